"""Percent amplitude modulation after a cut-off frequency, the Californian method."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

import numpy as np
from numpy.typing import NDArray

from generator.metrics.whole_periods import whole_period_samples

__all__ = ["CUT_OFFS_HZ", "percent_amplitude_modulation", "waves_below"]

Array = NDArray[np.float64]

CUT_OFFS_HZ = (40, 90, 200, 400, 1000)
"""Cut-off frequencies of JA10.6 [Hz]."""

_EDGE = 1.01  # mains is kept within 1 %: a line meant to lie on the edge is kept at any mains
_POINTS_PER_CYCLE = 64  # points per cycle of the cut-off, fine enough for extremes


def percent_amplitude_modulation(
    values: Array,
    sampling_rate_hz: float,
    period_s: Array,
    cut_offs_hz: Sequence[float] = CUT_OFFS_HZ,
) -> Array:
    """Percent amplitude modulation of light with everything above a cut-off removed.

    The record is first cut to whole periods, then its Fourier components above the cut-off are
    set to zero. A line on the edge itself is kept. The figure may exceed 100 %.

    Parameters
    ----------
    values
        Light, linear, any scale (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    period_s
        Period to cut the record to [s] (series,); not-a-number takes the whole record.
    cut_offs_hz
        Cut-off frequencies [Hz] (cut-offs,).

    Returns
    -------
    ndarray
        Percent amplitude modulation [%] (series, cut-offs); not-a-number for a cut-off that
        is not below half the sampling rate, and for light that swings about zero.

    Notes
    -----
    Source: ca_ja10, JA10.6.
    """
    result = np.full((values.shape[0], len(cut_offs_hz)), np.nan)
    for row, (series, period) in enumerate(zip(values, period_s, strict=True)):
        for column, (wave, _) in waves_below(series, sampling_rate_hz, float(period), cut_offs_hz):
            level = wave.max() + wave.min()
            if level > 0:
                result[row, column] = 100 * (wave.max() - wave.min()) / level
    return result


def waves_below(
    series: Array,
    sampling_rate_hz: float,
    period_s: float,
    cut_offs_hz: Sequence[float] = CUT_OFFS_HZ,
) -> Iterator[tuple[int, tuple[Array, float]]]:
    """One light waveform with everything above each cut-off removed.

    Parameters
    ----------
    series
        Light, linear, any scale (samples,); each series has its own whole number of periods,
        hence its own transform.
    sampling_rate_hz
        Samples per second [Hz].
    period_s
        Period to cut the record to [s]; not-a-number takes the whole record.
    cut_offs_hz
        Cut-off frequencies [Hz] (cut-offs,).

    Yields
    ------
    tuple
        Index of the cut-off; the waveform, on points fine enough for its extremes (points,);
        and the share of the components that was kept. Cut-offs that are not below half the
        sampling rate are left out.
    """
    length = whole_period_samples(series.size, period_s * sampling_rate_hz)
    spectrum = np.fft.rfft(series[:length]) / length
    for column, cut_off in enumerate(cut_offs_hz):
        if 2 * cut_off < sampling_rate_hz:
            kept = spectrum[: int(cut_off * _EDGE * length / sampling_rate_hz) + 1]
            points = min(length, 1 << (_POINTS_PER_CYCLE * kept.size).bit_length())
            yield column, (np.fft.irfft(kept, points) * points, kept.size / spectrum.size)
