"""An invented rig and a model that answers at once, for tests of the screens."""

from __future__ import annotations

import asyncio
from collections.abc import Callable
from contextlib import suppress
from dataclasses import dataclass, field, replace
from datetime import UTC, datetime
from pathlib import Path

from textual import events
from textual.message_pump import MessagePump

from model.checks.finding import (
    Answer,
    Checklist,
    Finding,
    Inspection,
    Kind,
    Limit,
    Signature,
    Verdict,
)
from model.checks.term import Procedure, Term
from model.quantity import UnitSystem
from tui.answering import Draft
from tui.app import RigslateApp
from tui.commands import Keys
from tui.services import CannotReadError, Found, NotWrittenError, Remedy

MORNING = datetime(2026, 9, 14, 8, 30, tzinfo=UTC)


def computed(
    key: str,
    title: str,
    value: float | None,
    unit: str,
    limit: Limit | None,
    verdict: Verdict,
    *,
    shown_in: str | None = None,
    reason: str = "",
    cautions: tuple[str, ...] = (),
) -> Finding:
    """A computed step with a short working."""
    margin = limit.margin(value) if limit is not None and value is not None else None
    mass = Term(975.2, "m", "falling mass", "mass", "lb", "rig file")
    how = Procedure("V = sqrt(2 m g0/(rho CdS))", lambda m: m, "derived: closed form")
    result = Term(value or 0.0, "V", title.lower(), "number", None, "", how, (mass,)) if value is not None else None
    return Finding(
        key, title, Kind.COMPUTED, key.split(".", maxsplit=1)[0], verdict, reason, value, unit, limit, margin, cautions,
        result, shown_in,
    )  # fmt: skip


def inspected(key: str, ask: str, *, answer: Answer | None = None, **asked: object) -> Finding:
    """An inspected step."""
    verdict, reason = Verdict.OPEN, "not inspected yet"
    if answer is not None:
        verdict = {"pass": Verdict.PASS, "fail": Verdict.FAIL}.get(answer.answer, Verdict.NOT_COUNTED)
        reason = "" if answer.answer == "pass" else answer.remark
    return Finding(
        key, ask, Kind.INSPECTED, key.split(".", maxsplit=1)[0], verdict, reason,
        inspection=Inspection(ask, **asked), answer=answer,  # type: ignore[arg-type]
    )  # fmt: skip


def findings() -> tuple[Finding, ...]:
    """One rig's steps: some pass, one fails, some are open."""
    rate = Limit(None, 8.6868, "house rule 4", "ft/s")
    return (
        computed("load.mass", "Rigged mass", 975.2, "kg", Limit(None, 1100.0, "house rule 1", "lb"), Verdict.PASS,
                 shown_in="lb"),
        computed("load.height", "Rigged height", 1.6, "m", Limit(None, 2.0, "house rule 2", "in"), Verdict.PASS),
        computed("balance.forward", "Centre of gravity, forward", 0.03, "m", Limit(-0.1, 0.15, "house rule 3", "in"),
                 Verdict.PASS, shown_in="in"),
        computed("descent.rate", "Rate of descent at the drop zone", 8.97, "m/s", rate, Verdict.FAIL, shown_in="ft/s",
                 cautions=("table figure, from memory",)),
        computed("opening.load_factor", "Load factor at opening", 5.1, "g0", None, Verdict.OPEN, reason="no limit set"),
        computed("zone.density_altitude", "Density altitude", 1100.0, "m", None, Verdict.NOT_COUNTED,
                 reason="for information"),
        inspected("canopy.bag_ties", "Bag closing ties: material, turns, none missing", stage="rigging", stop=True,
                  wants_value="turns", caution="Nylon in place of cotton will not break."),
        inspected("canopy.release", "Release: armed, pin seen", two_person=True),
        inspected("lashing.tight", "Lashings: tight, ends stowed"),
    )  # fmt: skip


@dataclass
class FakeServices:
    """A model that answers at once and writes into a list."""

    checklists: dict[Path, Checklist] = field(default_factory=dict)
    problems: dict[Path, str] = field(default_factory=dict)
    unread: dict[Path, str] = field(default_factory=dict)
    entries: list[tuple[Path, Draft, datetime]] = field(default_factory=list)
    refuse: str = ""
    hold: Callable[[], None] | None = None
    checks: list[Path] = field(default_factory=list)
    finds: int = 0

    def find(self, path: Path) -> Found:
        """All rigs known, or the one asked for."""
        self.finds += 1
        if path in self.checklists or path in self.problems:
            return Found((path,))
        rigs = tuple(sorted({*self.checklists, *self.problems}))
        if not rigs and not self.unread:
            raise CannotReadError([f"{path}: no rig file here"])
        return Found(rigs, tuple(self.unread.items()))

    def glance(self, folder: Path) -> tuple[Path, ...]:
        """All rigs that can be read."""
        return tuple(sorted(self.checklists))

    def inputs(self, rig: Path) -> tuple[Path, ...]:
        """The rig file alone."""
        return (rig,)

    def check(self, rig: Path) -> Checklist:
        """The checklist with the answers given so far."""
        self.checks.append(rig)
        if self.hold is not None:
            self.hold()
        if rig in self.problems:
            raise CannotReadError([self.problems[rig]])
        made = self.checklists[rig]
        for path, draft, when in self.entries:
            if path == rig:
                made = replace(made, findings=tuple(_answered(one, draft, when) for one in made.findings))
        return made

    def remedies(self, finding: Finding, system: UnitSystem) -> tuple[Remedy, ...]:
        """One remedy."""
        return (Remedy("rigged mass below", "2,024 lb", "2,150 lb"), Remedy("drop zone below", "-120 ft", "1,640 ft"))

    def working(self, checklist: Checklist, finding: Finding, system: UnitSystem) -> list[str]:
        """Some lines."""
        return [f"line {number} of {finding.key} in {system}" for number in range(1, 41)]

    def write(self, rig: Path, checklist: Checklist, draft: Draft, when: datetime) -> None:
        """Keep the answer, or refuse it."""
        if self.refuse:
            raise NotWrittenError(self.refuse)
        self.entries.append((rig, draft, when))

    def now(self) -> datetime:
        """Always the same moment."""
        return MORNING


