"""What only a process of its own shows: closed outputs, other locales, signals."""

import json
import os
import subprocess
import sys
from pathlib import Path

from tests.model.checks.sample import write

ROOT = Path(__file__).parents[3]


def start(*words: object, **options: object) -> subprocess.Popen[bytes]:
    environment = os.environ | {"PYTHONPATH": str(ROOT)} | dict(options.pop("env", {}))  # type: ignore[call-overload]
    command = [sys.executable, "-m", "tui.main", *(str(word) for word in words)]
    return subprocess.Popen(
        command, stdout=options.pop("stdout", subprocess.PIPE), stderr=subprocess.PIPE, env=environment, **options
    )  # type: ignore[call-overload, no-any-return]


def test_a_console_without_the_characters_shows_marks(tmp_path: Path) -> None:
    path = write(tmp_path, lambda raw: raw["rig"].update(name="Pumpe für Große"))
    with start("check", path, env={"PYTHONIOENCODING": "ascii", "LC_ALL": "C"}) as process:
        out, err = process.communicate()
    assert (process.returncode, err) == (0, b"")
    assert out.isascii()
    assert b"Pumpe f?r Gro?e" in out


def test_a_path_that_is_no_text_is_printed_all_the_same(tmp_path: Path) -> None:
    folder = Path(os.fsdecode(os.fsencode(tmp_path) + b"/caf\xe9"))
    try:
        folder.mkdir()
    except OSError:
        folder = tmp_path
    path = write(folder)
    with start("check", "--json", path) as process:
        out, err = process.communicate()
    assert (process.returncode, err) == (0, b"")
    assert json.loads(out)["rigs"][0]["verdict"] == "PASS"


def test_a_closed_output_is_no_traceback(tmp_path: Path) -> None:
    path = write(tmp_path)
    for closing in (">&-", "2>&-", ">&- 2>&-"):
        line = f'"{sys.executable}" -m tui.main check --brief "{path}" {closing}'
        done = subprocess.run(line, shell=True, capture_output=True, cwd=ROOT, check=False)
        assert done.returncode == 0, closing
        assert b"Traceback" not in done.stderr


def test_a_reader_that_goes_away_is_no_traceback(tmp_path: Path) -> None:
    path = write(tmp_path)
    read, written = os.pipe()
    os.close(read)
    with start("check", path, stdout=written) as process:
        os.close(written)
        _, err = process.communicate()
    assert err == b""
    assert process.returncode == 141


def test_a_full_disk_is_said(tmp_path: Path) -> None:
    with Path("/dev/full").open("wb") as full, start("check", write(tmp_path), stdout=full) as process:
        _, err = process.communicate()
    assert process.returncode == 2
    assert b"Traceback" not in err
    assert b"No space left" in err


INTERRUPTED = """
import os, signal, sys
import tui.command_line.check as command
command.check = lambda path: os.kill(os.getpid(), signal.SIGINT)
from tui.main import main
sys.exit(main(["check", sys.argv[1]]))
"""


def test_an_interrupt_ends_with_130(tmp_path: Path) -> None:
    done = subprocess.run(
        [sys.executable, "-c", INTERRUPTED, str(write(tmp_path))], capture_output=True, cwd=ROOT, check=False
    )
    assert (done.returncode, done.stderr) == (130, b"")
