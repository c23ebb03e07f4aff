"""Tables that the sheets set themselves: rows, lines and structure as the engine has them."""

import pytest

from generator.sheets import pdf_engine
from generator.sheets.pdf_sheet import written_pdf
from tests.sheets.reading_pdfs import (
    figures_of,
    grey_of,
    languages_in,
    most_different,
    paper,
    structure_of,
    text_of,
    words_of,
)

LONG = "several words that take more than one line of a narrow cell"
LINES = "border:2px solid #000;padding:1mm"
DOT = (
    '<svg xmlns="http://www.w3.org/2000/svg" style="width:{0}px;height:9px" viewBox="0 0 24 9">'
    '<title>dot {0}</title><path d="M0 0L24 9L24 0Z" fill="#000000"/></svg>'
)


def _table(rows, head="", before="", style=""):
    top = f"<thead>{head}</thead>" if head else ""
    return f'<table style="{style}">{before}{top}<tbody>{rows}</tbody></table>'


def _row(*cells, style=""):
    return "<tr>" + "".join(f'<td style="{style}">{cell}</td>' for cell in cells) + "</tr>"


def _printed(body):
    document = pdf_engine("tender").lay_out(paper(body))
    boxes = [box for page in document.pages for box in page._page_box.descendants()]
    kinds = {type(box).__name__ for box in boxes}
    return [box for box in boxes if type(box).__name__ == "SetTable"], kinds, written_pdf(document)


def _aligned(how):
    big = f'<td style="font-size:18pt;{LINES}">big</td>'
    cells = f'<td style="vertical-align:{how};{LINES}">low</td><td style="{LINES}">{LONG}</td>'
    return _table(f"<tr>{big}{cells}</tr>", style="width:100%") + "<p>after</p>"


TABLES = {
    "plain": _table(_row("one", "two", LONG) + _row("four", "", "six")),
    "lines": _table(_row("one", "two", LONG, style=LINES) + _row("a", "b", "c", style=LINES)),
    "thick and thin": _table(
        _row("one", "two", style="border-bottom:4px solid #000;border-left:2px solid #000")
        + _row("three", "four", style="border-top:2px solid #000;border-right:6px solid #000")
    ),
    "head": _table(_row("a", "b"), "<tr><th>one</th><th>two</th></tr>", "<caption>Said</caption>"),
    "percent": _table(
        _row("one", "two", "three", style=LINES),
        before='<colgroup><col style="width:20%"><col style="width:50%"><col></colgroup>',
    ),
    "px": _table(
        _row("one", "two", "three", style=LINES),
        before='<colgroup><col style="width:90px"><col><col style="width:40mm"></colgroup>',
    ),
    "ground": _table(_row("one", "two", style=f"background:#808080;{LINES}") + _row("a", "b")),
    "verdicts": '<section class="lamp">'
    + _table(
        _row(
            *(
                f'<b class="verdict {kind}">{kind}</b> 80'
                for kind in ("pass", "fail", "inconclusive")
            )
        )
    )
    + "</section>",
    "drawing": _table(_row(DOT.format(24), "one") + _row(LONG, DOT.format(60)), style="width:100%"),
    "too wide a drawing": f'<div style="width:50px">{_table(_row(DOT.format(48), "one"))}</div>',
    **{how: _aligned(how) for how in ("baseline", "top", "middle", "bottom")},
}


@pytest.mark.parametrize("name", TABLES)
def test_a_table_looks_as_the_engine_sets_it(name, long_way):
    ours, kinds, data = _printed(TABLES[name])
    assert len(ours) == 1
    assert "TableBox" not in kinds
    plain = long_way(paper(TABLES[name]))
    found = [
        [(word.text, *(pytest.approx(edge, abs=0.01) for edge in word[1:])) for word in page]
        for page in words_of(data)
    ]
    assert [[tuple(word) for word in page] for page in words_of(plain)] == found
    # Filled lines and drawn ones, shares of a bar: edges differ; a lost line of 2 px makes 50.
    assert most_different(grey_of(data), grey_of(plain)) < 35


def test_a_lost_line_would_be_seen(long_way):
    whole = long_way(paper(TABLES["thick and thin"]))
    without = TABLES["thick and thin"].replace("border-left:2px solid #000", "")
    assert most_different(grey_of(whole), grey_of(long_way(paper(without)))) > 50


