"""What a start loads: a check of one rig and the first screen leave out what they do not need."""

import subprocess
import sys
from pathlib import Path

import pytest

from tests.model.checks.sample import write

ROOT = Path(__file__).parents[1]
MODEL = sorted(
    ".".join(path.relative_to(ROOT).with_suffix("").parts)
    for path in (ROOT / "model").rglob("*.py")
    if path.name != "__init__.py"
)
LOADED = "\nimport sys\nprint(*sorted(sys.modules), file=sys.stderr)"


def loaded(code: str, *words: str) -> set[str]:
    """Names of all modules that a fresh process has loaded after running ``code``."""
    done = subprocess.run(
        [sys.executable, "-c", code + LOADED, *words], capture_output=True, text=True, cwd=ROOT, check=True
    )
    return set(done.stderr.split())


def test_the_model_loads_no_screen() -> None:
    found = loaded("\n".join(f"import {name}" for name in MODEL))
    assert len(MODEL) > 50
    assert not found & {"textual", "rich", "tui"}
    assert "scipy" not in found


@pytest.mark.parametrize("words", [["check"], ["check", "--json"], ["check", "--brief"]])
def test_a_check_loads_neither_screen_nor_what_writes_files(tmp_path: Path, words: list[str]) -> None:
    found = loaded("import sys\nfrom tui.main import main\nmain(sys.argv[1:])", *words, str(write(tmp_path)))
    assert {"pydantic", "numpy", "model"} <= found
    assert not found & {"scipy", "textual", "rich", "tomlkit", "tomli_w", "asyncio", "html"}
    # The search for plugins, packers that argparse loads to measure a terminal, what only a mistake needs.
    assert not found & {"pydantic.plugin._loader", "importlib.metadata", "email", "shutil", "difflib"}


@pytest.mark.parametrize("words", [["check"], ["check", "--brief"], ["check", "--computed"]])
def test_a_rig_without_a_record_loads_nothing_of_records(tmp_path: Path, words: list[str]) -> None:
    found = loaded("import sys\nfrom tui.main import main\nmain(sys.argv[1:])", *words, str(write(tmp_path)))
    assert "model.rig.standing" in found
    assert not found & {"model.rig.record", "model.rig.entry", "model.rig.whole", "json", "tempfile"}


def test_the_first_screen_loads_neither_engine_nor_numbers() -> None:
    found = loaded("import tui.app")
    assert "textual" in found
    assert not found & {"scipy", "numpy", "tomlkit", "tomli_w"}


def test_asking_for_help_loads_no_model() -> None:
    code = "from tui.main import main\ntry:\n    main(['check', '--help'])\nexcept SystemExit:\n    pass"
    assert not loaded(code) & {"pydantic", "numpy", "textual", "model"}


@pytest.mark.parametrize(("own", "expected"), [(None, "1"), ("3", "3")])
def test_the_linear_algebra_gets_one_thread_unless_somebody_asked_for_more(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, own: str | None, expected: str
) -> None:
    monkeypatch.delenv("OPENBLAS_NUM_THREADS", raising=False)
    if own is not None:
        monkeypatch.setenv("OPENBLAS_NUM_THREADS", own)
    code = "import os, sys\nfrom tui.main import main\nmain(sys.argv[1:])\nprint(os.environ['OPENBLAS_NUM_THREADS'])"
    command = [sys.executable, "-c", code, "check", "--brief", str(write(tmp_path))]
    done = subprocess.run(command, capture_output=True, text=True, cwd=ROOT, check=True)
    assert done.stdout.splitlines()[-1] == expected
