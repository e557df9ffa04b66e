"""What only physics can tell to be wrong in a rig file, as input errors like any other."""

from __future__ import annotations

from model.physics import air, day_air
from model.quantity import Dimension, show
from model.rig.errors import InputProblem
from model.rig.reading import RigFile
from model.rig.rig import point


def verify(rig_file: RigFile) -> list[InputProblem]:
    """Every contradiction between fields that takes physics to find."""
    return [*_air(rig_file), *_leg_lengths(rig_file), *_leaving(rig_file)]


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


def _leg_lengths(rig_file: RigFile) -> list[InputProblem]:
    """Measured leg lengths that no confluence point fits within a hundredth."""
    rig = rig_file.rig
    given = rig.suspension is not None and rig.suspension.apex is not None
    if given or len(rig.leg) < 3 or any(leg.length is None or leg.at is None for leg in rig.leg):
        return []
    from model.physics import sling

    places = [point(rig, leg.at) for leg in rig.leg if leg.at is not None]
    lengths = [leg.length for leg in rig.leg if leg.length is not None]
    try:
        apex = sling.apex_from_lengths(places, [length.value for length in lengths])
    except ValueError as error:
        return [
            rig_file.problem(("leg", 0, "length"), f'"{lengths[0].text}"', f"lengths that meet in one point ({error})")
        ]
    found = []
    for i, (length, place, misfit) in enumerate(zip(lengths, places, apex.misfits, strict=True)):
        if abs(misfit) > sling.MISFIT_ALLOWED:
            fits = show(length.value * (1 + float(misfit)), Dimension.LENGTH, length.unit)
            expected = (
                f"lengths that meet in one point within 1 %: {fits} would fit the other legs, {abs(misfit):.1%} off"
            )
            found.append(rig_file.problem(("leg", i, "length"), f'"{length.text}"', expected))
        elif apex.worst <= sling.MISFIT_ALLOWED and apex.point[2] <= place[2]:
            expected = "lengths that meet above the attachment"
            found.append(rig_file.problem(("leg", i, "length"), f'"{length.text}"', expected))
    return found


def _leaving(rig_file: RigFile) -> list[InputProblem]:
    """An extraction that takes all of the airspeed."""
    leaving, airspeed = rig_file.rig.exit, rig_file.rig.drop.airspeed
    lost = leaving.extraction.speed_lost if leaving and leaving.extraction else None
    if lost is None or airspeed is None or lost.value == 0 or lost.value < airspeed.value:
        return []
    expected = f'less than the airspeed, "{airspeed.text}"'
    return [rig_file.problem(("exit", "extraction", "speed_lost"), f'"{lost.text}"', expected)]
