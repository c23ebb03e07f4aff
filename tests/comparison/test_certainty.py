"""Rank probabilities against closed forms; swaps against roots; the same seed, the same answer."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import replace
from decimal import Decimal
from typing import Any

import pytest
from scipy.stats import norm

from generator.records.figure import Figure, Grade
from generator.records.tender import Certainty, LotResult, Outcome
from generator.records.verdict import Verdict, VerdictWord

RA_ALONE = {
    "criteria": [
        {
            "quantity": "ra",
            "weight_percent": 100,
            "better": "higher",
            "method": "linear",
            "full_score_at": 200,
            "zero_score_at": 0,
        }
    ]
}


def lot_of(case: Any) -> LotResult:
    (lot,) = case.compared().lots
    result: LotResult = lot
    return result


def sure_of(case: Any) -> Certainty:
    sure = lot_of(case).certainty
    assert sure is not None
    return sure


def two_bids(case: Any, first: tuple[str, str], second: tuple[str, str]) -> Any:
    """Bids a and b that differ in Ra (mean, expanded uncertainty) alone."""
    figures = [item for item in case.figures if item.quantity != "ra"]
    for lamp_id, (value, wide) in (("a", first), ("b", second)):
        figures.append(
            Figure(lamp_id, "", "ra", Decimal(value), Grade.REPORTED, "m", Decimal(wide))
        )
    return replace(
        case,
        figures=tuple(figures),
        lamps=tuple(lamp for lamp in case.lamps if lamp.lamp_id != "c"),
        bids=tuple(bid for bid in case.bids if bid.lamp_id != "c"),
        settings={**case.settings, "award": RA_ALONE},
    ).with_settings("tender", trials=100_000)


@pytest.mark.parametrize(
    ("first", "second"),
    [(("81", "2"), ("80", "2")), (("85", "4"), ("84", "1")), (("90", "2"), ("80", "2"))],
)
def test_two_normal_bids_rank_as_the_closed_form_says(
    tender_case: Any, first: tuple[str, str], second: tuple[str, str]
) -> None:
    """P(first ahead) = Phi((m1 - m2)/sqrt(s1^2 + s2^2)), s half the expanded uncertainty."""
    sure = sure_of(two_bids(tender_case, first, second))
    spread = math.hypot(float(first[1]) / 2, float(second[1]) / 2)
    expected = norm.cdf((float(first[0]) - float(second[0])) / spread)
    error = math.sqrt(max(expected * (1 - expected), 1e-9) / 100_000)
    assert sure.bids[0].lamp_id == "a"
    assert abs(sure.bids[0].ranks[0] - expected) < 4 * error + 1e-9
    assert sure.bids[0].ranks[0] == pytest.approx(sure.bids[1].ranks[1])


def test_drivers_share_the_variance_as_the_closed_form_says(tender_case: Any) -> None:
    sure = sure_of(two_bids(tender_case, ("85", "4"), ("84", "2")))
    shares = {item.lamp_id: item.share for item in sure.drivers}
    # variances 4 and 1 of a difference of two independent inputs; 100 000 trials
    assert shares["a"] == pytest.approx(0.8, abs=0.01)
    assert shares["b"] == pytest.approx(0.2, abs=0.01)


def test_coverage_interval_of_a_total(tender_case: Any) -> None:
    sure = sure_of(two_bids(tender_case, ("81", "2"), ("80", "2")))
    low, high = sure.bids[0].total_low, sure.bids[0].total_high
    assert low is not None
    assert high is not None
    # Ra 81 with standard uncertainty 1 is a total of 40.5 with 0.5
    assert low == pytest.approx(40.5 - 1.96 * 0.5, abs=0.02)
    assert high == pytest.approx(40.5 + 1.96 * 0.5, abs=0.02)


def test_smallest_swap_of_a_linear_score(tender_case: Any) -> None:
    sure = sure_of(two_bids(tender_case, ("81", "2"), ("80", "2")))
    by_input = {(item.input, item.lamp_id): item for item in sure.swaps}
    assert set(by_input) == {("ra", "a"), ("ra", "b")}
    assert float(by_input["ra", "a"].changed) == pytest.approx(80, abs=1e-4)
    assert float(by_input["ra", "b"].change_percent) == pytest.approx(1.25, abs=1e-4)
    assert sure.swaps[0].input == "ra"
    assert sure.swaps[0].lamp_id == "a"  # 1.23 % down before 1.25 % up


def test_swapping_price_brings_the_costs_together(tender_case: Any) -> None:
    """Award on cost alone: at the price found, both costs of the exact path are equal."""
    cost_alone = {
        "criteria": [{"quantity": "life_cycle_cost", "weight_percent": 100, "better": "lower"}]
    }
    case = replace(tender_case, settings={**tender_case.settings, "award": cost_alone})
    lot = lot_of(case)
    assert lot.certainty is not None
    first, second = (item.bid.lamp_id for item in lot.bids[:2])
    swap = next(
        item for item in lot.certainty.swaps if (item.input, item.lamp_id) == ("price", second)
    )
    moved = case.with_lamp(
        second, lambda lamp: replace(lamp, offer=replace(lamp.offer, unit_price=swap.changed))
    )
    costs = {item.bid.lamp_id: item.cost for item in lot_of(moved).bids}
    assert float(costs[first].total) == pytest.approx(float(costs[second].total), rel=1e-6)


def test_the_same_seed_gives_the_same_answer_and_another_does_not(tender_case: Any) -> None:
    assert sure_of(tender_case) == sure_of(tender_case)
    other = sure_of(tender_case.with_settings("tender", seed=8))
    assert other.bids != sure_of(tender_case).bids
    turned = replace(tender_case, lamps=tender_case.lamps[::-1], bids=tender_case.bids[::-1])
    assert sure_of(turned) == sure_of(tender_case)


def test_probabilities_add_up(tender_case: Any) -> None:
    case = tender_case.with_settings(
        "use",
        tariff_uncertainty_percent=20,
        life_uncertainty_percent=30,
        price_rise_uncertainty_points=2,
    )
    sure = sure_of(case)
    for item in sure.bids:
        assert sum(item.ranks) + item.not_ranked == pytest.approx(1)
        assert sum(item.outcomes.values()) == pytest.approx(1)
    for place in range(3):
        assert sum(item.ranks[place] for item in sure.bids) == pytest.approx(1)
    assert sum(item.share for item in sure.drivers) <= 1 + 1e-12
    assert {item.input for item in sure.drivers} & {"ra", "power_w", "tariff", "life_h"}


def test_arrays_give_the_totals_of_the_exact_path(tender_case: Any) -> None:
    """Without uncertainties the interval of each total closes on the exact total."""
    figures = tuple(replace(item, expanded_uncertainty=None) for item in tender_case.figures)
    lot = lot_of(replace(tender_case, figures=figures))
    assert lot.award is not None
    assert lot.certainty is not None
    exact = {item.lamp_id: item.total for item in lot.award.scores}
    for item in lot.certainty.bids:
        assert item.total_low == item.total_high
        assert item.total_low == pytest.approx(float(exact[item.lamp_id] or 0), abs=0.00501)
        assert item.ranks.index(1.0) + 1 in (1, 2, 3)
    assert lot.certainty.drivers == ()


def test_probability_of_each_outcome(tender_case: Any, verdict_of: Callable[..., Verdict]) -> None:
    """Ra 81 +- 2 against 80: Phi(1) = 0.8413 (normal tables)."""
    verdict = verdict_of(
        "a",
        VerdictWord.PASS,
        value=Decimal(81),
        margin=Decimal(1),
        probability=Decimal("0.8413"),
        status="buyer",
    )
    case = replace(tender_case, verdicts=(verdict,)).with_settings("tender", trials=50_000)
    sure = {item.lamp_id: item for item in sure_of(case).bids}
    assert sure["a"].outcomes[Outcome.ADMISSIBLE] == pytest.approx(0.8413, abs=0.007)
    assert sure["a"].not_ranked == pytest.approx(1 - 0.8413, abs=0.007)
    assert sure["b"].outcomes[Outcome.ADMISSIBLE] == 1.0
    asked = {item.lamp_id: item for item in sure_of(case.with_bid("a", laboratory="")).bids}
    assert asked["a"].outcomes[Outcome.ADMISSIBLE] == 0.0
    assert asked["a"].outcomes[Outcome.TO_CLARIFY] == pytest.approx(0.8413, abs=0.007)


def test_a_bid_that_fails_for_certain_is_never_ranked(
    tender_case: Any, verdict_of: Callable[..., Verdict]
) -> None:
    failed = verdict_of("c", VerdictWord.FAIL, status="buyer", probability=None)
    sure = {item.lamp_id: item for item in sure_of(replace(tender_case, verdicts=(failed,))).bids}
    assert sure["c"].outcomes[Outcome.NOT_ADMISSIBLE] == 1.0
    assert sure["c"].not_ranked == 1.0
    assert sure["c"].total_low is None
