"""`rigslate working`: the lines behind one step."""

from __future__ import annotations

import argparse
import sys
from pathlib import Path

from model.checks.checklist import check
from model.checks.finding import Finding
from model.quantity import UnitSystem
from model.report import wording
from model.report.load_path import load_path_lines
from model.report.other_methods import other_methods_lines
from model.report.working import working_text
from model.rig.errors import InputError
from model.rig.rule import nearest
from model.study.load_path import KEY
from tui.command_line import status


def run(options: argparse.Namespace) -> int:
    """Print the working of one step; returns the exit status."""
    try:
        checklist = check(Path(options.rig))
    except InputError as error:
        status.complain(error.problems)
        return status.UNREADABLE
    if options.key == KEY:
        print("\n".join(load_path_lines(checklist.details, UnitSystem(options.units))))
        return 0
    found = next((one for one in checklist.findings if one.key == options.key), None)
    if found is None:
        hint = nearest(options.key, [one.key for one in checklist.findings])
        print(f"{options.rig}: no step {options.key!r}" + (f"; {hint}" if hint else ""), file=sys.stderr)
        return status.UNREADABLE
    system = UnitSystem(options.units)
    print("\n".join([*_lines(found, system), *other_methods_lines(found, checklist.details, system)]))
    return 0


def _lines(finding: Finding, system: UnitSystem) -> list[str]:
    head = [f"{finding.verdict}  {finding.title}  ({finding.key})"]
    texts = [wording.value_text(finding, system), wording.bound_text(finding, system), wording.margin_text(finding)]
    head.append("; ".join(text for text in texts if text))
    head += [finding.reason] if finding.reason and finding.reason not in head[1] else []
    body = working_text(finding, system) or ["no working: " + (finding.reason or "an inspected step")]
    return [*head, "", *body, *(f"caution: {caution}" for caution in finding.cautions)]
