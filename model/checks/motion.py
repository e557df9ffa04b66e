"""The motion from release to the ground under both filling rules, as terms."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from functools import cached_property
from typing import TYPE_CHECKING, Literal

from model.checks.day import Day
from model.checks.missing import CannotJudge, Missing, need
from model.checks.rows import CanopyRow
from model.checks.term import Procedure, Term, combine, derive, given, known, read, total
from model.physics import air, balance, drag
from model.rig.rig import Rig

if TYPE_CHECKING:
    from model.physics.flight import Motion

Rule = Literal["time", "distance"]
Pick = Callable[["Motion"], float]
SOURCE = "planar point mass with both filling rules; equations in docs/methods.md"
RULES: tuple[Rule, ...] = ("time", "distance")
RULE_TEXT = {"time": "tau = t/tf, tf = L/V at line stretch", "distance": "tau = path through the air/L"}


class Motions:
    """The flights of one rig. Every property raises `Missing` where a field is absent."""

    def __init__(
        self, rig: Rig, day: Day, falling: Callable[[], Term], rows: Callable[[], Sequence[CanopyRow]]
    ) -> None:
        self.rig, self.day = rig, day
        self._falling, self._rows = falling, rows
        self._flown: dict[tuple[str, tuple[float, ...]], Motion] = {}
        self._settled: dict[str, Motion] = {}

    @cached_property
    def rows(self) -> tuple[CanopyRow, ...]:
        """The canopy rows in order of opening."""
        return tuple(self._rows())

    @cached_property
    def rules(self) -> tuple[Rule, ...]:
        """The filling rules that are flown: one where every filling time is measured."""
        return RULES[:1] if all(one.every_time_measured for one in self.rows) else RULES

    @cached_property
    def indicated(self) -> Term:
        """Indicated airspeed at which the load leaves the aircraft."""
        speed = read(self.rig.drop.airspeed, "Vi", "indicated airspeed", "drop.airspeed")
        leaving = self.rig.exit
        extraction = leaving.extraction if leaving and leaving.method == "extraction" else None
        if extraction is None:
            return speed
        if extraction.speed_lost is None:
            lost = known(0.0, "dV", "speed lost before the ramp", "speed", "none given: 0", "kt")
        else:
            lost = given(extraction.speed_lost, "dV", "speed lost before the ramp", "exit.extraction.speed_lost")
        how = Procedure("airspeed less the speed lost", lambda whole, less: whole - less, "definition")
        return combine(how, [speed, lost], "Vi", "indicated airspeed at release", "speed", speed.unit)

    @cached_property
    def airspeed(self) -> Term:
        """True airspeed at release."""
        return derive(air.true_airspeed, self.indicated, self.day.release_density, unit=self.indicated.unit)

    @cached_property
    def load_drag_area(self) -> Term:
        """Drag area of the load itself."""
        leaving = self.rig.exit
        if leaving is not None and leaving.load_drag_area is not None:
            return given(leaving.load_drag_area, "CdA", "drag area of the load", "exit.load_drag_area")
        platform = need(self.rig.platform, "platform")
        width = read(platform.width, "b", "width", "platform.width")
        return derive(drag.front_face_drag_area, width, self.rigged_height)

    @cached_property
    def rigged_height(self) -> Term:
        """Rigged height over the platform's underside."""
        platform = need(self.rig.platform, "platform")
        height = read(platform.height, "h", "highest point over the deck", "platform.height")
        return derive(balance.height_over_underside, height, self.depth, unit=height.unit)

    @cached_property
    def depth(self) -> Term:
        """Thickness of the deck; 0 where none is given."""
        depth = need(self.rig.platform, "platform").depth
        if depth is None:
            return known(0.0, "d", "deck thickness", "length", "none given: 0", "mm")
        return given(depth, "d", "deck thickness", "platform.depth")

    def _line_stretch(self, first: CanopyRow) -> tuple[str, Term]:
        """How the first row comes to line stretch: a known time, or the distance from the aircraft."""
        leaving = need(self.rig.exit, "exit")
        method = need(leaving.method, "exit.method")
        if leaving.line_stretch is not None:
            return "line_stretch", given(leaving.line_stretch, "tls", "line stretch after release", "exit.line_stretch")
        if need(leaving.canopy_pulled_by, "exit.canopy_pulled_by") != "static line" or method == "extraction":
            raise Missing("exit.line_stretch")
        static = need(leaving.static_line, "exit.static_line")
        parts = [
            given(static, "ls", "static line", "exit.static_line"),
            self.riser(first),
            self.line_length(first),
        ]
        return "static_line", total(parts, "s", "distance from the aircraft at line stretch", static.unit)

    @staticmethod
    def line_length(one: CanopyRow) -> Term:
        """Suspension line length of a row."""
        length = need(one.row.line_length, one.field("line_length"))
        return given(length, "l", f"line length, {one.name}", one.field("line_length"))

    @staticmethod
    def riser(one: CanopyRow) -> Term:
        """Riser length of a row, 0 where none is given."""
        if one.row.riser_length is None:
            return known(0.0, "r", f"riser length, {one.name}", "length", "none given: 0", "m")
        return given(one.row.riser_length, "r", f"riser length, {one.name}", one.field("riser_length"))

    def _trigger(self, one: CanopyRow) -> tuple[str, Term]:
        """When a later row opens."""
        fields = one.row
        if fields.opens_after is not None:
            return "opens_after", given(fields.opens_after, "to", f"opening of {one.name}", one.field("opens_after"))
        if fields.opens_at_height is not None:
            return "opens_at_height", given(
                fields.opens_at_height, "ho", f"height at which {one.name} opens", one.field("opens_at_height")
            )
        chosen = need(fields.opens_at_set_height, one.field("opens_at_height"))
        height = given(chosen, "hs", f"set height of {one.name}", one.field("opens_at_set_height"))
        text = "h = hs x mean absolute temperature/standard mean, layer from the zone to the set height above it"
        true = self.day.aloft(
            lambda day, set_to: day.true_height(set_to),
            text,
            height,
            "ho",
            f"true height at which {one.name} opens",
            "length",
            height.unit,
        )
        return "opens_at_height", true

    @cached_property
    def plan(self) -> dict[str, Term]:
        """Every number the motion needs, by its place in the drop."""
        day = self.day
        plan = {
            "mass": self._falling(),
            "airspeed": self.airspeed,
            "release_height": day.release_height,
            "load_drag_area": self.load_drag_area,
        }
        plan.update({f"air {i}": term for i, term in enumerate(day.inputs)})
        for i, (height, speed) in enumerate(day.winds()):
            plan[f"wind {i} height"], plan[f"wind {i} speed"] = height, speed
        for k, one in enumerate(self.rows):
            name, term = self._line_stretch(one) if k == 0 else self._trigger(one)
            plan[f"row {k} {name}"] = term
            if k > 0:
                time = need(one.row.deployment_time, one.field("deployment_time"))
                field = one.field("deployment_time")
                plan[f"row {k} deployment_time"] = given(time, "td", f"deployment time, {one.name}", field)
            for filling in one.fillings:
                where = f"row {k} filling {filling.number}"
                plan[f"{where} area"] = filling.area
                plan[f"{where} distance"] = filling.distance
                plan[f"{where} exponent"] = filling.exponent
                plan[f"{where} coefficient"] = filling.opening_coefficient
                if filling.cutter is not None:
                    plan[f"{where} cutter"] = filling.cutter
                if filling.measured_time is not None:
                    plan[f"{where} time"] = filling.measured_time
        return plan

    def fly(self, rule: Rule, *values: float) -> Motion:
        """Fly the plan with its terms at ``values``; a flight already flown is remembered."""
        from model.checks.drop import build
        from model.physics.flight import solve

        key = rule, values
        if key not in self._flown:
            if len(self._flown) > 256:
                self._flown.clear()
            drop = build(dict(zip(self.plan, values, strict=True)), self.rig, self.day, self.rows)
            self._flown[key] = solve(drop, rule)
        return self._flown[key]

    def motion(self, rule: Rule) -> Motion:
        """The flight under one rule, or `CannotJudge` where it could not be solved to its accuracy."""
        if rule in self._settled:
            return self._settled[rule]
        motion = self.fly(rule, *(term.value for term in self.plan.values()))
        if not bool(motion.accurate[0]):
            raise CannotJudge(f"the motion could not be solved to its accuracy ({rule} rule)")
        self._settled[rule] = motion
        return motion

    def flown(self, rule: Rule, pick: Pick, symbol: str, meaning: str, dimension: str, unit: str | None = None) -> Term:
        """A result of the motion under one rule."""
        self.motion(rule)
        text = f"motion from release to the ground, {rule} rule: {RULE_TEXT[rule]}"
        how = Procedure(text, lambda *values: float(pick(self.fly(rule, *values))), SOURCE)
        return combine(how, list(self.plan.values()), symbol, f"{meaning}, {rule} rule", dimension, unit)

    def landed_early(self) -> bool:
        """Whether the load lands before its last filling ends, under either rule."""
        return any(bool(self.motion(rule).landed_early[0]) for rule in self.rules)

    def both(self, pick: Pick, symbol: str, meaning: str, dimension: str, unit: str | None = None) -> list[Term]:
        """A result of the motion under every rule that is flown."""
        return [self.flown(rule, pick, symbol, meaning, dimension, unit) for rule in self.rules]
