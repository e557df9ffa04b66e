"""What is said before the full screen is opened at all."""

import pytest

from tui.main import main


def test_a_path_that_is_not_there_ends_with_2(tmp_path, capsys):
    assert main([str(tmp_path / "nosuch.toml")]) == 2
    assert "no such file" in capsys.readouterr().err


def test_a_folder_without_rigs_ends_with_2(tmp_path, capsys):
    (tmp_path / ".hidden").mkdir()
    (tmp_path / ".hidden" / "a.toml").write_text("", encoding="utf-8")
    assert main([str(tmp_path)]) == 2
    assert "no rig file in this folder" in capsys.readouterr().err


def test_without_a_path_the_folder_rigs_is_taken(tmp_path, capsys, monkeypatch):
    monkeypatch.chdir(tmp_path)
    (tmp_path / "rigs").mkdir()
    assert main([]) == 2
    assert capsys.readouterr().err.startswith("rigs: no rig file")


@pytest.mark.parametrize("words", [
    ["a", "b"], ["--nosuch"], ["check"], ["check", "--json", "--brief", "x"],
    [""], ["check", ""], ["check", "a.toml", ""], ["working", "", "load.mass"], ["report", ""],
])
def test_a_wrong_call_ends_with_2(words, capsys):
    with pytest.raises(SystemExit) as ended:
        main(words)
    assert ended.value.code == 2
    assert "usage" in capsys.readouterr().err
