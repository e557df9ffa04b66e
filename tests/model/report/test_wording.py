from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.checks.finding import Finding, Kind, Limit, Verdict
from model.quantity import UnitSystem
from model.report import wording
from tests.model.checks.sample import checklist


def finding(value: float | None, limit: Limit | None, unit: str = "m/s", shown: str | None = "ft/s") -> Finding:
    verdict = Verdict.OPEN if value is None or limit is None else Verdict.PASS if limit.holds(value) else Verdict.FAIL
    margin = limit.margin(value) if limit and value is not None else None
    return Finding("a.b", "title", Kind.COMPUTED, "a", verdict, "", value, unit, limit, margin, shown_in=shown)


def test_value_and_limit_stand_in_the_unit_the_limit_was_written_in() -> None:
    one = finding(8.5, Limit(None, 28.5 * 0.3048, "rule 4", "ft/s"))
    assert wording.value_text(one, UnitSystem.WRITTEN) == "27.89 ft/s"
    assert wording.limit_text(one, UnitSystem.WRITTEN) == "at most 28.5 ft/s"
    assert wording.bound_text(one, UnitSystem.WRITTEN) == "limit at most 28.5 ft/s, rule 4"
    assert wording.value_text(one, UnitSystem.SI) == "8.5 m/s"
    assert wording.limit_text(one, UnitSystem.SI) == "at most 8.687 m/s"


def test_a_lower_bound_and_two_bounds() -> None:
    assert wording.limit_text(finding(3.0, Limit(2.5, None, "x"), "1", None), UnitSystem.SI) == "at least 2.5"
    assert wording.limit_text(finding(0.0, Limit(-0.2, 0.2, "x", "m"), "m", "m"), UnitSystem.SI) == "-0.2 m to 0.2 m"


@given(st.floats(1, 100), st.floats(-1e-6, 1e-6), st.sampled_from(list(UnitSystem)))
def test_shown_numbers_never_contradict_the_verdict(bound: float, off: float, system: UnitSystem) -> None:
    one = finding(bound * (1 + off), Limit(None, bound, "x", "ft/s"))
    value, limit = wording.value_text(one, system), wording.limit_text(one, system).removeprefix("at most ")
    assert value.split()[1:] == limit.split()[1:]
    shown, allowed = (float(text.split()[0].replace(",", "")) for text in (value, limit))
    assert (shown <= allowed) is (one.verdict is Verdict.PASS)


def test_just_over_a_limit_is_never_shown_as_the_limit() -> None:
    one = finding(28.54 * 0.3048, Limit(None, 28.5 * 0.3048, "rule", "ft/s"))
    assert wording.value_text(one, UnitSystem.WRITTEN) == "28.54 ft/s"
    near = finding(28.5000004 * 0.3048, Limit(None, 28.5 * 0.3048, "rule", "ft/s"))
    assert wording.value_text(near, UnitSystem.WRITTEN) != "28.5 ft/s"
    assert wording.margin_text(near).startswith("short by ")
    assert wording.margin_text(near) != "short by 0 %"


@pytest.mark.parametrize(
    ("share", "text"), [(0.123, "12 %"), (0.0345, "3.5 %"), (0.0, "0.0 %"), (-0.5, "50 %"), (12.0, "1,200 %")]
)
def test_per_cent(share: float, text: str) -> None:
    assert wording.percent(share) == text


def test_margins_in_words() -> None:
    assert wording.margin_text(finding(8.0, Limit(None, 10.0, "x"))) == "margin 20 %"
    assert wording.margin_text(finding(12.0, Limit(None, 10.0, "x"))) == "short by 20 %"
    assert wording.margin_text(finding(5.0, Limit(0.0, None, "x"))) == ""


def test_days_and_years_keep_their_units() -> None:
    one = finding(31.0, Limit(None, 120.0, "rule", "d"), "d", "d")
    for system in UnitSystem:
        assert wording.value_text(one, system) == "31 d"
    old = finding(6.5, Limit(None, 12.0, "rule", "yr"), "yr", "yr")
    assert wording.value_text(old, UnitSystem.US) == "6.5 yr"


def test_no_limit_and_no_value() -> None:
    assert wording.bound_text(finding(3.0, None), UnitSystem.SI) == "no limit set"
    assert wording.value_text(finding(None, None), UnitSystem.SI) == ""


def test_counts_add_up(tmp_path: Path) -> None:
    whole = checklist(tmp_path)
    numbers = [int(part.split()[0]) for part in wording.counts_text(whole).split(", ")]
    assert sum(numbers) == len(whole.findings)
