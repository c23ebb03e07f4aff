"""The cost formula against a general library of finance: numpy-financial."""

from __future__ import annotations

from decimal import Decimal
from typing import Any

import numpy_financial
import pytest

from generator.comparison.cost.formula import present_value_factor


@pytest.mark.parametrize(
    ("rate", "growth", "years"),
    [("0.03", "0", 10), ("0.03", "0.02", 10), ("0.08", "-0.01", 25), ("0.02", "0.05", 7)],
)
def test_factor_against_net_present_value(rate: str, growth: str, years: int) -> None:
    payments = [0.0] + [(1 + float(growth)) ** k for k in range(1, years + 1)]
    expected = numpy_financial.npv(float(rate), payments)
    factor = present_value_factor(Decimal(rate), Decimal(growth), years)
    assert float(factor) == pytest.approx(expected, rel=1e-12)


def test_cost_of_a_bid_against_net_present_value(tender_case: Any) -> None:
    """Yearly sums of the cash-flow table, discounted by the library; no replacement is due."""
    cost = tender_case.compared().lots[0].bids[0].cost
    assert cost is not None
    yearly = [0.0] * (cost.years + 1)
    for flow in cost.cash_flows:
        assert flow.moment_years == flow.year
        yearly[flow.year] += float(flow.amount)
    rate = tender_case.settings["use"]["discount_rate_percent"] / 100
    assert float(cost.total) == pytest.approx(numpy_financial.npv(rate, yearly), rel=1e-12)


def test_payment_of_an_annuity() -> None:
    """A payment level against the library: the annuity of the factor is one."""
    factor = present_value_factor(Decimal("0.04"), Decimal(0), 15)
    payment = -numpy_financial.pmt(0.04, 15, float(factor))
    assert payment == pytest.approx(1.0, rel=1e-12)
