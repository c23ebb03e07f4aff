"""A campaign in several languages: a tree of pages for each, one set of data for all."""

from __future__ import annotations

import io
import re
from pathlib import Path
from urllib.parse import urldefrag

import html5lib
import pikepdf
import pytest

from generator import pipeline
from generator.errors import DataProblems

H = "{http://www.w3.org/1999/xhtml}"
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
        assert pipeline.assess(campaign).campaign.settings.languages == (spoken,)


@pytest.mark.parametrize(
    ("languages", "expected"),
    [('["nl"]', "'en', 'de', 'fr'"), ('["de", "de"]', "each language once")],
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
