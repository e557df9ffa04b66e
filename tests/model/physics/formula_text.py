"""Reads the text of a formula on its own, without the function behind it: tokens, algebra, dimensions."""

import functools
import re

import sympy

from model.physics.formula import Formula

FUNCTIONS = {
    "sqrt": sympy.sqrt, "exp": sympy.exp, "ln": sympy.log, "sin": sympy.sin, "cos": sympy.cos, "tan": sympy.tan,
    "asin": sympy.asin, "acos": sympy.acos, "atan": sympy.atan, "hypot": lambda *a: sympy.sqrt(sum(x**2 for x in a)),
    "min": sympy.Min, "max": sympy.Max, "abs": sympy.Abs, "sinh": sympy.sinh, "cosh": sympy.cosh, "tanh": sympy.tanh,
    "atanh": sympy.atanh,
}  # fmt: skip

TOKEN = re.compile(r"\s*(?:(\d+(?:\.\d+)?(?:e-?\d+)?)|([A-Za-z_][A-Za-z_0-9]*)|(\S))")

DIMENSIONS = {  # powers of kg, m, s, K
    "mass": (1, 0, 0, 0), "length": (0, 1, 0, 0), "area": (0, 2, 0, 0), "speed": (0, 1, -1, 0),
    "force": (1, 1, -2, 0), "pressure": (1, -1, -2, 0), "temperature": (0, 0, 0, 1), "time": (0, 0, 1, 0),
    "angle": (0, 0, 0, 0), "acceleration": (0, 1, -2, 0), "density": (1, -3, 0, 0), "number": (0, 0, 0, 0),
}  # fmt: skip
UNITS = {
    "kg": (1, 0, 0, 0), "m": (0, 1, 0, 0), "s": (0, 0, 1, 0), "K": (0, 0, 0, 1), "N": (1, 1, -2, 0),
    "Pa": (1, -1, -2, 0), "J": (1, 2, -2, 0), "W": (1, 2, -3, 0), "Hz": (0, 0, -1, 0), "rad": (0, 0, 0, 0),
}  # fmt: skip


def tokens(text: str) -> list[str]:
    """Numbers, names and signs, with ``*`` put in wherever a blank or a bracket multiplies, and ``^`` as ``**``."""
    found: list[str] = []
    for number, name, sign in TOKEN.findall(text):
        token = number or name or sign
        before = found[-1] if found else ""
        starts_factor = bool(number or name) or token == "("
        ends_factor = before == ")" or (bool(re.fullmatch(r"[\w.]+", before)) and before not in FUNCTIONS)
        if starts_factor and ends_factor:
            found.append("*")
        found.append("**" if token == "^" else token)
    return found


def names(text: str) -> set[str]:
    """The symbols of a text."""
    return {token for token in tokens(text) if re.match(r"[A-Za-z_]", token)} - set(FUNCTIONS)


def divides_by_bare_product(text: str) -> bool:
    """Whether a text reads ``a/b c``, which one reader takes for ``(a/b) c`` and another for ``a/(b c)``."""
    found = [*tokens(text), ""]
    for at, token in enumerate(found):
        if token != "/" or not re.match(r"[A-Za-z_(]", found[at + 1]):
            continue
        end, depth = at + 1, 0
        while True:  # over the factor that follows: a name, a call or a bracket, and its power
            depth += {"(": 1, ")": -1}.get(found[end], 0)
            end += 1
            if depth == 0 and found[end] not in ("(", "**") and found[end - 1] not in (*FUNCTIONS, "**"):
                break
        if found[end] == "*":
            return True
    return False


def expression(formula: Formula[..., object]) -> tuple[sympy.Expr, dict[str, sympy.Symbol]]:
    """The right side of a formula's text as algebra, and its symbols by name."""
    return _algebra(formula.text.split("=", 1)[1])


@functools.cache
def _algebra(right: str) -> tuple[sympy.Expr, dict[str, sympy.Symbol]]:
    symbols = {name: sympy.Symbol(name, real=True) for name in names(right)}
    return sympy.parse_expr("".join(tokens(right)), local_dict={**FUNCTIONS, **symbols}), symbols


def powers(dimension: str) -> tuple[int, int, int, int]:
    """Powers of kg, m, s and K of a dimension's name or of a unit such as ``J/(kg K)`` or ``kg m2``."""
    if dimension in DIMENSIONS:
        return DIMENSIONS[dimension]
    above, _, below = dimension.partition("/")
    total = [0, 0, 0, 0]
    for part, sign in ((above, 1), (below.strip("()"), -1)):
        for factor in part.split():
            if factor == "1":
                continue
            unit = re.fullmatch(r"([A-Za-z]+)(\d?)", factor)
            if unit is None or unit[1] not in UNITS:
                raise ValueError(f"{dimension!r} is neither a dimension nor an SI unit such as 'N/m' or 'kg m2'")
            for at, power in enumerate(UNITS[unit[1]]):
                total[at] += sign * power * int(unit[2] or 1)
    return total[0], total[1], total[2], total[3]
