"""Exit statuses, and how mistakes are printed."""

from __future__ import annotations

import sys
from collections.abc import Iterable

from model.checks.finding import Verdict
from model.rig.errors import InputProblem
from tui.command_line.arguments import UNREADABLE

__all__ = ["OF_VERDICT", "UNREADABLE", "complain", "of"]
OF_VERDICT = {Verdict.PASS: 0, Verdict.FAIL: 1, Verdict.OPEN: 3}


def of(verdicts: Iterable[Verdict], *, unreadable: bool) -> int:
    """The status of several rigs: unreadable over FAIL over OPEN over PASS."""
    if unreadable:
        return UNREADABLE
    found = {OF_VERDICT[verdict] for verdict in verdicts}
    return 1 if 1 in found else 3 if 3 in found else 0


def complain(problems: Iterable[InputProblem]) -> None:
    """Print mistakes on stderr, a line each."""
    for problem in problems:
        print(problem, file=sys.stderr)
