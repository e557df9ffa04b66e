"""Checks across the fields of the canopy rows; a field that was lost is None here."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from model.rig.canopy import Canopy, Measured
from model.rig.source import Fault

_OPENINGS = ("opens_after", "opens_at_height", "opens_at_set_height")
_LATER_ONLY = (*_OPENINGS, "deployment_time")
_ORDERED = (("opens_after", 1, "after"), ("opens_at_height", -1, "below"), ("opens_at_set_height", -1, "below"))
_TOGETHER = (
    ("rate", "rate_mass", "rate_density"),
    ("opening_force", "opening_force_mass", "opening_force_speed"),
)


def canopy_faults(canopies: Sequence[Canopy]) -> Iterator[Fault]:
    """Every contradiction within the canopy rows and between them."""
    for row, canopy in enumerate(canopies):
        yield from _size(row, canopy)
        yield from _alone(row, canopy)
        yield from _reefing(row, canopy)
        if canopy.measured is not None:
            yield from _measured(row, canopy.measured)
        yield from _opening(row, canopy)
        yield from _when_next_opens(row, canopy, is_last=row == len(canopies) - 1)
    yield from _order(canopies)


def _size(row: int, canopy: Canopy) -> Iterator[Fault]:
    if canopy.diameter is not None and canopy.drag_area is not None:
        yield Fault(("canopy", row, "drag_area"), "drag_area beside diameter", "one of the two")


def _alone(row: int, canopy: Canopy) -> Iterator[Fault]:
    """What means something only for several canopies."""
    if canopy.count is None:
        return
    for key in ("cluster_efficiency", "uneven_share"):
        value = getattr(canopy, key)
        if value is not None and canopy.count == 1 and (value.value != 1.0 or value.tolerance):
            yield Fault(("canopy", row, key), f'"{value.text}"', "1 for a single canopy")
    share = canopy.uneven_share
    if share is not None and 1 < canopy.count < share.value:
        expected = f"no more than the {canopy.count} canopies of the row"
        yield Fault(("canopy", row, "uneven_share"), f'"{share.text}"', expected)


def _reefing(row: int, canopy: Canopy) -> Iterator[Fault]:
    for key, what in (("drag_ratio", "drag ratio"), ("cutter", "cutter time")):
        before = None
        for stage, reefing in enumerate(canopy.reefing):
            value = getattr(reefing, key)
            if value is None:
                continue
            if before is not None and value.value <= before.value:
                expected = f'more than the {what} of the stage before, "{before.text}"'
                yield Fault(("canopy", row, "reefing", stage, key), f'"{value.text}"', expected)
            before = value


def _measured(row: int, measured: Measured) -> Iterator[Fault]:
    for keys in _TOGETHER:
        # A key that stands in the file but could not be read has its own message.
        missing = [key for key in keys if key not in measured.model_fields_set]
        if missing and len(missing) < len(keys):
            given = next(key for key in keys if key not in missing)
            yield Fault(("canopy", row, "measured", given), f"{given} without {' and '.join(missing)}", ", ".join(keys))


def _opening(row: int, canopy: Canopy) -> Iterator[Fault]:
    given = [key for key in _LATER_ONLY if key in canopy.model_fields_set]
    if row == 0:
        for key in given:
            yield Fault(("canopy", row, key), f"{key} in the first row", "it only in later rows")
        return
    ways = [key for key in given if key in _OPENINGS]
    if len(ways) != 1:
        found = " and ".join(ways) if ways else "no opening"
        yield Fault(("canopy", row, *ways[1:2]), found, f"one of {', '.join(_OPENINGS)} in a later row")


def _when_next_opens(row: int, canopy: Canopy, *, is_last: bool) -> Iterator[Fault]:
    given = "when_next_opens" in canopy.model_fields_set
    if is_last and given:
        yield Fault(("canopy", row, "when_next_opens"), "when_next_opens in the last row", "it only before another row")
    elif not is_last and not given:
        expected = 'when_next_opens = "stays", "goes at start" or "goes at line stretch"'
        yield Fault(("canopy", row), "a row followed by another", expected)


def _order(canopies: Sequence[Canopy]) -> Iterator[Fault]:
    """Rows that open by the same measure come in order."""
    for key, sign, word in _ORDERED:
        before = None
        for row, canopy in enumerate(canopies):
            value = getattr(canopy, key)
            if value is None:
                continue
            if before is not None and sign * (value.value - before.value) < 0:
                expected = f'a row that opens {word} the one before it, "{before.text}"'
                yield Fault(("canopy", row, key), f'"{value.text}"', expected)
            before = value
