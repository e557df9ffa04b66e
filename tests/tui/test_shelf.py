"""The shelf of rigs."""

from pathlib import Path

from tests.tui.fakes import checklist
from tui.services import Found, folders, looks_like_rigs, stamp, toml_files
from tui.shelf import CANNOT_READ, Shelf

ROOT = Path("/rigs")
A, B, C = ROOT / "a.toml", ROOT / "sub" / "b.toml", ROOT / "c.toml"


def filled() -> Shelf:
    shelf = Shelf(ROOT)
    shelf.take_in(Found((A, B), ((C, "no [rig] table"),)))
    return shelf


def test_rigs_come_sorted_with_their_path_below_the_folder() -> None:
    assert [entry.label for entry in filled().rows] == ["a.toml", "c.toml", "sub/b.toml"]


def test_taking_in_again_tells_what_is_new_and_what_is_gone() -> None:
    shelf = filled()
    shelf.settle(A, checklist(A), ())
    new, gone = shelf.take_in(Found((A, C)))
    assert (new, gone) == ([C], [B])
    assert shelf.entries[A].verdict == "FAIL"
    assert shelf.entries[C].verdict == ""


def test_a_rig_that_cannot_be_read_says_so_and_is_not_pass() -> None:
    shelf = filled()
    shelf.settle(A, None, ("a.toml:3: bad",))
    assert shelf.entries[A].verdict == CANNOT_READ
    assert shelf.next_not_pass(C) == A


def test_the_next_rig_skips_pass_and_what_has_no_result() -> None:
    shelf = filled()
    passing = tuple(one for one in checklist(A).findings if one.verdict == "PASS")
    shelf.settle(A, checklist(A, findings=passing), ())
    assert shelf.next_not_pass(None) == C
    assert shelf.next_not_pass(C) == C
    shelf.settle(B, checklist(B), ())
    assert shelf.next_not_pass(C) == B
    assert shelf.next_not_pass(B) == C


def test_only_the_latest_checklists_are_kept_whole() -> None:
    shelf = Shelf(ROOT)
    paths = tuple(ROOT / f"{number:03}.toml" for number in range(60))
    shelf.take_in(Found(paths))
    for path in paths:
        shelf.settle(path, checklist(path), ())
    assert shelf.entries[paths[0]].checklist is None
    assert shelf.entries[paths[0]].verdict == "FAIL"
    assert shelf.entries[paths[-1]].checklist is not None


def test_a_result_of_a_rig_that_is_gone_is_dropped() -> None:
    shelf = filled()
    shelf.settle(ROOT / "z.toml", checklist(A), ())
    assert len(shelf.rows) == 3


def test_stamps_tell_a_changed_file(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    assert stamp(path) is None
    path.write_text("a")
    before = stamp(path)
    path.write_text("ab")
    assert stamp(path) != before


def test_hidden_and_linked_folders_are_passed_over(tmp_path: Path) -> None:
    for name in ("one", ".hidden", "one/two"):
        (tmp_path / name).mkdir()
    (tmp_path / "link").symlink_to(tmp_path / "one")
    assert {path.relative_to(tmp_path).as_posix() for path in folders(tmp_path)} == {".", "one", "one/two"}


def test_a_glance_takes_files_with_a_rig_table_alone(tmp_path: Path) -> None:
    texts = {
        "a.toml": "format = 1\n[rig]\n", "set.toml": "[set]\n# [rig]\n", ".hidden.toml": "[rig]\n",
        "x.record.toml": "[rig]\n", "sub/b.toml": "[ rig ]\n", "c.txt": "[rig]\n",
    }  # fmt: skip
    (tmp_path / "sub").mkdir()
    for name, content in texts.items():
        (tmp_path / name).write_text(content)
    (tmp_path / "d.toml").mkdir()
    assert [path.relative_to(tmp_path).as_posix() for path in looks_like_rigs(tmp_path)] == ["a.toml", "sub/b.toml"]


def test_a_folder_named_like_a_rig_is_no_file_so_that_a_rig_in_its_place_counts_as_new(tmp_path: Path) -> None:
    (tmp_path / "a.toml").mkdir()
    before = toml_files(tmp_path)
    (tmp_path / "a.toml").rmdir()
    (tmp_path / "a.toml").write_text("format = 1\n[rig]\n")
    assert (before, toml_files(tmp_path)) == ((), (tmp_path / "a.toml",))
