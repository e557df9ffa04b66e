"""Write the keys of the full screen into keys.md from the command list: ``python -m docs.make_keys``."""

from __future__ import annotations

from docs.blocks import FOLDER, fill, table, write
from tui.commands import COMMANDS, Keys

PAGE = "keys.md"


def _commands() -> str:
    keys = Keys()
    rows = [
        [
            keys.all_text(one),
            f"{one.name}: {one.help}",
            ", ".join(one.where),
            f"`{one.id}`" + (" (fixed)" if one.fixed else ""),
        ]
        for one in COMMANDS
    ]
    return table(["key", "what it does", "screens", "id"], rows)


def rendered() -> str:
    """The page as it has to be."""
    return fill((FOLDER / PAGE).read_text(encoding="utf-8"), {"commands": _commands()})


if __name__ == "__main__":
    write(PAGE, rendered)
