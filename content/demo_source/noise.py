"""Repeatable noise: normal deviates made from the raw stream of one seeded bit generator."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["normal", "spread"]

Array = NDArray[np.float64]

CAMPAIGN_SEED = 20260302


def normal(*key: int, count: int) -> Array:
    """Standard normal deviates of one key; another key gives another, independent series.

    The raw 64-bit stream of PCG64 is guaranteed not to change between releases of numpy, while
    the distributions drawn from it are not; hence the Box-Muller transform here.

    Parameters
    ----------
    *key
        Whole numbers that name the series, for instance lamp number and purpose.
    count
        How many deviates are wanted.

    Returns
    -------
    NDArray
        Deviates with mean 0 and standard deviation 1, (count,).
    """
    generator = np.random.Generator(np.random.PCG64([CAMPAIGN_SEED, *key]))
    raw = generator.bit_generator.random_raw(2 * count)
    uniform = (np.asarray(raw, dtype=np.uint64) >> np.uint64(11)).astype(np.float64) + 0.5
    first, second = (uniform / 2.0**53).reshape(2, count)
    return np.asarray(np.sqrt(-2.0 * np.log(first)) * np.cos(2.0 * np.pi * second))


def spread(*key: int, count: int, limit: float = 1.8) -> Array:
    """Deviates of mean exactly 0, none beyond a limit: a sample of units that tells one story.

    Parameters
    ----------
    *key
        Whole numbers that name the series.
    count
        How many units.
    limit
        Largest deviation before the mean is taken off.

    Returns
    -------
    NDArray
        Deviates, (count,).
    """
    deviates = np.clip(normal(*key, count=count), -limit, limit)
    return np.asarray(deviates - np.mean(deviates))
