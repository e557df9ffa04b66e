"""From a step to the screens behind it."""

from __future__ import annotations

from typing import TYPE_CHECKING

from tui.screens.answers import AnswerScreen

if TYPE_CHECKING:
    from tui.screens.base import BaseScreen


class BehindScreen(AnswerScreen):
    """A screen with a step, from which its working, the opening and the load path can be reached."""

    def action_working(self) -> None:
        """Show the working of the step."""
        finding = self.finding
        if finding is None or self.under_way:
            self.say("Still calculating." if self.under_way else "There is no step.")
        elif finding.inspection is not None:
            self.say("An inspected step has no working; somebody looks.")
        elif finding.result is None:
            self.say(f"There is no number to work out: {finding.reason or 'no value'}.")
        else:
            from tui.screens.working import WorkingScreen

            self._go_behind(WorkingScreen(self.rig, finding.key))

    def action_opening(self) -> None:
        """Go through the opening line by line."""
        if self._can_go():
            from tui.screens.opening import OpeningScreen

            self._go_behind(OpeningScreen(self.rig))

    def action_load_path(self) -> None:
        """Show the load path."""
        if self._can_go():
            from tui.screens.load_path import LoadPathScreen

            self._go_behind(LoadPathScreen(self.rig))

    def _can_go(self) -> bool:
        if self._checklist is None:
            entry = self.slate.shelf.entries.get(self.rig)
            unread = entry is not None and entry.problems and not self.under_way
            self.say("This rig can't be read." if unread else "Still calculating.")
        return self._checklist is not None

    def _go_behind(self, screen: BaseScreen) -> None:
        """Show a screen, unless a chosen answer waits to be written."""
        if self._draft is not None:
            self.say(f"An answer is chosen: Enter goes on with it, {self.key_text('app.back')} drops it.")
        else:
            self.slate.push_screen(screen)
