"""Whatever a file holds, reading it ends in a model or in an input error that can be printed."""

import copy
import random
from collections.abc import Callable
from functools import partial
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from model.rig.errors import InputError, InputProblem
from model.rig.reading import find_rigs, load, read_limits, read_rig
from model.rig.record import read_record
from model.rig.rig import Rig
from model.rig.rules import rig_faults
from model.rig.source import parse_toml
from model.rig.stick import read_stick
from model.rig.validate import validate
from tests.model.rig import samples

READERS = [read_rig, read_limits, read_stick, read_record, load]
RELAXED = settings(suppress_health_check=[HealthCheck.function_scoped_fixture], max_examples=25)
VALUES = [
    "0", "-1", "1e300", "nan", "-inf", "true", '""', '"x"', '"1 ft"', '"-1 ft"', '"0 ft"', '"1e-9 kg"', '"5"', "[]",
    "{}",
    "[1]", '["0 ft", "0 ft", "0 ft"]', '["0 ft"]', "2026-09-16", "08:00:00", "2026-09-16T08:00:00Z", "{ a = 1 }",
    "[[]]", '"0,5"', '"5 kg ± 3"', "0x" + "f" * 300, '"\\u0007"', "[{}]", '[{ name = "x" }]', '"main"',
]  # fmt: skip


def problems_of(read: Callable[[], object]) -> tuple[InputProblem, ...]:
    """What reading says; nothing but an input error may come out of it."""
    try:
        read()
    except InputError as error:
        return error.problems or (InputProblem("\n", None, "", "", "", "an error without a problem"),)
    return ()


def check(path: Path) -> None:
    for read in READERS:
        for problem in problems_of(partial(read, path)):
            assert str(problem).isprintable()
            assert str(problem).encode("utf-8")
    assert len(find_rigs(path.parent).rigs) <= 2


@RELAXED
@given(data=st.binary(max_size=300))
def test_any_bytes(tmp_path: Path, data: bytes) -> None:
    path = tmp_path / "x.toml"
    path.write_bytes(data)
    check(path)


@RELAXED
@given(text=st.text(st.sampled_from("[]{}=.,\"'\n #abc rigdop019-:T\\u_x"), max_size=120))
def test_any_text_close_to_the_format(tmp_path: Path, text: str) -> None:
    path = tmp_path / "x.toml"
    path.write_text(text, encoding="utf-8")
    check(path)


def mutated(text: str, chance: random.Random) -> str:
    """A good file in which some lines got another value, another key, another place, or got lost."""
    lines = text.split("\n")
    for _ in range(chance.randint(1, 8)):
        at = chance.randrange(len(lines))
        key, sign, _ = lines[at].partition(" = ")
        action = chance.randrange(5)
        if action == 0 and sign:
            lines[at] = f"{key} = {chance.choice(VALUES)}"
        elif action == 1 and sign:
            lines[at] = lines[at].replace(key, key[1:] or "k", 1)
        elif action == 2:
            lines[at] = lines[at].replace("[[", "[").replace("]]", "]")
        elif action == 3:
            lines.insert(chance.randrange(len(lines)), lines.pop(at))
        else:
            del lines[at]
    return "\n".join(lines)


@RELAXED
@given(seed=st.integers(0, 2**32))
@pytest.mark.parametrize("name", ["RIG", "LIMITS", "STICK"])
def test_any_mutation_of_a_good_file(folder: Path, name: str, seed: int) -> None:
    path = folder / "x.toml"
    path.write_text(mutated(getattr(samples, name), random.Random(seed)), encoding="utf-8")
    check(path)


@RELAXED
@given(seed=st.integers(0, 2**32))
def test_any_change_of_bytes_in_a_good_file(folder: Path, seed: int) -> None:
    chance = random.Random(seed)
    data = bytearray(samples.RIG.encode())
    for _ in range(chance.randint(1, 5)):
        data[chance.randrange(len(data))] = chance.randrange(256)
    path = folder / "x.toml"
    path.write_bytes(data)
    check(path)


def every_place(raw: object, loc: tuple[str | int, ...] = ()) -> list[tuple[str | int, ...]]:
    inner = raw.items() if isinstance(raw, dict) else enumerate(raw) if isinstance(raw, list) else ()
    return [place for key, part in inner for place in ((*loc, key), *every_place(part, (*loc, key)))]


@pytest.mark.parametrize("value", [None, 3, "x", [], {}, [3], {"a": 1}, True, -1.5])
def test_any_value_in_any_place(value: object) -> None:
    file = parse_toml(Path("x.toml"), samples.RIG.encode())
    for loc in every_place(file.raw)[::3]:
        raw = copy.deepcopy(file.raw)
        inner: object = raw
        for part in loc[:-1]:
            inner = inner[part]  # type: ignore[index]
        if value is None and isinstance(loc[-1], str):
            del inner[loc[-1]]  # type: ignore[attr-defined]
        else:
            inner[loc[-1]] = value  # type: ignore[index]
        listed = problems_of(partial(validate, type(file)(file.path, file.text, raw), Rig, rig_faults))
        assert all(str(problem).isprintable() for problem in listed)
        assert any(str(loc[0]) in problem.path for problem in listed) or value in (None, []) or not listed
