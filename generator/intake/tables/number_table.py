"""Tables of numbers alone, up to millions: a fast way in, and a slow one that names faults.

The fast way takes a file only when every cell is a finite number and every row has the width
of the heading. Anything else goes the slow way, which reads the same numbers cell by cell and
notes each fault with row and column. Both give the double nearest to what is written.
"""

from __future__ import annotations

import io
import math
from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from generator.intake.tables.cells import EVERY_CELL, CellReader
from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.text_table import Heading, data_records, read_heading

__all__ = ["NumberTable", "read_number_table"]

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True, eq=False)
class NumberTable:
    """A table of numbers.

    Parameters
    ----------
    heading
        Column names.
    values
        The numbers (columns, rows); not-a-number where a fault was noted.
    whole
        False after a fault was noted; the table then only serves to look for more.
    """

    heading: Heading
    values: Array
    whole: bool
    _text: str = field(repr=False)

    def column(self, name: str) -> Array:
        """The numbers of one column (rows,)."""
        values: Array = self.values[self.heading.names.index(name)]
        return values

    def lines(self, rows: Sequence[int]) -> list[int]:
        """The lines of the file on which data rows stand, the first data row being row 0."""
        wanted = set(rows)
        found = {}
        quiet = ProblemList("")
        for row, (line, _) in enumerate(data_records(self._text, self.heading, quiet)):
            if row in wanted:
                found[row] = line
                if len(found) == len(wanted):
                    break
        return [found[row] for row in rows]


def read_number_table(text: str, problems: ProblemList) -> NumberTable | None:
    """Read a table whose cells are all numbers.

    Parameters
    ----------
    text
        The whole file.
    problems
        Where to note what is wrong: cells that are empty or no finite number, ragged rows.

    Returns
    -------
    NumberTable or None
        The table, possibly without rows, or ``None`` where the heading could not be read.
    """
    heading = read_heading(text, problems)
    if heading is None:
        return None
    before = problems.errors
    values = _fast(text, heading)
    if values is None:
        values = _cell_by_cell(text, heading, problems)
    return NumberTable(heading, values, problems.errors == before, text)


def _fast(text: str, heading: Heading) -> Array | None:
    body = text.split("\n", heading.row)[-1] if text.count("\n") >= heading.row else ""
    mixed = "," in body and "." in body
    if not body.strip() or '"' in body or (heading.separator == ";" and mixed):
        return None
    if heading.separator == ";":
        body = body.replace(",", ".")
    try:
        values = np.loadtxt(io.StringIO(body), delimiter=heading.separator, comments=None, ndmin=2)
    except ValueError:
        return None
    if values.shape[1] != len(heading.names) or not np.isfinite(values).all():
        return None
    return np.ascontiguousarray(values.T)


def _cell_by_cell(text: str, heading: Heading, problems: ProblemList) -> Array:
    cells = CellReader(heading.separator, problems, gaps=False)
    rows = [
        [
            _finite(cell, row, column, cells)
            for column, cell in zip(heading.names, record, strict=True)
        ]
        for row, record in data_records(text, heading, problems)
    ]
    return np.array(rows, dtype=np.float64).reshape(-1, len(heading.names)).T.copy()


def _finite(text: str, row: int, column: str, cells: CellReader) -> float:
    if not text:
        cells.problems.error(
            "The cell is empty.",
            row=row,
            column=column,
            found="an empty cell",
            expected=EVERY_CELL,
        )
        return math.nan
    point = cells.number_text(text, row, column)
    number = math.nan if point is None else float(point)
    if math.isinf(number):
        cells.problems.error(
            "The number is too large to be computed with.",
            row=row,
            column=column,
            found=text,
            expected="a finite number",
        )
        return math.nan
    return number
