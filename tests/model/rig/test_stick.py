"""Stick files with a mistake."""

from pathlib import Path

import pytest

from model.rig.errors import InputError
from model.rig.stick import read_stick
from tests.model.rig import samples


@pytest.mark.parametrize(
    ("old", "new", "path", "words"),
    [
        ('name = "Upper valley, second pass"', "", "stick.name", "required"),
        ('after = "0.8 s"', "", "load 2 (../grain.toml).after", "required"),
        ('after = "0.8 s"', 'after = "-1 s"', "load 2 (../grain.toml).after", "a time of 0 or over"),
        ('after = "0 s"', 'after = "1 s"', "load 2 (../grain.toml).after", 'no less than the load before it, "1 s"'),
        ('after = "0 s"', "after = 0", "load 1 (../pump.toml).after", "in quotes, with its unit"),
        ('min = "50 m"', 'min = "0 m"', "stick.separation.min", "a length over 0"),
        (', source = "house rule 12"', "", "stick.separation.source", "required"),
        ('rig = "../grain.toml"', 'rigs = "../grain.toml"\nrig = "x"', "load 2 (x).rigs", 'did you mean "rig"?'),
        ('[[load]]\nrig = "../grain.toml"\nafter = "0.8 s"\n', "", "load", "found one [[load]] row, expected two"),
    ],
)
def test_one_mistake_one_message(tmp_path: Path, old: str, new: str, path: str, words: str) -> None:
    assert samples.STICK.count(old) == 1
    file = tmp_path / "x.toml"
    file.write_text(samples.STICK.replace(old, new), encoding="utf-8")
    with pytest.raises(InputError) as caught:
        read_stick(file)
    assert [problem.path for problem in caught.value.problems] == [path]
    assert words in str(caught.value)


@pytest.mark.parametrize(("rows", "count"), [("", 1), ("load = 3\n", 1), ("load = []\n", 1)])
def test_no_loads(tmp_path: Path, rows: str, count: int) -> None:
    file = tmp_path / "x.toml"
    file.write_text(f'format = 1\n{rows}[stick]\nname = "a"\n', encoding="utf-8")
    with pytest.raises(InputError) as caught:
        read_stick(file)
    assert [problem.path for problem in caught.value.problems] == ["load"] * count


def test_loads_may_leave_together(tmp_path: Path) -> None:
    file = tmp_path / "x.toml"
    file.write_text(samples.STICK.replace('after = "0.8 s"', 'after = "0 s"'), encoding="utf-8")
    assert len(read_stick(file).rigs) == 2
