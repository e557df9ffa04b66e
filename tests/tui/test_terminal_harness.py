import os
import re
import sys
import textwrap
import time
from pathlib import Path

import pytest

from tests.tui.emulator import Emulator
from tests.tui.keys import key_bytes
from tests.tui.terminal import Terminal, run_plain


def python(script: str) -> list[str]:
    return [sys.executable, "-c", textwrap.dedent(script)]


ECHO_KEYS = python(
    """
    import os, sys, tty
    tty.setraw(0)
    os.write(1, b"ready\\r\\n")
    while (data := os.read(0, 100)) != b"q":
        os.write(1, data.hex(" ").encode() + b"\\r\\n")
    """
)

SCREEN_APP = python(
    """
    from textual.app import App
    from textual.widgets import Static

    class Small(App):
        CSS = "#b {text-style: bold; color: #ff0000; background: #000080;}"
        BINDINGS = [("x", "more", ""), ("escape", "leave", "")]
        BINDINGS += [("f2", "say('f two')", ""), ("ctrl+right", "say('far')", "")]
        count = 0

        def compose(self):
            yield Static("start ±", id="a")
            yield Static("marked", id="b")
            yield Static("", id="c")

        def action_more(self):
            self.count += 1
            self.query_one("#a").update(f"count {self.count}.")

        def action_say(self, text):
            self.query_one("#a").update(text)

        def action_leave(self):
            self.query_one("#a").update("escaped")

        def on_resize(self, event):
            self.query_one("#c").update(f"size {event.size.width}x{event.size.height}")

    Small().run(mouse=False)
    print("bye")
    """
)


def is_running(process: int) -> bool:
    try:
        os.kill(process, 0)
    except ProcessLookupError:
        return False
    return True


def test_a_full_screen_program_is_driven_by_keys_and_leaves_the_terminal_as_it_was() -> None:
    with Terminal(SCREEN_APP) as terminal:
        assert terminal.wait_for("start ±")[0] == "start ±"
        assert terminal.in_full_screen
        assert not terminal.cooked()
        before = terminal.screen()
        terminal.press("x")
        assert terminal.wait_change(before)[0] == "count 1."
        terminal.press("f2")
        terminal.wait_for("f two")
        terminal.press("ctrl+right")
        terminal.wait_gone("f two")
        assert terminal.screen()[0] == "far"
        terminal.press("ctrl+q")
        assert terminal.wait_exit() == 0
        assert terminal.screen()[0] == "bye"
        assert not terminal.in_full_screen
        assert terminal.cursor_visible
        assert terminal.cooked()
        assert not {1000, 1002, 1003, 1006} & terminal.ever


def test_frames_are_synchronized_because_the_query_is_answered() -> None:
    with Terminal(SCREEN_APP) as terminal:
        terminal.wait_for("start")
        assert b"\x1b[?2026;2$y" in terminal.replies
        terminal.press("x")
        terminal.wait_for("count 1")
        assert 2026 in terminal.ever


def test_an_escape_and_the_key_after_it_stay_two_keys() -> None:
    with Terminal(SCREEN_APP) as terminal:
        terminal.wait_for("start")
        terminal.press("x", "escape", "x")
        terminal.wait_for("count 2")
    with Terminal(ECHO_KEYS) as terminal:
        terminal.wait_for("ready")
        terminal.press("escape", "x")
        terminal.wait_for("78")
        assert terminal.screen()[1:3] == ["1b", "78"]


def test_a_resize_reaches_the_program() -> None:
    with Terminal(SCREEN_APP, columns=70, rows=20) as terminal:
        terminal.wait_for("size 70x20")
        terminal.resize(60, 18)
        terminal.wait_for("size 60x18")
        assert len(terminal.screen()) == 18


def test_cells_carry_their_attributes() -> None:
    with Terminal(SCREEN_APP, env={"COLORTERM": "truecolor"}) as terminal:
        terminal.wait_for("marked")
        assert terminal.find("marked") == (1, 0)
        cells = terminal.style_of("marked")
        assert "".join(cell.char for cell in cells) == "marked"
        assert {(cell.bold, cell.fg, cell.bg) for cell in cells} == {(True, "ff0000", "000080")}
        assert not terminal.cell(0, 0).bold
        with pytest.raises(AssertionError, match="'absent' is not on the screen"):
            terminal.find("absent")


