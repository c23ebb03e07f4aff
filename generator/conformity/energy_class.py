"""Total mains efficacy and energy efficiency class.

Source: eu_2019_2015, Annex II. Factor and class bounds come from the law book.
"""

from __future__ import annotations

from datetime import date
from fractions import Fraction

from generator.conformity.decision_rule import Limits
from generator.conformity.evidence import Evidence, Reading, missing
from generator.conformity.exact_number import number_text
from generator.conformity.limits import Limit, Question, no_limit
from generator.errors import LawBookError
from generator.language import say, say_as
from generator.records.clause import DatedValue, LawBook
from generator.records.clause_words import all_of
from generator.records.lamp import Lamp
from generator.records.verdict import Basis

__all__ = [
    "ENERGY_CLASS_CLAUSE",
    "class_constants",
    "class_limit",
    "declared_class",
    "energy_class_of",
    "energy_class_reading",
    "mains_factor",
    "not_stated",
    "total_mains_efficacy",
]

ENERGY_CLASS_CLAUSE = "eu-2019-2015-energy-efficiency-class"
"""The clause that names the leaves of factor and class bounds."""

NOT_IN_FORCE = say("the energy label rules are not in force on {day}")
NOT_STATED = say("not stated for the lamp: {properties}")

_PROPERTIES = {
    "directional": say_as("property", "directional"),
    "mains": say_as("property", "mains"),
}


def not_stated(lamp: Lamp) -> str:
    """Name what both formulas need to know of a lamp and what is not stated; may be empty."""
    return all_of(said for name, said in _PROPERTIES.items() if getattr(lamp, name) is None)


def class_constants(law: LawBook, day: date) -> tuple[DatedValue, DatedValue] | None:
    """Factor table and class bounds as they stood on a day; ``None`` where not in force."""
    clause = law.clause(ENERGY_CLASS_CLAUSE)
    try:
        return (
            law.constant(clause.constants["factor"], day),
            law.constant(clause.constants["bounds"], day),
        )
    except LawBookError:
        return None


def mains_factor(lamp: Lamp, table: DatedValue) -> Fraction | str:
    """Factor of the total mains efficacy.

    Parameters
    ----------
    lamp
        The lamp; ``directional`` and ``mains`` decide.
    table
        The four factors.

    Returns
    -------
    Fraction or str
        The factor, or the properties that are not stated.

    Notes
    -----
    Source: eu_2019_2015, Annex II Table 2.
    """
    unknown = not_stated(lamp)
    if unknown:
        return unknown
    light = "directional" if lamp.directional else "non_directional"
    supply = "mains" if lamp.mains else "non_mains"
    return Fraction(table.number(f"{light}_{supply}"))


def total_mains_efficacy(evidence: Evidence, law: LawBook, day: date) -> Reading:
    """Total mains efficacy [lm/W]: useful luminous flux over power, times the factor.

    Parameters
    ----------
    evidence
        Figures of the lamp on one basis.
    law
        The law book.
    day
        Day of law.

    Returns
    -------
    Reading
        Exact and unrounded; on the determined basis the mean of the quotients of the units.

    Notes
    -----
    Source: eu_2019_2015, Annex II; Annex IX for the determined value.
    """
    constants = class_constants(law, day)
    if constants is None:
        return missing(NOT_IN_FORCE.format(day=day))
    factor = mains_factor(evidence.lamp, constants[0])
    if isinstance(factor, str):
        return missing(NOT_STATED.format(properties=factor))
    with_factor = say("Factor of the total mains efficacy: {factor}.", factor=number_text(factor))
    if evidence.basis is Basis.DETERMINED:
        found = evidence.quotient_of_units("useful_luminous_flux_lm", "power_w", factor)
        if found.value is None:
            return found
        result = say("Total mains efficacy: {efficacy} lm/W.", efficacy=number_text(found.value))
        return Reading(
            found.value,
            found.expanded_uncertainty,
            found.units_count,
            found.grade,
            steps=(with_factor, *found.steps, result),
        )
    flux, power = evidence.reading("useful_luminous_flux_lm"), evidence.reading("power_w")
    if flux.value is None or not power.value:
        named = ((say("luminous flux"), flux), (say("power"), power))
        names = all_of(name for name, item in named if not item.value)
        return missing(say("not declared: {quantities}", quantities=names))
    value = flux.value / power.value * factor
    formula = say(
        "Total mains efficacy: {flux} lm / {power} W × {factor} = {efficacy} lm/W.",
        flux=number_text(flux.value),
        power=number_text(power.value),
        factor=number_text(factor),
        efficacy=number_text(value),
    )
    return Reading(value, steps=(with_factor, formula))


