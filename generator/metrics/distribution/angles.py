"""Beam angle and peak intensity of a luminous intensity distribution."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["BEAM_ANGLE_METHOD", "beam_angle_deg", "half_intensity_angle_deg", "peak_intensity_cd"]

Array = NDArray[np.float64]

BEAM_ANGLE_METHOD = "beam_angle_half_of_centre_beam_largest_plane"
"""Full angle at half of the centre-beam intensity, largest plane (EU 2019/2015 Annex I(16))."""

BEAM_SHARE = 0.5
"""Share of the centre-beam intensity that bounds the beam (EU 2019/2015 Annex I(16))."""


def half_intensity_angle_deg(fine_deg: Array, intensity_cd: Array, centre_cd: Array) -> Array:
    """Angle at which each plane first falls to half of the centre-beam intensity.

    Parameters
    ----------
    fine_deg
        Angles from the axis, from 0 [degrees] (fine,).
    intensity_cd
        Luminous intensity [cd] (..., planes, fine).
    centre_cd
        Intensity on the axis [cd] (...,).

    Returns
    -------
    Array
        Angle [degrees] (..., planes); not-a-number where the plane never falls that low.
    """
    bound = BEAM_SHARE * centre_cd[..., np.newaxis, np.newaxis]
    below = intensity_cd < bound
    after = np.maximum(np.argmax(below, axis=-1), 1)[..., np.newaxis]
    high = np.take_along_axis(intensity_cd, after - 1, axis=-1)
    low = np.take_along_axis(intensity_cd, after, axis=-1)
    fall = high - low
    share = np.divide(high - bound, fall, out=np.zeros_like(fall), where=fall > 0)
    angle = fine_deg[after - 1] + share * (fine_deg[after] - fine_deg[after - 1])
    crossing = np.any(below, axis=-1) & (centre_cd[..., np.newaxis] > 0)
    return np.asarray(np.where(crossing, angle[..., 0], np.nan))


def beam_angle_deg(turn_deg: Array, half_angles_deg: Array) -> Array:
    """Full beam angle: both halves of a plane through the axis, the largest plane counting.

    Parameters
    ----------
    turn_deg
        Half-planes of the whole turn in [0, 360), ascending [degrees] (turn,).
    half_angles_deg
        Angle from the axis to the bound of the beam in each half-plane [degrees]
        (series, turn).

    Returns
    -------
    Array
        Beam angle [degrees] (series,); not-a-number where a half-plane has no bound.
        Source: eu_2019_2015, Annex I(16).
    """
    opposite = np.array(
        [np.interp(turn_deg + 180.0, turn_deg, row, period=360.0) for row in half_angles_deg]
    )
    return np.asarray(np.max(half_angles_deg + opposite, axis=-1))


def peak_intensity_cd(intensity_cd: Array) -> Array:
    """Largest luminous intensity of the table.

    Parameters
    ----------
    intensity_cd
        Luminous intensity [cd] (series, planes, angles).

    Returns
    -------
    Array
        Peak intensity [cd] (series,). Source: eu_2019_2020, Annex I.
    """
    return np.asarray(np.max(intensity_cd, axis=(-2, -1)))
