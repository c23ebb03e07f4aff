"""The description of the comparison of all lamps, from an assessment and its matrix."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from generator.errors import SheetError
from generator.language import joined, say, say_as, say_counted
from generator.quantities import quantity
from generator.records.assessment import Assessment
from generator.records.comparison import (
    ComparisonCell,
    ComparisonMatrix,
    ComparisonRow,
    SheetContext,
)
from generator.records.figure import Grade
from generator.records.finding import Severity
from generator.records.lamp import Lamp, Offer
from generator.records.verdict import Verdict, VerdictWord
from generator.sheets.comparison_data import comparison_data
from generator.sheets.comparison_description import (
    ComparisonCellText,
    ComparisonColumn,
    ComparisonRowText,
    ComparisonSheet,
    LampQuestions,
)
from generator.sheets.comparison_pairs import first_pair, scatter_drawing
from generator.sheets.comparison_ruler import draw_cell_ruler
from generator.sheets.comparison_spectra import spectra_drawings
from generator.sheets.comparison_words import (
    CHOSEN_COLUMNS,
    PRICE,
    QUESTIONS,
    SHORT_LABELS,
    control_words,
)
from generator.sheets.drawings.drawing import Palette
from generator.sheets.figure_text import count_texts, distance_of, figure_text, verdict_text
from generator.sheets.lamp_words import SEVERITY_WORDS
from generator.sheets.notes import clean_notes
from generator.sheets.number_format import exact_text
from generator.sheets.risk_text import risk_statement
from generator.sheets.sheet_frame import sheet_frame
from generator.sheets.shown_names import ShownNames
from generator.sheets.themes import palette
from generator.sheets.words import NOT_MEASURED, VERDICT_ROLES

__all__ = ["describe_comparison"]

_MOST_NAMED = 3
_REPORT = "tender/report.html"


def describe_comparison(assessment: Assessment, context: SheetContext) -> ComparisonSheet:
    """Describe the comparison of all lamps.

    Parameters
    ----------
    assessment
        Campaign, figures, verdicts, date.
    context
        Sources, curves, and the comparison matrix.

    Returns
    -------
    ComparisonSheet
        Everything the comparison says, as finished text and drawings.

    Raises
    ------
    SheetError
        If the context holds no matrix, or the theme does not exist.
    """
    matrix = context.matrix
    if matrix is None:
        raise SheetError("the comparison cannot be described without its matrix")
    campaign, names = assessment.campaign, ShownNames(assessment)
    colours = palette(campaign.settings.sheet.theme, context.overrides)
    lamps = {lamp.lamp_id: lamp for lamp in campaign.lamps}
    columns = _columns(matrix, [lamp.offer for lamp in campaign.lamps])
    pair = first_pair(campaign.lamps, matrix)
    sentence = _sentence(matrix.rows, lamps, names)
    keys = [quantity(name).source for name in matrix.quantities]
    frame = sheet_frame(
        assessment,
        context,
        title=campaign.settings.campaign.title,
        summary=sentence,
        gaps=[f"{problem.message} ({problem.place})" for problem in campaign.warnings],
        keys=keys,
        principal=keys,
    )
    sheet = ComparisonSheet(
        frame=frame,
        columns=columns,
        rows=tuple(
            _row(lamps[row.lamp_id], row, matrix.quantities, columns, colours, names)
            for row in matrix.rows
        ),
        sentence=sentence,
        spectra=spectra_drawings(assessment, context, colours, names),
        scatter=scatter_drawing(campaign.lamps, matrix, columns, pair, colours, names),
        bidders=tuple(filter(None, dict.fromkeys(map(names.bidder, campaign.lamps)))),
        words=control_words(),
        data=comparison_data(assessment, context, matrix, columns, pair, names),
        notes=names.notes(clean_notes(campaign.notes.get("campaign", ""))),
        questions=_questions(assessment, names),
        risks=risk_statement(assessment.risks),
        report=_REPORT if assessment.tender else "",
    )
    return names.masked(sheet)


def _questions(assessment: Assessment, names: ShownNames) -> tuple[LampQuestions, ...]:
    """What must be explained, lamp by lamp: every finding but the remarks."""
    asked = (
        LampQuestions(
            lamp.lamp_id,
            names.lamp(lamp),
            tuple(
                say(
                    "{title} ({severity})", title=item.title, severity=SEVERITY_WORDS[item.severity]
                )
                for item in assessment.findings_of(lamp.lamp_id)
                if item.severity is not Severity.REMARK
            ),
        )
        for lamp in assessment.campaign.lamps
    )
    return tuple(item for item in asked if item.findings)


def _sentence(rows: Sequence[ComparisonRow], lamps: Mapping[str, Lamp], names: ShownNames) -> str:
    clean = [row for row in rows if not row.counts.get(VerdictWord.FAIL, 0)]
    failing = len(rows) - len(clean)
    compared = say_counted("{count} lamp compared", "{count} lamps compared", len(rows))
    if not failing:
        return say("{compared}; none fails a clause.", compared=compared)
    stated = say_counted(
        "{compared}; {count} fails at least one clause.",
        "{compared}; {count} fail at least one clause.",
        failing,
        compared=compared,
    )
    if not clean or len(clean) > _MOST_NAMED or len(clean) >= failing:
        return stated
    lamps_named = _listed([names.lamp(lamps[row.lamp_id]) for row in clean])
    return say("{stated} Without a fail: {lamps}.", stated=stated, lamps=lamps_named)


def _listed(called: Sequence[str]) -> str:
    """Names one after another, the last with an ``and`` before it."""
    if len(called) == 1:
        return called[0]
    return say_as("list", "{first} and {last}", first=joined(", ", called[:-1]), last=called[-1])


def _columns(matrix: ComparisonMatrix, offers: Sequence[Offer]) -> tuple[ComparisonColumn, ...]:
    """Columns of the page: price and open questions first, then the quantities."""
    columns = []
    if any(offer.unit_price is not None for offer in offers):
        columns.append(_column(PRICE, SHORT_LABELS[PRICE], "", _one_currency(offers)))
    if any(row.questions for row in matrix.rows):
        columns.append(_column(QUESTIONS, SHORT_LABELS[QUESTIONS], "", ""))
    for name in matrix.quantities:
        entry = quantity(name)
        label = SHORT_LABELS.get(name, entry.label)
        columns.append(_column(name, label, entry.symbol, entry.unit))
    return tuple(columns)


def _column(key: str, label: str, symbol: str, unit: str) -> ComparisonColumn:
    return ComparisonColumn(key, label, symbol, unit, key in CHOSEN_COLUMNS)


def _one_currency(offers: Sequence[Offer]) -> str:
    """The currency where all prices share it, else empty."""
    found = {offer.currency for offer in offers if offer.unit_price is not None}
    return (found.pop() or "") if len(found) == 1 else ""


def _row(
    lamp: Lamp,
    row: ComparisonRow,
    quantities: Sequence[str],
    columns: Sequence[ComparisonColumn],
    colours: Palette,
    names: ShownNames,
) -> ComparisonRowText:
    cells = dict(zip(quantities, row.cells, strict=True))
    written = []
    for column in columns:
        if column.key == PRICE:
            written.append(_price(lamp.offer, column.unit))
        elif column.key == QUESTIONS:
            written.append(ComparisonCellText(str(row.questions)))
        else:
            written.append(_cell(cells[column.key], column.key, colours))
    counts = tuple(item for item in count_texts(dict(row.counts)) if item.count != "0")
    return ComparisonRowText(
        lamp.lamp_id,
        names.lamp(lamp),
        names.bidder(lamp),
        "" if names.hidden(lamp.lamp_id) else lamp.lamp_id,
        tuple(written),
        counts,
    )


def _price(offer: Offer, unit: str) -> ComparisonCellText:
    if offer.unit_price is None:
        return ComparisonCellText(say("not offered"), missing=True)
    currency = "" if unit or not offer.currency else f"\u00a0{offer.currency}"
    return ComparisonCellText(f"{exact_text(offer.unit_price)}{currency}")


def _cell(cell: ComparisonCell, name: str, colours: Palette) -> ComparisonCellText:
    figure, text = cell.figure, figure_text(cell.figure, name)
    if figure is None or figure.value is None:
        told_enough = figure is None or figure.reason == NOT_MEASURED
        reason = "" if told_enough else text.reason
        return ComparisonCellText(NOT_MEASURED, reason=reason, missing=True)
    ruler = _ruler(cell.verdict, colours) if cell.verdict is not None else ""
    return ComparisonCellText(
        text.number,
        text.uncertainty,
        text.grade,
        ruler=ruler,
        computed=figure.grade is Grade.COMPUTED,
        best=cell.best,
    )


def _ruler(verdict: Verdict, colours: Palette) -> str:
    distance = distance_of(verdict)
    if distance is None:
        return ""
    text = verdict_text(verdict, colours)
    limit = f"{text.limit}\u00a0{text.unit}".rstrip("\u00a0")
    title = say(
        "{verdict}: {clause}, {limit}, margin {margin}",
        verdict=text.word,
        clause=text.title,
        limit=limit,
        margin=text.margin,
    )
    return draw_cell_ruler(distance, VERDICT_ROLES[verdict.verdict], title, colours)
