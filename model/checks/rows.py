"""Canopy rows: drag areas, fill lengths and the figures of each filling, as terms."""

from __future__ import annotations

from functools import cached_property
from typing import NamedTuple

from model.checks.missing import Missing, need, row
from model.checks.term import SAME, Procedure, Term, combine, derive, given, known, read
from model.physics import canopy, drag
from model.quantity import Quantity
from model.rig.canopy import Canopy, Reefing
from model.rig.canopy_table import CanopyType, Figure, lookup

CLUSTER_OF_KNOWN = Procedure(
    "CdS = N eta CdS1", lambda count, efficiency, area: count * efficiency * area, "definition"
)
NEAR = 0.10
"""A measured figure is used within this share of its mass and speed."""


class Filling(NamedTuple):
    """One filling of a row: the terms the motion needs, and which of them are the handbook's."""

    number: int
    area: Term
    ratio: Term
    distance: Term
    exponent: Term
    opening_coefficient: Term
    cutter: Term | None
    measured_time: Term | None


class CanopyRow:
    """One row of canopies of the rig. Every property raises `Missing` where a field is absent."""

    def __init__(self, index: int, canopy_row: Canopy, mass: Term) -> None:
        self.index, self.row, self.mass = index, canopy_row, mass
        self.type: CanopyType = lookup(canopy_row.type)

    def field(self, name: str) -> str:
        """A field of this row as messages name it."""
        return row("canopy row", self.index, self.row.role, name)

    @property
    def name(self) -> str:
        """How the row is called in workings."""
        return f"canopy row {self.index + 1} ({self.row.role})"

    def _figure(self, own: Quantity | None, table: Figure | None, symbol: str, meaning: str, field: str) -> Term:
        """The row's own figure, else the table's at the middle of its range, else `Missing`."""
        if own is not None:
            return given(own, symbol, meaning, self.field(field))
        figure = need(table, f"{self.field(field)}: the canopy table has none for {self.row.type}")
        caution = f"table figure, from memory: {meaning} of {self.row.type}, row {self.index + 1}"
        return known(
            figure.middle, symbol, meaning, "number", f"canopy table, {self.row.type}: {figure.source}", None, caution
        )

    @cached_property
    def drag_coefficient(self) -> Term:
        """CD0 of the row."""
        return self._figure(
            self.row.drag_coefficient, self.type.drag_coefficient, "CD0", "drag coefficient", "drag_coefficient"
        )

    @cached_property
    def diameter(self) -> Term:
        """Nominal diameter D0 of one canopy."""
        if self.row.diameter is not None:
            return given(self.row.diameter, "D0", f"nominal diameter, {self.name}", self.field("diameter"))
        if self.row.drag_area is None:
            raise Missing(self.field("diameter"))
        area = given(self.row.drag_area, "CdS1", "drag area of one canopy", self.field("drag_area"))
        return derive(drag.nominal_diameter, area, self.drag_coefficient, of=self.name)

    @cached_property
    def count(self) -> Term:
        """Canopies of the row."""
        return known(self.row.count, "N", f"canopies of row {self.index + 1}", "number", self.field("count"))

    @cached_property
    def efficiency(self) -> Term:
        """Cluster efficiency; 1 for one canopy."""
        return self._shared(self.row.cluster_efficiency, "eta", "cluster efficiency", "cluster_efficiency")

    @cached_property
    def uneven_share(self) -> Term:
        """Worst canopy's load over the even share; 1 for one canopy."""
        return self._shared(self.row.uneven_share, "u", "uneven share", "uneven_share")

    def _shared(self, own: Quantity | None, symbol: str, meaning: str, field: str) -> Term:
        if self.row.count == 1:
            return known(1.0, symbol, meaning, "number", "one canopy")
        return read(own, symbol, meaning, self.field(field))

    @cached_property
    def measured_rate_used(self) -> bool:
        """Whether a measured rate of descent stands and its mass is near this one's."""
        measured = self.row.measured
        if measured is None or measured.rate is None or measured.rate_mass is None:
            return False
        return abs(measured.rate_mass.value - self.mass.value) <= NEAR * measured.rate_mass.value

    @property
    def unused_rate(self) -> str:
        """What to say of a measured rate that stands and is not used; empty otherwise."""
        measured = self.row.measured
        if measured is None or measured.rate is None or self.measured_rate_used:
            return ""
        return f"{self.name}: measured rate not used, its mass is more than 10 % from this one's"

    @cached_property
    def full_area(self) -> Term:
        """Drag area of the whole row, full."""
        measured = self.row.measured
        if self.measured_rate_used and measured and measured.rate and measured.rate_mass and measured.rate_density:
            source = f"measured: {measured.source}"
            return derive(
                canopy.drag_area_from_rate,
                given(
                    measured.rate_mass,
                    "m",
                    "mass of the measured descent",
                    f"{self.field('measured.rate_mass')}, {source}",
                ),
                given(
                    measured.rate_density, "rho", "density of the measured descent", self.field("measured.rate_density")
                ),
                given(measured.rate, "v", "measured rate of descent", f"{self.field('measured.rate')}, {source}"),
                of=f"{self.name}, from the measured rate",
            )
        if self.row.diameter is None and self.row.drag_area is not None:
            one = given(self.row.drag_area, "CdS1", "drag area of one canopy", self.field("drag_area"))
            inputs = [self.count, self.efficiency, one]
            return combine(CLUSTER_OF_KNOWN, inputs, "CdS", f"drag area, {self.name}", "area", one.unit)
        nominal = derive(drag.circle_area, self.diameter, of=f"one canopy of row {self.index + 1}")
        return derive(
            canopy.cluster_drag_area, self.count, self.efficiency, self.drag_coefficient, nominal, of=self.name
        )

    @cached_property
    def fillings(self) -> tuple[Filling, ...]:
        """The fillings of the row, its reefing stages first."""
        found: list[Filling] = []
        before = known(0.0, "eps0", "drag ratio before the first filling", "number", "definition")
        cutter: Term | None = None
        for i, stage in enumerate(self.row.reefing):
            found.append(self._filling(i, stage, before, cutter))
            before = found[-1].ratio
            name = f"reefing {i + 1} cutter"
            cutter = read(stage.cutter, f"tc{i + 1}", f"cutter of reefing stage {i + 1}", self.field(name))
        found.append(self._filling(len(found), None, before, cutter))
        return tuple(found)

    def _filling(self, i: int, stage: Reefing | None, before: Term, cutter: Term | None) -> Filling:
        reefed = bool(self.row.reefing)
        prefix = f"reefing {i + 1} " if stage else ""
        own = stage if stage is not None else self.row
        kind = self.type
        if i > 0:
            table_n, table_j = kind.fill_constant_disreef, kind.growth_exponent_disreef
        else:
            table_n = kind.fill_constant_reefed if reefed else kind.fill_constant
            table_j = kind.growth_exponent
        number = f"filling {i + 1}" if reefed else "filling"
        if stage is None:
            ratio = known(1.0, "eps", "drag ratio when full", "number", "definition")
            area = self.full_area
        else:
            ratio = read(stage.drag_ratio, "eps", f"drag ratio of stage {i + 1}", self.field(f"{prefix}drag_ratio"))
            area = derive(canopy.reefed_drag_area, ratio, self.full_area, of=f"{self.name}, reefing stage {i + 1}")
        n = self._figure(own.fill_constant, table_n, "n", f"fill constant, {number}", f"{prefix}fill_constant")
        return Filling(
            i,
            area if stage else combine(SAME, [area], "CdS", f"drag area when full, {self.name}", "area", area.unit),
            ratio,
            derive(canopy.fill_distance, n, self.diameter, ratio, before, of=f"{self.name}, {number}"),
            self._figure(own.growth_exponent, table_j, "j", f"growth exponent, {number}", f"{prefix}growth_exponent"),
            self._figure(
                own.opening_coefficient,
                self.type.opening_coefficient,
                "Cx",
                f"opening coefficient, {number}",
                f"{prefix}opening_coefficient",
            ),
            cutter,
            self._measured_time(stage, prefix),
        )

    def _measured_time(self, stage: Reefing | None, prefix: str) -> Term | None:
        measured = stage.measured if stage else self.row.measured
        if measured is None or measured.filling_time is None:
            return None
        origin = f"{self.field(f'{prefix}measured.filling_time')}, measured: {measured.source}"
        return given(measured.filling_time, "tf", "measured filling time", origin)

    @property
    def every_time_measured(self) -> bool:
        """Whether every filling of the row has a measured time."""
        return all(filling.measured_time is not None for filling in self.fillings)
