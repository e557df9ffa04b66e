"""Every quantity of a rig by its place, and the same rig with some of them changed: what studies vary."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any, TypeVar

from model.quantity import Quantity
from model.rig.locate import Loc
from model.rig.rig import Rig
from model.rig.rule import Strict
from model.rig.source import key_path

S = TypeVar("S", bound=Strict)
_AXES = ("x", "y", "z")
_ENDS = ("least", "most")


def quantities(rig: Rig) -> Iterator[tuple[Loc, Quantity]]:
    """Every quantity of a rig with its place, in the order of the format.

    Args:
        rig: the rig.

    Yields:
        The place, such as `("item", 0, "centre", 2)`, and the quantity.
    """
    yield from _walk((), rig)


def label(rig: Rig, loc: Loc) -> str:
    """A place in words: `item 1 (Pump set).centre z`."""
    if isinstance(loc[-1], int) and isinstance(loc[-2], str):
        names = _ENDS if loc[-2] == "rated_mass" else _AXES
        return f"{key_path(rig, loc[:-1])} {names[loc[-1]]}"
    if loc[:2] == ("drop", "winds"):
        return f"drop.winds {int(loc[2]) + 1} {'speed' if loc[3] else 'height'}"
    return key_path(rig, loc)


def with_quantities(rig: Rig, changes: Mapping[Loc, Quantity]) -> Rig:
    """The rig with other quantities in some places; fields are not checked again.

    Args:
        rig: the rig.
        changes: quantities by place, as `quantities` names them.

    Raises:
        KeyError: there is no quantity at a place.
    """
    for loc, value in changes.items():
        rig = _replaced(rig, loc, loc, value)
    return rig


def _walk(loc: Loc, value: Any) -> Iterator[tuple[Loc, Quantity]]:
    if isinstance(value, Quantity):
        yield loc, value
    elif isinstance(value, Strict):
        for name in type(value).model_fields:
            yield from _walk((*loc, name), getattr(value, name))
    elif isinstance(value, tuple):
        for row, inner in enumerate(value):
            yield from _walk((*loc, row), inner)


def _replaced(value: Any, rest: Loc, loc: Loc, new: Quantity) -> Any:
    if not rest:
        if not isinstance(value, Quantity):
            raise KeyError(loc)
        return new
    part = rest[0]
    if isinstance(value, Strict) and isinstance(part, str) and part in type(value).model_fields:
        return value.model_copy(update={part: _replaced(getattr(value, part), rest[1:], loc, new)})
    if isinstance(value, tuple) and isinstance(part, int) and part < len(value):
        return (*value[:part], _replaced(value[part], rest[1:], loc, new), *value[part + 1 :])
    raise KeyError(loc)
