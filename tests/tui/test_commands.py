"""The command list."""

import re

from tui.commands import ALL, COMMANDS, FORBIDDEN, ON_WHAT_IS_SHOWN, PALETTE, Keys, on_screen
from tui.glyphs import PLAIN
from tui.keymap import clash
from tui.rows import row_text
from tui.views.help import help_rows, matches


def test_every_command_has_an_id_a_name_a_help_line_and_a_key() -> None:
    ids = [command.id for command in COMMANDS]
    assert len(set(ids)) == len(ids)
    for command in COMMANDS:
        assert re.fullmatch(r"[a-z]+\.[a-z_]+", command.id)
        assert command.name
        assert command.help.endswith(".")
        assert command.keys
        assert set(command.where) <= {*ALL, PALETTE}
        assert bool(command.rank) == bool(command.short)


def test_no_forbidden_key_is_bound() -> None:
    for command in COMMANDS:
        assert not FORBIDDEN & set(command.keys)


def test_no_key_means_two_things() -> None:
    assert clash(Keys()) is None
    meanings: dict[str, set[str]] = {}
    for command in COMMANDS:
        for key in command.keys:
            meanings.setdefault(key, set()).add(command.id)
    assert {key: ids for key, ids in meanings.items() if len(ids) > 1 and key not in ON_WHAT_IS_SHOWN} == {}


def test_letters_kept_for_other_screens_are_free() -> None:
    taken = {key for command in COMMANDS for key in command.keys}
    assert not taken & {"e", "d", "s", "b"}


def test_help_names_every_command_of_every_screen() -> None:
    for screen in ALL:
        shown = " ".join(row_text(line).strip() for line in help_rows(screen, Keys(), 76, PLAIN))
        shown = re.sub(r"\s+", " ", shown)
        for command in on_screen(screen):
            assert f"{command.name}. {command.help}" in shown


def test_the_palette_finds_commands_by_words_of_their_help() -> None:
    found = [command.id for command in COMMANDS if matches(command, "take answer")]
    assert found == ["answer.take_back"]
