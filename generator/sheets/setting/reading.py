"""Which elements of a page are set by the sheets themselves, and what text they hold.

A block that holds nothing but words in plain inline elements is set as a paragraph. Whatever asks
for more - a link, a float, a drawing amid words, text from right to left, a style of its own kind -
is left to the engine.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from typing import Any
from xml.etree.ElementTree import Element

from weasyprint.formatting_structure import build
from weasyprint.text.line_break import Layout

from generator.sheets.setting.paragraph import Paragraph, Run

__all__ = [
    "Page",
    "has_only_plain_text",
    "has_parts",
    "holds_paragraph",
    "is_evenly_aligned",
    "is_plain_block",
    "paragraph_of",
    "plain_lengths",
    "stands_in_room",
]

StyleFor = Callable[..., Any]

_INLINE = frozenset({"span", "b", "strong", "em", "i", "abbr", "small"})
_PARTS = {"div": frozenset({"dt", "dd"}), "ul": frozenset({"li"})}
"""Blocks of parts: a term with what is said of it, or a list, in lines."""

_NOT_PLAIN = re.compile(
    "[\u00ad\u0590-\u08ff\u2028-\u202e\u2066-\u2069\ufb1d-\ufdff\ufe70-\ufeff"
    "\U00010800-\U00010fff\U0001e800-\U0001efff]"
)
"""Soft hyphens, and letters or marks of texts from right to left."""

_SAME_FOR_ALL = {
    "position": "static",
    "opacity": 1,
    "transform": (),
    "overflow": "visible",
    "visibility": "visible",
    "text_transform": "none",
    "direction": "ltr",
    "unicode_bidi": "normal",
    "letter_spacing": "normal",
    "word_spacing": 0,
    "outline_width": 0,
    "box_decoration_break": "slice",
    "white_space": ("normal", "nowrap"),
    "hyphens": ("manual", "none"),
    "text_decoration_line": "none",
    "overflow_wrap": "normal",
}
_OWN_WORDS = (("content()", "text"),)
"""A heading stands in the outline of the file with its own words."""

_SIDES = ("left", "right", "top", "bottom")


@dataclass(frozen=True, slots=True)
class Page:
    """What the engine knows while it turns elements into boxes.

    Parameters
    ----------
    style_for
        Gives the style of an element or a pseudo-element.
    state
        Counters at this place.
    others
        What else the engine hands on, in its order.
    """

    style_for: StyleFor
    state: Any
    others: tuple[Any, ...]

    @property
    def targets(self) -> Any:
        """Where the engine collects what may be referred to."""
        return self.others[2]

    def count(self, style: Any) -> None:
        """Count what an element of a style counts, and let its children begin counters."""
        if _kept(style, "set_counts", _counts):
            build.update_counters(self.state, style)
        self.state[2].append(set())

    def count_no_more(self) -> None:
        """Let the counters that children began end with them."""
        _, values, scopes, _ = self.state
        for name in scopes.pop():
            values[name].pop()
            if not values[name]:
                values.pop(name)

    def boxes_of(self, element: Element) -> Any:
        """The boxes that the engine makes of an element."""
        return build.element_to_box(element, self.style_for, *self.others, self.state)


def _kept(style: Any, name: str, find: Callable[[Any], Any]) -> Any:
    """Find something of a style once."""
    kept = style.__dict__
    if name not in kept:
        kept[name] = find(style)
    return kept[name]


def _counts(style: Any) -> bool:
    begins = style["counter_reset"] or style["counter_set"]
    return bool(begins) or style["counter_increment"] != "auto" or "list-item" in style["display"]


def _is(style: Any, name: str, wanted: Any) -> bool:
    value = style[name]
    if isinstance(wanted, tuple):
        return value in wanted or (not value and not wanted)
    return bool(value == wanted)


def has_only_plain_text(style: Any) -> bool:
    """Whether the engine would set words of a style in the plainest way.

    Parameters
    ----------
    style
        Of the engine.
    """
    if not all(_is(style, name, wanted) for name, wanted in _SAME_FOR_ALL.items()):
        return False
    if style["string_set"] != "none" or not style["font_size"]:
        return False
    Layout(style)
    return style.__dict__.get("pango_kit") is not None


def is_plain_block(style: Any) -> bool:
    """Whether a style is that of a plain block in the flow.

    Parameters
    ----------
    style
        Of the engine.
    """
    return bool(_kept(style, "set_plain_block", _plain_block))


def _plain_block(style: Any) -> bool:
    display = style["display"]
    is_block = display == ("block", "flow") or (
        display[:2] == ("block", "flow")
        and style["list_style_type"] == "none"
        and style["list_style_image"] == ("none", None)
    )
    return (
        is_block
        and style["float"] == "none"
        and style["column_count"] == style["column_width"] == "auto"
        and style["height"] == "auto"
        and not any(getattr(style[f"min_{side}"], "value", 0) for side in ("height", "width"))
        and style["max_lines"] == "none"
        and style["continue"] == "auto"
        and style["box_sizing"] == "content-box"
        and (style["bookmark_level"] == "none" or style["bookmark_label"] == _OWN_WORDS)
        and is_evenly_aligned(style)
        and has_only_plain_text(style)
    )


def is_evenly_aligned(style: Any) -> bool:
    """Whether all lines begin, end or are centred alike.

    Parameters
    ----------
    style
        Of the engine.
    """
    lines, last = style["text_align_all"], style["text_align_last"]
    return (
        lines in ("start", "left", "right", "end", "center")
        and last in ("auto", lines)
        and style["text_indent"].value == 0
    )


def stands_in_room(style: Any) -> bool:
    """Whether the boxes around a block have a width that does not hang on its words.

    Parameters
    ----------
    style
        Style of the block.
    """
    above = style.parent_style
    return above is None or bool(_kept(above, "set_room", _gives_room))


def _gives_room(style: Any) -> bool:
    display = style["display"]
    if display[0] not in ("block", "inline") or len(display) < 2:
        return False
    if display[1] not in ("flow", "flow-root"):
        return False
    shrinks = display[0] == "inline" or style["float"] != "none" or style["position"] != "static"
    if shrinks and style["width"] == "auto":
        return False
    return stands_in_room(style)


def _plain_inline(style: Any) -> bool:
    return (
        style["display"] == ("inline", "flow")
        and style["float"] == "none"
        and style["vertical_align"] == "baseline"
        and not style["anchor"]
        and style["bookmark_level"] == "none"
        and not any(style[f"border_{side}_width"] for side in _SIDES)
        and not style["padding_top"].value
        and not style["padding_bottom"].value
        and style["background_color"] != "currentcolor"
        and style["background_color"].alpha == 0
        and all(_width(style, side) is not None for side in ("left", "right"))
        and has_only_plain_text(style)
    )


def plain_lengths(style: Any, kind: str) -> dict[str, float] | None:
    """Give the paddings or margins of the four sides [px]; ``None`` where one is no length.

    Parameters
    ----------
    style
        Of the engine.
    kind
        ``padding`` or ``margin``.
    """
    lengths = {side: style[f"{kind}_{side}"] for side in _SIDES}
    if any(getattr(length, "unit", None) != "px" for length in lengths.values()):
        return None
    return {side: length.value for side, length in lengths.items()}


def _width(style: Any, side: str) -> tuple[float, float] | None:
    """Margin and padding of a side [px]; ``None`` where they are no lengths."""
    lengths = style[f"margin_{side}"], style[f"padding_{side}"]
    if any(getattr(length, "unit", None) != "px" for length in lengths):
        return None
    return lengths[0].value, lengths[1].value


def holds_paragraph(element: Element, style_for: StyleFor) -> bool:
    """Whether the content of a block is words in plain inline elements.

    Parameters
    ----------
    element
        The block.
    style_for
        Gives the styles of the page.
    """
    if _has_marks(element, style_for, ("after", "first-letter", "first-line")):
        return False
    words = [element.text or "", *_tails(element)]
    inline = _INLINE
    if has_parts(element):
        inline = _PARTS[element.tag]
        if any(text.strip() for text in words):
            return False
    if not all(text.isascii() or not _NOT_PLAIN.search(text) for text in words):
        return False
    return all(
        child.tag == "br" or (child.tag in inline and _is_inline(child, style_for))
        for child in element
    )


def _is_inline(element: Element, style_for: StyleFor) -> bool:
    """Whether an element within a paragraph holds words of a plain style."""
    style = style_for(element)
    return (
        bool(_kept(style, "set_plain_inline", _plain_inline))
        and not (_has_ground(style) and len(element))
        and not _has_marks(element, style_for, ("before",))
        and holds_paragraph(element, style_for)
    )


def has_parts(element: Element) -> bool:
    """Whether a block is a term with what is said of it, or a list.

    Parameters
    ----------
    element
        The block.
    """
    return len(element) > 0 and element[0].tag in _PARTS.get(element.tag, ())


def _tails(element: Element) -> Iterator[str]:
    return (child.tail or "" for child in element)


def _has_marks(element: Element, style_for: StyleFor, kinds: tuple[str, ...]) -> bool:
    if not style_for(element).__dict__.get("pseudo_types", True):
        return False
    for kind in kinds:
        style = style_for(element, kind)
        if style is None:
            continue
        if kind.startswith("first"):
            return True
        if style["content"] not in ("normal", "inhibit", "none"):
            return True
    return False


def _has_ground(style: Any) -> bool:
    return any(kind != "none" for kind, _ in style["background_image"])


def paragraph_of(element: Element, style: Any, page: Page) -> Paragraph:
    """Read the words of a block that holds a paragraph; count what it counts.

    Parameters
    ----------
    element
        The block.
    style
        Its style.
    page
        Where it stands.
    """
    bound = id(style) if style["white_space"] == "nowrap" else 0
    runs = list(_before(element, page, bound))
    if not has_parts(element):
        return Paragraph.of(style, [*runs, *_runs(element, style, page.style_for, (), bound)])
    for part, child in enumerate(element):
        inner = _inner(child, page.style_for(child), page.style_for, (), bound)
        runs += [replace(run, part=part) for run in inner]
        runs.append(Run(child.tail or "", style, (), bound=bound, part=part))
    return Paragraph.of(style, runs, tuple(element))


def _before(element: Element, page: Page, bound: int) -> Iterator[Run]:
    """What the style sheet puts before the words, such as a number."""
    if page.style_for(element, "before") is None:
        return
    boxes = build.before_after_to_box(
        element, "before", page.state, page.style_for, page.others[0], *page.others[2:4]
    )
    for box in boxes:
        inner = [child.text for child in box.children if hasattr(child, "text")]
        if inner:
            yield Run("".join(inner), box.style, (box.style,), bound=bound)


def _runs(
    element: Element, style: Any, style_for: StyleFor, around: tuple[Any, ...], bound: int
) -> Iterator[Run]:
    if element.text:
        yield Run(element.text, style, around, bound=bound)
    for child in element:
        if child.tag == "br":
            yield Run("\n", style, around, bound=-1)
        else:
            yield from _inner(child, style_for(child), style_for, around, bound)
        if child.tail:
            yield Run(child.tail, style, around, bound=bound)


def _inner(
    element: Element, style: Any, style_for: StyleFor, around: tuple[Any, ...], bound: int
) -> Iterator[Run]:
    """The runs of an inline element, with the room that it takes before and after."""
    if not bound and style["white_space"] == "nowrap":
        bound = id(element)
    (margin_left, left), (margin_right, right) = _width(style, "left"), _width(style, "right")  # type: ignore[misc] # a plain inline element has widths
    runs = list(_runs(element, style, style_for, (*around, style), bound))
    if not runs:
        return
    ground = style if _has_ground(style) else None
    for at, run in enumerate(runs):
        first, last = at == 0, at == len(runs) - 1
        yield Run(
            run.text,
            run.style,
            run.around,
            run.lead + (margin_left + left if first else 0),
            run.trail + (margin_right + right if last else 0),
            (left if first else 0, right if last else 0) if ground is not None else run.pad,
            ground if ground is not None else run.ground,
            run.bound,
        )
