"""Uncertainties of figures computed from raw files, by what the campaign states about the data."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from generator.metrics.assembly.stated_uncertainty import Known, Stated, input_number
from generator.metrics.distribution import intensity_figures
from generator.metrics.uncertainty import (
    MainsInputs,
    distance_uncertainty,
    mains_uncertainty,
    quotient_uncertainty,
)
from generator.metrics.uncertainty.angles import distribution_uncertainty
from generator.metrics.uncertainty.light import LightInputs, light_uncertainty
from generator.records.figure import SeriesFigures, exact
from generator.records.raw import IntensityTable
from generator.records.settings import Settings

__all__ = [
    "with_ageing_uncertainty",
    "with_intensity_uncertainty",
    "with_light_uncertainty",
    "with_mains_uncertainty",
    "with_spectral_uncertainty",
]

Array = NDArray[np.float64]


def with_spectral_uncertainty(
    found: SeriesFigures, known: Known, lamp_ids: Sequence[str]
) -> SeriesFigures:
    """Figures of spectra with the uncertainty drawn for their lamp.

    Parameters
    ----------
    found
        Figures of spectra.
    known
        (``lamp_id``, quantity) -> expanded uncertainty.
    lamp_ids
        Lamp of each series.

    Returns
    -------
    SeriesFigures
        The same figures.
    """
    if not known:
        return found
    nan = float("nan")
    expanded = {
        name: np.array([float(known.get((lamp_id, name), nan)) for lamp_id in lamp_ids])
        for name in found.values
    }
    return replace(found, expanded_uncertainty=expanded)


def with_light_uncertainty(
    found: SeriesFigures,
    values: Array,
    sampling_rate_hz: float,
    settings: Settings,
    lamp_ids: tuple[str, ...],
    *,
    long: bool,
) -> SeriesFigures:
    """Figures of light records with the uncertainty that follows from noise, offset, time base.

    Parameters
    ----------
    found
        Figures of the records.
    values
        Light (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    settings
        The settings of the campaign.
    lamp_ids
        Lamp of each series.
    long
        Whether these are long records, which give PstLM alone.

    Returns
    -------
    SeriesFigures
        The same figures.
    """
    inputs = LightInputs(
        input_number(settings, "light_noise_percent"),
        input_number(settings, "light_offset_percent"),
        input_number(settings, "time_base_percent"),
    )
    if inputs == LightInputs():
        return found
    expanded = light_uncertainty(
        values, sampling_rate_hz, found, inputs, lamp_ids, only_pst_lm=long
    )
    return replace(found, expanded_uncertainty=expanded)


def with_mains_uncertainty(
    found: SeriesFigures, settings: Settings, stated: Stated, unit_ids: Sequence[str]
) -> SeriesFigures:
    """Figures of mains captures with the uncertainty that follows from gains, delay, time base.

    Parameters
    ----------
    found
        Figures of the captures.
    settings
        The settings of the campaign.
    stated
        Uncertainties stated for voltage, current and power.
    unit_ids
        Unit of each series.

    Returns
    -------
    SeriesFigures
        The same figures.
    """
    rule = settings.uncertainty.get("current_a")
    flat = rule is not None and rule.absolute is not None
    current = _relative(found, "current_a", stated, unit_ids)
    inputs = MainsInputs(
        voltage=_relative(found, "voltage_v", stated, unit_ids),
        current=np.zeros_like(current) if flat else current,
        current_floor_a=current * found.values["current_a"] if flat else np.zeros_like(current),
        power=_relative(found, "power_w", stated, unit_ids),
        skew_us=input_number(settings, "voltage_current_skew_us"),
        time_base_percent=input_number(settings, "time_base_percent"),
    )
    return replace(found, expanded_uncertainty=mains_uncertainty(found, inputs))


def with_intensity_uncertainty(
    tables: Sequence[IntensityTable], settings: Settings, stated: Stated
) -> SeriesFigures:
    """Figures of intensity tables on one grid, with their uncertainty.

    Parameters
    ----------
    tables
        The tables.
    settings
        The settings of the campaign.
    stated
        Uncertainties stated for flux and peak intensity.

    Returns
    -------
    SeriesFigures
        One series per table.
    """
    c_deg, gamma_deg = tables[0].c_deg, tables[0].gamma_deg
    intensity = np.stack([table.intensity_cd for table in tables])
    found = intensity_figures(c_deg, gamma_deg, intensity)
    unit_ids = [table.unit_id for table in tables]
    expanded = distribution_uncertainty(
        c_deg,
        gamma_deg,
        intensity,
        found,
        _relative(found, "luminous_flux_lm", stated, unit_ids),
        _relative(found, "peak_intensity_cd", stated, unit_ids),
        input_number(settings, "angle_deg"),
    )
    return replace(found, expanded_uncertainty=expanded)


def with_ageing_uncertainty(found: SeriesFigures, settings: Settings) -> SeriesFigures:
    """Figures of the units of an ageing test, with the uncertainty of repeated readings.

    Parameters
    ----------
    found
        Figures of the units.
    settings
        The settings of the campaign.

    Returns
    -------
    SeriesFigures
        The same figures.
    """
    expanded: dict[str, Array] = {}
    flux = input_number(settings, "flux_repeatability_percent")
    if flux is not None:
        factor = found.values["lumen_maintenance_factor"]
        expanded["lumen_maintenance_factor"] = quotient_uncertainty(factor, flux)
    colour = input_number(settings, "chromaticity_repeatability")
    if colour is not None:
        shift = found.values["chromaticity_shift"]
        expanded["chromaticity_shift"] = distance_uncertainty(shift, colour)
    return replace(found, expanded_uncertainty=expanded)


def _relative(
    found: SeriesFigures, quantity: str, stated: Stated, unit_ids: Sequence[str]
) -> Array:
    """Stated relative expanded uncertainty of a figure; not-a-number where there is none."""
    numbers = found.values[quantity]
    result = np.full(numbers.shape, np.nan)
    for index, unit_id in enumerate(unit_ids):
        number = float(numbers[index])
        if np.isfinite(number) and number != 0:
            wide = stated.of(unit_id, quantity, exact(number))
            if wide is not None:
                result[index] = float(wide) / abs(number)
    return result
