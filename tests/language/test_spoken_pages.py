"""Every page of the demo, said by one who turns each letter of a message into another script.

What is still in Latin letters afterwards is text that no catalogue can reach. Only data may be:
names, ids, symbols, titles of documents, the campaign's own words.
"""

from __future__ import annotations

import dataclasses
import io
import re
from collections.abc import Iterator
from html.parser import HTMLParser
from pathlib import Path

import pikepdf
import pytest

from generator.datasets import method, sources
from generator.language import speaking
from generator.language.speaking import LANGUAGES
from generator.metrics import curves_of
from generator.pipeline import assess, issuing
from generator.quantities import QUANTITIES
from generator.records.comparison import SheetContext
from generator.sheets import describe_lamp, number_format, render_html, render_pdf, themes
from generator.sheets.html_sheet import render_paper

DEMO = Path(__file__).parents[2] / "content" / "harbour-school-relamping"
SPOKEN_ATTRIBUTES = frozenset({"aria-label", "title", "alt", "placeholder"})
PLACES = re.compile(r"(\{[^}]*\})")
WORDS = re.compile(r"[A-Za-z]{3,}")
LEAST_LAMPS = 3
FULLEST = ("veldrune-a60-940", "veldrune-gu10-930")

KNOWN = {
    # Units, symbols and their indices.
    *("rad", "kWh", "min", "start", "peak", "end", "fem", "use"),
    # Formats, file names, and the program's own name.
    *("PDF", "CSV", "lampassay"),
    # Kinds of light source that Regulation (EU) 2019/2015, Annex V prescribes as they stand.
    *("DLS", "NDLS", "MLS", "NMLS"),
}
DATA_SHAPES = (
    re.compile(
        r"(?:finding|evidence|lot|offer|abnormally|mandatory)-[a-z-]+|use\.\w+"
    ),  # checks, keys
    re.compile(r"(?:intensity|spectra|light|mains)/\S*(?: \.csv\S*)?"),  # files of the campaign
    re.compile(r"(?<=\u0436 )(?:lamps|tubes|spots)\b"),  # lots, after the word for lot
    re.compile(r"[\w &]+, [\w ]+\u2026"),  # a name cut short in a drawing
    re.compile(r"[\w.-]*(?:_|\d)[\w.-]*"),  # ids
    PLACES,  # filled by the scripts
)


class Stranger:
    """Says every word in letters that no English word has, and numbers with a comma."""

    def pattern(self, message):
        several = message.plural and message.counted != 1
        english = message.plural if several else message.singular
        return "".join(
            part if place else re.sub("[A-Za-z]", "\u0436", part)
            for place, part in _by_places(english)
        )

    def number(self, text):
        return text.replace(".", ",")

    def day(self, day):
        return day.isoformat()


def _by_places(pattern):
    for at, part in enumerate(PLACES.split(pattern)):
        yield bool(at % 2), part


class SpokenText(HTMLParser):
    """Gathers what is read or read out: text, and attributes made for reading."""

    def __init__(self):
        super().__init__()
        self.texts = []
        self._silent = 0

    def handle_starttag(self, tag, attrs):
        self._silent += tag in ("script", "style")
        named = dict(attrs)
        self.texts += [named[name] or "" for name in SPOKEN_ATTRIBUTES & named.keys()]
        if named.get("name") == "description":
            self.texts.append(named["content"] or "")

    def handle_endtag(self, tag):
        self._silent -= tag in ("script", "style")

    def handle_data(self, data):
        if not self._silent:
            self.texts.append(data)


@pytest.fixture(scope="module")
def quiet_demo():
    """The demo, assessed, without its remarks: free text is the campaign's own."""
    assessment = assess(DEMO)
    return dataclasses.replace(
        assessment, campaign=dataclasses.replace(assessment.campaign, notes={})
    )


def _in_theme(assessment, theme):
    settings = assessment.campaign.settings
    sheet = settings.sheet.model_copy(update={"theme": theme, "languages": ("de",)})
    campaign = dataclasses.replace(
        assessment.campaign, settings=settings.model_copy(update={"sheet": sheet})
    )
    return dataclasses.replace(assessment, campaign=campaign)


def _data(campaign) -> re.Pattern[str]:
    """Matches what the campaign and the sources give in words of their own."""
    named = {text for lamp in campaign.lamps for text in _texts(dataclasses.asdict(lamp))}
    named |= set(_texts(campaign.settings.model_dump()))
    named |= {unit.unit_id for unit in campaign.units}
    for source in sources().values():
        named |= {source.title, source.edition, source.publisher, source.date}
    named |= {entry.symbol for entry in QUANTITIES.values()}
    # A single small word may be a word of a message too; as data alone it is not let pass.
    plain = (text.replace("\u00a0", " ") for text in named)
    kept = [text for text in plain if WORDS.search(text) and not re.fullmatch("[a-z]+", text)]
    longest_first = sorted(kept, key=len, reverse=True)
    return re.compile(rf"(?<!\w)(?:{'|'.join(map(re.escape, longest_first))})(?!\w)")


def _texts(value) -> Iterator[str]:
    if isinstance(value, str):
        yield "".join(value)
    elif isinstance(value, dict):
        for key, part in value.items():
            yield from (key, *_texts(part))
    elif isinstance(value, list | tuple):
        for part in value:
            yield from _texts(part)


def _left(page, data):
    spoken = SpokenText()
    spoken.feed(page)
    for text in spoken.texts:
        rest = data.sub(" ", text.replace("\u00a0", " "))
        for pattern in DATA_SHAPES:
            rest = pattern.sub(" ", rest)
        if set(WORDS.findall(rest)) - KNOWN:
            yield text.strip()


@pytest.mark.slow
def test_nothing_on_any_page_is_out_of_reach_of_a_translation(quiet_demo, monkeypatch):
    monkeypatch.setattr(speaking, "_speaker", lambda _: Stranger())
    monkeypatch.setattr(number_format, "date_in_words", lambda day: day.isoformat())
    data = _data(quiet_demo.campaign)
    left = set()
    for theme in themes():
        assessment = _in_theme(quiet_demo, theme)
        site = issuing._sheets(DEMO, assessment, issuing._products(assessment), with_pdf=True)
        assert site.languages == ("de",)
        for place, (name, sheet) in enumerate(site.trees["de"].pages()):
            if theme == "tender" or place % LEAST_LAMPS == 0:
                for page in (render_html(sheet), render_paper(sheet)):
                    left |= {(theme, name, text) for text in _left(page, data)}
    assert not left, "\n".join(map(str, sorted(left)))


@pytest.mark.slow
def test_the_fullest_lamps_fit_on_their_pages_in_every_language(quiet_demo):
    """Two pages in the tender theme, four in the others; what does not fit is refused."""
    for theme in themes():
        assessment = _in_theme(quiet_demo, theme)
        known = {
            item.method: found for item in assessment.figures if (found := method(item.method))
        }
        curves = curves_of(assessment.campaign, assessment.figures)
        context = SheetContext(sources(), curves, methods=known)
        names = FULLEST if theme == "tender" else FULLEST[:1]
        for tag in LANGUAGES:
            with speaking.speaking(tag):
                sheets = [describe_lamp(assessment, name, context) for name in names]
            for sheet in sheets:
                with pikepdf.open(io.BytesIO(render_pdf(sheet))) as pdf:
                    assert len(pdf.pages) == (2 if theme == "tender" else 4), (theme, tag)
                    assert str(pdf.Root.Lang) == tag
