"""Life-cycle cost as a series of cash flows: one formula for exact decimals and for arrays."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from decimal import Decimal
from functools import reduce
from typing import Generic, TypeVar

import numpy as np
from numpy.typing import NDArray

from generator.records.tender import CostItem

__all__ = [
    "CostInputs",
    "Flow",
    "Number",
    "cash_flows",
    "energy_per_year_kwh",
    "life_cycle_cost",
    "maintained_share",
    "present_value_factor",
    "price_path",
]

Number = TypeVar("Number", Decimal, NDArray[np.float64])

HOURS_OF_A_YEAR = 8760
LIFE_SHARE_PERCENT = 70
"""Share of the initial flux at the end of a life stated as L70 [percent]."""
_DECAY_OF_A_LIFE = 356_674_943_938_732_379  # -ln 0.7 in units of 1e-18


@dataclass(frozen=True, slots=True)
class CostInputs(Generic[Number]):
    """What the cost formula takes; every field a decimal, or an array (trials,).

    Parameters
    ----------
    lamps
        Number of lamps.
    price, installation, labour, maintenance, end_of_life
        Money per lamp: purchase, first installation, labour of one replacement, maintenance of
        one year, disposal.
    power_w, standby_power_w
        Active power in use and at standby [W].
    hours, standby_hours
        Hours of a year in use and at standby [h].
    tariffs
        Price of energy in each year of the study [money/kWh] (years,).
    life_h
        Life [h].
    failing_share
        Share of the lamps that fail in a year before the end of their life, 0 to 1.
    discount_rate
        Discount rate as a fraction.
    carbon_per_kwh
        Money per kilowatt-hour for emissions; zero where the tender does not price them.
    """

    lamps: Number
    price: Number
    installation: Number
    labour: Number
    maintenance: Number
    end_of_life: Number
    power_w: Number
    standby_power_w: Number
    hours: Number
    standby_hours: Number
    tariffs: tuple[Number, ...]
    life_h: Number
    failing_share: Number
    discount_rate: Number
    carbon_per_kwh: Number


@dataclass(frozen=True, slots=True)
class Flow(Generic[Number]):
    """One payment: what for, when [years from purchase], how much, and its discount factor."""

    item: CostItem
    moment: Number
    amount: Number
    factor: Number


def present_value_factor(rate: Number, growth: Number, years: int) -> Number:
    """Present value of a payment of one at each year's end that grows from year to year.

    Parameters
    ----------
    rate, growth
        Discount rate and growth as fractions, both real or both nominal.
    years
        Number of payments.

    Returns
    -------
    decimal or array
        Sum over k from 1 to the years of ((1 + growth)/(1 + rate))^k; standard present value.
    """
    step = (1 + growth) / (1 + rate)
    return reduce(lambda total, k: total + step**k, range(2, years + 1), step)


def price_path(first: Number, rise: Number, years: int) -> tuple[Number, ...]:
    """Price in each year: today's price after k rises in year k (years,)."""
    return tuple(first * (1 + rise) ** k for k in range(1, years + 1))


def energy_per_year_kwh(inputs: CostInputs[Number]) -> tuple[Number, Number]:
    """Energy of all lamps in a year, in use and at standby [kWh]."""
    scale = inputs.lamps / 1000
    return (
        scale * inputs.power_w * inputs.hours,
        scale * inputs.standby_power_w * inputs.standby_hours,
    )


def cash_flows(inputs: CostInputs[Number], years: int) -> Iterator[Flow[Number]]:
    """Every payment of a study.

    Yearly payments fall at the year's end; replacements when the life ends, as long as that is
    before the end of the study; disposal of the last set at its end.

    Parameters
    ----------
    inputs
        The inputs.
    years
        Length of the study [years].

    Yields
    ------
    Flow
        Payments; of arrays, a replacement that is due in some trials only has the amount zero
        in the others. Source: eu_2014_24, article 68 (groups of cost); standard present value.
    """
    zero = inputs.lamps * 0
    one = zero + 1
    growth = 1 + inputs.discount_rate
    yield Flow(CostItem.PURCHASE, zero, inputs.lamps * inputs.price, one)
    yield Flow(CostItem.INSTALLATION, zero, inputs.lamps * inputs.installation, one)
    in_use, standby = energy_per_year_kwh(inputs)
    renewed = inputs.lamps * (inputs.price + inputs.labour)
    for year, tariff in enumerate(inputs.tariffs[:years], start=1):
        moment, factor = zero + year, 1 / growth**year
        yield Flow(CostItem.ENERGY, moment, in_use * tariff, factor)
        yield Flow(CostItem.STANDBY, moment, standby * tariff, factor)
        yield Flow(CostItem.MAINTENANCE, moment, inputs.lamps * inputs.maintenance, factor)
        yield Flow(CostItem.FAILURES, moment, inputs.failing_share * renewed, factor)
        carbon = (in_use + standby) * inputs.carbon_per_kwh
        yield Flow(CostItem.CARBON, moment, carbon, factor)
    burnt = inputs.life_h  # compared in hours: a life that ends with the study renews nothing
    while bool(np.any(burnt < inputs.hours * years)):
        moment = burnt / inputs.hours
        due = burnt < inputs.hours * years
        yield Flow(CostItem.REPLACEMENT, moment, due * renewed, 1 / growth**moment)
        burnt = burnt + inputs.life_h
    end = zero + years
    yield Flow(CostItem.END_OF_LIFE, end, inputs.lamps * inputs.end_of_life, 1 / growth**years)


def life_cycle_cost(inputs: CostInputs[Number], years: int) -> Number:
    """Present value of every payment of a study [money]."""
    total = inputs.lamps * 0
    for flow in cash_flows(inputs, years):
        total = total + flow.amount * flow.factor
    return total


def maintained_share(life_h: Number, hours: Number, years: int) -> Number:
    """Mean flux over the study as a share of the initial flux, lamps renewed at their life.

    Parameters
    ----------
    life_h
        Life at which 70 % of the initial flux is left [h].
    hours
        Hours in use of a year [h].
    years
        Length of the study [years].

    Returns
    -------
    decimal or array
        Mean of an exponential decay that passes through 70 % at the life, over whole lives and
        the part of one that remains. Source: iec_62717 (meaning of L70, not read); ies_tm_21
        (exponential decay).
    """
    share = (life_h * 0 + LIFE_SHARE_PERCENT) / 100
    decay = (life_h * 0 + _DECAY_OF_A_LIFE) / 10**18
    lives = hours * years / life_h
    whole = lives // 1
    light = (whole * (1 - share) + (1 - share ** (lives - whole))) / decay
    return light / lives
