"""E_n and tolerances, worked by hand from the definitions in the module's docstring."""

from __future__ import annotations

from decimal import Decimal

import pytest

from generator.crosschecks.significance import (
    Reading,
    compared,
    half_digit,
    product,
    quotient,
    reading,
)
from generator.crosschecks.tolerances import TOLERANCES, tolerance
from generator.quantities import QUANTITIES
from generator.records.figure import Figure, Grade
from generator.records.finding import Severity

FLUX = tolerance("luminous_flux_lm")


def outcome(first: str, second: str, u_first: str | None = None, u_second: str | None = None):
    readings = [
        Reading(Decimal(value), None if u is None else Decimal(u))
        for value, u in ((first, u_first), (second, u_second))
    ]
    return compared(*readings, FLUX)


def test_e_n_of_a_three_four_five_triangle() -> None:
    result = outcome("107.5", "100", "3", "4")
    assert result.e_n == Decimal("1.5")
    assert result.allowance == 5
    assert result.severity is Severity.CONTRADICTION
    assert result.percent == Decimal("7.5")


@pytest.mark.parametrize(
    ("first", "severity"), [("105", None), ("105.01", Severity.CONTRADICTION), ("95", None)]
)
def test_e_n_of_exactly_one_still_agrees(first: str, severity: Severity | None) -> None:
    assert outcome(first, "100", "3", "4").severity is severity


@pytest.mark.parametrize(
    ("first", "severity"),
    [
        ("106", None),
        ("106.01", Severity.DOUBT),
        ("93.99", Severity.DOUBT),
        ("118", Severity.DOUBT),
        ("118.01", Severity.CONTRADICTION),
    ],
)
def test_default_tolerance_is_six_percent_and_gross_at_three_times(
    first: str, severity: Severity | None
) -> None:
    result = outcome(first, "100", "3")
    assert result.severity is severity
    assert result.e_n is None
    assert "default tolerance of 6 %" in result.basis


def test_a_known_uncertainty_above_the_tolerance_replaces_it() -> None:
    assert outcome("109", "100", "10").severity is None
    assert outcome("111", "100", "10").severity is Severity.DOUBT
    assert "one expanded uncertainty" in outcome("111", "100", "10").basis


def test_two_uncertainties_of_zero_do_not_make_an_e_n() -> None:
    result = outcome("104", "100", "0", "0")
    assert (result.severity, result.e_n) == (None, None)


def test_rounding_comes_off_the_difference_first() -> None:
    first = Reading(Decimal("106.4"), rounding=Decimal("0.5"))
    result = compared(first, Reading(Decimal(100)), FLUX)
    assert (result.excess, result.severity) == (Decimal("5.9"), None)


@pytest.mark.parametrize(
    ("text", "half"), [("806", "0.5"), ("0.05", "0.005"), ("8.10", "0.005"), ("8E+2", "0.5")]
)
def test_half_of_the_last_written_digit(text: str, half: str) -> None:
    assert half_digit(Decimal(text)) == Decimal(half)


def test_quotient_and_product_carry_relative_uncertainty() -> None:
    # 3 % and 4 % combine to 5 %
    flux = Reading(Decimal(800), Decimal(24), Decimal("0.5"))
    power = Reading(Decimal(8), Decimal("0.32"), Decimal("0.05"))
    ratio = quotient(flux, power)
    assert ratio.value == 100
    assert ratio.expanded == Decimal(5)
    assert ratio.rounding == Decimal("0.6875")  # 0.0625 % + 0.625 % of 100
    assert product(flux, power).expanded == Decimal(320)
    assert quotient(flux, Reading(Decimal(8))).expanded is None


def test_reading_of_figures() -> None:
    def figure(grade: Grade, value: Decimal | str | None, expanded: str | None = None) -> Figure:
        u = None if expanded is None else Decimal(expanded)
        return Figure("L1", "U", "power_w", value, grade, "m", u)

    assert reading(None) is None
    assert reading(figure(Grade.COMPUTED, None)) is None
    assert reading(figure(Grade.COMPUTED, "A")) is None
    assert reading(figure(Grade.COMPUTED, Decimal("8.1"))) == Reading(Decimal("8.1"))
    assert reading(figure(Grade.REPORTED, Decimal("8.1"), "0")) == Reading(
        Decimal("8.1"), None, Decimal("0.05")
    )


def test_words_give_difference_allowance_and_e_n() -> None:
    words = outcome("107.5", "100", "3", "4").words("lm")
    assert words == (
        "difference +7.5 lm (+7.5 %), allowed 5 lm (expanded uncertainties of both, k = 2), "
        "E_n = 1.5"
    )


def test_every_tolerance_states_reason_and_status() -> None:
    for name, row in TOLERANCES.items():
        assert row.reason, name
        assert row.source, name
        assert row.status in {"convention", "from memory, unconfirmed"}, name
    assert tolerance("ambient_temperature_c").status == "from memory, unconfirmed"
    assert "luminous_flux_lm" in QUANTITIES
    with pytest.raises(KeyError):
        tolerance("no_such_entry")
