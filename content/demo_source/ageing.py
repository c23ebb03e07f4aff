"""Forward model of an endurance test: slow loss of flux, drift of colour, failures."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

__all__ = ["TO_3000_H", "TO_6000_H", "Ageing"]

Array = NDArray[np.float64]

TO_3000_H = (0, 500, 1000, 1500, 2000, 2500, 3000)
TO_6000_H = (*TO_3000_H, 3500, 4000, 4500, 5000, 5500, 6000)


@dataclass(frozen=True, slots=True)
class Ageing:
    """How the units of a lamp age.

    Parameters
    ----------
    l70_h
        Time after which the slow loss alone leaves 70 % of the flux [h].
    hours_h
        When readings are taken [h].
    rise
        Early gain of flux, complete after some hundred hours.
    drift_x, drift_y
        Drift of the chromaticity per 1000 h.
    failures
        Number of a unit, counted from 0 -> reading from which on it is dark [h].
    units
        Units under test; those beyond the sample of ``units.csv`` were only aged.
    """

    l70_h: float
    hours_h: tuple[int, ...] = TO_3000_H
    rise: float = 0.0
    drift_x: float = 0.0002
    drift_y: float = 0.0002
    failures: Mapping[int, int] = field(default_factory=dict)
    units: int = 10

    def maintenance(self, pace: float, noise: Array) -> Array:
        """Flux relative to the first reading, at each reading; `pace` hastens the loss."""
        hours_h = np.asarray(self.hours_h, dtype=np.float64)
        loss = np.exp(np.log(0.7) * pace * hours_h / self.l70_h)
        gain = 1.0 + self.rise * (1.0 - np.exp(-hours_h / 300.0))
        return np.asarray(loss * gain * (1.0 + np.where(hours_h > 0.0, noise, 0.0)))
