"""Properties of the whole checklist."""

import copy
import math
import tempfile
import tomllib
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from model.checks.finding import Finding, Verdict
from model.quantity import Dimension, QuantityError, parse, to_unit, unit_names
from model.report.as_json import document, rig_object
from model.rig.errors import InputError
from tests.model.checks.sample import RIG, Raw, checklist, drogue_first, extracted, findings

FEW = settings(max_examples=8, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])


def checked(edit: Callable[[Raw], Any]) -> dict[str, Finding]:
    with tempfile.TemporaryDirectory() as folder:
        return findings(Path(folder), edit)


def value(found: dict[str, Finding], key: str) -> float:
    result = found[key].value
    assert result is not None, found[key].reason
    return result


@FEW
@given(st.floats(300, 3000), st.floats(1.001, 2.0))
def test_a_heavier_load_never_falls_slower(mass: float, factor: float) -> None:
    light = checked(lambda raw: raw["platform"].update(weighed=f"{mass!r} kg"))
    heavy = checked(lambda raw: raw["platform"].update(weighed=f"{mass * factor!r} kg"))
    assert value(heavy, "descent.rate") > value(light, "descent.rate")
    assert value(heavy, "descent.time") < value(light, "descent.time")
    assert value(heavy, "descent.rate") / value(light, "descent.rate") == pytest.approx(math.sqrt(factor), rel=1e-9)


@FEW
@given(st.integers(-400, 5000), st.integers(1, 2000))
def test_a_higher_zone_never_falls_slower(height: int, more: int) -> None:
    low = checked(lambda raw: raw["drop"].update(zone_elevation=f"{height} m"))
    high = checked(lambda raw: raw["drop"].update(zone_elevation=f"{height + more} m"))
    assert value(high, "descent.rate") > value(low, "descent.rate")
    assert value(high, "zone.density_altitude") > value(low, "zone.density_altitude")


@FEW
@given(st.integers(-30, 40), st.integers(1, 20))
def test_a_warmer_zone_never_falls_slower(temperature: int, more: int) -> None:
    cool = checked(lambda raw: raw["drop"].update(zone_temperature=f"{temperature} °C"))
    warm = checked(lambda raw: raw["drop"].update(zone_temperature=f"{temperature + more} °C"))
    assert value(warm, "descent.rate") > value(cool, "descent.rate")


@FEW
@given(st.floats(0.3, 3))
def test_strengths_scale_their_steps_and_nothing_else(factor: float) -> None:
    def stronger(raw: Raw) -> None:
        raw["canopy"][0]["strength"] = f"{150 * factor!r} kN"
        for leg in raw["leg"]:
            leg["strength"] = f"{40 * factor!r} kN"
        for row in raw["lashing"]:
            for key, strength in (("device", 20), ("deck_fitting", 40), ("load_fitting", 30)):
                row[key] = f"{strength * factor!r} kN"

    one, other = checked(lambda raw: None), checked(stronger)
    for key in ("opening.canopy", "suspension.leg", "lashing.forward", "lashing.up"):
        assert value(other, key) / value(one, key) == pytest.approx(factor, rel=1e-9), key
    for key in ("suspension.attachment", "opening.load_factor", "suspension.leg_angle"):
        assert value(other, key) == pytest.approx(value(one, key), rel=1e-12), key


@FEW
@given(st.floats(1.05, 3))
def test_twice_the_wind_halves_the_overturning_factor(factor: float) -> None:
    one, other = checked(lambda raw: None), checked(lambda raw: raw["drop"].update(surface_wind=f"{4 * factor!r} m/s"))
    assert value(one, "landing.overturn") / value(other, "landing.overturn") == pytest.approx(factor, rel=1e-9)


def _quantities(raw: Any) -> Iterator[tuple[Any, Any, str]]:
    """Every quantity text of a raw rig with the table or list it stands in."""
    for key, one in raw.items() if isinstance(raw, dict) else enumerate(raw):
        if isinstance(one, dict | list):
            yield from _quantities(one)
        elif isinstance(one, str) and key not in ("name", "serial", "type", "limits", "kind", "method"):
            yield raw, key, one


def _in_other_units(raw: Raw, choose: Callable[[list[str]], str]) -> None:
    for where, key, text in _quantities(raw):
        for dimension in (Dimension.LENGTH, Dimension.SPEED, Dimension.FORCE, Dimension.AREA, Dimension.PRESSURE,
                          Dimension.ACCELERATION, Dimension.TIME, Dimension.MASS):  # fmt: skip
            try:
                quantity = parse(text, dimension)
            except QuantityError:
                continue
            unit = choose([unit for unit in unit_names(dimension) if unit != "ft in"])
            where[key] = f"{to_unit(quantity.value, unit, dimension)!r} {unit}"
            break


@FEW
@given(st.data())
def test_a_rig_in_other_units_comes_to_the_same(data: st.DataObject) -> None:
    def other(raw: Raw) -> None:
        _in_other_units(raw, lambda units: data.draw(st.sampled_from(units)))

    def same(raw: Raw) -> None:
        raw["drop"]["surface_wind"] = "4 m/s"

    one, changed = checked(same), checked(other)
    assert one.keys() == changed.keys()
    for key, finding in one.items():
        assert changed[key].verdict is finding.verdict, key
        if finding.value is not None:
            assert changed[key].value == pytest.approx(finding.value, rel=1e-9, abs=1e-9), key


