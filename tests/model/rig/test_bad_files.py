"""Files that cannot be read at all, limit sets that are missing, folders without rigs."""

import os
import subprocess
import sys
import tempfile
from collections.abc import Callable, Iterator
from pathlib import Path

import pytest

from model.rig.errors import InputError
from model.rig.reading import find_rigs, load, read_limits, read_rig
from model.rig.source import LARGEST_FILE
from model.rig.stick import read_stick
from tests.model.rig import samples


def message(path: Path) -> str:
    with pytest.raises(InputError) as caught:
        read_rig(path)
    assert len(caught.value.problems) == 1
    return str(caught.value)


@pytest.mark.parametrize(
    ("data", "line", "words"),
    [
        (b"\x7fELF\x00\x01", None, "not a text file: it holds zero bytes"),
        (b"format = 1\nname = \"caf\xe9\"\n", 2, "not UTF-8 text: save it as UTF-8"),
        ("format = 1\n".encode("utf-16"), None, "not a text file"),
        (b"\xff\xfe", 1, "not UTF-8 text"),
        (b"format = 1\n[rig\n", 2, "not TOML: expected ']'"),
        (b"format = 1\n[drop]\nairspeed = 130 kt\n", 3, 'a value with its unit stands in quotes, as in "64 ft"'),
        (b"format = 1\nformat = 1\n", 2, "a key or table stands twice"),
        (b"[rig]\n[drop]\n[rig]\n", 3, "a key or table stands twice"),
        (b"format = 1\n[drop]\ndate = 2026-13-45\n", 3, "not TOML"),
        (b'format = 1\nname = "open', 2, "not TOML"),
        (b"just some words\n", 1, "not TOML"),
        (b"a = " + b"[" * 200_000, None, "nested too deeply"),
        (b"a = " + b"[" * 50 + b"]" * 50, None, "nested too deeply"),
        (b"format = 1\n" + b"a." * 500_000 + b"b = 1", 2, "nested too deeply"),
        (b"format = 1\n" + b'"a b" . ' * 100_000 + b"b = 1", 2, "nested too deeply"),
        (b"[" + b"a." * 500_000 + b"b]", 1, "nested too deeply"),
        (b"a = " + b"9" * 10_000, None, "a number too large to read"),
    ],
)
def test_what_is_no_toml_has_one_message(tmp_path: Path, data: bytes, line: int | None, words: str) -> None:
    path = tmp_path / "x.toml"
    path.write_bytes(data)
    text = message(path)
    assert text.startswith(f"{path}:{line}: " if line else f"{path}: ")
    assert words in text
    assert text.isprintable()


