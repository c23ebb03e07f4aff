"""Paragraphs that the sheets set themselves: words, places and languages as the engine has them."""

import io

import pikepdf
import pytest

from generator.sheets import pdf_engine
from generator.sheets.pdf_sheet import written_pdf
from tests.sheets.reading_pdfs import (
    grey_of,
    languages_in,
    most_different,
    paper,
    structure_of,
    text_of,
    words_of,
)

WORDS = "Every word of this text is set in a line by the sheets, and no word of it is lost. "
DOT = (
    '<svg xmlns="http://www.w3.org/2000/svg" style="display:inline-block" width="9" height="9" '
    'viewBox="0 0 9 9"><title>dot</title><path d="M0 0L9 9L9 0Z" fill="#000000"/></svg>'
)


def _laid_out(page):
    document = pdf_engine("tender").lay_out(page)
    boxes = [box for leaf in document.pages for box in leaf._page_box.descendants()]
    return document, [box for box in boxes if type(box).__name__ == "SetParagraph"]


def _printed(body, style=""):
    document, ours = _laid_out(paper(body, style))
    return ours, written_pdf(document)


def _text(box):
    return "".join(piece.run.text for line in box.lines for piece in line.stretches)


def _places(data):
    """The words with their places, to a hundredth of a point, page by page."""
    return [
        [(word.text, *(pytest.approx(edge, abs=0.01) for edge in word[1:])) for word in page]
        for page in words_of(data)
    ]


def _plain(data):
    return [[tuple(word) for word in page] for page in words_of(data)]


@pytest.mark.parametrize(
    "body",
    [
        "<p>  one \n\t two <b> three </b> four <em> </em> five</p>",
        "<p>one<br>two <br> three<br><br>four</p>",
        "<p><br>one</p><p>two<br></p><p>three</p>",
        f'<p style="width:40mm">{WORDS}<span style="white-space:nowrap">stay with me</span></p>',
        f'<p style="white-space:nowrap;width:40mm">{WORDS}</p>',
        f'<p style="text-align:right;width:60mm">{WORDS}</p>',
        f'<p style="text-align:center;width:60mm">{WORDS}<b>{WORDS}</b></p>',
        f'<p style="padding:3mm;border:1px solid #000;background:#ccc;margin:2mm">{WORDS * 3}</p>',
        f'<p style="width:50mm">a <b style="font-size:20pt;line-height:2">{WORDS}</b>{WORDS}</p>',
        f'<p style="width:50%;margin-left:10%">{WORDS * 3}</p>',
        f'<p style="max-width:50%">{WORDS * 3}</p>',
        '<p>a</p><p></p><p style="margin:5mm 0"> </p><p>b</p><p style="padding:2mm"></p><p>c</p>',
        '<div style="margin:4mm 0"><p style="margin:3mm 0">a</p><p style="margin:6mm">b</p></div>',
        f'<ul style="list-style:none"><li>{WORDS}</li></ul>',
        f'<dl class="cautions"><div><dt>Term.</dt> <dd>{WORDS * 2}</dd></div></dl>',
        f'<div style="columns:2;column-gap:5mm"><p>{WORDS * 9}</p><p>{WORDS}</p></div>',
        f'<div style="float:left;width:50mm"><p>{WORDS}</p></div><p style="clear:left">x</p>',
        '<p style="width:20mm">one\u00a0two\u00a0three four\u2011five six-seven eight/nine</p>',
        '<p style="width:40mm">a x\u030c q\u0303 after and some more words for a line</p>',
    ],
)
def test_words_stand_where_the_engine_puts_them(body, long_way):
    ours, data = _printed(body)
    plain = long_way(paper(body))
    assert ours
    assert _plain(plain) == _places(data)
    assert most_different(grey_of(data), grey_of(plain)) < 10


def test_white_space_collapses_into_one_blank():
    (box,), _ = _printed("<p> one \n\t two<b> three </b> four <em> </em> </p>")
    assert _text(box) == "one two three four"


def test_a_stretch_without_breaks_stays_on_one_line_and_two_may_part():
    keep = 'style="white-space:nowrap"'
    body = f'<p style="width:30mm">x <b {keep}>aa bb cc dd</b> <b {keep}>ee ff gg hh</b></p>'
    (box,), data = _printed(body)
    tops = {word.text: word.top for word in words_of(data)[0]}
    assert len({tops[name] for name in ("aa", "bb", "cc", "dd")}) == 1
    assert len({tops[name] for name in ("ee", "ff", "gg", "hh")}) == 1
    assert tops["ee"] > tops["aa"]
    assert len(box.lines) == 2


@pytest.mark.parametrize("filled", range(238, 262, 3))
@pytest.mark.parametrize(
    ("style", "parts"),
    [("", 2), ("orphans:3;widows:4;margin:2mm 0;padding:1mm 0", 2), ("break-inside:avoid", 1)],
)
def test_a_paragraph_breaks_over_pages_as_it_should(filled, style, parts):
    body = f'<div style="height:{filled}mm"></div><p style="{style}">{WORDS * 13}</p>'
    document, boxes = _laid_out(paper(body))
    whole = boxes[0].paragraph.lines(boxes[0].width)
    assert [line for box in boxes for line in box.lines] == whole
    assert len(whole) == 7
    assert len(document.pages) <= 2
    assert 1 <= len(boxes) <= parts
    if len(boxes) == 2:
        first, second = boxes
        assert len(first.lines) >= first.style["orphans"]
        assert len(second.lines) >= first.style["widows"]


