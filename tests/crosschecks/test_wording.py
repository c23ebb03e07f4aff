from __future__ import annotations

from decimal import Decimal

import pytest

from generator.crosschecks.wording import listed, named, number, worded


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [
        ("806", 5, "806"),
        ("8.10", 5, "8.10"),
        ("640.1972351", 5, "640.20"),
        ("12345678.9", 5, "12345679"),
        ("0.0004321987", 3, "0.000432"),
        ("8E+2", 5, "800"),
        ("0", 3, "0"),
        ("0.000", 3, "0"),
        ("165.8023", 3, "166"),
        ("99.999996", 5, "100.00"),
    ],
)
def test_numbers_are_short_and_without_exponent(value: str, digits: int, text: str) -> None:
    assert number(Decimal(value), digits) == text


def test_signed_numbers() -> None:
    assert number(Decimal(5), 3, signed=True) == "+5"
    assert number(Decimal(-5), 3, signed=True) == "\u22125"


def test_values_carry_the_unit_of_the_catalogue() -> None:
    assert worded("luminous_flux_lm", Decimal(806)) == "806 lm"
    assert worded("power_factor", Decimal("0.91")) == "0.91"
    assert worded("luminous_flux_lm", Decimal("640.1972351")) == "640.20 lm"


def test_names() -> None:
    assert named("L1") == "lamp L1"
    assert named("L1", "L1-2") == "lamp L1, unit L1-2"
    assert listed(list("abcdef")) == "a, b, c, d, e, f"
    assert listed(list("abcdefgh")) == "a, b, c, d, e, f and 2 more"
