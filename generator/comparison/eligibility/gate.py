"""The eligibility gate: everything that is checked of one bid in one lot, in one place."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date

from generator.comparison.eligibility.evidence import check_evidence, check_findings, check_offer
from generator.comparison.eligibility.gate_findings import GateFindings
from generator.comparison.eligibility.lot_limits import check_lot_limits
from generator.comparison.eligibility.mandatory_clauses import check_clauses, mandatory
from generator.records.figure import FigureSet
from generator.records.finding import Finding
from generator.records.lamp import Lamp
from generator.records.tender import Bid, Eligibility
from generator.records.tender_settings import TenderLot, TenderTable
from generator.records.verdict import Verdict

__all__ = ["eligibility"]


def eligibility(
    lamp: Lamp,
    bid: Bid,
    lot: TenderLot,
    quantity: int,
    *,
    units: int,
    figures: FigureSet,
    verdicts: Sequence[Verdict],
    findings: Sequence[Finding],
    tender: TenderTable,
    on: date,
) -> Eligibility:
    """Decide whether a bid is admissible, not admissible, or to be clarified.

    Parameters
    ----------
    lamp, bid, lot, quantity
        The bid, its lot, and the number of light points of the lot.
    units
        Units of the lamp that were measured.
    figures
        All figures.
    verdicts, findings
        Those of this lamp.
    tender
        ``[tender]``.
    on
        Date of the assessment.

    Returns
    -------
    Eligibility
        With every reason and every question, not the first alone.
    """
    collected = GateFindings()
    check_clauses(mandatory(verdicts, tender, lot), collected)
    check_evidence(lamp, bid, units, tender, on, collected)
    check_offer(lamp, lot, quantity, collected)
    check_lot_limits(lamp, lot, figures, collected)
    check_findings(findings, collected)
    return collected.result()
