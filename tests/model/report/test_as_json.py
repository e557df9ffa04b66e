import json
import math
import tomllib
from dataclasses import replace
from datetime import UTC, datetime
from pathlib import Path

import pytest

from model.checks.finding import Signature
from model.report.as_json import document, problem_object, rig_object, step_object, unreadable_object
from model.rig.digest import full_digest, rigging_digest
from model.rig.errors import InputProblem
from tests.model.checks.sample import checklist


def test_numbers_are_not_rounded(tmp_path: Path) -> None:
    whole = checklist(tmp_path)
    read = json.loads(document([rig_object(whole)]))["rigs"][0]
    for finding, step in zip(whole.findings, read["steps"], strict=True):
        assert step["key"] == finding.key
        assert step["value"] == finding.value
        assert step["margin"] == finding.margin


def test_signatures_and_stale_keys(tmp_path: Path) -> None:
    signed = Signature("RB", datetime(2026, 9, 15, 8, tzinfo=UTC), stale=True)
    whole = checklist(tmp_path)
    one = rig_object(replace(whole, signatures=(signed,), stale=("a.b",)))
    assert one["signed"] == [{"who": "RB", "when": "2026-09-15T08:00:00+00:00", "stale": True}]
    assert one["stale"] == ["a.b"]
    rig, limits = (tomllib.loads((tmp_path / name).read_text("utf-8")) for name in ("rig.toml", "limits.toml"))
    assert one["digest"] == {"rigging": rigging_digest(rig, limits), "all": full_digest(rig, limits)}
    assert rig_object(replace(whole, content=None))["digest"] == {"rigging": "", "all": ""}


def test_a_deviation_is_its_text(tmp_path: Path) -> None:
    finding = checklist(tmp_path).findings[0]
    assert step_object(finding)["deviation"] is None
    assert step_object(replace(finding, deviation="agreed with QX"))["deviation"] == "agreed with QX"


def test_a_number_that_is_none_is_refused_not_written(tmp_path: Path) -> None:
    finding = replace(checklist(tmp_path).findings[0], value=math.nan)
    with pytest.raises(ValueError, match="JSON"):
        document([{"steps": [step_object(finding)]}])


def test_an_unreadable_rig() -> None:
    problem = InputProblem("x.toml", 3, "drop.date", '"soon"', "a date", "x.toml:3: drop.date: ...")
    assert unreadable_object("x.toml", [problem]) == {"file": "x.toml", "errors": [problem_object(problem)]}
    assert problem_object(problem) == {
        "file": "x.toml", "line": 3, "path": "drop.date", "found": '"soon"', "expected": "a date",
        "message": "x.toml:3: drop.date: ...",
    }  # fmt: skip


def test_the_document_names_its_format() -> None:
    assert json.loads(document([])) == {"format": 1, "rigs": []}
