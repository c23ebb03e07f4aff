from __future__ import annotations

import tomllib
from collections.abc import Callable, Mapping, Sequence
from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.conformity import judge
from generator.lawbook import buyer_clauses, read_law_book
from generator.records.campaign import Campaign
from generator.records.clause import LawBook
from generator.records.figure import MEAN, Figure, FigureSet, Grade
from generator.records.lamp import Lamp, Unit
from generator.records.settings import CampaignTable, Decision, Settings
from generator.records.verdict import Judgement, Verdict

ASSESSED_ON = date(2026, 1, 15)
KIND = {
    "directional": False,
    "mains": True,
    "connected": False,
    "colour_tuneable": False,
    "high_luminance": False,
    "technology": "LED",
    "placed_on_market": date(2025, 3, 1),
}

Judged = Callable[[Mapping[str, Any]], Judgement]


@pytest.fixture(scope="session")
def law() -> LawBook:
    return read_law_book()


def figures_of(case: Mapping[str, Any]) -> list[Figure]:
    """Per-unit figures, their exact mean, and figures given as means with U."""
    figures = []
    for quantity, values in case.get("units", {}).items():
        numbers = [Decimal(str(value)) for value in values]
        for number, value in enumerate(numbers):
            figures.append(Figure("L1", f"u{number}", quantity, value, Grade.REPORTED, "units.csv"))
        mean = sum(numbers, Decimal(0)) / len(numbers)
        uncertainty = case.get("uncertainty", {}).get(quantity)
        figures.append(
            Figure(
                "L1",
                MEAN,
                quantity,
                mean,
                Grade.REPORTED,
                "mean",
                expanded_uncertainty=None if uncertainty is None else Decimal(str(uncertainty)),
                units_count=len(numbers),
            )
        )
    return figures


def campaign_of(case: Mapping[str, Any]) -> Campaign:
    kind = {**KIND, **case.get("lamp", {})}
    kind = {key: None if value == "unknown" else value for key, value in kind.items()}
    declared = {key: Decimal(str(value)) for key, value in case.get("declared", {}).items()}
    lamp = Lamp("L1", "Bidder", "Model", declared=declared, **kind)
    count = max((len(values) for values in case.get("units", {}).values()), default=0)
    units = tuple(Unit(f"u{number}", "L1") for number in range(count))
    settings = Settings(
        campaign=CampaignTable(title="case"), decision=Decision(**case.get("decision", {}))
    )
    return Campaign("case", settings, (lamp,), units)


@pytest.fixture(scope="session")
def judged(law: LawBook) -> Judged:
    """Judge one lamp given as a mapping: lamp, declared, units, uncertainty, decision, regimes."""

    def of(case: Mapping[str, Any]) -> Judgement:
        clauses = law.clauses(case.get("regimes")) + buyer_clauses(
            case.get("clause", ()), "campaign.toml"
        )
        figures = FigureSet(figures_of(case))
        return judge(campaign_of(case), figures, law, clauses, case.get("on", ASSESSED_ON))

    return of


def one(verdicts: Sequence[Verdict], clause: str, basis: str) -> Verdict:
    found = [item for item in verdicts if item.clause == clause and item.basis == basis]
    assert len(found) == 1, f"{len(found)} verdicts of {clause}, {basis}"
    return found[0]


@pytest.fixture(scope="session")
def verdict_of(judged: Judged) -> Callable[[Mapping[str, Any], str, str], Verdict]:
    def of(case: Mapping[str, Any], clause: str, basis: str) -> Verdict:
        return one(judged(case).verdicts, clause, basis)

    return of


def toml_with_decimals(text: str) -> dict[str, Any]:
    return tomllib.loads(text, parse_float=Decimal)
