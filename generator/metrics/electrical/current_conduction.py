"""Where in the half cycle the current flows: start, last peak and end, for IEC 61000-3-2.

Source: iec_61000_3_2, class C, clause 7.4.3 (quoted from laboratory notices, not read).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

__all__ = ["CurrentConduction", "current_conduction"]

Array = NDArray[np.float64]

_THRESHOLD_SHARE = 0.05  # of the highest absolute peak
_HIGHEST_HZ = 9000.0  # components above do not count
_LEAST_POINTS = 1800  # per cycle, so that a peak is found to 0.1°
_SLOWEST_MAINS_HZ = 40.0


@dataclass(frozen=True, slots=True, eq=False)
class CurrentConduction:
    """Angles of the current from the zero crossing of the fundamental voltage, 0° to 180°.

    Parameters
    ----------
    start_deg, last_peak_deg, end_deg
        Where the current reaches the threshold, has its last peak, and falls below the threshold
        [degrees] (series,); not-a-number where the current never flows with the voltage.
    """

    start_deg: Array
    last_peak_deg: Array
    end_deg: Array


def current_conduction(
    voltage_v: Array, current_a: Array, sampling_rate_hz: float, frequency_hz: Array
) -> CurrentConduction:
    """Start, last peak and end of the current in the half cycle with its highest peak.

    The threshold is 5 % of the highest absolute current in the whole cycles of the capture.
    Start and end are those of the flow that holds the highest current of the half cycle. The
    last peak is the last maximum that stands out by the threshold.

    Parameters
    ----------
    voltage_v, current_a
        Voltage [V] and current [A], sampled together (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    frequency_hz
        Mains frequency [Hz] (series,).

    Returns
    -------
    CurrentConduction
        The angles.

    Notes
    -----
    Source: iec_61000_3_2, clause 7.4.3; lampassay_methods, angles of the current (what counts as
    the last peak, and which flow counts where there are several).
    """
    cycle = sampling_rate_hz / frequency_hz
    start = _rising_zero(voltage_v, cycle)
    # A capture that closes on itself goes on with its first sample.
    cycles = np.maximum(np.floor((voltage_v.shape[1] - start) / cycle + 1e-3), 1).astype(np.int64)
    points = max(_LEAST_POINTS, 2 * int(np.ceil(sampling_rate_hz / _SLOWEST_MAINS_HZ / 2)))
    angles = np.full((3, voltage_v.shape[0]), np.nan)
    for count in np.unique(cycles):
        rows = np.flatnonzero(cycles == count)
        grid = _on_angles(current_a[rows], start[rows], cycle[rows], int(count), points)
        angles[:, rows] = _angles(_without_high(grid, frequency_hz[rows], int(count)), points)
    return CurrentConduction(*angles)


def _rising_zero(voltage_v: Array, cycle: Array) -> Array:
    """First rising zero crossing of the voltage fundamental [samples] (series,)."""
    samples = voltage_v.shape[1]
    number = np.arange(samples)
    whole = np.floor((samples + 0.5) / cycle) * cycle
    inside = number < np.round(whole)[:, None]
    turned = np.exp(-2j * np.pi * number / cycle[:, None]) * voltage_v * inside
    # The fundamental is sin(w n + angle); it rises through zero where the angle is made up.
    angle = np.angle(1j * turned.sum(axis=1))
    return np.asarray((-angle / (2 * np.pi)) % 1.0 * cycle, dtype=np.float64)


def _on_angles(current_a: Array, start: Array, cycle: Array, cycles: int, points: int) -> Array:
    """The current on even angles from the zero crossing on (series, cycles * points)."""
    samples = current_a.shape[1]
    place = start[:, None] + np.arange(cycles * points) / points * cycle[:, None]
    before = np.floor(place).astype(np.int64)
    share = place - before
    left = np.take_along_axis(current_a, before % samples, axis=1)
    right = np.take_along_axis(current_a, (before + 1) % samples, axis=1)
    return np.asarray(left + share * (right - left), dtype=np.float64)


def _without_high(grid: Array, frequency_hz: Array, cycles: int) -> Array:
    """The current without its Fourier lines above 9 kHz (series, points of the window)."""
    lines = np.fft.rfft(grid, axis=1)
    line_hz = np.arange(lines.shape[1]) * frequency_hz[:, None] / cycles
    lines[line_hz > _HIGHEST_HZ] = 0
    return np.asarray(np.fft.irfft(lines, grid.shape[1], axis=1), dtype=np.float64)


def _angles(current_a: Array, points: int) -> Array:
    """Start, last peak and end [degrees] (3, series)."""
    half = points // 2
    rows = np.arange(current_a.shape[0])
    threshold = _THRESHOLD_SHARE * np.abs(current_a).max(axis=1, keepdims=True)
    halves = current_a.reshape(rows.size, -1, half).copy()
    halves[:, 1::2] *= -1  # so that a current that flows with the voltage is positive
    chosen = halves[rows, np.argmax(halves.max(axis=2), axis=1)]
    place = np.arange(half)
    peak = np.argmax(chosen, axis=1)[:, None]
    below = chosen < threshold
    before = np.where(below & (place < peak), place, -1).max(axis=1)
    after = np.where(below & (place > peak), place, half).min(axis=1)
    start = np.where(before < 0, 0.0, _crossing(chosen, threshold[:, 0], before, before + 1))
    end = np.where(after >= half, float(half), _crossing(chosen, threshold[:, 0], after - 1, after))
    flows = np.take_along_axis(chosen, peak, axis=1)[:, 0] >= threshold[:, 0]
    flows &= threshold[:, 0] > 0
    found = np.stack([start, _last_peak(chosen, threshold), end])
    return np.where(flows, found * 180 / half, np.nan)


def _crossing(
    chosen: Array, threshold: Array, first: NDArray[np.int64], second: NDArray[np.int64]
) -> Array:
    """Where the straight line between two neighbouring points meets the threshold [points]."""
    rows, last = np.arange(chosen.shape[0]), chosen.shape[1] - 1
    one, two = (chosen[rows, np.clip(place, 0, last)] for place in (first, second))
    rise = np.where(two == one, 1.0, two - one)
    return np.asarray(first + np.clip((threshold - one) / rise, 0.0, 1.0), dtype=np.float64)


def _last_peak(chosen: Array, threshold: Array) -> Array:
    """The last maximum that the current falls short of, somewhere before, by the threshold."""
    back = np.maximum(chosen[:, ::-1], 0.0)  # ripple around zero is no peak
    highest = np.maximum.accumulate(back, axis=1)
    fallen = back <= highest - threshold
    until = np.where(fallen.any(axis=1), np.argmax(fallen, axis=1), chosen.shape[1])
    seen = np.where(np.arange(chosen.shape[1]) < until[:, None], back, -np.inf)
    return np.asarray(chosen.shape[1] - 1 - np.argmax(seen, axis=1), dtype=np.float64)
