"""Verification: whether the mean of the units is within the tolerance of the declaration.

Source: eu_2019_2015, Annex IX; eu_2019_2020, Annex IV; gb_2021_1095, Schedule 2. The tolerances
are for authorities: they never widen a limit.
"""

from __future__ import annotations

from fractions import Fraction

from generator.conformity.decision_rule import Limits
from generator.conformity.energy_class import total_mains_efficacy
from generator.conformity.evidence import Evidence, Reading
from generator.conformity.exact_number import decimal_of, number_text
from generator.conformity.limits import Limit, Question, no_limit, quantity_text
from generator.language import say
from generator.records.clause import Tolerance
from generator.records.clause_words import compared_text, with_unit
from generator.records.verdict import Basis

__all__ = ["tolerated", "verification_limit"]

_WITH_TOLERANCE = say("Declared {declared}, tolerance {tolerance}: {limit} ({source}).")
_NO_TOLERANCE = say("Declared {declared}, no tolerance: {limit} ({source}).")


def tolerated(declared: Fraction, tolerance: Tolerance) -> Limits:
    """Limits that a tolerance puts around a declared value.

    Parameters
    ----------
    declared
        Declared value.
    tolerance
        Absolute or in percent of the declared value, in one direction or both.

    Returns
    -------
    Limits
        On the determined value; the ends are within.

    Notes
    -----
    Source: eu_2019_2020, Annex IV Table 6; eu_2019_2015, Annex IX Table 9.
    """
    lower = upper = None
    if tolerance.minus is not None:
        lower = declared - Fraction(tolerance.minus)
    if tolerance.minus_percent is not None:
        lower = declared - abs(declared) * Fraction(tolerance.minus_percent) / 100
    if tolerance.plus is not None:
        upper = declared + Fraction(tolerance.plus)
    if tolerance.plus_percent is not None:
        upper = declared + abs(declared) * Fraction(tolerance.plus_percent) / 100
    return Limits(lower, upper)


def _declared(question: Question, quantity: str) -> Reading:
    evidence = Evidence(question.evidence.record, Basis.DECLARED)
    if quantity == "total_mains_efficacy_lm_per_w":
        return total_mains_efficacy(evidence, question.law, question.day)
    return evidence.reading(quantity)


def verification_limit(question: Question, quantity: str) -> Limit:
    """The declared value with its tolerance.

    Parameters
    ----------
    question
        Clause and lamp; the basis is determined.
    quantity
        Catalogue name of what is verified, of several the one in hand.

    Returns
    -------
    Limit
        On the mean of the units.

    Notes
    -----
    Source: eu_2019_2020, Annex IV; eu_2019_2015, Annex IX.
    """
    declared = _declared(question, quantity)
    tolerance = question.value.tolerance
    if declared.value is None or tolerance is None:
        return no_limit(say("{reason}, so there is nothing to verify", reason=declared.reason))
    limits = tolerated(declared.value, tolerance)
    unit = question.clause.unit
    ends = [number_text(end) for end in (limits.lower, limits.upper) if end is not None]
    shown = say("{low} to {high}", low=ends[0], high=ends[1]) if len(ends) > 1 else ends[0]
    step = (_NO_TOLERANCE if tolerance.is_zero else _WITH_TOLERANCE).format(
        declared=quantity_text(declared.value, unit),
        tolerance=tolerance.text(unit),
        limit=compared_text(question.clause.comparison, with_unit(shown, unit)),
        source=question.clause.source.text,
    )
    only = limits.lower if limits.upper is None else limits.upper
    if len(ends) == 1 and only is not None:
        return Limit(limits, shown=decimal_of(only), steps=(step,))
    return Limit(limits, shown=shown, steps=(step,))
