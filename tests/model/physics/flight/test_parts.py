"""The polynomials, the fitted density and the wind under the engine."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from model.physics.flight import Drop
from model.physics.flight.density import Air, air_between
from model.physics.flight.inputs import TROPOPAUSE, change_values
from model.physics.flight.lobatto import lobatto, root_after, values_at
from model.physics.flight.wind import Wind

from .cases import RIGS
from .reference import isa


@pytest.mark.parametrize("grade", [1, 2])
@pytest.mark.parametrize("count", [5, 7, 14])
def test_polynomials_are_integrated_and_differentiated_exactly(count: int, grade: int) -> None:
    nodes = lobatto(count, grade)
    tau, theta = nodes.tau[:, 0], (nodes.x + 1) / 2
    power = (count - 1) // grade - grade
    values = tau**power
    assert nodes.integral @ values == pytest.approx(tau ** (power + 1) / (power + 1), abs=1e-13)
    assert nodes.slope @ values == pytest.approx(
        power * grade * theta ** (power * grade - 1) if power else 0 * theta, abs=1e-10)
    at = np.array([0.37])
    assert values_at(nodes, at, values[:, None])[0] == pytest.approx(nodes.fraction(at) ** power, abs=1e-12)


def test_quadrature_weights_are_those_of_lobatto() -> None:
    # Derived: weights 1/6, 5/6, 5/6, 1/6 at -1, -1/sqrt 5, 1/sqrt 5, 1 for four nodes
    nodes = lobatto(4)
    assert nodes.x == pytest.approx([-1, -(5**-0.5), 5**-0.5, 1])
    assert nodes.integral[-1] * 2 == pytest.approx([1 / 6, 5 / 6, 5 / 6, 1 / 6])


def test_root_is_found_between_its_nodes() -> None:
    nodes = lobatto(14)
    roots = np.array([-0.9, -0.3, 0.02, 0.77])
    values = np.expm1(5 * (nodes.x[:, None] - roots))
    left = (values > 0).argmax(0) - 1
    assert root_after(nodes, values, left) == pytest.approx(roots, abs=2e-4)
    polynomial = (nodes.x[:, None] - roots) * (2 + nodes.x[:, None] ** 2)
    assert root_after(nodes, polynomial, left) == pytest.approx(roots, abs=1e-12)


@pytest.mark.parametrize(("low", "high"), [(-100, 500), (1500, 4700), (-100, 8000), (9900, 11000), (-100, 12000)])
def test_fitted_density(low: float, high: float) -> None:
    air = air_between(isa, low, high)
    z = np.linspace(low, high, 997)
    assert air(z) == pytest.approx(isa(z), rel=1e-8)
    out, scratch = np.empty_like(z), np.empty_like(z)
    assert air(z, out, scratch) is out
    assert out == pytest.approx(isa(z), rel=1e-8)
    assert air(np.array([low - 5000.0])) == pytest.approx(isa(air.low), rel=1e-8)


def test_a_density_without_a_close_polynomial_is_used_itself() -> None:
    air = Air(lambda z: 1 + 0.1 * np.sign(z - 100), 0, 500)
    assert air.coefficients is None
    assert air(np.array([50.0, 200.0])) == pytest.approx([0.9, 1.1])


def test_a_density_that_cannot_be_hashed() -> None:
    class Thin:
        __hash__ = None         # type: ignore[assignment]

        def __call__(self, z: np.ndarray) -> np.ndarray:
            return isa(z) / 2

    assert air_between(Thin(), 0, 500)(np.array([100.0])) == pytest.approx(isa(100.0) / 2)


def test_wind_by_layers_is_the_profile() -> None:
    winds = ((0.0, 4.0), (120.0, 9.0), (330.0, 7.0), (390.0, 15.0))
    heights = np.linspace(-50, 600, 131)
    drop = replace(RIGS[2], winds=winds, ground_altitude=1640.0, release_height=700.0, density_kinks=(1640.0 + 200,))
    drop = change_values(drop, lambda v: np.broadcast_to(np.asarray(v, float), heights.shape))
    wind = Wind(drop)
    assert wind.at(1640.0 + heights) == pytest.approx(np.interp(heights, *zip(*winds, strict=True)))
    assert len(wind.bottoms) == 6


def test_a_jump_of_the_wind_and_equal_winds() -> None:
    def arrays(winds: tuple[tuple[float, float], ...]) -> Drop:
        return change_values(replace(RIGS[2], winds=winds), lambda v: np.atleast_1d(np.asarray(v, float)))

    drop = arrays(((100.0, 4.0), (100.0, 9.0)))
    assert Wind(drop).at(np.array([50.0])) == 4.0
    assert Wind(drop).at(np.array([150.0])) == 9.0
    assert Wind(drop).at(np.array([100.05])) == pytest.approx(6.5)
    three = Wind(arrays(((0.0, 0.0), (0.0, 1.0), (0.01, 2.0))))
    assert three.tops[:, 0] == pytest.approx([0.2, 0.1, 0.0])
    even = arrays(((0.0, 4.0), (100.0, 4.0)))
    assert not Wind(even).layered
    assert Wind(even).at(np.array([50.0])) == 4.0


def test_tropopause() -> None:
    # U.S. Standard Atmosphere 1976: geopotential 11,000 m is 11,019.1 m geometric
    assert pytest.approx(11019.07, abs=0.01) == TROPOPAUSE
