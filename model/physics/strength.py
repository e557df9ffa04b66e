"""Strength of the load path against what each part carries: legs, links, lines, snatch, design factor, ties.

Forces in N, masses in kg, lengths in m, speeds in m/s, angles in rad.
"""

from __future__ import annotations

import numpy as np

from model.physics.formula import CONSTANTS, formula
from model.physics.types import Real

INFLATED_RADIUS = 0.35
"""Radius of an inflated round canopy over its nominal diameter."""


@formula(
    "S = s n u",
    result="S | strength of the leg | force",
    symbols={
        "strength": "s | strength of one thickness of the web | force",
        "plies": "n | thicknesses side by side | number",
        "joint_efficiency": "u | strength left at the worst end | number",
    },
    source="common practice, no source",
)
def leg_strength(strength: Real, plies: Real, joint_efficiency: Real) -> Real:
    """Strength of a leg in N. An endless sling of n loops has 2 n thicknesses."""
    return strength * plies * joint_efficiency


@formula(
    "S = s a",
    result="S | strength of the parts abreast | force",
    symbols={"strength": "s | strength of one part | force", "abreast": "a | parts side by side | number"},
    source="definition",
    leaves_out="uneven sharing between the parts",
)
def link_strength(strength: Real, abreast: Real) -> Real:
    """Strength in N of equal parts that share a load side by side."""
    return strength * abreast


@formula(
    "r = S/P",
    result="r | strength over load | number",
    symbols={"strength": "S | strength of the part | force", "load": "P | load of the part | force"},
    source="definition",
)
def strength_ratio(strength: Real, load: Real) -> Real:
    """Strength over load: a limit on it is the user's own factor of safety."""
    return strength / load


@formula(
    "P = F u/N",
    result="P | load of the worst canopy | force",
    symbols={
        "force": "F | force of all canopies of the row | force",
        "count": "N | canopies of the row | number",
        "uneven_share": "u | worst canopy's load over the even share | number",
    },
    source="definition",
)
def canopy_load(force: Real, count: Real, uneven_share: Real) -> Real:
    """Force in N on the worst canopy of a row."""
    return force * uneven_share / count


@formula(
    "P = max(F u/N, F_s)",
    result="P | load of a part that carries one canopy | force",
    symbols={
        "force": "F | opening force of all canopies | force",
        "count": "N | canopies of the row | number",
        "uneven_share": "u | worst canopy's load over the even share | number",
        "snatch": "F_s | snatch force of one canopy | force",
    },
    source="definition",
)
def one_canopy_load(force: Real, count: Real, uneven_share: Real, snatch: Real) -> Real:
    """Load in N of a part that carries one canopy: its opening force or its snatch, whichever is larger."""
    return np.maximum(force * uneven_share / count, snatch)


@formula(
    "phi = asin(0.35 D0/l)",
    result="phi | half cone angle of the lines | angle",
    symbols={"diameter": "D0 | nominal diameter | length", "line_length": "l | line length | length"},
    source="geometry, with an inflated radius of 0.35 D0 (from memory of Knacke, NWC TP 6575, ch. 5)",
    holds="lines longer than 0.35 D0",
    leaves_out="reefing, which keeps the mouth smaller; risers, which lengthen the cone",
)
def line_angle(diameter: Real, line_length: Real) -> Real:
    """Angle in rad of the lines to the canopy's axis; nan where the lines are too short to reach the skirt."""
    sine = INFLATED_RADIUS * diameter / line_length
    return np.arcsin(np.where(sine < 1.0, sine, np.nan))


@formula(
    "P = F u/(N Z cos(phi))",
    result="P | load of one line | force",
    symbols={
        "force": "F | force of all canopies of the row | force",
        "count": "N | canopies of the row | number",
        "uneven_share": "u | worst canopy's load over the even share | number",
        "lines": "Z | lines of one canopy | number",
        "angle": "phi | half cone angle of the lines | angle",
    },
    source="statics",
    leaves_out="uneven sharing between the lines of one canopy",
)
def line_load(force: Real, count: Real, uneven_share: Real, lines: Real, angle: Real) -> Real:
    """Load in N of each line of the worst canopy."""
    return force * uneven_share / (count * lines * np.cos(angle))


@formula(
    "S = Z s",
    result="S | strength of all lines of one canopy | force",
    symbols={"lines": "Z | lines of one canopy | number", "strength": "s | strength of one line | force"},
    source="definition",
)
def lines_strength(lines: Real, strength: Real) -> Real:
    """Strength in N of all lines of one canopy together."""
    return lines * strength


@formula(
    "k = Z s/(x L)",
    result="k | stiffness of all members together | N/m",
    symbols={
        "members": "Z | members side by side | number",
        "strength": "s | strength of one | force",
        "stretch": "x | stretch at break over its length | number",
        "length": "L | length | length",
    },
    source="definition",
    holds="a stretch in proportion to the load up to the break",
)
def stretch_stiffness(members: Real, strength: Real, stretch: Real, length: Real) -> Real:
    """Stiffness in N/m of lines, straps or chains side by side, from their stretch at break."""
    return members * strength / (stretch * length)


