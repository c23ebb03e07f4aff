"""The comparison in another language: what is said changes, what is counted does not."""

from __future__ import annotations

import dataclasses
import json
from datetime import date

import pytest

from generator.language import Message
from generator.language.messages import Worded, spoken_by
from generator.language.speaking import decimal_sign
from generator.sheets import describe_comparison
from generator.sheets.comparison_words import CONTROL_WORDS, SHORT_LABELS


class Marking:
    """Says every pattern between angle quotation marks, and numbers with a comma."""

    def pattern(self, message: Message) -> str:
        plural = message.plural and message.counted != 1
        return f"«{message.plural if plural else message.singular}»"

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


def texts_of(value):
    """Every text of a description."""
    if isinstance(value, str):
        yield value
    elif isinstance(value, dict):
        yield from texts_of(tuple(value.values()))
    elif isinstance(value, tuple):
        for item in value:
            yield from texts_of(item)
    elif dataclasses.is_dataclass(value):
        for field in dataclasses.fields(value):
            yield from texts_of(getattr(value, field.name))


@pytest.fixture(scope="module")
def marked_comparison(invented_assessment, invented_context):
    with spoken_by(Marking()):
        return describe_comparison(invented_assessment, invented_context)


def test_scripts_get_words_and_labels_as_they_are_said(marked_comparison):
    data = json.loads(marked_comparison.data)
    assert data["words"] == {key: f"«{words}»" for key, words in CONTROL_WORDS.items()}
    assert data["words"] == marked_comparison.words
    labels = {column["key"]: column["label"] for column in data["columns"]}
    assert labels["ra"] == f"«{SHORT_LABELS['ra']}»"


def test_numbers_of_the_scripts_are_numbers_in_every_language(
    marked_comparison, invented_assessment, invented_context
):
    plain = json.loads(describe_comparison(invented_assessment, invented_context).data)
    marked = json.loads(marked_comparison.data)
    assert [lamp["cells"] for lamp in marked["lamps"]] == [lamp["cells"] for lamp in plain["lamps"]]
    assert marked["spectra"] == plain["spectra"]
    assert plain["decimal"] == "."


@pytest.mark.parametrize(("tag", "sign"), [("en", "."), ("de", ","), ("fr", ","), ("pl", ",")])
def test_decimal_sign_is_that_of_the_language(monkeypatch, tag, sign):
    """Signs as the Unicode common locale data give them."""
    monkeypatch.setattr("generator.language.speaking.spoken_language", lambda: tag)
    assert decimal_sign() == sign


def test_a_finished_comparison_holds_no_message(marked_comparison):
    texts = list(texts_of(marked_comparison))
    assert "«Two figures against each other»" in texts
    assert [text for text in texts if isinstance(text, Worded)] == []


def test_a_computed_figure_goes_without_saying_in_every_language(
    marked_comparison, invented_assessment, invented_context
):
    plain = describe_comparison(invented_assessment, invented_context)
    known = [[cell.computed for cell in row.cells] for row in plain.rows]
    assert [[cell.computed for cell in row.cells] for row in marked_comparison.rows] == known
    assert [[cell.grade == "computed" for cell in row.cells] for row in plain.rows] == known
