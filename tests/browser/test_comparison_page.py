"""The comparison opened from disk, used as a buyer uses it."""

from __future__ import annotations

import csv
import io
import json
import re
from pathlib import Path

import pytest

pytestmark = pytest.mark.needs("chromium")

EFFICACY = "luminous efficacy"


@pytest.fixture
def index(issued):
    return issued / "index.html"


@pytest.fixture
def page(visit, index):
    return visit(index)


@pytest.fixture(scope="session")
def measured(issued):
    """Figures of ``data/figures.csv`` by lamp and quantity, as the comparison should show them."""
    order = {"computed": 0, "reported": 1, "declared": 2}
    found = {}
    with (issued / "data" / "figures.csv").open(encoding="utf-8", newline="") as stream:
        for row in csv.DictReader(stream):
            key = (row["lamp_id"], row["quantity"])
            if row["unit_id"] or not row["value"]:
                continue
            if key not in found or order[row["grade"]] < order[found[key]["grade"]]:
                found[key] = row
    return {key: row["value"] for key, row in found.items()}


def shown_lamps(page):
    rows = page.locator("#matrix tbody tr").filter(visible=True)
    return [
        re.fullmatch(r"lamps/(.+)\.html", link)[1]
        for link in rows.locator("a.model").evaluate_all(
            "links => links.map(link => link.getAttribute('href'))"
        )
    ]


def shown_headings(page):
    return page.locator("#matrix thead .label").filter(visible=True).all_inner_texts()


def column_numbers(page, heading):
    """The numbers of a column as shown, in the order shown; none where there is no number."""
    texts = page.evaluate(
        """heading => {
          const table = document.querySelector("#matrix");
          const at = [...table.tHead.rows[0].cells].findIndex(
            cell => cell.querySelector(".label").textContent === heading);
          return [...table.tBodies[0].rows].filter(row => !row.hidden).map(
            row => row.cells[at].querySelector(".number")?.textContent ?? null);
        }""",
        heading,
    )
    return [
        None if text is None else float(text.replace("\u2212", "-").replace("\u00a0", ""))
        for text in texts
    ]


def sort_button(page, heading):
    return page.locator("#matrix thead button").filter(has_text=heading)


def wait_for_rows(page, count):
    """Rows past the first window follow frame by frame."""
    page.wait_for_function(
        "count => document.querySelectorAll('#matrix tbody tr').length === count", arg=count
    )


def status(page):
    return page.get_by_role("status").inner_text()


def test_without_scripts_every_lamp_and_figure_is_there(visit, index, measured):
    page = visit(index, java_script_enabled=False)
    assert not page.locator("#controls").is_visible()
    assert page.get_by_role("button").count() == 0
    rows = page.locator("#matrix tbody tr")
    lamps = {lamp for lamp, _ in measured}
    assert rows.count() == len(lamps)
    cells = page.locator("#matrix td")
    assert cells.count() == rows.count() * (page.locator("#matrix thead th").count() - 1)
    assert cells.filter(visible=True).count() == cells.count()
    assert page.locator("#pair-plot svg").is_visible()
    assert page.locator(".spectrum svg").filter(visible=True).count() >= 2


def test_few_columns_at_first_and_any_on_request(page):
    assert "luminous flux" in shown_headings(page)
    assert "displacement factor" not in shown_headings(page)
    page.locator("#column-choice > summary").click()
    page.get_by_role("checkbox", name="displacement factor").check()
    page.get_by_role("checkbox", name="luminous flux", exact=True).uncheck()
    assert "displacement factor" in shown_headings(page)
    assert "luminous flux" not in shown_headings(page)
    page.get_by_role("button", name="All columns").click()
    everything = page.locator("#matrix thead th").count()
    assert len(shown_headings(page)) == everything


def test_sorting_by_a_figure_both_ways(page):
    sort_button(page, EFFICACY).click()
    heading = page.locator("#matrix thead th").filter(has_text=EFFICACY)
    assert heading.get_attribute("aria-sort") == "descending"
    numbers = column_numbers(page, EFFICACY)
    assert numbers == sorted(numbers, reverse=True)
    assert status(page) == "Sorted by luminous efficacy, highest first."
    sort_button(page, EFFICACY).click()
    assert heading.get_attribute("aria-sort") == "ascending"
    assert column_numbers(page, EFFICACY) == numbers[::-1]
    assert page.locator("#matrix [aria-sort]").count() == 1


