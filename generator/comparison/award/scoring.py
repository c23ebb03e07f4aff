"""Published scoring functions: one formula for exact decimals and for arrays."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from typing import Generic

import numpy as np
from numpy.typing import NDArray

from generator.comparison.cost.formula import Number
from generator.language import Numeral, joined, numeral, say
from generator.records.tender_settings import TenderCriterion

__all__ = [
    "FULL_SCORE",
    "ScoringFunction",
    "array_function",
    "exact_function",
    "function_text",
    "score",
]

FULL_SCORE = 100

_STEP = {
    "higher": say("{score} for at least {limit}"),
    "lower": say("{score} for at most {limit}"),
}
_RATIO = {
    "higher": say(
        "{criterion}: {full} x value / best, 100 for the best and 0 where there is no ratio; "
        "weight {weight} %"
    ),
    "lower": say(
        "{criterion}: {full} x best / value, 100 for the best and 0 where there is no ratio; "
        "weight {weight} %"
    ),
}


@dataclass(frozen=True, slots=True)
class ScoringFunction(Generic[Number]):
    """A scoring function with its numbers as decimals or as arrays.

    Parameters
    ----------
    method, higher_is_better
        As the criterion says.
    full, none
        Values of full score and of zero, of the method ``linear``.
    steps
        Values and scores, of the method ``steps``.
    """

    method: str
    higher_is_better: bool
    full: Number
    none: Number
    steps: tuple[tuple[Number, Number], ...]


def exact_function(criterion: TenderCriterion) -> ScoringFunction[Decimal]:
    """The scoring function of a criterion over exact decimals."""
    return ScoringFunction(
        criterion.method,
        criterion.better == "higher",
        criterion.full_score_at or Decimal(0),
        criterion.zero_score_at or Decimal(0),
        tuple((step.at, step.score) for step in criterion.steps),
    )


def array_function(criterion: TenderCriterion) -> ScoringFunction[NDArray[np.float64]]:
    """The scoring function of a criterion over arrays of floats."""
    known = exact_function(criterion)
    return ScoringFunction(
        known.method,
        known.higher_is_better,
        np.asarray(float(known.full)),
        np.asarray(float(known.none)),
        tuple((np.asarray(float(at)), np.asarray(float(to))) for at, to in known.steps),
    )


def score(function: ScoringFunction[Number], value: Number, best: Number) -> Number:
    """Score of a value, 0 to 100.

    Parameters
    ----------
    function
        The scoring function.
    value
        Value of the bid; decimal or array (trials,).
    best
        Best value of the bids that are scored, of the same kind.

    Returns
    -------
    decimal or array
        The score, unrounded. Relative to best, a best value of zero or less leaves no ratio:
        the best then scores in full, all others zero.
    """
    zero = value * 0
    if function.method == "linear":
        share = (value - function.none) / (function.full - function.none)
        return FULL_SCORE * _smaller(_larger(share, zero), zero + 1)
    if function.method == "steps":
        total = zero
        for at, reached in function.steps:
            met = (value >= at) if function.higher_is_better else (value <= at)
            total = _larger(total, zero + met * reached)
        return total
    small, large = (value, best) if function.higher_is_better else (best, value)
    ratio = small / (large + (large <= 0) * (1 - large))
    inside = FULL_SCORE * ratio * (small > 0)
    equal = zero + (value >= best) * (value <= best)
    return equal * FULL_SCORE + (1 - equal) * inside


def _larger(a: Number, b: Number) -> Number:
    return (a >= b) * a + (a < b) * b


def _smaller(a: Number, b: Number) -> Number:
    return (a <= b) * a + (a > b) * b


def function_text(criterion: TenderCriterion) -> str:
    """The scoring function in words, as it is published with the tender."""
    name, weight = criterion.quantity, _plain(criterion.weight_percent)
    if criterion.method == "linear":
        return say(
            "{criterion}: {full} at {best}, 0 at {none}, linear between, held at both ends; "
            "weight {weight} %",
            criterion=name,
            full=FULL_SCORE,
            best=_plain(criterion.full_score_at),
            none=_plain(criterion.zero_score_at),
            weight=weight,
        )
    if criterion.method == "steps":
        pattern = _STEP[criterion.better]
        return say(
            "{criterion}: {steps}, otherwise 0, the highest score reached counts; "
            "weight {weight} %",
            criterion=name,
            steps=joined(
                ", ",
                (
                    pattern.format(score=_plain(step.score), limit=_plain(step.at))
                    for step in criterion.steps
                ),
            ),
            weight=weight,
        )
    return _RATIO[criterion.better].format(criterion=name, full=FULL_SCORE, weight=weight)


def _plain(number: Decimal | None) -> Numeral:
    """A number as the tender states it."""
    return numeral(f"{number}")
