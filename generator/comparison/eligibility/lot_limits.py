"""Limits of a lot on beam and flux, held against the best known figure of a lamp."""

from __future__ import annotations

from decimal import Decimal

from generator.comparison.eligibility.gate_findings import GateFindings
from generator.comparison.eligibility.value_text import value_text
from generator.language import joined, numeral, say
from generator.quantities import quantity
from generator.records.clause_words import compared_text, with_unit
from generator.records.figure import GRADE_WORDS, FigureSet
from generator.records.lamp import Lamp
from generator.records.tender_settings import TenderLot

__all__ = ["check_lot_limits"]


def check_lot_limits(
    lamp: Lamp, lot: TenderLot, figures: FigureSet, findings: GateFindings
) -> None:
    """Check beam angle and luminous flux of one lamp against its lot.

    Parameters
    ----------
    lamp, lot
        The lamp and its lot; a limit that the lot does not set is not checked.
    figures
        All figures; measured before declared.
    findings
        Where to note the outcome.
    """
    flux = "useful_luminous_flux_lm" if lamp.directional else "luminous_flux_lm"
    for clause, name, low, high in (
        ("lot-beam", "beam_angle_deg", lot.beam_from_deg, lot.beam_to_deg),
        ("lot-flux", flux, lot.minimum_flux_lm, None),
    ):
        if low is None and high is None:
            continue
        entry = quantity(name)
        figure = figures.best(lamp.lamp_id, name)
        value = figure.number if figure is not None else None
        span = _span(low, high, entry.unit)
        if figure is None or value is None:
            text = say(
                "Please state the {quantity} of the offered lamp; the lot asks for {span}.",
                quantity=entry.label,
                span=span,
            )
            findings.ask(clause, entry.label, text)
        elif (low is not None and value < low) or (high is not None and value > high):
            text = say(
                "{quantity}, {grade}: {found}; asked for: {asked}.",
                quantity=entry.label,
                grade=GRADE_WORDS[figure.grade],
                found=value_text(value, name, low, high),
                asked=span,
            )
            findings.exclude(clause, entry.label, text, say("lot {lot}", lot=lot.id))
        else:
            findings.hold(clause)


def _span(low: Decimal | None, high: Decimal | None, unit: str) -> str:
    parts = [
        compared_text(comparison, with_unit(numeral(f"{limit}"), unit))
        for comparison, limit in (("at least", low), ("at most", high))
        if limit is not None
    ]
    return joined(say(" and "), parts)
