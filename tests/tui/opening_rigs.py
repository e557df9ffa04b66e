"""Rigs of the demo scenario in a folder of their own, and the app on the opening of one."""

from __future__ import annotations

import re
import shutil
from pathlib import Path

from tests.tui.fakes import after, settled
from tui.app import RigslateApp
from tui.model_services import ModelServices
from tui.screens.opening import OpeningScreen

DEMO = Path(__file__).parents[2] / "rigs"
WARM, REEFED, TWO_ROWS, HALF, MEASURED = (
    "05-pump-warm.toml", "06-reefed-truck.toml", "07-high-box.toml", "09-half-entered.toml", "10-measured-water.toml",
)  # fmt: skip


def copied(folder: Path, name: str = WARM, *changes: tuple[str, str]) -> Path:
    """A demo rig with its limit set in another folder, some of its text replaced; every text must be there."""
    shutil.copytree(DEMO / "limits", folder / "limits", dirs_exist_ok=True)
    text = (DEMO / name).read_text(encoding="utf-8")
    for old, new in changes:
        assert old in text
        text = text.replace(old, new, 1)
    rig = folder / name
    rig.write_text(text, encoding="utf-8")
    return rig


def running_on(rig: Path, *, ascii_only: bool = False, colour: bool = True) -> RigslateApp:
    """The app on one rig, with the real model; every key counts as one of its own."""
    ticks = iter(range(10**9))
    return RigslateApp(rig, ModelServices(), ascii_only=ascii_only, colour=colour, watch=None,
                       moment=lambda _: float(next(ticks)))  # fmt: skip


async def on_opening(running: RigslateApp, *keys: str) -> str:
    """The opening screen of the rig, after some keys."""
    await settled(running)
    first = await after(running, "o")
    return await after(running, *keys) if keys else first


def opening(running: RigslateApp) -> OpeningScreen:
    """The opening screen in front."""
    screen = running.front
    assert isinstance(screen, OpeningScreen)
    return screen


def shown(screen: str) -> str:
    """A screen's words without its line breaks."""
    return re.sub(r"\s+", " ", screen)
