"""Uncertainty of figures of intensity distributions, from the scale and the angles."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
from numpy.typing import NDArray

from generator.metrics.distribution import intensity_figures
from generator.records.figure import SeriesFigures

__all__ = ["distribution_uncertainty"]

Array = NDArray[np.float64]

_FLUXES = ("luminous_flux_lm", "flux_90deg_lm", "flux_120deg_lm")
_OF_ANGLES_ALONE = ("beam_angle_deg", "flux_120deg_fraction")


def distribution_uncertainty(
    c_deg: Array,
    gamma_deg: Array,
    intensity_cd: Array,
    found: SeriesFigures,
    flux_scale: Array,
    intensity_scale: Array,
    angle_deg: float | None,
) -> Mapping[str, Array]:
    """Expanded uncertainty of the figures of luminous intensity distributions.

    Parameters
    ----------
    c_deg, gamma_deg
        Planes (planes,) and angles from the axis (angles,) [degrees].
    intensity_cd
        Luminous intensity [cd] (series, planes, angles).
    found
        The figures of these distributions.
    flux_scale, intensity_scale
        Relative expanded uncertainty of fluxes and of intensities (series,); not-a-number where
        not stated.
    angle_deg
        Expanded uncertainty of the angle from the axis, common to the table [degrees]; ``None``
        where not stated.

    Returns
    -------
    Mapping
        Quantity name -> expanded uncertainty (k = 2) (series,). Fluxes ask for the scale; beam
        angle and the share of a cone, in which the scale cancels, for the angle. Half the
        difference between tables read at angles that much larger and smaller is the part of
        the angle. Source: jcgm_100, equation 10 and note 2 of 5.1.3.
    """
    by_angle = {name: np.zeros(intensity_cd.shape[0]) for name in found.values}
    known: dict[str, Array] = {
        "peak_intensity_cd": intensity_scale * found.values["peak_intensity_cd"]
    }
    if angle_deg is not None:
        by_angle |= _half_difference(c_deg, gamma_deg, intensity_cd, angle_deg)
        known |= {name: by_angle[name] for name in _OF_ANGLES_ALONE}
    scale = np.where(np.isfinite(flux_scale), flux_scale, intensity_scale)
    known |= {name: np.hypot(scale * found.values[name], by_angle[name]) for name in _FLUXES}
    return {
        name: np.where(np.isfinite(found.values[name]), expanded, np.nan)
        for name, expanded in known.items()
    }


def _half_difference(
    c_deg: Array, gamma_deg: Array, intensity_cd: Array, angle_deg: float
) -> dict[str, Array]:
    from scipy.interpolate import PchipInterpolator

    finite = np.where(np.isfinite(intensity_cd), intensity_cd, 0.0)
    curve = PchipInterpolator(gamma_deg, finite, axis=-1)
    wide, narrow = (
        intensity_figures(
            c_deg,
            gamma_deg,
            curve(np.clip(np.abs(gamma_deg + shift), gamma_deg[0], gamma_deg[-1])),
        ).values
        for shift in (-angle_deg, angle_deg)
    )
    return {name: np.abs(wide[name] - narrow[name]) / 2 for name in wide}
