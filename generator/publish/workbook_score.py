"""Scores, totals and ranks of a lot as formulas, by the published scoring functions."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from decimal import Decimal

from generator.publish.workbook_sheet import SheetWriter, column_letter
from generator.quantities import QUANTITIES
from generator.records.tender import LotResult, Outcome
from generator.records.tender_settings import COST_CRITERIA, TenderAward, TenderCriterion

__all__ = ["write_scores"]

_NO_VALUE = "no value"
_LAST = "9E+99"
"""Stands for a value that a tie rule needs and a bid lacks."""


def write_scores(
    sheet: SheetWriter, lot: LotResult, award: TenderAward, rows: Mapping[str, int]
) -> None:
    """Write value, score and points of every criterion, then totals and ranks.

    Parameters
    ----------
    sheet
        The sheet of the lot.
    lot
        The lot.
    award
        ``[award]``.
    rows
        Rows of ``price`` and ``life_cycle_cost``.
    """
    if lot.award is None:
        return
    columns = {item.bid.lamp_id: column for column, item in enumerate(lot.bids, start=2)}
    points = [
        _write_criterion(sheet, lot, criterion, place, columns, rows)
        for place, criterion in enumerate(award.criteria)
    ]
    ranked = [columns[item.lamp_id] for item in lot.award.scores if item.rank is not None]
    total = sheet.next_row("Total points", bold=True)
    for column in ranked:
        cells = "+".join(f"{column_letter(column)}{row}" for row in points)
        sheet.formula(column, f"ROUND({cells},{award.decimals})", _decimals(award.decimals))
    tie = sheet.next_row(f"Settles a tie, lower is better ({award.tie_rule})")
    for column in ranked:
        sheet.formula(column, _tie_cell(award, lot, column, rows))
    sheet.next_row("Rank", bold=True)
    for column in ranked:
        sheet.formula(column, _rank(column, ranked, total, tie), "0")
    sheet.next_row("Points as printed in the report")
    for score in lot.award.scores:
        if score.rank is not None and score.total is not None:
            sheet.number(columns[score.lamp_id], score.total, _decimals(award.decimals))


def _decimals(count: int) -> str:
    return f"0.{'0' * count}" if count else "0"


def _write_criterion(
    sheet: SheetWriter,
    lot: LotResult,
    criterion: TenderCriterion,
    place: int,
    columns: Mapping[str, int],
    rows: Mapping[str, int],
) -> int:
    """Value, score and points of one criterion; gives the row of the points."""
    scores = lot.award.scores if lot.award is not None else ()
    values = {item.lamp_id: item.sub_scores[place].value for item in scores}
    name = criterion.quantity
    entry = QUANTITIES.get(name)
    label = entry.label if entry else name.replace("_", " ")
    row = sheet.next_row(f"{label[:1].upper()}{label[1:]}, value")
    for lamp_id, value in values.items():
        _write_value(sheet, columns[lamp_id], name, value, rows)
    score_row = sheet.next_row("Score, 0 to 100")
    weight_row = sheet.next_row(f"Points, weight {criterion.weight_percent} %")
    open_bids = [
        columns[item.bid.lamp_id]
        for item in lot.bids
        if item.eligibility.outcome is not Outcome.NOT_ADMISSIBLE
        and values.get(item.bid.lamp_id) is not None
    ]
    best = _best(criterion, row, open_bids)
    for column in open_bids:
        at = column_letter(column)
        sheet.row = score_row
        sheet.formula(column, _score(criterion, f"{at}{row}", best), "0.0000")
        sheet.row = weight_row
        sheet.formula(column, f"{at}{score_row}*{criterion.weight_percent}/100", "0.0000")
    sheet.row = weight_row
    return weight_row


def _write_value(
    sheet: SheetWriter, column: int, name: str, value: Decimal | None, rows: Mapping[str, int]
) -> None:
    if value is None:
        sheet.text(column, _NO_VALUE)
    elif name in COST_CRITERIA:
        sheet.formula(column, f"{column_letter(column)}{rows[name]}")
    else:
        sheet.number(column, value)


def _best(criterion: TenderCriterion, row: int, columns: Sequence[int]) -> str:
    function = "MAX" if criterion.better == "higher" else "MIN"
    return f"{function}({','.join(f'${column_letter(column)}${row}' for column in columns)})"


def _score(criterion: TenderCriterion, value: str, best: str) -> str:
    if criterion.method == "linear":
        full, none = criterion.full_score_at, criterion.zero_score_at
        return f"100*MAX(0,MIN(1,({value}-({none}))/(({full})-({none}))))"
    if criterion.method == "steps":
        sign = ">=" if criterion.better == "higher" else "<="
        steps = (f"IF({value}{sign}{step.at},{step.score},0)" for step in criterion.steps)
        return f"MAX(0,{','.join(steps)})"
    small, large = (value, best) if criterion.better == "higher" else (best, value)
    return f"IF({value}={best},100,IF({small}>0,100*{small}/{large},0))"


def _tie_cell(award: TenderAward, lot: LotResult, column: int, rows: Mapping[str, int]) -> str:
    if award.tie_rule == "shared rank":
        return "0"
    item = lot.bids[column - 2]
    if award.tie_rule == "lower price":
        known, row = item.price is not None, rows["price"]
    else:
        known, row = item.cost is not None, rows["life_cycle_cost"]
    return f"{column_letter(column)}{row}" if known else _LAST


def _rank(column: int, ranked: Sequence[int], total: int, tie: int) -> str:
    """One more than the number of bids ahead."""
    own = column_letter(column)
    ahead = [
        f"IF({at}{total}>{own}{total},1,IF(AND({at}{total}={own}{total},{at}{tie}<{own}{tie}),1,0))"
        for at in (column_letter(other) for other in ranked if other != column)
    ]
    return "+".join(("1", *ahead))
