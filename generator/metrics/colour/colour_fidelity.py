"""Colour fidelity, gamut and local shifts (ANSI/IES TM-30-18, equal to CIE 224:2017 in Rf)."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.metrics.colour.weighting import CAT02

__all__ = ["HUE_BINS", "FidelityFigures", "cam02_ucs", "colour_fidelity"]

Array = NDArray[np.float64]

HUE_BINS = 16

_FROM_CAT02 = np.linalg.inv(CAT02)
_HPE = np.array([[0.38971, 0.68898, -0.07868], [-0.22981, 1.18340, 0.04641], [0.0, 0.0, 1.0]])
_TO_CONES = _HPE @ _FROM_CAT02

_ADAPTING_LUMINANCE = 100.0
_N = 0.2
_K4 = (1.0 / (5.0 * _ADAPTING_LUMINANCE + 1.0)) ** 4
_F_L = 0.2 * _K4 * 5.0 * _ADAPTING_LUMINANCE + 0.1 * (1.0 - _K4) ** 2 * np.cbrt(
    5.0 * _ADAPTING_LUMINANCE
)
_N_BB = 0.725 / _N**0.2
_C = 0.69
_Z = 1.48 + np.sqrt(_N)
_CHROMA = (1.64 - 0.29**_N) ** 0.73 * _F_L**0.25 * (50000.0 / 13.0 * _N_BB) ** 0.9
_FIDELITY_FACTOR = 6.73
_NEXT_BIN = np.arange(1, HUE_BINS + 1) % HUE_BINS
_BISECTORS = np.deg2rad(22.5 * np.arange(HUE_BINS) + 11.25)


@dataclass(frozen=True, slots=True, eq=False)
class FidelityFigures:
    """Figures of TM-30-18, one row per light.

    Parameters
    ----------
    rf, rg
        Fidelity and gamut index (series,).
    rf_h
        Local fidelity per hue bin (series, 16).
    rcs_h
        Local chroma shift per hue bin [%] (series, 16).
    rhs_h
        Local hue shift per hue bin [rad] (series, 16).
    """

    rf: Array
    rg: Array
    rf_h: Array
    rcs_h: Array
    rhs_h: Array


def colour_fidelity(test: Array, reference: Array) -> FidelityFigures:
    """Fidelity, gamut and local shifts from the samples in CAM02-UCS.

    Parameters
    ----------
    test, reference
        J′, a′, b′ of the 99 samples under the light and under its reference (series, 3, 99).

    Returns
    -------
    FidelityFigures
        The figures; Rf is not cut at 100. Source: ies_tm_30_18, clauses 3.5 to 3.9; cie_224.
    """
    shift = test - reference
    difference = np.sqrt(np.einsum("ijk,ijk->ik", shift, shift))
    hue = np.arctan2(reference[:, 2], reference[:, 1])
    bins = np.floor(hue * (HUE_BINS / (2.0 * np.pi))).astype(np.intp) % HUE_BINS
    bins += HUE_BINS * np.arange(len(bins))[:, None]
    count = np.bincount(bins.ravel(), minlength=HUE_BINS * len(bins)).astype(np.float64)
    count[count == 0] = np.nan

    def mean(values: Array) -> Array:
        total = np.bincount(bins.ravel(), values.ravel(), HUE_BINS * len(bins))
        return np.asarray((total / count).reshape(-1, HUE_BINS))

    a_r, b_r = mean(reference[:, 1]), mean(reference[:, 2])
    da, db = mean(shift[:, 1]), mean(shift[:, 2])
    norm = np.hypot(a_r, b_r)
    cos, sin = np.cos(_BISECTORS), np.sin(_BISECTORS)
    return FidelityFigures(
        rf=_fidelity(difference.mean(axis=1)),
        rg=100.0 * _polygon_area(a_r + da, b_r + db) / _polygon_area(a_r, b_r),
        rf_h=_fidelity(mean(difference)),
        rcs_h=100.0 * (da * cos + db * sin) / norm,
        rhs_h=(db * cos - da * sin) / norm,
    )


def cam02_ucs(samples: Array, white: Array) -> Array:
    """Samples in CAM02-UCS under the viewing conditions of TM-30-18.

    Average surround, adapting luminance 100 cd/m2, background 20 %, full adaptation. With full
    adaptation the adapted white is always the same, so its achromatic response is a constant.

    Parameters
    ----------
    samples
        Sharpened R, G, B (CAT02) of the samples, 10° observer (series, 3, samples).
    white
        The same of the light itself (series, 3).

    Returns
    -------
    ndarray
        J′, a′, b′ (series, 3, samples). Source: ciecam02; ies_tm_30_18, clause 3.4.
    """
    adapted = np.matmul(100.0 * _TO_CONES / white[:, None, :], samples)
    red, green, blue = np.moveaxis(_compressed(adapted), 1, 0)
    a = red - (12.0 / 11.0) * green + blue / 11.0
    b = (red + green - 2.0 * blue) / 9.0
    chroma = np.hypot(a, b)
    chroma = np.where(chroma == 0.0, 1e-300, chroma)
    cos, sin = a / chroma, b / chroma
    achromatic = np.maximum(2.0 * red + green + 0.05 * blue - 0.305, 0.0)
    lightness = (achromatic / _WHITE_RESPONSE) ** (_C * _Z)
    eccentricity = 0.25 * (cos * np.cos(2.0) - sin * np.sin(2.0) + 3.8)
    t = eccentricity * chroma / np.maximum(red + green + 1.05 * blue, 1e-9)
    M = _CHROMA * t**0.9 * np.sqrt(lightness)
    M_prime = np.log1p(0.0228 * M) / 0.0228
    J = 100.0 * lightness
    return np.stack([1.7 * J / (1.0 + 0.007 * J), M_prime * cos, M_prime * sin], axis=1)


def _compressed(cones: Array) -> Array:
    """Post-adaptation responses."""
    power = (_F_L / 100.0 * np.abs(cones)) ** 0.42
    return np.asarray(np.copysign(400.0 * power / (power + 27.13), cones) + 0.1)


def _fidelity(difference: Array) -> Array:
    """Fidelity of a mean colour difference; never below zero."""
    return np.asarray(10.0 * np.log1p(np.exp((100.0 - _FIDELITY_FACTOR * difference) / 10.0)))


def _polygon_area(a: Array, b: Array) -> Array:
    next_a, next_b = a[:, _NEXT_BIN], b[:, _NEXT_BIN]
    return np.asarray(0.5 * (a * next_b - b * next_a).sum(axis=1))


_WHITE_RESPONSE = float(
    np.array([2.0, 1.0, 0.05]) @ _compressed(_TO_CONES @ np.full(3, 100.0)) - 0.305
)
