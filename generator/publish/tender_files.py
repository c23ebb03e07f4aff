"""The files of a tender, by path inside the issue: report, letters, workbook, tables."""

from __future__ import annotations

import logging
from collections.abc import Mapping

from generator.publish.documents import in_processes, processors
from generator.publish.tender_tables import tender_tables
from generator.publish.tender_workbook import tender_workbook
from generator.records.assessment import Assessment
from generator.sheets import TenderDocument, TenderSheets, render_html, render_pdf

__all__ = ["tender_files"]

_log = logging.getLogger("lampassay")
_FOLDER = "tender"


def tender_files(
    assessment: Assessment, sheets: TenderSheets, *, pdf: bool, jobs: int | None = None
) -> Mapping[str, bytes]:
    """Make every file of a tender.

    Parameters
    ----------
    assessment
        Assessment of a campaign that is a tender.
    sheets
        Its report and letters.
    pdf
        Whether to render documents on paper.
    jobs
        Documents rendered at once; the number of processors by default.

    Returns
    -------
    mapping
        Path inside the issue -> content; empty where the campaign is no tender. The same bytes
        for the same assessment.

    Raises
    ------
    SheetError
        If a document cannot be rendered.
    """
    if assessment.tender is None:
        return {}
    settings = assessment.campaign.settings
    documents = _documents(sheets)
    files = {
        f"{name}.html": render_html(
            document, asset_prefix="../" * name.count("/") + "assets/"
        ).encode()
        for name, document in documents.items()
    }
    tables = tender_tables(assessment.tender, settings.use.currency or "")
    files |= {f"{_FOLDER}/{name}": content for name, content in tables.items()}
    files[f"{_FOLDER}/workbook.xlsx"] = tender_workbook(
        assessment.tender, settings, assessment.assessed_on
    )
    if pdf:
        tasks = [(f"{name}.pdf", document) for name, document in documents.items()]
        files |= dict(in_processes(render_pdf, tasks, jobs or processors()))
    _log.info("  %d files of the tender", len(files))
    return dict(sorted(files.items()))


def _documents(sheets: TenderSheets) -> dict[str, TenderDocument]:
    letters = {f"{_FOLDER}/letters/{name}": letter for name, letter in sheets.letters.items()}
    return {f"{_FOLDER}/report": sheets.report, **letters}
