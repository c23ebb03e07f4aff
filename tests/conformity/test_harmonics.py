"""IEC 61000-3-2 class C by edition and power, with made-up harmonics at the limits."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from decimal import Decimal
from typing import Any

import pytest

from generator.records.verdict import Verdict

VerdictOf = Callable[[Mapping[str, Any], str, str], Verdict]

OPTION_A = {3: "3.4", 5: "1.9", 7: "1.0", 9: "0.5", 11: "0.35"}
OPTION_C = {"thd_current_percent": "70", "h2_percent": "5"} | {
    f"h{order}_percent": limit
    for order, limit in {3: "35", 5: "25", 7: "30", 9: "20", 11: "20"}.items()
}


def per_watt(third: str = "3.4") -> dict[str, list[str]]:
    """Milliampere per watt within option A, the third order as given."""
    found = {f"h{order}_ma_per_w": [limit] for order, limit in OPTION_A.items()}
    found |= {f"h{order}_ma_per_w": ["0.09"] for order in range(13, 40, 2)}
    return found | {"h3_ma_per_w": [third]}


def percent(**changed: str) -> dict[str, list[str]]:
    """Percent of the fundamental on the limits of option C."""
    return {name: [value] for name, value in {**OPTION_C, **changed}.items()}


def small(units: Mapping[str, Any], power: str = "9") -> dict[str, Any]:
    return {
        "regimes": ["IEC 61000-3-2 edition 5"],
        "declared": {"power_w": power},
        "units": units,
    }


CLAUSE = "iec-61000-3-2-edition-5-harmonics-5-to-25-w"


def test_option_a_holds_on_its_limits(verdict_of: VerdictOf) -> None:
    verdict = verdict_of(small(per_watt() | percent(h3_percent="80")), CLAUSE, "determined")
    assert verdict.verdict == "pass"
    assert "Option A" in verdict.note or "option A" in verdict.note
    assert verdict.margin == 0


def test_option_c_holds_where_a_does_not(verdict_of: VerdictOf) -> None:
    verdict = verdict_of(small(per_watt("3.41") | percent()), CLAUSE, "determined")
    assert verdict.verdict == "pass"
    assert "option C" in verdict.note


@pytest.mark.parametrize("quantity", OPTION_C)
def test_option_c_is_missed_just_beyond_each_limit(verdict_of: VerdictOf, quantity: str) -> None:
    units = per_watt("3.41") | percent(**{quantity: f"{OPTION_C[quantity]}.1"})
    verdict = verdict_of(small(units), CLAUSE, "determined")
    assert verdict.verdict == "inconclusive"
    assert "Options A and C do not hold" in verdict.note


def test_option_b_needs_the_waveform(verdict_of: VerdictOf) -> None:
    units = per_watt("3.41") | percent(h3_percent="80", h5_percent="50")
    verdict = verdict_of(small(units), CLAUSE, "determined")
    assert verdict.verdict == "inconclusive"
    assert "not decidable without the waveform" in verdict.note


ANGLES = {
    "current_start_deg": "60",
    "current_last_peak_deg": "65",
    "current_end_deg": "90",
}


def with_angles(**changed: str) -> dict[str, list[str]]:
    """Neither option A nor C; third and fifth order, and the angles, on the limits of option B."""
    units = {**ANGLES, **changed}
    orders = percent(h3_percent="86", h5_percent="61")
    return per_watt("3.41") | orders | {name: [value] for name, value in units.items()}


def test_option_b_holds_on_its_limits(verdict_of: VerdictOf) -> None:
    verdict = verdict_of(small(with_angles()), CLAUSE, "determined")
    assert verdict.verdict == "pass"
    assert "option B" in verdict.note
    assert verdict.margin == 0


@pytest.mark.parametrize(
    "changed",
    [
        {"current_start_deg": "60.1"},
        {"current_last_peak_deg": "65.1"},
        {"current_end_deg": "89.9"},
    ],
)
def test_option_b_is_missed_just_beyond_each_angle(
    verdict_of: VerdictOf, changed: dict[str, str]
) -> None:
    verdict = verdict_of(small(with_angles(**changed)), CLAUSE, "determined")
    assert verdict.verdict == "fail"


def test_a_current_that_ends_too_soon_is_shown_against_a_lower_limit(
    verdict_of: VerdictOf,
) -> None:
    units = with_angles(current_end_deg="89.5") | {"h3_ma_per_w": ["5"]}
    verdict = verdict_of(small(units), CLAUSE, "determined")
    assert (verdict.quantity, verdict.unit) == ("current_end_deg", "°")
    assert verdict.comparison == "at least"
    assert verdict.limit == 90
    assert verdict.margin == Decimal("-0.5")


@pytest.mark.parametrize("absent", ANGLES)
def test_option_b_needs_all_three_angles(verdict_of: VerdictOf, absent: str) -> None:
    units = with_angles()
    del units[absent]
    verdict = verdict_of(small(units), CLAUSE, "determined")
    assert verdict.verdict == "inconclusive"
    assert "not decidable without the waveform" in verdict.note


@pytest.mark.parametrize("changed", [{"h3_percent": "86.1"}, {"h5_percent": "61.1"}])
def test_no_option_is_left(verdict_of: VerdictOf, changed: dict[str, str]) -> None:
    units = per_watt("3.41") | percent(**{"h3_percent": "80", **changed})
    verdict = verdict_of(small(units), CLAUSE, "determined")
    assert verdict.verdict == "fail"
    assert verdict.margin is not None
    assert verdict.margin < 0


@pytest.mark.parametrize("order", range(13, 40, 2))
def test_option_a_from_order_13_is_a_constant_over_the_order(
    verdict_of: VerdictOf, order: int
) -> None:
    on, over = f"{3.85 / order:.6f}", f"{3.85 / order + 1e-4:.6f}"
    bad = percent(h3_percent="90")
    within = per_watt() | {f"h{order}_ma_per_w": [f"{float(on) - 1e-6:.6f}"]} | bad
    beyond = per_watt() | {f"h{order}_ma_per_w": [over]} | bad
    assert verdict_of(small(within), CLAUSE, "determined").verdict == "pass"
    assert verdict_of(small(beyond), CLAUSE, "determined").verdict == "fail"


@pytest.mark.parametrize(
    ("power", "word"), [("4.9", "pass"), ("5", "fail"), ("25", "fail"), ("25.1", "not applicable")]
)
def test_power_bands(verdict_of: VerdictOf, power: str, word: str) -> None:
    units = per_watt("3.41") | percent(h3_percent="90")
    verdict = verdict_of(small(units, power), CLAUSE, "determined")
    assert verdict.verdict == word
    if word == "pass":
        assert "No limit below 5 W" in verdict.note


def test_missing_harmonics_are_not_measured(verdict_of: VerdictOf) -> None:
    verdict = verdict_of(small({"h3_percent": ["30"]}), CLAUSE, "determined")
    assert verdict.verdict == "not measured"


def large(edition: int, **changed: str) -> dict[str, Any]:
    orders = {2: "2", 3: "27", 5: "10", 7: "7", 9: "5"} | dict.fromkeys(range(11, 40, 2), "3")
    units = {f"h{order}_percent": [value] for order, value in orders.items()}
    units |= {"power_factor": ["0.9"]}
    units |= {name: [value] for name, value in changed.items()}
    return {
        "regimes": [f"IEC 61000-3-2 edition {edition}"],
        "declared": {"power_w": "30"},
        "units": units,
    }


@pytest.mark.parametrize("edition", [4, 5])
@pytest.mark.parametrize("order", [2, 5, 7, 9, 11, 23, 39])
def test_table_2(verdict_of: VerdictOf, edition: int, order: int) -> None:
    clause = f"iec-61000-3-2-edition-{edition}-harmonics-above-25-w"
    assert verdict_of(large(edition), clause, "determined").verdict == "pass"
    over = large(edition, **{f"h{order}_percent": "10.1"})
    verdict = verdict_of(over, clause, "determined")
    assert verdict.verdict == "fail"
    assert verdict.quantity == f"h{order}_percent"


@pytest.mark.parametrize(("factor", "word"), [("0.9", "pass"), ("0.8999", "fail")])
def test_third_order_of_edition_4_goes_with_the_power_factor(
    verdict_of: VerdictOf, factor: str, word: str
) -> None:
    clause = "iec-61000-3-2-edition-4-third-harmonic-above-25-w"
    assert verdict_of(large(4, power_factor=factor), clause, "determined").verdict == word


def test_third_order_of_edition_5_is_indicative(verdict_of: VerdictOf) -> None:
    clause = "iec-61000-3-2-edition-5-third-harmonic-above-25-w"
    for value, said in (("27", "would meet it"), ("27.1", "would not meet it")):
        verdict = verdict_of(large(5, h3_percent=value), clause, "determined")
        assert verdict.verdict == "inconclusive"
        assert "Indicative only" in verdict.note
        assert said in verdict.note
