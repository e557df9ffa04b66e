"""How the load hangs: legs, confluence point and tensions as terms."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from functools import cached_property, lru_cache

import numpy as np

from model.checks.forces import Forces
from model.checks.masses import Masses
from model.checks.missing import CannotJudge, Failed, Missing, need, row
from model.checks.term import LESS, Procedure, Term, combine, derive, given, known, read, read_count
from model.physics import hanging, sling, strength
from model.physics.hanging import Hang, Outcome
from model.rig.parts import Leg
from model.rig.rig import Rig, point

BALANCE_TEXT = (
    "sum of t_i d_i = F e; with more than three legs t_i = k_i d_i . delta, k_i = plies x strength/length, "
    "slack legs dropped"
)
BALANCE_SOURCE = "statics; elastic legs on a rigid body"
CAUTIOUS = (
    "holds for a load hanging in line with the pull; at the first peak the canopies pull aft on a level load and the "
    "forward legs carry most, so two legs is the cautious reading"
)


@lru_cache(maxsize=64)
def solve(values: tuple[float, ...], legs: int) -> Hang:
    """The legs' tensions from (x, y, z, strength, plies) of each leg, then apex, centre, pull and its turn."""
    per_leg = np.reshape(values[: 5 * legs], (legs, 5))
    rest = values[5 * legs :]
    apex, centre = np.array(rest[0:3]), np.array(rest[3:6])
    lengths = np.linalg.norm(apex - per_leg[:, :3], axis=1)
    stiffness = per_leg[:, 4] * per_leg[:, 3] / lengths
    return hanging.hang(per_leg[:, :3], apex, centre, stiffness, rest[6], rest[7])


