"""The rules of axe on every type of page, as screens and printers show it."""

from __future__ import annotations

import pytest

AXE_PATH = ".make/node/node_modules/axe-core/axe.min.js"
MODES = {
    "light": {"media": "screen", "color_scheme": "light"},
    "dark": {"media": "screen", "color_scheme": "dark"},
    "print": {"media": "print", "color_scheme": "light"},
}
SAME_RULES = {"dark"}
"""Modes that change colours alone; the other rules were asked in the light."""

COLOUR_RULES = ["color-contrast", "link-in-text-block"]
TAGS = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"]

pytestmark = pytest.mark.needs("chromium", "axe")


def violations(page, pytestconfig, only=None):
    # The policy of the page forbids scripts of others; the browser's own tool is let through.
    page.evaluate((pytestconfig.rootpath / AXE_PATH).read_text(encoding="utf-8"))
    options = {
        "runOnly": only or {"type": "tag", "values": TAGS},
        "resultTypes": ["violations"],
        "preload": False,
    }
    # What passes is many times what fails; it stays in the page.
    found = page.evaluate("async options => (await axe.run(document, options)).violations", options)
    return [
        f"{item['id']}: {node['target']} {node['failureSummary']}"
        for item in found
        for node in item["nodes"][:3]
    ]


@pytest.mark.parametrize("mode", MODES)
def test_axe_finds_nothing(visit, pages, pytestconfig, mode):
    only = {"type": "rule", "values": COLOUR_RULES} if mode in SAME_RULES else None
    found = {}
    for path in pages:
        page = visit(path)
        page.emulate_media(**MODES[mode])
        page.evaluate("document.querySelectorAll('details').forEach(fold => { fold.open = true; })")
        found["/".join(path.parts[-4:])] = violations(page, pytestconfig, only)
        page.close()
    assert {name: broken for name, broken in found.items() if broken} == {}


def test_axe_finds_nothing_on_a_narrow_screen(visit, pages, pytestconfig):
    page = visit(pages[0], viewport={"width": 320, "height": 800})
    assert violations(page, pytestconfig) == []


def test_axe_finds_nothing_with_lamps_side_by_side(visit, issued, pytestconfig):
    view = "side=veldrune-a60-940,corvath-a60-827&reference=corvath-a60-827&range=ra:80:&sort=ra"
    page = visit(issued / "index.html", view)
    assert violations(page, pytestconfig) == []


def test_axe_finds_what_is_wrong(visit, issued, pytestconfig):
    page = visit(issued / "index.html")
    page.evaluate("document.querySelector('label[for=find]').remove()")
    assert any(text.startswith("label:") for text in violations(page, pytestconfig))
