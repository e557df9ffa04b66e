"""Digests of content, and what of a record stands against it."""

import copy
import datetime
import tomllib
from typing import Any

import pytest

from model.rig.digest import full_digest, rigging_digest, tables_digest
from model.rig.entry import Entry, draft
from model.rig.standing import content_digest, standing
from tests.model.rig import samples

RIG, LIMITS = tomllib.loads(samples.RIG), tomllib.loads(samples.LIMITS)
WHEN = datetime.datetime(2026, 9, 14, 8, 30, tzinfo=datetime.UTC)


def entry(kind: str, key: str = "", *, covers: list[str] | None = None, minutes: int = 0, **fields: object) -> Entry:
    on = content_digest(kind, key, covers, RIG, LIMITS)
    when = WHEN + datetime.timedelta(minutes=minutes)
    return draft(kind=kind, key=key, covers=covers, who="AM", when=when, version="0.1.0", on=on, **fields)


def with_change(raw: dict[str, Any], *path: str | int, value: object) -> dict[str, Any]:
    changed: Any = copy.deepcopy(raw)
    inner = changed
    for part in path[:-1]:
        inner = inner[part]
    inner[path[-1]] = value
    return dict(changed)


RECORD = (
    entry("answer", "lashing.tails", answer="pass"),
    entry("answer", "canopy.bag_ties", answer="pass", covers=["canopy", "tie"]),
    entry("deviation", "descent.rate", remark="the zone is soft"),
    entry("signature"),
)


def stale(rig: dict[str, Any], limits: dict[str, Any] | None) -> set[str]:
    now = standing(RECORD, rig, limits)
    signed = {"signature"} if any(signature.stale for signature in now.signatures) else set()
    return {key for side in (now.answers, now.deviations) for key, line in side.items() if line.stale} | signed


def test_nothing_is_stale_on_the_same_content() -> None:
    assert stale(RIG, LIMITS) == set()


def test_comments_spacing_and_order_do_not_count() -> None:
    text = samples.RIG.replace(" = ", "=").replace("[drop]", "# note\n[drop]")
    swapped = dict(reversed(tomllib.loads(text).items()))
    assert stale(swapped, LIMITS) == set()


EVERYTHING = {"lashing.tails", "canopy.bag_ties", "descent.rate", "signature"}
SIGNED = {"descent.rate", "signature"}


@pytest.mark.parametrize(
    ("path", "value", "expected"),
    [
        (("rig", "revision"), 4, SIGNED),
        (("drop", "airspeed"), "125 kt", SIGNED),
        (("limits",), "limits/other.toml", SIGNED),
        (("item", 0, "mass"), "1,300 lb", SIGNED | {"lashing.tails"}),
        (("item", 0, "mass"), "1310 lb ± 10 lb", SIGNED | {"lashing.tails"}),
        (("tie", 0, "strands"), 3, EVERYTHING),
        (("pack", 0, "packed"), datetime.date(2026, 7, 1), SIGNED | {"lashing.tails"}),
    ],
)
def test_a_change_of_the_rig_leaves_behind_what_stands_on_it(
    path: tuple[str | int, ...], value: object, expected: set[str]
) -> None:
    assert stale(with_change(RIG, *path, value=value), LIMITS) == expected


@pytest.mark.parametrize(
    ("path", "value", "expected"),
    [
        (("limits", "descent.rate", "max"), "30 ft/s", SIGNED),
        (("restraint", "forward"), 4.0, SIGNED),
        (("inspection", 1, "ask"), "Tails taped and cut", SIGNED | {"lashing.tails"}),
        (("inspection", 0, "ask"), "Ties", EVERYTHING),
    ],
)
def test_a_change_of_the_limit_set_leaves_behind_what_stands_on_it(
    path: tuple[str | int, ...], value: object, expected: set[str]
) -> None:
    assert stale(RIG, with_change(LIMITS, *path, value=value)) == expected


def test_a_limit_set_taken_away_leaves_everything_behind() -> None:
    assert stale(RIG, None) == EVERYTHING


def test_a_change_taken_back_makes_it_stand_again() -> None:
    there = with_change(RIG, "tie", 0, "strands", value=3)
    assert stale(with_change(there, "tie", 0, "strands", value=2), LIMITS) == set()


def test_the_last_answer_is_the_current_one() -> None:
    record = (*RECORD, entry("answer", "lashing.tails", answer="fail", remark="one loose"))
    assert standing(record, RIG, LIMITS).answers["lashing.tails"].entry.answer == "fail"


def test_a_withdrawal_takes_back_every_answer_so_far() -> None:
    again = entry("answer", "lashing.tails", answer="fail", remark="one loose")
    withdrawn = (*RECORD, again, entry("withdrawal", "lashing.tails"))
    assert "lashing.tails" not in standing(withdrawn, RIG, LIMITS).answers
    assert "canopy.bag_ties" in standing(withdrawn, RIG, LIMITS).answers
    assert standing((*withdrawn, again), RIG, LIMITS).answers["lashing.tails"].entry.answer == "fail"


def test_a_deviation_is_withdrawn_with_its_step() -> None:
    record = (*RECORD, entry("withdrawal", "descent.rate"))
    assert standing(record, RIG, LIMITS).deviations == {}


def test_a_clock_that_runs_backwards_shows_on_both_entries() -> None:
    record = (
        entry("remark", minutes=0, remark="a"),
        entry("remark", minutes=5, remark="b"),
        entry("remark", minutes=3, remark="c"),
        entry("remark", minutes=3, remark="d"),
    )
    assert standing(record, RIG, LIMITS).clock_backwards == {1, 2}
    zone = datetime.timezone(datetime.timedelta(hours=-5))
    elsewhere = record[1].model_copy(update={"when": record[1].when.astimezone(zone)})
    assert standing((record[0], elsewhere), RIG, LIMITS).clock_backwards == set()


def test_the_digest_of_an_entry_follows_its_kind() -> None:
    assert content_digest("answer", "lashing.tails", None, RIG, LIMITS) == rigging_digest(RIG, LIMITS)
    assert content_digest("answer", "a.b", ["tie"], RIG, LIMITS) == tables_digest(RIG, LIMITS, ["tie"], "a.b")
    for kind in ("signature", "deviation", "withdrawal", "remark"):
        assert content_digest(kind, "", None, RIG, LIMITS) == full_digest(RIG, LIMITS)


def test_a_limit_set_that_is_none_of_ours_does_no_harm() -> None:
    assert rigging_digest(RIG, {"inspection": "x"}) == rigging_digest(RIG, None)
    assert tables_digest(RIG, {"inspection": [1]}, ["tie"], "a.b") == tables_digest(RIG, None, ["tie"], "a.b")
