"""The cost study of one bid: cash-flow table, equal light, break-even, tornado."""

from __future__ import annotations

from dataclasses import replace
from decimal import ROUND_CEILING, Decimal

from generator.comparison.cost.basis import (
    LampBasis,
    LampNumbers,
    UseNumbers,
    cost_inputs,
    lamps_for_light,
    use_assumptions,
    use_numbers,
)
from generator.comparison.cost.formula import cash_flows, life_cycle_cost, maintained_share
from generator.language import say
from generator.records.tender import (
    BreakEven,
    CashFlow,
    CostItem,
    EqualLight,
    LifeCycleCost,
    SensitivityBar,
)
from generator.records.tender_settings import TenderLot, TenderUse

__all__ = ["break_even", "cost_study", "equal_light", "lamp_count", "light_needed_lm", "tornado"]

FORMULA = say(
    "Present value of every payment: yearly payments at the end of the year, replacements when "
    "the life ends within the study, no residual value; amounts are summed unrounded."
)
_PRICES = {
    "real": say("Prices and rates are real."),
    "nominal": say("Prices and rates are nominal."),
}


def cost_study(basis: LampBasis, use: TenderUse, lamps: int) -> LifeCycleCost | None:
    """Life-cycle cost with every payment.

    Parameters
    ----------
    basis
        The lamp.
    use
        ``[use]`` without gaps.
    lamps
        Number of lamps.

    Returns
    -------
    LifeCycleCost or None
        ``None`` where a number of the lamp is missing.
    """
    if basis.numbers is None or use.years is None:
        return None
    inputs = cost_inputs(basis.numbers, use_numbers(use), Decimal(lamps))
    rows = [
        CashFlow(
            year=int(flow.moment.to_integral_value(ROUND_CEILING)),
            item=flow.item,
            moment_years=flow.moment,
            amount=flow.amount,
            factor=flow.factor,
            present_value=flow.amount * flow.factor,
        )
        for flow in cash_flows(inputs, use.years)
        if flow.amount != 0
    ]
    order = list(CostItem)
    rows.sort(key=lambda row: (row.moment_years, order.index(row.item)))
    return LifeCycleCost(
        lamps=lamps,
        currency=use.currency or "",
        years=use.years,
        prices=use.prices,
        cash_flows=tuple(rows),
        assumptions=(*basis.assumptions, *use_assumptions(use)),
        notes=(_PRICES[use.prices], FORMULA, *basis.notes),
    )


def light_needed_lm(lot: TenderLot, quantity: int) -> Decimal | None:
    """Light that a lot asks for on the mean over the study [lm]; ``None`` where it does not."""
    return None if lot.flux_per_point_lm is None else lot.flux_per_point_lm * quantity


def lamp_count(
    lot: TenderLot, basis: LampBasis, use: TenderUse, quantity: int
) -> tuple[int | None, int | None]:
    """Lamps the costs are for, and lamps needed for the light asked for.

    Either is ``None`` where it cannot be given: a lot without a need for light needs no count,
    and a lamp without flux, power or life has none.
    """
    light = light_needed_lm(lot, quantity)
    needed = None
    if light is not None and basis.numbers is not None and basis.flux_lm is not None:
        share = maintained_share(
            basis.numbers.life_h, use.hours_per_year or Decimal(1), use.years or 1
        )
        needed = int(lamps_for_light(light, basis.flux_lm * share))
    return (needed if lot.compare_at == "equal light" else quantity), needed


def equal_light(
    cost: LifeCycleCost, basis: LampBasis, use: TenderUse, needed: int | None
) -> EqualLight | None:
    """Cost per million lumen-hours over the study, with the mean flux of maintained lamps."""
    if basis.numbers is None or basis.flux_lm is None or use.hours_per_year is None:
        return None
    hours = use.hours_per_year
    share = maintained_share(basis.numbers.life_h, hours, cost.years)
    light = cost.lamps * basis.flux_lm * share * hours * cost.years / 10**6
    return EqualLight(basis.flux_lm, share, light, cost.total / light, needed)


def break_even(cost: LifeCycleCost, baseline: LifeCycleCost) -> BreakEven:
    """Hold a bid against the baseline lamp.

    Parameters
    ----------
    cost, baseline
        Two costs over the same years.

    Returns
    -------
    BreakEven
        Saving, the year from whose end on the bid stays no dearer, and simple payback.
    """
    pairs = list(zip(cost.cumulative, baseline.cumulative, strict=True))
    year = None
    for k in reversed(range(len(pairs))):
        if pairs[k][0] > pairs[k][1]:
            break
        year = k
    extra = _spent(cost, 0) - _spent(baseline, 0)
    saved = _running(baseline) - _running(cost)
    payback = extra / saved if extra > 0 and saved > 0 else None
    return BreakEven(baseline.total - cost.total, year, payback)


def _spent(cost: LifeCycleCost, year: int) -> Decimal:
    return sum((flow.amount for flow in cost.cash_flows if flow.year == year), Decimal(0))


def _running(cost: LifeCycleCost) -> Decimal:
    """Running cost of the first year, replacements at the end of life and disposal left out."""
    skipped = (CostItem.REPLACEMENT, CostItem.END_OF_LIFE)
    return sum(
        (flow.amount for flow in cost.cash_flows if flow.year == 1 and flow.item not in skipped),
        Decimal(0),
    )


def tornado(basis: LampBasis, use: TenderUse, lamps: int) -> tuple[SensitivityBar, ...]:
    """Move tariff, hours, discount rate and life one at a time.

    Parameters
    ----------
    basis
        The lamp.
    use
        ``[use]`` without gaps; its ``sensitivity`` says how far.
    lamps
        Number of lamps.

    Returns
    -------
    tuple of SensitivityBar
        Widest swing first.
    """
    lamp, years = basis.numbers, use.years
    if lamp is None or years is None:
        return ()
    base = use_numbers(use)

    def bar(name: str, unit: str, value: Decimal, percent: Decimal) -> SensitivityBar:
        low, high = value * (1 - percent / 100), value * (1 + percent / 100)
        costs = [
            life_cycle_cost(cost_inputs(*_moved(name, lamp, base, end), Decimal(lamps)), years)
            for end in (low, high)
        ]
        return SensitivityBar(name, unit, low, high, costs[0], costs[1])

    span, per_kwh = use.sensitivity, f"{use.currency}/kWh"
    bars = (
        bar("tariff", per_kwh, base.tariffs[0], span.tariff_percent),
        bar("hours per year", "h", base.hours, span.hours_percent),
        bar("discount rate", "", base.discount_rate, span.discount_rate_percent),
        bar("life", "h", lamp.life_h, span.life_percent),
    )
    return tuple(sorted(bars, key=lambda item: (-item.swing, item.assumption)))


def _moved(
    name: str, lamp: LampNumbers[Decimal], use: UseNumbers[Decimal], value: Decimal
) -> tuple[LampNumbers[Decimal], UseNumbers[Decimal]]:
    if name == "tariff":
        first = use.tariffs[0]
        return lamp, replace(use, tariff_scale=value / first if first else Decimal(1))
    if name == "hours per year":
        return lamp, replace(use, hours=value)
    if name == "discount rate":
        return lamp, replace(use, discount_rate=value)
    return replace(lamp, life_h=value), use
