"""Uncertainty of what compares two readings by one instrument: a quotient, a distance.

The calibration of the instrument is common to both readings, so that it cancels in a quotient
and, but for a second order, in a distance; what is left is their repeatability.
"""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

__all__ = ["distance_uncertainty", "quotient_uncertainty"]

Array = NDArray[np.float64]

_CIRCLE = 2.4860 / 2.0
"""Radius of the circle that holds 95.45 % of a two-dimensional Gaussian, over two deviations."""

_FAR = 3.0


def quotient_uncertainty(quotient: Array, repeatability_percent: float) -> Array:
    """Expanded uncertainty of the quotient of two readings.

    Parameters
    ----------
    quotient
        Later reading over earlier reading (series,).
    repeatability_percent
        Expanded uncertainty (k = 2) of a reading but for what both have in common [percent].

    Returns
    -------
    Array
        Expanded uncertainty (k = 2) (series,). Source: jcgm_100, equation 16.
    """
    return np.asarray(np.abs(quotient) * math.sqrt(2) * repeatability_percent / 100)


def distance_uncertainty(distance: Array, repeatability: float) -> Array:
    """Expanded uncertainty of the distance between two chromaticities.

    Parameters
    ----------
    distance
        Distance in the plane (series,).
    repeatability
        Expanded uncertainty (k = 2) of either coordinate of a reading, but for what both
        readings have in common.

    Returns
    -------
    Array
        Expanded uncertainty (series,): along the line of a long distance that of one
        coordinate; for a distance of less than three deviations, which noise alone may make,
        the radius of the circle that holds as much. Source: jcgm_100, equation 10; jcgm_101,
        9.4 (a distance from the origin).
    """
    along = math.sqrt(2) * repeatability
    return np.asarray(np.where(distance < _FAR * along / 2, _CIRCLE * along, along))
