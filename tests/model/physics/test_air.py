import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.integrate import solve_ivp

from model.physics import air
from model.physics.day_air import DayAir, dew_point_over, layer_mean_temperature

ELEVATIONS = st.floats(air.LOWEST_ZONE, 4500.0)
DAYS = st.builds(
    DayAir.at,
    zone_elevation=ELEVATIONS,
    zone_temperature=st.none() | st.floats(233.0, 323.0),
    altimeter_setting=st.none() | st.floats(92_000.0, 107_000.0),
    dew_point=st.none() | st.floats(213.0, 303.0),
)


@given(elevation=st.floats(air.LOWEST_ZONE, air.HIGHEST_ZONE), altitude=st.floats(-500.0, 20_000.0))
def test_day_air_of_a_standard_day_is_standard_air_to_rounding(elevation: float, altitude: float) -> None:
    day = DayAir.at(elevation)
    height = air.geopotential_height(altitude)
    assert day.density(altitude) == pytest.approx(air.standard_density(altitude), rel=1e-13)
    assert day.pressure(altitude) == pytest.approx(air.standard_pressure(height), rel=1e-13)
    assert day.temperature(altitude) == air.standard_temperature(height)
    assert day.zone_density == pytest.approx(air.standard_density(elevation), rel=1e-13)
    assert day.density_altitude == pytest.approx(elevation, abs=1e-7)


@pytest.mark.parametrize("temperature", [248.0, 288.15, 315.0])
@pytest.mark.parametrize("dew_point", [None, 245.0])
def test_pressure_aloft_meets_the_hydrostatic_equation(temperature: float, dew_point: float | None) -> None:
    # derived: dp/dH = -g0 p/(R T) integrated numerically at rtol 1e-12, from the zone up past the tropopause and down
    day = DayAir.at(820.0, temperature, 99_400.0, dew_point)
    start = float(day.zone_height)

    def slope(height: float, pressure: np.ndarray) -> np.ndarray:
        there = day.temperature(air.geometric_altitude(height))
        return -9.80665 * pressure / (air.GAS_CONSTANT * there)

    up = solve_ivp(slope, (start, 11_000.0), [day.zone_pressure], rtol=1e-12, atol=1e-9, method="DOP853")
    further = solve_ivp(slope, (11_000.0, 19_000.0), up.y[:, -1], rtol=1e-12, atol=1e-9, method="DOP853")
    down = solve_ivp(slope, (start, -500.0), [day.zone_pressure], rtol=1e-12, atol=1e-9, method="DOP853")
    for height, pressure in ((11_000.0, up.y[0, -1]), (19_000.0, further.y[0, -1]), (-500.0, down.y[0, -1])):
        altitude = air.geometric_altitude(height)
        assert day.pressure(altitude) == pytest.approx(pressure, rel=1e-9)
        vapour = day.vapour_ratio * day.pressure(altitude)
        by_hand = (day.pressure(altitude) - 0.378 * vapour) / (air.GAS_CONSTANT * day.temperature(altitude))
        assert day.density(altitude) == pytest.approx(by_hand, rel=1e-13)


@given(day=DAYS, low=st.floats(-500.0, 15_000.0), up=st.floats(1.0, 5000.0))
def test_day_air_thins_with_height_and_has_no_holes(day: DayAir, low: float, up: float) -> None:
    lower, higher = day.density(low), day.density(low + up)
    assert np.isfinite([lower, higher]).all()
    assert lower > higher > 0.0
    assert day.pressure(low) > day.pressure(low + up) > 0.0


@given(day=DAYS)
def test_day_air_at_the_zone_is_what_was_reported(day: DayAir) -> None:
    assert day.temperature(day.zone_elevation) == pytest.approx(day.zone_temperature, rel=1e-14)
    assert day.pressure(day.zone_elevation) == pytest.approx(day.zone_pressure, rel=1e-14)
    assert day.density(day.zone_elevation) == pytest.approx(day.zone_density, rel=1e-13)


@given(day=DAYS, temperature=st.floats(0.5, 10.0))
def test_hotter_moister_or_lower_pressure_means_thinner_air(day: DayAir, temperature: float) -> None:
    dry = DayAir.at(day.zone_elevation, day.zone_temperature, 100_000.0)
    assert DayAir.at(day.zone_elevation, day.zone_temperature + temperature, 100_000.0).zone_density < dry.zone_density
    assert DayAir.at(day.zone_elevation, day.zone_temperature, 99_000.0).zone_density < dry.zone_density
    assert DayAir.at(day.zone_elevation, day.zone_temperature, 100_000.0, 260.0).zone_density < dry.zone_density


@given(altitude=st.floats(-1000.0, 20_000.0))
def test_density_altitude_undoes_the_standard_density(altitude: float) -> None:
    assert air.density_altitude(air.standard_density(altitude)) == pytest.approx(altitude, abs=1e-6)