def test_a_huge_hexadecimal_number_is_named_and_not_printed(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    path.write_text(samples.SMALL_RIG + "airspeed = 0x" + "f" * 9000, encoding="utf-8")
    assert "found a number too large to show, expected a speed" in message(path)


def test_a_large_file_is_refused_unread(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    with path.open("wb") as file:
        file.truncate(50_000_000)  # sparse: it takes no space, and reading it would find zero bytes
    assert message(path) == f"{path}: over 2 MB (50,000,000 bytes): not read"


def test_a_file_of_just_two_megabytes_is_read(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    text = samples.SMALL_RIG + "# "
    path.write_text(text + "x" * (LARGEST_FILE - len(text)), encoding="utf-8")
    assert read_rig(path).rig.rig.name == "Bundle"
    with path.open("a", encoding="utf-8") as file:
        file.write("x")
    assert "over 2 MB" in message(path)


def test_a_missing_file(tmp_path: Path) -> None:
    path = tmp_path / "none" / "x.toml"
    assert message(path) == f"{path}: no such file"


def test_a_folder_in_place_of_a_file(tmp_path: Path) -> None:
    assert message(tmp_path) == f"{tmp_path}: a folder, where a file is expected"


@pytest.mark.parametrize("name", ["x\0y.toml", "x" * 5000 + ".toml"])
def test_names_no_file_can_have(tmp_path: Path, name: str) -> None:
    text = message(tmp_path / name)
    assert "file name is too long" in text or "no file can have that name" in text
    assert text.isprintable()


def test_a_pipe_is_not_waited_for(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    os.mkfifo(path)
    assert message(path) == f"{path}: not a regular file"


def test_a_link_in_a_circle(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    path.symlink_to(path)
    assert message(path) == f"{path}: a link that leads in a circle"


AS_NOBODY = """
import os, sys
from pathlib import Path
from model.rig.errors import InputError
from model.rig.reading import find_rigs, load, read_rig
if os.getuid() == 0:
    os.setgid(65534)
    os.setuid(65534)
path = Path(sys.argv[1])
for read in (read_rig, load):
    try:
        print("read", read(path))
    except InputError as error:
        print(error)
found = find_rigs(path.parent)
print([file.name for file in found.rigs], *found.problems, sep="\\n")
"""


@pytest.fixture
def open_folder() -> Iterator[Path]:
    """A folder that any user may look into."""
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        folder.chmod(0o755)
        yield folder


def test_an_unreadable_file_is_said_to_whom_may_not_read_it(open_folder: Path) -> None:
    path = open_folder / "x.toml"
    path.write_text(samples.SMALL_RIG, encoding="utf-8")
    path.chmod(0o000)
    closed = open_folder / "closed"
    closed.mkdir(mode=0o000)
    # The superuser reads everything, so the child gives that up.
    run = subprocess.run([sys.executable, "-c", AS_NOBODY, path], capture_output=True, text=True, check=True)
    closed.chmod(0o755)
    assert run.stdout.splitlines() == [
        f"{path}: not readable: permission denied",
        f"{path}: not readable: permission denied",
        "['x.toml']",
        f"{closed}: not readable: permission denied",
    ]


def test_a_missing_limit_set_is_said_where_it_is_named(folder: Path) -> None:
    (folder / "limits" / "tarn-relief.toml").unlink()
    with pytest.raises(InputError) as caught:
        load(folder / "pump.toml")
    assert str(caught.value) == (
        f'{folder / "pump.toml"}:2: limits: found "limits/tarn-relief.toml", expected a limit set (no such file)'
    )


def test_mistakes_of_rig_and_limit_set_come_together(folder: Path) -> None:
    (folder / "pump.toml").write_text(samples.RIG.replace("legs_carrying = 2", "legs_carrying = 0"), encoding="utf-8")
    path = folder / "limits" / "tarn-relief.toml"
    path.write_text(samples.LIMITS.replace("aft = 1.5", "aft = -1.5"), encoding="utf-8")
    with pytest.raises(InputError) as caught:
        load(folder / "pump.toml")
    assert [problem.path for problem in caught.value.problems] == ["suspension.legs_carrying", "restraint.aft"]
    assert [problem.file for problem in caught.value.problems] == [str(folder / "pump.toml"), str(path)]


def test_a_limit_set_that_is_no_text_is_said_once(folder: Path) -> None:
    text = samples.RIG.replace('limits = "limits/tarn-relief.toml"', "limits = 3")
    (folder / "pump.toml").write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as caught:
        load(folder / "pump.toml")
    assert [problem.path for problem in caught.value.problems] == ["limits"]


@pytest.mark.parametrize(
    ("read", "text", "words"),
    [
        (read_rig, samples.LIMITS, "a limit set, where a rig file is expected"),
        (read_rig, samples.STICK, "a stick file, where a rig file is expected"),
        (read_rig, "format = 1\n[[entry]]\n", "a record, where a rig file is expected"),
        (load, samples.LIMITS, "a limit set, where a rig file is expected"),
        (read_limits, samples.RIG, "a rig file, where a limit set is expected"),
        (read_stick, samples.RIG, "a rig file, where a stick file is expected"),
    ],
)
def test_a_file_of_another_kind_is_said_once(
    tmp_path: Path, read: Callable[[Path], object], text: str, words: str
) -> None:
    path = tmp_path / "x.toml"
    path.write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as caught:
        read(path)
    assert str(caught.value) == f"{path}: {words}"


def test_a_folder_gives_its_rigs_sorted_and_says_what_is_none(folder: Path) -> None:
    for name, text in {
        "b/two.toml": samples.SMALL_RIG,
        "b/two.record.toml": "format = 1\n",
        "a.toml": samples.SMALL_RIG,
        "sticks/one.toml": samples.STICK,
        "broken.toml": "[rig\n",
        "other.toml": "[tool]\n",
        "note.txt": "no rig",
        ".hidden.toml": samples.SMALL_RIG,
        ".git/x.toml": samples.SMALL_RIG,
    }.items():
        (folder / name).parent.mkdir(exist_ok=True)
        (folder / name).write_text(text, encoding="utf-8")
    (folder / "linked.toml").symlink_to(folder / "a.toml")
    (folder / "linked").symlink_to(folder / "b")
    (folder / "folder.toml").mkdir()
    found = find_rigs(folder)
    assert [path.relative_to(folder).as_posix() for path in found.rigs] == [
        "a.toml",
        "b/two.toml",
        "broken.toml",
        "pump.toml",
    ]
    assert [str(problem) for problem in found.problems] == [f"{folder / 'other.toml'}: no rig: it has no [rig] table"]


def test_a_folder_without_rigs(tmp_path: Path) -> None:
    (tmp_path / "limits.toml").write_text(samples.LIMITS, encoding="utf-8")
    found = find_rigs(tmp_path)
    assert found.rigs == ()
    assert [str(problem) for problem in found.problems] == [f"{tmp_path}: no rig file in this folder"]


def test_a_named_file_is_taken_whatever_it_is(tmp_path: Path) -> None:
    path = tmp_path / ".hidden"
    assert find_rigs(path).rigs == (path,)


def test_file_names_are_printable_in_messages(tmp_path: Path) -> None:
    path = tmp_path / "\x1b[2J\udce9.toml"
    text = message(path)
    assert text.isprintable()
    text.encode("utf-8")
    assert "\\x1b[2J\\udce9.toml: no such file" in text
