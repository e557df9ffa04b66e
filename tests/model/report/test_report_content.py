"""What a report says, whatever form it takes."""

from __future__ import annotations

import re
from dataclasses import replace
from pathlib import Path

import pytest

from model.checks.checklist import check
from model.checks.finding import STEP_UNITS, Checklist, Kind, Verdict
from model.quantity import Dimension, UnitSystem, parse
from model.report import wording
from model.report.document import Items, Picture, RigReport, StepRow, Steps, Words, step_row
from model.report.worked import Workings
from tests.model.report.report_cases import BUNDLE, DEMO, PROGRAM, PUMP, RIGS, checked, reported, signed

MADE: dict[tuple[int, bool], tuple[Checklist, RigReport]] = {}


def one(checklist: Checklist, workings: bool = False) -> RigReport:
    """The report on one rig, made once for each checklist."""
    key = id(checklist), workings
    if key not in MADE:
        MADE[key] = checklist, reported(checklist, workings=workings).rigs[0]
    return MADE[key][1]


def rows(rig: RigReport, title: str) -> list[StepRow]:
    [section] = [one for one in rig.sections if one.title == title]
    return [row for block in section.blocks if isinstance(block, Steps) for row in block.rows]


def said_apart(checklist: Checklist) -> dict[str, tuple[str, ...]]:
    found = [section for section in one(checklist).sections if section.title == "Said apart"]
    return {block.name: block.items for section in found for block in section.blocks if isinstance(block, Items)}


@pytest.mark.parametrize("path", DEMO, ids=lambda path: path.stem)
def test_every_step_stands_once_in_the_checklist_with_its_verdict(path: Path) -> None:
    checklist = checked(path)
    shown = [(row.key, row.verdict) for row in rows(one(checklist), "Checklist")]
    assert shown == [(finding.key, str(finding.verdict)) for finding in checklist.findings]


@pytest.mark.parametrize("path", DEMO, ids=lambda path: path.stem)
def test_what_fails_or_is_open_comes_first(path: Path) -> None:
    checklist = checked(path)
    rig = one(checklist)
    first = rig.sections[0]
    assert first.title == "To settle first"
    texts = [row.key for row in rows(rig, first.title)]
    texts += [item for block in first.blocks if isinstance(block, Items) for item in block.items]
    for finding in checklist.findings:
        named = any(text == finding.key or re.match(f"OPEN {re.escape(finding.key)}[:,]", text) for text in texts)
        assert named == (finding.verdict in (Verdict.FAIL, Verdict.OPEN))
    verdicts = [row.verdict for row in rows(rig, first.title)]
    assert verdicts == sorted(verdicts)  # FAIL before OPEN


def test_the_first_page_defers_to_local_rules_and_says_that_nobody_signed() -> None:
    rig = one(checked(PUMP))
    assert Words(wording.CAUTION, loud=True) in rig.first
    assert Items("Signatures", ("not signed",)) in rig.first
    assert rig.first[0] == Words("FAIL: 43 pass, 1 fail, 22 open, 4 not counted", loud=True)


def test_every_page_names_rig_revision_digest_limit_set_program_and_signatures() -> None:
    checklist = checked(PUMP)
    head = " ".join(one(checklist).page_head)
    for part in ("FAIL", "TV-05", "revision 3", checklist.digests[1][:16], "Tarn relief, low velocity", PROGRAM):
        assert part in head
    assert "not signed" in head


def test_signatures_stand_in_the_order_of_their_times_and_say_when_they_are_stale() -> None:
    rig = one(signed(checked(PUMP), 3, 0))
    [items] = [block.items for block in rig.first if isinstance(block, Items)]
    assert items == (
        "signed by S0, 2026-12-01 08:00 +0200, STALE: changed since",
        "signed by S1, 2026-12-01 09:00 +0200",
        "signed by S2, 2026-12-01 10:00 +0200",
    )
    assert rig.page_head[-1] == "; ".join(items)


def test_many_signatures_leave_the_head_of_a_page_short_but_all_stand_on_the_first_page() -> None:
    rig = one(signed(checked(PUMP), 9, 8))
    assert rig.page_head[-1].startswith("5 earlier signatures on the first page; signed by S5,")
    assert rig.page_head[-1].endswith("S8, 2026-12-01 16:00 +0200, STALE: changed since")
    [items] = [block.items for block in rig.first if isinstance(block, Items)]
    assert len(items) == 9


def test_a_rig_without_reference_revision_limits_and_almost_all_else_is_reported(tmp_path: Path) -> None:
    path = tmp_path / "bare.toml"
    path.write_text('format = 1\n[rig]\nname = "Bare"\n[drop]\ndate = 2026-12-07\n', encoding="utf-8")
    rig = one(check(path), workings=True)
    assert rig.title == "Bare"
    assert "limits: none" in rig.page_head[1]
    assert Words("no limit set is named in the rig file: the rig can't PASS") in rig.first
    curves = {section.title: section.blocks for section in rig.sections}["Curves"]
    assert len(curves) == 1
    assert isinstance(curves[0], Words)
    assert curves[0].text.startswith("No curves: data missing: ")


