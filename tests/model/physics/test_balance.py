import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.physics import balance

PLACES = st.floats(-20.0, 20.0)
PARTS = st.lists(st.tuples(st.floats(0.1, 5000.0), st.tuples(PLACES, PLACES, PLACES)), min_size=2, max_size=12)


def split(parts: list[tuple[float, tuple[float, float, float]]]) -> tuple[np.ndarray, np.ndarray]:
    return np.array([mass for mass, _ in parts]), np.array([point for _, point in parts])


@given(parts=PARTS)
def test_centre_balances_the_parts_and_lies_among_them(parts: list[tuple[float, tuple[float, float, float]]]) -> None:
    masses, points = split(parts)
    centre = balance.centre_of_gravity(masses, points)
    np.testing.assert_allclose(masses @ (points - centre), 0.0, atol=1e-9 * masses.sum() * 20.0)
    assert (centre >= points.min(axis=0) - 1e-9).all()
    assert (centre <= points.max(axis=0) + 1e-9).all()
    for axis in range(3):
        assert balance.centre_coordinate(float(masses @ points[:, axis]), float(masses.sum())) == pytest.approx(
            centre[axis], abs=1e-9
        )


@given(parts=PARTS, shift=st.tuples(PLACES, PLACES, PLACES))
def test_moving_everything_moves_the_centre_alike(
    parts: list[tuple[float, tuple[float, float, float]]], shift: tuple[float, float, float]
) -> None:
    masses, points = split(parts)
    moved = balance.centre_of_gravity(masses, points + np.array(shift))
    np.testing.assert_allclose(moved, balance.centre_of_gravity(masses, points) + np.array(shift), atol=1e-9)


@given(parts=PARTS)
def test_taking_parts_out_leaves_the_centre_of_the_others(
    parts: list[tuple[float, tuple[float, float, float]]],
) -> None:
    masses, points = split(parts)
    whole, centre = float(masses.sum()), balance.centre_of_gravity(masses, points)
    left, rest = balance.remove_parts(whole, centre, masses[1:], points[1:])
    share = left / whole  # taking out nearly everything magnifies rounding by as much
    assert left == pytest.approx(masses[0], rel=1e-9 / share)
    np.testing.assert_allclose(rest, points[0], atol=1e-11 / share)


def test_taking_nothing_out_changes_nothing() -> None:
    left, centre = balance.remove_parts(800.0, [1.0, 2.0, 3.0], [], [])
    assert left == 800.0
    np.testing.assert_allclose(centre, [1.0, 2.0, 3.0], rtol=1e-15)


def test_many_loads_at_once() -> None:
    masses = np.array([[1.0, 1.0], [1.0, 3.0]])
    points = np.array([[0.0, 0.0, 0.0], [4.0, 0.0, 2.0]])
    np.testing.assert_allclose(balance.centre_of_gravity(masses, points), [[2.0, 0.0, 1.0], [3.0, 0.0, 1.5]])


def test_parts_without_mass_have_no_centre() -> None:
    for masses, points in (([], np.empty((0, 3))), ([0.0, 0.0], np.zeros((2, 3)))):
        with pytest.raises(ValueError, match="without mass"):
            balance.centre_of_gravity(masses, points)


@pytest.mark.parametrize("gone", [[500.0], [300.0, 200.0], [600.0]])
def test_taking_everything_out_is_refused(gone: list[float]) -> None:
    with pytest.raises(ValueError, match="no mass is left"):
        balance.remove_parts(500.0, [0.0, 0.0, 0.0], gone, np.zeros((len(gone), 3)))


def test_outline_of_a_load() -> None:
    assert balance.height_over_underside(1.6, 0.025) == pytest.approx(1.625)
    assert balance.rigged_length(2.4, 0.1, 0.3) == pytest.approx(2.8)
    assert balance.slenderness(0.9, 1.2) == pytest.approx(0.75)
    assert balance.base_loading(1000.0, 2.0, 1.25) == pytest.approx(3922.66)
    assert balance.weighed_misfit(1010.0, 1000.0) == pytest.approx(0.01)
    assert balance.weighed_misfit(990.0, 1000.0) == pytest.approx(-0.01)
    assert balance.mass_per_canopy(1200.0, 3) == pytest.approx(400.0)


# derived: 28 lb/ft2 of base, the least loading of containers: 42 x 48 in 392 lb, 48 x 48 in 448 lb, 48 x 96 in 896 lb
@pytest.mark.parametrize(("length", "width", "pounds"), [(42.0, 48.0, 392.0), (48.0, 48.0, 448.0), (48.0, 96.0, 896.0)])
def test_base_loading_of_containers(length: float, width: float, pounds: float) -> None:
    loading = balance.base_loading(pounds * 0.45359237, length * 0.0254, width * 0.0254)
    assert loading / 47.88025898033584 == pytest.approx(28.0, rel=1e-9)
