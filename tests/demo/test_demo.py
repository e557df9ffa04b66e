"""The demo scenario shows what its files say, and says that it is invented."""

from __future__ import annotations

import re
import tomllib
from pathlib import Path
from typing import Any

import pytest

from model.checks.checklist import check
from model.rig.digest import rigging_digest
from model.rig.reading import find_rigs, load
from model.rig.record import read_record, record_path
from tests.demo.make_records import RECORDS, write
from tests.demo.scenario import RIGS, SHOWN, Kind, Verdict, checklist, computed, finding, rig_path

LIMITS = sorted((RIGS / "limits").glob("*.toml"))
FILES = sorted(RIGS.rglob("*.toml"))
NAMES = sorted(SHOWN)


def raw(path: Path) -> dict[str, Any]:
    return tomllib.loads(path.read_text(encoding="utf-8"))


def limits_raw(name: str) -> dict[str, Any]:
    limits = load(rig_path(name)).limits
    assert limits is not None
    return dict(limits.raw)


def test_the_folder_holds_just_the_rigs_that_are_described() -> None:
    found = find_rigs(RIGS)
    assert [path.stem for path in found.rigs] == NAMES
    assert found.problems == ()


@pytest.mark.parametrize("name", NAMES)
def test_rig_ends_as_its_header_says(name: str) -> None:
    alone, whole, failing = SHOWN[name]
    assert computed(name).verdict == alone
    assert checklist(name).verdict == whole
    assert {one.key for one in checklist(name).findings if one.verdict is Verdict.FAIL} == failing


@pytest.mark.parametrize("name", NAMES)
def test_header_tells_the_verdict(name: str) -> None:
    comment = header(rig_path(name).read_text(encoding="utf-8"))
    alone, whole, _ = SHOWN[name]
    assert "Shows: " in comment
    if whole == "FAIL":
        assert "FAIL" in comment
    elif whole == "PASS":
        assert "ends PASS" in comment
    else:
        assert re.search(r"OPEN|nspections are open", comment)
        assert ("omputed steps pass" in comment or "Every computed step passes" in comment) == (alone == "PASS")


def header(text: str) -> str:
    lines = [line.removeprefix("#").strip() for line in text.split("\n\nformat", maxsplit=1)[0].splitlines()]
    return " ".join(lines)


def test_there_are_passing_open_and_failing_rigs() -> None:
    assert [row[1] for row in SHOWN.values()].count("PASS") >= 1
    assert [row[0] for row in SHOWN.values()].count("PASS") >= 2
    assert {row[1] for row in SHOWN.values()} == {"PASS", "OPEN", "FAIL"}


def test_every_failing_rig_fails_for_one_reason() -> None:
    for name, (_, _, failing) in SHOWN.items():
        assert len({key.split(".")[0] for key in failing}) <= 1, name
    for key in ("landing.deceleration", "landing.fragility"):
        assert "bottoms" in finding("13-thin-honeycomb", key).reason


@pytest.mark.parametrize("name", [name for name in NAMES if SHOWN[name][0] == "FAIL"])
def test_failing_rig_has_nothing_open_but_inspections(name: str) -> None:
    assert [one.key for one in computed(name).findings if one.verdict is Verdict.OPEN] == []


@pytest.mark.parametrize("name", NAMES)
def test_no_computed_step_passes_without_a_number_and_a_limit(name: str) -> None:
    for one in computed(name).findings:
        if one.verdict is Verdict.PASS and one.key not in ("lashing.mixed", "service.packs"):
            assert one.value is not None, one.key
            assert one.limit is not None, one.key
            assert one.limit.source, one.key
            assert one.limit.holds(one.value), one.key


def test_the_two_pumps_differ_only_in_the_drop() -> None:
    cool, warm = (raw(rig_path(name)) for name in ("04-pump-cool", "05-pump-warm"))
    apart = {key for key in cool.keys() | warm.keys() if cool.get(key) != warm.get(key)}
    assert apart == {"rig", "drop"}
    assert {key for key in cool["rig"] if cool["rig"][key] != warm["rig"].get(key)} == {"name", "reference", "notes"}
    limits = limits_raw("04-pump-cool")
    assert rigging_digest(cool, limits) == rigging_digest(warm, limits)


def test_the_half_entered_rig_names_what_is_missing() -> None:
    found = computed("09-half-entered").findings
    open_steps = [one for one in found if one.verdict is Verdict.OPEN]
    assert len(open_steps) > 25
    assert all(one.reason.startswith("data missing: ") for one in open_steps)
    named = {one.reason.removeprefix("data missing: ") for one in open_steps}
    assert {"item 3 (Lashings and legs) mass", "platform.weighed", "platform.height", "drop.surface_wind", "cushion",
            "pack 1 (R-2219) packed"} <= named  # fmt: skip


