"""Steps of the group extraction: the parachute that draws the load out."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.missing import need
from model.checks.step import Outcome, Step
from model.checks.term import Term, derive, given, known, read, read_count
from model.physics import air, drag, extraction, strength
from model.rig.canopy_table import lookup
from model.rig.rig import Extraction


def _parachute(case: Case) -> Extraction:
    return need(case.exit.extraction, "exit.extraction")


def _field(name: str) -> str:
    return f"exit.extraction.{name}"


def _pressure(case: Case) -> Term:
    speed = read(case.rig.drop.airspeed, "Vi", "indicated airspeed", "drop.airspeed")
    density = known(air.SEA_LEVEL_DENSITY, "rho0", "sea level density", "density", "definition of indicated airspeed")
    return derive(drag.dynamic_pressure, density, speed)


def _coefficient(case: Case, name: str, symbol: str, meaning: str) -> Term:
    """A coefficient of the extraction parachute: its own, else the table's."""
    parachute = _parachute(case)
    own = getattr(parachute, name)
    if own is not None:
        return given(own, symbol, meaning, _field(name))
    kind = need(parachute.type, _field(name))
    figure = need(getattr(lookup(kind), name), f"{_field(name)}: the canopy table has none for {kind}")
    caution = f"table figure, from memory: {meaning} of {kind}, extraction parachute"
    return known(figure.middle, symbol, meaning, "number", f"canopy table, {kind}: {figure.source}", None, caution)


def _pull(case: Case) -> tuple[Term, Term, Term]:
    """Dynamic pressure, drag area of one and count."""
    parachute = _parachute(case)
    diameter = read(parachute.diameter, "D0", "diameter of the extraction parachute", _field("diameter"))
    nominal = derive(drag.circle_area, diameter, of="extraction parachute")
    area = derive(
        drag.drag_area,
        _coefficient(case, "drag_coefficient", "CD0", "drag coefficient"),
        nominal,
        of="extraction parachute",
    )
    count = read_count(parachute.count, "N", "extraction parachutes", _field("count"))
    return _pressure(case), area, count


def _ratio(case: Case) -> Outcome:
    return Outcome(derive(extraction.extraction_ratio, *_pull(case), case.masses.rigged))


def _against(case: Case, name: str, meaning: str) -> Outcome:
    allowed = read(getattr(_parachute(case), name), "S", meaning, _field(name))
    load = derive(
        extraction.extraction_line_load,
        *_pull(case),
        _coefficient(case, "opening_coefficient", "Cx", "opening coefficient"),
    )
    return Outcome(derive(strength.strength_ratio, allowed, load, of=meaning))


def _line(case: Case) -> Outcome:
    return _against(case, "line_strength", "strength of the extraction line")


def _attachment(case: Case) -> Outcome:
    return _against(case, "attachment", "strength of the fitting on the load")


STEPS = (
    Step("extraction.ratio", "Extraction force over weight", "1", _ratio),
    Step("extraction.line", "Extraction line strength over load", "1", _line),
    Step("extraction.attachment", "Extraction fitting strength over load", "1", _attachment),
)
