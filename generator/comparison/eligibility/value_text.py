"""A value in the words of a reason: few decimals, yet never on the other side of its limit."""

from __future__ import annotations

from decimal import ROUND_HALF_UP, Decimal

from generator.language import numeral
from generator.quantities import QUANTITIES
from generator.records.clause_words import with_unit

__all__ = ["value_text"]

_MOST_DECIMALS = 10
_MINUS = "\u2212"


def value_text(value: Decimal | str, quantity: str, *limits: Decimal | str | None) -> str:
    """Write a value with its unit.

    Parameters
    ----------
    value
        Exact value, or a class.
    quantity
        Catalogue name; gives decimals and unit.
    *limits
        What it is held against; where rounding would move the value across one of them, more
        decimals are written.
    """
    entry = QUANTITIES.get(quantity)
    unit = entry.unit if entry else ""
    if isinstance(value, str):
        return with_unit(value, unit)
    numbers = [limit for limit in limits if isinstance(limit, Decimal)]
    for decimals in range(entry.decimals if entry else 2, _MOST_DECIMALS + 1):
        rounded = value.quantize(Decimal(1).scaleb(-decimals), rounding=ROUND_HALF_UP)
        if all(_side(rounded, limit) == _side(value, limit) for limit in numbers):
            return with_unit(numeral(f"{rounded}".replace("-", _MINUS)), unit)
    return with_unit(numeral(f"{value}"), unit)


def _side(value: Decimal, limit: Decimal) -> int:
    return (value > limit) - (value < limit)
