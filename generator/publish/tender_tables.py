"""The tender as CSV: bids, cash flows, scores, ranks, plan.

Text that came from outside and begins like a formula gets an apostrophe before it, so that no
spreadsheet takes it for one.
"""

from __future__ import annotations

import csv
import io
from collections.abc import Iterable, Iterator, Mapping, Sequence
from decimal import Decimal

from generator.publish.evidence import plain
from generator.publish.tender_details import (
    ASSUMPTION_COLUMNS,
    EMISSION_COLUMNS,
    GATE_COLUMNS,
    LEAD_COLUMNS,
    SENSITIVITY_COLUMNS,
    assumption_rows,
    emission_rows,
    gate_rows,
    lead_rows,
    plain_text,
    sensitivity_rows,
)
from generator.records.tender import (
    BidResult,
    LifeCycleCost,
    LotResult,
    Outcome,
    RelampingPlan,
    Tender,
    money,
)

__all__ = ["tender_tables"]

BID_COLUMNS = (
    "lot",
    "lamp_id",
    "bid",
    "outcome",
    "reasons",
    "questions",
    "price",
    "currency",
    "lamps",
    "life_cycle_cost",
    "cost_per_million_lumen_hours",
    "lamps_needed",
    "energy_kwh_per_year",
    "saved_kwh_per_year",
    "saving",
    "break_even_year",
    "withheld",
)
FLOW_COLUMNS = (
    "lot",
    "lamp_id",
    "year",
    "moment_years",
    "item",
    "amount",
    "discount_factor",
    "present_value",
    "currency",
)
SCORE_COLUMNS = (
    "lot",
    "lamp_id",
    "criterion",
    "value",
    "unit",
    "score",
    "weight_percent",
    "points",
    "total",
    "rank",
    "provisional",
    "arithmetic",
    "reason",
)
RANK_COLUMNS = ("lot", "lamp_id", "event", "probability", "seed", "trials")
PLAN_COLUMNS = (
    "table",
    "year",
    "room",
    "lot",
    "existing_lamp",
    "points",
    "new_lamp",
    "quantity",
    "existing_kwh",
    "new_kwh",
    "saved_kwh",
    "spend",
    "saved_money",
    "cumulative_net",
    "reason",
)


def tender_tables(tender: Tender, currency: str) -> Mapping[str, bytes]:
    """Write the CSV files of a tender.

    Parameters
    ----------
    tender
        The bids compared.
    currency
        Currency of all money.

    Returns
    -------
    mapping
        File name -> content. Money is exact, unrounded, but for ``price`` and ``life_cycle_cost``
        of the bids, which are rounded as printed.
    """
    names = _Names(tender)
    return {
        "bids.csv": _csv(BID_COLUMNS, _bids(tender, names, currency)),
        "cash_flows.csv": _csv(FLOW_COLUMNS, _flows(tender, names)),
        "scores.csv": _csv(SCORE_COLUMNS, _scores(tender, names)),
        "ranks.csv": _csv(RANK_COLUMNS, _ranks(tender, names)),
        "plan.csv": _csv(PLAN_COLUMNS, _plan(tender.plan, names) if tender.plan else ()),
        "gate.csv": _csv(GATE_COLUMNS, gate_rows(tender, names.lamp)),
        "assumptions.csv": _csv(ASSUMPTION_COLUMNS, assumption_rows(tender, names.lamp)),
        "emissions.csv": _csv(EMISSION_COLUMNS, emission_rows(tender, names.lamp)),
        "sensitivity.csv": _csv(SENSITIVITY_COLUMNS, sensitivity_rows(tender, names.lamp)),
        "lead.csv": _csv(LEAD_COLUMNS, lead_rows(tender, names.lamp)),
    }


class _Names:
    """Ids as they may be written: under code names the code stands in their place."""

    def __init__(self, tender: Tender) -> None:
        self._shown = dict(tender.shown_as) if tender.under_codes else {}
        self._titles = dict(tender.existing_titles) if tender.under_codes else {}

    def lamp(self, lamp_id: str) -> str:
        """Id of a bid, or its code name."""
        return self._shown.get(lamp_id, lamp_id)

    def existing(self, lamp_id: str) -> str:
        """Id of a lamp in use today, or its title."""
        return self._titles.get(lamp_id, lamp_id)


def _csv(columns: Sequence[str], rows: Iterable[Mapping[str, str]]) -> bytes:
    out = io.StringIO()
    writer = csv.DictWriter(out, columns, restval="", lineterminator="\n")
    writer.writeheader()
    writer.writerows(rows)
    return out.getvalue().encode()


def _rounded(amount: Decimal | None) -> str:
    return "" if amount is None else str(money(amount))


def _exact(amount: Decimal | None) -> str:
    return plain(amount)


def _bids(tender: Tender, names: _Names, currency: str) -> Iterator[dict[str, str]]:
    for lot in tender.lots:
        for item in lot.bids:
            yield {
                "lot": lot.lot,
                "lamp_id": names.lamp(item.bid.lamp_id),
                "bid": plain_text(item.shown_as),
                "currency": currency,
                **_gate_cells(item),
                **_cost_cells(item),
            }


