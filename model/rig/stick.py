"""The stick file, format 1: several loads released in one pass."""

from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

from model.rig.fields import Format, Length, Name, SpeedOrZero, TimeOrZero
from model.rig.rule import Strict, optional, required, rows
from model.rig.source import Fault, TomlFile, read_toml, refuse_other_kinds
from model.rig.validate import validate


class Separation(Strict):
    """How far apart two loads have to stay."""

    min: Length | None = optional("least distance")
    source: Name = required("where it comes from")


class StickInfo(Strict):
    """The pass."""

    name: Name = required("what it is called")
    release_height: Length | None = optional("above the drop zone; replaces that of the rigs")
    airspeed: SpeedOrZero | None = optional("indicated; replaces that of the rigs")
    separation: Separation | None = optional("the limit on the distance between two loads")


class StickLoad(Strict):
    """One load of the pass."""

    rig: Name = required("path of its rig file, from this file")
    after: TimeOrZero = required("from the first release")


class Stick(Strict):
    """Several loads released in one pass."""

    format: Format = required("1")
    stick: StickInfo = required("the pass")
    load: tuple[StickLoad, ...] = rows("loads in order of release")


@dataclass(frozen=True, eq=False, repr=False)
class StickFile(TomlFile):
    """A stick file that was read without a mistake.

    Attributes:
        stick: the pass.
        rigs: where the rig files of its loads lie, in order of release.
    """

    stick: Stick
    rigs: tuple[Path, ...]


def read_stick(path: Path | str) -> StickFile:
    """Read a stick file; the rig files it names are not opened.

    Raises:
        InputError: with every mistake of the file.
    """
    file = read_toml(Path(path))
    refuse_other_kinds(file, "stick")
    stick = validate(file, Stick, _faults)
    rigs = tuple(file.path.parent / load.rig for load in stick.load)
    return StickFile(file.path, file.text, file.raw, stick, rigs)


def _faults(stick: Stick, lost: frozenset[str]) -> Iterator[Fault]:
    if len(stick.load) < 2 and "load" not in lost:
        found = "one [[load]] row" if stick.load else "no [[load]] row"
        yield Fault(("load",), found, "two or more")
    before = None
    for row, load in enumerate(stick.load):
        if load.after is None:
            continue
        if before is not None and load.after.value < before.value:
            expected = f'no less than the load before it, "{before.text}"'
            yield Fault(("load", row, "after"), f'"{load.after.text}"', expected)
        before = load.after
