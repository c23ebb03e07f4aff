"""A campaign in several languages: a tree of pages for each, one set of data for all."""

from __future__ import annotations

import dataclasses
import io
import re
from pathlib import Path
from urllib.parse import urldefrag

import html5lib
import pikepdf
import pytest

from generator import pipeline
from generator.errors import DataProblems
from generator.pipeline import issuing
from generator.sheets import own_words, render_html, themes
from generator.sheets.html_sheet import render_paper

DEMO = Path(__file__).parents[2] / "content" / "harbour-school-relamping"
H = "{http://www.w3.org/1999/xhtml}"
SVG_TITLE = "{http://www.w3.org/2000/svg}title"
TAGS = ("en", "de", "pl")
PAGES = ("index.html", "lamps/one.html", "lamps/two.html")


def _asked(folder: Path, languages: str) -> Path:
    table = folder / "campaign.toml"
    text = table.read_text(encoding="utf-8")
    table.write_text(f"{text}\n[sheet]\nlanguages = {languages}\n", encoding="utf-8")
    return folder


@pytest.fixture(scope="module")
def in_three(tmp_path_factory, write_small_campaign):
    folder = tmp_path_factory.mktemp("spoken")
    campaign = _asked(write_small_campaign(folder / "campaign"), '["en", "de", "pl"]')
    return pipeline.issue(campaign, target=folder / "out", jobs=2).folder


def _tree(path: Path):
    return html5lib.parse(path.read_text(encoding="utf-8"))


def _place(folder: Path, tag: str, page: str) -> Path:
    return folder / ("" if tag == TAGS[0] else tag) / page


@pytest.mark.slow
@pytest.mark.parametrize("page", PAGES)
def test_each_language_has_its_tree_and_a_switch_to_the_others(in_three, page):
    for tag in TAGS:
        place = _place(in_three, tag, page)
        tree = _tree(place)
        assert tree.get("lang") == tag
        switch = next(nav for nav in tree.iter(f"{H}nav") if nav.get("class") == "languages")
        assert [item.get("lang") for item in switch] == list(TAGS)
        assert [item.text for item in switch] == ["English", "Deutsch", "Polski"]
        here = [item for item in switch if item.get("aria-current") == "page"]
        assert [item.get("lang") for item in here] == [tag]
        for item in switch.iter(f"{H}a"):
            target = (place.parent / item.get("href")).resolve()
            assert target == _place(in_three, item.get("lang"), page).resolve()


@pytest.mark.slow
def test_every_link_of_every_tree_leads_to_a_file(in_three):
    pages = sorted(in_three.rglob("*.html"))
    assert len(pages) == len(TAGS) * len(PAGES)
    for path in pages:
        tree = _tree(path)
        for name in ("href", "src"):
            for item in (item for item in tree.iter() if item.get(name)):
                address, anchor = urldefrag(item.get(name))
                target = (path.parent / address).resolve() if address else path
                assert target.is_file(), (path, item.get(name))
                if anchor:
                    assert re.search(rf'id="{re.escape(anchor)}"', target.read_text("utf-8"))


@pytest.mark.slow
def test_texts_and_numbers_follow_the_language_and_data_do_not(in_three):
    english, german, polish = (
        "".join(_tree(_place(in_three, tag, "lamps/one.html")).itertext()) for tag in TAGS
    )
    assert "Luminous efficacy" in english
    assert "Lichtausbeute" in german
    assert "świetlna" in polish
    assert "2.\u00a0März 2026" in german
    assert "2\u00a0marca 2026" in polish
    assert "8.75" in english  # power of the first unit, in units.csv
    assert "8,75" in german
    assert "8.75" not in german
    assert (in_three / "data" / "figures.csv").is_file()
    assert not (in_three / "de" / "data").exists()
    assert "8.75" in (in_three / "data" / "figures.csv").read_text(encoding="utf-8")


