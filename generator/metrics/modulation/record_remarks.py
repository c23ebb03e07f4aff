"""What a light record says about itself: noise, clipping, dark signal, length, sampling rate."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say
from generator.metrics.modulation.light_lines import LightLines
from generator.metrics.modulation.period import fundamental_frequency, strongest_frequency
from generator.metrics.modulation.short_term_flicker import (
    SHORTEST_RECORD_S,
    enough_for_pst_lm,
    noise_pst_lm,
)
from generator.metrics.modulation.stroboscopic import svm

__all__ = [
    "DARK_FLICKER",
    "NOISE_IN_FLICKER",
    "NOISE_IN_PST_LM",
    "NOISE_IN_SVM",
    "SHORT_FOR_PST_LM",
    "SHORT_RECORD",
    "SPARSE_RECORD",
    "clipped",
    "highest_percent_flicker",
    "light_remarks",
    "noise_reach_percent",
]

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]
Rule = tuple[Flags, str | Callable[[int], str]]

DARK_FLICKER = say("noise about zero light: percent flicker is given as 100 %")
NOISE_IN_FLICKER = say("noise may raise percent flicker by up to {points} points")
NOISE_IN_SVM = say("noise adds {svm} to the stroboscopic visibility measure")
NOISE_IN_PST_LM = say("noise alone would give a PstLM of about {pst}")
SHORT_FOR_PST_LM = say("PstLM rests on {duration} s; 60 s or more is recommended")
SPARSE_RECORD = say("sampled at {rate} Hz; 20 kHz or more is usual")
SHORT_RECORD = say("the light record is {duration} s long; 1 s or more is usual")
"""What is said of a record and bears on some of its figures alone."""

_CLIPPED = say("the light record looks clipped: its top is flat")
_TOO_DARK = say("the light goes below zero: the dark signal is over-subtracted")
_NO_PERIOD = say("components that share no period; the strongest is at {frequency} Hz")
_REPEATS = say(
    "the waveform repeats at {frequency} Hz; its strongest component is at {strongest} Hz"
)

_USUAL_RATE_HZ = 20000.0  # ca_ja10, JA10.5: interval of 50 us or less
_USUAL_RECORD_S = 1.0  # ca_ja10, JA10.5
_RECOMMENDED_PST_RECORD_S = 60.0
_CLIPPED_SHARE = 0.02  # of the samples inside a flat top
_SHOULDER = 0.02  # of the range below the top, and
_SHOULDER_STEPS = 4  # no fewer than this many steps of the digitiser
_JUMP = 0.05  # of the range: a light that comes from farther below jumps to its top
_FLICKER_NOISE_PERCENT = 0.5  # noise reach in percent flicker that is worth a word
_FLICKER_NOISE_SHARE = 0.05
_REACH_MARGIN = 3.0  # at the dark end noise counts twice over when the mean lies low
_SVM_NOISE = 0.01
_PST_NOISE = 0.1


def noise_reach_percent(values: Array, lines: LightLines) -> Array:
    """How far noise alone is expected to push percent flicker up, at the most.

    Noise is what shows both between the lines of the spectrum and from sample to sample: the
    edges of a pulse-width-modulated light spread in the spectrum alone, a steep slope shows from
    sample to sample alone.

    Parameters
    ----------
    values
        Light (series, samples).
    lines
        Lines of the light with the noise floor.

    Returns
    -------
    ndarray
        Percent flicker of the noise [%] (series,): the expected greatest excursion of that many
        samples of Gaussian noise.

    Notes
    -----
    The median of the absolute value of a Gaussian is 0.6745 of its standard deviation; second
    differences of white noise have the square root of 6 of it.
    Source: lampassay_methods, noise of percent flicker.
    """
    bends = np.abs(np.diff(values, n=2, axis=1))
    by_samples = np.median(bends, axis=1) / (0.6745 * np.sqrt(6) * values.mean(axis=1))
    excursion = np.sqrt(2 * np.log(values.shape[1]))
    return np.asarray(100 * np.minimum(lines.noise_rms, by_samples) * excursion, dtype=np.float64)


def highest_percent_flicker(values: Array, lines: LightLines) -> Array:
    """Percent flicker above which the dark signal must be over-subtracted.

    Light cannot be negative, so that percent flicker ends at 100 %; noise about zero light may
    carry it a little further.

    Parameters
    ----------
    values
        Light (series, samples).
    lines
        Lines of the light with the noise floor.

    Returns
    -------
    ndarray
        Percent flicker [%] (series,).

    Notes
    -----
    Source: lampassay_methods, noise of percent flicker.
    """
    return 100 + _REACH_MARGIN * noise_reach_percent(values, lines)


def clipped(values: Array) -> Flags:
    """Whether the receiver seems to have saturated: a flat top that the light slides into.

    A pulse-width-modulated light has a flat top as well, but jumps to it; a clipped one
    passes through the levels just under the top.

    Parameters
    ----------
    values
        Light (series, samples).

    Returns
    -------
    ndarray
        Flags (series,).

    Notes
    -----
    Source: lampassay_methods, clipping.
    """
    top = values.max(axis=1, keepdims=True)
    span = top - values.min(axis=1, keepdims=True)
    at_top = values == top
    flat = (at_top[:, :-2] & at_top[:, 1:-1] & at_top[:, 2:]).mean(axis=1)
    below = np.where(at_top, -np.inf, values).max(axis=1, keepdims=True)
    step = np.where(np.isfinite(below), top - below, span)
    width = np.maximum(_SHOULDER * span, _SHOULDER_STEPS * step)
    shoulder = (~at_top & (values >= top - width)).mean(axis=1)
    slides = step[:, 0] < _JUMP * span[:, 0]
    return np.asarray(slides & (flat >= _CLIPPED_SHARE) & (flat >= shoulder), dtype=np.bool_)


def light_remarks(
    values: Array, sampling_rate_hz: float, lines: LightLines, percent: Array, usable: Flags
) -> tuple[tuple[str, ...], ...]:
    """Remarks on light records, fit to be printed.

    Parameters
    ----------
    values
        Light (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    lines
        Lines of the light.
    percent
        Percent flicker as measured [%] (series,).
    usable
        Whether the record holds light at all (series,).

    Returns
    -------
    tuple
        One tuple of remarks per series.
    """
    found = [
        *_noise_remarks(values, sampling_rate_hz, lines, percent),
        *_line_remarks(lines),
        (clipped(values), _CLIPPED),
        *_size_remarks(values, sampling_rate_hz),
    ]
    return tuple(
        tuple(
            text if isinstance(text, str) else text(series)
            for flags, text in found
            if usable[series] and flags[series]
        )
        for series in range(values.shape[0])
    )


def _size_remarks(values: Array, sampling_rate_hz: float) -> list[Rule]:
    """What length and sampling rate of the records say."""
    duration = values.shape[1] / sampling_rate_hz
    known = numeral(f"{duration:.3g}")
    rules = (
        (
            sampling_rate_hz < _USUAL_RATE_HZ * 0.999,
            SPARSE_RECORD.format(rate=numeral(f"{sampling_rate_hz:g}")),
        ),
        (duration < _USUAL_RECORD_S * 0.99, SHORT_RECORD.format(duration=known)),
        (
            SHORTEST_RECORD_S * 0.999 <= duration < _RECOMMENDED_PST_RECORD_S * 0.999,
            SHORT_FOR_PST_LM.format(duration=known),
        ),
    )
    return [(np.full(values.shape[0], holds), text) for holds, text in rules]


def _noise_remarks(
    values: Array, sampling_rate_hz: float, lines: LightLines, percent: Array
) -> list[Rule]:
    reach = noise_reach_percent(values, lines)
    dark = percent > highest_percent_flicker(values, lines)
    noise_svm = svm(lines) - svm(lines, material_only=True)
    noise_pst = _noise_pst(values, sampling_rate_hz, lines)
    return [
        (dark, _TOO_DARK),
        ((percent > 100) & ~dark, DARK_FLICKER),
        (
            (reach > _FLICKER_NOISE_PERCENT) & (reach > _FLICKER_NOISE_SHARE * percent),
            lambda i: NOISE_IN_FLICKER.format(points=numeral(f"{reach[i]:.1f}")),
        ),
        (
            noise_svm > _SVM_NOISE,
            lambda i: NOISE_IN_SVM.format(svm=numeral(f"{noise_svm[i]:.2f}")),
        ),
        (
            noise_pst > _PST_NOISE,
            lambda i: NOISE_IN_PST_LM.format(pst=numeral(f"{noise_pst[i]:.2f}")),
        ),
    ]


def _noise_pst(values: Array, sampling_rate_hz: float, lines: LightLines) -> Array:
    """PstLM of the noise alone; zero, and no filters loaded, where no PstLM is given (series,)."""
    if not enough_for_pst_lm(values.shape[1] / sampling_rate_hz, sampling_rate_hz):
        return np.zeros(values.shape[0])
    density = lines.noise_power[:, 0] / lines.resolution_hz
    return noise_pst_lm(density, sampling_rate_hz)


def _line_remarks(lines: LightLines) -> list[Rule]:
    frequency, fits = fundamental_frequency(lines)
    strongest = strongest_frequency(lines)
    return [
        (~fits, lambda i: _NO_PERIOD.format(frequency=numeral(f"{strongest[i]:.1f}"))),
        (
            fits & (strongest > 1.5 * frequency),
            lambda i: _REPEATS.format(
                frequency=numeral(f"{frequency[i]:.1f}"), strongest=numeral(f"{strongest[i]:.1f}")
            ),
        ),
    ]
