"""What every sheet carries: title, date, version, cautions, sources, gaps."""

from __future__ import annotations

from collections.abc import Iterable
from typing import TYPE_CHECKING

from generator.language import joined
from generator.language.speaking import in_language, spoken_language
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext, SourceLike
from generator.sheets.description import SheetFrame, SourceText
from generator.sheets.drawings.margin_ruler import draw_ruler_scale
from generator.sheets.number_format import date_words
from generator.sheets.themes import palette
from generator.sheets.words import CAUTIONS, RULER_SCALE_TITLE, RULER_SIDES

if TYPE_CHECKING:
    from generator.records.settings import SheetTable

__all__ = ["sheet_frame", "source_text"]


def sheet_frame(
    assessment: Assessment,
    context: SheetContext,
    *,
    title: str,
    summary: str,
    gaps: Iterable[str],
    keys: Iterable[str],
    principal: Iterable[str],
) -> SheetFrame:
    """Make the frame of a sheet.

    Parameters
    ----------
    assessment, context
        What the sheet is made of.
    title, summary
        Title of the document, and one sentence on it.
    gaps
        What is missing or was warned of.
    keys, principal
        Keys of the sources used, and of those behind page one.
    """
    settings = assessment.campaign.settings
    laboratory = settings.laboratory
    first = set(principal)
    return SheetFrame(
        title=title,
        summary=summary,
        language=spoken_language(),
        theme=settings.sheet.theme,
        campaign=settings.campaign.title,
        reference=settings.campaign.reference,
        client=settings.campaign.client,
        laboratory=joined(
            ", ", (part for part in (laboratory.name, laboratory.accreditation) if part)
        ),
        assessed_on=assessment.assessed_on.isoformat(),
        assessed_words=date_words(assessment.assessed_on),
        version=f"lampassay {assessment.version}",
        ruler_scale=draw_ruler_scale(
            RULER_SIDES, RULER_SCALE_TITLE, palette(settings.sheet.theme, context.overrides)
        ),
        cautions=CAUTIONS,
        sources=tuple(
            SourceText(key, source_text(context.sources.get(key), key), key in first)
            for key in dict.fromkeys(keys)
        ),
        gaps=tuple(gaps),
        with_pdf=context.with_pdf,
        overrides=context.overrides,
        short=_short(settings.sheet),
    )


def _short(table: SheetTable) -> bool:
    """Whether a lamp has two pages on paper: where it is asked for, else in the tender theme."""
    return (table.lamp_pages or (2 if table.theme == "tender" else 4)) == 2


def source_text(source: SourceLike | None, key: str) -> str:
    """Write a source: title, edition, publisher, date; its key where it is not known.

    Sources are written in English whatever is being spoken.
    """
    if source is None:
        return key
    parts = (source.title, source.edition, source.publisher, source.date)
    return in_language(", ".join(part for part in parts if part), "en")
