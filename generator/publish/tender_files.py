"""The data files of a tender, by path inside the issue: workbook and tables."""

from __future__ import annotations

from collections.abc import Mapping

from generator.publish.tender_tables import tender_tables
from generator.publish.tender_workbook import tender_workbook
from generator.records.assessment import Assessment

__all__ = ["tender_files"]

_FOLDER = "tender"


def tender_files(assessment: Assessment) -> Mapping[str, bytes]:
    """Make the data files of a tender.

    Parameters
    ----------
    assessment
        Assessment of a campaign.

    Returns
    -------
    mapping
        Path inside the issue -> content; empty where the campaign is no tender. The same bytes
        for the same assessment.
    """
    if assessment.tender is None:
        return {}
    settings = assessment.campaign.settings
    tables = tender_tables(assessment.tender, settings.use.currency or "")
    workbook = tender_workbook(assessment.tender, settings, assessment.assessed_on)
    files = {**tables, "workbook.xlsx": workbook}
    return {f"{_FOLDER}/{name}": files[name] for name in sorted(files)}
