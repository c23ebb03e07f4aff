"""Debrief letters: one per bidder, with their own data and what is published of the others."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from generator.language import joined, say
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.records.tender import BidResult, BidScore, LotResult, Outcome, Tender
from generator.sheets.shown_names import ShownNames
from generator.sheets.tender_award import function_words, points_table, reason_text
from generator.sheets.tender_description import (
    Block,
    HeadingBlock,
    ListBlock,
    ParagraphBlock,
    TenderDocument,
)
from generator.sheets.tender_eligibility import question_blocks, reason_table
from generator.sheets.tender_report import lot_heading, tender_frame, tender_of
from generator.sheets.tender_text import number
from generator.sheets.tender_trail import bid_trail
from generator.sheets.tender_words import LETTER

__all__ = ["describe_letters"]

_SOURCES = ("eu_2014_24", "ies_tm_21")


def describe_letters(assessment: Assessment, context: SheetContext) -> dict[str, TenderDocument]:
    """Describe the letter to each bidder.

    Parameters
    ----------
    assessment
        Assessment of a campaign that is a tender.
    context
        Sources, and whether documents on paper are issued.

    Returns
    -------
    dict
        Code of the bidder in small letters -> letter, in the order of the codes.

    Raises
    ------
    SheetError
        If the campaign is no tender.
    """
    tender = tender_of(assessment)
    codes = sorted(set(tender.codes.values()), key=lambda code: (len(code), code))
    names = ShownNames(assessment)
    letters = {code: _letter(code, assessment, context) for code in codes}
    return {f"bidder-{code.lower()}": names.masked(letter) for code, letter in letters.items()}


def _letter(code: str, assessment: Assessment, context: SheetContext) -> TenderDocument:
    tender = tender_of(assessment)
    own = {lamp_id for lamp_id, theirs in tender.codes.items() if theirs == code}
    settings = assessment.campaign.settings
    title = LETTER["title"].format(reference=settings.campaign.reference or settings.campaign.title)
    to = LETTER["to"].format(name=_addressee(code, own, assessment))
    frame = tender_frame(assessment, context, title, to, _SOURCES)
    return TenderDocument(
        frame=frame,
        over=joined(". ", (settings.campaign.title, frame.assessed_words)),
        lead=to,
        blocks=tuple(_blocks(own, tender, settings.use.currency or "")),
        pdf_name=f"bidder-{code.lower()}.pdf" if context.with_pdf else "",
    )


def _addressee(code: str, own: set[str], assessment: Assessment) -> str:
    if assessment.shown_bidders:
        return say("Bidder {letter}", letter=code)
    names = {lamp.bidder for lamp in assessment.campaign.lamps if lamp.lamp_id in own}
    return next(iter(sorted(name for name in names if name)), say("Bidder {letter}", letter=code))


def _names(own: set[str], tender: Tender) -> Mapping[str, str]:
    """Own bids by name, all others by the code of their bidder."""
    return {
        lamp_id: tender.shown_as[lamp_id] if lamp_id in own else coded
        for lamp_id, coded in tender.coded_names.items()
    }


def _blocks(own: set[str], tender: Tender, currency: str) -> Iterator[Block]:
    yield ParagraphBlock(LETTER["opening"])
    names = _names(own, tender)
    for lot in tender.lots:
        theirs = [item for item in lot.bids if item.bid.lamp_id in own]
        if not theirs:
            continue
        yield HeadingBlock(lot_heading(lot), 2)
        for item in theirs:
            yield from _bid_blocks(item, lot, currency, tender)
        if lot.award is not None and lot.award.winners:
            yield HeadingBlock(say("The published comparison"), 3)
            yield ListBlock(function_words(lot.award))
            yield points_table(lot.award, names)
            yield ParagraphBlock(LETTER["others"], "quiet")
    yield ParagraphBlock(LETTER["closing"])


def _bid_blocks(item: BidResult, lot: LotResult, currency: str, tender: Tender) -> Iterator[Block]:
    gate = item.eligibility
    yield HeadingBlock(item.shown_as, 3)
    key = {
        Outcome.ADMISSIBLE: "admissible",
        Outcome.NOT_ADMISSIBLE: "not_admissible",
        Outcome.TO_CLARIFY: "to_clarify",
    }[gate.outcome]
    yield ParagraphBlock(LETTER[key])
    if gate.reasons:
        yield reason_table([item], say("Reasons"), named=False)
    if gate.outcome is Outcome.TO_CLARIFY:
        yield from question_blocks(gate, particulars=not tender.under_codes)
    score = _score(item, lot)
    if score is None:
        return
    yield ParagraphBlock(_standing(score, lot), "sum")
    if score.rank is not None:
        yield from bid_trail(item, score, currency, own_alone=True)


def _score(item: BidResult, lot: LotResult) -> BidScore | None:
    scores = lot.award.scores if lot.award is not None else ()
    return next((part for part in scores if part.lamp_id == item.bid.lamp_id), None)


def _standing(score: BidScore, lot: LotResult) -> str:
    ranked = [part for part in lot.award.scores if part.rank is not None] if lot.award else []
    if score.rank is None or score.total is None:
        return LETTER["unranked"].format(reason=reason_text(score))
    best = ranked[0].total or score.total
    if score.rank == 1:
        words = LETTER["first"].format(points=number(score.total, 2))
        if len(ranked) > 1 and ranked[1].total is not None:
            gap = LETTER["lead"].format(points=number(score.total - ranked[1].total, 2))
            return joined(" ", (words, gap))
        return words
    words = LETTER["rank"].format(
        rank=score.rank, ranked=len(ranked), points=number(score.total, 2)
    )
    gap = LETTER["distance"].format(points=number(best - score.total, 2))
    return joined(" ", (words, gap))
