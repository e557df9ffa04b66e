"""`rigslate` without a command: the full screen."""

from __future__ import annotations

import argparse
from pathlib import Path


def run(options: argparse.Namespace) -> int:
    """Open the full screen on a path; returns the exit status."""
    from tui.app import run as open_screen

    path = Path(options.path) if options.path else Path("rigs") if Path("rigs").is_dir() else Path()
    return open_screen(path)
