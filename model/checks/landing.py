"""Steps of the group landing: cushion, fragility, wind and overturning."""

from __future__ import annotations

from functools import cached_property

from model.checks.balance import smaller_side
from model.checks.case import Case
from model.checks.descent import measured_cautions, rate_is_measured, vertical_at_touchdown
from model.checks.missing import CannotJudge, Failed, Missing, need, row
from model.checks.step import Outcome, Step
from model.checks.term import LESS, Procedure, Term, combine, derive, known, least, read, read_count, total
from model.physics import cushion, overturn
from model.physics.formula import formula
from model.physics.types import Real
from model.quantity import Quantity
from model.rig.rig import plan_point

CANNOT_STOP = f"the stack cannot stop the load: {cushion.CushionFit.CANNOT_STOP}"
NET = "net deceleration; the load feels one g0 more"


@formula(
    "W = m g0",
    result="W | weight | force",
    symbols={"mass": "m | mass | mass"},
    source="definition",
)
def weight(mass: Real) -> Real:
    """Weight of a mass, N."""
    return mass * 9.80665


class Cushioning:
    """The stacks of a case as terms."""

    def __init__(self, case: Case) -> None:
        self.case = case
        if not case.rig.cushion:
            raise Missing("cushion")

    def _field(self, i: int, name: str) -> str:
        return row("cushion", i, self.case.rig.cushion[i].name, name)

    def _given(self, i: int, name: str, symbol: str, meaning: str) -> Term:
        found: Quantity | None = getattr(self.case.rig.cushion[i], name)
        return read(found, symbol, f"{meaning}, {self.case.rig.cushion[i].name}", self._field(i, name))

    @cached_property
    def under_load(self) -> bool:
        """Whether the stacks lie under the load, on the platform."""
        places = [need(one.lies, self._field(i, "lies")) for i, one in enumerate(self.case.rig.cushion)]
        return places[0] == "under the load"

    @cached_property
    def forces(self) -> tuple[Term, ...]:
        """Crush force of every row."""
        return tuple(
            derive(
                cushion.stack_force,
                self._given(i, "crush_stress", "sigma", "crush stress"),
                self._given(i, "area", "A", "area"),
                of=one.name,
            )
            for i, one in enumerate(self.case.rig.cushion)
        )

    @cached_property
    def force(self) -> Term:
        """Crush force of all rows."""
        return total(self.forces, "P", "crush force of all stacks")

    @cached_property
    def mass(self) -> Term:
        """Mass over the stacks."""
        return self.case.masses.over_stack(platform_under=self.under_load)

    @cached_property
    def weight(self) -> Term:
        """Weight over the stacks."""
        return derive(weight, self.mass, of="over the stack")

    @cached_property
    def net(self) -> Term:
        """Net deceleration in g0."""
        return derive(cushion.net_deceleration, self.force, self.weight, unit="g")

    @cached_property
    def speed(self) -> Term:
        """Speed at landing."""
        return vertical_at_touchdown(self.case)

    @cached_property
    def usable(self) -> Term:
        """Usable stroke of the thinnest row."""
        strokes = []
        for i, one in enumerate(self.case.rig.cushion):
            layers = read_count(one.layers, "n", f"layers, {one.name}", self._field(i, "layers"))
            strokes.append(
                derive(
                    cushion.usable_stroke,
                    layers,
                    self._given(i, "layer_thickness", "t", "layer thickness"),
                    self._given(i, "usable_strain", "eps", "usable strain"),
                    of=one.name,
                )
            )
        return least(strokes, "su", "usable stroke of the thinnest row")

    @cached_property
    def reserve(self) -> Term:
        """Usable over needed stroke."""
        needed = derive(cushion.needed_stroke, self.speed, self.net, unit=self.usable.unit)
        return derive(cushion.crush_reserve, self.usable, needed)

    @property
    def trouble(self) -> str:
        """Why the stack fails whatever its deceleration is; empty where it works."""
        if self.net.value <= 0:
            return CANNOT_STOP
        return f"the stack {self.advice}" if self.reserve.value < 1 else ""

    @property
    def advice(self) -> str:
        """Which way to change the stack, within the limits on deceleration, fragility and reserve."""
        asked = self._bound("landing.crush_reserve") or 1.0
        usable = self.usable.value / max(asked, 1.0)
        found = cushion.advise(self.force.value, self.weight.value, self.speed.value, usable, self._net_limit())
        return "" if found.fit is cushion.CushionFit.FITS else str(found.fit)

    def _bound(self, key: str) -> float | None:
        """The minimum of a limit, or its maximum where it has no minimum."""
        ruling = self.case.rulings.get(key)
        limit = ruling.limit if ruling else None
        return None if limit is None else limit.minimum if limit.minimum is not None else limit.maximum

    def _net_limit(self) -> float | None:
        """The least net deceleration that the limit and every fragility allow, in g0."""
        factor = self._bound("landing.fragility") or 1.0
        allowed = [item.fragility.value / 9.80665 / factor for item in self.case.rig.item if item.fragility]
        most = self._bound("landing.deceleration")
        return min([*allowed, *([most] if most is not None else [])], default=None)


def _outcome(case: Case, result: Term, trouble: str, notes: tuple[str, ...] = ()) -> Outcome:
    return Outcome(
        result,
        cautions=measured_cautions(case.open_at_end),
        notes=(NET, *notes),
        fails=trouble,
        measured=rate_is_measured(case),
        outside=case.cushioning.advice,
    )


def _geometry(case: Case, result: Term) -> Outcome:
    """A step that needs no rate of descent: it stands on its own where there is none."""
    try:
        measured = rate_is_measured(case)
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
        factors.append(derive(fragility_ratio, fragility, stacks.net, of=item.name))
    without = [item.name for item in case.rig.item if item.fragility is None]
    said = (f"not judged, no fragility given: {', '.join(without)}",) if without else ()
    return _outcome(case, least(factors, "k", "least fragility/net deceleration"), stacks.trouble, said)


@formula(
    "k = a/(G g0)",
    result="k | fragility/net deceleration | number",
    symbols={
        "fragility": "a | largest net deceleration allowed | acceleration",
        "net": "G | net deceleration | number",
    },
    source="definition",
)
def fragility_ratio(fragility: Real, net: Real) -> Real:
    """Fragility, m/s2, over the net deceleration in g0."""
    return fragility / (net * 9.80665)


def _crush_reserve(case: Case) -> Outcome:
    stacks = case.cushioning
    if stacks.net.value <= 0:
        raise Failed(CANNOT_STOP)
    cautions = measured_cautions(case.open_at_end)
    return Outcome(stacks.reserve, cautions=cautions, measured=rate_is_measured(case), outside=stacks.advice)


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
        how = Procedure("sum of crush force x coordinate / sum of crush force", _weighted, "statics")
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


def _weighted(*values: float) -> float:
    half = len(values) // 2
    return sum(force * x for force, x in zip(values[:half], values[half:], strict=True)) / sum(values[:half])


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
