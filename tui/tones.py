"""How each tone looks in the dark and the light theme, and where the terminal shows no colour."""

from __future__ import annotations

from collections.abc import Mapping

from rich.style import Style

from tui.rows import Tone

DARK_GROUND, LIGHT_GROUND = "#14181c", "#f7f5ef"

_DARK: Mapping[Tone, tuple[str, str]] = {
    "text": ("#d8dcd6", ""),
    "title": ("#ffffff", "bold"),
    "dim": ("#9aa39d", ""),
    "pass": ("#7fd08f", "bold"),
    "fail": ("#ff8f80", "bold"),
    "open": ("#f0c35a", "bold"),
    "here": ("#ffffff", "bold reverse"),
    "key": ("#8fc4f0", "bold"),
    "note": ("#f0c35a", ""),
    "rule": ("#6d7772", ""),
}
_LIGHT: Mapping[Tone, tuple[str, str]] = {
    "text": ("#22282c", ""),
    "title": ("#000000", "bold"),
    "dim": ("#5a625e", ""),
    "pass": ("#12652a", "bold"),
    "fail": ("#a8150a", "bold"),
    "open": ("#7a5200", "bold"),
    "here": ("#000000", "bold reverse"),
    "key": ("#0b4f8a", "bold"),
    "note": ("#7a5200", ""),
    "rule": ("#7c837f", ""),
}
_NO_COLOUR: Mapping[Tone, str] = {
    "text": "",
    "title": "bold",
    "dim": "",
    "pass": "bold",
    "fail": "bold reverse",
    "open": "bold",
    "here": "reverse",
    "key": "bold",
    "note": "",
    "rule": "",
}

Look = Mapping[Tone, Style]


def _coloured(table: Mapping[Tone, tuple[str, str]], ground: str) -> Look:
    return {tone: Style.parse(f"{extra} {colour} on {ground}".strip()) for tone, (colour, extra) in table.items()}


def look(*, dark: bool, colour: bool) -> Look:
    """The style of every tone."""
    if not colour:
        return {tone: Style.parse(extra) if extra else Style() for tone, extra in _NO_COLOUR.items()}
    return _coloured(_DARK, DARK_GROUND) if dark else _coloured(_LIGHT, LIGHT_GROUND)