def _paths(raw: Any, before: tuple[Any, ...] = ()) -> Iterator[tuple[Any, ...]]:
    """Every key and row of a raw rig that may be missing."""
    for key, one in list(raw.items()) if isinstance(raw, dict) else list(enumerate(raw)):
        path = (*before, key)
        if path not in (("format",), ("rig",), ("rig", "name"), ("drop",), ("drop", "date")):
            yield path
        if isinstance(one, dict) or (isinstance(one, list) and one and isinstance(one[0], dict)):
            yield from _paths(one, path)


def _remove(raw: Any, path: tuple[Any, ...]) -> None:
    for key in path[:-1]:
        raw = raw[key]
    raw.pop(path[-1])


KINDS: dict[str, Callable[[Raw], Any]] = {"gravity": lambda raw: None, "drogue": drogue_first, "extraction": extracted}
REQUIRED = ("name", "role", "type", "count", "row", "serial")


@pytest.fixture(scope="module")
def whole() -> dict[str, dict[str, Finding]]:
    return {name: checked(edit) for name, edit in KINDS.items()}


def _optional() -> list[tuple[str, tuple[Any, ...]]]:
    found = []
    for name, edit in KINDS.items():
        raw = tomllib.loads(RIG)
        edit(raw)
        mine = {"gravity": tuple(raw), "drogue": ("canopy",), "extraction": ("exit",)}[name]
        found += [(name, path) for path in _paths(raw) if path[-1] not in REQUIRED and path[0] in mine]
    return found


OPTIONAL = _optional()
MAY_CHANGE = frozenset({
    "weighed", "depth", "riser_length", "mirror", "load_drag_area", "line_stretch", "surface_wind", "snatch_speed",
    "drag_coefficient", "opening_coefficient", "fill_constant", "growth_exponent", "fragility", "rated_mass",
    "rated_speed", "limits", "line_length",
})  # fmt: skip
"""Fields whose absence has a meaning of its own: an estimate, a table figure, 0, or one limit less."""


@settings(max_examples=40, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.data())
def test_what_passes_without_some_fields_passed_with_the_same_value_before(
    whole: dict[str, dict[str, Finding]], data: st.DataObject
) -> None:
    name = data.draw(st.sampled_from(list(KINDS)))
    mine = [path for kind, path in OPTIONAL if kind == name and not isinstance(path[-1], int)]
    gone = data.draw(st.lists(st.sampled_from(mine), min_size=1, max_size=4, unique=True))
    gone = [path for path in gone if not any(path[: len(other)] == other for other in gone if other != path)]
    changing = any(path[-1] in MAY_CHANGE for path in gone)

    def bare(raw: Raw) -> None:
        KINDS[name](raw)
        for path in gone:
            _remove(raw, path)

    try:
        found = checked(bare)
    except InputError:
        return
    for key, finding in found.items():
        if finding.verdict is not Verdict.PASS or key not in whole[name]:
            continue
        before = whole[name][key]
        assert before.verdict is Verdict.PASS, key
        if not changing:
            assert finding.value == before.value, (key, gone)


@pytest.mark.parametrize(("name", "path"), OPTIONAL, ids=lambda one: ".".join(map(str, one)) if one else "")
def test_any_one_field_or_row_may_be_missing(name: str, path: tuple[Any, ...]) -> None:
    def bare(raw: Raw) -> None:
        KINDS[name](raw)
        _remove(raw, path)

    try:
        found = checked(bare)
    except InputError:
        return
    for key, finding in found.items():
        if finding.verdict is Verdict.OPEN:
            assert finding.reason, key


HOSTILE = ["1e-9", "1e-3", "1", "1,000", "1e6", "1e12"]


@settings(max_examples=40, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(st.data())
def test_no_finite_input_gives_nan_or_a_crash(data: st.DataObject) -> None:
    edit = KINDS[data.draw(st.sampled_from(list(KINDS)))]
    rig = tomllib.loads(RIG)
    edit(rig)
    places = list(_quantities(rig))
    for index in data.draw(st.lists(st.integers(0, len(places) - 1), min_size=1, max_size=3, unique=True)):
        where, key, text = places[index]
        unit = text.split(" ", 1)[1] if " " in text else ""
        where[key] = f"{data.draw(st.sampled_from(HOSTILE))} {unit}".strip()

    def hostile(raw: Raw) -> None:
        raw.clear()
        raw.update(copy.deepcopy(rig))

    with tempfile.TemporaryDirectory() as folder:
        try:
            found = checklist(Path(folder), hostile)
        except InputError:
            return
        assert "NaN" not in document([rig_object(found)])
    for finding in found.findings:
        assert finding.value is None or math.isfinite(finding.value), finding.key
        assert finding.margin is None or math.isfinite(finding.margin), finding.key
