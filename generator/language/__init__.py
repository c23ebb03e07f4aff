"""Words that can be said in several languages: messages, catalogues, numbers and dates.

Rooms write messages (:mod:`generator.language.messages`): English text that remembers its pattern
and its values, so that it can be said again in another language. Data files hold the English
text. Sheets say a message in the language that is being spoken
(:mod:`generator.language.speaking`).
"""

from __future__ import annotations

from generator.language.messages import (
    SEMICOLON,
    Capital,
    Message,
    Numeral,
    Passage,
    Sentence,
    capital,
    joined,
    numeral,
    say,
    say_as,
    say_counted,
    sentence,
    told,
)

__all__ = [
    "SEMICOLON",
    "Capital",
    "Message",
    "Numeral",
    "Passage",
    "Sentence",
    "capital",
    "joined",
    "numeral",
    "say",
    "say_as",
    "say_counted",
    "sentence",
    "told",
]
