"""One value against its limit: formula, decision rule, and what a reader must know with it."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import replace
from datetime import date
from decimal import Decimal
from fractions import Fraction
from types import MappingProxyType

from generator.conformity.decision_rule import SIMPLE, Limits, Outcome, decide, rule_text
from generator.conformity.efficacy_curve import efficacy_curve
from generator.conformity.energy_class import class_limit, declared_class
from generator.conformity.equivalence import equivalent_power, reflector_flux
from generator.conformity.evidence import Evidence, Reading
from generator.conformity.exact_number import (
    decimal_of,
    number_text,
    rounded,
    square_root,
    uncertainty_text,
)
from generator.conformity.harmonics import harmonic_currents
from generator.conformity.law_figures import law_reading
from generator.conformity.limits import Limit, Question, no_limit, plain_limit, quantity_text
from generator.conformity.lumen_maintenance import lumen_maintenance_minimum
from generator.conformity.maximum_power import maximum_power
from generator.conformity.ruling import Ruling, not_applicable, not_measured
from generator.conformity.scope import light_source_scope
from generator.conformity.verification_tolerance import verification_limit
from generator.errors import LawBookError
from generator.language import joined, numeral, say, say_counted
from generator.quantities import QUANTITIES
from generator.records.clause import Clause, LawBook
from generator.records.clause_words import with_unit
from generator.records.settings import Decision
from generator.records.verdict import Basis, VerdictWord

__all__ = ["LIMIT_FORMULAS", "RULING_FORMULAS", "reading_for", "ruling_on", "shown"]

LIMIT_FORMULAS: Mapping[str, Callable[[Question], Limit]] = MappingProxyType(
    {
        "maximum_power": maximum_power,
        "lumen_maintenance_minimum": lumen_maintenance_minimum,
        "efficacy_curve": efficacy_curve,
        "equivalent_power": equivalent_power,
        "reflector_flux": reflector_flux,
        "declared_class": declared_class,
    }
)
"""Formula named in a leaf -> function that gives the limit."""

RULING_FORMULAS: Mapping[str, Callable[[Question], Ruling]] = MappingProxyType(
    {"light_source_scope": light_source_scope, "harmonic_currents": harmonic_currents}
)
"""Formula named in a leaf -> function that rules on several figures at once."""

PUBLISHED_STEPS = "eu-2019-2015-published-decimals"
"""The leaf with the steps in which product information is given."""

OF_THE_ACT = say("the act itself: the determined value is compared with the tolerance")
"""The rule of a verification, which no other may replace."""

ENERGY_CLASS = "energy_efficiency_class"
TOTAL_MAINS_EFFICACY = "total_mains_efficacy_lm_per_w"


def reading_for(
    clause: Clause, quantity: str, evidence: Evidence, law: LawBook, day: date
) -> Reading:
    """The reading of a quantity, measured or defined by the law, with the clause's statistic."""
    found = law_reading(quantity, evidence, law, day)
    return found if found is not None else evidence.reading(quantity, clause.statistic)


def shown(reading: Reading) -> Decimal | str | None:
    """What is printed as the value: the number, or the class."""
    if reading.shown:
        return reading.shown
    return None if reading.value is None else decimal_of(reading.value)


def ruling_on(question: Question, decision: Decision) -> Ruling:
    """Rule on a clause whose conditions hold for the lamp.

    Parameters
    ----------
    question
        Clause, lamp, basis and the value of the clause that counts.
    decision
        The decision rule of the campaign.

    Returns
    -------
    Ruling
        As if the limit were certain; its status is weighed elsewhere.
    """
    clause = question.clause
    if clause.formula in RULING_FORMULAS and not question.value.no_limit:
        ruling = RULING_FORMULAS[clause.formula](question)
        rule = rule_text(SIMPLE)
        return replace(ruling, rule=rule, steps=(*ruling.steps, _rule_step(rule)))
    rulings = [_compared(question, name, decision) for name in clause.quantities]
    order = (
        VerdictWord.FAIL,
        VerdictWord.NOT_MEASURED,
        VerdictWord.INCONCLUSIVE,
        VerdictWord.PASS,
        VerdictWord.NOT_APPLICABLE,
    )
    return min(rulings, key=lambda item: (order.index(item.word), item.margin or Decimal(0)))


