"""The record: rendering, chain, appending, and what of it stands."""

import datetime
import os
import threading
import tomllib
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.rig import whole
from model.rig.digest import digest
from model.rig.entry import Entry, draft
from model.rig.errors import InputError
from model.rig.record import append, read_record, record_path, render, seal
from model.rig.rule import FieldError
from model.rig.standing import content_digest
from tests.model.rig import samples

RIG, LIMITS = tomllib.loads(samples.RIG), tomllib.loads(samples.LIMITS)
WHEN = datetime.datetime(2026, 9, 14, 8, 30, tzinfo=datetime.timezone(datetime.timedelta(hours=2)))


def entry(kind: str = "answer", **fields: object) -> Entry:
    given_fields: dict[str, object] = {"kind": kind, "who": "AM", "when": WHEN, "version": "0.1.0"}
    if kind == "answer":
        given_fields |= {"key": "canopy.bag_ties", "answer": "pass"}
    given_fields["on"] = content_digest(kind, "canopy.bag_ties", None, RIG, LIMITS)
    return draft(**(given_fields | fields))


def damaged(path: Path) -> str:
    with pytest.raises(InputError) as caught:
        read_record(path)
    assert str(caught.value).isprintable() or "\n" in str(caught.value)
    return str(caught.value)


@pytest.fixture
def path(tmp_path: Path) -> Path:
    """A record of three entries."""
    path = tmp_path / "x.record.toml"
    append(path, entry(value="3 turns", remark='dry, "clean"\nand \\ taut', second="RB"))
    append(path, entry("deviation", key="descent.rate", remark="zone is soft"))
    append(path, entry("signature", who="RB"))
    return path


def test_the_record_lies_beside_the_rig() -> None:
    assert record_path("rigs/pump.toml") == Path("rigs/pump.record.toml")
    assert record_path(Path("pump.v2.toml")).name == "pump.v2.record.toml"


def test_no_record_is_an_empty_one(tmp_path: Path) -> None:
    assert read_record(tmp_path / "x.record.toml") == ()


def test_what_is_appended_is_read_back(path: Path) -> None:
    first, second, third = read_record(path)
    assert first.remark == 'dry, "clean"\nand \\ taut'
    assert (first.value, first.second, first.when) == ("3 turns", "RB", WHEN)
    assert (first.previous, second.previous, third.previous) == ("", first.digest, second.digest)
    assert path.read_bytes() == render((first, second, third)).encode()
    assert b"\r" not in path.read_bytes()
    assert len({first.digest, second.digest, third.digest}) == 3


def test_the_rendering_is_fixed() -> None:
    sealed = seal(entry("remark", remark="süß\tend", on="0" * 64), ())
    assert render((sealed,)) == (
        "format = 1\n\n[[entry]]\n"
        'kind = "remark"\nremark = "süß\\tend"\nwho = "AM"\nwhen = 2026-09-14T08:30:00+02:00\nversion = "0.1.0"\n'
        f'on = "{"0" * 64}"\ndigest = "{sealed.digest}"\n'
    )
    # derived: SHA-256 of the sorted compact JSON, by hand
    assert sealed.digest == digest(
        {"kind": "remark", "on": "0" * 64, "remark": "süß\tend", "version": "0.1.0", "when": WHEN, "who": "AM"}
    )


def test_a_digest_is_that_of_the_sorted_compact_json() -> None:
    # derived: printf '{"a":[1,"2026-09-16"],"b":"é"}' | sha256sum
    by_hand = "2a74672656afb1df15a16a677551cfb3a9c4cf7ff58b314b258028aea4b8b60d"
    assert digest({"b": "é", "a": [1, datetime.date(2026, 9, 16)]}) == by_hand


def test_line_ends_of_windows_count(path: Path) -> None:
    path.write_bytes(path.read_bytes().replace(b"\n", b"\r\n"))
    assert len(read_record(path)) == 3
    append(path, entry("remark", remark="more"))
    assert b"\r" not in path.read_bytes()
    assert len(read_record(path)) == 4


