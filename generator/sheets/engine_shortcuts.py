"""Shorter ways through the PDF engine to the same page: nothing is worked out twice.

The engine looks up the same lengths of the same style for every box, works out styles for marks
of notes that no page has, and prepares each style for each word. A style does not change once the
layout has begun (where the engine changes one, it changes a copy), so all that can stay with the
style. Texts, places and structure come out as without the shortcuts; a test lays pages out both
ways.

They fit one version of the engine and are not taken with another.
"""

from __future__ import annotations

from copy import copy
from functools import cache
from math import hypot
from typing import Any
from weakref import WeakKeyDictionary
from xml.etree.ElementTree import Element

from generator.sheets.engine_styles import share_styles
from generator.sheets.engine_text import replace_everywhere, shorten_text
from generator.sheets.paper_drawing import paper_drawing
from generator.sheets.pdf_writing import lighten_compression

__all__ = ["TooFullError", "lean_defaults", "put_aside_drawings", "take_shortcuts"]

_FITTING_VERSION = "70."
_WORDS_OF_NOTES = ("footnote", "note(", "list-item")
_MARKS_OF_NOTES = (
    "marker",
    "footnote-call",
    "footnote-marker",
    "note-call",
    "note-marker",
    "note-callback",
)
_SVG = "{http://www.w3.org/2000/svg}"
_TITLE = f"{_SVG}title"

_PARTS: WeakKeyDictionary[Element, list[Element]] = WeakKeyDictionary()
"""Drawing -> its elements, where they were taken out of the page."""


class TooFullError(Exception):
    """A document does not keep to the pages it asked for; the rest of it is not made.

    Parameters
    ----------
    page_one
        Whether page one runs over, which was to stand alone; else there are too many pages.
    """

    def __init__(self, *, page_one: bool) -> None:
        super().__init__("page one runs over" if page_one else "too many pages")
        self.page_one = page_one


def put_aside_drawings(root: Element) -> None:
    """Take the marks of every drawing out of a page; its title stays.

    The engine works out the style of each element of a page, for marks of a drawing in vain.

    Parameters
    ----------
    root
        The tree of a page.
    """
    if not take_shortcuts():
        return
    for drawing in root.iter(f"{_SVG}svg"):
        _PARTS[drawing] = list(drawing)
        drawing[:] = [part for part in drawing if part.tag == _TITLE]


def lean_defaults(style: str) -> Any:
    """The engine's own style sheet without its rules for the notes of every element.

    Each element gets five styles for marks of footnotes and one for the mark of a list, most of
    them for elements that have neither.

    Parameters
    ----------
    style
        The style sheet of the pages; where it speaks of notes, the rules stay.

    Returns
    -------
    weasyprint.CSS or None
        The sheet; ``None`` where the engine's own has to be used.
    """
    from weasyprint.html import UA_STYLESHEET

    if not take_shortcuts() or any(word in style for word in _WORDS_OF_NOTES):
        return None
    lean, matcher = copy(UA_STYLESHEET), copy(UA_STYLESHEET.matcher)
    matcher.lower_local_name_selectors = dict(matcher.lower_local_name_selectors)
    for name in ("li", "summary"):
        matcher.lower_local_name_selectors[name] = [
            *matcher.lower_local_name_selectors.get(name, ()),
            *(entry for entry in matcher.other_selectors if entry[3] == "marker"),
        ]
    matcher.other_selectors = [
        entry for entry in matcher.other_selectors if entry[3] not in _MARKS_OF_NOTES
    ]
    lean.matcher = matcher
    return lean


@cache
def take_shortcuts() -> bool:
    """Put the shortcuts in place, once in a process; say whether they fit the engine."""
    import weasyprint

    if not weasyprint.__version__.startswith(_FITTING_VERSION):
        return False
    shorten_text()
    share_styles()
    from generator.sheets.setting.engine_hooks import set_type_ourselves

    set_type_ourselves()
    _shorten_lengths()
    _shorten_drawings()
    _shorten_styles()
    _shorten_backgrounds()
    _shorten_borders()
    _end_trials_early()
    lighten_compression()
    return True


def _end_trials_early() -> None:
    """Leave a document that does not keep to the pages it asked for."""
    from weasyprint.layout import page

    plain = page.remake_page

    def remake_page(index: int, context: Any, root: Any, html: Any) -> Any:
        made = plain(index, context, root, html)
        most = getattr(html, "most_pages", None)
        resume_at, next_page, *_ = context.page_maker[index + 1]
        if most is not None and resume_at is not None:
            if index == 0 and next_page["break"] == "any":
                raise TooFullError(page_one=True)
            if index + 1 == most:
                raise TooFullError(page_one=False)
        return made

    page.remake_page = remake_page


