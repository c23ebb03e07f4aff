"""Verdicts: one clause judged for one lamp on one basis, with limit, margin and the way there."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from enum import StrEnum
from types import MappingProxyType

from generator.language import say_as
from generator.records.figure import Figure

__all__ = ["BASIS_WORDS", "VERDICT_WORDS", "Basis", "Judgement", "Verdict", "VerdictWord"]


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


VERDICT_WORDS = MappingProxyType(
    {
        VerdictWord.PASS: say_as("verdict", "pass"),
        VerdictWord.FAIL: say_as("verdict", "fail"),
        VerdictWord.INCONCLUSIVE: say_as("verdict", "inconclusive"),
        VerdictWord.NOT_MEASURED: say_as("verdict", "not measured"),
        VerdictWord.NOT_APPLICABLE: say_as("verdict", "not applicable"),
    }
)
"""The five words as they are said."""

BASIS_WORDS = MappingProxyType(
    {
        Basis.DECLARED: say_as("basis", "declared"),
        Basis.DETERMINED: say_as("basis", "determined"),
    }
)
"""The two bases as they are said."""


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
        is none); a passage whose parts are its sentences.
    steps
        The way from inputs to verdict, one sentence a step, for ``explain``.
    act
        The act, standard or call alone, as it heads its clauses.
    place
        Edition, annex and point, without what amended them.
    amending_act
        Number of the act that amended the place; empty where none did.
    reason
        Why the clause does not apply; empty where it does.
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
    act: str = ""
    place: str = ""
    amending_act: str = ""
    reason: str = ""


@dataclass(frozen=True, slots=True)
class Judgement:
    """What the conformity room gives: verdicts, and the figures that the law itself defines."""

    verdicts: tuple[Verdict, ...]
    figures: tuple[Figure, ...]