@formula(
    "m_r = m_c m_L/(m_c + m_L)",
    result="m_r | reduced mass | mass",
    symbols={
        "canopy_mass": "m_c | mass of one canopy | mass",
        "load_mass": "m_L | suspended mass for each canopy | mass",
    },
    source="mechanics of two bodies",
)
def reduced_mass(canopy_mass: Real, load_mass: Real) -> Real:
    """Mass in kg that counts where two bodies on a spring run apart."""
    return canopy_mass * load_mass / (canopy_mass + load_mass)


@formula(
    "F_s = v sqrt(k m_r)",
    result="F_s | snatch force | force",
    symbols={
        "speed": "v | load against canopy at line stretch | speed",
        "stiffness": "k | stiffness of all lines of one canopy | N/m",
        "mass": "m_r | reduced mass of canopy and load | mass",
    },
    source="energy balance of two bodies on a spring; the form of the parachute handbooks (ASD-TR-61-579, from memory)",
    leaves_out="the mass of the lines, their damping, drag while they stretch, a canopy that comes out in parts",
)
def snatch_force(speed: Real, stiffness: Real, mass: Real) -> Real:
    """Snatch force of one canopy in N."""
    return speed * np.sqrt(stiffness * mass)


@formula(
    "s = v sqrt(m_r/k)",
    result="s | stretch of the lines at the snatch | length",
    symbols={
        "speed": "v | load against canopy at line stretch | speed",
        "stiffness": "k | stiffness of all lines of one canopy | N/m",
        "mass": "m_r | reduced mass of canopy and load | mass",
    },
    source="energy balance of two bodies on a spring",
)
def snatch_stretch(speed: Real, stiffness: Real, mass: Real) -> Real:
    """Stretch of the lines in m at the snatch force."""
    return speed * np.sqrt(mass / stiffness)


@formula(
    "DF = S_f c/(u e o k)",
    result="DF | design factor | number",
    symbols={
        "safety": "S_f | safety factor | number",
        "convergence": "c | line convergence and asymmetry | number",
        "joint": "u | strength left at the joint | number",
        "abrasion": "e | strength left by abrasion | number",
        "moisture": "o | strength left by moisture | number",
        "fatigue": "k | strength left by fatigue | number",
    },
    source="Knacke, NWC TP 6575, ch. 6, from memory",
)
def design_factor(safety: Real, convergence: Real, joint: Real, abrasion: Real, moisture: Real, fatigue: Real) -> Real:
    """Factor by which the strength of a textile part must exceed its load."""
    return safety * convergence / (joint * abrasion * moisture * fatigue)


@formula(
    "S = F DF/n",
    result="S | strength each member needs | force",
    symbols={
        "force": "F | largest force | force",
        "design": "DF | design factor | number",
        "members": "n | members that share it | number",
    },
    source="Knacke, NWC TP 6575, ch. 6, from memory",
)
def required_strength(force: Real, design: Real, members: Real) -> Real:
    """Strength in N that each of several equal members needs."""
    return force * design / members


@formula(
    "MS = S/(F DF) - 1",
    result="MS | margin of safety | number",
    symbols={
        "strength": "S | strength of the part | force",
        "force": "F | its largest force | force",
        "design": "DF | design factor | number",
    },
    source="Knacke, NWC TP 6575, ch. 6, from memory",
)
def safety_margin(strength: Real, force: Real, design: Real) -> Real:
    """Margin of safety with a design factor; below 0 the part is too weak."""
    return strength / (force * design) - 1.0


@formula(
    "S = n s k",
    result="S | least the tie holds | force",
    symbols={
        "strands": "n | strands that cross | number",
        "strength": "s | least strength of one strand | force",
        "knot_efficiency": "k | strength left by the knot | number",
    },
    source="common practice, no source",
)
def tie_strength(strands: Real, strength: Real, knot_efficiency: Real) -> Real:
    """Least force in N that a tie holds."""
    return strands * strength * knot_efficiency


@formula(
    "S = n s",
    result="S | most the tie may hold | force",
    symbols={
        "strands": "n | strands that cross | number",
        "strength": "s | largest strength of one strand | force",
    },
    source="common practice, no source",
    leaves_out="the knot, which only weakens it",
)
def tie_strength_most(strands: Real, strength: Real) -> Real:
    """Most force in N that a tie may hold before it breaks."""
    return strands * strength


@formula(
    "k = a/(G g0)",
    result="k | fragility/net deceleration | number",
    symbols={
        "fragility": "a | largest net deceleration allowed | acceleration",
        "net": "G | net deceleration | number",
    },
    source="definition",
)
def fragility_ratio(fragility: Real, net: Real) -> Real:
    """Fragility, m/s2, over the net deceleration in g0."""
    return fragility / (net * CONSTANTS["g0"])
