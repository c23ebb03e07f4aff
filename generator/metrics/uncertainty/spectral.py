"""Uncertainty of all figures of spectra, by drawing the errors of the spectroradiometer."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.metrics.uncertainty.monte_carlo import stable_generator
from generator.records.figure import SeriesFigures

__all__ = [
    "SCALE_QUANTITIES",
    "SPECTRAL_TRIALS",
    "SpectralInputs",
    "spectral_draws",
    "spectral_uncertainty",
]

Array = NDArray[np.float64]

SPECTRAL_TRIALS = 400
"""Trials per spectrum: the standard deviation they give is itself known to 3.5 % or better."""

SCALE_QUANTITIES = frozenset({"luminous_flux_lm", "radiant_flux_w"})
"""Figures that the scale of the spectrum multiplies; all others do not depend on it."""

_TIED_TO_THE_GRID = frozenset({"peak_wavelength_nm"})
"""Figures that jump from sample to sample: half a step to either side joins their draws."""

_SOUND_SHARE = 0.9


@dataclass(frozen=True, slots=True)
class SpectralInputs:
    """Expanded uncertainties (k = 2) stated for spectra; ``None`` where nothing is stated.

    Parameters
    ----------
    wavelength_scale_nm
        Shift of the whole wavelength scale [nm].
    noise_percent
        Independent error of every sample [percent of the peak].
    calibration_percent
        Smooth error of the spectral responsivity, root mean square over the band [percent].
    flux_scale_percent
        Error of the absolute scale [percent].
    """

    wavelength_scale_nm: float | None = None
    noise_percent: float | None = None
    calibration_percent: float | None = None
    flux_scale_percent: float | None = None

    @property
    def shape_stated(self) -> bool:
        """Whether anything is stated about the shape of the spectrum."""
        shape = (self.wavelength_scale_nm, self.noise_percent, self.calibration_percent)
        return any(number is not None for number in shape)


def spectral_draws(
    wavelength_nm: Array,
    values: Array,
    inputs: SpectralInputs,
    names: Sequence[str],
    trials: int = SPECTRAL_TRIALS,
) -> Array:
    """Spectra as the instrument might as well have measured them.

    Parameters
    ----------
    wavelength_nm
        Wavelengths, ascending [nm] (wavelengths,).
    values
        Spectra, any unit (series, wavelengths).
    inputs
        What is stated.
    names
        Stable name of each series, from which its noise is drawn (series,).
    trials
        Trials per series.

    Returns
    -------
    Array
        Drawn spectra (series, trials, wavelengths). Shift, responsivity and scale are errors of
        the instrument, so their draws are common to all series; noise is drawn for each.
    """
    drawn = np.repeat(values[:, np.newaxis, :], trials, axis=1)
    shift, slope, bow, scale = _instrument_errors(trials)
    if inputs.wavelength_scale_nm is not None:
        drawn += _shifted(wavelength_nm, values, inputs.wavelength_scale_nm / 2.0 * shift)
    if inputs.calibration_percent is not None:
        deviation = inputs.calibration_percent / 200.0
        drawn *= _responsivity(wavelength_nm, deviation * slope, deviation * bow)
    if inputs.flux_scale_percent is not None:
        drawn *= 1.0 + inputs.flux_scale_percent / 200.0 * scale[:, np.newaxis]
    if inputs.noise_percent is not None:
        peak = np.max(values, axis=-1)
        for index, name in enumerate(names):
            noise = stable_generator("spectral noise", name).standard_normal(drawn.shape[1:])
            drawn[index] += inputs.noise_percent / 200.0 * peak[index] * noise
    return drawn


def spectral_uncertainty(
    wavelength_nm: Array,
    values: Array,
    inputs: SpectralInputs,
    names: Sequence[str],
    figures: Callable[[Array, Array], SeriesFigures],
    trials: int = SPECTRAL_TRIALS,
) -> Mapping[str, Array]:
    """Expanded uncertainty of every figure that follows from spectra.

    Parameters
    ----------
    wavelength_nm, values, inputs, names, trials
        As for :func:`spectral_draws`.
    figures
        The figures of a batch of spectra: wavelengths (wavelengths,) and values
        (series, wavelengths) to figures.

    Returns
    -------
    Mapping
        Quantity name -> expanded uncertainty (k = 2), twice the standard deviation of the
        trials (series,); not-a-number where more than a tenth of the trials gave no figure.
        Only quantities that the stated inputs bear upon are given: none where nothing is
        stated about the shape of spectra, and no flux where nothing is stated about the scale.
        Source: jcgm_101, clause 7.
    """
    if not inputs.shape_stated:
        return {}
    drawn = spectral_draws(wavelength_nm, values, inputs, names, trials)
    series = values.shape[0]
    found = figures(wavelength_nm, drawn.reshape(series * trials, wavelength_nm.size))
    scaled = inputs.flux_scale_percent is not None
    known = {
        name: _twice_deviation(numbers.reshape(series, trials))
        for name, numbers in found.values.items()
        if scaled or name not in SCALE_QUANTITIES
    }
    step = float(np.max(np.diff(wavelength_nm)))
    for name in _TIED_TO_THE_GRID & known.keys():
        known[name] = np.hypot(known[name], 2.0 * step / np.sqrt(12.0))
    return known


def _instrument_errors(trials: int) -> Array:
    """Shift, slope, bow and scale in units of their deviation (4, trials).

    The same draws serve all lamps, so that what is amiss with them does not average out: they
    are made to have exactly the mean, deviation and independence of what they stand for.
    """
    normal = stable_generator("spectroradiometer").standard_normal((trials, 4))
    directions, _ = np.linalg.qr(normal - normal.mean(axis=0))
    return np.asarray(directions.T * np.sqrt(trials - 1.0))


def _shifted(wavelength_nm: Array, values: Array, shift_nm: Array) -> Array:
    """Change of the spectra under shifts of the scale, by a Taylor series of their spline."""
    from scipy.interpolate import CubicSpline

    spline = CubicSpline(wavelength_nm, values, axis=-1)
    slope = np.asarray(spline(wavelength_nm, 1))[:, np.newaxis, :]
    bend = np.asarray(spline(wavelength_nm, 2))[:, np.newaxis, :]
    step = shift_nm[np.newaxis, :, np.newaxis]
    return np.asarray(step * slope + 0.5 * step**2 * bend)


def _responsivity(wavelength_nm: Array, slope: Array, bow: Array) -> Array:
    """Gain with a slope and a bow of equal power across the band (trials, wavelengths)."""
    first, last = wavelength_nm[0], wavelength_nm[-1]
    place = (2.0 * wavelength_nm - first - last) / (last - first)
    straight = np.sqrt(3.0 / 2.0) * place
    curved = np.sqrt(5.0 / 2.0) * 0.5 * (3.0 * place**2 - 1.0)
    return np.asarray(1.0 + slope[:, np.newaxis] * straight + bow[:, np.newaxis] * curved)


def _twice_deviation(numbers: Array) -> Array:
    sound = np.isfinite(numbers)
    count = np.sum(sound, axis=1)
    usable = count >= _SOUND_SHARE * numbers.shape[1]
    centre = np.sum(np.where(sound, numbers, 0.0), axis=1) / np.maximum(count, 1)
    square = np.where(sound, (numbers - centre[:, np.newaxis]) ** 2, 0.0)
    deviation = np.sqrt(np.sum(square, axis=1) / np.maximum(count - 1, 1))
    return np.asarray(np.where(usable, 2.0 * deviation, np.nan))
