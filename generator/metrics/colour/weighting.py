"""One matrix of weights per wavelength scale, so that one product gives every weighted sum."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from generator.datasets import spectral_tables as tables
from generator.metrics.colour.sampling import sprague_matrix

__all__ = [
    "BAND_NM",
    "CAT02",
    "FIDELITY_SAMPLES",
    "LUMINOUS_EFFICACY_LM_PER_W",
    "RENDERING_SAMPLES",
    "SpectralSums",
    "spectral_sums",
    "weights",
]

Array = NDArray[np.float64]

BAND_NM = (380, 780)
"""Band of every colour figure and of the luminous efficacy of radiation [nm]."""

LUMINOUS_EFFICACY_LM_PER_W = 683.002
"""Luminous efficacy at the peak of V(λ) in standard air [lm/W]. Source: cie_15; si_brochure."""

RENDERING_SAMPLES = 15
FIDELITY_SAMPLES = 99

CAT02 = np.array([[0.7328, 0.4296, -0.1624], [-0.7036, 1.6975, 0.0061], [0.0030, 0.0136, 0.9834]])
"""Matrix from X, Y, Z to the sharpened R, G, B of CIECAM02. Source: ciecam02."""

_PLAIN = 9
_RENDERING = _PLAIN + 3 * RENDERING_SAMPLES


@dataclass(frozen=True, slots=True, eq=False)
class SpectralSums:
    """Weighted sums over spectra; everything else is arithmetic on these.

    Parameters
    ----------
    tristimulus
        X, Y, Z of the 2° observer (series, 3).
    scotopic, melanopic, blue_light
        Sums weighted with V′(λ), s_mel(λ), B(λ) (series,).
    in_band, total, wavelength_moment
        Sum over 380 nm to 780 nm, sum over the whole record, sum times wavelength (series,).
    rendering
        X, Y, Z (2°) of the fifteen test-colour samples (series, 3, 15).
    white
        Sharpened R, G, B (10°) of the light itself (series, 3).
    fidelity
        Sharpened R, G, B (10°) of the 99 samples (series, 3, 99).
    """

    tristimulus: Array
    scotopic: Array
    melanopic: Array
    blue_light: Array
    in_band: Array
    total: Array
    wavelength_moment: Array
    rendering: Array
    white: Array
    fidelity: Array


def spectral_sums(spectra: Array, start_nm: int, stop_nm: int, step_nm: int) -> SpectralSums:
    """All weighted sums of spectra, by one matrix product.

    Parameters
    ----------
    spectra
        Spectra (series, g).
    start_nm, stop_nm, step_nm
        Their wavelengths [nm].

    Returns
    -------
    SpectralSums
        Sums times the interval [nm]; wavelengths without data count as dark.

    Notes
    -----
    Source: cie_15, clause 7.1.
    """
    sums = spectra @ weights(start_nm, stop_nm, step_nm)
    count = len(sums)
    return SpectralSums(
        tristimulus=sums[:, 0:3],
        scotopic=sums[:, 3],
        melanopic=sums[:, 4],
        blue_light=sums[:, 5],
        in_band=sums[:, 6],
        total=sums[:, 7],
        wavelength_moment=sums[:, 8],
        rendering=sums[:, _PLAIN:_RENDERING].reshape(count, 3, RENDERING_SAMPLES),
        white=sums[:, _RENDERING : _RENDERING + 3],
        fidelity=sums[:, _RENDERING + 3 :].reshape(count, 3, FIDELITY_SAMPLES),
    )


@lru_cache(maxsize=8)
def weights(start_nm: int, stop_nm: int, step_nm: int) -> Array:
    """Weights of every sum for one wavelength scale.

    Parameters
    ----------
    start_nm, stop_nm, step_nm
        Wavelengths [nm]; the interval is 1, or 5 on multiples of 5.

    Returns
    -------
    ndarray
        Read-only weights (g, sums), the interval included.
    """
    wavelength = np.arange(start_nm, stop_nm + 1, step_nm, dtype=np.float64)
    band = np.arange(BAND_NM[0], BAND_NM[1] + 1, step_nm, dtype=np.float64)
    first = BAND_NM[0] - 360
    observer = slice(first, first + BAND_NM[1] - BAND_NM[0] + 1, step_nm)
    cmf_2 = tables.colour_matching_2_degree()[:, observer]
    cmf_10 = CAT02 @ tables.colour_matching_10_degree()[:, observer]
    rendering = _samples(tables.colour_rendering_samples(), step_nm)
    fidelity = _samples(tables.colour_evaluation_samples(), step_nm)
    in_band = np.vstack(
        [
            cmf_2,
            tables.scotopic_efficiency()[observer],
            tables.melanopic_action_spectrum()[observer],
            np.zeros(band.size),
            np.ones(band.size),
            np.zeros((2, band.size)),
            (cmf_2[:, None] * rendering).reshape(-1, band.size),
            cmf_10,
            (cmf_10[:, None] * fidelity).reshape(-1, band.size),
        ]
    )
    matrix = np.zeros((wavelength.size, len(in_band)))
    shared, here, there = np.intersect1d(wavelength, band, return_indices=True)
    if shared.size:
        matrix[here] = in_band[:, there].T
    matrix[:, 5] = tables.blue_light_hazard(wavelength)
    matrix[:, 7] = 1.0
    matrix[:, 8] = wavelength
    matrix *= step_nm
    matrix.setflags(write=False)
    return matrix


def _samples(factors: Array, step_nm: int) -> Array:
    """Samples tabulated at 5 nm, at the wanted interval (samples, g)."""
    if step_nm == 5:
        return factors
    count = factors.shape[1]
    position = np.arange(5 * count - 4) / 5.0
    return np.asarray(factors @ sprague_matrix(count, tuple(position.tolist())).T)
