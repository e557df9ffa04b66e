"""The entries of a record."""

import re
from collections.abc import Iterator
from datetime import datetime
from typing import Annotated, Any, Literal, TypeAlias

from pydantic import Field, ValidationError

from model.quantity import QuantityError
from model.rig.fields import Format, Line, Note
from model.rig.limits import Covers
from model.rig.rule import FieldError, Rule, Strict, choice, described, required, rows
from model.rig.schema import read

_DIGEST = re.compile(r"[0-9a-f]{64}", re.ASCII)


def _digest(found: Any) -> str:
    if not isinstance(found, str) or not _DIGEST.fullmatch(found):
        raise FieldError(described(found), "a digest of 64 hexadecimal digits")
    return found


def _when(found: Any) -> datetime:
    expected = "a time with its zone in whole seconds, such as 2026-09-14T08:30:00+02:00"
    if not isinstance(found, datetime):
        raise FieldError(described(found), expected)
    offset = found.utcoffset()
    if offset is None or found.microsecond or offset.total_seconds() % 60:
        raise FieldError(described(found), expected)
    return found


Kind: TypeAlias = Annotated[
    Literal["answer", "withdrawal", "deviation", "signature", "remark"],
    choice("answer", "withdrawal", "deviation", "signature", "remark"),
]
Answer: TypeAlias = Annotated[
    Literal["pass", "fail", "does not apply"], choice("pass", "fail", "does not apply")
]
Digest: TypeAlias = Annotated[str, Rule(_digest)]
When: TypeAlias = Annotated[datetime, Rule(_when)]

_NEEDS = {
    "answer": ("key", "answer"),
    "withdrawal": ("key",),
    "deviation": ("key", "remark"),
    "signature": (),
    "remark": ("remark",),
}
_MAY = {
    "answer": ("key", "answer", "value", "remark", "second", "covers"),
    "withdrawal": ("key", "remark", "second"),
    "deviation": ("key", "remark", "second"),
    "signature": ("remark", "second"),
    "remark": ("key", "remark", "second"),
}
_SOME = ("key", "answer", "value", "remark", "second", "covers")


def _text(description: str) -> Any:
    return Field(default="", description=description)


class Entry(Strict):
    """One entry; a text that is missing is empty."""

    kind: Kind = required("answer, withdrawal, deviation, signature or remark")
    key: Line = _text("the step it is about")
    answer: Answer | None = Field(default=None, description="of an answer: pass, fail or does not apply")
    value: Line = _text("of an answer: the value that was asked for")
    remark: Note = _text("why, in free text")
    who: Line = required("who made it")
    second: Line = _text("the second person of a two-person step")
    when: When = required("when, with zone, in whole seconds")
    version: Line = required("version of the program")
    on: Digest = required("digest of the content it was made on")
    covers: Covers | None = Field(default=None, description="of an answer: the tables it stands on, else all rigging")
    previous: Annotated[str, Rule(lambda found: found and _digest(found))] = _text("digest of the entry before")
    digest: Annotated[str, Rule(lambda found: found and _digest(found))] = _text("its own digest")

    def written(self) -> dict[str, Any]:
        """The fields that are not empty, in the order they are written in."""
        return {key: value for key in FIELDS if (value := getattr(self, key))}

    def contradictions(self) -> Iterator[tuple[tuple[str, ...], str, str]]:
        """Fields that do not go together: place, what was found, what is expected."""
        for key in _NEEDS[self.kind]:
            if not getattr(self, key):
                yield (), f"no {key}", f"the {key} of kind {self.kind}"
        for key in _SOME:
            if getattr(self, key) and key not in _MAY[self.kind]:
                yield (key,), f"{key} with kind {self.kind}", f"none of kind {self.kind}"
        if self.answer in ("fail", "does not apply") and not self.remark.strip():
            yield (), f'"{self.answer}" without a remark', "a remark that says why"
        if not self.who:
            yield ("who",), "nobody", "a name"
        if self.second and self.second.casefold() == self.who.casefold():
            yield ("second",), f'"{self.second}", who made it', "the name of a second person"


def draft(**fields: Any) -> Entry:
    """An entry from what somebody typed, not yet linked to a record.

    Raises:
        FieldError: a field that may not stand so, or fields that do not go together.
    """
    try:
        entry = read(Entry, fields)
    except ValidationError as error:
        first = error.errors(include_url=False)[0]
        cause = first.get("ctx", {}).get("error")
        if isinstance(cause, QuantityError):
            raise FieldError(cause.found, cause.expected, cause.hint) from None
        raise FieldError(f"{first['type']} for {first['loc'][-1]}", "the fields of an entry") from None
    for _, found, expected in entry.contradictions():
        raise FieldError(found, expected)
    return entry


FIELDS = tuple(Entry.model_fields)
"""The fields of an entry in the order they are written in."""


class Record(Strict):
    """All entries of a record."""

    format: Format = required("1")
    entry: tuple[Entry, ...] = rows("entries, oldest first")
