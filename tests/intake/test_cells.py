from __future__ import annotations

from datetime import date
from decimal import Decimal

import pytest

from generator.intake.tables.cells import CellReader, is_identifier
from generator.intake.tables.problem_list import ProblemList


@pytest.mark.parametrize("text", ["0", "12.50", "-0.0012", "+5", ".5", "5.", "1e-3", "1.5E+2"])
def test_numbers_are_kept_as_written(text: str) -> None:
    problems = ProblemList("table.csv")
    number = CellReader(",", problems).number(text, 2, "a")
    assert str(number) == str(Decimal(text))
    assert problems.problems == ()


@pytest.mark.parametrize(
    ("separator", "text", "words"),
    [
        (",", "1,5", "decimal comma or a thousands separator"),
        (",", "1,234", "decimal comma or a thousands separator"),
        (",", "1,234,567", "without thousands"),
        (",", "1,234.5", "without thousands"),
        (",", "1 234", "without thousands"),
        (",", "1'234.5", "without thousands"),
        (",", "1_000", "without thousands"),
        (";", "1.234,5", "without thousands"),
        (";", "1,234.5", "without thousands"),
        (";", "1.234.567", "without thousands"),
        (",", "8.5 W", "carries the unit"),
        (",", "5%", "carries the unit"),
        (",", "2700K", "carries the unit"),
        (",", "8.5±0.1", "carries the unit"),
        (",", "n/a", "no number"),
        (",", "NaN", "no number"),
        (",", "-inf", "no number"),
        (",", "-", "no number"),
        (",", "<0.5", "no number"),
        (",", "−5", "no number"),
        (",", "٣", "no number"),
        (",", "0x1F", "carries the unit"),
        (",", "1e9999", "carries the unit"),
        (",", "9" * 61, "no measured number"),
    ],
)
def test_what_is_no_number(separator: str, text: str, words: str) -> None:
    problems = ProblemList("table.csv")
    assert CellReader(separator, problems).number(text, 7, "a") is None
    (problem,) = problems.problems
    assert (problem.level, problem.row, problem.column) == ("error", 7, "a")
    assert words in problem.message
    assert problem.expected


def test_an_empty_cell_is_nothing_given() -> None:
    problems = ProblemList("table.csv")
    cells = CellReader(",", problems)
    assert cells.number("", 2, "a") is None
    assert cells.yes_no("", 2, "a") is None
    assert cells.iso_date("", 2, "a") is None
    assert cells.count("", 2, "a") is None
    assert problems.problems == ()


def test_two_decimal_marks_are_named_once_where_they_meet() -> None:
    problems = ProblemList("table.csv")
    cells = CellReader(";", problems)
    assert cells.number("1,5", 2, "a") == Decimal("1.5")
    assert cells.number("7", 3, "a") == 7
    assert cells.number("1.5", 4, "a") is None
    cells.number("2.5", 5, "a")
    assert [(p.row, p.found) for p in problems.problems] == [(4, "1.5")]


def test_yes_no_dates_and_counts() -> None:
    problems = ProblemList("table.csv")
    cells = CellReader(",", problems)
    assert (cells.yes_no("yes", 2, "a"), cells.yes_no("no", 2, "a")) == (True, False)
    assert cells.iso_date("2024-02-29", 2, "a") == date(2024, 2, 29)
    assert cells.count("120", 2, "a") == 120
    assert problems.problems == ()


@pytest.mark.parametrize("text", ["Yes", "true", "1", "y", "ja"])
def test_other_answers_are_refused(text: str) -> None:
    problems = ProblemList("table.csv")
    assert CellReader(",", problems).yes_no(text, 2, "a") is None
    assert problems.errors == 1


@pytest.mark.parametrize("text", ["20250101", "2025-W01-1", "2025-1-1", "2025-02-29", "01/02/2025"])
def test_other_dates_are_refused(text: str) -> None:
    problems = ProblemList("table.csv")
    assert CellReader(",", problems).iso_date(text, 2, "a") is None
    assert problems.errors == 1


@pytest.mark.parametrize("text", ["0", "-1", "1.0", "1 000", "many"])
def test_other_counts_are_refused(text: str) -> None:
    problems = ProblemList("table.csv")
    assert CellReader(",", problems).count(text, 2, "a") is None
    assert problems.errors == 1


@pytest.mark.parametrize(
    ("text", "fit"),
    [
        ("L1", True),
        ("7_b-C", True),
        ("a" * 64, True),
        ("a" * 65, False),
        ("", False),
        ("-a", False),
        ("a.b", False),
        ("a/b", False),
        ("é1", False),
        ("L1\n", False),
    ],
)
def test_identifiers(text: str, fit: bool) -> None:
    assert is_identifier(text) is fit