@pytest.mark.slow
def test_data_are_the_same_whatever_is_spoken(in_three, tmp_path, write_small_campaign):
    campaign = _asked(write_small_campaign(tmp_path / "campaign"), '["it"]')
    spoken = pipeline.issue(campaign, target=tmp_path / "out", pdf=False).folder
    assert _tree(spoken / "index.html").get("lang") == "it"
    for path in sorted((spoken / "data").rglob("*")):
        if path.is_file():
            same = in_three / path.relative_to(spoken)
            assert path.read_bytes() == same.read_bytes(), path.name


@pytest.mark.slow
def test_documents_declare_their_language_and_keep_to_their_pages(in_three):
    for tag in TAGS:
        for name in ("lamps/one.pdf", "comparison.pdf"):
            content = _place(in_three, tag, name).read_bytes()
            with pikepdf.open(io.BytesIO(content)) as pdf:
                assert str(pdf.Root.Lang) == tag
                assert name != "lamps/one.pdf" or len(pdf.pages) == 2
                assert list(pdf.attachments)


def test_without_languages_the_sheets_speak_that_of_the_campaign(tmp_path, write_small_campaign):
    campaign = write_small_campaign(tmp_path / "campaign")
    table = campaign / "campaign.toml"
    text = table.read_text(encoding="utf-8")
    for own, spoken in (("fr-BE", "fr"), ("nl", "en")):
        table.write_text(
            text.replace("[campaign]\n", f'[campaign]\nlanguage = "{own}"\n'), encoding="utf-8"
        )
        read = pipeline.assess(campaign).campaign
        assert read.settings.languages == (spoken,)
        assert [item.column for item in read.warnings] == ["campaign.language"] * (own == "nl")


def test_a_language_of_the_campaign_without_a_catalogue_is_named(tmp_path, write_small_campaign):
    campaign = write_small_campaign(tmp_path / "campaign")
    table = campaign / "campaign.toml"
    text = table.read_text(encoding="utf-8")
    table.write_text(
        text.replace("[campaign]\n", '[campaign]\nlanguage = "nl"\n'), encoding="utf-8"
    )
    (problem,) = pipeline.check(campaign)
    assert (problem.level, problem.file, problem.row) == ("warning", "campaign.toml", 2)
    assert problem.found == '"nl"'
    assert problem.expected.startswith("one of en, de, fr, es, it, pl, or")
    assert "in English" in problem.message


def test_remarks_may_be_in_a_language_that_the_sheets_do_not_speak(tmp_path, write_small_campaign):
    campaign = _asked(write_small_campaign(tmp_path / "campaign"), '["de"]')
    table = campaign / "campaign.toml"
    text = table.read_text(encoding="utf-8")
    table.write_text(
        text.replace("[campaign]\n", '[campaign]\nlanguage = "nl"\n'), encoding="utf-8"
    )
    assert pipeline.check(campaign) == ()


@pytest.mark.parametrize(
    ("languages", "expected"),
    [
        ('["nl"]', "'en', 'de', 'fr'"),
        ('["de", "de"]', "each language once"),
        ("[]", "one or more of en, de, fr, es, it, pl"),
    ],
)
def test_a_language_without_a_catalogue_is_a_problem(
    tmp_path, write_small_campaign, languages, expected
):
    campaign = _asked(write_small_campaign(tmp_path / "campaign"), languages)
    with pytest.raises(DataProblems) as caught:
        pipeline.assess(campaign)
    problem = caught.value.problems[0]
    assert problem.column.startswith("sheet.languages")
    assert expected in f"{problem.expected} {problem.message}"


@pytest.fixture(scope="module")
def demo_in_two():
    """The demo, whose own words are English, described in German and in English."""
    assessment = pipeline.assess(DEMO)
    settings = assessment.campaign.settings
    sheet = settings.sheet.model_copy(update={"languages": ("de", "en")})
    campaign = dataclasses.replace(
        assessment.campaign, settings=settings.model_copy(update={"sheet": sheet})
    )
    spoken = dataclasses.replace(assessment, campaign=campaign)
    site = issuing._sheets(DEMO, spoken, issuing._products(spoken), with_pdf=True)
    return spoken, {tag: dict(tree.pages()) for tag, tree in site.trees.items()}


