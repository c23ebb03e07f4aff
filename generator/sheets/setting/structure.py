"""The structure of set paragraphs and tables in the file: what the marked content stands for.

Source: iso_14289_1, clause 7, and ISO 32000-1, 14.7 and 14.8.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import pydyf

from generator.sheets.setting.table import Cell, Row

__all__ = ["PageStructure", "Part"]

_Places = Mapping[Cell, tuple[float, ...]]


class Part(pydyf.Object):  # type: ignore[misc] # the library has no types
    """An element of the structure of a table: as much as a reader needs, and no more.

    Parameters
    ----------
    kind
        Its type of structure.
    parent
        Reference of the element above it.
    more
        What else is said of it, as it is written.
    """

    def __init__(self, kind: str, parent: bytes, more: bytes = b"") -> None:
        super().__init__()
        self._kind, self._parent, self._more = kind.encode(), parent, more
        self._kids: list[bytes] = []

    @property
    def data(self) -> bytes:
        """The element as it is written."""
        kids = b" ".join(self._kids)
        return b"<</S /%b/P %b%b/K [%b]>>" % (self._kind, self._parent, self._more, kids)

    def adopt(self, kid: bytes) -> None:
        """Take in an element or marked content."""
        self._kids.append(kid)


class PageStructure:
    """Makes the elements of the structure of one page.

    Parameters
    ----------
    pdf
        The file of the engine.
    number
        Number of the page, from 0.
    nums
        Marked content of the page, and what it belongs to; filled here.
    tags
        Marked content that was painted; what is placed is taken out.
    """

    def __init__(self, pdf: Any, number: int, nums: Any, tags: Any) -> None:
        self._pdf, self._nums, self._tags = pdf, nums, tags
        self._page = pdf.page_references[number]

    def element(self, kind: str, parent: Any, source: Any = None, *, adopted: bool = True) -> Any:
        """Make an element below another, in the language of the part that it comes from.

        Parameters
        ----------
        kind
            Its type of structure.
        parent
            The element above it.
        source
            The part of the page it comes from.
        adopted
            Whether to enter it there.
        """
        made = pydyf.Dictionary(
            {
                "S": f"/{kind}",
                "K": pydyf.Array([]),
                "Pg": self._page,
                "P": parent.reference,
            }
        )
        self._pdf.add_object(made)
        if source is not None and "lang" in source.attrib:
            made["Lang"] = pydyf.String(source.attrib["lang"])
        if adopted:
            parent["K"].append(made.reference)
        return made

    def content(self, element: Any, painted: Any) -> None:
        """Place what was painted.

        Parameters
        ----------
        element
            Where it belongs.
        painted
            What it was marked with.
        """
        kid = self._tags.pop(painted, None)
        if kid is not None:
            element["K"].append(kid["mcid"])
            self._nums[kid["mcid"]] = element.reference

    def part(self, kind: str, parent: Any, source: Any = None, more: bytes = b"") -> Part:
        """Make an element of a table, in the language of the part that it comes from.

        Parameters
        ----------
        kind
            Its type of structure.
        parent
            The element above it.
        source
            The part of the page it comes from.
        more
            What else is said of it, as it is written.
        """
        if source is not None and "lang" in source.attrib:
            more += b"/Lang " + bytes(pydyf.String(source.attrib["lang"]).data)
        made = Part(kind, parent.reference, more)
        self._pdf.add_object(made)
        if isinstance(parent, Part):
            parent.adopt(made.reference)
        else:
            parent["K"].append(made.reference)
        return made

    def row(self, parent: Any, row: Row, drawn: _Places, *, heads: bool) -> None:
        """Make a row of a table, and its cells.

        Parameters
        ----------
        parent
            Head or body of the table.
        row
            The row.
        drawn
            Where the drawings in cells lie on this page: left, top, right, bottom [px].
        heads
            Whether it stands in the head.
        """
        made = self.part("TR", parent, row.element)
        scope = b"Column" if heads else b"Row"
        head = b"/A <</O /Table/Scope /%b>>/Pg %b" % (scope, self._page)
        for cell in row.cells:
            is_heading = cell.element.tag == "th"
            more = head if is_heading else b"/Pg %b" % self._page
            holder = self.part("TH" if is_heading else "TD", made, cell.element, more)
            self._fill(holder, cell, drawn)

    def _fill(self, holder: Part, cell: Cell, drawn: _Places) -> None:
        if cell.drawing is None:
            kid = self._tags.pop(cell, None)
            if kid is not None:
                holder.adopt(b"%d" % kid["mcid"])
                self._nums[kid["mcid"]] = holder.reference
            return
        figure = self.element("Figure", holder, adopted=False)
        holder.adopt(figure.reference)
        figure["A"] = pydyf.Dictionary({"O": "/Layout", "BBox": pydyf.Array(drawn[cell])})
        title = cell.drawing.element.find("{http://www.w3.org/2000/svg}title")
        if title is not None and title.text:
            figure["Alt"] = pydyf.String(title.text)
        self.content(figure, cell)
