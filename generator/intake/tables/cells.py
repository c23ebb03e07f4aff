"""Cells of text tables: numbers exactly as written, yes or no, dates, counts, identifiers."""

from __future__ import annotations

import re
from datetime import date
from decimal import Decimal

from generator.intake.tables.problem_list import ProblemList

__all__ = ["EVERY_CELL", "IDENTIFIER", "CellReader", "is_identifier"]

EVERY_CELL = "a number in every cell"

IDENTIFIER = "a letter or digit, then up to 63 letters, digits, _ or -"

_IDENTIFIER = re.compile(r"[A-Za-z0-9][A-Za-z0-9_-]{0,63}")
_NUMBER = re.compile(r"[+-]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?")
_THOUSANDS = re.compile(
    r"[+-]?[0-9]{1,3}(?:[ '’_\u00a0\u202f][0-9]{3})+(?:[.,][0-9]*)?"
    r"|[+-]?[0-9]{1,3}(?:,[0-9]{3}){2,}(?:\.[0-9]*)?"
    r"|[+-]?[0-9]{1,3}(?:\.[0-9]{3}){2,}(?:,[0-9]*)?"
    r"|[+-]?[0-9]{1,3}(?:\.[0-9]{3})+,[0-9]*"
    r"|[+-]?[0-9]{1,3}(?:,[0-9]{3})+\.[0-9]*"
)
_WITH_UNIT = re.compile(r"[+-]?[0-9]+(?:[.,][0-9]*)?\s*[^\s0-9.,].*")
_ISO_DATE = re.compile(r"[0-9]{4}-[0-9]{2}-[0-9]{2}")
_COUNT = re.compile(r"[0-9]{1,18}")
_LONGEST_NUMBER = 60
_ABSENT = frozenset(
    (
        "n/a",
        "na",
        "n.a.",
        "#n/a",
        "nan",
        "nil",
        "null",
        "none",
        "-",
        "--",
        "–",
        "—",
        "?",
        "tbd",
        "tbc",
        "inf",
        "+inf",
        "-inf",
        "infinity",
        "-infinity",
    )
)


def is_identifier(text: str) -> bool:
    """Whether text is fit to name a lamp or a unit.

    Parameters
    ----------
    text
        A cell, heading or file name stem.

    Returns
    -------
    bool
        True for the pattern of the campaign format.
    """
    return _IDENTIFIER.fullmatch(text) is not None


class CellReader:
    """Reads the cells of one table and notes what is wrong with them.

    A comma-separated table has decimal points. A semicolon-separated table has decimal commas
    or decimal points, one of them throughout: ``1,234`` there is one and 234 thousandths. A
    table that mixes them is refused, for ``1.234`` could then mean either. Thousands
    separators are never accepted. An empty cell is ``None``: nothing was given.

    Parameters
    ----------
    separator
        What separates the cells, comma or semicolon.
    problems
        Where to note what is wrong.
    gaps
        False for a table in which every cell holds a number.
    """

    def __init__(self, separator: str, problems: ProblemList, *, gaps: bool = True) -> None:
        self.problems = problems
        self._gaps = gaps
        self._comma_separated = separator == ","
        self._mark = "." if self._comma_separated else ""
        self._mark_row = 0
        self._mixed = False

    def number_text(self, text: str, row: int, column: str) -> str | None:
        """The text of a number with a decimal point; ``None`` after an error was noted."""
        point = text if self._comma_separated else text.replace(",", ".")
        if _NUMBER.fullmatch(point) is None or len(text) > _LONGEST_NUMBER:
            message, expected = self._mistake(text)
            self.problems.error(message, row=row, column=column, found=text, expected=expected)
            return None
        if not self._comma_separated and not self._same_mark(text, row, column):
            return None
        return point

    def number(self, text: str, row: int, column: str) -> Decimal | None:
        """A number exactly as written; ``None`` for an empty cell or after an error."""
        if not text:
            return None
        point = self.number_text(text, row, column)
        return None if point is None else Decimal(point)

    def yes_no(self, text: str, row: int, column: str) -> bool | None:
        """``yes`` or ``no``; ``None`` for an empty cell or after an error."""
        if text in {"yes", "no", ""}:
            return text == "yes" if text else None
        self.problems.error(
            f"{column} is answered with yes or no.",
            row=row,
            column=column,
            found=text,
            expected="yes, no, or an empty cell",
        )
        return None

    def iso_date(self, text: str, row: int, column: str) -> date | None:
        """A date written YYYY-MM-DD; ``None`` for an empty cell or after an error."""
        if not text:
            return None
        if _ISO_DATE.fullmatch(text):
            try:
                return date.fromisoformat(text)
            except ValueError:
                message = "There is no such day in the calendar."
        else:
            message = "The date is not written as year-month-day."
        self.problems.error(
            message, row=row, column=column, found=text, expected="a date such as 2025-03-31"
        )
        return None

    def count(self, text: str, row: int, column: str) -> int | None:
        """A whole number above zero; ``None`` for an empty cell or after an error."""
        if not text:
            return None
        if _COUNT.fullmatch(text) and int(text) > 0:
            return int(text)
        self.problems.error(
            f"{column} is a count.",
            row=row,
            column=column,
            found=text,
            expected="a whole number above zero, without separators",
        )
        return None

    def _same_mark(self, text: str, row: int, column: str) -> bool:
        mark = "," if "," in text else "." if "." in text else ""
        if not mark or self._mixed or mark == self._mark:
            return True
        if not self._mark:
            self._mark, self._mark_row = mark, row
            return True
        self._mixed = True
        names = {",": "comma", ".": "point"}
        self.problems.error(
            f"The file has decimal commas and decimal points: {names[self._mark]} in row "
            f"{self._mark_row}, {names[mark]} here.",
            row=row,
            column=column,
            found=text,
            expected=f"a decimal {names[self._mark]}, as in row {self._mark_row}",
        )
        return False

    def _mistake(self, text: str) -> tuple[str, str]:
        point = "point" if self._comma_separated else "comma or point"
        if len(text) > _LONGEST_NUMBER:
            return "That is no measured number.", f"at most {_LONGEST_NUMBER} characters"
        if text.casefold() in _ABSENT:
            cure = "a number; an empty cell where there is none"
            return "That is no number.", cure if self._gaps else EVERY_CELL
        if _THOUSANDS.fullmatch(text):
            return (
                "Numbers are written without thousands separators.",
                f"digits with at most one decimal {point}",
            )
        if self._comma_separated and _NUMBER.fullmatch(text.replace(",", ".")):
            return (
                "A comma inside a number could be a decimal comma or a thousands separator.",
                "a decimal point; decimal commas need semicolons between the cells",
            )
        if _WITH_UNIT.fullmatch(text):
            return "The cell holds more than a number; the heading carries the unit.", "the number"
        return "That is no number.", "a number such as 12.5"
