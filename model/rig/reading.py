"""Files to models: rig files, limit sets, both together, and the rig files below a folder."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import lru_cache
from pathlib import Path
from typing import Any, NamedTuple

from model.rig.errors import InputError, InputProblem, whole_file
from model.rig.limits import LimitFile, LimitSet, limit_faults
from model.rig.rig import Rig
from model.rig.rules import rig_faults
from model.rig.source import TomlFile, parse_toml, read_bytes, read_toml, refuse_other_kinds, shown_path
from model.rig.validate import validate

RECORD_SUFFIX = ".record.toml"
KnownParts = Callable[[str], bool]


@dataclass(frozen=True, eq=False, repr=False)
class RigFile(TomlFile):
    """A rig file that was read without a mistake.

    Attributes:
        rig: the rig.
        limits_path: where its limit set lies, None where it names none.
    """

    rig: Rig
    limits_path: Path | None


class Loaded(NamedTuple):
    """A rig file with its limit set.

    Attributes:
        rig: the rig file.
        limits: its limit set; None where the rig names none.
    """

    rig: RigFile
    limits: LimitFile | None


class Found(NamedTuple):
    """What lies below a path.

    Attributes:
        rigs: the rig files, sorted by path.
        problems: what should not lie there, or could not be looked into.
    """

    rigs: tuple[Path, ...]
    problems: tuple[InputProblem, ...]


def read_rig(path: Path | str, known_parts: KnownParts | None = None) -> RigFile:
    """Read a rig file.

    Args:
        path: the file.
        known_parts: whether a `left_out` part names a group of steps or a step key; without it any name may stand.

    Raises:
        InputError: with every mistake of the file.
    """
    return _rig(read_toml(Path(path)), known_parts)


def read_limits(path: Path | str) -> LimitFile:
    """Read a limit set.

    Raises:
        InputError: with every mistake of the file.
    """
    path = Path(path)
    return _limit_file(path, read_bytes(path))


@lru_cache(maxsize=8)
def _limit_file(path: Path, data: bytes) -> LimitFile:
    """The limit set of these bytes; a folder of rigs names one set many times over."""
    file = parse_toml(path, data)
    refuse_other_kinds(file, "set")
    return LimitFile(file.path, file.text, file.raw, validate(file, LimitSet, limit_faults))


def load(path: Path | str, known_parts: KnownParts | None = None) -> Loaded:
    """Read a rig file and the limit set it names.

    Raises:
        InputError: with every mistake of both files.
    """
    file = read_toml(Path(path))
    problems: list[InputProblem] = []
    rig = limits = None
    try:
        rig = _rig(file, known_parts)
    except InputError as error:
        problems.extend(error.problems)
    try:
        limits = _limits_of(file)
    except InputError as error:
        problems.extend(error.problems)
    if rig is None or problems:
        raise InputError(problems)
    return Loaded(rig, limits)


def _rig(file: TomlFile, known_parts: KnownParts | None) -> RigFile:
    refuse_other_kinds(file, "rig")
    rig = validate(file, Rig, lambda rig, lost: rig_faults(rig, lost, known_parts))
    return RigFile(file.path, file.text, file.raw, rig, _limits_path(file))


def _limits_path(file: TomlFile) -> Path | None:
    name: Any = file.raw.get("limits")
    return file.path.parent / name if isinstance(name, str) and name.strip() else None


def _limits_of(file: TomlFile) -> LimitFile | None:
    """The limit set a rig names, if it names one that can be a path at all."""
    path = _limits_path(file)
    if path is None or not all(mark.isprintable() for mark in str(file.raw["limits"])):
        return None
    if not os.path.lexists(path):
        raise InputError([file.problem(("limits",), f'"{file.raw["limits"]}"', "a limit set", "no such file")])
    return read_limits(path)


def record_path(rig: Path | str) -> Path:
    """Where the record of a rig file lies: `x.record.toml` beside `x.toml`."""
    rig = Path(rig)
    return rig.with_name(f"{rig.name.removesuffix('.toml')}{RECORD_SUFFIX}")


def find_rigs(path: Path | str) -> Found:
    """The rig files below a folder, or the one file that was named.

    Records, limit sets, stick files, hidden and linked entries are passed over; any other TOML file that is no rig is
    a problem. A file that cannot be parsed counts as a rig, so that reading it says what is wrong.
    """
    path = Path(path)
    if not os.path.isdir(path):
        return Found((path,), ())
    rigs: list[Path] = []
    problems: list[InputProblem] = []
    for file in _toml_files(path, problems):
        try:
            tables = read_toml(file).raw
        except InputError:
            rigs.append(file)
            continue
        if "rig" in tables:
            rigs.append(file)
        elif "set" not in tables and "stick" not in tables:
            problems.extend(whole_file(shown_path(file), "no rig: it has no [rig] table").problems)
    if not rigs and not problems:
        problems.extend(whole_file(shown_path(path), "no rig file in this folder").problems)
    return Found(tuple(sorted(rigs)), tuple(sorted(problems, key=lambda problem: problem.file)))


def _toml_files(top: Path, problems: list[InputProblem]) -> Iterator[Path]:
    def note(error: OSError) -> None:
        folder = shown_path(error.filename or top)
        problems.extend(whole_file(folder, f"not readable: {(error.strerror or '').lower()}").problems)

    for folder, folders, files in os.walk(top, onerror=note):
        folders[:] = sorted(name for name in folders if not name.startswith("."))
        for name in sorted(files):
            file = Path(folder, name)
            wanted = name.endswith(".toml") and not name.endswith(RECORD_SUFFIX) and not name.startswith(".")
            if wanted and not file.is_symlink():
                yield file
