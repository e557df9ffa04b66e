"""Snatch force, line convergence, design factor and ties against worked rows."""

from math import cos, degrees, radians

import pytest

from model.physics import strength

# derived: energy balance of two bodies on a spring (form of ASD-TR-61-579, from memory). Load kg, canopy kg, speed m/s,
# lines, strength N, stretch at break, length m; stiffness N/m, reduced mass kg, force N, stretch m, strain, line N.
SNATCH = [
    (1000, 60, 20, 64, 2000, 0.30, 15.5, 27526.882, 56.60377, 24964.979, 0.9069, 0.05851, 390.078),
    (90, 5, 15, 30, 1780, 0.30, 7.8, 22820.513, 4.73684, 4931.720, 0.2161, 0.02771, 164.391),
    (1000, 60, 20, 64, 4448.22, 0.25, 15.5, 73467.376, 56.60377, 40784.952, 0.5551, 0.03582, 637.265),
]  # fmt: skip


@pytest.mark.parametrize("row", SNATCH)
def test_snatch_rows(row: tuple[float, ...]) -> None:
    load, canopy, speed, lines, each, at_break, length, stiffness, reduced, force, stretch, strain, line = row
    k = strength.stretch_stiffness(lines, each, at_break, length)
    assert k == pytest.approx(stiffness, rel=1e-7)
    m = strength.reduced_mass(canopy, load)
    assert m == pytest.approx(reduced, abs=5e-6)
    snatch = strength.snatch_force(speed, k, m)
    assert snatch == pytest.approx(force, abs=2e-3)
    assert snatch / lines == pytest.approx(line, abs=1e-3)
    assert strength.snatch_stretch(speed, k, m) == pytest.approx(stretch, abs=5e-5)
    assert strength.snatch_stretch(speed, k, m) / length == pytest.approx(strain, abs=5e-6)


# derived: sin(phi) = 0.35 D0/L (inflated radius from memory of Knacke, NWC TP 6575, ch. 5).
@pytest.mark.parametrize(
    ("ratio", "angle", "factor"),
    [(0.8, 25.9445, 1.112077), (1.0, 20.4873, 1.067521), (1.2, 16.9578, 1.045456), (1.5, 13.4934, 1.028387)],
)
def test_line_convergence(ratio: float, angle: float, factor: float) -> None:
    phi = strength.line_angle(20.0, ratio * 20.0)
    assert degrees(phi) == pytest.approx(angle, abs=5e-5)
    assert 1.0 / cos(phi) == pytest.approx(factor, abs=5e-7)
    assert strength.line_load(64000.0, 1, 1.0, 64, phi) == pytest.approx(1000.0 * factor, abs=5e-4)


def test_line_convergence_of_a_35_ft_troop_canopy() -> None:
    # Maker's sheet: inflated diameter 25.7 ft, lines 25 ft 6 in, 30 lines of 400 lb; angle derived.
    phi = strength.line_angle(25.7 / 0.70, 25.5)
    assert degrees(phi) == pytest.approx(30.260, abs=5e-4)
    assert 1.0 / cos(phi) == pytest.approx(1.15774, abs=5e-6)
    assert strength.lines_strength(30, 400.0) == 12000.0


def test_design_factor_rows() -> None:
    # Form and usual factors from memory of Knacke, NWC TP 6575, ch. 6; values derived.
    assert strength.design_factor(1.5, 1.05, 0.80, 0.95, 0.95, 0.95) == pytest.approx(2.296253, abs=5e-7)
    assert strength.design_factor(1.5, 1.05, 0.80, 1.00, 0.95, 0.95) == pytest.approx(2.181440, abs=5e-7)
    # Lines as long as the canopy is wide: 1/cos(phi), rounded to 1.0675.
    assert 1.0 / cos(strength.line_angle(1.0, 1.0)) == pytest.approx(1.0675, abs=5e-5)
    assert strength.design_factor(1.5, 1.0675, 0.80, 0.95, 0.95, 0.95) == pytest.approx(2.334524, abs=5e-7)
    assert strength.design_factor(1.5, 1.0, 0.80, 1.00, 1.00, 0.95) == pytest.approx(1.973684, abs=5e-7)


def test_strength_each_line_needs() -> None:
    # derived: 17,692.5 lbf on 64 lines.
    factor = strength.design_factor(1.5, 1.05, 0.80, 0.95, 0.95, 0.95)
    assert strength.required_strength(17692.5, factor, 64) == pytest.approx(634.8, abs=0.05)


@pytest.mark.parametrize(
    ("strands", "each", "ideal", "knotted"),
    [(2, 80.0, 160.0, 96.0), (4, 80.0, 320.0, 192.0), (2, 550.0, 1100.0, 660.0)],
)
def test_turns_of_cotton_web_and_cord(strands: int, each: float, ideal: float, knotted: float) -> None:
    # 1/4 in cotton web 80 lb, type III cord 550 lb: FM 4-20.199 (2009), ch. 8; knot 0.60: common practice, no source.
    assert strength.tie_strength_most(strands, each) == ideal
    assert strength.tie_strength(strands, each, 0.60) == pytest.approx(knotted)


def test_load_of_a_line_at_a_wide_angle() -> None:
    # derived: 60 deg doubles an even share.
    assert strength.line_load(30000.0, 1, 1.0, 30, radians(60.0)) == pytest.approx(2000.0)
