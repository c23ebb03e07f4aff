"""Planckian locus, correlated colour temperature and distance from the locus (Ohno 2013)."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from generator.datasets import spectral_tables as tables

__all__ = [
    "CCT_RANGE_K",
    "SECOND_RADIATION_CONSTANT",
    "correlated_colour_temperature",
    "planckian_locus_uv",
    "planckian_locus_xy",
    "planckian_spectrum",
]

Array = NDArray[np.float64]

SECOND_RADIATION_CONSTANT = 1.4388e-2
"""c2 as fixed for colorimetry [m K]. Source: cie_15, clause 4.1."""

CCT_RANGE_K = (1000.0, 25000.0)
"""Range in which a correlated colour temperature is given [K]. Source: ies_tm_30_18."""

_SPACING = 1.002
_STRIDE = 24


def planckian_spectrum(wavelength_nm: Array, temperature_k: Array) -> Array:
    """Relative spectral distribution of Planckian radiators, 1 at 560 nm.

    Parameters
    ----------
    wavelength_nm
        Wavelengths [nm] (w,).
    temperature_k
        Temperatures [K] (t,).

    Returns
    -------
    ndarray
        Spectra (t, w). Source: cie_15, clause 4.1 (n = 1).
    """
    wavelength = wavelength_nm[None, :] * 1e-9
    temperature = np.asarray(temperature_k, dtype=np.float64)[:, None]
    at_560_nm = np.expm1(SECOND_RADIATION_CONSTANT / (560e-9 * temperature))
    exponential = np.exp(SECOND_RADIATION_CONSTANT / wavelength / temperature)
    return np.asarray(at_560_nm * (560e-9 / wavelength) ** 5 / (exponential - 1.0))


def planckian_locus_xy(temperature_k: Array) -> Array:
    """Chromaticity x, y of Planckian radiators, summed over 360 nm to 830 nm at 1 nm.

    Parameters
    ----------
    temperature_k
        Temperatures [K] (t,).

    Returns
    -------
    ndarray
        x, y (t, 2). Source: cie_15, clause 4.1.
    """
    spectra = planckian_spectrum(tables.OBSERVER_WAVELENGTH_NM, temperature_k)
    tristimulus = spectra @ tables.colour_matching_2_degree().T
    return np.asarray(tristimulus[:, :2] / tristimulus.sum(axis=1, keepdims=True))


def planckian_locus_uv(temperature_k: Array) -> Array:
    """Chromaticity u, v (CIE 1960) of Planckian radiators.

    Parameters
    ----------
    temperature_k
        Temperatures [K] (t,).

    Returns
    -------
    ndarray
        u, v (t, 2); v′ of CIE 1976 is 3/2 v. Source: cie_15, clause 9.4.
    """
    x, y = planckian_locus_xy(temperature_k).T
    return np.asarray(np.column_stack([4 * x, 6 * y]) / (12 * y - 2 * x + 3)[:, None])


def correlated_colour_temperature(u: Array, v: Array) -> tuple[Array, Array]:
    """Correlated colour temperature and signed distance from the Planckian locus.

    The nearest point of a table of the locus and its two neighbours give a triangle, which is
    used near the locus, and a parabola, which is used from a distance of 0.002 on.

    Parameters
    ----------
    u, v
        Chromaticity in CIE 1960 u, v (series,).

    Returns
    -------
    cct_k
        Correlated colour temperature [K]; not-a-number where the nearest point is an end of
        the range 1000 K to 25000 K (series,).
    duv
        Distance, positive above the locus; not-a-number in the same place (series,).

    Notes
    -----
    Source: ohno_2014, clauses 3 and 4, on a table of 0.2 % spacing, which makes the
    correction of the triangular solution for coarse tables needless.
    """
    table, locus_u, locus_v = _locus_table()
    nearest = _nearest(u, v, locus_u, locus_v)
    at_end = (nearest == 0) | (nearest == table.size - 1)
    middle = np.clip(nearest, 1, table.size - 2)
    rows = middle[:, None] + np.array([-1, 0, 1])
    T = table[rows]
    d = np.hypot(locus_u[rows] - u[:, None], locus_v[rows] - v[:, None])
    cct_t, duv_t, sign = _triangular(T, d, locus_u[rows], locus_v[rows], v)
    cct_p, duv_p = _parabolic(T, d)
    near = duv_t < 0.002
    cct = np.where(near, cct_t, cct_p)
    duv = sign * np.where(near, duv_t, duv_p)
    return np.where(at_end, np.nan, cct), np.where(at_end, np.nan, duv)


def _triangular(T: Array, d: Array, lu: Array, lv: Array, v: Array) -> tuple[Array, Array, Array]:
    length = np.hypot(lu[:, 2] - lu[:, 0], lv[:, 2] - lv[:, 0])
    along = (d[:, 0] ** 2 - d[:, 2] ** 2 + length**2) / (2 * length)
    share = along / length
    cct = T[:, 0] + (T[:, 2] - T[:, 0]) * share
    foot_v = lv[:, 0] + (lv[:, 2] - lv[:, 0]) * share
    duv = np.sqrt(np.maximum(d[:, 0] ** 2 - along**2, 0.0))
    return cct, duv, np.where(v >= foot_v, 1.0, -1.0)


def _parabolic(T: Array, d: Array) -> tuple[Array, Array]:
    """Minimum of the parabola through three distances, in Newton's divided differences."""
    first = (d[:, 1] - d[:, 0]) / (T[:, 1] - T[:, 0])
    second = (d[:, 2] - d[:, 1]) / (T[:, 2] - T[:, 1])
    a = (second - first) / (T[:, 2] - T[:, 0])
    a = np.maximum(a, 1e-300)
    cct = 0.5 * (T[:, 0] + T[:, 1]) - first / (2 * a)
    duv = d[:, 0] + (cct - T[:, 0]) * (first + a * (cct - T[:, 1]))
    return cct, duv


def _nearest(u: Array, v: Array, locus_u: Array, locus_v: Array) -> NDArray[np.intp]:
    """Index of the nearest point of the table: every 24th point first, then those between."""
    coarse = (u[:, None] - locus_u[::_STRIDE]) ** 2 + (v[:, None] - locus_v[::_STRIDE]) ** 2
    width = 2 * _STRIDE + 1
    first = np.clip((coarse.argmin(axis=1) - 1) * _STRIDE, 0, locus_u.size - width)
    window = first[:, None] + np.arange(width)
    fine = (u[:, None] - locus_u[window]) ** 2 + (v[:, None] - locus_v[window]) ** 2
    return np.asarray(first + fine.argmin(axis=1))


@cache
def _locus_table() -> tuple[Array, Array, Array]:
    low, high = CCT_RANGE_K
    count = int(np.ceil(np.log(high / low) / np.log(_SPACING))) + 1
    temperature = np.geomspace(low, high, count)
    u, v = planckian_locus_uv(temperature).T
    return temperature, np.ascontiguousarray(u), np.ascontiguousarray(v)
