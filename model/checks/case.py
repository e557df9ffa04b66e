"""One rig with everything its steps share, worked out once and only when a step asks for it."""

from __future__ import annotations

from collections.abc import Mapping
from functools import cached_property

from model.checks.cushions import Cushioning
from model.checks.day import Day
from model.checks.finding import Ruling
from model.checks.forces import Forces
from model.checks.hanging import Hanging
from model.checks.heights import Heights
from model.checks.lashings import Lashings
from model.checks.masses import Masses
from model.checks.missing import Missing, need
from model.checks.motion import Motions
from model.checks.rates import Rates
from model.checks.rows import CanopyRow
from model.rig.limits import LimitSet
from model.rig.parts import Platform
from model.rig.rig import Exit, Rig


class Case:
    """A rig and its limit set, with masses, air, canopy rows and motion as terms."""

    def __init__(self, rig: Rig, limits: LimitSet | None, rulings: Mapping[str, Ruling] | None = None) -> None:
        self.rig, self.limits = rig, limits
        self.rulings: Mapping[str, Ruling] = rulings or {}
        self.masses = Masses(rig)
        self.day = Day(rig.drop)
        self.motions = Motions(rig, self.day, lambda: self.masses.falling, lambda: self.rows)
        self.forces = Forces(self.motions, self.masses)
        self.heights = Heights(self.motions, self.forces)
        self.rates = Rates(lambda: self.rows, self.masses, self.day, self.motions)

    @cached_property
    def rows(self) -> tuple[CanopyRow, ...]:
        """The canopy rows in order of opening."""
        if not self.rig.canopy:
            raise Missing("canopy")
        falling = self.masses.falling
        return tuple(CanopyRow(i, one, falling) for i, one in enumerate(self.rig.canopy))

    @cached_property
    def hanging(self) -> Hanging:
        """How the load hangs."""
        return Hanging(self.rig, self.masses, self.forces)

    @cached_property
    def cushioning(self) -> Cushioning:
        """The stacks under the load, or `Missing`."""
        return Cushioning(self.rig, self.masses, self.rates, self.rulings)

    @cached_property
    def lashings(self) -> Lashings:
        """The lashings, or `Missing`."""
        return Lashings(self.rig)

    @property
    def platform(self) -> Platform:
        """The platform, or `Missing`."""
        return need(self.rig.platform, "platform")

    @property
    def exit(self) -> Exit:
        """How the load leaves, or `Missing`."""
        return need(self.rig.exit, "exit")
