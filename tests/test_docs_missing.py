"""What the page on file formats says of missing keys, tried on demo rigs: take a key away and look at the steps."""

from __future__ import annotations

import tomllib
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import tomli_w
from pydantic import BaseModel

from docs.make_files import MISSING, child
from model.checks.checklist import check
from model.checks.finding import Finding, Verdict
from model.rig.rig import Rig

RIGS = Path(__file__).parent.parent / "rigs"
DEMO = ["04-pump-cool.toml", "06-reefed-truck.toml"]
"""One that leaves by gravity on a static line, one that is drawn out and has reefed canopies."""


def optional_keys(model: type[BaseModel], table: dict[str, Any]) -> Iterator[tuple[str, dict[str, Any], str]]:
    """Every optional key that stands in a table or those within it: its name in the docs, its table, the key.

    Of several rows the first one counts.
    """
    for key, field in model.model_fields.items():
        if key not in table:
            continue
        below = child(field)
        if below is not None:
            inner = table[key][0] if isinstance(table[key], list) else table[key]
            yield from optional_keys(below, inner)
        if not field.is_required():
            yield f"{model.__name__}.{key}", table, key


def findings(raw: dict[str, Any], folder: Path) -> dict[str, Finding]:
    """The steps of a rig written to a folder."""
    path = folder / "rig.toml"
    path.write_text(tomli_w.dumps(raw), encoding="utf-8")
    return {one.key: one for one in check(path).findings}


def test_keys_said_to_leave_steps_open_do_and_keys_no_step_needs_do_not(tmp_path: Path) -> None:
    tried: set[str] = set()
    for name in DEMO:
        raw = tomllib.loads((RIGS / name).read_text(encoding="utf-8"))
        raw["limits"] = str((RIGS / raw["limits"]).resolve())
        whole = findings(raw, tmp_path)
        for documented, table, key in list(optional_keys(Rig, raw)):
            if documented in tried or MISSING.get(documented, "OPEN") not in ("OPEN", "nothing"):
                continue
            kept = dict(table)
            del table[key]
            found = findings(raw, tmp_path)
            table.clear()
            table.update(kept)
            opened = {one for one, step in found.items() if opens(step, whole[one])}
            assert bool(opened) == (documented not in MISSING), documented
            tried.add(documented)
    assert len(tried) > 70


def opens(now: Finding, before: Finding) -> bool:
    """Whether a step has become open, or has lost its value for want of data."""
    became = now.verdict is Verdict.OPEN and before.verdict is not Verdict.OPEN
    return became or (now.reason.startswith("data missing") and before.value is not None)
