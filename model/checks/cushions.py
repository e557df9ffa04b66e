"""The cushion under a load as terms: crush force, deceleration, stroke, and which way to change a stack."""

from __future__ import annotations

from collections.abc import Mapping
from functools import cached_property

from model.checks.finding import Ruling
from model.checks.masses import Masses
from model.checks.missing import Missing, need, row
from model.checks.rates import Rates
from model.checks.term import Term, derive, least, read, read_count, total
from model.physics import balance, cushion
from model.physics.formula import CONSTANTS
from model.quantity import Quantity
from model.rig.rig import Rig

CANNOT_STOP = f"the stack cannot stop the load: {cushion.CushionFit.CANNOT_STOP}"


class Cushioning:
    """The stacks of a case as terms."""

    def __init__(self, rig: Rig, masses: Masses, rates: Rates, rulings: Mapping[str, Ruling]) -> None:
        if not rig.cushion:
            raise Missing("cushion")
        self.rig, self.masses, self.rates, self.rulings = rig, masses, rates, rulings

    def _field(self, i: int, name: str) -> str:
        return row("cushion", i, self.rig.cushion[i].name, name)

    def _given(self, i: int, name: str, symbol: str, meaning: str) -> Term:
        found: Quantity | None = getattr(self.rig.cushion[i], name)
        return read(found, symbol, f"{meaning}, {self.rig.cushion[i].name}", self._field(i, name))

    @cached_property
    def under_load(self) -> bool:
        """Whether the stacks lie under the load, on the platform."""
        places = [need(one.lies, self._field(i, "lies")) for i, one in enumerate(self.rig.cushion)]
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
            for i, one in enumerate(self.rig.cushion)
        )

    @cached_property
    def force(self) -> Term:
        """Crush force of all rows."""
        return total(self.forces, "P", "crush force of all stacks")

    @cached_property
    def mass(self) -> Term:
        """Mass over the stacks."""
        return self.masses.over_stack(platform_under=self.under_load)

    @cached_property
    def weight(self) -> Term:
        """Weight over the stacks."""
        return derive(balance.weight, self.mass, of="over the stack")

    @cached_property
    def net(self) -> Term:
        """Net deceleration in g0."""
        return derive(cushion.net_deceleration, self.force, self.weight, unit="g")

    @cached_property
    def speed(self) -> Term:
        """Speed at landing."""
        return self.rates.at_landing

    @cached_property
    def usable(self) -> Term:
        """Usable stroke of the thinnest row."""
        strokes = []
        for i, one in enumerate(self.rig.cushion):
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
        ruling = self.rulings.get(key)
        limit = ruling.limit if ruling else None
        return None if limit is None else limit.minimum if limit.minimum is not None else limit.maximum

    def _net_limit(self) -> float | None:
        """The least net deceleration that the limit and every fragility allow, in g0."""
        factor = self._bound("landing.fragility") or 1.0
        allowed = [item.fragility.value / CONSTANTS["g0"] / factor for item in self.rig.item if item.fragility]
        most = self._bound("landing.deceleration")
        return min([*allowed, *([most] if most is not None else [])], default=None)
