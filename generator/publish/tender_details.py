"""The tender as CSV, in detail: gate, inputs of the costs, emissions, sensitivity, certainty."""

from __future__ import annotations

from collections.abc import Callable, Iterator

from generator.publish.evidence import plain
from generator.records.tender import BidResult, Certainty, Emissions, Question, Tender

__all__ = [
    "ASSUMPTION_COLUMNS",
    "EMISSION_COLUMNS",
    "GATE_COLUMNS",
    "LEAD_COLUMNS",
    "SENSITIVITY_COLUMNS",
    "assumption_rows",
    "emission_rows",
    "gate_rows",
    "lead_rows",
    "plain_text",
    "sensitivity_rows",
]

GATE_COLUMNS = ("lot", "lamp_id", "kind", "clause", "title", "text", "source")
ASSUMPTION_COLUMNS = ("lot", "lamp_id", "assumption", "value", "unit", "origin")
EMISSION_COLUMNS = (
    "lot",
    "lamp_id",
    "basis",
    "tonnes_per_year",
    "saved_tonnes_per_year",
    "factor_g_per_kwh",
    "factor_year",
    "factor_region",
    "factor_source",
)
SENSITIVITY_COLUMNS = (
    "lot",
    "lamp_id",
    "assumption",
    "unit",
    "low_input",
    "high_input",
    "low_cost",
    "high_cost",
)
LEAD_COLUMNS = ("lot", "kind", "input", "lamp_id", "assumed", "changed", "change_percent", "share")

Row = dict[str, str]
Named = Callable[[str], str]
"""Gives the id of a bid as it may be written: under code names the code."""

_FORMULA_SIGNS = ("=", "+", "-", "@", "\t", "\r")


def plain_text(text: str) -> str:
    """Text that no spreadsheet takes for a formula."""
    return f"'{text}" if text.startswith(_FORMULA_SIGNS) else text


def _bids(tender: Tender, named: Named) -> Iterator[tuple[Row, BidResult]]:
    for lot in tender.lots:
        for item in lot.bids:
            yield {"lot": lot.lot, "lamp_id": named(item.bid.lamp_id)}, item


def gate_rows(tender: Tender, named: Named) -> Iterator[Row]:
    """Every reason, every question as it is sent (that of a low price too), every check passed.

    Particulars of a question may name the model, and are left out under code names.
    """
    for key, item in _bids(tender, named):
        gate = item.eligibility
        for reason in gate.reasons:
            yield key | {
                "kind": "reason",
                "clause": reason.clause,
                "title": plain_text(reason.title),
                "text": plain_text(reason.text),
                "source": plain_text(reason.source),
            }
        for question in gate.questions:
            yield key | _question(question, hidden=tender.under_codes)
        for clause in gate.passed:
            yield key | {"kind": "passed", "clause": clause}
    for lot in tender.lots:
        for low in lot.award.low_offers if lot.award else ():
            key = {"lot": lot.lot, "lamp_id": named(low.lamp_id)}
            yield key | _question(low.question, hidden=tender.under_codes)


def _question(question: Question, *, hidden: bool) -> Row:
    more = "" if hidden else question.particulars
    return {
        "kind": "question",
        "clause": question.clause,
        "title": plain_text(question.title),
        "text": plain_text(" ".join(filter(None, (question.text, more)))),
    }


def assumption_rows(tender: Tender, named: Named) -> Iterator[Row]:
    """Every input of every cost, with its origin."""
    for key, item in _bids(tender, named):
        for part in item.cost.assumptions if item.cost else ():
            yield key | {
                "assumption": part.name,
                "value": plain(part.value),
                "unit": part.unit,
                "origin": part.origin,
            }


def emission_rows(tender: Tender, named: Named) -> Iterator[Row]:
    """Emissions of a year on every basis, with the factor and where it stands."""
    for key, item in _bids(tender, named):
        for part in item.energy.emissions if item.energy else ():
            yield key | _emission(part)


def _emission(part: Emissions) -> Row:
    factor = part.factor
    return {
        "basis": part.basis,
        "tonnes_per_year": plain(part.tonnes),
        "saved_tonnes_per_year": plain(part.saving_tonnes),
        "factor_g_per_kwh": plain(factor.g_per_kwh),
        "factor_year": str(factor.year),
        "factor_region": plain_text(factor.region),
        "factor_source": plain_text(factor.source),
    }


def sensitivity_rows(tender: Tender, named: Named) -> Iterator[Row]:
    """The bars of every tornado."""
    for key, item in _bids(tender, named):
        for bar in item.sensitivity:
            yield key | {
                "assumption": bar.assumption,
                "unit": bar.unit,
                "low_input": plain(bar.low_input),
                "high_input": plain(bar.high_input),
                "low_cost": plain(bar.low_cost),
                "high_cost": plain(bar.high_cost),
            }


def lead_rows(tender: Tender, named: Named) -> Iterator[Row]:
    """What would swap first and second place, and what drives the lead of the first."""
    for lot in tender.lots:
        if lot.certainty is not None:
            yield from ({"lot": lot.lot} | row for row in _lead(lot.certainty, named))


def _lead(sure: Certainty, named: Named) -> Iterator[Row]:
    for swap in sure.swaps:
        yield {
            "kind": "swap",
            "input": swap.input,
            "lamp_id": named(swap.lamp_id),
            "assumed": plain(swap.value),
            "changed": plain(swap.changed),
            "change_percent": plain(swap.change_percent),
        }
    for driver in sure.drivers:
        yield {
            "kind": "driver",
            "input": driver.input,
            "lamp_id": named(driver.lamp_id),
            "share": f"{driver.share:.6f}",
        }
