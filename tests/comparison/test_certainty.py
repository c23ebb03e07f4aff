"""Rank probabilities against closed forms; swaps against roots; the same seed, the same answer."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import replace
from decimal import Decimal
from typing import Any

import numpy as np
import pytest
from scipy.stats import norm

from generator.comparison.certainty.draws import conforming, drawn_inputs
from generator.comparison.certainty.scene import COMMON, Entry, Scene, evaluated
from generator.comparison.cost.basis import LampBasis, LampNumbers, use_numbers
from generator.records.figure import Figure, Grade
from generator.records.tender import Certainty, LotResult, Outcome
from generator.records.tender_settings import TenderAward, TenderUse
from generator.records.verdict import Verdict, VerdictWord

RA_ALONE = {
    "decimals": 6,  # so fine that rounding ties no two bids
    "criteria": [
        {
            "quantity": "ra",
            "weight_percent": 100,
            "better": "higher",
            "method": "linear",
            "full_score_at": 200,
            "zero_score_at": 0,
        }
    ],
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
    ).with_settings("award", decimals=6)
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


def test_trials_rank_by_rounded_totals_and_the_tie_rule(tender_case: Any) -> None:
    """Ra 81.001 and 81 are equal at two decimals; the cheaper one is first, as in the award."""
    case = two_bids(tender_case, ("81.001", "0"), ("81", "0")).with_settings(
        "award", decimals=2, tie_rule="lower price"
    )
    lot = lot_of(case)
    assert lot.award is not None
    assert lot.certainty is not None
    assert lot.award.winners == ("b",)  # 4.50 against 6.00
    assert [(item.lamp_id, item.ranks) for item in lot.certainty.bids] == [
        ("b", (1.0, 0.0)),
        ("a", (0.0, 1.0)),
    ]


def test_a_rise_that_is_drawn_grows_from_year_to_year() -> None:
    """Closed form of the growing annuity: 2 % a year, and 1 % a year more where so drawn."""
    numbers = LampNumbers(Decimal(6), Decimal(8), Decimal(0), Decimal(30_000), Decimal(1))
    entry = Entry("a", LampBasis("a", numbers, None, {}, (), (), ()), {}, {})
    use = TenderUse(
        hours_per_year=Decimal(2000),
        tariff_per_kwh=Decimal("0.25"),
        price_rise_percent=Decimal(2),
        discount_rate_percent=Decimal(4),
        years=10,
        currency="EUR",
    )
    award = TenderAward(tie_rule="lower life-cycle cost")
    scene = Scene((entry,), award, use_numbers(use), 10, 100, None)
    drawn = {("price rise", COMMON): np.array([1.0, 1.01])}
    (costs,) = evaluated(scene, drawn, 2).tie_values
    for cost, growth in zip(costs, (1.02, 1.02 * 1.01), strict=True):
        step = growth / 1.04
        annuity = step * (1 - step**10) / (1 - step)
        assert cost == pytest.approx(600 + 0.25 * 1600 * annuity, rel=1e-12)


def test_expanded_uncertainties_are_drawn_at_half_their_width() -> None:
    """Stated for k = 2: 20 % is a standard deviation of 0.1, 2 points one of 0.01."""
    life = Figure("a", "", "l70b50_h", Decimal(20_000), Grade.DECLARED, "m")
    basis = LampBasis("a", None, None, {"life_h": life}, (), (), ())
    scene = Scene((Entry("a", basis, {}, {}),), TenderAward(), None, 0, 1, None)
    use = TenderUse(
        tariff_uncertainty_percent=Decimal(20),
        price_rise_uncertainty_points=Decimal(2),
        life_uncertainty_percent=Decimal(25),
    )
    drawn = drawn_inputs(scene, use, 3, 100_000)
    for key, mean, deviation in (
        (("tariff", COMMON), 1, 0.1),
        (("price rise", COMMON), 1, 0.01),
        (("life_h", "a"), 20_000, 2500),
    ):
        # standard error of a deviation from 100 000 trials: 0.22 %; four of them
        assert np.mean(drawn[key]) == pytest.approx(mean, abs=4 * deviation / 316)
        assert np.std(drawn[key]) == pytest.approx(deviation, rel=0.009)


@pytest.mark.parametrize("comparison", ["at least", "above", "at most", "below", "within"])
def test_a_limit_is_met_as_often_as_its_probability_says(
    verdict_of: Callable[..., Verdict], comparison: str
) -> None:
    verdict = verdict_of("a", VerdictWord.PASS, comparison=comparison, probability=Decimal("0.9"))
    met = conforming((verdict,), 5, 100_000)
    assert np.mean(met) == pytest.approx(0.9, abs=4 * math.sqrt(0.09 / 100_000))


def test_one_draw_of_a_quantity_serves_both_sides(verdict_of: Callable[..., Verdict]) -> None:
    """What is above a limit in a trial is not below it in the same trial."""
    sides = [
        verdict_of("a", VerdictWord.PASS, comparison=words, probability=Decimal("0.5"))
        for words in ("at least", "at most")
    ]
    assert not np.any(conforming(sides, 5, 1000))


def test_drivers_come_widest_first(tender_case: Any) -> None:
    shares = [item.share for item in sure_of(tender_case).drivers]
    assert len(shares) > 1
    assert shares == sorted(shares, reverse=True)
