"""The record beside a rig file: answers, withdrawals, deviations, signatures and remarks, only ever appended.

Each entry carries the digest of the one before it, so that a change inside shows. Without a secret key nothing can
show that the last entries were cut off, or that the whole record was written anew.
"""

import contextlib
import os
import sys
from collections.abc import Iterable, Iterator, Sequence
from datetime import datetime
from pathlib import Path
from typing import Any

from model.rig.digest import digest
from model.rig.entry import FIELDS, Entry, Record
from model.rig.errors import whole_file
from model.rig.reading import record_path
from model.rig.source import LARGEST_FILE, Fault, parse_toml, read_bytes, shown_path
from model.rig.validate import validate
from model.rig.whole import write_whole

__all__ = ["append", "entry_digest", "read_record", "record_path", "render", "seal"]

_ESCAPES = {"\\": "\\\\", '"': '\\"', "\n": "\\n", "\r": "\\r", "\t": "\\t"}


def render(entries: Iterable[Entry]) -> str:
    """The one text of a record; a file that differs from it by a byte does not count."""
    return "format = 1\n" + "".join(f"\n[[entry]]\n{_entry_text(entry)}" for entry in entries)


def _entry_text(entry: Entry) -> str:
    return "".join(f"{key} = {_toml(value)}\n" for key, value in entry.written().items())


def _toml(value: Any) -> str:
    if isinstance(value, datetime):
        return value.isoformat(timespec="seconds")
    if isinstance(value, tuple | list):
        return f"[{', '.join(_toml(word) for word in value)}]"
    return '"' + "".join(_ESCAPES.get(mark, mark) for mark in value) + '"'


def entry_digest(entry: Entry) -> str:
    """Digest of an entry without its own digest."""
    return digest({key: value for key, value in entry.written().items() if key != "digest"})


def seal(entry: Entry, before: Sequence[Entry]) -> Entry:
    """The entry linked to the ones before it and given its digest."""
    previous = before[-1].digest if before else ""
    linked = entry.model_copy(update={"previous": previous, "digest": ""})
    return linked.model_copy(update={"digest": entry_digest(linked)})


def read_record(path: Path | str) -> tuple[Entry, ...]:
    """The entries of a record; none where there is no file.

    Raises:
        InputError: it cannot be read, or is damaged: a broken chain, or a byte that is not ours.
    """
    return _read(Path(path))[0]


def _read(path: Path) -> tuple[tuple[Entry, ...], bytes | None]:
    """Entries and bytes of a record; no bytes where there is no file."""
    if not os.path.lexists(path):
        return (), None
    data = read_bytes(path)
    file = parse_toml(path, data)
    entries = validate(file, Record, _chain_faults).entry
    _refuse_stray_bytes(path, data, render(entries).encode("utf-8"))
    return entries, data


def _chain_faults(record: Record, lost: frozenset[str]) -> Iterator[Fault]:
    before: Entry | None = None
    for row, entry in enumerate(record.entry):
        if any(key in entry.model_fields_set and getattr(entry, key) is None for key in FIELDS):
            return  # a lost field has its own message, and no digest can be right without it
        yield from (Fault(("entry", row, *loc), found, expected) for loc, found, expected in entry.contradictions())
        if entry.previous != (before.digest if before else ""):
            expected = "the digest of the entry before it" if before else "none in the first entry"
            yield Fault(("entry", row, "previous"), "another digest", expected, "the record was changed or cut")
        if entry.digest != entry_digest(entry):
            yield Fault(("entry", row, "digest"), "another digest", "that of the entry", "the entry was changed")
        before = entry


def _refuse_stray_bytes(path: Path, data: bytes, ours: bytes) -> None:
    if data in (ours, ours.replace(b"\n", b"\r\n")):
        return
    if b"\r\n" in data:
        ours = ours.replace(b"\n", b"\r\n")
    differing = (place for place, (a, b) in enumerate(zip(data, ours, strict=False)) if a != b)
    at = next(differing, min(len(data), len(ours)))
    found = repr(data[at : at + 20])[1:] if at < len(data) else "the end of the file"
    line = data.count(b"\n", 0, at) + 1
    message = f"damaged record: byte {at + 1:,} is not as it was written (found {found})"
    raise whole_file(shown_path(path), message, found=found, expected="the record as it was written", line=line)


def append(path: Path | str, entry: Entry) -> Entry:
    """Append an entry to a record, creating it where there is none.

    The file is written whole beside the old one, flushed to the disk and put in its place in one step.

    Args:
        path: the record.
        entry: the entry; `previous` and `digest` are set here.

    Returns:
        The entry as written.

    Raises:
        InputError: the record is damaged, cannot be written, or was changed meanwhile; the file is as it was.
    """
    path = Path(os.path.realpath(path))
    with _one_writer(path.parent):
        return _append(path, entry)


def _append(path: Path, entry: Entry) -> Entry:
    file = shown_path(path)
    before, data = _read(path)
    sealed = seal(entry, before)
    contradictions = tuple(sealed.contradictions())
    if contradictions:
        _, found, expected = contradictions[0]
        raise whole_file(file, f"found {found}, expected {expected}", found=found, expected=expected)
    new = render((*before, sealed)).encode("utf-8")
    if len(new) > LARGEST_FILE:
        raise whole_file(file, "the record would grow over 2 MB: begin a new rig file")
    try:
        _replace(path, new, data)
    except OSError as error:
        raise whole_file(file, f"not written: {(error.strerror or 'unknown reason').lower()}") from None
    return sealed


@contextlib.contextmanager
def _one_writer(folder: Path) -> Iterator[None]:
    """Let one program at a time append in a folder; the system gives the lock back when a program dies."""
    if sys.platform == "win32":
        yield
        return
    import fcntl

    try:
        handle = os.open(folder, os.O_RDONLY)
    except OSError:  # whatever is wrong with the folder, writing says it better
        yield
        return
    try:
        with contextlib.suppress(OSError):  # some network folders know no locks; the bytes are compared all the same
            fcntl.flock(handle, fcntl.LOCK_EX)
        yield
    finally:
        os.close(handle)


def _replace(path: Path, new: bytes, old: bytes | None) -> None:
    """Put new bytes in the place of the old ones, all or nothing."""

    def unchanged() -> None:
        if (read_bytes(path) if os.path.lexists(path) else None) != old:
            raise whole_file(shown_path(path), "another program wrote this record meanwhile: nothing was written")

    write_whole(path, new, ready=unchanged)
