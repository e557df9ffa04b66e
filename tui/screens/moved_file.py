"""Asking for the name of a new rig file, and writing moved inputs to it."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from textual.containers import Horizontal
from textual.message import Message
from textual.widget import Widget

from tui.commands import BY_ID
from tui.rows import paragraph, row, row_width
from tui.screens.base import BaseScreen
from tui.services import NotWrittenError
from tui.widgets.field import Field
from tui.widgets.page import Page
from tui.workers import unexpected

_LONGEST = 200


@dataclass
class FileWritten(Message):
    """The moved rig is in a file of its own, or the reason why it is not."""

    path: Path
    problem: str = ""


def new_path(rig: Path, typed: str) -> Path | str:
    """Where a typed name leads: a rig file beside the rig unless it names a folder; or why it can't be used."""
    name = typed.strip()
    if not name:
        return "a file needs a name"
    if not name.isprintable():
        return "a name of letters, digits and signs that can be printed is needed"
    path = rig.parent / name
    if path.suffix != ".toml":
        path = path.with_name(f"{path.name}.toml")
    if path.name.endswith(".record.toml"):
        return "a name that ends in .record.toml is kept for records"
    if path.name.startswith("."):
        return "a hidden file is passed over when rigs are looked for"
    return path


class MovedFileScreen(BaseScreen):
    """A screen that can write its moved inputs to a new rig file."""

    def __init__(self, rig: Path) -> None:
        """Take the rig; its own file is never written."""
        super().__init__()
        self.rig = rig
        self._asking = False
        self._writing = False

    @property
    def changes(self) -> Mapping[Any, float]:
        """The moved inputs."""
        return {}

    def write_moved(self, path: Path) -> None:
        """Write the moved rig; called in a worker.

        Raises:
            NotWrittenError: If it could not be written.
        """

    def below(self) -> Iterator[Widget]:
        """The field of the file's name."""
        with Horizontal(id="field-line"):
            yield Page(id="asked")
            yield Field(id="field", max_length=_LONGEST)

    def draw_field(self, cells: int) -> None:
        """Draw the question beside the field."""
        self.query_one("#field-line").display = self._asking
        if self._asking:
            shown = row(*paragraph(" new rig file: ", cells // 2, "key")[0], " ")
            self.put("asked", [shown]).styles.width = row_width(shown)

    def footer_entries(self) -> list[tuple[str, str]]:
        """The usual entries; while a name is typed, what can be done with it."""
        if not self._asking:
            return super().footer_entries()
        keys = self.slate.keys.all_text(BY_ID["app.help"]).split(", ")
        return [("enter", "write it"), (self.key_text("app.back"), "drop"), (keys[-1], "keys")]

    def action_keep(self) -> None:
        """Ask for the name of the new file."""
        if self._writing:
            self.say("Still writing.")
            return
        if not self.changes:
            self.say("Nothing is moved, so there is nothing to write.")
            return
        field = self.query_one(Field)
        field.value = f"{self.rig.stem}-moved.toml"
        field.cursor_position = len(field.value)
        self._asking = True
        self.query_one("#field-line").display = True
        self.set_focus(field)
        self.hush()
        self.draw()

    def on_input_submitted(self, event: Field.Submitted) -> None:
        """Write the file."""
        if not self._asking or self._writing:
            return
        path = new_path(self.rig, event.value)
        if isinstance(path, str):
            self.say(f"{path[0].upper()}{path[1:]}.")
            return
        self._writing = True

        def work() -> None:
            problem = ""
            try:
                self.write_moved(path)
            except NotWrittenError as error:
                problem = str(error)
            except Exception as error:
                problem = unexpected(error)
            self.post_message(FileWritten(path, problem))

        self.slate.run_worker(work, thread=True, group="write", exit_on_error=False)

    def on_file_written(self, message: FileWritten) -> None:
        """Say where it went, or why it did not."""
        self._writing = False
        if message.problem:
            self.say(f"NOT WRITTEN: {message.problem}. Enter tries another name.", "fail")
            return
        self._close_field()
        self.say(f"Written to the new file {message.path}; {self.rig.name} is as it was.", "title")
        self.draw()

    def action_back(self) -> None:
        """Drop the name; else leave the screen."""
        if self._asking and not self._writing:
            self._close_field()
            self.say("Dropped; nothing was written.")
            return
        super().action_back()

    def _close_field(self) -> None:
        self._asking = False
        self.set_focus(None)
        self.query_one("#field-line").display = False
