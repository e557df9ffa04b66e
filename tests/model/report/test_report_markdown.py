"""The report as Markdown, read back by a Markdown reader."""

from __future__ import annotations

import re
from collections.abc import Iterator

import pytest
from hypothesis import given
from hypothesis import strategies as st
from markdown_it import MarkdownIt
from markdown_it.token import Token

from model.report.as_markdown import escaped, markdown
from model.report.document import Report, Unread
from model.report.prose import clean, isolated
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
)

PLAIN = {"text", "softbreak", "hardbreak", "strong_open", "strong_close", "em_open", "em_close"}
"""What stands within a paragraph or a cell of a report."""


def tokens(written: str) -> list[Token]:
    return MarkdownIt("gfm-like", {"html": True}).parse(written)


def inline(parsed: list[Token]) -> Iterator[Token]:
    for token in parsed:
        yield from token.children or ()


def shown(written: str) -> str:
    return "".join(token.content if token.type == "text" else " " for token in inline(tokens(written)))


@pytest.fixture(scope="module")
def nasty(tmp_path_factory: pytest.TempPathFactory) -> str:
    report = reported(hostile(tmp_path_factory.mktemp("hostile")), workings=True)
    return markdown(Report(report.title, report.rigs, Unread((MARKUP, LINKS))))


def test_a_hostile_text_makes_no_markup_and_is_shown_as_it_was_written(nasty: str) -> None:
    parsed = tokens(nasty)
    assert not [token for token in parsed if token.type in ("html_block", "blockquote_open", "code_block")]
    assert {token.type for token in inline(parsed)} <= PLAIN
    assert all(token.info == "text" for token in parsed if token.type == "fence")
    for written in (MARKUP, LINKS, LONG, RIGHT_TO_LEFT, *BEGINNINGS):
        assert written in shown(nasty)


def test_every_row_of_a_table_has_as_many_cells_as_its_head(nasty: str) -> None:
    for table in re.findall(r"(?:^\|.*\n)+", nasty, re.MULTILINE):
        counts = {len(re.findall(r"(?<!\\)(?:\\\\)*\|", row)) for row in table.splitlines()}
        assert len(counts) == 1


def test_headings_are_those_of_the_report_alone() -> None:
    parsed = tokens(markdown(reported(checked(PUMP), checked(BUNDLE))))
    titles = [parsed[i + 1].content for i, token in enumerate(parsed) if token.type == "heading_open"]
    assert titles[0] == "Rigging checks of 2 loads"
    assert titles.count("Checklist") == 2
    assert titles.count("TV-05, revision 3: Borehole pump, plateau") == 1


def test_curves_stand_in_blocks_of_plain_ascii() -> None:
    fences = [token for token in tokens(markdown(reported(checked(PUMP)))) if token.type == "fence"]
    assert len(fences) == 3
    assert all(token.content.isascii() for token in fences)
    assert all(len(line) <= 78 for token in fences for line in token.content.split("\n"))


def test_every_section_says_whose_it_is() -> None:
    written = markdown(reported(checked(PUMP)))
    for section in re.split(r"^#{2,3} ", written, flags=re.MULTILINE)[1:]:
        assert checked(PUMP).digests[1][:16] in section[:400]
        assert "*not signed*" in section[:400]


@given(st.text(alphabet=st.characters(codec="utf-8") | st.sampled_from("\\`*_{}[]()<>#+-.!|~&@:/ws1\n")))
def test_any_text_comes_back_from_a_cell_a_list_and_a_paragraph_as_it_was(words: str) -> None:
    text = clean(words)
    if not text:
        return
    for frame in ("- {}\n", "{}\n", "**x** {}\n", "| a | b |\n| --- | --- |\n| {} | z |\n"):
        parsed = tokens(frame.format(escaped(words)))
        assert {token.type for token in inline(parsed)} <= PLAIN
        found = "".join(token.content if token.type == "text" else "\n" for token in inline(parsed))
        assert isolated(words).strip() in found.replace("\u200b", "")
