"""Remarks from Markdown, made clean."""

import pytest

from generator.sheets.notes import clean_notes


def _page(text):
    return "\n".join(note.html for note in clean_notes(text))


def test_plain_markdown_passes():
    page = _page("A *b* **c** `d`\n\n- one\n- two\n\n| a | b |\n|---|---|\n| 1 | 2 |")
    for piece in ("<em>b</em>", "<strong>c</strong>", "<li>one</li>", "<td>1</td>"):
        assert piece in page


@pytest.mark.parametrize(
    "hostile",
    [
        "<script>alert(1)</script>",
        "text <img src=x onerror=alert(1)> text",
        "[x](javascript:alert(1))",
        "[x](data:text/html,1)",
        "![p](https://example.org/a.png)",
        '<a href="https://example.org" onclick="x()">y</a>',
        "<style>body{display:none}</style>",
        "<div><p>block</p></div>",
        "[x](file:///etc/passwd)",
    ],
)
def test_nothing_hostile_passes(hostile):
    page = _page(hostile)
    for forbidden in ("<script", "<img", "<style", "<div", '<a href="javascript', "<svg"):
        assert forbidden not in page
    for target in ('href="javascript', 'href="data', 'href="file'):
        assert target not in page


def test_headings_sink_below_those_of_the_sheet():
    page = _page("# One\n\n### Three")
    assert "<h3>One</h3>" in page
    assert "<h4>Three</h4>" in page


def test_blocks_are_counted_apart():
    notes = clean_notes("first\n\nsecond block\n\n- a\n- b")
    assert [note.length for note in notes][:2] == [5, 12]
    assert len(notes) == 3


def test_nothing_gives_nothing():
    assert clean_notes(" \n") == ()
