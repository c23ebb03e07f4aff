"""Decision rules against JCGM 106:2012 and a reference implementation of the normal law."""

from __future__ import annotations

from decimal import Decimal
from fractions import Fraction

import pytest
from scipy import stats

from generator.conformity.decision_rule import (
    Limits,
    acceptance_interval,
    conformance_probability,
    decide,
    rule_text,
)
from generator.records.settings import Decision
from generator.records.verdict import VerdictWord

F = Fraction


def limits(lower: str | None = None, upper: str | None = None) -> Limits:
    return Limits(F(lower) if lower else None, F(upper) if upper else None)


@pytest.mark.parametrize(
    ("value", "standard", "lower", "upper", "printed"),
    [
        # JCGM 106:2012, 7.4, kinematic viscosity of an oil (data quoted in a metrology article).
        ("13.6", "1.8", "12.5", "16.3", "0.66"),
        # JCGM 106:2012, 7.3.2, breakdown voltage of a diode, magnitudes; from memory.
        ("5.47", "0.05", "5.40", None, "0.92"),
        # JCGM 106:2012, 7.3.3, burst strength of a container; from memory.
        ("509.7", "8.6", "490", None, "0.99"),
    ],
)
def test_worked_examples_of_jcgm_106(
    value: str, standard: str, lower: str, upper: str | None, printed: str
) -> None:
    found = conformance_probability(F(value), 2 * F(standard), limits(lower, upper))
    assert found == pytest.approx(float(printed), abs=0.005)  # half the last printed digit


@pytest.mark.parametrize("value", ["119", "120", "122", "123.1", "118", "150"])
def test_probability_agrees_with_scipy(value: str) -> None:
    found = conformance_probability(F(value), F(3), limits("120", "125"))
    law = stats.norm(float(value), 1.5)
    assert found == pytest.approx(float(law.cdf(125) - law.cdf(120)), abs=1e-12)


def test_no_uncertainty_is_certainty() -> None:
    assert conformance_probability(F(120), F(0), limits("120")) == 1.0
    assert conformance_probability(F("119.9"), F(0), limits("120")) == 0.0


GUARDED = Decision(rule="guarded acceptance")


@pytest.mark.parametrize(
    ("value", "word", "said"),
    [
        ("123", VerdictWord.PASS, "within the guarded limits"),
        ("122.999", VerdictWord.INCONCLUSIVE, "conditional pass"),
        ("120", VerdictWord.INCONCLUSIVE, "conditional pass"),
        ("119.999", VerdictWord.INCONCLUSIVE, "conditional fail"),
        ("117", VerdictWord.INCONCLUSIVE, "conditional fail"),
        ("116.999", VerdictWord.FAIL, "beyond the limit"),
    ],
)
def test_guard_band_of_one_u(value: str, word: VerdictWord, said: str) -> None:
    # ILAC-G8:09/2019, 4.2.3: acceptance limit = tolerance limit -+ w, four statements.
    outcome = decide(F(value), F(3), limits("120"), GUARDED)
    assert outcome.word is word
    assert said in outcome.step
    assert outcome.margin == F(value) - 120


def test_guard_band_factor_scales() -> None:
    half = Decision(rule="guarded acceptance", guard_band_factor=Decimal("0.5"))
    assert decide(F("121.5"), F(3), limits("120"), half).word is VerdictWord.PASS
    assert decide(F("121.4"), F(3), limits("120"), half).word is VerdictWord.INCONCLUSIVE
    assert "0.5 U" in rule_text(half)


def test_guard_bands_that_cross_leave_nothing_to_accept() -> None:
    outcome = decide(F(122), F(3), limits("120", "124"), GUARDED)
    assert outcome.word is VerdictWord.INCONCLUSIVE


def test_simple_acceptance_takes_the_limit_itself() -> None:
    simple = Decision()
    assert decide(F(120), None, limits("120"), simple).word is VerdictWord.PASS
    assert decide(F("119.999"), None, limits("120"), simple).word is VerdictWord.FAIL
    below = Limits(upper=F(30), strict=True)
    assert decide(F(30), None, below, simple).word is VerdictWord.FAIL
    assert decide(F("29.99"), None, below, simple).word is VerdictWord.PASS


def test_simple_acceptance_still_gives_the_probability() -> None:
    outcome = decide(F(122), F(3), limits("120"), Decision())
    # 0.9088: normal law at 4/3 standard deviations.
    assert outcome.probability == pytest.approx(0.9088, abs=5e-5)


@pytest.mark.parametrize(
    ("value", "word"),
    [
        ("122.4673", VerdictWord.PASS),  # 1.6449 u above the limit: 95 %
        ("122.467", VerdictWord.INCONCLUSIVE),
        ("117.533", VerdictWord.INCONCLUSIVE),
        ("117.5327", VerdictWord.FAIL),
    ],
)
def test_conformance_probability_at_95_percent(value: str, word: VerdictWord) -> None:
    rule = Decision(rule="conformance probability")
    assert decide(F(value), F(3), limits("120"), rule).word is word


@pytest.mark.parametrize("rule", ["guarded acceptance", "conformance probability"])
def test_a_rule_without_uncertainty_is_inconclusive(rule: str) -> None:
    outcome = decide(F(200), None, limits("120"), Decision.model_validate({"rule": rule}))
    assert outcome.word is VerdictWord.INCONCLUSIVE
    assert outcome.probability is None
    assert "not known" in outcome.step


def test_acceptance_interval_moves_both_ends_inwards() -> None:
    moved = acceptance_interval(limits("120", "130"), F(2))
    assert (moved.lower, moved.upper) == (F(122), F(128))
