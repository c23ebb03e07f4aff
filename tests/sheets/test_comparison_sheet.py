"""The description of the comparison: columns, cells, drawings, and the data of its scripts."""

from __future__ import annotations

import json
import re
from dataclasses import replace
from decimal import Decimal
from xml.etree import ElementTree

import html5lib
import pytest

from generator.records.figure import FigureSet
from generator.records.finding import Severity
from generator.records.lamp import Offer
from generator.records.risk import CampaignRisk
from generator.records.tender import Tender
from generator.sheets import describe_comparison, render_html, site_assets
from generator.sheets.comparison_data import limit_lines, page_json
from generator.sheets.comparison_ruler import draw_cell_ruler
from generator.sheets.comparison_scatter import ScatterAxis, ScatterPoint, draw_scatter
from generator.sheets.comparison_spectra import SPECTRUM_LINES
from generator.sheets.drawings.margin_ruler import Distance
from generator.sheets.html_sheet import render_paper
from generator.sheets.themes import palette, templates_folder

H = "{http://www.w3.org/1999/xhtml}"


@pytest.fixture(scope="module")
def invented_comparison(invented_assessment, invented_context):
    return describe_comparison(invented_assessment, invented_context)


def cell(sheet, lamp_id, key):
    row = next(row for row in sheet.rows if row.lamp_id == lamp_id)
    return row.cells[[column.key for column in sheet.columns].index(key)]


def test_cells_tell_number_uncertainty_grade_and_ruler(invented_comparison):
    shown = cell(invented_comparison, "L-01", "ra")
    assert (shown.number, shown.uncertainty, shown.grade) == ("82.4", "±\u00a01.5", "computed")
    assert "pass: Colour rendering, ≥\u00a080, margin +2" in shown.ruler
    assert cell(invented_comparison, "L-03", "cct_k").grade == "declared"


def test_what_is_missing_says_so_once(invented_comparison):
    absent = cell(invented_comparison, "L-03", "power_w")
    assert (absent.number, absent.reason, absent.missing) == ("not measured", "", True)
    unread = cell(invented_comparison, "L-03", "ra")
    assert unread.reason == "the declared value could not be read"


def test_price_stands_with_its_currency_once_where_it_is_one(
    invented_assessment, invented_context, invented_comparison
):
    assert cell(invented_comparison, "L-01", "unit_price").number == "3.90"
    assert cell(invented_comparison, "L-02", "unit_price").missing
    assert invented_comparison.columns[0].unit == "EUR"
    campaign = invented_assessment.campaign
    first, second, third = campaign.lamps
    second = replace(second, offer=Offer(Decimal("11.50"), "PLN"))
    mixed = replace(invented_assessment, campaign=replace(campaign, lamps=(first, second, third)))
    sheet = describe_comparison(mixed, invented_context)
    assert sheet.columns[0].unit == ""
    assert cell(sheet, "L-02", "unit_price").number == "11.50\u00a0PLN"


def test_open_questions_are_a_column_where_there_are_any(invented_assessment, invented_context):
    keys = [
        column.key for column in describe_comparison(invented_assessment, invented_context).columns
    ]
    assert "questions" not in keys
    matrix = invented_context.matrix
    asked = replace(matrix, rows=(replace(matrix.rows[0], questions=2), *matrix.rows[1:]))
    sheet = describe_comparison(invented_assessment, replace(invented_context, matrix=asked))
    assert [cell(sheet, row.lamp_id, "questions").number for row in sheet.rows] == ["2", "0", "0"]


def test_data_of_the_scripts_are_the_figures(invented_assessment, invented_comparison):
    data = json.loads(invented_comparison.data)
    keys = [column["key"] for column in data["columns"]]
    first = data["lamps"][0]
    assert first["cells"][keys.index("ra")] == [82.41, 1.5, 1]
    assert first["cells"][keys.index("unit_price")] == [3.9, None, 2]
    assert data["lamps"][2]["cells"][keys.index("ra")] is None
    assert data["columns"][keys.index("ra")]["limits"] == [[80.0, "≥"]]
    counts = first["counts"]
    assert sum(counts.values()) == len(invented_assessment.verdicts_of("L-01"))
    assert max(data["spectra"]["permille"]["L-01"]) == pytest.approx(1000, abs=5)
    assert "L-03" not in data["spectra"]["permille"]


def test_data_cannot_end_their_element():
    text = page_json({"model": "</script><!--<b>&"})
    assert not set("<>&") & set(text)
    assert json.loads(text) == {"model": "</script><!--<b>&"}