def _compared(question: Question, quantity: str, decision: Decision) -> Ruling:
    reading = reading_for(question.clause, quantity, question.evidence, question.law, question.day)
    if question.value.no_limit:
        return _unlimited(reading)
    limit = _limit(question, quantity)
    if limit.limits is None:
        verified = question.clause.kind == "verification"
        reason = limit.reason
        if not verified:
            reason = say("no limit can be given: {reason}", reason=reason)
        ruling = not_measured(reason)
        return replace(ruling, value=shown(reading), quantity=quantity)
    if reading.value is None:
        ruling = not_measured(reading.reason, limit.shown)
        return replace(ruling, steps=limit.steps, quantity=quantity)
    return replace(_decided(question, reading, limit, limit.limits, decision), quantity=quantity)


def _unlimited(reading: Reading) -> Ruling:
    if reading.value is None:
        return not_applicable(say("the act sets no limit here"))
    return Ruling(VerdictWord.PASS, value=shown(reading), steps=reading.steps)


def _limit(question: Question, quantity: str) -> Limit:
    clause, value = question.clause, question.value
    if clause.kind == "verification":
        return verification_limit(question, quantity)
    if clause.formula:
        formula = LIMIT_FORMULAS.get(clause.formula)
        if formula is None:
            raise LawBookError(f"{clause.file}: formula: there is none called {clause.formula!r}")
        return formula(question)
    if clause.quantity == "energy_efficiency_class":
        if not isinstance(value.value, str):
            return no_limit(say("the clause has no class to compare with"))
        source = clause.source.text
        return class_limit(value.value, clause.comparison, question.law, question.day, source)
    return plain_limit(question)


def _decided(
    question: Question, reading: Reading, limit: Limit, limits: Limits, chosen: Decision
) -> Ruling:
    clause = question.clause
    value, rounding = _rounded(clause, reading.value or Fraction(0))
    declared = question.evidence.basis is Basis.DECLARED
    decision = SIMPLE if declared or clause.fixed_rule else chosen
    rule = OF_THE_ACT if clause.fixed_rule else rule_text(decision)
    uncertain = None if declared else _combined(reading, limit)
    outcome = decide(value, uncertain, limits, decision)
    word, lowered = _lowered(question, value, outcome.word)
    applied, open_because = _applied(rule, outcome, clause.fixed_rule)
    own = reading.expanded_uncertainty
    return Ruling(
        word,
        value=reading.shown or decimal_of(value),
        expanded_uncertainty=None if declared or own is None else decimal_of(own),
        limit=limit.shown,
        margin=decimal_of(outcome.margin),
        probability=_probability(outcome.probability),
        rule=rule,
        notes=(
            *open_because,
            *limit.notes,
            *lowered,
            *_tie(limit, value, limits),
            *_display(question, value, limits),
            *_sample(clause, reading, declared),
        ),
        steps=(
            *limit.steps,
            *reading.steps,
            *rounding,
            _compared_step(clause, value, limit, outcome.margin),
            *_uncertain_limit_step(clause, limit, uncertain),
            applied,
            *_probability_step(outcome.probability),
        ),
    )


def _applied(rule: str, outcome: Outcome, fixed: bool) -> tuple[str, tuple[str, ...]]:
    """The rule as it was applied, and the note that says why a verdict is left open."""
    named = _rule_step(rule)
    if outcome.word is VerdictWord.INCONCLUSIVE:
        return named, (outcome.step,)
    return named if fixed else joined(" ", (named, outcome.step)), ()


def _rule_step(rule: str) -> str:
    return say("Decision rule: {rule}.", rule=rule)


def _compared_step(clause: Clause, value: Fraction, limit: Limit, margin: Fraction) -> str:
    """Value, limit and margin in one sentence; a class is compared as an efficacy."""
    by_class = clause.quantity == ENERGY_CLASS
    unit = QUANTITIES[TOTAL_MAINS_EFFICACY].unit if by_class else clause.unit
    if isinstance(limit.shown, Decimal):
        against = quantity_text(Fraction(limit.shown), unit)
    else:
        against = limit.shown or ""
        against = say("class {letter}", letter=against) if by_class else against
    return say(
        "{value} against {limit}: margin {margin}.",
        value=quantity_text(value, unit),
        limit=against,
        margin=quantity_text(Fraction(f"{float(margin):.4g}"), unit),
    )


