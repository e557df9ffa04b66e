"""Keys by name, as a terminal sends them."""

from __future__ import annotations

import string

ESCAPE = b"\x1b"
_UNMISTAKABLE_ESCAPE = b"\x1b[27u"

_ARROWS = {"up": "A", "down": "B", "right": "C", "left": "D", "end": "F", "home": "H"}
_MODIFIERS = {"shift": 2, "alt": 3, "ctrl": 5}
_FUNCTION_KEYS = {
    f"f{number}": code
    for number, code in enumerate(
        ["OP", "OQ", "OR", "OS", "[15~", "[17~", "[18~", "[19~", "[20~", "[21~", "[23~", "[24~"], start=1
    )
}

KEYS: dict[str, bytes] = {
    "enter": b"\r",
    "escape": ESCAPE,
    "tab": b"\t",
    "shift+tab": b"\x1b[Z",
    "space": b" ",
    "backspace": b"\x7f",
    "insert": b"\x1b[2~",
    "delete": b"\x1b[3~",
    "pageup": b"\x1b[5~",
    "pagedown": b"\x1b[6~",
    **{name: f"\x1b[{letter}".encode() for name, letter in _ARROWS.items()},
    **{
        f"{modifier}+{name}": f"\x1b[1;{code}{letter}".encode()
        for modifier, code in _MODIFIERS.items()
        for name, letter in _ARROWS.items()
    },
    **{f"ctrl+{letter}": bytes([ord(letter) & 0x1F]) for letter in string.ascii_lowercase},
    **{name: f"\x1b{code}".encode() for name, code in _FUNCTION_KEYS.items()},
}


def key_bytes(key: str, kitty: bool = False) -> bytes:
    """What a terminal sends for a key.

    Args:
        key: A name of `KEYS`, ``alt+`` and a character, or one character.
        kitty: Whether the program asked for unmistakable escapes.

    Raises:
        ValueError: if there is no such key.
    """
    if kitty and key == "escape":
        return _UNMISTAKABLE_ESCAPE
    if key in KEYS:
        return KEYS[key]
    if len(key) == 1:
        return key.encode()
    if key.startswith("alt+") and len(key) == 5:
        return ESCAPE + key[4:].encode()
    raise ValueError(f"no key is called {key!r}; use type() for text")
