from datetime import UTC, datetime
from pathlib import Path

import pytest

from model.checks.checklist import NO_INSPECTIONS, check
from model.checks.finding import COMPUTED_ALONE, Checklist, Finding, Kind, Verdict, computed_alone
from model.rig import record
from model.rig.entry import draft
from model.rig.errors import InputError
from model.rig.reading import load
from model.rig.standing import content_digest
from tests.model.checks.sample import Raw, checklist, findings, write

TIES = {
    "key": "canopy.bag_ties", "stage": "rigging", "stop": True, "two_person": True, "ask": "Bag ties",
    "answer": "turns", "caution": "Nylon does not break.", "covers": ["canopy", "tie"],
}  # fmt: skip
TAILS = {"key": "lashing.tails", "ask": "Strap tails taped"}
HOOK = {"key": "lashing.hooks", "ask": "Hooks closed", "stop": True}


def asked(raw: Raw) -> None:
    raw["inspection"] = [TIES, TAILS, HOOK]


def answer(path: Path, key: str, **fields: object) -> None:
    loaded = load(path)
    assert loaded.limits is not None
    covers = TIES["covers"] if key == "canopy.bag_ties" else None
    on = content_digest("answer", key, covers, loaded.rig.raw, loaded.limits.raw)  # type: ignore[arg-type]
    whole = {
        "kind": "answer", "key": key, "answer": "pass", "who": "AM", "when": datetime(2026, 9, 15, 8, tzinfo=UTC),
        "version": "0.1.0", "on": on,
    }  # fmt: skip
    if covers:
        whole["covers"] = covers
    record.append(record.record_path(path), draft(**(whole | fields)))


def found(path: Path) -> dict[str, Finding]:
    return {one.key: one for one in check(path).findings}


def test_they_join_their_group_the_stopping_ones_first(tmp_path: Path) -> None:
    keys = [one.key for one in checklist(tmp_path, limits=asked).findings]
    lashing = [key for key in keys if key.startswith("lashing.")]
    assert lashing[0] == "lashing.hooks"
    assert lashing[-1] == "lashing.tails"
    assert keys[-1] == "canopy.bag_ties"


def test_unanswered_they_are_open(tmp_path: Path) -> None:
    step = findings(tmp_path, limits=asked)["lashing.tails"]
    assert (step.kind, step.verdict, step.reason) == (Kind.INSPECTED, Verdict.OPEN, "not inspected yet")
    assert checklist(tmp_path, limits=asked).verdict is Verdict.OPEN


@pytest.mark.parametrize(
    ("fields", "verdict", "word"),
    [
        ({"answer": "pass"}, Verdict.PASS, ""),
        ({"answer": "fail", "remark": "two loose"}, Verdict.FAIL, "two loose"),
        ({"answer": "does not apply", "remark": "no tails"}, Verdict.NOT_COUNTED, "no tails"),
    ],
)
def test_answers_count(tmp_path: Path, fields: dict[str, str], verdict: Verdict, word: str) -> None:
    path = write(tmp_path, limits=asked)
    answer(path, "lashing.tails", **fields)
    step = found(path)["lashing.tails"]
    assert step.verdict is verdict
    assert word in step.reason
    assert step.answer is not None
    assert step.answer.who == "AM"


def test_a_two_person_step_needs_two_names_and_its_value(tmp_path: Path) -> None:
    path = write(tmp_path, limits=asked)
    answer(path, "canopy.bag_ties", second="RB")
    assert found(path)["canopy.bag_ties"].verdict is Verdict.OPEN
    answer(path, "canopy.bag_ties", value="4")
    step = found(path)["canopy.bag_ties"]
    assert step.verdict is Verdict.OPEN
    assert "second name" in step.reason
    answer(path, "canopy.bag_ties", second="RB", value="4")
    assert found(path)["canopy.bag_ties"].verdict is Verdict.PASS


def test_a_withdrawn_answer_leaves_the_step_open(tmp_path: Path) -> None:
    path = write(tmp_path, limits=asked)
    answer(path, "lashing.tails")
    answer(path, "lashing.tails", kind="withdrawal", answer=None, remark="wrong load")
    assert found(path)["lashing.tails"].reason == "not inspected yet"


def test_a_change_of_the_rigging_turns_an_answer_stale_and_the_drop_does_not(tmp_path: Path) -> None:
    path = write(tmp_path, limits=asked)
    answer(path, "lashing.tails")
    write(tmp_path, lambda raw: raw["drop"].update(surface_wind="5 m/s"), asked)
    assert found(path)["lashing.tails"].verdict is Verdict.PASS
    write(tmp_path, lambda raw: raw["lashing"][0].update(count=3), asked)
    step = found(path)["lashing.tails"]
    assert step.verdict is Verdict.OPEN
    assert "STALE" in step.reason
    assert check(path).stale == ("lashing.tails",)


