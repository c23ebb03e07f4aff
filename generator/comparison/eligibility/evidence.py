"""Completeness of the evidence: report, model, laboratory, date, sample, offer, findings."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date

from generator.comparison.eligibility.gate_findings import GateFindings
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp
from generator.records.tender import Bid
from generator.records.tender_settings import TenderLot, TenderTable

__all__ = ["check_evidence", "check_findings", "check_offer"]

_SOURCE = "tender documents, [tender]"
_ASKED_ABOUT = (Severity.IMPOSSIBLE, Severity.CONTRADICTION, Severity.DOUBT)


def check_evidence(
    lamp: Lamp, bid: Bid, units: int, tender: TenderTable, on: date, findings: GateFindings
) -> None:
    """Check the test report of one bid.

    Parameters
    ----------
    lamp, bid
        The lamp and what its report says of itself.
    units
        Units that were measured.
    tender
        What the tender asks of a report.
    on
        Date of the assessment; no report may be younger.
    findings
        Where to note the outcome.
    """
    if not lamp.offer.report_no:
        findings.ask(
            "evidence-report",
            "Test report",
            "The bid names no test report for the offered lamp. Please supply the report with its "
            "number, date, laboratory and accreditation.",
        )
        return
    findings.hold("evidence-report")
    _check_model(lamp, bid, findings)
    _check_laboratory(bid, tender, findings)
    _check_date(lamp.offer.report_date, tender, on, findings)
    _check_sample(units, tender, findings)


def _same(name: str) -> str:
    return " ".join(name.split()).casefold()


def _check_model(lamp: Lamp, bid: Bid, findings: GateFindings) -> None:
    clause, title = "evidence-model", "Model named in the report"
    if not bid.report_model:
        findings.ask(
            clause,
            title,
            "It cannot be seen which model the test report is about. Please state the model that "
            "the report names, and enclose the page that names it.",
        )
    elif _same(bid.report_model) != _same(lamp.model):
        findings.ask(
            clause,
            title,
            "The test report names a model other than the offered one. Please supply a report on "
            "the offered model, or show that both are the same in light, colour and circuit.",
            f"report: {bid.report_model}; offer: {lamp.model}",
        )
    else:
        findings.hold(clause)


def _check_laboratory(bid: Bid, tender: TenderTable, findings: GateFindings) -> None:
    for clause, title, given, required in (
        ("evidence-laboratory", "Laboratory", bid.laboratory, tender.laboratory_required),
        (
            "evidence-accreditation",
            "Accreditation",
            bid.accreditation,
            tender.accreditation_required,
        ),
    ):
        if given:
            findings.hold(clause)
        elif required:
            findings.ask(
                clause,
                title,
                f"The bid does not state the {title.lower()} behind the test report. Please state "
                "it and enclose the document that shows it.",
            )


def _check_date(
    report_date: date | None, tender: TenderTable, on: date, findings: GateFindings
) -> None:
    clause, title = "evidence-date", "Date of the report"
    begin, end = tender.reports_from, tender.reports_to
    if report_date is None:
        findings.ask(
            clause,
            title,
            "The bid does not state the date of the test report. Please state it and enclose the "
            "page that shows it.",
        )
    elif report_date > on:
        findings.ask(
            clause,
            title,
            f"The test report is dated {report_date.isoformat()}, after the date of this "
            f"assessment ({on.isoformat()}). Please check the date and state the right one.",
        )
    elif (begin is not None and report_date < begin) or (end is not None and report_date > end):
        window = f"{begin or 'any date'} to {end or 'any date'}"
        findings.exclude(
            clause,
            title,
            f"Dated {report_date}; asked for: {window}.",
            f"{_SOURCE} reports_from/to",
        )
    else:
        findings.hold(clause)


def _check_sample(units: int, tender: TenderTable, findings: GateFindings) -> None:
    least = tender.minimum_sample_units
    if least is None:
        return
    if units >= least:
        findings.hold("evidence-sample")
        return
    findings.ask(
        "evidence-sample",
        "Size of the sample",
        f"The measurements cover {units} units; the tender asks for {least} or more. Please "
        "supply measurements of the units that are missing.",
    )


def check_offer(lamp: Lamp, lot: TenderLot, quantity: int, findings: GateFindings) -> None:
    """Check price, currency, quantity and cap of one offer against its lot."""
    if lamp.offer.unit_price is None:
        findings.ask(
            "offer-price",
            "Unit price",
            "No unit price was found in the bid. Please state where in the bid it stands.",
        )
    elif not lamp.offer.currency:
        findings.ask(
            "offer-currency",
            "Currency of the price",
            "The bid states a unit price without its currency. Please state the currency.",
        )
    offered = lamp.offer.quantity
    if lot.quantity is not None and offered is not None and offered < quantity:
        findings.ask(
            "offer-quantity",
            "Quantity",
            f"The bid offers {offered} lamps; the lot asks for {quantity}. Please confirm that "
            "the price holds for the whole quantity.",
        )
    if lot.cap is None:
        return
    if not lamp.cap:
        findings.ask("lot-cap", "Cap", "Please state the cap of the offered lamp.")
    elif _same(lamp.cap) != _same(lot.cap):
        text = f"Cap {lamp.cap}; asked for: {lot.cap}."
        findings.exclude("lot-cap", "Cap", text, f"lot {lot.id}, cap")
    else:
        findings.hold("lot-cap")


def check_findings(items: Sequence[Finding], findings: GateFindings) -> None:
    """Turn findings about a lamp into questions; a finding alone excludes nobody."""
    order = sorted(items, key=lambda item: (item.severity.rank, item.check, item.unit_id))
    for item in order:
        if item.severity in _ASKED_ABOUT:
            findings.ask(
                f"finding-{item.check}",
                item.title,
                f"Numbers in the bid do not agree with one another: {item.title}. Please explain "
                "the difference, or supply the number as it should stand.",
                f"{item.compared.rstrip('.')}. {item.explanation}",
            )
