"""Exemptions: clauses that an act lifts from a lamp whose supplier claims a reason for it."""

from __future__ import annotations

from collections.abc import Iterator
from datetime import date

from generator.conformity.applicability import applicability
from generator.conformity.evidence import LampRecord
from generator.language import SEMICOLON, joined, say
from generator.records.clause import Clause, Exemption, LawBook

__all__ = ["claimable_note", "claimed_exemption"]


def _covering(law: LawBook, clause: Clause, day: date) -> Iterator[Exemption]:
    return (item for item in law.exemptions if item.covers(clause, day))


def claimed_exemption(
    law: LawBook, clause: Clause, record: LampRecord, day: date
) -> tuple[str, str]:
    """Find an exemption that is claimed for a lamp and that lifts a clause.

    Parameters
    ----------
    law
        The law book.
    clause
        The clause.
    record
        The lamp; its ``claimed_exemptions`` are ids of exemptions.
    day
        Day of law.

    Returns
    -------
    tuple of str
        Why the clause is lifted, and why a claim is not followed; empty where there is none.
    """
    claims = record.lamp.claimed_exemptions
    refused: str = ""
    for item in _covering(law, clause, day):
        if item.id not in claims:
            continue
        fit = applicability(item.when, record)
        if fit.holds is not False:
            claimed = say(
                "exemption claimed: {exemption} ({source}).",
                exemption=item.title,
                source=item.source.text,
            )
            return joined(" ", (claimed, item.note)) if item.note else claimed, ""
        refused = say(
            "The exemption {exemption} is claimed but cannot be followed: it holds only where "
            "{condition}.",
            exemption=item.id,
            condition=fit.why,
        )
    return "", refused


def claimable_note(law: LawBook, clause: Clause, record: LampRecord, day: date) -> str:
    """Name the exemptions that could lift a clause which the lamp does not meet.

    Parameters
    ----------
    law, clause, record, day
        As above.

    Returns
    -------
    str
        Exemptions that name the clause, or that ask for a property the lamp has; those that
        may be claimed by any lamp are not listed with every clause.
    """
    texts = [
        say("{exemption} ({source})", exemption=item.title, source=item.source.text)
        for item in _covering(law, clause, day)
        if (item.lifts or item.when) and applicability(item.when, record).holds
    ]
    if not texts:
        return ""
    return say(
        "It would be lifted if the supplier claimed and showed: {exemptions}.",
        exemptions=joined(SEMICOLON, texts),
    )
