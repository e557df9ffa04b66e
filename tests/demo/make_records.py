"""Writes the records of the demo rigs anew; run it after one of these rigs or the limit set has changed.

    .venv/bin/python -m tests.demo.make_records

The clock is fixed, so that the same rigs give the same bytes.
"""

from __future__ import annotations

import sys
from collections.abc import Iterator, Mapping
from copy import deepcopy
from dataclasses import dataclass
from datetime import datetime, timedelta, timezone
from pathlib import Path
from typing import Any

from model.rig.entry import Entry, draft
from model.rig.reading import load
from model.rig.record import append, record_path
from model.rig.standing import content_digest

RIGS = Path(__file__).resolve().parents[2] / "rigs"
VERSION = "0.1.0"
ZONE = timezone(timedelta(hours=2))

# What AM answers on the bundle and SB looks at: key, value where one is asked for, remark where there is one.
BUNDLE = (
    ("load.contents", "", ""),
    ("load.hazards", "", "no fuel, batteries or gas"),
    ("balance.lift_test", "0.5", ""),
    ("canopy.type_and_count", "", ""),
    ("canopy.bag_ties", "1", "cotton, spool 14"),
    ("opening.reefing", None, "the canopy is not reefed"),
    ("suspension.legs", "", ""),
    ("suspension.clevises", "", ""),
    ("landing.honeycomb", "3", ""),
    ("landing.skid", "", ""),
    ("tie.material", "", "cotton, spool 14"),
    ("service.log_cards", "", ""),
    ("service.textiles", "", ""),
    ("aircraft.restraint", "", "cabin net, both sides"),
    ("canopy.first_pull", "", ""),
    ("aircraft.pins", "2", ""),
    ("aircraft.path", "", ""),
    ("zone.clear", "", "OD on the radio"),
    ("zone.wind", "5", ""),
)
FROM_THE_AIRCRAFT_ON = BUNDLE.index(("aircraft.restraint", "", "cabin net, both sides"))


@dataclass
class Book:
    """One rig's record under way, with a clock that goes on by itself."""

    rig: Mapping[str, Any]
    limits: Mapping[str, Any]
    inspections: Mapping[str, Any]
    now: datetime

    def entry(self, kind: str, who: str, minutes: int = 4, **fields: Any) -> Entry:
        """An entry made some minutes after the one before."""
        self.now += timedelta(minutes=minutes)
        key = fields.get("key", "")
        covers = fields.get("covers")
        on = content_digest(kind, key, covers, self.rig, self.limits)
        return draft(kind=kind, who=who, when=self.now, version=VERSION, on=on, **fields)

    def answer(self, key: str, value: str | None, remark: str, who: str, second: str, failed: bool = False) -> Entry:
        """An answer to an inspection; a value of None says that it does not apply."""
        asked = self.inspections[key]
        found = "fail" if failed else "does not apply" if value is None else "pass"
        fields: dict[str, Any] = {"key": key, "answer": found, "value": value or "", "remark": remark}
        if asked.two_person:
            fields["second"] = second
        if asked.covers:
            fields["covers"] = list(asked.covers)
        return self.entry("answer", who, **fields)


def book(name: str, begun: datetime) -> Book:
    """The record of a demo rig, begun at a time."""
    loaded = load(RIGS / name)
    if loaded.limits is None:
        raise ValueError(f"{name} names no limit set")
    inspections = {one.key: one for one in loaded.limits.limits.inspection}
    return Book(loaded.rig.raw, loaded.limits.raw, inspections, begun)


def bundle() -> Iterator[Entry]:
    """A whole record: rigged and looked at by two people, dropped two days later."""
    kept = book("01-medical-bundle.toml", datetime(2026, 11, 24, 14, 0, tzinfo=ZONE))
    for row, (key, value, remark) in enumerate(BUNDLE):
        if row == FROM_THE_AIRCRAFT_ON:
            yield kept.entry("signature", "AM", remark="rigged")
            yield kept.entry("signature", "SB", minutes=9, remark="checked")
            kept.now = datetime(2026, 11, 26, 7, 20, tzinfo=ZONE)
        yield kept.answer(key, value, remark, "AM", "SB")
    yield kept.entry("remark", "SB", minutes=12, remark="Dropped; zone reports the box whole.")


def grain() -> Iterator[Entry]:
    """Half a record: two answers from before the honeycomb was built up, one answer withdrawn."""
    kept = book("02-grain-container.toml", datetime(2026, 11, 27, 10, 30, tzinfo=ZONE))
    present = kept.rig
    kept.rig = before_the_third_layer(present)
    yield kept.answer("load.contents", "", "", "AM", "OD")
    yield kept.answer("landing.honeycomb", "2", "", "AM", "OD")
    kept.rig = present
    yield kept.entry("remark", "AM", minutes=55, remark="A third layer under the load, on the advice of OD.")
    yield kept.answer("canopy.type_and_count", "", "", "AM", "OD")
    yield kept.answer("canopy.bag_ties", "1", "cotton, spool 14", "AM", "OD")
    yield kept.answer("service.textiles", "", "web cover cut 20 mm, rear left", "AM", "OD", failed=True)
    yield kept.entry("withdrawal", "AM", minutes=40, key="service.textiles", remark="cover changed for another")
    yield kept.answer("service.textiles", "", "", "AM", "OD")
    yield kept.answer("suspension.legs", "", "", "AM", "OD")


def before_the_third_layer(rig: Mapping[str, Any]) -> Mapping[str, Any]:
    """The grain container as it stood before its third layer of honeycomb."""
    earlier = deepcopy(dict(rig))
    earlier["cushion"][0]["layers"] = 2
    honeycomb = next(item for item in earlier["item"] if item["name"] == "Honeycomb")
    honeycomb["mass"] = "21 lb"
    return earlier


RECORDS = {"01-medical-bundle.toml": bundle, "02-grain-container.toml": grain}


def write(folder: Path) -> None:
    """Write every record into a folder, in place of the ones there."""
    for name, entries in RECORDS.items():
        path = record_path(folder / name)
        path.unlink(missing_ok=True)
        for entry in entries():
            append(path, entry)


if __name__ == "__main__":
    write(Path(sys.argv[1]) if sys.argv[1:] else RIGS)
