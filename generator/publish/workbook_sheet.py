"""Cells of a workbook: text that stays text, exact numbers, formulas of the program alone; and
the same bytes for the same workbook.
"""

from __future__ import annotations

import io
import re
import zipfile
from datetime import UTC, date, datetime
from decimal import Decimal
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from openpyxl import Workbook
    from openpyxl.worksheet.worksheet import Worksheet

__all__ = ["SheetWriter", "column_letter", "packed"]

_FORMULA_SIGNS = ("=", "+", "-", "@")
_CONTROL = re.compile(r"[\x00-\x08\x0b\x0c\x0e-\x1f]")
_MODIFIED = re.compile(rb"(<dcterms:modified[^>]*>)[^<]*(</dcterms:modified>)")
_LONGEST_TEXT = 32_767
_ZIP_DATE = (1980, 1, 1, 0, 0, 0)


def column_letter(column: int) -> str:
    """Letters of a column, counted from 1."""
    letters = ""
    while column:
        column, rest = divmod(column - 1, 26)
        letters = chr(ord("A") + rest) + letters
    return letters


class SheetWriter:
    """Writes one sheet from top to bottom, a row at a time.

    Parameters
    ----------
    sheet
        The sheet.
    """

    def __init__(self, sheet: Worksheet) -> None:
        self._sheet = sheet
        self.row = 0

    def text(self, column: int, text: str, *, bold: bool = False) -> None:
        """Write text in the current row; whatever it begins with, it stays text."""
        from openpyxl.styles import Alignment, Font

        cell = self._sheet.cell(self.row, column)
        cell.value = _CONTROL.sub(" ", text)[:_LONGEST_TEXT]
        cell.data_type = "s"
        cell.alignment = Alignment(wrap_text=True, vertical="top")
        if text.startswith(_FORMULA_SIGNS):
            cell.quotePrefix = True
        if bold:
            cell.font = Font(bold=True)

    def number(self, column: int, value: Decimal | int, form: str = "General") -> None:
        """Write a number in the current row."""
        cell = self._sheet.cell(self.row, column)
        cell.value = value
        cell.number_format = form

    def formula(self, column: int, formula: str, form: str = "#,##0.00") -> None:
        """Write a formula of the program, without its sign of equality, in the current row."""
        cell = self._sheet.cell(self.row, column)
        cell.value = f"={formula}"
        cell.number_format = form

    def next_row(self, heading: str = "", *, bold: bool = False) -> int:
        """Go to the next row, write its heading, and give its number."""
        self.row += 1
        if heading:
            self.text(1, heading, bold=bold)
        return self.row

    def widths(self, first: float, others: float, columns: int) -> None:
        """Set the widths of the columns, and keep the first in sight."""
        for column in range(1, columns + 1):
            width = first if column == 1 else others
            self._sheet.column_dimensions[column_letter(column)].width = width
        self._sheet.freeze_panes = "B2"


def packed(book: Workbook, day: date) -> bytes:
    """Write a workbook; the same bytes for the same content.

    Parameters
    ----------
    book
        The workbook.
    day
        Date it bears.
    """
    moment = datetime(day.year, day.month, day.day, tzinfo=UTC)
    book.properties.created = moment.replace(tzinfo=None)
    book.properties.creator = "lampassay"
    written = io.BytesIO()
    book.save(written)
    stamp = moment.strftime("%Y-%m-%dT%H:%M:%SZ").encode()
    result = io.BytesIO()
    with zipfile.ZipFile(written) as old, zipfile.ZipFile(result, "w") as new:
        for name in old.namelist():
            content = _MODIFIED.sub(rb"\g<1>" + stamp + rb"\g<2>", old.read(name))
            entry = zipfile.ZipInfo(name, _ZIP_DATE)
            entry.compress_type = zipfile.ZIP_DEFLATED
            entry.external_attr = 0o644 << 16
            new.writestr(entry, content)
    return result.getvalue()
