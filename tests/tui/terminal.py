"""A pseudo-terminal that runs a command, types at it and reads its screen.

One thread: every look at the child reads what it has written so far, so a test never races a reader. Waits end when a
condition holds or the child ends; time limits are only there to stop a hanging test.
"""

from __future__ import annotations

import re
import sys
import tempfile
import time
from collections.abc import Callable, Sequence
from pathlib import Path
from types import TracebackType

from tests.tui.child import Changes, Child, base_environment, merged, run_plain
from tests.tui.emulator import Cell, Emulator
from tests.tui.keys import ESCAPE, key_bytes

__all__ = ["RIGSLATE", "Cell", "Terminal", "base_environment", "run_plain"]

RIGSLATE = [sys.executable, "-m", "tui.main"]

Condition = str | re.Pattern[str] | Callable[[list[str]], bool]

_ESCAPE_GAP = 0.3


class Terminal:
    """A command in a pseudo-terminal of a given size. Use it in a ``with`` statement."""

    def __init__(
        self,
        command: Sequence[str | Path],
        *,
        columns: int = 80,
        rows: int = 24,
        term: str = "xterm-256color",
        env: Changes = None,
        cwd: Path | None = None,
        encoding_locale: str = "C.UTF-8",
        timeout: float = 30.0,
    ) -> None:
        """Start the command.

        Args:
            command: Program and arguments.
            columns: Width in cells.
            rows: Height in cells.
            term: The child's TERM.
            env: Changes to the child's environment; None removes a name.
            cwd: The child's folder.
            encoding_locale: The child's LC_ALL and LANG.
            timeout: Seconds after which a wait counts as failed.
        """
        self.timeout = timeout
        self._raw = bytearray()
        self._replies = bytearray()
        self.status: int | None = None
        self._escape_until = 0.0
        self._emulator = Emulator(columns, rows)
        self._folder = tempfile.TemporaryDirectory(prefix="home-")
        self.home = Path(self._folder.name)
        environment = merged(base_environment(self.home, term, encoding_locale), env)
        try:
            self._child = Child(command, environment, (columns, rows), cwd)
        except BaseException:
            self._folder.cleanup()
            raise

    def __enter__(self) -> Terminal:
        return self

    def __exit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        self.close()

    def close(self) -> None:
        """End the child and all that it started, and give everything back. Safe to call twice."""
        self.status = self._child.close()
        self._folder.cleanup()

    def kill(self) -> None:
        """Kill the command's process group."""
        self.status = self._child.kill()

    def signal(self, number: int) -> None:
        """Send a signal to the command's process group."""
        self._child.signal(number)

    # What is typed

    def press(self, *keys: str) -> None:
        """Type keys by name, or single characters as they are.

        Raises:
            ValueError: if a key has no such name.
        """
        for data in [key_bytes(key, self._emulator.kitty) for key in keys]:
            self.send(data)
            if data == ESCAPE:
                self._escape_until = time.monotonic() + _ESCAPE_GAP

    def type(self, text: str) -> None:
        """Type a text, character by character."""
        for character in text:
            self.press(character)

    def hold(self, key: str, seconds: float, rate: float = 30.0) -> int:
        """Hold a key down: repeat it ``rate`` times a second while reading what the child writes.

        Returns:
            How many times the key was sent.
        """
        start = time.monotonic()
        count = 0
        while time.monotonic() - start < seconds:
            self.press(key)
            count += 1
            self._read_until(start + count / rate)
        return count

    def send(self, data: bytes) -> None:
        """Write bytes to the child, reading its output whenever it is not ready for more.

        Raises:
            AssertionError: if the child takes no input within the time limit, or has ended.
        """
        # An escape followed closely by a key reads as one key with Alt.
        self._read_until(self._escape_until)
        deadline = time.monotonic() + self.timeout
        while data:
            if self._child.ended or time.monotonic() > deadline:
                raise AssertionError(self._story(f"took no input: {data!r}"))
            written = self._child.write(data)
            data = data[written:]
            self._pump(0.0 if written else 0.02)

    def resize(self, columns: int, rows: int) -> None:
        """Change the size; the kernel tells the child."""
        self._pump(0.0)
        self._emulator.resize(columns, rows)
        self._child.resize(columns, rows)

    # What is waited for

    def wait_for(self, condition: Condition, timeout: float | None = None) -> list[str]:
        """Read until a text, pattern or predicate holds for the whole-frame screen.

        Returns:
            The rows at that moment.

        Raises:
            AssertionError: with the screen, if the child ends or the time limit passes first.
        """
        return self._wait(lambda rows: _holds(condition, rows), f"{_name(condition)} did not appear", timeout)

    def wait_gone(self, condition: Condition, timeout: float | None = None) -> list[str]:
        """Read until a condition holds no longer; otherwise as `wait_for`."""
        return self._wait(lambda rows: not _holds(condition, rows), f"{_name(condition)} did not go away", timeout)

    def wait_change(self, before: list[str], timeout: float | None = None) -> list[str]:
        """Read until the rows differ from ``before``; otherwise as `wait_for`."""
        return self._wait(lambda rows: rows != before, "the screen did not change", timeout)

    def _wait(self, holds: Callable[[list[str]], bool], what: str, timeout: float | None) -> list[str]:
        deadline = time.monotonic() + (self.timeout if timeout is None else timeout)
        self._pump(0.0)
        while True:
            # Of a frame half drawn nothing is concluded, unless the child has ended within it.
            if (self._child.ended or not self._emulator.in_frame) and holds(rows := self._emulator.rows()):
                return rows
            if self._child.ended or time.monotonic() > deadline:
                raise AssertionError(self._story(what))
            self._pump(0.05)

    def settle(self, quiet: float = 0.25) -> list[str]:
        """Read until nothing came for ``quiet`` seconds; says nothing about a child that is still calculating."""
        deadline = time.monotonic() + self.timeout
        while self._pump(quiet):
            if time.monotonic() > deadline:
                raise AssertionError(self._story("did not come to rest"))
        return self._emulator.rows()

    def wait_exit(self, timeout: float | None = None) -> int:
        """Read until the child has ended.

        Returns:
            Its exit status, negative for a signal.

        Raises:
            AssertionError: if it is still running at the time limit.
        """
        deadline = time.monotonic() + (self.timeout if timeout is None else timeout)
        while (status := self._child.status()) is None:
            if time.monotonic() > deadline:
                raise AssertionError(self._story("did not exit"))
            self._pump(0.05)
        while self._pump(0.05):
            pass
        self.status = status
        return status

    # What is seen

    def screen(self) -> list[str]:
        """The rows now, without trailing blanks."""
        self._pump(0.0)
        return self._emulator.rows()

    def text(self) -> str:
        """The rows now as one text."""
        return "\n".join(self.screen())

    def find(self, text: str) -> tuple[int, int]:
        """Row and column, from 0, of the first place that shows a text.

        Raises:
            AssertionError: if it is not on the screen.
        """
        self._pump(0.0)
        place = self._emulator.find(text)
        if place is None:
            raise AssertionError(self._story(f"{text!r} is not on the screen"))
        return place

    def cell(self, row: int, column: int) -> Cell:
        """One cell with its attributes; row and column from 0."""
        self._pump(0.0)
        return self._emulator.cell(row, column)

    def style_of(self, text: str) -> list[Cell]:
        """The cells of the first place that shows a text."""
        row, column = self.find(text)
        return self._emulator.cells(row, column, text)

    @property
    def raw(self) -> bytes:
        """All that the child wrote."""
        self._pump(0.0)
        return bytes(self._raw)

    @property
    def replies(self) -> bytes:
        """All that the child's queries were answered with."""
        return bytes(self._replies)

    @property
    def cursor(self) -> tuple[int, int]:
        """Row and column of the cursor, from 0."""
        self._pump(0.0)
        return self._emulator.cursor

    @property
    def cursor_visible(self) -> bool:
        """Whether the cursor is shown."""
        return 25 in self.modes

    @property
    def modes(self) -> set[int]:
        """The private modes that are on."""
        self._pump(0.0)
        return set(self._emulator.modes)

    @property
    def ever(self) -> set[int]:
        """The private modes that the child ever turned on."""
        self._pump(0.0)
        return set(self._emulator.ever)

    @property
    def in_full_screen(self) -> bool:
        """Whether the alternate screen is shown."""
        return 1049 in self.modes

    def cooked(self) -> bool:
        """Whether echo and line mode are on, as a shell expects them."""
        return self._child.is_cooked()

    # Reading

    def _read_until(self, moment: float) -> None:
        while (left := moment - time.monotonic()) > 0 and not self._child.ended:
            self._pump(left)

    def _pump(self, wait: float) -> bool:
        """Take in what the child has written, waiting up to ``wait`` seconds for the first of it; whether any came."""
        return self._child.pump(wait, self._take)

    def _take(self, data: bytes) -> None:
        self._raw += data
        reply = self._emulator.feed(data)
        self._replies += reply
        self._child.write(reply)

    def _story(self, what: str) -> str:
        status = self._child.status(1.0 if self._child.ended else 0.0)
        state = "still running" if status is None else f"ended with {status}"
        rows = "\n".join(f"  |{row}" for row in self._emulator.rows())
        return f"{what}; {self._child.name} {state}\n{rows}\nlast bytes: {bytes(self._raw[-300:])!r}"


def _holds(condition: Condition, rows: list[str]) -> bool:
    if isinstance(condition, str):
        return condition in "\n".join(rows)
    if isinstance(condition, re.Pattern):
        return condition.search("\n".join(rows)) is not None
    return condition(rows)


def _name(condition: Condition) -> str:
    return repr(condition) if isinstance(condition, str) else str(condition)
