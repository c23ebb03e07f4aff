"""From criterion values to points, totals and ranks, with the arithmetic in words."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from decimal import ROUND_HALF_UP, Decimal

from generator.comparison.award.abnormally_low import low_offers
from generator.comparison.award.scoring import FULL_SCORE, exact_function, function_text, score
from generator.language import Numeral, joined, numeral, say
from generator.records.tender import AwardResult, BidScore, SubScore
from generator.records.tender_settings import TenderAward, TenderCriterion

__all__ = ["Candidate", "award", "best_value"]

_SUM = say("{sum} = {score}")
_HELD = say("{sum}, held within 0 to {full} = {score}")
_TIED = say("equal total; tie rule: {rule}")
_STILL_TIED = say("equal total; tie rule: {rule}; still equal, the rank is shared")
_TIE_RULES = {
    "lower life-cycle cost": say("lower life-cycle cost"),
    "lower price": say("lower price"),
    "shared rank": say("shared rank"),
}


@dataclass(frozen=True, slots=True)
class Candidate:
    """One bid as the award sees it.

    Parameters
    ----------
    lamp_id
        The bid.
    values
        Name of the criterion -> value; ``None`` where it has none.
    units
        Name of the criterion -> unit.
    price
        Price of all lamps, installation left out [money].
    life_cycle_cost
        Present value of all costs [money].
    provisional
        Whether questions are open.
    barred
        Why it is not ranked; empty where it may be.
    declared
        Names of the criteria whose value is declared and not measured.
    """

    lamp_id: str
    values: Mapping[str, Decimal | None]
    units: Mapping[str, str]
    price: Decimal | None
    life_cycle_cost: Decimal | None
    provisional: bool = False
    barred: str = ""
    declared: frozenset[str] = frozenset()


def award(candidates: Sequence[Candidate], settings: TenderAward) -> AwardResult:
    """Score and rank the bids of one lot.

    Parameters
    ----------
    candidates
        The bids, in any order.
    settings
        ``[award]``.

    Returns
    -------
    AwardResult
        Ranked bids first, best first; bids still equal after the tie rule share the rank and
        stand in the order of their ids. The best value of a criterion is sought among the bids
        that may be ranked. Source: eu_2014_24, article 67 (criteria and weights published).
    """
    scored = [_scored(item, candidates, settings) for item in candidates]
    keys = {item.lamp_id: _key(item, candidates, settings) for item in scored}
    ranked = sorted(
        (item for item in scored if not item.reason),
        key=lambda item: (keys[item.lamp_id], item.lamp_id),
    )
    placed = [_placed(item, ranked, keys, settings) for item in ranked]
    others = sorted((item for item in scored if item.reason), key=lambda item: item.lamp_id)
    return AwardResult(
        scores=(*placed, *others),
        functions=tuple(function_text(criterion) for criterion in settings.criteria),
        tie_rule=settings.tie_rule,
        low_offers=low_offers(
            {item.lamp_id: item.price for item in candidates if not item.barred},
            settings.abnormally_low_percent,
        ),
    )


def best_value(criterion: TenderCriterion, candidates: Sequence[Candidate]) -> Decimal | None:
    """Best value among the bids that may be ranked; ``None`` where none has one."""
    values = [
        value
        for item in candidates
        if not item.barred and (value := item.values.get(criterion.quantity)) is not None
    ]
    return (max if criterion.better == "higher" else min)(values, default=None)


def _scored(item: Candidate, candidates: Sequence[Candidate], settings: TenderAward) -> BidScore:
    parts = tuple(
        _sub_score(criterion, item, best_value(criterion, candidates))
        for criterion in settings.criteria
    )
    gaps = [part.criterion for part in parts if part.points is None]
    points = [part.points for part in parts if part.points is not None]
    total = None
    if not gaps:
        step = Decimal(1).scaleb(-settings.decimals)
        total = sum(points, Decimal(0)).quantize(step, rounding=ROUND_HALF_UP)
    reason = item.barred or (
        say("no value for {criteria}", criteria=", ".join(gaps)) if gaps else ""
    )
    return BidScore(item.lamp_id, parts, total, None, provisional=item.provisional, reason=reason)


def _sub_score(criterion: TenderCriterion, item: Candidate, best: Decimal | None) -> SubScore:
    name, weight = criterion.quantity, criterion.weight_percent
    unit = item.units.get(name, "")
    value = item.values.get(name)
    if value is None or item.barred or best is None:
        text = item.barred or say("no value")
        return SubScore(name, value, unit, None, weight, None, text)
    reached = score(exact_function(criterion), value, best)
    points = reached * weight / FULL_SCORE
    arithmetic = say(
        "{score}; x {weight} % = {points} points",
        score=_arithmetic(criterion, value, best, reached),
        weight=_shown(weight),
        points=_shown(points),
    )
    if name in item.declared:
        arithmetic = say("{arithmetic}; the value is declared, not measured", arithmetic=arithmetic)
    return SubScore(name, value, unit, reached, weight, points, arithmetic)


def _arithmetic(criterion: TenderCriterion, value: Decimal, best: Decimal, reached: Decimal) -> str:
    given, score_text = _shown(value), _shown(reached)
    if criterion.method == "linear":
        full, none = numeral(f"{criterion.full_score_at}"), numeral(f"{criterion.zero_score_at}")
        sum_text = joined("", (f"{FULL_SCORE} x (", given, " - ", none, ") / (", full, " - ", none))
        held = reached in (0, FULL_SCORE)
        pattern = _HELD if held else _SUM
        return pattern.format(sum=joined("", (sum_text, ")")), full=FULL_SCORE, score=score_text)
    if criterion.method == "steps":
        return say("highest step reached by {value}: {score}", value=given, score=score_text)
    if value == best:
        return say("{value} is the best value: {score}", value=given, score=score_text)
    over, under = (given, _shown(best)) if criterion.better == "higher" else (_shown(best), given)
    ratio = joined("", (f"{FULL_SCORE} x ", over, " / ", under))
    return _SUM.format(sum=ratio, score=score_text)


def _shown(number: Decimal) -> Numeral:
    """A number with four decimals at the most."""
    text = f"{number.quantize(Decimal('0.0001'), rounding=ROUND_HALF_UP):f}"
    return numeral(text.rstrip("0").rstrip(".") if "." in text else text)


def _tie_value(item: Candidate, settings: TenderAward) -> Decimal:
    """What settles a tie, the lower the better; a bid without it comes last."""
    if settings.tie_rule == "shared rank":
        return Decimal(0)
    lower_price = settings.tie_rule == "lower price"
    value = item.price if lower_price else item.life_cycle_cost
    return Decimal("Infinity") if value is None else value


def _key(
    item: BidScore, candidates: Sequence[Candidate], settings: TenderAward
) -> tuple[Decimal, Decimal]:
    candidate = next(other for other in candidates if other.lamp_id == item.lamp_id)
    return -(item.total or Decimal(0)), _tie_value(candidate, settings)


def _placed(
    item: BidScore,
    ranked: Sequence[BidScore],
    keys: Mapping[str, tuple[Decimal, Decimal]],
    settings: TenderAward,
) -> BidScore:
    own = keys[item.lamp_id]
    rank = 1 + sum(keys[other.lamp_id] < own for other in ranked)
    tied = tuple(
        other.lamp_id
        for other in ranked
        if other.total == item.total and other.lamp_id != item.lamp_id
    )
    note: str = ""
    if tied:
        still = any(keys[other] == own for other in tied)
        pattern = _STILL_TIED if still else _TIED
        note = pattern.format(rule=_TIE_RULES[settings.tie_rule])
    return replace(item, rank=rank, tied_with=tied, tie_note=note)