def test_a_held_key_repeats() -> None:
    with Terminal(SCREEN_APP) as terminal:
        terminal.wait_for("start")
        sent = terminal.hold("x", 0.5, rate=20)
        assert sent >= 2
        terminal.wait_for(f"count {sent}.")


def test_text_is_typed_as_it_stands() -> None:
    with Terminal(python("print('heard', ascii(input('say: ')))")) as terminal:
        terminal.wait_for("say:")
        terminal.type("enter ±5 %")
        terminal.press("enter")
        terminal.wait_for("heard 'enter \\xb15 %'")
        assert terminal.wait_exit() == 0


def test_more_input_than_the_kernel_holds_arrives_whole() -> None:
    script = """
    import os, time, tty
    tty.setraw(0)
    os.write(1, b"ready")
    left = 30000
    while left:
        left -= len(os.read(0, left))
    os.write(1, b" all of it")
    """
    with Terminal(python(script)) as terminal:
        terminal.wait_for("ready")
        terminal.send(b"x" * 30000)
        terminal.wait_for("all of it")


def test_a_flood_of_output_does_not_block_the_program() -> None:
    with Terminal(python("print('line\\n' * 20000 + 'last')")) as terminal:
        assert terminal.wait_exit() == 0
        assert terminal.raw.count(b"line") == 20000
        assert "last" in terminal.text()


def test_a_failed_wait_tells_what_was_on_the_screen_and_how_the_program_ended() -> None:
    with Terminal(python("print('something else'); raise SystemExit(3)")) as terminal:
        with pytest.raises(AssertionError, match=r"(?s)'hello' did not appear.*ended with 3.*something else"):
            terminal.wait_for("hello")
        assert terminal.wait_exit() == 3
        with pytest.raises(AssertionError, match="took no input"):
            terminal.press("x")


def test_a_wait_on_a_silent_program_ends_at_its_limit() -> None:
    with Terminal(python("import time; print('here'); time.sleep(600)")) as terminal:
        terminal.wait_for("here")
        with pytest.raises(AssertionError, match="still running"):
            terminal.wait_for("there", timeout=0.1)
        with pytest.raises(AssertionError, match="did not exit"):
            terminal.wait_exit(timeout=0.1)


def test_patterns_and_predicates_are_waited_for() -> None:
    with Terminal(python("print('step 12 of 34')")) as terminal:
        terminal.wait_for(re.compile(r"step \d+ of 34"))
        assert terminal.wait_for(lambda rows: rows[0].endswith("34"))[0] == "step 12 of 34"


