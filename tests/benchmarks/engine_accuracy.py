"""The whole comparison of the engine with a plain integration: every feature under both rules, and very unlike cases.

python -m tests.benchmarks.engine_accuracy [cases of each exponent]
"""

from __future__ import annotations

import os

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")

import sys

from model.physics.flight import FillingRule, solve
from tests.model.physics.flight.cases import RIGS, cloud, features, torture
from tests.model.physics.flight.compare import LIMITS, differences, missed
from tests.model.physics.flight.reference import pick

RULES: tuple[FillingRule, ...] = ("time", "distance")
EXPONENTS = (0.5, 0.6, 0.75, 1.0, 1.2, 1.5, 1.8, 2.0, 2.5, 3.0, 4.0, 6.0)


def main() -> int:
    """Print the largest differences; the number of misses."""
    cases = int(sys.argv[1]) if len(sys.argv) > 1 else 20
    worst, misses, flown = dict.fromkeys(LIMITS, 0.0), 0, 0

    def take(name: str, found: dict[str, float]) -> None:
        nonlocal misses, flown
        flown += 1
        for key, value in found.items():
            worst[key] = max(worst[key], value)
        if missed(found):
            misses += 1
            print("missed:", name, missed(found), flush=True)

    for rule in RULES:
        for name, drop in (*((f"rig {number}", rig) for number, rig in RIGS.items()), *features()):
            take(f"{rule}, {name}", differences(drop, rule, [0]))
            take(f"{rule}, {name}, in a cloud", differences(cloud(drop, 60, 2), rule, [11]))
        for exponent in EXPONENTS:
            drop = torture(exponent, 300, int(10 * exponent))
            print(f"{rule}, exponent {exponent}: {solve(drop, rule).accurate.sum()} of 300 solved", flush=True)
            for case in range(cases):
                alone = case % 2
                found = differences(pick(drop, case), rule, [0]) if alone else differences(drop, rule, [case])
                take(f"{rule}, exponent {exponent}, case {case}", found)
    print(f"{flown} flights, largest relative differences (limits):")
    for key, value in worst.items():
        print(f"  {key:22} {value:8.1e}  ({LIMITS[key]:.0e})")
    return misses


if __name__ == "__main__":
    sys.exit(main())
