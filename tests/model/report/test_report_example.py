"""The worked opening in the docs is what the program says now."""

from __future__ import annotations

import re
from pathlib import Path

from docs.make_example import example


def test_the_worked_opening_and_its_pictures_are_up_to_date() -> None:
    for path, made in example().items():
        assert path.read_text(encoding="utf-8") == made, "write it anew: python -m docs.make_example"


def test_every_picture_of_the_example_is_shown_in_it_and_is_there() -> None:
    [page] = [path for path in example() if path.suffix == ".md"]
    shown = {Path(page.parent, name) for name in re.findall(r"\]\((pictures/[\w.-]+)\)", page.read_text("utf-8"))}
    assert shown == {path for path in example() if path.suffix == ".svg"}
