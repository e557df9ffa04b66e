"""Every formula: its text, read by a computer-algebra library, says what its function does."""

import importlib
import pkgutil
import zlib

import mpmath
import numpy as np
import pytest
import sympy

import model.physics
from model.physics.formula import CONSTANTS, FORMULAS, Formula, Symbol, formula
from tests.model.physics.formula_ranges import BY_ARGUMENT, BY_DIMENSION, DIMENSIONAL_NUMBERS, OTHERWISE, ROUNDED
from tests.model.physics.formula_text import divides_by_bare_product, expression, names, powers, tokens

for found in pkgutil.walk_packages(model.physics.__path__, "model.physics."):
    importlib.import_module(found.name)

POINTS = 25
EVERY = pytest.mark.parametrize("each", [pytest.param(each, id=name) for name, each in sorted(FORMULAS.items())])


def drawn(each: Formula, count: int = POINTS) -> tuple[np.ndarray, list[mpmath.mpf]]:
    """Random points (count, arguments) at which the text has a real value, and those values."""
    read, symbols = expression(each)
    order = [symbol.text for symbol in each.symbols.values()]
    constants = {symbols[name]: mpmath.mpf(value) for name, value in CONSTANTS.items() if name in symbols}
    with mpmath.workdps(30):
        evaluate = sympy.lambdify([sympy.Symbol(name, real=True) for name in order], read.subs(constants), "mpmath")
        random = np.random.default_rng(zlib.crc32(each.name.encode()))
        ranges = [
            BY_ARGUMENT.get(f"{each.name}.{name}", BY_DIMENSION.get(symbol.dimension, OTHERWISE))
            for name, symbol in each.symbols.items()
        ]
        points, values = [], []
        for _ in range(200 * count):
            point = np.array([random.uniform(*bounds) for bounds in ranges])
            try:
                value = evaluate(*map(mpmath.mpf, point))
            except (ZeroDivisionError, ValueError):
                continue
            if isinstance(value, mpmath.mpc) or not mpmath.isfinite(value):
                continue
            points.append(point)
            values.append(value)
            if len(points) == count:
                return np.array(points), values
    raise AssertionError(f"{each.name}: only {len(points)} points with a real value; name ranges in formula_ranges")


@EVERY
def test_text_names_its_result_and_exactly_its_arguments(each: Formula) -> None:
    left, equals, right = each.text.partition("=")
    assert equals
    assert left.strip() == each.result.text
    texts = [symbol.text for symbol in each.symbols.values()]
    assert len(set(texts)) == len(texts)
    assert names(right) - set(CONSTANTS) == set(texts)
    assert not set(texts) & set(CONSTANTS)


@EVERY
def test_text_can_be_read_in_one_way_only(each: Formula) -> None:
    assert not divides_by_bare_product(each.text), each.text


def compare(each: Formula) -> None:
    points, values = drawn(each)
    rtol = ROUNDED.get(each.name, 1e-11)
    for point, value in zip(points, values, strict=True):
        got = each(*map(float, point))
        assert np.ndim(got) == 0
        at = dict(zip(each.symbols, point, strict=True))
        assert float(got) == pytest.approx(float(value), rel=rtol, abs=1e-12), at


@EVERY
def test_text_has_the_values_of_its_function(each: Formula) -> None:
    compare(each)


@EVERY
def test_array_gives_what_its_floats_give(each: Formula) -> None:
    points, _ = drawn(each)
    at_once = np.asarray(each(*points.T))
    assert at_once.shape == (POINTS,)
    np.testing.assert_allclose(at_once, [float(each(*map(float, point))) for point in points], rtol=1e-12, atol=1e-15)


def compare_dimensions(each: Formula) -> None:
    scale = np.array([3.0, 0.7, 1.9, 1.3])  # of kg, m, s, K: a change of units must change both sides alike
    arguments = {symbol.text: symbol.dimension for symbol in each.symbols.values()}
    by = {name: np.prod(scale ** np.array(powers(dimension))) for name, dimension in arguments.items()}
    by |= {"g0": np.prod(scale ** np.array(powers("acceleration"))), "pi": 1.0}
    result = np.prod(scale ** np.array(powers(each.result.dimension)))
    read, symbols = expression(each)
    points, values = drawn(each, 3)
    for point, value in zip(points, values, strict=True):
        at = dict(zip(arguments, point, strict=True)) | dict(CONSTANTS)
        scaled = read.subs({symbol: sympy.Float(at[name] * by[name], 30) for name, symbol in symbols.items()})
        assert float(scaled) == pytest.approx(float(value) * result, rel=1e-9)


@pytest.mark.parametrize("name", sorted(set(FORMULAS) - DIMENSIONAL_NUMBERS))
def test_dimensions_agree_on_both_sides(name: str) -> None:
    compare_dimensions(FORMULAS[name])


@EVERY
def test_every_dimension_is_known(each: Formula) -> None:
    for symbol in (*each.symbols.values(), each.result):
        assert len(powers(symbol.dimension)) == 4


@EVERY
def test_formula_says_what_it_is_and_where_it_is_from(each: Formula) -> None:
    assert each.source.strip()
    assert each.result.meaning.strip()
    assert all(symbol.meaning.strip() for symbol in each.symbols.values())
    assert (each.__doc__ or "").strip()


def test_ranges_and_tolerances_name_formulas_and_arguments_that_exist() -> None:
    assert set(ROUNDED) | DIMENSIONAL_NUMBERS <= set(FORMULAS)
    for key in BY_ARGUMENT:
        name, _, argument = key.partition(".")
        assert argument in FORMULAS[name].symbols


def test_reader_multiplies_at_blanks_and_brackets_and_keeps_calls() -> None:
    assert "".join(tokens("2 m g0/(rho CdS)")) == "2*m*g0/(rho*CdS)"
    assert "".join(tokens("(a + b) (c) max(0, x)^2")) == "(a+b)*(c)*max(0,x)**2"


@pytest.mark.parametrize(
    ("text", "bare"),
    [("a/b c", True), ("a/(b c)", False), ("a/(b c) d", True), ("(a/b) c", False), ("a/2 c", False),
     ("a/sqrt(b) c", True), ("a/b^2 c", True), ("a/b + c d", False)],
)  # fmt: skip
def test_reader_sees_a_bare_product_after_a_division(text: str, bare: bool) -> None:
    assert divides_by_bare_product("x = " + text) is bare


@pytest.mark.parametrize(
    ("unit", "power"),
    [("N/m", (1, 0, -2, 0)), ("kg m2", (1, 2, 0, 0)), ("J/(kg K)", (0, 2, -2, -1)), ("1/s", (0, 0, -1, 0)),
     ("speed", (0, 1, -1, 0))],
)  # fmt: skip
def test_reader_knows_dimensions_and_units(unit: str, power: tuple[int, ...]) -> None:
    assert powers(unit) == power


def test_wrong_text_is_found_out() -> None:
    a, b = Symbol("a", "one", "length"), Symbol("b", "other", "length")
    wrong = Formula(
        lambda a, b: 2.0 * a * b, "c = 2 a b^2", {"a": a, "b": b}, Symbol("c", "product", "area"), "", "", ""
    )
    with pytest.raises(AssertionError):
        compare(wrong)
    with pytest.raises(AssertionError):
        compare_dimensions(wrong)


def test_symbols_must_name_the_arguments() -> None:
    with pytest.raises(ValueError, match="arguments"):
        formula("y = x", result="y | result | number", symbols={"other": "x | input | number"}, source="test")(
            lambda x: x
        )
