"""The program in a pseudo-terminal, on rigs of the demo scenario."""

import re
import shutil
import signal
import sys
import tomllib
from pathlib import Path

import pytest

from tests.tui.terminal import RIGSLATE, Terminal, run_plain
from tui.glyphs import width

DEMO = Path(__file__).parents[2] / "rigs"
WARM = "05-pump-warm.toml"

FIELD = re.compile(r"([a-z][a-z ,']*):( |$)")


def field(rows: list[str]) -> str | None:
    """The question of the field above the footer, None while there is no field."""
    found = FIELD.match(rows[-2])
    return found[1] if found else None


@pytest.fixture
def rigs(tmp_path: Path) -> Path:
    """A copy of the demo rigs without their records."""
    folder = tmp_path / "rigs"
    shutil.copytree(DEMO, folder)
    for record in folder.glob("*.record.toml"):
        record.unlink()
    return folder


def entries(rig: Path) -> list[dict[str, object]]:
    record = rig.with_name(rig.name.replace(".toml", ".record.toml"))
    return tomllib.loads(record.read_text(encoding="utf-8"))["entry"] if record.exists() else []


def test_the_folder_is_shown_a_rig_opened_and_the_program_left(rigs: Path) -> None:
    with Terminal([*RIGSLATE, str(rigs)]) as terminal:
        terminal.wait_for("enter open")
        terminal.wait_for("-5.0 % descent.rate")
        assert terminal.in_full_screen
        assert not {1000, 1002, 1003, 1006} & terminal.ever, "the mouse stays with the terminal"
        terminal.press("down", "down", "down", "down", "enter")
        terminal.wait_for("Tarn relief, low velocity")
        terminal.wait_for("step 1 of")
        terminal.press("escape")
        terminal.wait_for("enter open")
        terminal.press("ctrl+q")
        assert terminal.wait_exit() == 0
        assert terminal.cooked()
        assert not terminal.in_full_screen


def test_an_inspection_is_answered_and_found_again_after_a_kill(rigs: Path) -> None:
    rig = rigs / WARM
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("p pass   f fail")
        terminal.press("p")
        terminal.wait_for("Chosen: pass")
        assert entries(rig) == []
        terminal.press("enter")
        terminal.wait_for("your initials:")
        terminal.type("AM")
        terminal.press("enter")
        terminal.wait_for("Written to the record")
        terminal.kill()
    [entry] = entries(rig)
    assert (entry["kind"], entry["answer"], entry["who"]) == ("answer", "pass", "AM")
    assert {"key", "when", "version", "on", "digest"} <= entry.keys()
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("not inspected yet")
        terminal.wait_for("step 9 of")
        terminal.press("home")
        terminal.wait_for("pass, by AM")


def test_all_open_inspections_of_a_rig_are_answered_by_keys(rigs: Path) -> None:
    rig, limits = rigs / WARM, rigs / "limits" / "tarn-low.toml"
    head, *asked_for = limits.read_text(encoding="utf-8").split("[[inspection]]")
    limits.write_text("[[inspection]]".join([head, *asked_for[:7]]), encoding="utf-8")
    written = 0
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("p pass   f fail")
        while "not inspected yet" in terminal.text():
            shown = terminal.wait_for("p pass   f fail")
            two = any("two persons" in line for line in shown)
            step = next(line.split("step ")[1] for line in shown if " of " in line and "step " in line)
            terminal.press("p" if written != 1 else "f")
            terminal.wait_for("Chosen:")
            # Enter opened this step a moment ago; a second one within 0.3 s would count as its repeat.
            terminal.settle(0.35)
            terminal.press("enter")
            while "Written to the record" not in terminal.text():
                terminal.wait_for(lambda rows: field(rows) is not None or "Written" in "".join(rows))
                asked = field(terminal.screen())
                if asked is not None:
                    terminal.type("RB" if "second" in asked else "AM" if "initials" in asked else "three 3")
                    terminal.press("enter")
                    terminal.wait_for(lambda rows, asked=asked: field(rows) != asked)
            terminal.wait_for("Written to the record")
            written += 1
            assert len(entries(rig)) == written
            assert ("second" in entries(rig)[-1]) == two
            terminal.wait_gone("calculating")
            before = step
            terminal.settle(0.35)
            terminal.press("enter")
            terminal.wait_for(
                lambda rows, before=before: not any(f"step {before}" in row for row in rows)
                or any("open" in row and "No step" in row for row in rows)
            )
            terminal.wait_gone("Written to the record")
    assert written == 7
    assert any("value" in entry for entry in entries(rig))
    assert any("second" in entry for entry in entries(rig))
    assert entries(rig)[1]["answer"] == "fail"
    assert entries(rig)[1]["remark"] == "three 3"
    done = run_plain([*RIGSLATE, "check", "--json", str(rig)])
    assert "not inspected yet" not in done.stdout
    assert done.returncode == 1


def test_a_held_key_writes_one_answer(rigs: Path) -> None:
    rig = rigs / WARM
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("p pass   f fail")
        terminal.hold("p", 0.6)
        terminal.wait_for("Chosen: pass")
        terminal.press("enter")
        terminal.wait_for("your initials:")
        terminal.type("AM")
        terminal.hold("enter", 1.0)
        terminal.wait_for("Written to the record")
        terminal.settle()
        assert "Written to the record" in terminal.text()
    assert len(entries(rig)) == 1


