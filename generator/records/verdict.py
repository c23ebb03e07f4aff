"""Verdicts: one clause judged for one lamp on one basis, with limit, margin and the way there."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from enum import StrEnum

from generator.records.figure import Figure

__all__ = ["Basis", "Judgement", "Verdict", "VerdictWord"]


class VerdictWord(StrEnum):
    """The five words a verdict can be."""

    PASS = "pass"  # noqa: S105 - a verdict, not a secret
    FAIL = "fail"
    INCONCLUSIVE = "inconclusive"
    NOT_MEASURED = "not measured"
    NOT_APPLICABLE = "not applicable"


class Basis(StrEnum):
    """What is judged: the supplier's declaration, or what the units were found to be."""

    DECLARED = "declared"
    DETERMINED = "determined"


@dataclass(frozen=True, slots=True)
class Verdict:
    """One clause judged for one lamp on one basis.

    Parameters
    ----------
    lamp_id
        The lamp.
    clause
        Id of the clause, for instance ``eu-2019-2020-cri``.
    title
        Short name of the clause in words.
    regime
        The act, standard or buyer that asks, for instance ``EU 2019/2020``.
    quantity, unit
        Catalogue name and unit of what is judged.
    basis
        Declared or determined.
    value
        The value judged: exact decimal, class letter, or ``None`` when there is none.
    expanded_uncertainty
        Expanded uncertainty (k = 2) of the value; ``None`` for declared values or when unknown.
    limit
        The limit in force for this lamp; ``None`` where none applies.
    comparison
        ``at least``, ``at most``, ``below``, ``above``, ``within`` or ``equal``.
    margin
        How far the value is on the passing side, in the unit; negative on the failing side.
    verdict
        One of the five words.
    source
        Act, annex and point, for people.
    status
        How the limit is known: ``read``, ``quoted``, ``computed``, ``cross-checked``,
        ``unconfirmed``; ``buyer`` for the buyer's own clauses.
    probability
        Probability of conformity (JCGM 106), or ``None`` when the uncertainty is unknown.
    rule
        The decision rule used, in words.
    note
        What a reader must know with the verdict (tie rule, indicative, small sample, why there
        is none).
    steps
        The way from inputs to verdict, one sentence a step, for ``explain``.
    """

    lamp_id: str
    clause: str
    title: str
    regime: str
    quantity: str
    unit: str
    basis: Basis
    value: Decimal | str | None
    expanded_uncertainty: Decimal | None
    limit: Decimal | str | None
    comparison: str
    margin: Decimal | None
    verdict: VerdictWord
    source: str
    status: str
    probability: Decimal | None = None
    rule: str = ""
    note: str = ""
    steps: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Judgement:
    """What the conformity room gives: verdicts, and the figures that the law itself defines."""

    verdicts: tuple[Verdict, ...]
    figures: tuple[Figure, ...]
