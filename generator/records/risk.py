"""Global risks of a campaign: how often a clause lets a lamp pass, or fail, wrongly."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal

__all__ = ["CampaignRisk"]


@dataclass(frozen=True, slots=True)
class CampaignRisk:
    """Global consumer's and producer's risk of one clause over the lamps of a campaign.

    Parameters
    ----------
    clause, title, regime, unit
        The clause, and the unit of the margins.
    lamps_count
        Lamps behind the estimate.
    mean_margin, margin_spread
        Mean and standard deviation of the true margins, estimated from the lamps.
    standard_uncertainty
        Standard uncertainty of one margin, root mean square over the lamps.
    rule
        The decision rule.
    consumers_risk
        Probability that a lamp is nonconforming and passes; ``None`` where not given.
    producers_risk
        Probability that a lamp is conforming and does not pass; ``None`` where not given.
    reason
        Why the risks are not given; empty otherwise.
    """

    clause: str
    title: str
    regime: str
    unit: str
    lamps_count: int
    mean_margin: Decimal | None
    margin_spread: Decimal | None
    standard_uncertainty: Decimal | None
    rule: str
    consumers_risk: Decimal | None
    producers_risk: Decimal | None
    reason: str = ""
