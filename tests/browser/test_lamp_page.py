"""A lamp's page in the browser: what a printer and a narrow screen get of it."""

from __future__ import annotations

import pytest

pytestmark = pytest.mark.needs("chromium")

LAMP = "lamps/veldrune-gu10-930.html"


@pytest.mark.parametrize("theme", ["tender", "stewardship"])
def test_what_is_folded_away_is_printed_and_no_heading_is_left_alone(visit, small_issue, theme):
    page = visit(small_issue(theme) / LAMP, viewport={"width": 794, "height": 1100})
    page.emulate_media(media="print")
    assert page.locator("table.verdicts").first.bounding_box()["height"] > 0
    assert page.locator("table.verdicts").first.is_visible()
    assert not page.locator("#figures").is_visible()


def test_drawings_are_there_before_they_are_scrolled_to(visit, small_issue):
    page = visit(small_issue("tender") / LAMP)
    found = page.evaluate(
        "[...document.querySelectorAll('.drawings > div, .cautions > div')]"
        ".map(part => getComputedStyle(part).contentVisibility)"
    )
    assert set(found) == {"visible"}


def test_a_value_stands_beside_its_name_on_a_narrow_screen(visit, small_issue):
    page = visit(small_issue("tender") / LAMP, viewport={"width": 320, "height": 800})
    cells = page.locator(".product tbody td:nth-child(2)")
    ends = [cells.nth(at).bounding_box() for at in range(cells.count())]
    assert max(box["x"] + box["width"] for box in ends) <= 320
    caption = page.locator(".scroll .product caption").bounding_box()
    assert caption["x"] + caption["width"] <= 320
