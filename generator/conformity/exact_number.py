"""Exact numbers: fractions for every comparison, decimals for what is shown."""

from __future__ import annotations

from collections.abc import Iterable
from decimal import ROUND_CEILING, ROUND_HALF_EVEN, Decimal, localcontext
from fractions import Fraction

from generator.language import numeral

__all__ = ["decimal_of", "mean_of", "number_text", "rounded", "square_root", "uncertainty_text"]

_DIGITS = 12
"""Significant digits of a decimal that stands for a fraction without an end, or a long one."""

_LONG = 15
"""Digits up to which a decimal is kept as it is."""

_LONG_FOR_PEOPLE = 8
_DIGITS_FOR_PEOPLE = 7

_HALF = Fraction(1, 2)


def decimal_of(number: Fraction) -> Decimal:
    """Give the decimal that stands for a fraction.

    Parameters
    ----------
    number
        Any fraction.

    Returns
    -------
    Decimal
        Exact where the fraction ends within fifteen significant digits, else rounded to
        twelve; without trailing zeros and without an exponent.
    """
    with localcontext() as context:
        context.prec = 30
        context.rounding = ROUND_HALF_EVEN
        quotient = Decimal(number.numerator) / Decimal(number.denominator)
        if Fraction(quotient) != number or len(quotient.normalize().as_tuple().digits) > _LONG:
            context.prec = _DIGITS
            quotient = +quotient
        return Decimal(format(quotient.normalize(), "f"))


def number_text(number: Fraction) -> str:
    """Write a number for people: as it is, or to seven digits where it has more than eight.

    Parameters
    ----------
    number
        Any fraction.

    Returns
    -------
    str
        A numeral, with a minus sign where it is negative, without an exponent.
    """
    number_shown = decimal_of(number)
    if len(number_shown.as_tuple().digits) > _LONG_FOR_PEOPLE:
        with localcontext() as context:
            context.prec = _DIGITS_FOR_PEOPLE
            number_shown = (+number_shown).normalize()
    return numeral(format(number_shown, "f").replace("-", "\u2212"))


def uncertainty_text(number: Fraction) -> str:
    """Write an expanded uncertainty for people: to two significant digits."""
    with localcontext() as context:
        context.prec = 2
        return numeral(format((+decimal_of(number)).normalize(), "f"))


def mean_of(numbers: Iterable[Fraction]) -> Fraction | None:
    """Arithmetic mean, exact; ``None`` of nothing."""
    values = tuple(numbers)
    return sum(values, Fraction(0)) / len(values) if values else None


def rounded(number: Fraction, step: Fraction, mode: str = "half up") -> Fraction:
    """Round a number to a step.

    Parameters
    ----------
    number
        What is rounded.
    step
        The step, above zero.
    mode
        ``half up``: a tie goes up; ``half down``: a tie goes down; ``up``: always up.

    Returns
    -------
    Fraction
        A whole number of steps.
    """
    steps = number / step
    if mode == "up":
        count = -((-steps.numerator) // steps.denominator)
    elif mode == "half down":
        count = -int((-steps + _HALF).__floor__())
    else:
        count = int((steps + _HALF).__floor__())
    return count * step


def square_root(number: Fraction) -> Fraction:
    """Square root of a number not below zero, to twelve digits, rounded up.

    Rounded up, because it is only taken of squared uncertainties.
    """
    with localcontext() as context:
        context.prec = 30
        root = (Decimal(number.numerator) / Decimal(number.denominator)).sqrt()
        context.prec = _DIGITS
        context.rounding = ROUND_CEILING
        return Fraction(+root)
