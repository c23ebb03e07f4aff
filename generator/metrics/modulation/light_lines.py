"""Lines in the spectrum of a light record, and the noise floor between them.

Everything that asks "which frequencies are in this light" goes through here: the fundamental,
the stroboscopic visibility measure and the noise remarks. The record is cut into stretches of
about one second, each under a Hann window with the mean removed; frequency and amplitude of a
line between two bins follow from the ratio of the two highest bins of its peak, so that a record
need not hold a whole number of periods.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

__all__ = ["STRETCH_S", "LightLines", "light_lines", "line_peaks"]

Array = NDArray[np.float64]

STRETCH_S = 1.0
"""Length of the stretches a record is cut into [s]."""

_FIRST_BIN = 3  # a constant under a Hann window reaches bin 1; a slow drift hardly bin 3
_NOISE_BANDWIDTH_BINS = 1.5  # equivalent noise bandwidth of the Hann window
_FLOOR_BAND_BINS = 48  # the lowest band of the noise floor ends here; from there on, octaves
_FALSE_ALARM = 10.0  # noise alone passes for a line in one record of exp(10)
_DRIFT_BINS = 24  # below, drift looks like peaks: a line must tower over bins three away
_DRIFT_FACTOR = 4.0
_LEAST_AMPLITUDE = 1e-3  # share of the mean below which a line is no modulation


@dataclass(frozen=True, slots=True, eq=False)
class LightLines:
    """Peaks of the amplitude spectrum of light records, relative to their means.

    Parameters
    ----------
    frequency_hz
        Frequency of the peak, one column per bin [Hz] (series, bins).
    amplitude
        Amplitude relative to the mean light; zero where the bin holds no peak (series, bins).
    material
        Whether the peak stands clear of the noise and of a thousandth of the mean (series, bins).
    noise_power
        Power of the noise in each bin, relative to the squared mean (series, bins).
    resolution_hz
        Distance between bins [Hz].
    """

    frequency_hz: Array
    amplitude: Array
    material: NDArray[np.bool_]
    noise_power: Array
    resolution_hz: float

    @property
    def noise_rms(self) -> Array:
        """Root-mean-square noise over the whole band, relative to the mean (series,)."""
        return np.asarray(np.sqrt(self.noise_power.sum(axis=1)), dtype=np.float64)


def light_lines(values: Array, sampling_rate_hz: float) -> LightLines:
    """The lines in light records and the noise floor under them.

    Parameters
    ----------
    values
        Light, linear, any scale, mean above zero (series, samples).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    LightLines
        Peaks and noise floor.

    Notes
    -----
    Source: lampassay_methods, light spectrum.
    """
    stretches = max(1, int(values.shape[1] / sampling_rate_hz / STRETCH_S + 1e-6))
    length = values.shape[1] // stretches
    power = _mean_power(values, stretches, length)
    height = np.sqrt(power)
    place, amplitude = line_peaks(height)
    noise = _noise_floor(power, stretches)[:, 1:-1]
    threshold = noise * (np.log(noise.shape[1]) + _FALSE_ALARM)
    clear = power[:, 1:-1] > threshold
    resolution = sampling_rate_hz / length
    return LightLines(
        frequency_hz=place * resolution,
        amplitude=amplitude,
        material=(amplitude >= _LEAST_AMPLITUDE) & clear & _towers(height),
        noise_power=noise / (2 * _NOISE_BANDWIDTH_BINS),
        resolution_hz=resolution,
    )


def line_peaks(height: Array) -> tuple[Array, Array]:
    """Lines from the heights of the bins of a spectrum under a Hann window.

    Parameters
    ----------
    height
        Height of each bin, as amplitude of a line in its middle, from bin 0 on (series, bins).

    Returns
    -------
    tuple
        Place of the line counted in bins, and its amplitude, zero where the bin holds no peak
        (series, bins - 2): one column per bin, the first and the last left out.

    Notes
    -----
    For a line ``d`` bins off its bin the Hann window reads ``sinc(d) / (1 - d^2)`` of its
    amplitude, and the next bin ``(1 + d) / (2 - d)`` of that; both are inverted here.
    Source: lampassay_methods, light spectrum.
    """
    left, middle, right = height[:, :-2], height[:, 1:-1], height[:, 2:]
    peak = (middle >= left) & (middle > right)
    ratio = np.maximum(left, right) / np.where(peak, middle, 1.0)
    offset = np.where(peak, np.clip((2 * ratio - 1) / (1 + ratio), 0.0, 0.5), 0.0)
    bins = np.arange(1, height.shape[1] - 1)
    peak &= bins >= _FIRST_BIN
    amplitude = np.where(peak, middle * (1 - offset**2) / np.sinc(offset), 0.0)
    return bins + np.where(right >= left, offset, -offset), amplitude


def _mean_power(values: Array, stretches: int, length: int) -> Array:
    """Squared line amplitude per bin, mean over stretches (series, bins)."""
    window = np.hanning(length + 1)[:-1]
    total = np.zeros((values.shape[0], length // 2 + 1))
    mean = np.zeros((values.shape[0], 1))
    for start in range(0, stretches * length, length):
        stretch = values[:, start : start + length] * window
        level = stretch.sum(axis=1, keepdims=True) / window.sum()
        spectrum = np.fft.rfft(stretch - level * window, axis=1)
        total += spectrum.real**2 + spectrum.imag**2
        mean += level
    scale = 2 / window.sum() / mean
    return np.asarray(total * stretches * scale**2, dtype=np.float64)


def _towers(height: Array) -> NDArray[np.bool_]:
    """Whether a low bin stands far above those three away, as lines do and drift does not."""
    inner = height.shape[1] - 2
    result = np.ones((height.shape[0], inner), dtype=np.bool_)
    low = np.arange(_FIRST_BIN, min(_DRIFT_BINS, inner - _FIRST_BIN))
    around = np.maximum(height[:, low - 3], height[:, low + 3])
    result[:, low - 1] = height[:, low] > _DRIFT_FACTOR * around
    return result


def _noise_floor(power: Array, stretches: int) -> Array:
    """Mean squared amplitude of noise per bin, from the median of each band (series, bins)."""
    # The mean power of noise over stretches follows a gamma distribution; this is its median
    # over its mean, after Wilson and Hilferty, good to 1.5 %.
    median_share = (1 - 1 / (9 * stretches)) ** 3
    bins = power.shape[1]
    floor = np.zeros_like(power)
    start, stop = 0, _FLOOR_BAND_BINS
    while start < bins:
        if bins - stop < stop:
            stop = bins
        band = slice(max(start, _FIRST_BIN), stop)
        median = np.median(power[:, band], axis=1) if band.start < min(stop, bins) else 0.0
        floor[:, start:stop] = np.reshape(median, (-1, 1)) / median_share
        start, stop = stop, 2 * stop
    return floor
