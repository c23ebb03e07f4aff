"""The PDF: pages, words, structure, equal bytes, nothing from outside."""

import dataclasses
import hashlib
import io
import re
import subprocess
import sys

import pikepdf
import pydyf
import pytest

from generator.errors import SheetError
from generator.sheets import (
    SheetAttachment,
    describe_comparison,
    describe_lamp,
    pdf_engine,
    pdf_engine_missing,
    render_html,
    render_pdf,
)
from generator.sheets.description import Note
from generator.sheets.html_sheet import render_paper
from generator.sheets.paper_fit import REST, Trials, fitted
from generator.sheets.paper_tree import page_tree
from generator.sheets.pdf_archive import finish_archive
from generator.sheets.pdf_sheet import MOST_LAMP_PAGES, MOST_SHORT_PAGES


@pytest.fixture(scope="module")
def lamp_sheet(invented_assessment, invented_context):
    return describe_lamp(invented_assessment, "L-01", invented_context)


@pytest.fixture(scope="module")
def lamp_pdf(lamp_sheet):
    table = SheetAttachment("figures.csv", b"a,b\n1,2\n", "figures of the lamp")
    note = SheetAttachment("a-note.csv", b"c\n3\n", "a note", "Supplement")
    return render_pdf(lamp_sheet, attachments=[table, note])


@pytest.fixture(scope="module")
def opened(lamp_pdf):
    with pikepdf.open(io.BytesIO(lamp_pdf)) as pdf:
        yield pdf


def _unicode_map(font):
    text = font.ToUnicode.read_bytes().decode()
    pairs = {}
    for block in re.findall(r"beginbfchar(.*?)endbfchar", text, re.DOTALL):
        pairs |= dict(re.findall(r"<(\w+)>\s*<(\w+)>", block))
    for block in re.findall(r"beginbfrange(.*?)endbfrange", text, re.DOTALL):
        for low, high, first in re.findall(r"<(\w+)>\s*<(\w+)>\s*<(\w+)>", block):
            for step in range(int(high, 16) - int(low, 16) + 1):
                pairs[f"{int(low, 16) + step:04x}"] = f"{int(first, 16) + step:04x}"
    return {
        int(code, 16): bytes.fromhex(value).decode("utf-16-be") for code, value in pairs.items()
    }


def _words(pdf):
    """The text of the pages without white space, decoded through the fonts' own maps."""
    written = []
    for page in pdf.pages:
        fonts = {name: _unicode_map(font) for name, font in page.Resources.Font.items()}
        current = {}
        for operands, operator in pikepdf.parse_content_stream(page):
            if str(operator) == "Tf":
                current = fonts[str(operands[0])]
            elif str(operator) in {"TJ", "Tj"}:
                runs = operands[0] if str(operator) == "TJ" else operands
                for run in runs:
                    if isinstance(run, pikepdf.String):
                        raw = bytes(run)
                        codes = (int.from_bytes(raw[at : at + 2]) for at in range(0, len(raw), 2))
                        written += [current.get(code, "\ufffd") for code in codes]
    return re.sub(r"\s", "", "".join(written))


def _structure(pdf):
    stack = [pdf.Root.StructTreeRoot]
    while stack:
        node = stack.pop()
        if isinstance(node, pikepdf.Dictionary):
            if "/S" in node:
                yield node
            if "/K" in node:
                stack.append(node.K)
        elif isinstance(node, pikepdf.Array):
            stack += list(node)


def test_engine_is_here():
    assert pdf_engine_missing() is None


def test_a_lamp_takes_four_pages_of_a4_at_the_most(opened):
    assert len(opened.pages) <= MOST_LAMP_PAGES == 4
    for page in opened.pages:
        width, height = (float(edge) for edge in page.mediabox[2:])
        assert (width, height) == pytest.approx((595.276, 841.89), abs=0.01)  # A4, ISO 216


