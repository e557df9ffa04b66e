"""Answering inspected steps by keys: an answer is a key and then Enter."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING

from textual.containers import Horizontal
from textual.widget import Widget
from textual.widgets import Input

from tui.answering import LONGEST, Choice, Draft, FieldName
from tui.commands import BY_ID
from tui.messages import Written
from tui.rows import Rows, Span, paragraph, row, row_width
from tui.screens.base import BaseScreen
from tui.widgets.field import Field
from tui.widgets.page import Page

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding

_ANSWERS: tuple[tuple[str, str], ...] = (
    ("answer.pass", "pass"), ("answer.fail", "fail"), ("answer.not_applicable", "does not apply"),
)  # fmt: skip


class AnswerScreen(BaseScreen):
    """A screen with a step that can be answered.

    A key chooses an answer, Enter asks for what is missing and at last writes it. A key that repeats by itself is
    ignored, and the next step opens only on a key of its own.
    """

    def __init__(self, rig: Path) -> None:
        """Start without a chosen answer."""
        super().__init__()
        self.rig = rig
        self._checklist: Checklist | None = None
        self._pane = 1
        self._answered: set[str] = set()
        self._draft: Draft | None = None
        self._field_open = False
        self._writing = False
        self._written: Draft | None = None

    @property
    def finding(self) -> Finding | None:
        """The step shown."""
        return None

    @property
    def under_way(self) -> bool:
        """Whether a newer result is still to come."""
        return self.slate.book.under_way(self.rig)

    def next_open(self) -> None:
        """Go to the next open step."""

    def below(self) -> Iterator[Widget]:
        """The field of an answer."""
        with Horizontal(id="field-line"):
            yield Page(id="asked")
            yield Field(id="field")

    @property
    def _asking(self) -> FieldName | None:
        """The field being asked for."""
        return self._draft.next_field if self._draft is not None and self._field_open else None

    def draw_message(self, cells: int) -> None:
        """The message; without one, what the answer pane says."""
        if self._message[0]:
            super().draw_message(cells)
            return
        rows = self._answer_rows(cells - 2)
        self.put("say", [row(" ", *line) for line in rows])

    def _answer_rows(self, cells: int) -> Rows:
        finding = self.finding
        if finding is None or finding.inspection is None:
            return []
        if self._writing:
            return [row(Span("writing", "note"))]
        if self._written is not None and self._written.key == finding.key:
            from tui.views import step as view

            more = row(Span(self.key_text("steps.next_open"), "key"), " opens the next step")
            return [*view.written_rows(self._written, cells, self.chars), more]
        if self._draft is not None:
            return self._draft_rows(self._draft, cells)
        spans: list[str | Span] = []
        for command, word in _ANSWERS:
            spans += [Span(self.key_text(command), "key"), f" {word}   "]
        if finding.answer is not None:
            spans += [Span(self.key_text("answer.take_back"), "key"), " take back   "]
        return [row(*spans)]

    def _draft_rows(self, draft: Draft, cells: int) -> Rows:
        words = "take the answer back" if draft.choice == "withdrawal" else draft.choice
        given = [f"{name} {getattr(draft, name)}" for name in ("value", "remark") if getattr(draft, name)]
        if draft.who:
            given.append(f"as {draft.who}" + (f" and {draft.second}" if draft.second else ""))
        chosen = ", ".join([words, *given])
        todo = "Enter goes on" if draft.next_field else "Enter writes it"
        return paragraph(self.chars.clean(f"Chosen: {chosen}. {todo}, escape drops it."), cells, "title")

    def footer_entries(self) -> list[tuple[str, str]]:
        """The usual entries; while an answer is chosen, what goes on with it."""
        if self._draft is None:
            return super().footer_entries()
        enter = "take" if self._asking else "go on" if self._draft.next_field else "write it"
        # In a field the letters are typed; the last key of the help command works there.
        keys = self.slate.keys.all_text(BY_ID["app.help"]).split(", ")
        return [("enter", enter), (self.key_text("app.back"), "drop"), (keys[-1], "keys")]

    def _draw_field(self, cells: int) -> None:
        asking = self._asking
        self.query_one("#field-line").display = asking is not None
        if asking is not None and self._draft is not None:
            question = self.chars.clean(self._draft.question(asking))
            rows = paragraph(f" {question}: ", cells // 2 + 4, "key")
            shown = row(*rows[0], " ")
            self.put("asked", [shown]).styles.width = row_width(shown)
            if self._pane == 3 and self.focused is None:
                # A window that was too small took the field away, and the focus with it.
                self.set_focus(self.query_one(Input))

    def action_answer(self, choice: Choice) -> None:
        """Choose an answer; Enter writes it."""
        finding = self.finding
        if self.slate.repeated or self._writing:
            return
        if self._field_open:
            self.say(f"An answer is being given: Tab leads back to it, {self.key_text('app.back')} drops it.")
            return
        if finding is None or finding.inspection is None:
            self.say("This step is computed; it takes no answer.")
            return
        if self._written is not None and self._written.key == finding.key and choice != "withdrawal":
            self.next_open()
            return
        if choice == "withdrawal" and finding.answer is None and finding.key not in self._answered:
            self.say("There is no answer to take back.")
            return
        asked = finding.inspection
        self.hush()
        self._written = None
        self._draft = Draft(finding.key, choice, asked.wants_value, asked.two_person, who=self.slate.initials)
        self._pane = 3
        self.draw()

    def action_initials(self) -> None:
        """Have the initials asked for again."""
        self.slate.initials = None
        if self._draft is not None:
            draft = self._draft
            self._draft = Draft(draft.key, draft.choice, draft.wants_value, draft.two_person, draft.value, draft.remark)
        self.say("Your initials are asked for with the next answer.")

    def _go_on(self) -> None:
        """Ask for the next field, or write when nothing is missing."""
        assert self._draft is not None
        self.hush()
        name = self._draft.next_field
        if name is None:
            self._write(self._draft)
            return
        field = self.query_one(Input)
        field.value = ""
        field.max_length = LONGEST[name]
        self._field_open = True
        self._pane = 3
        # Shown and focused at once, so that no letter typed next is taken for a command.
        self.query_one("#field-line").display = True
        self.set_focus(field)
        self.draw()

    def on_input_changed(self, event: Input.Changed) -> None:
        """Text between two presses of Enter makes the second one meant."""
        if event.value:
            self.slate.text_typed()

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Take what was typed into a field."""
        name, draft = self._asking, self._draft
        if name is None or draft is None or self._writing or self.slate.repeated:
            return
        text = "".join(sign if sign.isprintable() else " " for sign in event.value)
        problem = draft.problem(name, text)
        if problem is not None:
            self.say(problem[0].upper() + problem[1:] + ".")
            return
        self._draft = draft.having(name, text)
        self._go_on()

    def _write(self, draft: Draft) -> None:
        self._close_field()
        if self._checklist is None or self.under_way:
            self.say("The rig is being read again; press Enter once its steps are shown.")
            return
        self._writing = True
        self.slate.write_answer(self.rig, self._checklist, draft)
        self.draw()

    def written(self, message: Written) -> None:
        """Say that the answer is in the record, or why it is not."""
        self._writing = False
        if message.problem:
            self.say(f"NOT WRITTEN: {message.problem}. The answer is kept here; Enter tries again.", "fail")
            return
        self.slate.initials = message.draft.who
        self._draft = None
        self._pane = 1
        self._written = message.draft
        if message.draft.choice == "withdrawal":
            self._answered.discard(message.draft.key)
        else:
            self._answered.add(message.draft.key)
        self.draw()

    def _close_field(self) -> None:
        self._field_open = False
        self.set_focus(None)
        self.query_one("#field-line").display = False

    def _drop_draft(self) -> None:
        self._close_field()
        self._draft = None
        if self._pane == 3:
            self._pane = 1
