"""Write the key tables into files.md from the models that read the files: ``python -m docs.make_files``."""

from __future__ import annotations

import inspect
from collections.abc import Iterator
from typing import Annotated, get_args, get_origin

from pydantic import BaseModel
from pydantic.fields import FieldInfo

from docs.blocks import FOLDER, fill, table, write
from model.checks.registry import BY_ROW, FIXED
from model.quantity import Dimension, QuantityError, unit_names
from model.rig.canopy_table import type_names
from model.rig.entry import Entry
from model.rig.limits import LimitSet
from model.rig.rig import Rig
from model.rig.rule import Rule
from model.rig.stick import Stick

PAGE = "files.md"
FILES: dict[str, tuple[type[BaseModel], str]] = {
    "rig file": (Rig, ""),
    "limit set": (LimitSet, ""),
    "stick file": (Stick, ""),
    "record": (Entry, "[[entry]]"),
}
"""Model of each file, and the table it describes where that is not the whole file."""
TABLES = {
    "About": "[rig]",
    "SetInfo": "[set]",
    "StickInfo": "[stick]",
    "Extraction": "[exit.extraction]",
    "Lines": "[canopy.lines]",
    "Reefing": "[[canopy.reefing]]",
    "ReefingMeasured": "[canopy.reefing.measured]",
    "Measured": "[canopy.measured]",
    "Limit": "[limits]",
    "Separation": "[stick.separation]",
    "StickLoad": "[[load]]",
}
"""Tables that are not called as the key of the model that holds them."""
MISSING = {
    "About.reference": "nothing",
    "About.revision": "nothing",
    "About.rigged_by": "nothing",
    "About.rigged_on": "nothing",
    "About.notes": "nothing",
    "Rig.limits": "every step is OPEN: no limit set",
    "Drop.zone_temperature": "the standard temperature of the zone",
    "Drop.altimeter_setting": "1013.25 hPa",
    "Drop.dew_point": "dry air",
    "Drop.surface_wind": "calm in the motion; `descent.drift` and `landing.*` across the ground are OPEN",
    "Drop.release_wind": "the surface wind at all heights",
    "Drop.winds": "the two winds above",
    "Exit.line_stretch": "worked out from the static line; an error with a timer or extraction",
    "Exit.canopy_pulled_by": "OPEN, unless `line_stretch` is given",
    "Exit.static_line": "OPEN, unless `line_stretch` is given",
    "Exit.load_drag_area": "1.05 x width x rigged height",
    "Exit.extraction": "with extraction everything that needs its mass is OPEN",
    "Extraction.speed_lost": "0, and the working says so",
    "Platform.kind": "nothing",
    "Platform.depth": "0",
    "Platform.overhang_front": "0",
    "Platform.overhang_rear": "0",
    "Platform.overall_width": "the platform's width",
    "Platform.weighed": "the mass is the sum of the parts; `load.weighed` is OPEN",
    "Platform.balanced_at": "the sum of the parts",
    "Platform.measure_from": "the middle",
    "Canopy.diameter": "from `drag_area` and CD0; one of the two is needed",
    "Canopy.drag_area": "from `diameter` and CD0",
    "Canopy.riser_length": "0",
    "Canopy.line_length": "no swing allowance, with a caution; steps that need it are OPEN",
    "Canopy.drag_coefficient": "the canopy table",
    "Canopy.opening_coefficient": "the canopy table",
    "Canopy.fill_constant": "the canopy table",
    "Canopy.growth_exponent": "the canopy table",
    "Canopy.cluster_efficiency": "1 for one canopy; OPEN for more",
    "Canopy.uneven_share": "1 for one canopy; OPEN for more",
    "Canopy.rated_mass": "the limit set alone; OPEN without a limit there",
    "Canopy.rated_speed": "the limit set alone; OPEN without a limit there",
    "Canopy.snatch_speed": "static line: the load's speed against the aircraft at line stretch; else OPEN",
    "Canopy.measured": "estimates",
    "Canopy.opens_after": "one of the three is needed in a later row",
    "Canopy.opens_at_height": "one of the three is needed in a later row",
    "Canopy.opens_at_set_height": "one of the three is needed in a later row",
    "Canopy.when_next_opens": "an error where another row follows",
    "Reefing.fill_constant": "the canopy table",
    "Reefing.growth_exponent": "the canopy table",
    "Reefing.opening_coefficient": "the canopy table",
    "Reefing.measured": "estimates",
    "Measured.rate": "CD0",
    "Measured.rate_mass": "an error beside `rate`",
    "Measured.rate_density": "an error beside `rate`",
    "Measured.filling_time": "fill distance over speed",
    "Measured.opening_force": "the motion",
    "Measured.opening_force_mass": "an error beside `opening_force`",
    "Measured.opening_force_speed": "an error beside `opening_force`",
    "ReefingMeasured.filling_time": "fill distance over speed",
    "Suspension.apex": "solved from the lengths of the legs",
    "Suspension.pull_off_axis": "0",
    "Leg.length": "from the apex",
    "Item.fragility": "that item is not judged; `landing.fragility` is OPEN where no item has one",
    "Lashing.mirror": "the row stands once",
    "Lashing.deck_ring": "a ring of its own",
    "Tie.holds_at_least": "the limit set alone; OPEN without a limit there",
    "Tie.breaks_by": "the limit set alone; OPEN without a limit there",
    "Device.serial": "nothing",
    "SetInfo.issued_by": "nothing",
    "SetInfo.issued_on": "nothing",
    "SetInfo.note": "nothing",
    "Limit.min": "no lower bound",
    "Limit.max": "no upper bound",
    "Limit.source": "an error beside a bound",
    "Limit.judged": "true",
    "Limit.needs_measured": "false",
    "Inspection.stage": "nothing",
    "Inspection.stop": "false",
    "Inspection.two_person": "false",
    "Inspection.answer": "pass or fail is enough",
    "Inspection.caution": "nothing",
    "Inspection.covers": "the whole rigging",
    "LimitSet.restraint": "`lashing.*` is OPEN",
    "StickInfo.release_height": "those of the rigs",
    "StickInfo.airspeed": "those of the rigs",
    "StickInfo.separation": "OPEN: no limit set",
    "Separation.min": "OPEN: no limit set",
    "Rig.left_out": "nothing is left out",
    "Rig.canopy": "OPEN; packs without canopies are an error",
    "Rig.tie": "no tie is judged",
    "Rig.device": "no device is judged",
    "Canopy.reefing": "not reefed",
    "Extraction.drag_coefficient": "the canopy table",
    "Extraction.opening_coefficient": "the canopy table",
    "Extraction.type": "OPEN, unless both coefficients are given",
    "LimitSet.limits": "computed steps are OPEN: no limit set",
    "LimitSet.inspection": "nothing is asked",
    "Stick.load": "an error: two or more are needed",
    "Entry.key": "an error in an answer, a withdrawal and a deviation",
    "Entry.answer": "an error in an answer",
    "Entry.value": "OPEN where the inspection asks for one",
    "Entry.remark": "an error in a deviation, a remark, and with fail or does not apply",
    "Entry.second": "OPEN where the inspection asks for two persons",
    "Entry.covers": "the whole rigging",
    "Entry.previous": "only in the first entry",
    "Entry.digest": "an error",
}
"""What is taken where an optional key is missing. Keys that are not named leave the steps that need them OPEN."""


