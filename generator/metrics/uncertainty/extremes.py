"""What noise does to the highest and the lowest sample of a record."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from generator.metrics.uncertainty.coverage import expanded_with_lift

__all__ = ["noise_of_highest", "noise_of_swing_percent"]

Array = NDArray[np.float64]

_NEAR = 3.0
"""Samples within this many deviations of the highest one may have been the highest."""

_COUNTING = 1.4
"""The luckier the top sample, the fewer lie near it and the smaller its surplus seems. For ten
thousand equal samples a hazard of 1.5 over a surplus of 4 adds 0.4 to the scatter."""

_CERTAIN = 4.0
"""Deviations of the noise by which a figure must stand out of it, or else be all noise."""


def noise_of_highest(
    values: Array, deviation: Array, independent: float = 1.0
) -> tuple[Array, Array]:
    """How far noise lifts the highest sample, and by how much that scatters.

    The more samples lie near the top, the farther the luckiest of them stands out. Their number
    is found by counting: ``n`` equal samples under Gaussian noise leave a known number of
    themselves within three deviations of their highest. Samples that are not independent count
    for less, but every separate crest counts as one.

    Parameters
    ----------
    values
        Samples (series, samples).
    deviation
        Standard deviation of their noise, in the same unit (series,).
    independent
        Share of the samples that are independent; less than 1 after a low-pass filter.

    Returns
    -------
    tuple
        Mean surplus of the highest sample and its standard deviation, in the same unit
        (series,).

    Notes
    -----
    Source: lampassay_methods, noise of percent flicker; order statistics of the normal
    distribution with the plotting position of Blom.
    """
    top = values.max(axis=1) - _NEAR * deviation
    high = values >= top[:, np.newaxis]
    crests = np.sum(high[:, 1:] & ~high[:, :-1], axis=1)
    near = np.maximum(np.maximum(independent * np.sum(high, axis=1), crests), 1.0)
    counts, logarithm, surplus, scatter = _equal_samples()
    equal = np.interp(np.log(near), counts, logarithm)
    return (
        np.asarray(deviation * np.interp(equal, logarithm, surplus)),
        np.asarray(deviation * np.interp(equal, logarithm, scatter)),
    )


def noise_of_swing_percent(
    values: Array, deviation: Array, offset: float, independent: float = 1.0
) -> Array:
    """Expanded uncertainty of ``100 (highest - lowest) / (highest + lowest)`` [%].

    Parameters
    ----------
    values
        Light (series, samples).
    deviation
        Standard deviation of the noise of a sample, in the same unit (series,).
    offset
        Standard uncertainty of an offset common to all samples, relative to their mean.
    independent
        As for :func:`noise_of_highest`.

    Returns
    -------
    Array
        Expanded uncertainty (k = 2) [%] (series,). Noise lifts the figure; as it is not
        corrected for that, the lift is added in full. A figure that noise alone may have made
        has an interval that reaches down to zero. Source: jcgm_100, equation 10 and F.2.4.5.
    """
    highest, lowest = values.max(axis=1), values.min(axis=1)
    level = highest + lowest
    up, up_scatter = noise_of_highest(values, deviation, independent)
    down, down_scatter = noise_of_highest(-values, deviation, independent)
    by_highest, by_lowest = 200 * lowest / level**2, 200 * highest / level**2
    lift = by_highest * up + by_lowest * down
    swing = 100 * (highest - lowest) / level
    by_noise = _COUNTING * np.hypot(by_highest * up_scatter, by_lowest * down_scatter)
    by_offset = 2 * swing / level * values.mean(axis=1) * offset
    lift = np.where(lift + _CERTAIN * by_noise >= swing, swing, lift)
    return expanded_with_lift(lift, np.hypot(by_noise, by_offset))


@cache
def _equal_samples() -> tuple[Array, Array, Array, Array]:
    """Equal samples under unit noise: how many lie near their highest, surplus and scatter of it.

    Returns
    -------
    tuple
        Logarithm of the count within three deviations of the highest, logarithm of the number,
        mean of the highest, standard deviation of the highest (numbers,).
    """
    from scipy.special import ndtr, ndtri

    number = np.geomspace(1.0, 1e8, 200)
    surplus = ndtri((number - 0.375) / (number + 0.25))
    scatter = (ndtri(0.8413 ** (1 / number)) - ndtri(0.1587 ** (1 / number))) / 2
    near = number * ndtr(_NEAR - surplus)
    return np.log(near), np.log(number), surplus, scatter
