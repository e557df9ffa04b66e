"""Measured figures beside the estimates they replace."""

from math import pi, sqrt
from pathlib import Path

import pytest

from model.checks.checklist import check
from model.study.measured import comparisons, without_measured

RIGS = Path(__file__).parents[3] / "rigs"


def _found():
    case = check(RIGS / "10-measured-water.toml").details
    return case, {one.name.split(",")[0]: one for one in comparisons(case)}


def test_the_rate_is_compared_at_the_mass_and_density_it_was_measured_at():
    case, found = _found()
    canopy = case.rig.canopy[0]
    measured = canopy.measured
    area = canopy.drag_coefficient.value * pi * canopy.diameter.value**2 / 4 if canopy.drag_coefficient else None
    one = found["rate of descent"]
    assert one.measured.value == measured.rate.value
    if area is not None:
        by_hand = sqrt(2 * measured.rate_mass.value * 9.80665 / (measured.rate_density.value * area))
        assert one.estimate.value == pytest.approx(by_hand, rel=1e-12)
    assert one.ratio == one.estimate.value / one.measured.value


def test_the_estimate_is_what_the_rig_gives_without_the_measured_force():
    case, found = _found()
    plain = without_measured(case)
    assert found["opening force"].estimate.value == plain.forces.of_row(plain.rows[0]).value
    assert found["opening force"].measured.value == case.rig.canopy[0].measured.opening_force.value


def test_every_comparison_names_its_source():
    _, found = _found()
    assert {"rate of descent", "filling time 1", "opening force"} <= set(found)
    assert all(one.source for one in found.values())


def test_a_rig_with_nothing_measured_has_none():
    assert comparisons(check(RIGS / "05-pump-warm.toml").details) == ()


def test_a_figure_measured_far_from_this_mass_is_marked_unused():
    case, _ = _found()
    canopy = case.rig.canopy[0]
    heavy = canopy.measured.rate_mass.__class__
    mass = canopy.measured.rate_mass
    far = heavy(mass.value * 2, mass.dimension, mass.unit)
    measured = canopy.measured.model_copy(update={"rate_mass": far, "opening_force_mass": far})
    rig = case.rig.model_copy(update={"canopy": (canopy.model_copy(update={"measured": measured}),)})
    found = {one.name.split(",")[0]: one for one in comparisons(type(case)(rig, case.limits))}
    assert not found["rate of descent"].used
    assert not found["opening force"].used