DEFINITIONS = {
    "load.mass": "M: the scale's reading if there is one, else platform + items + canopies + extraction parachutes",
    "load.weighed": "(scale - sum of the parts)/sum of the parts",
    "load.base_loading": "M g0/(length x width)",
    "load.height": "highest point over the platform's underside",
    "load.width": "overall width, else the platform's",
    "load.length": "platform and overhangs",
    "load.suspended_per_canopy": "suspended mass/number of mains; the row's own `rated_mass` is a limit on it",
    "balance.forward": "x of the centre of gravity of platform, items and canopies",
    "balance.side": "y of it",
    "balance.slenderness": "its height over the underside/smaller side of the base",
    "zone.density_altitude": "of the zone; for information where no limit is set",
    "descent.rate": "steady, zone air, drag area of what hangs open at the end alone",
    "descent.rate_one_out": "the same with one canopy of the largest row missing; only with several mains",
    "descent.time": "release to touchdown; for information where no limit is set",
    "descent.drift": "ground distance along the run-in, throw included; for information where no limit is set",
    "opening.load_factor": "F/(m g0); F is the largest opening force of all canopies over all fillings",
    "opening.canopy": "least over rows of strength/(row's force/count x uneven share)",
    "opening.speed": "at each row's line stretch, against its `rated_speed`",
    "opening.snatch": "strength of all lines/snatch force",
    "opening.line": "one line's strength/its share",
    "height.opening_loss": "release to the first moment after the last filling at which V <= 1.05 of the steady rate, "
    "plus the swing allowance",
    "height.reserve": "release height less that",
    "extraction.ratio": "q CdS count/(M g0); only with extraction",
    "extraction.line": "strength/(q CdS count Cx); only with extraction",
    "extraction.attachment": "the same for the fitting on the load",
    "suspension.leg": "least over legs of strength x plies x joint efficiency/tension",
    "suspension.attachment": "least over legs of lifting point strength/tension",
    "suspension.link": "least over links of strength x abreast/load",
    "suspension.leg_angle": "least angle of a leg over the deck plane",
    "suspension.tilt": "line from the centre of gravity to the apex against the deck's normal",
    "landing.deceleration": "net; felt is one more",
    "landing.fragility": "least over items of fragility/net deceleration",
    "landing.crush_reserve": "of the thinnest row; under 1 the stack bottoms",
    "landing.centre": "in plan, from the centre of gravity of what lies over the stack",
    "landing.speed_across": "size of the surface wind",
    "landing.overturn": "of a rigid block that catches its edge",
    "lashing.forward": "held/(restraint factor x weight of M less platform and extraction parachutes)",
    "lashing.aft": "likewise",
    "lashing.left": "likewise",
    "lashing.right": "likewise",
    "lashing.up": "likewise",
    "lashing.mixed": "FAIL where straps and chains each hold more than a tenth of one direction; takes no limit",
    "device.early": "arms after release/time of full opening; ground releases",
    "device.late": "release to touchdown/arms after release; ground releases",
    "device.expires": "days from the drop to the end of life",
    "service.packs": "packs/canopies: fewer is OPEN, more is an error",
    "service.repack": "days from packing to the drop",
    "service.age": "calendar years from manufacture to the drop, with the fraction of the current one",
}
"""What each step is; a step that is not named here stops the script."""


