"""Steps of colour difference from a stated centre: ellipses or circles, never mixed."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.datasets import CIRCLE_STEP, Centre, CentreSystem, centres
from generator.metrics.colour.chromaticity import chromaticity_uv_prime

__all__ = ["declared_centre", "nominal_centre", "sdcm"]

Array = NDArray[np.float64]

_NOMINAL_WITHIN_K = 100.0


def sdcm(x: Array, y: Array, centre: Centre) -> Array:
    """Distance from a centre in steps, in the kind of step the centre belongs to.

    Parameters
    ----------
    x, y
        Chromaticity (CIE 1931) (any shape).
    centre
        The stated centre. Its ellipse is used where it has one (IEC 60081), else circles of
        0.0011 in u′, v′ (ANSI C78.377 and declared chromaticities).

    Returns
    -------
    ndarray
        Steps, same shape; :attr:`Centre.method` names centre and kind.

    Notes
    -----
    Source: iec_60081, Annex D; cie_tn_001. One step of either kind differs from the other by
    −5 % to +48 %, so steps from different centres must not be ranked together.
    """
    if centre.ellipse is not None:
        g11, g12, g22 = centre.ellipse
        dx, dy = x - centre.x, y - centre.y
        return np.sqrt(g11 * dx**2 + 2.0 * g12 * dx * dy + g22 * dy**2)
    u, v = chromaticity_uv_prime(x, y)
    centre_u, centre_v = chromaticity_uv_prime(np.array(centre.x), np.array(centre.y))
    return np.asarray(np.hypot(u - centre_u, v - centre_v) / CIRCLE_STEP)


def nominal_centre(cct_k: float, system: CentreSystem) -> Centre | None:
    """The centre of a system that belongs to a declared colour temperature.

    Parameters
    ----------
    cct_k
        Declared (nominal, not measured) colour temperature [K].
    system
        ``iec_60081``, ``ansi_c78_377_2008`` or ``ansi_c78_377_2017``.

    Returns
    -------
    Centre or None
        The centre whose nominal value is nearest, or ``None`` where none lies within 100 K:
        nothing is interpolated between centres.

    Notes
    -----
    Source: iec_60081, Annex D; ansi_c78_377. The 100 K are lampassay_methods.
    """
    nearest = min(centres(system), key=lambda centre: abs(centre.nominal_cct_k - cct_k))
    return nearest if abs(nearest.nominal_cct_k - cct_k) <= _NOMINAL_WITHIN_K else None


def declared_centre(x: float, y: float) -> Centre:
    """A supplier's declared chromaticity as a centre; its steps are circles in u′, v′.

    Parameters
    ----------
    x, y
        Declared chromaticity (CIE 1931).

    Returns
    -------
    Centre
        The centre. Source: cie_tn_001.
    """
    return Centre("declared", 0.0, x, y)