def test_the_high_box_waits_for_a_measured_figure() -> None:
    open_steps = {one.key: one.reason for one in computed("07-high-box").findings if one.verdict is Verdict.OPEN}
    assert set(open_steps) == {"opening.canopy", "opening.line"}
    assert all("needs a measured figure" in reason for reason in open_steps.values())


def test_a_measured_opening_satisfies_the_set_that_asks_for_it() -> None:
    for key in ("opening.canopy", "opening.line"):
        assert finding("16-fast-rations", key).verdict is Verdict.PASS


def test_the_measured_rate_overrules_an_estimate_that_would_pass(tmp_path: Path) -> None:
    text = rig_path("10-measured-water").read_text(encoding="utf-8")
    start, end = text.index("[canopy.measured]"), text.index("[[pack]]")
    estimate = tmp_path / "estimate.toml"
    estimate.write_text(absolute(text[:start] + text[end:]), encoding="utf-8")
    found = {one.key: one for one in check(estimate).findings}
    measured = finding("10-measured-water", "descent.rate")
    assert measured.verdict is Verdict.FAIL
    assert found["descent.rate"].verdict is Verdict.PASS
    assert measured.value is not None
    assert found["descent.rate"].value is not None
    assert measured.value > found["descent.rate"].value
    for key in ("opening.load_factor", "height.opening_loss"):
        assert found[key].value != finding("10-measured-water", key).value


def absolute(text: str) -> str:
    return re.sub(r'(?m)^limits = "(.*)"$', lambda m: f'limits = "{(RIGS / m[1]).as_posix()}"', text)


# Figures that a step needs, a row of each taken out of a rig that passes all its computed steps.
NEEDED = (
    "release_height", "airspeed", "zone_elevation", "surface_wind", "static_line", "mass", "length", "width",
    "height", "centre", "weighed", "diameter", "line_length", "rated_mass", "rated_speed", "strength",
    "stretch", "made", "packed", "apex", "legs_carrying", "at", "plies", "joint_efficiency", "attachment",
    "carries", "abreast", "layers", "layer_thickness", "area", "crush_stress", "usable_strain", "deck",
    "load", "device", "deck_fitting", "load_fitting", "strands", "strand_strength", "strand_strength_most",
    "knot_efficiency", "holds_at_least", "breaks_by", "expires", "arms_after",
)  # fmt: skip
FIRST_ROW = ("fragility", "lies")
"""Of these one row is enough for the steps."""


def open_without(row: int, text: str, folder: Path) -> list[str]:
    """Keys of the computed steps that are OPEN once a line is taken out."""
    lines = text.splitlines()
    short = folder / "short.toml"
    short.write_text("\n".join(lines[:row] + lines[row + 1 :]), encoding="utf-8")
    found = [one for one in check(short).findings if one.kind is Kind.COMPUTED and one.verdict is Verdict.OPEN]
    assert all(one.reason.startswith("data missing: ") or one.reason == "no limit set" for one in found)
    return [one.key for one in found]


@pytest.mark.parametrize("key", [*NEEDED, *FIRST_ROW])
def test_a_figure_taken_out_never_leaves_a_pass(key: str, tmp_path: Path) -> None:
    text = absolute(rig_path("04-pump-cool").read_text(encoding="utf-8"))
    rows = [row for row, line in enumerate(text.splitlines()) if line.startswith(f"{key} = ")]
    assert rows
    for row in {rows[0]} if key in FIRST_ROW else {rows[0], rows[-1]}:
        assert open_without(row, text, tmp_path), f"line {row + 1}"


@pytest.mark.parametrize("path", LIMITS, ids=lambda path: path.stem)
def test_every_limit_has_a_source_that_is_a_house_rule(path: Path) -> None:
    found = raw(path)
    assert all(limit["source"].startswith("house rule ") for limit in found["limits"].values())
    assert found["restraint"]["source"].startswith("house rule ")
    assert found["set"]["issued_by"]
    assert "Invented" in found["set"]["note"]


