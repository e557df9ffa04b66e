"""The one entry point: full screen without a command, plain text with one."""

from __future__ import annotations

import gc
import os
import sys
from collections.abc import Sequence
from contextlib import suppress

UNREADABLE, INTERRUPTED, PIPE_CLOSED = 2, 130, 141


def main(arguments: Sequence[str] | None = None) -> int:
    """Run rigslate and return its exit status."""
    words = list(sys.argv[1:] if arguments is None else arguments)
    # The models take no plugins; looking for them would cost more than writing an entry.
    os.environ.setdefault("PYDANTIC_DISABLE_PLUGINS", "__all__")
    # Every system of equations here is small: starting threads for the linear algebra costs more than it gives.
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
    _plain_streams()
    try:
        status = _run(words)
        sys.stdout.flush()
    except KeyboardInterrupt:
        return INTERRUPTED
    except BrokenPipeError:
        _drop_output()
        return PIPE_CLOSED
    except OSError as error:
        print(f"rigslate: {error.filename or 'output'}: {error.strerror or error}", file=sys.stderr)
        _drop_output()
        return UNREADABLE
    return status


def _drop_output() -> None:
    """Nobody takes the output any more; what Python still holds must not be written at exit."""
    with suppress(OSError, ValueError, AttributeError):
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())


def _run(words: list[str]) -> int:
    # Within reach of the handlers of `main`, so that an interrupt while modules load ends quietly too.
    from tui.command_line.arguments import COMMANDS, parse

    if words and words[0] in COMMANDS:
        options = parse(words)
        # What modules create stays for good: looking through it for garbage, now or later, takes a cold check longer.
        gc.disable()
        try:
            module = __import__(f"tui.command_line.{options.command}", fromlist=["run"])
        finally:
            gc.freeze()
            gc.enable()
        status: int = module.run(options)
        return status
    from tui.command_line.screen import run

    return run(parse(["screen", *words]))


def _plain_streams() -> None:
    """A console that lacks a character shows a mark in its place; an output that is closed takes everything."""
    if sys.stdout is None:
        sys.stdout = open(os.devnull, "w", encoding="utf-8")  # noqa: SIM115
    if sys.stderr is None:
        sys.stderr = open(os.devnull, "w", encoding="utf-8")  # noqa: SIM115
    for stream in (sys.stdout, sys.stderr):
        reconfigure = getattr(stream, "reconfigure", None)
        if reconfigure is not None:
            reconfigure(errors="replace")


if __name__ == "__main__":
    sys.exit(main())
