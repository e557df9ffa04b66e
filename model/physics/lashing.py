"""Lashings: the pull of each row, what the rows hold in five directions, and what kinds hold it.

Coordinates: x forward, y to the left, z up from the deck. A row pulls the load from its load point toward its deck
point, so it holds against motion the other way. Forces in N, lengths in m, angles in rad.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from math import ceil
from typing import Literal, NamedTuple

import numpy as np
from numpy.typing import ArrayLike, NDArray

from model.physics.formula import formula
from model.physics.types import Real

Vector = NDArray[np.float64]
Point = tuple[float, float, float]
Mirror = Literal["", "left-right", "fore-aft"]

DIRECTIONS: Mapping[str, Point] = {
    "forward": (1.0, 0.0, 0.0),
    "aft": (-1.0, 0.0, 0.0),
    "left": (0.0, 1.0, 0.0),
    "right": (0.0, -1.0, 0.0),
    "up": (0.0, 0.0, 1.0),
}
"""Ways a load may move, as unit vectors."""

MIXED_SHARE = 0.1
"""Kinds of lashing are mixed in a direction where more than one holds a larger share of it than this."""

SAME_POINT = 0.01
"""Deck points closer than this, in m, are taken to be one fitting."""

MIRRORED: Mapping[str, Point] = {"left-right": (1.0, -1.0, 1.0), "fore-aft": (-1.0, 1.0, 1.0)}


ANGLED = {
    "pull": "R | pull of the row | force",
    "up_angle": "v | angle over the deck | angle",
    "side_angle": "h | angle in the deck plane away from the direction held | angle",
}


@formula(
    "R = n min(D, F, A)",
    result="R | pull of the row | force",
    symbols={
        "count": "n | lashings in the row | number",
        "device": "D | strength of the device | force",
        "deck_fitting": "F | strength of the deck fitting | force",
        "load_fitting": "A | strength of the fitting on the load | force",
    },
    source="the weakest part counts: common practice, FM 55-450-2, 6-2",
)
def row_pull(count: Real, device: Real, deck_fitting: Real, load_fitting: Real) -> Real:
    """Pull of a row of equal lashings in N."""
    return count * np.minimum(np.minimum(device, deck_fitting), load_fitting)


@formula(
    "P = R x/L",
    result="P | pull along one direction | force",
    symbols={
        "pull": "R | pull of the row | force",
        "reach": "x | run of the lashing along the direction | length",
        "length": "L | length of the lashing | length",
    },
    source="geometry",
)
def component(pull: Real, reach: Real, length: Real) -> Real:
    """Part of a pull in N that acts along one direction, from measured lengths in m."""
    return pull * reach / length


@formula(
    "P = R cos(v) cos(h)",
    result="P | pull along the deck | force",
    symbols=ANGLED,
    source="geometry",
)
def pull_along(pull: Real, up_angle: Real, side_angle: Real) -> Real:
    """Part of a pull in N along the direction held."""
    return pull * np.cos(up_angle) * np.cos(side_angle)


@formula(
    "P = R cos(v) sin(h)",
    result="P | pull across the deck | force",
    symbols=ANGLED,
    source="geometry",
)
def pull_across(pull: Real, up_angle: Real, side_angle: Real) -> Real:
    """Part of a pull in N in the deck plane across the direction held."""
    return pull * np.cos(up_angle) * np.sin(side_angle)


@formula(
    "P = R sin(v)",
    result="P | pull down | force",
    symbols={"pull": "R | pull of the row | force", "up_angle": "v | angle over the deck | angle"},
    source="geometry",
)
def pull_down(pull: Real, up_angle: Real) -> Real:
    """Part of a pull in N that holds the load down."""
    return pull * np.sin(up_angle)


@formula(
    "N = f W",
    result="N | restraint needed | force",
    symbols={"factor": "f | restraint factor | number", "weight": "W | weight of what is lashed | force"},
    source="definition",
)
def restraint_needed(factor: Real, weight: Real) -> Real:
    """Force in N to be held in a direction."""
    return factor * weight


@formula(
    "r = H/(f W)",
    result="r | held over needed | number",
    symbols={
        "held": "H | held against the direction | force",
        "factor": "f | restraint factor | number",
        "weight": "W | weight of what is lashed | force",
    },
    source="definition",
)
def restraint_ratio(held: Real, factor: Real, weight: Real) -> Real:
    """Restraint held over restraint needed."""
    return held / (factor * weight)


def devices_needed(needed: float, each: float) -> int:
    """Fewest lashings that hold a needed force (N), each holding its own part (N, over 0) of it."""
    return ceil(needed / each * (1.0 - 1e-12))


def held_together(strengths: ArrayLike, stiffnesses: ArrayLike) -> float:
    """Force in N that unlike lashings side by side hold when the first of them reaches its strength.

    Args:
        strengths: Strength of each in N, shape (n,).
        stiffnesses: Stiffness of each in N/m, shape (n,); the stiff one takes the load before the others stretch.
    """
    strength = np.asarray(strengths, dtype=np.float64)
    stiffness = np.asarray(stiffnesses, dtype=np.float64)
    return float(stiffness.sum() * (strength / stiffness).min())


@dataclass(frozen=True, eq=False)
class Row:
    """A row of equal lashings: points in m, strengths in N.

    A mirrored row stands for itself and its image on the other side; the image has a ring of its own.
    """

    deck: Point
    load: Point
    count: int
    device: float
    deck_fitting: float
    load_fitting: float
    kind: str = "strap"
    mirror: Mirror = ""
    ring: str = ""

    @property
    def weakest(self) -> str:
        """The part that counts: "device", "deck fitting" or "load fitting"; the first where they are equal."""
        parts = {"device": self.device, "deck fitting": self.deck_fitting, "load fitting": self.load_fitting}
        return min(parts, key=lambda part: parts[part])


class RowPull(NamedTuple):
    """The pull of one row, or of its image.

    Attributes:
        row: Index of the row.
        image: Whether this is the mirrored one.
        kind: Kind of lashing.
        deck: Its deck point in m.
        ring: Ring it hangs on, empty for a fitting of its own.
        fitting: Strength of its deck fitting in N.
        vector: Pull on the load in N, shape (3,), before rings are shared.
        scales: By direction, the share of the pull that its ring lets it use.
    """

    row: int
    image: bool
    kind: str
    deck: Point
    ring: str
    fitting: float
    vector: Vector
    scales: Mapping[str, float]

    def holds(self, direction: str) -> float:
        """Force in N this row holds against motion in a direction; 0 where it pulls the same way."""
        return max(0.0, -float(self.vector @ np.array(DIRECTIONS[direction]))) * self.scales[direction]


class Hold(NamedTuple):
    """What all rows hold.

    Attributes:
        pulls: Every row and image.
        held: By direction, the force held against it in N.
        by_kind: By direction and kind of lashing, the same split up.
        mixed: Directions in which more than one kind holds over a tenth.
        overloaded: Rings whose strength cuts a pull in some direction.
        unnamed_sharing: Pairs of row indices that use one deck point without naming one ring: each then counts the
            fitting's strength in full.
    """

    pulls: tuple[RowPull, ...]
    held: Mapping[str, float]
    by_kind: Mapping[str, Mapping[str, float]]
    mixed: tuple[str, ...]
    overloaded: tuple[str, ...]
    unnamed_sharing: tuple[tuple[int, int], ...]


def hold(rows: Sequence[Row]) -> Hold:
    """Sum what rows of lashings hold against motion in each of five directions.

    A row that pulls with the motion is slack and takes nothing off. The pulls on one ring are scaled down together
    until neither the sum of all of them nor the sum of those that hold against the direction is larger than the ring's
    least fitting. The second sum matters where rows on one ring pull opposite ways: they never do so at one time, so
    the one must not be let off by the other.

    More lashings hold no less in any direction, except on a ring that they overload: there a new row that pulls across
    takes strength from those that pull along.

    Raises:
        ValueError: For a row whose two points are one, or whose count or strengths are not over 0.
    """
    bare = [pull for index, row in enumerate(rows) for pull in _pulls(index, row)]
    scales = _ring_scales(bare)
    pulls = tuple(pull._replace(scales=scales.get(pull.ring, pull.scales)) for pull in bare)
    by_kind: dict[str, dict[str, float]] = {way: defaultdict(float) for way in DIRECTIONS}
    for way in DIRECTIONS:
        for pull in pulls:
            by_kind[way][pull.kind] += pull.holds(way)
    held = {way: sum(kinds.values()) for way, kinds in by_kind.items()}
    mixed = tuple(
        way for way, kinds in by_kind.items() if sum(part > MIXED_SHARE * held[way] for part in kinds.values()) > 1
    )
    overloaded = tuple(ring for ring, by_way in scales.items() if min(by_way.values()) < 1.0)
    return Hold(pulls, held, {way: dict(kinds) for way, kinds in by_kind.items()}, mixed, overloaded, _sharing(pulls))


def _pulls(index: int, row: Row) -> list[RowPull]:
    if row.count < 1 or not all(0.0 < part < np.inf for part in (row.device, row.deck_fitting, row.load_fitting)):
        raise ValueError(f"lashing row {index + 1}: count and strengths must be over 0")
    run = np.subtract(row.deck, row.load)
    length = float(np.linalg.norm(run))
    if not 0.0 < length < np.inf:
        raise ValueError(f"lashing row {index + 1}: deck point and load point are one, or no points")
    vector = run / length * float(row_pull(row.count, row.device, row.deck_fitting, row.load_fitting))
    full = dict.fromkeys(DIRECTIONS, 1.0)
    made = [RowPull(index, False, row.kind, row.deck, row.ring, row.deck_fitting, vector, full)]
    if row.mirror:
        flip = np.array(MIRRORED[row.mirror])
        x, y, z = (flip * row.deck).tolist()
        ring = f"{row.ring} ({row.mirror})" if row.ring else ""
        made.append(RowPull(index, True, row.kind, (x, y, z), ring, row.deck_fitting, vector * flip, full))
    return made


def _ring_scales(pulls: Sequence[RowPull]) -> dict[str, dict[str, float]]:
    rings: dict[str, list[RowPull]] = defaultdict(list)
    for pull in pulls:
        if pull.ring:
            rings[pull.ring].append(pull)
    return {
        ring: {way: _ring_scale(sharing, np.array(unit)) for way, unit in DIRECTIONS.items()}
        for ring, sharing in rings.items()
    }


def _ring_scale(sharing: Sequence[RowPull], way: Vector) -> float:
    vectors = np.array([pull.vector for pull in sharing])
    against = vectors[vectors @ way < 0.0]
    largest = max(float(np.linalg.norm(vectors.sum(axis=0))), float(np.linalg.norm(against.sum(axis=0))))
    strength = min(pull.fitting for pull in sharing)
    # A sum that passes the strength by rounding only is not an overload.
    return strength / largest if largest > strength * (1.0 + 1e-12) else 1.0


def _sharing(pulls: Sequence[RowPull]) -> tuple[tuple[int, int], ...]:
    pairs = set()
    for i, one in enumerate(pulls):
        for other in pulls[i + 1 :]:
            apart = float(np.linalg.norm(np.subtract(one.deck, other.deck)))
            if apart < SAME_POINT and not (one.ring and one.ring == other.ring):
                pairs.add((one.row, other.row))
    return tuple(sorted(pairs))