def energy_class_of(efficacy: Fraction, bounds: DatedValue) -> str:
    """Energy efficiency class of a total mains efficacy.

    Parameters
    ----------
    efficacy
        Total mains efficacy, unrounded [lm/W].
    bounds
        Lower bound of each class, included.

    Returns
    -------
    str
        A letter.

    Notes
    -----
    Source: eu_2019_2015, Annex II Table 1.
    """
    ordered = sorted(bounds.entries, key=lambda letter: -bounds.number(letter))
    for letter in ordered:
        if efficacy >= Fraction(bounds.number(letter)):
            return letter
    return ordered[-1]


def energy_class_reading(evidence: Evidence, law: LawBook, day: date) -> Reading:
    """The total mains efficacy, shown as the class that it gives."""
    efficacy = total_mains_efficacy(evidence, law, day)
    constants = class_constants(law, day)
    if efficacy.value is None or constants is None:
        return efficacy
    letter = energy_class_of(efficacy.value, constants[1])
    return Reading(
        efficacy.value,
        efficacy.expanded_uncertainty,
        efficacy.units_count,
        efficacy.grade,
        shown=letter,
        steps=(*efficacy.steps, say("That is class {letter}.", letter=letter)),
    )


def class_limit(letter: str, comparison: str, law: LawBook, day: date, source: str) -> Limit:
    """The total mains efficacy at which a class begins, shown as the class.

    Parameters
    ----------
    letter
        The class.
    comparison
        ``at least`` (this class or a better one) or ``at most``.
    law, day
        The law book and the day.
    source
        Where the requirement stands.

    Returns
    -------
    Limit
        On the total mains efficacy [lm/W].
    """
    constants = class_constants(law, day)
    if constants is None:
        return no_limit(NOT_IN_FORCE.format(day=day))
    bounds = constants[1]
    if letter not in bounds.entries:
        letters = ", ".join(bounds.entries)
        return no_limit(
            say(
                "{letter} is not a class; expected one of {letters}", letter=letter, letters=letters
            )
        )
    begin = Fraction(bounds.number(letter))
    if comparison == "at least":
        step = say(
            "Limit: class {letter} or better, which begins at {efficacy} lm/W ({source}).",
            letter=letter,
            efficacy=number_text(begin),
            source=source,
        )
        return Limit(Limits(lower=begin), shown=letter, steps=(step,))
    better = [Fraction(bounds.number(name)) for name in bounds.entries]
    above = [number for number in better if number > begin]
    step = say("Limit: class {letter} or a lower one ({source}).", letter=letter, source=source)
    if not above:
        return Limit(Limits(lower=Fraction(0)), shown=letter, steps=(step,))
    return Limit(Limits(upper=min(above), strict=True), shown=letter, steps=(step,))


def declared_class(question: Question) -> Limit:
    """The class that the supplier declares, as a limit on the class that the figures give.

    Parameters
    ----------
    question
        Clause, lamp and basis.

    Returns
    -------
    Limit
        A class that the figures must reach; a declared class below it passes.

    Notes
    -----
    Source: eu_2019_2015, Annex IX point 2(b): what is published must not be more favourable
    than the figures allow.
    """
    letter = question.evidence.lamp.declared_energy_class
    if letter is None:
        return no_limit(say("no energy efficiency class is declared"))
    source = question.clause.source.text
    limit = class_limit(letter, "at least", question.law, question.day, source)
    reading = energy_class_reading(question.evidence, question.law, question.day)
    if reading.shown and reading.shown < letter:
        note = say(
            "The figures give class {letter}, a better one than is declared.", letter=reading.shown
        )
        return Limit(limit.limits, shown=limit.shown, steps=limit.steps, notes=(note,))
    return limit
