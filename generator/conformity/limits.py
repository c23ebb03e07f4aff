"""The limit of a clause for one lamp: a dated value, a value with slopes, or a named formula."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from decimal import Decimal
from fractions import Fraction

from generator.conformity.applicability import applicability
from generator.conformity.decision_rule import Limits
from generator.conformity.evidence import Evidence, LampRecord
from generator.conformity.exact_number import decimal_of, number_text
from generator.language import joined, say
from generator.quantities import QUANTITIES
from generator.records.clause import Clause, DatedValue, LawBook
from generator.records.clause_words import compared_text, with_unit

__all__ = [
    "Chosen",
    "Limit",
    "Question",
    "chosen_value",
    "no_limit",
    "one_sided",
    "plain_limit",
    "quantity_text",
]


_NOT_YET = say("no value is in force on {day}: first value from {begin}")
_ENDED = say("no value is in force on {day}: its validity has ended")
DEPENDS_ON = say("the limit depends on the {quantity}, which is {reason}")


@dataclass(frozen=True, slots=True, eq=False)
class Question:
    """One clause put to one lamp on one basis.

    Parameters
    ----------
    clause, value
        The clause, and which of its values counts for this lamp.
    evidence
        The figures of the lamp.
    law
        The law book, for constants.
    day
        Day of law: the lamp's placing on the market.
    """

    clause: Clause
    value: DatedValue
    evidence: Evidence
    law: LawBook
    day: date

    def constants(self, role: str) -> DatedValue:
        """The constants that the clause names for a role in its formula."""
        return self.law.constant(self.clause.constants[role], self.day)


@dataclass(frozen=True, slots=True)
class Limit:
    """The limit for one lamp.

    Parameters
    ----------
    limits
        The numbers; ``None`` where there is no limit, and then :attr:`reason` says why.
    reason
        What is missing for a limit to be formed.
    shown
        What is printed as the limit.
    steps, notes
        How it came about; what a reader must know with it.
    expanded_uncertainty
        Expanded uncertainty (k = 2) of the limit itself, where it rests on measured figures;
        zero for a fixed number, ``None`` where unknown.
    other_reading
        The limits under another reading of the act, where it leaves one open.
    """

    limits: Limits | None
    reason: str = ""
    shown: Decimal | str | None = None
    steps: tuple[str, ...] = ()
    notes: tuple[str, ...] = ()
    expanded_uncertainty: Fraction | None = Fraction(0)
    other_reading: Limits | None = None


@dataclass(frozen=True, slots=True)
class Chosen:
    """The value of a clause that counts for a lamp, or why none does.

    Parameters
    ----------
    value
        The value; ``None`` where none counts.
    unknown
        Properties that are not known and that decide which value counts.
    why
        Why no value counts, though everything is known.
    """

    value: DatedValue | None
    unknown: str = ""
    why: str = ""


def no_limit(reason: str) -> Limit:
    """A limit that cannot be formed."""
    return Limit(None, reason=reason)


def chosen_value(clause: Clause, record: LampRecord, day: date) -> Chosen:
    """Pick the value of a clause by date and condition.

    Parameters
    ----------
    clause
        The clause.
    record
        The lamp with its figures.
    day
        Day of law.

    Returns
    -------
    Chosen
        The first value in force whose conditions hold; none where it cannot be told whether
        those of an earlier one do.
    """
    standing = clause.on(day)
    if not standing:
        starts = [item.start for item in clause.values if item.start is not None]
        later = [start for start in starts if start > day]
        if not later:
            return Chosen(None, why=_ENDED.format(day=day))
        return Chosen(None, why=_NOT_YET.format(day=day, begin=min(later)))
    unknown: list[str] = []
    for item in standing:
        fit = applicability(item.when, record)
        if fit.holds and not unknown:
            return Chosen(item)
        if fit.holds is None:
            unknown.append(fit.why)
    if unknown:
        return Chosen(None, unknown=joined(", ", dict.fromkeys(unknown)))
    return Chosen(None, why=say("the clause has no value for such a lamp"))


def quantity_text(number: Fraction, unit: str) -> str:
    """A number with its unit."""
    return with_unit(number_text(number), unit)


def one_sided(comparison: str, number: Fraction) -> Limits:
    """Limits of a one-sided comparison."""
    if comparison in {"at least", "above"}:
        return Limits(lower=number, strict=comparison == "above")
    return Limits(upper=number, strict=comparison == "below")


def plain_limit(question: Question) -> Limit:
    """Give the limit that stands in the leaf.

    Parameters
    ----------
    question
        Clause, lamp and basis.

    Returns
    -------
    Limit
        A dated value, two values for ``within``, or a value with slopes.
    """
    clause, value = question.clause, question.value
    source = (value.source or clause.source).text
    if value.lower is not None and value.upper is not None:
        lower, upper = Fraction(value.lower), Fraction(value.upper)
        shown = say("{low} to {high}", low=number_text(lower), high=number_text(upper))
        step = _limit_step(compared_text("within", shown), source)
        return Limit(Limits(lower, upper), shown=shown, steps=(step,))
    if not isinstance(value.value, Decimal):
        return no_limit(say("the clause has no number to compare with"))
    if value.slopes:
        return _sloped(question, Fraction(value.value), source)
    number = Fraction(value.value)
    asked = compared_text(clause.comparison, quantity_text(number, clause.unit))
    step = _limit_step(asked, source)
    return Limit(one_sided(clause.comparison, number), shown=decimal_of(number), steps=(step,))


def _limit_step(asked: str, source: str) -> str:
    return say("Limit: {limit} ({source}).", limit=asked, source=source)


def _sloped(question: Question, number: Fraction, source: str) -> Limit:
    parts: list[str] = [number_text(number)]
    uncertain: Fraction | None = Fraction(0)
    for slope in question.value.slopes:
        reading = question.evidence.reading(slope.quantity)
        label = QUANTITIES[slope.quantity].label
        if reading.value is None:
            return no_limit(DEPENDS_ON.format(quantity=label, reason=reading.reason))
        times = Fraction(slope.times)
        number += times * reading.value
        parts.append(
            say(
                "{factor} × {value} ({quantity})",
                factor=number_text(times),
                value=number_text(reading.value),
                quantity=label,
            )
        )
        if uncertain is not None and reading.expanded_uncertainty is not None:
            uncertain += abs(times) * reading.expanded_uncertainty
        else:
            uncertain = None
    clause = question.clause
    total = quantity_text(number, clause.unit)
    sum_text = say("{parts} = {total}", parts=joined(" + ", parts), total=total)
    step = _limit_step(compared_text(clause.comparison, sum_text), source)
    return Limit(
        one_sided(clause.comparison, number),
        shown=decimal_of(number),
        steps=(step,),
        expanded_uncertainty=uncertain,
    )
