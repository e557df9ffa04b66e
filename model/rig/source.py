"""A TOML file read safely: bounded, never a device, with one message for whatever goes wrong."""

from __future__ import annotations

import errno
import os
import re
import stat
import tomllib
from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path
from typing import Any, NamedTuple

from model.rig.errors import InputError, InputProblem, whole_file
from model.rig.locate import Loc, line_of

LARGEST_FILE = 2_000_000
"""Bytes; a larger file is refused unread."""
DEEPEST = 32
"""Levels of tables and lists; deeper is no file of ours."""

_ROW_NAMES = ("name", "role", "serial", "part", "key", "rig")
_KEY_PART = r"""(?:"(?:[^"\\\n]|\\.)*+"|'[^'\n]*+'|[\w-]++)[ \t]*+"""
_LONG_KEY = re.compile(rf"(?:^|[\[{{,])[ \t]*+(?:{_KEY_PART}\.[ \t]*+){{{DEEPEST}}}", re.ASCII | re.MULTILINE)
_AT_LINE = re.compile(r"\s*\(at (?:line (\d+), column \d+|end of document)\)\Z")
_BARE_QUANTITY = re.compile(r"=\s*[-+]?[\d.,]+\s*[A-Za-z°%±]")
_WHY_UNREADABLE = {
    errno.ENOENT: "no such file",
    errno.ENOTDIR: "no such file",
    errno.EACCES: "not readable: permission denied",
    errno.EPERM: "not readable: permission denied",
    errno.EISDIR: "a folder, where a file is expected",
    errno.ELOOP: "a link that leads in a circle",
    errno.ENAMETOOLONG: "the file name is too long",
}


class Fault(NamedTuple):
    """A mistake before it is given its file and line."""

    loc: Loc
    found: str
    expected: str
    hint: str = ""


@dataclass(frozen=True, eq=False, repr=False)
class TomlFile:
    """A file as read.

    Attributes:
        path: where it lies.
        text: its text.
        raw: its values as written.
    """

    path: Path
    text: str
    raw: dict[str, Any]

    def line(self, *loc: str | int) -> int:
        """Line of a place such as `("canopy", 0, "diameter")`; of its table where the key is missing."""
        return line_of(self.text, loc)

    def problem(self, loc: Loc, found: str, expected: str, hint: str = "") -> InputProblem:
        """A mistake at a place of this file, ready for an `InputError`."""
        message = f"found {found}, expected {expected}" + (f" ({hint})" if hint else "")
        return InputProblem(shown_path(self.path), self.line(*loc), key_path(self.raw, loc), found, expected, message)

    def problems(self, faults: Iterable[Fault]) -> tuple[InputProblem, ...]:
        """Mistakes with their lines, in the order of the lines."""
        return tuple(sorted((self.problem(*fault) for fault in faults), key=lambda problem: problem.line or 0))


_KINDS = {"rig": "a rig file", "set": "a limit set", "stick": "a stick file", "entry": "a record"}


def refuse_other_kinds(file: TomlFile, table: str) -> None:
    """Say in one message that a file of ours is of another kind than the one asked for.

    Args:
        file: the file.
        table: the table that the kind asked for has: rig, set or stick.

    Raises:
        InputError: it has not that table but one of another kind.
    """
    if table in file.raw:
        return
    other = next((words for key, words in _KINDS.items() if key in file.raw), None)
    if other is not None:
        name = shown_path(file.path)
        raise whole_file(name, f"{other}, where {_KINDS[table]} is expected", found=other, expected=_KINDS[table])


def shown_path(path: Path | str) -> str:
    """A path as text that any terminal can print."""
    text = os.fspath(path).encode("utf-8", "backslashreplace").decode("utf-8")
    return "".join(mark if mark.isprintable() else f"\\x{ord(mark):02x}" for mark in text)


def key_path(data: Any, loc: Loc) -> str:
    """A place in words: rows count from 1 and are followed by their name.

    Args:
        data: raw values or a model.
        loc: the place in it.
    """
    words = ""
    for part in loc:
        data = _inside(data, part)
        if isinstance(part, int):
            name = next((name for key in _ROW_NAMES if isinstance(name := _inside(data, key), str)), "")
            name = "".join(mark for mark in name if mark.isprintable())[:60]
            number = f"row {part + 1}" if words == "canopy" else str(part + 1)
            words += f" {number} ({name})" if name else f" {number}"
        else:
            shown = part if re.fullmatch(r"[\w-]+", part) else f'"{part[:60]}"'
            shown = "".join(mark if mark.isprintable() else " " for mark in shown[:62])
            words += f".{shown}" if words else shown
    return words


