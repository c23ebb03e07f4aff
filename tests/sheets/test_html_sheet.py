"""The pages, by their structure."""

import dataclasses
import itertools
import re

import html5lib
import pytest
from jinja2.sandbox import SecurityError

from generator.records.settings import SheetTable
from generator.sheets import (
    PagePlace,
    describe_comparison,
    describe_lamp,
    render_html,
    site_assets,
    theme_overrides,
)
from generator.sheets.description import Pair
from generator.sheets.html_sheet import render_paper
from generator.sheets.themes import palette, paper_style, templates_folder, themes

H = "{http://www.w3.org/1999/xhtml}"
S = "{http://www.w3.org/2000/svg}"


@pytest.fixture(scope="module")
def invented_pages(invented_assessment, invented_context):
    pages = {
        lamp.lamp_id: render_html(
            describe_lamp(invented_assessment, lamp.lamp_id, invented_context),
            PagePlace("../"),
        )
        for lamp in invented_assessment.campaign.lamps
    }
    comparison = describe_comparison(invented_assessment, invented_context)
    return pages | {"index": render_html(comparison)}


def _in_theme(assessment, theme):
    settings = assessment.campaign.settings
    dressed = settings.model_copy(update={"sheet": SheetTable(theme=theme)})
    return dataclasses.replace(
        assessment, campaign=dataclasses.replace(assessment.campaign, settings=dressed)
    )


@pytest.fixture(scope="module")
def dressed_pages(invented_assessment, invented_context):
    """The first lamp in every theme."""
    return {
        theme: render_html(
            describe_lamp(_in_theme(invented_assessment, theme), "L-01", invented_context),
            PagePlace("../"),
        )
        for theme in themes()
    }


@pytest.fixture(params=["L-01", "L-02", "L-03", "laboratory", "stewardship", "index"])
def page(request, invented_pages, dressed_pages):
    return (invented_pages | dressed_pages)[request.param]


@pytest.fixture
def tree(page):
    return html5lib.HTMLParser(strict=True).parse(page)


def test_nothing_is_fetched_from_outside(page, tree):
    for element in tree.iter():
        assert element.tag not in {f"{H}{name}" for name in ("img", "iframe", "object")}
        assert "style" not in element.attrib
        assert not [name for name in element.attrib if name.startswith("on")]
    for script in tree.iter(f"{H}script"):
        # Scripts of the comparison lie beside it; data in the page are no script.
        own = script.attrib.get("src", "").startswith("assets/")
        assert own or script.attrib.get("type") == "application/json"
    sheets = [link.attrib["href"] for link in tree.iter(f"{H}link")]
    assert sheets in (["../assets/sheet.css"], ["assets/sheet.css"])
    assert "Content-Security-Policy" in page
    assert "default-src 'none'" in page


def test_style_sheet_fetches_only_the_bundled_faces():
    assets = site_assets("tender")
    found = re.findall(r"url\(\"?([^\")]*)", assets["sheet.css"].decode())
    assert found
    assert set(found) <= set(assets)
    assert b"@import" not in assets["sheet.css"]


def test_language_title_landmarks_and_one_first_heading(tree):
    assert tree.attrib["lang"] == "en"
    assert tree.find(f".//{H}title").text
    for name in ("main", "nav", "header", "footer"):
        assert len(list(tree.iter(f"{H}{name}"))) == 1
    assert len(list(tree.iter(f"{H}h1"))) == 1
    skip = next(tree.iter(f"{H}a"))
    assert skip.attrib["href"] == f"#{tree.find(f'.//{H}main').attrib['id']}"


def test_no_heading_level_is_skipped(tree):
    levels = [int(e.tag[-1]) for e in tree.iter() if re.fullmatch(rf"{re.escape(H)}h[1-6]", e.tag)]
    assert all(after - before <= 1 for before, after in itertools.pairwise(levels))


def test_ids_are_unique_and_links_inside_the_page_resolve(tree):
    ids = [element.attrib["id"] for element in tree.iter() if "id" in element.attrib]
    assert len(ids) == len(set(ids))
    targets = [a.attrib.get("href", "") for a in tree.iter(f"{H}a")]
    assert all(target[1:] in ids for target in targets if target.startswith("#"))


