"""Write the formulas into methods.md: ``python -m docs.make_methods``."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import groupby

from docs.blocks import FOLDER, fill, formulas, unit, write
from model.physics.formula import Formula, Symbol
from model.rig.canopy_table import bands

PAGE = "methods.md"


def _named(symbol: Symbol) -> str:
    return f"{symbol.text} {symbol.meaning} [{unit(symbol.dimension)}]"


def _formula(each: Formula[..., object]) -> str:
    result = each.result.meaning
    lines = [
        f"**{result[0].upper()}{result[1:]}** (`{each.name}`)",
        "",
        f"    {each.text}",
        "",
        f"* Symbols: {'; '.join(_named(symbol) for symbol in (each.result, *each.symbols.values()))}",
    ]
    if each.holds:
        lines.append(f"* Range: {each.holds}")
    if each.leaves_out:
        lines.append(f"* Leaves out: {each.leaves_out}")
    return "\n".join([*lines, f"* Source: {each.source}", "", ""])


def _block(module: str, found: Sequence[Formula[..., object]]) -> tuple[str, str]:
    return module.removeprefix("model."), "".join(_formula(each) for each in found)


def _bands() -> str:
    found = bands()
    return (
        f"* Fill constant: times or divided by {found.fill_constant_factor:g}\n"
        f"* Drag coefficient: ±{found.drag_coefficient_share:.0%}\n"
        f"* Opening force of the motion, with a measured filling time: times or divided by {found.force_factor:g}\n"
        f"* Height lost, likewise: times or divided by {found.height_factor:g}\n"
        f"* Source: {found.source}\n"
    )


def rendered() -> str:
    """The page as it has to be."""
    by_module = groupby(formulas(), key=lambda each: each.__module__)
    blocks = dict(_block(module, list(found)) for module, found in by_module)
    return fill((FOLDER / PAGE).read_text(encoding="utf-8"), {**blocks, "bands": _bands()})


if __name__ == "__main__":
    write(PAGE, rendered)
