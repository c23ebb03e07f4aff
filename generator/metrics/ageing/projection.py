"""The maintenance curve of one lamp: readings, fit, band, and the life that may be reported."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.language import say, say_counted
from generator.metrics.ageing.exponential import (
    LIFE_SHARE,
    MINIMUM_DURATION_H,
    MINIMUM_UNITS,
    READING_INTERVAL_H,
    READING_WINDOW_H,
    ExponentialFit,
    exponential_fit,
    fit_range_h,
    projected_life_h,
    projection_limit_h,
)

__all__ = ["MaintenanceCurve", "maintenance_curve", "too_short_to_project"]

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True, eq=False)
class MaintenanceCurve:
    """Lumen maintenance of one lamp over time, and its projection where one may be given.

    Parameters
    ----------
    hours_h, maintenance
        Readings: hours [h] and flux relative to 0 h, averaged over the units (readings,).
    units_count
        Units in the average: those that survived and were read throughout.
    reason
        Why there is no projection; empty where there is one.
    fit
        The exponential, or ``None``.
    fit_from_h, fit_to_h
        First and last reading that entered the fit [h]; not-a-number without one.
    limit_h
        How far the test may be projected [h]; not-a-number without a projection.
    l70_h
        Projected life before the limit is applied [h]; infinite where the flux does not fall.
    l70_low_h, l70_high_h
        Confidence interval of the projected life, 95.45 % [h].
    """

    hours_h: Array
    maintenance: Array
    units_count: int
    reason: str
    fit: ExponentialFit | None = None
    fit_from_h: float = math.nan
    fit_to_h: float = math.nan
    limit_h: float = math.nan
    l70_h: float = math.nan
    l70_low_h: float = math.nan
    l70_high_h: float = math.nan

    @property
    def beyond_limit(self) -> bool:
        """Whether the life is to be reported as greater than the limit."""
        return self.fit is not None and self.l70_h > self.limit_h

    @property
    def reported_h(self) -> float:
        """The projected life, or the limit where the projection goes beyond it [h]."""
        return min(self.l70_h, self.limit_h) if self.fit is not None else math.nan


def maintenance_curve(hours_h: Array, maintenance: Array) -> MaintenanceCurve:
    """Curve and projection of a lamp from the maintenance of its units.

    Parameters
    ----------
    hours_h
        Hours of the readings, ascending from 0 [h] (readings,).
    maintenance
        Flux of each unit relative to its own at 0 h (units, readings); not-a-number where not
        read. Units with a gap are left out of the average.

    Returns
    -------
    MaintenanceCurve
        The average and, for tests of 6000 h or more with 10 units or more read every 1000 h,
        the projection. Source: ies_tm_21, clause 5.2.
    """
    whole = np.all(np.isfinite(maintenance), axis=1)
    count = int(np.sum(whole))
    if count == 0:
        return MaintenanceCurve(
            hours_h, np.full(hours_h.shape, np.nan), 0, say("no unit read throughout")
        )
    mean = np.mean(maintenance[whole], axis=0)
    first, last = fit_range_h(float(hours_h[-1]))
    inside = (hours_h >= first) & (hours_h <= last)
    reason = _obstacle(hours_h, inside, count)
    if reason:
        return MaintenanceCurve(hours_h, mean, count, reason)
    fit = exponential_fit(hours_h[inside], mean[inside])
    low, high = fit.life_interval_h(LIFE_SHARE)
    return MaintenanceCurve(
        hours_h,
        mean,
        count,
        "",
        fit,
        float(hours_h[inside][0]),
        float(hours_h[inside][-1]),
        projection_limit_h(float(hours_h[-1]), count),
        projected_life_h(fit.decay_rate_per_h, fit.initial_constant),
        low,
        high,
    )


def too_short_to_project(duration_h: float) -> str:
    """Say that a test is too short to be projected.

    Parameters
    ----------
    duration_h
        Hour of its last reading [h].

    Returns
    -------
    str
        The reason. Source: ies_tm_21, clause 5.2.
    """
    return say(
        "no projection from {duration:g} h: TM-21 asks for {least:g} h or more",
        duration=duration_h,
        least=MINIMUM_DURATION_H,
    )


def _obstacle(hours_h: Array, inside: NDArray[np.bool_], count: int) -> str:
    """Why the readings may not be projected; empty where they may."""
    duration = float(hours_h[-1])
    if duration < MINIMUM_DURATION_H - READING_WINDOW_H:
        return too_short_to_project(duration)
    if count < MINIMUM_UNITS:
        return say_counted(
            "no projection from {count} unit: TM-21 asks for {least} or more",
            "no projection from {count} units: TM-21 asks for {least} or more",
            count,
            least=MINIMUM_UNITS,
        )
    if np.any(np.diff(hours_h[inside]) > READING_INTERVAL_H + 2 * READING_WINDOW_H):
        return say(
            "no projection: readings in the fit are more than {interval:g} h apart",
            interval=READING_INTERVAL_H,
        )
    return ""
