"""The full screen: the state that its screens share, the workers, and the one way to start it."""

from __future__ import annotations

import os
import sys
from collections.abc import Callable, Iterable, Mapping
from pathlib import Path
from typing import TYPE_CHECKING, Any, ClassVar

from textual import events
from textual.app import App
from textual.binding import Binding, BindingType
from textual.screen import Screen

from tui import terminal
from tui.answering import Draft, RepeatGuard
from tui.commands import Keys
from tui.glyphs import Charset, charset
from tui.jobs import JobBook
from tui.keymap import KeymapError, keymap_path, read_keys
from tui.messages import Checked, FilesChanged, Remedied, RigsFound, RigsGlanced, Worked, Written
from tui.screens.base import BaseScreen
from tui.services import Found, Services
from tui.shelf import Shelf
from tui.themes import DARK, LIGHT
from tui.tones import Look, look
from tui.workers import Workers

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding
    from model.quantity import UnitSystem

WATCH = 1.0
"""Seconds between looks at the files."""


class RigslateApp(App[int], inherit_bindings=False):
    """Rigs and their checklists on the full screen.

    The shelf, the job book and the settings live here; screens draw them. Workers never touch a screen, they post
    messages that this class handles.
    """

    CSS_PATH = "styles.tcss"
    ENABLE_COMMAND_PALETTE = False
    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("ctrl+c", "how_to_leave", "How to leave", show=False, id="app.how_to_leave", system=True)
    ]

    def __init__(
        self,
        path: Path,
        services: Services,
        *,
        ascii_only: bool = False,
        colour: bool = True,
        keys: Keys | None = None,
        greeting: str = "",
        watch: float | None = WATCH,
        moment: Callable[[events.Key], float] = lambda event: event.time,
    ) -> None:
        """Set up the screen on a rig file or a folder.

        Args:
            path: A rig file or a folder.
            services: The model.
            ascii_only: Begin with ASCII glyphs.
            colour: False shows no colour at all.
            keys: The keys that hold.
            greeting: A message for the first screen.
            watch: Seconds between looks at the files; None never looks.
            moment: When a key was pressed, in seconds.
        """
        # Without colour the terminal's own colours are used; Textual settles that while the app is made.
        super().__init__(ansi_color=None if colour else True)
        self.root = path if path.is_dir() else path.parent
        self.shelf = Shelf(self.root)
        self.book = JobBook()
        self.keys = keys or Keys()
        self.chars: Charset = charset(ascii_only)
        self.initials: str | None = None
        self.folder_problems: tuple[str, ...] = ()
        self.repeated = False
        self._only = None if path.is_dir() else path
        self._services = services
        self._greeting = greeting
        self._dark = True
        self._colour = colour
        self._look = look(dark=True, colour=colour)
        self._system: UnitSystem | None = None
        self._watch = watch
        self._moment = moment
        self._guard = RepeatGuard()
        self._tasks = Workers(self, services, self.book)

    # -- start

    def get_default_screen(self) -> Screen[Any]:
        """The shelf, or the checklist where one rig was asked for."""
        if self._only is None:
            from tui.screens.rigs import RigsScreen

            return RigsScreen()
        from tui.screens.steps import StepsScreen

        return StepsScreen(self._only)

    def on_mount(self) -> None:
        """Begin to read the rigs."""
        self.title = "rigslate"
        self.register_theme(DARK)
        self.register_theme(LIGHT)
        self.theme = DARK.name
        self.set_keymap({name: ",".join(keys) for name, keys in self.keys.own.items()})
        if self._greeting:
            self.front.say(self._greeting)
        # The model's imports would hold up the first painting, so they wait for it.
        self.call_after_refresh(self._begin)

    def _begin(self) -> None:
        self._tasks.find(self._only or self.root, glance=True)
        if self._watch is not None:
            self.set_interval(self._watch, self._look_at_files)

    @property
    def front(self) -> BaseScreen:
        """The screen in front."""
        screen = self.screen
        assert isinstance(screen, BaseScreen)
        return screen

    def _screens(self) -> list[BaseScreen]:
        return [screen for screen in self.screen_stack if isinstance(screen, BaseScreen)]

    def on_key(self, event: events.Key) -> None:
        """Note whether a key repeats by itself, before its command runs."""
        self.repeated = self._guard.repeats(event.key, self._moment(event))

    def text_typed(self) -> None:
        """Text was typed into a field, so the next key is no repeat of one before it."""
        self._guard.forget()

    # -- rigs

    def check(self, rigs: Iterable[Path]) -> None:
        """Have checklists made; until they come the rigs count as under way."""
        asked = list(rigs)
        start = self.book.ask(asked)
        for rig in asked:
            for screen in self._screens():
                screen.rig_changed(rig)
        if start:
            self._tasks.check()

    def on_rigs_glanced(self, message: RigsGlanced) -> None:
        """Show rows at once; what the folder really holds follows."""
        if not self.shelf.entries:
            new, _ = self.shelf.take_in(Found(message.rigs))
            self.check(new)
            for screen in self._screens():
                screen.shelf_changed()

    def on_rigs_found(self, message: RigsFound) -> None:
        """Take in what lies in the folder."""
        self.folder_problems = message.problems
        if message.found is not None:
            new, gone = self.shelf.take_in(message.found)
            for rig in gone:
                self.book.forget(rig)
            self.check(new)
        elif message.problems:
            for rig in list(self.shelf.entries):
                self.book.forget(rig)
            self.shelf.entries.clear()
        for screen in self._screens():
            screen.shelf_changed()

    def on_checked(self, message: Checked) -> None:
        """Take a rig's result, unless a newer one was asked for."""
        if not self.book.accept(message.rig, message.job):
            return
        self.shelf.settle(message.rig, message.checklist, message.problems)
        entry = self.shelf.entries.get(message.rig)
        if entry is not None:
            entry.stamps = message.stamps
        for screen in self._screens():
            screen.rig_changed(message.rig)

    def _look_at_files(self) -> None:
        watched = {
            entry.path: entry.stamps for entry in self.shelf.rows
            if entry.stamps and not self.book.under_way(entry.path)
        }  # fmt: skip
        self._tasks.look(watched)

    def on_files_changed(self, message: FilesChanged) -> None:
        """Have changed rigs checked again."""
        if message.folder:
            self._tasks.find(self._only or self.root)
        self.check(rig for rig in message.rigs if rig in self.shelf.entries and not self.book.under_way(rig))

    def open_rig(self, rig: Path, *, instead: bool = False) -> None:
        """Show a rig's checklist, in place of the screen in front if asked."""
        from tui.screens.steps import StepsScreen

        self.book.prefer([rig])
        if instead:
            self.switch_screen(StepsScreen(rig))
        else:
            self.push_screen(StepsScreen(rig))

    # -- steps

    def ask_remedies(self, request: int, finding: Finding) -> None:
        """Have worked out what would make a step pass."""
        self._tasks.remedies(request, finding, self.system)

    def on_remedied(self, message: Remedied) -> None:
        """Hand on what would make a step pass."""
        for screen in self._screens():
            screen.remedied(message)

    def ask_working(self, request: int, checklist: Checklist, finding: Finding) -> None:
        """Have the lines of a working made."""
        self._tasks.working(request, checklist, finding, self.system)

    def on_worked(self, message: Worked) -> None:
        """Hand on the lines of a working."""
        for screen in self._screens():
            screen.worked(message)

    def write_answer(self, rig: Path, checklist: Checklist, draft: Draft) -> None:
        """Have an answer written to the record."""
        entry = self.shelf.entries.get(rig)
        self._tasks.write(rig, checklist, draft, entry.stamps if entry is not None else ((rig, None),))

    def on_written(self, message: Written) -> None:
        """Hand on how writing went, and read the record again."""
        for screen in self._screens():
            screen.written(message)
        self.check([message.rig])

    # -- settings

    @property
    def look(self) -> Look:
        """The style of each tone."""
        return self._look

    @property
    def system(self) -> UnitSystem:
        """The unit system picked."""
        if self._system is None:
            from model.quantity import UnitSystem

            self._system = UnitSystem.WRITTEN
        return self._system

    def next_units(self) -> None:
        """Go on to the next unit system."""
        from tui.views.numbers import SYSTEM_NAMES, next_system

        self._system = next_system(self.system)
        for screen in self._screens():
            screen.units_changed()
        self.front.say(f"Shown in {SYSTEM_NAMES[self._system]}.", "dim")

    def switch_glyphs(self) -> None:
        """Switch between full glyphs and ASCII."""
        self.chars = charset(not self.chars.ascii)
        self.front.say("Plain ASCII." if self.chars.ascii else "Full glyphs.", "dim")

    def switch_theme(self) -> None:
        """Switch between light and dark."""
        if not self._colour:
            self.front.say("No colour is shown, since NO_COLOR is set; the terminal's own colours hold.", "dim")
            return
        self._dark = not self._dark
        self._look = look(dark=self._dark, colour=True)
        self.theme = (DARK if self._dark else LIGHT).name
        self.front.say("Dark theme." if self._dark else "Light theme.", "dim")

    def action_how_to_leave(self) -> None:
        """Say how to leave; ctrl+c alone must not lose a half-typed answer."""
        self.front.say(f"{self.keys.text('app.quit')} leaves the program.")


def run(path: Path, environment: Mapping[str, str] | None = None) -> int:
    """Show the full screen on a rig file or a folder.

    Args:
        path: A rig file or a folder, which exists.
        environment: The environment's variables; those of the process where left out.

    Returns:
        The exit status: 0, or 2 where the full screen can't be shown.
    """
    environment = os.environ if environment is None else environment
    problem = terminal.refusal(environment, terminal=terminal.on_terminal())
    if problem is not None:
        print(problem, file=sys.stderr)
        return 2
    greeting, keys = "", Keys()
    try:
        keys = read_keys(keymap_path(environment, Path.home()))
    except (KeymapError, RuntimeError) as error:
        greeting = str(error)
    from tui.model_services import ModelServices

    app = RigslateApp(
        path,
        ModelServices(),
        ascii_only=terminal.wants_ascii(environment),
        colour=not terminal.wants_no_colour(environment),
        keys=keys,
        greeting=greeting,
    )
    status = app.run(mouse=False)
    return app.return_code or 0 if status is None else status
