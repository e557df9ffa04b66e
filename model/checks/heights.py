"""The height that opening costs under both filling rules, with the allowance for the load's swing."""

from __future__ import annotations

from functools import cached_property
from typing import TYPE_CHECKING

from model.checks.missing import Failed
from model.checks.term import LESS, Term, combine, derive, largest, total
from model.physics import canopy

if TYPE_CHECKING:
    from model.checks.forces import Forces
    from model.checks.motion import Motions, Rule

NO_SWING = "no line_length of the last row: no allowance for the load swinging under its canopy"


class Heights:
    """Height lost while opening under each rule, and the rule with the larger loss."""

    def __init__(self, motions: Motions, forces: Forces) -> None:
        self.motions, self.forces = motions, forces

    def _lost_by(self, rule: Rule) -> float:
        motion = self.motions.motion(rule)
        return float(motion.slow_height[0])

    @cached_property
    def rule(self) -> Rule:
        """The rule with the larger loss; of two that never slow down, the one that lands first."""
        rules = self.motions.rules
        slow = {rule: self._lost_by(rule) for rule in rules}
        never = [rule for rule in rules if slow[rule] != slow[rule]]
        if never:
            return min(never, key=lambda rule: float(self.motions.motion(rule).touchdown_time[0]))
        return min(rules, key=lambda rule: slow[rule])

    def flown_loss(self, rule: Rule) -> Term:
        """Release height less the height at which the load has slowed to 1.05 of the steady rate."""
        self.forces.must_open()
        if self._lost_by(rule) != self._lost_by(rule):
            raise Failed("lands before it has slowed to 1.05 of its steady rate")
        release = self.motions.day.release_height
        height = self.motions.flown(
            rule,
            lambda motion: motion.slow_height[0],
            "hs",
            "height at which V is down to 1.05 of the steady rate",
            "length",
            release.unit,
        )
        return combine(LESS, [release, height], "dh", f"height lost in the motion, {rule} rule", "length", release.unit)

    @cached_property
    def swing(self) -> Term | None:
        """Allowance for the load swinging down under the last row to open; None without a line length."""
        last = self.motions.rows[-1]
        if last.row.line_length is None:
            return None
        lengths = self.motions.line_length(last), self.motions.riser(last)
        angle = self.motions.flown(
            self.rule,
            lambda motion: motion.line_stretch_angle[last.index, 0],
            "gamma",
            f"path angle at line stretch, {last.name}",
            "angle",
            "deg",
        )
        return derive(canopy.swing_allowance, *lengths, angle, unit=self.motions.day.release_height.unit)

    @cached_property
    def loss(self) -> Term:
        """Height lost from release until slowed, the larger of the rules, with the swing allowance."""
        worst = largest([self.flown_loss(rule) for rule in self.motions.rules], "dh", "height lost in the motion")
        if self.swing is None:
            return worst
        return total([worst, self.swing], "dh", "height lost while opening", self.motions.day.release_height.unit)

    @cached_property
    def reserve(self) -> Term:
        """Release height less the loss."""
        release = self.motions.day.release_height
        return combine(LESS, [release, self.loss], "hr", "height left when open", "length", release.unit)
