"""Steps of the groups tie, device and service: one or two for each row of the rig file."""

from __future__ import annotations

from calendar import isleap
from collections.abc import Callable
from datetime import MAXYEAR, date

from model.checks.case import Case
from model.checks.missing import CannotJudge, Missing, need, row
from model.checks.step import Outcome, Step, own_limit
from model.checks.term import Procedure, Term, combine, derive, known, read, read_count
from model.physics import strength
from model.rig.parts import Device, Tie
from model.rig.rig import Rig


def tie_steps(rig: Rig) -> list[Step]:
    """Least it holds and most it may hold, for every tie."""
    if not rig.tie:
        return [Step("tie.rows", "Ties: given, or left out on purpose", None, _none_given("tie"), tables=("tie",))]
    found = []
    for i, tie in enumerate(rig.tie):

        def holds(case: Case, i: int = i, tie: Tie = tie) -> Outcome:
            return _holds(i, tie)

        def breaks(case: Case, i: int = i, tie: Tie = tie) -> Outcome:
            return _breaks(i, tie)

        found.append(Step(f"tie.{tie.name}.holds", f"{tie.name}: least it holds", "N", holds, tables=("tie",)))
        found.append(
            Step(f"tie.{tie.name}.breaks", f"{tie.name}: most it holds before it breaks", "N", breaks, tables=("tie",))
        )
    return found


def _none_given(table: str) -> Callable[[Case], Outcome]:
    """An absent table leaves a step open until it is given or left out on purpose."""

    def compute(_: Case) -> Outcome:
        raise Missing(table)

    return compute


def _strands(i: int, tie: Tie) -> Term:
    field = row("tie", i, tie.name, "strands")
    return read_count(tie.strands, "n", f"strands, {tie.name}", field)


def _holds(i: int, tie: Tie) -> Outcome:
    field = row("tie", i, tie.name, "strand_strength")
    each = read(tie.strand_strength, "S", f"least strength of a strand, {tie.name}", field)
    field = row("tie", i, tie.name, "knot_efficiency")
    knot = read(tie.knot_efficiency, "eta", f"knot efficiency, {tie.name}", field)
    result = derive(strength.tie_strength, _strands(i, tie), each, knot, of=tie.name)
    asked = tie.holds_at_least
    return Outcome(result, (own_limit("N", least=asked),) if asked else ())


def _breaks(i: int, tie: Tie) -> Outcome:
    field = row("tie", i, tie.name, "strand_strength_most")
    each = read(tie.strand_strength_most, "S", f"greatest strength of a strand, {tie.name}", field)
    result = derive(strength.tie_strength_most, _strands(i, tie), each, of=tie.name)
    asked = tie.breaks_by
    return Outcome(result, (own_limit("N", most=asked),) if asked else ())


def device_steps(rig: Rig) -> list[Step]:
    """Arming of ground releases, expiry of every device."""
    if not rig.device:
        title = "Devices: given, or left out on purpose"
        return [Step("device.rows", title, None, _none_given("device"), tables=("device",))]
    found = []
    for i, device in enumerate(rig.device):

        def early(case: Case, i: int = i, device: Device = device) -> Outcome:
            return _early(case, i, device)

        def late(case: Case, i: int = i, device: Device = device) -> Outcome:
            return _late(case, i, device)

        def expires(case: Case, i: int = i, device: Device = device) -> Outcome:
            return _expires(case, i, device)

        name, tables = device.name, ("device",)
        if device.kind in ("ground release", None):
            title = f"{name}: arms after the canopies are open"
            found.append(Step(f"device.{name}.early", title, "1", early, limit_key="device.early", tables=tables))
            title = f"{name}: arms before touchdown"
            found.append(Step(f"device.{name}.late", title, "1", late, limit_key="device.late", tables=tables))
        title = f"{name}: life left on the day of the drop"
        found.append(Step(f"device.{name}.expires", title, "d", expires, limit_key="device.expires", tables=tables))
    return found


RATIO = Procedure("quotient of the lines above", lambda over, under: over / under, "definition")


def _arms(i: int, device: Device) -> Term:
    need(device.kind, row("device", i, device.name, "kind"))
    field = row("device", i, device.name, "arms_after")
    return read(device.arms_after, "ta", f"{device.name} arms after release", field)


def _times_measured(case: Case) -> bool:
    return all(one.every_time_measured for one in case.rows)


