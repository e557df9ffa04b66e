"""`rigslate report` from the command line."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
from importlib.metadata import version
from pathlib import Path

import pytest

from tui.main import main

RIGS = Path(__file__).resolve().parents[3] / "rigs"


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    """Two demo rigs with their limit set, and room for a report."""
    place = tmp_path / "rigs"
    (place / "limits").mkdir(parents=True)
    shutil.copy(RIGS / "limits" / "tarn-low.toml", place / "limits")
    shutil.copy(RIGS / "05-pump-warm.toml", place / "b.toml")
    shutil.copy(RIGS / "10-measured-water.toml", place / "a.toml")
    return place


def test_one_rig_is_printed_as_plain_text(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["report", str(RIGS / "05-pump-warm.toml")]) == 0
    out, err = capsys.readouterr()
    assert out.startswith("FAIL: TV-05, revision 3: Borehole pump, plateau\n")
    assert f"rigslate {version('rigslate')}" in out
    assert "WORKINGS" not in out
    assert "\f" not in out
    assert err == ""


def test_workings_and_units_are_taken_up(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["report", str(RIGS / "05-pump-warm.toml"), "--working", "--units", "si"]) == 0
    out, _ = capsys.readouterr()
    assert "WORKINGS" in out
    assert "canopy force, kN" in out


@pytest.mark.parametrize(
    ("name", "beginning"),
    [("out.txt", "Rigging checks of 2"), ("out.md", "# Rigging checks of 2"), ("OUT.HTML", "<!DOCTYPE html>")],
)
def test_the_ending_decides_the_form_and_rigs_come_sorted(
    folder: Path, name: str, beginning: str, capsys: pytest.CaptureFixture[str]
) -> None:
    target = folder.parent / name
    assert main(["report", str(folder), "-o", str(target)]) == 0
    written = target.read_text(encoding="utf-8")
    assert written.startswith(beginning)
    assert written.index("TV-10") < written.index("TV-05")
    assert capsys.readouterr() == ("", "")
    assert sorted(one.name for one in folder.parent.iterdir()) == sorted(["rigs", name])


def test_a_former_report_is_replaced_and_keeps_its_permissions(folder: Path) -> None:
    target = folder.parent / "out.txt"
    target.write_text("former", encoding="utf-8")
    target.chmod(0o640)
    assert main(["report", str(folder / "b.toml"), "-o", str(target)]) == 0
    assert target.read_text(encoding="utf-8").startswith("FAIL: TV-05")
    assert target.stat().st_mode & 0o777 == 0o640


def test_a_bad_file_hides_no_other_rig_and_is_said_in_the_report_and_on_stderr(
    folder: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (folder / "c.toml").write_text('format = 1\n[rig]\nname = "Bad"\n[drop]\ndate = "soon"\n', encoding="utf-8")
    (folder / "d.toml").write_text("neither = 1\n", encoding="utf-8")
    target = folder.parent / "out.html"
    assert main(["report", str(folder), "-o", str(target)]) == 2
    _, err = capsys.readouterr()
    written = target.read_text(encoding="utf-8")
    assert written.count('<section class="rig"') == 2
    for name in ("c.toml", "d.toml"):
        assert name in err
        assert name in written


@pytest.mark.parametrize("text", ["format = 1\n", "= =", None])
def test_where_no_rig_can_be_read_nothing_is_written(
    tmp_path: Path, text: str | None, capsys: pytest.CaptureFixture[str]
) -> None:
    rig, target = tmp_path / "rig.toml", tmp_path / "out.txt"
    if text is not None:
        rig.write_text(text, encoding="utf-8")
    target.write_text("former", encoding="utf-8")
    assert main(["report", str(rig), "-o", str(target)]) == 2
    out, err = capsys.readouterr()
    assert out == ""
    assert "rig.toml" in err
    assert target.read_text(encoding="utf-8") == "former"


@pytest.mark.parametrize("name", ["out.pdf", "out", "b.toml", "limits/tarn-low.toml", "b.record.toml", "out.txt.toml"])
def test_another_ending_is_refused_before_anything_is_read(
    folder: Path, name: str, capsys: pytest.CaptureFixture[str]
) -> None:
    target = folder / name
    before = target.read_bytes() if target.exists() else None
    assert main(["report", str(folder), "-o", str(target)]) == 2
    assert "a report ends in .txt, .md or .html" in capsys.readouterr().err
    assert (target.read_bytes() if target.exists() else None) == before


@pytest.mark.parametrize("kind", ["symbolic", "hard", "named so"])
@pytest.mark.parametrize("read", ["b.toml", "limits/tarn-low.toml"])
def test_what_is_read_is_never_written_over_under_whatever_name(
    folder: Path, kind: str, read: str, capsys: pytest.CaptureFixture[str]
) -> None:
    rig, target = folder / "b.toml", folder / "out.txt"
    held = (folder / read).read_bytes()
    if kind == "symbolic":
        target.symlink_to(folder / read)
    elif kind == "hard":
        os.link(folder / read, target)
    elif read == "b.toml":
        rig = rig.rename(target)
    else:
        (folder / read).rename(target)
        rig.write_text(rig.read_text(encoding="utf-8").replace(read, "out.txt"), encoding="utf-8")
    assert main(["report", str(rig), "-o", str(target)]) == 2
    assert "out.txt" in capsys.readouterr().err
    assert target.read_bytes() == held


def test_a_place_that_cannot_hold_a_report_is_said(folder: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (folder / "dir.txt").mkdir()
    os.mkfifo(folder / "pipe.txt")
    for name, message in (
        ("dir.txt", "not a file that a report can replace"),
        ("pipe.txt", "not a file that a report can replace"),
        ("none/out.txt", "no such folder"),
        ("b.toml/out.txt", "not a directory"),
        ("x" * 300 + ".txt", "too long"),
    ):
        assert main(["report", str(folder), "-o", str(folder / name)]) == 2
        assert message in capsys.readouterr().err


def test_a_write_that_breaks_off_leaves_the_former_report_whole(
    folder: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    target = folder.parent / "out.txt"
    target.write_text("former", encoding="utf-8")

    def full(*_: object) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    assert main(["report", str(folder), "-o", str(target)]) == 2
    assert "not written: no space left on device" in capsys.readouterr().err
    assert target.read_text(encoding="utf-8") == "former"
    assert sorted(one.name for one in folder.parent.iterdir()) == ["out.txt", "rigs"]


def test_a_wrong_call_ends_with_2(capsys: pytest.CaptureFixture[str]) -> None:
    for words in (["report"], ["report", "a", "b"], ["report", "a", "--units", "metric"]):
        with pytest.raises(SystemExit) as left:
            main(words)
        assert left.value.code == 2
    capsys.readouterr()


def test_no_scipy_is_loaded_for_a_report() -> None:
    script = (
        "import sys; from tui.main import main; "
        f"main(['report', {str(RIGS / '05-pump-warm.toml')!r}]); "
        "print([name for name in ('scipy', 'textual') if name in sys.modules], file=sys.stderr)"
    )
    done = subprocess.run([sys.executable, "-c", script], cwd=RIGS.parent, capture_output=True, text=True, check=True)
    assert done.stderr.strip() == "[]"
