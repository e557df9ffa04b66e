"""Checks across the fields of a rig file.

They run on what could be read: a field that was lost is None here, even where the model promises a value, so every
rule asks for what it needs.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence
from datetime import date

from model.quantity import Quantity
from model.rig.canopy_rules import canopy_faults
from model.rig.rig import TABLES, Rig
from model.rig.rule import nearest
from model.rig.source import Fault

HIGHEST = 20_000.0
"""Top of the air model in m above mean sea level."""
LENGTH_MISFIT = 0.01
"""Share by which a leg's length may differ from the distance to a given apex."""

_NAMED = ("item", "leg", "link", "cushion", "lashing", "tie", "device")


def rig_faults(
    rig: Rig, lost: frozenset[str] = frozenset(), known_parts: Callable[[str], bool] | None = None
) -> Iterator[Fault]:
    """Every contradiction between fields of a rig.

    Args:
        rig: the rig; lost fields are None.
        lost: tables that could not be read at all.
        known_parts: whether a `left_out` part names a group of steps or a step; without it any name may stand.
    """
    yield from _repeated_names(rig)
    yield from _heights(rig)
    yield from _air(rig)
    yield from _exit(rig)
    yield from canopy_faults(rig.canopy)
    yield from _packs(rig, "canopy" in lost)
    yield from _readings(rig)
    yield from _hanging(rig)
    yield from _cushions(rig)
    yield from _lashings(rig)
    yield from _ties(rig)
    yield from _left_out(rig, known_parts)


def repeated(words: Iterable[tuple[tuple[str | int, ...], str | None]], what: str) -> Iterator[Fault]:
    """Faults for words that stand twice."""
    seen: set[str] = set()
    for loc, word in words:
        if word is not None and word in seen:
            yield Fault(loc, f'"{word}" a second time', f"{what} that no other row has")
        elif word is not None:
            seen.add(word)


def _repeated_names(rig: Rig) -> Iterator[Fault]:
    for table in _NAMED:
        named = (((table, row, "name"), part.name) for row, part in enumerate(getattr(rig, table)))
        yield from repeated(named, "a name")
    packs = [(("pack", row, "serial"), pack.serial) for row, pack in enumerate(rig.pack)]
    devices = [(("device", row, "serial"), device.serial) for row, device in enumerate(rig.device)]
    yield from repeated([*packs, *devices], "a serial")
    yield from repeated(((("left_out", row, "part"), part.part) for row, part in enumerate(rig.left_out)), "a part")


def _heights(rig: Rig) -> Iterator[Fault]:
    height = rig.drop.release_height
    if height is None:
        return
    elevation = rig.drop.zone_elevation
    top = height.value + (elevation.value if elevation else 0.0)
    if top > HIGHEST:
        shown = _text(height) + (f" over a zone at {_text(elevation)}" if elevation else "")
        yield Fault(("drop", "release_height"), shown, "a release at no more than 20 km above sea level")


def _air(rig: Rig) -> Iterator[Fault]:
    drop = rig.drop
    if drop.winds is not None:
        for key in ("surface_wind", "release_wind"):
            if getattr(drop, key) is not None:
                yield Fault(("drop", key), f"{key} beside winds", "one form of the wind, not both")
    if drop.dew_point and drop.zone_temperature and drop.dew_point.value > drop.zone_temperature.value:
        expected = f"no more than the temperature at the zone, {_text(drop.zone_temperature)}"
        yield Fault(("drop", "dew_point"), _text(drop.dew_point), expected)


def _exit(rig: Rig) -> Iterator[Fault]:
    way = rig.exit
    if way is None:
        return
    if way.extraction is not None and way.method == "gravity":
        yield Fault(("exit", "extraction"), "a table for method gravity", 'method = "extraction"')
    if way.line_stretch is None and "line_stretch" not in way.model_fields_set:
        if way.canopy_pulled_by == "timer":
            yield Fault(("exit",), "a timer without line_stretch", "line_stretch, the known time from release")
        elif way.method == "extraction":
            yield Fault(("exit",), "extraction without line_stretch", "line_stretch, the known time from release")


def _packs(rig: Rig, canopies_lost: bool) -> Iterator[Fault]:
    counts = [0] * len(rig.canopy)
    for row, pack in enumerate(rig.pack):
        yield from _pack_dates(rig.drop.date, row, pack.made, pack.packed)
        if pack.row is None or canopies_lost:
            continue
        if pack.row > len(rig.canopy):
            expected = f"a canopy row from 1 to {len(rig.canopy)}" if rig.canopy else "a canopy row; there is none"
            yield Fault(("pack", row, "row"), str(pack.row), expected)
            continue
        counts[pack.row - 1] += 1
        canopies = rig.canopy[pack.row - 1].count
        if canopies is not None and counts[pack.row - 1] > canopies:
            expected = f"no more packs than the {canopies} of canopy row {pack.row}"
            yield Fault(("pack", row, "row"), f"pack {counts[pack.row - 1]} of that row", expected)


