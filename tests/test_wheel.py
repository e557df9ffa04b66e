"""The wheel holds everything the program needs and works from any folder."""

from __future__ import annotations

import os
import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

ROOT = Path(__file__).parent.parent
RIG = """format = 1

[rig]
name = "Water tank"

[drop]
date = 2026-09-16
"""


def run(words: list[str], cwd: Path, **environment: str) -> subprocess.CompletedProcess[str]:
    """Run a command with the environment of this process and some changes, output as text."""
    env = {**os.environ, "PYTHONIOENCODING": "utf-8", **environment}
    return subprocess.run(words, cwd=cwd, env=env, capture_output=True, text=True, encoding="utf-8", check=False)


@pytest.fixture(scope="module")
def wheel(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A wheel built from this tree, with no network."""
    folder = tmp_path_factory.mktemp("wheel")
    words = [sys.executable, "-m", "build", "--wheel", "--no-isolation", "--outdir", str(folder), str(ROOT)]
    built = run(words, folder)
    assert built.returncode == 0, built.stderr
    (made,) = folder.glob("*.whl")
    return made


def test_it_holds_the_packages_with_their_data_and_nothing_else(wheel: Path) -> None:
    names = zipfile.ZipFile(wheel).namelist()
    assert {"model/rig/canopies.toml", "tui/styles.tcss", "tui/main.py", "model/checks/checklist.py"} <= set(names)
    modules = {str(path.relative_to(ROOT)) for folder in ("model", "tui") for path in (ROOT / folder).rglob("*.py")}
    assert {name.replace(os.sep, "/") for name in modules} <= set(names)
    assert {name.split("/")[0].split("-")[0] for name in names} == {"model", "tui", "rigslate"}


def test_it_checks_a_rig_from_another_folder(wheel: Path, tmp_path: Path) -> None:
    installed = tmp_path / "installed"
    words = [sys.executable, "-m", "pip", "install", "--quiet", "--no-deps", "--no-index", "--no-compile"]
    done = run([*words, "--target", str(installed), str(wheel)], tmp_path)
    assert done.returncode == 0, done.stderr
    elsewhere = tmp_path / "elsewhere"
    elsewhere.mkdir()
    (elsewhere / "tank.toml").write_text(RIG, encoding="utf-8")
    found = run(
        [sys.executable, "-c", "import model, tui; print(model.__file__)"], elsewhere, PYTHONPATH=str(installed)
    )
    assert Path(found.stdout.strip()).is_relative_to(installed)
    start = "import sys; from tui.main import main; sys.exit(main(sys.argv[1:]))"
    checked = run([sys.executable, "-c", start, "check", "tank.toml"], elsewhere, PYTHONPATH=str(installed))
    assert checked.returncode == 3, checked.stderr
    assert "Water tank" in checked.stdout
    assert "OPEN" in checked.stdout
    assert not checked.stderr
    scripts = [path for path in installed.rglob("rigslate*") if path.parent.name in ("bin", "Scripts")]
    assert scripts
