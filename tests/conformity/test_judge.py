"""Judging as a whole: buyer's clauses, exemptions, decision rules, traces."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, replace
from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.conformity import judge
from generator.lawbook import buyer_clauses
from generator.records.campaign import Campaign
from generator.records.clause import LawBook
from generator.records.figure import FigureSet, Grade
from generator.records.lamp import Lamp
from generator.records.settings import CampaignTable, Settings
from generator.records.verdict import Basis, Judgement, Verdict

Judged = Callable[[Mapping[str, Any]], Judgement]
VerdictOf = Callable[[Mapping[str, Any], str, str], Verdict]

MEASURED = {
    "lamp": {"declared_energy_class": "F"},
    "declared": {"luminous_flux_lm": "806", "power_w": "8.8", "ra": "80"},
    "units": {"luminous_flux_lm": ["800", "812"], "power_w": ["8.7", "8.9"], "ra": ["81", "81"]},
    "uncertainty": {"luminous_flux_lm": "16", "power_w": "0.05", "ra": "0.5"},
}


def test_figures_of_the_law_for_both_bases(judged: Judged) -> None:
    figures = {(item.quantity, item.grade): item for item in judged(MEASURED).figures}
    declared = figures["total_mains_efficacy_lm_per_w", Grade.DECLARED]
    assert declared.method == "from declared values, EU 2019/2015 Annex II"
    assert declared.value == Decimal("91.5909090909")
    found = figures["total_mains_efficacy_lm_per_w", Grade.REPORTED]
    # mean of 91.954023 (800 lm, 8.7 W) and 91.235955 (812 lm, 8.9 W)
    assert found.number == pytest.approx(Decimal("91.5950"), abs=Decimal("0.00005"))
    assert found.units_count == 2
    # relative U: sqrt((16/806)^2 + (0.05/8.8)^2) = 2.0648 %
    wanted = found.number * Decimal("0.020648") if found.number else None
    assert found.expanded_uncertainty == pytest.approx(wanted, rel=Decimal("0.0001"))
    assert figures["energy_efficiency_class", Grade.REPORTED].value == "F"
    assert figures["energy_kwh_per_1000h", Grade.DECLARED].value == 9
    assert figures["max_power_w", Grade.DECLARED].value == Decimal("8.874")
    assert all(item.unit_id == "" for item in figures.values())


def test_a_figure_that_cannot_be_given_says_why(judged: Judged) -> None:
    figures = judged({"declared": {"power_w": "8.8"}}).figures
    withheld = [item for item in figures if item.value is None]
    assert withheld
    assert all(item.reason for item in withheld)


def test_every_verdict_carries_what_a_report_needs(judged: Judged) -> None:
    # ISO/IEC 17025:2017, 7.8.6.2: results covered, specification met or not, rule applied.
    for verdict in judged(MEASURED).verdicts:
        assert verdict.source
        assert verdict.steps[-1] == f"Verdict: {verdict.verdict}."
        if verdict.margin is not None:
            assert verdict.rule
            assert verdict.value is not None
            assert verdict.limit is not None
        if verdict.verdict in {"not measured", "not applicable", "inconclusive"}:
            assert verdict.note
        if verdict.basis is Basis.DECLARED:
            assert verdict.expanded_uncertainty is None
            assert verdict.probability is None


def test_the_campaigns_rule_judges_determined_values_only(verdict_of: VerdictOf) -> None:
    near = {**MEASURED, "decision": {"rule": "guarded acceptance"}}
    near["units"] = {**MEASURED["units"], "ra": ["80.3", "80.3"]}
    determined = verdict_of(near, "eu-2019-2020-cri", "determined")
    assert determined.verdict == "inconclusive"
    assert "guarded acceptance" in determined.rule
    # U = 0.5: 0.3 above the limit is 1.2 standard uncertainties, 0.8849 of the normal law.
    assert determined.probability == Decimal("0.8849")
    assert verdict_of(near, "eu-2019-2020-cri", "declared").verdict == "pass"
    against = verdict_of(near, "eu-2019-2020-verification-cri", "determined")
    assert against.verdict == "pass"
    assert "the act itself" in against.rule


def test_maximum_power_takes_the_uncertainty_of_its_flux_along(verdict_of: VerdictOf) -> None:
    verdict = verdict_of(MEASURED, "eu-2019-2020-maximum-power", "determined")
    # limit 1.08 (1.5 + 806/120) 1.01 = 8.96274, its U = 16 * 1.08 * 1.01 / 120 = 0.14544;
    # margin 0.16274 over sqrt(0.05^2 + 0.14544^2) / 2 = 2.116: 0.9828
    assert verdict.limit == Decimal("8.96274")
    assert verdict.expanded_uncertainty == Decimal("0.05")
    assert verdict.probability == Decimal("0.9828")


@pytest.mark.parametrize(
    ("value", "word"), [(79, "pass"), (80, "pass"), (Decimal("80.1"), "fail"), (81, "fail")]
)
def test_buyers_clause(verdict_of: VerdictOf, value: Decimal, word: str) -> None:
    case = {**MEASURED, "clause": [{"quantity": "ra", "comparison": "at least", "value": value}]}
    verdict = verdict_of(case, "buyer-1-ra", "declared")
    assert verdict.verdict == word
    assert verdict.status == "buyer"
    assert verdict.regime == "Buyer"


def test_buyers_class(verdict_of: VerdictOf) -> None:
    def clause(letter: str, comparison: str = "at least") -> dict[str, Any]:
        table = {
            "id": "class",
            "quantity": "energy_efficiency_class",
            "comparison": comparison,
            "value": letter,
        }
        return {**MEASURED, "clause": [table]}

    assert verdict_of(clause("F"), "class", "declared").verdict == "pass"
    better = verdict_of(clause("E"), "class", "declared")
    assert (better.verdict, better.value, better.limit) == ("fail", "F", "E")
    assert verdict_of(clause("F", "at most"), "class", "determined").verdict == "pass"
    assert verdict_of(clause("G", "at most"), "class", "determined").verdict == "fail"
    assert verdict_of(clause("A", "at most"), "class", "determined").verdict == "pass"


def test_buyers_clause_within(verdict_of: VerdictOf) -> None:
    table = {"id": "p", "quantity": "power_w", "comparison": "within", "lower": 8, "upper": 9}
    verdict = verdict_of({**MEASURED, "clause": [table]}, "p", "determined")
    assert verdict.verdict == "pass"
    assert verdict.limit == "8 to 9"
    assert verdict.margin == Decimal("0.2")


def test_buyers_dates_are_those_of_the_assessment(verdict_of: VerdictOf) -> None:
    table = {
        "id": "p",
        "quantity": "power_w",
        "comparison": "at most",
        "value": 9,
        "from": date(2026, 1, 1),
    }
    case = {**MEASURED, "clause": [table]}
    assert verdict_of({**case, "on": date(2026, 1, 1)}, "p", "declared").verdict == "pass"
    before = verdict_of({**case, "on": date(2025, 12, 31)}, "p", "declared")
    assert before.verdict == "not applicable"


@dataclass(frozen=True)
class ClaimingLamp(Lamp):
    """A lamp whose supplier claims exemptions."""

    claimed_exemptions: tuple[str, ...] = ()


def claimed(law: LawBook, *claims: str, **changed: Any) -> dict[str, Verdict]:
    lamp = ClaimingLamp(
        "L1",
        "b",
        "m",
        directional=True,
        mains=True,
        connected=False,
        placed_on_market=date(2025, 3, 1),
        claimed_exemptions=claims,
        declared={"ra": Decimal(70), "pst_lm": Decimal("1.2"), "svm": Decimal("0.9"), **changed},
    )
    campaign = Campaign("c", Settings(campaign=CampaignTable(title="t")), (lamp,), ())
    judgement = judge(campaign, FigureSet(()), law, law.clauses(), date(2026, 1, 1))
    return {item.clause: item for item in judgement.verdicts if item.basis is Basis.DECLARED}


def test_a_claimed_use_lifts_cri_and_svm_but_not_pst(law: LawBook) -> None:
    found = claimed(law, "eu-2019-2020-exemption-low-cri-use")
    assert found["eu-2019-2020-cri"].verdict == "not applicable"
    assert "exemption claimed" in found["eu-2019-2020-cri"].note
    assert found["eu-2019-2020-svm"].verdict == "not applicable"
    assert found["eu-2019-2020-pst-lm"].verdict == "fail"


@pytest.mark.parametrize(("angle", "word"), [("9.9", "not applicable"), ("10", "fail")])
def test_a_claim_must_be_possible(law: LawBook, angle: str, word: str) -> None:
    found = claimed(law, "eu-2019-2020-exemption-spot-light", beam_angle_deg=Decimal(angle))
    verdict = found["eu-2019-2020-cri"]
    assert verdict.verdict == word
    if word == "fail":
        assert "cannot be followed" in verdict.note


def test_a_failing_spot_lamp_is_told_of_its_exemption(law: LawBook) -> None:
    verdict = claimed(law, beam_angle_deg=Decimal(9))["eu-2019-2020-pst-lm"]
    assert verdict.verdict == "fail"
    assert "beam angle below 10°" in verdict.note


def test_verdicts_come_lamp_by_lamp_in_clause_order(law: LawBook, judged: Judged) -> None:
    order = [clause.id for clause in law.clauses()]
    seen = list(dict.fromkeys(item.clause for item in judged(MEASURED).verdicts))
    assert seen == order


def test_the_same_records_give_the_same_verdicts(judged: Judged) -> None:
    assert judged(MEASURED) == judged(MEASURED)


def test_lamps_are_judged_apart(law: LawBook) -> None:
    base = Lamp("A", "b", "m", mains=True, placed_on_market=date(2024, 8, 31))
    lamps = (
        replace(base, declared={"svm": Decimal("0.9")}),
        replace(
            base,
            lamp_id="B",
            placed_on_market=date(2024, 9, 1),
            declared={"svm": Decimal("0.9")},
        ),
    )
    campaign = Campaign("c", Settings(campaign=CampaignTable(title="t")), lamps, ())
    clauses = (law.clause("eu-2019-2020-svm"), *buyer_clauses((), "campaign.toml"))
    verdicts = judge(campaign, FigureSet(()), law, clauses, date(2026, 1, 1)).verdicts
    words = {item.lamp_id: item.verdict for item in verdicts if item.basis is Basis.DECLARED}
    assert words == {"A": "pass", "B": "fail"}
