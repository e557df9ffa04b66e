"""One rig with everything its steps share, worked out once and only when a step asks for it."""

from __future__ import annotations

from collections.abc import Mapping
from functools import cached_property
from typing import TYPE_CHECKING

from model.checks.day import Day
from model.checks.forces import Forces
from model.checks.hanging import Hanging
from model.checks.heights import Heights
from model.checks.masses import Masses
from model.checks.missing import Missing, need
from model.checks.motion import Motions
from model.checks.rows import CanopyRow
from model.rig.limits import LimitSet
from model.rig.parts import Platform
from model.rig.rig import Exit, Rig

if TYPE_CHECKING:
    from model.checks.landing import Cushioning
    from model.checks.lashing import Lashings
    from model.checks.step import Ruling


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
        return Hanging(self)

    @cached_property
    def cushioning(self) -> Cushioning:
        """The stacks under the load, or `Missing`."""
        from model.checks.landing import Cushioning

        return Cushioning(self)

    @cached_property
    def lashings(self) -> Lashings:
        """The lashings, or `Missing`."""
        from model.checks.lashing import Lashings

        return Lashings(self)

    @property
    def platform(self) -> Platform:
        """The platform, or `Missing`."""
        return need(self.rig.platform, "platform")

    @property
    def exit(self) -> Exit:
        """How the load leaves, or `Missing`."""
        return need(self.rig.exit, "exit")

    @cached_property
    def open_at_end(self) -> tuple[CanopyRow, ...]:
        """The rows that hang open on the way to the ground."""
        rows = self.rows
        staying = [one for one in rows[:-1] if need(one.row.when_next_opens, one.field("when_next_opens")) == "stays"]
        return (*staying, rows[-1])
