"""Rig files with a mistake: one clear message each, in the right place."""

# ruff: noqa: E501 - one mistake a line: what is changed, where it is found, what the message says

from pathlib import Path

import pytest

from model.rig.errors import InputError, InputProblem
from model.rig.reading import read_rig
from tests.model.rig import samples


def problems(folder: Path, text: str) -> tuple[InputProblem, ...]:
    path = folder / "x.toml"
    path.write_text(text, encoding="utf-8")
    with pytest.raises(InputError) as caught:
        read_rig(path)
    assert str(caught.value) == "\n".join(map(str, caught.value.problems))
    return caught.value.problems


def changed(old: str, new: str) -> str:
    assert samples.RIG.count(old) == 1, old
    return samples.RIG.replace(old, new)


PLATFORM = 'platform]\nlength = "8 ft"\nmeasure_from = "front edge"\n'

ONE_MISTAKE = [
    # field by field
    ('mass = "1,310 lb ± 10 lb"', 'mass = "1,310"', "item 1 (Pump set).mass", '"1,310"', "a mass with its unit", "no unit"),
    ('mass = "1,310 lb ± 10 lb"', "mass = 1310", "item 1 (Pump set).mass", "1310", "a mass", "in quotes, with its unit"),
    ('mass = "1,310 lb ± 10 lb"', 'mass = "1,310 ft"', "item 1 (Pump set).mass", '"1,310 ft"', "a mass", "unit of length"),
    ('mass = "1,310 lb ± 10 lb"', 'mass = "-5 lb"', "item 1 (Pump set).mass", '"-5 lb"', "a mass over 0", ""),
    ('mass = "1,310 lb ± 10 lb"', 'mass = "5 lb ± 6 lb"', "item 1 (Pump set).mass", '"5 lb', "a mass over 0", "tolerance"),
    ('mass = "1,310 lb ± 10 lb"', 'mass = "nan lb"', "item 1 (Pump set).mass", '"nan lb"', "a mass", "finite"),
    ('mass = "1,310 lb ± 10 lb"', "mass = nan", "item 1 (Pump set).mass", "nan", "a mass", "in quotes"),
    ('mass = "1,310 lb ± 10 lb"', 'mass = "1e13 kg"', "item 1 (Pump set).mass", '"1e13 kg"', "a mass", "out of any reach"),
    ('mass = "1,310 lb ± 10 lb"', "mass = {}", "item 1 (Pump set).mass", "a table", "a mass", "in quotes"),
    ('mass = "1,310 lb ± 10 lb"', "mass = true", "item 1 (Pump set).mass", "true", "a mass", "in quotes"),
    ('name = "Pump set"', "name = 5", "item 1.name", "5", "a text of one line", "in quotes"),
    ('name = "Pump set"', 'name = ""', "item 1.name", '""', "a text of one line", "empty"),
    ('name = "Pump set"', 'name = " Pump"', "item 1 ( Pump).name", '" Pump"', "a text of one line", "blanks at its ends"),
    ('name = "Pump set"', 'name = "a\\u001b[2J"', "item 1 (a[2J).name", '"a [2J"', "a text of one line", "U+001B"),
    ('name = "Pump set"', 'name = "a\\nb"', "item 1 (ab).name", '"a b"', "a text of one line", "U+000A"),
    ('name = "Pump set"', 'name = "a\\u202eb"', "item 1 (ab).name", '"a b"', "a text of one line", "U+202E"),
    ('centre = ["4 in", "0 in", "22 in"]', 'centre = ["4 in", "0 in"]', "item 1 (Pump set).centre", "a list of 2", "3 lengths [x, y, z]", ""),
    ('centre = ["4 in", "0 in", "22 in"]', 'centre = "4 in"', "item 1 (Pump set).centre", '"4 in"', "3 lengths [x, y, z]", ""),
    ('centre = ["4 in", "0 in", "22 in"]', 'centre = ["4 in", "0", "22 in"]', "item 1 (Pump set).centre", '"0" for y', "a length", "no unit"),
    ("count = 2\ndrag_area", "count = 0\ndrag_area", "canopy row 2 (main).count", "0", "a whole number of at least 1", ""),
    ("count = 2\ndrag_area", "count = 2.0\ndrag_area", "canopy row 2 (main).count", "2.0", "a whole number", ""),
    ("count = 2\ndrag_area", "count = true\ndrag_area", "canopy row 2 (main).count", "true", "a whole number", ""),
    ("count = 64", "count = 10_001", "canopy row 2 (main).lines.count", "10001", "a whole number", "at most 10,000"),
    ('drag_coefficient = "0.75 ± 0.04"', 'drag_coefficient = "0,75"', "canopy row 2 (main).drag_coefficient", '"0,75"', "a plain number", '"0.75"'),
    ('drag_coefficient = "0.75 ± 0.04"', "drag_coefficient = 75", "canopy row 2 (main).drag_coefficient", "75", "at most 5", ""),
    ('drag_coefficient = "0.75 ± 0.04"', "drag_coefficient = []", "canopy row 2 (main).drag_coefficient", "a list", "a plain number", ""),
    ('diameter = "8 ft"', 'diameter = "0 ft"', "canopy row 1 (drogue).diameter", '"0 ft"', "a length over 0", ""),
    ("stretch = 0.30", "stretch = 30", "canopy row 2 (main).lines.stretch", "30", "0.3 is 30 %", ""),
    ("drag_ratio = 0.05", "drag_ratio = 1.2", "canopy row 2 (main).reefing 1.drag_ratio", "1.2", "a ratio over 0 and under 1", ""),
    ("drag_ratio = 0.05", "drag_ratio = 0", "canopy row 2 (main).reefing 1.drag_ratio", "0", "a ratio over 0 and under 1", ""),
    ("joint_efficiency = 0.8\nattachment = \"12,000 lbf\"\n\n[[leg]]\nname = \"front right\"", "joint_efficiency = 8\n[[leg]]\nname = \"front right\"", "leg 1 (front left).joint_efficiency", "8", "at most 1", ""),
    ('type = "flat circular"', 'type = "flat cirular"', "canopy row 2 (main).type", '"flat cirular"', "a type of the canopy table", '"flat circular"'),
    ('type = "flat circular"', 'type = "zzz"', "canopy row 2 (main).type", '"zzz"', "a type of the canopy table", "known: flat circular, conical"),
    ('type = "flat circular"', "type = 1", "canopy row 2 (main).type", "1", "a type of the canopy table", "known"),
    ('role = "main"', 'role = "Main"', "canopy row 2 (Main).role", '"Main"', '"drogue" or "main"', 'did you mean "main"?'),
    ('role = "main"', "role = 1", "canopy row 2.role", "1", '"drogue" or "main"', ""),
    ("date = 2026-09-16", 'date = "2026-09-16"', "drop.date", '"2026-09-16"', "a date", "without quotes"),
    ("date = 2026-09-16", "date = 2026-09-16T08:00:00", "drop.date", "2026-09-16T08:00:00", "a date", "without a time"),
    ("date = 2026-09-16", "date = 20260916", "drop.date", "20260916", "a date", ""),
    ("stays = false", 'stays = "false"', "exit.extraction.stays", '"false"', "true or false", "without quotes"),
    ("format = 1", "format = 2", "format", "2", "format 1", "no other"),
    ("format = 1", "format = true", "format", "true", "format 1", ""),
    ('rated_mass = ["501 lb", "2,200 lb"]', 'rated_mass = ["2,200 lb", "501 lb"]', "canopy row 2 (main).rated_mass", '"2,200 lb" and "501 lb"', "[least, most]", "the least is over the most"),
    ('rated_mass = ["501 lb", "2,200 lb"]', 'rated_mass = ["501 lb"]', "canopy row 2 (main).rated_mass", "a list", "[least, most]", ""),
    ('rated_mass = ["501 lb", "2,200 lb"]', 'rated_mass = ["501 lb", "2,200"]', "canopy row 2 (main).rated_mass", '"2,200" for most', "a mass", "no unit"),
    ('zone_temperature = "28 °C ± 3 °C"', 'zone_temperature = "82 °C"', "drop.zone_temperature", '"82 °C"', "between -90 °C and 60 °C", ""),
    ('altimeter_setting = "1009 hPa"', 'altimeter_setting = "29.92 hPa"', "drop.altimeter_setting", '"29.92 hPa"', "between 850 and 1,100 hPa", ""),
    ('release_height = "1,250 ft ± 50 ft"', 'release_height = "0 ft"', "drop.release_height", '"0 ft"', "a length over 0", ""),
    ('zone_elevation = "1,640 ft"', 'zone_elevation = "-600 m"', "drop.zone_elevation", '"-600 m"', "between -500 m and 20 km", ""),
    ('pull_off_axis = "15 deg"', 'pull_off_axis = "90 deg"', "suspension.pull_off_axis", '"90 deg"', "under 90 deg", ""),
    # keys and tables
    ("revision = 3", "revison = 3", "rig.revison", 'the unknown key "revison"', "a key of the format", 'did you mean "revision"?'),
    ("revision = 3", "zzz = 3", "rig.zzz", 'the unknown key "zzz"', "a key of the format", "known: name, reference, revision"),
    ("[suspension]", "[suspention]", "suspention", 'the unknown key "suspention"', "a key of the format", '"suspension"'),
    ("[canopy.lines]", "[canopy.line]", "canopy row 2 (main).line", 'the unknown key "line"', "a key", '"lines"'),
    ('name = "Borehole pump on skid board"\n', "", "rig.name", "nothing", "the key name", "required"),
    ("date = 2026-09-16\n", "", "drop.date", "nothing", "the key date", "required"),
    ('name = "front right"\n', "", "leg 2.name", "nothing", "the key name", "required"),
    ('serial = "C-2208"\n', "", "pack 3.serial", "nothing", "the key serial", "required"),
    ('[canopy.measured]\nsource = "drop report 7, 2025-03-02"\n', "[canopy.measured]\n", "canopy row 2 (main).measured.source", "nothing", "the key source", "required"),
    ("[[cushion]]", "[cushion]", "cushion", "a table", "rows: [[cushion]]", "two brackets"),
    # across fields
    ('name = "Pipes"', 'name = "Pump set"', "item 2 (Pump set).name", '"Pump set" a second time', "a name that no other row has", ""),
    ('serial = "C-2208"', 'serial = "GR-11"', "device 1 (ground release).serial", '"GR-11" a second time', "a serial", ""),
    ('release_height = "1,250 ft ± 50 ft"', 'release_height = "20 km"', "drop.release_height", '"20 km" over a zone at "1,640 ft"', "no more than 20 km", ""),
    ('release_wind = "18 kt"', 'winds = [["0 ft", "9 kt"]]', "drop.surface_wind", "surface_wind beside winds", "not both", ""),
    ('dew_point = "14 °C"', 'dew_point = "29 °C"', "drop.dew_point", '"29 °C"', 'no more than the temperature at the zone, "28', ""),
    ('method = "extraction"', 'method = "gravity"', "exit.extraction", "a table for method gravity", 'method = "extraction"', ""),
    ('line_stretch = "1.9 s ± 0.3 s"\n', "", "exit", "extraction without line_stretch", "the known time from release", ""),
    ('canopy_pulled_by = "static line"\nstatic_line = "15 ft"\nline_stretch = "1.9 s ± 0.3 s"\n', 'canopy_pulled_by = "timer"\n', "exit", "a timer without line_stretch", "line_stretch", ""),
    ('drag_area = "2,410 ft2"', 'drag_area = "2,410 ft2"\ndiameter = "64 ft"', "canopy row 2 (main).drag_area", "drag_area beside diameter", "one of the two", ""),
    ("uneven_share = 1.3", "uneven_share = 2.5", "canopy row 2 (main).uneven_share", '"2.5"', "no more than the 2 canopies", ""),
    ("uneven_share = 1.3", "uneven_share = 0.9", "canopy row 2 (main).uneven_share", "0.9", "a number of 1 or over", ""),
    ('strength = "12,000 lbf"\nwhen', 'strength = "12,000 lbf"\nuneven_share = 1.2\nwhen', "canopy row 1 (drogue).uneven_share", '"1.2"', "1 for a single canopy", ""),
    ('strength = "12,000 lbf"\nwhen', 'strength = "12,000 lbf"\ncluster_efficiency = "1 ± 0.1"\nwhen', "canopy row 1 (drogue).cluster_efficiency", '"1 ± 0.1"', "1 for a single canopy", ""),
    ("drag_ratio = 0.2", "drag_ratio = 0.05", "canopy row 2 (main).reefing 2.drag_ratio", '"0.05"', 'more than the drag ratio of the stage before, "0.05"', ""),
    ('cutter = "5 s"', 'cutter = "2 s"', "canopy row 2 (main).reefing 2.cutter", '"2 s"', 'more than the cutter time of the stage before, "2.5 s"', ""),
    ('when_next_opens = "goes at line stretch"\n', "", "canopy row 1 (drogue)", "a row followed by another", "when_next_opens", ""),
    ('snatch_speed = "15 m/s"', 'when_next_opens = "stays"', "canopy row 2 (main).when_next_opens", "when_next_opens in the last row", "before another row", ""),
    ('opens_at_set_height = "1,000 ft"\n', "", "canopy row 2 (main)", "no opening", "one of opens_after, opens_at_height, opens_at_set_height", ""),
    ('opens_at_set_height = "1,000 ft"\n', 'opens_at_set_height = "1,000 ft"\nopens_after = "4 s"\n', "canopy row 2 (main).opens_at_set_height", "opens_after and opens_at_set_height", "one of", ""),
    ('strength = "12,000 lbf"\nwhen', 'strength = "12,000 lbf"\ndeployment_time = "1 s"\nwhen', "canopy row 1 (drogue).deployment_time", "deployment_time in the first row", "later rows", ""),
    ('rate_density = "1.18 kg/m3"\n', "", "canopy row 2 (main).measured.rate", "rate without rate_density", "rate, rate_mass, rate_density", ""),
    ('opening_force = "9,800 lbf"\n', "", "canopy row 2 (main).measured.opening_force_mass", "opening_force_mass without opening_force", "opening_force_speed", ""),
    ('row = 1\nserial', 'row = 3\nserial', "pack 1 (D-011).row", "3", "a canopy row from 1 to 2", ""),
    ('row = 1\nserial', 'row = 2\nserial', "pack 3 (C-2208).row", "pack 3 of that row", "no more packs than the 2 of canopy row 2", ""),
    ("packed = 2026-06-30", "packed = 2026-09-17", "pack 1 (D-011).packed", "2026-09-17", "a day up to the drop on 2026-09-16", ""),
    ("packed = 2026-06-30", "packed = 2021-01-31", "pack 1 (D-011).packed", "2021-01-31", "a day from its manufacture on 2021-02-01", ""),
    ("legs_carrying = 2", "legs_carrying = 4", "suspension.legs_carrying", "4", "no more than there are legs, 3", ""),
    ('at = ["44 in", "-22 in", "30 in"]', 'at = ["44 in", "22 in", "30 in"]', "leg 2 (front right).at", "the point of leg front left", "a point of its own", ""),
    ('length = "130 in"', 'length = "140 in"', "leg 1 (front left).length", '"140 in"', "within 1 % of the distance to the apex, 3.294 m", ""),
    ('load = ["4 in", "14 in", "34 in"]', 'load = ["-40 in", "24 in", "0 in"]', "lashing 1 (against forward, left side).load", "the deck point", "away from the deck point", ""),
    ('strand_strength_most = "100 lbf"', 'strand_strength_most = "70 lbf"', "tie 1 (release tie).strand_strength_most", '"70 lbf"', 'at least the strand_strength, "80 lbf"', ""),
    ('breaks_by = "220 lbf"', 'breaks_by = "50 lbf"', "tie 1 (release tie).breaks_by", '"50 lbf"', 'at least the holds_at_least, "60 lbf"', ""),
]  # fmt: skip


