"""The model, asked by the screens' workers. Each import happens when it is first needed, off the screen's thread."""



from __future__ import annotations

from datetime import datetime
from pathlib import Path
from typing import TYPE_CHECKING, Literal

from tui.answering import Draft
from tui.services import CannotReadError, Found, NotWrittenError, Remedy, looks_like_rigs

if TYPE_CHECKING:
    from model.checks.finding import Checklist, Finding
    from model.quantity import UnitSystem
    from model.rig.errors import InputError


def _problems(error: InputError) -> list[str]:
    return [str(problem) for problem in error.problems]


class ModelServices:
    """The real model; see `tui.services.Services` for what each function does."""

    def find(self, path: Path) -> Found:
        """The rigs below a folder, or the one rig of a file."""
        from model.rig.errors import InputError
        from model.rig.reading import find_rigs

        if path.is_file():
            return Found((path,))
        try:
            found = find_rigs(path)
        except InputError as error:
            raise CannotReadError(_problems(error)) from error
        by_file: dict[Path, list[str]] = {}
        for problem in found.problems:
            by_file.setdefault(Path(problem.file), []).append(problem.message)
        if not found.rigs and not by_file:
            raise CannotReadError([f"{path}: no rig file here"])
        unread = [path for path in by_file if path.is_dir()]
        if not found.rigs and len(unread) == len(by_file):
            raise CannotReadError([str(problem) for problem in found.problems])
        return Found(found.rigs, tuple((file, "; ".join(texts)) for file, texts in by_file.items()))

    def glance(self, folder: Path) -> tuple[Path, ...]:
        """What look like rigs below a folder."""
        return looks_like_rigs(folder)

    def inputs(self, rig: Path) -> tuple[Path, ...]:
        """The rig file, its record and its limit set."""
        import tomllib

        from model.rig.record import record_path

        files = [rig, record_path(rig)]
        try:
            limits = tomllib.loads(rig.read_text(encoding="utf-8")).get("limits")
        except (OSError, ValueError):
            limits = None
        if isinstance(limits, str) and "\0" not in limits:
            files.append(rig.parent / limits)
        return tuple(files)

    def check(self, rig: Path) -> Checklist:
        """The checklist of a rig."""
        from model.checks.checklist import check
        from model.rig.errors import InputError

        try:
            return check(rig)
        except InputError as error:
            raise CannotReadError(_problems(error)) from error

    def remedies(self, finding: Finding, system: UnitSystem) -> tuple[Remedy, ...]:
        """What would make a failing step pass."""
        from model.study.remedy import what_would_pass

        return tuple(Remedy(*found) for found in what_would_pass(finding, system))

    def working(self, checklist: Checklist, finding: Finding, system: UnitSystem) -> list[str]:
        """The lines that lead to a computed step's number."""
        from model.report.other_methods import other_methods_lines
        from model.report.working import working_text

        return [*working_text(finding, system), *other_methods_lines(finding, checklist.details, system)]

    def write(self, rig: Path, checklist: Checklist, draft: Draft, when: datetime) -> None:
        """Append an answer or a withdrawal to the record beside the rig."""
        from importlib.metadata import PackageNotFoundError, version

        from model.rig.entry import Entry
        from model.rig.errors import InputError
        from model.rig.record import append, record_path
        from model.rig.standing import content_digest

        finding = next(one for one in checklist.findings if one.key == draft.key)
        covers = finding.inspection.covers if finding.inspection is not None else ()
        try:
            made_by = version("rigslate")
        except PackageNotFoundError:
            made_by = "unknown"
        kind: Literal["answer", "withdrawal"] = "withdrawal" if draft.choice == "withdrawal" else "answer"
        try:
            # The answer stands on what was shown, not on what the file may have become since.
            shown, limits = checklist.content
            entry = Entry(
                kind=kind,
                key=draft.key,
                answer=None if draft.choice == "withdrawal" else draft.choice,
                value=draft.value or "",
                remark=draft.remark or "",
                who=draft.who or "",
                second=draft.second or "",
                when=when,
                version=made_by,
                covers=covers if kind == "answer" and covers else None,
                on=content_digest(kind, draft.key, covers, shown, limits),
            )
            append(record_path(rig), entry)
        except InputError as error:
            raise NotWrittenError("; ".join(_problems(error))) from error
        except OSError as error:
            raise NotWrittenError(f"{error.strerror or error} ({record_path(rig).name})") from error

    def now(self) -> datetime:
        """The time of day, with its zone."""
        return datetime.now().astimezone().replace(microsecond=0)
