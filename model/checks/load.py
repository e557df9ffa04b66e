"""Steps of the group load: masses and outer sizes."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.missing import Missing
from model.checks.step import Outcome, Row, Step, own_limit
from model.checks.term import SAME, Term, combine, derive, given, known, read, total
from model.physics import balance


def _mass(case: Case) -> Outcome:
    return Outcome(case.masses.rigged)


def _weighed(case: Case) -> Outcome:
    weighed = case.masses.weighed
    if weighed is None:
        raise Missing("platform.weighed")
    return Outcome(derive(balance.weighed_misfit, weighed, case.masses.parts))


def side(case: Case, name: str) -> Term:
    """A side of the platform."""
    size = getattr(case.platform, name)
    return read(size, name[0], f"{name} of the platform", f"platform.{name}")


def _base_loading(case: Case) -> Outcome:
    pressure = derive(balance.base_loading, case.masses.rigged, side(case, "length"), side(case, "width"))
    return Outcome(pressure)


def _height(case: Case) -> Outcome:
    return Outcome(case.motions.rigged_height)


def _width(case: Case) -> Outcome:
    overall = case.platform.overall_width
    if overall is not None:
        term = given(overall, "b", "overall width", "platform.overall_width")
        return Outcome(combine(SAME, [term], "b", "rigged width", "length", term.unit))
    width = side(case, "width")
    return Outcome(combine(SAME, [width], "b", "rigged width: no overall width given", "length", width.unit))


def overhang(case: Case, end: str) -> Term:
    """How far the load stands out in front or behind; 0 where nothing is given."""
    found = getattr(case.platform, f"overhang_{end}")
    if found is None:
        return known(0.0, end[0], f"overhang {end}", "length", "none given: 0", side(case, "length").unit)
    return given(found, end[0], f"overhang {end}", f"platform.overhang_{end}")


def _length(case: Case) -> Outcome:
    length = side(case, "length")
    return Outcome(
        derive(balance.rigged_length, length, overhang(case, "front"), overhang(case, "rear"), unit=length.unit)
    )


def _per_canopy(case: Case) -> Outcome:
    """The load of each main canopy, against every row's own rating and the limit set."""
    mains = [one for one in case.rows if one.row.role == "main"]
    if not mains:
        raise Missing("canopy with role main")
    counts = [one.count for one in mains]
    count = counts[0] if len(counts) == 1 else total(counts, "N", "main canopies")
    each = derive(balance.mass_per_canopy, case.masses.suspended, count, unit=case.masses.suspended.unit)
    rows = []
    for one in mains:
        limits = (own_limit("kg", *one.row.rated_mass),) if one.row.rated_mass is not None else ()
        rows.append(Row(each, limits, one.field("rated_mass")))
    return Outcome(each, rows=tuple(rows))


STEPS = (
    Step("load.mass", "Rigged mass", "kg", _mass),
    Step("load.weighed", "Scale against the sum of the parts", "1", _weighed),
    Step("load.base_loading", "Base loading", "Pa", _base_loading, tables=("platform",)),
    Step("load.height", "Rigged height", "m", _height, tables=("platform",)),
    Step("load.width", "Rigged width", "m", _width, tables=("platform",)),
    Step("load.length", "Rigged length", "m", _length, tables=("platform",)),
    Step("load.suspended_per_canopy", "Suspended mass on each main canopy", "kg", _per_canopy, tables=("canopy",)),
)
