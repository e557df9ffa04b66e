"""The report as plain text."""

from __future__ import annotations

import unicodedata

import pytest
from hypothesis import given
from hypothesis import strategies as st

from model.report.as_text import PAGE, pages, text
from model.report.document import Report, Unread
from model.report.prose import ISOLATE, POP, clean, fold, isolated, width_of
from tests.model.report.report_cases import (
    BUNDLE,
    LONG,
    MARKUP,
    PUMP,
    RIGHT_TO_LEFT,
    checked,
    hostile,
    reported,
    signed,
)


@pytest.fixture(scope="module")
def nasty(tmp_path_factory: pytest.TempPathFactory) -> Report:
    return reported(hostile(tmp_path_factory.mktemp("hostile")), workings=True)


def test_no_line_is_wider_than_78_columns_whatever_a_user_wrote(nasty: Report) -> None:
    for written in (text(nasty), pages(nasty)):
        wide = [line for line in written.replace("\f", "\n").split("\n") if width_of(line) > 78]
        assert not wide


def test_a_users_text_is_kept_and_nothing_in_it_controls_a_display(nasty: Report) -> None:
    written = text(nasty)
    flat = " ".join(written.split())
    assert MARKUP in flat
    assert LONG in flat.replace(" ", "")
    marks = {ISOLATE, POP, "\n"}
    assert not [char for char in written if unicodedata.category(char)[0] == "C" and char not in marks]


def test_a_text_that_runs_right_to_left_is_kept_apart_from_the_numbers_beside_it(nasty: Report) -> None:
    assert f"{ISOLATE}{RIGHT_TO_LEFT}{POP}" in text(nasty)


def test_printed_pages_fit_the_paper_and_each_says_whose_it_is() -> None:
    sheets = pages(reported(signed(checked(PUMP), 2, 1), workings=True)).split("\f")
    assert len(sheets) > 10
    for number, sheet in enumerate(sheets, 1):
        lines = sheet.rstrip("\n").split("\n")
        assert len(lines) <= PAGE
        head = " ".join(lines[:6])
        assert lines[0] == "FAIL: TV-05, revision 3: Borehole pump, plateau"
        assert f"digest {checked(PUMP).digests[1][:16]}; limits: Tarn relief, low velocity; rigslate 9.9.9" in head
        assert f"page {number} of {len(sheets)}" in head
        assert "signed by S0" in head
        assert "STALE" in head


def test_pages_hold_everything_that_the_whole_text_holds() -> None:
    report = reported(checked(PUMP))
    whole = [line for line in text(report).split("\n") if line.startswith((" ", "-"))]
    paged = [line for line in pages(report).replace("\f", "\n").split("\n") if line.startswith((" ", "-"))]
    assert [line for line in paged if line.strip()] == [line for line in whole if line.strip()]


def test_a_block_that_fits_on_a_page_is_not_parted() -> None:
    for sheet in pages(reported(checked(PUMP), workings=True)).split("\f"):
        body = sheet.split("=" * 78, 1)[1].strip("\n").split("\n")
        # A detail of a step stands deeper than its title: no page begins with one.
        assert not body[0].startswith(" " * 14)


def test_the_text_ends_with_what_identifies_it() -> None:
    assert text(reported(checked(PUMP))).rstrip("\n").split("\n")[-4:] == [
        "FAIL: TV-05, revision 3: Borehole pump, plateau",
        f"digest {checked(PUMP).digests[1][:16]}; limits: Tarn relief, low velocity; rigslate 9.9.9",
        "not signed",
        "end of this rig",
    ]


def test_curves_are_plain_ascii() -> None:
    written = text(reported(checked(PUMP)))
    drawing = written[written.index("CURVES") : written.index("CHECKLIST")]
    assert drawing.isascii()
    assert "peak 15,846 lbf" in drawing


def test_several_rigs_each_have_their_heading_and_mistakes_are_said() -> None:
    both = reported(checked(PUMP), checked(BUNDLE))
    written = text(Report(both.title, both.rigs, Unread(("bad.toml:3: rig.name: found 3",))))
    assert written.startswith("Rigging checks of 2 loads\n")
    assert "  - bad.toml:3: rig.name: found 3" in written
    assert written.count("A computed check is an estimate.") == 2


@given(st.text(), st.integers(10, 80))
def test_folding_keeps_every_word_in_order_and_the_width(words: str, width: int) -> None:
    folded = fold(isolated(words), width, "  - ", "    ")
    assert all(width_of(line) <= width for line in folded)
    kept = "".join(line[4:] for line in folded).replace(" ", "")
    assert kept == isolated(words).replace(" ", "")


@given(st.text())
def test_a_clean_text_is_one_line_without_controls_that_a_file_can_hold(words: str) -> None:
    kept = clean(words)
    assert not [char for char in kept if unicodedata.category(char)[0] == "C"]
    assert kept.splitlines() in ([], [kept])
    assert kept.encode("utf-8").decode("utf-8") == kept
