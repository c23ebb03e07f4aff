"""Light and mains records against time: headings, even sampling, and signals that are no signal."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.intake.sampling import sampling_rate_hz
from generator.intake.tables.number_table import NumberTable, read_number_table
from generator.intake.tables.problem_list import ProblemList
from generator.language import say
from generator.records.raw import LightRecord, MainsCapture

__all__ = [
    "LONG_RECORD_S",
    "MAINS_HEADING",
    "light_record",
    "mains_capture",
    "read_light",
    "read_mains",
]

LONG_RECORD_S = 30.0
"""Shortest long light record [s], as the campaign format says."""

MAINS_HEADING = ("time_s", "voltage_v", "current_a")

Array = NDArray[np.float64]


def read_light(text: str, lamp_id: str, problems: ProblemList, *, long: bool) -> LightRecord | None:
    """Read a light record.

    Parameters
    ----------
    text
        Content of the file: ``time_s``, then one column per unit.
    lamp_id
        Lamp that the file name means.
    problems
        Where to note what is wrong.
    long
        Whether the file name says that it is a long record.

    Returns
    -------
    LightRecord or None
        The record, or ``None`` after an error was noted.
    """
    table = read_number_table(text, problems)
    return None if table is None else light_record(table, lamp_id, problems, long=long)


def light_record(
    table: NumberTable, lamp_id: str, problems: ProblemList, *, long: bool | None
) -> LightRecord | None:
    """Make a light record of a table of numbers; its length decides where ``long`` is ``None``."""
    before = problems.errors
    if not _begins_with_time(table, problems):
        return None
    names = table.heading.names[1:]
    if not names:
        problems.error(
            "The file has times, but no light.",
            row=table.heading.row,
            found="one column",
            expected="time_s, then one column per unit",
        )
        return None
    rate_hz = sampling_rate_hz(table, problems)
    for name in names:
        _check_light(table, name, problems)
    if rate_hz is None or problems.errors > before:
        return None
    duration_s = table.values.shape[1] / rate_hz
    if long and duration_s < LONG_RECORD_S:
        problems.warning(
            say("The long light record is short."),
            column="time_s",
            found=f"{duration_s:.3g} s",
            expected=f"{LONG_RECORD_S:g} s or more",
        )
    lasts = duration_s >= LONG_RECORD_S if long is None else long
    return LightRecord(lamp_id, names, rate_hz, table.values[1:], lasts, problems.file)


def read_mains(text: str, unit_id: str, problems: ProblemList) -> MainsCapture | None:
    """Read a mains capture.

    Parameters
    ----------
    text
        Content of the file: ``time_s, voltage_v, current_a``.
    unit_id
        Unit that the file name means.
    problems
        Where to note what is wrong.

    Returns
    -------
    MainsCapture or None
        The capture, or ``None`` after an error was noted.
    """
    table = read_number_table(text, problems)
    return None if table is None else mains_capture(table, unit_id, problems)


def mains_capture(table: NumberTable, unit_id: str, problems: ProblemList) -> MainsCapture | None:
    """Make a mains capture of a table of numbers."""
    before = problems.errors
    heading = table.heading
    for name in MAINS_HEADING:
        if name not in heading.names:
            problems.error(
                f"The column {name} is missing.",
                row=heading.row,
                column=name,
                found=", ".join(heading.names),
                expected=", ".join(MAINS_HEADING),
            )
    for name in heading.names:
        if name not in MAINS_HEADING:
            problems.warning(
                say("A mains capture has no column {name}; it is not read.", name=name),
                row=heading.row,
                column=name,
                found=name,
                expected=", ".join(MAINS_HEADING),
            )
    if problems.errors > before:
        return None
    rate_hz = sampling_rate_hz(table, problems)
    for name in MAINS_HEADING[1:]:
        _check_not_zero(name, table.column(name), problems)
    if rate_hz is None or problems.errors > before:
        return None
    return MainsCapture(
        unit_id, rate_hz, table.column("voltage_v"), table.column("current_a"), problems.file
    )


def _begins_with_time(table: NumberTable, problems: ProblemList) -> bool:
    first = table.heading.names[0]
    if first == "time_s":
        return True
    problems.error(
        "A light record begins with its times.",
        row=table.heading.row,
        column=first,
        found=first,
        expected="time_s as the first column",
    )
    return False


def _check_not_zero(name: str, values: Array, problems: ProblemList) -> bool:
    if values.any() or not values.size:
        return True
    problems.error(
        f"{name} is zero throughout.",
        column=name,
        found="0 in every row",
        expected="a measured signal",
    )
    return False


def _check_light(table: NumberTable, name: str, problems: ProblemList) -> None:
    values = table.column(name)
    if not _check_not_zero(name, values, problems):
        return
    negative = np.flatnonzero(values < 0)
    if 2 * negative.size > values.size:
        problems.error(
            f"Most of the light of {name} is negative.",
            row=table.lines([int(negative[0])])[0],
            column=name,
            found=f"{negative.size} of {values.size} values below zero",
            expected="a signal linear in light, without a coupling that removes its mean",
        )