def test_every_drawing_has_a_title_first(tree):
    for svg in tree.iter(f"{S}svg"):
        assert svg[0].tag == f"{S}title"
        assert svg[0].text.strip()


def test_tables_have_captions_and_scopes_and_equal_rows(tree):
    tables = list(tree.iter(f"{H}table"))
    assert tables
    for table in tables:
        if any(parent.attrib.get("class") == "notes" for parent in _parents(tree, table)):
            continue
        assert table.find(f"{H}caption").text.strip()
        assert all("scope" in cell.attrib for cell in table.iter(f"{H}th"))
        assert len({len(list(row)) for row in table.iter(f"{H}tr")}) == 1


def _parents(tree, wanted):
    above = {child: parent for parent in tree.iter() for child in parent}
    while wanted in above:
        wanted = above[wanted]
        yield wanted


def test_text_of_the_campaign_is_escaped(invented_pages):
    assert "Plain 中 lamp &lt;b&gt;&amp;" in invented_pages["L-03"]
    assert "<script" not in invented_pages["L-01"]
    assert "onerror=alert(1)&gt;" in invented_pages["L-01"]


def test_pages_link_to_one_another(invented_pages):
    assert 'href="lamps/L-01.html"' in invented_pages["index"]
    assert 'href="lamps/L-01.pdf"' in invented_pages["index"]
    assert 'href="../index.html"' in invented_pages["L-01"]
    assert 'href="L-01.pdf"' in invented_pages["L-01"]


def test_templates_do_no_arithmetic():
    calculation = re.compile(
        r"(?<![\w\"'-])[-+*/%]{1,2}\s*\d|\d\s*[-+*/%]|\|\s*(round|abs|sum|int|float)"
    )
    for path in sorted(templates_folder().rglob("*.j2")):
        for code in re.findall(r"\{[{%](.*?)[%}]\}", path.read_text(encoding="utf-8"), re.DOTALL):
            bare = re.sub(r"\"[^\"]*\"|'[^']*'", "", code.strip("-"))
            assert not calculation.search(bare), (path.name, code)


def test_three_themes_put_first_what_their_reader_asks_first(dressed_pages):
    assert set(dressed_pages) == {"laboratory", "stewardship", "tender"}
    order = {
        theme: re.findall(r'<h2 id="([a-z-]+)"', page) for theme, page in dressed_pages.items()
    }
    assert order["tender"][:2] == ["verdicts", "findings"]
    assert order["laboratory"][:5] == [
        "identification",
        "results",
        "conditions",
        "uncertainty",
        "verdicts",
    ]
    assert order["stewardship"][:3] == ["use", "short", "shortfalls"]
    assert "Name and function" in dressed_pages["laboratory"]
    assert "falls short" in dressed_pages["stewardship"]


def test_class_arrow_is_shown_where_the_act_allows_it(dressed_pages):
    # Regulation (EU) 2019/2015, Annex VII: technical promotional material; no test report.
    shown = {theme: "class-arrow" in page for theme, page in dressed_pages.items()}
    assert shown == {"laboratory": False, "stewardship": True, "tender": True}
    assert all("F declared" in page for page in dressed_pages.values())


def test_the_way_to_a_verdict_is_folded_behind_its_clause(dressed_pages):
    page = dressed_pages["tender"]
    assert "how it came about" in page
    assert "<li>Determined value 82.41 (computed, mean of 3 units, U = 1.5).</li>" in page


