"""Minimum lumen maintenance after the endurance test.

Source: eu_2019_2020, Annex II Table 4 and Annex V.
"""

from __future__ import annotations

from decimal import Decimal, localcontext
from fractions import Fraction

from generator.conformity.decision_rule import Limits
from generator.conformity.evidence import Evidence
from generator.conformity.exact_number import decimal_of, number_text
from generator.conformity.limits import Limit, Question, no_limit
from generator.language import say
from generator.records.clause import DatedValue
from generator.records.verdict import Basis

__all__ = ["lumen_maintenance_curve", "lumen_maintenance_minimum"]


_NOT_CAPPED = say(
    "Limit: {fraction:f} to the power of ({hours:f} h / {lifetime} h) = {limit} ({source})."
)
_CAPPED = say(
    "Limit: {fraction:f} to the power of ({hours:f} h / {lifetime} h) = {limit}, capped at {cap} "
    "({source})."
)


def lumen_maintenance_curve(lifetime_h: Fraction, table: DatedValue) -> Fraction:
    """Lumen maintenance factor at the end of the test, on an exponential through the lifetime.

    Parameters
    ----------
    lifetime_h
        Declared lifetime L70B50 [h], above zero.
    table
        Test hours, flux fraction at the end of the lifetime, cap.

    Returns
    -------
    Fraction
        Before the cap, to 28 digits.

    Notes
    -----
    Source: eu_2019_2020, Annex II Table 4; the formula is an image there and was cross-checked.
    """
    with localcontext() as context:
        context.prec = 28
        hours = table.number("test_hours_h")
        lifetime = Decimal(lifetime_h.numerator) / Decimal(lifetime_h.denominator)
        return Fraction((hours * table.number("flux_fraction").ln() / lifetime).exp())


def lumen_maintenance_minimum(question: Question) -> Limit:
    """The least lumen maintenance factor that the declared lifetime allows, with its cap.

    Parameters
    ----------
    question
        Clause, lamp and basis; the lifetime is the declared one on either basis.

    Returns
    -------
    Limit
        On the lumen maintenance factor.

    Notes
    -----
    Source: eu_2019_2020, Annex II Table 4.
    """
    lifetime = Evidence(question.evidence.record, Basis.DECLARED).reading("l70b50_h").value
    if not lifetime:
        return no_limit(say("the limit depends on the lifetime L70B50, which is not declared"))
    table = question.constants("curve")
    curve, cap = lumen_maintenance_curve(lifetime, table), Fraction(table.number("cap"))
    number = min(curve, cap)
    step = (_CAPPED if curve > cap else _NOT_CAPPED).format(
        fraction=table.number("flux_fraction"),
        hours=table.number("test_hours_h"),
        lifetime=number_text(lifetime),
        limit=number_text(curve),
        cap=number_text(cap),
        source=question.clause.source.text,
    )
    return Limit(Limits(lower=number), shown=decimal_of(number), steps=(step,))
