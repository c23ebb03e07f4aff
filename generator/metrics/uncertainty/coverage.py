"""Coverage factors, effective degrees of freedom, and the mean over the units of a lamp."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "COVERAGE_PROBABILITY",
    "MeanOverUnits",
    "coverage_factor",
    "expanded_with_lift",
    "mean_with_spread",
    "welch_satterthwaite",
]

Array = NDArray[np.float64]

COVERAGE_PROBABILITY = math.erf(math.sqrt(2.0))
"""Probability inside two standard deviations of a normal distribution, 95.45 %."""


_WHOLE = 1e-9
"""A count of degrees of freedom this little below a whole number is that number."""


@dataclass(frozen=True, slots=True)
class MeanOverUnits:
    """Mean over the units of a lamp.

    Parameters
    ----------
    mean
        Arithmetic mean [unit of the values].
    expanded_uncertainty
        Expanded uncertainty of the mean, 95.45 % coverage; ``None`` where the part common to
        all units is not known.
    spread
        Sample standard deviation over the units; ``None`` for one unit.
    units_count
        Number of units.
    degrees_of_freedom
        Effective degrees of freedom behind the expanded uncertainty, cut to a whole number;
        infinite for one unit.
    """

    mean: float
    expanded_uncertainty: float | None
    spread: float | None
    units_count: int
    degrees_of_freedom: float


def coverage_factor(degrees_of_freedom: float, probability: float = COVERAGE_PROBABILITY) -> float:
    """Coverage factor of Student's distribution, two-sided.

    Parameters
    ----------
    degrees_of_freedom
        Effective degrees of freedom, at least 1; may be infinite, and need not be whole.
    probability
        Coverage probability.

    Returns
    -------
    float
        Coverage factor k; 2 for infinite degrees of freedom and 95.45 %.
        Source: jcgm_100, G.3 and table G.2.

    Raises
    ------
    ValueError
        If there is less than one degree of freedom.
    """
    from scipy.special import ndtri, stdtrit

    if not degrees_of_freedom >= 1:
        raise ValueError(f"{degrees_of_freedom} degrees of freedom give no coverage factor")
    quantile = 0.5 * (1.0 + probability)
    if math.isinf(degrees_of_freedom):
        return float(ndtri(quantile))
    return float(stdtrit(degrees_of_freedom, quantile))


def expanded_with_lift(lift: Array, deviation: Array) -> Array:
    """Expanded uncertainty of a figure known to be too high that is given uncorrected.

    Parameters
    ----------
    lift
        By how much the figure is too high on average, not negative (...,).
    deviation
        Standard deviation about that (...,).

    Returns
    -------
    Array
        Half-width of the interval about the figure that holds the truth with 95.45 %: twice the
        deviation without a lift, the lift and 1.69 deviations beside a large one (...,).
        Source: jcgm_100, F.2.4.5.
    """
    ratios, excess = _one_sided()
    ratio = lift / np.where(deviation > 0, deviation, 1.0)
    return np.asarray(lift + deviation * np.interp(ratio, ratios, excess))


@cache
def _one_sided() -> tuple[Array, Array]:
    """Lift over deviation, and half-width less the lift over deviation, by bisection."""
    from scipy.special import ndtr

    ratio = np.linspace(0.0, 4.0, 81)
    low, high = np.full_like(ratio, 1.0), np.full_like(ratio, 3.0)
    for _ in range(40):
        middle = (low + high) / 2
        short = ndtr(middle) - ndtr(-middle - 2 * ratio) < COVERAGE_PROBABILITY
        low, high = np.where(short, middle, low), np.where(short, high, middle)
    return ratio, high


def welch_satterthwaite(components: Array, degrees_of_freedom: Array) -> float:
    """Effective degrees of freedom of a combined standard uncertainty.

    Parameters
    ----------
    components
        Contributions to the combined standard uncertainty, in its unit (inputs,).
    degrees_of_freedom
        Degrees of freedom of each (inputs,); infinite where a contribution is exactly known.

    Returns
    -------
    float
        Effective degrees of freedom, not truncated; infinite where nothing limits them.
        Source: jcgm_100, equation G.2b.
    """
    largest = float(np.max(np.abs(components), initial=0.0))
    if largest == 0.0:
        return math.inf
    shares = (components / largest) ** 2
    limiting = float(np.sum(shares**2 / degrees_of_freedom))
    return float(np.sum(shares)) ** 2 / limiting if limiting > 0 else math.inf


def mean_with_spread(values: Array, common_expanded: float | None) -> MeanOverUnits:
    """Mean over units whose readings share one systematic uncertainty.

    The laboratory's uncertainty acts on all units alike and does not average out; what the
    units differ by does, with the square root of their number.

    Parameters
    ----------
    values
        One value per unit (units,).
    common_expanded
        Expanded uncertainty (k = 2) common to all units; ``None`` where not known.

    Returns
    -------
    MeanOverUnits
        Mean, expanded uncertainty with the factor of the effective degrees of freedom,
        sample standard deviation, number of units. Source: jcgm_100, 4.2, 5.1.2, G.4, G.6.4.

    Raises
    ------
    ValueError
        If there are no values.
    """
    count = values.size
    if count == 0:
        raise ValueError("a mean needs one value at the least")
    mean = float(np.mean(values))
    if count == 1:
        return MeanOverUnits(mean, common_expanded, None, 1, math.inf)
    spread = float(np.std(values, ddof=1))
    if common_expanded is None:
        return MeanOverUnits(mean, None, spread, count, math.inf)
    parts = np.array([common_expanded / 2.0, spread / math.sqrt(count)])
    freedom = welch_satterthwaite(parts, np.array([math.inf, count - 1.0]))
    freedom = float(np.floor(freedom + _WHOLE))
    expanded = coverage_factor(freedom) * float(np.hypot(*parts))
    return MeanOverUnits(mean, expanded, spread, count, freedom)
