"""The air: the standard atmosphere to 20 km, and the laws that the day's air and the airspeeds follow.

Altitudes are geometric metres above mean sea level, heights called ``H`` are geopotential metres. Constants are those
of the U.S. Standard Atmosphere 1976.
"""

from __future__ import annotations

import numpy as np

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real, real

SEA_LEVEL_TEMPERATURE = 288.15
"""Standard temperature at sea level, K."""
SEA_LEVEL_PRESSURE = 101325.0
"""Standard pressure at sea level, Pa."""
SEA_LEVEL_DENSITY = 1.225
"""Density that indicated airspeed is calibrated to, kg/m3."""
GAS_CONSTANT = 8314.32 / 28.9644
"""Gas constant of dry air, J/(kg K)."""
LAPSE = 0.0065
"""Fall of temperature with geopotential height below the tropopause, K/m."""
TROPOPAUSE = 11_000.0
"""Geopotential height of the tropopause, m."""
EARTH_RADIUS = 6_356_766.0
"""Radius that turns geometric into geopotential height, m."""
LOWEST_ZONE, HIGHEST_ZONE = -500.0, 9_000.0
"""Elevations of a drop zone that the day's air is made for, m."""
LOWEST_SETTING, HIGHEST_SETTING = 85_000.0, 110_000.0
"""Altimeter settings that it is made for, Pa; weather has not been seen outside 87,000 to 108,500."""
COLDEST_ZONE, WARMEST_ZONE = 180.0, 335.0
"""Temperatures and dew points at the zone that it is made for, K; weather has not been seen outside 184 to 330."""

_EXPONENT = CONSTANTS["g0"] / (GAS_CONSTANT * LAPSE)
_DECAY = CONSTANTS["g0"] / GAS_CONSTANT
_SOURCE = "U.S. Standard Atmosphere 1976"
_DERIVED = "derived from the U.S. Standard Atmosphere 1976"


@formula(
    "H = 6356766 z/(6356766 + z)",
    result="H | geopotential height | length",
    symbols={"altitude": "z | geometric altitude | length"},
    source=_SOURCE,
)
def geopotential_height(altitude: Real) -> Real:
    """Give the geopotential height, m, of a geometric altitude, m.

    Source: U.S. Standard Atmosphere 1976.
    """
    return EARTH_RADIUS * altitude / (EARTH_RADIUS + altitude)


@formula(
    "z = 6356766 H/(6356766 - H)",
    result="z | geometric altitude | length",
    symbols={"height": "H | geopotential height | length"},
    source=_SOURCE,
)
def geometric_altitude(height: Real) -> Real:
    """Give the geometric altitude, m, of a geopotential height, m.

    Source: U.S. Standard Atmosphere 1976.
    """
    return EARTH_RADIUS * height / (EARTH_RADIUS - height)


@formula(
    "T = 288.15 - 0.0065 min(H, 11000)",
    result="T | standard temperature | temperature",
    symbols={"height": "H | geopotential height | length"},
    source=_SOURCE,
    holds="to 20 km",
)
def standard_temperature(height: Real) -> Real:
    """Give the standard temperature, K, at a geopotential height, m, to 20 km.

    Source: U.S. Standard Atmosphere 1976.
    """
    return SEA_LEVEL_TEMPERATURE - LAPSE * real(np.minimum(height, TROPOPAUSE))


@formula(
    "p = pz (T/Tz)^5.255876113 exp(-0.03416319474 max(H - 11000, 0)/T)",
    result="p | pressure | pressure",
    symbols={
        "zone_pressure": "pz | pressure at the zone | pressure",
        "zone_temperature": "Tz | temperature at the zone | temperature",
        "temperature": "T | temperature at the height | temperature",
        "height": "H | geopotential height | length",
    },
    source=_DERIVED,
    holds="to 20 km, from a zone below 11 km, temperature standard plus one offset",
    leaves_out="the lightness of moist air in the weight of the column",
)
def hydrostatic_pressure(zone_pressure: Real, zone_temperature: Real, temperature: Real, height: Real) -> Real:
    """Give the pressure, Pa, at a geopotential height, m, above or below a place of known pressure.

    The temperature falls by the standard lapse to 11 km and stays from there on, each moved by the same offset, so the
    hydrostatic equation integrates exactly: a power below the tropopause, an exponential above it.

    Args:
        zone_pressure: Pressure at the known place, Pa; the place lies below 11 km.
        zone_temperature: Temperature there, K.
        temperature: Temperature at the height asked for, K.
        height: Geopotential height asked for, m.

    Returns:
        Pressure, Pa. Source: derived from the U.S. Standard Atmosphere 1976.
    """
    pressure = zone_pressure * (temperature / zone_temperature) ** _EXPONENT
    above = real(np.maximum(height - TROPOPAUSE, 0.0))
    if not np.any(above):  # the flight calls this often and nearly always below the tropopause
        return pressure
    return pressure * real(np.exp(-_DECAY * above / temperature))


@formula(
    "pz = 101325 max(0, (Q/101325)^0.1902632365 - 0.0065 H/288.15)^5.255876113",
    result="pz | pressure at the zone | pressure",
    symbols={
        "altimeter_setting": "Q | altimeter setting | pressure",
        "height": "H | geopotential height of the zone | length",
    },
    source=_DERIVED,
    holds="below 11 km",
)
def station_pressure(altimeter_setting: Real, height: Real) -> Real:
    """Give the pressure, Pa, at a place whose altimeter setting, Pa, is known.

    An altimeter set to the setting shows the place's elevation there, by the standard atmosphere's pressure law.

    Args:
        altimeter_setting: Altimeter setting, Pa.
        height: Geopotential height of the place, m, below 11 km.

    Returns:
        Pressure, Pa; 0 where the setting cannot belong to that height. Source: derived from the U.S. Standard
        Atmosphere 1976.
    """
    ratio = (altimeter_setting / SEA_LEVEL_PRESSURE) ** (1.0 / _EXPONENT)
    return SEA_LEVEL_PRESSURE * real(np.maximum(0.0, ratio - LAPSE * height / SEA_LEVEL_TEMPERATURE)) ** _EXPONENT


