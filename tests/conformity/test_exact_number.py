from __future__ import annotations

from decimal import Decimal
from fractions import Fraction

import pytest

from generator.conformity.exact_number import (
    decimal_of,
    mean_of,
    number_text,
    rounded,
    square_root,
)

F = Fraction


@pytest.mark.parametrize(
    ("number", "text"),
    [
        (F(1, 3), "0.333333333333"),
        (F(2, 3), "0.666666666667"),
        (F("9.67266"), "9.67266"),
        (F(85), "85"),
        (F(82000), "82000"),
        (F("0.00000001"), "0.00000001"),
        (F("-0.012"), "-0.012"),
        (F(0), "0"),
    ],
)
def test_decimal_of(number: Fraction, text: str) -> None:
    assert format(decimal_of(number), "f") == text


def test_number_text_has_a_minus_sign() -> None:
    assert number_text(F("-0.5")) == "−0.5"


@pytest.mark.parametrize(
    ("number", "step", "mode", "wanted"),
    [
        ("1.025", "0.01", "half up", "1.03"),
        ("1.025", "0.01", "half down", "1.02"),
        ("1.0249", "0.01", "half up", "1.02"),
        ("1.0251", "0.01", "half down", "1.03"),
        ("8.8", "1", "up", "9"),
        ("8.0", "1", "up", "8"),
        ("8.0000001", "1", "up", "9"),
        ("2650", "100", "half up", "2700"),
        ("2649.9", "100", "half up", "2600"),
        ("0.44", "0.1", "half up", "0.4"),
    ],
)
def test_rounded(number: str, step: str, mode: str, wanted: str) -> None:
    assert rounded(F(number), F(step), mode) == F(wanted)


def test_mean_is_exact() -> None:
    assert mean_of([F("0.1"), F("0.2")]) == F("0.15")
    assert mean_of([]) is None


def test_square_root_is_rounded_up() -> None:
    assert square_root(F(9)) == 3
    assert F(2) < square_root(F(2)) ** 2 < F(2) + F(1, 10**10)
    assert decimal_of(square_root(F(2))) == Decimal("1.41421356238")
