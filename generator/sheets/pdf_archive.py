"""What an archival, accessible PDF needs beyond the engine: PDF/A-3a with a PDF/UA-1 claim.

Source: iso_19005_3 and iso_14289_1. The engine writes one variant only and leaves six things
undone; they are mended before the file is serialised.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from generator.sheets.pdf_writing import write_out

__all__ = ["ACCESSIBILITY_CLAIM", "finish_archive"]

ACCESSIBILITY_CLAIM = b"""
<rdf:Description rdf:about="" xmlns:pdfuaid="http://www.aiim.org/pdfua/ns/id/">
<pdfuaid:part>1</pdfuaid:part>
</rdf:Description>
<rdf:Description rdf:about="" xmlns:pdfaExtension="http://www.aiim.org/pdfa/ns/extension/"
 xmlns:pdfaSchema="http://www.aiim.org/pdfa/ns/schema#"
 xmlns:pdfaProperty="http://www.aiim.org/pdfa/ns/property#">
<pdfaExtension:schemas><rdf:Bag><rdf:li rdf:parseType="Resource">
<pdfaSchema:schema>PDF/UA identification</pdfaSchema:schema>
<pdfaSchema:namespaceURI>http://www.aiim.org/pdfua/ns/id/</pdfaSchema:namespaceURI>
<pdfaSchema:prefix>pdfuaid</pdfaSchema:prefix>
<pdfaSchema:property><rdf:Seq><rdf:li rdf:parseType="Resource">
<pdfaProperty:name>part</pdfaProperty:name>
<pdfaProperty:valueType>Integer</pdfaProperty:valueType>
<pdfaProperty:category>internal</pdfaProperty:category>
<pdfaProperty:description>Part of the accessibility standard</pdfaProperty:description>
</rdf:li></rdf:Seq></pdfaSchema:property>
</rdf:li></rdf:Bag></pdfaExtension:schemas>
</rdf:Description>
"""
"""Goes inside the one ``rdf:RDF`` of the metadata, with the schema that describes it."""

_PT_PER_PX = 0.75
_STREAM_ENDS = b"\nendstream\nendobj"


def finish_archive(document: Any, pdf: Any) -> None:
    """Mend the file before it is written; handed to the engine as its finisher.

    Parameters
    ----------
    document
        The rendered document of the engine.
    pdf
        The file about to be written.
    """
    del document
    _plain_metadata(pdf)
    _listed_once(pdf)
    _scoped_headings(pdf)
    _placed_figures(pdf)
    _direct_items(pdf)
    _told_ends(pdf)
    write_out(pdf)


def _dictionaries(pdf: Any) -> Iterator[Any]:
    return (item for item in pdf.objects if isinstance(item, dict))


def _resolved(pdf: Any, reference: Any) -> Any:
    """The object behind ``7 0 R``."""
    text = reference.decode() if isinstance(reference, bytes) else str(reference)
    return pdf.objects[int(text.split()[0])]


def _plain_metadata(pdf: Any) -> None:
    """Leave the metadata uncompressed, so that it can be read without a PDF library."""
    for item in pdf.objects:
        extra = getattr(item, "extra", None)
        if isinstance(extra, dict) and extra.get("Type") == "/Metadata":
            item.compress = False


def _listed_once(pdf: Any) -> None:
    """List every attachment once in the catalogue."""
    listed = pdf.catalog.get("AF")
    if listed is not None:
        listed[:] = list(dict.fromkeys(listed))


def _scoped_headings(pdf: Any) -> None:
    """Say of every heading cell whether it heads a row or a column."""
    for item in _dictionaries(pdf):
        if item.get("S") != "/TH":
            continue
        row = _resolved(pdf, item["P"])
        part = _resolved(pdf, row["P"])
        scope = "/Column" if part.get("S") == "/THead" else "/Row"
        item["A"]["Scope"] = scope


def _placed_figures(pdf: Any) -> None:
    """Give the place of every figure in the units of the page, from its lower left corner."""
    for item in _dictionaries(pdf):
        attributes = item.get("A")
        if item.get("S") != "/Figure" or attributes is None or "BBox" not in attributes:
            continue
        page = _resolved(pdf, item["Pg"])
        height = float(page["MediaBox"][3])
        x1, y1, x2, y2 = (float(edge) * _PT_PER_PX for edge in attributes["BBox"])
        attributes["BBox"][:] = [
            round(x1, 2),
            round(height - y2, 2),
            round(x2, 2),
            round(height - y1, 2),
        ]


def _direct_items(pdf: Any) -> None:
    """Let lists hold items and bodies of tables hold rows, without a box of the layout between.

    A list in columns has one box a column; a body without a row holds bodies.
    """
    boxes = {"/L": ("/Div", "/NonStruct"), "/TBody": ("/TBody",)}
    elements = [item for item in _dictionaries(pdf) if item.get("S") in boxes]
    for item in elements:
        between = boxes[item["S"]]
        item["K"][:] = _without(pdf, item, between)
    for item in elements:
        if item["S"] == "/L":
            _take_in_strays(pdf, item)


def _without(pdf: Any, parent: Any, between: tuple[str, ...]) -> list[Any]:
    """The kids of an element, those of its boxes taken in."""
    kids: list[Any] = []
    for reference in parent["K"]:
        kid = _resolved(pdf, reference)
        if kid.get("S") in between:
            kids += _without(pdf, kid, between)
            kid["K"][:] = []
        else:
            kids.append(reference)
    for reference in kids:
        _resolved(pdf, reference)["P"] = parent.reference
    return kids


def _take_in_strays(pdf: Any, parent: Any) -> None:
    """Give the spaces between the items of a list to the item before them."""
    kids: list[Any] = []
    for reference in parent["K"]:
        kid = _resolved(pdf, reference)
        if kid.get("S") == "/Span" and kids:
            body = _resolved(pdf, _resolved(pdf, kids[-1])["K"][-1])
            body["K"].append(reference)
            kid["P"] = body.reference
        else:
            kids.append(reference)
    parent["K"][:] = kids


def _told_ends(pdf: Any) -> None:
    """End each stream so that its length can be told from its end alone.

    The engine ends the line before ``endstream`` with a line feed; after data that end in a
    carriage return that reads as one ending of two bytes. Such a stream gets both bytes.
    It is done as lines are written, since the streams of packed objects are made only then.
    Source: iso_19005_3, clause 6.1.7.1.
    """
    plain = pdf.write_line

    def told(content: bytes, output: Any) -> None:
        plain(_doubled_end(content), output)

    pdf.write_line = told


def _doubled_end(content: bytes) -> bytes:
    """An object as it is written; nothing but a stream ends so."""
    if not content.endswith(b"\r" + _STREAM_ENDS):
        return content
    return content.removesuffix(_STREAM_ENDS) + b"\r" + _STREAM_ENDS
