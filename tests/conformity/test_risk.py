"""Global risks against the bivariate normal law."""

from __future__ import annotations

import math
from dataclasses import replace
from decimal import Decimal

import pytest
from scipy import stats

from generator.conformity.decision_rule import rule_text
from generator.conformity.risk import campaign_risks, global_risk
from generator.records.risk import CampaignRisk
from generator.records.settings import Decision
from generator.records.verdict import Basis, Verdict, VerdictWord


@pytest.mark.parametrize(
    ("acceptance", "consumers", "producers"),
    [(120.0, 0.0122, 0.0325), (121.5, 0.0029, 0.1035), (123.0, 0.0003, 0.2280)],
)
def test_prior_125_3_against_limit_120(
    acceptance: float, consumers: float, producers: float
) -> None:
    # JCGM 106:2012, clause 9.5 formulas; numbers computed apart for a limit of 120, u = 1.5.
    found = global_risk(125.0, 3.0, 1.5, (120.0, math.inf), (acceptance, math.inf))
    assert found.consumers == pytest.approx(consumers, abs=5e-5)
    assert found.producers == pytest.approx(producers, abs=5e-5)


@pytest.mark.parametrize("acceptance", [118.0, 120.0, 122.0])
def test_agrees_with_the_bivariate_normal_law(acceptance: float) -> None:
    found = global_risk(125.0, 3.0, 1.5, (120.0, math.inf), (acceptance, math.inf))
    together = stats.multivariate_normal([125.0, 125.0], [[9.0, 9.0], [9.0, 11.25]])
    both_low = float(together.cdf([120.0, acceptance]))
    low = float(stats.norm(125.0, 3.0).cdf(120.0))
    rejected = float(stats.norm(125.0, math.sqrt(11.25)).cdf(acceptance))
    assert found.consumers == pytest.approx(low - both_low, abs=1e-6)
    assert found.producers == pytest.approx(rejected - both_low, abs=1e-6)


def test_two_sided_interval_by_symmetry() -> None:
    both = global_risk(0.0, 1.0, 0.5, (-1.0, 1.0), (-1.0, 1.0))
    upper = global_risk(0.0, 1.0, 0.5, (-math.inf, 1.0), (-math.inf, 1.0))
    assert both.consumers < 2 * upper.consumers
    assert both.consumers == pytest.approx(2 * upper.consumers, rel=0.05)


VERDICT = Verdict(
    lamp_id="L1",
    clause="c",
    title="t",
    regime="r",
    quantity="ra",
    unit="",
    basis=Basis.DETERMINED,
    value=Decimal(82),
    expanded_uncertainty=Decimal(1),
    limit=Decimal(80),
    comparison="at least",
    margin=Decimal(2),
    verdict=VerdictWord.PASS,
    source="s",
    status="read",
)


def verdicts(*margins: str, rule: str = "") -> list[Verdict]:
    return [
        replace(VERDICT, lamp_id=f"L{number}", margin=Decimal(margin), rule=rule)
        for number, margin in enumerate(margins)
    ]


def test_campaign_prior_is_the_spread_less_the_measurement() -> None:
    (risk,) = campaign_risks(verdicts("0", "2", "4", "6"), Decision())
    # mean 3, s^2 = 20/3, u = 0.5: prior variance 20/3 - 1/4
    assert risk.mean_margin == 3
    assert risk.margin_spread == pytest.approx(Decimal("2.53311"), abs=Decimal("0.000005"))
    wanted = global_risk(3.0, math.sqrt(20 / 3 - 0.25), 0.5, (0.0, math.inf), (0.0, math.inf))
    assert risk.consumers_risk == Decimal(f"{wanted.consumers:.4f}")
    assert risk.producers_risk == Decimal(f"{wanted.producers:.4f}")


def risk_under(rule: str) -> CampaignRisk:
    decision = Decision.model_validate({"rule": rule})
    given = verdicts("0", "2", "4", "6", rule=rule_text(decision))
    (risk,) = campaign_risks(given, decision)
    assert risk.rule == rule_text(decision)
    return risk


def test_a_guard_band_trades_consumers_for_producers_risk() -> None:
    names = ("guarded acceptance", "conformance probability", "simple acceptance")
    risks = [risk_under(name) for name in names]
    consumers = [risk.consumers_risk for risk in risks]
    producers = [risk.producers_risk for risk in risks]
    assert consumers == sorted(consumers)  # type: ignore[type-var]  # none is None here
    assert producers == sorted(producers, reverse=True)  # type: ignore[type-var]  # the same
    assert len(set(consumers)) == len(set(producers)) == 3


def test_a_clause_that_is_its_own_rule_keeps_it() -> None:
    given = verdicts("0", "2", "4", "6", rule="the act itself")
    (own,) = campaign_risks(given, Decision(rule="guarded acceptance"))
    assert own.consumers_risk == risk_under("simple acceptance").consumers_risk
    assert own.rule == "the act itself"


def test_too_few_lamps_and_no_spread_are_said() -> None:
    (few,) = campaign_risks(verdicts("0", "2"), Decision())
    assert few.consumers_risk is None
    assert "fewer than 3 lamps" in few.reason
    (same,) = campaign_risks(verdicts("2", "2", "2"), Decision())
    assert same.consumers_risk is None
    assert "no more than the uncertainty" in same.reason


def test_declared_values_carry_no_risk() -> None:
    declared = [replace(item, basis=Basis.DECLARED) for item in verdicts("0", "2", "4")]
    assert campaign_risks(declared, Decision()) == ()