def test_what_does_not_count_is_said_apart_with_its_reason(tmp_path: Path) -> None:
    limits = (RIGS / "limits" / "tarn-low.toml").read_text(encoding="utf-8")
    measured = '"opening.load_factor" = { max = "9 g", source = "house rule 5", needs_measured = true }'
    limits = limits.replace('"opening.load_factor" = { max = "9 g", source = "house rule 5" }', measured)
    (tmp_path / "limits").mkdir()
    (tmp_path / "limits" / "tarn-low.toml").write_text(limits, encoding="utf-8")
    rig = tmp_path / "pump.toml"
    left_out = '\n[[left_out]]\npart = "tie"\nwhy = "buckled by hand"\n'
    rig.write_text(PUMP.read_text(encoding="utf-8") + left_out, encoding="utf-8")
    found = said_apart(check(rig))
    [left] = found["Left out on purpose"]
    assert "buckled by hand" in left
    assert "(tie.release tie.holds)" in left
    assert "(tie.material)" in left
    [unjudged] = found["Computed, not judged by the limit set"]
    assert "landing.overturn" in unjudged
    assert "house rule 14" in unjudged
    [waiting] = found["Open until a measured figure stands"]
    assert "opening.load_factor" in waiting
    assert "the estimate is within the limit" in waiting
    [informing] = found["For information, no limit set"]
    assert all(key in informing for key in ("zone.density_altitude", "descent.time", "descent.drift"))


@pytest.mark.parametrize("path", DEMO, ids=lambda path: path.stem)
def test_no_step_that_does_not_count_is_left_unsaid(path: Path) -> None:
    checklist = checked(path)
    said = [item for items in said_apart(checklist).values() for item in items]
    for finding in checklist.findings:
        if finding.verdict is Verdict.NOT_COUNTED:
            assert any(item.startswith(finding.reason) and f"({finding.key})" in item for item in said)
            assert "Not counted for another reason" not in said_apart(checklist)


def test_measured_figures_stand_apart_with_their_source() -> None:
    [figures] = said_apart(checked(RIGS / "10-measured-water.toml"))["Measured figures in the rig file"]
    assert figures.startswith("canopy row 1 (main): rate 28.3 ft/s ± 0.5 ft/s; rate mass 2,080 lb; ")
    assert figures.endswith("source: trial drops 3 and 4 of the lift, 2026-11-18")


def test_changes_and_deviations_stand_apart() -> None:
    checklist = signed(checked(PUMP), 2, 0)
    deviating = [replace(f, deviation="zone is soft") if f.key == "descent.rate" else f for f in checklist.findings]
    found = said_apart(replace(checklist, findings=tuple(deviating), stale=("canopy.bag_ties",)))
    assert found["Deviations"] == ("FAIL descent.rate: zone is soft",)
    said, signature, answer = found["Changed since it was signed or answered"]
    assert said.startswith("STALE: the rig file or its limit set is not what was signed; limits may have changed")
    assert "S0" in signature
    assert "canopy.bag_ties" in answer


def number(text: str, dimension: Dimension) -> float:
    """What a shown text says, in SI; a bare number where there is no unit."""
    found = parse(text, dimension) if dimension is not Dimension.NUMBER else parse(text.replace(" %", " %"), dimension)
    return found.value


@pytest.mark.parametrize("system", list(UnitSystem))
@pytest.mark.parametrize("path", DEMO, ids=lambda path: path.stem)
def test_shown_numbers_carry_their_unit_and_never_contradict_the_verdict(path: Path, system: UnitSystem) -> None:
    for finding in checked(path).findings:
        row = step_row(finding, system)
        if finding.kind is not Kind.COMPUTED or finding.value is None or not row.value:
            continue
        dimension = Dimension(STEP_UNITS[finding.unit or "1"].dimension)
        value = number(row.value, dimension)
        assert value == pytest.approx(finding.value * STEP_UNITS[finding.unit or "1"].size, rel=2e-3, abs=1e-9)
        if finding.limit is None:
            continue
        bounds = re.sub(r"^at (most|least) ", "", row.limit).split(" to ")
        low = number(bounds[0], dimension) if finding.limit.minimum is not None else float("-inf")
        high = number(bounds[-1], dimension) if finding.limit.maximum is not None else float("inf")
        assert (low <= value <= high) == finding.limit.holds(finding.value), row


def test_workings_show_each_shared_line_once_and_every_step_ends_in_its_value() -> None:
    checklist = checked(PUMP)
    [section] = [section for section in one(checklist, workings=True).sections if section.title == "Workings"]
    steps = [block for block in section.blocks if isinstance(block, Workings)]
    results = [finding for finding in checklist.findings if finding.result is not None]
    assert [block.name for block in steps] == [f"{finding.title} ({finding.key})" for finding in results]
    for block, finding in zip(steps, results, strict=True):
        assert finding.result is not None
        assert block.lines[-1].meaning == finding.result.meaning
    earlier = [line for block in steps for line in block.lines[:-1]]
    assert len(earlier) == len(set(earlier))


def test_a_total_over_lines_of_earlier_steps_names_them() -> None:
    [section] = [section for section in one(checked(PUMP), workings=True).sections if section.title == "Workings"]
    [per_canopy] = [b for b in section.blocks if isinstance(b, Workings) and "suspended_per_canopy" in b.name]
    [falling] = [line for line in per_canopy.lines if line.meaning == "falling mass"]
    assert falling.way == ("the line above", "source: definition", "with, from earlier steps: M = 2,084 lb")


def test_without_being_asked_for_no_workings_stand_in_a_report() -> None:
    assert "Workings" not in [section.title for section in one(checked(PUMP)).sections]


def test_several_rigs_begin_with_an_overview_and_one_does_not() -> None:
    both = reported(checked(PUMP), checked(BUNDLE))
    assert both.overview is not None
    assert [name for name, _ in both.overview.rows] == [
        "FAIL: TV-05, revision 3: Borehole pump, plateau",
        "PASS: TV-01, revision 2: Medical bundle",
    ]
    assert reported(checked(PUMP)).overview is None


def test_curves_come_with_their_numbers_in_words() -> None:
    [section] = [section for section in one(checked(PUMP)).sections if section.title == "Curves"]
    pictures = [block for block in section.blocks if isinstance(block, Picture)]
    assert len(pictures) == 3
    assert all(block.said for block in pictures)
