"""The standard air against an outside library and against printed tables; the day's air against field rules."""

import fluids
import numpy as np
import pytest

from model.physics import air
from model.physics.day_air import DayAir

FOOT = 0.3048
SLUG_PER_CUBIC_FOOT = 515.378819

ALTITUDES = [*np.linspace(-500.0, 20_000.0, 83), 10_999.0, 11_001.0, 11_018.9, 11_019.2]


@pytest.mark.parametrize("altitude", ALTITUDES)
def test_standard_air_is_that_of_an_outside_library(altitude: float) -> None:
    # fluids 1.3 (Caleb Bell), ATMOSPHERE_1976: takes geometric altitude
    outside = fluids.ATMOSPHERE_1976(altitude)
    height = air.geopotential_height(altitude)
    assert air.standard_density(altitude) == pytest.approx(outside.rho, rel=5e-6)
    assert air.standard_pressure(height) == pytest.approx(outside.P, rel=5e-6)
    assert air.standard_temperature(height) == pytest.approx(outside.T, rel=5e-6)


# Derived from the layer table of the U.S. Standard Atmosphere 1976, by geometric altitude: T K, p Pa, density kg/m3,
# speed over speed at sea level; all but the pressures to the digits printed there
TABLE = [
    (-500, 291.400, 107478, 1.28490, 0.976414),
    (0, 288.150, 101325, 1.22500, 1.0),
    (500, 284.900, 95461.3, 1.16727, 1.02443),
    (1000, 281.651, 89876.3, 1.11166, 1.04974),
    (1500, 278.402, 84559.7, 1.05810, 1.07598),
    (2000, 275.154, 79501.4, 1.00655, 1.10319),
    (3000, 268.659, 70121.1, 0.909254, 1.16071),
    (4000, 262.166, 61660.4, 0.819347, 1.22274),
    (5000, 255.676, 54048.3, 0.736429, 1.28974),
    (6000, 249.187, 47217.6, 0.660111, 1.36226),
    (8000, 236.215, 35651.6, 0.525786, 1.52638),
    (10000, 223.252, 26499.9, 0.413510, 1.72117),
    (11000, 216.774, 22699.9, 0.364801, 1.83248),
    (12000, 216.650, 19399.4, 0.311938, 1.98168),
    (15000, 216.650, 12111.8, 0.194755, 2.50798),
    (20000, 216.650, 5529.30, 0.0889098, 3.71187),
]


def half_a_unit(printed: str) -> float:
    """Half a unit of the last digit of a printed number."""
    mantissa, _, _ = printed.partition("e")
    return 0.5 * 10.0 ** -len(mantissa.partition(".")[2])


@pytest.mark.parametrize(("altitude", "temperature", "pressure", "density", "factor"), TABLE)
def test_standard_air_by_geometric_altitude(
    altitude: float, temperature: float, pressure: float, density: float, factor: float
) -> None:
    height = air.geopotential_height(altitude)
    assert air.standard_temperature(height) == pytest.approx(temperature, abs=0.0006)
    assert air.standard_pressure(height) == pytest.approx(pressure, rel=5e-6)
    assert air.standard_density(altitude) == pytest.approx(density, rel=5e-6)
    assert np.sqrt(air.standard_density(0.0) / air.standard_density(altitude)) == pytest.approx(factor, rel=6e-6)


# U.S. Standard Atmosphere 1976, layer bounds by geopotential height, as printed: T K, p mbar, density kg/m3
@pytest.mark.parametrize(
    ("height", "temperature", "pressure", "density"),
    [(0.0, "288.150", "1013.25", "1.2250"), (11_000.0, "216.650", "226.32", "0.36392"),
     (20_000.0, "216.650", "54.748", "0.088035")],
)  # fmt: skip
def test_standard_air_at_the_printed_layer_bounds(height: float, temperature: str, pressure: str, density: str) -> None:
    altitude = air.geometric_altitude(height)
    got = (
        air.standard_temperature(height),
        air.standard_pressure(height) / 100.0,
        air.standard_density(altitude),
    )
    for value, printed in zip(got, (temperature, pressure, density), strict=True):
        # 54.7489 mbar is printed cut, not rounded: 54.748
        assert abs(value - float(printed)) <= half_a_unit(printed) * (2.0 if printed == "54.748" else 1.0)


