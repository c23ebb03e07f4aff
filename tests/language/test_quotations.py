"""What is quoted in another language carries marks, whatever it is quoted in."""

from __future__ import annotations

import pytest

from generator.language import capital, joined, say, sentence, told
from generator.language.quotations import MARKS, marked, without_marks
from generator.language.speaking import in_language, quoting, speaking

TITLE = "relamping of two schools"
MARKED = marked(TITLE, "en")


def test_marks_stand_around_the_text_and_can_be_taken_away():
    opening, between, closing = MARKS
    assert f"{opening}en{between}{TITLE}{closing}" == MARKED
    assert without_marks(f"Bericht: {MARKED}.") == f"Bericht: {TITLE}."


@pytest.mark.parametrize("tag", ["", "English please", 'en" onclick="'])
def test_what_is_no_tag_marks_nothing(tag):
    assert marked(TITLE, tag) == TITLE


def test_a_text_cannot_bring_marks_of_its_own():
    assert marked(f"a{MARKS}b", "de") == marked("ab", "de")


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        (TITLE, MARKED),
        ("something else", "something else"),
        (say("Tender report: {campaign}", campaign=TITLE), f"Vergabebericht: {MARKED}"),
        (joined("; ", (TITLE, "AST-1")), f"{MARKED}; AST-1"),
        (say(TITLE), MARKED),
        (capital(TITLE), marked(f"R{TITLE[1:]}", "en")),
        (sentence(f"{TITLE}."), f"R{TITLE[1:]}."),
        (sentence(TITLE), f"{marked(f'R{TITLE[1:]}', 'en')}."),
    ],
)
def test_a_quoted_text_is_marked_wherever_it_stands_as_a_whole(text, expected):
    with speaking("de"), quoting([TITLE], "en"):
        assert told(text) == expected
    with speaking("de"):
        assert MARKS[0] not in told(text)


def test_english_pages_mark_what_is_not_english():
    title = "Neue Lampen für zwei Schulen"
    with speaking("en"), quoting([title], "de"):
        assert told(say("Tender report: {campaign}", campaign=title)) == (
            f"Tender report: {marked(title, 'de')}"
        )
        assert MARKS[0] not in say("Tender report: {campaign}", campaign=title)[:]


@pytest.mark.parametrize(("spoken", "own"), [("en", "en"), ("de", "de-AT"), ("fr", "FR")])
def test_nothing_is_marked_in_the_language_of_the_campaign(spoken, own):
    with speaking(spoken), quoting([TITLE], own):
        assert told(say("Tender report: {campaign}", campaign=TITLE)).endswith(f" {TITLE}")
        assert in_language(TITLE, own) == TITLE


def test_a_sentence_that_a_quoted_text_ends_has_one_full_stop():
    with speaking("de"), quoting(["Never dim."], "en"):
        assert without_marks(told(sentence("Never dim."))) == "Never dim."
