"""Even sampling: whether printed times lie on one grid, allowing for how they were rounded."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.intake.tables.number_table import NumberTable
from generator.intake.tables.problem_list import ProblemList

__all__ = ["FEWEST_SAMPLES", "rounding_of_times", "sampling_rate_hz"]

FEWEST_SAMPLES = 100
_JITTER = 0.01  # of the sampling interval; the accepted departure beyond rounding
_COARSEST = 0.49  # of the interval: with coarser rounding a lost sample could hide
_MOST_DECIMALS = 15

Array = NDArray[np.float64]


def sampling_rate_hz(table: NumberTable, problems: ProblemList) -> float | None:
    """The sampling rate of a record, after checking that its times are evenly spaced.

    Parameters
    ----------
    table
        Record with a column ``time_s`` [s].
    problems
        Where to note what is wrong, with the row where it begins.

    Returns
    -------
    float or None
        Intervals divided by the time between first and last sample [Hz]; ``None`` after an
        error was noted, here or in reading the table.
    """
    time_s = table.column("time_s")
    if table.whole and time_s.size < FEWEST_SAMPLES:
        problems.error(
            "The record has too few samples.",
            column="time_s",
            found=f"{time_s.size} samples",
            expected=f"{FEWEST_SAMPLES} samples or more",
        )
        return None
    interval_s = np.diff(time_s)
    backward = np.flatnonzero(interval_s <= 0)
    if backward.size:
        _report(table, int(backward[0]), "The times do not increase.", "increasing times", problems)
        return None
    if not table.whole:
        return None
    uneven = _first_uneven(time_s, interval_s)
    if uneven is not None:
        usual_s = float(np.median(interval_s))
        expected = f"steps of {usual_s:.6g} s within 1 %, but for rounding"
        message = "The record is not evenly sampled, or its times are rounded too coarsely."
        _report(table, uneven, message, expected, problems)
        return None
    return float((time_s.size - 1) / (time_s[-1] - time_s[0]))


def rounding_of_times(time_s: Array) -> Array:
    """The step to which each time was rounded when it was printed.

    Times are printed either with as many decimals each or with as many significant digits
    each. The fewest decimals, and the fewest digits, that give every time back are found; the
    coarser of the two steps holds.

    Parameters
    ----------
    time_s
        Times as read [s] (samples,).

    Returns
    -------
    ndarray
        Rounding step of each time [s] (samples,); 0 where the times are printed in full.
    """
    size = np.abs(time_s)
    exponent = np.floor(np.log10(np.where(size > 0, size, 1.0)))
    by_decimals = 0.0
    for decimals in range(_MOST_DECIMALS + 1):
        if np.array_equal(np.round(time_s, decimals), time_s):
            by_decimals = 10.0**-decimals
            break
    by_digits = np.zeros_like(time_s)
    for digits in range(1, _MOST_DECIMALS + 1):
        step = 10.0 ** (exponent + 1 - digits)
        if np.allclose(np.rint(time_s / step) * step, time_s, rtol=1e-15, atol=0.0):
            by_digits = np.where(size > 0, step, 0.0)
            break
    return np.maximum(by_decimals, by_digits)


def _first_uneven(time_s: Array, interval_s: Array) -> int | None:
    usual_s = float(np.median(interval_s))
    off = np.abs(interval_s - usual_s) > _JITTER * usual_s
    if not off.any():
        return _first_drifted(time_s)
    mean_s = float((time_s[-1] - time_s[0]) / interval_s.size)
    rounding_s = rounding_of_times(time_s)[1:]
    if rounding_s.max() > _COARSEST * mean_s:
        return int(np.flatnonzero(off)[0])
    allowed_s = _JITTER * mean_s + rounding_s
    still_off = np.abs(interval_s - mean_s) > allowed_s
    if not still_off.any():
        return _first_drifted(time_s)
    from_usual = np.abs(interval_s - usual_s) > allowed_s
    return int(np.flatnonzero(from_usual if from_usual.any() else still_off)[0])


def _first_drifted(time_s: Array) -> int | None:
    grid_s, step_s = np.linspace(time_s[0], time_s[-1], time_s.size, retstep=True)
    drifted = np.flatnonzero(np.abs(time_s - grid_s) > float(step_s))
    return max(int(drifted[0]) - 1, 0) if drifted.size else None


def _report(
    table: NumberTable, interval: int, message: str, expected: str, problems: ProblemList
) -> None:
    time_s = table.column("time_s")
    problems.error(
        message,
        row=table.lines([interval + 1])[0],
        column="time_s",
        found=f"{time_s[interval + 1]:.12g} after {time_s[interval]:.12g}",
        expected=expected,
    )
