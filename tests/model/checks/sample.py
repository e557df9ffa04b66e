"""A full rig with round SI numbers and a limit for every computed step; tests change it table by table."""

from __future__ import annotations

import tomllib
from collections.abc import Callable
from pathlib import Path
from typing import Any

import tomli_w

from model.checks.checklist import check
from model.checks.finding import Checklist, Finding

Raw = dict[str, Any]
Edit = Callable[[Raw], None]
G0 = 9.80665

RIG = """
format = 1
limits = "limits.toml"
[rig]
name = "Round numbers"
[drop]
date = 2026-09-16
release_height = "500 m"
airspeed = "60 m/s"
zone_elevation = "0 m"
surface_wind = "4 m/s"
[exit]
method = "gravity"
canopy_pulled_by = "static line"
static_line = "5 m"
load_drag_area = "2 m2"
[platform]
mass = "100 kg"
length = "2 m"
width = "1 m"
height = "1 m"
depth = "0.1 m"
centre = ["0 m", "0 m", "-0.05 m"]
weighed = "900 kg"
[[item]]
name = "crate"
mass = "600 kg"
centre = ["0 m", "0 m", "0.5 m"]
fragility = "50 g"
[[item]]
name = "tools"
mass = "100 kg"
centre = ["0.9 m", "-0.3 m", "0.2 m"]
[[canopy]]
role = "main"
type = "flat circular"
count = 1
diameter = "20 m"
line_length = "16 m"
riser_length = "1 m"
mass = "100 kg"
centre = ["0 m", "0 m", "1 m"]
drag_coefficient = 0.8
opening_coefficient = 1.7
fill_constant = 8
growth_exponent = 2
rated_mass = ["200 kg", "1,000 kg"]
rated_speed = "75 m/s"
strength = "150 kN"
snatch_speed = "20 m/s"
[canopy.lines]
count = 64
strength = "2.5 kN"
stretch = 0.3
[[pack]]
row = 1
serial = "A-1"
made = 2020-03-16
packed = 2026-08-16
[suspension]
apex = ["0 m", "0 m", "3 m"]
legs_carrying = 2
[[leg]]
name = "front left"
at = ["0.8 m", "0.4 m", "0.2 m"]
strength = "40 kN"
plies = 2
joint_efficiency = 0.8
attachment = "60 kN"
[[leg]]
name = "front right"
at = ["0.8 m", "-0.4 m", "0.2 m"]
strength = "40 kN"
plies = 2
joint_efficiency = 0.8
attachment = "60 kN"
[[leg]]
name = "rear left"
at = ["-0.8 m", "0.4 m", "0.2 m"]
strength = "40 kN"
plies = 2
joint_efficiency = 0.8
attachment = "60 kN"
[[leg]]
name = "rear right"
at = ["-0.8 m", "-0.4 m", "0.2 m"]
strength = "40 kN"
plies = 2
joint_efficiency = 0.8
attachment = "60 kN"
[[link]]
name = "clevis"
strength = "150 kN"
carries = "all"
abreast = 1
[[cushion]]
name = "pad"
at = ["0.1 m", "0 m"]
layers = 3
layer_thickness = "0.1 m"
area = "0.5 m2"
crush_stress = "300 kPa"
usable_strain = 0.7
lies = "under the platform"
[[lashing]]
name = "forward pair"
count = 2
mirror = "left-right"
deck = ["-0.9 m", "0.4 m", "0 m"]
load = ["0.3 m", "0.4 m", "0.9 m"]
device = "20 kN"
deck_fitting = "40 kN"
load_fitting = "30 kN"
kind = "strap"
[[lashing]]
name = "aft pair"
count = 2
mirror = "left-right"
deck = ["0.9 m", "0.4 m", "0 m"]
load = ["-0.3 m", "0.2 m", "0.9 m"]
device = "20 kN"
deck_fitting = "40 kN"
load_fitting = "30 kN"
kind = "strap"
[[tie]]
name = "bag tie"
strands = 2
strand_strength = "400 N"
strand_strength_most = "500 N"
knot_efficiency = 0.6
holds_at_least = "300 N"
breaks_by = "1,200 N"
[[device]]
name = "release"
kind = "ground release"
serial = "GR-1"
expires = 2027-03-01
arms_after = "15 s"
"""

