"""`rigslate check`: every rig at or below the paths, as text, brief lines or JSON."""

from __future__ import annotations

import argparse
import sys
import time
from collections.abc import Iterator, Sequence
from pathlib import Path

from model.checks.checklist import check
from model.checks.finding import Checklist, computed_alone
from model.quantity import UnitSystem
from model.rig.errors import InputError, InputProblem
from model.rig.reading import find_rigs
from tui.command_line import status

PROGRESS_AFTER = 1.0
"""Seconds after which a line of progress is shown on a terminal."""

Result = tuple[Path, Checklist | tuple[InputProblem, ...]]


def run(options: argparse.Namespace) -> int:
    """Check and print; returns the exit status."""
    if options.ask:
        return _ask(options)
    rigs, problems = _rigs(options.paths)
    status.complain(problems)
    results = list(_checked(rigs, computed_only=options.computed))
    lists = [found for _, found in results if isinstance(found, Checklist)]
    if options.json:
        _print_json(results, problems)
    else:
        _print_text(results, options)
    return status.of([one.verdict for one in lists], unreadable=bool(problems) or len(lists) < len(results))


def _ask(options: argparse.Namespace) -> int:
    from tui.command_line.ask import run as ask

    if len(options.paths) != 1 or Path(options.paths[0]).is_dir():
        print("rigslate check --ask: expected one rig file", file=sys.stderr)
        return status.UNREADABLE
    return ask(options)


def _rigs(paths: Sequence[str]) -> tuple[list[Path], list[InputProblem]]:
    rigs: list[Path] = []
    problems: list[InputProblem] = []
    for path in paths:
        found = find_rigs(Path(path))
        rigs += [one for one in found.rigs if one not in rigs]
        problems += found.problems
    return rigs, problems


def _checked(rigs: Sequence[Path], *, computed_only: bool) -> Iterator[Result]:
    """Check one after the other; a bad file never hides the others."""
    began, shown = time.monotonic(), False
    for number, path in enumerate(rigs, 1):
        try:
            checklist = check(path)
            yield path, computed_alone(checklist) if computed_only else checklist
        except InputError as error:
            yield path, error.problems
        if sys.stderr.isatty() and time.monotonic() - began > PROGRESS_AFTER and number < len(rigs):
            print(f"\rchecked {number} of {len(rigs)} rigs", end="", file=sys.stderr, flush=True)
            shown = True
    if shown:
        print("\r" + " " * 40 + "\r", end="", file=sys.stderr, flush=True)


def _print_json(results: Sequence[Result], elsewhere: Sequence[InputProblem]) -> None:
    """One object; files that are no rigs stand in it like rigs that could not be read."""
    from model.report.as_json import document, rig_object, unreadable_object

    rigs = []
    for path, found in results:
        if isinstance(found, Checklist):
            rigs.append(rig_object(found))
        else:
            rigs.append(unreadable_object(str(path), found))
            status.complain(found)
    for file in dict.fromkeys(one.file for one in elsewhere):
        rigs.append(unreadable_object(file, [one for one in elsewhere if one.file == file]))
    print(document(rigs))


def _print_summary(lists: Sequence[Checklist]) -> None:
    """What each of several rigs came to, a line each, so that it need not be looked for above."""
    from model.report.plain import summary_line

    if len(lists) > 1:
        print("\n" + "=" * 78 + "\n")
        for one in lists:
            print(summary_line(one))


def _print_text(results: Sequence[Result], options: argparse.Namespace) -> None:
    from textwrap import fill

    from model.report.plain import brief_line, checklist_text
    from model.report.wording import CAUTION

    first = True
    for _, found in results:
        if not isinstance(found, Checklist):
            status.complain(found)
            continue
        if options.brief:
            print(brief_line(found))
            continue
        if not first:
            print("\n" + "=" * 78 + "\n")
        print(checklist_text(found, UnitSystem(options.units)))
        first = False
    if not first:
        _print_summary([found for _, found in results if isinstance(found, Checklist)])
        print("\n" + fill(CAUTION, 78))
        print(f"full screen: rigslate {options.paths[0]}")
