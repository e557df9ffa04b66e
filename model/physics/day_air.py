"""The air of one day at one drop zone, made from elevation, temperature, altimeter setting and dew point."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from model.physics import air
from model.physics.formula import formula
from model.physics.types import Real, real


@formula(
    "Ts = 288.15 - 0.0065 ((min(b, 11000)^2 - min(a, 11000)^2)/2 + 11000 (max(b, 11000) - max(a, 11000)))/(b - a)",
    result="Ts | standard mean temperature of the layer | temperature",
    symbols={
        "low": "a | geopotential height of its foot | length",
        "high": "b | geopotential height of its top | length",
    },
    source="derived from the U.S. Standard Atmosphere 1976",
    holds="to 20 km, foot below top",
)
def layer_mean_temperature(low: Real, high: Real) -> Real:
    """Give the mean standard temperature, K, of the layer between two geopotential heights, m, low under high.

    Source: derived from the U.S. Standard Atmosphere 1976.
    """
    foot, top = real(np.minimum(low, air.TROPOPAUSE)), real(np.minimum(high, air.TROPOPAUSE))
    slanted = (top - foot) * (top + foot) / 2.0
    level = air.TROPOPAUSE * (real(np.maximum(high, air.TROPOPAUSE)) - real(np.maximum(low, air.TROPOPAUSE)))
    return air.SEA_LEVEL_TEMPERATURE - air.LAPSE * (slanted + level) / (high - low)


@formula(
    "h = hs Tm/Ts",
    result="h | true height above the zone | length",
    symbols={
        "set_height": "hs | height the device is set to | length",
        "mean_temperature": "Tm | mean temperature of the layer | temperature",
        "standard_mean": "Ts | standard mean temperature of the layer | temperature",
    },
    source="hydrostatic equation, common practice in altimetry",
    holds="device set to the zone's pressure",
)
def true_set_height(set_height: Real, mean_temperature: Real, standard_mean: Real) -> Real:
    """Give the true height, m, at which a pressure device set to a height, m, acts.

    In air warmer than standard the layers are thicker, so the device acts higher than it is set.

    Args:
        set_height: Height above the zone that the device is set to, m.
        mean_temperature: Mean temperature, K, from the zone to the set height above it.
        standard_mean: The standard mean of the same layer, K.

    Returns:
        True height above the zone, m. Source: hydrostatic equation.
    """
    return set_height * mean_temperature / standard_mean


def dew_point_over(dew_point: float, temperature: float) -> bool:
    """Tell whether a dew point, K, lies over the temperature of the air, K, which no air can have."""
    return dew_point > temperature


def _require(name: str, value: Real | None, low: float, high: float, unit: str) -> None:
    if value is not None and not np.all((np.asarray(value) >= low) & (np.asarray(value) <= high)):
        raise ValueError(f"{name} outside {low:g} to {high:g} {unit}")


@dataclass(frozen=True, slots=True)
class DayAir:
    """The day's air above (and a little below) a drop zone; make it with `DayAir.at`.

    Temperature is standard plus one offset that makes the zone's right, pressure hydrostatic from the zone with that
    temperature, the share of vapour the same at every height. On a standard day it equals the standard air to rounding.
    """

    zone_elevation: Real
    """Geometric elevation of the zone, m."""
    zone_height: Real
    """Its geopotential height, m."""
    zone_pressure: Real
    """Pressure at the zone, Pa."""
    zone_temperature: Real
    """Temperature at the zone, K."""
    temperature_offset: Real
    """Temperature over standard at every height, K."""
    vapour: Real
    """Vapour pressure at the zone, Pa; 0 for dry air."""
    vapour_ratio: Real
    """Vapour pressure over pressure, at every height."""

    @classmethod
    def at(
        cls,
        zone_elevation: Real,
        zone_temperature: Real | None = None,
        altimeter_setting: Real | None = None,
        dew_point: Real | None = None,
    ) -> DayAir:
        """Make the day's air.

        Args:
            zone_elevation: Geometric elevation of the zone, m, from `air.LOWEST_ZONE` to `air.HIGHEST_ZONE`.
            zone_temperature: Temperature at the zone, K, from `air.COLDEST_ZONE` to `air.WARMEST_ZONE`; a standard day
                if missing.
            altimeter_setting: Altimeter setting, Pa, from `air.LOWEST_SETTING` to `air.HIGHEST_SETTING`; 101325 Pa if
                missing.
            dew_point: Dew point at the zone, K, in the range of temperatures; dry air if missing. Whether it lies over
                the temperature is for the caller to ask, with `dew_point_over`.

        Raises:
            ValueError: If one of them is out of its range or not a number: a slip of the unit, not weather.
        """
        _require("zone elevation", zone_elevation, air.LOWEST_ZONE, air.HIGHEST_ZONE, "m")
        _require("zone temperature", zone_temperature, air.COLDEST_ZONE, air.WARMEST_ZONE, "K")
        _require("altimeter setting", altimeter_setting, air.LOWEST_SETTING, air.HIGHEST_SETTING, "Pa")
        _require("dew point", dew_point, air.COLDEST_ZONE, air.WARMEST_ZONE, "K")
        height = air.geopotential_height(zone_elevation)
        setting = air.SEA_LEVEL_PRESSURE if altimeter_setting is None else altimeter_setting
        pressure = air.station_pressure(setting, height)
        standard = air.standard_temperature(height)
        temperature = standard if zone_temperature is None else zone_temperature
        vapour: Real = 0.0 if dew_point is None else air.vapour_pressure(dew_point)
        return cls(
            zone_elevation=zone_elevation,
            zone_height=height,
            zone_pressure=pressure,
            zone_temperature=temperature,
            temperature_offset=temperature - standard,
            vapour=vapour,
            vapour_ratio=vapour / pressure,
        )

    def temperature(self, altitude: Real) -> Real:
        """Give the temperature, K, at a geometric altitude above sea level, m, to 20 km."""
        return air.standard_temperature(air.geopotential_height(altitude)) + self.temperature_offset

    def pressure(self, altitude: Real) -> Real:
        """Give the pressure, Pa, at a geometric altitude above sea level, m, to 20 km."""
        height = air.geopotential_height(altitude)
        temperature = air.standard_temperature(height) + self.temperature_offset
        return air.hydrostatic_pressure(self.zone_pressure, self.zone_temperature, temperature, height)

    def density(self, altitude: Real) -> Real:
        """Give the density, kg/m3, at a geometric altitude above sea level, m, to 20 km."""
        height = air.geopotential_height(altitude)
        temperature = air.standard_temperature(height) + self.temperature_offset
        pressure = air.hydrostatic_pressure(self.zone_pressure, self.zone_temperature, temperature, height)
        return air.gas_density(pressure, self.vapour_ratio * pressure, temperature)

    @property
    def zone_density(self) -> Real:
        """Density at the zone, kg/m3."""
        return air.gas_density(self.zone_pressure, self.vapour, self.zone_temperature)

    @property
    def density_altitude(self) -> Real:
        """Geometric altitude, m, at which the standard air is as dense as the air at the zone."""
        return air.density_altitude(self.zone_density)

    def standard_mean_temperature(self, set_height: Real) -> Real:
        """Give the standard mean temperature, K, from the zone to a height above it, m, over 0."""
        return layer_mean_temperature(self.zone_height, air.geopotential_height(self.zone_elevation + set_height))

    def mean_temperature(self, set_height: Real) -> Real:
        """Give the mean temperature, K, from the zone to a height above it, m, over 0."""
        return self.standard_mean_temperature(set_height) + self.temperature_offset

    def true_height(self, set_height: Real) -> Real:
        """Give the true height above the zone, m, at which a pressure device set to a height over 0, m, acts."""
        return true_set_height(
            set_height, self.mean_temperature(set_height), self.standard_mean_temperature(set_height)
        )
