"""Explanations: readable, whole, and the same words that stand behind a verdict."""

from __future__ import annotations

import re
from collections import Counter
from dataclasses import replace
from datetime import date
from decimal import Decimal

import pytest

from generator.conformity import judge
from generator.datasets import method, sources
from generator.lawbook import buyer_clauses, read_law_book
from generator.records.assessment import Assessment
from generator.records.campaign import Campaign
from generator.records.figure import MEAN, Figure, FigureSet, Grade
from generator.records.lamp import Lamp, Unit
from generator.records.settings import CampaignTable, Decision, Settings
from generator.sheets.explanation import Explanation, explain, explanation_text

MEASURED = {
    "luminous_flux_lm": (Decimal("801.123456789"), Decimal("12.3456789")),
    "power_w": (Decimal("8.123456789"), Decimal("0.0345678")),
    "ra": (Decimal("80.3"), Decimal("0.6")),
    "svm": (Decimal("0.41"), Decimal("0.03")),
}
DECLARED = {
    "luminous_flux_lm": "806",
    "power_w": "8.0",
    "ra": "80",
    "svm": "0.4",
    "l70b50_h": "15000",
    "lumen_maintenance_factor": "0.94",
}
BUYERS = [{"id": "own", "quantity": "ra", "comparison": "at least", "value": 90}]


@pytest.fixture(scope="module")
def small_assessment() -> Assessment:
    law, day = read_law_book(), date(2026, 3, 2)
    lamp = Lamp(
        "L1",
        "Bidder",
        "Model",
        directional=False,
        mains=True,
        connected=False,
        placed_on_market=date(2025, 3, 1),
        declared={name: Decimal(value) for name, value in DECLARED.items()},
    )
    figures = []
    for name, value in DECLARED.items():
        column = f"declared_{name}"
        declared = Figure("L1", MEAN, name, Decimal(value), Grade.DECLARED, column)
        figures.append(replace(declared, origin=(f"lamps.csv, row 2, column {column}",)))
    for name, (measured, uncertainty) in MEASURED.items():
        for unit in ("u1", MEAN):
            found = Figure("L1", unit, name, measured, Grade.REPORTED, name)
            found = replace(found, expanded_uncertainty=uncertainty, units_count=1)
            if unit != MEAN:
                found = replace(found, origin=(f"units.csv, row 2, column {name}",))
            figures.append(found)
    settings = Settings(
        campaign=CampaignTable(title="small"), decision=Decision(rule="guarded acceptance")
    )
    campaign = Campaign("small", settings, (lamp,), (Unit("u1", "L1"),))
    clauses = (*law.clauses(), *buyer_clauses(BUYERS, "campaign.toml"))
    judgement = judge(campaign, FigureSet(figures), law, clauses, day)
    return Assessment(
        campaign=campaign,
        version="0",
        assessed_on=day,
        figures=FigureSet([*figures, *judgement.figures]),
        verdicts=judgement.verdicts,
        clauses=clauses,
    )


def explained(assessment: Assessment, topic: str) -> Explanation:
    titles = {key: source.title for key, source in sources().items()}
    return explain(assessment, "L1", topic, method, titles)


def test_maximum_power_is_traced_whole(small_assessment: Assessment) -> None:
    text = explanation_text(explained(small_assessment, "eu-2019-2020-maximum-power"))
    for words in (
        "Source: Regulation (EU) 2019/2020, Annex II, point 1(a)",
        "Status: read, last looked up on ",
        "Written in: lawbook/eu/2019-2020/maximum-power.toml",
        "From 2021-09-01: by formula: C × (L + useful luminous flux / (F × η)) × R",
        "Constants: eu-2019-2020-correction-factor",
        "Law of 2025-03-01, the date of placing on the market; value in force from 2021-09-01.",
        "Correction factor C = 1.08.",
        "R = 1 for a CRI of 80.",
        "1.08 × (1.5 W + 806 lm / (1 × 120 lm/W)) × 1 = 8.874 W",
        "8 W against 8.874 W: margin 0.874 W.",
        "Decision rule: guarded acceptance, guard band w = U (ILAC-G8, 4.2.3). Guard band w = ",
        "The limit rests on measured figures and has U = ",
        "Verdict: pass.",
        # the flux and the CRI, on which the limit rests, with file and row
        "from units.csv, row 2, column luminous_flux_lm",
        "Read from: lamps.csv, row 2, column declared_ra",
    ):
        assert words in text


def test_an_open_verdict_says_why_once(small_assessment: Assessment) -> None:
    parts = explained(small_assessment, "eu-2019-2020-svm").parts
    (open_one,) = [item for item in parts if item.heading.endswith("basis: inconclusive")]
    assert open_one.lines[-1] == "Verdict: inconclusive."
    assert sum("lies within w of the limit" in line for line in open_one.lines) == 1


def test_a_quantity_shows_every_clause_that_judges_it(small_assessment: Assessment) -> None:
    text = explanation_text(explained(small_assessment, "ra"))
    for words in ("Written in: campaign.toml", "At all times: at least 90", "lawbook/eu/2019-2020"):
        assert words in text
    assert "Law of 2026-03-02, the date of the assessment." in text


def test_values_are_as_long_as_they_are_sure(small_assessment: Assessment) -> None:
    text = explanation_text(explained(small_assessment, "power_w"))
    assert "Value: 8.1235 W ± 0.035 (k = 2)" in text


def test_no_explanation_is_noise(small_assessment: Assessment) -> None:
    for clause in dict.fromkeys(item.clause for item in small_assessment.verdicts):
        for part in explained(small_assessment, clause).parts:
            assert [line for line, count in Counter(part.lines).items() if count > 1] == []
            for line in part.lines:
                assert not re.search(r"\d[\d.]{9,}", line.replace("-", "")), line
                assert not re.search(r"\.\.|\?\.|None| ,", line), line
