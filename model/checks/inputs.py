"""What only physics can tell to be wrong in a rig file, as input errors like any other."""

from __future__ import annotations

from model.physics import air, day_air
from model.rig.errors import InputError, InputProblem
from model.rig.reading import RigFile


def verify(rig_file: RigFile) -> None:
    """Refuse fields that contradict each other.

    Raises:
        InputError: With every contradiction found.
    """
    problems = [*_air(rig_file)]
    if problems:
        raise InputError(problems)


def _air(rig_file: RigFile) -> list[InputProblem]:
    drop = rig_file.rig.drop
    problems = []
    if drop.zone_elevation is not None and not air.LOWEST_ZONE <= drop.zone_elevation.value <= air.HIGHEST_ZONE:
        expected = f"a zone between {air.LOWEST_ZONE:,.0f} m and {air.HIGHEST_ZONE:,.0f} m"
        problems.append(rig_file.problem(("drop", "zone_elevation"), f'"{drop.zone_elevation.text}"', expected))
    elif drop.zone_elevation is not None and drop.dew_point is not None:
        temperature = drop.zone_temperature
        here = (
            temperature.value
            if temperature
            else air.standard_temperature(air.geopotential_height(drop.zone_elevation.value))
        )
        if day_air.dew_point_over(drop.dew_point.value, float(here)):
            expected = "a dew point not over the temperature at the zone"
            problems.append(rig_file.problem(("drop", "dew_point"), f'"{drop.dew_point.text}"', expected))
    return problems
