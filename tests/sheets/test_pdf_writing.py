"""Objects of a PDF are written out as the library that makes them writes them."""

import zlib

import pydyf
import pytest

from generator.sheets.pdf_writing import write_out


def _file(*objects):
    pdf = pydyf.PDF()
    for item in objects:
        pdf.add_object(item)
    return pdf


@pytest.mark.parametrize(
    "value",
    [
        0,
        -7,
        0.5,
        2.0,
        -0.125,
        1e-7,
        "/Name",
        b"3 0 R",
        pydyf.String("a (b) \\ c"),
        pydyf.String("é"),
    ],
)
def test_a_value_is_written_as_the_library_writes_it(value):
    item = pydyf.Dictionary({"A": value, "B": pydyf.Array([value, pydyf.Dictionary({"C": value})])})
    wanted = item.data
    pdf = _file(item)
    write_out(pdf)
    assert pdf.objects[-1].data == wanted


def test_a_stream_can_be_unpacked_to_what_went_in():
    lines = [b"q", "1 0 0 RG", b"0 0 m", b"Q"] * 50
    packed, plain = pydyf.Stream(lines, {"N": 3}, compress=True), pydyf.Stream(lines)
    wanted = plain.data
    pdf = _file(packed, plain)
    write_out(pdf)
    head, rest = pdf.objects[-2].data.split(b"\nstream\n", 1)
    content = rest.removesuffix(b"\nendstream")
    assert zlib.decompress(content) == b"\n".join(map(pydyf._to_bytes, lines))
    assert f"/Length {len(content)}".encode() in head
    assert b"/N 3" in head
    assert pdf.objects[-1].data == wanted


def test_numbers_and_places_stay():
    item, stream = pydyf.Dictionary({"A": 1}), pydyf.Stream([b"q"])
    pdf = _file(item, stream)
    before = [(thing.number, thing.generation, thing.free) for thing in pdf.objects]
    write_out(pdf)
    assert [(thing.number, thing.generation, thing.free) for thing in pdf.objects] == before
    assert [thing.compressible for thing in pdf.objects[-2:]] == [True, False]
    assert pdf.objects[-2].reference == item.reference
