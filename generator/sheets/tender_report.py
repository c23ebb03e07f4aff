"""The tender report: what is asked, each lot from gate to certainty, plan, formulas."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import replace
from functools import reduce

from generator.errors import SheetError
from generator.language import joined, say, say_as, say_counted
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.records.tender import LotResult, Tender
from generator.records.tender_settings import TenderSettings
from generator.sheets.description import Pair, SheetFrame
from generator.sheets.drawings.drawing import Palette
from generator.sheets.number_format import date_words
from generator.sheets.sheet_frame import sheet_frame
from generator.sheets.shown_names import ShownNames
from generator.sheets.tender_award import award_blocks, certainty_blocks
from generator.sheets.tender_costs import cost_blocks, energy_blocks, tornado_blocks
from generator.sheets.tender_description import (
    Block,
    HeadingBlock,
    ListBlock,
    PairsBlock,
    ParagraphBlock,
    TenderDocument,
)
from generator.sheets.tender_eligibility import asked_for, eligibility_blocks, outcome_table
from generator.sheets.tender_plan import plan_blocks
from generator.sheets.tender_text import number
from generator.sheets.tender_trail import trail_blocks
from generator.sheets.tender_words import (
    FORMULAS,
    NAMES_CAUTION,
    PRICES,
    RATES,
    REPORT_LEAD,
    TENDER_CAUTIONS,
)
from generator.sheets.themes import palette

__all__ = ["describe_tender_report", "lot_heading", "lot_name", "tender_frame", "tender_of"]

_SOURCES = ("eu_2014_24", "ghg_scope_2", "ies_tm_21", "iec_62717", "jcgm_101", "jcgm_106")
_FILES = (
    (say("Workbook with live formulas"), "tender/workbook.xlsx"),
    (say("Bids as CSV"), "tender/bids.csv"),
    (say("Cash flows as CSV"), "tender/cash_flows.csv"),
    (say("Scores as CSV"), "tender/scores.csv"),
    (say("Ranks as CSV"), "tender/ranks.csv"),
    (say("Plan as CSV"), "tender/plan.csv"),
    (say("Eligibility as CSV"), "tender/gate.csv"),
    (say("Assumptions as CSV"), "tender/assumptions.csv"),
    (say("Emissions as CSV"), "tender/emissions.csv"),
    (say("Sensitivity as CSV"), "tender/sensitivity.csv"),
    (say_as("award", "Lead as CSV"), "tender/lead.csv"),
)


def tender_of(assessment: Assessment) -> Tender:
    """The tender of an assessment.

    Raises
    ------
    SheetError
        If the campaign is no tender.
    """
    if assessment.tender is None:
        raise SheetError("the campaign is no tender")
    return assessment.tender


def tender_frame(
    assessment: Assessment,
    context: SheetContext,
    title: str,
    summary: str,
    keys: tuple[str, ...] = _SOURCES,
) -> SheetFrame:
    """Frame of a tender document, with the cautions of a tender."""
    frame = sheet_frame(
        assessment,
        context,
        title=title,
        summary=summary,
        gaps=(),
        keys=keys,
        principal=keys,
    )
    names = (NAMES_CAUTION,) if tender_of(assessment).under_codes else ()
    return replace(frame, cautions=(*names, *TENDER_CAUTIONS))


def describe_tender_report(assessment: Assessment, context: SheetContext) -> TenderDocument:
    """Describe the tender report.

    Parameters
    ----------
    assessment
        Assessment of a campaign that is a tender.
    context
        Sources, and whether documents on paper are issued.

    Returns
    -------
    TenderDocument
        The report, fit for the file.

    Raises
    ------
    SheetError
        If the campaign is no tender, or the theme does not exist.
    """
    tender = tender_of(assessment)
    settings = assessment.campaign.settings
    title = say("Tender report: {campaign}", campaign=settings.campaign.title)
    lead = joined(" ", (_lead(lot, tender.shown_as) for lot in tender.lots))
    colours = palette(settings.sheet.theme, context.overrides)
    reference = f"{settings.campaign.reference}. " if settings.campaign.reference else ""
    frame = tender_frame(assessment, context, title, lead)
    plan = [Pair(say("Relamping plan"), "#plan")] if tender.plan is not None else []
    lots = [Pair(lot_name(lot), f"#{_anchor(lot)}") for lot in tender.lots]
    report = TenderDocument(
        frame=frame,
        over=reference + say("Assessed on {date}", date=frame.assessed_words),
        lead=lead,
        blocks=tuple(_blocks(assessment, tender, colours)),
        pdf_name="report.pdf" if context.with_pdf else "",
        links=(*lots, *plan),
        files=tuple(Pair(*file) for file in _FILES),
    )
    return ShownNames(assessment).masked(report)


def lot_name(lot: LotResult) -> str:
    """Lot in a few words."""
    return say("Lot {lot}", lot=lot.lot) if lot.lot else say("The lot")


def lot_heading(lot: LotResult) -> str:
    """Lot in a few words, with its title where it has one."""
    if not lot.title:
        return lot_name(lot)
    return say("{lot}: {title}", lot=lot_name(lot), title=lot.title)


def _anchor(lot: LotResult) -> str:
    return f"lot-{lot.lot or 'only'}"


def _and(first: str, last: str) -> str:
    return say_as("list", "{first} and {last}", first=first, last=last)


def _lead(lot: LotResult, names: Mapping[str, str]) -> str:
    if lot.award is None:
        return REPORT_LEAD["unranked"].format(lot=lot_name(lot))
    winners = lot.award.winners
    if not winners:
        return REPORT_LEAD["none"].format(lot=lot_name(lot))
    if len(winners) > 1:
        bids = reduce(_and, (names[lamp_id] for lamp_id in winners))
        return REPORT_LEAD["shared"].format(lot=lot_name(lot), bids=bids)
    best = lot.award.scores[0]
    key = "provisional" if best.provisional else "first"
    return REPORT_LEAD[key].format(
        lot=lot_name(lot), bid=names[winners[0]], points=number(best.total, 2)
    )


def _blocks(assessment: Assessment, tender: Tender, colours: Palette) -> Iterator[Block]:
    settings = assessment.campaign.settings
    currency = settings.use.currency or ""
    titles = {item.clause: item.title for item in assessment.verdicts}
    yield PairsBlock(tuple(_facts(assessment)))
    yield HeadingBlock(say("What a bid must bring"), 2, "asked")
    yield ListBlock(asked_for(settings, titles))
    for lot in tender.lots:
        yield from _lot_blocks(lot, tender, settings, colours, titles)
    if tender.plan is not None:
        yield from plan_blocks(tender.plan, tender.shown_as, tender.existing_titles, currency)
    yield HeadingBlock(say("Formulas and notes"), 2, "formulas")
    yield ListBlock((*FORMULAS, *tender.notes))


def _facts(assessment: Assessment) -> Iterator[Pair]:
    settings = assessment.campaign.settings
    use, tender = settings.use, settings.tender
    yield Pair(say("Client"), settings.campaign.client or say("not stated"))
    yield Pair(say("Law as it stood on"), date_words(assessment.assessed_on))
    if use.years is not None:
        study = say_counted(
            "{count} year, {prices}",
            "{count} years, {prices}",
            use.years,
            prices=PRICES[use.prices],
        )
        yield Pair(say("Study"), study)
    if use.discount_rate_percent is not None:
        yield Pair(
            say("Discount rate"),
            say("{rate} % a year, {kind}", rate=use.discount_rate_percent, kind=RATES[use.prices]),
        )
    if use.hours_per_year is not None:
        yield Pair(say("Hours in use"), say("{hours} h a year", hours=use.hours_per_year))
    if use.tariff_per_kwh is not None:
        price = say(
            "{price} {currency}/kWh, rising {rise} % a year",
            price=use.tariff_per_kwh,
            currency=use.currency,
            rise=use.price_rise_percent or 0,
        )
        yield Pair(say("Energy"), price)
    names = say("Code names") if assessment.shown_bidders else say("Names of bidders and models")
    yield Pair(say("Bids are shown by"), names)
    drawn = say("seed {seed}, {trials} trials", seed=str(tender.seed), trials=tender.trials)
    yield Pair(say("Random numbers"), drawn)


def _lot_blocks(
    lot: LotResult,
    tender: Tender,
    settings: TenderSettings,
    colours: Palette,
    titles: Mapping[str, str],
) -> Iterator[Block]:
    currency = settings.use.currency or ""
    yield HeadingBlock(lot_heading(lot), 2, _anchor(lot))
    yield ParagraphBlock(say_counted("{count} light point.", "{count} light points.", lot.quantity))
    if not lot.bids:
        yield ParagraphBlock(say("No lamp is offered for this lot."))
        return
    yield outcome_table(lot, currency)
    yield HeadingBlock(say("Eligibility"), 3)
    yield from eligibility_blocks(lot, titles, under_codes=tender.under_codes)
    yield from award_blocks(lot, tender.shown_as, currency)
    yield from certainty_blocks(lot, tender.shown_as, currency, colours)
    yield from cost_blocks(lot, tender.existing_titles, currency)
    yield from tornado_blocks(lot, settings.use.sensitivity, currency, colours)
    yield from energy_blocks(lot, tender.existing_titles)
    yield from trail_blocks(lot, currency)
