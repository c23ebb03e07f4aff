"""Where the sheets' own paragraphs and tables take the place of the engine's boxes."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import pydyf
from weasyprint import draw
from weasyprint.formatting_structure import build
from weasyprint.layout import block
from weasyprint.pdf import tags as tagging

from generator.sheets.engine_text import replace_everywhere
from generator.sheets.setting.paragraph_box import SetParagraph
from generator.sheets.setting.reading import (
    Page,
    holds_paragraph,
    is_plain_block,
    paragraph_of,
    stands_in_room,
)
from generator.sheets.setting.set_box import SetBox
from generator.sheets.setting.structure import PageStructure
from generator.sheets.setting.table import grid_of
from generator.sheets.setting.table_box import SetTable

__all__ = ["set_type_ourselves"]


def set_type_ourselves() -> None:
    """Put our own boxes in the place of the engine's where an element is plain enough."""
    _build_boxes()
    _lay_out_boxes()
    _paint_boxes()
    _tag_boxes()


def _build_boxes() -> None:
    plain = build.element_to_box

    def element_to_box(
        element: Any, style_for: Any, *others: Any, state: Any = None, **named: Any
    ) -> Any:
        *others_known, state = others if len(others) == _WITH_STATE else (*others, state)
        if state is not None and element.tag in _SET:
            box = _SET[element.tag](element, Page(style_for, state, tuple(others_known)))
            if box is not None:
                return [box]
        return plain(element, style_for, *others_known, state, **named)

    build.element_to_box = element_to_box


def _lay_out_boxes() -> None:
    plain = block.block_level_layout_switch

    def block_level_layout_switch(context: Any, box: Any, *others: Any, **named: Any) -> Any:
        if isinstance(box, SetBox):
            bottom_space, skip, around, page_is_empty = others[:4]
            start = next(iter(skip)) if skip else 0
            return (*box.lay_out(context, bottom_space, start, around, page_is_empty), None)
        return plain(context, box, *others, **named)

    block.block_level_layout_switch = block_level_layout_switch


def _paint_boxes() -> None:
    plain = draw.draw_block_level

    def draw_block_level(page: Any, stream: Any, tree: Any) -> None:
        for box, inner in tree.items():
            if isinstance(box, SetBox):
                box.paint(stream)
            else:
                plain(page, stream, {box: {}})
                draw_block_level(page, stream, inner)

    replace_everywhere(plain, draw_block_level)


def _tag_boxes() -> None:
    """Build the structure; parts of a page in another language say so."""
    plain = tagging._build_box_tree

    def build_box_tree(
        box: Any, parent: Any, pdf: Any, number: int, nums: Any, annotations: Any, tags: Any
    ) -> Iterator[Any]:
        if isinstance(box, SetBox):
            made = box.tag(parent, PageStructure(pdf, number, nums, tags))
            if made is not None:
                yield made
                return
        element: Any = getattr(box, "element", None)
        is_part = element is not None and element.tag not in ("html", "body")
        language = element.get("lang") if is_part else None
        for made in plain(box, parent, pdf, number, nums, annotations, tags):
            if language:
                made["Lang"] = pydyf.String(language)
            yield made

    tagging._build_box_tree = build_box_tree


def _set_paragraph(element: Any, page: Page) -> SetParagraph | None:
    """The box of an element that holds a paragraph; ``None`` where the engine has to make it."""
    style = page.style_for(element)
    if not is_plain_block(style) or not stands_in_room(style):
        return None
    if not holds_paragraph(element, page.style_for):
        return None
    page.count(style)
    paragraph = paragraph_of(element, style, page)
    page.count_no_more()
    box = SetParagraph(element, style, paragraph)
    if style["anchor"]:
        page.targets.store_target(style["anchor"], page.state[1], box)
    if style["bookmark_level"] != "none":
        box.bookmark_label = " ".join("".join(element.itertext()).split())
    return box


def _set_table(element: Any, page: Page) -> SetTable | None:
    """The box of a plain table; ``None`` where the engine has to make it."""
    grid = grid_of(element, page)
    return None if grid is None else SetTable(grid)


_WITH_STATE = 6
"""Arguments behind the styles, the counters among them."""

_SET: dict[str, Any] = {
    "table": _set_table,
    **dict.fromkeys(
        ("p", "ul", "li", "dt", "dd", "figcaption", "div", "h1", "h2", "h3", "h4", "h5"),
        _set_paragraph,
    ),
}
"""Elements that may be set here, and how."""
