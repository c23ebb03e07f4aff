"""The sheet of a lamp while somebody speaks: every fixed word and every number is said by them."""

from __future__ import annotations

import dataclasses
import re
from datetime import date
from string import Formatter

import pytest

from generator.language import Message, joined, say, sentence
from generator.language.messages import Worded, spoken_by
from generator.records.verdict import VerdictWord
from generator.sheets.lamp_sheet import describe_lamp
from generator.sheets.lamp_verdicts import verdict_groups
from generator.sheets.themes import palette


class Loud:
    """Says every pattern in capitals, and numbers with a comma."""

    def pattern(self, message: Message) -> str:
        counted = message.plural and message.counted != 1
        pattern = message.plural if counted else message.singular
        return "".join(
            text.upper() + ("" if name is None else f"{{{name}{f':{form}' if form else ''}}}")
            for text, name, form, _ in Formatter().parse(pattern)
        )

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


@pytest.fixture
def loud_sheet(invented_assessment, invented_context):
    with spoken_by(Loud()):
        return describe_lamp(invented_assessment, "L-01", invented_context)


def test_sentences_of_the_sheet_are_said(loud_sheet):
    assert re.fullmatch(
        r"FAILS 1 OF \d+ JUDGEMENTS\. .* WITHIN THE UNCERTAINTY\. .*", loud_sheet.verdict_sentence
    )
    assert loud_sheet.energy_class.words == "F DECLARED"
    assert loud_sheet.frame.title.endswith(" \u2013 SPEC SHEET")
    assert loud_sheet.headlines[0].label == "LUMINOUS EFFICACY"
    assert loud_sheet.headlines[0].figure.number == "98,4"
    assert "<title>OUTLINE OF A BULB, CAP E27</title>" in loud_sheet.silhouette
    assert loud_sheet.shortfalls[0].word == "FALLS SHORT"
    assert loud_sheet.shortfalls[0].sentence.startswith("DETERMINED 1,62; ASKED ")
    assert loud_sheet.statements.law.startswith("THE LAW IS READ AS IT STOOD ON ")


def test_nothing_is_left_to_be_said(loud_sheet):
    left = [*_worded(loud_sheet)]
    assert left == []


def _worded(value):
    if isinstance(value, Worded):
        yield value
    elif isinstance(value, tuple):
        for item in value:
            yield from _worded(item)
    elif dataclasses.is_dataclass(value):
        for field in dataclasses.fields(value):
            yield from _worded(getattr(value, field.name))


def test_verdicts_are_grouped_by_fields_and_not_by_words(invented_assessment):
    verdicts = invented_assessment.verdicts_of("L-01")
    act = say("Regulation (EU) 2019/2020")
    known = [
        dataclasses.replace(
            item,
            act=act if item.status == "read" else item.act,
            reason=say("the lamp is not connected"),
            note=joined(" ", (sentence(say("first words")), sentence(say("second words")))),
        )
        for item in verdicts
    ]
    with spoken_by(Loud()):
        law, buyer = verdict_groups(known, palette("laboratory"))
        heading, asked = f"{law.heading}", f"{buyer.heading}"
        left_out = [(f"{item.label}", f"{item.text}") for item in law.not_applicable]
    assert heading == "REGULATION (EU) 2019/2020, AS AMENDED BY 2021/341"
    assert asked == "call for bids, ASKED BY THE BUYER"
    assert left_out == [("Networked standby power", "THE LAMP IS NOT CONNECTED")]
    assert all(item.notes == ("FIRST WORDS.", "SECOND WORDS.") for item in law.clauses)
    outside = [item for item in known if item.verdict is VerdictWord.NOT_APPLICABLE]
    assert len(outside) == 1
