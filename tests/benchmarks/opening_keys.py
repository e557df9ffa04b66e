"""How quick the opening follows a key, in a pseudo-terminal.

    .venv/bin/python -m tests.benchmarks.opening_keys

Times depend on the machine and on what else it does. The time to the changed screen holds the terminal emulator's share
too; the time of the numbers alone is that of the worker.
"""

from __future__ import annotations

import os
import statistics
import time
from pathlib import Path

from model.quantity import UnitSystem
from tests.tui.terminal import RIGSLATE, Terminal
from tui.moves import Moves
from tui.openings import ModelOpenings

DEMO = Path(__file__).parents[2] / "rigs"
RIGS = ("05-pump-warm.toml", "06-reefed-truck.toml", "07-high-box.toml")
ROUNDS = 30


def told(name: str, found: list[float]) -> None:
    """Print median, nine in ten and best."""
    found = sorted(found)
    print(f"  {name:44} {statistics.median(found):6.1f} ms   nine in ten under {found[int(len(found) * 0.9)]:6.1f} ms"
          f"   best {found[0]:6.1f} ms")  # fmt: skip


def numbers(rig: Path) -> None:
    """The worker's part: lines, curves and comparisons of one set of inputs."""
    model = ModelOpenings()
    start = model.open(rig, UnitSystem.WRITTEN)
    moves = Moves(start.inputs)
    moves.choose(1)
    found = []
    for _ in range(ROUNDS):
        moves.change(1, UnitSystem.WRITTEN)
        begun = time.perf_counter()
        model.shot(start, moves.changes, UnitSystem.WRITTEN)
        found.append((time.perf_counter() - begun) * 1000)
    told("numbers of a moved input", found)


def screen(rig: Path) -> None:
    """From the key to the input's new value, and to all the new numbers and the new curve."""
    first, all_new = [], []
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("step 1 of")
        terminal.press("o")
        terminal.wait_for("methods:")
        terminal.wait_gone("calculating")
        terminal.press("down")
        terminal.settle()
        for _ in range(ROUNDS):
            before = terminal.screen()
            begun = time.perf_counter()
            terminal.press("right")
            terminal.wait_change(before)
            first.append((time.perf_counter() - begun) * 1000)
            terminal.wait_for(lambda rows, before=before: rows != before and "calculating" not in rows[0])
            all_new.append((time.perf_counter() - begun) * 1000)
            terminal.settle(0.1)
    told("key to the input's new value", first)
    told("key to the new numbers and the new curve", all_new)


if __name__ == "__main__":
    print(f"load of the machine {os.getloadavg()[0]:.1f} on {os.cpu_count()} processors")
    for one in RIGS:
        print(one)
        numbers(DEMO / one)
        screen(DEMO / one)
