"""Report items and product information on a lamp's sheet."""

import dataclasses
import re
from decimal import Decimal

import pytest

from generator.records.product_field import ProductField
from generator.records.report_settings import Amendment, Equipment, ReportMethod, ReportTable
from generator.records.settings import SheetTable
from generator.sheets import describe_lamp, render_html
from generator.sheets.html_sheet import render_paper
from generator.sheets.paper_fit import REST, fitted
from generator.sheets.themes import themes

REPORT = ReportTable(
    number="TR-26-117-A1",
    received_on="2026-09-01",
    tested_from="2026-09-07",
    tested_to="2026-10-30",
    issued_on="2026-11-20",
    sampling="sent by the maker",
    methods=(ReportMethod(name="EN 13032-4, sphere", deviations="auxiliary lamp of 20 W"),),
    equipment=(Equipment(name="Sphere S-2", calibrated_on="2026-02-02", traceable_to="metre"),),
    signatory="Ada Fernwick",
    signatory_function="head of the bench",
    reproduction_note="To be copied whole.",
    amendments=(Amendment(replaces="TR-26-117", reason="a wrong serial number"),),
)

FIELDS = (
    ProductField("L-01", "supplier's name", "Bidder One"),
    ProductField("L-01", "envelope", "", reason="not stated in the campaign"),
    ProductField("L-01", "anti-glare shield", "", reason="not stated in the campaign"),
    ProductField(
        "L-01",
        "on-mode power",
        "8.4",
        "W",
        "to the nearest 0.1",
        Decimal("8.44"),
        warning="8.44 would be shown as 8.4, which is better than declared",
    ),
)


def words(page):
    """The text of a page, spaces made one."""
    return re.sub(r"\s+", " ", re.sub(r"<[^>]+>", " ", page))


@pytest.fixture(scope="module")
def reported_sheets(invented_assessment, invented_context):
    """The first lamp in every theme, with a report and product information."""
    context = dataclasses.replace(invented_context, products={"L-01": FIELDS})
    campaign = invented_assessment.campaign
    sheets = {}
    for theme in themes():
        update = {"report": REPORT, "sheet": SheetTable(theme=theme, lamp_pages=4)}
        dressed = dataclasses.replace(
            campaign, settings=campaign.settings.model_copy(update=update)
        )
        assessment = dataclasses.replace(invented_assessment, campaign=dressed)
        sheets[theme] = describe_lamp(assessment, "L-01", context)
    return sheets


@pytest.mark.parametrize("write", [render_html, render_paper])
def test_a_test_report_says_what_the_standard_asks(reported_sheets, write):
    # ISO/IEC 17025:2017, 7.8.2.1 and 7.8.8.
    page = words(write(reported_sheets["laboratory"]))
    for said in (
        "TR-26-117-A1",
        "2026-09-01",
        "2026-09-07 to 2026-10-30",
        "2026-11-20",
        "sent by the maker",
        "EN 13032-4, sphere: auxiliary lamp of 20 W",
        "Sphere S-2, calibrated on 2026-02-02, traceable to metre",
        "The results relate only to the items tested.",
        "To be copied whole.",
        "Ada Fernwick, head of the bench",
        "replaces TR-26-117: a wrong serial number",
    ):
        assert said in page, said


def test_nothing_is_said_that_nobody_stated(invented_assessment, invented_context):
    campaign = invented_assessment.campaign
    update = {"sheet": SheetTable(theme="laboratory")}
    dressed = dataclasses.replace(campaign, settings=campaign.settings.model_copy(update=update))
    assessment = dataclasses.replace(invented_assessment, campaign=dressed)
    sheet = describe_lamp(assessment, "L-01", invented_context)
    page = words(render_html(sheet))
    assert "consent of the laboratory" not in page
    assert "Reproduction note" not in page
    assert sheet.report.signatory == ""
    assert "Person who authorises the report" in sheet.report.missing


def test_every_theme_lists_what_is_missing(reported_sheets):
    for theme, sheet in reported_sheets.items():
        page = words(render_html(sheet))
        assert sheet.report.missing == (
            "Laboratory, name and address",
            "Place of work",
            "Condition of the items",
            "Conditions of the test",
        ), theme
        assert f"Not stated: {'; '.join(sheet.report.missing)}." in page, theme


def test_the_report_of_a_lamp_counts_that_lamp_alone(reported_sheets, invented_assessment):
    items = {pair.label: pair.text for pair in reported_sheets["laboratory"].report.opening}
    count = len(invented_assessment.verdicts_of("L-01"))
    assert items["Statements of conformity"] == f"{count} verdicts, each with its clause"
    assert items["Items tested"].count(";") == 0


@pytest.mark.parametrize("write", [render_html, render_paper])
def test_product_information_carries_its_warning(reported_sheets, write):
    # Regulation (EU) 2019/2015, Annex IX point 2(b): no better than declared.
    for theme, sheet in reported_sheets.items():
        page = words(write(sheet))
        assert "Product information" in page, theme
        assert "8.44 would be shown as 8.4, which is better than declared" in page, theme
        assert "anti-glare shield" in page, theme


def test_product_information_is_folded_first(reported_sheets):
    sheet = reported_sheets["laboratory"]
    first = next(budget for budget in REST if not budget.products)
    folded = fitted(sheet, first)
    assert folded.product is None
    assert folded.folded == ("Product information, 4 fields, stands on the HTML sheet.",)
    assert (folded.methods, folded.verdicts) == (sheet.methods, sheet.verdicts)


def test_no_product_information_where_no_act_asks(invented_assessment, invented_context):
    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    assert sheet.product is None
    assert 'id="product"' not in render_html(sheet)