def test_no_word_is_lost_between_two_pages():
    _, data = _printed(f'<div style="height:252mm"></div><p>{WORDS * 9}</p>')
    first, second = words_of(data)
    assert [word.text for word in (*first[:-3], *second[:-3])] == (WORDS * 9).split()


def test_words_beside_a_float_stay_in_their_room():
    body = (
        '<div style="float:left;width:50mm;height:30mm;margin-right:4mm"></div>'
        f'<p style="margin:0">{WORDS * 3}</p>'
    )
    ours, data = _printed(body)
    words = words_of(data)[0][:-3]
    assert ours
    start = min(word.left for word in words)
    assert start > (14 + 50 + 3.9) / 25.4 * 72 - 1
    assert max(word.right for word in words) < (210 - 14) / 25.4 * 72 + 0.1


@pytest.mark.parametrize(
    "body",
    [
        "<p>see there \u05e9\u05dc\u05d5\u05dd</p>",
        '<p>see <a href="https://example.org">there</a></p>',
        f"<p>see {DOT} there</p>",
        '<p style="text-align:justify">see there</p>',
        '<p style="letter-spacing:2pt">see there</p>',
        '<p style="text-transform:uppercase">see there</p>',
        '<p style="text-indent:5mm">see there</p>',
        '<p style="text-decoration:underline">see there</p>',
        '<p style="position:relative">see there</p>',
        '<p style="height:20mm">see there</p>',
        '<p style="direction:rtl">see there</p>',
        '<p>see <b style="background:#ccc">there</b></p>',
        '<p>see <b style="vertical-align:super">there</b></p>',
        '<div style="display:flex"><p>see </p><p>there</p></div>',
        '<div style="display:inline-block"><p>see there</p></div>',
        '<div style="float:left"><p>see there</p></div>',
        "<style>p::first-letter{font-size:30pt}</style><p>see there</p>",
        "<style>p::after{content:' end'}</style><p>see there</p>",
    ],
)
def test_what_is_not_plain_is_left_to_the_engine_and_printed(body, long_way):
    ours, data = _printed(body)
    assert not ours
    # A letter that stands apart may be read as a word of its own.
    printed = text_of(data).replace(" ", "")
    assert printed == text_of(long_way(paper(body))).replace(" ", "")
    assert "see" in printed.lower()


def test_a_soft_hyphen_is_printed_where_the_line_ends():
    ours, data = _printed('<p style="width:10mm;font-size:20pt">hyphen\u00adated</p>')
    assert not ours
    assert text_of(data).startswith("hyphen\u2010 ated")


def test_a_number_before_the_words_goes_on_counting(long_way):
    style = (
        "h2{counter-reset:k} p{counter-increment:k} p::before{content:counter(k) '. '}"
        "h2::before{content:none}"
    )
    body = "<h2>a</h2><p>one</p><p>two</p><h2>b</h2><p>three</p>"
    ours, data = _printed(body, style)
    assert len([box for box in ours if box.element_tag == "p"]) == 3
    assert "1. one 2. two" in text_of(data)
    assert "1. three" in text_of(data)
    assert text_of(data) == text_of(long_way(paper(body, style)))


def test_the_language_of_a_part_is_in_the_file():
    _, data = _printed(
        '<p lang="de">Wort <b lang="fr">mot</b></p><h2 lang="es">palabra</h2>'
        '<dl class="cautions"><div><dt lang="it">Parola.</dt> <dd lang="pl">s\u0142owo</dd></div>'
        "</dl>"
    )
    assert set(languages_in(data)) == {
        ("P", "de"),
        ("words in /Span", "fr"),
        ("words in /Span", "it"),
        ("words in /Span", "pl"),
        ("H2", "es"),
        ("Lbl", "it"),
        ("LBody", "pl"),
    }


def test_a_language_that_is_none_cannot_write_into_the_page():
    body = '<p>word <span lang="x) &gt;&gt; BDC (y">mot</span> end</p>'
    _, data = _printed(body)
    with pikepdf.open(io.BytesIO(data)) as pdf:
        operators = [str(item.operator) for item in pikepdf.parse_content_stream(pdf.pages[0])]
    assert operators.count("BDC") + operators.count("BMC") == operators.count("EMC")


def test_a_page_says_its_language_once():
    _, data = _printed("<p>word</p><div><p>word</p></div>")
    assert languages_in(data) == []


def test_a_term_and_what_is_said_of_it_are_one_item():
    _, data = _printed('<dl class="cautions"><div><dt>Term.</dt> <dd>said</dd></div></dl>')
    kinds = [kind for _, kind, _ in structure_of(data)]
    assert " ".join(kinds).endswith("LI Lbl LBody")