# Standard atmosphere tables in feet and slug/ft3, as printed to four figures (abbess.com; engineeringtoolbox.com),
# and the 1976 closed form in more digits
@pytest.mark.parametrize(
    ("feet", "printed"),
    [(0, "0.002378"), (1000, "0.002309"), (4000, "0.002112"), (5000, "0.002049"), (10000, "0.001756"),
     (15000, "0.001496"), (20000, "0.001267")],
)  # fmt: skip
def test_standard_density_in_feet_as_printed(feet: float, printed: str) -> None:
    got = air.standard_density(feet * FOOT) / SLUG_PER_CUBIC_FOOT
    # these sheets round 0.0023769 up to 0.002378, so a whole unit of their last digit is allowed, plus its share
    assert abs(got - float(printed)) <= 1.2e-6


@pytest.mark.parametrize(
    ("feet", "printed"), [(5000, 20.48), (10000, 17.56), (15000, 14.96), (20000, 12.67), (25000, 10.66), (30000, 8.91)]
)
def test_standard_density_in_feet_of_a_second_sheet(feet: float, printed: float) -> None:
    assert abs(air.standard_density(feet * FOOT) / SLUG_PER_CUBIC_FOOT * 1e4 - printed) <= 0.0055


@pytest.mark.parametrize(
    ("feet", "density"),
    [(0, 0.002376892), (1000, 0.002308118), (2500, 0.002207836), (5000, 0.002048172), (7500, 0.001897531),
     (10000, 0.00175555), (15000, 0.001496156), (20000, 0.001267258), (25000, 0.001066258), (30000, 0.0008906857)],
)  # fmt: skip
def test_standard_density_in_feet_of_the_closed_form(feet: float, density: float) -> None:
    # derived from the 1976 layer table, with 1.225 kg/m3 at sea level: 7e-7 over the gas law's value
    assert air.standard_density(feet * FOOT) / SLUG_PER_CUBIC_FOOT == pytest.approx(density, rel=1.5e-6)


def test_troposphere_law_printed_for_balloons() -> None:
    # UCSC balloon outreach, U.S. Standard Atmosphere 1976: rho = rho0 (1 - h/44329 m)^4.255876, h geopotential
    for height in (0.0, 1500.0, 3000.0, 8000.0):
        altitude = air.geometric_altitude(height)
        assert air.standard_density(altitude) == pytest.approx(1.225 * (1 - height / 44329) ** 4.255876, rel=4e-5)


def test_geometric_altitude_is_not_geopotential() -> None:
    # derived: the density off by taking one for the other, 1.5e-5 at 1 km, 4.3e-4 at 5 km, 1.2e-3 at 8 km
    for altitude, off in ((1000.0, 1.5e-5), (5000.0, 4.3e-4), (8000.0, 1.2e-3)):
        mistaken = air.standard_density(air.geometric_altitude(altitude))
        assert air.standard_density(altitude) / mistaken - 1.0 == pytest.approx(off, rel=0.05)


@pytest.mark.parametrize("celsius", [-40.0, -10.0, 0.0, 10.0, 20.0, 30.0, 45.0])
def test_vapour_pressure_is_near_other_published_laws(celsius: float) -> None:
    # WMO-No. 8 (2008), annex 4.B, over water: e = 6.112 hPa exp(17.62 t/(243.12 + t)) (from memory)
    other = 611.2 * np.exp(17.62 * celsius / (243.12 + celsius))
    assert air.vapour_pressure(celsius + 273.15) == pytest.approx(other, rel=0.015)


def test_saturated_warm_air_is_one_percent_lighter() -> None:
    # common practice, no source: virtual temperature T/(1 - 0.378 e/p); 25 °C saturated at sea level, 1.2 % lighter
    dry = DayAir.at(0.0, zone_temperature=298.15)
    moist = DayAir.at(0.0, zone_temperature=298.15, dew_point=298.15)
    assert moist.zone_density / dry.zone_density == pytest.approx(1.0 - 0.378 * 3169.0 / 101325.0, rel=1e-4)


@pytest.mark.parametrize(
    ("setting", "elevation", "station"), [(102_500.0, 1000.0, 90_946.0), (100_900.0, 500.0, 95_057.0)]
)
def test_station_pressure_by_hydrostatic_steps(setting: float, elevation: float, station: float) -> None:
    # derived: standard atmosphere shifted so that the altimeter shows the elevation: find its height by bisection
    low, high = -1000.0, 2000.0
    height = air.geopotential_height(elevation)
    for _ in range(60):  # the altitude of the setting's pressure in the standard air
        middle = (low + high) / 2.0
        low, high = (middle, high) if air.standard_pressure(middle) > setting else (low, middle)
    assert air.station_pressure(setting, height) == pytest.approx(air.standard_pressure(low + height), rel=1e-9)
    assert air.station_pressure(setting, height) == pytest.approx(station, rel=1e-3)
