"""What the groups of the load path add to a check, warm: all steps against those of load to height, in one run.

Run with ``python -m tests.benchmarks.load_path_cost``. Both are timed in turn, so that a machine that drifts drifts
for both; the median of the ratios is what counts.
"""

from __future__ import annotations

import time
from pathlib import Path
from statistics import median

from model.checks import registry
from model.checks.case import Case
from model.checks.finding import Ruling
from model.checks.step import judge
from model.rig.reading import load

RIGS = Path(__file__).parents[2] / "rigs"
EARLIER = ("load", "balance", "zone", "descent", "opening", "height")
ROUNDS = 15


def seconds(path: Path, groups: tuple[str, ...] | None) -> float:
    """One check of a rig, reading included; only the named groups, or all."""
    began = time.perf_counter()
    loaded = load(path)
    case = Case(loaded.rig.rig, loaded.limits.limits if loaded.limits else None)
    for step in registry.steps(loaded.rig.rig):
        if groups is None or step.group in groups:
            judge(step, case, Ruling())
    return time.perf_counter() - began


def main() -> None:
    """Print a line a rig."""
    print(f"{'rig':<28}{'load to height':>16}{'all groups':>12}{'ratio':>8}")
    for path in sorted(RIGS.glob("[0-9]*.toml")):
        if path.name.endswith(".record.toml"):
            continue
        pairs = [(seconds(path, EARLIER), seconds(path, None)) for _ in range(ROUNDS)][2:]
        fewer, every = median(pair[0] for pair in pairs), median(pair[1] for pair in pairs)
        ratio = median(pair[1] / pair[0] for pair in pairs)
        print(f"{path.name:<28}{fewer * 1e3:>13.1f} ms{every * 1e3:>9.1f} ms{ratio:>8.2f}")


if __name__ == "__main__":
    main()
