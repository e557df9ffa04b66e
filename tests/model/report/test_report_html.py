"""The report as HTML: one file that stands alone, holds, and shows a user's text as text."""

from __future__ import annotations

import itertools
import re
from html.parser import HTMLParser
from pathlib import Path

import pytest

from model.report.as_html import html
from model.report.document import Report, Unread
from tests.model.report.report_cases import (
    BEGINNINGS,
    BUNDLE,
    LINKS,
    LONG,
    MARKUP,
    PUMP,
    RIGHT_TO_LEFT,
    checked,
    hostile,
    reported,
    signed,
)

VOID = {"meta", "br", "col"}
ALLOWED = {
    "html", "head", "meta", "title", "style", "body", "main", "section", "h1", "h2", "h3", "h4", "p", "ul", "li",
    "table", "caption", "colgroup", "col", "thead", "tbody", "tr", "th", "td", "b", "br", "span", "bdi", "figure",
    "figcaption", "svg", "desc", "rect", "path", "text",
}  # fmt: skip


class Page(HTMLParser):
    """Reads a page and refuses whatever is not closed as it was opened."""

    def __init__(self, written: str) -> None:
        super().__init__(convert_charrefs=True)
        self.open: list[str] = []
        self.tags: list[tuple[str, dict[str, str | None]]] = []
        self.texts: list[tuple[str, str]] = []
        self.feed(written)
        self.close()
        assert self.open == []

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append((tag, dict(attrs)))
        if tag not in VOID:
            self.open.append(tag)

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append((tag, dict(attrs)))

    def handle_endtag(self, tag: str) -> None:
        assert self.open.pop() == tag

    def handle_data(self, data: str) -> None:
        self.texts.append((self.open[-1] if self.open else "", data))

    def all(self, tag: str) -> list[dict[str, str | None]]:
        return [attributes for name, attributes in self.tags if name == tag]

    def words(self) -> str:
        return " ".join(" ".join(text for tag, text in self.texts if tag != "style").split())


@pytest.fixture(scope="module")
def nasty(tmp_path_factory: pytest.TempPathFactory) -> str:
    folder = tmp_path_factory.mktemp("hostile")
    report = reported(hostile(folder), checked(BUNDLE), workings=True)
    return html(Report(report.title, report.rigs, Unread((MARKUP, LINKS))))


def test_a_hostile_text_makes_no_markup_and_is_shown_as_it_was_written(nasty: str) -> None:
    page = Page(nasty)
    assert {tag for tag, _ in page.tags} <= ALLOWED
    shown = page.words()
    for written in (MARKUP, LINKS, LONG, RIGHT_TO_LEFT, *BEGINNINGS):
        assert written in shown


def test_the_file_runs_nothing_and_reaches_for_nothing(nasty: str) -> None:
    page = Page(nasty)
    for tag, attributes in page.tags:
        assert not [name for name in attributes if name.startswith("on") or name in ("href", "src", "action", "style")]
        if tag != "svg":
            assert not [value for value in attributes.values() if value and "://" in value]
    [style] = [text for tag, text in page.texts if tag == "style"]
    assert not re.search(r"url\(|@import|@font-face", style)
    policy = next(one for one in page.all("meta") if one.get("http-equiv"))
    assert policy["content"] == "default-src 'none'; style-src 'unsafe-inline'"
    own = html(reported(checked(PUMP), workings=True))
    assert set(re.findall(r"https?://[^\s\"<]+", own)) == {"http://www.w3.org/2000/svg"}


def test_a_screen_reader_finds_language_headings_and_what_each_column_and_row_is(nasty: str) -> None:
    page = Page(nasty)
    assert page.all("html") == [{"lang": "en"}]
    levels = [int(tag[1]) for tag, _ in page.tags if re.fullmatch(r"h\d", tag)]
    assert levels.count(1) == 1
    assert all(after <= before + 1 for before, after in itertools.pairwise(levels))
    assert {one.get("scope") for one in page.all("th")} == {"row", "col"}
    assert len(page.all("caption")) == len([one for one in page.all("table") if one.get("role") != "presentation"])
    assert all(one["role"] == "img" and one["aria-labelledby"] for one in page.all("svg"))


def test_every_name_is_given_once_even_to_equal_rigs() -> None:
    page = Page(html(reported(checked(PUMP), checked(PUMP))))
    names = [one["id"] for _, one in page.tags if "id" in one]
    assert len(names) == len(set(names))
    wanted = [name for _, one in page.tags for name in (one.get("aria-labelledby") or "").split()]
    assert set(wanted) <= set(names)


def test_every_page_of_paper_is_headed_by_what_identifies_the_rig() -> None:
    written = html(reported(signed(checked(PUMP), 2, 1)))
    head = re.search(r'<table class="page" role="presentation">\n<thead><tr><td>(.*?)</td></tr></thead>', written)
    assert head is not None
    for part in ("FAIL: TV-05, revision 3", checked(PUMP).digests[1][:16], "rigslate 9.9.9", "S0", "STALE"):
        assert part in head[1]
    # A browser repeats a table's head on each page only where nothing turns the table into something else.
    assert not re.search(r"\.page[^{]*\{[^}]*display", written)


def test_a_verdict_is_a_word_and_has_a_frame_of_its_own_beside_its_colour() -> None:
    written = html(reported(checked(PUMP)))
    verdicts = re.findall(r'<tbody class="(\w+)">\n<tr><td class="verdict"><b>([A-Z ]+)</b></td>', written)
    assert {word for _, word in verdicts} == {"PASS", "FAIL", "OPEN", "NOT COUNTED"}
    assert all(word.startswith(kind) for kind, word in verdicts)
    for kind in ("FAIL", "OPEN", "PASS", "NOT"):
        rule = re.search(rf"^\.{kind} b\{{(.*)\}}$", written, re.MULTILINE)
        assert rule is not None
        assert "border" in rule[1]


def test_each_rig_begins_on_a_page_of_its_own() -> None:
    written = html(reported(checked(PUMP), checked(BUNDLE)))
    assert written.count('<section class="rig"') == 2
    assert ".rig+.rig{break-before:page}" in written
    assert "@page{" in written
    assert not re.search(r"size\s*:\s*(A4|letter)", written, re.IGNORECASE)  # whatever paper is in the printer


def test_three_curves_a_rig_stand_in_the_file() -> None:
    page = Page(html(reported(checked(PUMP))))
    assert len(page.all("svg")) == 3
    assert "peak 15,846 lbf" in page.words()


def test_a_path_that_holds_anything_is_shown(tmp_path: Path) -> None:
    folder = tmp_path / "a & <b>"
    folder.mkdir()
    path = folder / "bare.toml"
    path.write_text('format = 1\n[rig]\nname = "Bare"\n[drop]\ndate = 2026-12-07\n', encoding="utf-8")
    assert "a & <b>" in Page(html(reported(checked(path)))).words()
