"""Global consumer's and producer's risk of a decision rule.

Source: jcgm_106, clause 9.5: a normal prior for what is judged, a normal error of measurement.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from decimal import Decimal
from itertools import groupby
from statistics import NormalDist, fmean, stdev

from generator.conformity.decision_rule import COVERAGE_FACTOR, SIMPLE, rule_text
from generator.language import say
from generator.records.risk import CampaignRisk
from generator.records.settings import Decision
from generator.records.verdict import Basis, Verdict

__all__ = ["GlobalRisk", "campaign_risks", "global_risk"]

LEAST_LAMPS = 3
"""Fewer lamps give no spread worth the name; common practice, no source."""

_HALF_WIDTH = 9.0
_STEPS = 2000


@dataclass(frozen=True, slots=True)
class GlobalRisk:
    """Risk that an item is accepted wrongly, and that it is rejected wrongly."""

    consumers: float
    producers: float


def global_risk(
    mean: float,
    spread: float,
    standard_uncertainty: float,
    tolerance: tuple[float, float],
    acceptance: tuple[float, float],
) -> GlobalRisk:
    """Global risks for a tolerance interval and an acceptance interval.

    Parameters
    ----------
    mean, spread
        Mean and standard deviation of the property over the items.
    standard_uncertainty
        Standard uncertainty of one measurement, above zero.
    tolerance, acceptance
        Lower and upper end; infinite where there is none.

    Returns
    -------
    GlobalRisk
        Both risks as probabilities over all items.

    Notes
    -----
    Source: jcgm_106, clause 9.5.2. Simpson's rule over nine standard deviations of the prior,
    piecewise between the tolerance limits, so that the integrand is smooth in every piece.
    """
    prior, error = NormalDist(mean, spread), NormalDist(0.0, standard_uncertainty)
    lowest, highest = mean - _HALF_WIDTH * spread, mean + _HALF_WIDTH * spread

    def accepted(value: float) -> float:
        return error.cdf(acceptance[1] - value) - error.cdf(acceptance[0] - value)

    def integral(begin: float, end: float, rejected: bool) -> float:
        begin, end = max(begin, lowest), min(end, highest)
        if begin >= end:
            return 0.0
        width = (end - begin) / _STEPS
        total = 0.0
        for number in range(_STEPS + 1):
            value = begin + number * width
            share = accepted(value)
            weight = 1 if number in {0, _STEPS} else 4 if number % 2 else 2
            total += weight * prior.pdf(value) * (1.0 - share if rejected else share)
        return total * width / 3.0

    lower, upper = tolerance
    return GlobalRisk(
        consumers=integral(-math.inf, lower, False) + integral(upper, math.inf, False),
        producers=integral(lower, upper, True),
    )


def campaign_risks(verdicts: Iterable[Verdict], decision: Decision) -> tuple[CampaignRisk, ...]:
    """Estimate the global risks of every one-sided clause over the lamps of a campaign.

    Parameters
    ----------
    verdicts
        Verdicts of the whole campaign.
    decision
        The decision rule of the campaign; a clause whose act is itself the rule keeps that.

    Returns
    -------
    tuple of CampaignRisk
        One for every clause judged on determined values with known uncertainty; the margins of
        the lamps are the sample from which the prior is estimated.

    Notes
    -----
    Source: jcgm_106, clause 9.5. The spread of the true margins is that of the values found,
    less the part that measurement explains.
    """
    ordered = sorted(_usable(verdicts), key=lambda item: item.clause)
    groups = groupby(ordered, key=lambda item: item.clause)
    return tuple(_risk_of(list(group), decision) for _, group in groups)


def _usable(verdicts: Iterable[Verdict]) -> Iterator[Verdict]:
    return (
        item
        for item in verdicts
        if item.basis is Basis.DETERMINED
        and item.comparison != "within"
        and item.margin is not None
        and item.expanded_uncertainty
    )


def _risk_of(group: list[Verdict], decision: Decision) -> CampaignRisk:
    first = group[0]
    used = decision if first.rule == rule_text(decision) else SIMPLE
    margins = [float(item.margin or 0) for item in group]
    errors = [float(item.expanded_uncertainty or 0) / COVERAGE_FACTOR for item in group]
    error = math.sqrt(fmean(item * item for item in errors))
    mean = fmean(margins)
    variance = stdev(margins) ** 2 - error**2 if len(group) >= LEAST_LAMPS else 0.0
    reason: str = ""
    if len(group) < LEAST_LAMPS:
        reason = say("fewer than {count} lamps with known uncertainty", count=LEAST_LAMPS)
    elif variance <= 0.0:
        reason = say("the lamps differ by no more than the uncertainty explains")
    found = None
    if not reason:
        band = _guard_band(error, used)
        found = global_risk(mean, math.sqrt(variance), error, (0.0, math.inf), (band, math.inf))
    return CampaignRisk(
        clause=first.clause,
        title=first.title,
        regime=first.regime,
        unit=first.unit,
        lamps_count=len(group),
        mean_margin=_shown(mean),
        margin_spread=None if reason else _shown(math.sqrt(variance)),
        standard_uncertainty=_shown(error),
        rule=first.rule,
        consumers_risk=None if found is None else Decimal(f"{found.consumers:.4f}"),
        producers_risk=None if found is None else Decimal(f"{found.producers:.4f}"),
        reason=reason,
    )


def _guard_band(standard_uncertainty: float, decision: Decision) -> float:
    if decision.rule == "guarded acceptance":
        return float(decision.guard_band_factor) * COVERAGE_FACTOR * standard_uncertainty
    if decision.rule == "conformance probability":
        return standard_uncertainty * NormalDist().inv_cdf(float(decision.probability))
    return 0.0


def _shown(number: float) -> Decimal:
    return Decimal(f"{number:.6g}")
