"""Models read straight from their fields come out as pydantic's own schema generator would have them."""

import copy
import tomllib
from pathlib import Path
from typing import Any

import pytest
from pydantic import ValidationError

from model.rig.limits import LimitSet
from model.rig.rig import Rig
from model.rig.rule import Strict, optional
from model.rig.schema import read


@pytest.mark.parametrize(("kind", "name"), [(Rig, "pump.toml"), (LimitSet, "limits/tarn-relief.toml")])
def test_a_file_becomes_the_same_model(folder: Path, kind: type[Strict], name: str) -> None:
    raw = tomllib.loads((folder / name).read_text(encoding="utf-8"))
    made, other = read(kind, raw), kind.model_validate(raw)
    assert made == other
    assert made.model_fields_set == other.model_fields_set
    with pytest.raises(ValidationError):
        made.format = 2  # type: ignore[attr-defined]


def _errors(kind: type[Strict], raw: Any, *, own: bool) -> list[tuple[Any, ...]]:
    with pytest.raises(ValidationError) as raised:
        read(kind, raw) if own else kind.model_validate(raw)
    return [(one["type"], one["loc"], one["input"]) for one in raised.value.errors()]


CHANGES: dict[str, Any] = {
    "rig": 3,
    "drop": {"date": "today", "height": 1},
    "item": {"name": "one"},
    "canopy": [{"role": "main", "lines": [], "reefing": ({"cutter": "1 kg"}, 4)}, None],
    "leg": "none",
    "suspension": None,
    "platform": {"mass": None, 7: "x"},
    "limits": True,
    "wings": 2,
}


@pytest.mark.parametrize("key", CHANGES)
def test_a_mistake_is_found_at_the_same_place(folder: Path, key: str) -> None:
    raw = copy.deepcopy(tomllib.loads((folder / "pump.toml").read_text(encoding="utf-8")))
    raw[key] = CHANGES[key]
    if key == "suspension":
        assert read(Rig, raw) == Rig.model_validate(raw)
    else:
        assert _errors(Rig, raw, own=True) == _errors(Rig, raw, own=False)


def test_what_is_missing_is_found_at_the_same_place() -> None:
    assert _errors(Rig, {}, own=True) == _errors(Rig, {}, own=False)
    bad = {"format": 1, "limits": {3: {}, "a": 1, "b": {"min": []}}}
    assert _errors(LimitSet, bad, own=True) == _errors(LimitSet, bad, own=False)


def test_defaults_are_not_shared() -> None:
    raw = {"format": 1, "set": {"name": "empty"}}
    assert read(LimitSet, raw).limits is not read(LimitSet, raw).limits


def test_a_field_without_a_rule_is_refused() -> None:
    class Loose(Strict):
        size: int | None = optional("any number")

    with pytest.raises(TypeError, match="no rule reads"):
        read(Loose, {"size": 1})