def test_limits_are_drawn_only_where_lamps_share_them(invented_context):
    matrix = invented_context.matrix
    place = matrix.quantities.index("ra")
    cells = [row.cells[place] for row in matrix.rows]
    assert limit_lines(cells) == ((80.0, "≥"),)
    own = [
        replace(cells[0], verdict=replace(cells[0].verdict, limit=Decimal(limit)))
        for limit in (70, 75, 80, 85)
    ]
    assert limit_lines(own) == ()


def test_spectra_are_laid_over_one_another_white_by_white(invented_comparison):
    # Both invented lamps with a spectrum have about 2700 K; the band of the emitter is at 452 nm.
    (drawing,) = invented_comparison.spectra
    assert drawing.heading == "Spectra, about 2700\u00a0K"
    assert "Strongest blue at 450\u00a0nm" in drawing.caption
    tree = ElementTree.fromstring(drawing.svg)  # noqa: S314 - our own drawing
    assert len(tree.findall(".//{http://www.w3.org/2000/svg}path[@fill='none']")) == 2
    assert drawing.table.headings[0] == "wavelength, nm"


def test_lines_of_spectra_are_told_apart_without_colour():
    dashes = [dash for _, dash in SPECTRUM_LINES]
    assert len(set(dashes)) == len(dashes)
    script = (templates_folder() / "base" / "scripts" / "comparison-plots.js").read_text("utf-8")
    assert f"const LINES = {json.dumps([list(line) for line in SPECTRUM_LINES])};" in script


def test_without_spectra_the_page_says_so(invented_assessment, invented_context):
    sheet = describe_comparison(invented_assessment, replace(invented_context, curves={}))
    (drawing,) = sheet.spectra
    assert not drawing.svg
    assert drawing.caption == "Not drawn: the campaign has no spectrum."
    assert drawing.caption in render_html(sheet)


def test_scatter_needs_two_lamps_with_two_figures(invented_assessment, invented_context):
    # One price alone: colour temperature takes its place.
    sheet = describe_comparison(invented_assessment, invented_context)
    assert sheet.scatter.table.headings == (
        "Lamp",
        "colour temperature, K",
        "luminous efficacy, lm/W",
        "Verdict",
    )
    assert len(sheet.scatter.table.rows) == 2
    empty = describe_comparison(
        replace(invented_assessment, figures=FigureSet([])),
        replace(
            invented_context,
            matrix=replace(
                invented_context.matrix,
                rows=tuple(
                    replace(row, cells=tuple(replace(item, figure=None) for item in row.cells))
                    for row in invented_context.matrix.rows
                ),
            ),
        ),
    )
    assert not empty.scatter.svg
    assert empty.scatter.caption.startswith("Not drawn")
    assert "Not drawn" in render_html(empty)


def test_scatter_keeps_every_bar_and_near_limit_inside():
    points = [
        ScatterPoint("a", 1, 90, "1", "90", "fail", 0.0, 5.0),
        ScatterPoint("b", 2, 110, "2", "110", "pass", 0.5, 0.0),
    ]
    axis = ScatterAxis("efficacy, lm/W", ((120.0, "≥"), (900.0, "≥")))
    svg = draw_scatter(points, ScatterAxis("price"), axis, "t", palette("tender"))
    tree = ElementTree.fromstring(svg)  # noqa: S314 - our own drawing
    lines = tree.findall(".//{http://www.w3.org/2000/svg}line")
    for line in lines:
        assert all(0 <= float(line.attrib[name]) <= 640 for name in ("x1", "x2"))
        assert all(0 <= float(line.attrib[name]) <= 360 for name in ("y1", "y2"))
    words = [text.text for text in tree.iter("{http://www.w3.org/2000/svg}text")]
    assert "≥ 120" in words
    assert "≥ 900" not in words


@pytest.mark.parametrize(("margin", "parts"), [(0.1, "z"), (-0.1, "z"), (7.0, "L"), (-0.9, "L")])
def test_cell_ruler_has_a_tick_or_an_arrow_head(margin, parts):
    svg = draw_cell_ruler(Distance(margin, 0.02), "good", "t", palette("tender"))
    tick = html5lib.parseFragment(svg).findall(".//{http://www.w3.org/2000/svg}path")[-1]
    assert ("L" in tick.attrib["d"]) == (parts == "L")


