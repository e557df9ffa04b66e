"""The documentation is what the code says, its links lead somewhere, and the tree holds nothing it may not hold."""

from __future__ import annotations

import os
import re
import tomllib
from collections.abc import Iterator
from pathlib import Path
from types import ModuleType

import pytest

from docs.blocks import fill
from docs.make_files import DEFINITIONS, FILES, MISSING, child
from docs.make_glossary import Quantity, quantities
from docs.make_pages import SCRIPTS
from docs.make_validation import files as published
from model.checks.registry import BY_ROW, FIXED
from model.rig.reading import read_limits, read_rig
from model.rig.stick import read_stick

ROOT = Path(__file__).parent.parent
PAGES = sorted([*ROOT.glob("*.md"), *(ROOT / "docs").glob("*.md")])
EXAMPLES = re.findall(r"```toml\n(.*?)```", (ROOT / "docs" / "files.md").read_text(encoding="utf-8"), re.DOTALL)
FOLDERS = ("model", "tui", "tests", "rigs", "docs", ".ci")
TEXT = {".py", ".md", ".toml", ".tcss", ".txt", ".svg", ".html", "", ".cfg", ".ini"}


def tree() -> Iterator[Path]:
    """Every text file of the repository, without what tools leave behind."""
    yield from (path for path in ROOT.iterdir() if path.is_file() and path.suffix in TEXT and path.name != ".git")
    for folder in FOLDERS:
        for path in (ROOT / folder).rglob("*"):
            if path.is_file() and path.suffix in TEXT and "__pycache__" not in path.parts:
                yield path


def found(pattern: str, paths: Iterator[Path]) -> list[str]:
    """Lines that match a pattern, as file:line: text."""
    search = re.compile(pattern).search
    return [
        f"{path.relative_to(ROOT)}:{number}: {line.strip()[:80]}"
        for path in paths
        for number, line in enumerate(path.read_text(encoding="utf-8").splitlines(), 1)
        if search(line)
    ]


@pytest.mark.parametrize("script", SCRIPTS, ids=lambda script: script.PAGE)
def test_generated_parts_are_what_the_code_says(script: ModuleType) -> None:
    written = (ROOT / "docs" / script.PAGE).read_text(encoding="utf-8")
    assert written == script.rendered(), "write it anew: python -m docs.make_pages"


def test_no_generated_part_is_without_its_script() -> None:
    pages = {
        page.name for page in PAGES if re.search(r"^<!-- generated: ", page.read_text(encoding="utf-8"), re.MULTILINE)
    }
    assert pages == {script.PAGE for script in SCRIPTS}


def test_a_block_is_written_anew_and_the_rest_left_alone() -> None:
    page = "a\n<!-- generated: x -->\n\nold\n<!-- end -->\nb\n<!-- generated: y -->\n<!-- end -->\n"
    new = fill(page, {"x": "new\n", "y": "more"})
    assert new == "a\n<!-- generated: x -->\n\nnew\n\n<!-- end -->\nb\n<!-- generated: y -->\n\nmore\n\n<!-- end -->\n"
    assert fill(new, {"x": "new\n", "y": "more"}) == new


@pytest.mark.parametrize("blocks", [{"x": ""}, {"x": "", "y": "", "z": ""}, {}])
def test_a_block_that_is_missing_on_either_side_is_refused(blocks: dict[str, str]) -> None:
    page = "<!-- generated: x -->\n<!-- end -->\n<!-- generated: y -->\n<!-- end -->\n"
    with pytest.raises(ValueError, match="blocks of the page"):
        fill(page, blocks)


@pytest.mark.parametrize("quantity", quantities(), ids=lambda one: one.meaning)
def test_a_quantity_has_one_symbol_one_unit_one_name(quantity: Quantity) -> None:
    assert len(quantity.symbols) == 1
    assert len(quantity.units) == 1
    assert len(quantity.names) <= 1


def test_what_is_taken_for_a_missing_key_is_said_of_optional_keys() -> None:
    optional = set()
    waiting = [model for model, _ in FILES.values()]
    while waiting:
        model = waiting.pop()
        for key, field in model.model_fields.items():
            waiting.extend(below for below in [child(field)] if below is not None)
            if not field.is_required():
                optional.add(f"{model.__name__}.{key}")
    assert set(MISSING) <= optional