def test_what_has_no_number_stands_last_both_ways(page):
    for _ in range(2):
        sort_button(page, "percent flicker").click()
        numbers = column_numbers(page, "percent flicker")
        assert None in numbers
        assert None not in numbers[: numbers.index(None)]
        assert set(numbers[numbers.index(None) :]) == {None}


def test_filter_by_text_verdict_bidder_and_range(page, measured):
    everything = shown_lamps(page)
    page.get_by_role("searchbox", name="Find").fill("VELDRÜNE")
    assert shown_lamps(page) == ["veldrune-a60-940", "veldrune-gu10-930"]
    assert status(page) == f"2 of {len(everything)} lamps shown."
    page.get_by_label("Verdict").select_option("no clause failed")
    assert shown_lamps(page) == ["veldrune-a60-940"]
    page.get_by_role("button", name="Show everything").click()
    assert shown_lamps(page) == everything
    page.get_by_label("Bidder").select_option("Brantivar")
    assert shown_lamps(page) == ["brantivar-a60-link"]
    page.get_by_role("button", name="Show everything").click()
    page.locator("#range-choice > summary").click()
    page.get_by_label("Figure", exact=True).select_option("colour temperature")
    page.get_by_label("at least", exact=True).fill("3 500,0")
    page.get_by_role("button", name="Add the range").click()
    warm = [lamp for lamp in everything if float(measured[lamp, "cct_k"]) >= 3500]
    assert 0 < len(warm) < len(everything)
    assert shown_lamps(page) == warm
    page.get_by_role("button", name="Remove the range").click()
    assert shown_lamps(page) == everything
    page.get_by_role("searchbox", name="Find").fill("no such lamp")
    assert shown_lamps(page) == []
    assert page.get_by_text("No lamp matches.").is_visible()


def test_up_to_six_lamps_side_by_side(page):
    boxes = page.get_by_role("checkbox", name=re.compile("side by side$"))
    for at in range(6):
        boxes.nth(at).check()
    assert page.locator("#side thead a").count() == 6
    assert page.locator("#side-spectra path").count() == 5  # one of the six has no spectrum
    boxes.nth(6).click()
    assert not boxes.nth(6).is_checked()
    assert status(page).startswith("Six lamps are side by side already")
    page.get_by_role("button", name="Take Meridian A60 940 out").click()
    assert page.locator("#side thead a").count() == 5
    assert not boxes.nth(0).is_checked()
    heading = page.locator("#side-heading")
    assert heading.evaluate("element => element === document.activeElement")


def test_difference_from_a_reference_lamp(page, measured):
    page.get_by_label("Difference from").select_option("Meridian A60 940")
    row = page.locator("#matrix tbody tr").filter(has_text="Basic A60 827")
    column = shown_headings(page).index(EFFICACY)
    cells = row.locator("th, td").filter(visible=True)
    text = cells.nth(column).locator(".difference").inner_text()
    base, other = (
        float(measured[lamp, "efficacy_lm_per_w"])
        for lamp in ("veldrune-a60-940", "corvath-a60-827")
    )
    # Both are shown to a tenth, so the difference is too.
    assert float(text.replace("\u2212", "-")) == pytest.approx(other - base, abs=0.05)
    own = page.locator("#matrix tbody tr.reference")
    assert own.locator("a.model").inner_text() == "Meridian A60 940"
    assert own.locator(".difference").count() == 0
    assert page.locator("#difference-legend").is_visible()


def test_a_link_restores_the_view(page, visit, index):
    page.get_by_label("Verdict").select_option("fails a clause")
    page.get_by_label("Difference from").select_option("Basic A60 827")
    sort_button(page, "unit price").click()
    page.locator("#column-choice > summary").click()
    page.get_by_role("checkbox", name="deep red").check()
    page.get_by_role("checkbox", name=re.compile("side by side$")).nth(1).check()
    page.get_by_label("Across").select_option("colour temperature")
    page.wait_for_url("**#*x=cct_k*")  # the address follows a moment after the rows
    address = page.url
    other = visit(index, address.partition("#")[2])
    for question in (shown_lamps, shown_headings):
        assert question(other) == question(page)
    for label in ("Verdict", "Difference from", "Across", "Up"):
        assert (
            other.get_by_label(label, exact=True).input_value()
            == page.get_by_label(label, exact=True).input_value()
        )
    side = page.locator("#side thead a").all_inner_texts()
    assert len(side) == 1
    assert other.locator("#side thead a").all_inner_texts() == side
    assert (
        other.locator("#matrix th[aria-sort]").inner_text()
        == page.locator("#matrix th[aria-sort]").inner_text()
    )
    assert other.url == address


