"""What is wrong with an input: file, line, key path, what was found, what is expected."""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

MOST_PROBLEMS = 100
"""More problems of one file than this are counted, not listed."""


class InputProblem(NamedTuple):
    """One mistake in one file.

    Attributes:
        file: the path as it was asked for.
        line: line of the key, or of its table where the key is missing; None where the file could not be read.
        path: key path with rows counted from 1 and named: `leg 2 (front right).strength`; empty for the whole file.
        found: what stands there.
        expected: what may stand there.
        message: the whole sentence without file, line and path.
    """

    file: str
    line: int | None
    path: str
    found: str
    expected: str
    message: str

    def __str__(self) -> str:
        place = self.file if self.line is None else f"{self.file}:{self.line}"
        return ": ".join(part for part in (place, self.path, self.message) if part)


class InputError(Exception):
    """Input that cannot be used; holds every problem found, in the order of the files and their lines."""

    def __init__(self, problems: Iterable[InputProblem]) -> None:
        self.problems = tuple(problems)
        super().__init__("\n".join(str(problem) for problem in self.problems))


def whole_file(file: str, message: str, *, found: str = "", expected: str = "", line: int | None = None) -> InputError:
    """An error about a file as a whole: unreadable, not TOML, missing."""
    return InputError([InputProblem(file, line, "", found, expected, message)])