def test_a_campaign_changes_a_colour_and_a_template_without_copying_the_rest(
    invented_assessment, invented_context, tmp_path
):
    own = tmp_path / "templates" / "tender"
    own.mkdir(parents=True)
    (own / "tokens.css").write_text(":root { --accent: #123456; }", encoding="utf-8")
    (own / "lamp.html.j2").write_text(
        '{% extends "theme/lamp.html.j2" %}{% block sections %}<p>Our own word.</p>'
        "{{ super() }}{% endblock %}",
        encoding="utf-8",
    )
    assert theme_overrides(tmp_path, "laboratory") is None
    folder = theme_overrides(tmp_path, "tender")
    context = dataclasses.replace(invented_context, overrides=folder)
    page = render_html(describe_lamp(invented_assessment, "L-01", context))
    assert "<p>Our own word.</p>" in page
    assert 'id="verdicts"' in page
    assert 'fill="#123456"' in page
    style = site_assets("tender", folder)["sheet.css"].decode()
    assert style.rindex("--accent: #123456") > style.rindex("--accent: #c3a9ec")
    paper = paper_style("tender", folder)
    assert "#123456" in paper
    assert "var(" not in paper
    changed = {
        name for name, hue in palette("tender", folder).items() if hue != palette("tender")[name]
    }
    assert changed == {"accent"}


def test_a_template_of_a_campaign_runs_in_the_sandbox(
    invented_assessment, invented_context, tmp_path
):
    (tmp_path / "lamp.html.j2").write_text("{{ ''.__class__.__mro__ }}", encoding="utf-8")
    context = dataclasses.replace(invented_context, overrides=tmp_path)
    sheet = describe_lamp(invented_assessment, "L-01", context)
    with pytest.raises(SecurityError):
        render_html(sheet)


def test_every_theme_has_the_roles_that_drawings_use():
    roles = set(palette("tender"))
    assert all(set(palette(theme)) == roles for theme in themes())


@pytest.mark.parametrize("theme", ["laboratory", "stewardship", "tender"])
@pytest.mark.parametrize("mode", [0, 1])
def test_contrast_of_text_is_enough(theme, mode):
    # WCAG 2.2, 1.4.3: 4.5 to 1; relative luminance as defined there.
    css = (templates_folder() / theme / "tokens.css").read_text(encoding="utf-8")
    tokens = dict(re.findall(r"--([a-z-]+): (#[0-9a-f]{6})", css.split(":root")[mode + 1]))
    for role in ("ink", "quiet", "accent", "good", "bad", "open"):
        assert _contrast(tokens[role], tokens["paper"]) >= 4.5, role


def _luminance(colour):
    parts = [int(colour[at : at + 2], 16) / 255 for at in (1, 3, 5)]
    red, green, blue = (p / 12.92 if p <= 0.04045 else ((p + 0.055) / 1.055) ** 2.4 for p in parts)
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue


def _contrast(one, other):
    light, dark = sorted((_luminance(one), _luminance(other)), reverse=True)
    return (light + 0.05) / (dark + 0.05)


def test_a_figure_holds_its_caption_first_and_then_the_drawing_alone(tree):
    for figure in tree.iter(f"{H}figure"):
        kinds = [child.tag.rpartition("}")[2] for child in figure]
        assert kinds[0] == "figcaption"
        assert set(kinds[1:]) <= {"svg", "div"}


def test_regions_are_told_apart(tree):
    labels = [part.get("aria-label") for part in tree.iter() if part.get("role") == "region"]
    assert len(set(labels)) == len(labels)


def test_an_act_without_a_clause_that_applies_has_no_table(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    first, *others = sheet.verdicts
    outside = dataclasses.replace(first, clauses=())
    bare = dataclasses.replace(sheet, verdicts=(outside, *others))
    for text in (render_html(bare), render_paper(bare)):
        assert text.count('<table class="verdicts">') == len(others)
        assert "<tbody>\n</tbody>" not in text
        assert f'<p class="outside act">{first.heading}</p>' in text
        assert text.count("Not applicable: ") == 1


def test_a_reason_of_two_sentences_stands_in_no_brackets(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    first, *others = sheet.verdicts
    reasons = (
        Pair("Displacement factor", "the act sets no limit here. No limit up to 5 W"),
        Pair("Excitation purity", ""),
    )
    told = dataclasses.replace(first, not_applicable=reasons)
    told_sheet = dataclasses.replace(sheet, verdicts=(told, *others))
    for page in (render_html(told_sheet), render_paper(told_sheet)):
        assert (
            "Not applicable: The act sets no limit here. No limit up to 5 W\u00a0– Displacement "
            "factor. Excitation purity.</p>"
        ) in re.sub("</?strong>", "", page)