def _pages(sheets):
    """The page and the paper of some sheets, in every theme."""
    for theme in themes():
        for place, (name, sheet) in enumerate(sheets.items()):
            if place % 8 == 1 or (theme == "tender" and not name.startswith("lamps/")):
                themed = dataclasses.replace(
                    sheet, frame=dataclasses.replace(sheet.frame, theme=theme)
                )
                yield f"{theme}/{name}", render_html(themed)
                yield f"{theme}/paper/{name}", render_paper(themed)


def _elements(element, language=""):
    """Every element with the language that is in force in it."""
    here = element.get("lang") or language
    yield element, here
    for child in element:
        yield from _elements(child, here)


def _spoken_texts(page):
    """Every text that can have a language, with the one it has."""
    for element, here in _elements(html5lib.parse(page)):
        if element.tag not in (f"{H}script", f"{H}style"):
            yield element, element.text or "", here
        for child in element:
            yield element, child.tail or "", here


def _clause_titles(settings):
    return {clause["title"] for clause in settings.clause}


@pytest.mark.slow
def test_the_campaigns_own_words_have_their_language_on_a_page_of_another(demo_in_two):
    assessment, trees = demo_in_two
    settings = assessment.campaign.settings
    # A single word may be one of the other language too.
    words = {text for text in own_words(settings) if " " in text}
    titles = {settings.campaign.title, *_clause_titles(settings)}
    anything = re.compile("|".join(map(re.escape, sorted(words, key=len, reverse=True))))
    wrong, seen = set(), set()
    for name, page in _pages(trees["de"]):
        for element, text, here in _spoken_texts(page):
            found = anything.findall(text.replace("\u00a0", " "))
            # A title in a drawing or of a page holds no elements: it has one language.
            alone = element.tag not in (SVG_TITLE, f"{H}title") or text.strip() in words
            if found and alone:
                seen |= set(found)
                wrong |= {(name, element.tag, text) for _ in found if here != "en"}
    assert not wrong, "\n".join(map(str, sorted(wrong)))
    assert titles <= seen
    assert {settings.lot[0].title, settings.room[0].title, settings.campaign.client} <= seen


@pytest.mark.slow
def test_nothing_is_marked_on_pages_in_the_campaigns_own_language(demo_in_two):
    _, trees = demo_in_two
    for name, page in _pages(trees["en"]):
        said = [element.get("lang") for element, _ in _elements(html5lib.parse(page))]
        assert [lang for lang in said if lang] == ["en"], name


def test_english_pages_say_what_is_not_english(tmp_path, write_small_campaign):
    campaign = _asked(write_small_campaign(tmp_path / "campaign"), '["en", "de"]')
    table = campaign / "campaign.toml"
    text = table.read_text(encoding="utf-8")
    german = text.replace("Two lamps for a reading room", "Zwei Lampen für einen Lesesaal")
    own = german.replace("[campaign]\n", '[campaign]\nlanguage = "de"\n')
    table.write_text(own, encoding="utf-8")
    issued = pipeline.issue(campaign, target=tmp_path / "out", pdf=False).folder
    for tag, marked in (("en", True), ("de", False)):
        page = issued / ("" if tag == "en" else tag) / "index.html"
        heading = next(_tree(page).iter(f"{H}h1"))
        assert heading.text == "Zwei Lampen für einen Lesesaal"
        assert heading.get("lang") == ("de" if marked else None)
        entries = [
            entry.get("lang")
            for listed in _tree(page).iter(f"{H}ul")
            if listed.get("class") == "sources"
            for entry in listed
        ]
        assert entries[:1] == [None if tag == "en" else "en"]