@given(altitude=st.floats(-1000.0, 20_000.0))
def test_geometric_altitude_undoes_the_geopotential_height(altitude: float) -> None:
    assert air.geometric_altitude(air.geopotential_height(altitude)) == pytest.approx(altitude, abs=1e-8)


@given(speed=st.floats(1.0, 150.0), altitude=st.floats(-500.0, 12_000.0))
def test_equivalent_airspeed_undoes_the_true_airspeed(speed: float, altitude: float) -> None:
    density = air.standard_density(altitude)
    assert air.equivalent_airspeed(air.true_airspeed(speed, density), density) == pytest.approx(speed, rel=1e-13)


def test_altimeter_setting_of_the_standard_day_gives_standard_pressure() -> None:
    for height in (-400.0, 0.0, 1500.0, 8000.0):
        assert air.station_pressure(101_325.0, height) == pytest.approx(air.standard_pressure(height), rel=1e-14)
    assert air.station_pressure(100_900.0, 0.0) == pytest.approx(100_900.0, rel=1e-14)


def test_arrays_of_altitudes_and_of_days_broadcast() -> None:
    altitudes = np.array([-300.0, 0.0, 4000.0, 10_900.0, 11_100.0, 18_000.0])
    day = DayAir.at(500.0, 303.15, 100_500.0, 285.0)
    np.testing.assert_allclose(day.density(altitudes), [day.density(float(z)) for z in altitudes], rtol=1e-14)
    temperatures = np.array([[283.0], [303.15]])
    many = DayAir.at(500.0, temperatures, 100_500.0, 285.0)
    assert many.density(altitudes).shape == (2, 6)
    np.testing.assert_allclose(many.density(altitudes)[1], day.density(altitudes), rtol=1e-14)


def test_standard_mean_of_a_layer_is_the_mean_of_its_temperatures() -> None:
    for low, high in ((-300.0, 200.0), (1500.0, 9000.0), (9000.0, 13_000.0), (12_000.0, 15_000.0)):
        heights = np.linspace(low, high, 200_001)
        mean = np.mean((air.standard_temperature(heights[1:]) + air.standard_temperature(heights[:-1])) / 2.0)
        assert layer_mean_temperature(low, high) == pytest.approx(mean, abs=1e-7)


@given(day=DAYS, set_height=st.floats(10.0, 3000.0))
def test_pressure_device_acts_high_in_warm_air_and_low_in_cold(day: DayAir, set_height: float) -> None:
    true = day.true_height(set_height)
    assert np.isfinite(true)
    assert np.sign(true - set_height) == np.sign(day.temperature_offset) or abs(day.temperature_offset) < 1e-9
    assert day.mean_temperature(set_height) - day.standard_mean_temperature(set_height) == pytest.approx(
        day.temperature_offset, abs=1e-9
    )


NAN, INF = float("nan"), float("inf")


@pytest.mark.parametrize(
    ("field", "value"),
    [
        *(("zone_elevation", value) for value in (-501.0, 9001.0, INF, -INF, NAN)),
        *(("zone_temperature", value) for value in (28.0, 0.0, -5.0, 400.0, NAN)),
        *(("altimeter_setting", value) for value in (1009.0, 29.92, 0.0, -1.0, 1.5e5, INF, NAN)),
        *(("dew_point", value) for value in (14.0, 32.18, 0.0, 500.0, NAN)),
    ],
)
def test_what_is_no_weather_is_refused_by_name(field: str, value: float) -> None:
    with pytest.raises(ValueError, match=field.replace("_", " ")):
        DayAir.at(**{"zone_elevation": 100.0, field: value})


@given(
    elevation=st.floats(air.LOWEST_ZONE, air.HIGHEST_ZONE),
    setting=st.floats(air.LOWEST_SETTING, air.HIGHEST_SETTING),
    temperature=st.floats(air.COLDEST_ZONE, air.WARMEST_ZONE),
    dryness=st.floats(0.0, 1.0),
    altitude=st.floats(-500.0, 20_000.0),
)
def test_all_that_is_taken_gives_air(
    elevation: float, setting: float, temperature: float, dryness: float, altitude: float
) -> None:
    dew_point = air.COLDEST_ZONE + dryness * (temperature - air.COLDEST_ZONE)
    day = DayAir.at(elevation, temperature, setting, dew_point)
    values = (day.density(altitude), day.pressure(altitude), day.zone_density, day.zone_pressure)
    assert np.isfinite(values).all()
    assert np.isfinite(day.density_altitude)
    assert day.zone_pressure > day.vapour > 0.0


def test_dew_point_over_the_temperature_is_seen() -> None:
    assert dew_point_over(290.0, 289.9)
    assert not dew_point_over(289.9, 289.9)
    assert not dew_point_over(280.0, 289.9)


def test_saturated_air_at_the_temperature_has_the_vapour_of_its_dew_point() -> None:
    day = DayAir.at(0.0, 293.15, dew_point=293.15)
    assert day.vapour == air.vapour_pressure(293.15)
    assert day.vapour_ratio == pytest.approx(day.vapour / 101_325.0, rel=1e-14)
