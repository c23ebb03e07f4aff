"""``spectra/<lamp_id>.csv``: spectral radiant flux of a lamp's units on one wavelength scale."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.intake.tables.number_table import NumberTable, read_number_table
from generator.intake.tables.problem_list import ProblemList
from generator.language import say
from generator.records.raw import SpectrumSet, SpectrumUnit

__all__ = ["FEWEST_WAVELENGTHS", "read_spectra"]

FEWEST_WAVELENGTHS = 5
_SHORTEST_NM, _LONGEST_NM = 100.0, 2500.0  # span of optical spectroradiometers; common practice
_NOTEWORTHY_NEGATIVE = 0.1  # of the peak: past noise; common practice, no source

Array = NDArray[np.float64]


def read_spectra(
    text: str, lamp_id: str, unit: SpectrumUnit, problems: ProblemList
) -> SpectrumSet | None:
    """Read a spectrum file.

    Parameters
    ----------
    text
        Content of the file: ``wavelength_nm``, then one column per unit.
    lamp_id
        Lamp that the file name means.
    unit
        What the values are in.
    problems
        Where to note what is wrong.

    Returns
    -------
    SpectrumSet or None
        The spectra, or ``None`` after an error was noted.
    """
    before = problems.errors
    table = read_number_table(text, problems)
    if table is None or not _heading_is_right(table, problems):
        return None
    _check_wavelengths(table, problems)
    for name, values in zip(table.heading.names[1:], table.values[1:], strict=True):
        _check_values(table, name, values, problems)
    if problems.errors > before:
        return None
    return SpectrumSet(
        lamp_id=lamp_id,
        unit_ids=table.heading.names[1:],
        wavelength_nm=table.values[0],
        values=table.values[1:],
        unit=unit,
        file=problems.file,
    )


def _heading_is_right(table: NumberTable, problems: ProblemList) -> bool:
    heading = table.heading
    if heading.names[0] != "wavelength_nm":
        problems.error(
            "A spectrum file begins with its wavelengths.",
            row=heading.row,
            column=heading.names[0],
            found=heading.names[0],
            expected="wavelength_nm as the first column",
        )
        return False
    if len(heading.names) == 1:
        problems.error(
            "The file has wavelengths, but no spectrum.",
            row=heading.row,
            found="one column",
            expected="wavelength_nm, then one column per unit",
        )
        return False
    return True


def _check_wavelengths(table: NumberTable, problems: ProblemList) -> None:
    wavelength_nm = table.values[0]
    if table.whole and wavelength_nm.size < FEWEST_WAVELENGTHS:
        problems.error(
            "The file has too few wavelengths to be a spectrum.",
            column="wavelength_nm",
            found=f"{wavelength_nm.size} rows",
            expected=f"{FEWEST_WAVELENGTHS} rows or more",
        )
    outside = np.flatnonzero((wavelength_nm < _SHORTEST_NM) | (wavelength_nm > _LONGEST_NM))
    if outside.size:
        problems.error(
            f"{outside.size} wavelengths are not in nanometres, or not optical.",
            row=table.lines([int(outside[0])])[0],
            column="wavelength_nm",
            found=f"{wavelength_nm[outside[0]]:g}",
            expected=f"{_SHORTEST_NM:g} to {_LONGEST_NM:g} nm",
        )
    _check_order(table, wavelength_nm, problems)


def _check_order(table: NumberTable, wavelength_nm: Array, problems: ProblemList) -> None:
    steps = np.diff(wavelength_nm)
    if steps.size and (steps < 0).all():
        problems.error(
            "The wavelengths descend.",
            row=table.lines([1])[0],
            column="wavelength_nm",
            found=f"{wavelength_nm[1]:g} after {wavelength_nm[0]:g}",
            expected="ascending wavelengths",
        )
        return
    wrong = [int(row) + 1 for row in np.flatnonzero(steps <= 0)]
    for row, line in zip(wrong, table.lines(wrong), strict=True):
        repeated = steps[row - 1] == 0
        problems.error(
            "The wavelength stands there twice." if repeated else "The wavelengths do not ascend.",
            row=line,
            column="wavelength_nm",
            found=f"{wavelength_nm[row]:g} after {wavelength_nm[row - 1]:g}",
            expected="each wavelength once, ascending",
        )


def _check_values(table: NumberTable, name: str, values: Array, problems: ProblemList) -> None:
    if not values.size:
        return
    negative = np.flatnonzero(values < 0)
    if not values.any():
        problems.error(
            f"The spectrum of {name} is zero throughout.",
            column=name,
            found="0 in every row",
            expected="a measured spectrum; no column where there is none",
        )
    elif 2 * negative.size > values.size:
        problems.error(
            f"Most of the spectrum of {name} is negative.",
            row=table.lines([int(negative[0])])[0],
            column=name,
            found=f"{negative.size} of {values.size} values below zero",
            expected="values of zero or more, but for noise",
        )
    elif table.whole and values.min() < -_NOTEWORTHY_NEGATIVE * values.max():
        lowest = int(values.argmin())
        problems.warning(
            say("The spectrum of {name} has negative values past what noise explains.", name=name),
            row=table.lines([lowest])[0],
            column=name,
            found=f"{values[lowest]:g} at a peak of {values.max():g}",
            expected="values of zero or more, but for noise",
        )
