"""Scoring functions, ranks, ties, and offers to be explained."""

from __future__ import annotations

from dataclasses import replace
from decimal import Decimal
from itertools import permutations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from generator.comparison.award.abnormally_low import low_offers
from generator.comparison.award.ranking import Candidate, award
from generator.comparison.award.scoring import (
    array_function,
    exact_function,
    function_text,
    score,
)
from generator.records.tender_settings import ScoreStep, TenderAward, TenderCriterion


def criterion(**given_values: object) -> TenderCriterion:
    values = {"quantity": "price", "weight_percent": 100, "better": "lower"}
    return TenderCriterion.model_validate({**values, **given_values})


LINEAR = criterion(method="linear", full_score_at=10, zero_score_at=30)
STEPS = criterion(
    quantity="ra",
    better="higher",
    method="steps",
    steps=[{"at": 80, "score": 40}, {"at": 90, "score": 100}],
)
RELATIVE_LOW = criterion()
RELATIVE_HIGH = criterion(quantity="ra", better="higher")


@pytest.mark.parametrize(
    ("rule", "value", "best", "expected"),
    [
        # sums by hand from the published rule
        (LINEAR, "15", "12", "75"),
        (LINEAR, "5", "5", "100"),
        (LINEAR, "31", "5", "0"),
        (STEPS, "79.9", "95", "0"),
        (STEPS, "80", "95", "40"),
        (STEPS, "90", "95", "100"),
        (RELATIVE_LOW, "20", "16", "80"),
        (RELATIVE_LOW, "16", "16", "100"),
        (RELATIVE_LOW, "5", "0", "0"),
        (RELATIVE_LOW, "0", "0", "100"),
        (RELATIVE_HIGH, "60", "80", "75"),
        (RELATIVE_HIGH, "-5", "80", "0"),
        (RELATIVE_HIGH, "-5", "-5", "100"),
        (RELATIVE_HIGH, "-9", "-5", "0"),
    ],
)
def test_scores_by_hand(rule: TenderCriterion, value: str, best: str, expected: str) -> None:
    assert score(exact_function(rule), Decimal(value), Decimal(best)) == Decimal(expected)


@settings(max_examples=60, deadline=None)
@given(value=st.decimals(-50, 150, places=3), best=st.decimals(-50, 150, places=3))
@pytest.mark.parametrize("rule", [LINEAR, STEPS, RELATIVE_LOW, RELATIVE_HIGH])
def test_decimals_and_arrays_score_alike(
    rule: TenderCriterion, value: Decimal, best: Decimal
) -> None:
    exact = score(exact_function(rule), value, best)
    other = score(array_function(rule), np.array([float(value)]), np.array([float(best)]))
    assert other[0] == pytest.approx(float(exact), abs=1e-9)


def candidate(lamp_id: str, price: str | None, ra: str | None = "90", **more: str) -> Candidate:
    amount = None if price is None else Decimal(price)
    values = {"price": amount, "ra": None if ra is None else Decimal(ra)}
    cost = Decimal(more["cost"]) if "cost" in more else None
    return Candidate(lamp_id, values, {}, amount, cost, barred=more.get("barred", ""))


TWO = TenderAward(
    criteria=(
        criterion(weight_percent=60),
        criterion(
            quantity="ra",
            weight_percent=40,
            better="higher",
            method="linear",
            full_score_at=100,
            zero_score_at=80,
        ),
    )
)


def test_totals_add_up_and_show_their_arithmetic() -> None:
    result = award([candidate("a", "20", "95"), candidate("b", "16", "85")], TWO)
    by_id = {item.lamp_id: item for item in result.scores}
    # a: 60 x 16/20 + 40 x 15/20 = 48 + 30; b: 60 + 40 x 5/20 = 60 + 10
    assert by_id["a"].total == Decimal("78.00")
    assert by_id["b"].total == Decimal("70.00")
    assert result.winners == ("a",)
    assert by_id["a"].sub_scores[0].arithmetic == "100 x 16 / 20 = 80; x 60 % = 48 points"
    assert by_id["a"].sub_scores[1].arithmetic.startswith("100 x (95 - 80) / (100 - 80) = 75;")
    assert len(result.functions) == 2


