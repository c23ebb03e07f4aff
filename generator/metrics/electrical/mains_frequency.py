"""The mains frequency, from the fundamental of the voltage."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["mains_frequency"]

Array = NDArray[np.float64]

_LOWEST_HZ = 40.0
_HIGHEST_HZ = 70.0
_FEWEST_CYCLES = 2.0
_FEWEST_SAMPLES_PER_CYCLE = 4
_LEAST_SHARE = 0.5  # of the voltage, in the fundamental; below, this is no mains voltage
_ROUNDS = 6
_PADDING = 8
_SLACK = 0.1  # of a cycle, in counting whole cycles before the frequency is known well


def mains_frequency(voltage_v: Array, sampling_rate_hz: float) -> Array:
    """Mains frequency from the phase that the voltage fundamental gains across the record.

    A peak of the spectrum gives the start. Then the phases of the fundamental over whole cycles
    at the start and at the end of the record are compared, until the two agree.

    Parameters
    ----------
    voltage_v
        Voltage [V] (series, samples).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    ndarray
        Frequency [Hz] (series,); not-a-number where there is no fundamental between 40 Hz and
        70 Hz, or less than two cycles of it.

    Notes
    -----
    Source: iec_61000_4_7 (whole cycles); lampassay_methods, mains frequency.
    """
    samples = voltage_v.shape[1]
    if samples / sampling_rate_hz < _FEWEST_CYCLES / _HIGHEST_HZ or (
        sampling_rate_hz < _FEWEST_SAMPLES_PER_CYCLE * _HIGHEST_HZ
    ):
        return np.full(voltage_v.shape[0], np.nan)
    turns = _spectral_peak(voltage_v, sampling_rate_hz) / sampling_rate_hz
    bounds = _LOWEST_HZ / sampling_rate_hz, _HIGHEST_HZ / sampling_rate_hz
    for _ in range(_ROUNDS):
        turns = np.clip(turns + _phase_gain(voltage_v, turns), *bounds)
    inside = (turns > bounds[0]) & (turns < bounds[1])
    long = (samples + 0.5) * turns >= _FEWEST_CYCLES
    found = inside & long & _is_mains(voltage_v, turns)
    return np.where(found, turns * sampling_rate_hz, np.nan)


def _phase_gain(voltage_v: Array, turns: Array) -> Array:
    """Correction to the cycles per sample, from the first and the last whole cycles (series,)."""
    samples = voltage_v.shape[1]
    number = np.arange(samples)
    cycles = np.maximum(np.floor(samples * turns / 2 + _SLACK), 1)
    length = np.minimum(cycles / turns, samples)
    shift = samples - np.ceil(length)
    first = np.clip(length[:, None] - number, 0, 1)
    last = np.clip((length + shift)[:, None] - number, 0, 1) * (number >= shift[:, None])
    turned = np.exp(-2j * np.pi * turns[:, None] * number) * voltage_v
    gain = np.angle(np.sum(last * turned, axis=1) * np.conj(np.sum(first * turned, axis=1)))
    return np.asarray(gain / (2 * np.pi * np.maximum(shift, 1)), dtype=np.float64)


def _spectral_peak(voltage_v: Array, sampling_rate_hz: float) -> Array:
    """Frequency of the highest bin of the padded spectrum between 40 Hz and 70 Hz [Hz]."""
    samples = voltage_v.shape[1]
    window = np.hanning(samples + 1)[:-1]
    level = voltage_v.mean(axis=1, keepdims=True)
    spectrum = np.abs(np.fft.rfft((voltage_v - level) * window, _PADDING * samples, axis=1))
    frequency = np.fft.rfftfreq(_PADDING * samples, 1 / sampling_rate_hz)
    inside = (frequency >= _LOWEST_HZ) & (frequency <= _HIGHEST_HZ)
    return np.asarray(frequency[inside][np.argmax(spectrum[:, inside], axis=1)], dtype=np.float64)


def _is_mains(voltage_v: Array, cycles_per_sample: Array) -> NDArray[np.bool_]:
    """Whether most of the voltage is in the fundamental."""
    samples = voltage_v.shape[1]
    turn = np.exp(-2j * np.pi * cycles_per_sample[:, None] * np.arange(samples))
    fundamental = np.abs(np.mean(turn * voltage_v, axis=1)) * np.sqrt(2)
    effective = np.sqrt(np.mean(voltage_v**2, axis=1))
    return np.asarray((fundamental > _LEAST_SHARE * effective) & (effective > 0), dtype=np.bool_)
