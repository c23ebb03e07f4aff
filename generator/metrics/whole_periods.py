"""Whole periods of a sampled record whose period is no whole number of samples."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["whole_period_samples", "whole_period_weights"]

Array = NDArray[np.float64]

_SLACK = 0.02
"""A record that misses a whole number of periods by less than this many samples has them all."""

_ROUNDING = 0.5
"""The same where whole samples are counted."""

_LONG = 200_000
"""Number of samples above which, of several good lengths, one that transforms fast is taken."""

_NEAR = 0.05
"""How near to a whole number of periods such a length must come [samples]."""

_SMALL_FACTORS = (2, 2, 2, 3, 3, 5, 7, 11, 13, 17, 19, 23)


def whole_period_weights(samples: int, period_samples: Array) -> Array:
    """Weights that make a sum over samples an integral over a whole number of periods.

    The integral is that of straight lines between samples, from the first sample over the
    largest whole number of periods in the record; its end may lie between two samples.

    Parameters
    ----------
    samples
        Length of the record.
    period_samples
        Period in samples, not necessarily whole (series,); not-a-number, or longer than the
        record, takes the whole record.

    Returns
    -------
    ndarray
        Weights from 0 to 1 (series, samples); they add up to the length of the whole periods.

    Notes
    -----
    Source: iec_60050_845, entry 845-22-094, note 3 (whole periods); iec_61000_4_7 (whole cycles).
    """
    exact = np.round(samples / period_samples)
    closes = np.abs(samples - exact * period_samples) < _SLACK
    periods = np.where(closes, exact, np.floor((samples - 1) / period_samples))
    length = np.where(periods >= 1, periods * period_samples, samples)
    # The integral of the hat between one sample and its neighbours, cut at both ends.
    after = np.clip(length[:, None] - np.arange(samples + 2), -1.0, 1.0)
    weights = np.where(after < 0, (1 + after) ** 2 / 2, 1 - (1 - after) ** 2 / 2)
    weights[:, 0] -= 0.5
    # A record that closes on itself goes on with its first samples.
    weights[:, :2] += weights[:, samples:]
    return np.asarray(weights[:, :samples], dtype=np.float64)


def whole_period_samples(samples: int, period_samples: float) -> int:
    """The number of whole samples that comes nearest to a whole number of periods.

    Looks among the longest tenth of the possible lengths, so that little of the record is lost.

    Parameters
    ----------
    samples
        Length of the record.
    period_samples
        Period in samples; not-a-number, or longer than the record, takes the whole record.

    Returns
    -------
    int
        Number of samples from the start of the record.
    """
    if not period_samples <= samples + _ROUNDING:
        return samples
    most = int((samples + _ROUNDING) / period_samples)
    spans = period_samples * np.arange(most, int(0.9 * most) - (most == 1), -1)
    lengths = np.minimum(np.round(spans).astype(np.int64), samples)
    miss = np.round(np.abs(spans - lengths), 3)
    near = lengths[miss <= max(float(miss.min()), _NEAR if samples > _LONG else 0.0)]
    return int(near[np.argmin(_large_factor(near))]) if samples > _LONG else int(near[0])


def _large_factor(numbers: NDArray[np.int64]) -> NDArray[np.int64]:
    """What is left of numbers without their small factors; transforms are fast where it is 1."""
    left = numbers.copy()
    for factor in _SMALL_FACTORS:
        for _ in range(4):
            left = np.where(left % factor == 0, left // factor, left)
    return left
