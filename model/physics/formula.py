"""A formula: one function together with its text, symbols, range and source, so that they cannot drift apart.

The text is what a user reads, for example ``V = sqrt(2 m g0/(rho CdS))``. A blank between two symbols multiplies, ``^``
raises to a power. Functions used in texts: sqrt, exp, ln, sin, cos, tan, asin, acos, atan, sinh, cosh,
tanh, atanh, hypot, min, max, abs.
A test parses every text with a computer-algebra library and compares it with the function at random inputs.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import TYPE_CHECKING, Generic, NamedTuple, ParamSpec, TypeVar, cast

if TYPE_CHECKING:
    from types import FunctionType

P = ParamSpec("P")
R = TypeVar("R")

CONSTANTS: Mapping[str, float] = {"g0": 9.80665, "pi": 3.141592653589793}
"""Symbols a text may use without naming them as arguments; SI."""


class Symbol(NamedTuple):
    """One symbol of a formula: how it is written, what it means, and the dimension it is shown in.

    ``dimension`` is the name of a dimension of `model.quantity` ("mass", "speed", ... , "number").
    """

    text: str
    meaning: str
    dimension: str


@dataclass(frozen=True, eq=False, repr=False)
class Formula(Generic[P, R]):
    """A function on SI floats or arrays, callable like the function it wraps."""

    function: Callable[P, R]
    text: str
    symbols: Mapping[str, Symbol]
    result: Symbol
    source: str
    holds: str
    leaves_out: str

    def __call__(self, *args: P.args, **kwargs: P.kwargs) -> R:
        """Evaluate the formula."""
        return self.function(*args, **kwargs)

    @property
    def name(self) -> str:
        """Name of the wrapped function."""
        return self.function.__name__


FORMULAS: dict[str, Formula[..., object]] = {}
"""Every formula by the name of its function; filled as the physics modules are imported."""


def _symbol(text: str) -> Symbol:
    parts = [part.strip() for part in text.split("|")]
    if len(parts) != 3:
        raise ValueError(f"a symbol is written 'text | meaning | dimension', not {text!r}")
    return Symbol(*parts)


def formula(
    text: str,
    *,
    result: str,
    symbols: Mapping[str, str],
    source: str,
    holds: str = "",
    leaves_out: str = "",
) -> Callable[[Callable[P, R]], Formula[P, R]]:
    """Make a function a `Formula`.

    Args:
        text: The formula as a user reads it, ``result = expression``.
        result: The result as ``"V | rate of descent | speed"``: symbol, meaning, dimension.
        symbols: The same for each argument of the function, by argument name, in the function's order.
        source: Where the formula is published, or "derived", or "definition".
        holds: The range it holds in, empty where it always does.
        leaves_out: What it leaves out, empty where it is complete.

    Raises:
        ValueError: If ``symbols`` does not name the arguments of the function.
    """

    def wrap(function: Callable[P, R]) -> Formula[P, R]:
        code = cast("FunctionType", function).__code__
        if code.co_varnames[: code.co_argcount + code.co_kwonlyargcount] != tuple(symbols):
            raise ValueError(f"{function.__name__}: symbols must name the arguments, in their order")
        arguments = {name: _symbol(written) for name, written in symbols.items()}
        made = Formula(function, text, arguments, _symbol(result), source, holds, leaves_out)
        made.__dict__["__doc__"] = function.__doc__
        made.__dict__["__wrapped__"] = function
        made.__dict__["__module__"] = function.__module__
        if function.__name__ in FORMULAS:
            raise ValueError(f"two formulas are called {function.__name__}")
        FORMULAS[function.__name__] = cast("Formula[..., object]", made)
        return made

    return wrap
