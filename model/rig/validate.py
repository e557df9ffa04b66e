"""Raw values to a model, every mistake collected; what could not be read does not hide the mistakes of the rest."""

from __future__ import annotations

import copy
from collections.abc import Callable, Iterable
from typing import Any, TypeVar

from pydantic import ValidationError

from model.quantity import QuantityError
from model.rig.errors import MOST_PROBLEMS, InputError, InputProblem
from model.rig.locate import Loc
from model.rig.rule import LOST, Strict, described, nearest
from model.rig.schema import read
from model.rig.source import Fault, TomlFile

M = TypeVar("M", bound=Strict)

MOST_LISTED = 12
"""Keys of a table that a message lists; of a longer one it names only the nearest."""

_PLACEHOLDERS: dict[str, dict[str, Any]] = {
    "rig": {"name": LOST}, "drop": {"date": LOST}, "set": {"name": LOST}, "stick": {"name": LOST},
}  # fmt: skip
"""What stands for a required table that is missing, while the rest is checked."""


def validate(file: TomlFile, kind: type[M], rules: Callable[[M, frozenset[str]], Iterable[Fault]]) -> M:
    """A model from a file's raw values.

    Args:
        file: the file.
        kind: the model.
        rules: checks across fields; they run on what could be read, where a lost field is None, and are told which
            tables were lost whole.

    Raises:
        InputError: with every mistake of the file.
    """
    faults: list[Fault] = []
    raw = file.raw
    lost: set[str] = set()
    for _ in range(4):  # taking one mistake out may bring another to light, a few levels deep at most
        try:
            model = read(kind, raw)
        except ValidationError as error:
            errors = error.errors(include_url=False, include_input=True)
            faults.extend(fault for item in errors if (fault := _fault(item, kind)) not in faults)
            raw = _without(raw, errors, lost)
        else:
            faults.extend(rules(model, frozenset(lost)))
            if faults:
                raise InputError(limited(file.problems(faults)))
            return model
    raise InputError(limited(file.problems(faults)))


def limited(problems: tuple[InputProblem, ...]) -> tuple[InputProblem, ...]:
    """The first of many problems, and how many more there are."""
    if len(problems) <= MOST_PROBLEMS:
        return problems
    more = InputProblem(problems[0].file, None, "", "", "", f"and {len(problems) - MOST_PROBLEMS:,} more mistakes")
    return (*problems[:MOST_PROBLEMS], more)


def _fault(error: Any, kind: type[Strict]) -> Fault:
    """Our words for one error of the validator."""
    loc: Loc = error["loc"]
    cause = error.get("ctx", {}).get("error")
    if isinstance(cause, QuantityError):
        return Fault(loc, cause.found, cause.expected, cause.hint)
    if error["type"] == "missing":
        return Fault(loc, "nothing", f"the key {loc[-1]}", "it is required")
    if error["type"] == "extra_forbidden":
        known = _known_keys(kind, loc[:-1])
        hint = nearest(str(loc[-1]), known) or (f"known: {', '.join(known)}" if len(known) <= MOST_LISTED else "")
        return Fault(loc, f"the unknown key {described(loc[-1])}", "a key of the format", hint)
    if error["type"] == "tuple_type":
        return Fault(loc, described(error["input"]), f"rows: [[{loc[-1]}]]", "two brackets on each side")
    return Fault(loc, described(error["input"]), "a table")


def _known_keys(kind: type[Strict], loc: Loc) -> tuple[str, ...]:
    """The keys a table may hold."""
    model = kind
    for part in loc:
        if part in model.model_fields:  # else a row number, or the free key of a limit
            model = _model_in(model.model_fields[str(part)].annotation) or model
    return tuple(model.model_fields)


def _model_in(annotation: Any) -> type[Strict] | None:
    """The model inside `X | None`, `tuple[X, ...]` or `dict[str, X]`."""
    if isinstance(annotation, type) and issubclass(annotation, Strict):
        return annotation
    for inner in getattr(annotation, "__args__", ()):
        found = _model_in(inner)
        if found:
            return found
    return None


def _without(raw: dict[str, Any], errors: Iterable[Any], lost: set[str]) -> dict[str, Any]:
    """A copy in which the mistakes are taken out, or replaced by what stands for a lost value; notes lost tables."""
    kept = copy.deepcopy(raw)
    for error in errors:
        loc: Loc = error["loc"]
        if error["type"] in ("missing", "value_error"):
            _put(kept, loc, _stand_in(loc))
        elif error["type"] == "extra_forbidden":
            _drop(kept, loc)
        elif len(loc) == 1 and loc[0] in _PLACEHOLDERS:
            _put(kept, loc, _stand_in(loc))
        else:
            # One row that is no table takes its table with it: leaving it out would renumber the others.
            table = loc[:-1] if isinstance(loc[-1], int) else loc
            _drop(kept, table)
            lost.update(str(key) for key in table[:1] if len(table) == 1)
    return kept


def _stand_in(loc: Loc) -> Any:
    table = _PLACEHOLDERS.get(str(loc[0])) if len(loc) == 1 else None
    return LOST if table is None else dict(table)


def _put(raw: Any, loc: Loc, value: Any) -> None:
    table = _table_of(raw, loc)
    if table is not None:
        table[loc[-1]] = value


def _drop(raw: Any, loc: Loc) -> None:
    table = _table_of(raw, loc)
    if table is not None:
        table.pop(loc[-1], None)


def _table_of(raw: Any, loc: Loc) -> dict[Any, Any] | None:
    for part in loc[:-1]:
        try:
            raw = raw[part]
        except (KeyError, IndexError, TypeError):
            return None
    return raw if loc and isinstance(raw, dict) else None
