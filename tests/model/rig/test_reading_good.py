"""Files without a mistake."""

import datetime
import subprocess
import sys
from pathlib import Path

import pytest

from model.quantity import Dimension, Quantity
from model.rig.reading import load, read_limits, read_rig
from model.rig.rig import TABLES, Rig, plan_point, point
from model.rig.rule import Strict
from model.rig.stick import read_stick
from tests.model.rig import samples


def write(folder: Path, text: str, name: str = "x.toml") -> Path:
    path = folder / name
    path.write_text(text, encoding="utf-8")
    return path


def test_a_full_rig_is_read(folder: Path) -> None:
    loaded = load(folder / "pump.toml")
    rig = loaded.rig.rig
    assert rig.rig.name == "Borehole pump on skid board"
    assert rig.rig.notes == "Second pump of the valley.\nHandle with care."
    assert rig.drop.date == datetime.date(2026, 9, 16)
    assert rig.drop.release_height is not None
    assert (rig.drop.release_height.value, rig.drop.release_height.tolerance) == (381.0, 15.24)
    assert rig.canopy[1].rated_mass is not None
    assert [round(mass.value, 3) for mass in rig.canopy[1].rated_mass] == [227.25, 997.903]
    assert [stage.drag_ratio.value for stage in rig.canopy[1].reefing if stage.drag_ratio] == [0.05, 0.2]
    assert rig.canopy[1].reefing[0].measured is not None
    assert rig.exit is not None
    assert rig.exit.extraction is not None
    assert rig.exit.extraction.stays is False
    assert [pack.serial for pack in rig.pack] == ["D-011", "C-2207", "C-2208"]
    assert loaded.limits is not None
    assert loaded.limits.path == folder / "limits" / "tarn-relief.toml"


def every_model(model: type[Strict]) -> dict[str, type[Strict]]:
    found = {model.__name__: model}
    for field in model.model_fields.values():
        for inner in (field.annotation, *getattr(field.annotation, "__args__", ())):
            if isinstance(inner, type) and issubclass(inner, Strict):
                found |= every_model(inner)
    return found


def test_the_sample_holds_every_key_of_the_format(folder: Path) -> None:
    given: dict[str, set[str]] = {}

    def note(value: object) -> None:
        if isinstance(value, Strict):
            given.setdefault(type(value).__name__, set()).update(value.model_fields_set)
            for name in type(value).model_fields:
                note(getattr(value, name))
        elif isinstance(value, tuple):
            for inner in value:
                note(inner)

    rig = read_rig(folder / "pump.toml").rig
    note(rig)
    # One of two forms each: the other form is read in tests of their own.
    given["Drop"].add("winds")
    given["Canopy"] |= {"opens_after", "opens_at_height"}
    assert given == {name: set(model.model_fields) for name, model in every_model(Rig).items()}
    assert set(TABLES) == set(Rig.model_fields) - {"format", "limits"}


def test_every_field_says_what_it_means() -> None:
    for model in every_model(Rig).values():
        assert all(field.description for field in model.model_fields.values())


def test_a_small_rig_is_enough(tmp_path: Path) -> None:
    file = read_rig(write(tmp_path, samples.SMALL_RIG))
    assert file.rig.canopy == ()
    assert file.rig.platform is None
    assert file.limits_path is None
    assert load(file.path).limits is None


def test_models_cannot_be_changed(folder: Path) -> None:
    rig = read_rig(folder / "pump.toml").rig
    with pytest.raises(ValueError, match="frozen"):
        rig.limits = "other.toml"  # type: ignore[misc]


def test_windows_files_are_read(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    path.write_bytes(b"\xef\xbb\xbf" + samples.RIG.replace("\n", "\r\n").encode())
    assert read_rig(path).rig.rig.reference == "TV-014"


def test_winds_are_a_profile(tmp_path: Path) -> None:
    text = samples.SMALL_RIG + 'winds = [["0 ft", "9 kt"], ["3,000 ft", "-22 kt"]]\n'
    winds = read_rig(write(tmp_path, text)).rig.drop.winds
    assert winds is not None
    assert [(round(h.value, 1), round(w.value, 3)) for h, w in winds] == [(0.0, 4.63), (914.4, -11.318)]


def test_places_are_read_from_the_front_edge(tmp_path: Path) -> None:
    text = samples.SMALL_RIG + (
        '[platform]\nlength = "8 ft"\nmeasure_from = "front edge"\ncentre = ["4 ft", "0 ft", "0 ft"]\n'
        'balanced_at = ["3 ft", "1 in"]\n[[item]]\nname = "Box"\ncentre = ["8 ft", "1 ft", "2 ft"]\n'
    )
    rig = read_rig(write(tmp_path, text)).rig
    assert rig.platform is not None
    assert rig.platform.centre is not None
    assert rig.platform.balanced_at is not None
    assert rig.item[0].centre is not None
    assert point(rig, rig.platform.centre) == (0.0, 0.0, 0.0)
    assert point(rig, rig.item[0].centre) == pytest.approx((-1.2192, 0.3048, 0.6096))
    assert plan_point(rig, rig.platform.balanced_at) == pytest.approx((0.3048, 0.0254))


def test_places_are_read_from_the_middle(folder: Path) -> None:
    rig = read_rig(folder / "pump.toml").rig
    assert rig.item[0].centre is not None
    assert point(rig, rig.item[0].centre) == pytest.approx((0.1016, 0.0, 0.5588))


def test_a_limit_set_is_read(folder: Path) -> None:
    limits = read_limits(folder / "limits" / "tarn-relief.toml").limits
    assert limits.set.issued_by == "QX"
    assert limits.restraint is not None
    assert limits.restraint.forward == Quantity(3.0, Dimension.NUMBER, "", 0.0, "3.0")
    assert limits.inspection[0].covers == ("canopy", "tie")
    assert limits.inspection[1].stop is None


def test_a_stick_is_read(tmp_path: Path) -> None:
    file = read_stick(write(tmp_path, samples.STICK))
    assert file.rigs == (tmp_path / "../pump.toml", tmp_path / "../grain.toml")
    assert [load.after.value for load in file.stick.load] == [0.0, 0.8]
    assert file.stick.stick.separation is not None
    assert file.stick.stick.separation.min is not None
    assert file.stick.stick.separation.min.value == 50.0


def test_reading_a_rig_loads_neither_screens_nor_numpy() -> None:
    code = (
        "import sys, model.rig.reading, model.rig.record, model.rig.stick; "
        "print([m for m in ('textual', 'numpy', 'scipy', 'pint', 'tomlkit') if m in sys.modules])"
    )
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert run.stdout.strip() == "[]"