def test_a_broken_link_shows_what_it_can(visit, index):
    page = visit(
        index, "verdict=nonsense&sort=no&columns=ra,nought&range=ra:x:&side=,,&reference=%3Cb%3E"
    )
    assert shown_headings(page) == ["Lamp", "Verdicts", "colour rendering"]
    assert page.locator("#side").is_hidden()


def test_the_skip_link_is_no_view(visit, index):
    page = visit(index, "content")
    assert "unit price" in shown_headings(page)


def test_what_is_shown_comes_down_as_csv(page, measured):
    page.get_by_label("Verdict").select_option("fails a clause")
    sort_button(page, EFFICACY).click()
    with page.expect_download() as waiting:
        page.get_by_role("button", name="Download as CSV").click()
    assert waiting.value.suggested_filename == "comparison.csv"
    text = Path(waiting.value.path()).read_bytes().decode()
    assert text.count("\r\n") == text.count("\n")
    rows = list(csv.DictReader(io.StringIO(text)))
    assert [row["lamp_id"] for row in rows] == shown_lamps(page)
    for row in rows:
        written = row["efficacy_lm_per_w"]
        assert float(written) == pytest.approx(float(measured[row["lamp_id"], "efficacy_lm_per_w"]))
    assert {"u_efficacy_lm_per_w", "unit_price", "currency"} <= set(rows[0])
    assert "displacement_factor" not in rows[0]
    assert "difference_efficacy_lm_per_w" not in rows[0]


def test_differences_that_are_shown_come_down_too(page, measured):
    reference = "corvath-a60-827"
    page.select_option("#reference", reference)
    with page.expect_download() as waiting:
        page.get_by_role("button", name="Download as CSV").click()
    rows = list(csv.DictReader(io.StringIO(Path(waiting.value.path()).read_text("utf-8"))))
    assert {row["reference_lamp"] for row in rows} == {reference}
    base = float(measured[reference, "efficacy_lm_per_w"])
    for row in rows:
        written = row["difference_efficacy_lm_per_w"]
        if row["lamp_id"] == reference:
            assert written == ""
        elif row["efficacy_lm_per_w"]:  # with the digits of the coarser value, whole lm/W at worst
            assert float(written) == pytest.approx(float(row["efficacy_lm_per_w"]) - base, abs=0.51)


def test_text_that_looks_like_a_formula_stays_text(page):
    lamp = {
        "id": "a",
        "model": '=1+1 "x"',
        "bidder": "-2",
        "currency": "",
        "counts": {},
        "cells": [[-3.5, None, 1]],
    }
    data = {"columns": [{"key": "duv"}], "lamps": [lamp]}
    text = page.evaluate("data => lampassay.toCsv(data, {columns: ['duv']}, [0])", data)
    row = next(csv.DictReader(io.StringIO(text)))
    assert (row["model"], row["bidder"], row["duv"]) == ('\'=1+1 "x"', "'-2", "-3.5")


def test_any_two_figures_against_each_other(page, measured):
    page.get_by_label("Across").select_option("colour temperature")
    page.get_by_label("Up").select_option("colour rendering")
    title = page.locator("#pair-plot svg > title")
    title.filter(has_text="colour rendering against colour temperature").wait_for(state="attached")
    lamps = {lamp for lamp, name in measured if name == "cct_k"}
    drawn = page.locator("#pair-numbers tbody tr").count()
    assert drawn == len(lamps)
    words = page.locator("#pair-plot text").all_text_contents()
    assert "≥ 80" in words  # the limit of colour rendering


def test_by_keyboard_alone(page):
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Skip to the content"
    for _ in range(100):
        if EFFICACY in page.evaluate("document.activeElement.textContent.slice(0, 60)"):
            break
        page.keyboard.press("Tab")
    page.keyboard.press("Enter")
    heading = page.locator("#matrix thead th").filter(has_text=EFFICACY)
    assert heading.get_attribute("aria-sort") == "descending"
    for _ in range(20):
        page.keyboard.press("Tab")
        if page.evaluate("document.activeElement.type") == "checkbox":
            break
    page.keyboard.press("Space")
    assert page.locator("#side thead a").count() == 1


