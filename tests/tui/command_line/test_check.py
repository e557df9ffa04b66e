"""`rigslate check`: exit statuses, JSON, brief and plain forms."""

import json
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

from tests.model.checks.sample import Raw, write
from tests.model.checks.test_inspected import asked
from tui.main import main

STEP_KEYS = {
    "key", "title", "kind", "verdict", "reason", "value", "unit", "min", "max", "margin", "source", "method",
    "cautions", "deviation",
}  # fmt: skip
RIG_KEYS = {"file", "name", "reference", "revision", "verdict", "digest", "signed", "stale", "steps"}
UNITS = {"kg", "m", "m/s", "N", "Pa", "s", "g0", "deg", "d", "yr", "1", None}


def fails(raw: Raw) -> None:
    raw["platform"]["weighed"] = "1,100 kg"


def opens(raw: Raw) -> None:
    raw.pop("link")


def rig(folder: Path, name: str, edit: Callable[[Raw], Any] = lambda raw: None) -> Path:
    place = folder / name
    place.mkdir(parents=True)
    return write(place, edit)


def strict(text: str) -> Any:
    def refuse(word: str) -> None:
        raise ValueError(word)

    return json.loads(text, parse_constant=refuse)


def call(capsys: pytest.CaptureFixture[str], *words: object) -> tuple[int, str, str]:
    try:
        status = main([str(word) for word in words])
    except SystemExit as leaving:
        status = int(leaving.code or 0)
    taken = capsys.readouterr()
    assert "Traceback" not in taken.err
    return status, taken.out, taken.err


@pytest.mark.parametrize(("edit", "status"), [(lambda raw: None, 0), (fails, 1), (opens, 3)])
def test_status_of_one_rig(tmp_path: Path, capsys: pytest.CaptureFixture[str], edit: Any, status: int) -> None:
    assert call(capsys, "check", rig(tmp_path, "a", edit))[0] == status


