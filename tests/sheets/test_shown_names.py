"""Under code names nothing that a sheet shows tells who the bidder is."""

from __future__ import annotations

import json
import re
from dataclasses import replace
from decimal import Decimal

import html5lib
import pytest

from generator.language import say
from generator.records.finding import Finding, Severity
from generator.records.lamp import Offer
from generator.records.product_field import ProductField
from generator.records.report_settings import ReportTable
from generator.records.tender import Tender
from generator.sheets import PagePlace, describe_comparison, describe_lamp, render_html
from generator.sheets.html_sheet import render_paper
from generator.sheets.shown_names import ShownNames
from generator.sheets.themes import themes

CODES = {
    "L-01": "Bidder B, lamp 1",
    "L-02": "Bidder A, lamp 1",
    "L-03": "Bidder C, lamp 1",
}


@pytest.fixture(scope="module")
def coded(invented_assessment, invented_context):
    """The invented campaign with names that can be told apart, as a tender under code names."""
    campaign = invented_assessment.campaign
    first, second, third = campaign.lamps
    offer = Offer(Decimal("3.90"), "EUR", 400, "TR-117", report_model="Harbour 806")
    lamps = (
        replace(first, bidder="Quarrow", offer=offer),
        replace(second, bidder="Bidder Two", model="Globe of 9 W"),
        third,
    )
    finding = Finding(
        "L-01",
        "L-01-1",
        "svm",
        Severity.DOUBT,
        "Odd SVM of Quarrow",
        "lamp L-01: unit L-01-1 against Harbour 806; the report is TR-117 of Quarrow.",
        Decimal(1),
        "",
        "Quarrow knows.",
        ("svm",),
        "common practice, no source",
    )
    matrix = invented_context.matrix
    rows = (replace(matrix.rows[0], questions=1), *matrix.rows[1:])
    products = {
        "L-01": (
            ProductField("L-01", "supplier's name", "Quarrow"),
            ProductField("L-01", "model identifier", "Harbour 806"),
        )
    }
    context = replace(invented_context, matrix=replace(matrix, rows=rows), products=products)
    report = ReportTable(item_description="Harbour 806 of Quarrow", sampling="by Quarrow")
    settings = campaign.settings.model_copy(update={"report": report})
    tender = Tender(
        lots=(),
        shown_as=CODES,
        codes={"L-01": "B", "L-02": "A", "L-03": "C"},
        under_codes=True,
    )
    assessment = replace(
        invented_assessment,
        campaign=replace(campaign, lamps=lamps, settings=settings),
        findings=(finding,),
        tender=tender,
    )
    return assessment, context


def shown(page):
    """Everything of a page that a reader is told: text, title, and the words of attributes."""
    tree = html5lib.parse(page, namespaceHTMLElements=False)
    parts = []
    for element in tree.iter():
        if isinstance(element.tag, str) and element.tag != "script":
            parts += [
                element.text or "",
                *(element.get(name, "") for name in ("aria-label", "alt")),
            ]
            parts += [element.get("content", "")] if element.tag == "meta" else []
        parts.append(element.tail or "")
    return "\n".join(parts)


def told(text):
    names = ("Quarrow", "Harbour 806", "TR-117", "Globe of 9 W", "Bidder Two")
    ids = r"(?<![\w-])L-0[123](?:-\d)?(?![\w-])"
    plain = text.replace("\u00a0", " ")
    return [name for name in names if name in plain] + re.findall(ids, text)


@pytest.mark.parametrize("theme", themes())
@pytest.mark.parametrize("lamp_id", ["L-01", "L-02", "L-03"])
def test_lamp_sheet_tells_nobody(coded, theme, lamp_id):
    assessment, context = coded
    sheet = describe_lamp(assessment, lamp_id, context)
    sheet = replace(sheet, frame=replace(sheet.frame, theme=theme))
    for page in (render_html(sheet, PagePlace("../")), render_paper(sheet)):
        assert told(shown(page)) == []
        code = assessment.shown_bidders[lamp_id]
        assert f"<title>{code} – spec sheet</title>" in page
        assert f"<h1>{code}</h1>" in page


def test_comparison_tells_nobody(coded):
    assessment, context = coded
    sheet = describe_comparison(assessment, context)
    page, paper = render_html(sheet), render_paper(sheet)
    assert told(shown(page)) == []
    assert told(shown(paper)) == []
    assert sheet.bidders == ("Bidder B", "Bidder A", "Bidder C")
    assert [row.model for row in sheet.rows] == list(assessment.shown_bidders.values())
    lamps = json.loads(sheet.data)["lamps"]
    assert [(lamp["model"], lamp["bidder"]) for lamp in lamps] == [
        ("Bidder B, lamp 1", "Bidder B"),
        ("Bidder A, lamp 1", "Bidder A"),
        ("Bidder C, lamp 1", "Bidder C"),
    ]
    assert 'href="lamps/L-01.html"' in page, "files keep their names"


def test_remarks_are_left_out_and_the_sheet_says_why(coded):
    assessment, context = coded
    lamp, comparison = (
        describe_lamp(assessment, "L-01", context),
        describe_comparison(assessment, context),
    )
    for notes in (lamp.notes, comparison.notes):
        assert len(notes) == 1
        assert "free text may tell who the bidder is" in notes[0].html
    assert describe_lamp(assessment, "L-02", context).notes == (), "nothing was left out there"


def test_running_text_keeps_its_sense(coded):
    assessment, context = coded
    (finding,) = describe_lamp(assessment, "L-01", context).findings
    assert finding.compared == (
        "Unit unit 1 against Bidder B, lamp 1; the report is the report of Bidder B."
    )


def test_a_name_with_a_number_and_a_unit_is_masked_however_it_is_set(coded):
    assessment, _ = coded
    names = ShownNames(assessment)
    for text in (
        "like Globe of 9 W",
        "like Globe of 9\u00a0W",
        say("like {lamp}", lamp="Globe of 9 W"),
    ):
        assert names.masked(text) == "like Bidder A, lamp 1"


def test_a_model_of_two_bidders_tells_neither(coded):
    assessment, _ = coded
    lamps = tuple(replace(lamp, model="Harbour 806") for lamp in assessment.campaign.lamps)
    both = replace(assessment, campaign=replace(assessment.campaign, lamps=lamps))
    assert ShownNames(both).masked("like Harbour 806") == "like the lamp"


def test_names_are_shown_where_no_code_is_in_force(invented_assessment):
    names = ShownNames(invented_assessment)
    lamp = invented_assessment.campaign.lamps[0]
    assert (names.lamp(lamp), names.bidder(lamp)) == ("Harbour 806", "Bidder A")
    assert names.masked("Harbour 806 of L-01") == "Harbour 806 of L-01"


def test_a_lamp_that_is_no_bid_keeps_its_name_and_not_that_of_a_bidder(coded):
    assessment, _ = coded
    today = replace(assessment.campaign.lamps[0], lamp_id="today", model="Old 60")
    names = ShownNames(assessment)
    assert (names.lamp(today), names.bidder(today)) == ("Old 60", "")
    assert names.bidder(replace(today, bidder="Somebody Else")) == "Somebody Else"
