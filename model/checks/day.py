"""The air of the day at the drop zone and aloft, and the winds, as terms."""

from __future__ import annotations

from collections.abc import Callable
from functools import cached_property, lru_cache

from model.checks.missing import need
from model.checks.term import Procedure, Term, combine, derive, given, known, read, total
from model.physics import air
from model.physics.day_air import DayAir
from model.physics.types import Real
from model.rig.rig import Drop

SOURCE = "U.S. Standard Atmosphere 1976; hydrostatic from the zone with the day's constant offset"


@lru_cache(maxsize=64)
def day_air(elevation: float, temperature: float | None, setting: float | None, dew_point: float | None) -> DayAir:
    """The day's air; see `DayAir.at`."""
    return DayAir.at(elevation, temperature, setting, dew_point)


class Day:
    """Air and winds of a drop. Every property raises `Missing` where a field is absent."""

    def __init__(self, drop: Drop) -> None:
        self.drop = drop

    @cached_property
    def elevation(self) -> Term:
        """Height of the zone above mean sea level."""
        return read(self.drop.zone_elevation, "z0", "drop zone elevation", "drop.zone_elevation")

    @cached_property
    def release_height(self) -> Term:
        """Release height above the zone."""
        height = need(self.drop.release_height, "drop.release_height")
        return given(height, "h0", "release height above the zone", "drop.release_height")

    @cached_property
    def setting(self) -> Term:
        """Altimeter setting; the standard one where absent."""
        setting = self.drop.altimeter_setting
        if setting is None:
            return known(air.SEA_LEVEL_PRESSURE, "Q", "altimeter setting", "pressure", "standard: none given", "hPa")
        return given(setting, "Q", "altimeter setting", "drop.altimeter_setting")

    @cached_property
    def zone_height(self) -> Term:
        """Geopotential height of the zone."""
        return derive(air.geopotential_height, self.elevation, of="the zone")

    @cached_property
    def temperature(self) -> Term:
        """Temperature at the zone; the standard one where absent."""
        temperature = self.drop.zone_temperature
        if temperature is None:
            return derive(air.standard_temperature, self.zone_height, of="the zone, standard day", unit="°C")
        return given(temperature, "T", "temperature at the zone", "drop.zone_temperature")

    @cached_property
    def pressure(self) -> Term:
        """Pressure at the zone."""
        return derive(air.station_pressure, self.setting, self.zone_height, unit="hPa")

    @cached_property
    def vapour(self) -> Term:
        """Vapour pressure at the zone; none where no dew point is given."""
        if self.drop.dew_point is None:
            return known(0.0, "e", "vapour pressure", "pressure", "dry air: no dew point given", "hPa")
        dew_point = given(self.drop.dew_point, "Td", "dew point", "drop.dew_point")
        return derive(air.vapour_pressure, dew_point, unit="hPa")

    @cached_property
    def density(self) -> Term:
        """Density at the zone."""
        return derive(air.gas_density, self.pressure, self.vapour, self.temperature, of="the zone")

    @cached_property
    def density_altitude(self) -> Term:
        """Standard geometric altitude of the zone's density."""
        height = derive(air.density_height, self.density)
        return derive(air.geometric_altitude, height, of="density altitude of the zone", unit=self.elevation.unit)

    @cached_property
    def inputs(self) -> tuple[Term, ...]:
        """Zone elevation, then those of temperature, altimeter setting and dew point that are given."""
        terms = [self.elevation]
        drop = self.drop
        if drop.zone_temperature is not None:
            terms.append(self.temperature)
        if drop.altimeter_setting is not None:
            terms.append(self.setting)
        if drop.dew_point is not None:
            terms.append(self.vapour.inputs[0])
        return tuple(terms)

    def air(self, *values: float) -> DayAir:
        """The day's air from values of `inputs`."""
        rest = iter(values[1:])
        drop = self.drop
        chosen = [
            next(rest) if field is not None else None
            for field in (drop.zone_temperature, drop.altimeter_setting, drop.dew_point)
        ]
        return day_air(values[0], *chosen)

    def aloft(
        self,
        pick: Callable[[DayAir, float], Real],
        text: str,
        at: Term,
        symbol: str,
        meaning: str,
        dimension: str,
        unit: str | None = None,
    ) -> Term:
        """A property of the air at a height."""

        def function(height: float, *values: float) -> float:
            return float(pick(self.air(*values), height))

        how = Procedure(text, function, SOURCE)
        return combine(how, [at, *self.inputs], symbol, meaning, dimension, unit)

    @cached_property
    def release_altitude(self) -> Term:
        """Release height above mean sea level."""
        return total([self.elevation, self.release_height], "z", "release height above mean sea level")

    @cached_property
    def release_density(self) -> Term:
        """Density at release."""
        text = (
            "rho(z): pressure hydrostatic from the zone, temperature standard + the zone's offset, e/p as at the zone"
        )
        return self.aloft(
            lambda day, z: day.density(z), text, self.release_altitude, "rho", "density at release", "density"
        )

    def winds(self) -> tuple[tuple[Term, Term], ...]:
        """Heights above the zone and winds along the run-in, heights rising; empty where none is given."""
        drop = self.drop
        if drop.winds:
            return tuple(
                (
                    given(height, f"hw{i + 1}", f"height of wind {i + 1}", "drop.winds"),
                    given(speed, f"W{i + 1}", f"wind {i + 1} along the run-in", "drop.winds"),
                )
                for i, (height, speed) in enumerate(drop.winds)
            )
        if drop.surface_wind is None:
            return ()
        ground = known(0.0, "hw1", "height of the surface wind", "length", "definition")
        surface = given(drop.surface_wind, "W1", "surface wind along the run-in", "drop.surface_wind")
        if drop.release_wind is None:
            return ((ground, surface),)
        return (
            (ground, surface),
            (
                self.release_height,
                given(drop.release_wind, "W2", "wind at release along the run-in", "drop.release_wind"),
            ),
        )
