"""No number of the law stands in code: every literal is looked for in the leaves."""

from __future__ import annotations

import ast
import tomllib
from collections.abc import Iterator
from decimal import Decimal
from pathlib import Path
from typing import Any

import pytest

import generator

PACKAGE = Path(generator.__file__).parent
ORDINARY = {Decimal(number) for number in ("0", "1", "2", "3", "4", "100")}
"""Numbers that any code holds: indices, halves, percent, Simpson's rule."""

ALLOWED = {"exact_number.py": {Decimal(7), Decimal(12), Decimal(15), Decimal(30)}}
"""Counts of digits, which happen to be numbers of a leaf too."""


def numbers_in(value: Any) -> Iterator[Decimal]:
    if isinstance(value, bool):
        return
    if isinstance(value, int | Decimal):
        yield abs(Decimal(value))
    elif isinstance(value, list):
        for item in value:
            yield from numbers_in(item)
    elif isinstance(value, dict):
        for item in value.values():
            yield from numbers_in(item)


def law_numbers() -> set[Decimal]:
    found: set[Decimal] = set()
    for path in (PACKAGE / "lawbook").rglob("*.toml"):
        table = tomllib.loads(path.read_text(encoding="utf-8"), parse_float=Decimal)
        found |= set(
            numbers_in({key: table[key] for key in ("values", "rounding") if key in table})
        )
    return found


LAW = law_numbers()


def literals(path: Path) -> Iterator[tuple[int, Decimal]]:
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Constant) and type(node.value) in {int, float}:
            yield node.lineno, abs(Decimal(repr(node.value)))
        if isinstance(node, ast.Constant) and isinstance(node.value, str):
            try:
                number = Decimal(node.value)
            except ArithmeticError:
                continue
            if number.is_finite():
                yield node.lineno, abs(number)


JUDGING = sorted(
    path for room in ("conformity", "lawbook") for path in (PACKAGE / room).rglob("*.py")
)


@pytest.mark.parametrize("path", JUDGING, ids=[path.stem for path in JUDGING])
def test_rooms_that_judge_hold_no_number_of_the_law(path: Path) -> None:
    sought = LAW - ORDINARY - ALLOWED.get(path.name, set())
    assert [item for item in literals(path) if item[1] in sought] == []


def telling(number: Decimal) -> bool:
    """Three significant digits or more and not whole: no accident."""
    digits = number.normalize().as_tuple().digits
    return len(digits) >= 3 and number != number.to_integral_value()


ELSEWHERE = sorted(
    path
    for path in PACKAGE.rglob("*.py")
    # drawings hold positions and colours, which are numbers of every kind
    if "drawings" not in path.parts
)


@pytest.mark.parametrize(
    "path", ELSEWHERE, ids=[str(path.relative_to(PACKAGE)) for path in ELSEWHERE]
)
def test_no_telling_number_of_the_law_stands_in_any_module(path: Path) -> None:
    law = {number for number in LAW if telling(number)}
    assert [item for item in literals(path) if item[1] in law] == []


def test_the_search_would_find_one() -> None:
    assert {Decimal("0.926"), Decimal("0.0058"), Decimal("2.3172"), Decimal(210)} <= LAW
    assert telling(Decimal("0.926"))
    assert not telling(Decimal("0.5"))
