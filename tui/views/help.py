"""The help screen and the palette's entries, made from the command list."""

from __future__ import annotations

from tui.commands import COMMANDS, Command, Keys, on_screen
from tui.glyphs import Charset, fill
from tui.rows import EMPTY, Row, Span, paragraph, row

SCREEN_NAMES = {"rigs": "Rigs", "steps": "Steps", "working": "Working", "help": "Keys"}
_KEYS = 17

SIGNS = (
    ("= pass", "the step is within its limit, or was looked at and found right"),
    ("X fail", "it is not; in the margin bar: the part over or short of the limit"),
    ("o open", "no limit, data missing, or not looked at yet; never counts as pass"),
    ("- not counted", "left out on purpose, not judged, or does not apply"),
    (". calculating", "a new result is on its way"),
)
DEFERRAL = (
    "rigslate helps to check; it releases nothing. Local rules, the technical manual of the equipment and licensed"
    " riggers decide. Where they differ from this screen, they hold."
)


def help_rows(screen: str, keys: Keys, cells: int, chars: Charset) -> list[Row]:
    """All keys: those of the screen help was asked for on first, then the others."""
    here = list(on_screen(screen))
    rows: list[Row] = [row(Span(f"Keys on {SCREEN_NAMES.get(screen, screen)}", "title")), EMPTY]
    rows += _listed(here, keys, cells, chars)
    rows += [EMPTY, row(Span("In a field", "title"))]
    for key, text in (("enter", "takes what was typed"), ("esc", "leaves the field, nothing is written"),
                      ("f1", "this page")):  # fmt: skip
        rows += _entry(key, text, cells, chars)
    others = [command for command in COMMANDS if command not in here]
    for name in ("rigs", "steps", "working"):
        listed = [command for command in others if command.where[0] == name]
        if listed:
            rows += [EMPTY, row(Span(f"On {SCREEN_NAMES[name]}", "title")), *_listed(listed, keys, cells, chars)]
    rows += [EMPTY, row(Span("Signs", "title"))]
    for sign, text in SIGNS:
        rows += _entry(sign, text, cells, chars)
    return [*rows, EMPTY, *paragraph(DEFERRAL, cells, "note")]


def _listed(commands: list[Command], keys: Keys, cells: int, chars: Charset) -> list[Row]:
    rows: list[Row] = []
    group = ""
    for command in sorted(commands, key=lambda command: _GROUPS.index(command.group)):
        if command.group != group:
            group = command.group
            rows.append(row(Span(group, "dim")))
        rows += _entry(keys.all_text(command), f"{command.name}. {command.help}", cells, chars)
    return rows


_GROUPS = list(dict.fromkeys(command.group for command in COMMANDS))


def _entry(key: str, text: str, cells: int, chars: Charset) -> list[Row]:
    lines = paragraph(text, cells - _KEYS - 2)
    shown = [row(Span(f"  {fill(key, _KEYS, chars)}", "key"), *lines[0])]
    return shown + [row(" " * (_KEYS + 2), *line) for line in lines[1:]]


def matches(command: Command, words: str) -> bool:
    """Whether all words typed occur in a command's name or help."""
    text = f"{command.name} {command.help}".casefold()
    return all(word in text for word in words.casefold().split())
