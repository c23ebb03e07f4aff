"""Rulings: a verdict before it is given its lamp, clause and source."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from decimal import Decimal

from generator.language import say, sentence
from generator.records.verdict import VerdictWord

__all__ = ["Ruling", "not_applicable", "not_measured", "unsettled", "weighed"]


@dataclass(frozen=True, slots=True)
class Ruling:
    """What was found for one clause, one lamp and one basis.

    Parameters
    ----------
    word
        One of the five.
    value, expanded_uncertainty, limit, margin, probability, rule
        As on the verdict.
    quantity, unit, comparison
        Where they differ from the clause, of several quantities the deciding one; else empty.
    notes, steps
        Sentences.
    reason
        Why the clause does not apply; empty where it does.
    """

    word: VerdictWord
    value: Decimal | str | None = None
    expanded_uncertainty: Decimal | None = None
    limit: Decimal | str | None = None
    margin: Decimal | None = None
    probability: Decimal | None = None
    rule: str = ""
    quantity: str = ""
    unit: str | None = None
    comparison: str = ""
    notes: tuple[str, ...] = ()
    steps: tuple[str, ...] = ()
    reason: str = ""

    def with_notes(self, notes: Iterable[str]) -> Ruling:
        """The same ruling with further notes; empty ones are left out."""
        added = (*self.notes, *(note for note in notes if note))
        return replace(self, notes=tuple(dict.fromkeys(added)))

    def with_steps_before(self, steps: Iterable[str]) -> Ruling:
        """The same ruling with steps put before its own."""
        return replace(self, steps=(*steps, *self.steps))


def not_applicable(reason: str) -> Ruling:
    """The clause does not apply, and why."""
    note = sentence(say("Not applicable: {reason}", reason=reason))
    return Ruling(VerdictWord.NOT_APPLICABLE, reason=reason, notes=(note,))


def not_measured(reason: str, limit: Decimal | str | None = None) -> Ruling:
    """There is no value to judge, and why."""
    return Ruling(VerdictWord.NOT_MEASURED, limit=limit, notes=(sentence(reason),))


def unsettled(reason: str) -> Ruling:
    """There is a value, but something needed is not known."""
    return Ruling(VerdictWord.INCONCLUSIVE, notes=(sentence(reason),))


_WEIGHTS = {
    "quoted": say("The limit is quoted from another publication; the act itself was not read."),
    "computed": say("The limit is computed from stated inputs; it was not read in the act."),
    "cross-checked": say("The limit is cross-checked; it was not read in the act."),
}

_INDICATIVE = {
    VerdictWord.PASS: say(
        "Indicative only: the limit is not confirmed in any source; the value would meet it."
    ),
    VerdictWord.FAIL: say(
        "Indicative only: the limit is not confirmed in any source; the value would not meet it."
    ),
    VerdictWord.INCONCLUSIVE: say(
        "Indicative only: the limit is not confirmed in any source; the value would leave it open."
    ),
}


def weighed(ruling: Ruling, status: str) -> Ruling:
    """Let the status of the limit decide how much a verdict weighs.

    Parameters
    ----------
    ruling
        Found as if the limit were certain.
    status
        ``read`` and ``buyer``: as found; ``quoted``, ``computed``, ``cross-checked``: as found,
        and said; ``unconfirmed``: indicative, never a pass or a fail.

    Returns
    -------
    Ruling
        With its note.
    """
    if ruling.word not in _INDICATIVE:
        return ruling
    if status != "unconfirmed":
        return ruling.with_notes([_WEIGHTS.get(status, "")])
    notes = (_INDICATIVE[ruling.word], *ruling.notes)
    return replace(ruling, word=VerdictWord.INCONCLUSIVE, notes=notes)