class Hanging:
    """The suspension of a rig."""

    def __init__(self, rig: Rig, masses: Masses, forces: Forces) -> None:
        self.rig, self.masses, self.forces = rig, masses, forces

    @cached_property
    def legs(self) -> tuple[Leg, ...]:
        """The suspension legs; fewer than three leave the steps open."""
        legs = self.rig.leg
        if not legs:
            raise Missing("leg")
        if len(legs) < 3:
            raise CannotJudge(f"{Outcome.TOO_FEW}: {len(legs)} given, three are needed to hold a load in place")
        return legs

    def field(self, i: int, name: str) -> str:
        """A field of a leg as messages name it."""
        return row("leg", i, self.legs[i].name, name)

    def places(self) -> list[tuple[float, float, float]]:
        """Where the legs are attached, in deck coordinates."""
        rig = self.rig
        return [point(rig, need(leg.at, self.field(i, "at"))) for i, leg in enumerate(self.legs)]

    @cached_property
    def apex(self) -> tuple[Term, Term, Term]:
        """The confluence point: given, or solved from the measured leg lengths."""
        suspension = self.rig.suspension
        if suspension is not None and suspension.apex is not None:
            place = point(self.rig, suspension.apex)
            units = [reading.unit for reading in suspension.apex]
            terms = [
                known(place[i], f"{axis}a", f"{axis} of the confluence point", "length", "suspension.apex", units[i])
                for i, axis in enumerate("xyz")
            ]
            # Its height is what a rigger can change; x and y follow the centre of gravity.
            return terms[0], terms[1], replace(terms[2], from_file=True)
        lengths = [
            given(
                need(leg.length, f"suspension.apex, or {self.field(i, 'length')}"),
                f"L{i + 1}",
                f"length of leg {i + 1}",
                self.field(i, "length"),
            )
            for i, leg in enumerate(self.legs)
        ]
        places = self.places()

        def coordinate(axis: int) -> Term:
            def function(*values: float) -> float:
                return float(sling.apex_from_lengths(places, values).point[axis])

            how = Procedure("point at the measured lengths from the attachments, least squares", function, "geometry")
            return combine(how, lengths, f"{'xyz'[axis]}a", f"{'xyz'[axis]} of the confluence point", "length")

        return coordinate(0), coordinate(1), coordinate(2)

    def place(self, i: int) -> list[Term]:
        """Where a leg is attached, in deck coordinates."""
        leg = self.legs[i]
        reading = need(leg.at, self.field(i, "at"))
        place = point(self.rig, reading)
        return [
            known(
                place[k],
                f"{axis}{i + 1}",
                f"{axis} of leg {i + 1} ({leg.name})",
                "length",
                self.field(i, "at"),
                reading[k].unit,
            )
            for k, axis in enumerate("xyz")
        ]

    def _inputs(self, force: Term) -> list[Term]:
        inputs: list[Term] = []
        for i, leg in enumerate(self.legs):
            inputs += self.place(i)
            inputs.append(read(leg.strength, "S", f"strength of one ply, leg {i + 1}", self.field(i, "strength")))
            inputs.append(self.plies(i))
        inputs += self.apex
        inputs += [self.masses.centre_without_canopies(axis) for axis in range(3)]
        return [*inputs, force, self.turn]

    def plies(self, i: int) -> Term:
        """Thicknesses of a leg's web."""
        field = self.field(i, "plies")
        return read_count(self.legs[i].plies, "n", f"plies of leg {i + 1}", field)

    @cached_property
    def turn(self) -> Term:
        """How far the pull is turned off its axis."""
        suspension = self.rig.suspension
        if suspension is None or suspension.pull_off_axis is None:
            return known(0.0, "beta", "pull off its axis", "angle", "none given: 0", "deg")
        return given(suspension.pull_off_axis, "beta", "pull off its axis", "suspension.pull_off_axis")

    def _hang(self, inputs: list[Term]) -> Hang:
        return solve(tuple(term.value for term in inputs), len(self.legs))

    @cached_property
    def carrying(self) -> Term:
        """How many legs are taken to share the load."""
        suspension = self.rig.suspension
        field = "suspension.legs_carrying"
        return read_count(suspension.legs_carrying if suspension else None, "c", "legs carrying", field)

    @cached_property
    def loads(self) -> tuple[Term, ...]:
        """Load of every leg at the largest opening force, as few legs carrying as the rig says."""
        inputs = self._inputs(self.forces.opening)
        hung = self._hang(inputs)
        if hung.outcome is not Outcome.BALANCED:
            raise Failed(f"{hung.outcome}: the pull {hung.worst.name} cannot be held")
        legs = known(len(self.legs), "N", "legs", "number", "rows of [[leg]]")
        found = []
        for i, leg in enumerate(self.legs):
            how = Procedure(
                BALANCE_TEXT,
                lambda *values, i=i: float(solve(tuple(values), len(self.legs)).loads[i]),
                BALANCE_SOURCE,
                "the worst of the pull in line and turned off its axis",
            )
            unit = leg.strength.unit if leg.strength else None
            tension = combine(how, inputs, f"t{i + 1}", f"tension of leg {i + 1} ({leg.name})", "force", unit)
            found.append(
                derive(
                    sling.carrying_load,
                    tension,
                    legs,
                    self.carrying,
                    of=f"leg {i + 1} ({leg.name})",
                    symbol=f"T{i + 1}",
                )
            )
        return tuple(found)

    def strength(self, i: int) -> Term:
        """Strength of a leg: web, plies and its worst joint."""
        leg = self.legs[i]
        each = read(leg.strength, "S", f"strength of one ply, leg {i + 1}", self.field(i, "strength"))
        joint = read(leg.joint_efficiency, "eta", f"joint efficiency, leg {i + 1}", self.field(i, "joint_efficiency"))
        return derive(strength.leg_strength, each, self.plies(i), joint, of=f"leg {i + 1} ({leg.name})")

    def _away(self, start: Sequence[Term], name: str) -> list[Term]:
        """The confluence point less another, axis by axis."""
        return [
            combine(LESS, [end, begin], axis, f"{axis} from {name} to the confluence point", "length", end.unit)
            for axis, end, begin in zip("xyz", self.apex, start, strict=True)
        ]

    def angles(self) -> list[Term]:
        """Angle of every leg over the deck plane."""
        found = []
        for i, leg in enumerate(self.legs):
            name = f"leg {i + 1} ({leg.name})"
            away = self._away(self.place(i), name)
            length = derive(sling.leg_length, *away, of=name)
            found.append(derive(sling.leg_angle, away[2], length, of=name, symbol=f"b{i + 1}", unit="deg"))
        return found

    def tilt(self) -> Term:
        """Tilt of the pull's axis, from the centre of gravity to the confluence point."""
        _ = self.legs
        centre = [self.masses.centre_without_canopies(axis) for axis in range(3)]
        away = self._away(centre, "the centre of gravity")
        if away[2].value <= 0:
            raise Failed(str(Outcome.NOT_ABOVE))
        return derive(sling.axis_tilt, *away, unit="deg")
