"""Colour rendering indices Ra and R1 to R15 (CIE 13.3-1995)."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.metrics.colour.weighting import SpectralSums

__all__ = ["colour_rendering_indices", "sample_chromaticities", "uvw_1964"]

Array = NDArray[np.float64]


def colour_rendering_indices(
    sums: SpectralSums, u: Array, v: Array, reference_uvw: Array, reference_uv: Array
) -> Array:
    """Special colour rendering indices R1 to R14, and R15 of the Japanese skin sample.

    The general index Ra is the mean of the first eight. An index may be negative; none is
    rounded before the mean.

    Parameters
    ----------
    sums
        Weighted sums of the lights.
    u, v
        Their chromaticity (CIE 1960) (series,).
    reference_uvw
        U*, V*, W* of the samples under the reference (series, 3, 15).
    reference_uv
        Chromaticity of the reference (series, 2).

    Returns
    -------
    ndarray
        R1 to R15 (series, 15). Source: cie_13_3, clauses 5.5 to 5.9; jis_z_8726 for R15.
    """
    reference_u, reference_v = reference_uv[:, :1], reference_uv[:, 1:]
    sample_u, sample_v = sample_chromaticities(sums.rendering)
    adapted_u, adapted_v = _adapted(sample_u, sample_v, u[:, None], v[:, None], reference_uv)
    luminance = 100.0 * sums.rendering[:, 1] / sums.tristimulus[:, 1, None]
    test_uvw = uvw_1964(adapted_u, adapted_v, luminance, reference_u, reference_v)
    difference = test_uvw - reference_uvw
    return np.asarray(100.0 - 4.6 * np.sqrt(np.einsum("ijk,ijk->ik", difference, difference)))


def sample_chromaticities(tristimulus: Array) -> tuple[Array, Array]:
    """Chromaticity u, v (CIE 1960) of samples.

    Parameters
    ----------
    tristimulus
        X, Y, Z (series, 3, samples).

    Returns
    -------
    u, v
        Chromaticity (series, samples) each. Source: cie_13_3, clause 5.6.
    """
    X, Y, Z = tristimulus[:, 0], tristimulus[:, 1], tristimulus[:, 2]
    divisor = X + 15.0 * Y + 3.0 * Z
    return 4.0 * X / divisor, 6.0 * Y / divisor


def uvw_1964(u: Array, v: Array, luminance: Array, white_u: Array, white_v: Array) -> Array:
    """Coordinates U*, V*, W* of the CIE 1964 uniform space.

    Parameters
    ----------
    u, v
        Chromaticity of the samples (series, samples).
    luminance
        Luminance factor times 100 (series, samples).
    white_u, white_v
        Chromaticity of the white (series, 1).

    Returns
    -------
    ndarray
        U*, V*, W* (series, 3, samples). Source: cie_13_3, clause 5.8.
    """
    W = 25.0 * np.cbrt(luminance) - 17.0
    return np.stack([13.0 * W * (u - white_u), 13.0 * W * (v - white_v), W], axis=1)


def _adapted(
    u: Array, v: Array, u_k: Array, v_k: Array, reference_uv: Array
) -> tuple[Array, Array]:
    """Von Kries adaptation from the light to the reference. Source: cie_13_3, clause 5.7."""
    c_r, d_r = _c_d(reference_uv[:, :1], reference_uv[:, 1:])
    c_k, d_k = _c_d(u_k, v_k)
    c_i, d_i = _c_d(u, v)
    c = c_r / c_k * c_i
    d = d_r / d_k * d_i
    divisor = 16.518 + 1.481 * c - d
    return (10.872 + 0.404 * c - 4.0 * d) / divisor, 5.520 / divisor


def _c_d(u: Array, v: Array) -> tuple[Array, Array]:
    return (4.0 - u - 10.0 * v) / v, (1.708 * v + 0.404 - 1.481 * u) / v