def test_status_of_several_rigs(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    good, bad, unknown = rig(tmp_path, "a"), rig(tmp_path, "b", fails), rig(tmp_path, "c", opens)
    broken = tmp_path / "broken.toml"
    broken.write_text("format = 1\n[rig\n")
    assert call(capsys, "check", "--brief", good, good)[0] == 0
    assert call(capsys, "check", "--brief", good, unknown)[0] == 3
    assert call(capsys, "check", "--brief", unknown, bad, good)[0] == 1
    status, out, err = call(capsys, "check", "--brief", bad, broken, good)
    assert status == 2
    assert len(out.splitlines()) == 2
    assert "broken.toml:" in err


def test_a_folder_is_checked_whole_and_a_bad_file_hides_nothing(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    rig(tmp_path, "b")
    rig(tmp_path, "a", fails)
    (tmp_path / "c.toml").write_bytes(b"\xff\xfe\x00")
    (tmp_path / "notes.toml").write_text("x = 1\n")
    status, out, err = call(capsys, "check", "--json", tmp_path)
    assert status == 2
    rigs = strict(out)["rigs"]
    assert [Path(one["file"]).name for one in rigs] == ["rig.toml", "rig.toml", "c.toml", "notes.toml"]
    assert [Path(one["file"]).parent.name for one in rigs[:2]] == ["a", "b"]
    for one in rigs[2:]:
        assert set(one) == {"file", "errors"}
        assert all(
            set(mistake) == {"file", "line", "path", "found", "expected", "message"} for mistake in one["errors"]
        )
    assert "c.toml" in err
    assert "notes.toml" in err


def test_json_is_as_promised(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = call(capsys, "check", "--json", rig(tmp_path, "a", opens))
    assert status == 3
    whole = strict(out)
    assert whole["format"] == 1
    (one,) = whole["rigs"]
    assert set(one) >= RIG_KEYS
    assert set(one["digest"]) == {"rigging", "all"}
    assert one["verdict"] == "OPEN"
    assert (one["reference"], one["revision"]) == ("", None)
    assert (one["signed"], one["stale"]) == ([], [])
    steps = {step["key"]: step for step in one["steps"]}
    assert len(steps) == len(one["steps"])
    for step in steps.values():
        assert set(step) == STEP_KEYS
        assert step["verdict"] in ("PASS", "FAIL", "OPEN", "NOT COUNTED")
        assert step["kind"] in ("computed", "inspected")
        assert step["unit"] in UNITS
        assert step["deviation"] is None
    assert steps["suspension.link"]["reason"] == "data missing: link"
    assert steps["suspension.link"]["value"] is None
    factor = steps["opening.load_factor"]
    assert (factor["unit"], factor["max"], factor["min"], factor["source"]) == ("g0", 20.0, None, "rule 4")
    assert factor["margin"] == pytest.approx((20 - factor["value"]) / 20)
    assert factor["method"].startswith("G = F/(m g0)")
    assert steps["service.age.A-1"]["unit"] == "yr"
    assert steps["service.repack.A-1"]["unit"] == "d"
    assert steps["suspension.leg_angle"]["unit"] == "deg"
    assert steps["lashing.mixed"]["unit"] is None


def test_json_stays_json_where_the_console_knows_no_umlaut(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = rig(tmp_path, "a", lambda raw: raw["rig"].update(name="Pumpe für Große"))
    out = call(capsys, "check", "--json", path)[1]
    assert out.isascii()
    assert strict(out)["rigs"][0]["name"] == "Pumpe für Große"


def test_a_missing_file_is_an_error_in_json_too(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = call(capsys, "check", "--json", tmp_path / "none.toml")
    assert status == 2
    (one,) = strict(out)["rigs"]
    assert one["errors"][0]["message"]
    assert "none.toml" in err


def test_a_folder_without_rigs(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = call(capsys, "check", tmp_path)
    assert (status, out) == (2, "")
    assert "no rig" in err


def test_one_rig_named_twice_is_checked_once(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = rig(tmp_path, "a")
    assert len(call(capsys, "check", "--brief", path, path)[1].splitlines()) == 1


def test_brief_is_one_line_a_rig(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    out = call(capsys, "check", "--brief", rig(tmp_path, "a", fails))[1]
    (line,) = out.splitlines()
    assert line.startswith("FAIL  ")
    assert "Round numbers" in line
    assert "load.mass" in line or "load.weighed" in line


@pytest.mark.parametrize("form", [[], ["--brief"], ["--json"]])
def test_computed_leaves_inspected_steps_out_and_says_so(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], form: list[str]
) -> None:
    path = write(tmp_path, limits=asked)
    status, whole, _ = call(capsys, "check", *form, path)
    assert status == 3
    assert "inspected steps left out" not in whole
    status, alone, _ = call(capsys, "check", "--computed", *form, path)
    assert status == 0
    assert "inspected steps left out" in " ".join(alone.split())
    assert "canopy.bag_ties" not in alone


def test_plain_text_fits_eighty_columns_and_says_everything(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    out = call(capsys, "check", rig(tmp_path, "a", opens))[1]
    assert max(len(line) for line in out.splitlines() if not line.startswith(("file:", "full screen:"))) <= 80
    text = " ".join(out.split())
    assert "data missing: link" in text
    assert "at most 9 m/s, rule 3" in text
    assert "licensed riggers" in text
    assert "\x1b" not in out


@pytest.mark.parametrize(("system", "shown"), [("written", "900 kg"), ("si", "900 kg"), ("us", "1,984 lb")])
def test_units_are_chosen(tmp_path: Path, capsys: pytest.CaptureFixture[str], system: str, shown: str) -> None:
    assert shown in call(capsys, "check", "--units", system, rig(tmp_path, "a"))[1]


@pytest.mark.parametrize(
    "words",
    [
        ["check"],
        ["check", "--json", "--brief", "x.toml"],
        ["check", "--colour", "x.toml"],
        ["check", "--units", "metric", "x.toml"],
        ["check", "--uni", "si", "x.toml"],
        ["working"],
        ["working", "x.toml"],
        ["--nothing"],
    ],
)
def test_wrong_calls(capsys: pytest.CaptureFixture[str], words: list[str]) -> None:
    status, out, err = call(capsys, *words)
    assert (status, out) == (2, "")
    assert "usage" in err


def test_help_names_every_status(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = call(capsys, "check", "--help")
    assert status == 0
    for word in ("0 PASS", "1 FAIL", "3 OPEN", "2 input", "130"):
        assert word in out


def test_nothing_is_written_beside_the_rig(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = rig(tmp_path, "a")
    before = {one: one.read_bytes() for one in path.parent.iterdir()}
    call(capsys, "check", path)
    assert {one: one.read_bytes() for one in path.parent.iterdir()} == before


def test_an_interrupt_ends_with_130(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    import tui.command_line.check as command

    def interrupted(_: object) -> int:
        raise KeyboardInterrupt

    monkeypatch.setattr(command, "check", interrupted)
    assert call(capsys, "check", rig(tmp_path, "a"))[0] == 130