def test_the_accessibility_tree_names_every_control(page):
    tree = page.locator("body").aria_snapshot()
    for line in (
        'region "Choose what is shown"',
        'searchbox "Find"',
        'combobox "Verdict"',
        'combobox "Bidder"',
        'combobox "Difference from"',
        'button "Download as CSV"',
        'table "All lamps side by side"',
        'checkbox "Set Meridian A60 940 side by side"',
        'columnheader "Ra colour rendering"',
        'rowheader "Meridian A60 940',
        "status: 8 of 8 lamps shown.",
    ):
        assert line in tree, line
    assert re.search(r'img "pass: .*margin \+', tree)


@pytest.mark.parametrize("width", [320, 640])
def test_nothing_but_tables_and_drawings_scrolls_sideways(visit, index, width):
    # 640 px at 200 % zoom leaves the layout 320 px.
    page = visit(index, viewport={"width": width, "height": 800}, device_scale_factor=640 / width)
    assert page.evaluate("document.documentElement.scrollWidth") <= width


def test_print_leaves_the_controls_out(page):
    page.emulate_media(media="print")
    assert not page.locator("#controls").is_visible()
    assert page.locator(".pick").filter(visible=True).count() == 0
    assert page.locator("#matrix tbody tr").filter(visible=True).count() == 8


def test_nothing_moves(visit, index):
    page = visit(index, reduced_motion="reduce")
    sort_button(page, EFFICACY).click()
    assert page.evaluate("document.getAnimations().length") == 0


def test_page_data_are_the_matrix(page):
    data = json.loads(page.locator("#comparison-data").text_content())
    assert [column["label"] for column in data["columns"]] == page.locator(
        "#matrix thead .label"
    ).all_text_contents()[2:]
    assert len(data["lamps"]) == page.locator("#matrix tbody tr").count()


def test_of_many_lamps_the_first_stand_on_the_page_and_all_in_the_csv(visit, tmp_path):
    from tests.benchmarks.bench_filter import write_page

    page = visit(write_page(tmp_path, 120))
    assert len(shown_lamps(page)) == 50
    assert status(page) == "120 of 120 lamps match; the first 50 stand here."
    sort_button(page, EFFICACY).click()
    at_once = shown_lamps(page)
    assert 6 <= len(at_once) <= 50
    wait_for_rows(page, 50)
    first = shown_lamps(page)
    assert first[: len(at_once)] == at_once
    page.get_by_role("button", name="Show 50 more").click()
    wait_for_rows(page, 100)
    page.get_by_role("button", name="Show all 120").click()
    wait_for_rows(page, 120)
    assert first == shown_lamps(page)[:50]
    assert page.get_by_role("button", name="Show all").count() == 0
    with page.expect_download() as waiting:
        page.get_by_role("button", name="Download as CSV").click()
    rows = list(csv.DictReader(io.StringIO(Path(waiting.value.path()).read_text("utf-8"))))
    assert [row["lamp_id"] for row in rows] == shown_lamps(page)
    numbers = [float(row["efficacy_lm_per_w"]) for row in rows]
    assert numbers == sorted(numbers, reverse=True)


def test_rows_that_follow_keep_the_order_and_the_next_step_takes_over(visit, tmp_path):
    from tests.benchmarks.bench_filter import write_page

    page = visit(write_page(tmp_path, 120))
    everything = page.evaluate("JSON.parse(document.querySelector('#comparison-data').textContent)")
    models = {lamp["id"]: lamp["model"] for lamp in everything["lamps"]}
    find = page.get_by_role("searchbox", name="Find")
    for text in ("A60", "3", "A60", ""):
        find.fill(text)
        asked = [lamp for lamp, model in models.items() if text in model][:50]
        found = shown_lamps(page)
        assert found == asked[: len(found)]
        assert len(found) >= min(6, len(asked))
    wait_for_rows(page, 50)
    assert shown_lamps(page) == list(models)[:50]
    scroller = page.locator(".matrix-scroll")
    scroller.evaluate("element => element.scrollTo(0, 900)")
    page.wait_for_timeout(100)
    find.fill("3")
    assert scroller.evaluate("element => element.scrollTop") == 0


