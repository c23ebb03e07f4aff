"""Chromaticity coordinates, dominant wavelength and excitation purity."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from generator.datasets import spectral_tables as tables

__all__ = [
    "chromaticity_uv_1960",
    "chromaticity_uv_prime",
    "chromaticity_xy",
    "dominant_wavelength",
]

Array = NDArray[np.float64]

_ACHROMATIC = 1.0 / 3.0
_LOCUS_NM = (380, 699)


def chromaticity_xy(tristimulus: Array) -> tuple[Array, Array]:
    """Chromaticity x, y.

    Parameters
    ----------
    tristimulus
        X, Y, Z (series, 3).

    Returns
    -------
    x, y
        Chromaticity (series,) each. Source: cie_15, clause 7.3.
    """
    total = tristimulus.sum(axis=1)
    return tristimulus[:, 0] / total, tristimulus[:, 1] / total


def chromaticity_uv_prime(x: Array, y: Array) -> tuple[Array, Array]:
    """Chromaticity u′, v′ (CIE 1976).

    Parameters
    ----------
    x, y
        Chromaticity (any shape).

    Returns
    -------
    u_prime, v_prime
        Chromaticity, same shape. Source: iso_cie_11664_5, clause 4.
    """
    divisor = 12.0 * y - 2.0 * x + 3.0
    return 4.0 * x / divisor, 9.0 * y / divisor


def chromaticity_uv_1960(x: Array, y: Array) -> tuple[Array, Array]:
    """Chromaticity u, v (CIE 1960), kept for colour temperature and colour rendering.

    Parameters
    ----------
    x, y
        Chromaticity (any shape).

    Returns
    -------
    u, v
        Chromaticity, same shape. Source: cie_15, clause 9.4 and annex on obsolete formulas.
    """
    u_prime, v_prime = chromaticity_uv_prime(x, y)
    return u_prime, v_prime * (2.0 / 3.0)


def dominant_wavelength(x: Array, y: Array) -> tuple[Array, Array]:
    """Dominant wavelength and excitation purity against equal energy (1/3, 1/3).

    The spectrum locus is joined by straight lines between whole nanometres from 380 nm to
    699 nm; beyond, all wavelengths have one chromaticity and none can be told.

    Parameters
    ----------
    x, y
        Chromaticity (series,).

    Returns
    -------
    wavelength_nm
        Dominant wavelength [nm]; the complementary wavelength with a minus sign for purples;
        not-a-number at the achromatic point itself (series,).
    purity
        Quotient of the distances from the achromatic point to the colour and to the spectrum
        locus or purple line on the same line (series,).

    Notes
    -----
    Source: cie_15, clause on dominant wavelength and purity; iec_60050_845, entry excitation
    purity. Equal energy as achromatic point is usual for LEDs (common practice).
    """
    dx, dy = x - _ACHROMATIC, y - _ACHROMATIC
    distance = np.hypot(dx, dy)
    seen = distance > 1e-9
    dx, dy = np.where(seen, dx, 1.0), np.where(seen, dy, 0.0)
    nanometres, reach = _locus_crossing(dx, dy)
    purple = np.isnan(nanometres)
    if purple.any():
        complement, _ = _locus_crossing(-dx[purple], -dy[purple])
        nanometres[purple] = -complement
        reach[purple] = _purple_crossing(dx[purple], dy[purple])
    return np.where(seen, nanometres, np.nan), np.where(seen, 1.0 / reach, 0.0)


def _locus_crossing(dx: Array, dy: Array) -> tuple[Array, Array]:
    """Where the ray (dx, dy) meets the locus: wavelength and length in units of the ray."""
    px, py, turn, start = _locus()
    angle = (start - np.arctan2(dy, dx)) % (2 * np.pi)
    cell = np.clip(np.searchsorted(turn, angle, side="right") - 1, 0, turn.size - 2)
    ex, ey = px[cell + 1] - px[cell], py[cell + 1] - py[cell]
    cross = dx * ey - dy * ex
    reach = (px[cell] * ey - py[cell] * ex) / cross
    share = (px[cell] * dy - py[cell] * dx) / cross
    wavelength = _LOCUS_NM[0] + cell + share
    outside = angle > turn[-1]
    return np.where(outside, np.nan, wavelength), np.where(outside, np.nan, reach)


def _purple_crossing(dx: Array, dy: Array) -> Array:
    """Length at which the ray meets the line between the ends of the locus, in its own units."""
    px, py, _, _ = _locus()
    ex, ey = px[-1] - px[0], py[-1] - py[0]
    cross = dx * ey - dy * ex
    return np.asarray((px[0] * ey - py[0] * ex) / np.where(cross == 0, np.nan, cross))


@cache
def _locus() -> tuple[Array, Array, Array, float]:
    """Locus from the achromatic point: x, y, angle turned from its violet end, first angle."""
    first, last = _LOCUS_NM
    cmf = tables.colour_matching_2_degree()[:, first - 360 : last - 360 + 1]
    total = cmf.sum(axis=0)
    px, py = cmf[0] / total - _ACHROMATIC, cmf[1] / total - _ACHROMATIC
    angle = np.arctan2(py, px)
    turn = (angle[0] - angle) % (2 * np.pi)
    return px, py, turn, float(angle[0])
