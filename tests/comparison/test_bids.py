"""Bids as the campaign states them, code names, and the lamp a lot is compared with."""

from __future__ import annotations

from dataclasses import replace
from decimal import Decimal
from typing import Any

import pytest

from generator.comparison import bids_of, tender_problems
from generator.comparison.eligibility.code_names import bidder_codes, coded_names, shown_names
from generator.comparison.eligibility.value_text import value_text
from generator.records.lamp import Lamp, Offer
from generator.records.settings import Laboratory
from generator.records.tender import Bid
from generator.records.tender_settings import TenderSettings, TenderTable

OWN = Laboratory(name="Own Laboratory", accreditation="A-1")


@pytest.mark.parametrize(
    ("measured", "laboratory", "accreditation", "expected"),
    [
        (True, "", "", ("Own Laboratory", "A-1")),
        (True, "Own Laboratory", "", ("Own Laboratory", "A-1")),
        (True, "", "A-2", ("Own Laboratory", "A-2")),
        (True, "Another", "", ("Another", "")),  # the campaign does not vouch for others
        (False, "", "", ("", "")),
    ],
)
def test_report_of_a_bid(
    measured: bool, laboratory: str, accreditation: str, expected: tuple[str, str]
) -> None:
    offer = Offer(
        report_model="M", report_laboratory=laboratory, report_accreditation=accreditation
    )
    lamp = Lamp("a", "B", "M", lot="one", offer=offer)
    (bid,) = bids_of([lamp], ["a"] if measured else [], OWN)
    assert bid == Bid("a", "one", "M", *expected)


def test_codes_are_one_per_bidder_and_say_nothing_of_the_order() -> None:
    lamps = [Lamp(f"l{i}", bidder, f"M{i}") for i, bidder in enumerate(["X", "Y", "X", ""])]
    tender = TenderTable(code_names=True, seed=3)
    codes = bidder_codes(lamps, tender)
    assert codes["l0"] == codes["l2"]
    assert len(set(codes.values())) == 3
    assert dict(bidder_codes(lamps[::-1], tender)) == dict(codes)
    names = coded_names(lamps, tender)
    assert dict(shown_names(lamps, tender)) == dict(names)
    assert all(names[lamp].startswith(f"Bidder {code}, lamp ") for lamp, code in codes.items())
    closed = TenderTable(code_names=True, technical_part_closed=True, seed=3)
    assert shown_names(lamps, closed)["l1"] == "Y, M1"
    assert dict(coded_names(lamps, closed)) == dict(names)


def test_a_lot_may_have_a_baseline_lamp_of_its_own(tender_case: Any) -> None:
    lot = {**tender_case.settings["lot"][0], "baseline_lamp": "tube"}
    tube = {"id": "tube", "power_w": 70, "life_h": 20000, "unit_price": 3}
    existing = [*tender_case.settings["existing_lamp"], tube]
    settings = {**tender_case.settings, "lot": [lot], "existing_lamp": existing}
    (result,) = replace(tender_case, settings=settings).compared().lots
    assert result.baseline_lamp == "tube"
    assert result.bids[0].energy is not None
    assert result.bids[0].energy.baseline_kwh == 100 * 70 * 2
    wrong = {**settings, "lot": [{**lot, "baseline_lamp": "none"}]}
    problems = tender_problems(
        tender_case.lamps, tender_case.bids, TenderSettings.model_validate(wrong)
    )
    assert [item.column for item in problems] == ["lot.1.baseline_lamp"]


def test_mandatory_clauses_and_regimes_must_be_judged(tender_case: Any) -> None:
    """A requirement that nobody judges would let every bid through unseen."""
    raw = tender_case.with_settings(
        "tender", mandatory_clauses=["c-ra", "c-rb"], mandatory_regimes=["eu 2019/2020", "EU 1/2"]
    ).settings
    problems = tender_problems(
        tender_case.lamps,
        tender_case.bids,
        TenderSettings.model_validate(raw),
        {"c-ra": "EU 2019/2020"},
    )
    assert [(item.column, item.found) for item in problems] == [
        ("tender.mandatory_clauses", "c-rb"),
        ("tender.mandatory_regimes", "EU 1/2"),
    ]


def test_a_value_never_reads_as_being_on_the_other_side_of_its_limit() -> None:
    assert value_text(Decimal("99.97"), "efficacy_lm_per_w", Decimal(100)) == "99.97 lm/W"
    assert value_text(Decimal("94.8235294"), "efficacy_lm_per_w", Decimal(100)) == "94.8 lm/W"
    assert value_text(Decimal("-6.4589"), "r9", Decimal(0)) == "\u22126"
    assert value_text("F", "energy_efficiency_class", "E") == "F"
