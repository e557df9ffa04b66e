"""Write the quantities of all formulas into glossary.md: ``python -m docs.make_glossary``."""

from __future__ import annotations

from dataclasses import dataclass, field

from docs.blocks import FOLDER, fill, formulas, table, unit, write

PAGE = "glossary.md"


@dataclass
class Quantity:
    """One quantity: everything the formulas call it."""

    meaning: str
    symbols: set[str] = field(default_factory=set)
    units: set[str] = field(default_factory=set)
    names: set[str] = field(default_factory=set)
    used: list[str] = field(default_factory=list)


def quantities() -> list[Quantity]:
    """Every quantity of the formulas by its meaning; names are those of arguments, or of the formula that gives it."""
    found: dict[str, Quantity] = {}
    for each in formulas():
        for name, symbol in [*each.symbols.items(), ("", each.result)]:
            one = found.setdefault(symbol.meaning, Quantity(symbol.meaning))
            one.symbols.add(symbol.text)
            one.units.add(unit(symbol.dimension))
            one.names.update([name] if name else [])
            one.used.append(each.name)
    return sorted(found.values(), key=lambda one: one.meaning.casefold())


def rendered() -> str:
    """The page as it has to be."""
    rows = [
        [
            one.meaning,
            ", ".join(f"`{text}`" for text in sorted(one.symbols)),
            ", ".join(sorted(one.units)),
            ", ".join(f"`{name}`" for name in sorted(one.names)),
            ", ".join(f"`{name}`" for name in dict.fromkeys(one.used)),
        ]
        for one in quantities()
    ]
    head = ["quantity", "symbol", "SI unit", "name in code", "formulas"]
    return fill((FOLDER / PAGE).read_text(encoding="utf-8"), {"quantities": table(head, rows)})


if __name__ == "__main__":
    write(PAGE, rendered)
