"""Every quantity of a rig by its place."""

from dataclasses import replace
from pathlib import Path

import pytest

from model.quantity import Dimension, Quantity, parse
from model.rig.reading import read_rig
from model.rig.walk import label, quantities, with_quantities
from tests.model.rig import samples


def test_every_quantity_text_of_the_file_is_found(folder: Path) -> None:
    file = read_rig(folder / "pump.toml")
    found = dict(quantities(file.rig))
    for loc, quantity in found.items():
        written: object = file.raw
        for part in loc:
            written = written[part]  # type: ignore[index]
        assert str(written) == quantity.text
    texts = [part for part in samples.RIG.split('"') if part[:1].isdigit() or part[:1] == "-"]
    assert len([q for q in found.values() if q.dimension is not Dimension.NUMBER or "±" in q.text]) >= len(texts) - 2


@pytest.mark.parametrize(
    ("loc", "words"),
    [
        (("item", 0, "centre", 2), "item 1 (Pump set).centre z"),
        (("item", 0, "mass"), "item 1 (Pump set).mass"),
        (("canopy", 1, "rated_mass", 0), "canopy row 2 (main).rated_mass least"),
        (("canopy", 1, "reefing", 0, "drag_ratio"), "canopy row 2 (main).reefing 1.drag_ratio"),
        (("leg", 1, "strength"), "leg 2 (front right).strength"),
        (("drop", "release_height"), "drop.release_height"),
    ],
)
def test_places_in_words(folder: Path, loc: tuple[str | int, ...], words: str) -> None:
    rig = read_rig(folder / "pump.toml").rig
    assert loc in dict(quantities(rig))
    assert label(rig, loc) == words


def test_winds_in_words(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    path.write_text(samples.SMALL_RIG + 'winds = [["0 ft", "9 kt"], ["3,000 ft", "22 kt"]]\n', encoding="utf-8")
    rig = read_rig(path).rig
    assert [label(rig, loc) for loc, _ in quantities(rig)] == [
        "drop.winds 1 height",
        "drop.winds 1 speed",
        "drop.winds 2 height",
        "drop.winds 2 speed",
    ]


def test_changed_quantities_stand_and_nothing_else_moves(folder: Path) -> None:
    rig = read_rig(folder / "pump.toml").rig
    before = dict(quantities(rig))
    new = parse("7 in", Dimension.LENGTH)
    changes: dict[tuple[str | int, ...], Quantity] = {
        ("item", 0, "centre", 2): new,
        ("drop", "airspeed"): replace(before["drop", "airspeed"], value=1.0),
    }
    changed = with_quantities(rig, changes)
    assert dict(quantities(changed)) == before | changes
    assert dict(quantities(rig)) == before
    assert with_quantities(changed, {loc: before[loc] for loc in changes}) == rig
    assert changed.rig is rig.rig


@pytest.mark.parametrize(
    "loc",
    [("item", 0, "name"), ("item", 9, "mass"), ("nothing",), ("item",), ("drop", "winds", 0, 0), ("item", "mass")],
)
def test_places_without_a_quantity(folder: Path, loc: tuple[str | int, ...]) -> None:
    rig = read_rig(folder / "pump.toml").rig
    with pytest.raises(KeyError):
        with_quantities(rig, {loc: parse("7 in", Dimension.LENGTH)})
