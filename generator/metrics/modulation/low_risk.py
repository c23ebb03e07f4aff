"""The low-risk line of IEEE Std 1789, for the position of a lamp in the modulation chart."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

__all__ = ["LOW_RISK_LINE", "LowRiskSection", "low_risk_modulation"]

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class LowRiskSection:
    """One section of the line: percent modulation per hertz, from one frequency to another.

    Parameters
    ----------
    from_hz, to_hz
        Ends of the section [Hz]; the lower one belongs to it.
    percent_per_hz
        Slope through the origin [%/Hz].
    """

    from_hz: float
    to_hz: float
    percent_per_hz: float


LOW_RISK_LINE = (
    LowRiskSection(0.0, 90.0, 0.025),
    LowRiskSection(90.0, 1250.0, 0.08),
)
"""Practice 1 (low risk); no limit from the end of the last section on.

Source: ieee_1789, clause 8.1.1. Status: cross-checked (quoted in secondary texts, and the upper
end follows from the slope: 100 % / 0.08 = 1250 Hz). Which section owns 90 Hz is not settled.
"""


def low_risk_modulation(frequency_hz: Array) -> Array:
    """Percent flicker at the low-risk line.

    Parameters
    ----------
    frequency_hz
        Frequency of the light modulation [Hz], any shape.

    Returns
    -------
    ndarray
        Percent flicker [%], same shape; not-a-number where there is no limit or no frequency.

    Notes
    -----
    Source: ieee_1789, clause 8.1.1, Practice 1.
    """
    result = np.full(np.shape(frequency_hz), np.nan)
    for section in LOW_RISK_LINE:
        inside = (frequency_hz >= section.from_hz) & (frequency_hz < section.to_hz)
        result = np.where(inside, section.percent_per_hz * frequency_hz, result)
    return np.asarray(result, dtype=np.float64)
