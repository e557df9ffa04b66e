"""The checklist, one step in the middle, every step of the rig at the left."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING

from textual.containers import Horizontal
from textual.widget import Widget
from textual.widgets import Input

from tui import stepping
from tui.answering import LONGEST, Choice, Draft, Field
from tui.commands import BY_ID, STEPS
from tui.messages import Remedied, Written
from tui.rows import EMPTY, Row, Rows, Span, paragraph, row, row_width
from tui.screens.base import BaseScreen, bindings
from tui.views.panes import pane_rule
from tui.widgets.page import Page

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding

_ANSWERS: tuple[tuple[str, str], ...] = (
    ("answer.pass", "pass"), ("answer.fail", "fail"), ("answer.not_applicable", "does not apply"),
)  # fmt: skip


class StepsScreen(BaseScreen):
    """Steps of one rig, gone through one by one; inspected steps are answered here."""

    BINDINGS = bindings(STEPS)
    KIND = STEPS

    def __init__(self, rig: Path) -> None:
        """Open a rig."""
        super().__init__()
        self.rig = rig
        self._checklist: Checklist | None = None
        self._here = 0
        self._answered: set[str] = set()
        self._draft: Draft | None = None
        self._writing = False
        self._written: Draft | None = None
        self._pane = 1
        self._remedies: Remedied | None = None
        self._request = 0

    def panes(self) -> Iterator[Widget]:
        """Header, board and step."""
        yield Page(id="head")
        yield Page(id="rule")
        with Horizontal(id="body"):
            yield Page(id="board")
            yield Page(id="middle")
        yield Page(id="foot-rule")

    def below(self) -> Iterator[Widget]:
        """The field of an answer."""
        with Horizontal(id="field-line", classes="-hidden"):
            yield Page(id="asked")
            yield Input(compact=True, select_on_focus=False, id="field")

    def on_mount(self) -> None:
        """Show what is known, and have the checklist made where it is not."""
        self.query_one(Input).cursor_blink = False
        self._take_checklist()

    # -- state

    @property
    def findings(self) -> tuple[Finding, ...]:
        """The steps."""
        return self._checklist.findings if self._checklist is not None else ()

    @property
    def finding(self) -> Finding | None:
        """The step shown."""
        return self.findings[self._here] if self._here < len(self.findings) else None

    @property
    def under_way(self) -> bool:
        """Whether a newer result is still to come."""
        return self.slate.book.under_way(self.rig)

    def rig_changed(self, rig: Path) -> None:
        """Take a new result of this rig; the step shown stays the one shown."""
        if rig == self.rig:
            self._take_checklist()
            self.draw_soon()

    def _take_checklist(self) -> None:
        entry = self.slate.shelf.entries.get(self.rig)
        if self.under_way or entry is None:
            return
        if entry.checklist is None:
            if entry.problems:
                self._checklist = None
            elif entry.summary is not None:
                self.slate.check([self.rig])
            return
        if entry.checklist is self._checklist:
            return
        shown = self.finding.key if self.finding is not None else None
        begin = self._checklist is None
        self._checklist = entry.checklist
        self._answered.clear()
        if begin and shown is None:
            self._here = stepping.first(self.findings)
        else:
            keys = [finding.key for finding in self.findings]
            self._here = keys.index(shown) if shown in keys else stepping.first(self.findings)
            if self._draft is not None and shown not in keys:
                self._drop_draft()
        self._ask_remedies()

    def _ask_remedies(self) -> None:
        """Have what would pass worked out for a failing step; what was shown for another one goes."""
        self._remedies = None
        finding = self.finding
        if finding is not None and finding.verdict == "FAIL" and finding.inspection is None and not self.under_way:
            self._request += 1
            self.slate.ask_remedies(self._request, finding)

    def remedied(self, message: Remedied) -> None:
        """Show what would pass, if it is for the step shown."""
        if message.request == self._request:
            self._remedies = message
            if message.problem:
                self.say(f"What would pass is not known: {message.problem}")
            self.draw_soon()

    def units_changed(self) -> None:
        """Numbers in another unit."""
        self._ask_remedies()

    # -- drawing

    def draw_panes(self, cells: int) -> None:
        """Draw header, board and step."""
        board = 20 if cells < 72 else 25
        self.put("rule", [pane_rule([(1, "steps", board), (2, "this step", cells - board)], self._pane, self.chars)])
        self._draw_head(cells)
        self._draw_board(board)
        more = self.key_text("page.down")
        self.put("middle", self._middle(cells - board - 1), more=more, keep=True)
        name = (3, "answer", cells) if self.finding is not None and self.finding.inspection else (0, "", cells)
        self.put("foot-rule", [pane_rule([name], self._pane, self.chars)])
        self._draw_field(cells)

    def _draw_head(self, cells: int) -> None:
        # The views of a step need the model's numbers; they are loaded once there is a checklist.
        if self._checklist is None:
            name = self.chars.clean(self.rig.name)
            self.put("head", [row(Span(name, "title")), row(Span(self._state(), "note"))])
            return
        from tui.views import step as view  # noqa: PLC0415

        under_way = self.under_way
        self.put("head", view.head(self._checklist, self._here, under_way=under_way, cells=cells, chars=self.chars))

    def _state(self) -> str:
        entry = self.slate.shelf.entries.get(self.rig)
        return "can't be read" if entry is not None and entry.problems and not self.under_way else "calculating"

    def _draw_board(self, cells: int) -> None:
        if self._checklist is None:
            self.put("board", [])
            return
        from tui.views import step as view  # noqa: PLC0415

        rows, current = view.board_rows(
            self._checklist, self._here, self._answered, under_way=self.under_way, cells=cells - 1, chars=self.chars
        )
        page = self.put("board", rows, keep=True)
        page.reveal(current)

    def _middle(self, cells: int) -> Rows:
        if self._checklist is None:
            return self._no_checklist(cells)
        from tui.views import step as view  # noqa: PLC0415

        finding = self.finding
        if finding is None:
            return paragraph("This rig has no steps.", cells)
        remedies = self._remedies.remedies if self._remedies is not None else None
        return view.step_rows(
            finding, self.slate.system, remedies, under_way=self.under_way, cells=cells, chars=self.chars
        )

    def _no_checklist(self, cells: int) -> Rows:
        entry = self.slate.shelf.entries.get(self.rig)
        if entry is None or self.under_way or not entry.problems:
            return []
        rows: list[Row] = [row(Span("This rig can't be read", "fail")), EMPTY]
        for problem in entry.problems:
            rows += [*paragraph(self.chars.clean(problem), cells, indent="  "), EMPTY]
        return rows + paragraph("It is read again as soon as the file is saved.", cells, "dim")

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
            from tui.views import step as view  # noqa: PLC0415

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
        line = self.query_one("#field-line")
        line.set_class(asking is None, "-hidden")
        if asking is not None and self._draft is not None:
            question = self.chars.clean(self._draft.question(asking))
            rows = paragraph(f" {question}: ", cells // 2 + 4, "key")
            shown = row(*rows[0], " ")
            self.put("asked", [shown]).styles.width = row_width(shown)

    # -- moving

    @property
    def _asking(self) -> Field | None:
        """The field being asked for."""
        return self._draft.next_field if self._draft is not None and self._field_open else None

    _field_open = False

    def _go(self, here: int) -> None:
        if self._draft is not None:
            self.say(f"An answer is chosen: Enter goes on with it, {self.key_text('app.back')} drops it.")
            return
        self.hush()
        self._written = None
        if here != self._here:
            self._here = here
            self.query_one("#middle", Page).scroll_by(-(10**6))
            self._ask_remedies()
        self.draw()

    def action_move(self, by: int) -> None:
        """Go to the step before or after; in the middle pane, move its lines."""
        if self._pane == 2:
            self.query_one("#middle", Page).scroll_by(by)
            return
        self._go(stepping.step(self.findings, self._here, by))

    def action_move_group(self, by: int) -> None:
        """Go to the group before or after."""
        self._go(stepping.step_group(self.findings, self._here, by) if self.findings else 0)

    def action_page(self, direction: int) -> None:
        """Move the lines of the step."""
        self.query_one("#middle", Page).scroll_page(direction)

    def action_edge(self, direction: int) -> None:
        """Go to the first or last step."""
        self._go(stepping.step(self.findings, self._here, direction * len(self.findings)))

    def action_enter(self) -> None:
        """Write a chosen answer, or go to the next open step."""
        finding = self.finding
        inspected = finding is not None and finding.inspection is not None
        if self._writing or (inspected and self.slate.repeated):
            return
        if self._draft is not None:
            self._go_on()
            return
        self.next_open()

    def next_open(self) -> None:
        """Go to the next open step."""
        found = stepping.next_open(self.findings, self._here, self._answered) if self.findings else None
        if found is not None:
            self._go(found)
            return
        self._written = None
        here = self.finding
        if here is None:
            self.say("There are no steps yet." if self.under_way else "There are no steps.")
        elif stepping.is_open(here, self._answered):
            self.say("This is the only open step.")
        else:
            failing = [finding.key for finding in self.findings if finding.verdict == "FAIL"]
            self.say(f"No step is open; failing: {', '.join(failing)}." if failing else "No step is open.")

    def action_pane(self, number: int) -> None:
        """Jump to a pane."""
        if number == 3 and not (self.finding is not None and self.finding.inspection):
            self.say("This step is computed; there is nothing to answer.")
            return
        self._pane = number
        self.hush()
        field = self.query_one(Input)
        if number == 3 and self._asking is not None:
            field.focus()
        else:
            self.set_focus(None)
        self.draw()

    def action_next_pane(self, by: int) -> None:
        """Go to the next pane."""
        last = 3 if self.finding is not None and self.finding.inspection else 2
        self.action_pane((self._pane - 1 + by) % last + 1)

    def action_back(self) -> None:
        """Drop a chosen answer; else leave the screen."""
        if self._draft is not None and not self._writing:
            self._drop_draft()
            self.say("Dropped; nothing was written.")
            return
        super().action_back()

    def action_next_rig(self) -> None:
        """Open the next rig that is not PASS."""
        found = self.slate.shelf.next_not_pass(self.rig)
        if self._draft is not None:
            self._go(self._here)
        elif found is None or found == self.rig:
            self.say("No other rig is known that is not PASS.")
        elif self.slate.shelf.entries[found].no_rig:
            self.say(f"{found.name} can't be read: {self.slate.shelf.entries[found].problems[0]}")
        else:
            self.slate.open_rig(found, instead=True)

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
            from tui.screens.working import WorkingScreen  # noqa: PLC0415  (loaded when first asked for)

            self.slate.push_screen(WorkingScreen(self.rig, finding.key))

    # -- answering

    def action_answer(self, choice: Choice) -> None:
        """Choose an answer; Enter writes it."""
        finding = self.finding
        if self.slate.repeated or self._writing:
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
        self.query_one("#field-line").remove_class("-hidden")
        field.focus()
        self.draw()

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
        assert self._checklist is not None
        self._close_field()
        if self.under_way:
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
        self.query_one("#field-line").add_class("-hidden")

    def _drop_draft(self) -> None:
        self._close_field()
        self._draft = None
        if self._pane == 3:
            self._pane = 1