def _gate_cells(item: BidResult) -> dict[str, str]:
    gate = item.eligibility
    reasons = "; ".join(f"{part.clause}: {part.text}" for part in gate.reasons)
    questions = "; ".join(f"{part.clause}: {part.title}" for part in gate.questions)
    return {
        "outcome": gate.outcome.value,
        "reasons": plain_text(reasons),
        "questions": plain_text(questions),
    }


def _cost_cells(item: BidResult) -> dict[str, str]:
    cells = {"price": _rounded(item.price), "withheld": "; ".join(item.withheld)}
    if item.cost is not None:
        cells |= {"lamps": str(item.cost.lamps), "life_cycle_cost": _rounded(item.cost.total)}
    light, energy, even = item.equal_light, item.energy, item.break_even
    if light is not None:
        needed = light.lamps_needed
        cells["cost_per_million_lumen_hours"] = _exact(light.cost_per_million_lumen_hours)
        cells["lamps_needed"] = "" if needed is None else str(needed)
    if energy is not None:
        cells["energy_kwh_per_year"] = _exact(energy.total_kwh)
        cells["saved_kwh_per_year"] = _exact(energy.saving_kwh)
    if even is not None:
        cells["saving"] = _rounded(even.saving)
        cells["break_even_year"] = "" if even.year is None else str(even.year)
    return cells


def _flows(tender: Tender, names: _Names) -> Iterator[dict[str, str]]:
    """Payments of every bid, then of the lamp in use today."""
    for lot in tender.lots:
        for item in lot.bids:
            yield from _flow_rows(lot.lot, names.lamp(item.bid.lamp_id), item.cost)
        yield from _flow_rows(lot.lot, names.existing(lot.baseline_lamp), lot.baseline)


def _flow_rows(lot: str, lamp: str, cost: LifeCycleCost | None) -> Iterator[dict[str, str]]:
    for flow in cost.cash_flows if cost else ():
        yield {
            "lot": lot,
            "lamp_id": plain_text(lamp),
            "year": str(flow.year),
            "moment_years": _exact(flow.moment_years),
            "item": flow.item.value,
            "amount": _exact(flow.amount),
            "discount_factor": _exact(flow.factor),
            "present_value": _exact(flow.present_value),
            "currency": cost.currency if cost else "",
        }


def _scores(tender: Tender, names: _Names) -> Iterator[dict[str, str]]:
    for lot in tender.lots:
        for score in lot.award.scores if lot.award else ():
            for part in score.sub_scores:
                yield {
                    "lot": lot.lot,
                    "lamp_id": names.lamp(score.lamp_id),
                    "criterion": part.criterion,
                    "value": _exact(part.value),
                    "unit": part.unit,
                    "score": _exact(part.score),
                    "weight_percent": _exact(part.weight_percent),
                    "points": _exact(part.points),
                    "total": _exact(score.total),
                    "rank": "" if score.rank is None else str(score.rank),
                    "provisional": "yes" if score.provisional else "no",
                    "arithmetic": plain_text(part.arithmetic),
                    "reason": plain_text(score.reason),
                }


def _ranks(tender: Tender, names: _Names) -> Iterator[dict[str, str]]:
    for lot in tender.lots:
        yield from _rank_rows(lot, names)


def _rank_rows(lot: LotResult, names: _Names) -> Iterator[dict[str, str]]:
    sure = lot.certainty
    if sure is None:
        return
    for item in sure.bids:
        events = [(f"rank {place}", share) for place, share in enumerate(item.ranks, start=1)]
        events.append(("not ranked", item.not_ranked))
        events += [(outcome.value, item.outcomes.get(outcome, 0.0)) for outcome in Outcome]
        for event, share in events:
            yield {
                "lot": lot.lot,
                "lamp_id": names.lamp(item.lamp_id),
                "event": event,
                "probability": f"{share:.6f}",
                "seed": str(sure.seed),
                "trials": str(sure.trials),
            }


def _plan(plan: RelampingPlan, names: _Names) -> Iterator[dict[str, str]]:
    for room in plan.rooms:
        yield {
            "table": "room",
            "year": str(room.relamp_year),
            "room": room.room,
            "lot": room.lot,
            "existing_lamp": names.existing(room.existing_lamp),
            "points": str(room.points),
            "new_lamp": names.lamp(room.new_lamp),
            "quantity": str(room.quantity),
            "existing_kwh": _exact(room.existing_kwh),
            "new_kwh": _exact(room.new_kwh),
            "spend": _exact(room.spend),
            "reason": room.reason,
        }
    for year in plan.years:
        yield {
            "table": "year",
            "year": str(year.year),
            "quantity": str(year.quantity),
            "saved_kwh": _exact(year.saved_kwh),
            "spend": _exact(year.spend),
            "saved_money": _exact(year.saved_money),
            "cumulative_net": _exact(year.cumulative_net),
        }
