"""The other ways to an opening force, in words: shown beside the motion, each with what it leaves out."""

from __future__ import annotations

from textwrap import wrap

from model.checks.case import Case
from model.checks.finding import Finding
from model.quantity import UnitSystem
from model.report.wording import percent
from model.report.working import term_value
from model.study.walkthrough import WalkLine, walk

STEPS = ("opening.load_factor", "opening.canopy", "opening.line")
"""Steps that rest on an opening force alone."""
WIDTH = 76


def other_methods_lines(finding: Finding, case: Case | None, system: UnitSystem) -> list[str]:
    """Lines below the working of an opening step: every method, the range of those that hold here.

    Empty for any other step, or where the motion cannot be flown.
    """
    if case is None or finding.key not in STEPS or finding.result is None:
        return []
    found = walk(case)
    methods = [one for one in found.lines if one.method and one.term is not None]
    if not methods:
        return []
    lines = ["beside it, every way to the opening force:"]
    for one in methods:
        lines += _method(one, system)
    share = found.range_of_methods
    if share is not None:
        lines.append(f"  methods within their range: {percent(share[0])} to {percent(share[1])} of the motion")
    return lines


def _method(line: WalkLine, system: UnitSystem) -> list[str]:
    term = line.term
    assert term is not None
    said = [f"{line.title}: {term_value(term, system)}"]
    leaves_out = term.how.leaves_out if term.how else ""
    if leaves_out:
        said.append(f"leaves out {leaves_out}")
    if line.warning:
        said.append(line.warning)
    return wrap("; ".join(said), WIDTH, initial_indent="  ", subsequent_indent="      ")
