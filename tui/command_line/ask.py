"""`rigslate check --ask`: the open inspections asked line by line, for screen readers and serial consoles."""

from __future__ import annotations

import argparse
import sys
from pathlib import Path
from textwrap import fill
from typing import TYPE_CHECKING

from model.checks.checklist import check
from model.checks.finding import Checklist, Finding, Kind, Verdict
from model.report.plain import heading
from model.report.wording import CAUTION, answer_text
from model.rig.errors import InputError
from tui.answering import Draft
from tui.command_line import status
from tui.model_services import ModelServices
from tui.services import NotWrittenError

if TYPE_CHECKING:
    from tui.answering import Choice

WORDS: dict[str, Choice] = {
    "p": "pass", "pass": "pass", "f": "fail", "fail": "fail", "x": "does not apply", "does not apply": "does not apply",
}  # fmt: skip
LEAVE = ("q", "quit")


class _LeaveError(Exception):
    """The user is done, or the input has ended."""


def run(options: argparse.Namespace) -> int:
    """Ask what is open, write each answer at once; returns the status of the verdict afterwards."""
    path = Path(options.paths[0])
    try:
        checklist = check(path)
        _ask_all(path, checklist)
        after = check(path)
    except InputError as error:
        status.complain(error.problems)
        return status.UNREADABLE
    except NotWrittenError as error:
        print(f"not written: {error}", file=sys.stderr)
        return status.UNREADABLE
    print("\n".join(heading(after)))
    return status.of([after.verdict], unreadable=False)


def _ask_all(path: Path, checklist: Checklist) -> None:
    asked = [one for one in checklist.findings if one.kind is Kind.INSPECTED and one.verdict is Verdict.OPEN]
    print("\n".join(heading(checklist)))
    print(fill(CAUTION, 78))
    print(f"{len(asked)} inspections are open. An empty answer leaves one open, q leaves.")
    try:
        for number, finding in enumerate(asked, 1):
            print(f"\n{number} of {len(asked)}: {finding.title}")
            _ask(path, checklist, finding)
    except _LeaveError:
        print("\nleft; what was answered is written")


def _ask(path: Path, checklist: Checklist, finding: Finding) -> None:
    """Ask one inspection and write its answer."""
    inspection = finding.inspection
    for text in (finding.reason, answer_text(finding), *(f"caution: {one}" for one in finding.cautions)):
        if text:
            print(fill(text, 78))
    choice = _choice()
    if choice is None:
        return
    draft = Draft(
        finding.key,
        choice,
        inspection.wants_value if inspection else "",
        inspection.two_person if inspection else False,
    )
    while (name := draft.next_field) is not None:
        entered = _input(f"{draft.question(name)}: ")
        problem = draft.problem(name, entered)
        if problem is None:
            draft = draft.having(name, entered)
        else:
            print(problem)
    services = ModelServices()
    services.write(path, checklist, draft, services.now())
    print(f"written: {choice}")


def _choice() -> Choice | None:
    while True:
        entered = _input("pass, fail or does not apply (p, f, x): ").strip().casefold()
        if not entered:
            return None
        if entered in WORDS:
            return WORDS[entered]
        print(f"{entered!r} is none of them")


def _input(prompt: str) -> str:
    try:
        entered = input(prompt)
    except EOFError:
        raise _LeaveError from None
    if entered.strip().casefold() in LEAVE:
        raise _LeaveError
    return entered
