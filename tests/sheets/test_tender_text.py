"""Numbers of a tender in words, its drawings, and what a report must hold."""

from __future__ import annotations

import re
from decimal import Decimal

import pytest

from generator.records.tender import SensitivityBar
from generator.sheets.drawings.rank_chances import RankChances, draw_rank_chances
from generator.sheets.drawings.tornado import draw_tornado
from generator.sheets.tender_text import (
    amount,
    chance,
    criterion_value,
    input_value,
    significant,
    worded,
)
from generator.sheets.themes import palette


def test_money_is_rounded_half_up_with_two_decimals() -> None:
    assert amount(Decimal("2.345")) == "2.35"
    assert amount(Decimal("38028.3239")) == "38\u00a0028.32"
    assert amount(Decimal("-0.5")) == "\u22120.50"
    assert amount(None) == "–"


@pytest.mark.parametrize(
    ("probability", "text"),
    [
        (0.0, "0.0 %"),
        (0.0004, "< 0.1 %"),
        (0.814, "81.4 %"),
        (0.9999, "> 99.9 %"),
        (1.0, "100.0 %"),
    ],
)
def test_what_is_not_certain_never_reads_as_certain(probability: float, text: str) -> None:
    assert chance(probability) == text


def test_significant_digits_and_units() -> None:
    assert significant(Decimal("5.313566847")) == "5.314"
    assert significant(Decimal(33000)) == "33\u00a0000"
    assert significant(Decimal(0)) == "0"
    assert input_value("tariff", Decimal("0.2448"), "EUR") == "0.2448 EUR/kWh"
    assert input_value("discount rate", Decimal("0.03"), "EUR") == "3.000 %"
    assert criterion_value("life_cycle_cost", Decimal("1.005"), "EUR") == "1.01 EUR"


def test_arithmetic_is_worded_for_people() -> None:
    text = "percent_flicker: 100 x 2 / 4 - 1"
    assert worded(text) == "percent flicker (modulation depth): 100 × 2 / 4 − 1"


def test_tornado_bars_end_where_the_costs_are() -> None:
    bars = (
        SensitivityBar("tariff", "EUR/kWh", *map(Decimal, ("0.2", "0.3", "80", "120"))),
        SensitivityBar("life", "h", *map(Decimal, ("8", "12", "100", "100"))),
    )
    svg = draw_tornado(bars, 100.0, "EUR", "title & words", palette("tender"))
    found = re.findall(r'<rect x="([\d.]+)" y="[\d.]+" width="([\d.]+)"', svg)
    (left, first), (start, second) = [(float(x), float(width)) for x, width in found]
    assert first == pytest.approx(second, abs=0.2)  # 20 to either side; one decimal is written
    assert left + first == pytest.approx(start, abs=0.2)
    assert "no change" in svg
    assert "title &amp; words" in svg


def test_parts_of_the_chances_fill_the_bar() -> None:
    chances = [RankChances("<A>", (0.7, 0.2), 0.1), RankChances("B", (0.3, 0.7), 0.0)]
    svg = draw_rank_chances(chances, "title", palette("tender"))
    widths = [float(width) for width in re.findall(r'<rect [^>]*width="([\d.]+)"', svg)]
    full = 520 - 236 - 12
    assert sum(widths[:3]) == pytest.approx(full - 3 * 0.8, abs=0.3)
    assert (widths[0] + 0.8) / (widths[1] + 0.8) == pytest.approx(3.5, rel=0.003)
    assert "&lt;A&gt;" in svg