def test_an_answer_that_covers_some_tables_stands_on_them_alone(tmp_path: Path) -> None:
    path = write(tmp_path, limits=asked)
    answer(path, "canopy.bag_ties", second="RB", value="4")
    write(tmp_path, lambda raw: raw["lashing"][0].update(count=3), asked)
    assert found(path)["canopy.bag_ties"].verdict is Verdict.PASS
    write(tmp_path, lambda raw: raw["tie"][0].update(strands=3), asked)
    assert found(path)["canopy.bag_ties"].verdict is Verdict.OPEN


@pytest.mark.parametrize(
    "key", ["load.mass", "lashing.mixed", "tie.bag tie.holds", "device.release.expires", "service.age.A-1"]
)
def test_an_inspection_with_the_key_of_a_computed_step_is_an_error(tmp_path: Path, key: str) -> None:
    with pytest.raises(InputError) as error:
        checklist(tmp_path, limits=lambda raw: raw.update(inspection=[{"key": key, "ask": "?"}]))
    assert len(error.value.problems) == 1


def test_computed_steps_alone_say_so(tmp_path: Path) -> None:
    whole = checklist(tmp_path, limits=asked)
    alone = computed_alone(whole)
    assert alone.verdict is Verdict.PASS
    assert all(one.kind is Kind.COMPUTED for one in alone.findings)
    assert COMPUTED_ALONE in alone.notes


# Parts left out on purpose.


def without(part: str, *tables: str) -> object:
    def edit(raw: Raw) -> None:
        for table in tables:
            raw.pop(table)
        raw["left_out"] = [{"part": part, "why": "grain in bags"}]

    return edit


@pytest.mark.parametrize(
    ("part", "tables", "out", "stays"),
    [
        ("cushion", ("cushion",), "landing.deceleration", "landing.overturn"),
        ("landing", ("cushion",), "landing.overturn", "descent.rate"),
        ("landing.fragility", (), "landing.fragility", "landing.deceleration"),
        ("lashing", ("lashing",), "lashing.mixed", "load.mass"),
        ("link", ("link",), "suspension.link", "suspension.leg"),
        ("leg", ("leg", "suspension"), "suspension.tilt", "suspension.link"),
        ("pack", ("pack",), "service.packs", "device.release.expires"),
        ("tie", (), "tie.bag tie.holds", "load.mass"),
        ("device", (), "device.release.late", "load.mass"),
    ],
)
def test_a_table_a_group_or_a_step_left_out_takes_its_steps_out(
    tmp_path: Path, part: str, tables: tuple[str, ...], out: str, stays: str
) -> None:
    steps = findings(tmp_path, without(part, *tables))  # type: ignore[arg-type]
    assert steps[out].verdict is Verdict.NOT_COUNTED
    assert "grain in bags" in steps[out].reason
    assert (steps[out].value, steps[out].margin) == (None, None)
    assert steps[stays].verdict is Verdict.PASS


def test_the_rest_of_the_rig_can_still_pass(tmp_path: Path) -> None:
    whole: Checklist = checklist(tmp_path, without("cushion", "cushion"))  # type: ignore[arg-type]
    assert whole.verdict is Verdict.PASS


def test_a_part_that_is_nothing_is_an_error_with_the_nearest_name(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="cushion"):
        checklist(tmp_path, without("cusion"))  # type: ignore[arg-type]


def test_a_failing_step_left_out_no_longer_fails(tmp_path: Path) -> None:
    def heavy(raw: Raw) -> None:
        raw["platform"]["weighed"] = "1,200 kg"
        raw["left_out"] = [{"part": "load.mass", "why": "agreed"}, {"part": "load.weighed", "why": "agreed"}]

    assert findings(tmp_path, heavy)["load.mass"].verdict is Verdict.NOT_COUNTED


def test_mistakes_of_rig_and_limit_set_that_physics_finds_come_together(tmp_path: Path) -> None:
    def damp(raw: Raw) -> None:
        raw["drop"]["dew_point"] = "40 °C"

    def unknown(raw: Raw) -> None:
        raw["limits"]["descent.speed"] = {"max": "9 m/s", "source": "rule"}

    with pytest.raises(InputError) as error:
        checklist(tmp_path, damp, unknown)
    assert len(error.value.problems) == 2


def test_losing_all_airspeed_before_the_ramp_is_an_error(tmp_path: Path) -> None:
    from tests.model.checks.sample import extracted

    def stopped(raw: Raw) -> None:
        extracted(raw)
        raw["exit"]["extraction"]["speed_lost"] = "60 m/s"

    with pytest.raises(InputError, match="airspeed"):
        checklist(tmp_path, stopped)


def test_a_limit_set_that_asks_for_no_inspection_says_so(tmp_path: Path) -> None:
    assert NO_INSPECTIONS in checklist(tmp_path).notes
    assert NO_INSPECTIONS not in checklist(tmp_path, limits=asked).notes
