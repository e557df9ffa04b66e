"""What of a record stands: answers, deviations, signatures, and which of them the content has left behind."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from itertools import pairwise
from typing import TYPE_CHECKING, NamedTuple

from model.rig.digest import Raw, full_digest, rigging_digest, tables_digest

if TYPE_CHECKING:
    from model.rig.entry import Entry


class Standing(NamedTuple):
    """An entry that stands.

    Attributes:
        entry: the entry.
        stale: whether the content it was made on has changed since.
    """

    entry: Entry
    stale: bool


class Standings(NamedTuple):
    """What stands of a record.

    Attributes:
        answers: the current answer by step key.
        deviations: the current deviation by step key.
        signatures: every signature, oldest first.
        clock_backwards: numbers from 0 of entries on either side of a clock that ran backwards.
    """

    answers: Mapping[str, Standing]
    deviations: Mapping[str, Standing]
    signatures: tuple[Standing, ...]
    clock_backwards: frozenset[int]


def content_digest(
    kind: str, key: str, covers: Sequence[str] | None, rig: Raw, limits: Raw | None
) -> str:
    """The digest an entry of a kind is made on.

    Args:
        kind: an answer stands on the rigging, or on the tables its inspection covers; any other entry on everything.
        key: the step.
        covers: the tables; None for the whole rigging.
        rig: raw values of the rig file.
        limits: raw values of the limit set; None without one.
    """
    if kind != "answer":
        return full_digest(rig, limits)
    return tables_digest(rig, limits, covers, key) if covers else rigging_digest(rig, limits)


def standing(entries: Sequence[Entry], rig: Raw, limits: Raw | None) -> Standings:
    """What stands of a record against the present content.

    A withdrawal takes back every answer and deviation its step has so far: no older answer comes back to life.

    Args:
        entries: the record, oldest first.
        rig: raw values of the rig file.
        limits: raw values of the limit set; None without one.
    """
    if not entries:
        return Standings({}, {}, (), frozenset())
    answers: dict[str, Entry] = {}
    deviations: dict[str, Entry] = {}
    signatures: list[Entry] = []
    for entry in entries:
        if entry.kind == "answer":
            answers[entry.key] = entry
        elif entry.kind == "deviation":
            deviations[entry.key] = entry
        elif entry.kind == "signature":
            signatures.append(entry)
        elif entry.kind == "withdrawal":
            answers.pop(entry.key, None)
            deviations.pop(entry.key, None)
    whole, rigging = full_digest(rig, limits), rigging_digest(rig, limits)

    def stands(entry: Entry) -> Standing:
        if entry.kind != "answer":
            now = whole
        elif entry.covers:
            now = tables_digest(rig, limits, entry.covers, entry.key)
        else:
            now = rigging
        return Standing(entry, entry.on != now)

    return Standings(
        {key: stands(entry) for key, entry in answers.items()},
        {key: stands(entry) for key, entry in deviations.items()},
        tuple(stands(entry) for entry in signatures),
        _clock_backwards(entries),
    )


def _clock_backwards(entries: Sequence[Entry]) -> frozenset[int]:
    pairs = enumerate(pairwise(entries))
    return frozenset(row for first, (a, b) in pairs if b.when < a.when for row in (first, first + 1))
