"""The period of a light waveform: its fundamental, found from its lines, and a view of it."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.metrics.modulation.light_lines import LightLines, light_lines

__all__ = ["fundamental_frequency", "fundamental_period", "strongest_frequency", "two_periods"]

Array = NDArray[np.float64]

_LINES = 12  # strongest lines that have to fit the fundamental
_LEAST_SHARE = 0.02  # of the strongest line: what lies below does not lengthen the period
_STRONGEST_DIVISORS = 10  # the strongest line may be up to the tenth harmonic
_LOWEST_DIVISORS = 2  # the lowest line up to the second
_LEAST_BINS = 4  # a fundamental below this many bins fits nearly any lines
_TOLERANCE_BINS = 0.02  # of a line free of noise
_NOISE_TOLERANCE = 2.0  # bins, times noise amplitude over line amplitude: three deviations
_DEFAULT_VIEW_S = 0.04
_VIEW_POINTS = 400


def fundamental_period(values: Array, sampling_rate_hz: float) -> Array:
    """Period of the whole waveform, so that an asymmetry between half-cycles counts.

    Parameters
    ----------
    values
        Light, linear, any scale (series, samples).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    ndarray
        Period [s] (series,); not-a-number where no modulation stands clear of the noise.

    Notes
    -----
    Source: iec_60050_845, entry 845-22-094 (period of the whole waveform).
    """
    return 1.0 / fundamental_frequency(light_lines(values, sampling_rate_hz))[0]


def fundamental_frequency(lines: LightLines) -> tuple[Array, NDArray[np.bool_]]:
    """The highest frequency of which all material lines are multiples.

    Parameters
    ----------
    lines
        Lines of the light.

    Returns
    -------
    tuple
        Frequency [Hz] (series,), not-a-number where there is no line; and whether all lines fit
        (series,). Where they fit no common fundamental, the frequency is that of the strongest.

    Notes
    -----
    Source: lampassay_methods, light spectrum.
    """
    frequency, amplitude, tolerance = _strongest_lines(lines)
    strongest = frequency[:, :1]
    lowest = np.min(np.where(amplitude > 0, frequency, np.inf), axis=1, keepdims=True)
    candidates = np.concatenate(
        [
            strongest / np.arange(1, _STRONGEST_DIVISORS + 1),
            lowest / np.arange(1, _LOWEST_DIVISORS + 1),
        ],
        axis=1,
    )[:, :, None]
    order = np.maximum(np.round(frequency[:, None, :] / candidates), 1.0)
    weight = (amplitude**2)[:, None, :]
    moment = np.sum(weight * order**2, axis=2, keepdims=True)
    fitted = np.sum(weight * order * frequency[:, None, :], axis=2, keepdims=True) / np.where(
        moment > 0, moment, 1.0
    )
    miss = np.abs(frequency[:, None, :] - order * fitted) > tolerance[:, None, :]
    fits = ~np.any(miss & (weight > 0), axis=2) & (
        fitted[..., 0] > _LEAST_BINS * lines.resolution_hz
    )
    best = np.max(np.where(fits, fitted[..., 0], 0.0), axis=1)
    found = amplitude[:, 0] > 0
    frequency_hz = np.where(best > 0, best, strongest[:, 0])
    return np.where(found, frequency_hz, np.nan), (best > 0) | ~found


def strongest_frequency(lines: LightLines) -> Array:
    """Frequency of the strongest material line [Hz] (series,); not-a-number where none is."""
    frequency, amplitude, _ = _strongest_lines(lines)
    return np.where(amplitude[:, 0] > 0, frequency[:, 0], np.nan)


def _strongest_lines(lines: LightLines) -> tuple[Array, Array, Array]:
    """Frequency, amplitude and tolerance [Hz] of the lines that count, strongest first."""
    every = np.where(lines.material, lines.amplitude, 0.0)
    chosen = np.argsort(-every, axis=1, kind="stable")[:, :_LINES]
    frequency, amplitude, noise = (
        np.take_along_axis(array, chosen, axis=1)
        for array in (lines.frequency_hz, every, lines.noise_power)
    )
    amplitude = np.where(amplitude >= _LEAST_SHARE * amplitude[:, :1], amplitude, 0.0)
    unsure = np.sqrt(noise) / np.where(amplitude > 0, amplitude, 1.0)
    tolerance = (_TOLERANCE_BINS + _NOISE_TOLERANCE * unsure) * lines.resolution_hz
    return frequency, amplitude, tolerance


def two_periods(values: Array, sampling_rate_hz: float) -> tuple[Array, Array]:
    """Two periods of one light waveform, for drawing.

    Starts where the light first rises through its mean. Light without a period is shown over
    two cycles of 50 Hz mains.

    Parameters
    ----------
    values
        Light of one unit, linear, any scale (samples,).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    tuple
        Time from the start of the view [s] (points,) and light relative to its mean (points,);
        400 points at the most, no spacing finer than the samples.
    """
    relative = values / values.mean()
    period = float(fundamental_period(values[None, :], sampling_rate_hz)[0])
    span = 2 * period if np.isfinite(period) else _DEFAULT_VIEW_S
    last = values.size - 1
    length = min(span * sampling_rate_hz, float(last))
    rises = np.flatnonzero((relative[:-1] < 1) & (relative[1:] >= 1)) + 1
    rises = rises[rises + length <= last]
    start = float(rises[0]) if rises.size else 0.0
    place = np.linspace(0.0, length, min(_VIEW_POINTS, int(length) + 1))
    return place / sampling_rate_hz, np.interp(start + place, np.arange(values.size), relative)
