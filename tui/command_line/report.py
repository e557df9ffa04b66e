"""`rigslate report`: one rig or a folder of rigs as a text to print, keep or hand on."""

from __future__ import annotations

import argparse
import os
import stat
import sys
from collections.abc import Callable, Iterable
from pathlib import Path
from typing import TYPE_CHECKING

from model.checks.checklist import check
from model.checks.finding import Checklist
from model.quantity import UnitSystem
from model.rig.errors import InputError, InputProblem
from model.rig.reading import find_rigs
from model.rig.record import record_path
from model.rig.source import shown_path
from model.rig.whole import write_whole
from tui.command_line import status

if TYPE_CHECKING:
    from model.report.document import Report

ENDINGS = (".txt", ".md", ".html")


class _NotWritten(Exception):
    """Why a report is not written where it was asked for."""


def run(options: argparse.Namespace) -> int:
    """Write the report; returns the exit status: 0 done, 2 where a file could not be read or written."""
    target = Path(options.output) if options.output else None
    try:
        if target is not None:
            _must_be_writable(target)
        checklists, problems = _check(Path(options.path))
        status.complain(problems)
        if not checklists:
            return status.UNREADABLE
        if target is not None:
            _must_be_no_input(target, checklists)
        text = _rendered(checklists, problems, options, target)
        if target is None:
            sys.stdout.write(text)
        else:
            _write_whole(target, text)
    except _NotWritten as reason:
        print(reason, file=sys.stderr)
        return status.UNREADABLE
    return status.UNREADABLE if problems else 0


def _check(path: Path) -> tuple[list[Checklist], list[InputProblem]]:
    found = find_rigs(path)
    problems, checklists = list(found.problems), []
    for rig in found.rigs:
        try:
            checklists.append(check(rig))
        except InputError as error:
            problems += error.problems
    return checklists, problems


def _rendered(
    checklists: list[Checklist], problems: list[InputProblem], options: argparse.Namespace, target: Path | None
) -> str:
    from importlib.metadata import PackageNotFoundError, version

    from model.report.document import Options, report

    try:
        program = f"rigslate {version('rigslate')}"
    except PackageNotFoundError:
        program = "rigslate, version unknown"
    chosen = Options(program, UnitSystem(options.units), options.working)
    return _renderer(target)(report(checklists, problems, chosen))


def _renderer(target: Path | None) -> Callable[[Report], str]:
    """What turns a report into the form that the ending of the file asks for."""
    from model.report import as_html, as_markdown, as_text

    if target is None:
        return as_text.text
    return {".txt": as_text.pages, ".md": as_markdown.markdown, ".html": as_html.html}[target.suffix.lower()]


def _must_be_writable(target: Path) -> None:
    """Refuse a name whose ending is none of ours, and a place that holds something else than a file."""
    name = shown_path(target)
    for path in (target, Path(os.path.realpath(target))):
        if path.suffix.lower() not in ENDINGS:
            raise _NotWritten(f"{name}: a report ends in {', '.join(ENDINGS[:-1])} or {ENDINGS[-1]}")
    try:
        if not stat.S_ISREG(os.stat(target).st_mode):
            raise _NotWritten(f"{name}: not a file that a report can replace")
    except FileNotFoundError:
        if not os.path.isdir(os.path.dirname(os.path.realpath(target))):
            raise _NotWritten(f"{name}: no such folder") from None
    except (OSError, ValueError) as error:
        raise _NotWritten(f"{name}: {_why(error)}") from None


def _must_be_no_input(target: Path, checklists: Iterable[Checklist]) -> None:
    """Refuse to write over a rig, its limit set or its record, whatever they are called."""
    for checklist in checklists:
        rig = Path(checklist.file)
        inputs = [rig, record_path(rig)]
        limits = checklist.details.rig.limits if checklist.details else None
        inputs += [rig.parent / limits] if limits else []
        if any(os.path.exists(one) and os.path.exists(target) and os.path.samefile(one, target) for one in inputs):
            raise _NotWritten(f"{shown_path(target)}: is read for this report and is not overwritten")


def _write_whole(target: Path, text: str) -> None:
    """Put the report in place in one step: a former one stands until the new one is complete."""
    try:
        write_whole(Path(os.path.realpath(target)), text.encode("utf-8"))
    except OSError as error:
        raise _NotWritten(f"{shown_path(target)}: not written: {_why(error)}") from None


def _why(error: OSError | ValueError) -> str:
    return (getattr(error, "strerror", None) or str(error)).lower()
