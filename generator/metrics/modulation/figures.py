"""All modulation figures of a batch of light records."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say
from generator.metrics.modulation.amplitude_modulation import (
    CUT_OFFS_HZ,
    percent_amplitude_modulation,
)
from generator.metrics.modulation.flicker import flicker_index, percent_flicker
from generator.metrics.modulation.light_lines import LightLines, light_lines
from generator.metrics.modulation.low_risk import low_risk_modulation
from generator.metrics.modulation.period import fundamental_frequency
from generator.metrics.modulation.record_remarks import highest_percent_flicker, light_remarks
from generator.metrics.modulation.short_term_flicker import (
    SHORTEST_RECORD_S,
    enough_for_pst_lm,
    pst_lm,
)
from generator.metrics.modulation.stroboscopic import HIGHEST_FREQUENCY_HZ, svm
from generator.metrics.withheld import withheld
from generator.records.figure import SeriesFigures

__all__ = ["METHODS", "light_figures"]

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]
Given = dict[str, tuple[Array, tuple[str, ...]]]

METHODS = {
    "flicker_frequency_hz": "light_fundamental_whole_waveform",
    "percent_flicker": "percent_flicker_cie_eilv",
    "flicker_index": "flicker_index_iec_60050_845",
    "svm": "svm_iec_tr_63158_2018",
    "pst_lm": "pst_lm_iec_tr_61547_1_2020",
    **{f"pam_{hz}hz_percent": "pam_ja10_2019" for hz in CUT_OFFS_HZ},
    "low_risk_modulation_percent": "low_risk_ieee_1789_2015",
}
"""Quantity name -> method id."""

_SHORTEST_RECORD_S = 0.2
_LOWEST_RATE_HZ = 2000.0  # that of PstLM; below, ripple and its harmonics fold together
_RATE_MARGIN = 0.9999  # a rate taken from a rounded time column may miss by this much
_SPARSE = say("sampled below {rate} Hz", rate=numeral(f"{2 * HIGHEST_FREQUENCY_HZ:g}"))
_NO_FREQUENCY = say("no modulation stands clear of the noise")
_TOO_DARK = say("percent flicker above 100 %: the dark signal is over-subtracted")
_SHORT = say("the light record is {duration} s long, shorter than {least} s")
_LEAST_MEAN = 1e-6  # of the largest excursion: below, the mean is what rounding left of it
_LARGEST_EXPONENT = 1000  # of the power of two that brings a record near one


def light_figures(
    values: Array, sampling_rate_hz: float, *, mains_frequency_hz: float | None = None
) -> SeriesFigures:
    """All modulation figures of a batch of light records.

    Parameters
    ----------
    values
        Light, linear, any scale, dark signal removed (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    mains_frequency_hz
        Mains frequency [Hz], where known: light without a period of its own is then cut to
        whole mains cycles.

    Returns
    -------
    SeriesFigures
        The group ``modulation`` of the catalogue, with reasons, methods and remarks.

    Raises
    ------
    ValueError
        If the values are no table of series or the sampling rate is not above zero.
    """
    if values.ndim != 2 or not sampling_rate_hz > 0:
        raise ValueError(
            "expected light as (series, samples) and a sampling rate above zero, "
            f"got shape {values.shape} at {sampling_rate_hz} Hz"
        )
    samples = values.shape[1]
    unusable = _unusable(values, sampling_rate_hz)
    usable = np.array([not reason for reason in unusable])
    if samples < 3 or not usable.any():
        return _nothing(unusable)
    light = _near_one(np.where(usable[:, None], values, 1.0))
    lines = light_lines(light, sampling_rate_hz)
    given: Given = _frequency_figures(lines)
    frequency = given["flicker_frequency_hz"][0]
    percent = percent_flicker(light)
    too_dark = percent > highest_percent_flicker(light, lines)
    given["percent_flicker"] = withheld(np.minimum(percent, 100.0), (too_dark, _TOO_DARK))
    given["flicker_index"] = withheld(
        flicker_index(light, sampling_rate_hz, 1 / frequency), (too_dark, _TOO_DARK)
    )
    given["svm"] = _svm_figure(lines, sampling_rate_hz, too_dark)
    given["pst_lm"] = _pst_lm_figure(light, sampling_rate_hz, too_dark)
    mains = np.nan if mains_frequency_hz is None else 1 / mains_frequency_hz
    period = np.where(np.isfinite(frequency), 1 / frequency, mains)
    given |= _amplitude_modulation_figures(light, sampling_rate_hz, period, too_dark)
    return SeriesFigures(
        values={name: np.where(usable, figure, np.nan) for name, (figure, _) in given.items()},
        reasons={
            name: tuple(first or second for first, second in zip(unusable, reasons, strict=True))
            for name, (_, reasons) in given.items()
        },
        methods=METHODS,
        remarks=light_remarks(light, sampling_rate_hz, lines, percent, usable),
    )


def _unusable(values: Array, sampling_rate_hz: float) -> tuple[str, ...]:
    """Why a record cannot be used at all; empty text where it can."""
    duration = values.shape[1] / sampling_rate_hz
    finite: Flags = np.all(np.isfinite(values), axis=1)
    numbers = np.where(finite[:, None], values, 0.0)
    largest = np.abs(numbers).max(axis=1, initial=0.0)
    relative = numbers / np.where(largest > 0, largest, 1.0)[:, None]
    lit = relative.sum(axis=1) > _LEAST_MEAN * values.shape[1]
    return withheld(
        np.zeros(values.shape[0]),
        (~finite, say("the light record has gaps")),
        (
            np.full(finite.shape, duration < _SHORTEST_RECORD_S * 0.99),
            _too_short(duration, _SHORTEST_RECORD_S),
        ),
        (
            np.full(finite.shape, sampling_rate_hz < _LOWEST_RATE_HZ * _RATE_MARGIN),
            say(
                "sampled at {rate} Hz, below {least} Hz",
                rate=numeral(f"{sampling_rate_hz:g}"),
                least=numeral(f"{_LOWEST_RATE_HZ:g}"),
            ),
        ),
        (~lit, say("no light in the record: its mean is not above zero")),
    )[1]


def _too_short(duration_s: float, least_s: float) -> str:
    return _SHORT.format(duration=numeral(f"{duration_s:.3g}"), least=numeral(f"{least_s:g}"))


def _near_one(values: Array) -> Array:
    """Records on another scale, so that no square overflows; a power of two rounds nothing."""
    _, exponent = np.frexp(values.max(axis=1, keepdims=True))
    return np.asarray(np.ldexp(values, np.clip(-exponent, -_LARGEST_EXPONENT, _LARGEST_EXPONENT)))


def _nothing(reasons: tuple[str, ...]) -> SeriesFigures:
    return SeriesFigures(
        values={name: np.full(len(reasons), np.nan) for name in METHODS},
        reasons=dict.fromkeys(METHODS, reasons),
        methods=METHODS,
        remarks=((),) * len(reasons),
    )


def _frequency_figures(lines: LightLines) -> Given:
    frequency, _ = fundamental_frequency(lines)
    silent = np.isnan(frequency)
    line = low_risk_modulation(frequency)
    return {
        "flicker_frequency_hz": withheld(frequency, (silent, _NO_FREQUENCY)),
        "low_risk_modulation_percent": withheld(
            line,
            (silent, _NO_FREQUENCY),
            (np.isnan(line), say("the low-risk line ends below this frequency")),
        ),
    }


def _svm_figure(
    lines: LightLines, sampling_rate_hz: float, too_dark: Flags
) -> tuple[Array, tuple[str, ...]]:
    sparse = sampling_rate_hz < 2 * HIGHEST_FREQUENCY_HZ * _RATE_MARGIN
    return withheld(svm(lines), (sparse, _SPARSE), (too_dark, _TOO_DARK))


def _pst_lm_figure(
    values: Array, sampling_rate_hz: float, too_dark: Flags
) -> tuple[Array, tuple[str, ...]]:
    duration = values.shape[1] / sampling_rate_hz
    if enough_for_pst_lm(duration, sampling_rate_hz):
        return withheld(pst_lm(values, sampling_rate_hz), (too_dark, _TOO_DARK))
    reason = _too_short(duration, SHORTEST_RECORD_S)
    return withheld(np.full(values.shape[0], np.nan), (True, reason))


def _amplitude_modulation_figures(
    values: Array, sampling_rate_hz: float, period_s: Array, too_dark: Flags
) -> Given:
    table = percent_amplitude_modulation(values, sampling_rate_hz, period_s)
    return {
        f"pam_{hz}hz_percent": withheld(
            column,
            (
                2 * hz >= sampling_rate_hz,
                say("sampled below {rate} Hz, twice the cut-off", rate=2 * hz),
            ),
            (too_dark | np.isnan(column), _TOO_DARK),
        )
        for hz, column in zip(CUT_OFFS_HZ, table.T, strict=True)
    }
