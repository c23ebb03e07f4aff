"""Luminous flux from intensities: planes around the axis, monotone cubic along gamma, sum."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "ZONAL_METHOD",
    "cone_flux_lm",
    "cumulated_flux_lm",
    "full_circle",
    "on_fine_angles",
    "plane_mean",
]

Array = NDArray[np.float64]
Indices = NDArray[np.intp]

ZONAL_METHOD = "zonal_flux_cie_84"
"""Integration of intensity over solid angle (CIE 84), monotone cubic between the angles."""

FINE_STEP_DEG = 0.1
"""Step of the integration along gamma [degrees]; its error in the flux is below 1e-6."""

_SAME_DEG = 1e-6
_WIDEST_GAP = 1.5
_WIDEST_SECTOR_DEG = 180.0  # between two opposite planes


def full_circle(c_deg: Array) -> tuple[Array, Indices] | None:
    """Planes of the whole turn around the axis, by the symmetry the planes imply.

    One plane stands for a rotationally symmetric lamp. Planes that span 90 degrees from a
    multiple of 90 stand for one quadrant of four alike, planes that span 180 degrees for one
    half of two alike; all others must close the turn themselves. Source: eulumdat, symmetry
    indicators 1 to 4.

    Parameters
    ----------
    c_deg
        Measured planes, ascending [degrees] (planes,).

    Returns
    -------
    tuple or None
        Planes of the turn in [0, 360), ascending [degrees] (turn,), and for each the index of
        the measured plane that stands for it (turn,); ``None`` where the planes leave a gap.
    """
    if c_deg.size == 1:
        return np.zeros(1), np.zeros(1, dtype=np.intp)
    start, span = float(c_deg[0]), float(c_deg[-1] - c_deg[0])
    measured = np.arange(c_deg.size, dtype=np.intp)
    if abs(span - 90.0) < _SAME_DEG and abs(start / 90.0 - round(start / 90.0)) < _SAME_DEG:
        half = np.concatenate([c_deg, 2 * c_deg[-1] - c_deg])
        angles = np.concatenate([half, 2 * start - half])
        planes = np.tile(measured, 4)
    elif abs(span - 180.0) < _SAME_DEG:
        angles = np.concatenate([c_deg, 2 * start - c_deg])
        planes = np.tile(measured, 2)
    else:
        angles, planes = c_deg, measured
        gaps = np.diff(c_deg)
        closing = 360.0 - span
        widest = min(_WIDEST_GAP * float(gaps.max()), _WIDEST_SECTOR_DEG + _SAME_DEG)
        if closing < -_SAME_DEG or max(closing, float(gaps.max())) > widest:
            return None
    turned = np.round(np.mod(angles, 360.0), 9) % 360.0
    unique, first = np.unique(turned, return_index=True)
    return unique, planes[first]


def on_fine_angles(gamma_deg: Array, intensity_cd: Array) -> tuple[Array, Array]:
    """Intensity on an even, fine scale of gamma.

    Parameters
    ----------
    gamma_deg
        Measured angles, ascending [degrees] (angles,).
    intensity_cd
        Luminous intensity [cd] (..., angles).

    Returns
    -------
    tuple
        Fine angles from the first to the last measured one [degrees] (fine,), and the
        intensity there by a monotone cubic, which never overshoots [cd] (..., fine).
    """
    from scipy.interpolate import PchipInterpolator

    first, last = float(gamma_deg[0]), float(gamma_deg[-1])
    steps = max(round((last - first) / FINE_STEP_DEG), 1)
    fine_deg = np.linspace(first, last, steps + 1)
    fine_cd = PchipInterpolator(gamma_deg, intensity_cd, axis=-1)(fine_deg)
    return fine_deg, np.asarray(fine_cd, dtype=np.float64)


def plane_mean(turn_deg: Array, intensity_cd: Array) -> Array:
    """Mean over the turn around the axis, each plane weighted with the sector it stands for.

    Parameters
    ----------
    turn_deg
        Planes of the whole turn in [0, 360), ascending [degrees] (turn,).
    intensity_cd
        Luminous intensity [cd] (..., turn, angles).

    Returns
    -------
    Array
        Mean intensity [cd] (..., angles).
    """
    following = np.diff(turn_deg, append=turn_deg[:1] + 360.0)
    weights = (following + np.roll(following, 1)) / 720.0
    return np.asarray(np.einsum("t,...ta->...a", weights, intensity_cd))


def cumulated_flux_lm(fine_deg: Array, mean_cd: Array) -> Array:
    """Luminous flux between the axis and each angle.

    Parameters
    ----------
    fine_deg
        Angles from the axis, from 0, on a fine scale [degrees] (fine,).
    mean_cd
        Intensity averaged over the planes [cd] (..., fine).

    Returns
    -------
    Array
        Flux inside each angle [lm] (..., fine): the integral of ``2 π I sin γ dγ``.
        Source: cie_84, clause on the zonal flux method.
    """
    gamma = np.radians(fine_deg)
    density = 2.0 * np.pi * mean_cd * np.sin(gamma)
    zones = 0.5 * (density[..., 1:] + density[..., :-1]) * np.diff(gamma)
    inside = np.zeros_like(density)
    np.cumsum(zones, axis=-1, out=inside[..., 1:])
    return inside


def cone_flux_lm(fine_deg: Array, inside_lm: Array, cone_deg: float) -> Array:
    """Luminous flux in a cone around the axis.

    Parameters
    ----------
    fine_deg
        Angles from the axis [degrees] (fine,).
    inside_lm
        Flux inside each angle [lm] (series, fine).
    cone_deg
        Full apex angle of the cone [degrees].

    Returns
    -------
    Array
        Flux [lm] (series,); not-a-number where the angles end inside the cone.
    """
    half = cone_deg / 2.0
    if fine_deg[-1] < half - _SAME_DEG:
        return np.full(inside_lm.shape[:-1], np.nan)
    upper = int(np.clip(np.searchsorted(fine_deg, half), 1, fine_deg.size - 1))
    low, high = fine_deg[upper - 1], fine_deg[upper]
    share = float(np.clip((half - low) / (high - low), 0.0, 1.0))
    return np.asarray((1.0 - share) * inside_lm[..., upper - 1] + share * inside_lm[..., upper])
