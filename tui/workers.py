"""Everything that may take time, on threads of its own; results come back as messages."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from pathlib import Path
from typing import TYPE_CHECKING

from textual.app import App
from textual.worker import get_current_worker

from tui.answering import Draft
from tui.jobs import JobBook
from tui.messages import Checked, FilesChanged, Remedied, RigsFound, RigsGlanced, Worked, Written
from tui.services import CannotReadError, NotWrittenError, Services, Stamp, folders, stamp, stamps, toml_files

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding
    from model.quantity import UnitSystem

Stamps = tuple[tuple[Path, Stamp], ...]


def unexpected(error: Exception) -> str:
    """An error that the program did not foresee, in one line."""
    return f"the program failed here ({type(error).__name__}: {error}); please report it"


class Workers:
    """The threads of the app."""

    def __init__(self, app: App[int], services: Services, book: JobBook) -> None:
        """Take the app that gets the messages.

        Args:
            app: The app.
            services: The model.
            book: The rigs that wait.
        """
        self._app = app
        self._services = services
        self._book = book
        self._root: Path | None = None
        self._folders: Stamps = ()
        self._names: tuple[Path, ...] = ()
        self._looking = False

    def _start(self, work: Callable[[], None], group: str) -> None:
        self._app.run_worker(work, thread=True, group=group, exit_on_error=False)

    def find(self, path: Path, *, glance: bool = False) -> None:
        """Look for rigs; with a quick glance first where nothing is shown yet."""

        def work() -> None:
            if glance and path.is_dir():
                self._app.post_message(RigsGlanced(self._services.glance(path)))
            # Listed before the look, so that what changes meanwhile is seen the next time.
            self._list(path)
            try:
                found = self._services.find(path)
            except CannotReadError as error:
                self._app.post_message(RigsFound(None, error.problems))
            except Exception as error:
                self._app.post_message(RigsFound(None, (unexpected(error),)))
            else:
                self._app.post_message(RigsFound(found, ()))

        self._start(work, "find")

    def _list(self, path: Path) -> None:
        """Note which files lie in the folder."""
        if path.is_dir():
            self._root, self._folders, self._names = path, stamps(list(folders(path))), toml_files(path)

    def _folder_changed(self) -> bool:
        """Whether files came or went; a record that was written anew is no such change."""
        if self._root is None or all(stamp(path) == old for path, old in self._folders):
            return False
        before = self._names
        self._list(self._root)
        return self._names != before

    def check(self) -> None:
        """Work off the rigs that wait."""

        def work() -> None:
            worker = get_current_worker()
            while (job := self._book.take()) is not None:
                if worker.is_cancelled:
                    self._book.stop()
                    return
                self._app.post_message(self._checked(*job))

        self._start(work, "check")

    def _checked(self, rig: Path, job: int) -> Checked:
        stamped: Stamps = ()
        try:
            stamped = stamps(self._services.inputs(rig))
            return Checked(rig, job, self._services.check(rig), (), stamped)
        except CannotReadError as error:
            return Checked(rig, job, None, error.problems, stamped or stamps([rig]))
        except Exception as error:
            return Checked(rig, job, None, (unexpected(error),), stamped or stamps([rig]))

    def look(self, watched: Mapping[Path, Stamps]) -> None:
        """Look which files changed; at most one look at a time."""
        if self._looking:
            return
        self._looking = True

        def work() -> None:
            try:
                changed = tuple(
                    rig for rig, stamped in watched.items() if any(stamp(path) != old for path, old in stamped)
                )
                folder = self._folder_changed()
                if changed or folder:
                    self._app.post_message(FilesChanged(changed, folder))
            finally:
                self._looking = False

        self._start(work, "look")

    def remedies(self, request: int, finding: Finding, system: UnitSystem) -> None:
        """Work out what would make a step pass."""

        def work() -> None:
            try:
                message = Remedied(request, self._services.remedies(finding, system))
            except Exception as error:
                message = Remedied(request, (), unexpected(error))
            self._app.post_message(message)

        self._start(work, "remedies")

    def working(self, request: int, checklist: Checklist, finding: Finding, system: UnitSystem) -> None:
        """Make the lines of a working."""

        def work() -> None:
            try:
                lines = tuple(self._services.working(checklist, finding, system))
            except Exception as error:
                lines = (unexpected(error),)
            self._app.post_message(Worked(request, lines, system))

        self._start(work, "working")

    def write(self, rig: Path, checklist: Checklist, draft: Draft, stamped: Stamps) -> None:
        """Append an answer to the record, unless the rig changed since its checklist was made."""

        def work() -> None:
            problem = ""
            try:
                if any(stamp(path) != old for path, old in stamped):
                    problem = "the rig's files changed on disk since this step was shown; look at it again"
                else:
                    self._services.write(rig, checklist, draft, self._services.now())
            except NotWrittenError as error:
                problem = str(error)
            except Exception as error:
                problem = unexpected(error)
            self._app.post_message(Written(rig, draft, problem))

        self._start(work, "write")
