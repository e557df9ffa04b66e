"""What the terminal can do, found out before the full screen starts."""

from __future__ import annotations

import os
import sys
from collections.abc import Mapping

LEAST_COLUMNS, LEAST_ROWS = 60, 20
_PLAIN_COMMANDS = "'rigslate check PATH' prints the checklist, 'rigslate check --ask RIG' asks the open inspections"


def refusal(environment: Mapping[str, str], *, terminal: bool) -> str | None:
    """Why the full screen can't start here, in one line; None where it can.

    Args:
        environment: The environment's variables.
        terminal: Whether standard input, output and error are terminals.
    """
    if not terminal:
        return f"rigslate: the full screen needs a terminal; {_PLAIN_COMMANDS}"
    if environment.get("TERM", "").lower() == "dumb":
        return f"rigslate: the full screen can't run on TERM=dumb; {_PLAIN_COMMANDS}"
    return None


def on_terminal() -> bool:
    """Whether all three standard streams are terminals."""
    return all(
        stream is not None and stream.isatty() for stream in (sys.__stdin__, sys.__stdout__, sys.__stderr__)
    )


def wants_ascii(environment: Mapping[str, str], *, windows: bool = os.name == "nt") -> bool:
    """Whether to draw in ASCII: on the Linux console, an unknown terminal or a locale that is not UTF-8."""
    if windows:
        return "WT_SESSION" not in environment and not environment.get("TERM")
    if environment.get("TERM", "").lower() in ("", "linux", "unknown", "vt100", "vt220", "ansi", "cons25"):
        return True
    locale = next((environment[name] for name in ("LC_ALL", "LC_CTYPE", "LANG") if environment.get(name)), "")
    return "utf8" not in locale.lower().replace("-", "")


def wants_no_colour(environment: Mapping[str, str]) -> bool:
    """Whether NO_COLOR is set; an empty value counts."""
    return "NO_COLOR" in environment


def too_small(columns: int, rows: int) -> str | None:
    """What to say where a terminal has less room than the screens need, None where it has enough."""
    if columns >= LEAST_COLUMNS and rows >= LEAST_ROWS:
        return None
    return (
        f"This window is {columns} x {rows}; rigslate needs {LEAST_COLUMNS} x {LEAST_ROWS}. "
        "Make it larger, or leave with ctrl+q and use rigslate check."
    )