@pytest.mark.parametrize(
    "body",
    [
        _table('<tr><td rowspan="2">one</td><td>two</td></tr><tr><td>three</td></tr>'),
        _table('<tr><td colspan="2">one</td></tr><tr><td>two</td><td>three</td></tr>'),
        _table(_row("one", "two"), style="table-layout:auto"),
        _table(_row("one", "two"), style="border-collapse:separate"),
        _table(_row("one", "two"), style="border:1px solid #000"),
        _table(_row("one", "two"), style="width:60%"),
        _table('<tr style="background:#ccc"><td>one</td><td>two</td></tr>'),
        _table(_row("one", '<a href="https://example.org">two</a>')),
        _table(_row("one", "two", style="border-bottom:1px dotted #000")),
        _table(_row("one", "<p>two</p>")),
        _table("<tr><td>one</td><td>two</td></tr><tr><td>three</td></tr>"),
        f'<div style="float:left">{_table(_row("one", "two"))}</div>',
    ],
)
def test_what_is_not_plain_is_left_to_the_engine_and_printed(body, long_way):
    ours, kinds, data = _printed(body)
    assert not ours
    assert "TableBox" in kinds
    assert text_of(data) == text_of(long_way(paper(body)))
    assert text_of(data).startswith("one")


HEAD = f"<tr><th>{DOT.format(24)}</th><th>Heading</th></tr>"


@pytest.fixture(scope="module")
def long_table():
    rows = "".join(_row(f"name{at}", f"value{at}", style="padding:1mm 0") for at in range(120))
    return '<div style="height:60mm"></div>' + _table(rows, HEAD, "<caption>Many rows</caption>")


def test_a_table_over_pages_repeats_its_head_and_loses_no_row(long_table, long_way):
    ours, _, data = _printed(long_table)
    pages = [[word.text for word in page] for page in words_of(data)]
    assert len(ours) == len(pages) == 3
    assert [page.count("Heading") for page in pages] == [1, 1, 1]
    assert [page.count("rows") for page in pages] == [1, 0, 0]
    names = [text for page in pages for text in page if text.startswith("name")]
    assert names == [f"name{at}" for at in range(120)]
    plain = words_of(long_way(paper(long_table)))
    assert [[word.text for word in page] for page in plain] == pages
    for page, other in zip(words_of(data), plain, strict=True):
        tops = [word.top for word in other]
        assert [word.top for word in page] == pytest.approx(tops, abs=0.01)


def test_a_drawing_in_a_repeated_head_lies_where_it_is_painted(long_table, long_way):
    *_, data = _printed(long_table)
    places, plain = figures_of(data), figures_of(long_way(paper(long_table)))
    assert [len(page) for page in places] == [1, 1, 1]
    for page, other in zip(places, plain, strict=True):
        assert page[0] == pytest.approx(other[0], abs=0.01)
    assert places[0] != places[1]


def test_a_table_that_may_not_be_broken_moves_to_the_next_page():
    rows = "".join(_row(f"name{at}") for at in range(20))
    table = _table(rows, style="break-inside:avoid")
    _, _, data = _printed(f'<p>before</p><div style="height:230mm"></div>{table}')
    first, second = words_of(data)
    assert "name0" not in [word.text for word in first]
    assert [word.text for word in second[:20]] == [f"name{at}" for at in range(20)]


def test_the_structure_of_a_table_is_whole():
    head = "<tr><th>one</th><th>two</th></tr>"
    rows = f'<tr><th scope="row">three</th><td>{DOT.format(24)}</td></tr>' + _row("four", "five")
    *_, data = _printed(_table(rows, head, "<caption>Said</caption>"))
    table = [(kind, own) for _, kind, own in structure_of(data)][1:]
    column, row = {"/Scope": "/Column"}, {"/Scope": "/Row"}
    assert table == [
        ("Table", {}),
        ("Caption", {}),
        ("THead", {}),
        ("TR", {}),
        ("TH", column),
        ("TH", column),
        ("TBody", {}),
        ("TR", {}),
        ("TH", row),
        ("TD", {}),
        ("Figure", {"/Alt": "dot 24"}),
        ("TR", {}),
        ("TD", {}),
        ("TD", {}),
    ]


def test_the_language_of_a_part_is_in_the_file():
    body = (
        '<table lang="cs"><caption lang="de">Wort</caption><tbody lang="nl"><tr lang="pl">'
        '<td lang="it">parola</td><td>s\u0142owo <b lang="fr">mot</b></td></tr></tbody></table>'
    )
    *_, data = _printed(body)
    assert languages_in(data) == [
        ("Table", "cs"),
        ("Caption", "de"),
        ("TBody", "nl"),
        ("TR", "pl"),
        ("TD", "it"),
        ("words in /Span", "fr"),
    ]
