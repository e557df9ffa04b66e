"""How quick the full screen is, in a pseudo-terminal.

    .venv/bin/python -m tests.benchmarks.screen

Times depend on the machine; the first is given as a ratio to the smallest Textual program, measured turn by turn.
"""

from __future__ import annotations

import shutil
import statistics
import sys
import tempfile
import time
from collections.abc import Callable
from pathlib import Path

from tests.tui.terminal import RIGSLATE, Terminal

DEMO = Path(__file__).parents[2] / "rigs"
ROUNDS = 9
SMALLEST = """
from textual.app import App
from textual.widgets import Static
class Smallest(App):
    def compose(self):
        yield Static("first words")
Smallest().run(mouse=False)
"""


def milliseconds(work: Callable[[], object]) -> float:
    """How long something takes."""
    start = time.perf_counter()
    work()
    return (time.perf_counter() - start) * 1000


def first_words(command: list[str], words: str) -> float:
    """Milliseconds from the start of a process to its first words on the screen."""
    start = time.perf_counter()
    with Terminal(command) as terminal:
        terminal.wait_for(words)
        return (time.perf_counter() - start) * 1000


def first_screen() -> None:
    """The first painted screen against the smallest program."""
    names = {
        "smallest Textual program": ([sys.executable, "-c", SMALLEST], "first words"),
        "folder: first screen": ([*RIGSLATE, str(DEMO)], "reading the folder"),
        "folder: first rows": ([*RIGSLATE, str(DEMO)], "05-pump-warm"),
        "rig: first screen": ([*RIGSLATE, str(DEMO / "05-pump-warm.toml")], "calculating"),
        "rig: first step": ([*RIGSLATE, str(DEMO / "05-pump-warm.toml")], "step 1 of"),
    }
    times: dict[str, list[float]] = {name: [] for name in names}
    for _ in range(ROUNDS):
        for name, (command, words) in names.items():
            times[name].append(first_words(command, words))
    smallest = statistics.median(times["smallest Textual program"])
    for name, found in times.items():
        median = statistics.median(found)
        print(f"{name:28} {median:6.0f} ms   best {min(found):6.0f} ms   {median / smallest:5.2f} x smallest")


def keys() -> None:
    """A key on Steps to the changed screen."""
    found = []
    with Terminal([*RIGSLATE, str(DEMO / "05-pump-warm.toml")]) as terminal:
        terminal.wait_for("step 1 of")
        terminal.settle(1.0)
        for number in range(2, 42):
            terminal.press("down")
            found.append(milliseconds(lambda number=number: terminal.wait_for(f"step {number} of")))
            terminal.settle(0.05)
    found.sort()
    print(f"{'key on Steps to screen':28} {statistics.median(found):6.1f} ms   nine in ten under {found[35]:.1f} ms,"
          f" longest {found[-1]:.1f} ms")  # fmt: skip


def shelf(count: int = 500) -> None:
    """A folder of many rigs."""
    with tempfile.TemporaryDirectory() as folder:
        root = Path(folder) / "rigs"
        shutil.copytree(DEMO / "limits", root / "limits")
        demo = sorted(path for path in DEMO.glob("*.toml") if not path.name.endswith(".record.toml"))
        for number in range(count):
            source = demo[number % len(demo)]
            shutil.copy(source, root / f"{number:03}-{source.name[3:]}")
        start = time.perf_counter()
        with Terminal([*RIGSLATE, str(root)], timeout=600) as terminal:
            terminal.wait_for(f"{count} rigs")
            print(f"{f'{count} rigs: first rows':28} {(time.perf_counter() - start) * 1000:6.0f} ms")
            moved = []
            for _ in range(10):
                before = terminal.screen()
                terminal.press("down")
                moved.append(milliseconds(lambda before=before: terminal.wait_change(before)))
            print(f"{'  a key meanwhile':28} {statistics.median(moved):6.1f} ms   longest {max(moved):.1f} ms")
            terminal.wait_for(lambda rows: "calculating" not in "".join(rows))
            print(f"{'  all verdicts':28} {time.perf_counter() - start:6.1f} s")


if __name__ == "__main__":
    first_screen()
    keys()
    shelf()
