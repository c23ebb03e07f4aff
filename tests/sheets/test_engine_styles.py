"""Styles remembered from document to document: the same as those of a fresh engine."""

import dataclasses
import subprocess
import sys

import pytest

from generator.sheets import describe_lamp, pdf_engine, render_pdf, themes
from generator.sheets.engine_styles import _asked_by_place
from generator.sheets.pdf_sheet import PdfEngine, written_pdf
from generator.sheets.themes import paper_style
from tests.sheets.reading_pdfs import paper, text_of

ASKED = (
    "color",
    "font_size",
    "font_weight",
    "margin_top",
    "margin_right",
    "clear",
    "lang",
    "anchor",
)


@pytest.mark.parametrize("theme", themes())
@pytest.mark.parametrize("of_lamp", [True, False])
def test_the_styles_of_every_theme_can_be_remembered(theme, of_lamp):
    placed = _asked_by_place(paper_style(theme, of_lamp=of_lamp))
    assert placed is not None
    # .identity div:nth-child(5n+1), .headlines li:last-child, .drawings figure:nth-child(even)
    assert {"div", "li", "figure", "h2"} <= placed
    assert not {"p", "td", "span", "*"} & placed


def test_what_rules_ask_for_by_place_is_named():
    assert _asked_by_place("p { color: red } .a b, c > d { color: red }") == frozenset()
    assert _asked_by_place("/* i:first-child */ a[b='c:d'] { color: red }") == frozenset()
    assert _asked_by_place("li:last-child, .a b:nth-child(5n+1) i { color: red }") == {"li", "b"}
    assert _asked_by_place(".a:first-child { color: red }") == {".a"}
    assert _asked_by_place("h2 + .plain { color: red }") == {".plain"}
    assert _asked_by_place("tr:last-child > * { color: red }") == {"tr"}
    assert _asked_by_place(".a > :first-child { color: red }") == {"*"}
    assert _asked_by_place("b.c:first-child { color: red }") == {"*"}
    assert _asked_by_place("@media print { h2 + p { color: red } }") == {"p"}


@pytest.mark.parametrize(
    "rule",
    [
        "td ~ td { color: red }",
        "p:has(b) { color: red }",
        "p:empty { color: red }",
        "p:nth-of-type(2) { color: red }",
        "p:nth-last-child(2) { color: red }",
        "p:only-child { color: red }",
        "p:not(.a) { color: red }",
        "p:lang(de) { color: red }",
        "@layer a { p { color: red } }",
        "p { width: 40vw }",
    ],
)
def test_what_asks_for_more_is_left_to_the_engine(rule):
    assert _asked_by_place(rule) is None


FIRST = (
    '<main><h2 id="one">a</h2><p class="plain">b</p><p lang="de">c</p>'
    '<dl class="identity"><div><dt>a</dt></div><div><dt>b</dt></div></dl></main>'
)
SECOND = (
    '<section class="tender" id="two"><p class="plain">b</p><h2>a</h2><p class="plain" lang="fr">c'
    '</p><dl class="identity">'
    + "".join(f'<div id="d{at}"><dt>{at}</dt></div>' for at in range(12))
    + '</dl><ul class="headlines"><li>a</li><li>b</li><li>c</li></ul>'
    '<p style="color:#ff0000">r</p><p style="color:#0000ff">r</p></section>'
)


def _found(engine, body):
    """What the engine has worked out for every box that has an element, and the anchors."""
    document = engine.lay_out(paper(body), of_lamp=False)
    boxes = [
        (box.element_tag, *(str(box.style[name]) for name in ASKED))
        for page in document.pages
        for box in page._page_box.descendants()
        if box.element is not None and type(box.style).__name__ == "ComputedStyle"
    ]
    return boxes, [dict(page.anchors) for page in document.pages]


@pytest.mark.parametrize("bodies", [(FIRST, SECOND), (SECOND, FIRST, SECOND), (FIRST, FIRST)])
def test_a_later_document_gets_the_styles_of_a_fresh_engine(bodies):
    engine = pdf_engine("tender")
    for body in bodies:
        found, anchors = _found(engine, body)
    fresh, wanted = _found(PdfEngine("tender"), bodies[-1])
    assert found == fresh
    assert anchors == wanted
    assert sum(map(len, anchors)) > 0


def test_a_place_among_siblings_is_told_apart():
    boxes, _ = _found(pdf_engine("tender"), SECOND)
    divs = [box for box in boxes if box[0] == "div"]
    clear, right = ASKED.index("clear") + 1, ASKED.index("margin_right") + 1
    assert [at for at, box in enumerate(divs) if box[clear] == "left"] == [0, 5, 10]
    assert [at for at, box in enumerate(divs) if "value=0" in box[right]] == [4, 9]
    items = [box for box in boxes if box[0] == "li"]
    assert ["value=0" in box[right] for box in items] == [False, False, True]
    assert {box[1] for box in boxes if box[0] == "p"} > {boxes[0][1]}
    assert len({box[1] for box in boxes if box[0] == "p"}) == 3


def test_a_campaign_may_ask_for_siblings(tmp_path):
    (tmp_path / "theme.css").write_text("td ~ td { display: none }", encoding="utf-8")
    engine = PdfEngine("tender", tmp_path)
    body = "<table><tbody><tr><td>one</td><td>two</td></tr></tbody></table>"
    data = written_pdf(engine.lay_out(paper(body)))
    assert "one" in text_of(data)
    assert "two" not in text_of(data)


def _sheets(assessment, context):
    sheet = describe_lamp(assessment, "L-02", context)
    for at in range(10):
        frame = dataclasses.replace(sheet.frame, campaign=f"Campaign {at}")
        yield dataclasses.replace(sheet, frame=frame, lamp_id=f"L-{at}")


def test_a_sheet_is_the_same_first_and_after_ten_others(invented_assessment, invented_context):
    import pickle

    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    program = (
        "import sys, pickle\n"
        "from generator.sheets import render_pdf\n"
        "print(render_pdf(pickle.loads(sys.stdin.buffer.read())).hex())\n"
    )
    first = subprocess.run(
        [sys.executable, "-c", program], input=pickle.dumps(sheet), capture_output=True, check=True
    )
    for other in _sheets(invented_assessment, invented_context):
        render_pdf(other)
    assert render_pdf(sheet).hex() == first.stdout.decode().strip()


def test_memory_is_let_go_and_the_next_document_is_the_same(
    invented_assessment, invented_context, monkeypatch
):
    from generator.sheets import engine_styles, engine_text
    from generator.sheets.setting import shapes

    sheet = describe_lamp(invented_assessment, "L-01", invented_context)
    before = render_pdf(sheet)
    kept = sum(len(hand.shapes) + len(hand.lines) for hand in shapes._HANDS)
    assert kept > 200
    age = engine_text._memory.age
    assert engine_text._memory.lines
    for module, name in (
        (engine_styles, "_MOST_KINDS"),
        (engine_text, "_MOST_LINES"),
        (shapes, "_MOST_SHAPES"),
    ):
        monkeypatch.setattr(module, name, 1)
    shapes.forget_shapes()
    engine_text.forget_lines()
    assert all(not hand.shapes and not hand.lines for hand in shapes._HANDS)
    assert engine_text._memory.lines == 0
    assert engine_text._memory.age == age + 1
    assert render_pdf(sheet) == before
    assert render_pdf(sheet) == before
