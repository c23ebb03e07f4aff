"""Percent flicker and flicker index."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.metrics.whole_periods import whole_period_weights

__all__ = ["flicker_index", "percent_flicker"]

Array = NDArray[np.float64]


def percent_flicker(values: Array) -> Array:
    """Percent flicker, also called modulation depth; no smoothing is applied.

    Parameters
    ----------
    values
        Light, linear, any scale, dark signal removed (series, samples).

    Returns
    -------
    ndarray
        Percent flicker [%] (series,); infinite where the light swings as far below zero as above.

    Notes
    -----
    Source: cie_eilv, term 39, amplitude of fluctuation of the luminous flux; ca_ja10, JA10.6.
    """
    highest, lowest = values.max(axis=1), values.min(axis=1)
    level = highest + lowest
    swing = np.divide(highest - lowest, level, out=np.full_like(level, np.inf), where=level > 0)
    return np.asarray(100 * swing, dtype=np.float64)


def flicker_index(values: Array, sampling_rate_hz: float, period_s: Array) -> Array:
    """Flicker index: the share of the light that lies above its mean, over whole periods.

    Parameters
    ----------
    values
        Light, linear, any scale, dark signal removed (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    period_s
        Period of the whole waveform [s] (series,); not-a-number takes the whole record.

    Returns
    -------
    ndarray
        Flicker index, 0 to 1 (series,).

    Notes
    -----
    Source: iec_60050_845, entry 845-22-094.
    """
    weights = whole_period_weights(values.shape[1], period_s * sampling_rate_hz)
    total = np.einsum("sn,sn->s", weights, values)
    mean = total / weights.sum(axis=1)
    above = np.einsum("sn,sn->s", weights, np.maximum(values - mean[:, None], 0.0))
    return np.asarray(above / total, dtype=np.float64)