def test_the_child_sees_only_the_environment_it_is_given(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("NO_COLOR", "1")
    monkeypatch.setenv("COLUMNS", "33")
    script = "import os; print(*(os.environ.get(n, '-') for n in ('NO_COLOR', 'COLUMNS', 'TERM', 'LC_ALL', 'ADDED')))"
    with Terminal(python(script), term="linux", env={"ADDED": "yes", "LC_ALL": None}) as terminal:
        terminal.wait_exit()
        assert terminal.screen()[0] == "- - linux - yes"
    assert run_plain(python(script), env={"NO_COLOR": ""}).stdout == " - dumb C.UTF-8 -\n"


def test_leaving_ends_the_program_and_what_it_started() -> None:
    script = """
    import signal, subprocess, sys, time
    signal.signal(signal.SIGHUP, signal.SIG_IGN)
    child = subprocess.Popen([sys.executable, "-c", "import time; time.sleep(600)"])
    print("child", child.pid, "end", flush=True)
    time.sleep(600)
    """
    with Terminal(python(script)) as terminal:
        rows = terminal.wait_for("end")
        child = int(rows[0].split()[1])
        home = terminal.home
        assert home.is_dir()
    assert terminal.status == -9
    assert not home.exists()
    deadline = time.monotonic() + 30
    while is_running(child) and Path(f"/proc/{child}/stat").exists() and time.monotonic() < deadline:
        if Path(f"/proc/{child}/stat").read_text().rsplit(")", 1)[1].split()[0] == "Z":
            break
    else:
        assert not is_running(child)


def test_an_interrupt_key_and_a_signal_reach_the_program() -> None:
    waiting = python("import time; print('on', flush=True); time.sleep(600)")
    with Terminal(waiting) as terminal:
        terminal.wait_for("on")
        terminal.press("ctrl+c")
        terminal.wait_for("KeyboardInterrupt")
        assert terminal.wait_exit() in (-2, 130)
    with Terminal(waiting) as terminal:
        terminal.wait_for("on")
        terminal.signal(15)
        assert terminal.wait_exit() == -15


def test_unknown_keys_are_refused_before_anything_is_typed() -> None:
    with Terminal(ECHO_KEYS) as terminal:
        terminal.wait_for("ready")
        with pytest.raises(ValueError, match="no key is called 'entr'"):
            terminal.press("a", "entr")
        terminal.press("b")
        terminal.wait_for("62")
        assert terminal.screen()[1] == "62"


@pytest.mark.parametrize(
    ("key", "data"),
    [
        ("ctrl+q", b"\x11"),
        ("shift+tab", b"\x1b[Z"),
        ("pagedown", b"\x1b[6~"),
        ("alt+x", b"\x1bx"),
        ("ctrl+left", b"\x1b[1;5D"),
        ("f1", b"\x1bOP"),
        ("f12", b"\x1b[24~"),
        ("±", "±".encode()),
    ],
)
def test_keys_are_sent_as_terminals_send_them(key: str, data: bytes) -> None:
    # XTerm Control Sequences, "PC-Style Function Keys"
    assert key_bytes(key) == data


def test_a_run_without_terminal_has_pipes_on_all_streams() -> None:
    script = (
        "import sys; print(*(s.isatty() for s in (sys.stdin, sys.stdout, sys.stderr)), sys.stdin.read()); sys.exit(4)"
    )
    result = run_plain(python(script), input="wörds")
    assert (result.returncode, result.stdout, result.stderr) == (4, "False False False wörds\n", "")


def test_a_command_without_screen_codes_runs_on_a_dumb_terminal() -> None:
    with Terminal(python("import sys; print(sys.stdout.isatty())"), term="dumb") as terminal:
        assert terminal.wait_exit() == 0
        assert terminal.raw == b"True\r\n"


def test_sequences_cut_anywhere_are_read_the_same() -> None:
    text = "a\x1b[?1049h\x1b[31;1mré\x1b[0m\x1b[>1u\x1b[?2026$p\x1bP+q544e\x1b\\\x1b]0;title\x07"
    text += "\x1b[38:2::1:2:3mz\x1b[6n\x1b[<u"
    whole = Emulator(20, 3)
    reply = whole.feed(text.encode())
    single = Emulator(20, 3)
    replies = b"".join(single.feed(bytes([byte])) for byte in text.encode())
    assert whole.rows() == single.rows() == [" réz", "", ""]
    assert reply == replies == b"\x1b[?2026;2$y\x1b[1;5R"
    assert whole.cell(0, 1) == single.cell(0, 1)
    assert (whole.cell(0, 1).fg, whole.cell(0, 1).bold) == ("red", True)
    assert whole.cell(0, 3).fg == "010203"
    assert not whole.kitty


def test_the_normal_screen_comes_back_after_the_full_screen() -> None:
    emulator = Emulator(20, 3)
    emulator.feed(b"before\r\n\x1b[?1049h\x1b[Hinside\r\nmore")
    assert emulator.rows() == ["inside", "more", ""]
    emulator.feed(b"\x1b[?1049lafter")
    assert emulator.rows() == ["before", "after", ""]
    assert emulator.ever == {1049}


def test_wide_characters_take_two_cells() -> None:
    emulator = Emulator(20, 2)
    emulator.feed("高x".encode())
    assert emulator.rows()[0] == "高x"
    assert emulator.find("x") == (0, 2)
