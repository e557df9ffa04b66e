from pathlib import Path

import pytest

from model.checks.finding import computed_alone
from model.quantity import UnitSystem
from model.report.plain import brief_line, checklist_text
from tests.model.checks.sample import Raw, checklist
from tests.model.checks.test_inspected import asked

DEMO = sorted(path for path in Path(__file__).parents[3].joinpath("rigs").glob("*.toml") if ".record." not in path.name)


def words(text: str) -> str:
    return " ".join(text.split())


def test_the_head_names_rig_limits_and_verdict(tmp_path: Path) -> None:
    def named(raw: Raw) -> None:
        raw["rig"] |= {"reference": "TV-1", "revision": 3}

    lines = checklist_text(checklist(tmp_path, named), UnitSystem.WRITTEN).splitlines()
    assert lines[0] == "TV-1, revision 3: Round numbers"
    assert lines[2] == "limits: Test limits"
    assert any(line.startswith("PASS: ") for line in lines[:6])
    assert "not signed" in lines


def test_every_step_shows_verdict_first_and_its_key(tmp_path: Path) -> None:
    whole = checklist(tmp_path, limits=asked)
    text = checklist_text(whole, UnitSystem.WRITTEN)
    for finding in whole.findings:
        assert f"key: {finding.key}" in text
        assert words(f"{finding.verdict} {finding.title}") in words(text)


def test_groups_stand_once_each(tmp_path: Path) -> None:
    whole = checklist(tmp_path, limits=asked)
    groups = [finding.group for finding in whole.findings]
    assert [group for i, group in enumerate(groups) if i == 0 or groups[i - 1] != group] == list(dict.fromkeys(groups))


@pytest.mark.parametrize("system", list(UnitSystem))
@pytest.mark.parametrize("path", DEMO, ids=lambda path: path.stem)
def test_demo_rigs_fit_eighty_columns(path: Path, system: UnitSystem) -> None:
    from model.checks.checklist import check

    text = checklist_text(check(path), system)
    assert max(len(line) for line in text.splitlines() if not line.startswith("file:")) <= 80
    assert not any(line != line.rstrip() for line in text.splitlines())


def test_a_brief_line_names_the_least_margin(tmp_path: Path) -> None:
    whole = checklist(tmp_path)
    line = brief_line(whole)
    assert "\n" not in line
    assert whole.worst is not None
    assert whole.worst.key in line


def test_a_brief_line_says_when_inspections_were_left_out(tmp_path: Path) -> None:
    assert "inspected steps left out" in brief_line(computed_alone(checklist(tmp_path, limits=asked)))


def test_cautions_and_reasons_are_printed(tmp_path: Path) -> None:
    def table(raw: Raw) -> None:
        raw["canopy"][0].pop("drag_coefficient")
        raw.pop("link")

    text = words(checklist_text(checklist(tmp_path, table), UnitSystem.WRITTEN))
    assert "caution: table figure, from memory" in text
    assert "data missing: link" in text
