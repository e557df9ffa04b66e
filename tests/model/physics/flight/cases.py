"""Drops that the engine is held against."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from model.physics.flight import Drop, Filling, Row
from model.physics.flight.inputs import change_values

from .reference import isa

RIGS = {
    1: Drop(100, 30.87, 200, 0.6, (Row((Filling(31.4, 58.4),), line_stretch=1.5),), isa),
    2: Drop(1000, 66.88, 400, 3.0, (Row((Filling(233, 156),), line_stretch=2.0),), isa),
    3: Drop(
        5000, 66.88, 600, 10.0,
        (Row((Filling(72.8, 40, 1.0), Filling(1455.7, 120, 3.0, cutter=2.5)), line_stretch=3.0),), isa,
    ),
    6: Drop(500, 70, 500, 1.0, (Row((Filling(11.81, 76, 1.0),), line_stretch=1.5),), isa),
}
"""Four rigs for which an independent solution is known (tests/published/test_motion.py)."""

DROGUE = Row((Filling(12.0, 60.0, 1.0, 1.05),), line_stretch=1.2)
MAIN = Row((Filling(233.0, 156.0, 2.0, 1.7),), opens_after=9.0, deployment_time=1.5)
REEFED = Row(
    (Filling(15.0, 40.0, 1.0), Filling(233.0, 120.0, 3.0, 1.3, cutter=3.0)), opens_at_height=700.0, deployment_time=0.8
)


def cloud(drop: Drop, size: int, seed: int, spread: float = 0.05) -> Drop:
    """The drop with every number scattered uniformly by so much, but the heights of release, ground and wind."""
    draw = np.random.default_rng(seed)
    scattered = change_values(drop, lambda v: v * (1 + spread * draw.uniform(-1, 1, size)))
    winds = tuple((height, wind) for (height, _), (_, wind) in zip(drop.winds, scattered.winds, strict=True))
    return replace(
        scattered, release_height=drop.release_height, ground_altitude=drop.ground_altitude, winds=winds
    )


def torture(exponent: float, size: int, seed: int) -> Drop:
    """Very unlike cases: 50 to 5,000 N/m2, 25 to 130 m/s, 250 to 8,000 m, fills of 1 to 7 s, for one exponent."""
    draw = np.random.default_rng(seed)
    mass = np.exp(draw.uniform(np.log(50), np.log(10000), size))
    loading = np.exp(draw.uniform(np.log(50), np.log(5000), size))
    fill = Filling(mass * 9.80665 / loading, draw.choice([60.0, 156.0, 400.0], size), exponent)
    row = Row((fill,), line_stretch=draw.uniform(0.5, 3, size))
    height = np.exp(draw.uniform(np.log(250), np.log(8000), size))
    return Drop(mass, draw.uniform(25, 130, size), height, mass * draw.uniform(1e-3, 6e-3, size), (row,), isa)


def rows(drop: Drop, *rows: Row, **changes: object) -> Drop:
    """The drop with other rows and other changes."""
    return replace(drop, rows=rows, **changes)      # type: ignore[arg-type]


def features() -> Iterator[tuple[str, Drop]]:
    """One drop for each thing that the engine has to handle."""
    two = RIGS[2]
    stretch = two.rows[0]
    static = replace(stretch, line_stretch=None, static_line=18.0)
    wind = ((0.0, 4.0), (120.0, 9.0), (330.0, 7.0), (390.0, 15.0))
    stages = (Filling(30, 40, 1.0), Filling(200, 60, 1.5, cutter=3.0), Filling(1455.7, 120, 3.0, 1.2, cutter=6.0))
    yield "cutter before the end of filling", rows(RIGS[3], Row(
        (Filling(72.8, 120, 1.0), Filling(1455.7, 120, 3.0, cutter=0.9)), line_stretch=3.0))
    yield "three stages", rows(RIGS[3], Row(stages, line_stretch=3.0), release_height=1200)
    yield "measured filling time", rows(two, Row((replace(stretch.fillings[0], filling_time=1.8),), line_stretch=2.0))
    for leaves in ("stays", "goes at start", "goes at line stretch"):
        drogue = replace(DROGUE, when_next_opens=leaves)
        yield f"drogue {leaves}, main at a time", rows(two, drogue, MAIN, release_height=1500)
        yield f"drogue {leaves}, reefed main at a height", rows(two, drogue, REEFED, release_height=1500)
    slow = replace(DROGUE, fillings=(Filling(60.0, 300.0, 2.0),))
    at_height = replace(MAIN, opens_after=None, opens_at_height=350.0)
    for leaves in ("stays", "goes at start", "goes at line stretch"):
        yield f"main at a height while the drogue fills, which {leaves}", rows(
            two, replace(slow, when_next_opens=leaves), replace(at_height, deployment_time=0.9))
    yield "main at a time while the drogue fills", rows(two, slow, replace(MAIN, opens_after=1.9, deployment_time=0.4))
    yield "main at a height already passed", rows(
        two, replace(slow, when_next_opens="goes at line stretch"),
        replace(at_height, opens_at_height=500.0, deployment_time=0.7))
    yield "main before the drogue's cutter", rows(
        two, replace(DROGUE, fillings=(*DROGUE.fillings, Filling(40.0, 30.0, cutter=20.0))), MAIN, release_height=1500)
    yield "three rows", rows(
        two, replace(DROGUE, when_next_opens="goes at line stretch"),
        replace(MAIN, fillings=(Filling(40.0, 90.0, 1.0),), opens_after=6.0),
        replace(MAIN, opens_after=None, opens_at_height=500.0), release_height=1500)
    yield "static line", rows(two, static)
    yield "static line, wind in layers", rows(two, static, winds=wind)
    yield "wind in layers", replace(two, winds=wind)
    yield "strong headwind shear", replace(two, winds=((0.0, -4.0), (400.0, -16.0)))
    yield "wind that all but jumps", replace(
        two, winds=((0.0, 4.0), (80.0, 4.0), (80.1, 12.0), (370.0, 12.0), (370.2, 3.0)))
    yield "constant wind", replace(two, winds=((0.0, 8.0),))
    yield "drogue and main, wind in layers, high ground", rows(
        two, DROGUE, REEFED, release_height=1500, ground_altitude=1640.0,
        winds=((0.0, 4.0), (500.0, 9.0), (900.0, 2.0)))
    yield "hot day, thin air", replace(two, density=lambda z: isa(z, 25.0, 98000.0), density_factor=0.97)
    yield "across 11 km", replace(two, release_height=1060, ground_altitude=10000)
    yield "from 12 km", replace(two, release_height=12000)
    yield "lands while filling", replace(two, release_height=60)
    yield "lands in free fall", replace(two, release_height=15)
    yield "lands before the main opens", rows(two, DROGUE, replace(MAIN, opens_after=60.0))
    yield "lands while the main is deployed", rows(two, DROGUE, replace(at_height, opens_at_height=30.0))
    yield "hover", replace(two, airspeed=0.0)
    yield "long free fall of a light load", rows(two, replace(stretch, line_stretch=14.0), mass=80, release_height=1500)
