"""The rigs the program knows of, each with its last result."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field
from pathlib import Path
from typing import TYPE_CHECKING

from tui.services import Found, Stamp, stamps

if TYPE_CHECKING:
    from model.checks.finding import Checklist

WORDS = ("PASS", "FAIL", "OPEN", "NOT COUNTED")
_KEPT = 40
"""Checklists kept whole; of the others the summary stays."""
CANNOT_READ = "CAN'T READ"


@dataclass(frozen=True, slots=True)
class Summary:
    """What the shelf shows of a checklist."""

    verdict: str
    name: str
    reference: str
    revision: int | None
    limit_set: str
    counts: tuple[tuple[str, int], ...]
    worst: tuple[str, str, float] | None
    signed: tuple[tuple[str, bool], ...]
    stale: tuple[str, ...]

    @staticmethod
    def of(checklist: Checklist) -> Summary:
        """The summary of a checklist."""
        worst = checklist.worst
        verdicts = [finding.verdict for finding in checklist.findings]
        return Summary(
            str(checklist.verdict),
            checklist.name,
            checklist.reference,
            checklist.revision,
            checklist.limit_set,
            tuple((word, verdicts.count(word)) for word in WORDS if word in verdicts),  # type: ignore[arg-type]
            (worst.key, worst.title, worst.margin) if worst is not None and worst.margin is not None else None,
            tuple((signature.who, signature.stale) for signature in checklist.signatures),
            checklist.stale,
        )


@dataclass(slots=True)
class Entry:
    """One rig of the shelf. ``problems`` are the reasons why it can't be read."""

    path: Path
    label: str
    summary: Summary | None = None
    checklist: Checklist | None = None
    problems: tuple[str, ...] = ()
    stamps: tuple[tuple[Path, Stamp], ...] = ()
    no_rig: bool = False

    @property
    def verdict(self) -> str:
        """The verdict as a word, empty while there is none."""
        if self.problems:
            return CANNOT_READ
        return self.summary.verdict if self.summary else ""


@dataclass(slots=True)
class Shelf:
    """All rigs below a folder, sorted by path."""

    root: Path
    entries: dict[Path, Entry] = field(default_factory=dict)
    _kept: list[Path] = field(default_factory=list)

    def take_in(self, found: Found) -> tuple[list[Path], list[Path]]:
        """Take what was found in the folder; returns the rigs that are new and those that are gone."""
        unreadable = dict(found.problems)
        here = sorted({*found.rigs, *unreadable})
        still = set(here)
        gone = [path for path in self.entries if path not in still]
        for path in gone:
            del self.entries[path]
        new = [path for path in found.rigs if path not in self.entries or self.entries[path].no_rig]
        known = self.entries
        self.entries = {
            path: known[path] if path in known and path not in new else Entry(path, self._label(path)) for path in here
        }
        for path, problem in unreadable.items():
            self.entries[path].problems = (problem,)
            self.entries[path].no_rig = True
            self.entries[path].stamps = stamps([path])
        return new, gone

    def _label(self, path: Path) -> str:
        try:
            return str(path.relative_to(self.root))
        except ValueError:
            return path.name

    def settle(self, path: Path, checklist: Checklist | None, problems: Iterable[str]) -> None:
        """Note a rig's result."""
        entry = self.entries.get(path)
        if entry is None:
            return
        entry.problems = tuple(problems)
        entry.checklist = checklist
        entry.no_rig = entry.no_rig and checklist is None
        entry.summary = Summary.of(checklist) if checklist is not None else None
        if path in self._kept:
            self._kept.remove(path)
        if checklist is not None:
            self._kept.append(path)
            while len(self._kept) > _KEPT:
                old = self.entries.get(self._kept.pop(0))
                if old is not None:
                    old.checklist = None

    @property
    def rows(self) -> list[Entry]:
        """The entries in order."""
        return list(self.entries.values())

    def next_not_pass(self, after: Path | None) -> Path | None:
        """The next rig with a result that is not PASS, starting over at the end; None where there is none."""
        paths = list(self.entries)
        start = paths.index(after) + 1 if after in self.entries else 0
        for path in paths[start:] + paths[:start]:
            if self.entries[path].verdict not in ("", "PASS"):
                return path
        return None
