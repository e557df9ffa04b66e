"""`rigslate` without a command: the full screen."""

from __future__ import annotations

import argparse
import os
import sys
from pathlib import Path

from tui.command_line.arguments import UNREADABLE


def run(options: argparse.Namespace) -> int:
    """Open the full screen on a path; returns the exit status."""
    path = Path(options.path) if options.path else Path("rigs") if Path("rigs").is_dir() else Path()
    if not os.path.lexists(path):
        print(f"{path}: no such file", file=sys.stderr)
        return UNREADABLE
    if path.is_dir() and not _holds_toml(path):
        print(f"{path}: no rig file in this folder", file=sys.stderr)
        return UNREADABLE
    from tui.app import run as open_screen

    return open_screen(path)


def _holds_toml(folder: Path) -> bool:
    """Whether there is a file below that might be a rig; whether it is one is told on the screen."""
    for _, below, files in os.walk(folder):
        below[:] = [name for name in below if not name.startswith(".")]
        if any(name.endswith(".toml") for name in files):
            return True
    return False