@formula(
    "e = 611.21 exp(17.502 (Td - 273.15)/(Td - 32.18))",
    result="e | vapour pressure | pressure",
    symbols={"dew_point": "Td | dew point | temperature"},
    source="Buck 1981, saturation over water",
    holds="-40 to 50 °C",
)
def vapour_pressure(dew_point: Real) -> Real:
    """Give the vapour pressure, Pa, of air with a dew point, K.

    Source: Buck 1981, Journal of Applied Meteorology 20, saturation over water; 240.97 °C - 273.15 = 32.18 K below.
    """
    return 611.21 * real(np.exp(17.502 * (dew_point - 273.15) / (dew_point - 32.18)))


@formula(
    "rho = (p - 0.378 e)/(287.0530720 T)",
    result="rho | air density | density",
    symbols={
        "pressure": "p | pressure | pressure",
        "vapour": "e | vapour pressure | pressure",
        "temperature": "T | temperature | temperature",
    },
    source="ideal gas law, water vapour at 0.622 of the weight of dry air",
)
def gas_density(pressure: Real, vapour: Real, temperature: Real) -> Real:
    """Give the density, kg/m3, of moist air.

    Args:
        pressure: Pressure of the air with its vapour, Pa.
        vapour: Pressure of the vapour alone, Pa; 0 for dry air.
        temperature: Temperature, K.

    Returns:
        Density, kg/m3. Source: ideal gas law.
    """
    return (pressure - 0.378 * vapour) / (GAS_CONSTANT * temperature)


def standard_pressure(height: Real) -> Real:
    """Give the standard pressure, Pa, at a geopotential height, m, to 20 km.

    Source: U.S. Standard Atmosphere 1976.
    """
    return hydrostatic_pressure(SEA_LEVEL_PRESSURE, SEA_LEVEL_TEMPERATURE, standard_temperature(height), height)


def standard_density(altitude: Real) -> Real:
    """Give the standard density, kg/m3, at a geometric altitude, m, to 20 km.

    Source: U.S. Standard Atmosphere 1976.
    """
    height = geopotential_height(altitude)
    return gas_density(standard_pressure(height), 0.0, standard_temperature(height))


@formula(
    "H = min(44330.76923 (1 - (rho/1.224999156)^0.2349692457), 11000 - 6341.620029 ln(rho/0.3639177759))",
    result="H | geopotential height of that standard density | length",
    symbols={"density": "rho | air density | density"},
    source=_DERIVED,
    holds="to 20 km",
)
def density_height(density: Real) -> Real:
    """Give the geopotential height, m, at which the standard air has a density, kg/m3.

    The inverse of the standard density, one closed form each below and above the tropopause; the lower of the two is
    the right one on both sides. Density above 0.088 kg/m3 (20 km).

    Source: derived from the U.S. Standard Atmosphere 1976.
    """
    below = (SEA_LEVEL_TEMPERATURE / LAPSE) * (1.0 - (density / _SEA_LEVEL_RHO) ** (1.0 / (_EXPONENT - 1.0)))
    above = TROPOPAUSE - _TROPOPAUSE_TEMPERATURE / _DECAY * real(np.log(density / _TROPOPAUSE_RHO))
    return real(np.minimum(below, above))


def density_altitude(density: Real) -> Real:
    """Give the geometric altitude, m, at which the standard air has a density, kg/m3, to 20 km.

    Source: derived from the U.S. Standard Atmosphere 1976.
    """
    return geometric_altitude(density_height(density))


@formula(
    "V = Vi sqrt(1.225/rho)",
    result="V | true airspeed | speed",
    symbols={"indicated": "Vi | indicated airspeed | speed", "density": "rho | air density | density"},
    source="definition of equivalent airspeed",
    leaves_out="instrument and position error, compressibility",
)
def true_airspeed(indicated: Real, density: Real) -> Real:
    """Give the true airspeed, m/s, of an indicated airspeed, m/s, in air of a density, kg/m3.

    Source: definition of equivalent airspeed.
    """
    return indicated * real(np.sqrt(SEA_LEVEL_DENSITY / density))


@formula(
    "Ve = V sqrt(rho/1.225)",
    result="Ve | equivalent airspeed | speed",
    symbols={"speed": "V | true airspeed | speed", "density": "rho | air density | density"},
    source="definition of equivalent airspeed",
)
def equivalent_airspeed(speed: Real, density: Real) -> Real:
    """Give the equivalent airspeed, m/s, of a true airspeed, m/s, in air of a density, kg/m3.

    Source: definition of equivalent airspeed.
    """
    return speed * real(np.sqrt(density / SEA_LEVEL_DENSITY))


_TROPOPAUSE_TEMPERATURE = float(standard_temperature(TROPOPAUSE))
_TROPOPAUSE_RHO = float(gas_density(standard_pressure(TROPOPAUSE), 0.0, _TROPOPAUSE_TEMPERATURE))
_SEA_LEVEL_RHO = float(standard_density(0.0))
