"""The limit set, format 1: what somebody allows, with its source, and what somebody has to look at."""

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass
from typing import Annotated, Any, NamedTuple, TypeAlias

from pydantic import Field

from model.quantity import Dimension, Quantity, QuantityError
from model.rig.errors import InputError
from model.rig.fields import (
    Day,
    Flag,
    Format,
    Line,
    Multiple,
    Name,
    Note,
    Sentence,
)
from model.rig.locate import Loc
from model.rig.rig import TABLES
from model.rig.rule import FieldError, Rule, Strict, described, nearest, optional, quantity, required, rows
from model.rig.source import Fault, TomlFile
from model.rig.validate import limited


def _raw_bound(found: Any) -> str | float:
    """A bound as written; its dimension is known only to the step it limits."""
    if isinstance(found, bool) or not isinstance(found, str | int | float):
        raise FieldError(described(found), "a value with its unit in quotes, or a plain number")
    return found


def _covers(found: Any) -> tuple[str, ...]:
    if not isinstance(found, list | tuple) or not found:
        raise FieldError(described(found) if found else "an empty list", "a list of tables of the rig file")
    for name in found:
        if name not in TABLES:
            hint = (nearest(name, TABLES) if isinstance(name, str) else "") or f"known: {', '.join(TABLES)}"
            raise FieldError(described(name), "a table of the rig file", hint)
    return tuple(found)


def _inspection_key(found: Any) -> str:
    expected = "a key of group and name, such as canopy.bag_ties"
    if not isinstance(found, str) or len(found) > 100 or not found.isprintable():
        raise FieldError(described(found), expected)
    group, _, name = found.partition(".")
    if not group or not name or " " in found or name.endswith("."):
        raise FieldError(described(found), expected)
    return found


RawBound: TypeAlias = Annotated[str | float, Rule(_raw_bound)]
Covers: TypeAlias = Annotated[tuple[str, ...], Rule(_covers)]
InspectionKey: TypeAlias = Annotated[str, Rule(_inspection_key)]


class SetInfo(Strict):
    """Whose limits these are."""

    name: Name = required("what the set is called")
    issued_by: Line | None = optional("who answers for it")
    issued_on: Day | None = optional("when it was issued")
    note: Note | None = optional("free text")


class Limit(Strict):
    """The bounds of one step, as written."""

    min: RawBound | None = optional("least value allowed")
    max: RawBound | None = optional("greatest value allowed")
    source: Name | None = optional("where the bound comes from; required with a bound")
    judged: Flag | None = optional("false: computed and shown, not counted")
    needs_measured: Flag | None = optional("true: open until a measured figure stands")


class Restraint(Strict):
    """What lashings have to hold, in multiples of the weight lashed."""

    forward: Multiple | None = optional("against the load moving forward")
    aft: Multiple | None = optional("against the load moving aft")
    left: Multiple | None = optional("against the load moving left")
    right: Multiple | None = optional("against the load moving right")
    up: Multiple | None = optional("against the load moving up")
    source: Name = required("where the multiples come from")


class Inspection(Strict):
    """A step that somebody has to look at."""

    key: InspectionKey = required("group and name")
    stage: Line | None = optional("when it is looked at, in free text")
    stop: Flag | None = optional("asked first in its group")
    two_person: Flag | None = optional("needs two names")
    ask: Sentence = required("what is asked")
    answer: Line | None = optional("a value that is asked for beside pass or fail")
    caution: Sentence | None = optional("what can go wrong")
    covers: Covers | None = optional("tables whose change reopens the step; the whole rigging where missing")


class LimitSet(Strict):
    """Limits and inspections that somebody issued."""

    format: Format = required("1")
    set: SetInfo = required("whose limits these are")
    limits: dict[str, Limit] = Field(default_factory=dict, description="bounds by step key")
    restraint: Restraint | None = optional("what lashings have to hold")
    inspection: tuple[Inspection, ...] = rows("what has to be looked at")


@dataclass(frozen=True, eq=False, repr=False)
class LimitFile(TomlFile):
    """A limit set that was read without a mistake."""

    limits: LimitSet


class Bounds(NamedTuple):
    """A limit read in the dimension of its step.

    Attributes:
        low: least value allowed.
        high: greatest value allowed.
        source: where they come from; empty for an entry without a bound.
        judged: whether the step counts.
        needs_measured: whether the step is open until a measured figure stands.
    """

    low: Quantity | None
    high: Quantity | None
    source: str
    judged: bool
    needs_measured: bool


def limit_faults(limits: LimitSet, lost: frozenset[str] = frozenset()) -> Iterator[Fault]:
    """Every contradiction within a limit set; a field that was lost is None here."""
    for key, limit in limits.limits.items():
        given = limit.model_fields_set
        if not given - {"source"}:
            yield Fault(("limits", key), "a limit that says nothing", "min, max, judged or needs_measured")
        if given & {"min", "max"} and "source" not in given:
            yield Fault(("limits", key), "a bound without a source", "the key source")
    seen: set[str] = set()
    for row, inspection in enumerate(limits.inspection):
        if inspection.key is not None and inspection.key in seen:
            yield Fault(("inspection", row, "key"), f'"{inspection.key}" a second time', "a key that no other row has")
        seen.add(inspection.key)


def bound(found: str | float, dimension: Dimension) -> Quantity:
    """A bound read in the dimension of its step.

    Raises:
        QuantityError: no quantity of that dimension, or one with a tolerance.
    """
    value: Quantity = quantity(dimension, exact=True).read(found)
    return value


def resolve(
    file: LimitFile, dimension_of: Callable[[str], Dimension | None], known: Iterable[str] = ()
) -> dict[str, Bounds]:
    """Every limit of a set in the dimension of its step.

    Args:
        file: the limit set.
        dimension_of: the dimension of a computed step's value by key; None where there is no such step.
        known: keys to suggest for an unknown one.

    Returns:
        The bounds by step key.

    Raises:
        InputError: unknown keys, wrong dimensions, min over max, inspections named like computed steps; all at once.
    """
    names = tuple(known)
    faults: list[Fault] = []
    resolved: dict[str, Bounds] = {}
    for key, limit in file.limits.limits.items():
        dimension = dimension_of(key)
        if dimension is None:
            expected = "the key of a computed step"
            faults.append(Fault(("limits", key), f"the unknown step {described(key)}", expected, nearest(key, names)))
            continue
        low = _bound(limit.min, ("limits", key, "min"), dimension, faults)
        high = _bound(limit.max, ("limits", key, "max"), dimension, faults)
        if low and high and low.value > high.value:
            found = f"min {described(limit.min)} over max {described(limit.max)}"
            faults.append(Fault(("limits", key), found, "min up to max"))
        judged = limit.judged is not False
        resolved[key] = Bounds(low, high, limit.source or "", judged, bool(limit.needs_measured))
    for row, inspection in enumerate(file.limits.inspection):
        if dimension_of(inspection.key) is not None:
            expected = "a key that no computed step has"
            faults.append(Fault(("inspection", row, "key"), f'"{inspection.key}"', expected))
    if faults:
        raise InputError(limited(file.problems(faults)))
    return resolved


def _bound(found: str | float | None, loc: Loc, dimension: Dimension, faults: list[Fault]) -> Quantity | None:
    if found is None:
        return None
    try:
        return bound(found, dimension)
    except QuantityError as error:
        faults.append(Fault(loc, error.found, error.expected, error.hint))
        return None
