"""The texts of the leaves as messages: cut into pieces, whole again in English, said elsewhere."""

from __future__ import annotations

import pickle
import tomllib
from collections.abc import Iterator
from datetime import date
from importlib.resources import files
from pathlib import Path
from typing import Any

import pytest

from generator.language import Message, capital, say, told
from generator.language.messages import spoken_by
from generator.lawbook import buyer_clauses, read_law_book
from generator.lawbook.leaf_text import TRANSLATED_KEYS, pieces, source_of
from generator.records.clause import Clause, Constant, Exemption


class Shouting:
    """Says every pattern in capitals and every number with a comma."""

    def pattern(self, message: Message) -> str:
        return message.singular.upper() if not message.values else message.singular

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


def leaf_texts(value: Any, key: str = "") -> Iterator[tuple[str, str]]:
    if isinstance(value, dict):
        for name, part in value.items():
            yield from leaf_texts(part, name)
    elif isinstance(value, list):
        for part in value:
            yield from leaf_texts(part, key)
    elif isinstance(value, str) and key in TRANSLATED_KEYS:
        yield key, value


def every_text() -> Iterator[tuple[str, str]]:
    for path in Path(str(files("generator.lawbook"))).rglob("*.toml"):
        yield from leaf_texts(tomllib.loads(path.read_text(encoding="utf-8")))


def test_the_pieces_of_every_leaf_make_its_text_again() -> None:
    texts = list(every_text())
    assert {key for key, _ in texts} == TRANSLATED_KEYS
    for key, text in texts:
        assert (" " if key == "note" else ", ").join(pieces(key, text)) == text


@pytest.mark.parametrize(
    ("key", "text", "expected"),
    [
        ("note", "One. Two of S.I. 2021/1095.", ("One.", "Two of S.I. 2021/1095.")),
        ("note", "No limit", ("No limit",)),
        ("act", "IEC 61000-3-2:2018, edition 5", ("IEC 61000-3-2:2018", "edition 5")),
        ("point", "Tables 4, 5 and 6", ("Tables 4, 5 and 6",)),
        (
            "point",
            "Table 9, as amended by Delegated Regulation (EU) 2021/340",
            ("Table 9", "as amended by Delegated Regulation (EU) 2021/340"),
        ),
        (
            "point",
            "as amended by Regulation (EU) 2021/341",
            ("as amended by Regulation (EU) 2021/341",),
        ),
    ],
)
def test_pieces(key: str, text: str, expected: tuple[str, ...]) -> None:
    assert pieces(key, text) == expected


def test_a_source_keeps_act_place_and_amendment_apart() -> None:
    source = source_of(
        "IEC 61000-3-2, edition 5", "Class C", "Table 2, as amended by Regulation (EU) 2021/341"
    )
    assert source.act == "IEC 61000-3-2"
    assert source.place == "edition 5, Class C, Table 2"
    assert source.amending_act == "2021/341"
    assert source.text == (
        "IEC 61000-3-2, edition 5, Class C, Table 2, as amended by Regulation (EU) 2021/341"
    )
    with spoken_by(Shouting()):
        assert told(source.place) == "EDITION 5, CLASS C, TABLE 2"


def test_every_printed_text_of_the_law_book_can_be_said_again() -> None:
    book = read_law_book()
    with spoken_by(Shouting()):
        leaves: list[Clause | Constant | Exemption] = [*book.leaves, *book.exemptions]
        for leaf in (*leaves, *book.constants.values()):
            said = (leaf.title, leaf.regime, leaf.note, leaf.source.text)
            assert [told(text) for text in said] == ["".join(text).upper() for text in said]
        for clause in book:
            for value in clause.values:
                assert told(value.note) == "".join(value.note).upper()


def test_the_buyers_words_stay_and_what_stands_for_them_is_said() -> None:
    given = {"quantity": "luminous_flux_lm", "comparison": "at least", "value": 806.5}
    plain, named = buyer_clauses([given, {**given, "id": "b", "title": "Light wanted"}], "f.toml")
    assert (plain.title, plain.regime) == ("Luminous flux", "Buyer")
    assert plain.source.text == "Requirement of the buyer"
    with spoken_by(Shouting()):
        assert told(plain.title) == "LUMINOUS FLUX"
        assert told(plain.source.text) == "REQUIREMENT OF THE BUYER"
        assert told(named.title) == "Light wanted"
        assert told(plain.says(plain.values[0])) == "at least 806,5 lm"


def test_a_capital_is_set_in_the_language_spoken_and_survives_pickling() -> None:
    text = pickle.loads(pickle.dumps(capital(say("été"))))  # noqa: S301 - pickled one line before
    assert text == "Été"
    with spoken_by(Shouting()):
        assert told(text) == "ÉTÉ"
    assert told(capital("")) == ""