def test_page_runs_only_its_own_scripts(invented_comparison):
    page = render_html(invented_comparison)
    tree = html5lib.parse(page)
    scripts = list(tree.iter(f"{H}script"))
    sources = [script.attrib["src"] for script in scripts if "src" in script.attrib]
    assets = {f"assets/{name}" for name in site_assets("tender")}
    assert sources
    assert set(sources) <= assets
    (data,) = [script for script in scripts if "src" not in script.attrib]
    assert data.attrib["type"] == "application/json"
    policy = next(
        meta.attrib["content"]
        for meta in tree.iter(f"{H}meta")
        if meta.attrib.get("http-equiv") == "Content-Security-Policy"
    )
    assert "script-src 'self';" in policy
    assert "unsafe" not in policy


def test_scripts_write_no_markup_and_evaluate_nothing():
    for name, content in site_assets("tender").items():
        if name.endswith(".js"):
            text = content.decode()
            for word in (
                "innerHTML",
                "outerHTML",
                "insertAdjacentHTML",
                "eval(",
                "Function(",
                ".write(",
            ):
                assert word not in text, (name, word)


def test_every_word_of_the_controls_is_there_and_used(invented_comparison):
    scripts = [
        text.decode() for name, text in site_assets("tender").items() if name.endswith(".js")
    ]
    pages = [path.read_text(encoding="utf-8") for path in templates_folder().rglob("*.j2")]
    used = set(re.findall(r"\bwords\.(\w+)", "\n".join([*scripts, *pages])))
    assert used == set(invented_comparison.words)


def test_limits_in_a_cell_have_the_digits_of_the_sheet(invented_assessment, invented_context):
    matrix = invented_context.matrix
    at = matrix.quantities.index("ra")
    first = matrix.rows[0]
    long = replace(first.cells[at].verdict, limit=Decimal("79.9742342798202"))
    cells = (*first.cells[:at], replace(first.cells[at], verdict=long), *first.cells[at + 1 :])
    rows = (replace(first, cells=cells), *matrix.rows[1:])
    context = replace(invented_context, matrix=replace(matrix, rows=rows))
    ruler = cell(describe_comparison(invented_assessment, context), "L-01", "ra").ruler
    assert "pass: Colour rendering, ≥\u00a079.97, margin +2.4" in ruler


def test_questions_and_risks_stand_on_the_page_and_on_paper(invented_assessment, invented_context):
    remark = replace(invented_assessment.findings[0], severity=Severity.REMARK, title="Just so")
    assessment = replace(
        invented_assessment,
        findings=(*invented_assessment.findings, remark),
        risks=(RISK, replace(RISK, clause="b", consumers_risk=None, reason="too few lamps")),
    )
    sheet = describe_comparison(assessment, invented_context)
    (asked,) = sheet.questions
    assert (asked.lamp_id, asked.model) == ("L-01", "Harbour 806")
    assert asked.findings == ("Declared SVM better than that of every unit (contradiction)",)
    page, paper = render_html(sheet), render_paper(sheet)
    assert 'href="lamps/L-01.html#findings"' in page
    for text in (page, paper):
        assert asked.findings[0] in text
        assert "Just so" not in text
        assert ">1.8\u00a0%</td>" in text
        assert "No risk can be given of Lumen maintenance (EU 2019/2020): too few lamps." in text


def test_without_questions_and_risks_nothing_is_said_of_them(invented_assessment, invented_context):
    plain = replace(invented_assessment, findings=())
    sheet = describe_comparison(plain, invented_context)
    page = render_html(sheet)
    assert (sheet.questions, sheet.risks) == ((), None)
    assert not re.search('id="(?:questions|risks)"', page)


def test_a_tender_is_linked_to_its_report(invented_assessment, invented_context):
    link = '<a href="tender/report.html">Tender report</a>'
    tender = replace(invented_assessment, tender=Tender(lots=()))
    pages = [
        render_html(describe_comparison(item, invented_context))
        for item in (invented_assessment, tender)
    ]
    assert [link in page for page in pages] == [False, True]


RISK = CampaignRisk(
    clause="a",
    title="Lumen maintenance",
    regime="EU 2019/2020",
    unit="",
    lamps_count=10,
    mean_margin=Decimal("0.005"),
    margin_spread=Decimal("0.022"),
    standard_uncertainty=Decimal("0.0026"),
    rule="simple acceptance",
    consumers_risk=Decimal("0.0177"),
    producers_risk=Decimal("0.0183"),
)
