"""A set paragraph as a box that the engine can place and break; its paint and its structure."""

from __future__ import annotations

from typing import Any

from weasyprint.layout import block
from weasyprint.layout.float import avoid_collisions

from generator.sheets.setting.paragraph import Line, Paragraph
from generator.sheets.setting.set_box import SetBox
from generator.sheets.setting.structure import PageStructure

__all__ = ["SetParagraph"]


class SetParagraph(SetBox):
    """A block whose lines are set here.

    Parameters
    ----------
    element
        The element it comes from.
    style
        Its style.
    paragraph
        Its text.
    """

    def __init__(self, element: Any, style: Any, paragraph: Paragraph) -> None:
        super().__init__(element, style)
        self.paragraph = paragraph
        self.lines: list[Line] = []
        self.width: Any = 0
        self.height: Any = 0

    def lay_out(
        self, context: Any, bottom_space: float, start: int, around: Any, page_is_empty: bool
    ) -> Any:
        """Set the lines that the page has room for; see the base."""
        box = self.copy()
        box.remove_decoration_sides = set()
        if page_is_empty and context.current_page > 1 and not context.forced_break:
            box.margin_top = 0
        block.block_level_width(box, around)
        box.remove_decoration(start=start > 0, end=False)
        if context.excluded_shapes:
            box._stand_beside(context, around)
        lines = self.paragraph.lines(box.width)[start:]
        kept = box._fitting(context, bottom_space, lines, page_is_empty)
        resume_at = None if kept == len(lines) else {start + kept: None}
        apart = block.avoid_page_break(box.style["break_inside"], context)
        if (lines and not kept) or (resume_at and apart and not page_is_empty):
            return self.nowhere()
        box.remove_decoration(start=False, end=resume_at is not None)
        box.lines = lines[:kept]
        box.height = sum(line.height for line in box.lines)
        return box.placed(resume_at, collapses=not (lines or box._is_framed()))

    @property
    def longest(self) -> float:
        """Length of the text on one line [px]."""
        return self.paragraph.longest

    def _stand_beside(self, context: Any, around: Any) -> None:
        """Make room for what floats beside the block: all its lines are as short."""
        self.height = sum(line.height for line in self.paragraph.lines(self.width))
        wide = self.width
        self.width = 0
        self.position_x, self.position_y, room = avoid_collisions(
            context, self, around, outer=False
        )
        self.width = min(wide, room)

    def _fitting(
        self, context: Any, bottom_space: float, lines: list[Line], page_is_empty: bool
    ) -> int:
        """How many lines stay on the page, none left alone."""
        below = self.border_bottom_width + self.padding_bottom
        y, fitting = self.content_box_y(), 0
        if not context.overflows_page(bottom_space, y + sum(line.height for line in lines) + below):
            return len(lines)
        for line in lines:
            y += line.height
            if context.overflows_page(bottom_space, y + below):
                break
            fitting += 1
        if fitting == len(lines):
            return fitting
        kept: int = min(fitting, len(lines) - self.style["widows"])
        if kept < self.style["orphans"]:
            return max(fitting, 1) if page_is_empty else 0
        return kept

    def _is_framed(self) -> bool:
        """Whether the margins above and below are held apart though no line stands between."""
        return any(
            getattr(self, name)
            for side in ("top", "bottom")
            for name in (f"padding_{side}", f"border_{side}_width")
        )

    def _reset_spacing(self, side: str) -> None:
        """Take the decoration of a side away."""
        for name in (f"margin_{side}", f"padding_{side}", f"border_{side}_width"):
            setattr(self, name, 0)

    def remove_decoration(self, start: bool, end: bool) -> None:
        """Take away the decoration where the block goes on from page to page."""
        if start:
            self._reset_spacing("top")
        if end:
            self._reset_spacing("bottom")

    def paint(self, stream: Any) -> None:
        """Write the lines on a page of the engine."""
        place = self.content_box_x(), self.content_box_y(), self.width
        self.paragraph.grounds(stream, self.lines, place)
        if not self.paragraph.parts:
            with stream.marked(self, "P"):
                self.paragraph.write(stream, self.lines, place)
        for at, part in enumerate(self.paragraph.parts):
            if at in self._parts():
                with stream.marked(part, "P"):
                    self.paragraph.write(stream, self.lines, place, at)

    def _parts(self) -> set[int]:
        """The parts that have words among the lines."""
        return {stretch.run.part for line in self.lines for stretch in line.stretches}

    def tag(self, parent: Any, page: PageStructure) -> Any:
        """Build the structure of a block of parts: an item of a list, or a list of items.

        Parameters
        ----------
        parent
            The element of the structure above it.
        page
            Makes the elements of the page.

        Returns
        -------
        pydyf.Dictionary or None
            The element of the structure; ``None`` for a plain paragraph, which the engine knows.
        """
        if not self.paragraph.parts:
            return None
        is_list = self.element_tag == "ul"
        made = page.element("L" if is_list else "LI", parent, self.element, adopted=False)
        for at, part in enumerate(self.paragraph.parts):
            if at in self._parts():
                item = page.element("LI", made) if is_list else made
                kind = "Lbl" if part.tag == "dt" else "LBody"
                page.content(page.element(kind, item, part), part)
        return made
