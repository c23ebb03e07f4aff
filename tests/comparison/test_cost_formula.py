"""The cost formula against published factors, closed forms and worked examples."""

from __future__ import annotations

from dataclasses import fields, replace
from decimal import Decimal

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray
from scipy.integrate import quad

from generator.comparison.cost.formula import (
    CostInputs,
    cash_flows,
    life_cycle_cost,
    maintained_share,
    present_value_factor,
    price_path,
)
from generator.records.tender import CostItem

NO_COSTS = dict.fromkeys(
    ("installation", "labour", "maintenance", "end_of_life", "standby_power_w", "standby_hours"),
    Decimal(0),
)


def inputs(**given_values: object) -> CostInputs[Decimal]:
    values: dict[str, object] = {
        **NO_COSTS,
        "lamps": Decimal(1),
        "price": Decimal(0),
        "power_w": Decimal(1000),
        "hours": Decimal(1),
        "tariffs": (Decimal(0),),
        "life_h": Decimal(10**6),
        "failing_share": Decimal(0),
        "discount_rate": Decimal(0),
        "carbon_per_kwh": Decimal(0),
    }
    return CostInputs(**{**values, **given_values})  # type: ignore[arg-type] # by name


def as_floats(exact: CostInputs[Decimal]) -> CostInputs[NDArray[np.float64]]:
    values = {}
    for item in fields(exact):
        value = getattr(exact, item.name)
        values[item.name] = (
            tuple(np.array([float(v)]) for v in value)
            if isinstance(value, tuple)
            else np.array([float(value)])
        )
    return CostInputs(**values)


@pytest.mark.parametrize(
    ("rate", "growth", "years", "printed"),
    [
        ("0.04", "0", 10, "8.1109"),  # annuity tables, 4 %, 10 years
        ("0.04", "0.02", 10, "9.0010"),  # growing annuity
        ("0.04", "0.04", 10, "10"),  # growth cancels discount
        ("0.03", "0", 8, "7.0197"),  # annuity tables, 3 %, 8 years
    ],
)
def test_present_value_factors(rate: str, growth: str, years: int, printed: str) -> None:
    factor = present_value_factor(Decimal(rate), Decimal(growth), years)
    assert abs(factor - Decimal(printed)) <= Decimal("0.00005")


@pytest.mark.parametrize("rate", ["0.01", "0.07", "0.5", "-0.02"])
def test_present_value_factor_is_the_closed_form_of_an_annuity(rate: str) -> None:
    d = Decimal(rate)
    closed = (1 - (1 + d) ** -17) / d
    assert abs(present_value_factor(d, Decimal(0), 17) - closed) < Decimal("1e-20")


def test_net_present_value_of_the_numpy_manual() -> None:
    """numpy 1.16 manual, numpy.npv: npv(0.281, [-100, 39, 59, 55, 20]) = -0.00847859163845488."""
    flows = inputs(
        price=Decimal(-100),
        tariffs=tuple(Decimal(v) for v in (39, 59, 55, 20)),
        discount_rate=Decimal("0.281"),
    )
    assert float(life_cycle_cost(flows, 4)) == pytest.approx(-0.0084785916384548798, abs=1e-12)


@pytest.mark.parametrize(
    ("power", "price", "printed"), [("17", "7.5", "43.31"), ("60", "7.5", "133.87")]
)
def test_worked_example_of_two_lamps(power: str, price: str, printed: str) -> None:
    """Course solution, compact fluorescent against incandescent lamp: 2000 h a year, 0.25 a
    kilowatt-hour, 6 %, 5 years, first cost once (scribd.com, document 731725478). The example
    sums yearly values rounded to cents, hence a tolerance of half a cent for each of six.
    """
    lamp = inputs(
        power_w=Decimal(power),
        hours=Decimal(2000),
        price=Decimal(price),
        tariffs=(Decimal("0.25"),) * 5,
        discount_rate=Decimal("0.06"),
    )
    assert abs(life_cycle_cost(lamp, 5) - Decimal(printed)) <= Decimal("0.03")


def test_price_path_rises_from_the_first_year_on() -> None:
    path = price_path(Decimal("0.20"), Decimal("0.10"), 3)
    assert path == (Decimal("0.2200"), Decimal("0.24200"), Decimal("0.266200"))


def test_energy_follows_the_present_value_factor() -> None:
    d, g, years = Decimal("0.04"), Decimal("0.02"), 10
    lamp = inputs(
        lamps=Decimal(50),
        power_w=Decimal("8.4"),
        hours=Decimal(2500),
        standby_power_w=Decimal("0.3"),
        standby_hours=Decimal(6260),
        tariffs=price_path(Decimal("0.21"), g, years),
        discount_rate=d,
    )
    kwh = Decimal(50) * (Decimal("8.4") * 2500 + Decimal("0.3") * 6260) / 1000
    expected = Decimal("0.21") * kwh * present_value_factor(d, g, years)
    assert abs(life_cycle_cost(lamp, years) - expected) < Decimal("1e-18")


