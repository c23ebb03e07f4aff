"""One bid followed by hand: its inputs with their origin, every payment, every point."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from decimal import Decimal

from generator.language import numeral, say, say_as
from generator.records.tender import (
    Assumption,
    BidResult,
    BidScore,
    CashFlow,
    LifeCycleCost,
    LotResult,
    SubScore,
    money,
)
from generator.sheets.tender_description import (
    Block,
    HeadingBlock,
    ListBlock,
    ParagraphBlock,
    TableBlock,
)
from generator.sheets.tender_text import (
    amount,
    capital,
    criterion_label,
    criterion_value,
    number,
    significant,
    worded,
)
from generator.sheets.tender_words import ASSUMPTION_NAMES, COST_ITEMS

__all__ = ["assumption_table", "bid_trail", "cash_flow_table", "trail_blocks", "year_table"]

_INTRO = say(
    "Every number below follows from the inputs of the first table. The workbook holds the same "
    "sums for every bid as live formulas."
)
_SUM = say(
    "The present values add up to {total} {currency}; the rows are rounded for print, the sum is "
    "formed before rounding."
)
_OWN_POINTS = say("{value} scores {score}; × {weight} % = {points} points")
_POINTS = say("{parts} = {sum}, rounded to {total} points.")
_CRITERION = say("{criterion}: {arithmetic}.")


def trail_blocks(lot: LotResult, currency: str) -> Iterator[Block]:
    """Follow the bid of a lot that stands first; where nothing is ranked, the first with a cost."""
    scores = {part.lamp_id: part for part in lot.award.scores} if lot.award else {}
    item = next((item for item in lot.bids if item.cost is not None), None)
    if item is None or (lot.award is not None and not lot.award.winners):
        return
    yield HeadingBlock(say("One bid followed by hand: {bid}", bid=item.shown_as), 3)
    yield ParagraphBlock(_INTRO, "quiet")
    yield from bid_trail(item, scores.get(item.bid.lamp_id), currency)


def bid_trail(
    item: BidResult, score: BidScore | None, currency: str, *, own_alone: bool = False
) -> Iterator[Block]:
    """Inputs, payments and points of one bid.

    Parameters
    ----------
    item, score
        The bid and its score; ``None`` where it has none.
    currency
        Currency of all money.
    own_alone
        Whether to leave out of the arithmetic what other bids offer.
    """
    cost = item.cost
    if cost is None:
        return
    yield assumption_table(cost.assumptions, currency)
    yield cash_flow_table(cost, currency)
    yield ParagraphBlock(_SUM.format(total=amount(cost.total), currency=currency), "sum")
    if cost.notes:
        yield ListBlock(cost.notes)
    if score is not None and score.total is not None:
        points = [part.points or Decimal(0) for part in score.sub_scores]
        yield ListBlock(
            tuple(
                _CRITERION.format(
                    criterion=capital(criterion_label(part.criterion)),
                    arithmetic=_arithmetic(part, own_alone),
                )
                for part in score.sub_scores
            )
        )
        yield ParagraphBlock(
            _POINTS.format(
                parts=" + ".join(number(part, 4) for part in points),
                sum=number(sum(points, Decimal(0)), 4),
                total=score.total,
            ),
            "sum",
        )


def _arithmetic(part: SubScore, own_alone: bool) -> str:
    if not own_alone:
        return worded(part.arithmetic)
    return _OWN_POINTS.format(
        value=criterion_value(part.criterion, part.value, part.unit),
        score=number(part.score, 4),
        weight=part.weight_percent,
        points=number(part.points, 4),
    )


def assumption_table(assumptions: Sequence[Assumption], currency: str) -> TableBlock:
    """The inputs with unit and origin."""
    rows = tuple(
        (
            ASSUMPTION_NAMES.get(item.name, item.name),
            _value(item),
            currency if item.unit == "money" else item.unit,
            worded(item.origin),
        )
        for item in assumptions
    )
    headings = (say("Input"), say("Value"), say("Unit"), say("Where it comes from"))
    return TableBlock(say("Inputs"), headings, rows, (0, 2, 3))


def _value(item: Assumption) -> str:
    digits = len(item.value.as_tuple().digits)
    return significant(item.value, 6) if digits > 6 else numeral(f"{item.value.normalize():f}")


def cash_flow_table(cost: LifeCycleCost, currency: str) -> TableBlock:
    """Every payment: year, moment, item, amount, discount factor, present value."""
    rows = [_flow(flow) for flow in cost.cash_flows]
    rows.append((say("Total"), "", "", "", "", amount(cost.total)))
    headings = (
        say("Year"),
        say("Due after, years"),
        say_as("payment", "For"),
        say("Payment, {currency}", currency=currency),
        say("Discount factor"),
        say("Present value, {currency}", currency=currency),
    )
    return TableBlock(say("Cash flows"), headings, tuple(rows), (0, 2), sum_row=True)


def _flow(flow: CashFlow) -> tuple[str, ...]:
    return (
        str(flow.year),
        number(flow.moment_years, 2),
        COST_ITEMS[flow.item],
        amount(flow.amount),
        number(flow.factor, 6),
        amount(flow.present_value),
    )


def year_table(cost: LifeCycleCost, currency: str) -> TableBlock:
    """Present value spent up to the end of each year."""
    rows = tuple((str(year), amount(money(spent))) for year, spent in enumerate(cost.cumulative))
    return TableBlock(say("Spent up to the end of each year"), (say("Year"), currency), rows)
