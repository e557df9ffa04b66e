"""Inputs of the opening that keys move: which one is chosen, where each stands, where it stood in the file."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from math import floor, log10

from model.quantity import FEET_INCHES, Dimension, UnitSystem, from_unit, to_unit, unit_for
from model.rig.locate import Loc
from model.study.moving import Input

BIG = 10
"""Plain steps in a big one."""
_AS_GOOD_AS_BACK = 1e-6
"""Part of a step within which a value counts as that of the file."""


class Moves:
    """What is moved, and by how much."""

    def __init__(self, inputs: Sequence[Input]) -> None:
        """Start with every input as in the file."""
        self.inputs = tuple(inputs)
        self.chosen = 0
        self.big = False
        self._values: dict[Loc, float] = {}

    @property
    def changes(self) -> Mapping[Loc, float]:
        """The moved inputs' values in SI, by place in the file."""
        return dict(self._values)

    @property
    def input(self) -> Input | None:
        """The chosen input."""
        return self.inputs[self.chosen] if self.inputs else None

    def value(self, one: Input) -> float:
        """Where an input stands now, in SI."""
        return self._values.get(one.loc, one.value)

    def is_moved(self, one: Input) -> bool:
        """Whether an input stands elsewhere than in the file."""
        return one.loc in self._values

    def choose(self, by: int) -> None:
        """Choose the input so many places further; after the last comes the first."""
        if self.inputs:
            self.chosen = (self.chosen + by) % len(self.inputs)

    def change(self, direction: int, system: UnitSystem) -> bool:
        """Move the chosen input by a step; False at the end of its range, or where nothing can be moved."""
        one = self.input
        if one is None:
            return False
        now = self.value(one)
        new = stepped(one, now, direction * (BIG if self.big else 1), system)
        if new == now:
            return False
        if abs(new - one.value) <= _AS_GOOD_AS_BACK * one.step:
            self._values.pop(one.loc, None)
        else:
            self._values[one.loc] = new
        return True

    def put_back(self) -> bool:
        """Put all inputs back to the file's values; False where none was moved."""
        moved = bool(self._values)
        self._values.clear()
        return moved


def shown_unit(one: Input, system: UnitSystem) -> str:
    """The unit an input is moved in: the one shown, feet where feet and inches are."""
    unit = unit_for(one.dimension, system, one.unit or None, one.value)
    return "ft" if unit == FEET_INCHES else unit


def step_in_unit(one: Input, system: UnitSystem) -> float:
    """The step of an input, a round number of the unit shown."""
    if one.whole or one.dimension is Dimension.NUMBER:
        return one.step
    unit = shown_unit(one, system)
    size = abs(to_unit(one.value + one.step, unit, one.dimension) - to_unit(one.value, unit, one.dimension))
    if one.dimension is Dimension.TEMPERATURE:
        return 1.0
    power: float = 10.0 ** floor(log10(size))
    return min((power, 2 * power, 5 * power, 10 * power), key=lambda step: abs(step - size))


def stepped(one: Input, value: float, steps: int, system: UnitSystem) -> float:
    """A value so many steps further, within the input's range."""
    unit = "" if one.whole or one.dimension is Dimension.NUMBER else shown_unit(one, system)

    def out(si: float) -> float:
        return to_unit(si, unit, one.dimension) if unit else si

    new = round(out(value) + steps * step_in_unit(one, system), 9)
    new_si = from_unit(new, unit, one.dimension) if unit else new
    least, most = min(one.least, one.value), max(one.most, one.value)
    return min(max(new_si, least), most)


def step_text(one: Input, system: UnitSystem, *, big: bool) -> str:
    """The size of a step in words."""
    size = step_in_unit(one, system) * (BIG if big else 1)
    unit = "" if one.whole or one.dimension is Dimension.NUMBER else shown_unit(one, system)
    return f"{size:,.6g} {unit}".strip()
