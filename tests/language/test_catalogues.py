"""Catalogues: no message missing, none unused, each with the places of its English pattern."""

from __future__ import annotations

import io
from datetime import date
from string import Formatter
from typing import get_args

import pytest
from babel.messages.pofile import read_po

from generator.language import say, say_counted, told
from generator.language.speaking import (
    LANGUAGES,
    date_in_words,
    language_name,
    speaking,
    spoken_language,
)
from generator.records.figure import Grade
from generator.records.settings import Language
from generator.sheets.lamp_words import USE_LABELS
from generator.sheets.typeface import uncovered_characters
from generator.sheets.words import CLASS_GRADES
from tests.language.write_catalogues import (
    TRANSLATED,
    catalogue_path,
    messages,
    read_catalogue,
    renewed,
)

PLURALS = {"de": 2, "fr": 2, "es": 2, "it": 2, "pl": 3}
"""Plural forms that the counts of a sheet, 0 to some thousand, use; Unicode CLDR, plural rules
(French, Spanish and Italian have one more for millions)."""
FEW_WORDS = 4


@pytest.fixture(scope="module")
def wanted():
    return {(item.context, item.id): item for item in messages() if item.id}


@pytest.fixture(scope="module", params=TRANSLATED)
def catalogue(request):
    return read_catalogue(request.param)


def _entries(catalogue):
    return {(item.context, item.id): item for item in catalogue if item.id}


def _strings(message):
    return message.string if isinstance(message.string, tuple) else (message.string,)


def _places(pattern):
    return sorted((name, spec) for _, name, spec, _ in Formatter().parse(pattern) if name)


def test_every_language_has_a_catalogue():
    assert {path.stem for path in catalogue_path("x").parent.glob("*.po")} == set(TRANSLATED)
    assert get_args(Language) == LANGUAGES


def test_no_message_is_missing_and_none_unused(catalogue, wanted):
    found = _entries(catalogue)
    assert sorted(map(str, set(wanted) - set(found))) == [], "missing"
    assert sorted(map(str, set(found) - set(wanted))) == [], "unused"
    assert not catalogue.obsolete


def test_every_message_is_translated(catalogue):
    untold = [
        key
        for key, item in _entries(catalogue).items()
        if item.fuzzy or not all(text and text.strip() for text in _strings(item))
    ]
    assert untold == []


def test_translations_keep_the_places(catalogue):
    wrong = []
    for key, item in _entries(catalogue).items():
        english = item.id if isinstance(item.id, tuple) else (item.id,)
        places = _places(english[-1])
        wrong += [key for text in _strings(item) if set(_places(text)) != set(places)]
    assert wrong == []


def test_translations_begin_and_end_like_their_pattern(catalogue):
    wrong = [
        key
        for key, item in _entries(catalogue).items()
        for text in _strings(item)
        if (text != text.strip()) != (key[1][-1] != key[1][-1].strip())
        and not isinstance(key[1], tuple)
    ]
    assert wrong == []


def test_long_messages_are_not_left_in_english(catalogue):
    """A short one may be the same in two languages; one of four words and more hardly is."""
    english = [
        key[1]
        for key, item in _entries(catalogue).items()
        if isinstance(key[1], str) and item.string == key[1] and _words(key[1]) >= FEW_WORDS
    ]
    assert english == []


def _words(pattern):
    text = "".join(part for part, *_ in Formatter().parse(pattern))
    return sum(word.isalpha() and word.islower() for word in text.split())


def test_plural_forms(catalogue):
    needed = PLURALS[str(catalogue.locale)]
    for item in _entries(catalogue).values():
        if isinstance(item.id, tuple):
            assert len(item.string) >= needed, item.id


def test_the_typeface_has_every_letter(catalogue):
    for item in _entries(catalogue).values():
        for text in _strings(item):
            assert not uncovered_characters(text), text


def test_catalogues_are_written_as_the_tool_writes_them(catalogue):
    tag = str(catalogue.locale)
    assert catalogue_path(tag).read_bytes() == renewed(tag)
    again = read_po(io.BytesIO(renewed(tag)), locale=tag)
    assert len(again) == len(catalogue)


@pytest.mark.parametrize(
    ("tag", "words"),
    [
        # The long dates of Unicode CLDR, as a reader of the language writes them; from memory.
        ("en", "1 September 2021"),
        ("de", "1. September 2021"),
        ("fr", "1 septembre 2021"),
        ("es", "1 de septiembre de 2021"),
        ("it", "1 settembre 2021"),
        ("pl", "1 września 2021"),
    ],
)
def test_dates_in_words(tag, words):
    with speaking(tag):
        assert spoken_language() == tag
        assert date_in_words(date(2021, 9, 1)).replace("\u00a0", " ") == words
    assert spoken_language() == "en"


def test_decimal_signs():
    message = say("{number}", number=1.5)
    signs = {}
    for tag in LANGUAGES:
        with speaking(tag):
            signs[tag] = told(message)
    assert signs == {"en": "1.5", "de": "1,5", "fr": "1,5", "es": "1,5", "it": "1,5", "pl": "1,5"}


def test_polish_counts_have_three_forms():
    """1 jednostka, 2 jednostki, 5 jednostek: the three forms of Polish; from memory."""
    with speaking("pl"):
        forms = {told(say_counted("{count} unit", "{count} units", n)) for n in (1, 2, 5, 22)}
    assert len({form.split(maxsplit=1)[1] for form in forms}) == 3


def test_a_class_has_its_own_gender_and_years_their_own_forms():
    """Una clase declarada, un valor declarado; 1 roku, 5 lat: from memory."""
    words = {}
    for tag in ("es", "it", "pl"):
        with speaking(tag):
            cost = USE_LABELS["life"]
            years = [told(cost.format(count=count)).split()[-1] for count in (1, 5)]
            words[tag] = (told(CLASS_GRADES[Grade.DECLARED]), *years)
    assert words == {
        "es": ("declarada", "año", "años"),
        "it": ("dichiarata", "anno", "anni"),
        "pl": ("deklarowana", "roku", "lat"),
    }


def test_languages_have_their_own_names():
    names = [language_name(tag) for tag in LANGUAGES]
    assert names == ["English", "Deutsch", "Français", "Español", "Italiano", "Polski"]


def test_an_unknown_language_is_refused():
    with pytest.raises(ValueError, match="xx"), speaking("xx"):
        pass
