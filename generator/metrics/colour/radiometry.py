"""Ratios of weighted sums: efficacy of radiation, S/P, melanopic daylight ratio, blue light."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.metrics.colour.weighting import LUMINOUS_EFFICACY_LM_PER_W, SpectralSums

__all__ = [
    "blue_light_efficacy",
    "blue_light_threshold_illuminance",
    "luminous_efficacy_of_radiation",
    "melanopic_daylight_efficacy_ratio",
    "scotopic_photopic_ratio",
]

Array = NDArray[np.float64]

_SCOTOPIC_OVER_PHOTOPIC = 1700.0 / 683.0
_MELANOPIC_EFFICACY_OF_D65 = 1.3262e-3
_BLUE_LIGHT_IRRADIANCE_W_PER_M2 = 1.0


def luminous_efficacy_of_radiation(sums: SpectralSums) -> Array:
    """Luminous efficacy of radiation over 380 nm to 780 nm.

    Parameters
    ----------
    sums
        Weighted sums of the lights.

    Returns
    -------
    ndarray
        Luminous over radiant flux in that band [lm/W] (series,). Source: cie_eilv.
    """
    return LUMINOUS_EFFICACY_LM_PER_W * sums.tristimulus[:, 1] / sums.in_band


def scotopic_photopic_ratio(sums: SpectralSums) -> Array:
    """Scotopic over photopic luminous flux.

    Parameters
    ----------
    sums
        Weighted sums of the lights.

    Returns
    -------
    ndarray
        S/P (series,). Source: cie_191.
    """
    return _SCOTOPIC_OVER_PHOTOPIC * sums.scotopic / sums.tristimulus[:, 1]


def melanopic_daylight_efficacy_ratio(sums: SpectralSums) -> Array:
    """Melanopic efficacy of the light over that of daylight D65 (1.3262 mW/lm).

    Parameters
    ----------
    sums
        Weighted sums of the lights.

    Returns
    -------
    ndarray
        Melanopic DER (series,). Source: cie_s026, clause 3.
    """
    efficacy = sums.melanopic / (LUMINOUS_EFFICACY_LM_PER_W * sums.tristimulus[:, 1])
    return np.asarray(efficacy / _MELANOPIC_EFFICACY_OF_D65)


def blue_light_efficacy(sums: SpectralSums) -> Array:
    """Blue-light-hazard efficacy of luminous radiation K_B,v.

    Parameters
    ----------
    sums
        Weighted sums of the lights.

    Returns
    -------
    ndarray
        K_B,v [W/lm] (series,). Source: iec_62471, Table 4.2; cie_eilv, entry 17-26-061.
    """
    return sums.blue_light / (LUMINOUS_EFFICACY_LM_PER_W * sums.tristimulus[:, 1])


def blue_light_threshold_illuminance(efficacy_w_per_lm: Array) -> Array:
    """Illuminance at which a small source reaches the border of risk groups 1 and 2.

    Parameters
    ----------
    efficacy_w_per_lm
        K_B,v [W/lm] (series,).

    Returns
    -------
    ndarray
        1 W/m² over K_B,v [lx]; not-a-number where K_B,v is not positive (series,).
        Source: iec_62471_7 (clause not read).
    """
    positive = efficacy_w_per_lm > 0
    divisor = np.where(positive, efficacy_w_per_lm, 1.0)
    return np.where(positive, _BLUE_LIGHT_IRRADIANCE_W_PER_M2 / divisor, np.nan)
