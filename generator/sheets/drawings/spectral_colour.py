"""The colour a wavelength or a spectrum looks like, for drawing only.

No figure rests on this: the colour-matching functions are a closed-form fit, good to a few
percent, and colours outside the gamut of a screen are moved towards grey.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["hue_colour", "matching_functions", "spectrum_colour", "wavelength_colour"]

Array = NDArray[np.float64]

# Linear sRGB from CIE 1931 XYZ. Source: IEC 61966-2-1.
_TO_RGB = np.array(
    [[3.2406, -1.5372, -0.4986], [-0.9689, 1.8758, 0.0415], [0.0557, -0.2040, 1.0570]]
)

_CALMED = 0.12
"""How far pure colours are moved towards grey, to keep the page quiet."""

_HUE_LIGHTNESS, _HUE_CHROMA = 68.0, 42.0
_LAST_BLUE_NM, _LAST_RED_NM = 425.0, 655.0
"""Beyond these the hue no longer changes to the eye, and the fit is not to be trusted."""


def _lobe(wavelength_nm: Array, centre: float, left: float, right: float) -> Array:
    width = np.where(wavelength_nm < centre, left, right)
    return np.asarray(np.exp(-0.5 * ((wavelength_nm - centre) / width) ** 2), dtype=np.float64)


def matching_functions(wavelength_nm: Array) -> Array:
    """CIE 1931 colour-matching functions by a fit of Gaussian lobes.

    Parameters
    ----------
    wavelength_nm
        Wavelengths [nm] (wavelengths,).

    Returns
    -------
    numpy.ndarray
        x, y, z functions (wavelengths, 3).

    Notes
    -----
    Multi-lobe fit of Wyman, Sloan and Shirley, Simple Analytic Approximations to the CIE XYZ
    Color Matching Functions, JCGT 2(2), 2013.
    """
    x = (
        1.056 * _lobe(wavelength_nm, 599.8, 37.9, 31.0)
        + 0.362 * _lobe(wavelength_nm, 442.0, 16.0, 26.7)
        - 0.065 * _lobe(wavelength_nm, 501.1, 20.4, 26.2)
    )
    y = 0.821 * _lobe(wavelength_nm, 568.8, 46.9, 40.5) + 0.286 * _lobe(
        wavelength_nm, 530.9, 16.3, 31.1
    )
    z = 1.217 * _lobe(wavelength_nm, 437.0, 11.8, 36.0) + 0.681 * _lobe(
        wavelength_nm, 459.0, 26.0, 13.8
    )
    return np.column_stack([x, y, z])


def _screen(xyz: Array, brightness: float, greyed: float = 0.0) -> str:
    rgb = _TO_RGB @ xyz
    rgb = rgb - min(0.0, float(rgb.min()))
    rgb = rgb / max(float(rgb.max()), 1e-12)
    rgb = ((1 - greyed) * rgb + greyed * rgb.mean()) * brightness
    coded = np.where(rgb <= 0.0031308, 12.92 * rgb, 1.055 * rgb ** (1 / 2.4) - 0.055)
    red, green, blue = (round(255 * float(part)) for part in coded)
    return f"#{red:02x}{green:02x}{blue:02x}"


def wavelength_colour(wavelength_nm: float) -> str:
    """Give the colour of one wavelength, dimmed towards the ends of the visible range."""
    hue, seen = matching_functions(
        np.array([min(max(wavelength_nm, _LAST_BLUE_NM), _LAST_RED_NM), wavelength_nm])
    )
    dimmed = min(1.0, 0.18 + 1.4 * max(0.0, float(seen.sum())) ** 0.6)
    return _screen(hue, dimmed, _CALMED)


def spectrum_colour(wavelength_nm: Array, values: Array) -> str:
    """Give the colour of a spectrum (wavelengths,) at full brightness."""
    xyz = np.trapezoid(matching_functions(wavelength_nm) * values[:, None], wavelength_nm, axis=0)
    return _screen(np.asarray(xyz, dtype=np.float64), 1.0)


def hue_colour(hue_deg: float) -> str:
    """Give a plain colour of a hue angle in CIELAB, at one lightness and chroma.

    Parameters
    ----------
    hue_deg
        Hue angle [degrees].
    """
    angle = np.deg2rad(hue_deg)
    middle = (_HUE_LIGHTNESS + 16) / 116
    steps = np.array([_HUE_CHROMA * np.cos(angle) / 500, 0.0, -_HUE_CHROMA * np.sin(angle) / 200])
    xyz = (middle + steps) ** 3 * np.array([0.9505, 1.0, 1.089])  # D65, IEC 61966-2-1
    linear = np.clip(_TO_RGB @ xyz, 0.0, 1.0)
    return _screen(np.linalg.solve(_TO_RGB, linear), float(linear.max()))
