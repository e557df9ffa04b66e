"""What a step says when a field it needs is not there, and how rows are named in messages."""

from __future__ import annotations

from typing import TypeVar

T = TypeVar("T")


class Missing(Exception):
    """A field that a step needs is absent: the step is OPEN and names it."""


class CannotJudge(Exception):
    """A step that cannot be worked out from complete data; it stays OPEN with this reason."""


class Failed(Exception):
    """A step that fails whatever its value would be; the reason says why and the value is null."""


def need(value: T | None, field: str) -> T:
    """The value, or `Missing` with the field's name."""
    if value is None:
        raise Missing(field)
    return value


def row(table: str, index: int, name: str, field: str = "") -> str:
    """A row as messages name it: counted from 1 and followed by its name, then the field."""
    where = f"{table} {index + 1} ({name})"
    return f"{where} {field}" if field else where
