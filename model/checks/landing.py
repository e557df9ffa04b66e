"""Steps of the group landing: cushion, fragility, wind and overturning."""

from __future__ import annotations

from model.checks.balance import smaller_side
from model.checks.case import Case
from model.checks.cushions import CANNOT_STOP
from model.checks.masses import weighted_mean
from model.checks.missing import CannotJudge, Failed, Missing, need, row
from model.checks.step import Outcome, Step
from model.checks.term import LESS, Procedure, Term, combine, derive, known, least, read
from model.physics import overturn, strength
from model.rig.rig import plan_point

NET = "net deceleration; the load feels one g0 more"


def _outcome(case: Case, result: Term, trouble: str, notes: tuple[str, ...] = ()) -> Outcome:
    return Outcome(
        result,
        cautions=case.rates.cautions,
        notes=(NET, *notes),
        fails=trouble,
        measured=case.rates.measured,
        outside=case.cushioning.advice,
    )


def _geometry(case: Case, result: Term) -> Outcome:
    """A step that needs no rate of descent: it stands on its own where there is none."""
    try:
        measured = case.rates.measured
    except (Missing, CannotJudge):
        measured = False
    return Outcome(result, measured=measured)


def _deceleration(case: Case) -> Outcome:
    stacks = case.cushioning
    return _outcome(case, stacks.net, stacks.trouble)


def _fragility(case: Case) -> Outcome:
    stacks = case.cushioning
    items = [(i, item) for i, item in enumerate(case.rig.item) if item.fragility is not None]
    if not items:
        raise Missing("item fragility")
    if stacks.net.value <= 0:
        raise Failed(CANNOT_STOP)
    factors = []
    for i, item in items:
        field = row("item", i, item.name, "fragility")
        fragility = read(item.fragility, "a", f"fragility of {item.name}", field)
        factors.append(derive(strength.fragility_ratio, fragility, stacks.net, of=item.name))
    without = [item.name for item in case.rig.item if item.fragility is None]
    said = (f"not judged, no fragility given: {', '.join(without)}",) if without else ()
    return _outcome(case, least(factors, "k", "least fragility/net deceleration"), stacks.trouble, said)


def _crush_reserve(case: Case) -> Outcome:
    stacks = case.cushioning
    if stacks.net.value <= 0:
        raise Failed(CANNOT_STOP)
    cautions = case.rates.cautions
    return Outcome(stacks.reserve, cautions=cautions, measured=case.rates.measured, outside=stacks.advice)


def _centre(case: Case) -> Outcome:
    """Distance in plan between crush-force centre and the centre of gravity above it."""
    stacks = case.cushioning
    places = []
    for i, one in enumerate(case.rig.cushion):
        field = row("cushion", i, one.name, "at")
        reading = need(one.at, field)
        place = plan_point(case.rig, reading)
        places.append(
            [known(place[k], "xy"[k], f"{'xy'[k]} of {one.name}", "length", field, reading[k].unit) for k in (0, 1)]
        )
    offsets = []
    for axis in (0, 1):
        how = Procedure("sum of crush force x coordinate / sum of crush force", weighted_mean, "statics")
        centre = combine(
            how,
            [*stacks.forces, *(place[axis] for place in places)],
            f"{'xy'[axis]}c",
            f"{'xy'[axis]} of the crush force",
            "length",
        )
        above = case.masses.centre_above(axis, platform=not stacks.under_load)
        offsets.append(
            combine(LESS, [centre, above], f"d{'xy'[axis]}", f"offset in {'xy'[axis]}", "length", places[0][axis].unit)
        )
    how = Procedure("d = hypot(dx, dy)", lambda dx, dy: (dx * dx + dy * dy) ** 0.5, "geometry")
    meaning = "crush-force centre from the centre of gravity above it"
    return _geometry(case, combine(how, offsets, "d", meaning, "length", offsets[0].unit))


def speed_across(case: Case) -> Term:
    """Size of the wind at the ground."""
    winds = case.day.winds()
    if not winds:
        raise Missing("drop.surface_wind")
    how = Procedure("size of the wind at the ground", abs, "definition")
    return combine(how, [winds[0][1]], "vx", "speed across the ground at landing", "speed", winds[0][1].unit)


def _speed_across(case: Case) -> Outcome:
    return _geometry(case, speed_across(case))


def _overturn(case: Case) -> Outcome:
    across = speed_across(case)
    if across.value == 0:
        raise CannotJudge("surface wind 0: give the strongest wind it may be dropped in")
    centre = case.masses.centre_without_canopies(2)
    if centre.value <= 0:
        raise CannotJudge("the centre of gravity is not over the deck: the block of the formula cannot tip")
    base, height = smaller_side(case), case.motions.rigged_height
    rise = derive(overturn.tipping_rise, base, centre)
    inertia = derive(overturn.tipping_inertia, base, centre, height)
    tipping = derive(overturn.tipping_speed, rise, inertia, centre)
    how = Procedure("tipping speed/speed across", lambda tips, moves: tips / moves, "definition")
    return _geometry(case, combine(how, [tipping, across], "k", "tipping speed over speed across", "number"))


STACK = ("cushion",)
STEPS = (
    Step("landing.deceleration", "Net deceleration on the cushion", "g0", _deceleration, tables=STACK),
    Step("landing.fragility", "Fragility over net deceleration", "1", _fragility, tables=STACK),
    Step("landing.crush_reserve", "Usable over needed stroke of the cushion", "1", _crush_reserve, tables=STACK),
    Step("landing.centre", "Cushion centre from the centre of gravity", "m", _centre, tables=STACK),
    Step("landing.speed_across", "Speed across the ground at landing", "m/s", _speed_across),
    Step("landing.overturn", "Tipping speed over speed across", "1", _overturn, tables=("platform",)),
)
