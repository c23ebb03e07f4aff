"""Clauses in words, in English and said again."""

from __future__ import annotations

from datetime import date
from decimal import Decimal
from enum import StrEnum

import pytest

from generator.language import Message, told
from generator.language.messages import spoken_by
from generator.records.clause import Condition, DatedValue, Slope, Tolerance
from generator.records.clause_words import FORMULAS
from generator.records.figure import GRADE_WORDS, Grade
from generator.records.verdict import BASIS_WORDS, VERDICT_WORDS, Basis, VerdictWord

D = Decimal


class Marker:
    def pattern(self, message: Message) -> str:
        return {
            "at least {limit}": "mindestens {limit}",
            "the {quantity}": "{quantity}",
            "the declared {quantity}": "{quantity} (angegeben)",
            "{subject} is {value}": "{subject}: {value}",
            "{first} and {second}": "{first} und {second}",
            "below {limit}": "unter {limit}",
            "beam angle": "Halbwertswinkel",
            "steps": "Stufen",
        }.get(message.singular, message.singular)

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


@pytest.mark.parametrize(
    ("condition", "text"),
    [
        (Condition("directional", equals=True), "the lamp is directional"),
        (Condition("connected", equals=False), "the lamp is not connected"),
        (Condition("cap", one_of=("E27", "E14", "B22")), "the cap is E27, E14 or B22"),
        (Condition("power_w", at_least=D(5), at_most=D(5)), "the active power is 5 W"),
        (
            Condition("declared_power_w", at_least=D(5), below=D("25.5")),
            "the declared active power is at least 5 W and below 25.5 W",
        ),
        (
            Condition("duv", above=D("-0.006")),
            "the distance from the Planckian locus is above −0.006",
        ),
    ],
)
def test_a_condition_in_words(condition: Condition, text: str) -> None:
    assert condition.text == text


@pytest.mark.parametrize(
    ("value", "unit", "text"),
    [
        (DatedValue(no_limit=True), "W", "no limit"),
        (DatedValue(value=D("1E+3")), "lm", "1000 lm"),
        (DatedValue(value="F"), "", "F"),
        (DatedValue(lower=D("-0.006"), upper=D("0.006")), "", "−0.006 to 0.006"),
        (DatedValue(tolerance=Tolerance()), "W", "the declared value"),
        (DatedValue(tolerance=Tolerance(plus=D(0))), "W", "the declared value"),
        (
            DatedValue(tolerance=Tolerance(plus_percent=D(5), minus_percent=D(5))),
            "W",
            "the declared value ± 5 %",
        ),
        (
            DatedValue(tolerance=Tolerance(plus=D("0.1"), minus_percent=D(10))),
            "W",
            "the declared value + 0.1 W, − 10 %",
        ),
        (
            DatedValue(value=D(10), slopes=(Slope("power_factor", D(-30)),)),
            "%",
            "10 − 30 × power factor, in %",
        ),
        (
            DatedValue(value=D(0), slopes=(Slope("ra", D("-2.3")),)),
            "",
            "− 2.3 × general colour rendering index",
        ),
        (DatedValue(), "W", "by formula"),
    ],
)
def test_a_value_in_words(value: DatedValue, unit: str, text: str) -> None:
    assert value.text(unit) == text


def test_conditions_are_said_in_the_order_of_the_language() -> None:
    condition = Condition("declared_beam_angle_deg", at_least=D("22.5"), below=D(60))
    with spoken_by(Marker()):
        said = told(condition.text)
    assert said == "Halbwertswinkel (angegeben): mindestens 22,5 ° und unter 60 °"


def test_every_formula_and_every_word_of_a_verdict_is_a_message() -> None:
    words: list[tuple[StrEnum, str]]
    words = [*VERDICT_WORDS.items(), *BASIS_WORDS.items(), *GRADE_WORDS.items()]
    assert [key for key, _ in words] == [*VerdictWord, *Basis, *Grade]
    assert all(isinstance(word, Message) and word == key.value for key, word in words)
    assert all(isinstance(item.text, Message) for item in FORMULAS.values())
