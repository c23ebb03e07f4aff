"""Messages: English text that remembers its pattern and its values.

A message is a string, its English text, and goes wherever a string goes: into records, data
files, tests. Where a language is spoken, formatting it (``f"{message}"``, ``str(message)``,
:func:`told`) says it in that language, with its numbers in the notation of that language.
String operations other than formatting and ``+`` see the English text alone; so a room that
writes messages leaves them whole and puts them together with :func:`say` and :func:`joined`.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping
from contextlib import contextmanager
from contextvars import ContextVar
from datetime import date
from decimal import Decimal
from string import Formatter
from types import MappingProxyType
from typing import Any, Protocol, Self, SupportsIndex

from generator.language.quotations import MARKS, after_marks, are_marked, quoted

__all__ = [
    "SEMICOLON",
    "Capital",
    "Message",
    "Numeral",
    "Passage",
    "Sentence",
    "Speaker",
    "Worded",
    "capital",
    "joined",
    "numeral",
    "say",
    "say_as",
    "say_counted",
    "sentence",
    "spoken_by",
    "told",
]

Renumber = Callable[[str], str]
"""What becomes of a number in English notation before it takes the notation of the language."""

_FIELDS = Formatter()


class Speaker(Protocol):
    """One who says patterns and numbers in a language."""

    def pattern(self, message: Message) -> str:
        """Give the pattern of a message in the language."""

    def number(self, text: str) -> str:
        """Give a number, in English notation, in the notation of the language."""

    def day(self, day: date) -> str:
        """Give a date in the words of the language."""


_SPEAKER: ContextVar[Speaker | None] = ContextVar("speaker", default=None)


@contextmanager
def spoken_by(speaker: Speaker | None) -> Iterator[None]:
    """Let somebody speak for the length of a ``with`` block; ``None`` speaks English."""
    before = _SPEAKER.set(speaker)
    try:
        yield
    finally:
        _SPEAKER.reset(before)


class Worded(str):
    """English text that can be said in another language."""

    __slots__ = ()

    def said_by(self, speaker: Speaker, renumber: Renumber | None = None) -> str:
        """Say the text in the language of the speaker."""
        raise NotImplementedError

    def __str__(self) -> str:
        return told(self)

    def __format__(self, spec: str) -> str:
        return format(told(self), spec)

    def __add__(self, other: str) -> str:
        return joined("", (self, other)) if other else self

    def __radd__(self, other: str) -> str:
        return joined("", (other, self)) if other else self


class Numeral(Worded):
    """A number that is text already: digits, a full stop before its decimals, perhaps a sign."""

    __slots__ = ()

    def said_by(self, speaker: Speaker, renumber: Renumber | None = None) -> str:
        """Give the number in the notation of the speaker."""
        plain = "".join(self)
        return speaker.number(renumber(plain) if renumber else plain)

    def __reduce_ex__(self, protocol: SupportsIndex) -> tuple[Any, ...]:
        return (Numeral, ("".join(self),))


class Message(Worded):
    """A pattern with its values.

    Parameters
    ----------
    pattern
        English pattern with named places, for instance ``{count} lamps``; the key of the
        catalogues.
    values
        What stands in the places: messages, numbers, or data that no language changes. Empty
        while the places are still to be filled.
    context
        Tells apart equal words that mean different things; empty for most.
    plural
        Pattern for other counts than one; empty where there is no count.
    count
        The count; ``None`` where there is none.
    """

    __slots__ = ("context", "counted", "plural", "singular", "values")

    singular: str
    plural: str
    context: str
    counted: int | None
    values: Mapping[str, Any]

    def __new__(
        cls,
        pattern: str,
        values: Mapping[str, Any] = MappingProxyType({}),
        context: str = "",
        plural: str = "",
        count: int | None = None,
    ) -> Self:
        """Write the English text and keep what it is made of."""
        english = plural if plural and count != 1 else pattern
        text = _filled(english, values, None, None) if values else english
        message = super().__new__(cls, text)
        message.singular, message.plural, message.context = pattern, plural, context
        message.counted, message.values = count, MappingProxyType(dict(values))
        return message

    def format(self, *args: object, **values: object) -> Message:
        """Fill the places; gives a message again. A count given here is counted by."""
        if args:
            raise TypeError("the places of a message have names")
        count = values.get("count")
        counted = count if self.plural and isinstance(count, int) else self.counted
        return Message(self.singular, {**self.values, **values}, self.context, self.plural, counted)

    def said_by(self, speaker: Speaker, renumber: Renumber | None = None) -> str:
        """Say the message in the language of the speaker."""
        pattern = speaker.pattern(self)
        if self.values:
            return _filled(pattern, self.values, speaker, renumber)
        return quoted(pattern) if pattern == self.singular else pattern

    def __reduce_ex__(self, protocol: SupportsIndex) -> tuple[Any, ...]:
        kept = (self.singular, dict(self.values), self.context, self.plural, self.counted)
        return (Message, kept)


class Passage(Worded):
    """Texts one after another.

    Parameters
    ----------
    separator
        What stands between them.
    parts
        Messages, numbers, data.
    """

    __slots__ = ("parts", "separator")

    parts: tuple[str, ...]
    separator: str

    def __new__(cls, separator: str, parts: Iterable[str]) -> Self:
        """Put the English texts together and keep the parts."""
        kept = tuple(parts)
        passage = super().__new__(cls, str.join(separator, kept))
        passage.parts, passage.separator = kept, separator
        return passage

    def said_by(self, speaker: Speaker, renumber: Renumber | None = None) -> str:
        """Say the parts in the language of the speaker."""
        between = _said(self.separator, speaker, renumber)
        return between.join(_said(part, speaker, renumber) for part in self.parts)

    def __reduce_ex__(self, protocol: SupportsIndex) -> tuple[Any, ...]:
        return (Passage, (self.separator, self.parts))


class Sentence(Worded):
    """A text with a capital at its beginning and a full stop at its end."""

    __slots__ = ("text",)

    text: str

    def __new__(cls, text: str) -> Self:
        """Write the English sentence and keep the text."""
        written = super().__new__(cls, _as_sentence("".join(text)))
        written.text = text
        return written

    def said_by(self, speaker: Speaker, renumber: Renumber | None = None) -> str:
        """Say the sentence in the language of the speaker."""
        return _as_sentence(_said(self.text, speaker, renumber))

    def __reduce_ex__(self, protocol: SupportsIndex) -> tuple[Any, ...]:
        return (Sentence, (self.text,))


def _as_sentence(text: str) -> str:
    text = text.strip()
    if not text:
        return ""
    ended = text.rstrip(MARKS).endswith((".", "?", "!"))
    return f"{_with_capital(text)}{'' if ended else '.'}"


class Capital(Worded):
    """A text with a capital at its beginning."""

    __slots__ = ("text",)

    text: str

    def __new__(cls, text: str) -> Self:
        """Write the English text and keep what it is made of."""
        written = super().__new__(cls, _with_capital("".join(text)))
        written.text = text
        return written

    def said_by(self, speaker: Speaker, renumber: Renumber | None = None) -> str:
        """Say the text in the language of the speaker."""
        return _with_capital(_said(self.text, speaker, renumber))

    def __reduce_ex__(self, protocol: SupportsIndex) -> tuple[Any, ...]:
        return (Capital, (self.text,))


def _with_capital(text: str) -> str:
    at = after_marks(text)
    return f"{text[:at]}{text[at : at + 1].upper()}{text[at + 1 :]}"


def _said(value: str, speaker: Speaker, renumber: Renumber | None) -> str:
    return value.said_by(speaker, renumber) if isinstance(value, Worded) else quoted(value)


def _filled(
    pattern: str, values: Mapping[str, Any], speaker: Speaker | None, renumber: Renumber | None
) -> str:
    """A pattern with its places filled, in English where nobody speaks."""
    parts: list[str] = []
    for text, name, spec, conversion in _FIELDS.parse(pattern):
        parts.append(text)
        if name is None:
            continue
        if conversion or not name.isidentifier():
            raise ValueError(f"place {name!r} of {pattern!r}: a name and a format, no more")
        parts.append(_value_text(values[name], spec or "", speaker, renumber))
    return "".join(parts)


def _value_text(value: Any, spec: str, speaker: Speaker | None, renumber: Renumber | None) -> str:
    if isinstance(value, Worded):
        return format("".join(value) if speaker is None else value.said_by(speaker, renumber), spec)
    if isinstance(value, date) and speaker is not None:
        return speaker.day(value)
    text = format(value, spec)
    if isinstance(value, str) and speaker is not None:
        return quoted(text)
    if isinstance(value, int | float | Decimal) and not isinstance(value, bool):
        text = text.replace("-", "\u2212")
        return speaker.number(renumber(text) if renumber else text) if speaker else text
    return text


def say(pattern: str, /, **values: object) -> Message:
    """Write a message.

    Parameters
    ----------
    pattern
        English pattern, a literal, with named places; a place may carry a format
        (``{share:.1f}``), and a number in it takes the notation of the language.
    values
        What stands in the places; none where they are filled later with ``format``.
    """
    return Message(pattern, values)


def say_as(context: str, pattern: str, /, **values: object) -> Message:
    """Write a message whose English words mean something else elsewhere.

    Parameters
    ----------
    context
        What tells the meanings apart, a literal, for instance ``weight``.
    pattern, values
        As for :func:`say`.
    """
    return Message(pattern, values, context)


def say_counted(one: str, many: str, count: int | None = None, /, **values: object) -> Message:
    """Write a message that depends on a count.

    Parameters
    ----------
    one, many
        English patterns, literals, for a count of one and for others; ``{count}`` is the count.
    count
        The count; ``None`` where it is filled later with ``format``.
    values
        What stands in the other places; none where the count comes later.
    """
    if count is None:
        return Message(one, values, "", many)
    return Message(one, {"count": count, **values}, "", many, count)


def joined(separator: str, parts: Iterable[str]) -> Passage:
    """Put texts one after another, each still to be said in another language.

    Parameters
    ----------
    separator
        What stands between them.
    parts
        The texts.
    """
    return Passage(separator, parts)


def sentence(text: str) -> Sentence:
    """Give a text a capital and a full stop, in whatever language it is said.

    Parameters
    ----------
    text
        A message, or other text; empty text stays empty.
    """
    return Sentence(text)


def capital(text: str) -> Capital:
    """Give a text a capital, in whatever language it is said.

    Parameters
    ----------
    text
        A message, or other text.
    """
    return Capital(text)


def numeral(text: str) -> Numeral:
    """Mark text as a number, so that it takes the notation of the language.

    Parameters
    ----------
    text
        The number in English notation: a full stop before its decimals.
    """
    return Numeral(text)


def told(text: str, renumber: Renumber | None = None) -> str:
    """Say a text in the language that is being spoken; plain text stays as it is.

    Parameters
    ----------
    text
        A message, or any other text.
    renumber
        What becomes of its numbers before they take the notation of the language.

    Returns
    -------
    str
        Plain text; English where no language is being spoken. What it quotes in another language
        has its marks (:mod:`generator.language.quotations`).
    """
    if not isinstance(text, Worded):
        return quoted(text)
    speaker = _SPEAKER.get()
    if speaker is not None:
        return text.said_by(speaker, renumber)
    spoken = renumber is not None or are_marked()
    return text.said_by(_ENGLISH, renumber) if spoken else "".join(text)


class _English:
    """Says everything as it was written."""

    def pattern(self, message: Message) -> str:
        """Give the English pattern for the count."""
        return message.plural if message.plural and message.counted != 1 else message.singular

    def number(self, text: str) -> str:
        """Leave a number as it is."""
        return text

    def day(self, day: date) -> str:
        """Leave a date as data files write it."""
        return day.isoformat()


_ENGLISH = _English()


SEMICOLON = say_as("between parts", "; ")
"""What stands between the parts of a list, with the space that the language puts before it."""