def test_the_short_form_takes_two_pages_of_a4(lamp_sheet):
    frame = dataclasses.replace(lamp_sheet.frame, short=True)
    short = dataclasses.replace(_crowded(lamp_sheet, 2), frame=frame)
    with pikepdf.open(io.BytesIO(render_pdf(short))) as pdf:
        assert len(pdf.pages) == MOST_SHORT_PAGES == 2
        words = _words(pdf)
    for heading in ("Verdictbyclause", "Whatthemeasurementsshow", "Cautions", "Sources"):
        assert heading in words
    assert "Thisistheshortform." in words
    assert "Unitsandspread" not in words


def test_page_and_paper_say_the_same(lamp_sheet, opened):
    words = _words(opened)
    assert "\ufffd" not in words
    page = render_html(lamp_sheet)
    said = [item.figure.number for item in lamp_sheet.headlines]
    for group in lamp_sheet.verdicts:
        said += [group.heading]
        for clause in group.clauses:
            said += [clause.title, clause.place, clause.limit]
            for row in clause.verdicts:
                said += [row.word, row.value]
    said += [text for row in lamp_sheet.declared for text in (row.declared, row.difference)]
    said += [text for row in lamp_sheet.units.summary for text in row]
    said += [lamp_sheet.statements.decision, lamp_sheet.findings[0].compared]
    said += [lamp_sheet.verdict_sentence, *(item.text for item in lamp_sheet.frame.cautions)]
    said += [
        lamp_sheet.frame.assessed_words,
        lamp_sheet.frame.version,
        lamp_sheet.energy_class.words,
    ]
    for text in said:
        assert re.sub(r"\s", "", text) in words
        assert text.replace("&", "&amp;") in page


def test_numbers_stand_beside_the_right_clause(opened):
    assert "Stroboscopiceffect,SVM" in _words(opened)
    assert re.search(r"Stroboscopiceffect,SVM.{0,80}≤0\.4–fail1\.62±0\.04−1\.22", _words(opened))


def test_archive_and_accessibility_are_claimed_once(opened):
    metadata = opened.Root.Metadata
    assert "/Filter" not in metadata
    text = metadata.read_bytes().decode()
    assert text.count("<rdf:RDF") == 1
    with opened.open_metadata() as claimed:
        assert claimed["pdfaid:part"] == "3"
        assert claimed["pdfaid:conformance"] == "A"
        assert claimed["pdfuaid:part"] == "1"
    assert str(opened.Root.Lang) == "en"
    assert bool(opened.Root.MarkInfo.Marked)
    assert bool(opened.Root.ViewerPreferences.DisplayDocTitle)
    assert str(opened.docinfo.Title).startswith("Harbour 806")
    assert str(opened.docinfo.CreationDate).startswith("D:20261130")


def test_syntax_is_sound(opened):
    assert opened.check_pdf_syntax() == []


def test_structure_is_complete(opened):
    nodes = list(_structure(opened))
    figures = [node for node in nodes if node.S == "/Figure"]
    assert len(figures) > 15
    height = 841.89
    for node in figures:
        assert str(node.Alt).strip()
        left, low, right, high = (float(edge) for edge in node.A.BBox)
        assert 0 <= left < right <= 596
        assert 0 <= low < high <= height + 0.1
    headings = [node for node in nodes if node.S == "/TH"]
    assert {str(node.A.Scope) for node in headings} == {"/Column", "/Row"}
    tables = [node for node in nodes if node.S == "/Table"]
    assert len(tables) == 4
    for table in tables:
        rows = [node for part in table.K if part.S in {"/THead", "/TBody"} for node in part.K]
        assert len({len(row.K) for row in rows}) == 1


def test_only_bundled_faces_are_embedded(opened):
    names = set()
    for page in opened.pages:
        for font in page.Resources.Font.values():
            inner = font.DescendantFonts[0]
            assert "/FontFile2" in inner.FontDescriptor
            names.add(str(inner.BaseFont).split("+", 1)[1])
    assert all(re.match("Sheet-?Sans|Fira-?Sans", name) for name in names), names


def test_nothing_runs_and_no_path_of_the_machine_is_in_it(lamp_pdf, opened):
    assert "/OpenAction" not in opened.Root
    assert b"file:" not in lamp_pdf
    assert b"/JavaScript" not in lamp_pdf
    links = [
        str(note.A.URI) for page in opened.pages for note in page.get("/Annots", []) if "/A" in note
    ]
    assert links == ["https://example.org/report"]


