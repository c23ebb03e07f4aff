"""Forward model of white LED spectra: one blue emitter, phosphor bands, solved for a colour."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cache
from pathlib import Path

import numpy as np
from numpy.typing import NDArray

__all__ = ["Emitter", "ManganeseLines", "Phosphor", "chromaticity", "luminous_flux", "white"]

Array = NDArray[np.float64]

WAVELENGTH_NM: Array = np.arange(380.0, 781.0, 1.0)
MAXIMUM_EFFICACY_LM_PER_W = 683.002
PHOTON_EV_NM = 1239.842


@dataclass(frozen=True, slots=True)
class Emitter:
    """Blue InGaN emitter: Gaussian in photon energy, wider on the side of low energy.

    Parameters
    ----------
    peak_nm
        Peak wavelength [nm].
    fwhm_nm
        Full width at half maximum [nm].
    """

    peak_nm: float
    fwhm_nm: float = 20.0

    def shape(self, shift_nm: float = 0.0) -> Array:
        """Relative spectral power on the model's wavelengths, moved by a shift [nm]."""
        peak_ev = PHOTON_EV_NM / (self.peak_nm + shift_nm)
        sigma_ev = peak_ev * self.fwhm_nm / self.peak_nm / 2.3548
        offset = PHOTON_EV_NM / WAVELENGTH_NM - peak_ev
        sigma = np.where(offset < 0.0, 1.12 * sigma_ev, 0.88 * sigma_ev)
        return np.asarray(np.exp(-0.5 * (offset / sigma) ** 2))


@dataclass(frozen=True, slots=True)
class Phosphor:
    """Broad phosphor band: skewed Gaussian in wavenumber with its tail towards the red.

    Parameters
    ----------
    peak_nm
        Peak wavelength [nm].
    fwhm_nm
        Full width at half maximum [nm].
    skew
        Skewness; 0 is a plain Gaussian.
    """

    peak_nm: float
    fwhm_nm: float
    skew: float = 0.18

    def shape(self, shift_nm: float = 0.0) -> Array:
        """Relative spectral power; the phosphor does not move with the emitter."""
        del shift_nm
        wavenumber = 1.0e7 / WAVELENGTH_NM
        centre = 1.0e7 / self.peak_nm
        width = 1.0e7 * self.fwhm_nm / self.peak_nm**2
        argument = 1.0 - 2.0 * self.skew * (wavenumber - centre) / width
        logarithm = np.log(np.maximum(argument, 1e-12))
        return np.asarray(np.exp(-np.log(2.0) * (logarithm / self.skew) ** 2))


@dataclass(frozen=True, slots=True)
class ManganeseLines:
    """Narrow red lines of a fluoride phosphor doped with tetravalent manganese."""

    fwhm_nm: float = 4.5

    def shape(self, shift_nm: float = 0.0) -> Array:
        """Relative spectral power; the lines do not move with the emitter."""
        del shift_nm
        lines = ((609.0, 0.13), (613.5, 0.42), (631.0, 1.0), (635.0, 0.62), (648.0, 0.24))
        sigma = self.fwhm_nm / 2.3548
        return np.asarray(
            sum(part * np.exp(-0.5 * ((WAVELENGTH_NM - at) / sigma) ** 2) for at, part in lines)
        )


Component = Emitter | Phosphor | ManganeseLines


@cache
def _observer() -> Array:
    """Colour-matching functions on the model's wavelengths, (3, wavelengths)."""
    table = np.loadtxt(
        Path(__file__).with_name("observer_cie_1931_5nm.csv"), delimiter=",", skiprows=3
    )
    return np.stack([np.interp(WAVELENGTH_NM, table[:, 0], table[:, i]) for i in (1, 2, 3)])


def luminous_flux(spectral_flux_w_per_nm: Array) -> float:
    """Luminous flux [lm] of a spectral radiant flux on the model's wavelengths [W/nm]."""
    return float(MAXIMUM_EFFICACY_LM_PER_W * (_observer()[1] @ spectral_flux_w_per_nm))


def chromaticity(spectral_flux: Array) -> tuple[float, float]:
    """Chromaticity x, y of a spectrum on the model's wavelengths."""
    tristimulus = _observer() @ spectral_flux
    total = float(np.sum(tristimulus))
    return float(tristimulus[0]) / total, float(tristimulus[1]) / total


def white(
    components: Sequence[Component], x: float, y: float, flux_lm: float, shift_nm: float = 0.0
) -> Array:
    """Spectral radiant flux of three components mixed to a chromaticity and a luminous flux.

    Parameters
    ----------
    components
        Three: emitter, green or yellow phosphor, red phosphor.
    x, y
        Chromaticity wanted.
    flux_lm
        Luminous flux wanted [lm].
    shift_nm
        Shift of the emitter from its nominal peak [nm].

    Returns
    -------
    NDArray
        Spectral radiant flux, 380 nm to 780 nm every 1 nm [W/nm].

    Raises
    ------
    ValueError
        If the colour lies outside the triangle of the components.
    """
    shapes = np.stack([component.shape(shift_nm) for component in components])
    shares = np.linalg.solve(_observer() @ shapes.T, np.array([x, y, 1.0 - x - y]))
    if np.any(shares < 0.0):
        raise ValueError(f"{x}, {y} lies outside the triangle of {components}")
    mixed = np.asarray(shares @ shapes)
    return np.asarray(mixed * (flux_lm / luminous_flux(mixed)))
