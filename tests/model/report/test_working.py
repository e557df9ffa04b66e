from pathlib import Path

from model.checks.finding import Finding
from model.quantity import UnitSystem
from model.report.working import working, working_text
from tests.model.checks.sample import checklist, findings
from tests.model.checks.test_inspected import asked


def step(folder: Path, key: str) -> Finding:
    return next(one for one in checklist(folder, limits=asked).findings if one.key == key)


def test_a_formula_is_shown_with_its_numbers_and_its_source(tmp_path: Path) -> None:
    last = working(step(tmp_path, "load.base_loading"), UnitSystem.WRITTEN)[-1]
    assert last.formula == "w = M g0/(l b)"
    for number in ("900 kg", "2 m", "1 m", "9.807 m/s2"):
        assert number in last.numbers
    assert last.value.endswith("Pa")


def test_a_given_line_says_its_field(tmp_path: Path) -> None:
    lines = working(step(tmp_path, "load.base_loading"), UnitSystem.WRITTEN)
    assert {line.origin for line in lines if line.origin} == {"platform.weighed", "platform.length", "platform.width"}


def test_one_line_a_term_even_where_it_is_used_twice(tmp_path: Path) -> None:
    lines = working(step(tmp_path, "suspension.leg"), UnitSystem.WRITTEN)
    assert len({id(line.term) for line in lines}) == len(lines)


def test_both_rules_and_the_ratios_are_shown(tmp_path: Path) -> None:
    text = "\n".join(working_text(step(tmp_path, "opening.load_factor"), UnitSystem.WRITTEN))
    assert "time rule" in text
    assert "distance rule" in text
    assert "path flown while filling" in text
    assert "not checked against a measured cargo drop" in text


def test_the_swing_has_its_own_line(tmp_path: Path) -> None:
    lines = working(step(tmp_path, "height.reserve"), UnitSystem.WRITTEN)
    assert any("cos" in line.formula and "swing" in line.meaning for line in lines)


def test_an_estimate_of_the_speed_lost_says_it_is_none(tmp_path: Path) -> None:
    from tests.model.checks.sample import extracted

    result = findings(tmp_path, extracted)["opening.load_factor"]
    assert any("none given: 0" in line.origin for line in working(result, UnitSystem.WRITTEN))


def test_hanging_says_where_it_holds(tmp_path: Path) -> None:
    text = "\n".join(working_text(step(tmp_path, "suspension.leg"), UnitSystem.WRITTEN))
    assert "in line with the pull" in text
    assert "cautious" in text


def test_an_inspected_step_has_none(tmp_path: Path) -> None:
    assert working_text(step(tmp_path, "lashing.tails"), UnitSystem.WRITTEN) == []


def test_units_are_chosen(tmp_path: Path) -> None:
    lines = working(step(tmp_path, "load.base_loading"), UnitSystem.US)
    assert lines[-1].value.split()[-1] in ("psf", "psi", "lb/ft2")
    assert any(line.value.endswith(" lb") for line in lines)
