"""``endurance.csv``: the readings of an ageing test."""

from __future__ import annotations

from decimal import Decimal

from generator.intake.columns import SPANS, Span, check_heading, check_span
from generator.intake.register import Register
from generator.intake.tables.cells import CellReader
from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.text_table import read_text_table
from generator.language import say
from generator.records.raw import EnduranceReading

__all__ = ["ENDURANCE_COLUMNS", "read_endurance"]

ENDURANCE_COLUMNS = (
    "lamp_id",
    "unit_id",
    "hours_h",
    "luminous_flux_lm",
    "operational",
    "x",
    "y",
)
_REQUIRED = ("lamp_id", "unit_id", "hours_h", "operational")
_FLUX = Span(Decimal(0), None, usual=(Decimal(0), Decimal(200_000)))


def read_endurance(
    text: str, register: Register, problems: ProblemList
) -> tuple[EnduranceReading, ...]:
    """Read the readings of an ageing test.

    Parameters
    ----------
    text
        Content of ``endurance.csv``.
    register
        Where lamps and units stand.
    problems
        Where to note what is wrong.

    Returns
    -------
    tuple of EnduranceReading
        The readings that could be read, in file order.
    """
    table = read_text_table(text, problems)
    if table is None or not check_heading(table.heading, ENDURANCE_COLUMNS, _REQUIRED, problems):
        return ()
    cells = CellReader(table.heading.separator, problems)
    readings = []
    for row, record in table.rows:
        known = _is_known(record, row, register, problems)
        reading = _reading(record, row, cells)
        if known and reading is not None:
            readings.append(reading)
    _check_hours(readings, problems)
    return tuple(readings)


def _is_known(record: dict[str, str], row: int, register: Register, problems: ProblemList) -> bool:
    lamp_id, unit_id = record["lamp_id"], record["unit_id"]
    if not register.knows_lamp(lamp_id, problems, row, "lamp_id"):
        return False
    return register.claim_unit(unit_id, lamp_id, problems, row, "unit_id")


def _reading(record: dict[str, str], row: int, cells: CellReader) -> EnduranceReading | None:
    def number(column: str, span: Span) -> Decimal | None:
        value = cells.number(record.get(column, ""), row, column)
        if value is None or not check_span(value, span, row, column, cells.problems):
            return None
        return value

    for column in ("hours_h", "operational"):
        if not record[column]:
            cells.problems.error(
                "The cell is empty.",
                row=row,
                column=column,
                found="an empty cell",
                expected="yes or no" if column == "operational" else "operating time in hours",
            )
    hours_h = number("hours_h", SPANS["hours_h"])
    flux_lm = number("luminous_flux_lm", _FLUX)
    x, y = number("x", SPANS["x"]), number("y", SPANS["y"])
    operational = cells.yes_no(record["operational"], row, "operational")
    if hours_h is None or operational is None:
        return None
    _check_flux(
        record.get("luminous_flux_lm", ""), flux_lm, row, cells.problems, operational=operational
    )
    return EnduranceReading(
        record["lamp_id"], record["unit_id"], hours_h, flux_lm, operational, x, y, row
    )


def _check_flux(
    written: str,
    flux_lm: Decimal | None,
    row: int,
    problems: ProblemList,
    *,
    operational: bool,
) -> None:
    if operational and not written:
        problems.warning(
            say("The unit worked, but its luminous flux was not measured."),
            row=row,
            column="luminous_flux_lm",
            found="an empty cell",
            expected="luminous flux in lumens",
        )
    if operational and flux_lm == 0:
        problems.error(
            "A unit that works gives light.",
            row=row,
            column="luminous_flux_lm",
            found="0 lm, operational yes",
            expected="more than 0 lm, or operational no",
        )
    if not operational and flux_lm:
        problems.warning(
            say("The unit gave light, but did not count as working."),
            row=row,
            column="luminous_flux_lm",
            found=f"{flux_lm} lm, operational no",
            expected="0 or an empty cell where operational is no",
        )


def _check_hours(readings: list[EnduranceReading], problems: ProblemList) -> None:
    latest: dict[str, EnduranceReading] = {}
    for reading in readings:
        earlier = latest.get(reading.unit_id)
        if earlier is not None and reading.hours_h <= earlier.hours_h:
            problems.error(
                f"The hours of {reading.unit_id} do not increase from row {earlier.row}.",
                row=reading.row,
                column="hours_h",
                found=f"{reading.hours_h} after {earlier.hours_h}",
                expected="increasing hours of each unit",
            )
        latest[reading.unit_id] = reading
