"""Eligibility in words: requirements by their titles."""

import re
from pathlib import Path

from generator.records.tender import Bid, BidResult, Eligibility, LotResult, Outcome
from generator.records.tender_settings import TenderSettings
from generator.sheets.tender_description import ListBlock
from generator.sheets.tender_eligibility import asked_for, eligibility_blocks
from generator.sheets.tender_words import CHECK_TITLES

TITLES = {"own-efficacy": "luminous efficacy", "own-ra": "colour rendering"}
GATE = Path(__file__).parents[2] / "generator" / "comparison" / "eligibility"


def test_checks_passed_are_named_by_their_titles():
    passed = ("own-efficacy", "own-ra", "evidence-report", "lot-flux", "untitled-check")
    eligibility = Eligibility(Outcome.ADMISSIBLE, passed=passed)
    bid = BidResult(Bid("L-01"), "Bidder A", eligibility, None, None)
    lot = LotResult("", "", 10, (bid,), None, None)
    lists = [
        b for b in eligibility_blocks(lot, TITLES, under_codes=False) if isinstance(b, ListBlock)
    ]
    assert lists[-1].items == (
        (
            "Bidder A. Checks passed: Luminous efficacy; Colour rendering; Test report; "
            "Luminous flux; untitled-check."
        ),
    )


def test_what_is_asked_is_named_by_its_title():
    settings = TenderSettings.model_validate({"tender": {"mandatory_clauses": ["own-ra"]}})
    asked = " ".join(asked_for(settings, TITLES))
    assert "and these: Colour rendering." in asked
    assert "own-ra" not in asked


def test_every_check_of_the_gate_has_a_title():
    """Checks that are passed by name of their own, read from the gate itself."""
    text = "\n".join(path.read_text(encoding="utf-8") for path in GATE.glob("*.py"))
    named = set(re.findall(r'"((?:evidence|lot)-[a-z]+)"', text))
    assert len(named) >= 9
    assert named <= set(CHECK_TITLES)
