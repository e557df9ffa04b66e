"""Limit sets: mistakes in them, and bounds in the dimension of their step."""

# ruff: noqa: E501 - one mistake a line: what is changed, where it is found, what the message says

from pathlib import Path

import pytest

from model.quantity import Dimension, QuantityError
from model.rig.errors import InputError, InputProblem
from model.rig.limits import LimitFile, bound, resolve
from model.rig.reading import read_limits
from tests.model.rig import samples

DIMENSIONS = {
    "descent.rate": Dimension.SPEED,
    "opening.load_factor": Dimension.ACCELERATION,
    "suspension.leg": Dimension.NUMBER,
    "landing.overturn": Dimension.NUMBER,
    "opening.canopy": Dimension.NUMBER,
    "service.age": Dimension.TIME,
    "balance.forward": Dimension.LENGTH,
}


def read(folder: Path, old: str = "", new: str = "") -> LimitFile:
    assert not old or samples.LIMITS.count(old) == 1
    path = folder / "set.toml"
    path.write_text(samples.LIMITS.replace(old, new) if old else samples.LIMITS, encoding="utf-8")
    return read_limits(path)


def mistakes(error: InputError) -> list[tuple[str, str]]:
    return [(problem.path, problem.message) for problem in error.problems]


RATE = '"descent.rate" = { max = "28.5 ft/s", source = "house rule 4" }'


@pytest.mark.parametrize(
    ("old", "new", "path", "words"),
    [
        (RATE, '"descent.rate" = { max = "28.5 ft/s" }', 'limits."descent.rate"', "a bound without a source, expected the key source"),
        (RATE, '"descent.rate" = { max = "28.5 ft/s", source = "" }', 'limits."descent.rate".source', "empty"),
        (RATE, '"descent.rate" = {}', 'limits."descent.rate"', "a limit that says nothing"),
        (RATE, '"descent.rate" = { source = "x" }', 'limits."descent.rate"', "a limit that says nothing"),
        (RATE, '"descent.rate" = "28.5 ft/s"', 'limits."descent.rate"', 'found "28.5 ft/s", expected a table'),
        (RATE, '"descent.rate" = { max = true, source = "x" }', 'limits."descent.rate".max', "found true, expected a value with its unit in quotes, or a plain number"),
        (RATE, '"descent.rate" = { maxx = "1 m", source = "x", min = "1 m" }', 'limits."descent.rate".maxx', 'did you mean "max"?'),
        (RATE, '"descent.rate" = { judged = "no" }', 'limits."descent.rate".judged', 'found "no", expected true or false'),
        ("forward = 3.0", 'forward = "3 g"', "restraint.forward", "found"),
        ("forward = 3.0", "forward = -3.0", "restraint.forward", "a multiple of weight, 0 or over"),
        ("forward = 3.0", 'forward = "3.0 ± 0.1"', "restraint.forward", "without a tolerance"),
        ('source = "house rule 7"', "", "restraint.source", "required"),
        ('name = "Tarn relief, low velocity"', "", "set.name", "required"),
        ('key = "lashing.tails"', 'key = "canopy.bag_ties"', "inspection 2 (canopy.bag_ties).key", "a key that no other row has"),
        ('key = "lashing.tails"', 'key = "tails"', "inspection 2 (tails).key", "a key of group and name"),
        ('key = "lashing.tails"', 'key = "lashing.two tails"', "inspection 2 (lashing.two tails).key", "a key of group and name"),
        ('key = "lashing.tails"', "key = 3", "inspection 2.key", "a key of group and name"),
        ('ask = "Strap tails taped"', "", "inspection 2 (lashing.tails).ask", "required"),
        ('covers = ["canopy", "tie"]', 'covers = ["canopy", "ties"]', "inspection 1 (canopy.bag_ties).covers", 'did you mean "tie"?'),
        ('covers = ["canopy", "tie"]', "covers = []", "inspection 1 (canopy.bag_ties).covers", "an empty list"),
        ('covers = ["canopy", "tie"]', "covers = [1]", "inspection 1 (canopy.bag_ties).covers", "known: rig, drop"),
        ("two_person = true", "two_persons = true", "inspection 1 (canopy.bag_ties).two_persons", 'did you mean "two_person"?'),
        ("[limits]", "[limit]", "limit", 'did you mean "limits"?'),
    ],
)
def test_one_mistake_one_message(tmp_path: Path, old: str, new: str, path: str, words: str) -> None:
    with pytest.raises(InputError) as caught:
        read(tmp_path, old, new)
    assert [problem.path for problem in caught.value.problems] == [path]
    assert words in caught.value.problems[0].message
    assert caught.value.problems[0].line


