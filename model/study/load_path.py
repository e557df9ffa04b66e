"""The load path on one page: every part from cargo fitting to canopy with its load, its strength and its factor."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from functools import partial

from model.checks.case import Case
from model.checks.missing import CannotJudge, Failed, Missing
from model.checks.opening import canopy_factor, line_factor, snatch_factor
from model.checks.rows import CanopyRow
from model.checks.suspension import attachment_factors, leg_factors, link_factors
from model.checks.term import Term

KEY = "load-path"


@dataclass(frozen=True)
class Part:
    """One part of the load path; ``factor`` is strength over load, with both as its inputs.

    Without one, ``missing`` says why, and ``fails`` whether the part fails for it or is open.
    """

    name: str
    factor: Term | None
    missing: str = ""
    fails: bool = False

    @property
    def strength(self) -> Term | None:
        """What the part holds."""
        return self.factor.inputs[0] if self.factor else None

    @property
    def load(self) -> Term | None:
        """What it carries at the largest opening force."""
        return self.factor.inputs[1] if self.factor else None


def load_path(case: Case) -> tuple[Part, ...]:
    """All parts, from the lifting points up to the canopies; a part whose data are missing says so."""
    parts = [
        *_parts("lifting points", lambda: attachment_factors(case)),
        *_parts("legs", lambda: leg_factors(case)),
        *_links(case),
    ]
    try:
        rows = case.rows
    except Missing as missing:
        return (*parts, Part("canopies", None, f"data missing: {missing}"))
    for one in rows:
        parts += _parts(f"lines of {one.name}, opening", partial(_alone, line_factor, case, one))
        parts += _parts(f"lines of {one.name}, snatch", partial(_alone, snatch_factor, case, one))
        parts += _parts(f"canopy of {one.name}", partial(_alone, canopy_factor, case, one))
    return tuple(parts)


def _alone(factor: Callable[[Case, CanopyRow], Term], case: Case, one: CanopyRow) -> list[Term]:
    return [factor(case, one)]


def _links(case: Case) -> list[Part]:
    """Links as they follow each other upward: of one leg, of all, of one canopy."""
    order = {"one leg": 0, "all": 1, "one canopy": 2}
    parts = _parts("links", lambda: link_factors(case))
    carries = [order.get(link.carries or "", 3) for link in case.rig.link]
    if len(parts) != len(carries):
        return parts
    return [part for _, part in sorted(zip(carries, parts, strict=True), key=lambda pair: pair[0])]


def _parts(name: str, factors: Callable[[], Sequence[Term]]) -> list[Part]:
    try:
        return [Part(one.meaning.removeprefix("strength over load, "), one) for one in factors()]
    except Missing as missing:
        return [Part(name, None, f"data missing: {missing}")]
    except CannotJudge as reason:
        return [Part(name, None, str(reason))]
    except Failed as reason:
        return [Part(name, None, str(reason), fails=True)]


def weakest(parts: Sequence[Part]) -> Part | None:
    """The part that would give first, of those whose factor is known; None where none is."""
    known = [part for part in parts if part.factor is not None]
    return min(known, key=lambda part: part.factor.value if part.factor else 0.0, default=None)