def test_a_folder_that_cannot_be_written_to_is_said(rigs: Path) -> None:
    rig = rigs / WARM
    # A folder in the record's place stops the writing whoever runs the test.
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("p pass   f fail")
        terminal.press("p", "enter")
        terminal.wait_for("your initials:")
        terminal.type("AM")
        (rigs / "05-pump-warm.record.toml").mkdir()
        terminal.press("enter")
        terminal.wait_for("NOT WRITTEN")
        assert "Written to the record" not in terminal.text()


def test_an_edit_on_disk_is_noticed(rigs: Path) -> None:
    rig = rigs / WARM
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("step 1 of")
        text = rig.read_text(encoding="utf-8")
        rig.write_text(text.replace("format = 1", "format = 1\nfromat = 2", 1), encoding="utf-8")
        terminal.wait_for("This rig can't be read")
        assert "fromat" in terminal.text()
        rig.write_text(text, encoding="utf-8")
        terminal.wait_for("p pass   f fail")


@pytest.mark.parametrize(("columns", "rows"), [(80, 24), (60, 20)])
def test_the_linux_console_gets_ascii_alone(rigs: Path, columns: int, rows: int) -> None:
    with Terminal([*RIGSLATE, str(rigs)], columns=columns, rows=rows, term="linux") as terminal:
        terminal.wait_for("-5.0 %")
        terminal.press("n")
        for keys in (("enter",), ("down",) * 6, ("w",), ("escape",), ("?",)):
            before = terminal.screen()
            terminal.press(*keys)
            terminal.wait_change(before)
            terminal.settle()
            assert terminal.text().isascii()
        assert terminal.raw.isascii()


def test_a_locale_that_is_not_utf8_gets_ascii(rigs: Path) -> None:
    with Terminal([*RIGSLATE, str(rigs)], encoding_locale="C") as terminal:
        terminal.wait_for("-5.0 %")
        assert terminal.text().isascii()
        terminal.press("c")
        terminal.wait_for("Full glyphs")
        assert not terminal.text().isascii()


def test_no_color_sends_no_colour_and_stays_readable(rigs: Path) -> None:
    with Terminal([*RIGSLATE, str(rigs / WARM)], env={"NO_COLOR": "1"}) as terminal:
        terminal.wait_for("step 1 of")
        terminal.settle()
        for row, line in enumerate(terminal.screen()):
            for column in range(len(line)):
                cell = terminal.cell(row, column)
                assert (cell.fg, cell.bg) == ("default", "default")
        assert all(cell.reverse for cell in terminal.style_of("FAIL"))


def test_sixty_by_twenty_shows_the_step_and_the_help_key(rigs: Path) -> None:
    with Terminal([*RIGSLATE, str(rigs / WARM)], columns=60, rows=20) as terminal:
        terminal.wait_for("step 1 of")
        terminal.wait_for("? keys")
        assert all(width(line) <= 60 for line in terminal.screen())
        terminal.resize(50, 15)
        terminal.wait_for("rigslate needs 60 x 20")
        terminal.resize(100, 30)
        terminal.wait_for("p pass   f fail")


def test_a_dumb_terminal_is_refused_with_the_plain_commands() -> None:
    with Terminal([*RIGSLATE, str(DEMO)], term="dumb") as terminal:
        assert terminal.wait_exit() == 2
        assert "rigslate check PATH" in terminal.text()
        assert 1049 not in terminal.ever


def test_without_a_terminal_there_is_a_hint_and_status_two() -> None:
    done = run_plain([*RIGSLATE, str(DEMO)])
    assert done.returncode == 2
    assert done.stdout == ""
    assert "needs a terminal" in done.stderr
    assert len(done.stderr.strip().splitlines()) == 1


def test_own_keys_are_read_and_a_bad_file_changes_nothing(rigs: Path, tmp_path: Path) -> None:
    folder = tmp_path / "config" / "rigslate"
    folder.mkdir(parents=True)
    environment = {"XDG_CONFIG_HOME": str(tmp_path / "config")}
    (folder / "keys.toml").write_text('[keys]\n"steps.working" = "v"\n')
    with Terminal([*RIGSLATE, str(rigs / WARM)], env=environment) as terminal:
        terminal.wait_for("v working")
    (folder / "keys.toml").write_text('[keys]\n"steps.working" = "ctrl+b"\n')
    with Terminal([*RIGSLATE, str(rigs / WARM)], env=environment) as terminal:
        terminal.wait_for("ctrl+b can't be used")
        terminal.wait_for("w working")


@pytest.mark.parametrize("number", [signal.SIGTERM, signal.SIGHUP])
def test_a_program_ended_from_outside_leaves_every_answer_in_place(rigs: Path, number: signal.Signals) -> None:
    rig = rigs / WARM
    with Terminal([*RIGSLATE, str(rig)]) as terminal:
        terminal.wait_for("p pass   f fail")
        terminal.press("p", "enter")
        terminal.wait_for("your initials:")
        terminal.type("AM")
        terminal.press("enter")
        terminal.wait_for("Written to the record")
        terminal.signal(number)
        terminal.wait_exit()
    assert len(entries(rig)) == 1


def test_the_first_screen_loads_neither_scipy_nor_numpy() -> None:
    code = (
        "import sys; import tui.app, tui.screens.rigs, tui.screens.steps, tui.model_services;"
        "print([name for name in ('numpy', 'scipy', 'pydantic', 'tomllib') if name in sys.modules])"
    )
    done = run_plain([sys.executable, "-c", code])
    assert done.stdout.strip() == "[]", done.stderr
