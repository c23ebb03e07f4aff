"""What the costs of a lamp rest on: its figures with their origin, and the tender's ``[use]``."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, fields, replace
from decimal import Decimal
from typing import Any, Generic, cast

import numpy as np
from numpy.typing import NDArray

from generator.comparison.cost.formula import HOURS_OF_A_YEAR, CostInputs, Number, price_path
from generator.language import joined, say, say_as
from generator.records.figure import GRADE_WORDS, Figure, FigureSet
from generator.records.lamp import Lamp
from generator.records.tender import Assumption
from generator.records.tender_settings import ExistingLamp, TenderUse

__all__ = [
    "ACTIVE_POWER",
    "STANDBY_POWER",
    "LampBasis",
    "LampNumbers",
    "UseNumbers",
    "cost_inputs",
    "existing_basis",
    "lamp_arrays",
    "lamp_basis",
    "lamps_for_light",
    "use_arrays",
    "use_assumptions",
    "use_gaps",
    "use_numbers",
]

Array = NDArray[np.float64]

ACTIVE_POWER = say("active power")
STANDBY_POWER = say("standby power")
"""Assumptions that the energy of a year rests on, by name."""

LIFE_QUANTITIES = ("l70_projected_h", "l70b50_h")
"""Projected life before declared life."""


@dataclass(frozen=True, slots=True)
class LampNumbers(Generic[Number]):
    """Numbers of one lamp: price [money], powers [W], life [h], survival factor."""

    price: Number
    power_w: Number
    standby_power_w: Number
    life_h: Number
    survival_factor: Number


@dataclass(frozen=True, slots=True)
class UseNumbers(Generic[Number]):
    """Numbers of ``[use]``, rates as fractions; tariffs of each year before scale and drift.

    The tariff of year k is ``tariffs[k - 1] * tariff_scale * tariff_drift**k``; both factors are
    one unless an uncertainty or a what-if moves them.
    """

    tariffs: tuple[Number, ...]
    tariff_scale: Number
    tariff_drift: Number
    hours: Number
    standby_share: Number
    discount_rate: Number
    installation: Number
    labour: Number
    maintenance: Number
    end_of_life: Number
    carbon_per_kwh: Number
    survival_years_per_hour: Number


@dataclass(frozen=True, slots=True)
class LampBasis:
    """A lamp for the cost formula.

    Parameters
    ----------
    lamp_id
        The lamp.
    numbers
        Its numbers; ``None`` where one is missing.
    flux_lm
        Its luminous flux [lm], the useful one of a directional lamp; ``None`` where missing.
    figures
        Input name -> figure it comes from, where it comes from one.
    assumptions
        The numbers with unit and origin.
    missing
        What is missing, in words.
    notes
        What was taken for granted.
    """

    lamp_id: str
    numbers: LampNumbers[Decimal] | None
    flux_lm: Decimal | None
    figures: dict[str, Figure]
    assumptions: tuple[Assumption, ...]
    missing: tuple[str, ...]
    notes: tuple[str, ...]


def lamp_basis(lamp: Lamp, figures: FigureSet, use: TenderUse) -> LampBasis:
    """Gather what the costs of an offered lamp rest on.

    Parameters
    ----------
    lamp
        The lamp.
    figures
        All figures; measured before declared.
    use
        ``[use]``.

    Returns
    -------
    LampBasis
        Life is the projected one, else the declared one; standby power that of the network
        standby for a connected lamp. A lamp that is not connected and has no standby figure
        draws none, and a note says so.
    """
    standby_name = "networked_standby_power_w" if lamp.connected else "standby_power_w"
    found: dict[str, Figure] = {}
    for name, quantities in (
        ("power_w", ("power_w",)),
        ("standby_power_w", (standby_name,)),
        ("life_h", LIFE_QUANTITIES),
        ("flux_lm", ("useful_luminous_flux_lm" if lamp.directional else "luminous_flux_lm",)),
        ("survival_factor", ("survival_factor",)),
    ):
        figure = _first(figures, lamp.lamp_id, quantities)
        if figure is not None:
            found[name] = figure
    numbers = {name: _number(figure) for name, figure in found.items()}
    notes = []
    if "standby_power_w" not in numbers and not lamp.connected:
        numbers["standby_power_w"] = Decimal(0)
        notes.append(
            say("No standby power is given for this lamp, which is not connected: none taken.")
        )
    if use.survival_stated_at_h is None:
        numbers["survival_factor"] = Decimal(1)
        found.pop("survival_factor", None)
        notes.append(say("Failures before the end of life are not counted."))
    if lamp.offer.unit_price is not None:
        numbers["price"] = lamp.offer.unit_price
    return _basis(lamp.lamp_id, numbers, found, notes)


def existing_basis(lamp: ExistingLamp) -> LampBasis:
    """What the costs of a lamp that burns today rest on; what is not given is missing."""
    given = {
        "price": lamp.unit_price,
        "power_w": lamp.power_w,
        "standby_power_w": lamp.standby_power_w,
        "life_h": lamp.life_h,
        "flux_lm": lamp.luminous_flux_lm,
        "survival_factor": Decimal(1),
    }
    numbers = {name: value for name, value in given.items() if value is not None}
    return _basis(lamp.id, numbers, {}, [say("Existing lamp, as the tender states it.")])


_WORDS = {
    "price": (say("unit price"), "money"),
    "power_w": (ACTIVE_POWER, "W"),
    "standby_power_w": (STANDBY_POWER, "W"),
    "life_h": (say("projected or declared life"), "h"),
    "flux_lm": (say("luminous flux"), "lm"),
    "survival_factor": (say("survival factor"), ""),
}
_MAY_BE_ZERO = ("price", "standby_power_w")


def _basis(
    lamp_id: str, numbers: dict[str, Decimal], found: dict[str, Figure], notes: Sequence[str]
) -> LampBasis:
    usable = {
        name: value
        for name, value in numbers.items()
        if value > 0 or (name in _MAY_BE_ZERO and value == 0)
    }
    flux_lm = usable.get("flux_lm")
    needed = {name: value for name, value in usable.items() if name != "flux_lm"}
    missing = tuple(
        words for name, (words, _) in _WORDS.items() if name not in usable and name != "flux_lm"
    )
    assumptions = tuple(
        Assumption(words, usable[name], unit, _origin(name, found))
        for name, (words, unit) in _WORDS.items()
        if name in usable
    )
    whole = LampNumbers(**needed) if not missing else None
    return LampBasis(lamp_id, whole, flux_lm, found, assumptions, missing, tuple(notes))


def _origin(name: str, found: dict[str, Figure]) -> str:
    figure = found.get(name)
    if figure is not None:
        return joined(", ", (GRADE_WORDS[figure.grade], figure.quantity))
    return say_as("origin", "offer") if name == "price" else say("stated or taken, see notes")


def _first(figures: FigureSet, lamp_id: str, quantities: Sequence[str]) -> Figure | None:
    for quantity in quantities:
        figure = figures.best(lamp_id, quantity)
        if figure is not None and figure.number is not None:
            return figure
    return None


def _number(figure: Figure) -> Decimal:
    return figure.number if figure.number is not None else Decimal(0)


def use_gaps(use: TenderUse) -> tuple[str, ...]:
    """Keys of ``[use]`` without which no cost can be given."""
    gaps = [
        key
        for key in ("hours_per_year", "currency", "discount_rate_percent", "years")
        if getattr(use, key) is None
    ]
    if use.tariff_per_kwh is None and use.tariff_path_per_kwh is None:
        gaps.append("tariff_per_kwh")
    if use.carbon_price_per_t is not None and use.location_based is None:
        gaps.append("location_based")
    return tuple(f"use.{key}" for key in gaps)


def use_numbers(use: TenderUse) -> UseNumbers[Decimal]:
    """Numbers of ``[use]``; to be asked for only where :func:`use_gaps` finds no gap.

    Emissions are priced with the location-based factor, and only where ``carbon_price_per_t``
    is given; a tender may count them only with a method open to all.
    Source: eu_2014_24, article 68.
    """
    years = use.years or 0
    rise = (use.price_rise_percent or Decimal(0)) / 100
    path = use.tariff_path_per_kwh
    if path is None:
        path = price_path(use.tariff_per_kwh or Decimal(0), rise, years)
    factor = use.location_based
    carbon = Decimal(0)
    if use.carbon_price_per_t is not None and factor is not None:
        carbon = use.carbon_price_per_t * factor.g_per_kwh / 10**6
    stated_at = use.survival_stated_at_h
    return UseNumbers(
        tariffs=path,
        tariff_scale=Decimal(1),
        tariff_drift=Decimal(1),
        hours=use.hours_per_year or Decimal(0),
        standby_share=use.standby_share_percent / 100,
        discount_rate=(use.discount_rate_percent or Decimal(0)) / 100,
        installation=use.installation_cost_per_lamp,
        labour=use.replacement_labour_per_lamp,
        maintenance=use.maintenance_cost_per_lamp_year,
        end_of_life=use.end_of_life_cost_per_lamp,
        carbon_per_kwh=carbon,
        survival_years_per_hour=Decimal(0) if stated_at is None else 1 / stated_at,
    )


def use_assumptions(use: TenderUse) -> tuple[Assumption, ...]:
    """The inputs of ``[use]`` with their units, for print beside a cost."""
    currency = use.currency or ""
    rows = (
        ("hours_per_year", "h"),
        ("standby_share_percent", "%"),
        ("tariff_per_kwh", f"{currency}/kWh"),
        ("price_rise_percent", "%"),
        ("discount_rate_percent", "%"),
        ("installation_cost_per_lamp", currency),
        ("replacement_labour_per_lamp", currency),
        ("maintenance_cost_per_lamp_year", say("{currency}/year", currency=currency)),
        ("end_of_life_cost_per_lamp", currency),
        ("survival_stated_at_h", "h"),
        ("carbon_price_per_t", f"{currency}/t"),
    )
    path = use.tariff_path_per_kwh or ()
    return (
        *(
            Assumption(key, getattr(use, key), unit, f"use.{key}")
            for key, unit in rows
            if getattr(use, key) is not None
        ),
        *(
            Assumption(
                say("tariff of year {year}", year=k),
                price,
                f"{currency}/kWh",
                "use.tariff_path_per_kwh",
            )
            for k, price in enumerate(path, start=1)
        ),
    )


def cost_inputs(
    lamp: LampNumbers[Number], use: UseNumbers[Number], lamps: Number
) -> CostInputs[Number]:
    """Put a lamp, its use and a number of lamps together for the cost formula."""
    off_hours = HOURS_OF_A_YEAR - use.hours
    return CostInputs(
        lamps=lamps,
        price=lamp.price,
        installation=use.installation,
        labour=use.labour,
        maintenance=use.maintenance,
        end_of_life=use.end_of_life,
        power_w=lamp.power_w,
        standby_power_w=lamp.standby_power_w,
        hours=use.hours,
        standby_hours=use.standby_share * off_hours * (off_hours > 0),
        tariffs=tuple(
            tariff * use.tariff_scale * use.tariff_drift**k
            for k, tariff in enumerate(use.tariffs, start=1)
        ),
        life_h=lamp.life_h,
        failing_share=1 - lamp.survival_factor ** (use.hours * use.survival_years_per_hour),
        discount_rate=use.discount_rate,
        carbon_per_kwh=use.carbon_per_kwh,
    )


def lamps_for_light(light_lm: Number, mean_flux_lm: Number) -> Number:
    """Number of lamps that give an amount of light, rounded up."""
    whole = light_lm // mean_flux_lm
    return whole + (whole * mean_flux_lm < light_lm)


def lamp_arrays(numbers: LampNumbers[Decimal], **moved: Any) -> LampNumbers[Array]:
    """The numbers of a lamp as floats, some of them replaced by arrays (trials,)."""
    return replace(cast("LampNumbers[Array]", _floats(numbers)), **moved)


def use_arrays(numbers: UseNumbers[Decimal], **moved: Any) -> UseNumbers[Array]:
    """The numbers of use as floats, some of them replaced by arrays (trials,)."""
    return replace(cast("UseNumbers[Array]", _floats(numbers)), **moved)


def _floats(record: LampNumbers[Decimal] | UseNumbers[Decimal]) -> object:
    def floating(value: Decimal | tuple[Decimal, ...]) -> Array | tuple[Array, ...]:
        if isinstance(value, tuple):
            return tuple(np.asarray(float(item)) for item in value)
        return np.asarray(float(value))

    values = {item.name: floating(getattr(record, item.name)) for item in fields(record)}
    return type(record)(**values)  # type: ignore[arg-type] # the same record over another kind
