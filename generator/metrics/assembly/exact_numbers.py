"""Exact quotients and means of decimals."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import Decimal, localcontext
from fractions import Fraction

__all__ = ["exact_mean", "exact_quotient", "rendered"]

DIGITS = 12
"""Significant digits kept of a quotient or mean that does not end."""


def rendered(number: Fraction) -> Decimal:
    """Turn an exact fraction into a decimal of twelve significant digits at most.

    Parameters
    ----------
    number
        The fraction.

    Returns
    -------
    Decimal
        The fraction itself where it ends within the digits, else rounded half to even.
    """
    with localcontext() as context:
        context.prec = DIGITS
        return Decimal(number.numerator) / Decimal(number.denominator)


def exact_mean(values: Sequence[Decimal]) -> Decimal:
    """Arithmetic mean of decimals; a single value is given back as it stands.

    Parameters
    ----------
    values
        At least one value.

    Returns
    -------
    Decimal
        The mean.
    """
    if len(values) == 1:
        return values[0]
    return rendered(sum((Fraction(value) for value in values), Fraction(0)) / len(values))


def exact_quotient(dividend: Decimal, divisor: Decimal) -> Decimal:
    """Quotient of two decimals.

    Parameters
    ----------
    dividend, divisor
        The decimals; the divisor is not zero.

    Returns
    -------
    Decimal
        The quotient.
    """
    return rendered(Fraction(dividend) / Fraction(divisor))
