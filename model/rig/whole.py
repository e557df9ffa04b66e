"""Files written whole: to a temporary file beside the old one, flushed to the disk, then put in place in one step."""

from __future__ import annotations

import os
import stat
import tempfile
from collections.abc import Callable
from pathlib import Path


def write_whole(path: Path, data: bytes, *, fresh: bool = False, ready: Callable[[], None] | None = None) -> None:
    """Write a file all or nothing; the old one stands until the new one is complete.

    Args:
        path: the file; not a link.
        data: what to write.
        fresh: whether there may be no file of that name yet.
        ready: called just before the new file is put in place; what it raises leaves the old one as it was.

    Raises:
        FileExistsError: with `fresh`, there is a file of that name; it is not touched.
        OSError: it cannot be written; nothing is changed.
    """
    if fresh and os.path.lexists(path):
        raise FileExistsError(17, "File exists", str(path))
    handle, name = tempfile.mkstemp(prefix=f".{path.name[:100]}.", dir=path.parent)
    try:
        with open(handle, "wb") as stream:
            stream.write(data)
            stream.flush()
            os.fsync(stream.fileno())
        os.chmod(name, _mode(path))
        if ready is not None:
            ready()
        if fresh:
            _place_new(name, path)
        else:
            os.replace(name, path)
    except BaseException:
        os.unlink(name)
        raise
    _flush_folder(path.parent)


def _place_new(name: str, path: Path) -> None:
    """Give the finished file its name, unless somebody has taken it meanwhile."""
    try:
        os.link(name, path)
    except FileExistsError:
        raise
    except OSError:
        # Some file systems know no second name for a file; there the look at the start has to do.
        os.replace(name, path)
        return
    os.unlink(name)


def _mode(path: Path) -> int:
    """Permissions of the file in place, or of a new one."""
    if path.exists():
        return stat.S_IMODE(path.stat().st_mode)
    mask = os.umask(0)
    os.umask(mask)
    return 0o666 & ~mask


def _flush_folder(folder: Path) -> None:
    """Make the new name last; not every system can open a folder for it."""
    try:
        handle = os.open(folder, os.O_RDONLY)
    except OSError:
        return
    try:
        os.fsync(handle)
    except OSError:
        return
    finally:
        os.close(handle)
