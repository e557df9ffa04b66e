"""Write the outside checks into validation.md from the tests themselves: ``python -m docs.make_validation``.

A check is a test function of tests/published. Its source is what its own comments say, and those of the module's
constants and helpers that it uses; its agreement is what its comparisons allow.
"""

from __future__ import annotations

import ast
import io
import re
import tokenize
from collections.abc import Iterator
from pathlib import Path

from docs.blocks import FOLDER, fill, table, write

PAGE = "validation.md"
CHECKS = FOLDER.parent / "tests" / "published"
DIRECTIVE = re.compile(r"(fmt|type|noqa|ruff)\b")
NUMBER = re.compile(r"\d[\d.]*(?:e-?\d+)?")
CLOSE = {"approx", "allclose", "assert_allclose", "isclose"}
"""Functions that compare within a tolerance."""
KINDS = {"rel": "relative", "rel_tol": "relative", "rtol": "relative", "abs": "", "abs_tol": "", "atol": ""}

Statement = ast.stmt


def files() -> list[Path]:
    """The files of outside checks."""
    return sorted(CHECKS.glob("test_*.py"))


class Checks:
    """The checks of one file."""

    def __init__(self, path: Path) -> None:
        self.source = path.read_text(encoding="utf-8")
        self.tree = ast.parse(self.source)
        self.comments = dict(_comments(self.source))
        self.statements = {name: one for one in self.tree.body for name in _names(one)}

    @property
    def about(self) -> str:
        """What the file checks."""
        return " ".join((ast.get_docstring(self.tree) or "").split())

    def tests(self) -> Iterator[ast.FunctionDef]:
        """Its test functions."""
        for one in self.tree.body:
            if isinstance(one, ast.FunctionDef) and one.name.startswith("test_"):
                yield one

    def sources(self, test: ast.FunctionDef) -> str:
        """Every comment that belongs to a test, its own first."""
        found = {text: None for one in (test, *self._used(test)) for text in self._said(one)}
        return " ".join(found)

    def _used(self, test: Statement) -> list[Statement]:
        """The module's constants and helpers that a test uses, in the order they are written in."""
        known: dict[int, Statement] = {}
        waiting = [test]
        while waiting:
            for node in ast.walk(waiting.pop()):
                one = self.statements.get(node.id) if isinstance(node, ast.Name) else None
                if one is not None and one is not test and one.lineno not in known:
                    known[one.lineno] = one
                    waiting.append(one)
        return [known[line] for line in sorted(known)]

    def _said(self, one: Statement) -> list[str]:
        first = min([one.lineno, *(each.lineno for each in getattr(one, "decorator_list", []))])
        above = first
        while above - 1 in self.comments and above - 1 not in self._ends():
            above -= 1
        lines = [line for line in range(above, (one.end_lineno or first) + 1) if line in self.comments]
        return _paragraphs(self.comments, lines) + self._described(one)

    def _ends(self) -> set[int]:
        """Lines on which a statement of the module ends."""
        return {one.end_lineno or one.lineno for one in self.tree.body}

    def _described(self, one: Statement) -> list[str]:
        """The text under a constant, or the docstring of a function."""
        if isinstance(one, ast.FunctionDef):
            return [" ".join(text.split())] if one.name.startswith("test_") and (text := ast.get_docstring(one)) else []
        after = self.tree.body[self.tree.body.index(one) + 1 :][:1]
        text = after[0].value if after and isinstance(after[0], ast.Expr) else None
        return [" ".join(str(text.value).split())] if isinstance(text, ast.Constant) else []

    def agreement(self, test: ast.FunctionDef) -> str:
        """What its comparisons allow."""
        calls = [node for node in ast.walk(test) if isinstance(node, ast.Call) and _called(node) in CLOSE]
        found = dict.fromkeys(text for call in calls for text in self._allowed(call))
        choices = {id(node.test) for node in ast.walk(test) if isinstance(node, ast.IfExp)}
        compares = [node for node in ast.walk(test) if isinstance(node, ast.Compare) and id(node) not in choices]
        compared = [op for node in compares for op in node.ops]
        if any(isinstance(op, ast.Lt | ast.LtE | ast.Gt | ast.GtE) for op in compared):
            found["within bounds"] = None
        return ", ".join(found) or "exact"

    def _allowed(self, call: ast.Call) -> Iterator[str]:
        """The tolerances of one comparison; pytest's own where it names none."""
        named = [one for one in call.keywords if one.arg in KINDS]
        if not named:
            yield "1e-6 relative"
        for one in named:
            size = self._size(one.value)
            yield f"{size} {KINDS[one.arg or '']}".strip() if size[0].isdigit() else size

    def _size(self, value: ast.expr) -> str:
        """A tolerance in words."""
        if isinstance(value, ast.IfExp):
            return f"{self._size(value.body)} or {self._size(value.orelse)}"
        text = ast.get_source_segment(self.source, value) or ""
        if NUMBER.fullmatch(text):
            return text
        return "the digits printed" if "printed" in text else "as its row says"


def _called(call: ast.Call) -> str:
    return call.func.attr if isinstance(call.func, ast.Attribute) else getattr(call.func, "id", "")


def _comments(source: str) -> Iterator[tuple[int, str]]:
    for token in tokenize.generate_tokens(io.StringIO(source).readline):
        text = token.string.lstrip("# ").strip()
        if token.type == tokenize.COMMENT and text and not DIRECTIVE.match(text):
            yield token.start[0], text


def _names(one: Statement) -> list[str]:
    if isinstance(one, ast.FunctionDef | ast.ClassDef):
        return [one.name]
    targets = one.targets if isinstance(one, ast.Assign) else [one.target] if isinstance(one, ast.AnnAssign) else []
    return [node.id for target in targets for node in ast.walk(target) if isinstance(node, ast.Name)]


def _paragraphs(comments: dict[int, str], lines: list[int]) -> list[str]:
    """Comments on lines that follow each other, joined."""
    found: list[str] = []
    for line in lines:
        if line - 1 in lines and found:
            found[-1] += f" {comments[line]}"
        else:
            found.append(comments[line])
    return [text if text.endswith((".", "?")) else f"{text}." for text in found]


def _title(name: str) -> str:
    words = name.removeprefix("test_").replace("_", " ")
    return words[0].upper() + words[1:]


def _file(path: Path) -> str:
    checks = Checks(path)
    rows = [[_title(one.name), checks.sources(one) or "as above", checks.agreement(one)] for one in checks.tests()]
    head = ["check", "figures and their source", "agreement"]
    return f"### `tests/published/{path.name}`\n\n{checks.about}\n\n{table(head, rows)}"


def rendered() -> str:
    """The page as it has to be."""
    block = "\n".join(_file(path) for path in files())
    return fill((FOLDER / PAGE).read_text(encoding="utf-8"), {"checks": block})


if __name__ == "__main__":
    write(PAGE, rendered)
