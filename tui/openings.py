"""What the opening screen asks of the model, and the one job that counts when keys come faster than results."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace
from pathlib import Path
from threading import Lock
from typing import TYPE_CHECKING, Protocol

from tui.services import CannotReadError, NotWrittenError

if TYPE_CHECKING:
    from model.checks.case import Case
    from model.checks.finding import Checklist
    from model.quantity import UnitSystem
    from model.report.flight_charts import FlightCharts
    from model.rig.locate import Loc
    from model.rig.reading import Loaded
    from model.study.measured import Comparison
    from model.study.moving import Input
    from model.study.walkthrough import Walk

Changes = Mapping["Loc", float]


@dataclass(frozen=True)
class Shot:
    """What comes of one set of inputs.

    ``felt`` is the load factor, with its ``margin`` to the limit set; ``notes`` say how far the filling rules can be
    trusted and ``cautions`` what speaks against them.
    """

    walk: Walk
    charts: FlightCharts
    comparisons: tuple[Comparison, ...]
    system: UnitSystem
    notes: tuple[str, ...] = ()
    cautions: tuple[str, ...] = ()
    felt: float | None = None
    margin: float | None = None


@dataclass(frozen=True)
class Start:
    """A rig as its file has it: what can be moved, and what comes of it unmoved."""

    loaded: Loaded
    checklist: Checklist
    inputs: tuple[Input, ...]
    shot: Shot


class Openings(Protocol):
    """The model as the opening screen sees it. All of it takes time and runs in a worker."""

    def open(self, rig: Path, system: UnitSystem) -> Start:
        """Read a rig and work its opening out.

        Raises:
            CannotReadError: If the rig or its limit set can't be read.
        """

    def shot(self, start: Start, changes: Changes, system: UnitSystem) -> Shot:
        """Work the opening out with some inputs moved.

        Raises:
            CannotReadError: If the moved values contradict each other.
        """

    def write(self, start: Start, changes: Changes, path: Path) -> None:
        """Write the moved rig to a new file.

        Raises:
            NotWrittenError: If it could not be written, or there is such a file.
        """


class ModelOpenings:
    """The real model."""

    def open(self, rig: Path, system: UnitSystem) -> Start:
        """Read a rig and work its opening out."""
        from model.checks.checklist import check_loaded
        from model.rig.errors import InputError
        from model.rig.reading import load
        from model.study.moving import inputs

        try:
            loaded = load(rig)
            checklist = check_loaded(loaded)
        except InputError as error:
            raise CannotReadError([str(problem) for problem in error.problems]) from error
        return Start(loaded, checklist, inputs(checklist.details), _shot(checklist, system))

    def shot(self, start: Start, changes: Changes, system: UnitSystem) -> Shot:
        """Work the opening out with some inputs moved."""
        from model.checks.case import Case

        if not changes:
            return _shot(start.checklist, system)
        loaded = _moved(start, changes)
        case = Case(loaded.rig.rig, loaded.limits.limits if loaded.limits else None)
        return _shot(replace(start.checklist, details=case), system)

    def write(self, start: Start, changes: Changes, path: Path) -> None:
        """Write the moved rig to a new file."""
        from model.study.moving import write_moved

        try:
            _moved(start, changes)
            write_moved(start.loaded, changes, {one.loc: one for one in start.inputs}, path)
        except CannotReadError as error:
            raise NotWrittenError(f"these values can't be ({'; '.join(error.problems)})") from error
        except FileExistsError as error:
            raise NotWrittenError(f"there is a file {path.name} already, and no file is ever written over") from error
        except OSError as error:
            raise NotWrittenError(f"{error.strerror or error} ({path})") from error


def _moved(start: Start, changes: Changes) -> Loaded:
    """The rig with its moved inputs, or `CannotReadError` where they contradict each other."""
    from model.checks.inputs import verify
    from model.study.moving import moved

    loaded = moved(start.loaded, changes, {one.loc: one for one in start.inputs})
    problems = verify(loaded.rig)
    if problems:
        raise CannotReadError([f"{problem.path}: {problem.message}" for problem in problems])
    return loaded


def _shot(checklist: Checklist, system: UnitSystem) -> Shot:
    from model.report.flight_charts import flight_charts
    from model.study.walkthrough import walk

    case: Case = checklist.details
    found = walk(case)
    notes, cautions = _trust(case)
    last = found.lines[-1].term
    felt = last.value if last is not None else None
    charts, compared = flight_charts(checklist, system), _compared(case)
    return Shot(found, charts, compared, system, notes, cautions, felt, _margin(checklist, felt))


def _compared(case: Case) -> tuple[Comparison, ...]:
    """Measured figures beside their estimates; none where the canopy rows lack data."""
    from model.checks.missing import Missing
    from model.study.measured import comparisons

    try:
        return comparisons(case)
    except Missing:
        return ()


def _trust(case: Case) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """The ratios of the filling rules, and the cautions that go with every number that rests on them."""
    from model.checks.missing import CannotJudge, Failed, Missing

    try:
        return case.forces.notes(), case.forces.cautions
    except (Missing, CannotJudge, Failed):
        return (), ()


def _margin(checklist: Checklist, felt: float | None) -> float | None:
    """Margin of a load factor to the limit set."""
    step = next((one for one in checklist.findings if one.key == "opening.load_factor"), None)
    return step.limit.margin(felt) if step is not None and step.limit is not None and felt is not None else None


class LatestJob:
    """The latest request alone is worked off; safe from the screen's thread and the worker's at once."""

    def __init__(self) -> None:
        """Start with nothing to do."""
        self._lock = Lock()
        self._latest = 0
        self._waiting: tuple[Changes, UnitSystem] | None = None
        self._working = False

    def ask(self, changes: Changes, system: UnitSystem) -> bool:
        """Ask for a set of inputs in place of what waits; True when a worker has to be started."""
        with self._lock:
            self._latest += 1
            self._waiting = changes, system
            start = not self._working
            self._working = True
            return start

    def take(self) -> tuple[int, Changes, UnitSystem] | None:
        """The request to work off, with its number; None ends the worker."""
        with self._lock:
            if self._waiting is None:
                self._working = False
                return None
            changes, system = self._waiting
            self._waiting = None
            return self._latest, changes, system

    def drop(self) -> None:
        """Forget what waits; a number is passed over, so that no result under way counts as the latest."""
        with self._lock:
            self._latest += 1
            self._waiting = None

    @property
    def latest(self) -> int:
        """The number of the latest request."""
        with self._lock:
            return self._latest

    def is_latest(self, number: int) -> bool:
        """Whether a result is that of the latest request."""
        with self._lock:
            return number == self._latest
