"""How lamps and bidders are called on the sheets; under code names nothing tells who they are."""

from __future__ import annotations

import dataclasses
import html
import re
from collections.abc import Mapping
from typing import Any, TypeVar

from generator.language import say, told
from generator.records.assessment import Assessment
from generator.records.lamp import Lamp
from generator.sheets.description import Note
from generator.sheets.finished import finished
from generator.sheets.words import UNDER_CODE_NAMES

__all__ = ["ShownNames"]

Described = TypeVar("Described")

_AS_IT_IS = frozenset({"lamp_id", "key", "data", "theme", "overrides", "words"})
"""Fields that name files and places in a page, and the data that were made from shown names."""
_MARKUP = frozenset({"svg", "ruler", "arrow", "silhouette", "html", "ruler_scale"})
_LEAST_LETTERS = 4  # a shorter word stands in too many sentences that tell nobody
_BETWEEN_TAGS = re.compile(r">[^<]+<")
_BIDDER = say("Bidder {code}")


class ShownNames:
    """The names of one campaign as its sheets show them.

    Parameters
    ----------
    assessment
        The campaign, and the code names of its bids where they are in force.
    """

    def __init__(self, assessment: Assessment) -> None:
        self._language = assessment.campaign.settings.campaign.language
        self._codes = {lamp: told(code) for lamp, code in assessment.shown_bidders.items()}
        self._letters = assessment.tender.codes if assessment.tender else {}
        self._words = _hidden_words(assessment, self._codes, self._letters)
        longest_first = sorted(self._words, key=len, reverse=True)
        pattern = "|".join(map(re.escape, longest_first))
        self._pattern = re.compile(rf"(?<![\w-])(?:{pattern})(?![\w-])") if pattern else None

    def hidden(self, lamp_id: str) -> bool:
        """Whether a code name stands for a lamp."""
        return lamp_id in self._codes

    def lamp(self, lamp: Lamp) -> str:
        """Code name, else model, else id of a lamp."""
        return self._codes.get(lamp.lamp_id) or lamp.model or lamp.lamp_id

    def bidder(self, lamp: Lamp) -> str:
        """Bidder of a lamp, by code where code names are in force; empty where not known.

        A lamp that is no bid, such as one that burns today, keeps its name, but not that of a
        maker who bids.
        """
        if self.hidden(lamp.lamp_id):
            return told(_BIDDER.format(code=self._letters[lamp.lamp_id]))
        return "" if lamp.bidder in self._words else lamp.bidder

    def notes(self, notes: tuple[Note, ...]) -> tuple[Note, ...]:
        """Remarks, which are free text; under code names a sentence in their place."""
        if not (notes and self._codes):
            return tuple(dataclasses.replace(note, language=self._language) for note in notes)
        text = told(UNDER_CODE_NAMES)
        return (Note(f"<p>{html.escape(text, quote=False)}</p>", len(text)),)

    def masked(self, described: Described) -> Described:
        """Replace the names that still stand in the running text of a description.

        The messages of the description are said first: what is masked is what is read.
        """
        plain = finished(described)
        result: Described = self._masked(plain, "") if self._pattern else plain
        return result

    def _masked(self, value: Any, field: str) -> Any:
        if field in _AS_IT_IS:
            return value
        if isinstance(value, str):
            if field in _MARKUP:
                return _BETWEEN_TAGS.sub(lambda found: self._text(found[0]), value)
            return self._text(value)
        if isinstance(value, tuple):
            return tuple(self._masked(item, "") for item in value)
        if dataclasses.is_dataclass(value) and not isinstance(value, type):
            return dataclasses.replace(
                value,
                **{
                    item.name: self._masked(getattr(value, item.name), item.name)
                    for item in dataclasses.fields(value)
                },
            )
        return value

    def _text(self, text: str) -> str:
        if self._pattern is None:
            return text
        return self._pattern.sub(lambda found: self._words[found[0]], text)


def _hidden_words(
    assessment: Assessment, codes: Mapping[str, str], letters: Mapping[str, str]
) -> dict[str, str]:
    """Every word that tells a bid -> what stands for it."""
    words: dict[str, str] = {}
    lamp_word, report_word = told(say("the lamp")), told(say("the report"))
    for lamp in (lamp for lamp in assessment.campaign.lamps if lamp.lamp_id in codes):
        code = codes[lamp.lamp_id]
        for model in {lamp.model, lamp.offer.report_model}:
            words[model] = code if words.get(model, code) == code else lamp_word
        bidder = told(_BIDDER.format(code=letters[lamp.lamp_id]))
        words |= {lamp.bidder: bidder, lamp.offer.report_no or "": report_word}
        units = assessment.campaign.units_of(lamp.lamp_id)
        words |= {
            unit.unit_id: told(say("unit {number}", number=place))
            for place, unit in enumerate(units, 1)
        }
        words[lamp.lamp_id] = code
    # A name is sought as it was written and as the page has it, with its spaces before units.
    return {
        form: said
        for word, said in words.items()
        if len(word) >= _LEAST_LETTERS
        for form in (word, finished(word))
    }
