"""The lashings of a rig as terms: what they hold in each direction."""

from __future__ import annotations

from functools import lru_cache

from model.checks.missing import Missing, need, row
from model.checks.term import Procedure, Term, combine, given, known, read_count
from model.physics import lashing
from model.physics.lashing import Hold, Mirror
from model.rig.parts import Lashing
from model.rig.rig import Rig, point

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

    def __init__(self, rig: Rig) -> None:
        if not rig.lashing:
            raise Missing("lashing")
        self.rig = rig
        self.inputs: list[Term] = []
        for i, one in enumerate(rig.lashing):
            self._read(i, one)
        self.rows = tuple(
            (need(one.kind, row("lashing", i, one.name, "kind")), one.mirror or "", one.deck_ring or "")
            for i, one in enumerate(rig.lashing)
        )

    def _read(self, i: int, one: Lashing) -> None:
        def field(name: str) -> str:
            return row("lashing", i, one.name, name)

        for name in ("deck", "load"):
            reading = need(getattr(one, name), field(name))
            place = point(self.rig, reading)
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
        for i, one in enumerate(self.rig.lashing):
            device, *fittings = self.inputs[10 * i + 7 : 10 * i + 10]
            weakest = min(fittings, key=lambda term: term.value)
            if weakest.value < device.value:
                part = weakest.meaning.split(",")[0]
                found.append(f"{row('lashing', i, one.name)}: the {part} is weaker than the device and counts")
        found += [f"ring {name}: its lashings pull more than it holds and count for less" for name in held.overloaded]
        names = [one.name for one in self.rig.lashing]
        found += [f"{names[i]} and {names[j]}: {SHARING}" for i, j in held.unnamed_sharing]
        return tuple(dict.fromkeys(found))
