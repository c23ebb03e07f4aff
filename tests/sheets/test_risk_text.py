"""Global risks as text."""

from __future__ import annotations

from decimal import Decimal

import pytest

from generator.records.risk import CampaignRisk
from generator.sheets.risk_text import risk_statement


def _risk(clause, consumers, producers, reason=""):
    decimal = lambda text: None if text is None else Decimal(text)  # noqa: E731 - short and local
    return CampaignRisk(
        clause=clause,
        title=clause.capitalize(),
        regime="EU 2019/2020",
        unit="",
        lamps_count=12,
        mean_margin=Decimal(1),
        margin_spread=Decimal(1),
        standard_uncertainty=Decimal("0.1"),
        rule="simple acceptance",
        consumers_risk=decimal(consumers),
        producers_risk=decimal(producers),
        reason=reason,
    )


def test_the_largest_stand_first_and_the_rest_is_bounded():
    risks = [_risk(f"c{place}", f"0.00{place}", "0.0005") for place in range(1, 10)]
    told = risk_statement([*risks, _risk("flicker", "0.0004", "0.093")])
    assert [row.title for row in told.largest][:2] == ["Flicker", "C9"]
    flicker = told.largest[0]
    assert (flicker.consumers, flicker.producers) == ("< 0.1\u00a0%", "9.3\u00a0%")
    assert len(told.largest) == 8
    assert [row.title for row in told.further] == ["C2", "C1"]
    assert told.rest == "Of 2 further clauses both risks are 0.2\u00a0% or less."


def test_clauses_without_a_risk_are_named_with_the_reason():
    few = "fewer than 3 lamps with known uncertainty"
    told = risk_statement(
        [_risk("cri", None, None, few), _risk("svm", None, None, few), _risk("r9", "0.01", "0.01")]
    )
    assert told.rest == ""
    assert [(pair.label, pair.text) for pair in told.unknown] == [
        ("Cri (EU 2019/2020); Svm (EU 2019/2020)", few)
    ]


def test_no_risk_no_statement():
    assert risk_statement([]) is None


@pytest.mark.parametrize(("risk", "text"), [("0.0009", "< 0.1\u00a0%"), ("0.001", "0.1\u00a0%")])
def test_a_small_risk_never_reads_as_none(risk, text):
    assert risk_statement([_risk("cri", risk, risk)]).largest[0].consumers == text
