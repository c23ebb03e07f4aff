"""Mandatory clauses of the law and of the buyer, as they were judged for one lamp."""

from __future__ import annotations

from collections.abc import Sequence

from generator.comparison.eligibility.gate_findings import GateFindings
from generator.comparison.eligibility.value_text import value_text
from generator.quantities import QUANTITIES
from generator.records.clause import BUYER
from generator.records.tender_settings import TenderLot, TenderTable
from generator.records.verdict import Basis, Verdict, VerdictWord

__all__ = ["check_clauses", "mandatory"]


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
                "Clause not judged",
                f"The requirement {clause} could not be judged from what your bid contains. "
                "Please show how the offered lamp meets it.",
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
    return f"{item.comparison} {item.limit} {item.unit}".strip()


def _failure(item: Verdict) -> str:
    found = "no value"
    if item.value is not None:
        found = value_text(item.value, item.quantity, item.limit)
    limit = _limit(item) or "the limit"
    return f"{_label(item)}, {item.basis}: {found}; asked for: {limit}."


def _question(item: Verdict) -> str:
    label, limit = _label(item), _limit(item)
    asked = f" ({limit})" if limit else ""
    if item.verdict is VerdictWord.INCONCLUSIVE:
        return (
            f"The {label} of the offered lamp lies so near the requirement{asked} that the "
            "measurement leaves open whether it is met. Please supply measurements of a smaller "
            f"uncertainty or of more units. The requirement stands in {item.source}."
        )
    return (
        f"The bid contains no value for the {label} of the offered lamp that could be held "
        f"against the requirement{asked}. Please supply a test report that states it with its "
        f"uncertainty. The requirement stands in {item.source}."
    )
