"""Completeness of the evidence: report, model, laboratory, date, sample, offer, findings."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date

from generator.comparison.eligibility.gate_findings import GateFindings
from generator.language import joined, say, say_as, say_counted
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp
from generator.records.tender import Bid
from generator.records.tender_settings import TenderLot, TenderTable

__all__ = ["check_evidence", "check_findings", "check_offer"]

_SOURCE = say("tender documents, {key}", key="[tender] reports_from/to")
_QUESTIONED = say(
    "Numbers in the bid do not agree with one another: {title}. Please explain the difference, or "
    "supply the number as it should stand."
)
_CAP = say_as("lamp", "Cap")
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
            say("Test report"),
            say(
                "The bid names no test report for the offered lamp. Please supply the report with "
                "its number, date, laboratory and accreditation."
            ),
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
    clause, title = "evidence-model", say("Model named in the report")
    if not bid.report_model:
        findings.ask(
            clause,
            title,
            say(
                "It cannot be seen which model the test report is about. Please state the model "
                "that the report names, and enclose the page that names it."
            ),
        )
    elif _same(bid.report_model) != _same(lamp.model):
        findings.ask(
            clause,
            title,
            say(
                "The test report names a model other than the offered one. Please supply a report "
                "on the offered model, or show that both are the same in light, colour and "
                "circuit."
            ),
            say("report: {report}; offer: {offer}", report=bid.report_model, offer=lamp.model),
        )
    else:
        findings.hold(clause)


def _check_laboratory(bid: Bid, tender: TenderTable, findings: GateFindings) -> None:
    for clause, title, question, given, required in (
        (
            "evidence-laboratory",
            say("Laboratory"),
            say(
                "The bid does not state the laboratory behind the test report. Please state it "
                "and enclose the document that shows it."
            ),
            bid.laboratory,
            tender.laboratory_required,
        ),
        (
            "evidence-accreditation",
            say("Accreditation"),
            say(
                "The bid does not state the accreditation behind the test report. Please state it "
                "and enclose the document that shows it."
            ),
            bid.accreditation,
            tender.accreditation_required,
        ),
    ):
        if given:
            findings.hold(clause)
        elif required:
            findings.ask(clause, title, question)


def _check_date(
    report_date: date | None, tender: TenderTable, on: date, findings: GateFindings
) -> None:
    clause, title = "evidence-date", say("Date of the report")
    begin, end = tender.reports_from, tender.reports_to
    if report_date is None:
        findings.ask(
            clause,
            title,
            say(
                "The bid does not state the date of the test report. Please state it and enclose "
                "the page that shows it."
            ),
        )
    elif report_date > on:
        findings.ask(
            clause,
            title,
            say(
                "The test report is dated {dated}, after the date of this assessment "
                "({assessed}). Please check the date and state the right one.",
                dated=report_date,
                assessed=on,
            ),
        )
    elif (begin is not None and report_date < begin) or (end is not None and report_date > end):
        any_date = say("any date")
        findings.exclude(
            clause,
            title,
            say(
                "Dated {dated}; asked for: {begin} to {end}.",
                dated=report_date,
                begin=begin or any_date,
                end=end or any_date,
            ),
            _SOURCE,
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
        say("Size of the sample"),
        say_counted(
            "The measurements cover {count} unit; the tender asks for {least} or more. Please "
            "supply measurements of the units that are missing.",
            "The measurements cover {count} units; the tender asks for {least} or more. Please "
            "supply measurements of the units that are missing.",
            units,
            least=least,
        ),
    )


def check_offer(lamp: Lamp, lot: TenderLot, quantity: int, findings: GateFindings) -> None:
    """Check price, currency, quantity and cap of one offer against its lot."""
    if lamp.offer.unit_price is None:
        findings.ask(
            "offer-price",
            say("Unit price"),
            say("No unit price was found in the bid. Please state where in the bid it stands."),
        )
    elif not lamp.offer.currency:
        findings.ask(
            "offer-currency",
            say("Currency of the price"),
            say("The bid states a unit price without its currency. Please state the currency."),
        )
    offered = lamp.offer.quantity
    if lot.quantity is not None and offered is not None and offered < quantity:
        findings.ask(
            "offer-quantity",
            say_as("lamps", "Quantity"),
            say_counted(
                "The bid offers {count} lamp; the lot asks for {quantity}. Please confirm that "
                "the price holds for the whole quantity.",
                "The bid offers {count} lamps; the lot asks for {quantity}. Please confirm that "
                "the price holds for the whole quantity.",
                offered,
                quantity=quantity,
            ),
        )
    if lot.cap is None:
        return
    if not lamp.cap:
        findings.ask("lot-cap", _CAP, say("Please state the cap of the offered lamp."))
    elif _same(lamp.cap) != _same(lot.cap):
        text = say("Cap {found}; asked for: {asked}.", found=lamp.cap, asked=lot.cap)
        findings.exclude("lot-cap", _CAP, text, say("lot {lot}, cap", lot=lot.id))
    else:
        findings.hold("lot-cap")


def _ended(text: str) -> str:
    """A text with a full stop at its end."""
    return text if text.endswith(".") else joined("", (text, "."))


def check_findings(items: Sequence[Finding], findings: GateFindings) -> None:
    """Turn findings about a lamp into questions; a finding alone excludes nobody."""
    order = sorted(items, key=lambda item: (item.severity.rank, item.check, item.unit_id))
    for item in order:
        if item.severity in _ASKED_ABOUT:
            findings.ask(
                f"finding-{item.check}",
                item.title,
                _QUESTIONED.format(title=item.title),
                joined(" ", (_ended(item.compared), item.explanation)),
            )
