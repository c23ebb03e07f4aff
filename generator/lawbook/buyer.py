"""The buyer's own clauses: ``[[clause]]`` of ``campaign.toml``, in the shape of a leaf."""

from __future__ import annotations

import difflib
from collections.abc import Mapping, Sequence
from typing import Any

from generator.errors import DataProblems, Problem
from generator.quantities import suggestion
from generator.records.clause import Clause

__all__ = ["buyer_clauses"]


def buyer_clauses(raw: Sequence[Mapping[str, Any]], file: str) -> tuple[Clause, ...]:
    """Check the buyer's clauses and turn them into clauses like those of the law book.

    Parameters
    ----------
    raw
        The tables as they were read.
    file
        Path for messages, relative to the campaign folder.

    Returns
    -------
    tuple of Clause
        In file order; their status is ``buyer``.

    Raises
    ------
    DataProblems
        If a clause has unknown keys, wrong types, an unknown quantity (the nearest name is
        suggested), overlapping dates, or an id twice.
    """
    problems: list[Problem] = []
    clauses: dict[str, Clause] = {}
    for number, table in enumerate(raw, start=1):
        clause = _clause(table, number, file, problems)
        if clause is None:
            continue
        if clause.id.casefold() in (known.casefold() for known in clauses):
            key = f"clause.{number}.id"
            text = "two clauses have this id"
            problems.append(Problem("error", file, None, key, clause.id, "another id", text + "."))
        clauses[clause.id] = clause
    if problems:
        raise DataProblems(problems)
    return tuple(clauses.values())


def _clause(
    table: Mapping[str, Any], number: int, file: str, problems: list[Problem]
) -> Clause | None:
    from pydantic import ValidationError

    from generator.lawbook.leaf import BuyerLeaf, first_problems

    try:
        leaf = BuyerLeaf.model_validate(table)
    except ValidationError as error:
        known = [field.alias or name for name, field in BuyerLeaf.model_fields.items()]
        for key, message, found in first_problems(error, "clause"):
            place = f"clause.{number}.{key}" if key else f"clause.{number}"
            expected = _expected(key, table, known, message)
            text = _text(place, message)
            stands = "no such key" if message == "missing key" else found
            problems.append(Problem("error", file, None, place, stands, expected, text))
        return None
    clause_id = leaf.id or f"buyer-{number}-{leaf.quantities[0].replace('_', '-')}"
    return leaf.record(clause_id, file)


def _text(place: str, message: str) -> str:
    if message.startswith("expected "):
        return f"{place} is not as it must be."
    if message == "missing key":
        return f"{place} is missing."
    return f"{message[:1].upper()}{message[1:]}{'' if message.endswith('?') else '.'}"


def _expected(key: str, table: Mapping[str, Any], known: list[str], message: str) -> str:
    if key.partition(".")[0] == "quantity" and isinstance(table.get("quantity"), str):
        near = suggestion(table["quantity"])
        return near or "the name of a quantity"
    if message == "unknown key":
        matches = difflib.get_close_matches(key, known, n=1, cutoff=0.6)
        return matches[0] if matches else f"one of {', '.join(sorted(known))}"
    if message == "missing key":
        return f"{key} = …"
    return message.removeprefix("expected ") if message.startswith("expected ") else ""
