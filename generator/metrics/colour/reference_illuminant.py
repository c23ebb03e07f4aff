"""Reference illuminants of colour rendering, and samples under them as functions of temperature.

What the two rendering methods need of their reference depends on its colour temperature alone:
the fifteen samples in U*, V*, W* and the 99 samples in CAM02-UCS. Both are computed once on a
table of temperatures and read off by cubic interpolation over reciprocal temperature. The error
is below 1e-4 in either space (0.002 for the one sample that turns grey on the way, at 7700 K),
which is 2e-4 in Rf and 1e-4 in R1 to R15.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from generator.datasets import spectral_tables as tables
from generator.metrics.colour.chromaticity import chromaticity_uv_1960, chromaticity_xy
from generator.metrics.colour.colour_fidelity import cam02_ucs
from generator.metrics.colour.colour_rendering import sample_chromaticities, uvw_1964
from generator.metrics.colour.colour_temperature import planckian_spectrum
from generator.metrics.colour.weighting import (
    BAND_NM,
    FIDELITY_SAMPLES,
    RENDERING_SAMPLES,
    SpectralSums,
    spectral_sums,
)

__all__ = [
    "ReferenceSamples",
    "blended_reference",
    "daylight_phase",
    "reference_samples",
    "rendering_reference",
]

Array = NDArray[np.float64]

_BORDERS_K = (25000.0, 7000.0, 5000.0, 4000.0, 1000.0)
_SPACING_MIRED = 3.0
_RENDERING = 3 * RENDERING_SAMPLES


@dataclass(frozen=True, slots=True, eq=False)
class ReferenceSamples:
    """What the rendering methods need of their references, one row per light.

    Parameters
    ----------
    rendering
        U*, V*, W* of the fifteen samples under the CIE 13.3 reference (series, 3, 15).
    white_uv
        Chromaticity u, v (CIE 1960) of that reference (series, 2).
    fidelity
        J′, a′, b′ of the 99 samples under the TM-30 reference (series, 3, 99).
    """

    rendering: Array
    white_uv: Array
    fidelity: Array


def daylight_phase(step_nm: int, temperature_k: Array) -> Array:
    """Relative spectral distribution of a phase of daylight, 380 nm to 780 nm.

    Parameters
    ----------
    step_nm
        Interval, 1 or 5 [nm].
    temperature_k
        Correlated colour temperatures, 4000 to 25000 [K] (t,).

    Returns
    -------
    ndarray
        Spectra (t, w).

    Notes
    -----
    M1 and M2 are not rounded, so that figures do not jump with the temperature; the effect on
    Ra and Rf is below 0.01. Source: cie_15, clause 4.1.2 and Table 6 (linear between 5 nm).
    """
    T = np.asarray(temperature_k, dtype=np.float64)
    warm = -4.6070e9 / T**3 + 2.9678e6 / T**2 + 0.09911e3 / T + 0.244063
    cold = -2.0064e9 / T**3 + 1.9018e6 / T**2 + 0.24748e3 / T + 0.237040
    x = np.where(T <= 7000.0, warm, cold)
    y = -3.000 * x**2 + 2.870 * x - 0.275
    M = 0.0241 + 0.2562 * x - 0.7341 * y
    M1 = (-1.3515 - 1.7703 * x + 5.9114 * y) / M
    M2 = (0.0300 - 31.4424 * x + 30.0717 * y) / M
    wavelength = np.arange(BAND_NM[0], BAND_NM[1] + 1, step_nm, dtype=np.float64)
    S0, S1, S2 = (
        np.interp(wavelength, tables.SAMPLE_WAVELENGTH_NM, component)
        for component in tables.daylight_components()
    )
    return np.asarray(S0 + M1[:, None] * S1 + M2[:, None] * S2)


def rendering_reference(step_nm: int, temperature_k: Array) -> Array:
    """Reference illuminants of CIE 13.3: Planckian below 5000 K, daylight from 5000 K.

    Parameters
    ----------
    step_nm
        Interval, 1 or 5 [nm].
    temperature_k
        Correlated colour temperatures of the lights [K] (t,).

    Returns
    -------
    ndarray
        Spectra, 380 nm to 780 nm (t, w). Source: cie_13_3, clause 5.2.
    """
    T = np.asarray(temperature_k, dtype=np.float64)
    return np.where(
        (T < 5000.0)[:, None],
        _planckian(step_nm, T),
        daylight_phase(step_nm, np.maximum(T, 4000.0)),
    )


def blended_reference(step_nm: int, temperature_k: Array) -> Array:
    """Reference illuminants of TM-30-18: Planckian to 4000 K, daylight from 5000 K, mixed between.

    Parameters
    ----------
    step_nm
        Interval, 1 or 5 [nm].
    temperature_k
        Correlated colour temperatures of the lights [K] (t,).

    Returns
    -------
    ndarray
        Spectra of equal luminance, 380 nm to 780 nm (t, w). Source: ies_tm_30_18, clause 3.3.
    """
    T = np.asarray(temperature_k, dtype=np.float64)
    observer = slice(BAND_NM[0] - 360, BAND_NM[1] - 360 + 1, step_nm)
    luminous = tables.colour_matching_2_degree()[1, observer]
    planckian = _planckian(step_nm, T)
    daylight = daylight_phase(step_nm, np.maximum(T, 4000.0))
    planckian /= (planckian @ luminous)[:, None]
    daylight /= (daylight @ luminous)[:, None]
    share = np.clip((T - 4000.0) / 1000.0, 0.0, 1.0)[:, None]
    return np.asarray((1.0 - share) * planckian + share * daylight)


def reference_samples(step_nm: int, cct_k: Array) -> ReferenceSamples:
    """Samples under the reference illuminants that belong to colour temperatures.

    Parameters
    ----------
    step_nm
        Interval of summation, 1 or 5 [nm].
    cct_k
        Correlated colour temperatures, 1000 to 25000 [K] (series,).

    Returns
    -------
    ReferenceSamples
        The samples. Source: cie_13_3, clause 5; ies_tm_30_18, clause 3.
    """
    nodes, starts, borders = _node_table(step_nm)
    mired = 1e6 / cct_k
    piece = np.searchsorted(borders[1:-1], mired, side="left")
    size = starts[piece + 1] - starts[piece]
    width = borders[piece + 1] - borders[piece]
    place = (mired - borders[piece]) / width * (size - 1)
    first = np.clip(place.astype(np.intp) - 1, 0, size - 4)
    t = place - first
    weights = np.stack(
        [
            -(t - 1) * (t - 2) * (t - 3) / 6,
            t * (t - 2) * (t - 3) / 2,
            -t * (t - 1) * (t - 3) / 2,
            t * (t - 1) * (t - 2) / 6,
        ],
        axis=1,
    )
    rows = (starts[piece] + first)[:, None] + np.arange(4)
    values = np.matmul(weights[:, None, :], nodes[rows])[:, 0]
    count = len(values)
    return ReferenceSamples(
        rendering=values[:, :_RENDERING].reshape(count, 3, RENDERING_SAMPLES),
        white_uv=values[:, _RENDERING : _RENDERING + 2],
        fidelity=values[:, _RENDERING + 2 :].reshape(count, 3, FIDELITY_SAMPLES),
    )


@lru_cache(maxsize=2)
def _node_table(step_nm: int) -> tuple[Array, NDArray[np.intp], Array]:
    """Samples at the nodes of every piece; first node of each piece; borders [mired].

    The references change their law at 4000 K, 5000 K and 7000 K, so no piece reaches over one.
    """
    borders = 1e6 / np.array(_BORDERS_K)
    sizes = np.ceil(np.diff(borders) / _SPACING_MIRED).astype(np.intp) + 1
    starts = np.concatenate([[0], np.cumsum(sizes)])
    pieces = []
    for low, high, size in zip(borders, borders[1:], sizes, strict=False):
        inside = np.clip(np.linspace(low, high, size), low * (1 + 1e-12), high * (1 - 1e-12))
        temperature = 1e6 / inside
        planckian_piece = low >= 199.99
        pieces.append(_samples_at(step_nm, temperature, planckian=planckian_piece))
    return np.vstack(pieces), starts, borders


def _samples_at(step_nm: int, temperature: Array, *, planckian: bool) -> Array:
    """Samples under both references at temperatures that lie on one side of 5000 K."""
    sums = _sums(step_nm, blended_reference(step_nm, temperature))
    fidelity = cam02_ucs(sums.fidelity, sums.white)
    if planckian:
        sums = _sums(step_nm, _planckian(step_nm, temperature))
    u, v = chromaticity_uv_1960(*chromaticity_xy(sums.tristimulus))
    luminance = 100.0 * sums.rendering[:, 1] / sums.tristimulus[:, 1, None]
    sample_u, sample_v = sample_chromaticities(sums.rendering)
    rendering = uvw_1964(sample_u, sample_v, luminance, u[:, None], v[:, None])
    count = len(temperature)
    return np.hstack(
        [rendering.reshape(count, -1), u[:, None], v[:, None], fidelity.reshape(count, -1)]
    )


def _sums(step_nm: int, spectra: Array) -> SpectralSums:
    return spectral_sums(spectra, BAND_NM[0], BAND_NM[1], step_nm)


def _planckian(step_nm: int, temperature: Array) -> Array:
    wavelength = np.arange(BAND_NM[0], BAND_NM[1] + 1, step_nm, dtype=np.float64)
    return planckian_spectrum(wavelength, temperature)
