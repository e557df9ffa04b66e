"""What the workers tell the screen's thread."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

from textual.message import Message

from tui.answering import Draft
from tui.services import Found, Remedy, Stamp

if TYPE_CHECKING:
    from model.checks.finding import Checklist
    from model.quantity import UnitSystem


@dataclass
class RigsGlanced(Message):
    """What look like rigs, before the folder is read in earnest."""

    rigs: tuple[Path, ...]


@dataclass
class RigsFound(Message):
    """What lies in the folder, or why nothing could be found."""

    found: Found | None
    problems: tuple[str, ...]


@dataclass
class Checked(Message):
    """A rig's checklist, or why there is none, with the number of the job."""

    rig: Path
    job: int
    checklist: Checklist | None
    problems: tuple[str, ...]
    stamps: tuple[tuple[Path, Stamp], ...]


@dataclass
class FilesChanged(Message):
    """Rigs whose files changed on disk, and whether the folder itself did."""

    rigs: tuple[Path, ...]
    folder: bool


@dataclass
class Remedied(Message):
    """What would make a step pass, with the number of the request."""

    request: int
    remedies: tuple[Remedy, ...]
    problem: str = ""


@dataclass
class Worked(Message):
    """The lines of a working, with the number of the request."""

    request: int
    lines: tuple[str, ...]
    system: UnitSystem


@dataclass
class Written(Message):
    """An answer is in the record, or the reason why it is not."""

    rig: Path
    draft: Draft
    problem: str
