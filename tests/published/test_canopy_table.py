"""The canopy table against the figures it is taken from.

All figures are from memory of Knacke, NWC TP 6575 (Parachute Recovery Systems Design Manual): drag and opening
coefficients tables 5-1 to 5-3, filling constants table 5-6, growth exponents chapter 5.
"""

import re

import pytest

from model.rig.canopy_table import CanopyType, Figure, bands, lookup, type_names

# Knacke, NWC TP 6575, tables 5-1 to 5-3, from memory: CD0, Cx
COEFFICIENTS = {
    "flat circular": ((0.75, 0.80), (1.7, 1.7)),
    "conical": ((0.75, 0.90), (1.8, 1.8)),
    "biconical": ((0.75, 0.92), (1.8, 1.8)),
    "triconical": ((0.80, 0.96), (1.8, 1.8)),
    "extended skirt, 10 % flat": ((0.78, 0.87), (1.4, 1.4)),
    "extended skirt, 14.3 % full": ((0.75, 0.90), (1.4, 1.4)),
    "hemispherical": ((0.62, 0.77), (1.6, 1.6)),
    "guide surface, ribbed": ((0.28, 0.42), (1.2, 1.2)),
    "guide surface, ribless": ((0.30, 0.34), (1.4, 1.4)),
    "annular": ((0.85, 0.95), (1.4, 1.4)),
    "cross": ((0.60, 0.85), (1.1, 1.2)),
    "flat ribbon": ((0.45, 0.50), (1.05, 1.05)),
    "conical ribbon": ((0.50, 0.55), (1.05, 1.05)),
    "conical ribbon, varied porosity": ((0.55, 0.65), (1.05, 1.30)),
    "ringslot": ((0.56, 0.65), (1.05, 1.05)),
    "ringsail": ((0.75, 0.90), (1.10, 1.10)),
    "disk-gap-band": ((0.52, 0.58), (1.30, 1.30)),
    "vortex ring": ((1.5, 1.8), (1.1, 1.2)),
}
# Knacke, NWC TP 6575, table 5-6, from memory: n unreefed, reefed, after a cutter; conical shapes taken as flat circular
FILLING = {
    "flat circular": ((8, 8), None, None),
    "conical": ((8, 8), None, None),
    "biconical": ((8, 8), None, None),
    "triconical": ((8, 8), None, None),
    "extended skirt, 10 % flat": ((10, 10), (16, 18), (4, 5)),
    "extended skirt, 14.3 % full": ((12, 12), (16, 18), (7, 7)),
    "cross": ((11.7, 11.7), None, None),
    "flat ribbon": ((14, 14), (10, 10), (6, 6)),
    "conical ribbon": ((14, 14), (10, 10), (6, 6)),
    "conical ribbon, varied porosity": ((14, 14), (10, 10), (6, 6)),
    "ringslot": ((14, 14), None, None),
    "ringsail": ((7, 7), (7, 8), (2, 2)),
}
# Knacke, NWC TP 6575, ch. 5, from memory: j = 1 ribbon and ringslot, 2 solid cloth, 1/2 solid cloth after a cutter
GROWTH = {
    "flat circular": (2, 0.5),
    "conical": (2, 0.5),
    "biconical": (2, 0.5),
    "triconical": (2, 0.5),
    "extended skirt, 10 % flat": (2, 0.5),
    "extended skirt, 14.3 % full": (2, 0.5),
    "flat ribbon": (1, None),
    "conical ribbon": (1, None),
    "conical ribbon, varied porosity": (1, None),
    "ringslot": (1, None),
}


def span(figure: Figure | None) -> tuple[float, float] | None:
    return figure and (figure.low, figure.high)


def figures(kind: CanopyType) -> list[Figure]:
    return [value for name in kind.__slots__ if isinstance(value := getattr(kind, name), Figure)]


def test_the_types_are_those_of_the_handbook_and_other() -> None:
    assert type_names() == (*COEFFICIENTS, "other")


@pytest.mark.parametrize("name", COEFFICIENTS)
def test_drag_and_opening_coefficients(name: str) -> None:
    kind = lookup(name)
    assert (span(kind.drag_coefficient), span(kind.opening_coefficient)) == COEFFICIENTS[name]


@pytest.mark.parametrize("name", COEFFICIENTS)
def test_filling_constants(name: str) -> None:
    kind = lookup(name)
    found = span(kind.fill_constant), span(kind.fill_constant_reefed), span(kind.fill_constant_disreef)
    assert found == FILLING.get(name, (None, None, None))


@pytest.mark.parametrize("name", COEFFICIENTS)
def test_growth_exponents(name: str) -> None:
    kind = lookup(name)
    found = (
        kind.growth_exponent and kind.growth_exponent.middle,
        kind.growth_exponent_disreef and kind.growth_exponent_disreef.middle,
    )
    assert found == GROWTH.get(name, (None, None))


def test_a_range_is_used_at_its_middle_and_spread_over_its_half_width() -> None:
    figure = lookup("flat circular").drag_coefficient
    assert figure is not None
    assert (figure.middle, figure.half_width) == pytest.approx((0.775, 0.025))


def test_every_figure_says_it_is_from_memory() -> None:
    for name in type_names():
        assert all("from memory" in figure.source for figure in figures(lookup(name)))
        assert all(figure.low <= figure.high for figure in figures(lookup(name)))


def test_the_type_that_is_not_listed_has_no_figures() -> None:
    assert figures(lookup("other")) == []


def test_types_are_shapes_and_no_equipment_designations() -> None:
    assert not [name for name in type_names() if re.search(r"[A-Z]|\b[a-z]-?\d", name)]


def test_an_unknown_type_is_refused() -> None:
    with pytest.raises(KeyError, match="parasol"):
        lookup("parasol")


def test_bands_stand_with_their_source() -> None:
    # judgement from seven openings of 80 to 230 kg rescue canopies (public repository fredvol/logger_200hz, commit
    # 0bdaf98, load tests to EN 12491) and from service rates of descent
    found = bands()
    assert (found.fill_constant_factor, found.drag_coefficient_share) == (1.8, 0.15)
    assert (found.force_factor, found.height_factor) == (1.6, 1.6)
    assert "judgement" in found.source


def test_solid_cloth_is_told_from_slotted() -> None:
    slotted = {name for name in type_names() if not lookup(name).solid}
    assert slotted == {
        "flat ribbon",
        "conical ribbon",
        "conical ribbon, varied porosity",
        "ringslot",
        "ringsail",
        "disk-gap-band",
        "other",
    }
