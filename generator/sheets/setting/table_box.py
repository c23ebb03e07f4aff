"""A set table as a box that the engine can place and cut, with its paint and its structure."""

from __future__ import annotations

from itertools import groupby
from typing import Any

from weasyprint.layout import block

from generator.sheets.setting.grounds import bare_box, paint_ground, paints_ground
from generator.sheets.setting.set_box import SetBox
from generator.sheets.setting.structure import PageStructure
from generator.sheets.setting.table import Cell, Cut, Grid

__all__ = ["SetTable"]


class SetTable(SetBox):
    """A table whose rows are set here.

    Parameters
    ----------
    grid
        The table as it was read.
    """

    def __init__(self, grid: Grid) -> None:
        super().__init__(grid.element, grid.style)
        self.grid = grid
        self.cut: Any = None
        self.drawn: dict[Cell, tuple[float, float, float, float]] = {}

    def lay_out(
        self, context: Any, bottom_space: float, start: int, around: Any, page_is_empty: bool
    ) -> Any:
        """Set the rows that the page has room for; see the base."""
        box = self.copy()
        outer = self.grid.outer["left"] + self.grid.outer["right"]
        within = self.style["box_sizing"] == "border-box"
        setting = self.grid.setting(around.width - (outer if within else 0))
        rows = setting.body
        stop = start
        y = box.position_y + box.margin_top + Cut(setting, start, start).height
        y -= self.grid.outer["bottom"]
        while stop < len(rows):
            y += rows[stop].height
            if context.overflows_page(bottom_space, y) and not (page_is_empty and stop == start):
                break
            stop += 1
        whole = block.avoid_page_break(box.style["break_inside"], context)
        if (stop == start and rows) or (whole and stop < len(rows) and not page_is_empty):
            return self.nowhere()
        box.cut = Cut(setting, start, stop)
        box.width = setting.width + outer
        box.height = box.cut.height
        box.padding_left = box.padding_right = box.padding_top = box.padding_bottom = 0
        resume_at = None if stop == len(rows) else {stop: None}
        if resume_at:
            box.margin_bottom = 0
        return box.placed(resume_at)

    def paint(self, stream: Any) -> None:
        """Paint caption, cells and lines on a page of the engine."""
        cut, grid = self.cut, self.grid
        left, top = self.content_box_x(), self.content_box_y()
        if cut.has_caption and grid.caption is not None and grid.caption.text is not None:
            padding = grid.caption.padding
            room = self.width - padding["left"] - padding["right"]
            corner = left + padding["left"], top + padding["top"]
            with stream.marked(grid.caption, "Caption"):
                grid.caption.text.write(stream, cut.setting.caption_lines, (*corner, room))
            top += cut.setting.caption_height
        left, top = left + grid.outer["left"], top + grid.outer["top"]
        self.drawn = {}
        y = top
        for row in cut.rows:
            for at, place in enumerate(row.places):
                self._ground(stream, place, (left + cut.setting.edges[at], y), row, at)
                self._paint_content(stream, place, left, y)
            y += row.height
        self._lines(stream, left, top)

    def _paint_content(self, stream: Any, place: Any, left: float, top: float) -> None:
        """Write the words of a cell, or put its drawing."""
        cell, x, y = place.cell, left + place.x, top + place.y
        if cell.drawing is not None:
            style = cell.drawing.style
            most = style["max_width"]
            limit = most.value * (place.width / 100 if most.unit == "%" else 1)
            width, height = min(style["width"].value, limit), style["height"].value
            self.drawn[cell] = x, y, x + width, y + height
            with stream.marked(cell, "Figure"), stream.stacked():
                stream.set_alpha(1)
                stream.transform(e=x, f=y)
                cell.drawing.replacement.draw(stream, width, height, style)
        elif place.lines:
            at = x, y, place.width
            cell.text.grounds(stream, place.lines, at)
            with stream.marked(cell, cell.element.tag.upper()):
                cell.text.write(stream, place.lines, at)

    def _ground(self, stream: Any, place: Any, corner: Any, row: Any, at: int) -> None:
        """Paint the background of a cell."""
        style = place.cell.style
        if not paints_ground(style):
            return
        grid, box = self.grid, bare_box(style)
        box.border_left_width, box.border_right_width = place.left, place.right
        box.border_top_width = grid.across[row.number][at].width / 2
        box.border_bottom_width = grid.across[row.number + 1][at].width / 2
        for side, padding in place.cell.padding.items():
            setattr(box, f"padding_{side}", padding)
        box.width = place.width
        content = box.border_top_width + box.border_bottom_width
        box.height = row.height - content - box.padding_top - box.padding_bottom
        paint_ground(stream, box, *corner)

    def _lines(self, stream: Any, left: float, top: float) -> None:
        """Draw the lines between the cells; neighbours of one kind are one line."""
        cut, grid = self.cut, self.grid
        edges = cut.setting.edges
        strokes: list[tuple[float, Any, float, float, float, float]] = []
        y = top
        rows = cut.rows
        for place, row in enumerate(rows):
            above, below = grid.across[row.number], grid.across[row.number + 1]
            if place == 0:
                strokes += _across(above, edges, left, y, grid.down[row.number])
            strokes += _across(below, edges, left, y + row.height, grid.down[row.number])
            for at, line in enumerate(grid.down[row.number]):
                if line.width and line.colour.alpha:
                    sides = slice(max(at - 1, 0), at + 1)
                    up = max(item.width for item in above[sides]) / 2
                    under = max(item.width for item in below[sides]) / 2
                    x = left + edges[at]
                    ends = x, y - up, x, y + row.height + under
                    strokes.append((line.width, line.colour, *ends))
            y += row.height
        if not strokes:
            return
        strokes.sort(key=lambda stroke: stroke[0])
        with stream.artifact(), stream.stacked():
            for (width, colour), alike in groupby(strokes, key=lambda stroke: stroke[:2]):
                stream.set_color(colour)
                half = width / 2
                stream.stream += [
                    b"%.3f %.3f %.3f %.3f re" % (x1, y1 - half, x2 - x1, width)
                    if y1 == y2
                    else b"%.3f %.3f %.3f %.3f re" % (x1 - half, y1, width, y2 - y1)
                    for _, _, x1, y1, x2, y2 in alike
                ]
                stream.stream.append(b"f")

    def tag(self, parent: Any, page: PageStructure) -> Any:
        """Build the structure of the table.

        Parameters
        ----------
        parent
            The element of the structure above it.
        page
            Makes the elements of the page.

        Returns
        -------
        pydyf.Dictionary
            The element of the structure.
        """
        table = page.element("Table", parent, self.element, adopted=False)
        caption = self.grid.caption
        if self.cut.has_caption and caption is not None:
            page.content(page.element("Caption", table, caption.element), caption)
        head_part, bodies = self.grid.groups
        if self.cut.setting.head:
            head = page.part("THead", table, head_part)
            for row in self.cut.setting.head:
                page.row(head, row.row, self.drawn, heads=True)
        first = 0
        for part, count in bodies:
            start, stop = max(first, self.cut.start), min(first + count, self.cut.stop)
            first += count
            if start < stop:
                body = page.part("TBody", table, part)
                for row in self.cut.setting.body[start:stop]:
                    page.row(body, row.row, self.drawn, heads=False)
        return table


def _across(lines: Any, edges: list[float], left: float, y: float, down: Any) -> Any:
    """Strokes along the top or the bottom of a row."""
    strokes: list[tuple[float, Any, float, float, float, float]] = []
    for at, line in enumerate(lines):
        if not line.width or not line.colour.alpha:
            continue
        x1 = left + edges[at] - down[at].width / 2
        x2 = left + edges[at + 1] + down[at + 1].width / 2
        if strokes and strokes[-1][:2] == (line.width, line.colour) and strokes[-1][4] >= x1:
            x1 = strokes.pop()[2]
        strokes.append((line.width, line.colour, x1, y, x2, y))
    return strokes