def test_every_step_is_defined_and_no_other() -> None:
    assert set(DEFINITIONS) == {*(step.key for step in FIXED), *BY_ROW}


def test_validation_names_every_file_of_outside_checks() -> None:
    page = (ROOT / "docs" / "validation.md").read_text(encoding="utf-8")
    missing = [path.name for path in published() if f"`tests/published/{path.name}`" not in page]
    assert published()
    assert not missing


def test_every_outside_check_names_a_source() -> None:
    page = (ROOT / "docs" / "validation.md").read_text(encoding="utf-8")
    sections = page.partition("## Every outside check")[2].split("### ")[1:]
    silent = [section.split("\n")[0] for section in sections if all("as above" in row for row in _rows(section))]
    assert not silent


def _rows(section: str) -> list[str]:
    return [line for line in section.splitlines() if line.startswith("| ")][2:]


@pytest.mark.parametrize("example", EXAMPLES, ids=range(len(EXAMPLES)))
def test_examples_of_the_file_formats_are_read(example: str, tmp_path: Path) -> None:
    path = tmp_path / "example.toml"
    path.write_text(example, encoding="utf-8")
    tables = tomllib.loads(example)
    if "rig" in tables:
        assert read_rig(path).rig.rig.name == tables["rig"]["name"]
    elif "set" in tables:
        assert read_limits(path).limits.set.name == tables["set"]["name"]
    elif "stick" in tables:
        assert len(read_stick(path).rigs) == len(tables["load"])
    else:
        assert set(tables) == {"left_out"}


def _anchors(page: Path) -> set[str]:
    headings = re.findall(r"^#+ (.*)$", page.read_text(encoding="utf-8"), re.MULTILINE)
    return {re.sub(r"[^\w\- ]", "", heading.lower()).strip().replace(" ", "-") for heading in headings}


@pytest.mark.parametrize("page", PAGES, ids=lambda path: path.name)
def test_links_lead_somewhere(page: Path) -> None:
    text = re.sub(r"```.*?```", "", page.read_text(encoding="utf-8"), flags=re.DOTALL)
    for target in re.findall(r"\]\(([^)\s]+)\)", text):
        if target.startswith(("http:", "https:", "mailto:")):
            continue
        file, _, anchor = target.partition("#")
        linked = page.parent / file if file else page
        assert linked.exists(), target
        assert not anchor or anchor in _anchors(linked), target


def test_the_readme_command_is_the_one_that_ci_runs() -> None:
    wanted = [line.strip() for line in (ROOT / "README.md").read_text().splitlines() if "pytest -q" in line]
    ran = [line.strip() for line in (ROOT / ".ci" / "run").read_text().splitlines() if "pytest -q" in line]
    described = [line.strip() for line in (ROOT / "DEVELOPERS.md").read_text().splitlines() if "pip install" in line]
    assert len(wanted) == 1
    assert wanted == ran == described
    assert os.access(ROOT / ".ci" / "run", os.X_OK)


def test_no_machine_and_no_registry_is_named() -> None:
    assert not found(r"/wor[k]/|/tm[p]/[a-z]|index[-]url|\.\./share[d]|share[d]/handboo[k]", tree())


def test_where_the_subject_came_from_is_not_mentioned() -> None:
    pages = (path for path in tree() if path.name != "DEVELOPERS.md")
    assert not found(r"(?i)transcri[p]t|seed[ ]document|the[ ]tal[k]\b|\bvide[o]|youtub[e]|lectur[e]", pages)


def test_nothing_is_left_to_do_and_no_test_is_passed_over() -> None:
    sources = (path for path in tree() if path.suffix == ".py")
    assert not found(r"TOD[O]\b|FIXM[E]|mark\.(ski[p]|xfai[l])|pytest\.(ski[p]|xfai[l]|importorski[p])", sources)


def test_no_equipment_designation_in_product_and_demo() -> None:
    product = (path for path in tree() if path.relative_to(ROOT).parts[0] in ("model", "tui", "rigs", "README.md"))
    assert not found(r"\b[AGTM]-\d{1,2}[A-Z]?\b", product)


@pytest.mark.parametrize("folder", ["model", "tui"])
def test_files_are_short(folder: str) -> None:
    lengths = {path: len(path.read_text(encoding="utf-8").splitlines()) for path in (ROOT / folder).rglob("*.py")}
    assert not {str(path.relative_to(ROOT)): length for path, length in lengths.items() if length > 320}
