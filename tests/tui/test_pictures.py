"""The pictures of the docs are the program itself."""

import re
import shutil
from pathlib import Path

from docs.make_pictures import PICTURES, PICTURES_WANTED, ROOT, taken


async def test_a_picture_shows_the_screen_and_links_to_nothing_outside(tmp_path: Path) -> None:
    shutil.copytree(ROOT / "rigs", tmp_path / "rigs")
    picture = next(one for one in PICTURES_WANTED if one.name == "steps-fail")
    svg = await taken(picture, tmp_path / "rigs")
    assert "FAIL" in svg
    assert set(re.findall(r"https?://[^\"' )<]+", svg)) == {"http://www.w3.org/2000/svg"}


def test_every_picture_is_there() -> None:
    for picture in PICTURES_WANTED:
        assert (PICTURES / f"{picture.name}.svg").read_text(encoding="utf-8").startswith("<svg")
