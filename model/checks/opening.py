"""Steps of the group opening: forces on canopies and lines while they fill."""

from __future__ import annotations

from model.checks.case import Case
from model.checks.missing import CannotJudge, need
from model.checks.rows import CanopyRow
from model.checks.step import Outcome, Row, Step, own_limit
from model.checks.term import Term, derive, given, least, read, read_count
from model.physics import balance, canopy, strength


def _load_factor(case: Case) -> Outcome:
    result = derive(canopy.load_factor, case.forces.opening, case.masses.falling, unit="g")
    outcome = _outcome(case, result)
    if any(case.forces.measured(one) for one in case.rows):
        return outcome
    plain = canopy.load_factor(case.forces.plain().value, case.masses.falling.value)
    return outcome._replace(notes=(f"(without the opening coefficient {float(plain):.4g} g)", *outcome.notes))


def _outcome(case: Case, result: Term, measured: bool | None = None) -> Outcome:
    forces = case.forces
    rests = forces.measured_all() if measured is None else measured
    return Outcome(result, cautions=forces.cautions, notes=forces.notes(), measured=rests)


def canopy_share(case: Case, one: CanopyRow) -> Term:
    """Load of the worst canopy of a row."""
    return derive(strength.canopy_load, case.forces.of_row(one), one.count, one.uneven_share, of=one.name)


def canopy_factor(case: Case, one: CanopyRow) -> Term:
    """Strength of one canopy over the load of the row's worst."""
    case.forces.must_open()
    allowed = read(one.row.strength, "S", f"strength, {one.name}", one.field("strength"))
    return derive(strength.strength_ratio, allowed, canopy_share(case, one), of=f"canopy of {one.name}")


def _canopy(case: Case) -> Outcome:
    factors = [canopy_factor(case, one) for one in case.rows]
    return _outcome(case, least(factors, "k", "least strength/load over the rows"))


def speed_at_stretch(case: Case, one: CanopyRow) -> Term:
    """Equivalent airspeed at a row's line stretch, the larger of the rules."""
    forces, motions = case.forces, case.motions
    forces.must_open()
    unit = one.row.rated_speed.unit if one.row.rated_speed else case.motions.indicated.unit
    rule = max(motions.rules, key=lambda name: float(motions.motion(name).line_stretch_equivalent_speed[one.index, 0]))
    return motions.flown(
        rule,
        lambda motion: motion.line_stretch_equivalent_speed[one.index, 0],
        "Ve",
        f"equivalent airspeed at line stretch, {one.name}",
        "speed",
        unit,
    )


def _speed(case: Case) -> Outcome:
    """Every row against its own rated speed and the limit set."""
    rows = []
    for one in case.rows:
        rated = one.row.rated_speed
        limits = (own_limit("m/s", most=rated),) if rated else ()
        rows.append(Row(speed_at_stretch(case, one), limits, one.field("rated_speed")))
    return Outcome(rows[0].result, measured=case.forces.measured_all(), rows=tuple(rows))


def snatch_of(case: Case, one: CanopyRow) -> Term:
    """Snatch force of one canopy of a row at line stretch."""
    lines = need(one.row.lines, one.field("lines"))
    count, each = _lines(one)
    stretch = read(lines.stretch, "eps", "stretch at break", one.field("lines.stretch"))
    stiffness = derive(strength.stretch_stiffness, count, each, stretch, case.motions.line_length(one), of=one.name)
    canopy_mass = read(one.row.mass, "mc", "mass of one canopy", one.field("mass"))
    load_mass = derive(balance.mass_per_canopy, case.masses.suspended, one.count)
    reduced = derive(strength.reduced_mass, canopy_mass, load_mass)
    return derive(strength.snatch_force, snatch_speed(case, one), stiffness, reduced, of=one.name)


def snatch_speed(case: Case, one: CanopyRow) -> Term:
    """Load against canopy at line stretch: given, or for a static line the load against the aircraft."""
    if one.row.snatch_speed is not None:
        return given(one.row.snatch_speed, "dv", "load against canopy at line stretch", one.field("snatch_speed"))
    leaving = case.exit
    if one.index > 0 or leaving.canopy_pulled_by != "static line" or leaving.method == "extraction":
        need(None, one.field("snatch_speed"))
    return case.motions.flown(
        case.motions.rules[0],
        lambda motion: motion.line_stretch_relative_speed[one.index, 0],
        "dv",
        "load against the aircraft at line stretch",
        "speed",
    )


def _line_total(one: CanopyRow) -> Term:
    return derive(strength.lines_strength, *_lines(one), of=one.name)


def _lines(one: CanopyRow) -> tuple[Term, Term]:
    """Lines of one canopy and the strength of each."""
    lines = need(one.row.lines, one.field("lines"))
    count = read_count(lines.count, "Z", "lines of one canopy", one.field("lines.count"))
    return count, read(lines.strength, "P", "strength of one line", one.field("lines.strength"))


def snatch_factor(case: Case, one: CanopyRow) -> Term:
    """Strength of all lines of one canopy over its snatch force."""
    case.forces.must_open()
    snatch = snatch_of(case, one)
    if snatch.value <= 0:
        raise CannotJudge(f"{one.name}: no snatch, load and canopy move alike at line stretch")
    return derive(strength.strength_ratio, _line_total(one), snatch, of=f"lines of {one.name}, snatch")


def _snatch(case: Case) -> Outcome:
    case.forces.must_open()
    factors = [snatch_factor(case, one) for one in case.rows if snatch_of(case, one).value > 0]
    if not factors:
        raise CannotJudge("no snatch: load and canopies move alike at line stretch")
    return Outcome(least(factors, "k", "least line strength/snatch force"), measured=case.forces.measured_all())


def line_share(case: Case, one: CanopyRow) -> Term:
    """Load on one line of the worst canopy."""
    count, _ = _lines(one)
    angle = derive(strength.line_angle, one.diameter, case.motions.line_length(one), of=one.name)
    if angle.value != angle.value:
        raise CannotJudge(f"{one.name}: the lines are shorter than the mouth of the canopy is wide")
    return derive(strength.line_load, case.forces.of_row(one), one.count, one.uneven_share, count, angle, of=one.name)


def line_factor(case: Case, one: CanopyRow) -> Term:
    """Strength of one line over its share."""
    case.forces.must_open()
    _, each = _lines(one)
    return derive(strength.strength_ratio, each, line_share(case, one), of=f"one line of {one.name}")


def _line(case: Case) -> Outcome:
    return _outcome(case, least([line_factor(case, one) for one in case.rows], "k", "least line strength/share"))


STEPS = (
    Step("opening.load_factor", "Opening force over weight", "g0", _load_factor, tables=("canopy",)),
    Step("opening.canopy", "Canopy strength over opening force", "1", _canopy, tables=("canopy",)),
    Step("opening.speed", "Equivalent airspeed at line stretch", "m/s", _speed, tables=("canopy",)),
    Step("opening.snatch", "Line strength over snatch force", "1", _snatch, tables=("canopy",)),
    Step("opening.line", "Line strength over its share", "1", _line, tables=("canopy",)),
)
