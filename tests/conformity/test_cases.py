"""Boundary cases on file: both sides of every limit, the day before and the day of every date."""

from __future__ import annotations

import tomllib
from collections.abc import Callable, Mapping
from decimal import Decimal
from pathlib import Path
from typing import Any

import pytest

from generator.records.verdict import Judgement

CASES = sorted((Path(__file__).parent / "cases").glob("*.toml"))


def read_cases() -> list[tuple[str, dict[str, Any]]]:
    found = []
    for path in CASES:
        table = tomllib.loads(path.read_text(encoding="utf-8"), parse_float=Decimal)
        assert table["source"], path
        shared = table.get("shared", {})
        for case in table["case"]:
            merged = {**shared, **case}
            for key in ("lamp", "declared", "units"):
                merged[key] = {**shared.get(key, {}), **case.get(key, {})}
            found.append((f"{path.stem}: {case['name']}", merged))
    return found


READ = read_cases()


@pytest.mark.parametrize("case", [case for _, case in READ], ids=[name for name, _ in READ])
def test_case(case: dict[str, Any], judged: Callable[[Mapping[str, Any]], Judgement]) -> None:
    judgement = judged(case)
    for wanted in case.get("expect", ()):
        found = [
            item
            for item in judgement.verdicts
            if item.clause == wanted["clause"] and item.basis == wanted["basis"]
        ]
        assert len(found) == 1, wanted
        (verdict,) = found
        assert verdict.verdict == wanted["verdict"], (verdict.note, verdict.steps)
        for key in ("value", "limit", "margin"):
            if key in wanted:
                assert getattr(verdict, key) == wanted[key], key
        if "note" in wanted:
            assert wanted["note"] in verdict.note
    for wanted in case.get("figure", ()):
        (figure,) = [
            item
            for item in judgement.figures
            if item.quantity == wanted["quantity"]
            and item.method.startswith(f"from {wanted['basis']}")
        ]
        if isinstance(wanted["value"], str):
            assert figure.value == wanted["value"]
        else:
            places = Decimal(wanted.get("within", Decimal(0)))
            assert figure.number is not None
            assert abs(figure.number - Decimal(wanted["value"])) <= places


def test_there_are_cases_for_every_clause() -> None:
    from generator.lawbook import read_law_book

    covered = {item["clause"] for _, case in READ for item in case.get("expect", ())}
    # harmonic currents, whose tables are long, have a module of their own
    elsewhere = {item.id for item in read_law_book() if item.regime.startswith("IEC 61000-3-2")}
    assert {clause.id for clause in read_law_book()} - covered == elsewhere
