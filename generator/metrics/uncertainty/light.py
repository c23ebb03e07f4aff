"""Uncertainty of the figures of light records, from noise, offset and time base."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.metrics.modulation.amplitude_modulation import CUT_OFFS_HZ, waves_below
from generator.metrics.modulation.light_lines import STRETCH_S, line_peaks
from generator.metrics.modulation.short_term_flicker import noise_pst_lm
from generator.metrics.modulation.stroboscopic import HIGHEST_FREQUENCY_HZ, visibility_threshold
from generator.metrics.uncertainty.coverage import expanded_with_lift
from generator.metrics.uncertainty.extremes import noise_of_swing_percent
from generator.metrics.uncertainty.monte_carlo import stable_generator
from generator.metrics.whole_periods import whole_period_weights
from generator.records.figure import SeriesFigures

__all__ = ["LIGHT_TRIALS", "LightInputs", "light_uncertainty"]

Array = NDArray[np.float64]

LIGHT_TRIALS = 200
"""Trials per record: the standard deviation they give is itself known to 5 %."""

_EXPONENT = 3.7
_MORE_BINS = 4
_CERTAIN = 4.0  # deviations by which a figure must stand out of its noise, or else be all noise
_MEAN_ABSOLUTE = float(np.sqrt(2 / np.pi))  # mean of the absolute value of unit Gaussian noise
_SETTLING_S = 20.0
_PST_SCATTER = 0.17
"""Scatter of PstLM under white noise, times the root of the seconds judged, over the PstLM of the
noise alone: 0.13 to 0.17 in simulations with and without flicker (lampassay_methods)."""
_PST_BEAT = 0.26
"""Share of the product of flicker and noise in the square of PstLM, from simulations (the same)."""


@dataclass(frozen=True, slots=True)
class LightInputs:
    """Expanded uncertainties (k = 2) stated for light records; ``None`` where nothing is stated.

    Parameters
    ----------
    noise_percent
        Independent error of every sample [percent of the mean].
    offset_percent
        Dark signal and stray light left in the record [percent of the mean].
    time_base_percent
        Error of the sampling rate [percent].
    """

    noise_percent: float | None = None
    offset_percent: float | None = None
    time_base_percent: float | None = None

    @property
    def light_stated(self) -> bool:
        """Whether anything is stated about the light itself."""
        return self.noise_percent is not None or self.offset_percent is not None

    @property
    def noise(self) -> float:
        """Standard deviation of a sample, relative to the mean; zero where not stated."""
        return (self.noise_percent or 0.0) / 200

    @property
    def offset(self) -> float:
        """Standard uncertainty of the offset, relative to the mean; zero where not stated."""
        return (self.offset_percent or 0.0) / 200


def light_uncertainty(
    values: Array,
    sampling_rate_hz: float,
    found: SeriesFigures,
    inputs: LightInputs,
    names: tuple[str, ...],
    trials: int = LIGHT_TRIALS,
    *,
    only_pst_lm: bool = False,
) -> Mapping[str, Array]:
    """Expanded uncertainty of the modulation figures of light records.

    Noise makes most of these figures larger, never smaller; as they are given as they are
    measured, that surplus is part of the uncertainty, beside the scatter.

    Parameters
    ----------
    values
        Light, linear, any scale (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    found
        The figures of these records.
    inputs
        What is stated.
    names
        Stable name of each series, from which its noise is drawn. Series of one name share the
        draws of the first of them, as units of one lamp have nearly the same light.
    trials
        Trials for the stroboscopic visibility measure.
    only_pst_lm
        Whether nothing but PstLM is asked for, as of long records.

    Returns
    -------
    Mapping
        Quantity name -> expanded uncertainty (k = 2) (series,); not-a-number where there is no
        figure. Frequencies are given only where the time base is stated, all others only where
        something is stated about the light.

    Notes
    -----
    An offset divides every relative modulation alike; the low-risk line is proportional to the
    frequency. The scatter of the stroboscopic visibility
    measure is drawn; extremes, flicker index and PstLM follow closed forms.
    Source: jcgm_100, equation 10 and F.2.4.5; jcgm_101, clause 7.
    """
    usable = np.isfinite(found.values["percent_flicker"])
    known: dict[str, Array] = {}
    if inputs.time_base_percent is not None:
        for name in ("flicker_frequency_hz", "low_risk_modulation_percent"):
            known[name] = found.values[name] * inputs.time_base_percent / 100
    if inputs.light_stated:
        duration = values.shape[1] / sampling_rate_hz
        known["pst_lm"] = _pst_lm(duration, sampling_rate_hz, found, inputs)
    if inputs.light_stated and not only_pst_lm:
        light = np.where(usable[:, np.newaxis], values, 1.0)
        light = light / light.mean(axis=1, keepdims=True)
        noise = np.full(usable.size, inputs.noise)
        period = 1 / found.values["flicker_frequency_hz"]
        known["percent_flicker"] = noise_of_swing_percent(light, noise, inputs.offset)
        known["flicker_index"] = _flicker_index(light, period * sampling_rate_hz, found, inputs)
        known["svm"] = _svm(light, sampling_rate_hz, found, inputs, names, trials)
        known |= _amplitude_modulation(light, sampling_rate_hz, period, inputs)
    return {
        name: np.where(np.isfinite(found.values[name]), expanded, np.nan)
        for name, expanded in known.items()
    }


def _lifted(figure: Array, of_noise: float, by_noise: Array, by_offset: Array) -> Array:
    """Expanded uncertainty of a figure whose square noise adds to (series,)."""
    most = of_noise + 2 * by_noise
    lift = figure - np.sqrt(np.maximum(figure**2 - most**2, 0.0))
    return expanded_with_lift(lift, np.hypot(by_noise, by_offset))


def _flicker_index(
    light: Array, period_samples: Array, found: SeriesFigures, inputs: LightInputs
) -> Array:
    index = found.values["flicker_index"]
    weights = whole_period_weights(light.shape[1], period_samples)
    weights /= np.einsum("sn,sn->s", weights, light)[:, np.newaxis]
    mean = 1 / weights.sum(axis=1, keepdims=True)
    above = light > mean
    share = np.sum(weights * above, axis=1) * mean[:, 0]
    # A sample above the mean adds itself to the area above, and lifts the mean.
    slope = weights * (above - (share + index)[:, np.newaxis])
    by_noise = inputs.noise * np.sqrt(np.einsum("sn,sn->s", slope, slope))
    of_noise = _MEAN_ABSOLUTE / 2 * inputs.noise
    return _lifted(index, of_noise, by_noise, index * inputs.offset)


def _svm(
    light: Array,
    sampling_rate_hz: float,
    found: SeriesFigures,
    inputs: LightInputs,
    names: tuple[str, ...],
    trials: int,
) -> Array:
    measure = found.values["svm"]
    given = np.isfinite(measure)
    by_noise = np.zeros_like(measure)
    lift = np.zeros_like(measure)
    drawn: dict[str, tuple[float, float]] = {}
    for index, name in enumerate(names) if inputs.noise > 0 else ():
        if given[index] and name not in drawn:
            drawn[name] = _svm_draws(light[index], sampling_rate_hz, inputs.noise, name, trials)
        by_noise[index], lift[index] = drawn.get(name, (np.nan, np.nan))
    lift = np.where(lift + _CERTAIN * by_noise >= measure, measure, lift)
    return expanded_with_lift(lift, np.hypot(by_noise, measure * inputs.offset))


def _svm_draws(
    light: Array, sampling_rate_hz: float, noise: float, name: str, trials: int
) -> tuple[float, float]:
    """Scatter and lift of the stroboscopic visibility measure of one record under noise."""
    stretches = max(1, int(light.size / sampling_rate_hz / STRETCH_S + 1e-6))
    length = light.size // stretches
    last = int(HIGHEST_FREQUENCY_HZ * length / sampling_rate_hz + 0.5) + _MORE_BINS
    last = min(last, length // 2)
    window = np.hanning(length + 1)[:-1]
    stretch = light[:length] - light[:length].mean()
    spectrum = np.fft.rfft(stretch * window)[: last + 1] * 4 / length
    normal = stable_generator("light noise", name).standard_normal((2, trials, last + 3))
    white = (normal[0] + 1j * normal[1]) * noise * np.sqrt(length / 2 / stretches) * 4 / length
    errors = white[:, 1:-1] / 2 - (white[:, :-2] + white[:, 2:]) / 4
    frequency = sampling_rate_hz / length
    measured = _svm_of(np.abs(spectrum[np.newaxis]), frequency)
    drawn = _svm_of(np.abs(spectrum + errors), frequency)
    # The measured spectrum holds noise already. A second helping makes the noise larger by the
    # square root of 2 and lifts the figure by so much less than the first one did.
    lift = float(np.mean(drawn) - measured[0]) / (np.sqrt(2) - 1)
    return float(np.std(drawn, ddof=1)), max(lift, 0.0)


def _svm_of(height: Array, resolution_hz: float) -> Array:
    place, amplitude = line_peaks(height)
    frequency = place * resolution_hz
    inside = frequency <= HIGHEST_FREQUENCY_HZ + resolution_hz / 2
    seen = np.where(inside, amplitude, 0.0) / visibility_threshold(frequency)
    return np.asarray(np.sum(seen**_EXPONENT, axis=1) ** (1 / _EXPONENT))


def _pst_lm(
    duration_s: float, sampling_rate_hz: float, found: SeriesFigures, inputs: LightInputs
) -> Array:
    figure = found.values["pst_lm"]
    density = np.array([2 * inputs.noise**2 / sampling_rate_hz])
    of_noise = float(noise_pst_lm(density, sampling_rate_hz)[0])
    judged = duration_s - min(_SETTLING_S, duration_s / 3)
    by_noise = _PST_SCATTER * of_noise / np.sqrt(judged)
    # Squares add up, and noise beats with flicker: P² = F² + N² + c F N, solved for the flicker F.
    most = of_noise + 2 * by_noise
    beat = _PST_BEAT * most / 2
    flicker = np.sqrt(np.maximum(beat**2 + figure**2 - most**2, 0.0)) - beat
    lift = figure - np.maximum(flicker, 0.0)
    return expanded_with_lift(lift, np.hypot(by_noise, figure * inputs.offset))


def _amplitude_modulation(
    light: Array, sampling_rate_hz: float, period_s: Array, inputs: LightInputs
) -> dict[str, Array]:
    table = np.full((light.shape[0], len(CUT_OFFS_HZ)), np.nan)
    for row, (series, period) in enumerate(zip(light, period_s, strict=True)):
        for column, (wave, kept) in waves_below(series, sampling_rate_hz, float(period)):
            independent = min(kept * series.size / wave.size, 1.0)
            left = np.array([inputs.noise * np.sqrt(kept)])
            table[row, column] = noise_of_swing_percent(
                wave[np.newaxis], left, inputs.offset, independent
            )[0]
    return {f"pam_{hz}hz_percent": column for hz, column in zip(CUT_OFFS_HZ, table.T, strict=True)}
