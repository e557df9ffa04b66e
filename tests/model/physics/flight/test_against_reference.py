"""The engine against a plain integration of the same equations (derived: Runge-Kutta of order 8, rtol 1e-12)."""

from __future__ import annotations

import pytest

from model.physics.flight import Drop, FillingRule

from .cases import RIGS, cloud, features, torture
from .compare import differences, missed
from .reference import pick

RULES: tuple[FillingRule, ...] = ("time", "distance")
FEATURES = dict(features())


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize("number", RIGS)
def test_rigs(number: int, rule: FillingRule) -> None:
    assert missed(differences(RIGS[number], rule, [0])) == {}


@pytest.mark.parametrize(("number", "name"), list(enumerate(FEATURES)))
def test_features(number: int, name: str) -> None:
    # the rules in turn; tests/benchmarks/engine_accuracy.py runs both
    assert missed(differences(FEATURES[name], RULES[number % 2], [0])) == {}


@pytest.mark.parametrize(("name", "rule"), [
    ("drogue stays, reefed main at a height", "time"),
    ("main at a height while the drogue fills, which stays", "distance"),
    ("static line, wind in layers", "time"), ("three stages", "distance"),
])
def test_features_in_a_cloud(name: str, rule: FillingRule) -> None:
    assert missed(differences(cloud(FEATURES[name], 40, 1), rule, [7])) == {}


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize("exponent", [0.5, 0.75, 1.0, 1.2, 1.5, 2.0, 3.0, 6.0])
def test_very_unlike_cases(exponent: float, rule: FillingRule) -> None:
    drop: Drop = torture(exponent, 100, int(10 * exponent))
    case = int(7 * exponent)
    if rule == "time":      # one alone, one in a batch
        assert missed(differences(pick(drop, case), rule, [0])) == {}
    else:
        assert missed(differences(drop, rule, [case])) == {}