@pytest.mark.parametrize(
    ("old", "new", "words"),
    [
        (b"zone is soft", b"zone is hard", "entry 2 (descent.rate).digest: found another digest"),
        (b'answer = "pass"', b'answer = "fail"', "entry 1 (canopy.bag_ties).digest: found another digest"),
        (b"format = 1\n", b"format = 1\n\n", "byte 13 is not as it was written"),
        (b"format = 1\n", b"# note\nformat = 1\n", "byte 1 is not as it was written"),
        (b'who = "RB"', b"who = 'RB'", "is not as it was written (found"),
        (b'"signature"', b'"signed"', 'expected "answer" or "withdrawal"'),
        (b'version = "0.1.0"\n', b'version = "0.1.0" \n', "is not as it was written"),
        (b'kind = "signature"', b'kind = "signature"\ncolour = "red"', 'the unknown key "colour"'),
        (b"when = 2026-09-14T08:30:00+02:00", b"when = 2026-09-14T08:30:00", "a time with its zone"),
        (b"when = 2026-09-14T08:30:00+02:00", b"when = 2026-09-14", "a time with its zone"),
        (b"when = 2026-09-14T08:30:00+02:00", b"when = 2026-09-14T08:30:00.5+02:00", "a time with its zone"),
        (b"format = 1", b"format = 2", "expected format 1"),
        (b"[[entry]]", b"[[entry]", "not TOML"),
        (b"AM", b"A\xffM", "not UTF-8"),
    ],
)
def test_damage_is_said(path: Path, old: bytes, new: bytes, words: str) -> None:
    data = path.read_bytes()
    assert old in data
    path.write_bytes(data.replace(old, new, 1))
    assert words in damaged(path)


def test_an_entry_taken_out_of_the_middle_is_said(path: Path) -> None:
    parts = path.read_bytes().split(b"\n[[entry]]\n")
    path.write_bytes(b"\n[[entry]]\n".join([parts[0], parts[1], parts[3]]))
    assert "entry 2.previous: found another digest, expected the digest of the entry before it" in damaged(path)


def test_entries_in_another_order_are_said(path: Path) -> None:
    parts = path.read_bytes().split(b"\n[[entry]]\n")
    path.write_bytes(b"\n[[entry]]\n".join([parts[0], parts[2], parts[1], parts[3]]))
    assert "expected none in the first entry" in damaged(path)


def test_a_cut_off_end_shows_only_within_an_entry(path: Path) -> None:
    data = path.read_bytes()
    path.write_bytes(data[:-1])
    assert "found the end of the file" in damaged(path)
    # Without a key nothing can show that whole entries are gone from the end; the docs say so.
    path.write_bytes(data[: data.rindex(b"\n[[entry]]")])
    assert len(read_record(path)) == 2


def test_every_single_changed_byte_is_said(path: Path) -> None:
    data = path.read_bytes()
    for at in range(0, len(data), 7):
        path.write_bytes(data[:at] + bytes([data[at] ^ 1]) + data[at + 1 :])
        assert damaged(path)


def test_nothing_is_appended_to_a_damaged_record(path: Path) -> None:
    path.write_bytes(path.read_bytes() + b"\n")
    before = path.read_bytes()
    with pytest.raises(InputError, match="damaged record"):
        append(path, entry("remark", remark="more"))
    assert path.read_bytes() == before
    assert [file.name for file in path.parent.iterdir()] == [path.name]


