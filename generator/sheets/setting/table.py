"""Plain tables set by the sheets themselves: rows of words and small drawings between lines.

A table is read once into a grid, set once for each width, and cut between rows where a page ends;
its head is repeated. The rules are those of CSS 2.2, chapter 17, for a fixed layout with collapsing
borders. A table with anything else in it is left to the engine.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cached_property
from math import inf
from typing import Any, NamedTuple
from xml.etree.ElementTree import Element

from weasyprint.css.properties import Dimension

from generator.sheets.setting.paragraph import Paragraph
from generator.sheets.setting.reading import (
    Page,
    has_only_plain_text,
    holds_paragraph,
    is_evenly_aligned,
    paragraph_of,
    plain_lengths,
    stands_in_room,
)

__all__ = ["Cell", "Cut", "Grid", "Setting", "grid_of"]

_SVG = "{http://www.w3.org/2000/svg}svg"
_SIDES = ("left", "right", "top", "bottom")
_ALIGNED = ("baseline", "top", "middle", "bottom")
_DISPLAYS = {
    "thead": ("table-header-group",),
    "tbody": ("table-row-group",),
    "tr": ("table-row",),
    "caption": ("table-caption",),
    "colgroup": ("table-column-group",),
    "col": ("table-column",),
}


class Border(NamedTuple):
    """A line between cells."""

    width: float
    colour: Any


_NONE = Border(0, None)


@dataclass(eq=False, slots=True)
class Cell:
    """A cell of a table.

    Parameters
    ----------
    element
        The element it comes from.
    style
        Its style.
    text
        Its words; ``None`` where it holds a drawing or nothing.
    drawing
        The box of its drawing, as the engine makes it.
    """

    element: Element
    style: Any
    text: Paragraph | None
    drawing: Any = None
    padding: dict[str, float] = field(default_factory=dict)


@dataclass(eq=False, slots=True)
class Row:
    """A row of a table."""

    element: Element
    cells: list[Cell]


@dataclass(eq=False)
class Grid:
    """A table as it was read.

    Parameters
    ----------
    element
        The element it comes from.
    style
        Its style.
    caption
        Its caption, with the element and the style.
    columns
        Widths of its columns, as the style sheet gives them.
    head, body
        Its rows.
    groups
        The element of the head, and those of the bodies with their numbers of rows.
    """

    element: Element
    style: Any
    caption: Cell | None
    columns: list[Any]
    head: list[Row]
    body: list[Row]
    groups: tuple[Element | None, list[tuple[Element, int]]]
    _settings: dict[float, Setting] = field(default_factory=dict)

    def setting(self, width: float) -> Setting:
        """Set the table.

        Parameters
        ----------
        width
            Its width without the halves of the outer borders [px].
        """
        if width not in self._settings:
            self._settings[width] = Setting(self, width)
        return self._settings[width]

    @cached_property
    def rows(self) -> list[Row]:
        """The rows of head and body."""
        return [*self.head, *self.body]

    @cached_property
    def across(self) -> list[list[Border]]:
        """The lines above the first row, and below each row, cell by cell."""
        count = len(self.rows[0].cells)
        lines = [[_NONE] * count for _ in range(len(self.rows) + 1)]
        for at, row in enumerate(self.rows):
            for column, cell in enumerate(row.cells):
                _wider(lines[at], column, cell.style, "top")
                _wider(lines[at + 1], column, cell.style, "bottom")
        return lines

    @cached_property
    def down(self) -> list[list[Border]]:
        """The lines left of the first cell, and right of each cell, row by row."""
        lines = []
        for row in self.rows:
            line = [_NONE] * (len(row.cells) + 1)
            for column, cell in enumerate(row.cells):
                _wider(line, column, cell.style, "left")
                _wider(line, column + 1, cell.style, "right")
            lines.append(line)
        return lines

    @cached_property
    def outer(self) -> dict[str, float]:
        """Halves of the outer borders [px]."""
        return {
            "left": self.down[0][0].width / 2,
            "right": self.down[0][-1].width / 2,
            "top": max(line.width for line in self.across[0]) / 2,
            "bottom": max(line.width for line in self.across[-1]) / 2,
        }


def _wider(lines: list[Border], at: int, style: Any, side: str) -> None:
    """The wider of two borders wins; of equal ones the earlier."""
    width = style[f"border_{side}_width"]
    if width > lines[at].width:
        colour = style[f"border_{side}_color"]
        lines[at] = Border(width, style["color"] if colour == "currentcolor" else colour)


class _Place(NamedTuple):
    """Where a cell lies in its row, and its content in it [px]."""

    cell: Cell
    x: float
    y: float
    width: float
    left: float
    right: float
    lines: Any


class _SetRow(NamedTuple):
    """A row with its height [px]."""

    row: Row
    number: int
    height: float
    places: list[_Place]


class Setting:
    """A table in a width.

    Parameters
    ----------
    grid
        The table.
    width
        Its width [px].
    """

    def __init__(self, grid: Grid, width: float) -> None:
        self.grid = grid
        self.width = width
        self.columns = _column_widths(grid.columns, width)
        self.edges = [sum(self.columns[:at]) for at in range(len(self.columns) + 1)]
        self.head = [self._set(row, at) for at, row in enumerate(grid.head)]
        first = len(grid.head)
        self.body = [self._set(row, first + at) for at, row in enumerate(grid.body)]
        self.head_height = sum(row.height for row in self.head)
        self.caption_lines: Any = []
        self.caption_height = 0.0
        if grid.caption is not None and grid.caption.text is not None:
            padding = grid.caption.padding
            room = width + grid.outer["left"] + grid.outer["right"]
            room -= padding["left"] + padding["right"]
            self.caption_lines = grid.caption.text.lines(room)
            height = sum(line.height for line in self.caption_lines)
            self.caption_height = height + padding["top"] + padding["bottom"]

    def _set(self, row: Row, number: int) -> _SetRow:
        """Set the cells of a row side by side."""
        across, down = self.grid.across, self.grid.down[number]
        raw: list[tuple[Cell, float, float, float, float, Any, float, float, float]] = []
        for at, cell in enumerate(row.cells):
            above, below = across[number][at].width / 2, across[number + 1][at].width / 2
            left, right = down[at].width / 2, down[at + 1].width / 2
            padding = cell.padding
            inner = self.columns[at] - left - right - padding["left"] - padding["right"]
            lines = cell.text.lines(inner) if cell.text is not None else []
            height = sum(line.height for line in lines)
            if cell.drawing is not None:
                height = cell.drawing.style["height"].value
            top = above + padding["top"]
            base = top + (lines[0].baseline if lines else height)
            whole = top + height + padding["bottom"] + below
            raw.append((cell, left, right, top, inner, lines, height, base, whole))
        on_line = [base for cell, *_, base, _ in raw if _alignment(cell) == "baseline"]
        line = max(on_line, default=0.0)
        wholes = [
            whole + (line - base if _alignment(cell) == "baseline" else 0)
            for cell, *_, base, whole in raw
        ]
        tall = max(wholes, default=0.0)
        places = []
        for at, (cell, left, right, top, inner, lines, _, base, whole) in enumerate(raw):
            align = _alignment(cell)
            if align == "baseline":
                shift = line - base
            else:
                shift = {"top": 0.0, "middle": 0.5, "bottom": 1.0}[align] * (tall - whole)
            x = self.edges[at] + left + cell.padding["left"]
            places.append(_Place(cell, x, top + shift, inner, left, right, lines))
        return _SetRow(row, number, tall, places)


def _alignment(cell: Cell) -> str:
    align = cell.style["vertical_align"]
    return align if align in _ALIGNED else "baseline"


def _column_widths(columns: list[Any], width: float) -> list[float]:
    """The widths of the columns in the fixed layout (CSS 2.2, 17.5.2.1) [px]."""
    known = [
        None if column == "auto" else column.value * (width / 100 if column.unit == "%" else 1)
        for column in columns
    ]
    left = width - sum(item for item in known if item is not None)
    open_columns = known.count(None)
    share = max(left, 0.0) / open_columns if open_columns else 0.0
    widths = [share if item is None else item for item in known]
    spare = width - sum(widths)
    return [item + spare / len(widths) for item in widths] if spare > 0 else widths


class Cut(NamedTuple):
    """The rows of a table on one page."""

    setting: Setting
    start: int
    stop: int

    @property
    def has_caption(self) -> bool:
        """Whether the caption stands on this page."""
        return self.start == 0 and self.setting.grid.caption is not None

    @property
    def rows(self) -> list[_SetRow]:
        """The rows, the head first."""
        return [*self.setting.head, *self.setting.body[self.start : self.stop]]

    @property
    def height(self) -> float:
        """Height with caption and outer borders [px]."""
        outer = self.setting.grid.outer
        caption = self.setting.caption_height if self.has_caption else 0
        return caption + outer["top"] + sum(row.height for row in self.rows) + outer["bottom"]


def grid_of(element: Element, page: Page) -> Grid | None:
    """Read a table; ``None`` where the engine has to set it.

    Parameters
    ----------
    element
        The table.
    page
        Where it stands.
    """
    style = page.style_for(element)
    if not _is_plain_table(style) or not stands_in_room(style):
        return None
    if not all(_is_plain_part(part, page.style_for) for part in element):
        return None
    rows = [row for part in element for row in part if row.tag == "tr"]
    sizes = {len(row) for row in rows}
    if len(sizes) != 1 or 0 in sizes:
        return None
    if not all(_is_plain_row(row, page.style_for) for row in rows):
        return None
    return _read(element, style, page, sizes.pop())


def _is_plain_table(style: Any) -> bool:
    return (
        style["display"] == ("block", "table")
        and style["border_collapse"] == "collapse"
        and style["table_layout"] == "fixed"
        and style["width"] == Dimension(100, "%")
        and style["caption_side"] == "top"
        and style["float"] == "none"
        and not any(style[f"border_{side}_width"] for side in _SIDES)
        and not any(getattr(style[f"margin_{side}"], "value", 1) for side in ("left", "right"))
        and not style["anchor"]
        and _paints_nothing(style)
        and has_only_plain_text(style)
    )


def _paints_nothing(style: Any) -> bool:
    colour = style["background_color"]
    return (
        colour != "currentcolor"
        and colour.alpha == 0
        and all(kind == "none" for kind, _ in style["background_image"])
    )


def _is_plain_part(part: Element, style_for: Any) -> bool:
    """Whether a part of a table is one that is known here, and looks like nothing of its own."""
    style = style_for(part)
    if part.tag not in _DISPLAYS or style["display"] != _DISPLAYS[part.tag]:
        return False
    if part.tag == "caption":
        return (
            plain_lengths(style, "padding") is not None
            and not any(style[f"border_{side}_width"] for side in _SIDES)
            and has_only_plain_text(style)
            and style_for(part, "before") is None
            and holds_paragraph(part, style_for)
        )
    if part.tag == "colgroup":
        return all(
            column.tag == "col" and "span" not in column.attrib and _is_bare(style_for(column))
            for column in part
        )
    return _is_bare(style) and all(row.tag == "tr" for row in part)


def _is_bare(style: Any) -> bool:
    return (
        not style["anchor"]
        and _paints_nothing(style)
        and not any(style[f"border_{side}_width"] for side in _SIDES)
    )


def _is_plain_row(row: Element, style_for: Any) -> bool:
    style = style_for(row)
    return (
        style["display"] == ("table-row",)
        and style["height"] == "auto"
        and _is_bare(style)
        and has_only_plain_text(style)
        and all(_is_plain_cell(cell, style_for) for cell in row)
    )


def _is_plain_cell(cell: Element, style_for: Any) -> bool:
    if cell.tag not in ("th", "td") or {"colspan", "rowspan"} & cell.attrib.keys():
        return False
    style = style_for(cell)
    if not style.__dict__.get("set_plain_cell"):
        plain = style.__dict__["set_plain_cell"] = (
            style["display"] == ("table-cell",)
            and style["height"] == style["width"] == "auto"
            and plain_lengths(style, "padding") is not None
            and all(style[f"border_{side}_style"] in ("none", "solid") for side in _SIDES)
            and is_evenly_aligned(style)
            and style["vertical_align"] in _ALIGNED
            and not style["anchor"]
            and has_only_plain_text(style)
        )
        if not plain:
            return False
    if _is_drawing(cell, style_for):
        return True
    return holds_paragraph(cell, style_for)


def _is_drawing(cell: Element, style_for: Any) -> bool:
    """Whether a cell holds a drawing of a given size and nothing else."""
    if len(cell) != 1 or cell[0].tag != _SVG or (cell.text or "").strip():
        return False
    style = style_for(cell[0])
    return (
        not (cell[0].tail or "").strip()
        and style["display"] == ("block", "flow")
        and all(getattr(style[name], "unit", None) == "px" for name in ("width", "height"))
        and style["max_width"].unit in ("px", "%")
        and style["max_height"].value == inf
        and not any(getattr(style[f"min_{side}"], "value", 0) for side in ("height", "width"))
        and all(getattr(style[f"margin_{side}"], "value", 1) == 0 for side in _SIDES)
        and not any(style[f"border_{side}_width"] for side in _SIDES)
    )


def _read(element: Element, style: Any, page: Page, count: int) -> Grid | None:
    """Read the parts of a table; counters go on as if the engine had read them."""
    caption: Cell | None = None
    columns: list[Any] = []
    head: list[Row] = []
    body: list[Row] = []
    head_element: Element | None = None
    bodies: list[tuple[Element, int]] = []
    page.count(style)
    for part in element:
        own = page.style_for(part)
        if part.tag == "caption":
            caption = Cell(part, own, paragraph_of(part, own, page))
            caption.padding = plain_lengths(own, "padding") or {}
        elif part.tag == "colgroup":
            columns = [page.style_for(column)["width"] for column in part]
        else:
            page.count(own)
            rows = [_read_row(row, page) for row in part]
            page.count_no_more()
            if part.tag == "thead":
                head, head_element = rows, part
            else:
                body += rows
                bodies.append((part, len(rows)))
    page.count_no_more()
    columns += ["auto"] * (count - len(columns))
    return Grid(element, style, caption, columns, head, body, (head_element, bodies))


def _read_row(row: Element, page: Page) -> Row:
    page.count(page.style_for(row))
    cells = [_read_cell(cell, page) for cell in row]
    page.count_no_more()
    return Row(row, cells)


def _read_cell(element: Element, page: Page) -> Cell:
    style = page.style_for(element)
    page.count(style)
    cell = Cell(element, style, None, None, plain_lengths(style, "padding") or {})
    if _is_drawing(element, page.style_for):
        (cell.drawing,) = page.boxes_of(element[0])
    else:
        cell.text = paragraph_of(element, style, page)
    page.count_no_more()
    return cell
