"""Whether a clause applies to a lamp: structured conditions on what the lamp is."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from fractions import Fraction

from generator.conformity.evidence import Evidence, LampRecord
from generator.language import joined
from generator.quantities import QUANTITIES
from generator.records.clause import Condition
from generator.records.clause_words import subject_text
from generator.records.verdict import Basis

__all__ = ["Applicability", "applicability", "property_of"]

Property = bool | str | Fraction


@dataclass(frozen=True, slots=True)
class Applicability:
    """Whether all conditions hold.

    Parameters
    ----------
    holds
        True, False, or ``None`` where a property needed is not known.
    why
        The condition that fails, in words, or what is not known; empty where all hold.
    """

    holds: bool | None
    why: str = ""


def property_of(record: LampRecord, subject: str) -> Property | None:
    """Give a property of a lamp by its name in a condition.

    Parameters
    ----------
    record
        The lamp with its figures.
    subject
        Property of the lamp, catalogue quantity (declared before determined), or ``declared_``
        and a catalogue quantity.

    Returns
    -------
    bool, str, Fraction or None
        ``None`` where it is not known.
    """
    declared_only = subject.removeprefix("declared_")
    if declared_only != subject:
        return Evidence(record, Basis.DECLARED).reading(declared_only).value
    if subject in QUANTITIES:
        for basis in (Basis.DECLARED, Basis.DETERMINED):
            value = Evidence(record, basis).reading(subject).value
            if value is not None:
                return value
        return None
    stated = getattr(record.lamp, subject, None)
    return stated if isinstance(stated, bool | str) and stated != "" else None


def applicability(conditions: Iterable[Condition], record: LampRecord) -> Applicability:
    """Decide whether all conditions hold for a lamp.

    Parameters
    ----------
    conditions
        The conditions; none of them always holds.
    record
        The lamp with its figures.

    Returns
    -------
    Applicability
        A condition that fails decides, also where another cannot be told.
    """
    unknown: list[str] = []
    for condition in conditions:
        value = property_of(record, condition.subject)
        if value is None:
            unknown.append(subject_text(condition.subject))
        elif not _holds(condition, value):
            return Applicability(False, condition.text)
    if unknown:
        return Applicability(None, joined(", ", dict.fromkeys(unknown)))
    return Applicability(True)


def _holds(condition: Condition, value: Property) -> bool:
    if isinstance(value, Fraction):
        return _within(condition, value)
    if condition.equals is not None:
        return _same(condition.equals, value)
    return any(_same(item, value) for item in condition.one_of)


def _same(wanted: bool | str, value: bool | str) -> bool:
    if isinstance(wanted, str) and isinstance(value, str):
        return wanted.casefold() == value.casefold()
    return wanted is value


def _within(condition: Condition, value: Fraction) -> bool:
    return (
        (condition.at_least is None or value >= Fraction(condition.at_least))
        and (condition.above is None or value > Fraction(condition.above))
        and (condition.at_most is None or value <= Fraction(condition.at_most))
        and (condition.below is None or value < Fraction(condition.below))
    )
