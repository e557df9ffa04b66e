"""Generated blocks within pages that are otherwise written by hand.

A block stands between the lines ``<!-- generated: NAME -->`` and ``<!-- end -->``; everything else is left alone.
"""

from __future__ import annotations

import importlib
import pkgutil
import re
from collections.abc import Callable, Mapping, Sequence
from pathlib import Path
from types import ModuleType

import model.checks
import model.physics
from model.physics.formula import FORMULAS, Formula

FOLDER = Path(__file__).parent
BLOCK = re.compile(r"<!-- generated: (?P<name>[^>\n]+) -->\n(?:.*?\n)??<!-- end -->\n", re.DOTALL)
SI_UNITS = {
    "mass": "kg",
    "length": "m",
    "area": "m2",
    "speed": "m/s",
    "force": "N",
    "pressure": "Pa",
    "temperature": "K",
    "time": "s",
    "angle": "rad",
    "acceleration": "m/s2",
    "density": "kg/m3",
    "number": "1",
}
"""SI unit of a dimension; a symbol of no dimension of `model.quantity` names its unit itself."""


def fill(text: str, blocks: Mapping[str, str]) -> str:
    """A page with its generated blocks written anew.

    Raises:
        ValueError: If the page and ``blocks`` do not name the same blocks, each once.
    """
    found = [match["name"] for match in BLOCK.finditer(text)]
    if sorted(found) != sorted(blocks):
        raise ValueError(f"blocks of the page: {sorted(found)}; blocks made: {sorted(blocks)}")

    def written(match: re.Match[str]) -> str:
        return f"<!-- generated: {match['name']} -->\n\n{blocks[match['name']].strip()}\n\n<!-- end -->\n"

    return BLOCK.sub(written, text)


def table(head: Sequence[str], rows: Sequence[Sequence[str]]) -> str:
    """A Markdown table."""
    lines = [head, ["---"] * len(head), *rows]
    return "".join(f"| {' | '.join(cell.replace('|', '/') for cell in line)} |\n" for line in lines)


def unit(dimension: str) -> str:
    """SI unit of a symbol's dimension."""
    return SI_UNITS.get(dimension, dimension)


def _walk(package: ModuleType) -> None:
    for found in pkgutil.walk_packages(package.__path__, f"{package.__name__}."):
        importlib.import_module(found.name)


def formulas() -> list[Formula[..., object]]:
    """Every formula of the program, module by module in the order they are written in."""
    _walk(model.physics)
    _walk(model.checks)
    ours = [each for each in FORMULAS.values() if each.__module__.startswith("model.")]
    return sorted(ours, key=lambda each: (each.__module__, each.function.__code__.co_firstlineno))


def write(page: str, rendered: Callable[[], str]) -> None:
    """Write a page of this folder."""
    path = FOLDER / page
    path.write_text(rendered(), encoding="utf-8", newline="\n")
    print(f"{path.name} written")