LIMITS = """
format = 1
[set]
name = "Test limits"
[limits]
"load.mass" = { max = "1,000 kg", source = "rule 1" }
"load.weighed" = { min = -0.05, max = 0.05, source = "rule 1" }
"load.base_loading" = { min = "1 kPa", max = "10 kPa", source = "rule 1" }
"load.height" = { max = "2 m", source = "rule 1" }
"load.width" = { max = "2 m", source = "rule 1" }
"load.length" = { max = "3 m", source = "rule 1" }
"balance.forward" = { min = "-0.2 m", max = "0.2 m", source = "rule 2" }
"balance.side" = { min = "-0.1 m", max = "0.1 m", source = "rule 2" }
"balance.slenderness" = { max = 1.2, source = "rule 2" }
"descent.rate" = { max = "9 m/s", source = "rule 3" }
"descent.rate_one_out" = { max = "20 m/s", source = "rule 3" }
"descent.time" = { max = "100 s", source = "rule 3" }
"descent.drift" = { min = "-600 m", max = "1,200 m", source = "rule 3" }
"opening.load_factor" = { max = "20 g", source = "rule 4" }
"opening.canopy" = { min = 1.0, source = "rule 4" }
"opening.speed" = { max = "80 m/s", source = "rule 4" }
"opening.snatch" = { min = 1.0, source = "rule 4" }
"opening.line" = { min = 1.0, source = "rule 4" }
"height.opening_loss" = { max = "400 m", source = "rule 5" }
"height.reserve" = { min = "50 m", source = "rule 5" }
"suspension.leg" = { min = 1.0, source = "rule 6" }
"suspension.attachment" = { min = 1.0, source = "rule 6" }
"suspension.link" = { min = 1.0, source = "rule 6" }
"suspension.leg_angle" = { min = "40 deg", source = "rule 6" }
"suspension.tilt" = { max = "10 deg", source = "rule 6" }
"landing.deceleration" = { max = "30 g", source = "rule 7" }
"landing.fragility" = { min = 1.0, source = "rule 7" }
"landing.crush_reserve" = { min = 1.0, source = "rule 7" }
"landing.centre" = { max = "0.2 m", source = "rule 7" }
"landing.speed_across" = { max = "8 m/s", source = "rule 7" }
"landing.overturn" = { min = 0.2, source = "rule 7" }
"extraction.ratio" = { min = 0.5, max = 3, source = "rule 8" }
"extraction.line" = { min = 1.5, source = "rule 8" }
"extraction.attachment" = { min = 1.5, source = "rule 8" }
"lashing.forward" = { min = 1.0, source = "rule 9" }
"lashing.aft" = { min = 1.0, source = "rule 9" }
"lashing.left" = { min = 0.0, source = "rule 9" }
"lashing.right" = { min = 0.0, source = "rule 9" }
"lashing.up" = { min = 1.0, source = "rule 9" }
"device.early" = { min = 1.1, source = "rule 10" }
"device.late" = { min = 1.2, source = "rule 10" }
"device.expires" = { min = "0 d", source = "rule 10" }
"service.repack" = { max = "120 d", source = "rule 11" }
"service.age" = { max = "12 yr", source = "rule 11" }
[restraint]
forward = 3.0
aft = 1.5
left = 1.5
right = 1.5
up = 2.0
source = "rule 9"
"""


def nothing(_: Raw) -> None:
    """Leave the sample as it is."""


def write(folder: Path, edit: Edit = nothing, limits: Edit = nothing) -> Path:
    """The sample with changes, as files in a folder."""
    rig_raw, limits_raw = tomllib.loads(RIG), tomllib.loads(LIMITS)
    edit(rig_raw)
    limits(limits_raw)
    (folder / "limits.toml").write_text(tomli_w.dumps(limits_raw), "utf-8")
    path = folder / "rig.toml"
    path.write_text(tomli_w.dumps(rig_raw), "utf-8")
    return path


def checklist(folder: Path, edit: Edit = nothing, limits: Edit = nothing) -> Checklist:
    """The sample with changes, checked."""
    return check(write(folder, edit, limits))


def findings(folder: Path, edit: Edit = nothing, limits: Edit = nothing) -> dict[str, Finding]:
    """Findings of the changed sample by key."""
    return {one.key: one for one in checklist(folder, edit, limits).findings}


def drogue_first(raw: Raw, leaves: str = "goes at line stretch") -> None:
    """Put a drogue before the main, which then opens after 3 s."""
    raw["canopy"].insert(0, {
        "role": "drogue", "type": "conical ribbon", "count": 1, "diameter": "3 m", "line_length": "4 m",
        "mass": "10 kg", "centre": ["0 m", "0 m", "1 m"], "drag_coefficient": 0.5, "opening_coefficient": 1.05,
        "fill_constant": 14, "growth_exponent": 1, "strength": "60 kN", "rated_speed": "100 m/s",
        "snatch_speed": "20 m/s", "lines": {"count": 20, "strength": "4 kN", "stretch": 0.25},
        "when_next_opens": leaves,
    })  # fmt: skip
    raw["canopy"][1] |= {"opens_after": "3 s", "deployment_time": "1 s"}
    raw["pack"][0]["row"] = 2
    raw["pack"].append({"row": 1, "serial": "D-1", "made": raw["pack"][0]["made"], "packed": raw["pack"][0]["packed"]})
    raw["platform"]["weighed"] = "910 kg"


def extracted(raw: Raw) -> None:
    """Draw the load out by an extraction parachute that does not stay."""
    raw["exit"] |= {"method": "extraction", "line_stretch": "2 s"}
    raw["exit"]["extraction"] = {
        "type": "ringslot", "count": 1, "diameter": "5 m", "drag_coefficient": 0.6, "opening_coefficient": 1.05,
        "mass": "20 kg", "stays": False, "line_strength": "80 kN", "attachment": "60 kN",
    }  # fmt: skip
    raw["platform"]["weighed"] = "920 kg"