@pytest.mark.parametrize(("old", "new", "path", "found", "expected", "hint"), ONE_MISTAKE)
def test_one_mistake_one_message(
    tmp_path: Path, old: str, new: str, path: str, found: str, expected: str, hint: str
) -> None:
    listed = problems(tmp_path, changed(old, new))
    assert len(listed) == 1, "\n".join(map(str, listed))
    assert listed[0].path == path
    assert found in listed[0].found
    assert expected in listed[0].expected
    assert hint in listed[0].message
    assert str(listed[0]).isprintable()


def test_the_line_is_that_of_the_key(tmp_path: Path) -> None:
    text = changed('strand_strength = "80 lbf"', 'strand_strength = "80"')
    assert problems(tmp_path, text)[0].line == text[: text.index('strand_strength = "80"')].count("\n") + 1


def test_a_missing_key_has_the_line_of_its_table(tmp_path: Path) -> None:
    text = changed('name = "front right"\n', "")
    assert problems(tmp_path, text)[0].line == text[: text.index('at = ["44 in", "-22 in"')].count("\n")


def test_an_apex_is_judged_against_every_leg(tmp_path: Path) -> None:
    listed = problems(tmp_path, changed('apex = ["0 in", "0 in", "150 in"]', 'apex = ["0 in", "0 in", "29 in"]'))
    assert [problem.path for problem in listed] == [f"leg {n}.at" for n in ("1 (front left)", "2 (front right)", "3 (rear left)")]


