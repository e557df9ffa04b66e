"""Masses and the centre of gravity of a rig, as terms."""

from __future__ import annotations

from functools import cached_property

from model.checks.missing import CannotJudge, Missing, need, row
from model.checks.term import LESS, SAME, Procedure, Term, combine, given, known, read, total
from model.quantity import Quantity
from model.rig.rig import Rig, along, plan_point

SCALED = Procedure("count x mass of each", lambda mass, count: mass * count, "definition")
MOMENTS = "sum of mass x coordinate / sum of mass"


def weighted_mean(*values: float) -> float:
    """Mean of the second half of some numbers, weighted by the first: a coordinate of a centre."""
    half = len(values) // 2
    weights, places = values[:half], values[half:]
    return sum(w * x for w, x in zip(weights, places, strict=True)) / sum(weights)


def _centre_without(*values: float) -> float:
    mass, place, *rest = values
    half = len(rest) // 2
    gone, places = rest[:half], rest[half:]
    return (mass * place - sum(m * x for m, x in zip(gone, places, strict=True))) / (mass - sum(gone))


CENTRE = Procedure(MOMENTS, weighted_mean, "statics")
CENTRE_WITHOUT = Procedure(
    "(mass x coordinate - sum of part mass x its coordinate) / (mass - sum of part masses)", _centre_without, "statics"
)
AXES = ("x", "y", "z")
Place = tuple[Quantity, Quantity, Quantity]


def _over_0(mass: Term, otherwise: str) -> Term:
    if mass.value <= 0:
        raise CannotJudge(f"{otherwise}: check the masses")
    return mass


