"""Short-term flicker of light (PstLM): the light flickermeter.

The relative light passes a high-pass and a low-pass filter and the eye filter (the weighting
filter of the flickermeter with the incandescent lamp left out), is squared and smoothed, and its
levels exceeded for given shares of the time are summed. All filters run as second-order
sections: direct-form coefficients lose their digits above some 30 kHz sampling.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "FEWEST_SAMPLES_PER_S",
    "SHORTEST_RECORD_S",
    "enough_for_pst_lm",
    "light_response",
    "noise_pst_lm",
    "pst_lm",
]

Array = NDArray[np.float64]

SHORTEST_RECORD_S = 30.0
"""Shortest record from which PstLM is given [s]."""

FEWEST_SAMPLES_PER_S = 2000.0
"""Lowest sampling rate from which PstLM is given [Hz]."""

_HIGH_PASS_HZ = 0.05
_LOW_PASS_HZ = 35.0
_LOW_PASS_ORDER = 6
_EYE_NUMERATOR = (0.041661, 44.758, 2715.6, 29839.0, 0.0)
_EYE_DENOMINATOR = (1.0, 196.32, 11781.0, 534820.0, 3505380.0)
_SMOOTHING_S = 0.300
_REFERENCE_HZ = 8.8
_REFERENCE_CHANGE = 0.00630  # peak-to-peak relative change that is just perceptible
_SETTLING_S = 20.0
_NOISE_EXCESS = 1.2  # PstLM of simulated white noise over that of constant perception
_PERCEPTION_RATE_HZ = 2000.0

# Weight of each group, and the percentages of time exceeded that are averaged in it.
_LEVELS: tuple[tuple[float, tuple[float, ...]], ...] = (
    (0.0314, (0.1,)),
    (0.0525, (0.7, 1.0, 1.5)),
    (0.0657, (2.2, 3.0, 4.0)),
    (0.28, (6.0, 8.0, 10.0, 13.0, 17.0)),
    (0.08, (30.0, 50.0, 80.0)),
)


@lru_cache(maxsize=16)
def _sections(rate_hz: float) -> Array:
    """High-pass, low-pass and eye filter at a sampling rate, as second-order sections."""
    from scipy import signal

    zeros, poles = np.roots(_EYE_NUMERATOR), np.roots(_EYE_DENOMINATOR)
    eye = signal.bilinear_zpk(zeros, poles, _EYE_NUMERATOR[0], fs=rate_hz)
    sections = np.vstack(
        [
            signal.butter(1, _HIGH_PASS_HZ, "highpass", fs=rate_hz, output="sos"),
            signal.butter(_LOW_PASS_ORDER, _LOW_PASS_HZ, "lowpass", fs=rate_hz, output="sos"),
            signal.zpk2sos(*eye),
        ]
    )
    return np.asarray(sections, dtype=np.float64)


def light_response(frequency_hz: Array, sampling_rate_hz: float) -> Array:
    """Magnitude of the filters of the light flickermeter before the squaring.

    Parameters
    ----------
    frequency_hz
        Frequencies [Hz] (frequencies,).
    sampling_rate_hz
        Samples per second at which the filters run [Hz].

    Returns
    -------
    ndarray
        Magnitude (frequencies,).

    Notes
    -----
    Source: iec_tr_61547_1, Annex A.
    """
    from scipy import signal

    angle = 2 * np.pi * np.asarray(frequency_hz, dtype=np.float64) / sampling_rate_hz
    _, response = signal.freqz_sos(_sections(sampling_rate_hz), angle)
    return np.asarray(np.abs(response), dtype=np.float64)


def _scale(rate_hz: float) -> float:
    """Factor that makes the reference sine reach an instantaneous perception of one."""
    gain = float(light_response(np.array([_REFERENCE_HZ]), rate_hz)[0])
    ripple = 1 / np.hypot(1, 2 * np.pi * 2 * _REFERENCE_HZ * _SMOOTHING_S)
    mean = (_REFERENCE_CHANGE / 2 * gain) ** 2 / 2
    return float(1 / (mean * (1 + ripple)))


def pst_lm(values: Array, sampling_rate_hz: float) -> Array:
    """Short-term flicker of light.

    The first 20 s, or the first third of a record shorter than a minute, settle the filters
    and are dropped.

    Parameters
    ----------
    values
        Light, linear, any scale, mean above zero (series, samples).
    sampling_rate_hz
        Samples per second [Hz], 2000 or more.

    Returns
    -------
    ndarray
        PstLM (series,).

    Raises
    ------
    ValueError
        If the record is shorter than 30 s or sampled below 2 kHz.

    Notes
    -----
    Source: iec_tr_61547_1, Annex A, equations A.4 to A.6.
    """
    duration = values.shape[1] / sampling_rate_hz
    if not enough_for_pst_lm(duration, sampling_rate_hz):
        raise ValueError(
            f"PstLM needs {SHORTEST_RECORD_S:g} s at {FEWEST_SAMPLES_PER_S:g} Hz or more, "
            f"the record has {duration:g} s at {sampling_rate_hz:g} Hz"
        )
    # One series at a time: a long record of several units would not fit in memory twice.
    return np.array([_pst_lm_of_one(series, sampling_rate_hz) for series in values])


def enough_for_pst_lm(duration_s: float, sampling_rate_hz: float) -> bool:
    """Whether a record is long enough and sampled fast enough; a rounded time column may miss."""
    return (
        duration_s >= SHORTEST_RECORD_S * 0.999 and sampling_rate_hz >= FEWEST_SAMPLES_PER_S * 0.999
    )


def _pst_lm_of_one(series: Array, rate_hz: float) -> float:
    perception = _instantaneous_perception(series, rate_hz)
    percent = [share for _, shares in _LEVELS for share in shares]
    weight = [group / len(shares) for group, shares in _LEVELS for _ in shares]
    levels = np.quantile(perception, 1 - np.array(percent) / 100)
    return float(np.sqrt(np.maximum(levels, 0.0) @ np.array(weight)))


def _instantaneous_perception(series: Array, rate_hz: float) -> Array:
    """Instantaneous flicker perception after settling, at about 2 kHz (samples,)."""
    from scipy import signal

    filtered = signal.sosfilt(_sections(rate_hz), series / series.mean() - 1)
    # The low-pass leaves nothing above 1 kHz, so samples may be left out without folding.
    step = max(1, int(rate_hz / _PERCEPTION_RATE_HZ + 1e-6))
    squared = filtered[::step] ** 2 * _scale(rate_hz)
    corner = 1 / (2 * np.pi * _SMOOTHING_S)
    smooth = signal.sosfilt(signal.butter(1, corner, fs=rate_hz / step, output="sos"), squared)
    settling = min(_SETTLING_S, series.size / rate_hz / 3)
    return np.asarray(smooth[round(settling * rate_hz / step) :], dtype=np.float64)


def noise_pst_lm(noise_power_per_hz: Array, sampling_rate_hz: float) -> Array:
    """The PstLM that noise alone would give, to tell whether the noise floor is material.

    Parameters
    ----------
    noise_power_per_hz
        Power density of the noise from 1 to 100 Hz, relative to the squared mean light
        [1/Hz] (series,).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    ndarray
        PstLM of the noise (series,), good to some 15 %: perception is taken at its mean, and
        the surplus of a perception that comes and goes was found by simulation.

    Notes
    -----
    Source: lampassay_methods, noise of PstLM, from the filters of iec_tr_61547_1, Annex A.
    """
    frequency = np.linspace(0.25, 100.0, 400)
    gain = light_response(frequency, sampling_rate_hz)
    mean = _scale(sampling_rate_hz) * float(np.trapezoid(gain**2, frequency)) * noise_power_per_hz
    total = sum(group for group, _ in _LEVELS)
    return np.asarray(_NOISE_EXCESS * np.sqrt(total * mean), dtype=np.float64)
