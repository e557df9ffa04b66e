"""Rates of descent and what hangs open at the end, as terms."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from functools import cached_property

from model.checks.day import Day
from model.checks.masses import Masses
from model.checks.missing import need
from model.checks.motion import Motions
from model.checks.rows import CanopyRow
from model.checks.term import Term, derive, largest, total
from model.physics import drag


class Rates:
    """How fast a rig comes down. Every property raises `Missing` where a field is absent."""

    def __init__(self, rows: Callable[[], Sequence[CanopyRow]], masses: Masses, day: Day, motions: Motions) -> None:
        self._rows, self.masses, self.day, self.motions = rows, masses, day, motions

    @cached_property
    def open_at_end(self) -> tuple[CanopyRow, ...]:
        """The rows that hang open on the way to the ground."""
        rows = self._rows()
        staying = [one for one in rows[:-1] if need(one.row.when_next_opens, one.field("when_next_opens")) == "stays"]
        return (*staying, rows[-1])

    @property
    def measured(self) -> bool:
        """Whether every canopy that hangs open at the end has a measured rate that is used."""
        return all(one.measured_rate_used for one in self.open_at_end)

    @property
    def cautions(self) -> tuple[str, ...]:
        """Cautions for measured rates that stand but are not used."""
        return tuple(one.unused_rate for one in self.open_at_end if one.unused_rate)

    def steady(self, areas: Sequence[Term], of: str) -> Term:
        """Steady rate of descent in the air of the zone under some drag areas."""
        area = areas[0] if len(areas) == 1 else total(areas, "CdS", f"drag area, {of}")
        return derive(drag.terminal_speed, self.masses.falling, self.day.density, area, of=of)

    @cached_property
    def rate(self) -> Term:
        """Steady rate of descent under what hangs open at the end."""
        return self.steady([one.full_area for one in self.open_at_end], "air of the zone")

    @cached_property
    def at_landing(self) -> Term:
        """The larger of the steady rate and the vertical speed at touchdown of the motion."""
        flown = self.motions.both(
            lambda motion: motion.touchdown_descent[0], "w", "vertical speed at touchdown", "speed"
        )
        return largest([self.rate, *flown], "v", "speed at landing")