class Masses:
    """What the parts of a rig weigh and where they lie. Every property raises `Missing` where a field is absent."""

    def __init__(self, rig: Rig) -> None:
        self.rig = rig
        self.left_out = {entry.part for entry in rig.left_out}
        self._bare_centre: dict[int, Term] = {}

    @cached_property
    def platform(self) -> Term | None:
        """Mass of the platform; None where it is left out on purpose and no mass is given."""
        platform = self.rig.platform
        if "platform" in self.left_out and (platform is None or platform.mass is None):
            return None
        platform = need(platform, "platform")
        return read(platform.mass, "m", "mass of the platform", "platform.mass")

    @cached_property
    def items(self) -> tuple[Term, ...]:
        """Mass of each item."""
        if not self.rig.item and "item" not in self.left_out:
            raise Missing("item")
        found = []
        for i, item in enumerate(self.rig.item):
            field = row("item", i, item.name, "mass")
            found.append(read(item.mass, f"m{i + 1}", f"mass of {item.name}", field))
        return tuple(found)

    @cached_property
    def canopies(self) -> tuple[Term, ...]:
        """Mass of all canopies of each row."""
        if not self.rig.canopy and "canopy" not in self.left_out:
            raise Missing("canopy")
        found = []
        for i, one in enumerate(self.rig.canopy):
            field = row("canopy row", i, one.role, "mass")
            each = read(one.mass, f"mc{i + 1}", f"mass of one canopy of row {i + 1}", field)
            if one.count == 1:
                found.append(each)
            else:
                count = known(one.count, "N", "canopies of the row", "number", row("canopy row", i, one.role, "count"))
                found.append(
                    combine(
                        SCALED, [each, count], f"mc{i + 1}", f"mass of the canopies of row {i + 1}", "mass", each.unit
                    )
                )
        return tuple(found)

    @cached_property
    def extraction(self) -> Term | None:
        """Mass of the extraction parachutes; None where there are none."""
        leaving = self.rig.exit
        if (leaving is None or leaving.extraction is None) and self.left_out & {"exit", "extraction"}:
            return None
        leaving = need(leaving, "exit")
        if need(leaving.method, "exit.method") != "extraction":
            return None
        mass = need(need(leaving.extraction, "exit.extraction").mass, "exit.extraction.mass")
        return given(mass, "me", "mass of the extraction parachutes", "exit.extraction.mass")

    @cached_property
    def parts(self) -> Term:
        """Sum of all parts."""
        terms = [self.platform, *self.items, *self.canopies, self.extraction]
        return total([term for term in terms if term], "Ms", "sum of the parts")

    @cached_property
    def weighed(self) -> Term | None:
        """The scale's reading, if any."""
        weighed = self.rig.platform.weighed if self.rig.platform else None
        return given(weighed, "M", "rigged mass, weighed", "platform.weighed") if weighed else None

    @cached_property
    def rigged(self) -> Term:
        """Rigged mass M: the scale's reading where there is one, else the sum of the parts."""
        if self.weighed:
            return self.weighed
        parts = self.parts
        return combine(SAME, [parts], "M", "rigged mass: nothing weighed, so the sum of the parts", "mass", parts.unit)

    @cached_property
    def falling(self) -> Term:
        """Falling mass m: M less an extraction parachute that does not stay."""
        rigged = self.rigged
        extraction = self.rig.exit.extraction if self.rig.exit else None
        if self.extraction is None or extraction is None or need(extraction.stays, "exit.extraction.stays"):
            return combine(SAME, [rigged], "m", "falling mass", "mass", rigged.unit)
        falling = combine(LESS, [rigged, self.extraction], "m", "falling mass", "mass", rigged.unit)
        return _over_0(falling, "the extraction parachute weighs as much as everything rigged")

    @cached_property
    def suspended(self) -> Term:
        """Suspended mass m_s: the falling mass less the canopies."""
        falling = self.falling
        suspended = combine(LESS, [falling, *self.canopies], "ms", "suspended mass", "mass", falling.unit)
        return _over_0(suspended, "the canopies weigh as much as everything that falls")

    @cached_property
    def lashed(self) -> Term:
        """Mass that the lashings hold: all but platform and extraction parachutes."""
        away = [term for term in (self.platform, self.extraction) if term is not None]
        lashed = combine(LESS, [self.rigged, *away], "m", "mass lashed", "mass", self.rigged.unit)
        return _over_0(lashed, "the platform weighs as much as everything rigged")

    def over_stack(self, *, platform_under: bool) -> Term:
        """Mass that comes down on a stack: suspended, less the platform where that lies under it."""
        suspended = self.suspended
        if not platform_under or self.platform is None:
            return combine(SAME, [suspended], "m", "mass over the stack", "mass", suspended.unit)
        meaning = "mass over the stack: the platform lies under it"
        over = combine(LESS, [suspended, self.platform], "m", meaning, "mass", suspended.unit)
        return _over_0(over, "the platform weighs as much as everything suspended")

    def _place(self, axis: int, point: Place | None, field: str, name: str) -> Term:
        reading = need(point, field)[axis]
        place = along(self.rig, reading) if axis == 0 else reading.value
        return known(place, AXES[axis], f"{AXES[axis]} of {name}", "length", field, reading.unit)

    def _platform_place(self, axis: int) -> Term:
        platform = need(self.rig.platform, "platform")
        return self._place(axis, platform.centre, "platform.centre", "the platform")

    def _places(self, axis: int, *, canopies: bool) -> tuple[list[Term], list[Term]]:
        """Masses and one coordinate of platform, items and (or only) canopies."""
        masses: list[Term] = []
        places: list[Term] = []

        def put(mass: Term, point: Place | None, field: str, name: str) -> None:
            masses.append(mass)
            places.append(self._place(axis, point, field, name))

        if not canopies:
            if self.platform is not None:
                masses.append(self.platform)
                places.append(self._platform_place(axis))
            for i, (item, mass) in enumerate(zip(self.rig.item, self.items, strict=True)):
                put(mass, item.centre, row("item", i, item.name, "centre"), item.name)
        else:
            for i, (one, mass) in enumerate(zip(self.rig.canopy, self.canopies, strict=True)):
                put(mass, one.centre, row("canopy row", i, one.role, "centre"), f"canopy row {i + 1}")
        return masses, places

    @property
    def balanced(self) -> bool:
        """Whether a measured balance point stands in place of the sum."""
        return self.rig.platform is not None and self.rig.platform.balanced_at is not None

    @cached_property
    def in_place(self) -> Term:
        """Sum of the parts that have a place in the rig file: platform, items and canopies."""
        terms = [*([self.platform] if self.platform else []), *self.items, *self.canopies]
        return total(terms, "Mp", "parts in place")

    def centre(self, axis: int) -> Term:
        """One coordinate of the centre of gravity of platform, items and canopies."""
        balanced = self.rig.platform.balanced_at if self.rig.platform else None
        name = f"{AXES[axis]}G"
        if balanced is not None and axis < 2:
            place = plan_point(self.rig, balanced)[axis]
            return known(place, name, "measured balance point", "length", "platform.balanced_at", balanced[axis].unit)
        masses, places = self._places(axis, canopies=False)
        more, further = self._places(axis, canopies=True)
        return combine(CENTRE, [*masses, *more, *places, *further], name, "centre of gravity, canopies in", "length")

    def centre_above(self, axis: int, *, platform: bool) -> Term:
        """One coordinate of the centre of gravity over a stack: without canopies, with or without the platform."""
        if platform or self.platform is None:
            return self.centre_without_canopies(axis)
        if self.balanced and axis < 2:
            under = self._platform_place(axis)
            masses, places = self._places(axis, canopies=True)
            terms = [self.in_place, self.centre(axis), self.platform, *masses, under, *places]
            return combine(CENTRE_WITHOUT, terms, f"{AXES[axis]}g", "centre of gravity of the items", "length")
        masses, places = self._places(axis, canopies=False)
        masses, places = masses[1:], places[1:]
        return combine(CENTRE, [*masses, *places], f"{AXES[axis]}g", "centre of gravity of the items", "length")

    def centre_without_canopies(self, axis: int) -> Term:
        """One coordinate of the centre of gravity of platform and items alone."""
        if axis not in self._bare_centre:
            self._bare_centre[axis] = self._centre_without_canopies(axis)
        return self._bare_centre[axis]

    def _centre_without_canopies(self, axis: int) -> Term:
        name = f"{AXES[axis]}g"
        if self.balanced and axis < 2:
            masses, places = self._places(axis, canopies=True)
            terms = [self.in_place, self.centre(axis), *masses, *places]
            return combine(CENTRE_WITHOUT, terms, name, "centre of gravity without canopies", "length")
        masses, places = self._places(axis, canopies=False)
        return combine(CENTRE, [*masses, *places], name, "centre of gravity without canopies", "length")