def _pack_dates(drop: date | None, row: int, made: date | None, packed: date | None) -> Iterator[Fault]:
    for key, day in (("made", made), ("packed", packed)):
        if day and drop and day > drop:
            yield Fault(("pack", row, key), day.isoformat(), f"a day up to the drop on {drop.isoformat()}")
    if made and packed and made > packed:
        yield Fault(("pack", row, "packed"), packed.isoformat(), f"a day from its manufacture on {made.isoformat()}")


def _readings(rig: Rig) -> Iterator[Fault]:
    """Places read from a tape that runs aft from the front edge."""
    platform = rig.platform
    if platform is None or platform.measure_from != "front edge":
        return
    if platform.length is None:
        if "length" not in platform.model_fields_set:
            yield Fault(("platform", "measure_from"), "front edge", "length, without which it can't be read")
        return
    front = platform.overhang_front.value if platform.overhang_front else 0.0
    rear = platform.overhang_rear.value if platform.overhang_rear else 0.0
    expected = f"an x along the platform, {_text(platform.length)} aft of its front edge at most"
    for loc, place in _places(rig):
        if not -front <= place[0].value <= platform.length.value + rear:
            yield Fault(loc, f"x {_text(place[0])}", expected)


def _places(rig: Rig) -> Iterator[tuple[tuple[str | int, ...], Sequence[Quantity]]]:
    """Every place in the file that has an x."""
    for table in ("platform", "suspension"):
        for key in ("centre", "balanced_at", "apex"):
            place = getattr(getattr(rig, table), key, None)
            if place is not None:
                yield (table, key), place
    for table in ("item", "canopy", "leg", "cushion", "lashing"):
        for row, part in enumerate(getattr(rig, table)):
            for key in ("centre", "at", "deck", "load"):
                place = getattr(part, key, None)
                if place is not None:
                    yield (table, row, key), place


def _hanging(rig: Rig) -> Iterator[Fault]:
    apex = rig.suspension.apex if rig.suspension else None
    carrying = rig.suspension.legs_carrying if rig.suspension else None
    if carrying is not None and rig.leg and carrying > len(rig.leg):
        yield Fault(("suspension", "legs_carrying"), str(carrying), f"no more than there are legs, {len(rig.leg)}")
    for row, leg in enumerate(rig.leg):
        if leg.at is None:
            continue
        for other in rig.leg[:row]:
            if other.at is not None and _values(other.at) == _values(leg.at):
                expected = "a point of its own (thicknesses side by side are plies)"
                yield Fault(("leg", row, "at"), f"the point of leg {other.name}", expected)
        if apex is None:
            continue
        if apex[2].value <= leg.at[2].value:
            yield Fault(("leg", row, "at"), f"z {_text(leg.at[2])}", f"a point below the apex at {_text(apex[2])}")
        elif leg.length is not None:
            away = sum((a.value - b.value) ** 2 for a, b in zip(apex, leg.at, strict=True)) ** 0.5
            if abs(leg.length.value - away) > LENGTH_MISFIT * away:
                expected = f"within 1 % of the distance to the apex, {away:.3f} m"
                yield Fault(("leg", row, "length"), _text(leg.length), expected)


def _cushions(rig: Rig) -> Iterator[Fault]:
    first = next((cushion.lies for cushion in rig.cushion if cushion.lies), None)
    for row, cushion in enumerate(rig.cushion):
        if cushion.lies and cushion.lies != first:
            yield Fault(("cushion", row, "lies"), f'"{cushion.lies}"', f'"{first}", the same for all rows')


def _lashings(rig: Rig) -> Iterator[Fault]:
    for row, lashing in enumerate(rig.lashing):
        if lashing.deck and lashing.load and _values(lashing.deck) == _values(lashing.load):
            yield Fault(("lashing", row, "load"), "the deck point", "a load point away from the deck point")


def _ties(rig: Rig) -> Iterator[Fault]:
    for row, tie in enumerate(rig.tie):
        for low, high in (("strand_strength", "strand_strength_most"), ("holds_at_least", "breaks_by")):
            least, most = getattr(tie, low), getattr(tie, high)
            if least and most and least.value > most.value:
                yield Fault(("tie", row, high), _text(most), f"at least the {low}, {_text(least)}")


def _left_out(rig: Rig, known_parts: Callable[[str], bool] | None) -> Iterator[Fault]:
    for row, part in enumerate(rig.left_out):
        if part.part is None or known_parts is None or part.part in TABLES or known_parts(part.part):
            continue
        hint = nearest(part.part, TABLES)
        yield Fault(("left_out", row, "part"), f'"{part.part}"', "a table, a group of steps or a step key", hint)


def _values(place: Sequence[Quantity]) -> tuple[float, ...]:
    return tuple(axis.value for axis in place)


def _text(quantity: Quantity) -> str:
    return f'"{quantity.text}"'
