"""The campaign's own words: what its author wrote, which stays as it is on every sheet."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Mapping

from generator.records.settings import Settings

__all__ = ["own_words"]

_REPORT_CODES = frozenset({"number"})
_CLAUSE_WORDS = ("title", "regime", "note", "source")
_SENTENCE_END = re.compile(r"(?<=\.) (?=[A-Z0-9])")


def own_words(settings: Settings) -> frozenset[str]:
    """Gather the texts of a campaign that are words of its language.

    Parameters
    ----------
    settings
        ``campaign.toml``.

    Returns
    -------
    frozenset of str
        Titles, names, addresses, methods, items of the report, and what the buyer's own clauses
        say; no ids, numbers or codes.
    """
    return frozenset(text for text in map(str.strip, _texts(settings)) if _is_word(text))


def _is_word(text: str) -> bool:
    """Whether a text has words; a code is in capitals and digits."""
    return any(letter.islower() for letter in text)


def _texts(settings: Settings) -> Iterator[str]:
    campaign, use = settings.campaign, settings.use
    yield from (campaign.title, campaign.client, campaign.purpose)
    yield from _inside(settings.laboratory.model_dump())
    yield from _inside(settings.report.model_dump(exclude=set(_REPORT_CODES)))
    for factor in (use.location_based, use.market_based):
        yield from (factor.source, factor.region) if factor else ()
    yield from (item.title for item in settings.lot)
    yield from (item.title for item in settings.existing_lamp)
    yield from (item.title for item in settings.room)
    for clause in settings.clause:
        for text in _inside(clause.get(key) for key in _CLAUSE_WORDS):
            yield from (text, *_pieces(text))


def _pieces(text: str) -> Iterator[str]:
    """Sentences of a text, and what stands before and after its first comma."""
    yield from _SENTENCE_END.split(text)
    yield from text.split(", ", 1)


def _inside(value: object) -> Iterator[str]:
    """Every text inside a value."""
    if isinstance(value, str):
        yield value
    elif isinstance(value, Mapping):
        yield from _inside(value.values())
    elif isinstance(value, Iterable):
        for part in value:
            yield from _inside(part)
