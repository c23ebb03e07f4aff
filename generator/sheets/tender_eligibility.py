"""Eligibility of the bids of a lot in words: outcomes, reasons with clauses, questions to send."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence

from generator.language import SEMICOLON, joined, say, say_as
from generator.records.tender import BidResult, Eligibility, LotResult, Outcome
from generator.records.tender_settings import TenderSettings
from generator.sheets.tender_description import (
    Block,
    HeadingBlock,
    ListBlock,
    ParagraphBlock,
    QuestionBlock,
    TableBlock,
)
from generator.sheets.tender_text import NONE, amount, capital, number, worded
from generator.sheets.tender_words import (
    ASKED_REPORTS,
    CHECK_TITLES,
    LOT_OUTCOME,
    OUTCOME_NOTES,
    OUTCOMES,
)

__all__ = ["asked_for", "eligibility_blocks", "outcome_table", "question_blocks", "reason_table"]


def asked_for(settings: TenderSettings, titles: Mapping[str, str]) -> tuple[str, ...]:
    """What a bid must bring, in words; ``titles`` gives the title of a clause by its id."""
    tender = settings.tender
    mandatory = (*tender.mandatory_regimes, *_titled(tender.mandatory_clauses, titles))
    words = [ASKED_REPORTS["report"]]
    if tender.reports_from or tender.reports_to:
        begin = tender.reports_from or say("any day")
        end = tender.reports_to or say("the assessment")
        words.append(ASKED_REPORTS["window"].format(begin=begin, end=end))
    if tender.minimum_sample_units:
        words.append(ASKED_REPORTS["sample"].format(count=tender.minimum_sample_units))
    if tender.laboratory_required:
        words.append(ASKED_REPORTS["laboratory"])
    if tender.accreditation_required:
        words.append(ASKED_REPORTS["accreditation"])
    if mandatory:
        words.append(ASKED_REPORTS["clauses"].format(clauses=joined(SEMICOLON, mandatory)))
    else:
        words.append(ASKED_REPORTS["own"])
    return (*words, ASKED_REPORTS["findings"])


def outcome_table(lot: LotResult, currency: str) -> TableBlock:
    """One row per bid: outcome, rank, points, cost, number of reasons and questions."""
    scores = {item.lamp_id: item for item in lot.award.scores} if lot.award else {}
    rows = []
    for item in lot.bids:
        score = scores.get(item.bid.lamp_id)
        rank = NONE if score is None or score.rank is None else str(score.rank)
        rows.append(
            (
                item.shown_as,
                OUTCOMES[item.eligibility.outcome],
                say("{rank} (provisional)", rank=rank)
                if score and score.rank and score.provisional
                else rank,
                number(score.total if score else None, 2),
                amount(item.price),
                amount(item.cost.total if item.cost else None),
                str(len(item.eligibility.reasons)),
                str(len(item.eligibility.questions)),
            )
        )
    headings = (
        say("Bid"),
        say("Outcome"),
        say("Rank"),
        say_as("award", "Points"),
        say("Price, {currency}", currency=currency),
        say("Life-cycle cost, {currency}", currency=currency),
        say("Reasons"),
        say("Questions"),
    )
    return TableBlock(say("The bids of this lot"), headings, tuple(rows), (0, 1, 2))


def reason_table(bids: Sequence[BidResult], caption: str, *, named: bool = True) -> TableBlock:
    """Why bids are not admissible, one row per reason; with the bid where it is to be named."""
    first = 0 if named else 1
    rows = tuple(
        (item.shown_as, capital(reason.title), capital(reason.text), reason.source, reason.clause)[
            first:
        ]
        for item in bids
        for reason in item.eligibility.reasons
    )
    headings = (
        say("Bid"),
        say("Requirement"),
        say("What was found"),
        say("Where it stands"),
        say("Clause"),
    )[first:]
    return TableBlock(caption, headings, rows, tuple(range(5 - first)), wide=2 - first)


def question_blocks(eligibility: Eligibility, *, particulars: bool) -> Iterator[QuestionBlock]:
    """The questions of a bid, numbered."""
    for place, question in enumerate(eligibility.questions, start=1):
        facts = question.particulars if particulars else ""
        yield QuestionBlock(
            str(place), question.title, question.clause, question.text, worded(facts)
        )


def _titled(checks: Iterable[str], titles: Mapping[str, str]) -> tuple[str, ...]:
    """The titles of some checks; the id where a check has no title."""
    known = {**CHECK_TITLES, **titles}
    return tuple(capital(known[check]) if check in known else check for check in checks)


def eligibility_blocks(
    lot: LotResult, titles: Mapping[str, str], *, under_codes: bool
) -> Iterator[Block]:
    """Reasons, questions and checks of a lot; ``titles`` gives the title of a clause by its id."""
    counts = [item.eligibility.outcome for item in lot.bids]
    yield ParagraphBlock(
        LOT_OUTCOME.format(
            count=len(counts),
            admissible=counts.count(Outcome.ADMISSIBLE),
            clarify=counts.count(Outcome.TO_CLARIFY),
            refused=counts.count(Outcome.NOT_ADMISSIBLE),
        )
    )
    yield from _refused([item for item in lot.bids if item.eligibility.reasons])
    yield from _asked(
        [item for item in lot.bids if item.eligibility.outcome is Outcome.TO_CLARIFY], under_codes
    )
    passed = [item for item in lot.bids if item.eligibility.outcome is Outcome.ADMISSIBLE]
    if passed:
        yield HeadingBlock(say("Bids that may be accepted"), 4)
        yield ListBlock(
            tuple(
                say(
                    "{bid}. Checks passed: {checks}.",
                    bid=item.shown_as,
                    checks=joined(SEMICOLON, _titled(item.eligibility.passed, titles)),
                )
                for item in passed
            )
        )


def _refused(bids: Sequence[BidResult]) -> Iterator[Block]:
    yield HeadingBlock(say("Bids that may not be accepted"), 4)
    if not bids:
        yield ParagraphBlock(OUTCOME_NOTES["no_reasons"])
        return
    yield ParagraphBlock(OUTCOME_NOTES["reasons"], "quiet")
    yield reason_table(bids, say("Reasons"))
    further = tuple(
        OUTCOME_NOTES["further"].format(
            bid=item.shown_as,
            titles=joined(
                SEMICOLON, dict.fromkeys(part.title for part in item.eligibility.questions)
            ),
        )
        for item in bids
        if item.eligibility.questions
    )
    if further:
        yield ListBlock(further)


def _asked(bids: Sequence[BidResult], under_codes: bool) -> Iterator[Block]:
    yield HeadingBlock(say("Questions to bidders"), 4)
    if not bids:
        yield ParagraphBlock(OUTCOME_NOTES["no_questions"])
        return
    yield ParagraphBlock(OUTCOME_NOTES["questions"], "quiet")
    for item in bids:
        yield HeadingBlock(item.shown_as, 5)
        yield from question_blocks(item.eligibility, particulars=not under_codes)