def _uncertain_limit_step(
    clause: Clause, limit: Limit, combined: Fraction | None
) -> tuple[str, ...]:
    """Why the rule works with more than the uncertainty of the value."""
    own = limit.expanded_uncertainty
    if not own or combined is None:
        return ()
    step = say(
        "The limit rests on measured figures and has U = {own} of its own; value and limit "
        "together have U = {combined}.",
        own=with_unit(uncertainty_text(own), clause.unit),
        combined=with_unit(uncertainty_text(combined), clause.unit),
    )
    return (step,)


_EXTREMES = {
    "0.0000": say("below {limit}", limit=numeral("0.0001")),
    "1.0000": say("above {limit}", limit=numeral("0.9999")),
}


def _probability_step(probability: float | None) -> tuple[str, ...]:
    if probability is None:
        return ()
    shown_as = f"{probability:.4f}"
    words = _EXTREMES.get(shown_as, numeral(shown_as))
    return (say("Probability of conformity: {probability}.", probability=words),)


def _rounded(clause: Clause, value: Fraction) -> tuple[Fraction, tuple[str, ...]]:
    if clause.rounding is None:
        return value, ()
    result = rounded(value, Fraction(clause.rounding.step), clause.rounding.mode)
    step = say(
        "Rounded as the act asks, to {step:f}: {value}.",
        step=clause.rounding.step,
        value=number_text(result),
    )
    return result, (step,)


def _combined(reading: Reading, limit: Limit) -> Fraction | None:
    own, other = reading.expanded_uncertainty, limit.expanded_uncertainty
    if own is None:
        return None
    if not other:
        return own
    return square_root(own**2 + other**2)


def _probability(probability: float | None) -> Decimal | None:
    return None if probability is None else Decimal(f"{probability:.4f}")


def _lowered(
    question: Question, value: Fraction, word: VerdictWord
) -> tuple[VerdictWord, tuple[str, ...]]:
    floor = question.value.may_be_lowered_to
    if floor is None or word is not VerdictWord.FAIL or value < Fraction(floor):
        return word, ()
    note = say("Corrections that are not known here may lower the limit to {limit:f}.", limit=floor)
    return VerdictWord.INCONCLUSIVE, (note,)


def _tie(limit: Limit, value: Fraction, limits: Limits) -> tuple[str, ...]:
    other = limit.other_reading
    if other is None or other.meets(value) is limits.meets(value):
        return ()
    return (_TIE_PASSES if other.meets(value) else _TIE_FAILS,)


_TIE_PASSES = say(
    "R is a tie and the act has no rule for it: half-up is used; half-down would make this a pass."
)
_TIE_FAILS = say(
    "R is a tie and the act has no rule for it: half-up is used; half-down would make this a fail."
)


def _display(question: Question, value: Fraction, limits: Limits) -> tuple[str, ...]:
    """The trap of a rounded display: what is published may look better than what is judged."""
    try:
        table = question.law.constant(PUBLISHED_STEPS, question.day)
    except LawBookError:
        return ()
    step = table.entries.get(question.clause.quantity)
    if question.clause.kind != "clause" or not isinstance(step, Decimal) or limits.meets(value):
        return ()
    published = rounded(value, Fraction(step))
    if not limits.meets(published):
        return ()
    note = say(
        "In steps of {step:f}, as EU product information is printed, the value would read {value} "
        "and seem to meet the limit; it does not.",
        step=step,
        value=number_text(published),
    )
    return (note,)


def _sample(clause: Clause, reading: Reading, declared: bool) -> tuple[str, ...]:
    count, wanted = reading.units_count, clause.sample_units
    if declared or wanted is None or not count or count == wanted:
        return ()
    if clause.formula == "lumen_maintenance_minimum":
        survived = say_counted(
            "Over {count} unit that survived; the act begins with {wanted}.",
            "Over {count} units that survived; the act begins with {wanted}.",
            count,
            wanted=wanted,
        )
        return (survived,)
    few = say_counted(
        "From {count} unit; the act wants {wanted}.",
        "From {count} units; the act wants {wanted}.",
        count,
        wanted=wanted,
    )
    return (few,)
