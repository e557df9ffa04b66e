from pathlib import Path

import pytest

from tests.model.checks.sample import checklist, write
from tests.model.checks.test_inspected import asked
from tests.tui.command_line.test_check import call


def test_working_ends_with_0_and_shows_the_lines(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = call(capsys, "working", write(tmp_path), "descent.rate")
    assert status == 0
    lines = out.splitlines()
    assert lines[0].startswith("PASS  ")
    assert "descent.rate" in lines[0]
    assert any("sqrt(" in line for line in lines)
    assert any("platform.weighed" in line for line in lines)


def test_every_step_has_a_working_or_a_reason(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    def bare(raw: dict[str, object]) -> None:
        raw.pop("link")

    path = write(tmp_path, bare, asked)
    for finding in checklist(tmp_path, bare, asked).findings:
        status, out, _ = call(capsys, "working", path, finding.key)
        assert status == 0
        assert len(out.splitlines()) > 2, finding.key


def test_an_unknown_key_is_a_wrong_call_with_the_nearest_one(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    status, out, err = call(capsys, "working", write(tmp_path), "descent.rat")
    assert (status, out) == (2, "")
    assert "descent.rate" in err


def test_a_rig_that_cannot_be_read(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    for path in (tmp_path / "none.toml", tmp_path):
        status, out, err = call(capsys, "working", path, "load.mass")
        assert (status, out) == (2, "")
        assert err


@pytest.mark.parametrize(("system", "unit"), [("si", "kg"), ("us", "lb"), ("written", "kg")])
def test_units_are_chosen(tmp_path: Path, capsys: pytest.CaptureFixture[str], system: str, unit: str) -> None:
    out = call(capsys, "working", write(tmp_path), "load.mass", "--units", system)[1]
    assert f" {unit}" in out


def test_the_load_path_is_one_page(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = call(capsys, "working", write(tmp_path), "load-path")
    assert status == 0
    for word in ("leg", "clevis", "canopy"):
        assert word in out
