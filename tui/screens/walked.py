"""What the opening screen has worked out, always for the latest inputs."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from textual.message import Message

from model.quantity import UnitSystem
from tui.moves import Moves
from tui.openings import Changes, LatestJob, Openings, Shot, Start
from tui.screens.moved_file import MovedFileScreen
from tui.services import CannotReadError
from tui.views.opening import Entry, entries
from tui.workers import unexpected


@dataclass
class Opened(Message):
    """A rig is read, or why it can't be."""

    request: int
    start: Start | None
    problems: tuple[str, ...] = ()


@dataclass
class ShotMade(Message):
    """What comes of a set of inputs and of the file's own, or why nothing does, with the number of the job."""

    job: int
    shot: Shot | None
    filed: Shot | None
    problems: tuple[str, ...] = ()


class WalkedScreen(MovedFileScreen):
    """A screen with the lines of an opening; keys never wait for them, and old numbers are known to be old."""

    def __init__(self, rig: Path, openings: Openings) -> None:
        """Take the rig.

        Args:
            rig: Its file.
            openings: The model.
        """
        super().__init__(rig)
        self._openings = openings
        self._jobs = LatestJob()
        self._request = 0
        self._opening = True
        self._start: Start | None = None
        self._shot: Shot | None = None
        self._filed: Shot | None = None
        self._shown_job = 0
        self._problems: tuple[str, ...] = ()
        self._listed: list[Entry] = []
        self._at = 0
        self._moves = Moves(())

    def on_mount(self) -> None:
        """Have the rig read."""
        self._open()

    @property
    def calculating(self) -> bool:
        """Whether newer numbers than the ones shown are on their way."""
        return self._opening or self.slate.book.under_way(self.rig) or not self._jobs.is_latest(self._shown_job)

    def _open(self) -> None:
        self._opening = True
        self._request += 1
        request, system = self._request, self.slate.system

        def work() -> None:
            try:
                message = Opened(request, self._openings.open(self.rig, system))
            except CannotReadError as error:
                message = Opened(request, None, error.problems)
            except Exception as error:
                message = Opened(request, None, (unexpected(error),))
            self.post_message(message)

        self.slate.run_worker(work, thread=True, group="opening", exit_on_error=False)

    def on_opened(self, message: Opened) -> None:
        """Take the rig in; moves stand as long as the file says the same."""
        if message.request != self._request:
            return
        self._opening = False
        start, before = message.start, self._start
        if start is not None and before is not None and _says_the_same(start, before):
            self._problems = ()
            self._ask()
            return
        if self._moves.put_back():
            self.say("The file has changed; the moved inputs are put back.")
        self._start = start
        self._take(start.shot if start else None, start.shot if start else None, message.problems)
        chosen = self._moves.chosen
        self._moves = Moves(start.inputs if start else ())
        self._moves.choose(chosen if chosen < len(self._moves.inputs) else 0)
        self._jobs.drop()
        self._shown_job = self._jobs.latest
        if start is not None and start.shot.system is not self.slate.system:
            self._ask()
        self.draw()

    def _take(self, shot: Shot | None, filed: Shot | None, problems: tuple[str, ...]) -> None:
        self._shot, self._problems = shot, problems
        self._filed = filed or self._filed
        self._listed = entries(shot) if shot is not None else []
        self._at = min(self._at, max(len(self._listed) - 1, 0))

    def _ask(self) -> None:
        """Have the inputs as they stand now worked out."""
        if self._start is None:
            return
        if self._jobs.ask(self._moves.changes, self.slate.system):
            self.slate.run_worker(self._work, thread=True, group="opening", exit_on_error=False)
        self.draw()

    def _work(self) -> None:
        """Work requests off, always the latest, until none waits."""
        while (job := self._jobs.take()) is not None:
            number, changes, system = job
            start = self._start
            if start is None:
                continue
            self.post_message(self._made(number, start, changes, system))

    def _made(self, number: int, start: Start, changes: Changes, system: UnitSystem) -> ShotMade:
        filed = self._filed if self._filed is not None and self._filed.system is system else None
        try:
            filed = filed or self._openings.shot(start, {}, system)
            return ShotMade(number, self._openings.shot(start, changes, system) if changes else filed, filed)
        except CannotReadError as error:
            return ShotMade(number, None, filed, error.problems)
        except Exception as error:
            return ShotMade(number, None, filed, (unexpected(error),))

    def on_shot_made(self, message: ShotMade) -> None:
        """Show a result, unless a later one is shown already or the rig was read anew since."""
        if message.job <= self._shown_job:
            return
        self._shown_job = message.job
        self._take(message.shot, message.filed, message.problems)
        self.draw()

    def rig_changed(self, rig: Path) -> None:
        """Read the file again once its checklist is made anew."""
        if rig != self.rig:
            return
        if not self.slate.book.under_way(rig):
            self._open()
        self.draw_soon()

    def shelf_changed(self) -> None:
        """Say that the file is gone; what was read of it stands."""
        if self.rig not in self.slate.shelf.entries:
            self.say("This rig's file is gone from the folder; the numbers are those it had.", "fail")

    def units_changed(self) -> None:
        """Numbers in another unit."""
        self._ask()

    @property
    def changes(self) -> Changes:
        """The moved inputs."""
        return self._moves.changes

    def write_moved(self, path: Path) -> None:
        """Write the moved rig; called in a worker."""
        assert self._start is not None
        self._openings.write(self._start, self._moves.changes, path)


def _says_the_same(one: Start, other: Start) -> bool:
    """Whether two readings of a rig are of the same content."""
    limits = [start.loaded.limits.text if start.loaded.limits else None for start in (one, other)]
    return one.loaded.rig.text == other.loaded.rig.text and limits[0] == limits[1]
