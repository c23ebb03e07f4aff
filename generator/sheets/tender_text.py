"""How the numbers of a tender are written: money, percent, energy, names of criteria."""

from __future__ import annotations

from decimal import Decimal

from generator.language import Capital, say, say_as, told
from generator.quantities import QUANTITIES
from generator.records.tender import money
from generator.sheets.number_format import grouped, shown

__all__ = [
    "NONE",
    "amount",
    "capital",
    "chance",
    "criterion_label",
    "criterion_value",
    "in_words",
    "input_value",
    "number",
    "percent",
    "significant",
    "worded",
]

NONE = "–"
"""Stands where there is no number."""

_SMALL = 0.001

_CRITERIA = {"life_cycle_cost": say("life-cycle cost"), "price": say_as("criterion", "price")}
_INPUTS = {
    "price": say("unit price"),
    "power_w": say("active power"),
    "standby_power_w": say("standby power"),
    "life_h": say_as("lamp", "life"),
    "flux_lm": say("luminous flux"),
    "tariff": say("price of energy"),
    "price rise": say("rise of the price of energy"),
    "hours": say("hours in use"),
    "discount rate": say("discount rate"),
}


def amount(value: Decimal | None) -> str:
    """Money with two decimals; a dash where there is none."""
    return NONE if value is None else shown(money(value), 2)


def number(value: Decimal | None, decimals: int) -> str:
    """A number with fixed decimals; a dash where there is none."""
    return NONE if value is None else shown(value, decimals)


def percent(share: float | Decimal, decimals: int = 1) -> str:
    """A share between 0 and 1 in percent."""
    return f"{shown(Decimal(str(share)) * 100, decimals)} %"


def capital(text: str) -> str:
    """Text, said in the language that is being spoken, that begins with a capital letter."""
    return told(Capital(text))


def chance(probability: float) -> str:
    """A probability in percent; what is not certain never reads as certain."""
    if 0 < probability < _SMALL:
        return f"< {percent(_SMALL)}"
    if 1 - _SMALL < probability < 1:
        return f"> {percent(1 - _SMALL)}"
    return percent(probability)


def criterion_label(name: str) -> str:
    """Name of a criterion or of an input in words."""
    if name in _CRITERIA:
        return _CRITERIA[name]
    if name in QUANTITIES:
        return QUANTITIES[name].label
    return _INPUTS.get(name, name)


def in_words(name: str) -> str:
    """Name of an input of the certainty study in words."""
    return _INPUTS.get(name) or criterion_label(name)


def criterion_value(name: str, value: Decimal | None, unit: str) -> str:
    """Value of a criterion with its unit; money with two decimals."""
    if value is None:
        return NONE
    decimals = QUANTITIES[name].decimals if name in QUANTITIES else 2
    return f"{shown(value, decimals)} {unit}".strip()


def worded(text: str) -> str:
    """Text of the comparison with names of criteria in words and a true sign of multiplication.

    Gives plain text in the language that is being spoken.
    """
    said = told(text, grouped)
    for name in sorted((*_CRITERIA, *QUANTITIES), key=len, reverse=True):
        if "_" in name and name in said:
            said = said.replace(name, told(criterion_label(name)))
    return said.replace(" x ", " × ").replace(" - ", " − ")


def input_value(name: str, value: Decimal, currency: str) -> str:
    """Value of an input of the certainty study with its unit, four significant digits."""
    unit = {
        "price": currency,
        "tariff": f"{currency}/kWh",
        "power_w": "W",
        "standby_power_w": "W",
        "life_h": "h",
        "hours": "h",
        "flux_lm": "lm",
    }.get(name, QUANTITIES[name].unit if name in QUANTITIES else "")
    if name == "discount rate":
        return f"{significant(value * 100)} %"
    return f"{significant(value)} {unit}".strip()


def significant(value: Decimal, digits: int = 4) -> str:
    """A number with significant digits, never less than whole units."""
    if value == 0:
        return "0"
    return shown(value, max(digits - 1 - value.adjusted(), 0))
