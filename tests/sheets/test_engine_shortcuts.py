"""The shortcuts through the PDF engine: the same page comes out as by the long way."""

import dataclasses
import io
import re
import subprocess
import sys
from collections import defaultdict
from xml.etree.ElementTree import fromstring

import numpy as np
import pikepdf
import pytest

from generator.sheets import describe_comparison, describe_lamp, pdf_engine
from generator.sheets.engine_shortcuts import lean_defaults, put_aside_drawings, take_shortcuts
from generator.sheets.html_sheet import render_paper
from generator.sheets.paper_drawing import paper_drawing
from generator.sheets.pdf_sheet import written_pdf
from tests.sheets.reading_pdfs import (
    DOTS,
    figures_of,
    grey_of,
    most_different,
    paper,
    structure_of,
    words_of,
)

SVG = "http://www.w3.org/2000/svg"
SHEETS = ("laboratory", "tender", "stewardship", "comparison")

AMONG_WORDS = 0.01
"""Words of the page agree far below what a printer can show [pt]."""

IN_DRAWINGS = 1.5
"""Labels of drawings: the engine's painter of drawings spaces letters one by one, rounded [pt]."""


def _page(assessment, context, name):
    """A sheet as a page, its theme, and whether it is one of a lamp."""
    if name == "comparison":
        return render_paper(describe_comparison(assessment, context)), "tender", False
    sheet = describe_lamp(assessment, "L-01", context)
    frame = dataclasses.replace(sheet.frame, theme=name)
    return render_paper(dataclasses.replace(sheet, frame=frame)), name, True


@pytest.fixture(scope="module", params=SHEETS)
def both_ways(request, invented_assessment, invented_context, long_way):
    """The laid-out document, its PDF, and the PDF that the engine alone makes of the page."""
    page, theme, of_lamp = _page(invented_assessment, invented_context, request.param)
    document = pdf_engine(theme).lay_out(page, of_lamp=of_lamp)
    return document, written_pdf(document), long_way(page, theme, of_lamp=of_lamp)


def _nearest(word, others):
    """The place among equal words that is nearest to one, and how far it is [pt]."""
    away = [max(abs(a - b) for a, b in zip(word[1:], other[1:], strict=True)) for other in others]
    at = min(range(len(away)), key=away.__getitem__)
    return at, away[at]


def _moved(words, others):
    """How far each word lies from the same word of another page [pt]."""
    assert sorted(word.text for word in words) == sorted(word.text for word in others)
    left = defaultdict(list)
    for other in others:
        left[other.text].append(other)
    moved = []
    for word in words:
        at, away = _nearest(word, left[word.text])
        left[word.text].pop(at)
        moved.append(away)
    return moved


def test_every_word_stands_where_the_engine_itself_puts_it(both_ways):
    _, short, long = both_ways
    pages, others = words_of(short), words_of(long)
    assert len(pages) == len(others) > 1
    assert sum(map(len, pages)) > 600
    for words, plain, figures in zip(pages, others, figures_of(short), strict=True):
        for word, away in zip(words, _moved(words, plain), strict=True):
            drawn = any(_overlap(word, figure) for figure in figures)
            assert away < (IN_DRAWINGS if drawn else AMONG_WORDS), word


def _overlap(word, figure):
    left, top, right, bottom = figure
    return left < word.right and word.left < right and top < word.bottom and word.top < bottom


def test_most_words_are_set_by_the_sheets_themselves(both_ways):
    document, *_ = both_ways
    boxes = [box for page in document.pages for box in page._page_box.descendants()]
    kinds = [type(box).__name__ for box in boxes]
    assert kinds.count("SetParagraph") + kinds.count("SetTable") > 20
    ours = sum(_letters_of(box) for box in boxes)
    plain = sum(len(box.text) for box in boxes if type(box).__name__ == "TextBox")
    assert ours > plain


def _letters_of(box):
    """How many letters of a page stand in a box of ours."""
    if type(box).__name__ == "SetParagraph":
        lines = box.lines
    elif type(box).__name__ == "SetTable":
        places = [place for row in box.cut.rows for place in row.places]
        lines = [line for place in places for line in place.lines]
    else:
        return 0
    return sum(len(piece.run.text) for line in lines for piece in line.stretches)


def _as_the_engine_says(data):
    """Kinds of elements, and the words for drawings.

    The engine makes an item of every line of a term and of what is said of it; items of a list
    count as one here.
    """
    left_out = {"Span", "NonStruct", "Div"}
    found = [
        (kind, own.get("/Alt", "")) for _, kind, own in structure_of(data) if kind not in left_out
    ]
    kinds = " ".join(kind for kind, _ in found).replace("LI Lbl LBody", "LI LBody")
    kinds = re.sub("LI LBody(?: LI LBody)+", "LI LBody", kinds)
    return kinds.split(), [words for kind, words in found if kind == "Figure"]


def test_the_structure_is_the_engine_s_own(both_ways):
    _, short, long = both_ways
    kinds, figures = _as_the_engine_says(short)
    assert (kinds, figures) == _as_the_engine_says(long)
    assert kinds.count("Table") > 0
    assert all(figures)


def test_bars_and_lines_look_as_the_engine_paints_them(both_ways):
    _, short, long = both_ways
    grey, plain = grey_of(short), grey_of(long)
    for left, top, right, bottom in figures_of(short)[0]:
        rows = slice(_point(top - 1), _point(bottom + 1) + 1)
        columns = slice(_point(left - 1), _point(right + 1) + 1)
        grey[rows, columns] = plain[rows, columns] = 255
    # The edges of a bar may be a point wider or narrower; a lost bar or word makes 80 and more.
    assert most_different(grey, plain) < 30


