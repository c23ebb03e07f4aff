"""Messages: English everywhere, and every language where it is spoken."""

from __future__ import annotations

import copy
import json
import pickle
from decimal import Decimal

import pytest

from generator.language import (
    joined,
    numeral,
    say,
    say_as,
    say_counted,
    sentence,
    told,
)
from generator.language.messages import spoken_by

PATTERNS = {
    "{first} before {second}": "{second} NACH {first}",
    "{count} lamp": "{count} LAMPE",
    "{count} lamps": "{count} LAMPEN",
    "the lamp": "die Lampe",
    "share {share:.1f} %": "ANTEIL {share:.1f} %",
}


class Backwards:
    """Says words in capitals and numbers with a comma, and turns two places round."""

    def pattern(self, message):
        several = message.plural and message.counted != 1
        english = message.plural if several else message.singular
        return PATTERNS.get(english, english)

    def number(self, text):
        return text.replace(".", ",")

    def day(self, day):
        return day.isoformat()


def test_a_message_is_its_english_text():
    message = say("{first} before {second}", first="a", second=Decimal("1.50"))
    assert message == "a before 1.50"
    assert json.dumps([message]) == '["a before 1.50"]'
    assert f"{message}|{message:>15}" == "a before 1.50|  a before 1.50"
    assert isinstance(message, str)
    assert hash(message) == hash("a before 1.50")


def test_where_a_language_is_spoken_formatting_says_it():
    message = say("{first} before {second}", first=say("the lamp"), second=Decimal("1.50"))
    with spoken_by(Backwards()):
        assert f"{message}" == str(message) == told(message) == "1,50 NACH die Lampe"
        assert message == "the lamp before 1.50"  # what data files hold
    assert f"{message}" == "the lamp before 1.50"


def _pickled(item):
    return pickle.loads(pickle.dumps(item))  # noqa: S301 - written on the same line


@pytest.mark.parametrize("copied", [copy.deepcopy, _pickled])
@pytest.mark.parametrize(
    "text",
    [
        say("{first} before {second}", first=say("the lamp"), second=2.5),
        say_counted("{count} lamp", "{count} lamps", 3),
        say_as("context", "word"),
        joined("; ", [say("the lamp"), "x", numeral("1.5")]),
        sentence(say("the lamp")),
        numeral("0.5"),
    ],
)
def test_copies_and_other_processes_keep_what_a_text_is_made_of(text, copied):
    again = copied(text)
    assert again == text
    assert type(again) is type(text)
    with spoken_by(Backwards()):
        assert told(again) == told(text)


def test_counts_choose_the_pattern():
    assert say_counted("{count} lamp", "{count} lamps", 1) == "1 lamp"
    assert say_counted("{count} lamp", "{count} lamps", 0) == "0 lamps"
    with spoken_by(Backwards()):
        assert told(say_counted("{count} lamp", "{count} lamps", 1)) == "1 LAMPE"
        assert told(say_counted("{count} lamp", "{count} lamps", 2)) == "2 LAMPEN"


def test_a_count_may_come_later():
    later = say_counted("{count} lamp", "{count} lamps")
    assert [later.format(count=number) for number in (1, 2)] == ["1 lamp", "2 lamps"]
    with spoken_by(Backwards()):
        assert [told(later.format(count=number)) for number in (1, 2)] == ["1 LAMPE", "2 LAMPEN"]


def test_parts_put_together_are_said_one_by_one():
    passage = joined(" – ", [say("the lamp"), "Model 1.5", numeral("1.5")]) + "!"
    assert passage == "the lamp – Model 1.5 – 1.5!"
    with spoken_by(Backwards()):
        assert told(passage) == "die Lampe – Model 1.5 – 1,5!"
        assert told("x" + say("the lamp")) == "xdie Lampe"


def test_a_sentence_has_a_capital_and_one_full_stop():
    assert sentence(say("the lamp")) == "The lamp."
    assert sentence("Ready.") == "Ready."
    assert sentence("") == ""
    with spoken_by(Backwards()):
        assert told(sentence(say("the lamp"))) == "Die Lampe."


def test_numbers_take_format_minus_and_notation():
    message = say("share {share:.1f} %", share=-2.25)
    assert message == f"share \u2212{2.25:.1f} %"
    with spoken_by(Backwards()):
        assert told(message) == "ANTEIL \u22122,2 %"
        assert told(message, lambda text: f"~{text}") == "ANTEIL ~\u22122,2 %"
    assert told(message, lambda _: "n") == "share n %"


def test_a_constant_is_filled_later():
    constant = say("{first} before {second}")
    assert constant.format(first="a", second="b") == "a before b"
    with pytest.raises(KeyError):
        constant.format(first="a")
    with pytest.raises(TypeError, match="names"):
        constant.format("a")


def test_a_place_is_a_name_and_no_more():
    with pytest.raises(ValueError, match="a name and a format"):
        say("{lamp.model}", lamp=object())
