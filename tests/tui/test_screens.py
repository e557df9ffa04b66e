"""The screens by keys, on a model that answers at once."""

import threading
from dataclasses import replace
from pathlib import Path

import pytest

from tests.tui.fakes import after, app, back_to_first, checklist, findings, press, services, settled, text, until
from tui.commands import COMMANDS, FORBIDDEN, Keys, on_screen
from tui.screens.base import BaseScreen
from tui.screens.help import HelpScreen
from tui.screens.palette import PaletteScreen
from tui.screens.rigs import RigsScreen
from tui.screens.steps import StepsScreen
from tui.screens.working import WorkingScreen


async def test_the_shelf_lists_rigs_with_verdict_margin_and_signature(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
    assert "5 rigs" in shown
    assert "1 pass   2 fail   2 can't be read" in shown
    assert "▸ TV-014  a-pump" in shown
    row = next(line for line in shown.splitlines() if "b-bundle" in line)
    assert "FAIL X" in row
    assert "-3.3 % descent.rate" in row
    assert "changed since" in row
    assert "CAN'T READ !" in next(line for line in shown.splitlines() if "e-notes" in line)


async def test_one_key_marks_the_next_rig_that_is_not_pass(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "▸ TV-014  b-bundle" in await after(running, "n")
        shown = await after(running, "n")
    assert "▸ d-broken.toml" in shown
    assert 'd-broken.toml:14: canopy row 1 (main).diameter: found "0 ft"' in shown


async def test_a_folder_without_rigs_says_so(tmp_path: Path) -> None:
    model = services(tmp_path)
    model.checklists.clear()
    model.problems.clear()
    model.unread.clear()
    running = app(tmp_path, model)
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
        assert "no rig file here" in " ".join(shown.split())
        assert "There is no rig to open." in await after(running, "enter")


async def test_steps_open_at_the_first_open_step_and_enter_goes_on(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
        assert "step 5 of 9" in shown
        assert "FAIL X   3 pass   1 fail   4 open   1 not counted" in shown
        assert "Load factor at opening" in shown
        assert "no limit set" in shown
        assert "step 7 of 9" in await after(running, "enter")


async def test_a_failing_step_shows_number_limit_source_bar_cautions_and_what_would_pass(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "up")
    for part in (
        "29.43 ft/s   FAIL X", "limit at most 28.5 ft/s, house rule 4", "max 28.5 ft/s", "▒", "Would pass with",
        "rigged mass below  2,024 lb  now 2,150 lb", "Caution: table figure, from memory", "V = sqrt(2 m g0/(rho CdS))",
    ):  # fmt: skip
        assert part in shown


async def test_groups_are_stepped_by_left_and_right(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "step 1 of 9" in await after(running, "home")
        assert "Centre of gravity, forward" in await after(running, "right")
        assert "Rigged mass" in await after(running, "left")
        assert "step 9 of 9" in await after(running, "end")


async def test_units_change_all_numbers(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "up")
        shown = await after(running, "u")
        assert "8.97 m/s" in shown
        assert "Shown in SI units." in shown
        assert "29.43 ft/s" in await after(running, "u")


async def test_the_working_is_shown_and_left_again(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "w")
        assert "Working of opening.load_factor" in shown
        assert "line 1 of opening.load_factor in written" in shown
        assert "more lines: page down" in shown
        assert "line 40" in await after(running, "end")
        assert "in si" in await after(running, "u")
        await after(running, "escape")
        assert isinstance(running.screen, StepsScreen)


async def test_panes_are_jumped_to_by_number_and_the_marked_one_takes_the_arrows(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(60, 20)):
        await settled(running)
        await after(running, "up")
        shown = await after(running, "2", "down", "down", "down")
        assert "▸ 2 this step" in shown
        assert "step 4 of 9" in shown
        assert "lines above" in shown
        assert "step 5 of 9" in await after(running, "1", "down")
        assert "there is nothing to answer" in await after(running, "3")


async def test_a_rig_that_cannot_be_read_shows_its_message_on_steps(tmp_path: Path) -> None:
    running = app(tmp_path / "d-broken.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
    assert "This rig can't be read" in shown
    assert "canopy row 1 (main).diameter" in shown


async def test_the_next_rig_is_opened_from_steps_and_escape_leads_to_the_shelf(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "enter")
        shown = await after(running, "n")
        assert "b-bundle" in shown
        await after(running, "escape")
        assert isinstance(running.screen, RigsScreen)


async def test_a_number_under_way_is_never_shown_as_new(tmp_path: Path) -> None:
    model = services(tmp_path)
    gate = threading.Event()
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        await after(running, "up")
        rig = tmp_path / "a-pump.toml"
        slow = tuple(replace(one, value=8.0) if one.key == "descent.rate" else one for one in findings())
        model.checklists[rig] = checklist(rig, findings=slow)
        model.hold = gate.wait
        try:
            running.check([rig])
            for _ in range(20):
                await pilot.pause(0.02)
            shown = text(running)
            assert "calculating" in shown
            assert "29.43" not in shown
            assert "FAIL" not in shown
        finally:
            gate.set()
        shown = await settled(running)
        assert "26.25 ft/s" in shown
        assert "calculating" not in shown


async def test_of_two_results_only_the_one_asked_for_last_counts(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        rig = tmp_path / "a-pump.toml"
        running.check([rig])
        model.checklists[rig] = checklist(rig, name="second edit")
        running.check([rig])
        assert "second edit" in await settled(running)


async def test_a_changed_file_is_noticed_and_the_step_shown_stays(tmp_path: Path) -> None:
    model = services(tmp_path)
    rig = tmp_path / "a-pump.toml"
    running = app(rig, model, watch=0.05)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        await after(running, "up")
        model.checklists[rig] = checklist(rig, name="edited by hand")
        rig.write_text("[rig]\n# edited\n")
        for _ in range(100):
            if "edited by hand" in text(running):
                break
            await pilot.pause(0.05)
        shown = text(running)
        assert "edited by hand" in shown
        assert "step 4 of 9" in shown


async def test_new_and_removed_rigs_of_the_folder_are_noticed(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path, model, watch=0.05)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        added = tmp_path / "aa-new.toml"
        model.checklists[added] = checklist(added, name="brand new")
        del model.checklists[tmp_path / "b-bundle.toml"]
        added.write_text("[rig]\n")
        for _ in range(100):
            if "brand new" in text(running) and "b-bundle" not in text(running):
                break
            await pilot.pause(0.05)
        assert "brand new" in text(running)
        assert "b-bundle" not in text(running)


async def test_a_defect_in_the_model_is_said_and_does_not_end_the_program(tmp_path: Path) -> None:
    model = services(tmp_path)

    def fail() -> None:
        raise ZeroDivisionError("float division by zero")

    model.hold = fail
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
    assert "the program failed here (ZeroDivisionError" in shown


async def test_help_names_the_keys_of_the_screen_it_was_asked_from(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "Keys on Steps" in await after(running, "question_mark")
        assert isinstance(running.screen, HelpScreen)
        await after(running, "question_mark")
        assert isinstance(running.screen, StepsScreen)


async def test_the_palette_runs_a_command_found_by_a_word(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "ctrl+p", *"unit")
        assert isinstance(running.screen, PaletteScreen)
        shown = await after(running, "enter")
        assert isinstance(running.screen, StepsScreen)
        assert "Shown in SI units." in shown


async def test_the_palette_says_when_nothing_matches_and_escape_leaves_it(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "ctrl+p", *"zzz", "enter")
        assert "No command matches" in shown
        await after(running, "escape")
        assert isinstance(running.screen, RigsScreen)


async def test_own_keys_work_and_are_shown(tmp_path: Path) -> None:
    keys = Keys({"steps.working": ("v",), "app.units": ("w",)})
    running = app(tmp_path / "a-pump.toml", services(tmp_path), keys=keys)
    async with running.run_test(size=(80, 24)):
        shown = await settled(running)
        assert "v working" in shown
        assert "Shown in SI units." in await after(running, "w")
        await after(running, "v")
        assert isinstance(running.screen, WorkingScreen)


async def test_a_greeting_is_shown_until_the_next_key(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path), greeting="keys.toml: unknown command; the usual keys hold")
    async with running.run_test(size=(80, 24)):
        assert "keys.toml: unknown command" in await settled(running)
        assert "keys.toml" not in await after(running, "down")


async def test_a_window_too_small_says_so_acts_on_nothing_and_comes_back(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(40, 12)) as pilot:
        shown = await settled(running)
        assert "This window is 40 x 12" in shown
        await after(running, "down", "w")
        assert isinstance(running.screen, StepsScreen)
        await pilot.resize_terminal(80, 24)
        await until(running, "step 5 of 9")
        await pilot.resize_terminal(59, 24)
        await until(running, "rigslate needs 60 x 20")


async def test_ctrl_c_says_how_to_leave_and_ctrl_q_leaves(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        assert "ctrl+q leaves the program" in await after(running, "ctrl+c")
        await pilot.press("ctrl+q")
    assert running.return_value == 0


REACH = {"rigs": (), "steps": ("enter",), "working": ("enter", "w"), "help": ("question_mark",), "palette": ("ctrl+p",)}


@pytest.mark.parametrize("screen", REACH)
async def test_every_key_on_every_screen_keeps_the_program_alive(tmp_path: Path, screen: str) -> None:
    model = services(tmp_path)
    running = app(tmp_path, model)
    every = {key for command in COMMANDS for key in command.keys if command.id != "app.quit"}
    assert {key for command in on_screen(screen) for key in command.keys} - {"ctrl+q"} <= every
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, *REACH[screen])
        for key in sorted(every):
            while len(running.screen_stack) > 1:
                running.pop_screen()
            await press(running, *REACH[screen])
            assert isinstance(running.screen, BaseScreen)
            assert screen == running.screen.KIND
            running.screen.hush()
            await press(running, key)
        await settled(running)
        assert running.is_running


async def test_a_file_that_was_no_rig_is_read_again_when_it_changes(tmp_path: Path) -> None:
    model = services(tmp_path)
    notes = tmp_path / "e-notes.toml"
    notes.write_text("x = 1\n")
    running = app(tmp_path, model, watch=0.05)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        model.checklists[notes] = checklist(notes, name="now a rig")
        del model.unread[notes]
        notes.write_text("[rig]\nx = 1\n")
        for _ in range(100):
            if "now a rig" in text(running):
                break
            await pilot.pause(0.05)
        assert "now a rig" in text(running)
        await after(running, "end", "enter")
        assert isinstance(running.screen, StepsScreen)


async def test_a_record_written_beside_the_rigs_does_not_make_the_folder_be_read_again(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path, model, watch=0.05)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        seen = model.finds
        (tmp_path / "a-pump.record.toml").write_text("format = 1\n")
        await pilot.pause(0.3)
        assert model.finds == seen
        (tmp_path / "f-new.toml").write_text("[rig]\n")
        for _ in range(100):
            if model.finds > seen:
                break
            await pilot.pause(0.05)
        assert model.finds == seen + 1


async def test_no_forbidden_key_acts_anywhere_and_every_binding_has_an_id(tmp_path: Path) -> None:
    running = app(tmp_path, services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        for keys in (*REACH.values(), ("enter", "end", "f", "enter")):
            await back_to_first(running)
            await after(running, *keys)
            for key, active in running.active_bindings.items():
                assert key not in FORBIDDEN
                assert active.binding.id, key


async def test_a_rig_whose_file_is_gone_shows_no_numbers(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path, model, watch=0.05)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        await after(running, "enter", "up")
        del model.checklists[tmp_path / "a-pump.toml"]
        (tmp_path / "a-pump.toml").unlink()
        for _ in range(100):
            if "file is gone" in text(running):
                break
            await pilot.pause(0.05)
        shown = text(running)
        assert "This rig's file is gone" in shown
        assert "29.43" not in shown


async def test_what_was_said_for_want_of_steps_goes_once_the_rig_is_back(tmp_path: Path) -> None:
    model = services(tmp_path)
    rig = tmp_path / "a-pump.toml"
    running = app(tmp_path, model, watch=0.05)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        await after(running, "enter")
        kept = model.checklists.pop(rig)
        rig.unlink()
        for _ in range(100):
            if "file is gone" in text(running):
                break
            await pilot.pause(0.05)
        assert "There are no steps." in await after(running, "enter")
        model.checklists[rig] = kept
        rig.write_text("[rig]\n")
        for _ in range(100):
            if "of 9" in text(running):
                break
            await pilot.pause(0.05)
        shown = text(running)
    assert "of 9" in shown
    assert "There are no steps" not in shown
