"""The opening in a pseudo-terminal: a key held down."""

import re
import time
from pathlib import Path

from model.quantity import Dimension, UnitSystem, from_unit
from tests.tui.opening_rigs import WARM, copied
from tests.tui.terminal import RIGSLATE, Terminal
from tui.openings import ModelOpenings

AIRSPEED = re.compile(r"indicated airspeed +(\d+) kt")
PEAK = re.compile(r"(?:time|distance) rule: peak ([\d,]+) lbf")
SECONDS, RATE = 2.0, 30


def hold(terminal: Terminal, key: str) -> list[list[str]]:
    """Hold a key down; every whole frame seen meanwhile."""
    frames: list[list[str]] = []
    start = time.monotonic()
    for count in range(1, int(SECONDS * RATE) + 1):
        terminal.press(key)
        until = start + count / RATE

        def seen(rows: list[str], until: float = until) -> bool:
            frames.append(rows)
            return time.monotonic() >= until

        terminal.wait_for(seen)
    return frames


def number(pattern: re.Pattern[str], rows: list[str]) -> int | None:
    """A number on the screen."""
    found = pattern.search("\n".join(rows))
    return int(found[1].replace(",", "")) if found else None


def test_a_key_held_down_leaves_the_screen_live_and_the_last_value_is_the_last_computed(tmp_path: Path) -> None:
    rig = copied(tmp_path, WARM)
    with Terminal([*RIGSLATE, str(rig)], columns=100, rows=30) as terminal:
        terminal.wait_for("step 1 of")
        terminal.press("o")
        terminal.wait_for("peak 15,846 lbf")
        terminal.press("down")
        terminal.wait_for("input 2 of")
        frames = hold(terminal, "right")
        # Another key acts at once, though numbers may still be on their way.
        terminal.press("space")
        terminal.wait_for("line 2 of")
        frames.append(terminal.wait_gone("calculating"))
        last = 130 + int(SECONDS * RATE)
        assert number(AIRSPEED, frames[-1]) == last
        assert len({number(AIRSPEED, rows) for rows in frames}) > 10

        model = ModelOpenings()
        start = model.open(rig, UnitSystem.WRITTEN)
        settled = {
            (speed, number(PEAK, rows)) for rows in frames
            if "calculating" not in rows[0] and (speed := number(AIRSPEED, rows)) is not None
        }  # fmt: skip
        assert {speed for speed, _ in settled} >= {130, last}
        for speed, peak in settled:
            changes = {("drop", "airspeed"): from_unit(speed, "kt", Dimension.SPEED)} if speed != 130 else {}
            shot = model.shot(start, changes, UnitSystem.WRITTEN)
            assert number(PEAK, list(shot.charts.charts[0].said)) == peak, speed
        terminal.press("0")
        terminal.wait_for("peak 15,846 lbf")
        terminal.press("ctrl+q")
        assert terminal.wait_exit() == 0
