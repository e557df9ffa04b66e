"""The canopy table read type by type is the whole file."""

import tomllib
from pathlib import Path

import pytest

from model.rig import canopy_table
from model.rig.canopy_table import CanopyType, bands, lookup, type_names

WHOLE = tomllib.loads(Path(canopy_table.__file__).with_name("canopies.toml").read_text(encoding="utf-8"))


def test_no_type_is_lost() -> None:
    assert list(type_names()) == [row["name"] for row in WHOLE["type"]]
    assert len(type_names()) > 10


@pytest.mark.parametrize("row", WHOLE["type"], ids=[row["name"] for row in WHOLE["type"]])
def test_a_type_has_every_figure_of_its_row(row: dict[str, object]) -> None:
    found = lookup(str(row["name"]))
    assert set(row) <= set(CanopyType._fields)
    assert (found.name, found.solid) == (row["name"], row["solid"])
    for key in CanopyType._fields[2:]:
        figure, written = getattr(found, key), row.get(key)
        assert (figure is None) == (written is None)
        if isinstance(written, dict):
            assert (figure.low, figure.high) == (written["low"], written["high"])
            assert figure.source == WHOLE["sources"][written["source"]]


def test_the_bands_stand_above_the_types() -> None:
    assert bands()._asdict() == WHOLE["bands"]


def test_an_unknown_type_is_refused() -> None:
    with pytest.raises(KeyError):
        lookup("round")
