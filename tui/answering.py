"""An answer on its way into the record: what is still asked for, and keys that repeat by themselves."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Literal

FieldName = Literal["value", "remark", "who", "second"]
Choice = Literal["pass", "fail", "does not apply", "withdrawal"]

REPEAT = 0.3
"""Seconds within which the same key counts as a repeat."""
LONGEST = {"value": 120, "remark": 400, "who": 40, "second": 40}
"""Most characters of each field."""


@dataclass(frozen=True, slots=True)
class Draft:
    """An answer that is chosen but not written yet.

    ``wants_value`` and ``two_person`` say what the inspection asks for. A field that is None has not been asked yet.
    """

    key: str
    choice: Choice
    wants_value: str = ""
    two_person: bool = False
    value: str | None = None
    remark: str | None = None
    who: str | None = None
    second: str | None = None

    @property
    def fields(self) -> tuple[FieldName, ...]:
        """The fields this answer takes, in the order they are asked for."""
        wanted: list[FieldName] = []
        if self.wants_value and self.choice in ("pass", "fail"):
            wanted.append("value")
        if self.choice != "pass":
            wanted.append("remark")
        wanted.append("who")
        if self.two_person and self.choice != "withdrawal":
            wanted.append("second")
        return tuple(wanted)

    @property
    def next_field(self) -> FieldName | None:
        """The next field to ask for; None when nothing is missing."""
        return next((name for name in self.fields if getattr(self, name) is None), None)

    def question(self, name: FieldName) -> str:
        """What a field asks, in a few words."""
        if name == "value":
            return self.wants_value
        return {"remark": "remark, why", "who": "your initials", "second": "second person's initials"}[name]

    def problem(self, name: FieldName, text: str) -> str | None:
        """Why a text can't be taken for a field, None where it can."""
        entered = text.strip()
        if len(entered) > LONGEST[name]:
            return f"{self.question(name)}: {len(entered)} characters, at most {LONGEST[name]}"
        if not entered and not (name == "value" and self.choice == "fail"):
            return f"{self.question(name)}: needed, nothing was typed"
        if name == "second" and _same(entered, self.who or ""):
            return "the second person must be somebody else"
        return None

    def having(self, name: FieldName, text: str) -> Draft:
        """The draft with a field filled in.

        Raises:
            ValueError: If the text can't be taken.
        """
        problem = self.problem(name, text)
        if problem is not None:
            raise ValueError(problem)
        entered = text.strip()
        if name == "value":
            return replace(self, value=entered)
        if name == "remark":
            return replace(self, remark=entered)
        if name == "who":
            return replace(self, who=entered)
        return replace(self, second=entered)


def _same(one: str, other: str) -> bool:
    return "".join(one.split()).casefold() == "".join(other.split()).casefold()


class RepeatGuard:
    """Tells a key pressed again from one that is held down."""

    def __init__(self) -> None:
        """Start with no key seen."""
        self._last: dict[str, float] = {}

    def repeats(self, key: str, moment: float) -> bool:
        """Whether this press follows one of the same key within `REPEAT`; a held key keeps counting as held.

        Args:
            key: The key.
            moment: When it was pressed, seconds of a clock that never goes back.
        """
        last = self._last.get(key)
        self._last[key] = moment
        return last is not None and moment - last < REPEAT

    def forget(self) -> None:
        """Forget all keys: text was typed since, so the next key is pressed anew."""
        self._last.clear()
