"""Digests of content: what an answer or a signature was made on.

SHA-256 over sorted compact JSON of the TOML values as written; comments, spacing and the order of keys do not count.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from datetime import date, time
from typing import Any, TypeAlias

Raw: TypeAlias = Mapping[str, Any]

_NOT_RIGGING = frozenset({"rig", "drop", "limits"})


def digest(values: object) -> str:
    """SHA-256 of values as sorted compact JSON, in hexadecimal; dates and times as ISO text."""
    import hashlib
    import json  # a check of a rig without a record takes no digest

    text = json.dumps(values, sort_keys=True, separators=(",", ":"), ensure_ascii=False, default=_iso)
    return hashlib.sha256(text.encode("utf-8")).hexdigest()


def rigging_digest(rig: Raw, limits: Raw | None) -> str:
    """Digest of what is rigged and of what has to be looked at.

    Args:
        rig: raw values of the rig file; [rig], [drop] and `limits` are left out.
        limits: raw values of the limit set, of which the inspections count; None without one.
    """
    rigging = {key: value for key, value in rig.items() if key not in _NOT_RIGGING}
    return digest({"rig": rigging, "inspection": _inspections(limits)})


def full_digest(rig: Raw, limits: Raw | None) -> str:
    """Digest of everything in both files."""
    return digest({"rig": rig, "limits": limits})


def tables_digest(rig: Raw, limits: Raw | None, tables: Iterable[str], key: str) -> str:
    """Digest of some tables of the rig file, and of the inspection that covers them.

    Args:
        rig: raw values of the rig file.
        limits: raw values of the limit set.
        tables: names of the tables.
        key: key of the inspection; a question put differently is another question.
    """
    asked = [row for row in _inspections(limits) if isinstance(row, dict) and row.get("key") == key]
    return digest({"rig": {name: rig.get(name) for name in tables}, "inspection": asked})


def _inspections(limits: Raw | None) -> list[Any]:
    rows = limits.get("inspection", []) if limits else []
    return rows if isinstance(rows, list) else []


def _iso(value: object) -> str:
    if isinstance(value, date | time):  # a datetime is a date
        return value.isoformat()
    raise TypeError(f"no TOML value: {type(value).__name__}")
