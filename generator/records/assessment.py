"""An assessment: a campaign with its figures and verdicts on one date; what sheets are made of."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date

from generator.records.campaign import Campaign
from generator.records.clause import Clause
from generator.records.figure import FigureSet
from generator.records.finding import Finding
from generator.records.risk import CampaignRisk
from generator.records.tender import Tender
from generator.records.verdict import Verdict

__all__ = ["Assessment"]


@dataclass(frozen=True, slots=True, eq=False)
class Assessment:
    """Everything the sheets and the data files are made of.

    Parameters
    ----------
    campaign
        What was read.
    assessed_on
        The date on which the law was read.
    figures
        All figures: per unit, means, declared, and those that the law defines.
    verdicts
        All verdicts, lamp by lamp in campaign order.
    version
        Version of the program.
    law_book
        Version of the law book.
    findings
        What the cross-checks found, lamp by lamp in campaign order.
    clauses
        The clauses asked for, those of the law and the buyer's.
    risks
        Global consumer's and producer's risk, clause by clause where it can be given.
    tender
        The bids compared; ``None`` where the campaign is no tender.
    """

    campaign: Campaign
    assessed_on: date
    figures: FigureSet
    verdicts: tuple[Verdict, ...]
    version: str
    law_book: str = ""
    findings: tuple[Finding, ...] = ()
    clauses: tuple[Clause, ...] = ()
    risks: tuple[CampaignRisk, ...] = ()
    tender: Tender | None = None

    @property
    def shown_bidders(self) -> Mapping[str, str]:
        """lamp_id -> code name that stands for bidder and model; empty where names are shown."""
        return self.tender.shown_as if self.tender and self.tender.under_codes else {}

    def verdicts_of(self, lamp_id: str) -> tuple[Verdict, ...]:
        """The verdicts of one lamp, in clause order."""
        return tuple(item for item in self.verdicts if item.lamp_id == lamp_id)

    def findings_of(self, lamp_id: str) -> tuple[Finding, ...]:
        """The findings on one lamp, the heaviest first."""
        return tuple(item for item in self.findings if item.lamp_id == lamp_id)
