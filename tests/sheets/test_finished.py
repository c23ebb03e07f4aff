"""The last step of a description: said, with thousands apart, and no line end before a unit."""

from dataclasses import dataclass

import pytest

from generator.language import joined, say
from generator.sheets.finished import finished


@dataclass(frozen=True)
class Described:
    """A description of three fields."""

    text: str
    bidders: tuple[str, ...] = ()
    parts: tuple[str, ...] = ()


@pytest.mark.parametrize(
    ("text", "written"),
    [
        ("2960 ± 42 K at 5 %", "2960 ± 42\u00a0K at 5\u00a0%"),
        ("a beam of 36 °", "a beam of 36°"),
        ("an ambient of 25 °C", "an ambient of 25 °C"),
        ("5 hours, 4 Kelvin Street", "5 hours, 4 Kelvin Street"),
        (say("after {hours} h", hours=25000), "after 25\u00a0000\u00a0h"),
        (say("by {margin} lm", margin=-12345.5), "by \u221212\u00a0345.5\u00a0lm"),
        (say("seed {seed}", seed="20260302"), "seed 20260302"),
        ("Order 20260302", "Order 20260302"),
        (joined("; ", [say("year {year}", year=2026), "x"]), "year 2026; x"),
        ('<path d="M1 2 V 3 h 4"/>', '<path d="M1 2 V 3 h 4"/>'),
        ('{"unit": "5 K"}', '{"unit": "5 K"}'),
    ],
)
def test_running_text_is_set_and_nothing_else(text, written):
    result = finished(Described(text, parts=(text,)))
    assert result == Described(written, parts=(written,))
    assert type(result.text) is str


def test_what_scripts_compare_with_their_data_stays():
    assert finished(Described("", bidders=("Lamps 24 h",))).bidders == ("Lamps 24 h",)
