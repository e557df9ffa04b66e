"""The opening screen by keys, with the real model on demo rigs."""

import re
from pathlib import Path

import pytest

from model.checks.checklist import check
from model.study.walkthrough import walk
from tests.tui.fakes import after, settled, text
from tests.tui.opening_rigs import (
    HALF,
    MEASURED,
    REEFED,
    TWO_ROWS,
    WARM,
    copied,
    on_opening,
    opening,
    running_on,
    shown,
)


def left(screen: str) -> str:
    """The words of the lines, without the curve beside them."""
    return shown("\n".join(line[:41] for line in screen.splitlines()))


async def test_lines_open_one_by_one_with_formula_numbers_and_source(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        assert "line 1 of 20" in await on_opening(running)
        screen = await after(running, "space", "space", "space", "space")
        assert "line 5 of 20" in screen
        assert "▸ 5 filling time" in screen
        for words in ("tf = L/V", "= 512 ft/129.5 kt", "source: Knacke", "go first"):
            assert words in left(screen) + shown(screen)
        assert "line 4 of 20" in await after(running, "backspace")
        assert "line 20 of 20" in await after(running, "end")
        assert "That is the last line." in await after(running, "space")
        await after(running, "home")
        assert "That is the first line." in await after(running, "backspace")


async def test_every_line_has_a_value_and_says_where_it_comes_from(tmp_path: Path) -> None:
    rig = copied(tmp_path, REEFED)
    titles = [line.title for line in walk(check(rig).details).lines]
    running = running_on(rig)
    async with running.run_test(size=(120, 60)):
        await on_opening(running)
        listed = opening(running)._listed
        assert [one.line.title for one in listed if one.line] == titles
        for number in range(len(listed)):
            screen = shown(text(running))
            assert f"line {number + 1} of {len(listed)}" in screen
            assert re.search(r"source: |by definition|least and largest of|measured: |exit\.|drop\.|platform\.", screen)
            await after(running, "space")


async def test_peak_time_limit_and_margin_stand_beside_the_curve_at_both_sizes(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)) as pilot:
        for columns, rows in ((80, 24), (60, 20)):
            await pilot.resize_terminal(columns, rows)
            screen = shown(await (settled(running) if columns == 60 else on_opening(running)))
            assert re.search(r"time rule: peak 15,\d{3} lbf at 3\.\d\d s", screen)
            assert re.search(r"limit 9 g: 18,\d{3} lbf", screen)
            assert re.search(r"load factor 7\.\d+ g: margin 1\d %", screen)
            assert re.search(r"methods: 87 % to 133 % of the motion", screen)
            assert "riggers go first" in screen
            wide = await after(running, "z")
            assert "canopy force, lbf" in wide
            assert wide.count("┤") > 1
            assert "peak 15," in wide
            assert all(len(line) <= columns for line in wide.splitlines())
            await after(running, "z")


async def test_a_moved_input_moves_lines_and_curve_and_the_file_value_stays_marked(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        before = await on_opening(running)
        assert "as in the file" in before
        screen = shown(await after(running, "m", "right"))
        assert "2,284 lb moved, file 2,084 lb" in screen
        assert "1 moved" in screen
        assert "file: peak 15,846 lbf" in screen
        assert re.search(r"time rule: peak 1[67],\d{3} lbf", screen)
        assert "calculating" not in screen
        assert "ratio" not in screen
        back = await after(running, "0")
        assert "2,084 lb as in the file" in shown(back)
        assert "peak 15,846 lbf" in back
        assert "file: peak" not in back
        assert "Nothing is moved." in await after(running, "0")


async def test_what_is_shown_is_what_the_model_makes_of_the_moved_values(tmp_path: Path) -> None:
    rig = copied(tmp_path)
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "down", "right", "right", "down", "left")
        screen = opening(running)
        written = tmp_path / "by-hand.toml"
        words = rig.read_text(encoding="utf-8").replace('"130 kt', '"132 kt')
        written.write_text(words.replace('release_height = "1,250 ft', 'release_height = "1,230 ft'), encoding="utf-8")
        by_hand = walk(check(written).details)
        assert screen._shot is not None
        for one, other in zip(screen._shot.walk.lines, by_hand.lines, strict=True):
            assert (one.term is None) == (other.term is None)
            if one.term is not None and other.term is not None:
                assert one.term.value == pytest.approx(other.term.value, rel=1e-9)


async def test_numbers_keep_their_columns_while_inputs_move(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "end", *["backspace"] * 9)

        def ends(screen: str) -> list[int]:
            rows = [line[:41] for line in screen.splitlines()[3:17]]
            return [len(line.rstrip()) for line in rows if re.search(r"\d (lbf|s|g|psf|kt)$", line.rstrip())]

        before = ends(text(running))
        assert before
        assert set(before) == {40}
        assert set(ends(await after(running, "m", "right", "right"))) == {40}


