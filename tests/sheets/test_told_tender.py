"""The tender in another language: every name that the comparison uses has words."""

from __future__ import annotations

from datetime import date
from decimal import Decimal
from typing import get_args

import pytest

from generator.comparison.cost.basis import existing_basis, use_assumptions
from generator.language import Message, say
from generator.language.messages import spoken_by
from generator.records.tender import AwardResult, BidScore, CostItem, Outcome, SubScore
from generator.records.tender_settings import ExistingLamp, TenderAward, TenderUse
from generator.sheets.tender_award import function_words, reason_text
from generator.sheets.tender_text import chance, worded
from generator.sheets.tender_words import (
    ASSUMPTION_NAMES,
    COST_ITEMS,
    EMISSION_BASES,
    OUTCOMES,
    PRICES,
    RATES,
    TIE_RULES,
)


class Shouting:
    """Says every pattern in capitals, places apart, and numbers with a comma."""

    def pattern(self, message: Message) -> str:
        text = message.plural if message.plural and message.counted != 1 else message.singular
        return text if "{" in text else text.upper()

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


def test_every_outcome_item_rule_and_kind_of_price_has_words() -> None:
    assert {outcome.value for outcome in Outcome} == set(OUTCOMES)
    assert set(COST_ITEMS) == set(CostItem)
    assert set(TIE_RULES) == set(get_args(TenderAward.model_fields["tie_rule"].annotation))
    kinds = set(get_args(TenderUse.model_fields["prices"].annotation))
    assert set(PRICES) == set(RATES) == kinds


def test_english_words_are_the_names_themselves() -> None:
    """Tables of data and sheets in English name an item alike."""
    for words in (OUTCOMES, COST_ITEMS, TIE_RULES, EMISSION_BASES, RATES):
        assert {str(key): str(said) for key, said in words.items()} == {
            str(key): str(key) for key in words
        }
    assert {name: str(said) for name, said in ASSUMPTION_NAMES.items()} == {
        name: name.replace("_", " ") for name in ASSUMPTION_NAMES
    }


def test_every_assumption_of_the_cost_study_has_words() -> None:
    use = TenderUse(
        hours_per_year=2000,
        tariff_per_kwh=Decimal("0.3"),
        price_rise_percent=Decimal(1),
        discount_rate_percent=Decimal(3),
        currency="EUR",
        years=5,
        survival_stated_at_h=Decimal(3000),
        carbon_price_per_t=Decimal(80),
    )
    lamp = ExistingLamp(
        id="old",
        title="Old lamp",
        power_w=Decimal(45),
        life_h=Decimal(2000),
        luminous_flux_lm=Decimal(600),
        unit_price=Decimal(1),
    )
    inputs = (*use_assumptions(use), *existing_basis(lamp).assumptions)
    assert len(inputs) > 12
    plain = {item.name for item in inputs if not isinstance(item.name, Message)}
    assert plain == set(ASSUMPTION_NAMES)


def test_a_criterion_is_named_wherever_a_language_puts_it() -> None:
    """A name may be part of a word that stands before it: ``ra`` in ``gradual``."""
    part = SubScore("ra", Decimal(80), "", Decimal(1), Decimal(1), Decimal(1), "")
    score = BidScore("L-01", (part,), Decimal(1), 1)
    function = say("gradual from 0 to {full}: {criterion}", full=100, criterion="ra")
    said = function_words(AwardResult((score,), (function,), "shared rank"))
    assert said == ("gradual from 0 to 100: general colour rendering index",)


def test_why_a_bid_has_no_rank_is_said_in_the_language() -> None:
    score = BidScore("L-01", (), None, None, reason=Outcome.NOT_ADMISSIBLE.value)
    assert reason_text(score) == "not admissible"
    with spoken_by(Shouting()):
        assert reason_text(score) == "NOT ADMISSIBLE"


@pytest.mark.parametrize(
    ("probability", "text"), [(0.0004, "< 0,1 %"), (0.814, "81,4 %"), (0.9999, "> 99,9 %")]
)
def test_chances_take_the_notation_of_the_language(probability: float, text: str) -> None:
    with spoken_by(Shouting()):
        assert chance(probability) == text


def test_names_inside_a_text_of_the_comparison_are_said_too() -> None:
    with spoken_by(Shouting()):
        text = say("no value for {name}: {first:.1f} x 2", name="life_cycle_cost", first=0.5)
        assert worded(text) == "no value for LIFE-CYCLE COST: 0,5 × 2"