@pytest.mark.parametrize(
    ("winds", "found", "expected"),
    [
        ("[]", "an empty list", "rising heights"),
        ('"9 kt"', '"9 kt"', "rising heights"),
        ('[["0 ft"]]', "a list for wind 1", "rising heights"),
        ('[["0 ft", "9 kt"], ["0 ft", "8 kt"]]', '"0 ft" for the height of wind 2', "rising heights"),
        ('[["-5 ft", "9 kt"]]', '"-5 ft" for the height of wind 1', "a length of 0 or over"),
        ('[["0 ft", "9"]]', '"9" for the speed of wind 1', "a speed"),
    ],
)
def test_winds_in_disorder(tmp_path: Path, winds: str, found: str, expected: str) -> None:
    listed = problems(tmp_path, f"{samples.SMALL_RIG}winds = {winds}\n")
    assert len(listed) == 1
    assert (listed[0].path, listed[0].found) == ("drop.winds", found)
    assert expected in listed[0].expected


@pytest.mark.parametrize(
    ("rows", "path", "found", "expected"),
    [
        ('[[item]]\nname = "a"\ncentre = ["8.1 ft", "0 ft", "0 ft"]', "item 1 (a).centre", 'x "8.1 ft"', '"8 ft" aft'),
        ('[[leg]]\nname = "a"\nat = ["-1 in", "0 ft", "0 ft"]', "leg 1 (a).at", 'x "-1 in"', '"8 ft" aft'),
        ('[[cushion]]\nname = "a"\nat = ["9 ft", "0 ft"]', "cushion 1 (a).at", 'x "9 ft"', '"8 ft" aft'),
        ('[[lashing]]\nname = "a"\ndeck = ["9 ft", "0 ft", "0 ft"]', "lashing 1 (a).deck", 'x "9 ft"', '"8 ft" aft'),
        ('[suspension]\napex = ["9 ft", "0 ft", "9 ft"]', "suspension.apex", 'x "9 ft"', '"8 ft" aft'),
    ],
)
def test_a_tape_reads_no_further_than_the_platform(
    tmp_path: Path, rows: str, path: str, found: str, expected: str
) -> None:
    listed = problems(tmp_path, f"{samples.SMALL_RIG}[{PLATFORM}{rows}\n")
    assert len(listed) == 1
    assert (listed[0].path, listed[0].found) == (path, found)
    assert expected in listed[0].expected


