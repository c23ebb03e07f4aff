"""Text tables: CSV of RFC 4180 as laboratories and spreadsheets write it, read without guessing."""

from __future__ import annotations

import csv
import io
import re
from collections.abc import Iterator
from dataclasses import dataclass

from generator.intake.tables.problem_list import ProblemList

__all__ = ["Heading", "TextTable", "data_records", "read_heading", "read_text_table", "records"]

_QUOTED = re.compile(r'"[^"]*"')


@dataclass(frozen=True, slots=True)
class Heading:
    """The heading of a table: column names, the line it stands on, and the cell separator."""

    names: tuple[str, ...]
    row: int
    separator: str


@dataclass(frozen=True, slots=True)
class TextTable:
    """A table of stripped text cells.

    Parameters
    ----------
    heading
        Column names.
    rows
        Line of the file on which each row begins, and its cells by column name.
    whole
        False where rows were left out because their cells could not be told apart.
    """

    heading: Heading
    rows: tuple[tuple[int, dict[str, str]], ...]
    whole: bool


def read_heading(text: str, problems: ProblemList) -> Heading | None:
    """Read the heading and settle what separates the cells.

    The first line that is neither blank nor a comment (``#`` at its start) is the heading.
    Commas or semicolons separate; a heading with both, or with tabs, is refused.

    Parameters
    ----------
    text
        The whole file.
    problems
        Where to note what is wrong.

    Returns
    -------
    Heading or None
        The heading, or ``None`` after an error was noted.
    """
    first = _first_line(text)
    if first is None:
        problems.error("The file is empty.", expected="a heading and rows of data")
        return None
    row, line = first
    separator = _separator(line, row, problems)
    if separator is None:
        return None
    before = problems.errors
    found = next(records(text, separator, problems), None)
    if found is None or problems.errors > before:
        return None
    names = tuple(name.strip() for name in found[1])
    _check_names(names, row, problems)
    return Heading(names, row, separator) if problems.errors == before else None


def read_text_table(text: str, problems: ProblemList) -> TextTable | None:
    """Read a small table as text.

    Rows without any entry are skipped. A row with more or fewer cells than the heading is
    reported and left out.

    Parameters
    ----------
    text
        The whole file.
    problems
        Where to note what is wrong.

    Returns
    -------
    TextTable or None
        The table, or ``None`` where the heading could not be read.
    """
    heading = read_heading(text, problems)
    if heading is None:
        return None
    before = problems.errors
    rows = []
    for row, cells in data_records(text, heading, problems):
        rows.append((row, dict(zip(heading.names, cells, strict=True))))
    return TextTable(heading, tuple(rows), whole=problems.errors == before)


def records(text: str, separator: str, problems: ProblemList) -> Iterator[tuple[int, list[str]]]:
    """Give the records of a file, each with the line on which it begins.

    Parameters
    ----------
    text
        The whole file.
    separator
        Comma or semicolon.
    problems
        Where to note records whose quotation marks do not match.

    Yields
    ------
    tuple of int and list of str
        Line number counted from 1, and the cells as they stand.
    """
    lines = _Lines(text)
    reader = csv.reader(lines, delimiter=separator, strict=True)
    while True:
        lines.between_records = True
        try:
            cells = next(reader)
        except StopIteration:
            return
        except csv.Error as failure:
            problems.error(
                "The quotation marks of the row do not match.",
                row=lines.first,
                found=str(failure),
                expected='quoted cells closed by ", and "" for a quotation mark inside',
            )
            reader = csv.reader(lines, delimiter=separator, strict=True)
            continue
        yield lines.first, cells


def data_records(
    text: str, heading: Heading, problems: ProblemList
) -> Iterator[tuple[int, list[str]]]:
    """Give the stripped records below the heading that have as many cells as the heading.

    Parameters
    ----------
    text
        The whole file.
    heading
        Its heading.
    problems
        Where to note rows with too many or too few cells.

    Yields
    ------
    tuple of int and list of str
        Line number counted from 1, and the stripped cells.
    """
    width = len(heading.names)
    for row, raw in records(text, heading.separator, problems):
        cells = [cell.strip() for cell in raw]
        if row <= heading.row or not any(cells):
            continue
        if len(cells) == width:
            yield row, cells
        else:
            hint = " Decimal commas need semicolons between the cells."
            problems.error(
                "The row and the heading do not have the same number of cells."
                + (hint if heading.separator == "," and len(cells) > width else ""),
                row=row,
                found=f"{len(cells)} cells",
                expected=f"{width} cells",
            )


class _Lines:
    """Feeds lines to the CSV reader, skips comments and blanks between records, counts."""

    def __init__(self, text: str) -> None:
        self._lines = io.StringIO(text, newline="\n")
        self._count = 0
        self.first = 0
        self.between_records = True

    def __iter__(self) -> Iterator[str]:
        return self

    def __next__(self) -> str:
        for line in self._lines:
            self._count += 1
            if not self.between_records:
                return line
            if line.strip() and not line.startswith("#"):
                self.between_records = False
                self.first = self._count
                return line
        raise StopIteration


def _first_line(text: str) -> tuple[int, str] | None:
    for row, line in enumerate(io.StringIO(text, newline="\n"), start=1):
        if line.strip() and not line.startswith("#"):
            return row, line
    return None


def _separator(line: str, row: int, problems: ProblemList) -> str | None:
    bare = _QUOTED.sub("", line)
    present = [mark for mark in "\t;," if mark in bare]
    if "\t" in present:
        problems.error(
            "The cells are separated by tabs.",
            row=row,
            found="a tab in the heading",
            expected="commas, or semicolons with decimal commas",
        )
        return None
    if len(present) > 1:
        problems.error(
            "The heading has commas and semicolons, so the cells cannot be told apart.",
            row=row,
            found=line.strip(),
            expected="one separator throughout, comma or semicolon",
        )
        return None
    return present[0] if present else ","


def _check_names(names: tuple[str, ...], row: int, problems: ProblemList) -> None:
    for position, name in enumerate(names):
        if not name:
            problems.error(
                f"Cell {position + 1} of the heading is empty.",
                row=row,
                found="an empty heading",
                expected="a column name",
            )
        elif name in names[:position]:
            problems.error(
                f"The column {name} stands {names.count(name)} times in the heading.",
                row=row,
                column=name,
                found=f"{name} in cell {names.index(name) + 1} and in cell {position + 1}",
                expected="each column once",
            )
