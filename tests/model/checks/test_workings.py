"""Every working of the sample and of the demo rigs: its lines lead to the number that was judged, bit for bit."""

from pathlib import Path

import pytest

from model.checks import motion
from model.checks.checklist import check
from model.checks.finding import Checklist, Kind
from model.checks.step import in_step_unit
from model.checks.term import Term, lines
from model.physics import flight
from model.quantity import UnitSystem
from model.report.working import working, working_text
from tests.model.checks.sample import checklist, drogue_first, extracted, nothing

DEMO = sorted(path for path in Path(__file__).parents[3].joinpath("rigs").glob("*.toml") if ".record." not in path.name)
SAMPLES = {"gravity": nothing, "drogue": drogue_first, "extraction": extracted}


def examine(whole: Checklist) -> None:
    for finding in whole.findings:
        if finding.kind is Kind.INSPECTED:
            assert finding.result is None
            continue
        if finding.value is None:
            continue
        assert finding.result is not None
        found = list(lines(finding.result))
        assert found[-1] is finding.result
        assert in_step_unit(finding.result, finding.unit or "1") == finding.value, finding.key
        told: set[int] = set()
        for term in found:
            assert all(id(one) in told for one in term.inputs), f"{finding.key}: {term.symbol} before its inputs"
            told.add(id(term))
            _examine(finding.key, term)
        shown = working(finding, UnitSystem.WRITTEN)
        assert shown[-1].term is finding.result
        assert finding.method, finding.key


def _examine(key: str, term: Term) -> None:
    assert term.symbol, f"{key}: {term.meaning}"
    assert term.meaning, f"{key}: {term.symbol}"
    if term.how is None:
        assert term.inputs == (), key
        assert term.origin, f"{key}: {term.symbol} says not where it comes from"
    else:
        assert term.inputs, f"{key}: {term.symbol} comes from nothing"
        assert not term.origin, key
    assert term.again() == term.value, f"{key}: {term.symbol}"


@pytest.mark.parametrize("name", SAMPLES)
def test_workings_of_the_sample(tmp_path: Path, name: str) -> None:
    examine(checklist(tmp_path, SAMPLES[name]))


@pytest.mark.parametrize("path", DEMO, ids=lambda path: path.stem)
def test_workings_of_the_demo_rigs(path: Path) -> None:
    examine(check(path))


def test_there_are_demo_rigs() -> None:
    assert len(DEMO) >= 9


@pytest.mark.parametrize("system", list(UnitSystem))
def test_workings_are_written_in_all_units(tmp_path: Path, system: UnitSystem) -> None:
    for finding in checklist(tmp_path, extracted).findings:
        text = working_text(finding, system)
        assert (not text) is (finding.result is None)
        assert not any("nan" in line.split() for line in text)


def test_a_rig_flies_twice_and_its_workings_no_more(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    flown: list[str] = []
    true = flight.solve

    def solve(drop: flight.Drop, rule: flight.FillingRule) -> flight.Motion:
        flown.append(rule)
        return true(drop, rule)

    monkeypatch.setattr(flight, "solve", solve)
    whole = checklist(tmp_path)
    assert sorted(flown) == ["distance", "time"]
    examine(whole)
    assert len(flown) == 2
    assert motion.RULES == ("time", "distance")


def test_measured_filling_times_fly_once(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    flown: list[str] = []
    true = flight.solve

    def solve(drop: flight.Drop, rule: flight.FillingRule) -> flight.Motion:
        flown.append(rule)
        return true(drop, rule)

    monkeypatch.setattr(flight, "solve", solve)
    checklist(tmp_path, lambda raw: raw["canopy"][0].update(measured={"source": "report 7", "filling_time": "4 s"}))
    assert flown == ["time"]
