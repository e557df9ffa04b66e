"""What may be typed after `rigslate`."""

from __future__ import annotations

import argparse
from collections.abc import Sequence

COMMANDS = ("check", "working", "report")
UNITS = ("written", "si", "us")
UNREADABLE = 2
"""Exit status of a wrong call and of input that cannot be read."""
WIDTH = 78
EPILOG = """exit status: 0 PASS, 1 FAIL, 3 OPEN, 2 input that cannot be read or a wrong call, 130 interrupted
without a command: full screen on a rig file or a folder
A computed check is an estimate: local rules, the technical manual and licensed riggers go before it."""


def parse(words: Sequence[str]) -> argparse.Namespace:
    """Read the words of a call; ends the program with status 2 where they are wrong."""
    return _screen().parse_args(words[1:]) if words[0] == "screen" else _commands().parse_args(words)


def _screen() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="rigslate",
        description="Checks the rigging of an airdrop load.",
        epilog=f"commands: {', '.join(COMMANDS)}; 'rigslate COMMAND --help' tells more\n{EPILOG}",
        formatter_class=_formatter,
        allow_abbrev=False,
    )
    parser.add_argument("--version", action=_Version)
    parser.add_argument(
        "path", nargs="?", type=_path, metavar="PATH",
        help="a rig file or a folder (default: rigs/ here, else this folder)",
    )  # fmt: skip
    parser.set_defaults(command="screen")
    return parser


def _path(word: str) -> str:
    """A path as typed. An empty one, from a variable that is not set, would mean the folder one stands in."""
    if not word:
        raise argparse.ArgumentTypeError("an empty path")
    return word


class _Version(argparse.Action):
    """Prints the version; looked up only when asked for, since the look-up is slow."""

    def __init__(self, option_strings: Sequence[str], dest: str) -> None:
        super().__init__(option_strings, dest, nargs=0, help="print the version and leave")

    def __call__(self, parser: argparse.ArgumentParser, *_: object) -> None:
        from importlib.metadata import version

        parser.exit(0, f"rigslate {version('rigslate')}\n")


def _formatter(prog: str) -> argparse.RawDescriptionHelpFormatter:
    """Help as wide as all other text: measuring the terminal, which every option would do, loads three packers."""
    return argparse.RawDescriptionHelpFormatter(prog, width=WIDTH)


def _commands() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="rigslate", formatter_class=_formatter, allow_abbrev=False)
    commands = parser.add_subparsers(dest="command", required=True)
    check = _command(commands, "check", "check every rig file at or below each PATH")
    check.add_argument("paths", nargs="+", type=_path, metavar="PATH", help="a rig file or a folder")
    form = check.add_mutually_exclusive_group()
    form.add_argument("--json", action="store_true", help="print one JSON object")
    form.add_argument("--brief", action="store_true", help="print one line a rig")
    form.add_argument("--ask", action="store_true", help="ask the open inspections of one RIG line by line")
    check.add_argument("--computed", action="store_true", help="leave the inspected steps out")
    _units(check)
    working = _command(commands, "working", "print the lines behind one step")
    working.add_argument("rig", type=_path, metavar="RIG", help="a rig file")
    working.add_argument("key", metavar="KEY", help="a step key, as 'rigslate check' prints it, or load-path")
    _units(working)
    report = _command(commands, "report", "report on one rig or on every rig in a folder")
    report.add_argument("path", type=_path, metavar="PATH", help="a rig file or a folder")
    report.add_argument(
        "-o", dest="output", type=_path, metavar="FILE",
        help="where to: FILE.txt, .md or .html (default: text, printed)",
    )  # fmt: skip
    report.add_argument("--working", action="store_true", help="add the lines behind every computed step")
    _units(report)
    return parser


def _command(
    commands: argparse._SubParsersAction[argparse.ArgumentParser], name: str, help_: str
) -> argparse.ArgumentParser:
    return commands.add_parser(
        name, help=help_, description=help_.capitalize() + ".", epilog=EPILOG, allow_abbrev=False,
        formatter_class=_formatter,
    )  # fmt: skip


def _units(parser: argparse.ArgumentParser) -> None:
    parser.add_argument("--units", choices=UNITS, default="written", help="units shown (default: as written)")
