"""The law of propagation of uncertainty for any model, and for products of powers."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["combine", "combine_powers"]

Array = NDArray[np.float64]


def combine(
    sensitivity: Array, standard_uncertainty: Array, correlation: Array | None = None
) -> Array:
    """Combined standard uncertainty of ``y = f(x1 ... xN)``.

    Parameters
    ----------
    sensitivity
        Partial derivatives of the model [unit of y / unit of xi] (inputs, ...).
    standard_uncertainty
        Standard uncertainties of the inputs [unit of xi] (inputs, ...).
    correlation
        Correlation coefficients (inputs, inputs); ``None`` for independent inputs.

    Returns
    -------
    Array
        Combined standard uncertainty [unit of y] (...,); not-a-number where one of the inputs
        is not known.

    Raises
    ------
    ValueError
        If the correlation matrix is not symmetric with ones on its diagonal.

    Notes
    -----
    Source: jcgm_100, equations 10 and 16.
    """
    part = sensitivity * standard_uncertainty
    if correlation is None:
        return np.asarray(np.sqrt(np.sum(part**2, axis=0)))
    if not np.allclose(correlation, correlation.T) or not np.allclose(np.diag(correlation), 1.0):
        raise ValueError("a correlation matrix is symmetric, with ones on its diagonal")
    variance = np.einsum("i...,ij,j...->...", part, correlation, part)
    return np.asarray(np.sqrt(np.maximum(variance, 0.0)))


def combine_powers(
    estimates: Array,
    exponents: Array,
    standard_uncertainty: Array,
    correlation: Array | None = None,
) -> Array:
    """Relative combined standard uncertainty of ``y = c x1^p1 ... xN^pN``.

    Parameters
    ----------
    estimates
        Estimates of the inputs, none of them zero (inputs, ...).
    exponents
        Known exponents (inputs,): 1 for a factor, -1 for a divisor.
    standard_uncertainty
        Standard uncertainties of the inputs [unit of xi] (inputs, ...).
    correlation
        Correlation coefficients (inputs, inputs); ``None`` for independent inputs.

    Returns
    -------
    Array
        Combined standard uncertainty over the magnitude of y (...,).
        Source: jcgm_100, equation 12.
    """
    powers = exponents.reshape((-1,) + (1,) * (estimates.ndim - 1))
    return combine(powers / estimates, standard_uncertainty, correlation)
