"""Uncertainties a campaign states, and those that follow from what it states."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace
from decimal import Decimal
from functools import partial

import numpy as np
from numpy.typing import NDArray

from generator.metrics.colour import spectral_figures
from generator.metrics.uncertainty import (
    SpectralInputs,
    combine_powers,
    spectral_uncertainty,
)
from generator.records.campaign import Campaign
from generator.records.figure import Figure, exact
from generator.records.raw import SpectrumSet
from generator.records.settings import Settings, UncertaintyRule

__all__ = [
    "Known",
    "Stated",
    "input_number",
    "propagated",
    "relative_expanded",
    "spectral_inputs",
    "uncertainty_of_spectra",
]

Array = NDArray[np.float64]
Known = dict[tuple[str, str], Decimal]
"""(``lamp_id``, quantity) -> expanded uncertainty (k = 2)."""

_LAMPS_AT_ONCE = 16

_ELECTRICAL_POWERS = {
    "power_factor": {"power_w": 1, "voltage_v": -1, "current_a": -1},
    "apparent_power_va": {"voltage_v": 1, "current_a": 1},
}
"""Products of powers whose uncertainty follows from that of their factors."""


class Stated:
    """Expanded uncertainties that stand in the campaign: ``u_`` columns, then the rules.

    Parameters
    ----------
    campaign
        The campaign.
    """

    def __init__(self, campaign: Campaign) -> None:
        self._rules = campaign.settings.uncertainty
        self._columns = {unit.unit_id: unit.expanded_uncertainty for unit in campaign.units}

    def of(self, unit_id: str, quantity: str, value: Decimal) -> Decimal | None:
        """Stated expanded uncertainty (k = 2) of a value of one unit, or ``None``.

        A percentage says nothing about a value of zero.
        """
        column = self._columns.get(unit_id, {}).get(quantity)
        if column is not None:
            return column
        rule = self._rules.get(quantity)
        return (rule.of(value) or None) if rule is not None else None

    def applied(self, figure: Figure) -> Figure:
        """The figure with what is stated; with what it brought along where nothing is."""
        if figure.number is None:
            return figure
        stated = self.of(figure.unit_id, figure.quantity, figure.number)
        return figure if stated is None else replace(figure, expanded_uncertainty=stated)


def relative_expanded(powers: Sequence[tuple[Figure, int]]) -> float | None:
    """Relative expanded uncertainty of a product of powers of independent figures.

    Parameters
    ----------
    powers
        Figures with their exponents.

    Returns
    -------
    float or None
        Relative expanded uncertainty (k = 2); ``None`` where that of a factor is not known or
        a factor is zero. Source: jcgm_100, equation 12.
    """
    numbers = [(figure.number, figure.expanded_uncertainty) for figure, _ in powers]
    if any(not value or wide is None for value, wide in numbers):
        return None
    estimates = np.array([float(value or 0) for value, _ in numbers])
    expanded = np.array([float(wide or 0) for _, wide in numbers])
    exponents = np.array([float(power) for _, power in powers])
    return float(combine_powers(estimates, exponents, expanded))


def propagated(figures: Sequence[Figure]) -> Iterator[Figure]:
    """Complete the electrical figures whose uncertainty follows from that of others.

    Parameters
    ----------
    figures
        Figures of units, with what is stated about them.

    Yields
    ------
    Figure
        The same figures in the same order.
    """
    best: dict[tuple[str, str], Figure] = {}
    for figure in figures:
        if figure.number is not None and figure.expanded_uncertainty is not None:
            best.setdefault((figure.unit_id, figure.quantity), figure)
    for figure in figures:
        powers = _ELECTRICAL_POWERS.get(figure.quantity)
        if powers is None or figure.number is None or figure.expanded_uncertainty is not None:
            yield figure
            continue
        factors = [(best.get((figure.unit_id, name)), power) for name, power in powers.items()]
        known = [(factor, power) for factor, power in factors if factor is not None]
        share = relative_expanded(known) if len(known) == len(factors) else None
        wide = None if share is None else exact(share * abs(float(figure.number)))
        yield replace(figure, expanded_uncertainty=wide)


def spectral_inputs(settings: Settings) -> SpectralInputs:
    """What ``[uncertainty]`` states about spectra.

    Parameters
    ----------
    settings
        The settings of the campaign.

    Returns
    -------
    SpectralInputs
        From ``wavelength_scale_nm``, ``spectral_noise_percent``,
        ``spectral_calibration_percent``, and the percent rule of ``luminous_flux_lm``.
    """
    flux = settings.uncertainty.get("luminous_flux_lm")
    scale = None if flux is None or flux.percent is None else float(flux.percent)
    return SpectralInputs(
        input_number(settings, "wavelength_scale_nm"),
        input_number(settings, "spectral_noise_percent"),
        input_number(settings, "spectral_calibration_percent"),
        scale,
    )


def input_number(settings: Settings, key: str) -> float | None:
    """What ``[uncertainty]`` states about the raw data under a key that says its unit.

    Parameters
    ----------
    settings
        The settings of the campaign.
    key
        Key of ``[uncertainty]``, for instance ``light_noise_percent``.

    Returns
    -------
    float or None
        Expanded uncertainty (k = 2) in the unit of the key; ``None`` where it is not stated.
    """
    rule = settings.uncertainty.get(key)
    return None if rule is None else float(_size(rule))


def uncertainty_of_spectra(settings: Settings, sets: Sequence[SpectrumSet]) -> Known:
    """Expanded uncertainty of all figures of spectra, drawn once per lamp.

    The units of one lamp have nearly the same spectrum, so the draws are made on their mean.

    Parameters
    ----------
    settings
        The settings of the campaign.
    sets
        Spectra on one wavelength scale and in one unit.

    Returns
    -------
    dict
        (``lamp_id``, quantity) -> expanded uncertainty (k = 2); empty where nothing is stated
        about the shape of spectra.
    """
    inputs = spectral_inputs(settings)
    means = [(item.lamp_id, _mean_spectrum(item.values)) for item in sets]
    usable = [(lamp_id, mean) for lamp_id, mean in means if mean is not None]
    known: Known = {}
    if not inputs.shape_stated:
        return known
    figures = partial(spectral_figures, absolute=sets[0].unit == "W/nm")
    for start in range(0, len(usable), _LAMPS_AT_ONCE):
        names = [lamp_id for lamp_id, _ in usable[start : start + _LAMPS_AT_ONCE]]
        values = np.stack([mean for _, mean in usable[start : start + _LAMPS_AT_ONCE]])
        found = spectral_uncertainty(sets[0].wavelength_nm, values, inputs, names, figures)
        for quantity, numbers in found.items():
            for lamp_id, wide in zip(names, numbers.tolist(), strict=True):
                if np.isfinite(wide):
                    known[lamp_id, quantity] = exact(wide)
    return known


def _size(rule: UncertaintyRule) -> Decimal:
    """The number of a rule whose key already says its unit."""
    return rule.percent if rule.percent is not None else rule.of(Decimal(1))


def _mean_spectrum(values: Array) -> Array | None:
    sound = np.all(np.isfinite(values), axis=1) & (np.sum(values, axis=1) > 0)
    return np.asarray(np.mean(values[sound], axis=0)) if np.any(sound) else None
