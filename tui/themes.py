"""The two themes of the full screen."""

from textual.theme import Theme

from tui.tones import DARK_GROUND, LIGHT_GROUND

DARK = Theme("rigslate-dark", primary="#8fc4f0", foreground="#d8dcd6", background=DARK_GROUND, surface=DARK_GROUND)
LIGHT = Theme(
    "rigslate-light",
    primary="#0b4f8a",
    foreground="#22282c",
    background=LIGHT_GROUND,
    surface=LIGHT_GROUND,
    dark=False,
)