def test_a_bid_without_a_value_or_barred_is_not_ranked_and_sets_no_best_value() -> None:
    bids = [
        candidate("a", "20"),
        candidate("b", "1", barred="not admissible"),
        candidate("c", None),
    ]
    result = award(bids, TWO)
    by_id = {item.lamp_id: item for item in result.scores}
    assert by_id["a"].rank == 1
    assert by_id["a"].sub_scores[0].score == 100
    assert by_id["b"].rank is None
    assert by_id["b"].reason == "not admissible"
    assert by_id["c"].total is None
    assert by_id["c"].reason == "no value for price"


def test_a_declared_value_is_scored_and_named_as_declared() -> None:
    told = replace(candidate("a", "20", "95"), declared=frozenset({"ra"}))
    price, rendering = award([told], TWO).scores[0].sub_scores
    assert "declared" not in price.arithmetic
    assert rendering.arithmetic.endswith("points; the value is declared, not measured")
    assert rendering.score == 75


def test_ties_share_the_rank_unless_the_rule_settles_them() -> None:
    only_ra = {"criteria": (criterion(quantity="ra", better="higher"),)}
    bids = [
        candidate("a", "20", cost="5"),
        candidate("b", "16", cost="9"),
        candidate("c", "9", "80"),
    ]
    shared = award(bids, TenderAward.model_validate(only_ra))
    assert [(item.lamp_id, item.rank) for item in shared.scores] == [("a", 1), ("b", 1), ("c", 3)]
    assert shared.winners == ("a", "b")
    by_price = award(bids, TenderAward.model_validate({**only_ra, "tie_rule": "lower price"}))
    assert by_price.winners == ("b",)
    by_cost = award(
        bids, TenderAward.model_validate({**only_ra, "tie_rule": "lower life-cycle cost"})
    )
    assert by_cost.winners == ("a",)
    assert by_cost.scores[0].tied_with == ("b",)


def test_totals_are_rounded_before_they_are_compared() -> None:
    """85.001 against 85 of 20 is 0.002 points of 40 more: equal at two decimals, so tied."""
    result = award([candidate("a", "20", "85"), candidate("b", "20", "85.001")], TWO)
    assert [(item.lamp_id, item.rank, item.tied_with) for item in result.scores] == [
        ("a", 1, ("b",)),
        ("b", 1, ("a",)),
    ]


def test_order_of_bids_does_not_matter() -> None:
    bids = [candidate("a", "20"), candidate("b", "16", "85"), candidate("c", "16", "85")]
    results = {repr(award(list(order), TWO)) for order in permutations(bids)}
    assert len(results) == 1


def test_low_offers_are_flagged_and_stay() -> None:
    prices = {"a": Decimal(100), "b": Decimal(110), "c": Decimal(60), "d": None}
    (low,) = low_offers(prices, Decimal(40))
    # 60 against the mean of the others, 105: 42.86 % below
    assert low.lamp_id == "c"
    assert low.mean_of_others == 105
    assert abs(low.percent_below - Decimal("42.857")) < Decimal("0.001")
    assert low_offers(prices, Decimal(43)) == ()
    at_the_threshold = {"a": Decimal(100), "b": Decimal(100), "c": Decimal(60)}
    assert [item.lamp_id for item in low_offers(at_the_threshold, Decimal(40))] == ["c"]
    assert low_offers({"a": Decimal(1), "b": Decimal(9)}, Decimal(20)) == ()
    settings_low = TWO.model_copy(update={"abnormally_low_percent": Decimal(40)})
    result = award(
        [candidate("a", "100"), candidate("b", "110"), candidate("c", "60")], settings_low
    )
    assert [item.lamp_id for item in result.low_offers] == ["c"]
    assert result.winners == ("c",)


def test_functions_are_published_in_words() -> None:
    assert "linear between" in function_text(LINEAR)
    assert "40 for at least 80" in function_text(STEPS)
    assert "best / value" in function_text(RELATIVE_LOW)
    assert ScoreStep(at=Decimal(1), score=Decimal(2)).score == 2
