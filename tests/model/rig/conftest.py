from pathlib import Path

import pytest

from tests.model.rig import samples


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    """A folder with a full rig and its limit set."""
    (tmp_path / "limits").mkdir()
    (tmp_path / "limits" / "tarn-relief.toml").write_text(samples.LIMITS, encoding="utf-8")
    (tmp_path / "pump.toml").write_text(samples.RIG, encoding="utf-8")
    return tmp_path
