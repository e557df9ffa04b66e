"""Going through a checklist: groups, the first open step, the next one."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from model.checks.finding import Finding


def groups(findings: Sequence[Finding]) -> list[tuple[str, list[int]]]:
    """The groups in order of their first step, each with the numbers of its steps."""
    found: dict[str, list[int]] = {}
    for number, finding in enumerate(findings):
        found.setdefault(finding.group, []).append(number)
    return list(found.items())


def order(findings: Sequence[Finding]) -> list[int]:
    """The numbers of the steps, group by group."""
    return [number for _, numbers in groups(findings) for number in numbers]


def place(findings: Sequence[Finding], here: int) -> tuple[int, int]:
    """Group of a step and its place in the group."""
    for group, (_, numbers) in enumerate(groups(findings)):
        if here in numbers:
            return group, numbers.index(here)
    return 0, 0


def is_open(finding: Finding, answered: Collection[str] = ()) -> bool:
    """Whether a step still waits; ``answered`` are keys answered since the checklist was made."""
    return finding.verdict == "OPEN" and finding.key not in answered


def first(findings: Sequence[Finding]) -> int:
    """Where to begin: the first open step, else the first that fails, else the first."""
    numbers = order(findings)
    for verdict in ("OPEN", "FAIL"):
        for number in numbers:
            if findings[number].verdict == verdict:
                return number
    return numbers[0] if numbers else 0


def next_open(findings: Sequence[Finding], here: int, answered: Collection[str] = ()) -> int | None:
    """The next open step after this one, starting over at the end; None where no other step is open."""
    numbers = order(findings)
    start = numbers.index(here) + 1 if here in numbers else 0
    for number in numbers[start:] + numbers[:start]:
        if number != here and is_open(findings[number], answered):
            return number
    return None


def step(findings: Sequence[Finding], here: int, by: int) -> int:
    """The step so many further on, held at both ends."""
    numbers = order(findings)
    if here not in numbers:
        return 0
    return numbers[max(0, min(numbers.index(here) + by, len(numbers) - 1))]


def step_group(findings: Sequence[Finding], here: int, by: int) -> int:
    """The first step of the group before or after."""
    listed = groups(findings)
    group = place(findings, here)[0] + by
    if not 0 <= group < len(listed):
        return here
    return listed[group][1][0]