def _shorten_drawings() -> None:
    from weasyprint import html
    from weasyprint.images import SVGImage

    def image(root: Element, base_url: Any, fetcher: Any, context: Any) -> Any:
        title = list(root)
        root[:] = _PARTS.get(root, title)
        ours = paper_drawing(root, context)
        if ours is None:
            return SVGImage(root, base_url, fetcher, context)
        root[:] = title
        return ours

    html.SVGImage = image


def _shorten_styles() -> None:
    """Most values of most styles are inherited or the first ones; so is the way of placing."""
    from weasyprint.css import AnonymousStyle, ComputedStyle, computed_values, properties
    from weasyprint.formatting_structure.boxes import Box

    plain_flow = Box.is_in_normal_flow
    physical = computed_values.PHYSICAL_FUNCTIONS
    logical = {
        find(block="ttb", inline=way) for find in physical.values() for way in ("ltr", "rtl")
    }
    plain_names = {
        name
        for name in properties.INITIAL_VALUES.keys()
        - properties.INITIAL_NOT_COMPUTED
        - properties.INHERITED
        - {"position", "float", "display", "page"}
        if not name.startswith("text_decoration_")
    }
    every = {name: properties.INITIAL_VALUES[name] for name in plain_names}
    beside_logical = {name: value for name, value in every.items() if name not in physical}
    plain_start, plain_anonymous = ComputedStyle.__init__, AnonymousStyle.__init__

    def start(self: Any, parent_style: Any, cascaded: Any, *others: Any) -> None:
        """Begin with the first values; what the style sheets say is worked out when asked for."""
        plain_start(self, parent_style, cascaded, *others)
        self.update(every if logical.isdisjoint(cascaded) else beside_logical)
        for name in plain_names.intersection(cascaded):
            del self[name]

    def start_anonymous(self: Any, parent_style: Any) -> None:
        self.update(every)
        plain_anonymous(self, parent_style)

    ComputedStyle.__init__, AnonymousStyle.__init__ = start, start_anonymous

    def is_in_normal_flow(self: Any) -> Any:
        style = self.style
        if style["float"] == "none" and style["position"] == "static":
            return True
        return plain_flow(self)

    Box.is_in_normal_flow = is_in_normal_flow


def _shorten_borders() -> None:
    """Most boxes have neither a border nor an outline."""
    from weasyprint.draw import border
    from weasyprint.formatting_structure.boxes import Box

    plain_border, plain_outline = border.draw_border, border.draw_outline

    def draw_border(stream: Any, box: Any) -> None:
        style = box.style
        if (
            any(box.__dict__[name] for name in _BORDERS)
            or style["column_rule_width"]
            or style["border_image_source"][0] != "none"
        ):
            plain_border(stream, box)

    def draw_outline(stream: Any, box: Any) -> None:
        if box.style["outline_width"]:
            plain_outline(stream, box)
            return
        for child in box.children:
            if isinstance(child, Box):
                draw_outline(stream, child)

    replace_everywhere(plain_border, draw_border)
    replace_everywhere(plain_outline, draw_outline)


def _shorten_backgrounds() -> None:
    """Paint the bands of a background as they are: no group, no pattern, no blend."""
    from weasyprint import draw
    from weasyprint.images import LinearGradient

    plain = draw.draw_background_image

    def draw_background_image(stream: Any, layer: Any, style: Any) -> None:
        once = layer.repeat == ("no-repeat", "no-repeat") and not layer.unbounded
        image = layer.image
        if once and type(image) is LinearGradient and not image.repeating and 0 not in layer.size:
            _, kind, ends, places, colours, _ = image.layout(*layer.size, style)
            bands = list(zip(places, places[1:], colours, colours[1:], strict=False))
            if kind == "linear" and all(a == b or first == last for a, b, first, last in bands):
                _paint_bands(stream, layer, ends, bands)
                return
        plain(stream, layer, style)

    replace_everywhere(plain, draw_background_image)