def test_attachments_are_whole_sorted_and_listed_once(opened):
    assert list(opened.attachments) == ["a-note.csv", "figures.csv"]
    assert opened.attachments["figures.csv"].get_file().read_bytes() == b"a,b\n1,2\n"
    assert len(opened.Root.AF) == 2
    kinds = {str(item.UF): str(item.AFRelationship) for item in opened.Root.AF}
    assert kinds == {"a-note.csv": "/Supplement", "figures.csv": "/Data"}


def test_same_bytes_again_and_in_another_process(lamp_sheet):
    first = render_pdf(lamp_sheet)
    assert render_pdf(lamp_sheet) == first
    program = (
        "import sys, pickle, hashlib\n"
        "from generator.sheets import render_pdf\n"
        "sheet = pickle.loads(sys.stdin.buffer.read())\n"
        "print(hashlib.sha256(render_pdf(sheet)).hexdigest())\n"
    )
    import pickle

    other = subprocess.run(
        [sys.executable, "-c", program],
        input=pickle.dumps(lamp_sheet),
        capture_output=True,
        check=True,
        env={"PYTHONHASHSEED": "7", "TZ": "Asia/Tokyo", "HOME": "/nonexistent", "PATH": "/usr/bin"},
    )
    assert other.stdout.decode().strip() == hashlib.sha256(first).hexdigest()


def test_engine_fetches_nothing_but_its_faces():
    engine = pdf_engine("tender")
    from weasyprint.urls import FatalURLFetchingError

    for outside in ("https://example.org/a.png", "file:///etc/hostname", "data:,x"):
        page = f'<html lang="en"><title>t</title><img alt="x" src="{outside}"></html>'
        with pytest.raises(FatalURLFetchingError):
            engine.lay_out(page)


def _crowded(sheet, times):
    group = sheet.verdicts[0]
    clauses = tuple(dataclasses.replace(clause) for clause in group.clauses * times)
    return dataclasses.replace(sheet, verdicts=(dataclasses.replace(group, clauses=clauses),))


def test_an_overfull_sheet_is_folded_and_says_so(lamp_sheet):
    notes = (Note(f"<p>{'Long remark. ' * 60}</p>", 780),) * 6
    sheet = dataclasses.replace(_crowded(lamp_sheet, 9), notes=notes)
    with pikepdf.open(io.BytesIO(render_pdf(sheet))) as pdf:
        assert len(pdf.pages) <= MOST_LAMP_PAGES
        words = _words(pdf)
    assert "FurtherverdictsontheHTMLsheet" in words
    assert "TheremarkscontinueontheHTMLsheet." in words


def test_page_one_stands_alone(lamp_sheet):
    engine = pdf_engine("tender")
    page = render_paper(fitted(_crowded(lamp_sheet, 2), REST[0]), dense=True)
    pages = engine.lay_out(page).pages
    assert "verdicts" in pages[0].anchors
    assert set(pages[1].anchors) >= {"behind", "drawings"}


def test_a_failed_clause_is_folded_last(lamp_sheet):
    most = len(lamp_sheet.verdicts[0].clauses) - 3
    folded = fitted(lamp_sheet, dataclasses.replace(REST[-1], rows=most))
    marks = [clause.mark for group in folded.verdicts for clause in group.clauses]
    assert len(marks) == most
    assert "fail" in marks
    assert "inconclusive" in marks
    # Three clauses, one of them judged on both bases.
    assert folded.verdicts[0].folded == "Further verdicts on the HTML sheet: 4 pass."


def test_what_is_left_out_is_counted(lamp_sheet):
    folded = fitted(lamp_sheet, dataclasses.replace(REST[-1], rows=8))
    assert folded.folded == (
        "Further drawings on the HTML sheet: 7.",
        "Further methods on the HTML sheet: 1.",
        "Further notes on the verdicts on the HTML sheet: 2.",
    )