def _annotations(annotation: object) -> Iterator[object]:
    """An annotation and everything it is made of."""
    yield annotation
    for inner in get_args(annotation):
        if not isinstance(inner, Rule):
            yield from _annotations(inner)


def _rule(field: FieldInfo) -> Rule | None:
    for data in field.metadata:
        if isinstance(data, Rule):
            return data
    for part in _annotations(field.annotation):
        if get_origin(part) is Annotated:
            return next((data for data in get_args(part)[1:] if isinstance(data, Rule)), None)
    return None


def child(field: FieldInfo) -> type[BaseModel] | None:
    """The model of a field that is a table or rows of one."""
    for part in _annotations(field.annotation):
        if isinstance(part, type) and issubclass(part, BaseModel):
            return part
    return None


def _is_rows(field: FieldInfo) -> bool:
    return any(get_origin(part) is tuple for part in _annotations(field.annotation))


def expected(rule: Rule) -> str:
    """What may stand in a field, in the words of its own error message."""
    words = inspect.getclosurevars(rule.read).nonlocals.get("expected")
    if isinstance(words, str):
        return words
    try:
        rule.read(object())
    except QuantityError as error:
        return error.expected
    raise ValueError("a rule that takes anything")


def _tables(model: type[BaseModel], name: str) -> Iterator[tuple[str, type[BaseModel]]]:
    """A model with its table, then those of the tables within it."""
    yield name, model
    for key, field in model.model_fields.items():
        below = child(field)
        if below is not None:
            yield from _tables(below, _table_name(key, field, below))


def _table_name(key: str, field: FieldInfo, model: type[BaseModel]) -> str:
    plain = f"[[{key}]]" if _is_rows(field) else f"[{key}]"
    return TABLES.get(model.__name__, plain)


def _value(key: str, field: FieldInfo) -> str:
    model = child(field)
    if model is None:
        rule = _rule(field)
        return expected(rule) if rule else "a text"
    name = _table_name(key, field, model)
    return f"[`{name}`](#{''.join(mark for mark in name.lower() if mark.isalnum() or mark == '_')})"


def _missing(model: type[BaseModel], key: str, field: FieldInfo) -> str:
    return "an error" if field.is_required() else MISSING.get(f"{model.__name__}.{key}", "OPEN")


def _keys(model: type[BaseModel], name: str) -> str:
    made = []
    for table_name, each in _tables(model, name):
        rows = [
            [f"`{key}`", _value(key, field), field.description or "", _missing(each, key, field)]
            for key, field in each.model_fields.items()
        ]
        title = f"### `{table_name}`\n\n" if table_name else ""
        made.append(title + table(["key", "value", "meaning", "where missing"], rows))
    return "\n".join(made)


def _steps() -> str:
    rows = [[f"`{step.key}`", step.unit or "-", f"{step.title}: {DEFINITIONS[step.key]}"] for step in FIXED]
    rows += [[f"`{key}`", unit, f"for every row: {DEFINITIONS[key]}"] for key, unit in BY_ROW.items()]
    rows += [["`tie.NAME.holds`", "N", "strands x strand strength x knot efficiency, against `holds_at_least`"]]
    rows += [["`tie.NAME.breaks`", "N", "strands x greatest strand strength, against `breaks_by`"]]
    return table(["key", "unit", "step"], rows)


def _units() -> str:
    return table(["quantity", "units"], [[str(d), " · ".join(unit_names(d))] for d in Dimension])


def _types() -> str:
    return f"Types: {', '.join(type_names())}.\n"


def blocks() -> dict[str, str]:
    """The generated blocks of the page."""
    made = {f"keys of the {file}": _keys(model, name) for file, (model, name) in FILES.items()}
    return {**made, "steps": _steps(), "units": _units(), "canopy types": _types()}


def rendered() -> str:
    """The page as it has to be."""
    return fill((FOLDER / PAGE).read_text(encoding="utf-8"), blocks())


if __name__ == "__main__":
    write(PAGE, rendered)
