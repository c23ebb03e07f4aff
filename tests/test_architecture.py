"""The rooms keep to what they may do: purity, size, names, docstrings."""

from __future__ import annotations

import ast
import re
from pathlib import Path

import pytest

import generator

PACKAGE = Path(generator.__file__).parent
CORE = ("metrics", "crosschecks", "conformity", "comparison")
MODULES = sorted(PACKAGE.rglob("*.py"))


def names(paths: list[Path]) -> list[str]:
    return [str(path.relative_to(PACKAGE)) for path in paths]


def calls(tree: ast.AST) -> set[str]:
    found = set()
    for node in ast.walk(tree):
        if isinstance(node, ast.Call):
            found.add(ast.unparse(node.func))
    return found


CORE_MODULES = [path for path in MODULES if path.relative_to(PACKAGE).parts[0] in CORE]
FORBIDDEN = re.compile(
    r"^(open|print|input|.*\.(today|now|utcnow|time|monotonic|perf_counter)|os\..*|random\..*"
    r"|np\.random\.(seed|rand|randn|random|normal|uniform))$"
)


@pytest.mark.parametrize("path", CORE_MODULES, ids=names(CORE_MODULES))
def test_core_rooms_touch_no_file_clock_or_terminal(path: Path) -> None:
    tree = ast.parse(path.read_text(encoding="utf-8"))
    assert not {name for name in calls(tree) if FORBIDDEN.match(name)}


def test_core_rooms_are_searched_at_all() -> None:
    assert len(CORE_MODULES) > 10


@pytest.mark.parametrize("path", MODULES, ids=names(MODULES))
def test_no_module_outgrows_a_reader(path: Path) -> None:
    assert len(path.read_text(encoding="utf-8").splitlines()) <= 600


@pytest.mark.parametrize("path", MODULES, ids=names(MODULES))
def test_names_are_trade_words(path: Path) -> None:
    banned = {"utils", "helpers", "common", "manager", "processor", "misc"}
    assert not banned & set(path.relative_to(PACKAGE).with_suffix("").parts)


def test_colour_science_is_no_part_of_the_engine() -> None:
    for path in MODULES:
        tree = ast.parse(path.read_text(encoding="utf-8"))
        imported = {
            alias.name.split(".")[0]
            for node in ast.walk(tree)
            if isinstance(node, ast.Import)
            for alias in node.names
        } | {
            (node.module or "").split(".")[0]
            for node in ast.walk(tree)
            if isinstance(node, ast.ImportFrom)
        }
        assert "colour" not in imported, path


def test_public_functions_and_classes_have_docstrings() -> None:
    missing = []
    for path in MODULES:
        tree = ast.parse(path.read_text(encoding="utf-8"))
        missing += [
            f"{path.relative_to(PACKAGE)}:{node.name}"
            for node in tree.body
            if isinstance(node, ast.FunctionDef | ast.ClassDef)
            and not node.name.startswith("_")
            and ast.get_docstring(node) is None
        ]
    assert missing == []
