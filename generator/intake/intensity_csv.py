"""``intensity/<unit_id>.csv``: luminous intensity on a full grid of C-planes and gamma angles."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.intake.tables.number_table import NumberTable, read_number_table
from generator.intake.tables.problem_list import ProblemList
from generator.records.raw import IntensityTable

__all__ = ["INTENSITY_HEADING", "read_intensity"]

INTENSITY_HEADING = ("c_deg", "gamma_deg", "intensity_cd")
_FEWEST_ANGLES = 3
_LIMITS = {"c_deg": (0.0, 360.0), "gamma_deg": (0.0, 180.0), "intensity_cd": (0.0, np.inf)}
_NAMED_GAPS = 20

Array = NDArray[np.float64]


def read_intensity(text: str, unit_id: str, problems: ProblemList) -> IntensityTable | None:
    """Read an intensity distribution; its rows may come in any order.

    Parameters
    ----------
    text
        Content of the file: ``c_deg, gamma_deg, intensity_cd``.
    unit_id
        Unit that the file name means.
    problems
        Where to note what is wrong.

    Returns
    -------
    IntensityTable or None
        The distribution on its grid, or ``None`` after an error was noted.
    """
    before = problems.errors
    table = read_number_table(text, problems)
    if table is None or not _heading_is_right(table, problems):
        return None
    for name, limits in _LIMITS.items():
        _check_limits(table, name, limits, problems)
    if table.whole and not table.column("intensity_cd").any():
        problems.error(
            "The intensity is zero throughout.",
            column="intensity_cd",
            found="0 in every row" if table.values.size else "no rows",
            expected="a measured distribution",
        )
    if problems.errors > before:
        return None
    return _on_grid(table, unit_id, problems)


def _heading_is_right(table: NumberTable, problems: ProblemList) -> bool:
    names = table.heading.names
    if sorted(names) == sorted(INTENSITY_HEADING):
        return True
    problems.error(
        "The columns are not those of an intensity distribution.",
        row=table.heading.row,
        found=", ".join(names),
        expected=", ".join(INTENSITY_HEADING),
    )
    return False


def _check_limits(
    table: NumberTable, name: str, limits: tuple[float, float], problems: ProblemList
) -> None:
    values = table.column(name)
    outside = [int(row) for row in np.flatnonzero((values < limits[0]) | (values > limits[1]))]
    upper = f" to {limits[1]:g}" if np.isfinite(limits[1]) else " or more"
    for row, line in zip(outside, table.lines(outside), strict=True):
        problems.error(
            f"{name} cannot be {values[row]:g}.",
            row=line,
            column=name,
            found=f"{values[row]:g}",
            expected=f"{limits[0]:g}{upper}",
        )


def _on_grid(table: NumberTable, unit_id: str, problems: ProblemList) -> IntensityTable | None:
    c_deg, plane = np.unique(table.column("c_deg"), return_inverse=True)
    gamma_deg, angle = np.unique(table.column("gamma_deg"), return_inverse=True)
    place = plane * gamma_deg.size + angle
    before = problems.errors
    if gamma_deg.size < _FEWEST_ANGLES:
        problems.error(
            "The distribution has too few angles.",
            column="gamma_deg",
            found=f"{gamma_deg.size} angles",
            expected=f"{_FEWEST_ANGLES} angles or more",
        )
    _check_repeated(table, place, problems)
    _check_gaps(c_deg, gamma_deg, place, problems)
    if problems.errors > before:
        return None
    intensity_cd = np.empty(place.size)
    intensity_cd[place] = table.column("intensity_cd")
    grid = intensity_cd.reshape(c_deg.size, gamma_deg.size)
    return IntensityTable(unit_id, c_deg, gamma_deg, grid, problems.file)


def _check_repeated(table: NumberTable, place: NDArray[np.intp], problems: ProblemList) -> None:
    _, first, inverse = np.unique(place, return_index=True, return_inverse=True)
    repeated = [int(row) for row in np.flatnonzero(first[inverse] != np.arange(place.size))]
    earlier = [int(first[inverse[row]]) for row in repeated]
    lines = table.lines(earlier + repeated)
    for position, row in enumerate(repeated):
        angles = f"C {table.column('c_deg')[row]:g}, gamma {table.column('gamma_deg')[row]:g}"
        problems.error(
            f"The intensity at {angles} stands in row {lines[position]} already.",
            row=lines[len(earlier) + position],
            column="gamma_deg",
            found=angles,
            expected="each pair of angles once",
        )


def _check_gaps(
    c_deg: Array, gamma_deg: Array, place: NDArray[np.intp], problems: ProblemList
) -> None:
    present = np.zeros(c_deg.size * gamma_deg.size, dtype=bool)
    present[place] = True
    missing = np.flatnonzero(~present)
    for gap in missing[:_NAMED_GAPS]:
        plane, angle = divmod(int(gap), gamma_deg.size)
        problems.error(
            "The grid of angles has a gap.",
            column="intensity_cd",
            found=f"no row for C {c_deg[plane]:g}, gamma {gamma_deg[angle]:g}",
            expected="a row for every gamma in every C-plane",
        )
    if missing.size > _NAMED_GAPS:
        problems.error(
            f"The grid of angles has {missing.size - _NAMED_GAPS} more gaps.",
            column="intensity_cd",
            expected="a row for every gamma in every C-plane",
        )
