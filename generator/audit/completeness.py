"""Completeness: which items of a test report stand in the issue, and which are missing."""

from __future__ import annotations

from generator.audit.report import AuditFinding
from generator.records.assessment import Assessment
from generator.records.report import missing_items, report_items

__all__ = ["completeness"]


def completeness(assessment: Assessment) -> tuple[AuditFinding, ...]:
    """List the items of a test report that are missing.

    A gap is a note: a comparison of bids may be complete without being a test report.

    Parameters
    ----------
    assessment
        The assessment.

    Returns
    -------
    tuple of AuditFinding
        One note per missing item, with the clause that asks for it.

    Notes
    -----
    Source: iso_iec_17025, clause 7.8.
    """
    report = assessment.campaign.settings.report
    missing = missing_items(report_items(assessment, report))
    return tuple(
        AuditFinding("completeness", "note", item.label, f"missing (ISO/IEC 17025, {item.clause})")
        for item in missing
    )
