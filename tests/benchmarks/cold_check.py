"""Cold start of `rigslate check`: fresh processes against ones that only import the libraries it needs.

    python -m tests.benchmarks.cold_check [RUNS]

Runs are interleaved, so that a busy machine slows all of them alike; the ratios are of medians. The aim is 1.5 times a
process that imports pydantic and numpy. `import pydantic` alone loads little of it, so two more processes stand beside
it: one that loads what every model needs, and one that also builds a single small model.
"""

from __future__ import annotations

import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

from tests.model.checks.sample import write

ROOT = Path(__file__).parents[2]
MODEL = "from pydantic import BaseModel; import numpy"
BASE = "imports pydantic, numpy"


def cases(rig: Path) -> dict[str, list[str]]:
    """Commands by name."""
    python = sys.executable
    return {
        "python alone": [python, "-c", "pass"],
        BASE: [python, "-c", "import pydantic, numpy"],
        "imports BaseModel, numpy": [python, "-c", MODEL],
        "builds one model": [python, "-c", f"{MODEL}\nclass A(BaseModel):\n    x: int\nA(x=1)"],
        "imports rigslate check": [python, "-c", "import tui.command_line.check, model.checks.drop"],
        "rigslate check, one rig": [python, "-m", "tui.main", "check", str(rig)],
        "rigslate check --json, one rig": [python, "-m", "tui.main", "check", "--json", str(rig)],
    }


def measure(runs: int) -> dict[str, list[float]]:
    """Seconds of each run by name."""
    with tempfile.TemporaryDirectory() as folder:
        commands = cases(write(Path(folder)))
        found: dict[str, list[float]] = {name: [] for name in commands}
        for number in range(runs + 1):
            for name, command in commands.items():
                began = time.perf_counter()
                subprocess.run(command, stdout=subprocess.DEVNULL, cwd=ROOT, check=True)
                if number:  # the first run fills the file cache and writes bytecode
                    found[name].append(time.perf_counter() - began)
    return found


def main(runs: int) -> None:
    """Print the table."""
    found = measure(runs)
    base = statistics.median(found[BASE])
    print(f"{'process':32}{'median ms':>12}{'least ms':>12}{'ratio':>8}")
    for name, times in found.items():
        median = statistics.median(times)
        print(f"{name:32}{median * 1e3:12.0f}{min(times) * 1e3:12.0f}{median / base:8.2f}")


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else 11)
