"""A rig file, a limit set and a stick file in which every table and every key of the formats stands."""

RIG = '''\
format = 1
limits = "limits/tarn-relief.toml"

[rig]
name = "Borehole pump on skid board"
reference = "TV-014"
revision = 3
rigged_by = "AM"
rigged_on = 2026-09-14
notes = """
Second pump of the valley.
Handle with care."""

[drop]
date = 2026-09-16
release_height = "1,250 ft ± 50 ft"
airspeed = "130 kt ± 5 kt"
zone_elevation = "1,640 ft"
zone_temperature = "28 °C ± 3 °C"
altimeter_setting = "1009 hPa"
dew_point = "14 °C"
surface_wind = "9 kt ± 3 kt"
release_wind = "18 kt"

[exit]
method = "extraction"
canopy_pulled_by = "static line"
static_line = "15 ft"
line_stretch = "1.9 s ± 0.3 s"
load_drag_area = "30 ft2"

[exit.extraction]
type = "ringslot"
count = 1
diameter = "28 ft"
drag_coefficient = 0.55
opening_coefficient = 1.05
mass = "80 lb"
stays = false
line_strength = "80,000 lbf"
attachment = "60,000 lbf"
speed_lost = "0 kt"

[platform]
kind = "skid board"
mass = "95 lb ± 1 lb"
length = "8 ft"
width = "4 ft"
height = "5 ft 2 in"
depth = "1 in"
overhang_front = "0 in"
overhang_rear = "2 in"
overall_width = "50 in"
centre = ["0 ft", "0 ft", "-1 in"]
weighed = "2,150 lb ± 10 lb"
balanced_at = ["1 in", "0 in"]
measure_from = "middle"

[[item]]
name = "Pump set"
mass = "1,310 lb ± 10 lb"
centre = ["4 in", "0 in", "22 in"]
fragility = "25 g"

[[item]]
name = "Pipes"
mass = "420 lb"
centre = ["-6 in", "0 in", "12 in"]

[[canopy]]
role = "drogue"
type = "conical ribbon"
count = 1
diameter = "8 ft"
line_length = "10 ft"
mass = "9 lb"
centre = ["-40 in", "0 in", "40 in"]
strength = "12,000 lbf"
when_next_opens = "goes at line stretch"

[[canopy]]
role = "main"
type = "flat circular"
count = 2
drag_area = "2,410 ft2"
line_length = "51 ft"
riser_length = "3 ft"
mass = "125 lb"
centre = ["0 in", "0 in", "50 in"]
drag_coefficient = "0.75 ± 0.04"
opening_coefficient = 1.7
fill_constant = 8
growth_exponent = 2
cluster_efficiency = 0.95
uneven_share = 1.3
rated_mass = ["501 lb", "2,200 lb"]
rated_speed = "150 kt"
strength = "30,000 lbf"
snatch_speed = "15 m/s"
opens_at_set_height = "1,000 ft"
deployment_time = "1.2 s"

[canopy.lines]
count = 64
strength = "550 lbf"
stretch = 0.30

[[canopy.reefing]]
drag_ratio = 0.05
cutter = "2.5 s"
fill_constant = 17
growth_exponent = 1
opening_coefficient = 1.0

[canopy.reefing.measured]
source = "drop report 7, 2025-03-02"
filling_time = "0.9 s"

[[canopy.reefing]]
drag_ratio = 0.2
cutter = "5 s"

[canopy.measured]
source = "drop report 7, 2025-03-02"
rate = "27.4 ft/s"
rate_mass = "2,100 lb"
rate_density = "1.18 kg/m3"
filling_time = "4.1 s"
opening_force = "9,800 lbf"
opening_force_mass = "2,100 lb"
opening_force_speed = "128 kt"

[[pack]]
row = 1
serial = "D-011"
made = 2021-02-01
packed = 2026-06-30

[[pack]]
row = 2
serial = "C-2207"
made = 2019-05-01
packed = 2026-08-14

[[pack]]
row = 2
serial = "C-2208"
made = 2019-05-01
packed = 2026-08-14

[suspension]
apex = ["0 in", "0 in", "150 in"]
legs_carrying = 2
pull_off_axis = "15 deg"

[[leg]]
name = "front left"
at = ["44 in", "22 in", "30 in"]
length = "130 in"
strength = "9,500 lbf"
plies = 2
joint_efficiency = 0.8
attachment = "12,000 lbf"

[[leg]]
name = "front right"
at = ["44 in", "-22 in", "30 in"]
strength = "9,500 lbf"
plies = 2
joint_efficiency = 0.8
attachment = "12,000 lbf"

[[leg]]
name = "rear left"
at = ["-44 in", "22 in", "30 in"]

[[link]]
name = "confluence clevis"
strength = "28,000 lbf"
carries = "all"
abreast = 1

[[cushion]]
name = "full pad"
at = ["0 in", "0 in"]
layers = 2
layer_thickness = "3 in"
area = "14 ft2"
crush_stress = "6,300 psf ± 8 %"
usable_strain = 0.7
lies = "under the platform"

[[lashing]]
name = "against forward, left side"
count = 1
mirror = "left-right"
deck = ["-40 in", "24 in", "0 in"]
load = ["4 in", "14 in", "34 in"]
device = "5,000 lbf"
deck_fitting = "10,000 lbf"
load_fitting = "5,000 lbf"
deck_ring = "L4"
kind = "strap"

[[tie]]
name = "release tie"
strands = 2
strand_strength = "80 lbf"
strand_strength_most = "100 lbf"
knot_efficiency = 0.6
holds_at_least = "60 lbf"
breaks_by = "220 lbf"

[[device]]
name = "ground release"
kind = "ground release"
serial = "GR-11"
expires = 2027-03-01
arms_after = "12 s ± 2 s"

[[left_out]]
part = "cushion"
why = "free-fall bundle of bagged grain"
'''

SMALL_RIG = """\
format = 1
[rig]
name = "Bundle"
[drop]
date = 2026-09-16
"""

LIMITS = """\
format = 1

[set]
name = "Tarn relief, low velocity"
issued_by = "QX"
issued_on = 2026-05-02
note = "Invented for the demonstration."

[limits]
"descent.rate" = { max = "28.5 ft/s", source = "house rule 4" }
"opening.load_factor" = { max = "9 g", source = "pump maker's letter" }
"suspension.leg" = { min = 2.5, source = "house rule 11" }
"landing.overturn" = { judged = false, source = "house rule 3" }
"opening.canopy" = { min = 1.5, source = "house rule 6", needs_measured = true }
"service.age" = { max = "12 yr", source = "house rule 9" }
"balance.forward" = { min = "-3 in", max = "3 in", source = "house rule 2" }

[restraint]
forward = 3.0
aft = 1.5
left = 1.5
right = 1.5
up = 2.0
source = "house rule 7"

[[inspection]]
key = "canopy.bag_ties"
stage = "rigging"
stop = true
two_person = true
ask = "Bag closing ties: material, turns, none missing"
answer = "turns"
caution = "Nylon in place of cotton will not break."
covers = ["canopy", "tie"]

[[inspection]]
key = "lashing.tails"
ask = "Strap tails taped"
"""

STICK = """\
format = 1

[stick]
name = "Upper valley, second pass"
release_height = "1,250 ft"
airspeed = "130 kt"
separation = { min = "50 m", source = "house rule 12" }

[[load]]
rig = "../pump.toml"
after = "0 s"

[[load]]
rig = "../grain.toml"
after = "0.8 s"
"""
