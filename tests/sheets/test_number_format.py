"""Numbers as text."""

import re
from datetime import date
from decimal import Decimal

import pytest

from generator.language import say
from generator.language.messages import spoken_by
from generator.sheets.number_format import (
    date_words,
    decimals_for,
    declared_text,
    exact_text,
    limits_in,
    range_text,
    readable,
    rounded_up,
    shown,
    shown_margin,
    telling_decimals,
)


@pytest.mark.parametrize(
    ("uncertainty", "decimals"),
    [("1.9", 1), ("12", 0), ("0.31", 1), ("0.0297", 2), ("0.0249", 3), ("0.996", 1), ("230", 0)],
)
def test_digits_follow_the_uncertainty(uncertainty, decimals):
    # Two digits where the first is 1 or 2, else one; 0.996 rounds to 1.0 first.
    assert decimals_for(Decimal(uncertainty), 9) == decimals


def test_without_uncertainty_the_catalogue_decides():
    assert decimals_for(None, 3) == 3
    assert decimals_for(Decimal(0), 3) == 3


def test_writing():
    assert shown(Decimal("12345.678"), 1) == "12\u00a0345.7"
    assert shown(Decimal("1234.5"), 0) == "1235"
    assert shown(Decimal("-0.004"), 2) == "0.00"
    assert shown(Decimal("-1.25"), 1) == "\u22121.3"
    assert exact_text(Decimal("0.960")) == "0.960"


def test_a_rounded_value_never_crosses_its_limit():
    # 79.97 at one decimal would read 80.0, as if it met a limit of 80.
    value, limit = Decimal("79.97"), Decimal(80)
    assert shown(value, telling_decimals(value, [limit], 1)) == "79.97"
    assert telling_decimals(Decimal(80), [limit], 1) == 1
    assert telling_decimals(Decimal("2430.4"), limits_in("2430 to 2970"), 0) == 1


def test_a_quotient_of_declared_values_is_rounded_and_what_was_written_is_not():
    # 806 lm over 8.5 W
    quotient = Decimal("94.8235294118")
    assert declared_text(quotient) == "94.82"
    assert declared_text(quotient, [Decimal("94.822")]) == "94.824"
    assert declared_text(Decimal("8.874")) == "8.874"
    assert declared_text(Decimal(15000)) == "15\u00a0000"


def test_ranges_are_written_with_their_thousands_apart():
    assert range_text("60 to 82000") == "60 to 82\u00a0000"
    assert range_text("F") == "F"
    assert limits_in("2430 to 2970") == (Decimal(2430), Decimal(2970))
    assert limits_in("F") == ()


def test_long_numbers_of_a_trace_are_shortened_and_nothing_else():
    sentence = "0.9402046252 against 0.931149915095 (EU 2019/2020): margin \u22120.00905471010516."
    known = {Decimal("0.9402046252"): "0.940"}
    assert readable(sentence, 2, known) == (
        "0.940 against 0.9311 (EU 2019/2020): margin \u22120.009055."
    )
    assert readable("Declared 1.05, 725.4 lm, on 2021-09-01", 0) == (
        "Declared 1.05, 725.4 lm, on 2021-09-01"
    )


def test_an_uncertainty_never_reads_as_nought():
    # JCGM 100, 7.2.6: it may be rounded up.
    assert rounded_up(Decimal("0.004"), 1) == "0.1"


def test_margins_carry_their_sign_and_never_read_nought():
    assert shown_margin(Decimal("2.4"), 1) == "+2.4"
    assert shown_margin(Decimal("-0.03"), 1) == "\u22120.03"
    assert shown_margin(Decimal(0), 1) == "0.0"


def test_date_in_words():
    assert date_words(date(2021, 9, 1)) == "1\u00a0September 2021"


class DecimalComma:
    """Says every pattern in capitals, places aside, and numbers with a comma."""

    def pattern(self, message):
        return re.sub(r"\{\w+(?::[^}]*)?\}|[a-z]+", _upper, message.singular)

    def number(self, text):
        return text.replace(".", ",")

    def day(self, day):
        return day.isoformat()


def _upper(match):
    return match[0] if match[0].startswith("{") else match[0].upper()


def test_numbers_take_the_notation_of_the_language():
    with spoken_by(DecimalComma()):
        assert shown(Decimal("12345.678"), 1) == "12\u00a0345,7"
        assert exact_text(Decimal("-0.50")) == "\u22120,50"
        assert shown_margin(Decimal("0.25"), 2) == "+0,25"
        assert rounded_up(Decimal("0.0301"), 2) == "0,04"
        assert range_text("0.5 to 82000") == "0,5 TO 82\u00a0000"
        assert limits_in("0.5 to 82000") == (Decimal("0.5"), Decimal(82000))


def test_numbers_of_a_message_are_shortened_before_they_take_the_notation():
    step = say("the margin is {margin}, the limit {limit}", margin=Decimal("1.23456789"), limit=0.5)
    known = {Decimal("1.23456789"): "1.2"}
    assert readable(step, 2) == "the margin is 1.235, the limit 0.5"
    assert readable(step, 2, known) == "the margin is 1.2, the limit 0.5"
    with spoken_by(DecimalComma()):
        assert readable(step, 2) == "THE MARGIN IS 1,235, THE LIMIT 0,5"
        assert readable("of 1.23456789 in clause 4.1", 2) == "of 1,235 in clause 4.1"
