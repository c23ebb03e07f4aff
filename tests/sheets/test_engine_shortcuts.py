"""The shortcuts through the PDF engine: the same page comes out as by the long way."""

import io
import json
import re
import subprocess
import sys
from xml.etree.ElementTree import fromstring

import pikepdf
import pytest

from generator.sheets import describe_lamp, pdf_engine
from generator.sheets.engine_shortcuts import lean_defaults, put_aside_drawings, take_shortcuts
from generator.sheets.html_sheet import render_paper
from generator.sheets.paper_drawing import paper_drawing
from generator.sheets.pdf_sheet import written_pdf

SVG = "http://www.w3.org/2000/svg"

# Lays out a page and lists its boxes with their places and texts, with or without the shortcuts.
DESCRIBE = """
import json, sys
import generator.sheets.engine_shortcuts as shortcuts
import generator.sheets.pdf_sheet as pdf_sheet
if sys.argv[1] == "long":
    shortcuts.take_shortcuts = pdf_sheet.take_shortcuts = lambda: False
engine = pdf_sheet.pdf_engine(sys.argv[2])
document = engine.lay_out(sys.stdin.read())
boxes = [
    [type(box).__name__, box.element_tag, getattr(box, "text", ""),
     *(round(float(getattr(box, name, 0)), 3) for name in ("position_x", "position_y", "width"))]
    for page in document.pages for box in page._page_box.descendants()
]
sys.stdout.write(json.dumps(boxes) + "\\n" + pdf_sheet.written_pdf(document).hex())
"""


@pytest.fixture(scope="module")
def page(invented_assessment, invented_context):
    return render_paper(describe_lamp(invented_assessment, "L-01", invented_context))


def _way(page, way):
    ran = subprocess.run(
        [sys.executable, "-c", DESCRIBE, way, "laboratory"],
        input=page.encode(),
        capture_output=True,
        check=True,
    )
    boxes, written = ran.stdout.decode().split("\n")
    return json.loads(boxes), bytes.fromhex(written)


@pytest.fixture(scope="module")
def both_ways(page):
    return _way(page, "short"), _way(page, "long")


def _structure(data):
    with pikepdf.open(io.BytesIO(data)) as pdf:
        stack, found = [pdf.Root.StructTreeRoot.K[0]], []
        while stack:
            node = stack.pop()
            if isinstance(node, pikepdf.Dictionary) and "/S" in node:
                found.append((str(node.S), str(node.get("/Alt", ""))))
                stack += list(node.get("/K", []))
        return found


def test_every_box_stands_where_the_engine_itself_puts_it(both_ways):
    (short, _), (long, _) = both_ways
    assert len(short) > 500
    assert short == long


def test_the_structure_is_the_engine_s_own(both_ways):
    (_, short), (_, long) = both_ways
    assert _structure(short) == _structure(long)
    assert ("/Figure", "") not in _structure(short)


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


def test_a_justified_and_a_spaced_text_is_written_whole():
    words = "Every word of a line that is spread over the whole width stays in its place. " * 4
    styles = "text-align: justify; width: 40mm", "letter-spacing: 1pt", "text-decoration: underline"
    body = "".join(f'<p style="{style}">{words}</p>' for style in styles)
    page = f'<html lang="en"><head><title>t</title></head><body>{body}</body></html>'
    (short, written), (long, plain) = _way(page, "short"), _way(page, "long")
    assert short == long
    assert _structure(written) == _structure(plain)


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
