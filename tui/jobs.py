"""Which rigs wait for their checklist, so that the one on the screen comes first and no old result counts as new."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from pathlib import Path
from threading import Lock


class JobBook:
    """Jobs by rig; safe to use from the screen's thread and the worker's at once.

    Every request gets a number, and only the result with the latest number of its rig counts.
    """

    def __init__(self) -> None:
        """Start with nothing to do."""
        self._lock = Lock()
        self._waiting: dict[Path, int] = {}
        self._latest: dict[Path, int] = {}
        self._done: dict[Path, int] = {}
        self._number = 0
        self._first: tuple[Path, ...] = ()
        self._working = False

    def ask(self, rigs: Iterable[Path]) -> bool:
        """Ask for checklists; True when a worker has to be started."""
        with self._lock:
            for rig in rigs:
                self._number += 1
                self._latest[rig] = self._waiting[rig] = self._number
            start = bool(self._waiting) and not self._working
            self._working = self._working or start
            return start

    def prefer(self, rigs: Sequence[Path]) -> None:
        """Name the rigs to be checked before all others, the most wanted first."""
        with self._lock:
            self._first = tuple(rigs)

    def take(self) -> tuple[Path, int] | None:
        """The next job; None ends the worker."""
        with self._lock:
            rig = next((wanted for wanted in self._first if wanted in self._waiting), None)
            if rig is None:
                rig = next(iter(self._waiting), None)
            if rig is None:
                self._working = False
                return None
            return rig, self._waiting.pop(rig)

    def stop(self) -> None:
        """Note that the worker ended before its work did."""
        with self._lock:
            self._working = False

    def accept(self, rig: Path, number: int) -> bool:
        """Whether a result is the latest asked for; it is noted as done then."""
        with self._lock:
            if self._latest.get(rig) != number:
                return False
            self._done[rig] = number
            return True

    def under_way(self, rig: Path) -> bool:
        """Whether a newer result than the one shown is still to come."""
        with self._lock:
            return rig in self._latest and self._latest[rig] != self._done.get(rig)

    def forget(self, rig: Path) -> None:
        """Drop a rig whose file is gone."""
        with self._lock:
            self._waiting.pop(rig, None)
            self._latest.pop(rig, None)
            self._done.pop(rig, None)

    @property
    def left(self) -> int:
        """How many rigs are still under way."""
        with self._lock:
            return sum(self._done.get(rig) != number for rig, number in self._latest.items())
