"""Steps of the group suspension: legs, attachments and links between load and canopies."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.hanging import CAUTIOUS
from model.checks.missing import Missing, need, row
from model.checks.opening import canopy_share, snatch_of
from model.checks.step import Outcome, Step
from model.checks.term import Term, derive, largest, least, read, read_count
from model.physics import strength
from model.rig.parts import Link


def _outcome(case: Case, factors: list[Term], meaning: str) -> Outcome:
    forces = case.forces
    return Outcome(
        least(factors, "k", meaning),
        cautions=forces.cautions,
        notes=(CAUTIOUS, *forces.notes()),
        measured=forces.measured_all(),
    )


def leg_factors(case: Case) -> list[Term]:
    """Strength over load of every leg that carries; a slack one has no factor."""
    hanging = case.hanging
    return [
        derive(strength.strength_ratio, hanging.strength(i), load, of=f"leg {i + 1} ({hanging.legs[i].name})")
        for i, load in enumerate(hanging.loads)
        if load.value > 0
    ]


def attachment_factors(case: Case) -> list[Term]:
    """Strength over load of every lifting point whose leg carries."""
    hanging = case.hanging
    found = []
    for i, load in enumerate(hanging.loads):
        if load.value <= 0:
            continue
        field = hanging.field(i, "attachment")
        allowed = read(hanging.legs[i].attachment, "S", f"attachment of leg {i + 1}", field)
        found.append(
            derive(strength.strength_ratio, allowed, load, of=f"attachment of leg {i + 1} ({hanging.legs[i].name})")
        )
    return found


def link_load(case: Case, link: Link, field: str) -> Term:
    """What a link carries at the largest opening force."""
    carries = need(link.carries, field)
    if carries == "all":
        return case.forces.opening
    if carries == "one leg":
        return largest(list(case.hanging.loads), "T", "largest load of one leg")
    loads = []
    for one in case.rows:
        loads += [canopy_share(case, one), snatch_of(case, one)]
    return largest(loads, "P", "largest load of one canopy, opening or snatch")


def link_factors(case: Case) -> list[Term]:
    """Strength over load of every link."""
    if not case.rig.link:
        raise Missing("link")
    found = []
    for i, link in enumerate(case.rig.link):

        def field(name: str, i: int = i, link: Link = link) -> str:
            return row("link", i, link.name, name)

        each = read(link.strength, "S", f"strength of {link.name}", field("strength"))
        abreast = read_count(link.abreast, "n", f"{link.name}, side by side", field("abreast"))
        whole = derive(strength.link_strength, each, abreast, of=link.name)
        found.append(
            derive(
                strength.strength_ratio,
                whole,
                link_load(case, link, field("carries")),
                of=f"link {i + 1} ({link.name})",
            )
        )
    return found


def _leg(case: Case) -> Outcome:
    case.forces.must_open()
    return _outcome(case, leg_factors(case), "least strength/load of the legs")


def _attachment(case: Case) -> Outcome:
    case.forces.must_open()
    return _outcome(case, attachment_factors(case), "least strength/load of the attachments")


def _link(case: Case) -> Outcome:
    case.forces.must_open()
    return _outcome(case, link_factors(case), "least strength/load of the links")


def _leg_angle(case: Case) -> Outcome:
    fails, measured = case.forces.for_geometry()
    angle = least(case.hanging.angles(), "b", "least leg angle over the deck plane")
    return Outcome(angle, fails=fails, measured=measured)


def _tilt(case: Case) -> Outcome:
    fails, measured = case.forces.for_geometry()
    return Outcome(case.hanging.tilt(), fails=fails, measured=measured)


LEGS = ("leg", "suspension")
STEPS = (
    Step("suspension.leg", "Leg strength over load", "1", _leg, tables=LEGS),
    Step("suspension.attachment", "Lifting point strength over load", "1", _attachment, tables=LEGS),
    Step("suspension.link", "Link strength over load", "1", _link, tables=("link",)),
    Step("suspension.leg_angle", "Least leg angle over the deck", "deg", _leg_angle, tables=LEGS),
    Step("suspension.tilt", "Tilt of the pull against the deck's normal", "deg", _tilt, tables=LEGS),
)
