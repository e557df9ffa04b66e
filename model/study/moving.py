"""A rig with some of its inputs moved: for the walk-through, and as a new rig file."""

from __future__ import annotations

import os
from collections.abc import Callable, Mapping
from dataclasses import dataclass, replace
from pathlib import Path
from typing import Any

from model.checks.case import Case
from model.checks.day import Day
from model.checks.missing import Missing
from model.checks.term import Term
from model.quantity import FEET_INCHES, Dimension, Quantity, UnitSystem, show, show_difference, unit_for
from model.rig.locate import Loc
from model.rig.reading import Loaded
from model.rig.rig import Rig

SMALL = 0.01


@dataclass(frozen=True)
class Input:
    """One input that can be moved: where it lies in the rig file, its value now, and how it steps.

    ``step`` is in SI; ``whole`` marks a count. ``tolerance`` is that of the field in SI, or 0; ``relative``
    says whether it was written as a share.
    """

    name: str
    loc: Loc
    value: float
    dimension: Dimension
    unit: str
    step: float
    least: float
    most: float
    whole: bool = False
    tolerance: float = 0.0
    relative: bool = False

    def text(self, value: float, system: UnitSystem = UnitSystem.WRITTEN) -> str:
        """A value of this input in words."""
        return show(value, self.dimension, unit_for(self.dimension, system, self.unit, value))


def inputs(case: Case) -> tuple[Input, ...]:
    """The inputs that can be moved, in the order of the walk; those without a value are left out."""
    day = case.day
    found = [
        _input("rigged mass", ("platform", "weighed"), lambda: case.masses.rigged, 1.0, 1e6),
        _input("indicated airspeed", ("drop", "airspeed"), lambda: _airspeed(case), 0.0, 200.0),
        _input("release height", ("drop", "release_height"), lambda: day.release_height, 1.0, 19000.0),
        _input("zone elevation", ("drop", "zone_elevation"), lambda: day.elevation, -500.0, 9000.0, step=30.0),
        _input("zone temperature", ("drop", "zone_temperature"), lambda: _temperature(day), 223.15, 328.15, step=1.0),
    ]
    for k, _ in enumerate(case.rig.canopy):
        found += _row_inputs(case, k)
    if case.rig.platform is None:
        del found[0]
    return tuple(one for one in found if one is not None)


def _airspeed(case: Case) -> Term:
    speed = case.motions.indicated
    return speed.inputs[0] if speed.inputs else speed


def _temperature(day: Day) -> Term:
    temperature = day.temperature
    return replace(temperature, unit=temperature.unit or "°C")


def _row_inputs(case: Case, k: int) -> list[Input | None]:
    name = f"row {k + 1}, " if len(case.rig.canopy) > 1 else ""
    at: Loc = ("canopy", k)
    found = [
        _input(f"{name}canopies", (*at, "count"), lambda: case.rows[k].count, 1.0, 12.0, step=1.0, whole=True),
        _input(f"{name}diameter D0", (*at, "diameter"), lambda: case.rows[k].diameter, 0.5, 100.0),
        _input(
            f"{name}drag coefficient CD0", (*at, "drag_coefficient"), lambda: case.rows[k].drag_coefficient, 0.1, 3.0
        ),
    ]
    if case.rig.canopy[k].diameter is None:
        del found[1]
    for i in range(len(case.rig.canopy[k].reefing) + 1):
        found += _filling_inputs(case, k, i, name)
    return found


def _filling_inputs(case: Case, k: int, i: int, name: str) -> list[Input | None]:
    reefed = i < len(case.rig.canopy[k].reefing)
    at: Loc = ("canopy", k, "reefing", i) if reefed else ("canopy", k)
    stage = f"{name}stage {i + 1}, " if case.rig.canopy[k].reefing else name

    def filling() -> Any:
        return case.rows[k].fillings[i]

    found = [
        _input(f"{stage}fill constant n", (*at, "fill_constant"), lambda: filling().distance.inputs[0], 0.5, 60.0),
        _input(f"{stage}growth exponent j", (*at, "growth_exponent"), lambda: filling().exponent, 0.5, 6.0, step=0.1),
        _input(
            f"{stage}opening coefficient Cx",
            (*at, "opening_coefficient"),
            lambda: filling().opening_coefficient,
            1.0,
            3.0,
        ),
    ]
    if reefed:
        found.append(_input(f"{stage}drag ratio", (*at, "drag_ratio"), lambda: filling().ratio, 0.005, 0.9))
        following = i + 1

        def cutter() -> Term:
            term = case.rows[k].fillings[following].cutter
            if term is None:
                raise Missing("cutter")
            return term

        found.append(_input(f"{stage}cutter", (*at, "cutter"), cutter, 0.1, 60.0, step=0.1))
    return found


