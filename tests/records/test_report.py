"""The items of a test report: what is stated stands there, what is not is missing."""

from __future__ import annotations

from datetime import date
from decimal import Decimal

import pytest
from pydantic import ValidationError

from generator.records.assessment import Assessment
from generator.records.campaign import Campaign
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.lamp import Lamp, Unit
from generator.records.report import ITEMS_ONLY, missing_items, report_items
from generator.records.report_settings import ReportTable
from generator.records.settings import Settings

FULL = {
    "number": "TR-26-014",
    "customer_contact": "A. Reader",
    "place_of_work": "Fellside, hall 2",
    "accreditation_scope": "photometry",
    "received_on": date(2026, 1, 12),
    "tested_from": date(2026, 1, 14),
    "tested_to": date(2026, 2, 3),
    "issued_on": date(2026, 2, 6),
    "item_condition": "new, unopened",
    "sampling": "by the customer",
    "conditions": "25 °C",
    "methods": [{"name": "CIE S 025", "deviations": "none"}],
    "equipment": [{"name": "2 m sphere", "serial": "S1", "calibrated_on": date(2025, 6, 1)}],
    "signatory": "B. Signer",
    "signatory_function": "head of laboratory",
    "reproduction_note": "Not to be reproduced in part.",
    "amendments": [{"replaces": "TR-26-013", "reason": "wrong serial number"}],
}


@pytest.fixture
def reported_assessment() -> Assessment:
    settings = Settings.model_validate(
        {
            "campaign": {"title": "Tests", "client": "Trust"},
            "laboratory": {"name": "Bench", "address": "1 Lane", "accreditation": "T-000"},
        }
    )
    campaign = Campaign("c", settings, (Lamp("a", "Bidder", "Model"),), (Unit("a-1", "a"),))
    figure = Figure("a", "a-1", "power_w", Decimal(8), Grade.REPORTED, "units.csv", Decimal("0.1"))
    return Assessment(campaign, date(2026, 3, 2), FigureSet([figure]), (), "0.0")


def texts(assessment: Assessment, **stated: object) -> dict[str, str | None]:
    items = report_items(assessment, ReportTable.model_validate(stated))
    assert len({item.key for item in items}) == len(items)
    return {item.key: item.text for item in items}


def test_what_is_stated_stands_there(reported_assessment: Assessment) -> None:
    found = texts(reported_assessment, **FULL)
    assert found["number"] == "TR-26-014"
    assert found["laboratory"] == "Bench, 1 Lane"
    assert found["customer"] == "Trust, A. Reader"
    assert found["accreditation"] == "T-000, photometry"
    assert found["tested_on"] == "2026-01-14 to 2026-02-03"
    assert found["item"] == "Bidder, Model, 1 unit"
    assert found["deviations"] == "CIE S 025: none"
    assert found["equipment"] == (
        "2 m sphere, serial S1, calibrated on 2025-06-01, traceability missing"
    )
    assert found["signatory"] == "B. Signer, head of laboratory"
    assert found["amendments"] == "replaces TR-26-013: wrong serial number"
    assert found["items_only"] == ITEMS_ONLY
    items = report_items(reported_assessment, ReportTable.model_validate(FULL))
    assert missing_items(items) == ()


def test_nothing_is_invented(reported_assessment: Assessment) -> None:
    items = report_items(reported_assessment, ReportTable())
    missing = {item.key: item.clause for item in missing_items(items)}
    # ISO/IEC 17025:2017, clause 7.8.2.1 letters as paraphrased in the sources' note
    assert missing == {
        "place_of_work": "7.8.2.1 c",
        "number": "7.8.2.1 d",
        "condition": "7.8.2.1 g",
        "received_on": "7.8.2.1 h",
        "tested_on": "7.8.2.1 i",
        "issued_on": "7.8.2.1 j",
        "sampling": "7.8.2.1 k",
        "methods": "7.8.2.1 f",
        "deviations": "7.8.2.1 n",
        "conditions": "7.8.3.1 a",
        "equipment": "6.5, 7.5.1",
        "signatory": "7.8.2.1 o",
    }
    assert next(item for item in items if item.key == "opinions").text is None


def test_a_laboratory_without_address_is_not_identified(reported_assessment: Assessment) -> None:
    settings = Settings.model_validate({"campaign": {"title": "T"}, "laboratory": {"name": "B"}})
    bare = Assessment(Campaign("c", settings, (), ()), date(2026, 3, 2), FigureSet([]), (), "0.0")
    keys = {item.key for item in missing_items(report_items(bare, ReportTable()))}
    assert {"laboratory", "customer", "results", "uncertainty", "item"} <= keys
    assert "decision_rule" not in keys  # nothing is judged
    assert "laboratory" not in {
        item.key for item in missing_items(report_items(reported_assessment, ReportTable()))
    }


@pytest.mark.parametrize(
    "stated",
    [
        {"tested_from": date(2026, 1, 2), "tested_to": date(2026, 1, 1)},
        {"received_on": date(2026, 1, 2), "issued_on": date(2026, 1, 1)},
        {"amendments": [{"replaces": "TR-1"}]},
        {"amendments": [{"replaces": "TR-1", "reason": ""}]},
        {"methods": [{"name": ""}]},
        {"nmber": "TR-1"},
    ],
)
def test_what_cannot_be_is_refused(stated: dict[str, object]) -> None:
    with pytest.raises(ValidationError):
        ReportTable.model_validate(stated)