def _early(case: Case, i: int, device: Device) -> Outcome:
    arms = _arms(i, device)
    case.forces.must_open()
    last = sum(len(one.fillings) for one in case.rows) - 1
    full = case.motions.flown(
        case.heights.rule, lambda motion: motion.end_time[last, 0], "tf", "time of full opening", "time"
    )
    result = combine(RATIO, [arms, full], "k", "arming over full opening", "number")
    return Outcome(result, cautions=case.forces.cautions, measured=_times_measured(case))


def _late(case: Case, i: int, device: Device) -> Outcome:
    arms = _arms(i, device)
    if arms.value == 0:
        raise CannotJudge(f"{device.name} arms at release: there is no ratio")
    lands = case.motions.flown(
        case.heights.rule, lambda motion: motion.touchdown_time[0], "t", "release to touchdown", "time"
    )
    result = combine(RATIO, [lands, arms], "k", "touchdown over arming", "number")
    return Outcome(result, cautions=case.forces.cautions, measured=_times_measured(case))


def _days(later: date, earlier: date, symbol: str, meaning: str, origin: str) -> Term:
    return known(float((later - earlier).days), symbol, meaning, "d", f"{origin}: {earlier} to {later}")


def _expires(case: Case, i: int, device: Device) -> Outcome:
    field = row("device", i, device.name, "expires")
    last = need(device.expires, field)
    return Outcome(_days(last, case.rig.drop.date, "d", f"life left, {device.name}", f"drop.date and {field}"))


def service_steps(rig: Rig) -> list[Step]:
    """Packs against canopies; days since packing and age of every pack."""
    found = [Step("service.packs", "Packs for canopies", "1", _packs, tables=("pack",))]
    for i, pack in enumerate(rig.pack):

        def repack(case: Case, i: int = i) -> Outcome:
            return _since(case, i)

        def age(case: Case, i: int = i) -> Outcome:
            return _age(case, i)

        key, title = f"service.repack.{pack.serial}", f"{pack.serial}: days since it was packed"
        found.append(Step(key, title, "d", repack, limit_key="service.repack", tables=("pack",)))
        key, title = f"service.age.{pack.serial}", f"{pack.serial}: age"
        found.append(Step(key, title, "yr", age, limit_key="service.age", tables=("pack",)))
    return found


def _packs(case: Case) -> Outcome:
    rig = case.rig
    canopies = sum(one.count for one in rig.canopy)
    if canopies == 0:
        raise Missing("canopy")
    packs = known(float(len(rig.pack)), "np", "packs", "number", "rows of [[pack]]")
    count = known(float(canopies), "nc", "canopies", "number", "canopy rows, count")
    ratio = combine(RATIO, [packs, count], "k", "packs/canopies", "number")
    if len(rig.pack) < canopies:
        return Outcome(ratio, opens=f"data missing: {canopies - len(rig.pack)} of {canopies} packs")
    return Outcome(ratio, passes="a pack for every canopy")


def _since(case: Case, i: int) -> Outcome:
    pack = case.rig.pack[i]
    field = row("pack", i, pack.serial, "packed")
    packed = need(pack.packed, field)
    return Outcome(_days(case.rig.drop.date, packed, "d", f"since {pack.serial} was packed", f"{field} and drop.date"))


def _age(case: Case, i: int) -> Outcome:
    pack = case.rig.pack[i]
    field = row("pack", i, pack.serial, "made")
    made = need(pack.made, field)
    on = case.rig.drop.date
    return Outcome(
        known(age_in_years(made, on), "y", f"age of {pack.serial}", "yr", f"{field} and drop.date: {made} to {on}")
    )


def _anniversary(made: date, year: int) -> date:
    """The same day in another year; 29 February falls on 1 March where there is none."""
    leaps = (made.month, made.day) == (2, 29) and not isleap(year)
    return date(year, 3, 1) if leaps else made.replace(year=year)


def age_in_years(made: date, on: date) -> float:
    """Calendar years from one day to another, with the fraction of the current one."""
    years = on.year - made.year
    if on < _anniversary(made, on.year):
        years -= 1
    last = _anniversary(made, made.year + years)
    if last.year == MAXYEAR:
        return years + (on - last).days / 365
    return years + (on - last).days / (_anniversary(made, last.year + 1) - last).days