def test_both_sets_are_used_and_ask_enough() -> None:
    used = {checklist(name).limit_set for name in NAMES}
    assert used == {"Tarn relief, low velocity", "Tarn relief, high velocity"}
    for path in LIMITS:
        asked = raw(path)["inspection"]
        assert 15 <= len(asked) <= 25
        for what in ("stop", "two_person", "answer", "caution", "covers"):
            assert any(what in one for one in asked), what
        assert any(limit.get("judged") is False for limit in raw(path)["limits"].values())
    assert any(limit.get("needs_measured") for path in LIMITS for limit in raw(path)["limits"].values())


@pytest.mark.parametrize("path", FILES, ids=lambda path: path.name)
def test_files_say_they_are_invented(path: Path) -> None:
    if path.name.endswith(".record.toml"):  # written by the program alone
        return
    start = path.read_text(encoding="utf-8").split("\n\nformat", maxsplit=1)[0]
    assert "Tarn valley relief lift, an invented scenario" in start
    assert "made up" in start


DESIGNATION = re.compile(
    r"\b(?:G|T|A|M|C|CV|CH|UH|MH|MB|MC|CGU|AN|KC|Il|An)-?\d{1,3}[A-Z]?\b"
    r"|\btype [IVX]+\b|\bMIL-|\bTM \d|\bFM \d|\bAFI\b|\bTO \d",
)


@pytest.mark.parametrize("path", FILES, ids=lambda path: path.name)
def test_no_equipment_designation_and_no_official_air(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    assert DESIGNATION.findall(text) == []
    assert not re.search(r"\bofficial|\bapproved\b|\bcertified\b|\bguarantee", text, re.IGNORECASE)


def test_people_are_initials() -> None:
    for name in NAMES:
        assert re.fullmatch(r"[A-Z]{2}", raw(rig_path(name))["rig"]["rigged_by"])
    for path in LIMITS:
        assert re.fullmatch(r"[A-Z]{2}", raw(path)["set"]["issued_by"])
    for name in RECORDS:
        for entry in read_record(record_path(RIGS / name)):
            assert re.fullmatch(r"[A-Z]{2}", entry.who)
            assert re.fullmatch(r"([A-Z]{2})?", entry.second)


def test_references_and_serials_are_used_once() -> None:
    rigs = {name: raw(rig_path(name)) for name in NAMES}
    references = [found["rig"]["reference"] for found in rigs.values()]
    assert len(set(references)) == len(references)
    twins = {"05-pump-warm"}  # the same load as the rig before it
    serials = [pack["serial"] for name, found in rigs.items() if name not in twins for pack in found.get("pack", [])]
    serials += [one["serial"] for name, found in rigs.items() if name not in twins for one in found.get("device", [])]
    assert len(set(serials)) == len(serials)


def test_one_rig_is_in_si_alone_and_read_from_the_front_edge() -> None:
    text = rig_path("11-generator-si").read_text(encoding="utf-8")
    units = set(re.findall(r'"-?[\d.,]+ ([^"± ]+)', text))
    assert units <= {"kg", "m", "mm", "m2", "m/s", "km/h", "kN", "N", "kPa", "hPa", "°C", "s", "deg", "g"}
    assert raw(rig_path("11-generator-si"))["platform"]["measure_from"] == "front edge"


def test_records_are_as_the_script_writes_them(tmp_path: Path) -> None:
    write(tmp_path)
    for name in RECORDS:
        path = record_path(RIGS / name)
        assert path.read_bytes() == (tmp_path / path.name).read_bytes(), f"run tests.demo.make_records for {name}"
    assert {path.name for path in RIGS.glob("*.record.toml")} == {path.name for path in tmp_path.iterdir()}


def test_the_whole_record_is_by_two_people_and_nothing_is_stale() -> None:
    found = checklist("01-medical-bundle")
    assert found.stale == ()
    assert [(one.who, one.stale) for one in found.signatures] == [("AM", False), ("SB", False)]
    asked = [one for one in found.findings if one.inspection is not None and one.verdict is not Verdict.NOT_COUNTED]
    assert len(asked) >= 15
    assert all(one.answer is not None for one in asked)
    for one in asked:
        if one.inspection is not None and one.inspection.two_person:
            assert one.answer is not None
            assert one.answer.second not in ("", one.answer.who)


def test_the_half_record_shows_what_the_content_left_behind() -> None:
    found = checklist("02-grain-container")
    assert set(found.stale) == {"load.contents", "landing.honeycomb"}
    for key in found.stale:
        assert finding("02-grain-container", key).verdict is Verdict.OPEN
        assert "STALE" in finding("02-grain-container", key).reason
    assert finding("02-grain-container", "service.textiles").verdict is Verdict.PASS
    assert finding("02-grain-container", "zone.clear").reason == "not inspected yet"
    assert found.signatures == ()