def test_replacements_fall_at_the_end_of_each_life_before_the_end_of_the_study() -> None:
    lamp = inputs(
        lamps=Decimal(10),
        price=Decimal(4),
        labour=Decimal(1),
        hours=Decimal(2000),
        life_h=Decimal(7500),
        tariffs=(Decimal(0),) * 15,
        discount_rate=Decimal("0.05"),
    )
    due = [flow for flow in cash_flows(lamp, 15) if flow.item is CostItem.REPLACEMENT]
    assert [flow.moment for flow in due] == [Decimal("3.75"), Decimal("7.50"), Decimal("11.25")]
    expected = 40 + 50 * sum(1.05**-t for t in (3.75, 7.5, 11.25))
    assert float(life_cycle_cost(lamp, 15)) == pytest.approx(expected, rel=1e-12)


def test_a_life_that_ends_with_the_study_renews_nothing() -> None:
    """Three lives of 10 000 h in ten years of 3000 h: a third of ten is no exact decimal."""
    lamp = inputs(
        price=Decimal(1), hours=Decimal(3000), life_h=Decimal(10_000), tariffs=(Decimal(0),) * 10
    )
    assert life_cycle_cost(lamp, 10) == 3
    assert life_cycle_cost(as_floats(lamp), 10)[0] == 3.0


def test_failures_emissions_upkeep_and_disposal_stand_beside_each_other() -> None:
    lamp = inputs(
        lamps=Decimal(100),
        price=Decimal(5),
        labour=Decimal(3),
        installation=Decimal(2),
        maintenance=Decimal("0.5"),
        end_of_life=Decimal("0.1"),
        failing_share=Decimal("0.02"),
        power_w=Decimal(10),
        hours=Decimal(1000),
        carbon_per_kwh=Decimal("0.03"),
        tariffs=(Decimal(0),) * 2,
    )
    amounts: dict[CostItem, Decimal] = {}
    for flow in cash_flows(lamp, 2):
        amounts[flow.item] = amounts.get(flow.item, Decimal(0)) + flow.amount
    assert amounts[CostItem.INSTALLATION] == 200
    assert amounts[CostItem.FAILURES] == 2 * 100 * Decimal("0.02") * 8
    assert amounts[CostItem.MAINTENANCE] == 100
    assert amounts[CostItem.CARBON] == 2 * 1000 * Decimal("0.03")
    assert amounts[CostItem.END_OF_LIFE] == 10


@settings(max_examples=40, deadline=None)
@given(
    power=st.decimals(1, 200, places=2),
    life=st.integers(1500, 80_000),
    hours=st.integers(200, 8760),
    rate=st.decimals("-0.02", "0.2", places=4),
    failing=st.decimals(0, "0.2", places=3),
)
def test_decimals_and_arrays_agree(
    power: Decimal, life: int, hours: int, rate: Decimal, failing: Decimal
) -> None:
    lamp = replace(
        inputs(),
        lamps=Decimal(120),
        price=Decimal("6.4"),
        labour=Decimal(2),
        power_w=power,
        life_h=Decimal(life),
        hours=Decimal(hours),
        failing_share=failing,
        discount_rate=rate,
        tariffs=price_path(Decimal("0.24"), Decimal("0.02"), 12),
    )
    exact = float(life_cycle_cost(lamp, 12))
    assert life_cycle_cost(as_floats(lamp), 12)[0] == pytest.approx(exact, rel=1e-9)
    share = maintained_share(lamp.life_h, lamp.hours, 12)
    other = maintained_share(np.array([float(lamp.life_h)]), np.array([float(hours)]), 12)
    assert other[0] == pytest.approx(float(share), rel=1e-9)


def test_arrays_hold_a_replacement_back_where_it_is_not_due() -> None:
    lamp = as_floats(inputs(price=Decimal(10), hours=Decimal(1000), tariffs=(Decimal(0),) * 5))
    cost = life_cycle_cost(replace(lamp, life_h=np.array([1e6, 2500.0, 1250.0])), 5)
    assert cost.tolist() == [10.0, 20.0, 40.0]  # the life that ends with the study renews nothing


@pytest.mark.parametrize(("life", "hours"), [(20_000, 2000), (7000, 3000), (50_000, 1000)])
def test_maintained_share_is_the_mean_of_the_decay(life: int, hours: int) -> None:
    """Numerical mean over ten years of 0.7^(t/L), starting anew with every life."""
    whole, rest = divmod(hours * 10, life)
    light = whole * quad(lambda t: 0.7 ** (t / life), 0, life)[0]
    light += quad(lambda t: 0.7 ** (t / life), 0, rest)[0]
    share = maintained_share(Decimal(life), Decimal(hours), 10)
    assert float(share) == pytest.approx(light / (hours * 10), rel=1e-9)
