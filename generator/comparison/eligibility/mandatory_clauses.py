"""Mandatory clauses of the law and of the buyer, as they were judged for one lamp."""

from __future__ import annotations

from collections.abc import Sequence

from generator.comparison.eligibility.gate_findings import GateFindings
from generator.comparison.eligibility.value_text import value_text
from generator.language import numeral, say
from generator.quantities import QUANTITIES
from generator.records.clause import BUYER
from generator.records.clause_words import compared_text, with_unit
from generator.records.tender_settings import TenderLot, TenderTable
from generator.records.verdict import BASIS_WORDS, Basis, Verdict, VerdictWord

__all__ = ["check_clauses", "mandatory"]

_OPEN = (
    say(
        "The {quantity} of the offered lamp lies so near the requirement ({limit}) that the "
        "measurement leaves open whether it is met. Please supply measurements of a smaller "
        "uncertainty or of more units. The requirement stands in {source}."
    ),
    say(
        "The {quantity} of the offered lamp lies so near the requirement that the measurement "
        "leaves open whether it is met. Please supply measurements of a smaller uncertainty or of "
        "more units. The requirement stands in {source}."
    ),
)
"""What is asked where a value is too near its limit: with the limit, and without one."""

_WITHOUT_VALUE = (
    say(
        "The bid contains no value for the {quantity} of the offered lamp that could be held "
        "against the requirement ({limit}). Please supply a test report that states it with its "
        "uncertainty. The requirement stands in {source}."
    ),
    say(
        "The bid contains no value for the {quantity} of the offered lamp that could be held "
        "against the requirement. Please supply a test report that states it with its "
        "uncertainty. The requirement stands in {source}."
    ),
)
"""What is asked where there is no value: with the limit, and without one."""


def mandatory(
    verdicts: Sequence[Verdict], tender: TenderTable, lot: TenderLot
) -> dict[str, list[Verdict]]:
    """The verdicts on mandatory clauses, by clause.

    Parameters
    ----------
    verdicts
        Verdicts of one lamp.
    tender, lot
        Where regimes and clauses are named as mandatory; the buyer's own clauses always are.

    Returns
    -------
    dict
        Clause id -> verdicts; empty for a clause that is named but was not judged.
    """
    regimes = {name.casefold() for name in (*tender.mandatory_regimes, *lot.mandatory_regimes)}
    named = (*tender.mandatory_clauses, *lot.mandatory_clauses)
    found: dict[str, list[Verdict]] = {}
    for item in verdicts:
        asked = item.status == BUYER or item.regime.casefold() in regimes or item.clause in named
        if asked:
            found.setdefault(item.clause, []).append(item)
    for clause in named:
        found.setdefault(clause, [])
    return found


def check_clauses(clauses: dict[str, list[Verdict]], findings: GateFindings) -> None:
    """Turn the verdicts on mandatory clauses into reasons, questions and checks passed.

    Parameters
    ----------
    clauses
        As :func:`mandatory` gives them.
    findings
        Where to note the outcome. A ``fail`` on either basis is a reason; a determined value
        that is missing or left open is a question; a declared value alone is enough only for a
        clause that is judged on the declaration alone.
    """
    for clause in sorted(clauses):
        verdicts = clauses[clause]
        if not verdicts:
            findings.ask(
                clause,
                say("Clause not judged"),
                say(
                    "The requirement {clause} could not be judged from what your bid contains. "
                    "Please show how the offered lamp meets it.",
                    clause=clause,
                ),
            )
            continue
        _check_clause(clause, verdicts, findings)


def _check_clause(clause: str, verdicts: Sequence[Verdict], findings: GateFindings) -> None:
    failed = [item for item in verdicts if item.verdict is VerdictWord.FAIL]
    if failed:
        for item in failed:
            findings.exclude(clause, item.title, _failure(item), item.source)
        return
    judged = [item for item in verdicts if item.verdict is not VerdictWord.NOT_APPLICABLE]
    determined = [item for item in judged if item.basis is Basis.DETERMINED]
    open_ones = [item for item in (determined or judged) if item.verdict is not VerdictWord.PASS]
    for item in open_ones:
        findings.ask(clause, item.title, _question(item), item.note)
    if not open_ones:
        findings.hold(clause)


def _label(item: Verdict) -> str:
    known = QUANTITIES.get(item.quantity)
    return known.label if known else item.quantity


def _limit(item: Verdict) -> str:
    """The limit in words; empty where there is none to name."""
    if item.limit is None:
        return ""
    limit = item.limit if isinstance(item.limit, str) else numeral(f"{item.limit}")
    return compared_text(item.comparison, with_unit(limit, item.unit))


def _failure(item: Verdict) -> str:
    found: str = say("no value")
    if item.value is not None:
        found = value_text(item.value, item.quantity, item.limit)
    return say(
        "{quantity}, {basis}: {found}; asked for: {asked}.",
        quantity=_label(item),
        basis=BASIS_WORDS[item.basis],
        found=found,
        asked=_limit(item) or say("the limit"),
    )


def _question(item: Verdict) -> str:
    limit = _limit(item)
    patterns = _OPEN if item.verdict is VerdictWord.INCONCLUSIVE else _WITHOUT_VALUE
    pattern = patterns[0] if limit else patterns[1]
    return pattern.format(quantity=_label(item), limit=limit, source=item.source)
