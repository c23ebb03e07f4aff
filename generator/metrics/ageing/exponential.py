"""The exponential of IES TM-21: fit, range of the fit, projected life, limit of projection."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.metrics.uncertainty import coverage_factor

__all__ = [
    "LIFE_SHARE",
    "MINIMUM_DURATION_H",
    "MINIMUM_UNITS",
    "PROJECTION_METHOD",
    "READING_INTERVAL_H",
    "READING_WINDOW_H",
    "ExponentialFit",
    "exponential_fit",
    "fit_range_h",
    "projected_life_h",
    "projection_limit_h",
]

Array = NDArray[np.float64]

PROJECTION_METHOD = "tm_21_2011_exponential"
"""Projection of IES TM-21-11 with Addendum B, applied to the flux of whole lamps."""

LIFE_SHARE = 0.7
"""Share of the initial flux that ends the life L70."""

READING_WINDOW_H = 48.0
"""How far a reading may lie from its due hour [h] (TM-21 Addendum B, 4.3)."""

READING_INTERVAL_H = 1000.0
"""Longest interval between readings [h] (TM-21 Addendum B, 4.3)."""

MINIMUM_DURATION_H = 6000.0
"""Shortest test that may be projected [h] (TM-21)."""

MINIMUM_UNITS = 10
"""Fewest units that may be projected (TM-21)."""

_LARGE_SET = 20
_LARGE_SET_FACTOR = 6.0
_SMALL_SET_FACTOR = 5.5
_FIT_START_H = 1000.0
_FIT_SPAN_H = 5000.0
_LONG_TEST_H = 10_000.0
_LONG_TEST_SHARE = 0.5


@dataclass(frozen=True, slots=True)
class ExponentialFit:
    """Least squares of ``ln Φ = ln B - α t``.

    Parameters
    ----------
    decay_rate_per_h
        α [1/h].
    initial_constant
        B, relative to the flux at 0 h.
    residual_deviation
        Standard deviation of the logarithms about the line; not-a-number for two readings.
    centre_h, centre_log
        Mean of the hours [h] and of the logarithms.
    spread_h2
        Sum of the squared distances of the hours from their mean [h²].
    readings
        Number of readings.
    """

    decay_rate_per_h: float
    initial_constant: float
    residual_deviation: float
    centre_h: float
    centre_log: float
    spread_h2: float
    readings: int

    def at(self, hours_h: Array) -> Array:
        """Maintenance on the fitted curve (hours,)."""
        return np.asarray(self.initial_constant * np.exp(-self.decay_rate_per_h * hours_h))

    def band(self, hours_h: Array) -> tuple[Array, Array]:
        """Confidence band of the fitted curve, 95.45 %: lower and upper line (hours,)."""
        wide = 1.0 / self.readings + (hours_h - self.centre_h) ** 2 / self.spread_h2
        margin = self._factor() * self.residual_deviation * np.sqrt(wide)
        middle = self.at(hours_h)
        return np.asarray(middle * np.exp(-margin)), np.asarray(middle * np.exp(margin))

    def life_interval_h(self, share: float = LIFE_SHARE) -> tuple[float, float]:
        """Where the confidence band crosses a share: earliest and latest hour.

        Fieller's theorem; infinite ends where the band does not cross, not-a-number for two
        readings.
        """
        if self.readings < 3:
            return math.nan, math.nan
        slope = -self.decay_rate_per_h
        above = self.centre_log - math.log(share)
        square = (self._factor() * self.residual_deviation) ** 2
        a = slope**2 - square / self.spread_h2
        b = 2.0 * slope * above
        c = above**2 - square / self.readings
        if a >= 0 and slope >= 0:
            return math.inf, math.inf
        if a == 0:
            return self.centre_h - c / b, math.inf
        root = math.sqrt(max(b**2 - 4.0 * a * c, 0.0))
        latest = (-b + root) / (2.0 * a) + self.centre_h if a > 0 else math.inf
        return (-b - root) / (2.0 * a) + self.centre_h, latest

    def _factor(self) -> float:
        return coverage_factor(self.readings - 2) if self.readings > 2 else math.nan


def exponential_fit(hours_h: Array, maintenance: Array) -> ExponentialFit:
    """Fit the exponential to mean maintenance against hours.

    Parameters
    ----------
    hours_h
        Hours of the readings in the range of the fit [h] (readings,).
    maintenance
        Flux relative to 0 h, averaged over the units (readings,).

    Returns
    -------
    ExponentialFit
        The fit. Source: ies_tm_21, clause 5.2.4.

    Raises
    ------
    ValueError
        If there are fewer than two readings, or one is not positive.
    """
    if hours_h.size < 2 or not np.all(maintenance > 0):
        raise ValueError("an exponential needs two readings at the least, all above zero")
    logs = np.log(maintenance)
    centre_h, centre_log = float(np.mean(hours_h)), float(np.mean(logs))
    away = hours_h - centre_h
    spread_h2 = float(np.sum(away**2))
    slope = float(np.sum(away * (logs - centre_log))) / spread_h2
    rest = logs - centre_log - slope * away
    freedom = hours_h.size - 2
    deviation = math.sqrt(float(np.sum(rest**2)) / freedom) if freedom else math.nan
    constant = math.exp(centre_log - slope * centre_h)
    return ExponentialFit(
        -slope, constant, deviation, centre_h, centre_log, spread_h2, hours_h.size
    )


def projected_life_h(
    decay_rate_per_h: float, initial_constant: float, share: float = LIFE_SHARE
) -> float:
    """Hours until the exponential falls to a share of the initial flux.

    Parameters
    ----------
    decay_rate_per_h
        α [1/h].
    initial_constant
        B, relative to the flux at 0 h.
    share
        Share of the initial flux.

    Returns
    -------
    float
        ``ln(B / share) / α`` [h]; infinite where the flux does not fall.
        Source: ies_tm_21, clause 5.2.5.
    """
    if decay_rate_per_h <= 0:
        return math.inf
    return math.log(initial_constant / share) / decay_rate_per_h


def fit_range_h(duration_h: float) -> tuple[float, float]:
    """First and last hour of the readings that enter the fit.

    Parameters
    ----------
    duration_h
        Hour of the last reading [h].

    Returns
    -------
    tuple
        The last 5000 h of tests up to 10 000 h, the last half of longer ones, never readings
        before 1000 h; reading windows included [h]. Source: ies_tm_21, Addendum B, 5.2.3.
    """
    span = _FIT_SPAN_H if duration_h <= _LONG_TEST_H else _LONG_TEST_SHARE * duration_h
    return max(duration_h - span, _FIT_START_H) - READING_WINDOW_H, duration_h


def projection_limit_h(duration_h: float, units: int) -> float:
    """How far a test may be projected.

    Parameters
    ----------
    duration_h
        Hour of the last reading [h].
    units
        Number of units in the mean, 10 at the least.

    Returns
    -------
    float
        Six times the duration for 20 units or more, 5.5 times for 10 to 19 [h].
        Source: ies_tm_21, clause 5.2.5.
    """
    return duration_h * (_LARGE_SET_FACTOR if units >= _LARGE_SET else _SMALL_SET_FACTOR)
