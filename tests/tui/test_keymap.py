"""The user's key file."""

from pathlib import Path

import pytest

from tui.commands import BY_ID
from tui.keymap import KeymapError, keymap_path, read_keys


def written(folder: Path, text: str) -> Path:
    path = folder / "keys.toml"
    path.write_text(text, encoding="utf-8")
    return path


def test_without_a_file_the_usual_keys_hold(tmp_path: Path) -> None:
    assert read_keys(tmp_path / "keys.toml").text("steps.working") == "w"


def test_a_file_changes_the_keys_it_names(tmp_path: Path) -> None:
    keys = read_keys(written(tmp_path, '[keys]\n"steps.working" = "v"\n"page.down" = ["pagedown", "ctrl+f"]\n'))
    assert keys.text("steps.working") == "v"
    assert keys.of(BY_ID["page.down"]) == ("pagedown", "ctrl+f")
    assert keys.text("app.units") == "u"


def test_two_commands_may_swap_their_keys(tmp_path: Path) -> None:
    keys = read_keys(written(tmp_path, '[keys]\n"steps.working" = "u"\n"app.units" = "w"\n'))
    assert (keys.text("steps.working"), keys.text("app.units")) == ("u", "w")


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("[keys", "Expected"),
        ('[kees]\na = "b"', "unknown entry 'kees'"),
        ("keys = 3", "must be a table"),
        ('[keys]\n"steps.wroking" = "v"', "steps.wroking: unknown command"),
        ('[keys]\n"steps.working" = "ctrl+b"', "ctrl+b can't be used"),
        ('[keys]\n"steps.working" = "ctrl+c"', "ctrl+c can't be used"),
        ('[keys]\n"steps.working" = "u"', "u is wanted by"),
        ('[keys]\n"rigs.next" = "p"', "p is wanted by"),
        ('[keys]\n"steps.working" = "hyper"', "unknown key 'hyper'"),
        ('[keys]\n"steps.working" = []', "expected a key or a list of keys"),
        ('[keys]\n"steps.working" = 7', "expected a key or a list of keys"),
        ('[keys]\n"app.quit" = "q"', "keeps its key"),
        ('[keys]\n"steps.working" = "enter"', "enter is wanted by"),
    ],
)
def test_a_bad_file_gets_one_line_and_changes_nothing(tmp_path: Path, text: str, message: str) -> None:
    with pytest.raises(KeymapError) as caught:
        read_keys(written(tmp_path, text))
    assert message in str(caught.value)
    assert str(caught.value).endswith("the usual keys hold")
    assert "\n" not in str(caught.value)


def test_a_file_that_is_no_text_or_a_folder_gets_one_line(tmp_path: Path) -> None:
    (tmp_path / "keys.toml").write_bytes(b"\xff\xfe\x00")
    with pytest.raises(KeymapError, match="not UTF-8 text"):
        read_keys(tmp_path / "keys.toml")
    (tmp_path / "folder").mkdir()
    with pytest.raises(KeymapError, match="the usual keys hold"):
        read_keys(tmp_path / "folder")


def test_the_file_lies_in_the_configuration_folder(tmp_path: Path) -> None:
    assert keymap_path({}, tmp_path) == tmp_path / ".config" / "rigslate" / "keys.toml"
    assert keymap_path({"XDG_CONFIG_HOME": "relative"}, tmp_path) == tmp_path / ".config" / "rigslate" / "keys.toml"
    elsewhere = tmp_path / "conf"
    assert keymap_path({"XDG_CONFIG_HOME": str(elsewhere)}, tmp_path) == elsewhere / "rigslate" / "keys.toml"
