"""The opening screen and files: changed, hostile and new ones; and numbers that are on their way."""

import re
from pathlib import Path
from threading import Event

import pytest

from model.quantity import UnitSystem
from tests.tui.fakes import after, press, settled, text
from tests.tui.opening_rigs import WARM, copied, on_opening, opening, running_on, shown
from tui.openings import Changes, Openings, Shot, Start


class Held:
    """The real model, which waits until it may go on."""

    def __init__(self, real: Openings) -> None:
        self.real, self.go, self.asked = real, Event(), list[float]()

    def open(self, rig: Path, system: UnitSystem) -> Start:
        return self.real.open(rig, system)

    def shot(self, start: Start, changes: Changes, system: UnitSystem) -> Shot:
        if changes:
            self.asked += changes.values()
            assert self.go.wait(20)
        return self.real.shot(start, changes, system)

    def write(self, start: Start, changes: Changes, path: Path) -> None:
        self.real.write(start, changes, path)


async def test_hostile_names_stay_text(tmp_path: Path) -> None:
    rig = copied(
        tmp_path, WARM,
        ('name = "Borehole pump, plateau"', f'name = "[/red][s] é\u0301\u0301\u0301 漢字 [N] {"long " * 30}on"'),
        ('name = "front left"', 'name = "[/][bold]漢字漢字漢字漢字 left"'),
    )  # fmt: skip
    running = running_on(rig)
    async with running.run_test(size=(60, 20)):
        screen = await on_opening(running, "end")
        assert "[/red][s]" in screen
        assert "line 20 of 20" in screen
        await press(running, "escape")
        assert "[/][bold]" in await after(running, "h")


async def test_a_rig_that_cannot_be_read_says_why(tmp_path: Path) -> None:
    rig = copied(tmp_path)
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        rig.write_text("format = 1\n[rig\n", encoding="utf-8")
        screen = await after(running, "o")
        assert "This rig can't be read" in screen
        assert "05-pump-warm.toml:2:notTOML" in re.sub(r"\s", "", screen)
        assert "No input can be moved." in await after(running, "right")
        assert "Nothing is moved" in await after(running, "k")


async def test_a_changed_file_puts_moved_inputs_back_and_an_equal_one_does_not(tmp_path: Path) -> None:
    rig = copied(tmp_path)
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "right")
        running.check([rig])
        assert "1 moved" in await settled(running)
        rig.write_text(rig.read_text(encoding="utf-8").replace('"130 kt', '"125 kt'), encoding="utf-8")
        running.check([rig])
        screen = await settled(running)
        assert "the moved inputs are put back" in screen
        assert "1 moved" not in screen
        assert "125 kt" in screen


async def test_the_moved_rig_goes_to_a_new_file_with_its_comments(tmp_path: Path) -> None:
    rig = copied(tmp_path)
    before = rig.read_text(encoding="utf-8")
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "down", "right", "k")
        assert "new rig file: 05-pump-warm-moved.toml" in text(running)
        screen = shown(await after(running, "enter"))
        assert "Written to the new file" in screen
        assert "05-pump-warm.toml is as it was" in screen
        assert "new rig file:" not in screen
    written = (tmp_path / "05-pump-warm-moved.toml").read_text(encoding="utf-8")
    assert rig.read_text(encoding="utf-8") == before
    changed = [(old, new) for old, new in zip(before.splitlines(), written.splitlines(), strict=True) if old != new]
    assert len(changed) == 1
    assert changed[0][0].startswith('airspeed = "130 kt')
    assert changed[0][1].startswith('airspeed = "131 kt')


async def test_no_file_is_ever_written_over(tmp_path: Path) -> None:
    rig = copied(tmp_path)
    before = rig.read_text(encoding="utf-8")
    other = tmp_path / "05-pump-warm-moved.toml"
    other.write_text("mine", encoding="utf-8")
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "right", "k")
        screen = shown(await after(running, "enter"))
        assert "NOT WRITTEN: there is a file 05-pump-warm-moved.toml already" in screen
        assert "new rig file:" in screen
        field = running.screen.query_one("#field")
        for name, words in (
            (rig.name, "NOT WRITTEN: there is a file 05-pump-warm.toml already"),
            ("no such folder/a.toml", "NOT WRITTEN: No such file or directory"),
            ("", "A file needs a name."),
            ("a.record.toml", "kept for records"),
        ):
            field.value = name  # type: ignore[attr-defined]
            assert words in shown(await after(running, "enter"))
        screen = await after(running, "escape")
        assert "Dropped; nothing was written." in screen
        assert "new rig file:" not in screen
    assert other.read_text(encoding="utf-8") == "mine"
    assert rig.read_text(encoding="utf-8") == before
    assert sorted(path.name for path in tmp_path.iterdir()) == ["05-pump-warm-moved.toml", rig.name, "limits"]


async def test_a_typed_name_is_no_command(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await on_opening(running, "right", "k")
        running.screen.query_one("#field").value = ""  # type: ignore[attr-defined]
        await press(running, "z", "0", "g", "u", "enter")
        await settled(running)
    assert (tmp_path / "z0gu.toml").exists()


async def test_while_numbers_are_on_their_way_the_screen_says_so(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await on_opening(running)
        screen = opening(running)
        numbers = Held(screen._openings)
        screen._openings = numbers
        await press(running, "right", "right")
        assert "calculating" in text(running).splitlines()[0]
        assert "2,124 lb" in text(running)
        assert "peak 15,846 lbf" in text(running)
        await press(running, "right", "space", "g", "g", "g")
        assert "line 2 of 20" in text(running)
        numbers.go.set()
        done = shown(await settled(running))
        assert "calculating" not in done
        assert "2,144 lb moved" in done
        assert "peak 16,298 lbf" in done
        assert numbers.asked[-1] == pytest.approx(2144 * 0.45359237)
        assert len(numbers.asked) == 2
