"""Opening forces of the motion and the measured figures that replace them."""

from __future__ import annotations

from collections.abc import Iterator
from functools import cached_property

from model.checks.masses import Masses
from model.checks.missing import CannotJudge, Failed, Missing
from model.checks.motion import Motions
from model.checks.rows import NEAR, CanopyRow
from model.checks.term import Term, given, largest
from model.physics import canopy

LANDS_FIRST = "lands before it is open"
RATIO_PATH, RATIO_SPEED = 0.45, 1.1
OUTSIDE = "filling estimate outside its range: use a measured filling time or force"
NOT_CHECKED = (
    "handbook fill constant, growth exponent and opening coefficient: not checked against a measured cargo drop"
)


class Forces:
    """What the canopies pull with, largest over the filling rules."""

    def __init__(self, motions: Motions, masses: Masses) -> None:
        self.motions, self.masses = motions, masses

    def must_open(self) -> None:
        """Raise `Failed` where the load lands before its last filling ends."""
        if self.motions.landed_early():
            raise Failed(LANDS_FIRST)

    def for_geometry(self) -> tuple[str, bool]:
        """For a step that needs no force: why it fails all the same, and whether forces rest on measured figures.

        Where the motion cannot be flown such a step stands on its own.
        """
        try:
            return (LANDS_FIRST if self.motions.landed_early() else ""), self.measured_all()
        except (Missing, CannotJudge):
            return "", False

    def measured(self, one: CanopyRow) -> Term | None:
        """The measured opening force of a row where it stands and is near this mass and speed."""
        figures = one.row.measured
        if figures is None or figures.opening_force is None:
            return None
        mass, speed = figures.opening_force_mass, figures.opening_force_speed
        if mass is None or speed is None:
            return None
        flown = float(self.motions.motion("time").line_stretch_equivalent_speed[one.index, 0])
        near_mass = abs(self.masses.falling.value - mass.value) <= NEAR * mass.value
        near_speed = abs(flown - speed.value) <= NEAR * speed.value
        if not (near_mass and near_speed):
            return None
        origin = f"{one.field('measured.opening_force')}, measured: {figures.source}"
        return given(figures.opening_force, "Fr", f"measured opening force, {one.name}", origin)

    def unused(self) -> tuple[str, ...]:
        """Cautions for measured figures that stand but are not used."""
        found = []
        for one in self.motions.rows:
            if one.unused_rate:
                found.append(one.unused_rate)
            figures = one.row.measured
            if figures is not None and figures.opening_force is not None and self.measured(one) is None:
                found.append(
                    f"{one.name}: measured force not used, its mass or speed is more than 10 % from this one's"
                )
        return tuple(found)

    @cached_property
    def opening(self) -> Term:
        """F, the largest opening force over all fillings, all canopies, Cx in."""
        self.must_open()
        candidates: list[Term] = []
        number = 0
        for one in self.motions.rows:
            measured = self.measured(one)
            if measured is not None:
                candidates.append(measured)
            for filling in one.fillings:
                if measured is None:
                    candidates += self._filling(one, number, filling.number)
                number += 1
        return largest(candidates, "F", "largest opening force")

    def _filling(self, one: CanopyRow, number: int, stage: int) -> list[Term]:
        name = f"opening force, {one.name}" + (f", filling {stage + 1}" if len(one.fillings) > 1 else "")
        unit = one.row.strength.unit if one.row.strength else None
        return self.motions.both(lambda motion: motion.opening_force[number, 0], f"F{number + 1}", name, "force", unit)

    def of_row(self, one: CanopyRow) -> Term:
        """Largest force of one row's own area, its Cx while it fills."""
        self.must_open()
        measured = self.measured(one)
        if measured is not None:
            return measured
        unit = one.row.strength.unit if one.row.strength else None
        both = self.motions.both(
            lambda motion: motion.row_force[one.index, 0], "Fr", f"largest force of {one.name}", "force", unit
        )
        return largest(both, "Fr", f"largest force of {one.name}")

    def plain(self) -> Term:
        """The same as `opening` without the opening coefficient; for the working."""
        fillings = range(sum(len(one.fillings) for one in self.motions.rows))
        both = [term for number in fillings for term in self._plain_filling(number)]
        return largest(both, "f", "largest force without the opening coefficient")

    def _plain_filling(self, number: int) -> list[Term]:
        name = f"filling {number + 1} without Cx"
        return self.motions.both(lambda motion: motion.opening_force_plain[number, 0], f"f{number + 1}", name, "force")

    def measured_all(self) -> bool:
        """Whether forces rest on measured figures: a force for every row, or a time for every filling."""
        return all(one.every_time_measured or self.measured(one) is not None for one in self.motions.rows)

    @cached_property
    def ratios(self) -> tuple[tuple[str, float, float], ...]:
        """For each estimated filling of the time rule: its name, path flown/L, largest speed/speed at its start."""
        motion = self.motions.motion("time")
        found, number = [], 0
        for one in self.motions.rows:
            for filling in one.fillings:
                if filling.measured_time is None and bool(motion.started[number, 0]):
                    name = one.name + (f", filling {filling.number + 1}" if len(one.fillings) > 1 else "")
                    path = float(motion.fill_path[number, 0]) / filling.distance.value
                    found.append((name, path, float(motion.speed_ratio[number, 0])))
                number += 1
        return tuple(found)

    @cached_property
    def cautions(self) -> tuple[str, ...]:
        """What must be said beside every number that rests on a filling estimate."""
        found = [f"{OUTSIDE} ({name})" for name, path, speed in self.ratios if path < RATIO_PATH or speed > RATIO_SPEED]
        motions = [self.motions.motion(rule) for rule in self.motions.rules]
        number = 0
        for one in self.motions.rows:
            if not one.every_time_measured and self.measured(one) is None and not self._in_class(one):
                found.append(
                    f"{one.name}: outside the class of the handbook figures (solid cloth, 28 to 100 ft, "
                    "0.5 to 2 lb/ft2, not made to open fast): real forces may be over twice the estimate"
                )
            for filling in one.fillings:
                name = f"{one.name}: filling {filling.number + 1}"
                cut = [m for m in motions if bool(m.started[number, 0]) and not bool(m.full[number, 0])]
                if cut:
                    share = min(float(m.reached[number, 0]) for m in cut)
                    found.append(f"{name} is cut short at {share:.0%} of its area")
                if any(not bool(m.started[number, 0]) and not bool(m.landed_early[0]) for m in motions):
                    found.append(f"{name} never starts, the next row opens first")
                number += 1
        return (*found, *self._beside(), *self.unused())

    def _beside(self) -> Iterator[str]:
        """Cautions for measured forces of a row that opens while an earlier one still pulls."""
        staying = ""
        for one in self.motions.rows:
            if staying and self.measured(one) is not None:
                yield f"{one.name}: measured force taken as it is, without the pull of {staying}, which stays"
            if one.row.when_next_opens == "stays":
                staying = one.name

    def _in_class(self, one: CanopyRow) -> bool:
        loading = float(canopy.canopy_loading(self.masses.suspended.value, one.full_area.value))
        return one.type.solid and bool(canopy.in_handbook_class(one.diameter.value, loading))

    def notes(self) -> tuple[str, ...]:
        """Lines under the working: the ratios of the time rule and where the handbook's figures stand."""
        lines = [
            f"{name}, time rule: path flown while filling {path:.2f} L, largest speed {speed:.2f} of that at its start"
            for name, path, speed in self.ratios
        ]
        return (*lines, NOT_CHECKED) if lines else ()
