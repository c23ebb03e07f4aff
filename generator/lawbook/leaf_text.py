"""The words of a leaf: which of its texts are printed, and the messages they become.

A text is cut into the pieces that a sheet prints apart, and each piece is a message of its own:
a note into its sentences, an act into its name and what tells its editions apart, a point into
the place and the act that amended it.
"""

from __future__ import annotations

import re

from generator.language import Message, joined
from generator.records.clause import Source

__all__ = ["TRANSLATED_KEYS", "message_of", "note_of", "pieces", "source_of"]

TRANSLATED_KEYS = frozenset({"title", "note", "act", "annex", "point", "regime"})
"""Keys of a leaf whose texts are printed."""

_SENTENCE_END = re.compile(r"(?<=\.) (?=[A-Z0-9])(?<!S\.I\. )(?<!S\.O\. )")
_AMENDED = re.compile(
    r"(?:(?P<place>.*), )?(?P<amendment>as amended by (?:Delegated )?Regulation \(EU\) "
    r"(?P<act>\d+/\d+))"
)


def pieces(key: str, text: str) -> tuple[str, ...]:
    """Cut the text of a key into the pieces that are translated.

    Parameters
    ----------
    key
        One of :data:`TRANSLATED_KEYS`.
    text
        The English text as it stands in the leaf.

    Returns
    -------
    tuple of str
        Plain text; the keys of the catalogues.
    """
    if key == "note":
        return tuple(_SENTENCE_END.split(text))
    if key == "act":
        return tuple(text.split(", ", 1))
    found = _AMENDED.fullmatch(text) if key == "point" else None
    if found is None:
        return (text,)
    return tuple(part for part in (found["place"], found["amendment"]) if part)


def message_of(text: str) -> str:
    """Make a message of a text that is one piece; empty text stays empty."""
    return Message(text) if text else ""


def note_of(text: str) -> str:
    """Make a passage of a note, each sentence a message."""
    return joined(" ", map(Message, pieces("note", text))) if text else ""


def source_of(act: str, annex: str = "", point: str = "") -> Source:
    """Make a source of the texts of a leaf.

    Parameters
    ----------
    act, annex, point
        As they stand in the leaf.

    Returns
    -------
    Source
        Every piece a message.
    """
    name, _, edition = act.partition(", ")
    found = _AMENDED.fullmatch(point)
    return Source(
        act=message_of(name),
        edition=message_of(edition),
        annex=message_of(annex),
        point=message_of(point if found is None else found["place"] or ""),
        amendment=message_of("" if found is None else found["amendment"]),
        amending_act="" if found is None else found["act"],
    )
