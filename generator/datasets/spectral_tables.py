"""Spectral tables on their own wavelengths: observers, efficiencies, samples, daylight."""

from __future__ import annotations

from functools import cache

import numpy as np
from numpy.typing import NDArray

from generator.datasets.tables import reference_table

__all__ = [
    "OBSERVER_WAVELENGTH_NM",
    "SAMPLE_WAVELENGTH_NM",
    "blue_light_hazard",
    "colour_evaluation_samples",
    "colour_matching_2_degree",
    "colour_matching_10_degree",
    "colour_rendering_samples",
    "daylight_components",
    "melanopic_action_spectrum",
    "scotopic_efficiency",
]

Array = NDArray[np.float64]

OBSERVER_WAVELENGTH_NM = np.arange(360.0, 831.0)
"""Wavelengths of the colour-matching functions [nm] (471,)."""

SAMPLE_WAVELENGTH_NM = np.arange(380.0, 781.0, 5.0)
"""Wavelengths of the sample tables and daylight components as given here [nm] (81,)."""

OBSERVER_WAVELENGTH_NM.setflags(write=False)
SAMPLE_WAVELENGTH_NM.setflags(write=False)


def colour_matching_2_degree() -> Array:
    """Colour-matching functions of the CIE 1931 observer, 360 nm to 830 nm at 1 nm.

    The second row is the photopic luminous efficiency V(λ).

    Returns
    -------
    ndarray
        x̄, ȳ, z̄ (3, 471). Source: iso_cie_11664_1, Table 1.
    """
    return reference_table("colour_matching_2_degree_1931").values[:, 1:].T


def colour_matching_10_degree() -> Array:
    """Colour-matching functions of the CIE 1964 observer, 360 nm to 830 nm at 1 nm.

    Returns
    -------
    ndarray
        x̄10, ȳ10, z̄10 (3, 471). Source: iso_cie_11664_1, Table 2.
    """
    return reference_table("colour_matching_10_degree_1964").values[:, 1:].T


@cache
def scotopic_efficiency() -> Array:
    """Scotopic luminous efficiency V′(λ), 360 nm to 830 nm at 1 nm, zero outside its table.

    Returns
    -------
    ndarray
        V′ (471,). Source: cie_191.
    """
    return _on_observer_wavelengths("scotopic_efficiency_1951", "v_prime")


@cache
def melanopic_action_spectrum() -> Array:
    """Melanopic action spectrum, 360 nm to 830 nm at 1 nm, zero outside its table.

    Returns
    -------
    ndarray
        s_mel (471,). Source: cie_s026, Table 2.
    """
    return _on_observer_wavelengths("melanopic_action_spectrum_2018", "s_mel")


def blue_light_hazard(wavelength_nm: Array) -> Array:
    """Blue-light-hazard weighting B(λ); zero outside 300 nm to 700 nm.

    Between the tabulated points B is linear up to 500 nm and its logarithm is linear from there
    on, which is the standard's formula 10^((450 − λ)/50) between 500 nm and 600 nm.

    Parameters
    ----------
    wavelength_nm
        Wavelengths [nm] (w,).

    Returns
    -------
    ndarray
        B (w,). Source: iec_62471, Table 4.2.
    """
    table = reference_table("blue_light_hazard_2006")
    points, weights = table.values[:, 0], table.values[:, 1]
    linear = np.interp(wavelength_nm, points, weights)
    exponential = np.exp(np.interp(wavelength_nm, points, np.log(weights)))
    inside = (wavelength_nm >= points[0]) & (wavelength_nm <= points[-1])
    return np.where(inside, np.where(wavelength_nm < 500.0, linear, exponential), 0.0)


@cache
def colour_rendering_samples() -> Array:
    """Test-colour samples 1 to 14 and the Japanese skin sample, 380 nm to 780 nm at 5 nm.

    Returns
    -------
    ndarray
        Spectral radiance factors (15, 81). Source: cie_13_3, Tables 1 and 2; jis_z_8726.
    """
    table = reference_table("test_colour_samples_1995").values
    inside = (table[:, 0] >= 380.0) & (table[:, 0] <= 780.0)
    skin = reference_table("skin_sample_2024").values[:, 1]
    return np.vstack([table[inside, 1:].T, skin])


def colour_evaluation_samples() -> Array:
    """The 99 colour evaluation samples, 380 nm to 780 nm at 5 nm.

    Returns
    -------
    ndarray
        Spectral radiance factors (99, 81). Source: ies_tm_30_18, Annex; same as cie_224.
    """
    return reference_table("colour_evaluation_samples_2018").values[:, 1:].T


def daylight_components() -> Array:
    """Components S0, S1, S2 of daylight, 380 nm to 780 nm at 5 nm.

    Returns
    -------
    ndarray
        S0, S1, S2 (3, 81). Source: cie_15, Table 6.
    """
    table = reference_table("daylight_components_2018").values
    inside = (table[:, 0] >= 380.0) & (table[:, 0] <= 780.0)
    return table[inside, 1:].T


def _on_observer_wavelengths(name: str, heading: str) -> Array:
    table = reference_table(name)
    values = np.zeros(OBSERVER_WAVELENGTH_NM.size)
    first = int(table.column("wavelength_nm")[0] - OBSERVER_WAVELENGTH_NM[0])
    column = table.column(heading)
    values[first : first + column.size] = column
    values.setflags(write=False)
    return values