def _point(length):
    """The point of a picture at a place of the page [pt]."""
    return int(length * DOTS / 72)


def test_the_shortcuts_are_taken_by_this_engine():
    assert take_shortcuts()


def test_another_version_of_the_engine_goes_the_long_way():
    code = (
        "import weasyprint; weasyprint.__version__ = '71.0'\n"
        "from weasyprint.text.line_break import Layout; setup = Layout.setup\n"
        "from generator.sheets.engine_shortcuts import lean_defaults, take_shortcuts\n"
        "assert not take_shortcuts() and lean_defaults('') is None and Layout.setup is setup"
    )
    subprocess.run([sys.executable, "-c", code], check=True)


def test_marks_of_notes_stay_where_a_theme_asks_for_notes():
    assert lean_defaults("p { color: red }") is not None
    assert lean_defaults(".aside { float: footnote }") is None


def test_the_style_sheet_of_the_engine_itself_stays_whole():
    from weasyprint.html import UA_STYLESHEET

    kept = {entry[3] for entry in UA_STYLESHEET.matcher.other_selectors}
    lean = {entry[3] for entry in lean_defaults("").matcher.other_selectors}
    assert {"footnote-call", "marker"} <= kept
    assert not {"footnote-call", "marker"} & lean


def test_marks_of_a_drawing_are_put_aside_and_the_title_stays():
    drawing = f'<svg xmlns="{SVG}"><title>Peak</title><path d="M0 0"/></svg>'
    root = fromstring(f"<p>{drawing}</p>")  # noqa: S314 - written above
    put_aside_drawings(root)
    assert [part.tag for part in root[0]] == [f"{{{SVG}}}title"]


def test_a_justified_and_a_spaced_text_is_written_whole(long_way):
    words = "Every word of a line that is spread over the whole width stays in its place. " * 4
    styles = "text-align: justify; width: 40mm", "letter-spacing: 1pt", "text-decoration: underline"
    page = paper("".join(f'<p style="{style}">{words}</p>' for style in styles))
    short, long = written_pdf(pdf_engine("laboratory").lay_out(page)), long_way(page, "laboratory")
    for found, plain in zip(words_of(short), words_of(long), strict=True):
        assert len(found) > 150
        assert max(_moved(found, plain)) < AMONG_WORDS
    assert structure_of(short) == structure_of(long)
    assert np.array_equal(grey_of(short), grey_of(long))


def _drawing(inner, size='viewBox="0 0 40 20" width="40" height="20"'):
    root = fromstring(f'<svg xmlns="{SVG}" {size}>{inner}</svg>')  # noqa: S314 - written here
    return paper_drawing(root, None)


def test_lines_of_one_paint_are_one_stroke():
    line = '<line x1="0" y1="{0}" x2="9" y2="{0}" fill="none" stroke="#000000" stroke-width="1"/>'
    marks = _drawing(line.format(1) + line.format(2))._marks
    operators = b"\n".join(marks).decode().split("\n")
    assert operators.count("S") == 1
    assert operators[-5:] == ["0 1 m", "9 1 l", "0 2 m", "9 2 l", "S"]


def test_a_path_with_relative_steps_ends_where_it_should():
    # From (1, 2): right to 5, down by 3, back to x = 0, and closed.
    marks = _drawing('<path fill="#ff0000" d="M1 2h4v3H0z"/>')._marks
    assert b"1 2 m\n5 2 l\n5 5 l\n0 5 l\nh\nf" in b"\n".join(marks)
    assert b"1 0 0 rg" in b"\n".join(marks)


@pytest.mark.parametrize(
    "inner",
    [
        "<ellipse/>",
        '<path d="M0 0Q1 1 2 2"/>',
        '<path d="M0 0L1" fill="#000000"/>',
        '<rect width="1" height="1" fill="red"/>',
        '<g transform="scale(2)"/>',
        '<text x="0" y="0"><tspan>a</tspan></text>',
    ],
)
def test_what_is_no_plain_mark_is_left_to_the_engine(inner):
    assert _drawing(inner) is None


def test_a_drawing_without_a_size_is_left_to_the_engine():
    assert _drawing("", 'viewBox="0 0 40 20"') is None
    assert _drawing("", 'viewBox="1 0 40 20" width="40" height="20"') is None


def test_a_drawing_keeps_its_words_marks_and_blend():
    inner = (
        '<g font-family="Sheet Sans" font-size="10"><linearGradient id="a" x1="0" y1="0" x2="40"'
        ' y2="0" gradientUnits="userSpaceOnUse"><stop offset="0.2" stop-color="#ff0000"/>'
        '<stop offset="0.8" stop-color="#0000ff"/></linearGradient>'
        '<path d="M0 0L40 0L40 20Z" fill="url(#a)"/><circle cx="5" cy="5" r="2" fill="#00ff00"/>'
        '<path d="M0 0L9 9" fill="#000000" fill-opacity="0.70"/>'
        '<text x="20" y="9" text-anchor="middle" fill="#000000">limit</text></g>'
    )
    size = 'viewBox="0 0 40 20" width="40" height="20"'
    svg = f'<svg xmlns="{SVG}" {size}><title>t</title>{inner}</svg>'
    page = f'<html lang="en"><head><title>t</title></head><body>{svg}</body></html>'
    data = written_pdf(pdf_engine("tender").lay_out(page))
    with pikepdf.open(io.BytesIO(data)) as pdf:
        content = pdf.pages[0].Contents.read_bytes().decode("latin-1")
        assert list(pdf.pages[0].Resources.Shading)
    assert " sh\n" in content
    assert len(re.findall(r" c\n", content)) == 4
    assert content.count("TJ") == 2  # the label, and the number of the page