@pytest.mark.parametrize("theme", ["laboratory", "stewardship"])
def test_other_themes_fit_their_pages_too(lamp_sheet, theme):
    dressed = dataclasses.replace(
        lamp_sheet, frame=dataclasses.replace(lamp_sheet.frame, theme=theme)
    )
    with pikepdf.open(io.BytesIO(render_pdf(dressed))) as pdf:
        assert len(pdf.pages) <= MOST_LAMP_PAGES
        words = _words(pdf)
    assert re.sub(r"\s", "", lamp_sheet.verdict_sentence) in words


def test_uncovered_characters_are_printed_as_their_code_point(
    invented_assessment, invented_context
):
    sheet = describe_lamp(invented_assessment, "L-03", invented_context)
    with pikepdf.open(io.BytesIO(render_pdf(sheet))) as pdf:
        assert "Plain[U+4E2D]lamp<b>&" in _words(pdf)


def test_comparison_on_paper(invented_assessment, invented_context):
    sheet = describe_comparison(invented_assessment, invented_context)
    with pikepdf.open(io.BytesIO(render_pdf(sheet))) as pdf:
        words = _words(pdf)
        width, height = (float(edge) for edge in pdf.pages[0].mediabox[2:])
    assert width > height
    for row in sheet.rows:
        assert re.sub(r"\s", "", row.bidder or row.lamp_id) in words
        assert all(re.sub(r"\s", "", cell.number) in words for cell in row.cells)


def test_missing_libraries_are_named_with_their_cure(monkeypatch):
    import builtins

    real = builtins.__import__

    def refusing(name, *arguments, **named):
        if name == "weasyprint":
            print("a banner")
            raise OSError("cannot load library 'libpango-1.0-0'")
        return real(name, *arguments, **named)

    pdf_engine_missing.cache_clear()
    monkeypatch.setattr(builtins, "__import__", refusing)
    try:
        reason = pdf_engine_missing()
        assert reason is not None
        assert "apt install libpango-1.0-0" in reason
        assert "\n" not in reason
        from generator.sheets.pdf_sheet import PdfEngine

        with pytest.raises(SheetError, match="Pango"):
            PdfEngine("tender")
    finally:
        pdf_engine_missing.cache_clear()


def test_every_drawing_of_the_comparison_is_a_drawing_to_the_engine(
    invented_assessment, invented_context
):
    page = render_paper(describe_comparison(invented_assessment, invented_context))
    drawn = [element.tag for element in page_tree(page).iter() if element.tag.endswith("svg")]
    assert len(drawn) == page.count("<svg ") > 3
    assert set(drawn) == {"{http://www.w3.org/2000/svg}svg"}


@pytest.mark.parametrize("compress", [False, True])
def test_length_of_a_stream_can_be_told_from_its_end(compress):
    # ISO 19005-3, 6.1.7.1: the length is that up to the end of line before ``endstream``.
    pdf = pydyf.PDF()
    for place in range(600):
        pdf.add_object(pydyf.Stream([f"{place}\r"], compress=compress))
    finish_archive(None, pdf)
    written = io.BytesIO()
    pdf.write(written, version=b"1.7", compress=compress)
    told = re.findall(
        rb"/Length (\d+)[^>]*>>\nstream\n(.*?)(?:\r\n|\n)endstream\nendobj",
        written.getvalue(),
        re.DOTALL,
    )
    assert len(told) >= 600
    assert all(int(length) == len(data) for length, data in told)
    with pikepdf.open(written) as again:
        assert len(again.objects) >= len(told)


def test_a_sheet_is_tightened_where_it_was_too_full(lamp_sheet):
    short = dataclasses.replace(lamp_sheet, frame=dataclasses.replace(lamp_sheet.frame, short=True))
    trials = Trials(short)
    whole = trials.budget
    trials.tighten(page_one=True)
    fewer = trials.budget
    assert fewer.rows < whole.rows
    assert fewer == dataclasses.replace(whole, rows=fewer.rows)
    trials.tighten(page_one=False)
    assert trials.budget.rows == fewer.rows
    assert trials.budget.drawings < fewer.drawings
    for _ in range(9):
        trials.tighten(page_one=True)
    assert trials.budget is None
