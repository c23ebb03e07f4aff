"""Minimum efficacy on a curve over the luminous flux.

Source: us_10_cfr_430, 430.32(dd), standard of 2028.
"""

from __future__ import annotations

from decimal import Decimal, localcontext
from fractions import Fraction

from generator.conformity.decision_rule import Limits
from generator.conformity.exact_number import decimal_of, number_text
from generator.conformity.limits import Limit, Question, no_limit
from generator.records.clause import DatedValue

__all__ = ["curve_efficacy", "efficacy_curve"]


def curve_efficacy(flux_lm: Fraction, table: DatedValue) -> Fraction:
    """Minimum efficacy [lm/W]: a / (b + exp(−c (Φ + d))) + e.

    Parameters
    ----------
    flux_lm
        Luminous flux [lm].
    table
        The constants a to e.

    Returns
    -------
    Fraction
        To 28 digits.

    Notes
    -----
    Source: us_10_cfr_430, 430.32(dd).
    """
    with localcontext() as context:
        context.prec = 28
        flux = Decimal(flux_lm.numerator) / Decimal(flux_lm.denominator)
        decay = (-table.number("decay_per_lm") * (flux + table.number("shift_lm"))).exp()
        ratio = table.number("numerator") / (table.number("denominator_constant") + decay)
        return Fraction(ratio + table.number("offset_lm_per_w"))


def efficacy_curve(question: Question) -> Limit:
    """The minimum efficacy at the luminous flux of the lamp.

    Parameters
    ----------
    question
        Clause, lamp and basis.

    Returns
    -------
    Limit
        On the efficacy [lm/W].

    Notes
    -----
    Source: us_10_cfr_430, 430.32(dd).
    """
    flux = question.evidence.reading("useful_luminous_flux_lm")
    if flux.value is None:
        return no_limit(f"the limit depends on the luminous flux, which is {flux.reason}")
    number = curve_efficacy(flux.value, question.constants("curve"))
    step = (
        f"Limit at {number_text(flux.value)} lm: {number_text(number)} lm/W "
        f"({question.clause.source.text})."
    )
    return Limit(Limits(lower=number), shown=decimal_of(number), steps=(step,))
