"""Stroboscopic visibility measure (SVM)."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.metrics.modulation.light_lines import LightLines

__all__ = ["HIGHEST_FREQUENCY_HZ", "svm", "visibility_threshold"]

Array = NDArray[np.float64]

HIGHEST_FREQUENCY_HZ = 2000.0
"""Upper end of the band of the stroboscopic visibility measure [Hz]."""

_EXPONENT = 3.7


def visibility_threshold(frequency_hz: Array) -> Array:
    """Modulation of a sine that is just visible as a stroboscopic effect.

    Parameters
    ----------
    frequency_hz
        Frequency [Hz], any shape.

    Returns
    -------
    ndarray
        Amplitude relative to the mean, same shape.

    Notes
    -----
    The sigmoid of IEC TR 63158, not the power law of the earlier papers.
    Source: iec_tr_63158, Annex A.1.
    """
    sigmoid = 1 / (1 + np.exp(-0.00518 * (frequency_hz - 306.6)))
    return np.asarray(sigmoid + 20 * np.exp(-frequency_hz / 10), dtype=np.float64)


def svm(lines: LightLines, *, material_only: bool = False) -> Array:
    """Stroboscopic visibility measure from the lines of the light, to 2000 Hz inclusive.

    Every peak of the spectrum counts once, noise included, as the definition has it.

    Parameters
    ----------
    lines
        Lines of the light, from :func:`light_lines`.
    material_only
        Leave out the peaks that do not stand clear of the noise.

    Returns
    -------
    ndarray
        Stroboscopic visibility measure (series,).

    Notes
    -----
    Source: iec_tr_63158, Annex A.1.
    """
    inside = lines.frequency_hz <= HIGHEST_FREQUENCY_HZ + lines.resolution_hz / 2
    if material_only:
        inside = inside & lines.material
    seen = np.where(inside, lines.amplitude, 0.0) / visibility_threshold(lines.frequency_hz)
    return np.asarray(np.sum(seen**_EXPONENT, axis=1) ** (1 / _EXPONENT), dtype=np.float64)
