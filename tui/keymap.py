"""The user's own keys, from a file in their configuration folder.

[keys]
"steps.working" = "v"
"page.down" = ["pagedown", "ctrl+f"]
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from pathlib import Path

from tui.commands import BY_ID, COMMANDS, FORBIDDEN, ON_WHAT_IS_SHOWN, Keys

_KEY = re.compile(
    r"[a-z0-9A-Z]|f([1-9]|1[0-2])|ctrl\+([a-z]|up|down|left|right|underscore)|question_mark|full_stop|comma|minus|plus"
    r"|slash|equals_sign|semicolon|colon|apostrophe|" + "|".join(map(re.escape, sorted(ON_WHAT_IS_SHOWN)))
)


class KeymapError(ValueError):
    """A key file that can't be used; the text is one line for the user."""


def keymap_path(environment: Mapping[str, str], home: Path) -> Path:
    """Where the key file lies."""
    base = environment.get("XDG_CONFIG_HOME", "")
    return (Path(base) if base and Path(base).is_absolute() else home / ".config") / "rigslate" / "keys.toml"


def read_keys(path: Path) -> Keys:
    """The keys that hold: the defaults, with what the file changes.

    Raises:
        KeymapError: If the file can't be read or says something that can't hold. No file is no error.
    """
    try:
        text = path.read_text(encoding="utf-8")
    except FileNotFoundError:
        return Keys()
    except (OSError, UnicodeDecodeError) as error:
        reason = getattr(error, "strerror", None) or "not UTF-8 text"
        raise KeymapError(f"{path.name}: {reason}; the usual keys hold") from error
    # Read here, since most users have no such file and the parser costs time at the start.
    import tomllib

    try:
        found = tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise KeymapError(f"{path.name}: {error}; the usual keys hold") from error
    problem = _problem(found)
    if problem is not None:
        raise KeymapError(f"{path.name}: {problem}; the usual keys hold")
    return Keys({name: _as_keys(keys) for name, keys in found.get("keys", {}).items()})


def _as_keys(written: object) -> tuple[str, ...]:
    keys = written if isinstance(written, list) else [written]
    return tuple("question_mark" if key == "?" else str(key) for key in keys)


def _problem(found: Mapping[str, object]) -> str | None:
    """The first thing that can't hold."""
    unknown = next((name for name in found if name != "keys"), None)
    if unknown is not None:
        return f"unknown entry {unknown!r}, expected [keys]"
    table = found.get("keys", {})
    if not isinstance(table, dict):
        return "[keys] must be a table"
    for name, written in table.items():
        problem = _entry_problem(name, written)
        if problem is not None:
            return f"{name}: {problem}"
    return clash(Keys({name: _as_keys(written) for name, written in table.items()}))


def _entry_problem(name: str, written: object) -> str | None:
    """What is wrong with one line of the file."""
    if name not in BY_ID:
        return "unknown command"
    if BY_ID[name].fixed:
        return "this command keeps its key"
    listed = written if isinstance(written, list) else [written]
    if not listed or not all(isinstance(key, str) for key in listed):
        return "expected a key or a list of keys"
    for key in _as_keys(written):
        if key in FORBIDDEN or key == "ctrl+c":
            return f"{key} can't be used, terminals keep it for themselves"
        if not _KEY.fullmatch(key):
            return f"unknown key {key!r}"
    return None


def clash(keys: Keys) -> str | None:
    """Two commands that want one key: on one screen, or anywhere if the key must mean one thing everywhere."""
    taken: dict[tuple[str, str], str] = {}
    for command in COMMANDS:
        for key in keys.of(command):
            places = command.where if key in ON_WHAT_IS_SHOWN else ("everywhere",)
            for place in places:
                other = taken.setdefault((place, key), command.id)
                if other != command.id:
                    return f"{key} is wanted by {other} and {command.id}"
    return None


