"""The items of a test report: what stands under each, or that it is missing.

Source: iso_iec_17025, clauses 7.8.2, 7.8.3, 7.8.6 and 7.8.8. Nothing is invented: an item that
nobody stated has no text.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from typing import TYPE_CHECKING

from generator.language import SEMICOLON, joined, say, say_counted
from generator.language.messages import Worded

if TYPE_CHECKING:
    from generator.records.assessment import Assessment
    from generator.records.report_settings import Amendment, ReportTable
    from generator.records.settings import Laboratory

__all__ = ["ITEMS_ONLY", "ReportItem", "missing_items", "report_items"]

ITEMS_ONLY = say("The results relate only to the items tested.")
_DECISION = {
    "simple acceptance": say(
        "simple acceptance: the value is compared with the limit; a value at the limit may be "
        "wrong either way with a probability of up to 50 %"
    ),
    "guarded acceptance": say("guarded acceptance: pass and fail keep a distance of {guard:f} U"),
    "conformance probability": say("pass from a probability of conformity of {probability:f} on"),
}


@dataclass(frozen=True, slots=True)
class ReportItem:
    """One item of a test report.

    Parameters
    ----------
    key
        Short name, for programs.
    label
        Name for people.
    text
        What stands there; ``None`` where it is missing.
    clause
        Clause of ISO/IEC 17025 that asks for it.
    needed
        Whether its absence is a gap; ``False`` for items that are asked for only where they
        apply.
    """

    key: str
    label: str
    text: str | None
    clause: str
    needed: bool = True


def report_items(assessment: Assessment, report: ReportTable) -> tuple[ReportItem, ...]:
    """List the items of the test report in the order of the standard.

    Parameters
    ----------
    assessment
        Figures and verdicts, and the campaign they come from.
    report
        ``[report]`` of ``campaign.toml``.

    Returns
    -------
    tuple of ReportItem
        Every item, with its text or ``None``.
    """
    laboratory = assessment.campaign.settings.laboratory
    return (
        *_identity(assessment, report, laboratory),
        *_dates(report),
        *_work(assessment, report, laboratory),
        *_statements(assessment, report),
    )


def missing_items(items: tuple[ReportItem, ...]) -> tuple[ReportItem, ...]:
    """The items that are needed and have no text."""
    return tuple(item for item in items if item.needed and item.text is None)


def _item(key: str, label: str, text: str, clause: str, *, needed: bool = True) -> ReportItem:
    stated = text if isinstance(text, Worded) else text.strip()
    return ReportItem(key, label, stated or None, clause, needed)


def _identity(
    assessment: Assessment, report: ReportTable, laboratory: Laboratory
) -> Iterator[ReportItem]:
    campaign = assessment.campaign.settings.campaign
    yield _item("title", say("Title"), report.title or campaign.title, "7.8.2.1 a")
    place = _joined(laboratory.name, laboratory.address) if laboratory.address else ""
    yield _item("laboratory", say("Laboratory, name and address"), place, "7.8.2.1 b")
    yield _item("place_of_work", say("Place of work"), report.place_of_work, "7.8.2.1 c")
    yield _item("number", say("Number of the report"), report.number, "7.8.2.1 d")
    yield _item(
        "pages", say("Pages, each as page x of y"), say("printed on every page"), "7.8.2.1 d"
    )
    customer = _joined(report.customer or campaign.client, report.customer_contact)
    yield _item("customer", say("Customer and contact"), customer, "7.8.2.1 e")
    accreditation = _joined(laboratory.accreditation, report.accreditation_scope)
    yield _item(
        "accreditation",
        say("Accreditation and scope"),
        accreditation,
        say("accreditation body"),
        needed=False,
    )
    described = report.item_description or _lamps(assessment)
    yield _item("item", say("Items tested"), described, "7.8.2.1 g")
    yield _item("condition", say("Condition of the items"), report.item_condition, "7.8.2.1 g")


def _joined(*parts: str) -> str:
    return joined(", ", (part.strip() for part in parts if part.strip()))


def _lamps(assessment: Assessment) -> str:
    campaign = assessment.campaign
    described = []
    for lamp in campaign.lamps:
        count = len(campaign.units_of(lamp.lamp_id))
        units = say_counted("{count} unit", "{count} units", count)
        described.append(joined(", ", (_joined(lamp.bidder, lamp.model) or lamp.lamp_id, units)))
    return joined(SEMICOLON, described)


def _day(day: date | None) -> str:
    return day.isoformat() if day else ""


def _dates(report: ReportTable) -> Iterator[ReportItem]:
    yield _item("received_on", say("Date of receipt"), _day(report.received_on), "7.8.2.1 h")
    begin, end = _day(report.tested_from), _day(report.tested_to)
    days = say("{begin} to {end}", begin=begin, end=end) if begin and end else begin or end
    yield _item("tested_on", say("Dates of the work"), days, "7.8.2.1 i")
    yield _item("issued_on", say("Date of issue"), _day(report.issued_on), "7.8.2.1 j")
    yield _item("sampling", say("Sampling"), report.sampling, "7.8.2.1 k")


def _work(
    assessment: Assessment, report: ReportTable, laboratory: Laboratory
) -> Iterator[ReportItem]:
    stated = laboratory.methods
    plain = (stated,) if isinstance(stated, str) else stated
    names = [method.name for method in report.methods] or [name for name in plain if name]
    yield _item("methods", say("Methods"), joined(SEMICOLON, names), "7.8.2.1 f")
    deviations = joined(
        SEMICOLON,
        (
            joined(": ", (method.name, method.deviations))
            for method in report.methods
            if method.deviations
        ),
    )
    yield _item("deviations", say("Deviations from the methods"), deviations, "7.8.2.1 n")
    yield _item("conditions", say("Conditions of the test"), report.conditions, "7.8.3.1 a")
    equipment = joined(SEMICOLON, (item.text for item in report.equipment))
    yield _item(
        "equipment", say("Equipment, calibration and traceability"), equipment, "6.5, 7.5.1"
    )
    yield _item("results", say("Results with units"), _results(assessment), "7.8.2.1 m")
    yield _item(
        "uncertainty", say("Measurement uncertainty"), _uncertainty(assessment), "7.8.3.1 c"
    )
    external = report.external_results
    yield _item(
        "external", say("Results from external providers"), external, "7.8.2.1 p", needed=False
    )


def _results(assessment: Assessment) -> str:
    given = sum(item.value is not None for item in assessment.figures)
    if not given:
        return ""
    return say_counted(
        "{count} figures, each with its unit", "{count} figures, each with its unit", given
    )


def _uncertainty(assessment: Assessment) -> str:
    given = sum(item.expanded_uncertainty is not None for item in assessment.figures)
    if not given:
        return ""
    return say_counted(
        "expanded uncertainty (k = 2) beside {count} figures",
        "expanded uncertainty (k = 2) beside {count} figures",
        given,
    )


def _statements(assessment: Assessment, report: ReportTable) -> Iterator[ReportItem]:
    judged = bool(assessment.verdicts)
    yield _item(
        "conformity",
        say("Statements of conformity"),
        _conformity(assessment),
        "7.8.6.2",
        needed=False,
    )
    rule = _rule(assessment) if judged else ""
    yield _item("decision_rule", say("Decision rule"), rule, "7.8.6.1", needed=judged)
    yield _item("items_only", say("Scope of the results"), ITEMS_ONLY, "7.8.2.1 l")
    note = report.reproduction_note
    yield _item(
        "reproduction",
        say("Reproduction note"),
        note,
        say("{clause} note", clause="7.8.2.1"),
        needed=False,
    )
    signatory = _joined(report.signatory, report.signatory_function)
    yield _item("signatory", say("Person who authorises the report"), signatory, "7.8.2.1 o")
    yield _item("opinions", say("Opinions"), report.opinions, "7.8.7", needed=False)
    history = joined(SEMICOLON, map(_replaced, report.amendments))
    yield _item("amendments", say("Amendments"), history, "7.8.8", needed=False)


def _conformity(assessment: Assessment) -> str:
    if not assessment.verdicts:
        return ""
    return say_counted(
        "{count} verdicts, each with its clause",
        "{count} verdicts, each with its clause",
        len(assessment.verdicts),
    )


def _replaced(item: Amendment) -> str:
    if item.issued_on is None:
        return say("replaces {number}: {reason}", number=item.replaces, reason=item.reason)
    return say(
        "replaces {number} of {day}: {reason}",
        number=item.replaces,
        day=_day(item.issued_on),
        reason=item.reason,
    )


def _rule(assessment: Assessment) -> str:
    decision = assessment.campaign.settings.decision
    return _DECISION[decision.rule].format(
        guard=decision.guard_band_factor, probability=decision.probability
    )
