"""A checklist as JSON, format 1: keys and units are promises to users."""

from __future__ import annotations

import json
from collections.abc import Iterable
from typing import Any

from model.checks.finding import Checklist, Finding
from model.rig.errors import InputProblem


def step_object(finding: Finding) -> dict[str, Any]:
    """One step."""
    limit = finding.limit
    return {
        "key": finding.key,
        "title": finding.title,
        "kind": str(finding.kind),
        "verdict": str(finding.verdict),
        "reason": finding.reason,
        "value": finding.value,
        "unit": finding.unit,
        "min": limit.minimum if limit else None,
        "max": limit.maximum if limit else None,
        "margin": finding.margin,
        "source": limit.source if limit else None,
        "method": finding.method or None,
        "cautions": list(finding.cautions),
        "deviation": finding.deviation,
    }


def rig_object(checklist: Checklist) -> dict[str, Any]:
    """One rig."""
    rigging, everything = checklist.digests
    return {
        "file": checklist.file,
        "name": checklist.name,
        "reference": checklist.reference,
        "revision": checklist.revision,
        "verdict": str(checklist.verdict),
        "digest": {"rigging": rigging, "all": everything},
        "signed": [{"who": one.who, "when": one.when.isoformat(), "stale": one.stale} for one in checklist.signatures],
        "stale": list(checklist.stale),
        "notes": list(checklist.notes),
        "steps": [step_object(one) for one in checklist.findings],
    }


def problem_object(problem: InputProblem) -> dict[str, Any]:
    """One mistake in a file."""
    return {
        "file": problem.file,
        "line": problem.line,
        "path": problem.path,
        "found": problem.found,
        "expected": problem.expected,
        "message": problem.message,
    }


def unreadable_object(file: str, problems: Iterable[InputProblem]) -> dict[str, Any]:
    """A rig that could not be read."""
    return {"file": file, "errors": [problem_object(one) for one in problems]}


def document(rigs: list[dict[str, Any]]) -> str:
    """The one object that `check --json` prints."""
    return json.dumps({"format": 1, "rigs": rigs}, indent=1, allow_nan=False)