def _inside(data: Any, part: str | int) -> Any:
    if isinstance(data, dict):
        return data.get(part)
    if isinstance(part, str):
        return getattr(data, part, None)
    return data[part] if isinstance(data, list | tuple) and part < len(data) else None


def read_bytes(path: Path) -> bytes:
    """The bytes of a regular file of bearable size.

    Raises:
        InputError: missing, unreadable, no regular file, or too large.
    """
    file = shown_path(path)
    try:
        # Opening a pipe without O_NONBLOCK would wait for a writer for ever.
        handle = os.open(path, os.O_RDONLY | getattr(os, "O_NONBLOCK", 0) | getattr(os, "O_BINARY", 0))
    except OSError as error:
        if os.path.isdir(path):
            raise whole_file(file, _WHY_UNREADABLE[errno.EISDIR]) from None
        raise whole_file(file, _why(error)) from None
    except ValueError:
        raise whole_file(file, "no file can have that name") from None
    try:
        with open(handle, "rb", buffering=0) as stream:
            return _bounded(stream.fileno(), file)
    except OSError as error:
        raise whole_file(file, _why(error)) from None


def _why(error: OSError) -> str:
    return _WHY_UNREADABLE.get(error.errno or 0) or f"not readable: {(error.strerror or 'unknown reason').lower()}"


def _bounded(handle: int, file: str) -> bytes:
    state = os.fstat(handle)
    if stat.S_ISDIR(state.st_mode):
        raise whole_file(file, _WHY_UNREADABLE[errno.EISDIR])
    if not stat.S_ISREG(state.st_mode):
        raise whole_file(file, "not a regular file")
    parts: list[bytes] = []
    size = state.st_size
    while size <= LARGEST_FILE:
        part = os.read(handle, 65_536)
        if not part:
            return b"".join(parts)
        parts.append(part)
        size = max(size, sum(map(len, parts)))
    raise whole_file(file, f"over 2 MB ({size:,} bytes): not read")


def read_toml(path: Path) -> TomlFile:
    """Read and parse a TOML file.

    Raises:
        InputError: it cannot be read, is no UTF-8 text, or is not TOML; one problem, with its line.
    """
    return parse_toml(path, read_bytes(path))


def parse_toml(path: Path, data: bytes) -> TomlFile:
    """Parse the bytes of a TOML file.

    Raises:
        InputError: no UTF-8 text or not TOML; one problem, with its line.
    """
    file = shown_path(path)
    if b"\0" in data:
        raise whole_file(file, "not a text file: it holds zero bytes")
    try:
        text = data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        raise whole_file(file, "not UTF-8 text: save it as UTF-8", line=line) from None
    text = text.replace("\r\n", "\n")
    long_key = _LONG_KEY.search(text)
    if long_key:  # the parser needs the square of a dotted key's length
        raise _too_deep(file, text.count("\n", 0, long_key.start()) + 1)
    try:
        raw = tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise _syntax_error(file, text, str(error)) from None
    except RecursionError:
        raise _too_deep(file, None) from None
    except ValueError:  # an integer of over 4,300 digits
        raise whole_file(file, "not TOML: it holds a number too large to read") from None
    if _deeper_than(raw, DEEPEST):
        raise _too_deep(file, None)
    return TomlFile(path, text, raw)


def _too_deep(file: str, line: int | None) -> InputError:
    return whole_file(file, "tables or lists nested too deeply", line=line)


def _syntax_error(file: str, text: str, message: str) -> InputError:
    place = _AT_LINE.search(message)
    lines = text.split("\n")
    line = int(place.group(1)) if place and place.group(1) else max(len(text.rstrip().split("\n")), 1)
    what = _AT_LINE.sub("", message)
    what = "".join(mark for mark in what[:1].lower() + what[1:] if mark.isprintable())
    if what.startswith(("cannot overwrite", "cannot declare")):
        what = "a key or table stands twice"
    hint = ""
    if _BARE_QUANTITY.search(lines[line - 1] if line <= len(lines) else ""):
        hint = ' (a value with its unit stands in quotes, as in "64 ft")'
    return whole_file(file, f"not TOML: {what}{hint}", line=line)


def _deeper_than(raw: Any, levels: int) -> bool:
    level = [raw]
    for _ in range(levels):
        level = [
            inner
            for outer in level
            for inner in (outer.values() if isinstance(outer, dict) else outer)
            if isinstance(inner, dict | list)
        ]
        if not level:
            return False
    return True
