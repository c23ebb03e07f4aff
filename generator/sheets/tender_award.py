"""The award of a lot in words: every sub-score with its arithmetic, ties, low offers, certainty."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from decimal import Decimal

from generator.language import Message, say, say_as, told
from generator.records.tender import AwardResult, BidScore, Certainty, LotResult, Outcome
from generator.sheets.drawings.drawing import DataTable, Drawing, Palette
from generator.sheets.drawings.rank_chances import RankChances, draw_rank_chances
from generator.sheets.number_format import shown_margin
from generator.sheets.tender_description import (
    Block,
    DrawingBlock,
    HeadingBlock,
    ListBlock,
    ParagraphBlock,
    QuestionBlock,
    TableBlock,
)
from generator.sheets.tender_text import (
    NONE,
    amount,
    chance,
    criterion_label,
    criterion_value,
    in_words,
    input_value,
    number,
    percent,
    worded,
)
from generator.sheets.tender_words import OUTCOMES, TIE_RULES

__all__ = ["award_blocks", "certainty_blocks", "function_words", "points_table", "reason_text"]

_LOW = say(
    "{bid}: a price of {price} {currency} is {below} % below the mean of the other offers that "
    "may be ranked, {mean} {currency}. It stays in the ranking; an explanation must be asked for."
)
_TIES = say("Tie rule: {rule}. Bids still equal after it share the rank.")
_OF_BID = say("{bid}: {text}.")
_ALL_BIDS = say("all bids")
_SURE = say(
    "{bid} comes first in {share} of {trials} trials in which measured figures, life and the "
    "price of energy vary by their uncertainty (seed {seed})."
)


def points_table(award: AwardResult, names: Mapping[str, str]) -> TableBlock:
    """Rank, points per criterion and total of every ranked bid; what is published."""
    ranked = [item for item in award.scores if item.rank is not None]
    criteria = [part.criterion for part in award.scores[0].sub_scores] if award.scores else []
    rows = tuple(
        (
            str(item.rank),
            names[item.lamp_id],
            *(number(part.points, 2) for part in item.sub_scores),
            number(item.total, 2),
        )
        for item in ranked
    )
    labels = (criterion_label(name) for name in criteria)
    headings = (say("Rank"), say("Bid"), *labels, say("Total"))
    return TableBlock(say("Points of each criterion, and their total"), headings, rows, (1,))


def function_words(award: AwardResult) -> tuple[str, ...]:
    """The published scoring functions, criteria by their names in words."""
    parts = award.scores[0].sub_scores if award.scores else ()
    return tuple(
        worded(_named(text, part.criterion))
        for text, part in zip(award.functions, parts, strict=True)
    )


def _named(text: str, criterion: str) -> str:
    """A scoring function, with its criterion in words."""
    if isinstance(text, Message):
        return text.format(criterion=criterion_label(criterion))
    return text


def award_blocks(lot: LotResult, names: Mapping[str, str], currency: str) -> Iterator[Block]:
    """Scores, arithmetic, ties and low offers of a lot."""
    award = lot.award
    if award is None or not award.scores:
        return
    yield HeadingBlock(say("Award"), 3)
    yield ListBlock(function_words(award))
    yield ParagraphBlock(_TIES.format(rule=TIE_RULES[award.tie_rule]), "quiet")
    ranked = [item for item in award.scores if item.rank is not None]
    if ranked:
        yield points_table(award, names)
        yield _arithmetic_table(award, names)
    ties = tuple(
        _OF_BID.format(bid=names[item.lamp_id], text=item.tie_note)
        for item in ranked
        if item.tie_note
    )
    others = tuple(
        _OF_BID.format(bid=names[item.lamp_id], text=reason_text(item))
        for item in award.scores
        if item.reason
    )
    if ties:
        yield ParagraphBlock(say("Ties"))
        yield ListBlock(ties)
    if others:
        yield ParagraphBlock(say("Bids without a rank"))
        yield ListBlock(others)
    for place, offer in enumerate(award.low_offers, start=1):
        yield ParagraphBlock(
            _LOW.format(
                bid=names[offer.lamp_id],
                price=amount(offer.price),
                currency=currency,
                below=number(offer.percent_below, 1),
                mean=amount(offer.mean_of_others),
            )
        )
        question = offer.question
        yield QuestionBlock(str(place), question.title, question.clause, question.text)


def reason_text(score: BidScore) -> str:
    """Why a bid has no rank."""
    return worded(OUTCOMES.get(score.reason, score.reason))


def _arithmetic_table(award: AwardResult, names: Mapping[str, str]) -> TableBlock:
    rows = tuple(
        (
            names[item.lamp_id],
            criterion_label(part.criterion),
            criterion_value(part.criterion, part.value, part.unit),
            number(part.score, 2),
            worded(part.arithmetic),
        )
        for item in award.scores
        if item.rank is not None
        for part in item.sub_scores
    )
    headings = (
        say("Bid"),
        say("Criterion"),
        say("Value"),
        say_as("award", "Score"),
        say("Arithmetic"),
    )
    caption = say("How each score and its points come about")
    return TableBlock(caption, headings, rows, (0, 1, 4), wide=4)


def certainty_blocks(
    lot: LotResult, names: Mapping[str, str], currency: str, colours: Palette
) -> Iterator[Block]:
    """How sure the ranking of a lot is."""
    sure = lot.certainty
    if sure is None:
        return
    yield HeadingBlock(say("How sure the ranking is"), 3)
    first = sure.bids[0]
    says = _SURE.format(
        bid=names[first.lamp_id],
        share=chance(first.ranks[0]),
        trials=number(Decimal(sure.trials), 0),
        seed=str(sure.seed),
    )
    yield DrawingBlock(_drawing(sure, names, says, colours))
    yield _chance_table(sure, names)
    if sure.swaps:
        yield _swap_table(sure, names, currency)
    if sure.drivers:
        yield _driver_table(sure, names)
    yield ListBlock(sure.notes)


def _drawing(sure: Certainty, names: Mapping[str, str], says: str, colours: Palette) -> Drawing:
    ranked = [item for item in sure.bids if item.total_low is not None]
    chances = [RankChances(told(names[i.lamp_id]), i.ranks, i.not_ranked) for i in ranked]
    count = len(ranked)
    places = (say("rank {place}", place=place) for place in range(1, count + 1))
    headings = (say("Bid"), *places, say("not ranked"))
    rows = tuple(
        (item.name, *(chance(share) for share in item.ranks), chance(item.none)) for item in chances
    )
    svg = draw_rank_chances(chances, told(says), colours)
    return Drawing("ranks", say("Chances of ranks"), says, svg, DataTable(headings, rows))


def _chance_table(sure: Certainty, names: Mapping[str, str]) -> TableBlock:
    rows = []
    for item in sure.bids:
        low, high = item.total_low, item.total_high
        span = (
            NONE
            if low is None or high is None
            else say("{low:.2f} to {high:.2f}", low=low, high=high)
        )
        best = max(item.ranks, default=0.0)
        likely = str(item.ranks.index(best) + 1) if best > 0 else NONE
        rows.append(
            (
                names[item.lamp_id],
                likely,
                chance(best),
                span,
                *(chance(item.outcomes.get(outcome, 0.0)) for outcome in Outcome),
            )
        )
    headings = (
        say("Bid"),
        say("Likeliest rank"),
        say("Its probability"),
        say("Points, 95 % interval"),
        *(OUTCOMES[outcome] for outcome in Outcome),
    )
    return TableBlock(say("Probability of ranks and of outcomes"), headings, tuple(rows))


def _swap_table(sure: Certainty, names: Mapping[str, str], currency: str) -> TableBlock:
    rows = tuple(
        (
            in_words(item.input),
            names.get(item.lamp_id, _ALL_BIDS),
            input_value(item.input, item.value, currency),
            input_value(item.input, item.changed, currency),
            f"{shown_margin(item.change_percent, 1)} %",
        )
        for item in sure.swaps
    )
    headings = (
        say("Input"),
        say_as("input", "Of"),
        say("As assumed"),
        say("First place is lost at"),
        say("Change"),
    )
    return TableBlock(
        say("Smallest change of one input alone that swaps first and second place"),
        headings,
        rows,
        (0, 1),
    )


def _driver_table(sure: Certainty, names: Mapping[str, str]) -> TableBlock:
    rows = tuple(
        (in_words(item.input), names.get(item.lamp_id, _ALL_BIDS), percent(item.share))
        for item in sure.drivers
    )
    return TableBlock(
        say("What drives the lead of the first over the second: share of its variance"),
        (say("Input"), say_as("input", "Of"), say("Share")),
        rows,
        (0, 1),
    )
