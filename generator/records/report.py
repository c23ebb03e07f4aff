"""The items of a test report: what stands under each, or that it is missing.

Source: iso_iec_17025, clauses 7.8.2, 7.8.3, 7.8.6 and 7.8.8. Nothing is invented: an item that
nobody stated has no text.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from generator.records.assessment import Assessment
    from generator.records.report_settings import ReportTable
    from generator.records.settings import Laboratory

__all__ = ["ITEMS_ONLY", "ReportItem", "missing_items", "report_items"]

ITEMS_ONLY = "The results relate only to the items tested."
_DECISION = {
    "simple acceptance": (
        "simple acceptance: the value is compared with the limit; a value at the limit may be "
        "wrong either way with a probability of up to 50 %"
    ),
    "guarded acceptance": "guarded acceptance: pass and fail keep a distance of {guard} U",
    "conformance probability": "pass from a probability of conformity of {probability} on",
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
    return ReportItem(key, label, text.strip() or None, clause, needed)


def _identity(
    assessment: Assessment, report: ReportTable, laboratory: Laboratory
) -> Iterator[ReportItem]:
    campaign = assessment.campaign.settings.campaign
    yield _item("title", "Title", report.title or campaign.title, "7.8.2.1 a")
    place = _joined(laboratory.name, laboratory.address) if laboratory.address else ""
    yield _item("laboratory", "Laboratory, name and address", place, "7.8.2.1 b")
    yield _item("place_of_work", "Place of work", report.place_of_work, "7.8.2.1 c")
    yield _item("number", "Number of the report", report.number, "7.8.2.1 d")
    yield _item("pages", "Pages, each as page x of y", "printed on every page", "7.8.2.1 d")
    customer = _joined(report.customer or campaign.client, report.customer_contact)
    yield _item("customer", "Customer and contact", customer, "7.8.2.1 e")
    accreditation = _joined(laboratory.accreditation, report.accreditation_scope)
    yield _item(
        "accreditation",
        "Accreditation and scope",
        accreditation,
        "accreditation body",
        needed=False,
    )
    described = report.item_description or _lamps(assessment)
    yield _item("item", "Items tested", described, "7.8.2.1 g")
    yield _item("condition", "Condition of the items", report.item_condition, "7.8.2.1 g")


def _joined(*parts: str) -> str:
    return ", ".join(part.strip() for part in parts if part.strip())


def _lamps(assessment: Assessment) -> str:
    campaign = assessment.campaign
    described = []
    for lamp in campaign.lamps:
        count = len(campaign.units_of(lamp.lamp_id))
        units = "1 unit" if count == 1 else f"{count} units"
        described.append(f"{_joined(lamp.bidder, lamp.model) or lamp.lamp_id}, {units}")
    return "; ".join(described)


def _day(day: date | None) -> str:
    return day.isoformat() if day else ""


def _dates(report: ReportTable) -> Iterator[ReportItem]:
    yield _item("received_on", "Date of receipt", _day(report.received_on), "7.8.2.1 h")
    days = " to ".join(filter(None, (_day(report.tested_from), _day(report.tested_to))))
    yield _item("tested_on", "Dates of the work", days, "7.8.2.1 i")
    yield _item("issued_on", "Date of issue", _day(report.issued_on), "7.8.2.1 j")
    yield _item("sampling", "Sampling", report.sampling, "7.8.2.1 k")


def _work(
    assessment: Assessment, report: ReportTable, laboratory: Laboratory
) -> Iterator[ReportItem]:
    stated = laboratory.methods
    plain = (stated,) if isinstance(stated, str) else stated
    names = [method.name for method in report.methods] or [name for name in plain if name]
    yield _item("methods", "Methods", "; ".join(names), "7.8.2.1 f")
    deviations = "; ".join(
        f"{method.name}: {method.deviations}" for method in report.methods if method.deviations
    )
    yield _item("deviations", "Deviations from the methods", deviations, "7.8.2.1 n")
    yield _item("conditions", "Conditions of the test", report.conditions, "7.8.3.1 a")
    equipment = "; ".join(item.text for item in report.equipment)
    yield _item("equipment", "Equipment, calibration and traceability", equipment, "6.5, 7.5.1")
    yield _item("results", "Results with units", _results(assessment), "7.8.2.1 m")
    yield _item("uncertainty", "Measurement uncertainty", _uncertainty(assessment), "7.8.3.1 c")
    external = report.external_results
    yield _item("external", "Results from external providers", external, "7.8.2.1 p", needed=False)


def _results(assessment: Assessment) -> str:
    given = sum(item.value is not None for item in assessment.figures)
    return f"{given} figures, each with its unit" if given else ""


def _uncertainty(assessment: Assessment) -> str:
    given = sum(item.expanded_uncertainty is not None for item in assessment.figures)
    return f"expanded uncertainty (k = 2) beside {given} figures" if given else ""


def _statements(assessment: Assessment, report: ReportTable) -> Iterator[ReportItem]:
    judged = bool(assessment.verdicts)
    count = f"{len(assessment.verdicts)} verdicts, each with its clause" if judged else ""
    yield _item("conformity", "Statements of conformity", count, "7.8.6.2", needed=False)
    rule = _rule(assessment) if judged else ""
    yield _item("decision_rule", "Decision rule", rule, "7.8.6.1", needed=judged)
    yield _item("items_only", "Scope of the results", ITEMS_ONLY, "7.8.2.1 l")
    note = report.reproduction_note
    yield _item("reproduction", "Reproduction note", note, "7.8.2.1 note", needed=False)
    signatory = _joined(report.signatory, report.signatory_function)
    yield _item("signatory", "Person who authorises the report", signatory, "7.8.2.1 o")
    yield _item("opinions", "Opinions", report.opinions, "7.8.7", needed=False)
    history = "; ".join(
        f"replaces {item.replaces}{f' of {_day(item.issued_on)}' if item.issued_on else ''}: "
        f"{item.reason}"
        for item in report.amendments
    )
    yield _item("amendments", "Amendments", history, "7.8.8", needed=False)


def _rule(assessment: Assessment) -> str:
    decision = assessment.campaign.settings.decision
    return _DECISION[decision.rule].format(
        guard=decision.guard_band_factor, probability=decision.probability
    )
