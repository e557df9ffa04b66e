"""Commands started by tests: in a pseudo-terminal, or with pipes. What they start ends with them."""

from __future__ import annotations

import contextlib
import fcntl
import os
import pty
import select
import signal
import struct
import subprocess
import sys
import tempfile
import termios
from collections.abc import Callable, Mapping, Sequence
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
Changes = Mapping[str, str | None] | None

# Takes the pseudo-terminal as controlling terminal, so that a resize arrives as SIGWINCH, then becomes the command.
_LAUNCH = "import fcntl,os,sys,termios;fcntl.ioctl(0,termios.TIOCSCTTY,0);os.execvp(sys.argv[1],sys.argv[1:])"


def base_environment(home: Path, term: str, locale: str = "C.UTF-8") -> dict[str, str]:
    """The few variables that a child sees; nothing of the caller's colours, sizes or settings leaks in."""
    return {
        "PATH": os.environ.get("PATH", os.defpath),
        "PYTHONPATH": str(ROOT),
        "HOME": str(home),
        "XDG_CONFIG_HOME": str(home / ".config"),
        "XDG_STATE_HOME": str(home / ".local" / "state"),
        "XDG_CACHE_HOME": str(home / ".cache"),
        "LC_ALL": locale,
        "LANG": locale,
        "TERM": term,
    }


def merged(base: dict[str, str], changes: Changes) -> dict[str, str]:
    """An environment with changes; a value of None removes the name."""
    both: dict[str, str | None] = {**base, **(changes or {})}
    return {name: value for name, value in both.items() if value is not None}


def kill_group(group: int) -> None:
    """Kill a process group that this module started, if any of it is left."""
    with contextlib.suppress(ProcessLookupError, PermissionError):
        os.killpg(group, signal.SIGKILL)


def run_plain(
    command: Sequence[str | Path],
    *,
    input: str = "",  # noqa: A002
    env: Changes = None,
    cwd: Path | None = None,
    timeout: float = 60.0,
) -> subprocess.CompletedProcess[str]:
    """Run a command without a terminal: pipes on all three streams, UTF-8, TERM=dumb."""
    with tempfile.TemporaryDirectory(prefix="home-") as home:
        process = subprocess.Popen(
            [str(part) for part in command],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            stderr=subprocess.PIPE,
            env=merged(base_environment(Path(home), "dumb"), env),
            cwd=cwd,
            encoding="utf-8",
            errors="replace",
            start_new_session=True,
        )
        try:
            output, errors = process.communicate(input, timeout)
        except BaseException:
            kill_group(process.pid)
            process.communicate()
            raise
    return subprocess.CompletedProcess(process.args, process.returncode, output, errors)


class Child:
    """A command in a pseudo-terminal; whoever holds it reads by `pump` and must `close` it."""

    def __init__(
        self, command: Sequence[str | Path], environment: dict[str, str], size: tuple[int, int], cwd: Path | None
    ) -> None:
        """Start the command in a terminal of ``size`` (columns, rows)."""
        self.name = " ".join(str(part) for part in command)
        self.ended = False
        self._master, slave = pty.openpty()
        try:
            self.resize(*size)
            os.set_blocking(self._master, False)
            self._process = subprocess.Popen(
                [sys.executable, "-I", "-S", "-c", _LAUNCH, *(str(part) for part in command)],
                stdin=slave,
                stdout=slave,
                stderr=slave,
                env=environment,
                cwd=cwd,
                start_new_session=True,
            )
        except BaseException:
            os.close(self._master)
            raise
        finally:
            os.close(slave)

    def status(self, wait: float = 0.0) -> int | None:
        """The exit status, negative for a signal; None while it runs."""
        with contextlib.suppress(subprocess.TimeoutExpired):
            return self._process.wait(wait)
        return None

    def kill(self) -> int:
        """Kill the process group and collect the child; its exit status."""
        kill_group(self._process.pid)
        return self._process.wait()

    def close(self) -> int:
        """Kill what is left and give the terminal back. Safe to call twice."""
        if self._master >= 0:
            self.kill()
            os.close(self._master)
            self._master = -1
            self.ended = True
        return self._process.wait()

    def signal(self, number: int) -> None:
        """Send a signal to the process group."""
        os.killpg(self._process.pid, number)

    def resize(self, columns: int, rows: int) -> None:
        """Change the size; the kernel tells the program."""
        fcntl.ioctl(self._master, termios.TIOCSWINSZ, struct.pack("HHHH", rows, columns, 0, 0))

    def is_cooked(self) -> bool:
        """Whether echo and line mode are on."""
        flags = termios.tcgetattr(self._master)[3]
        return bool(flags & termios.ECHO) and bool(flags & termios.ICANON)

    def write(self, data: bytes) -> int:
        """Write as much as there is room for; how many bytes that was."""
        if self.ended or not select.select([], [self._master], [], 0)[1]:
            return 0
        try:
            return os.write(self._master, data)
        except BlockingIOError:
            return 0
        except OSError:
            self.ended = True
            return 0

    def pump(self, wait: float, take: Callable[[bytes], None]) -> bool:
        """Pass on what the program has written; waits up to ``wait`` seconds for the first of it. Whether any came."""
        came = False
        while not self.ended and self._has_output(0.0 if came else wait):
            try:
                data = os.read(self._master, 65536)
            except OSError:
                # Linux reports the last closing of the other side as an input error.
                data = b""
            if data:
                came = True
                take(data)
            else:
                self.ended = True
        # Something left behind may hold the terminal open; the program's own end is what counts.
        if not came and not self.ended and self._process.poll() is not None and not self._has_output(0.0):
            self.ended = True
        return came

    def _has_output(self, wait: float) -> bool:
        return bool(select.select([self._master], [], [], wait)[0])
