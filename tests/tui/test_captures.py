"""Every screen as it is seen: both sizes, both themes, no colour, ASCII."""

import re
from pathlib import Path

import pytest
from rich.segment import Segment

from tests.tui.fakes import after, app, back_to_first, services, settled
from tui.app import RigslateApp
from tui.widgets.board import MARKS

SCREENS = {
    "rigs": (),
    "rigs unreadable": ("end",),
    "steps open": ("enter",),
    "steps fail": ("enter", "up"),
    "steps pass": ("enter", "home"),
    "inspected": ("enter", "down", "down"),
    "chosen": ("enter", "end", "f"),
    "asking": ("enter", "down", "down", "f", "enter"),
    "working": ("enter", "w"),
    "help": ("question_mark",),
    "palette": ("ctrl+p",),
}
SIZES = [(80, 24), (60, 20)]
NUMBER_NEEDS_UNIT = re.compile(r"(?<![\w.,:/+-])-?\d[\d,]*\.\d+(?! ?(%|[a-zA-Z/])|\d)")


def segments(running: RigslateApp) -> list[Segment]:
    return [segment for strip in running.screen._compositor.render_strips() for segment in strip]


def check_words(shown: str) -> None:
    """No number without its unit, no verdict without its sign."""
    assert not NUMBER_NEEDS_UNIT.search(shown), "a number without its unit"
    for word, sign in re.findall(r"(?<!not )\b(PASS|FAIL|OPEN)\b(..)", shown):
        assert sign == f" {MARKS[word][0]}", f"{word} without its sign"


def words(shown: str) -> list[str]:
    """Letters and digits alone; the bars and boards are left out by their signs."""
    return re.findall(r"[A-Za-z0-9]{2,}", re.sub(r"[X▒=█]{2,}", "", shown))


@pytest.mark.parametrize(("columns", "rows"), SIZES)
async def test_screens_fit_and_say_the_same_in_ascii(tmp_path: Path, columns: int, rows: int) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(columns, rows)):
        await settled(running)
        for name, keys in SCREENS.items():
            await back_to_first(running)
            full = await after(running, *keys)
            assert len(full.splitlines()) <= rows
            assert all(len(line) <= columns for line in full.splitlines())
            assert full.splitlines()[-1].strip().endswith(("keys", "leave")), name
            check_words(full)
            running.switch_glyphs()
            running.front.hush()
            plain = await settled(running)
            assert plain.isascii(), name
            assert words(plain) == words(full), name
            assert [line.rstrip()[-1:] == "~" for line in plain.splitlines()] == [
                line.rstrip()[-1:] == "…" for line in full.splitlines()
            ], name
            running.switch_glyphs()


async def test_without_colour_no_cell_has_one(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("NO_COLOR", "1")
    running = app(tmp_path, services(tmp_path), colour=False)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        for name, keys in SCREENS.items():
            await back_to_first(running)
            check_words(await after(running, *keys))
            for segment in segments(running):
                if segment.style is not None and segment.text.strip():
                    for colour in (segment.style.color, segment.style.bgcolor):
                        assert colour is None or colour.is_default, (name, segment)
        await back_to_first(running)
        assert "NO_COLOR is set" in await after(running, "l")


async def test_light_and_dark_show_the_same_words_on_other_grounds(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        for name, keys in SCREENS.items():
            await back_to_first(running)
            dark, ground = await after(running, *keys), grounds(running)
            running.switch_theme()
            running.front.hush()
            assert await settled(running) == dark, name
            assert not grounds(running) & ground, name
            running.switch_theme()


def grounds(running: RigslateApp) -> set[object]:
    """The grounds of all cells but those shown in reverse."""
    styles = [segment.style for segment in segments(running) if segment.style is not None]
    return {style.bgcolor for style in styles if not style.reverse}


def test_the_check_for_numbers_without_units_finds_one() -> None:
    assert NUMBER_NEEDS_UNIT.search("margin 28.5 of") is None
    assert NUMBER_NEEDS_UNIT.search("value 28.5")
    assert not NUMBER_NEEDS_UNIT.search("value 28.5 ft/s, -3.3 %, 0.5 g")


async def test_the_board_tells_verdicts_by_signs(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
    board = [line[:24].rstrip() for line in shown.splitlines()[3:10]]
    assert board == [
        "load      = =", "balance   =", "descent   X", "opening  ▸o", "zone air  -", "canopy    o o", "lashing   o",
    ]  # fmt: skip
