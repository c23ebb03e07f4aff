"""What a campaign asks of the law book: its regimes and the buyer's own clauses, checked."""

from __future__ import annotations

import difflib
from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from generator.errors import DataProblems, LawBookError, Problem
from generator.lawbook.buyer import buyer_clauses
from generator.records.clause import LawBook
from generator.records.lamp import Lamp

__all__ = ["asked_problems", "claim_problems"]

FILE = "campaign.toml"


def asked_problems(tables: Mapping[str, Any], law: LawBook) -> Iterator[Problem]:
    """What is wrong with the regimes and clauses that a campaign asks for.

    Parameters
    ----------
    tables
        The tables of ``campaign.toml`` as they were parsed; what is of the wrong type is left
        to the settings model.
    law
        The law book.

    Yields
    ------
    Problem
        One for each thing that is wrong.
    """
    campaign = tables.get("campaign")
    regimes = campaign.get("regimes") if isinstance(campaign, Mapping) else None
    if isinstance(regimes, list) and all(isinstance(name, str) for name in regimes):
        yield from _regime_problems(regimes, law)
    clauses = tables.get("clause")
    if isinstance(clauses, list) and all(isinstance(item, Mapping) for item in clauses):
        try:
            buyer_clauses(clauses, FILE)
        except DataProblems as error:
            yield from error.problems


def _regime_problems(regimes: list[str], law: LawBook) -> Iterator[Problem]:
    for name in regimes:
        try:
            law.clauses([name])
        except LawBookError as error:
            expected = ", ".join(law.regimes)
            yield Problem(
                "error", FILE, None, "campaign.regimes", name, f"one of {expected}", f"{error}"
            )


def claim_problems(lamps: Iterable[Lamp], law: LawBook) -> Iterator[Problem]:
    """What is wrong with the exemptions that suppliers claim.

    Parameters
    ----------
    lamps
        The lamps.
    law
        The law book.

    Yields
    ------
    Problem
        One for each claim that names no exemption of the law book.
    """
    known = [exemption.id for exemption in law.exemptions]
    for lamp in lamps:
        for claim in lamp.claimed_exemptions:
            if claim not in known:
                near = difflib.get_close_matches(claim, known, n=1)
                yield Problem(
                    "error",
                    "lamps.csv",
                    lamp.row,
                    "claimed_exemptions",
                    claim,
                    near[0] if near else f"ids parted by spaces, out of {', '.join(known)}",
                    "The law book has no such exemption.",
                )
