"""Speaking a language: its catalogue, the notation of its numbers, its dates."""

from __future__ import annotations

import io
from collections.abc import Iterable, Iterator
from contextlib import contextmanager
from contextvars import ContextVar
from datetime import date
from functools import cache
from importlib.resources import files
from typing import TYPE_CHECKING

from generator.language.messages import Message, spoken_by
from generator.language.quotations import marked, marking

if TYPE_CHECKING:
    from babel import Locale
    from babel.support import Translations

__all__ = [
    "LANGUAGES",
    "date_in_words",
    "decimal_sign",
    "in_language",
    "language_name",
    "quoting",
    "speaking",
    "spoken_language",
]

LANGUAGES = ("en", "de", "fr", "es", "it", "pl")
"""The languages that sheets can be in, by tag."""

_LOCALES = {"en": "en_GB"}
_SPACE = "\u00a0"
_TAG: ContextVar[str] = ContextVar("tag", default="en")


@cache
def _locale(tag: str) -> Locale:
    from babel import Locale

    return Locale.parse(_LOCALES.get(tag, tag))


@cache
def _catalogue(tag: str) -> Translations:
    """The messages of a language, read from its catalogue of text."""
    from babel.messages.mofile import write_mo
    from babel.messages.pofile import read_po
    from babel.support import Translations

    text = files("generator.language").joinpath("catalogues", f"{tag}.po").read_bytes()
    compiled = io.BytesIO()
    write_mo(compiled, read_po(io.BytesIO(text), locale=tag))
    compiled.seek(0)
    return Translations(compiled)


class _Speaker:
    """Says messages from a catalogue; what it lacks is said in English."""

    def __init__(self, tag: str) -> None:
        self._tag = tag
        self._catalogue = _catalogue(tag)
        self._decimal_sign = _locale(tag).number_symbols["latn"]["decimal"]

    def pattern(self, message: Message) -> str:
        """Give the pattern of a message in the language, for its count where it has one."""
        found = self._catalogue
        if message.plural:
            count = 0 if message.counted is None else message.counted
            return str(found.ngettext(message.singular, message.plural, count))
        if message.context:
            return str(found.pgettext(message.context, message.singular))
        return str(found.gettext(message.singular)) if message.singular else ""

    def number(self, text: str) -> str:
        """Give a number with the decimal sign of the language."""
        return text.replace(".", self._decimal_sign)

    def day(self, day: date) -> str:
        """Give a date in words."""
        return _date_in(self._tag, day)


@cache
def _speaker(tag: str) -> _Speaker | None:
    """Who speaks a language; nobody is needed for English, which messages are written in."""
    if tag not in LANGUAGES:
        raise ValueError(f"no catalogue for the language {tag!r}")
    return None if tag == "en" else _Speaker(tag)


@contextmanager
def speaking(tag: str) -> Iterator[None]:
    """Speak a language for the length of a ``with`` block.

    Parameters
    ----------
    tag
        One of :data:`LANGUAGES`.

    Raises
    ------
    ValueError
        If there is no catalogue for it.
    """
    before = _TAG.set(tag)
    try:
        with spoken_by(_speaker(tag)):
            yield
    finally:
        _TAG.reset(before)


def spoken_language() -> str:
    """Give the tag of the language that is being spoken; English where none is."""
    return _TAG.get()


def in_language(text: str, language: str) -> str:
    """Mark text that is in another language than the one being spoken.

    Parameters
    ----------
    text
        Plain text.
    language
        Tag of its language.

    Returns
    -------
    str
        The text, with marks (:mod:`generator.language.quotations`) where its language is another.
    """
    return text if _primary(language) == _primary(spoken_language()) else marked(text, language)


@contextmanager
def quoting(texts: Iterable[str], language: str) -> Iterator[None]:
    """Mark some texts wherever they are said as a whole, for the length of a ``with`` block.

    Parameters
    ----------
    texts
        Texts that stay as they are, whatever is being spoken.
    language
        Tag of their language; where it is the one being spoken, nothing is marked.
    """
    of_others = {text: in_language(text, language) for text in texts}
    with marking({text: said for text, said in of_others.items() if said != text}):
        yield


def _primary(tag: str) -> str:
    """The language of a tag, without region or script."""
    return tag.partition("-")[0].lower()


def date_in_words(day: date) -> str:
    """Write a date in the words of the language that is being spoken.

    Parameters
    ----------
    day
        The date, for instance 1 September 2021; its day and month stay on one line.
    """
    return _date_in(spoken_language(), day)


def _date_in(tag: str, day: date) -> str:
    from babel.dates import format_date

    return format_date(day, "long", locale=_locale(tag)).replace(" ", _SPACE, 1)


def decimal_sign() -> str:
    """Give the sign before the decimals of a number in the language that is being spoken."""
    return str(_locale(spoken_language()).number_symbols["latn"]["decimal"])


def language_name(tag: str) -> str:
    """Give the name of a language in that language, with a capital as in a list.

    Parameters
    ----------
    tag
        One of :data:`LANGUAGES`.
    """
    locale = _locale(tag)
    name = str(locale.languages[locale.language])
    return f"{name[:1].upper()}{name[1:]}"
