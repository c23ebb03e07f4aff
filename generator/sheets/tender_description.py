"""What a tender document says, as finished text and drawings, block by block.

The report and the letters are one kind of document: a frame and blocks in reading order, so that
page and paper say the same.
"""

from __future__ import annotations

from dataclasses import dataclass

from generator.sheets.description import Pair, SheetFrame
from generator.sheets.drawings.drawing import Drawing

__all__ = [
    "Block",
    "DrawingBlock",
    "HeadingBlock",
    "ListBlock",
    "PairsBlock",
    "ParagraphBlock",
    "QuestionBlock",
    "TableBlock",
    "TenderDocument",
    "TenderSheets",
]


@dataclass(frozen=True, slots=True)
class HeadingBlock:
    """A heading; level 2 to 4, and the anchor that a link can name."""

    text: str
    level: int = 2
    anchor: str = ""
    kind: str = "heading"


@dataclass(frozen=True, slots=True)
class ParagraphBlock:
    """A paragraph; the role is empty, ``lead``, ``quiet`` or ``sum``."""

    text: str
    role: str = ""
    kind: str = "paragraph"


@dataclass(frozen=True, slots=True)
class ListBlock:
    """Items of a list."""

    items: tuple[str, ...]
    kind: str = "list"


@dataclass(frozen=True, slots=True)
class PairsBlock:
    """Names and what stands under them."""

    pairs: tuple[Pair, ...]
    kind: str = "pairs"


@dataclass(frozen=True, slots=True)
class TableBlock:
    """A table.

    Parameters
    ----------
    caption
        What it shows, with unit and currency.
    headings
        Column headings.
    rows
        Cells as text; the first heads its row.
    text_columns
        Places of the columns that hold text; all others hold numbers.
    sum_row
        Whether the last row is a sum.
    wide
        Place of a column that takes the room left; -1 for none.
    """

    caption: str
    headings: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    text_columns: tuple[int, ...] = (0,)
    sum_row: bool = False
    wide: int = -1
    kind: str = "table"


@dataclass(frozen=True, slots=True)
class QuestionBlock:
    """One question ready to send: number, what it is about, where the demand stands, the text.

    ``particulars`` are facts behind it that may name the model; empty under code names.
    """

    number: str
    title: str
    clause: str
    text: str
    particulars: str = ""
    kind: str = "question"


@dataclass(frozen=True, slots=True)
class DrawingBlock:
    """A drawing with its caption and the numbers behind it."""

    drawing: Drawing
    kind: str = "drawing"


Block = (
    HeadingBlock
    | ParagraphBlock
    | ListBlock
    | PairsBlock
    | TableBlock
    | QuestionBlock
    | DrawingBlock
)


@dataclass(frozen=True, slots=True)
class TenderDocument:
    """A tender report or a letter.

    Parameters
    ----------
    frame
        What every sheet carries.
    over
        Line above the title.
    lead
        The document in a sentence.
    blocks
        In reading order.
    pdf_name
        File of the same document on paper, from the page; empty without one.
    links
        Parts of the page and pages beside it: words and path from the page.
    files
        Data files that the page links to: words and path inside the issue.
    """

    frame: SheetFrame
    over: str
    lead: str
    blocks: tuple[Block, ...]
    pdf_name: str = ""
    links: tuple[Pair, ...] = ()
    files: tuple[Pair, ...] = ()


@dataclass(frozen=True, slots=True)
class TenderSheets:
    """The tender report, and code of a bidder in small letters -> its letter."""

    report: TenderDocument
    letters: dict[str, TenderDocument]