def test_everything_is_printed_whatever_was_on_the_page(visit, tmp_path):
    from tests.benchmarks.bench_filter import write_page

    page = visit(write_page(tmp_path, 120))
    page.evaluate("dispatchEvent(new Event('beforeprint'))")
    assert len(shown_lamps(page)) == 120
    page.evaluate("dispatchEvent(new Event('afterprint'))")
    wait_for_rows(page, 50)


def test_no_column_moves_when_the_rows_change(page):
    def edges():
        return page.locator("#matrix thead th").evaluate_all(
            "heads => heads.map(head => head.getBoundingClientRect().left)"
        )

    page.locator("#column-choice > summary").click()
    page.get_by_role("button", name="All columns").click()
    before = edges()
    for text in ("Basic", "no such lamp"):
        page.get_by_role("searchbox", name="Find").fill(text)
        assert edges() == before
    page.get_by_role("searchbox", name="Find").fill("")
    spilled = page.locator("#matrix tbody td").evaluate_all(
        "cells => cells.filter(cell => cell.scrollWidth > cell.clientWidth).map("
        "cell => cell.textContent)"
    )
    assert spilled == []


def test_numbers_of_the_scripts_have_the_decimal_sign_of_the_page(visit, index, tmp_path):
    text = index.read_text(encoding="utf-8")
    data = json.loads(re.search(r'id="comparison-data">(.*?)</script>', text)[1])
    comma = json.dumps({**data, "decimal": ","}).replace("<", r"\u003c")
    copied = tmp_path / "index.html"
    copied.write_text(
        re.sub(
            r'(id="comparison-data">).*?(</script>)',
            lambda found: found[1] + comma + found[2],
            text,
        ),
        encoding="utf-8",
    )
    (tmp_path / "assets").symlink_to(index.parent / "assets")
    page = visit(copied, "range=efficacy_lm_per_w:90.5:200&reference=veldrune-a60-940&x=cct_k")
    chip = page.locator("#ranges button")
    assert chip.inner_text() == "luminous efficacy at least 90,5, at most 200 \u00d7"
    label = "Remove the range: luminous efficacy at least 90,5, at most 200"
    assert chip.get_attribute("aria-label") == label
    differences = page.locator("#matrix .difference").all_text_contents()
    assert any("," in words for words in differences)
    page.locator("#pair-numbers tbody td").filter(has_text="\u00b1").first.wait_for(
        state="attached"
    )
    numbers = page.locator("#pair-numbers tbody td").all_text_contents()
    assert any("," in words for words in numbers)
    assert not any("." in words for words in [*differences, *numbers])
    with page.expect_download() as waiting:
        page.get_by_role("button", name="Download as CSV").click()
    rows = list(csv.DictReader(io.StringIO(Path(waiting.value.path()).read_text("utf-8"))))
    assert all(90.5 <= float(row["efficacy_lm_per_w"]) <= 200 for row in rows)
    assert any("." in row["efficacy_lm_per_w"] for row in rows)


@pytest.mark.parametrize(
    ("low", "high", "words"),
    [
        ("1,000", "", "\u201c1,000\u201d is no number, or can be read in two ways."),
        ("", "1e3", "\u201c1e3\u201d is no number, or can be read in two ways."),
        ("900", "800", "The lower end is above the upper end."),
    ],
)
def test_a_range_that_cannot_be_read_in_one_way_is_refused(page, low, high, words):
    before = page.locator("#matrix tbody tr:visible").count()
    page.locator("#range-choice > summary").click()
    page.fill("#range-low", low)
    page.fill("#range-high", high)
    page.get_by_role("button", name="Add the range").click()
    assert page.locator("#status").inner_text() == words
    assert page.locator("input[aria-invalid=true]").count() > 0
    assert page.locator("#matrix tbody tr:visible").count() == before
    page.fill("#range-low", "0,85")
    page.fill("#range-high", "")
    page.get_by_role("button", name="Add the range").click()
    assert page.locator("input[aria-invalid=true]").count() == 0


def test_the_other_languages_open_on_the_same_view(visit, pages):
    page = visit(pages[0], "sort=ra")
    page.select_option("#reference", index=1)
    link = page.locator(".languages a").first
    page.wait_for_function(
        "() => document.querySelector('.languages a').hash.includes('reference')"
    )
    assert "sort=ra" in link.get_attribute("href")
