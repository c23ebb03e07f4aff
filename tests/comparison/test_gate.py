"""The eligibility gate: every reason, every question, and code names that give nothing away."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.comparison.eligibility.code_names import shown_names
from generator.records.figure import Figure, Grade
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp
from generator.records.tender import Eligibility, Outcome
from generator.records.tender_settings import TenderTable
from generator.records.verdict import Basis, Verdict, VerdictWord


def gate_of(case: Any, lamp_id: str = "a") -> Eligibility:
    (lot,) = case.compared().lots
    result: Eligibility = next(item.eligibility for item in lot.bids if item.bid.lamp_id == lamp_id)
    return result


def test_a_complete_bid_is_admissible(tender_case: Any) -> None:
    gate = gate_of(tender_case)
    assert gate.outcome is Outcome.ADMISSIBLE
    assert gate.questions == gate.reasons == ()
    assert "evidence-accreditation" in gate.passed


@pytest.mark.parametrize(
    ("words", "outcome"),
    [
        ({"determined": "pass", "declared": "pass"}, Outcome.ADMISSIBLE),
        ({"determined": "pass", "declared": "not measured"}, Outcome.ADMISSIBLE),
        ({"determined": "fail", "declared": "pass"}, Outcome.NOT_ADMISSIBLE),
        ({"determined": "pass", "declared": "fail"}, Outcome.NOT_ADMISSIBLE),
        ({"determined": "inconclusive", "declared": "pass"}, Outcome.TO_CLARIFY),
        ({"determined": "not measured", "declared": "pass"}, Outcome.TO_CLARIFY),
        ({"determined": "not applicable", "declared": "not applicable"}, Outcome.ADMISSIBLE),
        ({"declared": "pass"}, Outcome.ADMISSIBLE),
        ({"declared": "not measured"}, Outcome.TO_CLARIFY),
    ],
)
def test_mandatory_clauses(
    tender_case: Any,
    verdict_of: Callable[..., Verdict],
    words: dict[str, str],
    outcome: Outcome,
) -> None:
    verdicts = tuple(
        verdict_of("a", VerdictWord(word), basis=Basis(basis)) for basis, word in words.items()
    )
    case = replace(tender_case, verdicts=verdicts)
    mandatory = case.with_settings("tender", mandatory_regimes=["eu 2019/2020"])
    gate = gate_of(mandatory)
    assert gate.outcome is outcome
    if outcome is Outcome.NOT_ADMISSIBLE:
        assert gate.reasons[0].clause == "c-ra"
        assert gate.reasons[0].source == "EU 2019/2020, Annex II"
        assert "at least 80" in gate.reasons[0].text
    if outcome is Outcome.TO_CLARIFY:
        assert "EU 2019/2020, Annex II" in gate.questions[0].text
    assert gate_of(case).outcome is Outcome.ADMISSIBLE  # nobody made the clause mandatory


def test_clauses_of_the_buyer_bind_and_named_clauses_must_be_judged(
    tender_case: Any, verdict_of: Callable[..., Verdict]
) -> None:
    own = verdict_of("a", VerdictWord.FAIL, status="buyer", regime="the school")
    assert gate_of(replace(tender_case, verdicts=(own,))).outcome is Outcome.NOT_ADMISSIBLE
    lot = {**tender_case.settings["lot"][0], "mandatory_clauses": ["c-unseen"]}
    gate = gate_of(replace(tender_case, settings={**tender_case.settings, "lot": [lot]}))
    assert gate.outcome is Outcome.TO_CLARIFY
    assert gate.questions[0].clause == "c-unseen"


@pytest.mark.parametrize(
    ("offer", "bid", "tender", "clause", "outcome"),
    [
        ({"report_no": None}, {}, {}, "evidence-report", Outcome.TO_CLARIFY),
        ({}, {"report_model": "Model  A"}, {}, None, Outcome.ADMISSIBLE),
        ({}, {"report_model": "Model x"}, {}, "evidence-model", Outcome.TO_CLARIFY),
        ({}, {"report_model": ""}, {}, "evidence-model", Outcome.TO_CLARIFY),
        ({}, {"laboratory": ""}, {}, "evidence-laboratory", Outcome.TO_CLARIFY),
        ({}, {"accreditation": ""}, {}, "evidence-accreditation", Outcome.TO_CLARIFY),
        ({}, {"accreditation": ""}, {"accreditation_required": False}, None, Outcome.ADMISSIBLE),
        ({"report_date": None}, {}, {}, "evidence-date", Outcome.TO_CLARIFY),
        ({"report_date": date(2026, 9, 2)}, {}, {}, "evidence-date", Outcome.TO_CLARIFY),
        ({}, {}, {"reports_from": date(2026, 5, 1)}, None, Outcome.ADMISSIBLE),
        (
            {},
            {},
            {"reports_from": date(2026, 5, 2)},
            "evidence-date",
            Outcome.NOT_ADMISSIBLE,
        ),
        ({}, {}, {"reports_to": date(2026, 4, 30)}, "evidence-date", Outcome.NOT_ADMISSIBLE),
        # the days at both ends of the window belong to it, and so does that of the assessment
        ({}, {}, {"reports_to": date(2026, 5, 1)}, None, Outcome.ADMISSIBLE),
        ({"report_date": date(2026, 9, 1)}, {}, {}, None, Outcome.ADMISSIBLE),
        ({}, {}, {"minimum_sample_units": 3}, None, Outcome.ADMISSIBLE),
        ({}, {}, {"minimum_sample_units": 4}, "evidence-sample", Outcome.TO_CLARIFY),
        ({"unit_price": None}, {}, {}, "offer-price", Outcome.TO_CLARIFY),
        ({"currency": None}, {}, {}, "offer-currency", Outcome.TO_CLARIFY),
        ({"quantity": 99}, {}, {}, "offer-quantity", Outcome.TO_CLARIFY),
    ],
)
def test_evidence(
    tender_case: Any,
    offer: dict[str, Any],
    bid: dict[str, Any],
    tender: dict[str, Any],
    clause: str | None,
    outcome: Outcome,
) -> None:
    case = tender_case.with_lamp(
        "a", lambda lamp: replace(lamp, offer=replace(lamp.offer, **offer))
    )
    gate = gate_of(case.with_bid("a", **bid).with_settings("tender", **tender))
    assert gate.outcome is outcome
    named = [item.clause for item in (*gate.reasons, *gate.questions)]
    assert named == ([] if clause is None else [clause])
    for question in gate.questions:
        assert "Model" not in question.text.replace("Model named", "")
        assert question.text.endswith(".")


@pytest.mark.parametrize(
    ("lot", "clause", "outcome"),
    [
        ({"cap": "e27"}, None, Outcome.ADMISSIBLE),
        ({"cap": "GU10"}, "lot-cap", Outcome.NOT_ADMISSIBLE),
        ({"minimum_flux_lm": 900}, None, Outcome.ADMISSIBLE),
        ({"minimum_flux_lm": Decimal("900.1")}, "lot-flux", Outcome.NOT_ADMISSIBLE),
        ({"beam_from_deg": 30, "beam_to_deg": 40}, "lot-beam", Outcome.TO_CLARIFY),
    ],
)
def test_limits_of_the_lot(
    tender_case: Any, lot: dict[str, Any], clause: str | None, outcome: Outcome
) -> None:
    rows = [{**tender_case.settings["lot"][0], **lot}]
    gate = gate_of(replace(tender_case, settings={**tender_case.settings, "lot": rows}))
    assert gate.outcome is outcome
    named = [item.clause for item in (*gate.reasons, *gate.questions)]
    assert named == ([] if clause is None else [clause])


@pytest.mark.parametrize(
    ("beam", "outcome"),
    [
        ("29.9", Outcome.NOT_ADMISSIBLE),
        ("30", Outcome.ADMISSIBLE),
        ("40", Outcome.ADMISSIBLE),
        ("40.1", Outcome.NOT_ADMISSIBLE),
    ],
)
def test_both_ends_of_a_span_belong_to_it(tender_case: Any, beam: str, outcome: Outcome) -> None:
    rows = [{**tender_case.settings["lot"][0], "beam_from_deg": 30, "beam_to_deg": 40}]
    figure = Figure("a", "", "beam_angle_deg", Decimal(beam), Grade.REPORTED, "m")
    case = replace(
        tender_case,
        figures=(*tender_case.figures, figure),
        settings={**tender_case.settings, "lot": rows},
    )
    assert gate_of(case).outcome is outcome


@pytest.mark.parametrize(
    ("severity", "outcome"),
    [
        (Severity.IMPOSSIBLE, Outcome.TO_CLARIFY),
        (Severity.CONTRADICTION, Outcome.TO_CLARIFY),
        (Severity.DOUBT, Outcome.TO_CLARIFY),
        (Severity.REMARK, Outcome.ADMISSIBLE),
    ],
)
def test_findings_are_asked_about_and_exclude_nobody(
    tender_case: Any, severity: Severity, outcome: Outcome
) -> None:
    finding = Finding("a", "", "flux", severity, "Flux", "1 and 2", None, "", "A slip.", (), "own")
    gate = gate_of(replace(tender_case, findings=(finding,)))
    assert gate.outcome is outcome
    assert not gate.reasons
    assert gate_of(replace(tender_case, findings=(finding,)), "b").outcome is Outcome.ADMISSIBLE


def test_code_names_hide_order_and_bidder_until_the_technical_part_is_closed() -> None:
    lamps = [Lamp(f"l{i}", f"Firm {i % 4}", f"M{i}") for i in range(8)]
    hidden = TenderTable(code_names=True, seed=3)
    shown = shown_names(lamps, hidden)
    assert dict(shown) == dict(shown_names(lamps[::-1], hidden))
    assert len(set(shown.values())) == 8
    assert {name.split(",")[0] for name in shown.values()} == {f"Bidder {c}" for c in "ABCD"}
    assert not any("Firm" in name for name in shown.values())
    orders = {
        tuple(
            shown_names(lamps, TenderTable(code_names=True, seed=seed))[f"l{i}"] for i in range(4)
        )
        for seed in range(20)
    }
    assert len(orders) > 5  # the letters follow the seed, not the file
    closed = TenderTable(code_names=True, technical_part_closed=True)
    assert shown_names(lamps, closed)["l0"] == "Firm 0, M0"
