"""The canopy table: handbook figures by type of canopy, each with its range and source.

The figures lie in `canopies.toml` beside this module and are read once, when the first of them is asked for.
"""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from functools import cache
from pathlib import Path
from typing import Any, NamedTuple

_FILE = Path(__file__).with_name("canopies.toml")


class Figure(NamedTuple):
    """A figure of the table, dimensionless.

    Attributes:
        low: least value printed.
        high: greatest value printed; the same where one value is printed.
        source: where it comes from.
    """

    low: float
    high: float
    source: str

    @property
    def middle(self) -> float:
        """The value used: the middle of the range."""
        return (self.low + self.high) / 2.0

    @property
    def half_width(self) -> float:
        """Half the printed range, over which the value is spread evenly."""
        return (self.high - self.low) / 2.0


class CanopyType(NamedTuple):
    """A type of canopy; None stands where the handbook gives no figure.

    Attributes:
        name: as rig files name it.
        solid: solid cloth, against ribbons, rings and slots.
        drag_coefficient: CD0 on the nominal area.
        opening_coefficient: Cx at infinite mass.
        fill_constant: n of an unreefed filling.
        fill_constant_reefed: n of the filling into the first reefing stage.
        fill_constant_disreef: n of the filling after a cutter.
        growth_exponent: j of an unreefed filling.
        growth_exponent_disreef: j of the filling after a cutter.
    """

    name: str
    solid: bool
    drag_coefficient: Figure | None
    opening_coefficient: Figure | None
    fill_constant: Figure | None
    fill_constant_reefed: Figure | None
    fill_constant_disreef: Figure | None
    growth_exponent: Figure | None
    growth_exponent_disreef: Figure | None


class Bands(NamedTuple):
    """95 % bands around handbook figures and around the motion.

    Attributes:
        fill_constant_factor: n times or divided by this.
        drag_coefficient_share: CD0 plus or minus this share.
        force_factor: opening force with a measured filling time, times or divided by this.
        height_factor: height lost, times or divided by this.
        source: where the bands come from.
    """

    fill_constant_factor: float
    drag_coefficient_share: float
    force_factor: float
    height_factor: float
    source: str


@cache
def _texts() -> tuple[str, Mapping[str, str]]:
    """The text above the types, and that of each type by its name; a rig needs few types, so each is parsed alone."""
    head, *rows = _FILE.read_text(encoding="utf-8").split("\n[[type]]\n")
    return head, {tomllib.loads(row.partition("\n")[0])["name"]: row for row in rows}


@cache
def _head() -> Mapping[str, Any]:
    return tomllib.loads(_texts()[0])


@cache
def type_names() -> tuple[str, ...]:
    """The names of all types, in the order of the table."""
    return tuple(_texts()[1])


@cache
def lookup(name: str) -> CanopyType:
    """The figures of one type.

    Raises:
        KeyError: the table has no such type.
    """
    row = tomllib.loads(_texts()[1][name])
    sources = _head()["sources"]

    def figure(key: str) -> Figure | None:
        given = row.get(key)
        return given and Figure(float(given["low"]), float(given["high"]), sources[given["source"]])

    return CanopyType(
        name,
        row["solid"],
        drag_coefficient=figure("drag_coefficient"),
        opening_coefficient=figure("opening_coefficient"),
        fill_constant=figure("fill_constant"),
        fill_constant_reefed=figure("fill_constant_reefed"),
        fill_constant_disreef=figure("fill_constant_disreef"),
        growth_exponent=figure("growth_exponent"),
        growth_exponent_disreef=figure("growth_exponent_disreef"),
    )


@cache
def bands() -> Bands:
    """The bands of the table."""
    return Bands(**_head()["bands"])