def test_bounds_take_the_dimension_of_their_step(tmp_path: Path) -> None:
    bounds = resolve(read(tmp_path), DIMENSIONS.get)
    assert set(bounds) == set(DIMENSIONS)
    rate = bounds["descent.rate"]
    assert rate.low is None
    assert rate.high is not None
    assert (rate.high.value, rate.source, rate.judged, rate.needs_measured) == (8.6868, "house rule 4", True, False)
    factor, age, forward = (bounds[key].high for key in ("opening.load_factor", "service.age", "balance.forward"))
    assert factor is not None
    assert age is not None
    assert forward is not None
    assert factor.value == pytest.approx(9 * 9.80665, rel=1e-15)
    assert age.value == 12 * 365.25 * 86400
    assert forward.value == pytest.approx(0.0762, rel=1e-15)
    assert bounds["suspension.leg"].low is not None
    assert bounds["suspension.leg"].low.value == 2.5
    assert not bounds["landing.overturn"].judged
    assert bounds["landing.overturn"].source == "house rule 3"
    assert bounds["opening.canopy"].needs_measured


@pytest.mark.parametrize(
    ("new", "path", "words"),
    [
        ('"descent.rat" = { max = "28.5 ft/s", source = "x" }', 'limits."descent.rat"', 'the unknown step "descent.rat", expected the key of a computed step (did you mean "descent.rate"?)'),
        ('"descent.rate" = { max = "28.5 kg", source = "x" }', 'limits."descent.rate".max', "kg is a unit of mass"),
        ('"descent.rate" = { max = 28.5, source = "x" }', 'limits."descent.rate".max', "in quotes, with its unit"),
        ('"descent.rate" = { max = "28,5 ft/s", source = "x" }', 'limits."descent.rate".max', "the decimal sign is a point"),
        ('"descent.rate" = { max = "28.5 ft/s ± 1 ft/s", source = "x" }', 'limits."descent.rate".max', "without a tolerance"),
        ('"descent.rate" = { min = "29 ft/s", max = "28.5 ft/s", source = "x" }', 'limits."descent.rate"', 'min "29 ft/s" over max "28.5 ft/s", expected min up to max'),
        ('"descent.rate" = { min = "1000 m/s", max = "28.5 km/h", source = "x" }', 'limits."descent.rate"', "min up to max"),
        ('"descent.rate" = { max = "1e20 m/s", source = "x" }', 'limits."descent.rate".max', "out of any reach"),
    ],
)
def test_bounds_that_cannot_be(tmp_path: Path, new: str, path: str, words: str) -> None:
    file = read(tmp_path, RATE, new)
    with pytest.raises(InputError) as caught:
        resolve(file, DIMENSIONS.get, known=DIMENSIONS)
    assert [problem.path for problem in caught.value.problems] == [path]
    assert words in caught.value.problems[0].message
    assert caught.value.problems[0].line == 10


def test_equal_bounds_are_allowed(tmp_path: Path) -> None:
    file = read(tmp_path, RATE, '"descent.rate" = { min = "1 m/s", max = "1 m/s", source = "x" }')
    assert resolve(file, DIMENSIONS.get)["descent.rate"].low is not None


def test_every_bound_that_cannot_be_is_named_at_once(tmp_path: Path) -> None:
    file = read(tmp_path, 'key = "lashing.tails"', 'key = "descent.rate"')
    known = {key: Dimension.MASS for key in DIMENSIONS if key != "service.age"}
    with pytest.raises(InputError) as caught:
        resolve(file, known.get)
    paths = [problem.path for problem in caught.value.problems]
    assert 'limits."service.age"' in paths
    assert 'limits."opening.load_factor".max' not in paths  # 9 g can be a mass
    assert 'limits."balance.forward".min' in paths
    assert 'limits."balance.forward".max' in paths
    assert paths[-1] == "inspection 2 (descent.rate).key"


def test_a_problem_of_the_checks_has_its_line(tmp_path: Path) -> None:
    problem = read(tmp_path).problem(("limits", "service.age", "max"), "x", "y", "z")
    assert problem == InputProblem(
        str(tmp_path / "set.toml"), 15, 'limits."service.age".max', "x", "y", "found x, expected y (z)"
    )


def test_bound_of_one_step() -> None:
    assert bound("2 yr", Dimension.TIME).value == 2 * 365.25 * 86400
    assert bound(2.5, Dimension.NUMBER).value == 2.5
    with pytest.raises(QuantityError, match="in quotes, with its unit"):
        bound(2.5, Dimension.TIME)
