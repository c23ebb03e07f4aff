"""``units.csv``: the measured units, with the figures their laboratory reports ready-made."""

from __future__ import annotations

from decimal import Decimal

from generator.intake.columns import SPANS, UNIT_COLUMNS, UNIT_FIGURES, check_heading, check_span
from generator.intake.register import Register
from generator.intake.tables.cells import CellReader
from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.text_table import read_text_table
from generator.records.lamp import Unit

__all__ = ["read_units"]


def read_units(text: str, register: Register, problems: ProblemList) -> tuple[Unit, ...]:
    """Read the units and enter them in the register.

    Parameters
    ----------
    text
        Content of ``units.csv``.
    register
        Where the lamps stand, and where to enter the units.
    problems
        Where to note what is wrong.

    Returns
    -------
    tuple of Unit
        The units that could be read, in file order.
    """
    table = read_text_table(text, problems)
    register.units_whole = table is not None and table.whole
    required = ["unit_id", "lamp_id"]
    if table is None or not check_heading(table.heading, UNIT_COLUMNS, required, problems):
        register.units_whole = False
        return ()
    cells = CellReader(table.heading.separator, problems)
    units = []
    for row, record in table.rows:
        entered = register.enter_unit(record["unit_id"], record["lamp_id"], row, problems)
        unit = _unit(record, row, cells)
        if entered:
            units.append(unit)
    return tuple(units)


def _unit(record: dict[str, str], row: int, cells: CellReader) -> Unit:
    reported: dict[str, Decimal] = {}
    uncertainty: dict[str, Decimal] = {}
    for quantity in UNIT_FIGURES:
        number = _figure(record, quantity, quantity, row, cells)
        if number is not None:
            reported[quantity] = number
        companion = f"u_{quantity}"
        number = _figure(record, companion, "expanded_uncertainty", row, cells)
        if number is not None:
            uncertainty[quantity] = number
    _check_chromaticity(reported, row, cells.problems)
    return Unit(record["unit_id"], record["lamp_id"], reported, uncertainty, row)


def _figure(
    record: dict[str, str], column: str, span: str, row: int, cells: CellReader
) -> Decimal | None:
    number = cells.number(record.get(column, ""), row, column)
    if number is None or not check_span(number, SPANS[span], row, column, cells.problems):
        return None
    return number


def _check_chromaticity(reported: dict[str, Decimal], row: int, problems: ProblemList) -> None:
    x, y = reported.get("x"), reported.get("y")
    if x is not None and y is not None and x + y > 1:
        problems.error(
            "x and y together cannot exceed 1.",
            row=row,
            column="y",
            found=f"x = {x}, y = {y}",
            expected="chromaticity coordinates of CIE 1931",
        )
