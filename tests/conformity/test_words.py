"""What a verdict says can be said again: every word of it, every number, its parts kept apart."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator, Mapping
from dataclasses import replace
from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.conformity import campaign_risks
from generator.conformity.product_information import product_information
from generator.language import Message, Passage, told
from generator.language.messages import spoken_by
from generator.lawbook import read_law_book
from generator.quantities import QUANTITIES
from generator.records.figure import FigureSet
from generator.records.lamp import Lamp
from generator.records.settings import Decision
from generator.records.verdict import Judgement, Verdict, VerdictWord

Judged = Callable[[Mapping[str, Any]], Judgement]
VerdictOf = Callable[[Mapping[str, Any], str, str], Verdict]

REGIMES = read_law_book().regimes
NO_DATE = {"placed_on_market": None, "connected": None}
WIDE = {
    "lamp": {"declared_energy_class": "F", "cap": "E27"},
    "declared": {
        "luminous_flux_lm": "806.5",
        "power_w": "9.4",
        "ra": "80",
        "l70b50_h": "25000",
        "equivalent_power_w": "60",
        "cct_k": "3000",
    },
    "units": {
        "luminous_flux_lm": ["799.5", "812"],
        "power_w": ["9.35", "9.45"],
        "ra": ["81", "81"],
        "x": ["0.44", "0.4401"],
        "y": ["0.403", "0.4032"],
        "h3_percent": ["12.5", "12.7"],
        "svm": ["0.41", "0.45"],
    },
    "uncertainty": {"luminous_flux_lm": "16", "power_w": "0.05", "ra": "0.5"},
    "regimes": REGIMES,
}
CASES = (
    WIDE,
    {**WIDE, "decision": {"rule": "guarded acceptance"}, "lamp": NO_DATE},
    {**WIDE, "decision": {"rule": "conformance probability"}, "lamp": {"directional": True}},
    {**WIDE, "lamp": {"directional": "unknown", "mains": "unknown"}},
    {"regimes": REGIMES},
)
_SPELT = re.compile(r"(?<![\w-])[A-Za-z]{3,}(?![\w-])")
_PLACE = re.compile(r"(\{[^}]*\})")
_DATA = {"kWh", "LED", "CFR", "MLS", "NDLS", "DLS", "NMLS", "Model", "Bidder"}


class Marker:
    """Says every pattern in letters that no English word has, and every number with a comma."""

    def pattern(self, message: Message) -> str:
        parts = _PLACE.split(message.plural or message.singular)
        return "".join(
            part if part.startswith("{") else re.sub("[A-Za-z]", "ж", part) for part in parts
        )

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


def printed(judgement: Judgement) -> Iterator[str]:
    for item in judgement.verdicts:
        yield from (item.title, item.source, item.act, item.place, item.rule, item.note)
        yield from (item.unit, item.reason, item.regime, *item.steps)
        if isinstance(item.limit, str):
            yield item.limit
    for figure in judgement.figures:
        yield from (figure.reason, figure.method, *figure.remarks)


@pytest.mark.parametrize("case", CASES)
def test_every_word_of_a_verdict_can_be_said_again(judged: Judged, case: Mapping[str, Any]) -> None:
    texts = dict.fromkeys(printed(judged(case)))
    assert len(texts) > 100
    with spoken_by(Marker()):
        left = {word for text in texts for word in _SPELT.findall(told(text))}
    assert left <= _DATA | {unit for item in QUANTITIES.values() for unit in item.unit.split("/")}


def test_numbers_of_a_verdict_take_the_notation_of_the_language(verdict_of: VerdictOf) -> None:
    verdict = verdict_of(WIDE, "eu-2019-2020-maximum-power", "declared")
    formula = next(step for step in verdict.steps if step.startswith("Maximum power"))
    with spoken_by(Marker()):
        said = told(formula)
    assert " 806,5 " in said
    assert "." not in said.removesuffix(".")


def test_act_place_and_amending_act_stand_apart(judged: Judged) -> None:
    amended = 0
    for item in judged(WIDE).verdicts:
        amended += bool(item.amending_act)
        whole = f"{item.act}, {item.place}" if item.place else item.act
        assert item.source.startswith(whole)
        assert (item.source != whole) is bool(item.amending_act)
        assert item.source.endswith(item.amending_act)
    assert amended


def test_a_note_is_a_passage_of_its_sentences(judged: Judged) -> None:
    several = 0
    for item in judged(WIDE).verdicts:
        assert isinstance(item.note, Passage)
        several += len(item.note.parts) > 1
        for part in item.note.parts:
            assert part.endswith(".")
            assert not re.search(r"(?<!S\.I)(?<!S\.O)\. [A-Z]", part)
    assert several


def test_what_does_not_apply_has_its_reason_alone(judged: Judged) -> None:
    words = set()
    for item in judged(WIDE).verdicts:
        words.add(item.verdict)
        assert bool(item.reason) is (item.verdict is VerdictWord.NOT_APPLICABLE)
        if item.reason and item.note.startswith("Not applicable: "):
            plain = item.note.removeprefix("Not applicable: ").removesuffix(".")
            assert item.reason.removesuffix(".") == plain
    assert VerdictWord.NOT_APPLICABLE in words


@pytest.mark.parametrize("lamps", [1, 3])
def test_risks_are_said_again(judged: Judged, lamps: int) -> None:
    verdicts = judged(WIDE).verdicts
    several = [replace(item, lamp_id=f"{number}") for item in verdicts for number in range(lamps)]
    risks = campaign_risks(several, Decision())
    assert risks
    with spoken_by(Marker()):
        for risk in risks:
            texts = (risk.title, risk.rule, risk.reason)
            assert not _SPELT.findall(" ".join(told(text) for text in texts))


def test_product_information_is_said_again() -> None:
    declared = {"ra": Decimal("79.6"), "sdcm": Decimal("5.4"), "power_w": Decimal("8.84")}
    lamp = Lamp("a", "Bidder", "Model", technology="LED", mains=True, declared=declared)
    day = read_law_book().clause("eu-2019-2020-maximum-power").values[0].start
    assert day is not None
    fields = product_information(lamp, FigureSet(()), read_law_book(), day)
    said = [text for item in fields for text in (item.name, item.text, item.unit, item.rounding)]
    said += [text for item in fields for text in (item.reason, item.warning)]
    assert any(item.warning for item in fields)
    with spoken_by(Marker()):
        assert {word for text in said for word in _SPELT.findall(told(text))} <= _DATA
        assert "8,8" in [told(item.text) for item in fields]
