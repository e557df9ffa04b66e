"""The shelf as rows of text."""

from __future__ import annotations

from collections.abc import Sequence

from tui.caution import CAUTION
from tui.glyphs import Charset, clip, clip_front, fill, fill_left
from tui.rows import Row, Span, Tone, ends, paragraph, row
from tui.shelf import CANNOT_READ, Entry
from tui.widgets.board import MARKS

_WIDE = 72


def verdict_span(verdict: str, cells: int, chars: Charset) -> list[Span]:
    """A verdict: the word, then its sign; blanks fill the column."""
    if not verdict:
        return [Span(fill("calculating", cells, chars), "dim")]
    if verdict == CANNOT_READ:
        return [Span(fill(f"{verdict} !", cells, chars), "fail")]
    sign, tone = MARKS[verdict]
    return [Span(fill(f"{verdict} {sign}", cells, chars), tone)]


def columns(cells: int) -> tuple[int, int, int, int]:
    """Widths of name, verdict, worst margin and signatures."""
    verdict, worst, signed = 13, (22 if cells >= _WIDE else 8), 13
    return cells - 2 - verdict - worst - signed - 3, verdict, worst, signed


def head(folder: str, entries: Sequence[Entry], left: int, cells: int, chars: Charset) -> list[Row]:
    """Title, counts in words, and the heads of the columns."""
    counts = {word: sum(entry.verdict == word for entry in entries) for word in ("PASS", "FAIL", "OPEN", CANNOT_READ)}
    words: list[Span] = []
    tones: dict[str, Tone] = {"PASS": "pass", "FAIL": "fail", "OPEN": "open", CANNOT_READ: "fail"}
    for word, count in counts.items():
        if count:
            words.append(Span(f"{count} {word.lower() if word != CANNOT_READ else 'can' + chr(39) + 't be read'}   ",
                              tones[word]))  # fmt: skip
    state = row(Span(f"calculating {left}", "note")) if left else row()
    rigs = f"{len(entries)} rig{'s' if len(entries) != 1 else ''}"
    title = row(Span("Rigs", "title"), Span(f"  {clip_front(chars.clean(folder), cells - 20, chars)}", "dim"))
    return [ends(title, row(Span(rigs, "dim")), cells, chars), ends(tuple(words), state, cells, chars)]


def column_heads(cells: int, chars: Charset) -> Row:
    """The heads of the columns."""
    name, verdict, worst, signed = columns(cells)
    margin = "least margin" if worst > 12 else "margin"
    heads = zip(("rig", "verdict", margin, "signed"), (name, verdict, worst, signed), strict=True)
    return row(Span("  " + " ".join(fill(word, room, chars) for word, room in heads), "dim"))


def shelf_row(entry: Entry, *, here: bool, under_way: bool, cells: int, chars: Charset) -> Row:
    """One rig on one line."""
    name, verdict, worst, signed = columns(cells)
    summary = entry.summary
    title = entry.label
    if summary is not None and not entry.problems:
        title = f"{summary.reference}  {summary.name}" if summary.reference else summary.name
    spans: list[Span] = [
        Span(f"{chars.here} " if here else "  ", "title"),
        Span(fill(chars.clean(title), name, chars), "title" if here else "text"),
        Span(" "),
        *verdict_span("" if under_way else entry.verdict, verdict, chars),
        Span(" "),
        Span(fill("" if under_way else _worst(entry, worst, chars), worst, chars)),
        Span(" "),
        Span(fill("" if under_way else _signed(entry), signed, chars), "note" if _changed(entry) else "dim"),
    ]
    return tuple(spans)


def _worst(entry: Entry, cells: int, chars: Charset) -> str:
    if entry.problems or entry.summary is None:
        return ""
    if entry.summary.worst is None:
        return "none"
    key, _, margin = entry.summary.worst
    share = margin_share(margin)
    room = cells - 9
    return f"{fill_left(share, 8, chars)} {clip(chars.clean(key), room, chars)}" if room > 8 else share


def margin_share(margin: float) -> str:
    """A margin in per cent with its sign."""
    from model.report.wording import percent

    return f"-{percent(margin)}" if margin < 0 else percent(margin)


def _changed(entry: Entry) -> bool:
    return entry.summary is not None and any(stale for _, stale in entry.summary.signed)


def _signed(entry: Entry) -> str:
    if entry.problems or entry.summary is None:
        return ""
    if not entry.summary.signed:
        return "not signed"
    return "changed since" if _changed(entry) else "signed"


def detail(entry: Entry | None, *, under_way: bool, cells: int, chars: Charset) -> list[Row]:
    """What is known of the marked rig."""
    if entry is None:
        return []
    rows = [row(Span(clip_front(chars.clean(entry.label), cells, chars), "title"))]
    for problem in entry.problems:
        rows += paragraph(chars.clean(problem), cells, "fail", "  ")
    summary = entry.summary
    if under_way:
        return [*rows, row(Span("calculating", "note"))]
    if entry.problems or summary is None:
        return rows
    counts = "   ".join(f"{count} {word.lower()}" for word, count in summary.counts)
    sign, tone = MARKS[summary.verdict]
    rows.append(row(Span(f"{summary.verdict} {sign}", tone), f"   {counts}"))
    if summary.worst is not None:
        _, title, margin = summary.worst
        rows.append(row(*_clipped(f"least margin {margin_share(margin)}: ", chars.clean(title), cells, chars)))
    limits = chars.clean(summary.limit_set) or "none"
    rows.append(row(*_clipped("limit set ", limits, cells, chars)))
    who = ", ".join(f"{chars.clean(name)}{' (changed since)' if stale else ''}" for name, stale in summary.signed)
    rows += paragraph(f"signed by {who}" if who else "not signed", cells)
    if summary.stale:
        count = len(summary.stale)
        words = "1 answer was given before a change and is STALE" if count == 1 else (
            f"{count} answers were given before a change and are STALE")  # fmt: skip
        rows += paragraph(words, cells, "note")
    return [*rows, *paragraph(CAUTION, cells, "dim")]


def _clipped(lead: str, text: str, cells: int, chars: Charset) -> list[str]:
    return [lead, clip(text, max(cells - len(lead), 1), chars)]
