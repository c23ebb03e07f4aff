"""Minimum efficacy on a curve over the luminous flux.

Source: us_10_cfr_430, 430.32(dd), standard of 2028.
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

__all__ = ["curve_efficacy", "efficacy_curve"]

_LENGTH_BOUND = "length_below_in"
_LONG_CURVE = "long_curve"
_SHORTER = say(
    "The lamp counts as shorter than {bound:f} in: its length is {length} mm, and {bound:f} in are "
    "{bound_mm} mm."
)
_LONGER = say(
    "The lamp counts as {bound:f} in or longer: its length is {length} mm, and {bound:f} in are "
    "{bound_mm} mm."
)


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
    """The minimum efficacy at the luminous flux of the lamp, on the curve for its length.

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
        reason = say(
            "the limit depends on the luminous flux, which is {reason}", reason=flux.reason
        )
        return no_limit(reason)
    curve, said = _curve_by_length(question)
    if curve is None:
        return no_limit(said)
    number = curve_efficacy(flux.value, curve)
    step = say(
        "Limit at {flux} lm: {limit} lm/W ({source}).",
        flux=number_text(flux.value),
        limit=number_text(number),
        source=question.clause.source.text,
    )
    notes = (said,) if said else ()
    return Limit(Limits(lower=number), shown=decimal_of(number), steps=(step,), notes=notes)


def _curve_by_length(question: Question) -> tuple[DatedValue | None, str]:
    """The curve for the length of the lamp, and what is to be said of that choice."""
    curve = question.constants("curve")
    if _LENGTH_BOUND not in curve.entries:
        return curve, ""
    bound = curve.number(_LENGTH_BOUND)
    length = Evidence(question.evidence.record, Basis.DECLARED).reading("length_mm").value
    if length is None:
        return curve, say(
            "The length is not given; the lamp is taken as shorter than {bound:f} in.", bound=bound
        )
    bound_mm = Fraction(bound) * Fraction(curve.number("mm_per_in"))
    lengths = {"length": number_text(length), "bound": bound, "bound_mm": number_text(bound_mm)}
    if length < bound_mm:
        return curve, _SHORTER.format(**lengths)
    if _LONG_CURVE in question.clause.constants:
        return question.constants(_LONG_CURVE), _LONGER.format(**lengths)
    return None, say(
        "there is no curve for such a lamp of {bound:f} in or more in the law book", bound=bound
    )