def _answered(finding: Finding, draft: Draft, when: datetime) -> Finding:
    if finding.key != draft.key or finding.inspection is None:
        return finding
    if draft.choice == "withdrawal":
        return replace(finding, verdict=Verdict.OPEN, reason="not inspected yet", answer=None)
    answer = Answer(draft.choice, draft.who or "", when, draft.second or "", draft.remark or "", draft.value or "")
    verdict = {"pass": Verdict.PASS, "fail": Verdict.FAIL}.get(draft.choice, Verdict.NOT_COUNTED)
    return replace(finding, verdict=verdict, reason="", answer=answer)


def checklist(file: Path, name: str = "Borehole pump on skid board", **changes: object) -> Checklist:
    """A checklist."""
    made = Checklist(
        str(file), name, "TV-014", 3, "Tarn relief, low velocity", findings(),
        signatures=(Signature("RB", MORNING, True),),
    )  # fmt: skip
    return replace(made, **changes)  # type: ignore[arg-type]


def services(folder: Path) -> FakeServices:
    """Three rigs and a file that is none."""
    made = FakeServices()
    for name in ("a-pump.toml", "b-bundle.toml"):
        (folder / name).write_text("[rig]\n")
        made.checklists[folder / name] = checklist(folder / name, name=name.split(".", maxsplit=1)[0])
    (folder / "c-pass.toml").write_text("[rig]\n")
    passing = tuple(one for one in findings() if one.verdict is Verdict.PASS)
    made.checklists[folder / "c-pass.toml"] = checklist(folder / "c-pass.toml", name="c-pass", findings=passing)
    made.problems[folder / "d-broken.toml"] = 'd-broken.toml:14: canopy row 1 (main).diameter: found "0 ft"'
    made.unread[folder / "e-notes.toml"] = "no [rig] table"
    return made


def app(path: Path, model: FakeServices, *, ascii_only: bool = False, colour: bool = True,
        keys: Keys | None = None, greeting: str = "", watch: float | None = None) -> RigslateApp:  # fmt: skip
    """The app with a clock for keys that always moves on, so that no key counts as a repeat."""
    ticks = iter(range(10**9))
    return RigslateApp(
        path, model, ascii_only=ascii_only, colour=colour, keys=keys, greeting=greeting, watch=watch,
        moment=lambda _: float(next(ticks)),
    )  # fmt: skip


_CHARACTERS = {"space": " ", "question_mark": "?", "full_stop": ".", "minus": "-"}


async def press(running: RigslateApp, *keys: str) -> None:
    """Press keys, each once the one before has done its work; much quicker than waiting for an idle processor."""
    for key in keys:
        event = events.Key(key, key if len(key) == 1 else _CHARACTERS.get(key))
        event.set_sender(running)
        running._driver.send_message(event)  # type: ignore[union-attr]
        for _ in range(3):
            await _handled(running)
            await _handled(running.screen)
            if running.focused is not None:
                await _handled(running.focused)


async def _handled(pump: MessagePump) -> None:
    """Wait until a message pump has worked off what it has."""
    done = asyncio.Event()
    pump.call_later(done.set)
    with suppress(TimeoutError):
        await asyncio.wait_for(done.wait(), 5)


async def settled(running: RigslateApp) -> str:
    """The screen once all workers are done and everything is drawn."""
    before = ""
    for _ in range(400):
        await running.workers.wait_for_complete()
        await _handled(running)
        await _handled(running.screen)
        begun = running.shelf.entries or running.folder_problems
        busy = running.book.left or any(worker.is_running for worker in running.workers)
        if begun and not busy and not running.front.about_to_draw:
            shown = text(running)
            if shown == before:
                break
            before = shown
        await asyncio.sleep(0.02)
    return text(running)


async def until(running: RigslateApp, words: str) -> str:
    """The screen once it says something, blanks and line ends apart."""
    for _ in range(250):
        if words in " ".join(text(running).split()):
            break
        await asyncio.sleep(0.02)
    shown = " ".join((await settled(running)).split())
    assert words in shown
    return shown


async def after(running: RigslateApp, *keys: str) -> str:
    """The screen after some keys."""
    for key in keys:
        await press(running, key)
        if key == "enter":
            await running.workers.wait_for_complete()
            await _handled(running)
            await _handled(running.screen)
    return await settled(running)


async def back_to_first(running: RigslateApp) -> None:
    """Leave all screens but the first, with the first rig marked."""
    while len(running.screen_stack) > 1:
        running.pop_screen()
        await _handled(running)
    await press(running, "1", "home")


def lines(running: RigslateApp) -> list[str]:
    """The screen as lines of text."""
    return [
        "".join(segment.text for segment in strip).rstrip()
        for strip in running.screen._compositor.render_strips()
    ]


def text(running: RigslateApp) -> str:
    """The screen as one text."""
    return "\n".join(lines(running))
