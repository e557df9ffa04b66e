"""What the screens ask of the model. The model is imported when it is first asked, in a worker, never at the start."""

from __future__ import annotations

import os
import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from datetime import datetime
from pathlib import Path
from typing import TYPE_CHECKING, Protocol

from tui.answering import Draft

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding
    from model.quantity import UnitSystem


class CannotReadError(Exception):
    """A rig, or a folder, that can't be read; one line of text for each problem."""

    def __init__(self, problems: Sequence[str]) -> None:
        """Take the problems."""
        super().__init__("\n".join(problems))
        self.problems = tuple(problems)


class NotWrittenError(Exception):
    """An entry that could not be written; the text says why, and the record is as it was."""


@dataclass(frozen=True, slots=True)
class Found:
    """What lies in a folder: rig files, and files that should be rigs but can't be read, with the reason."""

    rigs: tuple[Path, ...]
    problems: tuple[tuple[Path, str], ...] = ()


@dataclass(frozen=True, slots=True)
class Remedy:
    """A change of one input that would make a step pass."""

    text: str
    value: str
    now: str


class Services(Protocol):
    """The model as the screens see it. All but `now` may take time and run in a worker."""

    def find(self, path: Path) -> Found:
        """The rigs below a folder, or the one rig of a file.

        Raises:
            CannotReadError: If there is none.
        """

    def glance(self, folder: Path) -> tuple[Path, ...]:
        """What look like rigs below a folder, found in a moment; `find` has the last word."""

    def inputs(self, rig: Path) -> tuple[Path, ...]:
        """The files a rig's checklist is made from."""

    def check(self, rig: Path) -> Checklist:
        """The checklist of a rig.

        Raises:
            CannotReadError: If the rig or its limit set can't be read.
        """

    def remedies(self, finding: Finding, system: UnitSystem) -> tuple[Remedy, ...]:
        """What would make a failing step pass."""

    def working(self, checklist: Checklist, finding: Finding, system: UnitSystem) -> list[str]:
        """The lines that lead to a computed step's number, and what other methods give."""

    def write(self, rig: Path, checklist: Checklist, draft: Draft, when: datetime) -> None:
        """Append an answer or a withdrawal to the record beside the rig.

        Raises:
            NotWrittenError: If it could not be written; nothing is changed then.
        """

    def now(self) -> datetime:
        """The time of day, with its zone."""


Stamp = tuple[int, int, int] | None


def stamp(path: Path) -> Stamp:
    """What tells a changed file from an unchanged one; None where there is none or it can't be seen."""
    try:
        found = os.stat(path)
    except OSError:
        return None
    return found.st_mtime_ns, found.st_size, found.st_ino


def stamps(paths: Sequence[Path]) -> tuple[tuple[Path, Stamp], ...]:
    """The stamps of several files."""
    return tuple((path, stamp(path)) for path in paths)


def folders(root: Path) -> Iterator[Path]:
    """A folder and those below it, hidden and linked ones passed over."""
    for place, below, _ in os.walk(root, followlinks=False):
        below[:] = [name for name in below if not name.startswith(".")]
        yield Path(place)


def toml_files(folder: Path) -> tuple[Path, ...]:
    """The names of all files below a folder that may be rigs, records left out, sorted."""
    return tuple(sorted(
        path for place in folders(folder) for path in place.glob("*.toml")
        if not path.name.startswith(".") and not path.name.endswith(".record.toml") and not path.is_dir()
    ))  # fmt: skip


_RIG_TABLE = re.compile(rb"^[ \t]*\[[ \t]*rig[ \t]*\]", re.MULTILINE)
_LARGEST = 2_000_000


def looks_like_rigs(folder: Path) -> tuple[Path, ...]:
    """The files below a folder that hold a rig table, by a look at their text alone, sorted."""
    found = []
    for path in toml_files(folder):
        try:
            if path.is_file() and path.stat().st_size <= _LARGEST and _RIG_TABLE.search(path.read_bytes()):
                found.append(path)
        except OSError:
            continue
    return tuple(found)
