"""The description of one lamp's sheet, from an assessment."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable

from generator.errors import Problem
from generator.language import joined, told
from generator.quantities import GROUPS, QUANTITIES, quantity
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.records.curves import LampCurves
from generator.records.figure import Figure, Grade
from generator.records.harmonic_table import HarmonicTable
from generator.records.lamp import Lamp
from generator.records.verdict import Basis, Verdict, VerdictWord
from generator.sheets.description import Pair
from generator.sheets.drawings.class_arrow import draw_class_arrow
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.silhouette import draw_silhouette, lamp_shape
from generator.sheets.figure_text import (
    count_texts,
    distance_of,
    figure_text,
    severest,
    verdict_text,
)
from generator.sheets.lamp_description import EnergyClass, FigureGroup, Headline, LampSheet
from generator.sheets.lamp_drawings import lamp_drawings
from generator.sheets.lamp_report import product_table, report_text
from generator.sheets.lamp_statements import (
    finding_texts,
    grade_texts,
    method_texts,
    statements_of,
    use_texts,
)
from generator.sheets.lamp_tables import declared_texts, units_table
from generator.sheets.lamp_verdicts import shortfalls, verdict_groups, verdict_notes
from generator.sheets.lamp_words import (
    AGAINST,
    CLASS_ARROW,
    CLASS_MISSING,
    CLASS_WORDS,
    CLOSEST,
    EVIDENCE,
    GAP,
    GRADE_COUNTS,
    IDENTITY_LABELS,
    SHEET_SUMMARY,
    SHEET_TITLE,
    SILHOUETTE,
    VERDICT_SENTENCES,
)
from generator.sheets.notes import clean_notes
from generator.sheets.number_format import date_words, exact_text
from generator.sheets.sheet_frame import sheet_frame
from generator.sheets.shown_names import ShownNames
from generator.sheets.themes import palette
from generator.sheets.words import GROUP_HEADINGS, HEADLINE_LABELS, YES_NO

__all__ = ["describe_lamp"]

_JUDGED = (VerdictWord.PASS, VerdictWord.FAIL, VerdictWord.INCONCLUSIVE)


def describe_lamp(assessment: Assessment, lamp_id: str, context: SheetContext) -> LampSheet:
    """Describe the sheet of one lamp.

    Parameters
    ----------
    assessment
        Campaign, figures, verdicts, date.
    lamp_id
        The lamp.
    context
        Sources and curves.

    Returns
    -------
    LampSheet
        Everything the sheet says, as finished text and drawings.

    Raises
    ------
    KeyError
        If the campaign has no such lamp.
    SheetError
        If the theme of the campaign does not exist.
    """
    lamp = assessment.campaign.lamp(lamp_id)
    colours = palette(assessment.campaign.settings.sheet.theme, context.overrides)
    verdicts = assessment.verdicts_of(lamp_id)
    counts = Counter(item.verdict for item in verdicts)
    figures = tuple(_shown_figures(assessment, lamp_id))
    sentence = _verdict_sentence(counts)
    groups = verdict_groups(verdicts, colours)
    names = ShownNames(assessment)
    model = names.lamp(lamp)
    frame = sheet_frame(
        assessment,
        context,
        title=SHEET_TITLE.format(model=model),
        summary=SHEET_SUMMARY.format(lamp=lamp_id, sentence=sentence),
        gaps=_gaps(assessment, lamp),
        keys=[quantity(item.quantity).source for item in figures],
        principal=[quantity(name).source for name in HEADLINE_LABELS],
    )
    sheet = LampSheet(
        frame=frame,
        lamp_id=lamp_id,
        model=model,
        bidder=names.bidder(lamp),
        tag="" if names.hidden(lamp_id) else lamp_id,
        silhouette=_silhouette(lamp, colours),
        identity=_identity(lamp, names),
        verdict_sentence=sentence,
        closest=_closest(verdicts, colours),
        counts=count_texts(counts),
        headlines=tuple(_headline(assessment, lamp_id, name, colours) for name in HEADLINE_LABELS),
        energy_class=_energy_class(assessment, lamp, colours),
        use=use_texts(assessment, lamp_id),
        verdicts=groups,
        shortfalls=shortfalls(groups),
        verdict_notes=verdict_notes(groups),
        drawings=lamp_drawings(
            assessment,
            lamp_id,
            context.curves.get(lamp_id, LampCurves()),
            context.harmonic_tables.get(lamp_id, HarmonicTable()),
            colours,
        ),
        declared=declared_texts(assessment, lamp, colours),
        product=product_table(context.products.get(lamp_id, ()), lamp, names),
        report=report_text(assessment, lamp, names),
        units=units_table(assessment, lamp),
        findings=finding_texts(assessment.findings_of(lamp_id), context),
        figures=_figure_groups(figures),
        grades=grade_texts(figures),
        methods=method_texts(figures, context),
        statements=statements_of(assessment, lamp_id),
        notes=names.notes(clean_notes(assessment.campaign.notes.get(lamp_id, ""))),
        evidence=_evidence(assessment, lamp_id),
    )
    return names.masked(sheet)


def _silhouette(lamp: Lamp, colours: Palette) -> str:
    shape = lamp_shape(lamp.cap, directional=lamp.directional)
    title = told(SILHOUETTE[shape].format(cap=lamp.cap))
    return draw_silhouette(lamp.cap, directional=lamp.directional, title=title, palette=colours)


def _identity(lamp: Lamp, names: ShownNames) -> tuple[Pair, ...]:
    """What the lamp is; nothing that tells the bidder where names are not shown."""
    named = not names.hidden(lamp.lamp_id)
    placed = lamp.placed_on_market
    offer = lamp.offer
    day = date_words(offer.report_date) if offer.report_date else ""
    price = ""
    if offer.unit_price is not None:
        price = f"{exact_text(offer.unit_price)}\u00a0{offer.currency or ''}".strip()
    texts = {
        "lamp": lamp.lamp_id if named else "",
        "bidder": names.bidder(lamp),
        "cap": lamp.cap,
        "technology": lamp.technology,
        "directional": YES_NO[lamp.directional],
        "mains": YES_NO[lamp.mains],
        "connected": YES_NO[lamp.connected],
        "placed": date_words(placed) if placed else YES_NO[None],
        "price": price,
        "report": ", ".join(part for part in (offer.report_no or "", day) if part) if named else "",
    }
    return tuple(Pair(IDENTITY_LABELS[key], text) for key, text in texts.items() if text)


def _verdict_sentence(counts: Counter[VerdictWord]) -> str:
    numbers = {
        "count": sum(counts[word] for word in _JUDGED),
        "failed": counts[VerdictWord.FAIL],
        "passed": counts[VerdictWord.PASS],
        "open": counts[VerdictWord.INCONCLUSIVE],
        "unmeasured": counts[VerdictWord.NOT_MEASURED],
    }
    if not numbers["count"]:
        return VERDICT_SENTENCES["none"]
    first = "fails" if numbers["failed"] else "passes some"
    if numbers["passed"] == numbers["count"]:
        first = "passes all"
    keys = [first]
    keys += ["open"] if numbers["open"] else []
    keys += ["not measured"] if numbers["unmeasured"] else []
    return joined(" ", (VERDICT_SENTENCES[key].format(**numbers) for key in keys))


def _closest(verdicts: Iterable[Verdict], colours: Palette) -> str:
    """Say where a measured pass stands closest to its limit."""
    passed = [
        (distance.margin, item)
        for item in verdicts
        if item.verdict is VerdictWord.PASS
        and item.basis is Basis.DETERMINED
        and (distance := distance_of(item)) is not None
    ]
    if not passed:
        return ""
    item = min(passed, key=lambda pair: pair[0])[1]
    text = verdict_text(item, colours)
    unit = f"\u00a0{text.unit}" if text.unit else ""
    return CLOSEST.format(
        title=text.title, value=f"{text.value}{unit}", limit=f"{text.limit}{unit}"
    )


def _headline(assessment: Assessment, lamp_id: str, name: str, colours: Palette) -> Headline:
    text = figure_text(assessment.figures.best(lamp_id, name), name)
    limiting = severest(
        item
        for item in assessment.verdicts_of(lamp_id)
        if item.quantity == name and item.basis is Basis.DETERMINED and distance_of(item)
    )
    if limiting is None:
        return Headline(HEADLINE_LABELS[name], text)
    judged = verdict_text(limiting, colours)
    against = AGAINST.format(limit=judged.limit, regime=limiting.regime)
    return Headline(HEADLINE_LABELS[name], text, judged.ruler, against)


def _energy_class(assessment: Assessment, lamp: Lamp, colours: Palette) -> EnergyClass:
    name = "energy_efficiency_class"
    found = {
        grade: str(figure.value)
        for grade in (Grade.DECLARED, Grade.COMPUTED, Grade.REPORTED)
        if (figure := assessment.figures.graded(lamp.lamp_id, name, grade)) and figure.value
    }
    if lamp.declared_energy_class:
        found = {Grade.DECLARED: lamp.declared_energy_class} | found
    if not found:
        return EnergyClass(CLASS_MISSING)
    words = joined(", ", (CLASS_WORDS[grade].format(letter=found[grade]) for grade in found))
    declared = found.get(Grade.DECLARED, "")
    title = told(CLASS_ARROW.format(letter=declared))
    return EnergyClass(words, draw_class_arrow(declared, title, colours))


def _shown_figures(assessment: Assessment, lamp_id: str) -> Iterable[Figure]:
    """The figures to show, one per quantity, in the order of the catalogue."""
    for name in QUANTITIES:
        figure = assessment.figures.best(lamp_id, name)
        if figure is not None:
            yield figure


def _figure_groups(figures: tuple[Figure, ...]) -> tuple[FigureGroup, ...]:
    groups = []
    for group in GROUPS:
        texts = tuple(
            figure_text(item, item.quantity)
            for item in figures
            if quantity(item.quantity).group == group
        )
        if texts:
            groups.append(FigureGroup(GROUP_HEADINGS[group], texts))
    return tuple(groups)


def _evidence(assessment: Assessment, lamp_id: str) -> str:
    grades = Counter(
        figure.grade for figure in _shown_figures(assessment, lamp_id) if figure.value is not None
    )
    units = len(assessment.campaign.units_of(lamp_id))
    counted = joined(
        ", ", (GRADE_COUNTS[grade].format(count=grades[grade]) for grade in Grade if grades[grade])
    )
    measured = EVIDENCE["units"].format(count=units) if units else EVIDENCE["no unit"]
    rests = EVIDENCE["figures"].format(counted=counted) if counted else EVIDENCE["no figures"]
    return joined(" ", (measured, rests))


def _gaps(assessment: Assessment, lamp: Lamp) -> list[str]:
    """The warnings of the campaign that concern this lamp."""
    units = assessment.campaign.units_of(lamp.lamp_id)
    names = {lamp.lamp_id, *(unit.unit_id for unit in units)}
    rows = {"lamps.csv": {lamp.row}, "units.csv": {unit.row for unit in units if unit.row}}
    return [
        GAP.format(message=problem.message, place=problem.place)
        for problem in assessment.campaign.warnings
        if _concerns(problem, names, rows)
    ]


def _concerns(problem: Problem, names: set[str], rows: dict[str, set[int]]) -> bool:
    if problem.file in rows:
        return problem.row in rows[problem.file]
    stem = problem.file.rsplit("/", 1)[-1].split(".", 1)[0]
    return stem in names