def _paint_bands(stream: Any, layer: Any, ends: Any, bands: Any) -> None:
    """Paint bands across the line from end to end, inside the place of a background."""
    width, height = layer.size
    x1, y1, x2, y2 = ends
    length = hypot(x2 - x1, y2 - y1)
    across, down = (x2 - x1) / length, (y2 - y1) / length
    far = width + height
    with stream.artifact(), stream.stacked():
        stream.rectangle(*layer.painting_area)
        stream.clip()
        stream.end()
        stream.transform(
            e=layer.positioning_area[0] + layer.position[0],
            f=layer.positioning_area[1] + layer.position[1],
        )
        stream.rectangle(0, 0, width, height)
        stream.clip()
        stream.end()
        stream.transform(across, down, -down, across, x1, y1)
        for start, end, colour, _ in bands:
            if end > start and colour.alpha:
                stream.set_color(colour)
                stream.rectangle(start * length, -far, (end - start) * length, 2 * far)
                stream.fill()


_EDGES = tuple(
    f"{kind}_{side}"
    for kind in ("margin", "padding")
    for side in ("left", "right", "top", "bottom")
)
_SIZES = ("width", "min_width", "max_width", "min_height", "max_height")
_BORDERS = tuple(f"border_{side}_width" for side in ("top", "right", "bottom", "left"))


def _fixed_lengths(style: Any) -> dict[str, Any] | None:
    """The lengths of a style that has no shares and no formulas; ``None`` where it has."""
    fixed: dict[str, Any] = {}
    for name in (*_EDGES, *_SIZES):
        value = style[name]
        if value is not None and value != "auto":
            if getattr(value, "unit", None) != "px":
                return None
            value = value.value
        fixed[name] = value
    for name in ("min_width", "min_height"):
        if fixed[name] == "auto":
            fixed[name] = 0
    return fixed


def _shorten_lengths() -> None:  # noqa: C901, PLR0915 - one small function for each shortcut
    """Resolve the lengths of a style once; most need no box to be resolved for."""
    from weasyprint.css import functions, properties
    from weasyprint.layout import block, percent
    from weasyprint.layout import float as floated

    plain_math, plain_percentages = functions.check_math, percent.resolve_percentages
    plain_radii, plain_one = percent.resolve_radii_percentages, percent.resolve_one_percentage
    bare = (str, int, float, type(None), properties.Dimension, bool)
    zero = (0, "px")
    corners = tuple(
        f"border_{corner}_radius"
        for corner in ("top_left", "top_right", "bottom_right", "bottom_left")
    )
    flat = dict.fromkeys(corners, (0, 0))

    def check_math(token: Any) -> Any:
        """A word, a number or a length is no formula."""
        return None if type(token) in bare else plain_math(token)

    def resolve_percentages(box: Any, containing_block: Any) -> None:
        style = box.style
        kept = style.__dict__
        if "fixed_lengths" not in kept:
            kept["fixed_lengths"] = _fixed_lengths(style)
        fixed = kept["fixed_lengths"]
        if fixed is None or style["box_sizing"] != "content-box":
            plain_percentages(box, containing_block)
            return
        found = box.__dict__
        found.update(fixed)
        height = getattr(containing_block, "height", None)
        if height is None:
            height = containing_block[1]
        if height == "auto":
            own = style["height"]
            by_content = own == "auto" or check_math(own) or own.unit == "%"
            found["height"] = "auto" if by_content else own.value
        else:
            plain_one(box, "height", height)
        collapse = style["border_collapse"] == "collapse"
        for name in _BORDERS:
            if not (collapse and name in found):
                found[name] = style[name]

    def resolve_radii(box: Any) -> None:
        """No corner of most boxes is round."""
        kept = box.style.__dict__
        if "square" not in kept:
            kept["square"] = all(zero in box.style[name] for name in corners)
        if kept["square"]:
            box.__dict__.update(flat)
        else:
            plain_radii(box)

    plain_collisions = floated.avoid_collisions

    def avoid_collisions(context: Any, box: Any, containing_block: Any, outer: bool = True) -> Any:
        """Where nothing floats, a line takes the whole width."""
        plain_case = outer and not context.excluded_shapes and box.style["float"] == "none"
        if plain_case and containing_block.style["direction"] == "ltr":
            return containing_block.content_box_x(), box.position_y, containing_block.width
        return plain_collisions(context, box, containing_block, outer)

    def collapse_margin(margins: Any) -> Any:
        return max(0, *margins) + min(0, *margins) if margins else 0

    replace_everywhere(block.collapse_margin, collapse_margin)
    replace_everywhere(plain_collisions, avoid_collisions)
    replace_everywhere(plain_math, check_math)
    replace_everywhere(plain_percentages, resolve_percentages)
    replace_everywhere(plain_radii, resolve_radii)
