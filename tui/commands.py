"""The one list of commands: bindings, footer, help and palette are made from it."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

RIGS, STEPS, WORKING, HELP, PALETTE = "rigs", "steps", "working", "help", "palette"
OPENING, LOAD_PATH = "opening", "load path"
READING = (RIGS, STEPS, WORKING, LOAD_PATH, OPENING)
"""Screens that show a rig or rigs."""
ALL = (*READING, HELP)
LINES = (WORKING, LOAD_PATH, HELP)
"""Screens that are one page of lines."""
PAGED = (RIGS, STEPS, *LINES)

FORBIDDEN = frozenset({
    "ctrl+i", "ctrl+m", "ctrl+h", "ctrl+j", "ctrl+left_square_bracket", "ctrl+b", "ctrl+a", "ctrl+z", "ctrl+backslash",
    "ctrl+space", "ctrl+at", "ctrl+[", "ctrl+\\", "ctrl+@",
})  # fmt: skip
"""Keys that terminals and multiplexers keep for themselves or turn into others."""

ON_WHAT_IS_SHOWN = frozenset(
    ("up", "down", "left", "right", "enter", "tab", "shift+tab", "escape", "space", "pageup", "pagedown", "home", "end")
)
"""Keys that act on what is shown; every other key means one thing everywhere."""


@dataclass(frozen=True, slots=True)
class Command:
    """One thing a key does.

    ``id`` never changes, users' key files name it. ``where`` are the screens it holds on. ``rank`` orders the footer,
    0 stays out of it; ``short`` is its word there.
    """

    id: str
    keys: tuple[str, ...]
    name: str
    help: str
    where: tuple[str, ...]
    group: str
    action: str
    rank: int = 0
    short: str = ""
    fixed: bool = False


COMMANDS: tuple[Command, ...] = (
    Command("rigs.open", ("enter",), "Open the rig", "Opens the checklist of the marked rig.",
            (RIGS,), "Rigs", "open", 1, "open"),
    Command("rigs.up", ("up",), "Rig above", "Marks the rig above.", (RIGS,), "Rigs", "move(-1)", 2, "choose"),
    Command("rigs.down", ("down",), "Rig below", "Marks the rig below.", (RIGS,), "Rigs", "move(1)", 2, "choose"),
    Command("rigs.next", ("n",), "Next rig that is not PASS", "Goes on to the next rig that fails, is open or can't be"
            " read; on Steps it opens that rig.", (RIGS, STEPS), "Rigs", "next_rig", 4, "next not PASS"),
    Command("steps.next_open", ("enter",), "Next open step", "Goes to the next open step; after the last one it starts"
            " over. While an answer is chosen it writes the answer.", (STEPS,), "Steps", "enter", 1, "next open"),
    Command("steps.up", ("up",), "Step above", "Goes to the step before.", (STEPS,), "Steps", "move(-1)", 2, "step"),
    Command("steps.down", ("down",), "Step below", "Goes to the step after.", (STEPS,), "Steps", "move(1)", 2, "step"),
    Command("steps.left", ("left",), "Group above", "Goes to the first step of the group before.",
            (STEPS,), "Steps", "move_group(-1)", 6, "group"),
    Command("steps.right", ("right",), "Group below", "Goes to the first step of the group after.",
            (STEPS,), "Steps", "move_group(1)", 6, "group"),
    Command("answer.pass", ("p",), "Answer: pass", "Chooses 'pass' for the inspected step; Enter writes it.",
            (STEPS,), "Answers", "answer('pass')"),
    Command("answer.fail", ("f",), "Answer: fail", "Chooses 'fail'; a remark is asked for, then Enter writes it.",
            (STEPS,), "Answers", "answer('fail')"),
    Command("answer.not_applicable", ("x",), "Answer: does not apply", "Chooses 'does not apply'; a remark is asked"
            " for, then Enter writes it.", (STEPS,), "Answers", "answer('does not apply')"),
    Command("answer.take_back", ("t",), "Take the answer back", "Withdraws the standing answer by a new entry; the old"
            " one stays in the record.", (STEPS,), "Answers", "answer('withdrawal')"),
    Command("answer.initials", ("i",), "Initials", "Changes the initials that go with your answers.",
            (STEPS,), "Answers", "initials"),
    Command("steps.working", ("w",), "Working", "Shows the lines that lead to the number.",
            (STEPS,), "Steps", "working", 3, "working"),
    Command("steps.opening", ("o",), "Opening", "Goes through the opening line by line, with its curve and with inputs"
            " that keys move.", (STEPS,), "Steps", "opening", 3, "opening"),
    Command("steps.load_path", ("h",), "Load path", "Shows what hangs on what: every part with its load, strength and"
            " factor, the weakest marked.", (STEPS,), "Steps", "load_path"),
    Command("opening.next", ("space", "enter"), "Next line", "Opens the next line.",
            (OPENING,), "Opening", "next_line(1)", 1, "next"),
    Command("opening.previous", ("backspace",), "Line before", "Opens the line before.",
            (OPENING,), "Opening", "next_line(-1)"),
    Command("opening.first", ("home",), "First line", "Opens the first line.", (OPENING,), "Opening", "edge(-1)"),
    Command("opening.last", ("end",), "Last line", "Opens the last line.", (OPENING,), "Opening", "edge(1)"),
    Command("opening.page_down", ("pagedown",), "Page down", "Shows the lines below.",
            (OPENING,), "Opening", "page(1)"),
    Command("opening.page_up", ("pageup",), "Page up", "Shows the lines above.", (OPENING,), "Opening", "page(-1)"),
    Command("opening.input_above", ("up", "shift+tab"), "Input above", "Chooses the input above.",
            (OPENING,), "Opening", "choose(-1)", 2, "input"),
    Command("opening.input_below", ("down", "tab"), "Input below", "Chooses the input below.",
            (OPENING,), "Opening", "choose(1)", 2, "input"),
    Command("opening.less", ("left",), "Less", "Moves the chosen input down by a step.",
            (OPENING,), "Opening", "change(-1)", 3, "change"),
    Command("opening.more", ("right",), "More", "Moves the chosen input up by a step.",
            (OPENING,), "Opening", "change(1)", 3, "change"),
    Command("opening.big", ("m",), "Bigger steps", "Switches between plain steps and steps ten times as big.",
            (OPENING,), "Opening", "big"),
    Command("opening.put_back", ("0",), "Put all back", "Puts all moved inputs back to the values of the file.",
            (OPENING,), "Opening", "put_back", 6, "put back"),
    Command("opening.width", ("z",), "Whole width", "Gives the curve the whole width, or takes it back.",
            (OPENING,), "Opening", "whole_width", 4, "curve wide"),
    Command("opening.plot", ("g",), "Next curve", "Shows force against time, rate of descent against height and drag"
            " area against time, in turn.", (OPENING,), "Opening", "plot", 5, "curve"),
    Command("opening.keep", ("k",), "Keep as a new file", "Writes the rig with its moved inputs to a new rig file; no"
            " file is ever written over.", (OPENING,), "Opening", "keep"),
    Command("page.down", ("pagedown", "space"), "Page down", "Shows the lines below.", PAGED, "Moving", "page(1)"),
    Command("page.up", ("pageup",), "Page up", "Shows the lines above.", PAGED, "Moving", "page(-1)"),
    Command("page.first", ("home",), "First", "Goes to the first rig, step or line.", PAGED, "Moving", "edge(-1)"),
    Command("page.last", ("end",), "Last", "Goes to the last rig, step or line.", PAGED, "Moving", "edge(1)"),
    Command("lines.up", ("up",), "Line up", "Shows one line more above.", LINES, "Moving", "line(-1)", 2,
            "move"),
    Command("lines.down", ("down",), "Line down", "Shows one line more below.", LINES, "Moving", "line(1)", 2,
            "move"),
    Command("pane.next", ("tab",), "Next pane", "Goes to the next pane; the marked pane takes the arrows.",
            (RIGS, STEPS), "Moving", "next_pane(1)"),
    Command("pane.previous", ("shift+tab",), "Pane before", "Goes to the pane before.",
            (RIGS, STEPS), "Moving", "next_pane(-1)"),
    Command("pane.first", ("1",), "Jump to pane 1", "Goes to the pane numbered 1.", (RIGS, STEPS), "Moving", "pane(1)"),
    Command("pane.second", ("2",), "Jump to pane 2", "Goes to the pane numbered 2.",
            (RIGS, STEPS), "Moving", "pane(2)"),
    Command("pane.third", ("3",), "Jump to pane 3", "Goes to the answer, pane 3.", (STEPS,), "Moving", "pane(3)"),
    Command("palette.up", ("up",), "Command above", "Marks the command above.", (PALETTE,), "Finding a command",
            "line(-1)", 2, "choose"),
    Command("palette.down", ("down",), "Command below", "Marks the command below.", (PALETTE,), "Finding a command",
            "line(1)", 2, "choose"),
    Command("palette.run", ("enter",), "Run the command", "Runs the marked command.", (PALETTE,), "Finding a command",
            "run", 1, "run"),
    Command("app.back", ("escape",), "Back", "Leaves a field, then this screen.",
            (*ALL, PALETTE), "Everywhere", "back", 7, "back"),
    Command("app.units", ("u",), "Units", "Shows values as written, in SI, in US units, in turn.",
            READING, "Everywhere", "units", 5, "units"),
    Command("app.glyphs", ("c",), "Characters", "Switches between full glyphs and plain ASCII.",
            ALL, "Everywhere", "glyphs"),
    Command("app.light", ("l",), "Light or dark", "Switches between the light and the dark theme.",
            ALL, "Everywhere", "light"),
    Command("app.palette", ("ctrl+p",), "Find a command", "Lists the commands of this screen, to be found by a word.",
            ALL, "Everywhere", "palette"),
    Command("app.help", ("question_mark", "f1"), "Keys", "Shows this page.", ALL, "Everywhere", "help", 9, "keys"),
    Command("app.quit", ("ctrl+q",), "Leave", "Leaves the program; every answer is already written.",
            (*ALL, PALETTE), "Everywhere", "quit", 8, "leave", fixed=True),
)  # fmt: skip

BY_ID: Mapping[str, Command] = {command.id: command for command in COMMANDS}

_SHOWN = {"question_mark": "?", "pageup": "page up", "pagedown": "page down", "escape": "esc"}
_PAIRS = {"up": "up/down", "left": "left/right"}


def key_text(key: str) -> str:
    """A key as it is written on the screen."""
    return _SHOWN.get(key, key)


class Keys:
    """The commands with the keys that hold, the user's own included."""

    def __init__(self, own: Mapping[str, tuple[str, ...]] | None = None) -> None:
        """Take the user's own keys, command id to keys; they are already checked."""
        self._own = dict(own or {})

    def of(self, command: Command) -> tuple[str, ...]:
        """The keys of a command."""
        return self._own.get(command.id, command.keys)

    @property
    def own(self) -> Mapping[str, tuple[str, ...]]:
        """What the user changed."""
        return self._own

    def text(self, command_id: str) -> str:
        """The first key of a command as shown."""
        return key_text(self.of(BY_ID[command_id])[0])

    def all_text(self, command: Command) -> str:
        """All keys of a command as shown."""
        return ", ".join(key_text(key) for key in self.of(command))

    def footer(self, screen: str) -> list[tuple[str, str]]:
        """Key and word of the footer's entries, the most wanted first; pairs of arrows are one entry."""
        entries: dict[tuple[int, str], list[str]] = {}
        for command in sorted(on_screen(screen), key=lambda command: command.rank):
            if command.rank:
                entries.setdefault((command.rank, command.short), []).append(self.of(command)[0])
        return [(_PAIRS.get(keys[0], key_text(keys[0])) if keys[1:] in (["down"], ["right"]) else
                 "/".join(key_text(key) for key in keys), word) for (_, word), keys in entries.items()]  # fmt: skip


def on_screen(screen: str) -> Iterable[Command]:
    """The commands that hold on a screen, in the list's order."""
    return (command for command in COMMANDS if screen in command.where)