def test_a_tape_reads_to_the_end_of_an_overhang(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    rows = 'overhang_rear = "2 ft"\noverhang_front = "1 ft"\n[[item]]\nname = "a"\ncentre = ["10 ft", "0 ft", "0 ft"]\n'
    path.write_text(f"{samples.SMALL_RIG}[{PLATFORM}{rows}", encoding="utf-8")
    assert read_rig(path).rig.item[0].centre is not None


def test_a_front_edge_without_a_length_cannot_be_read(tmp_path: Path) -> None:
    listed = problems(tmp_path, f'{samples.SMALL_RIG}[platform]\nmeasure_from = "front edge"\n')
    assert [problem.path for problem in listed] == ["platform.measure_from"]


def test_cushions_lie_alike(tmp_path: Path) -> None:
    rows = "".join(f'[[cushion]]\nname = "{n}"\nlies = "under the {n}"\n' for n in ("platform", "load"))
    listed = problems(tmp_path, samples.SMALL_RIG + rows)
    assert [problem.path for problem in listed] == ["cushion 2 (load).lies"]


@pytest.mark.parametrize(
    ("key", "first", "second"),
    [("opens_after", "5 s", "4 s"), ("opens_at_height", "900 ft", "1,000 ft"), ("opens_at_set_height", "1 m", "2 m")],
)
def test_rows_open_in_order(tmp_path: Path, key: str, first: str, second: str) -> None:
    def row(extra: str) -> str:
        return f'[[canopy]]\nrole = "main"\ntype = "other"\ncount = 1\n{extra}\n'

    stays = 'when_next_opens = "stays"'
    text = samples.SMALL_RIG + row(stays) + row(f'{stays}\n{key} = "{first}"') + row(f'{key} = "{second}"')
    listed = problems(tmp_path, text)
    assert [problem.path for problem in listed] == [f"canopy row 3 (main).{key}"]


def test_packs_without_canopies(tmp_path: Path) -> None:
    listed = problems(tmp_path, f'{samples.SMALL_RIG}[[pack]]\nrow = 1\nserial = "a"\n')
    assert [(problem.path, problem.expected) for problem in listed] == [("pack 1 (a).row", "a canopy row; there is none")]


def test_left_out_parts_are_asked_about(tmp_path: Path) -> None:
    path = tmp_path / "x.toml"
    text = samples.SMALL_RIG + "".join(
        f'[[left_out]]\npart = "{part}"\nwhy = "none"\n' for part in ("cushion", "landing", "descent.rate", "cushon")
    )
    path.write_text(text, encoding="utf-8")
    assert len(read_rig(path).rig.left_out) == 4
    with pytest.raises(InputError) as caught:
        read_rig(path, known_parts=lambda part: part in ("landing", "descent.rate"))
    assert [problem.path for problem in caught.value.problems] == ["left_out 4 (cushon).part"]
    assert 'did you mean "cushion"?' in str(caught.value)


def test_several_mistakes_come_at_once_in_the_order_of_lines(tmp_path: Path) -> None:
    text = samples.RIG
    for old, new in [
        ("format = 1\n", ""),
        ("date = 2026-09-16", 'date = "soon"'),
        ('mass = "95 lb ± 1 lb"', 'mass = "95"'),
        ('name = "Pipes"', 'name = "Pump set"'),
        ("legs_carrying = 2", "legs_carying = 2"),
        ('kind = "strap"', 'kind = "rope"'),
        ("packed = 2026-06-30", "packed = 2021-01-31"),
    ]:
        assert text.count(old) == 1
        text = text.replace(old, new)
    listed = problems(tmp_path, text)
    assert [problem.path for problem in listed] == [
        "format",
        "drop.date",
        "platform.mass",
        "item 2 (Pump set).name",
        "pack 1 (D-011).packed",
        "suspension.legs_carying",
        "lashing 1 (against forward, left side).kind",
    ]
    lines = [problem.line or 0 for problem in listed]
    assert lines == sorted(lines)


@pytest.mark.parametrize("text", ["", "format = 1\n", 'rig = "x"\ndrop = 3\nformat = 1\n', "rig = []\n[drop]\n"])
def test_required_tables(tmp_path: Path, text: str) -> None:
    listed = problems(tmp_path, text)
    assert {"rig", "drop"} <= {problem.path.split(".")[0] for problem in listed}


def test_thousands_of_mistakes_are_counted(tmp_path: Path) -> None:
    text = samples.SMALL_RIG + "".join(f'[[item]]\nname = "{n}"\nmass = "{n}"\n' for n in range(5000))
    listed = problems(tmp_path, text)
    assert len(listed) == 101
    assert listed[-1].message == "and 4,900 more mistakes"