def test_a_record_that_changes_meanwhile_is_left_alone(path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    whole_mode = whole._mode

    def intrude(file: Path) -> int:
        file.write_bytes(file.read_bytes() + b"# from elsewhere\n")
        return whole_mode(file)

    monkeypatch.setattr(whole, "_mode", intrude)
    with pytest.raises(InputError, match="another program wrote this record meanwhile"):
        append(path, entry("remark", remark="more"))
    assert path.read_bytes().endswith(b"# from elsewhere\n")
    assert [file.name for file in path.parent.iterdir()] == [path.name]


def test_a_failing_disk_leaves_the_old_record(path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    before = path.read_bytes()

    def full(handle: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(InputError, match="not written: no space left on device"):
        append(path, entry("remark", remark="more"))
    assert path.read_bytes() == before
    assert [file.name for file in path.parent.iterdir()] == [path.name]


def test_a_missing_folder_is_said(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="not written: no such file or directory"):
        append(tmp_path / "none" / "x.record.toml", entry("remark", remark="more"))


def test_permissions_stay_and_a_link_stays_a_link(path: Path) -> None:
    path.chmod(0o640)
    link = path.with_name("link.record.toml")
    link.symlink_to(path)
    append(link, entry("remark", remark="more"))
    assert link.is_symlink()
    assert path.stat().st_mode & 0o777 == 0o640
    assert len(read_record(path)) == 4


def test_appending_from_two_sides_loses_nothing(tmp_path: Path) -> None:
    path = tmp_path / "x.record.toml"

    def write(who: str) -> None:
        for count in range(10):
            append(path, entry("remark", remark=f"{who} {count}"))

    threads = [threading.Thread(target=write, args=(who,)) for who in ("AM", "RB")]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    remarks = [line.remark for line in read_record(path)]
    assert sorted(remarks) == sorted(f"{who} {count}" for who in ("AM", "RB") for count in range(10))


@pytest.mark.parametrize(
    ("kind", "fields", "words"),
    [
        ("answer", {"answer": None}, "found no answer, expected the answer of kind answer"),
        ("answer", {"answer": "maybe"}, 'expected "pass" or "fail" or "does not apply"'),
        ("answer", {"key": ""}, "found no key"),
        ("answer", {"answer": "fail"}, 'found "fail" without a remark'),
        ("answer", {"answer": "does not apply", "remark": " "}, 'found "does not apply" without a remark'),
        ("answer", {"second": "am"}, 'found "am", who made it, expected the name of a second person'),
        ("answer", {"who": ""}, "found nobody, expected a name"),
        ("answer", {"who": "A\x1bM"}, "U+001B"),
        ("answer", {"on": "abc"}, "a digest of 64 hexadecimal digits"),
        ("answer", {"when": WHEN.replace(tzinfo=None)}, "a time with its zone"),
        ("answer", {"covers": ["canopi"]}, 'did you mean "canopy"?'),
        ("withdrawal", {}, "found no key"),
        ("withdrawal", {"key": "a.b", "answer": "pass"}, "found answer with kind withdrawal"),
        ("deviation", {"key": "descent.rate"}, "found no remark"),
        ("deviation", {"remark": "soft"}, "found no key"),
        ("signature", {"covers": ["canopy"]}, "found covers with kind signature"),
        ("remark", {}, "found no remark"),
        ("other", {}, 'expected "answer" or "withdrawal"'),
        ("answer", {"colour": "red"}, "colour"),
    ],
)
def test_entries_that_cannot_be(kind: str, fields: dict[str, object], words: str) -> None:
    with pytest.raises(FieldError) as caught:
        entry(kind, **fields)
    assert words in str(caught.value)


@given(st.text(st.characters(codec="utf-8", exclude_categories=["C"]) | st.sampled_from("\n\t\"\\#"), max_size=40))
def test_any_remark_survives(tmp_path_factory: pytest.TempPathFactory, remark: str) -> None:
    try:
        made = entry("remark", remark=remark)
    except FieldError:
        assert not remark.strip() or "\u2028" in remark or "\u2029" in remark
        return
    path = tmp_path_factory.mktemp("record") / "x.record.toml"
    append(path, made)
    assert read_record(path)[0].remark == remark
