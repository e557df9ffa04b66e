"""Steps of the group lashing: what holds the load to the platform, in five directions."""

from __future__ import annotations

from collections.abc import Callable
from functools import lru_cache

from model.checks.case import Case
from model.checks.missing import CannotJudge, Failed, Missing, need, row
from model.checks.step import Outcome, Step
from model.checks.term import Procedure, Term, combine, derive, given, known, read_count
from model.physics import lashing
from model.physics.lashing import Hold, Mirror
from model.rig.parts import Lashing
from model.rig.rig import point

HELD_TEXT = (
    "sum of the pull components against the direction; a pull is count x min(device, deck fitting, load fitting) from "
    "load point to deck point, a shared ring scales its pulls"
)
SHARING = "lashings share a deck point without naming one ring: give them a deck_ring"


@lru_cache(maxsize=64)
def hold(rows: tuple[tuple[str, Mirror, str], ...], values: tuple[float, ...]) -> Hold:
    """What the lashings hold; ``values`` are (deck, load, count, device, deck fitting, load fitting) of each."""
    made = []
    for k, (kind, mirror, ring) in enumerate(rows):
        one = values[10 * k : 10 * k + 10]
        made.append(
            lashing.Row(
                deck=(one[0], one[1], one[2]),
                load=(one[3], one[4], one[5]),
                count=int(one[6]),
                device=one[7],
                deck_fitting=one[8],
                load_fitting=one[9],
                kind=kind,
                mirror=mirror,
                ring=ring,
            )
        )
    return lashing.hold(made)


class Lashings:
    """The lashings of a case as terms."""

    def __init__(self, case: Case) -> None:
        if not case.rig.lashing:
            raise Missing("lashing")
        self.case = case
        self.inputs: list[Term] = []
        for i, one in enumerate(case.rig.lashing):
            self._read(i, one)
        self.rows = tuple(
            (need(one.kind, row("lashing", i, one.name, "kind")), one.mirror or "", one.deck_ring or "")
            for i, one in enumerate(case.rig.lashing)
        )

    def _read(self, i: int, one: Lashing) -> None:
        def field(name: str) -> str:
            return row("lashing", i, one.name, name)

        for name in ("deck", "load"):
            reading = need(getattr(one, name), field(name))
            place = point(self.case.rig, reading)
            self.inputs += [
                known(place[k], axis, f"{axis} of the {name} point, {one.name}", "length", field(name), reading[k].unit)
                for k, axis in enumerate("xyz")
            ]
        self.inputs.append(read_count(one.count, "n", f"count, {one.name}", field("count")))
        for name in ("device", "deck_fitting", "load_fitting"):
            strength = need(getattr(one, name), field(name))
            self.inputs.append(given(strength, name[0].upper(), f"{name.replace('_', ' ')}, {one.name}", field(name)))

    def hold(self) -> Hold:
        """What they hold."""
        return hold(self.rows, tuple(term.value for term in self.inputs))

    def held(self, direction: str) -> Term:
        """What they hold against one direction."""
        how = Procedure(HELD_TEXT, lambda *values: float(hold(self.rows, values).held[direction]), "statics")
        unit = self.inputs[7].unit
        return combine(how, self.inputs, "R", f"held against {direction}", "force", unit)

    def cautions(self) -> tuple[str, ...]:
        """Rows whose weakest part is a fitting, shared rings and deck points shared without a ring."""
        held = self.hold()
        found = []
        for i, one in enumerate(self.case.rig.lashing):
            device, *fittings = self.inputs[10 * i + 7 : 10 * i + 10]
            weakest = min(fittings, key=lambda term: term.value)
            if weakest.value < device.value:
                part = weakest.meaning.split(",")[0]
                found.append(f"{row('lashing', i, one.name)}: the {part} is weaker than the device and counts")
        found += [f"ring {name}: its lashings pull more than it holds and count for less" for name in held.overloaded]
        names = [one.name for one in self.case.rig.lashing]
        found += [f"{names[i]} and {names[j]}: {SHARING}" for i, j in held.unnamed_sharing]
        return tuple(dict.fromkeys(found))


def _direction(direction: str) -> Callable[[Case], Outcome]:
    def compute(case: Case) -> Outcome:
        lashings = case.lashings
        restraint = case.limits.restraint if case.limits else None
        if restraint is None:
            raise CannotJudge("no limit set: the limit set has no [restraint]")
        factor = need(getattr(restraint, direction), f"restraint.{direction}")
        origin = f"limit set, restraint.{direction}, {restraint.source}"
        term = known(factor.value, "a", f"restraint factor {direction}", "number", origin)
        if term.value == 0:
            raise CannotJudge(f"restraint.{direction} is 0: nothing is asked for")
        needed_mass = case.masses.lashed
        result = derive(lashing.restraint_ratio, lashings.held(direction), term, _weight(needed_mass))
        return Outcome(result, cautions=lashings.cautions())

    return compute


def _weight(mass: Term) -> Term:
    from model.checks.landing import weight

    return derive(weight, mass, of="lashed")


def _mixed(case: Case) -> Outcome:
    held = case.lashings.hold()
    if held.mixed:
        raise Failed(
            f"straps and chains share a direction: {', '.join(held.mixed)}; the stiffer chain takes the load first"
        )
    count = known(0.0, "n", "directions shared by straps and chains", "number", "lashing rows")
    return Outcome(count, passes="no direction is shared by straps and chains")


STEPS = (
    *(
        Step(
            f"lashing.{direction}",
            f"Held against {direction} over what is asked for",
            "1",
            _direction(direction),
            tables=("lashing",),
        )
        for direction in ("forward", "aft", "left", "right", "up")
    ),
    Step("lashing.mixed", "Straps and chains apart", None, _mixed, tables=("lashing",)),
)
