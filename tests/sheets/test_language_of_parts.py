"""Marks of a description become ``lang`` on the page (WCAG 2.2, success criterion 3.1.2)."""

from __future__ import annotations

import pytest

from generator.language.quotations import MARKS, marked
from generator.records.settings import Settings
from generator.sheets import own_words
from generator.sheets.html_sheet import _printable
from generator.sheets.language_of_parts import with_languages

EN = marked("Red must not be lost", "en")
TWO = marked("Clause two", "en")
RED = '<span lang="en">Red must not be lost</span>'
SECOND = '<span lang="en">Clause two</span>'


@pytest.mark.parametrize(
    ("page", "expected"),
    [
        (f"<p>{EN}</p>", '<p lang="en">Red must not be lost</p>'),
        (f'<li class="a">\n{EN}\n</li>', '<li class="a" lang="en">\nRed must not be lost\n</li>'),
        (f'<li lang="en">{EN}</li>', '<li lang="en">Red must not be lost</li>'),
        (
            f"<p>Abstand: {EN}, knapp</p>",
            '<p>Abstand: <span lang="en">Red must not be lost</span>, knapp</p>',
        ),
        (
            f"<th>{EN} <i>1</i></th>",
            '<th><span lang="en">Red must not be lost</span> <i>1</i></th>',
        ),
        (f"<dd>{EN}; {TWO}</dd>", '<dd lang="en">Red must not be lost; Clause two</dd>'),
        (
            f"<p>{EN} und {TWO}</p>",
            f"<p>{RED} und {SECOND}</p>",
        ),
        (
            f"<p>{EN}, {marked('Zwei', 'de')}</p>",
            '<p><span lang="en">Red must not be lost</span>, <span lang="de">Zwei</span></p>',
        ),
        (f'<p aria-label="{EN}: 1">x</p>', '<p aria-label="Red must not be lost: 1">x</p>'),
        (f"<title>Bericht: {EN}</title>", "<title>Bericht: Red must not be lost</title>"),
        (f"<title>{EN}</title>", '<title lang="en">Red must not be lost</title>'),
        (f'<script>{{"a":"{EN}"}}</script>', '<script>{"a":"Red must not be lost"}</script>'),
        (f"<p>{MARKS[0]}en{MARKS[1]}cut sho…</p>", "<p>cut sho…</p>"),
        ("<p>nothing</p>", "<p>nothing</p>"),
    ],
)
def test_a_mark_becomes_the_language_of_an_element(page, expected):
    assert with_languages(page) == expected


def test_paper_prints_marks_neither_as_themselves_nor_as_code_points():
    assert _printable(f"{EN}\u4e2d") == f"{EN}[U+4E2D]"


def test_own_words_are_words_and_no_codes():
    settings = Settings.model_validate(
        {
            "campaign": {"title": "Two rooms", "client": "A School", "reference": "AB-1"},
            "laboratory": {"name": "A bench", "methods": ["by hand", "by eye"]},
            "report": {"number": "Tp-7", "signatory_function": "head of it"},
            "lot": [{"id": "small", "title": "Small lamps", "quantity": 3}],
            "clause": [
                {
                    "id": "own-clause",
                    "title": "Light enough",
                    "quantity": "luminous_flux_lm",
                    "comparison": "at least",
                    "value": 1,
                    "note": "Said once. Said twice.",
                    "source": {"act": "AB-1, second part", "annex": "Specification", "point": "3"},
                }
            ],
        }
    )
    words = own_words(settings)
    assert words >= {"Two rooms", "A School", "A bench", "by hand", "by eye", "head of it"}
    assert words >= {"Small lamps", "Light enough", "Said once.", "Said twice.", "Specification"}
    assert "second part" in words
    assert not words & {"AB-1", "Tp-7", "small", "own-clause", "at least", "luminous_flux_lm", "3"}
