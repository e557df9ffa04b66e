"""What each demo rig is there to show, and how it is read in the tests."""

from __future__ import annotations

from functools import cache
from pathlib import Path

from model.checks.checklist import check
from model.checks.finding import Checklist, Finding, Kind, Verdict, computed_alone

RIGS = Path(__file__).resolve().parents[2] / "rigs"

# Verdict of the computed steps, verdict of all steps, steps that FAIL.
SHOWN: dict[str, tuple[str, str, frozenset[str]]] = {
    "01-medical-bundle": ("PASS", "PASS", frozenset()),
    "02-grain-container": ("PASS", "OPEN", frozenset()),
    "03-fuel-drums": ("PASS", "OPEN", frozenset()),
    "04-pump-cool": ("PASS", "OPEN", frozenset()),
    "05-pump-warm": ("FAIL", "FAIL", frozenset({"descent.rate"})),
    "06-reefed-truck": ("PASS", "OPEN", frozenset()),
    "07-high-box": ("OPEN", "OPEN", frozenset()),
    "08-high-zone": ("PASS", "OPEN", frozenset()),
    "09-half-entered": ("OPEN", "OPEN", frozenset()),
    "10-measured-water": ("FAIL", "FAIL", frozenset({"descent.rate"})),
    "11-generator-si": ("PASS", "OPEN", frozenset()),
    "12-flat-slings": ("FAIL", "FAIL", frozenset({"suspension.leg_angle"})),
    "13-thin-honeycomb": (
        "FAIL", "FAIL", frozenset({"landing.crush_reserve", "landing.deceleration", "landing.fragility"}),
    ),
    "14-mixed-lashing": ("FAIL", "FAIL", frozenset({"lashing.mixed"})),
    "15-overdue-pack": ("FAIL", "FAIL", frozenset({"service.repack.R-2203"})),
    "16-fast-rations": ("PASS", "OPEN", frozenset()),
}  # fmt: skip


def rig_path(name: str) -> Path:
    """A demo rig by the name of its file."""
    return RIGS / f"{name}.toml"


@cache
def checklist(name: str) -> Checklist:
    """All steps of a demo rig."""
    return check(rig_path(name))


def computed(name: str) -> Checklist:
    """The computed steps of a demo rig."""
    return computed_alone(checklist(name))


def finding(name: str, key: str) -> Finding:
    """One step of a demo rig."""
    return next(one for one in checklist(name).findings if one.key == key)


def value(name: str, key: str) -> float:
    """The number of one step, in the unit of the step."""
    found = finding(name, key).value
    assert found is not None, f"{name} {key} has no number"
    return found


__all__ = ["RIGS", "SHOWN", "Kind", "Verdict", "checklist", "computed", "finding", "rig_path", "value"]
