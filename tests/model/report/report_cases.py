"""Rigs to report on: the demo rigs, and one whose every text is out to break the form it is written in."""

from __future__ import annotations

import json
from dataclasses import replace
from datetime import datetime, timedelta, timezone
from functools import cache
from pathlib import Path

from model.checks.checklist import check
from model.checks.finding import Checklist, Signature
from model.quantity import UnitSystem
from model.report.document import Options, Report, report

RIGS = Path(__file__).resolve().parents[3] / "rigs"
DEMO = sorted(one for one in RIGS.glob("*.toml") if not one.name.endswith(".record.toml"))
PUMP, BUNDLE = RIGS / "05-pump-warm.toml", RIGS / "01-medical-bundle.toml"
PROGRAM = "rigslate 9.9.9"

MARKUP = '<script>alert("x")</script> | `code` **bold** _it_ [a](http://bad.example/) ![b](x) &lt; </style></svg> $x$'
LINKS = "www.bad.example http://bad.example a@bad.example <http://bad.example> ![](http://bad.example/i.png)"
BEGINNINGS = ("# heading", "- dash", "1. first", "> quote", "+ plus", "=== line", "| a | b |", "~~~", "```", "\\|")
RIGHT_TO_LEFT = "משאבה 25 מתוך 30"
LONG = "W" * 190
WIDE = "水泵" * 60
"""Characters that take two cells each."""


@cache
def checked(path: Path) -> Checklist:
    return check(path)


def reported(*checklists: Checklist, system: UnitSystem = UnitSystem.WRITTEN, workings: bool = False) -> Report:
    return report(checklists, (), Options(PROGRAM, system, workings))


def hostile(folder: Path) -> Checklist:
    """The pump rig with hostile names, sources, questions and notes."""
    rig = PUMP.read_text(encoding="utf-8")
    limits = (RIGS / "limits" / "tarn-low.toml").read_text(encoding="utf-8")
    for old, new in (
        ("Borehole pump, plateau", MARKUP),
        ("TV-05", RIGHT_TO_LEFT),
        ('"AM"', LINKS),
        ("The pump's own zone.", LINKS + "\n" + "\n".join(BEGINNINGS)),
        ("Pump set", MARKUP),
        ("Rising main, bundled pipe", LONG),
        ("Fuel tank, empty", WIDE),
        ("front left", "| a | b |"),
        ("ground release", LINKS),
    ):
        assert f'"{old}"' in rig or old in rig
        rig = rig.replace(old if old.startswith('"') else f'"{old}"', json.dumps(new, ensure_ascii=False), 1)
    for old, new in (
        ("Tarn relief, low velocity", MARKUP),
        ("house rule 4", LINKS),
        ("house rule 5", RIGHT_TO_LEFT),
        ("house rule 1", LONG),
        *(
            (row.split('ask = "', 1)[1].split('"', 1)[0], text)
            for row, text in zip(limits.split("[[inspection]]")[1:], (*BEGINNINGS, MARKUP), strict=False)
        ),
    ):
        assert f'"{old}"' in limits
        limits = limits.replace(f'"{old}"', json.dumps(new, ensure_ascii=False))
    (folder / "limits").mkdir()
    (folder / "limits" / "tarn-low.toml").write_text(limits, encoding="utf-8")
    path = folder / "pump.toml"
    path.write_text(rig, encoding="utf-8")
    return check(path)


def signed(checklist: Checklist, count: int, *stale: int) -> Checklist:
    """The checklist with signatures of S0, S1, ... an hour apart, written down in reverse order."""
    zone = timezone(timedelta(hours=2))
    first = datetime(2026, 12, 1, 8, 0, tzinfo=zone)
    signatures = [Signature(f"S{i}", first + timedelta(hours=i), i in stale) for i in range(count)]
    return replace(checklist, signatures=tuple(reversed(signatures)))