def _input(
    name: str, loc: Loc, term: Callable[[], Term], least: float, most: float, step: float = 0.0, *, whole: bool = False
) -> Input | None:
    try:
        found = term()
    except Missing:
        return None
    dimension = Dimension(found.dimension)
    size = step or _round_step(abs(found.value) * SMALL)
    tolerance = 0.0 if whole else found.tolerance
    return Input(
        name, loc, found.value, dimension, found.unit or "", size, least, most, whole, tolerance, found.relative
    )


def _round_step(size: float) -> float:
    """A step of 1, 2 or 5 times a power of ten near a size."""
    from math import floor, log10

    if size <= 0:
        return 0.01
    power = 10.0 ** floor(log10(size))
    return min((power, 2 * power, 5 * power, 10 * power), key=lambda one: abs(one - size))


def moved(loaded: Loaded, changes: Mapping[Loc, float], chosen: Mapping[Loc, Input]) -> Loaded:
    """The same rig with some inputs at other values; a tolerance stays as wide as it was, or the same share."""
    rig: Rig = loaded.rig.rig
    for loc, value in changes.items():
        one = chosen[loc]
        rig = _with(rig, loc, round(value) if one.whole else _quantity(one, value))
    return Loaded(replace(loaded.rig, rig=rig), loaded.limits)


def _quantity(one: Input, value: float) -> Quantity:
    tolerance = one.tolerance * abs(value / one.value) if one.relative and one.value else one.tolerance
    return Quantity(value, one.dimension, one.unit, tolerance, _written(one, value), one.relative)


def _with(model: Any, loc: Loc, value: Any) -> Any:
    """A copy of a model with one field replaced, however deep it lies."""
    head, *rest = loc
    if isinstance(model, tuple):
        index = int(head)
        return (*model[:index], _with(model[index], tuple(rest), value), *model[index + 1 :])
    inner = value if not rest else _with(getattr(model, str(head)), tuple(rest), value)
    return model.model_copy(update={str(head): inner})


def _written(one: Input, value: float) -> str:
    """A moved value as it is written in a file, with the tolerance it had."""
    unit = one.unit or unit_for(one.dimension, UnitSystem.SI, None, value)
    text = show(value, one.dimension, unit, digits=6)
    if not one.tolerance:
        return text
    if one.relative and one.value:
        return f"{text} ± {show(one.tolerance / abs(one.value) * 100, Dimension.NUMBER, '', digits=6)} %"
    plain = "in" if unit == FEET_INCHES else unit
    return f"{text} ± {show_difference(one.tolerance, one.dimension, plain, digits=6)}"


def write_moved(loaded: Loaded, changes: Mapping[Loc, float], chosen: Mapping[Loc, Input], path: Path) -> None:
    """Write the rig with its moved inputs to a new file; its comments stay, the old file is not touched.

    Raises:
        FileExistsError: If there is a file of that name.
        OSError: If it cannot be written; no half of it is left.
    """
    import tomlkit

    from model.rig.whole import write_whole

    document: Any = tomlkit.parse(loaded.rig.text)
    for loc, value in changes.items():
        table = document
        for key in loc[:-1]:
            table = table[key]
        table[str(loc[-1])] = _field(chosen[loc], value)
    if path.parent.resolve() != loaded.rig.path.parent.resolve() and loaded.rig.limits_path is not None:
        document["limits"] = Path(os.path.relpath(loaded.rig.limits_path.resolve(), path.parent.resolve())).as_posix()
    write_whole(path, tomlkit.dumps(document).encode("utf-8"), fresh=True)


def _field(one: Input, value: float) -> int | float | str:
    """What stands in the file for a moved input; a plain number without a tolerance stays a plain number."""
    if one.whole:
        return round(value)
    text = _written(one, value)
    return float(text.replace(",", "")) if one.dimension is Dimension.NUMBER and not one.tolerance else text
