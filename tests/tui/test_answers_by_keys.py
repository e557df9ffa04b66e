"""Inspected steps answered by keys: the rules made for gloves."""

from collections.abc import Iterator
from pathlib import Path

from textual import events
from textual.widgets import Input

from tests.tui.fakes import MORNING, after, app, press, services, settled, until
from tui.app import RigslateApp

TIES = ("down", "down")
"""From the first open step to the inspection of the bag ties."""


async def test_a_pass_takes_a_key_enter_and_the_fields_asked_for(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, *TIES)
        for part in ("Bag closing ties", "Caution: Nylon in place of cotton", "p pass   f fail   x does not apply",
                     "not inspected yet", "No answer yet."):  # fmt: skip
            assert part in shown
        assert "Chosen: pass. Enter goes on" in await after(running, "p")
        assert model.entries == []
        assert "turns:" in await after(running, "enter")
        assert "your initials:" in await after(running, "3", "enter")
        shown = await after(running, *"AM", "enter")
    assert "Written to the record: 'pass', by AM." in shown
    assert "pass, 3, by AM, 2026-09-14 08:30 +0000" in shown
    [(rig, draft, when)] = model.entries
    assert rig.name == "a-pump.toml"
    assert (draft.key, draft.choice, draft.value, draft.who) == ("canopy.bag_ties", "pass", "3", "AM")
    assert when == MORNING


async def answered_ties(running: RigslateApp) -> str:
    return await after(running, *TIES, "p", "enter", "3", "enter", *"AM", "enter")


