"""Make the pictures of the screens in docs/pictures from the demo scenario.

    .venv/bin/python -m docs.make_pictures

Each picture is the program itself on the demo rigs, driven by keys; nothing is drawn by hand. Answers are given to a
copy of the rigs, so that the demo's own records stay as they are.
"""

from __future__ import annotations

import asyncio
import re
import shutil
import tempfile
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import UTC, datetime
from pathlib import Path

from tui.app import RigslateApp
from tui.model_services import ModelServices

ROOT = Path(__file__).parents[1]
PICTURES = ROOT / "docs" / "pictures"
FONT = "ui-monospace, 'DejaVu Sans Mono', 'Liberation Mono', Menlo, Consolas, monospace"


@dataclass(frozen=True)
class Picture:
    """One picture: its file's name, the rig or folder, the keys, and how the screen is set up."""

    name: str
    path: str
    keys: Sequence[str] = ()
    size: tuple[int, int] = (80, 24)
    ascii_only: bool = False
    light: bool = False


PICTURES_WANTED = (
    Picture("rigs", "", ("n",)),
    Picture("steps-fail", "05-pump-warm.toml", ("home", *("right",) * 3)),
    Picture("steps-pass-light", "05-pump-warm.toml", ("home", "down"), light=True),
    Picture("steps-inspected", "05-pump-warm.toml", ("home", "f", "enter", *"pin missing")),
    Picture("steps-ascii-60x20", "05-pump-warm.toml", ("home", *("right",) * 3), (60, 20), ascii_only=True),
    Picture("keys", "05-pump-warm.toml", ("question_mark",)),
)


class FixedClock(ModelServices):
    """The model with a clock that stands, so that the same pictures come out every time."""

    def now(self) -> datetime:
        """The morning of the drop."""
        return datetime(2026, 9, 16, 6, 30, tzinfo=UTC)


async def taken(picture: Picture, folder: Path) -> str:
    """The picture as SVG."""
    moments = iter(range(10**6))
    app = RigslateApp(
        folder / picture.path, FixedClock(), ascii_only=picture.ascii_only, watch=None,
        moment=lambda _: float(next(moments)),
    )  # fmt: skip
    async with app.run_test(size=picture.size) as pilot:
        await pilot.pause(0.2)
        await app.workers.wait_for_complete()
        await pilot.pause(0.2)
        for key in picture.keys:
            await pilot.press({" ": "space"}.get(key, key))
            await app.workers.wait_for_complete()
        if picture.light:
            app.switch_theme()
            app.front.hush()
        await pilot.pause(0.3)
        return plain_svg(app.export_screenshot(title="rigslate"), picture.name)


def plain_svg(svg: str, name: str) -> str:
    """The picture without links to anything outside, and with ids that don't change from run to run."""
    svg = re.sub(r"@font-face\s*\{.*?\}\s*", "", svg, flags=re.DOTALL)
    svg = re.sub(r"font-family: [^;]+;", f"font-family: {FONT};", svg)
    svg = re.sub(r"<!--.*?-->\s*", "", svg, flags=re.DOTALL)
    return re.sub(r"terminal-\d+", f"screen-{name}", svg).rstrip() + "\n"


def main() -> None:
    """Make all pictures."""
    PICTURES.mkdir(exist_ok=True)
    with tempfile.TemporaryDirectory() as folder:
        rigs = Path(folder) / "rigs"
        shutil.copytree(ROOT / "rigs", rigs)
        for picture in PICTURES_WANTED:
            svg = asyncio.run(taken(picture, rigs)).replace(str(folder), "")
            (PICTURES / f"{picture.name}.svg").write_text(svg, encoding="utf-8", newline="\n")
            print(f"docs/pictures/{picture.name}.svg")


if __name__ == "__main__":
    main()
