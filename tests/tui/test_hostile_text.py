"""Text of rig files that would break or restyle a screen."""

import unicodedata
from dataclasses import replace
from pathlib import Path

import pytest

from model.checks.finding import Answer
from tests.tui.fakes import MORNING, FakeServices, after, app, checklist, findings, inspected, lines, settled, text
from tui.glyphs import width

HOSTILE = (
    "[bold red]Pump[/bold red] [/] [/s]",
    "\x1b[2J\x1b[31mred\x07 bell",
    "\u202eevil \u2066iso\u2069 \u200fmark",
    "\u05de\u05e9\u05d0\u05d1\u05ea \u0645\u0636\u062e\u0629",
    "漢字ポンプ一式 揚水機",
    "e\u0301\u0301\u0301\u0301\u0301 zalgo \u0489\u0489\u0489",
    "tab\tand\nnew line\r\x00nul",
    "x" * 300,
    "word " * 120,
    "👩‍🚒 fire \ufe0f\u200d crew",
    "",
)


def hostile(folder: Path, words: str) -> FakeServices:
    rig = folder / "rig.toml"
    rig.write_text("[rig]\n")
    changed = tuple(
        replace(one, title=words or "t", reason=words, cautions=(words,), group=words or "g") for one in findings()
    )
    answer = Answer("fail", words, MORNING, words, words, words, True)
    asked = replace(inspected("x.y", words, answer=answer, stage=words, caution=words, wants_value=words), title=words)
    broken = folder / "z.toml"
    return FakeServices(
        {rig: checklist(rig, name=words, reference=words, limit_set=words, findings=(*changed, asked))},
        {broken: f"z.toml:1: {words}"},
    )


def check_screen(shown: list[str], columns: int) -> None:
    for line in shown:
        assert width(line) <= columns
        for sign in line:
            assert unicodedata.category(sign) not in ("Cc", "Cf", "Cs", "Zl", "Zp")


@pytest.mark.parametrize(("number", "words"), list(enumerate(HOSTILE)))
async def test_no_text_of_a_file_breaks_or_styles_a_screen(tmp_path: Path, number: int, words: str) -> None:
    columns, rows = (80, 24) if number % 2 else (60, 20)
    running = app(tmp_path, hostile(tmp_path, words), ascii_only=number % 3 == 0)
    async with running.run_test(size=(columns, rows)):
        await settled(running)
        check_screen(lines(running), columns)
        await after(running, "end")
        check_screen(lines(running), columns)
        for keys in (("home", "enter"), ("home",), ("down",), ("down", "down"), ("end",), ("p", "enter"), ("escape",),
                     ("home", "w")):  # fmt: skip
            await after(running, *keys)
            shown = lines(running)
            check_screen(shown, columns)
            assert len(shown) == rows
            if number % 3 == 0:
                assert text(running).isascii()


async def test_brackets_are_shown_as_written(tmp_path: Path) -> None:
    running = app(tmp_path, hostile(tmp_path, "[bold]N[/bold] [/]"))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "[bold]N[/bold] [/]" in await after(running, "enter")


async def test_what_is_typed_is_written_without_control_signs(tmp_path: Path) -> None:
    model = hostile(tmp_path, "plain")
    running = app(tmp_path / "rig.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "end", "f", "enter", *"3", "enter")
        running.focused.insert_text_at_cursor("cut\x1b[31m \u202ehere")  # type: ignore[union-attr]
        await after(running, "enter", *"AM", "enter")
    assert model.entries[0][1].remark == "cut [31m  here"