async def test_the_curves_follow_each_other_and_each_has_its_numbers(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "z")
        descent = await after(running, "g")
        assert "rate of descent, ft/s" in descent
        assert "at touchdown 29.26 ft/s" in descent
        area = await after(running, "g")
        assert "drag area of the canopies, ft2" in area
        assert "full: 2,413 ft2" in area
        assert "canopy force, lbf" in await after(running, "g")


async def test_units_change_lines_curve_and_inputs(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "right")
        screen = shown(await after(running, "u"))
        assert "canopy force, kN" in screen
        assert "1.023 kg/m3" in screen or "0.99" in screen
        assert "kg moved, file 945.3 kg" in screen
        assert "lbf" not in screen
        assert "file: peak 70.49 kN" in screen


async def test_contradicting_values_give_a_reason_and_no_number(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        # The dew point of the file is 14 °C.
        screen = await on_opening(running, "down", "down", "down", "down", "m", "left", "left")
        assert "No result with these values" in screen
        assert "dew" in screen
        assert "lbf" not in screen
        assert "NOT WRITTEN: these values can't be" in shown(await after(running, "k", "enter"))
        assert not (tmp_path / "05-pump-warm-moved.toml").exists()
        await after(running, "escape")
        assert "line 1 of 20" in await after(running, "0")


async def test_methods_stand_side_by_side_with_their_share_and_warnings(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 50)):
        screen = left(await on_opening(running, *["space"] * 7))
        assert "methods, and their share of the motion" in screen
        assert "1,197 %, not counted" in screen
        assert "Caution: ballistic parameter under 10" in screen
        assert "100 %" in screen
        last = left(await after(running, "end"))
        assert "range of methods 87 % to 133 %" in last
        assert "path flown while filling" in last
        assert "not counted: infinite mass" in last


async def test_measured_figures_stand_beside_the_estimate_they_replace(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path, MEASURED))
    async with running.run_test(size=(80, 40)):
        await on_opening(running, "end")
        screen = left(await after(running, "backspace"))
        assert "measured, beside the estimate it replaces" in screen
        assert re.search(r"measured: 16,400 lbf, source: trial drops", screen)
        assert re.search(r"estimate: [\d,]+ lbf, \d+\.\d % too (low|high)", screen)


async def test_missing_data_are_named_and_the_other_lines_stand(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path, HALF))
    async with running.run_test(size=(80, 40)):
        screen = await on_opening(running, "end")
        screen = left(screen) + shown("\n".join(line[41:] for line in screen.splitlines()))
        assert "No curve" in screen
        assert "data missing: item 3 (Lashings and legs)" in screen
        assert "true airspeed at" in screen
        assert "no value" in screen
        assert "1 moved" in await after(running, "right")


async def test_a_load_that_lands_first_says_so_and_has_no_load_factor(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path, WARM, ('release_height = "1,250 ft', 'release_height = "220 ft')))
    async with running.run_test(size=(80, 24)):
        screen = shown(await on_opening(running, "end", "backspace"))
        assert "load factor: lands before it is open" in screen
        assert "margin" not in screen
        assert "FAIL" not in screen


async def test_stages_and_rows_are_told_apart(tmp_path: Path) -> None:
    for name, words in ((REEFED, "filling 2"), (TWO_ROWS, "row 2 (main)")):
        running = running_on(copied(tmp_path, name))
        async with running.run_test(size=(100, 60)):
            await on_opening(running)
            listed = opening(running)._listed
            assert any(words in one.head for one in listed)
            assert {"stage 1, drag ratio", "row 1, diameter D0"} & {one.name for one in opening(running)._moves.inputs}


async def test_ascii_says_the_same_without_another_glyph(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path), ascii_only=True)
    async with running.run_test(size=(80, 24)):
        assert (await on_opening(running, "right")).isascii()
        wide = await after(running, "z")
        assert wide.isascii()
        assert "*" in wide
        assert (await after(running, "g")).isascii()
        assert (await after(running, "escape", "h")).isascii()


async def test_without_colour_no_cell_of_the_opening_has_one(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("NO_COLOR", "1")
    running = running_on(copied(tmp_path), colour=False)
    async with running.run_test(size=(80, 24)):
        screen = await on_opening(running, "right")
        assert "moved, file" in screen
        for strip in running.screen._compositor.render_strips():
            for segment in strip:
                if segment.style is not None and segment.text.strip():
                    for colour in (segment.style.color, segment.style.bgcolor):
                        assert colour is None or colour.is_default, segment


async def test_names_of_inputs_are_whole_on_a_small_screen(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path, REEFED))
    async with running.run_test(size=(60, 20)):
        await on_opening(running)
        for one in opening(running)._moves.inputs:
            screen = await after(running, "right")
            assert f"▸ {one.name} " in screen
            assert re.search(rf"▸ {re.escape(one.name)} +\S.* file \S", screen)
            await after(running, "left", "down")