async def test_the_next_step_opens_only_on_the_next_key(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await answered_ties(running)
        assert "step 7 of 9" in shown
        assert "enter opens the next step" in shown
        assert "step 8 of 9" in await after(running, "enter")


async def test_an_answer_key_after_writing_opens_the_next_step_and_answers_nothing(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await answered_ties(running)
        shown = await after(running, "p")
        assert "step 8 of 9" in shown
        assert "Chosen" not in shown
        assert len(model.entries) == 1


async def test_two_persons_are_asked_for_and_must_differ(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, *TIES, "down", "p", "enter", *"AM", "enter")
        shown = await after(running, *"am", "enter")
        assert "The second person must be somebody else." in shown
        assert model.entries == []
        shown = await after(running, "backspace", "backspace", *"RB", "enter")
    assert "by AM and RB" in shown
    assert (model.entries[0][1].who, model.entries[0][1].second) == ("AM", "RB")


async def test_fail_asks_for_a_remark_and_takes_no_empty_one(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "end", "f", "enter")
        assert "remark, why:" in shown
        assert "Remark, why: needed, nothing was typed." in await after(running, "enter")
        await after(running, *"slack", "enter", *"AM", "enter")
    assert model.entries[0][1].remark == "slack"
    assert model.entries[0][1].choice == "fail"


async def test_escape_drops_a_chosen_answer_and_writes_nothing(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "end", "p", "enter", "escape")
        assert "Dropped; nothing was written." in shown
        assert "step 9 of 9" in shown
    assert model.entries == []


async def test_arrows_do_not_lose_a_half_typed_answer(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "end", "f", "enter", *"sla", "up")
        assert "An answer is chosen" in shown
        assert "step 9 of 9" in shown
        await after(running, *"ck", "enter", *"AM", "enter")
    assert model.entries[0][1].remark == "slack"


async def test_an_answer_is_taken_back_by_a_new_entry(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "end", "p", "enter", *"AM", "enter")
        shown = await after(running, "t", "enter", *"wrong rig", "enter")
        assert "taken back" in shown
        assert "No answer yet." in shown
    assert [entry[1].choice for entry in model.entries] == ["pass", "withdrawal"]
    assert model.entries[1][1].remark == "wrong rig"
    assert model.entries[1][1].who == "AM"


async def test_nothing_can_be_taken_back_where_nothing_was_answered(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "There is no answer to take back." in await after(running, "end", "t")


async def test_a_computed_step_takes_no_answer(tmp_path: Path) -> None:
    running = app(tmp_path / "a-pump.toml", services(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "it takes no answer" in await after(running, "p")


async def test_an_answer_that_cannot_be_written_is_said_kept_and_tried_again(tmp_path: Path) -> None:
    model = services(tmp_path)
    model.refuse = "No space left on device (a-pump.record.toml)"
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "end", "f", "enter", *"slack", "enter", *"AM", "enter")
        assert "NOT WRITTEN: No space left on device" in shown
        assert "Written to the record" not in shown
        assert "OPEN o" in shown
        model.refuse = ""
        shown = await after(running, "enter")
        assert "Written to the record: 'fail', by AM." in shown
    assert model.entries[0][1].remark == "slack"


async def test_an_answer_on_a_rig_that_changed_meanwhile_is_refused(tmp_path: Path) -> None:
    model = services(tmp_path)
    rig = tmp_path / "a-pump.toml"
    running = app(rig, model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "end", "p", "enter", *"AM")
        rig.write_text("[rig]\n# edited meanwhile\n")
        shown = await after(running, "enter")
        assert "NOT WRITTEN" in shown
        assert "changed on disk" in shown
    assert model.entries == []


async def test_initials_are_kept_for_the_next_answer_and_can_be_changed(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await answered_ties(running)
        shown = await after(running, "end", "p")
        assert "Chosen: pass, as AM. Enter writes it" in shown
        await after(running, "i", "enter", *"QX", "enter")
    assert [entry[1].who for entry in model.entries] == ["AM", "QX"]


def stuck_clock(running: RigslateApp, moments: Iterator[float]) -> None:
    """Give the next keys these moments."""

    def moment(_: events.Key) -> float:
        return next(moments)

    running._moment = moment


async def test_a_held_enter_neither_answers_nor_skips(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await answered_ties(running)
        await after(running, "end", "p")
        stuck_clock(running, iter([1e6, 1e6 + 0.1, 1e6 + 0.2, 1e6 + 0.3]))
        shown = await after(running, "enter", "enter", "enter", "enter")
        assert "step 9 of 9" in shown
        assert "Written to the record" in shown
    assert len(model.entries) == 2


async def test_a_held_answer_key_chooses_once_and_opens_nothing(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "end")
        stuck_clock(running, iter([1e6, 1e6 + 0.1, 1e6 + 0.2]))
        shown = await after(running, "f", "f", "f")
        assert "Chosen: fail" in shown
    assert model.entries == []


async def test_a_field_left_by_tab_keeps_its_text_and_no_letter_replaces_the_answer(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        shown = await after(running, "end", "f", "enter", *"sla", "tab", "p")
        assert "Tab leads back to it" in shown
        await after(running, "3", *"ck", "enter", *"AM", "enter")
    assert (model.entries[0][1].choice, model.entries[0][1].remark) == ("fail", "slack")


async def test_a_window_made_too_small_and_large_again_keeps_the_field(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        await after(running, "end", "f", "enter", *"sla")
        await pilot.resize_terminal(40, 10)
        assert "remark" not in await until(running, "rigslate needs 60 x 20")
        await pilot.resize_terminal(80, 24)
        await until(running, "remark, why: sla")
        await after(running, *"ck", "enter", *"AM", "enter")
    assert model.entries[0][1].remark == "slack"


async def test_enter_beside_a_field_left_by_tab_leads_back_to_what_was_typed(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "remark, why: sla" in await after(running, "end", "f", "enter", *"sla", "tab", "enter")
        await after(running, *"ck", "enter", *"AM", "enter")
    assert model.entries[0][1].remark == "slack"


async def test_a_field_takes_nothing_while_the_window_is_too_small_to_show_it(tmp_path: Path) -> None:
    model = services(tmp_path)
    running = app(tmp_path / "a-pump.toml", model)
    async with running.run_test(size=(80, 24)) as pilot:
        await settled(running)
        await after(running, "end", "f", "enter", *"sla")
        await pilot.resize_terminal(40, 10)
        await until(running, "rigslate needs 60 x 20")
        field = running.screen.query_one(Input)
        # The terminal may be quicker than the screen's hiding of the field.
        running.screen.set_focus(field)
        field.focus()
        await press(running, "q", "backspace", "enter")
        field.post_message(events.Paste("pasted"))
        await press(running, "z")
        await pilot.resize_terminal(80, 24)
        assert "remark, why: sla" in await until(running, "remark, why:")
        assert field.value == "sla"
    assert model.entries == []
