"""The load path and the working on the screen."""

import re
from pathlib import Path

from model.checks.checklist import check
from model.study.load_path import load_path, weakest
from tests.tui.fakes import after, settled
from tests.tui.opening_rigs import HALF, TWO_ROWS, WARM, copied, running_on


async def test_every_part_stands_with_load_strength_and_factor_and_the_weakest_is_named(tmp_path: Path) -> None:
    for name in (WARM, TWO_ROWS):
        rig = copied(tmp_path, name)
        parts = load_path(check(rig).details)
        least = weakest(parts)
        assert least is not None
        running = running_on(rig)
        async with running.run_test(size=(80, 50)):
            await settled(running)
            screen = await after(running, "h")
            for part in parts:
                assert part.name in screen
            words = [line for line in screen.splitlines() if line.endswith("weakest")]
            assert len(words) == 1
            assert least.name in words[0]
            assert f"weakest of the parts known: {least.name}" in screen
            assert "riggers go first" in screen
            metric = await after(running, "u")
            assert "lbf" not in metric
            assert "kN" in metric


async def test_the_load_path_scrolls_and_fits_small_screens(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path, TWO_ROWS))
    async with running.run_test(size=(60, 20)):
        await settled(running)
        seen = await after(running, "h")
        for _ in range(4):
            assert all(len(line) <= 60 for line in seen.splitlines())
            seen += "\n" + await after(running, "pagedown")
        assert re.search(r"one line of canopy row 2 \(main\)\n +0\.917 kN +2\.45 kN +2\.672  weakest", seen)
        assert "…" not in re.sub(r"… \d+ (more )?lines", "", seen)


async def test_parts_without_data_say_what_is_missing(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path, HALF))
    async with running.run_test(size=(80, 40)):
        await settled(running)
        screen = await after(running, "h")
        assert "OPEN  data missing" in screen
        assert "lines lack data" in screen


async def test_a_rig_that_cannot_be_read_has_no_load_path(tmp_path: Path) -> None:
    rig = copied(tmp_path)
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "h")
        rig.write_text("format = 1\n", encoding="utf-8")
        running.check([rig])
        screen = await settled(running)
        assert "lbf" not in screen
        assert "rig" in screen
        assert "load path" not in screen


async def test_a_working_stands_under_its_result_with_limit_verdict_and_source(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        listed = [finding.key for finding in check(copied(tmp_path)).findings]
        await after(running, *["down"] * listed.index("descent.rate"), "w")
        screen = await settled(running)
        assert "Rate of descent at the drop zone" in screen
        assert re.search(r"29\.39 ft/s   FAIL X   short by 5\.0 %", screen)
        assert "limit at most 28 ft/s, house rule 4" in screen
        last = await after(running, "end")
        assert "V = sqrt(2 m g0/(rho CdS))" in last
        assert "source: Knacke" in last
        assert "leaves out: glide" in last
        assert "m/s   FAIL" in await after(running, "home", "u")


async def test_an_inspected_step_has_no_working_and_says_so(tmp_path: Path) -> None:
    running = running_on(copied(tmp_path))
    async with running.run_test(size=(80, 24)):
        await settled(running)
        assert "An inspected step has no working" in await after(running, "w")


async def test_a_step_without_a_number_says_what_is_missing(tmp_path: Path) -> None:
    rig = copied(tmp_path, HALF)
    found = check(rig).findings
    key = next(number for number, one in enumerate(found) if one.inspection is None and one.result is None)
    running = running_on(rig)
    async with running.run_test(size=(80, 24)):
        await settled(running)
        await after(running, "home")
        assert "There is no number to work out" in await after(running, *["down"] * key, "w")
