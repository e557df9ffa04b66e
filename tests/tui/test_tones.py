"""Colours can be read, and nothing hangs on them."""

import pytest
from rich.color import Color
from rich.style import Style

from tui.tones import look


def luminance(colour: Color | None) -> float:
    """Relative luminance; WCAG 2.1, definition of relative luminance."""
    assert colour is not None
    parts = [part / 255 for part in colour.get_truecolor()]
    linear = [part / 12.92 if part <= 0.03928 else ((part + 0.055) / 1.055) ** 2.4 for part in parts]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(style: Style) -> float:
    """Contrast ratio of text and ground; WCAG 2.1, 1.4.3."""
    light, dark = sorted((luminance(style.color), luminance(style.bgcolor)), reverse=True)
    return (light + 0.05) / (dark + 0.05)


@pytest.mark.parametrize("dark", [True, False])
def test_every_text_stands_out_from_its_ground(dark: bool) -> None:
    for tone, style in look(dark=dark, colour=True).items():
        assert contrast(style) >= (3.0 if tone == "rule" else 4.5), tone


def test_without_colour_no_style_names_one() -> None:
    for style in look(dark=True, colour=False).values():
        assert style.color is None
        assert style.bgcolor is None


def test_both_themes_and_no_colour_know_the_same_tones() -> None:
    assert look(dark=True, colour=True).keys() == look(dark=False, colour=True).keys()
    assert look(dark=True, colour=True).keys() == look(dark=True, colour=False).keys()
