"""Stretches of text as the face shows them, kept as the operators that write them on a page."""

from __future__ import annotations

import struct
from dataclasses import dataclass
from typing import Any, NamedTuple
from weakref import WeakSet

from weasyprint.pdf import stream
from weasyprint.text import line_break
from weasyprint.text.ffi import FROM_UNITS, TO_UNITS, ffi, pango

__all__ = [
    "Shape",
    "broken",
    "forget_shapes",
    "shape_of_line",
    "shaped",
    "strut",
    "write_shape",
    "write_spans",
]

_GLYPH = struct.Struct("=IiiiI")
_MOST_SHAPES = 30_000
_NOTHING = 0x0FFFFFFF
"""Stands for a letter without a mark, such as the space at the end of a line."""


class _Span(NamedTuple):
    """A stretch of glyphs of one font."""

    font: Any
    key: Any
    size: float
    widths: dict[int, int]
    letters: dict[int, str]
    operator: bytes


@dataclass(frozen=True, slots=True)
class Shape:
    """A stretch of text as the face shows it.

    Parameters
    ----------
    width
        Its advance [px].
    spans
        Its glyphs, font by font; ``None`` where a glyph is moved from its place.
    layout
        Its layout, where the engine has to write it.
    """

    width: float
    spans: tuple[_Span, ...] | None
    layout: Any = None


@dataclass(slots=True, eq=False, weakref_slot=True)
class _Hand:
    """What sets texts of one font, size and language.

    Parameters
    ----------
    layout
        A layout for one text after the other.
    shapes
        Text -> shape.
    lines
        Text and width -> shapes of its lines.
    """

    layout: Any
    shapes: dict[str, Shape]
    lines: dict[tuple[str, float], list[Shape] | None]


_HANDS: WeakSet[_Hand] = WeakSet()
"""Every hand; each lives with the faces that it sets texts in."""


def strut(style: Any) -> tuple[float, float]:
    """Height of a line and its baseline from the top [px].

    Parameters
    ----------
    style
        Of the engine.
    """
    kept = style.__dict__
    if "strut" not in kept:
        kept["strut"] = line_break.strut(style)
    height, baseline = kept["strut"]
    return height, baseline


def forget_shapes() -> None:
    """Let go of the shapes of past documents where they have become many."""
    if sum(len(hand.shapes) + len(hand.lines) for hand in _HANDS) > _MOST_SHAPES:
        for hand in _HANDS:
            hand.shapes.clear()
            hand.lines.clear()


def _hand(style: Any) -> _Hand:
    kept = style.__dict__
    if "hand" not in kept:
        hands = style.font_config.__dict__.setdefault("hands", {})
        key = line_break._font_style_cache_key(style, include_size=True), style["lang"]
        if key not in hands:
            hands[key] = _Hand(line_break.create_layout("", style, None, None, 0), {}, {})
            _HANDS.add(hands[key])
        kept["hand"] = hands[key]
    hand: _Hand = kept["hand"]
    return hand


def shaped(text: str, style: Any) -> Shape:
    """Shape a text.

    Parameters
    ----------
    text
        A stretch without a line break.
    style
        Its style, of the engine.
    """
    hand = _hand(style)
    shape = hand.shapes.get(text)
    if shape is None:
        hand.layout.set_text(text)
        line = pango.pango_layout_get_line_readonly(hand.layout.layout, 0)
        shape = shape_of_line(line, text.encode(), style)
        if shape.spans is None:
            layout = line_break.create_layout(text, style, None, None, 0)
            shape = Shape(shape.width, None, layout)
        hand.shapes[text] = shape
    return shape


def broken(text: str, style: Any, width: float) -> list[Shape] | None:
    """Break a text into lines; ``None`` where a glyph is moved from its place.

    Parameters
    ----------
    text
        Words of one style.
    style
        Of the engine; lines may be broken in it.
    width
        Room [px].
    """
    hand = _hand(style)
    key = (text, width)
    if key not in hand.lines:
        hand.lines[key] = _broken(text, style, width, hand.layout)
    return hand.lines[key]


def _broken(text: str, style: Any, width: float, layout: Any) -> list[Shape] | None:
    written = text.encode()
    pango.pango_layout_set_width(layout.layout, int(max(0.0, width) * TO_UNITS))
    try:
        layout.set_text(text)
        shapes: list[Shape] = []
        while True:
            line = pango.pango_layout_get_line_readonly(layout.layout, len(shapes))
            if line == ffi.NULL:
                return shapes
            shape = shape_of_line(line, written, style)
            if shape.spans is None:
                return None
            shapes.append(shape)
    finally:
        pango.pango_layout_set_width(layout.layout, -1)


def shape_of_line(line: Any, text: bytes, style: Any) -> Shape:
    """Give the shape of a line of a layout.

    Parameters
    ----------
    line
        The line, of Pango.
    text
        The text of the whole layout.
    style
        Its style, of the engine.
    """
    width, _ = line_break.line_size(line, style)
    spans: list[_Span] = []
    run = line.runs[0] if line.runs != ffi.NULL else ffi.NULL
    while run != ffi.NULL:
        item, run = run.data, run.next
        span = _span(item, text)
        if span is None:
            return Shape(width, None)
        spans.append(span)
    return Shape(width, tuple(spans))


def _span(item: Any, text: bytes) -> _Span | None:
    """The glyphs of an item; ``None`` where one stands elsewhere than the face puts it."""
    string, font = item.glyphs, item.item.analysis.font
    size = string.num_glyphs * _GLYPH.size
    glyphs = list(_GLYPH.iter_unpack(ffi.buffer(string.glyphs, size)))
    unknown = pango.PANGO_GLYPH_UNKNOWN_FLAG
    if any(glyph >= unknown or across or up for glyph, _, across, up, _ in glyphs):
        return None
    key, _, font_size = stream.get_pango_font_key(font)
    scale = 1000 * FROM_UNITS / font_size
    widths: dict[int, int] = {}
    operator = ""
    logical = ffi.new("PangoRectangle *")
    for glyph, width, *_ in glyphs:
        if glyph == _NOTHING:
            continue
        if glyph not in widths:
            pango.pango_font_get_glyph_extents(font, glyph, ffi.NULL, logical)
            widths[glyph] = round(logical.width * scale)
        operator += f"{glyph:04x}"
        if nearer := int(widths[glyph] - width * scale):
            operator += f">{nearer}<"
    written = f"[<{operator}>] TJ".replace("<>", "").encode()
    return _Span(font, key, font_size, widths, _letters(item, glyphs, text), written)


def _letters(item: Any, glyphs: list[Any], text: bytes) -> dict[int, str]:
    """What the glyphs of an item stand for."""
    start, end = item.item.offset, item.item.offset + item.item.length
    backwards = item.item.analysis.level % 2
    places = [item.glyphs.log_clusters[at] for at in range(len(glyphs))]
    letters: dict[int, str] = {}
    for at, (glyph, *_) in enumerate(glyphs):
        if glyph == _NOTHING:
            continue
        if backwards:
            last = places[at - 1] if at else end - start
        else:
            last = places[at + 1] if at + 1 < len(glyphs) else end - start
        letters.setdefault(glyph, text[start + places[at] : start + last].decode())
    return letters


def write_shape(page: Any, shape: Shape, style: Any, x: float, y: float) -> None:
    """Write a shape at a point of a page, inside a text object.

    Parameters
    ----------
    page
        The page of the engine.
    shape
        What is written.
    style
        Its style.
    x, y
        Where its baseline begins [px].
    """
    if shape.spans is None:
        from weasyprint.draw.text import draw_first_line
        from weasyprint.matrix import Matrix
        from weasyprint.svg.text import TextBox

        text_box = TextBox(shape.layout, style)
        draw_first_line(page, text_box, "clip", "none", Matrix(d=-1, e=x, f=y))
        return
    page.stream.append(b"1 0 0 -1 %.3f %.3f Tm" % (x, y))
    write_spans(page, shape.spans)


def write_spans(page: Any, spans: tuple[_Span, ...]) -> None:
    """Write glyphs where the page stands, inside a text object.

    Parameters
    ----------
    page
        The page of the engine.
    spans
        The glyphs.
    """
    for span in spans:
        font = page._fonts.get(span.key) or page.add_font(span.font)[0]
        page.set_font_size(font.hash, span.size)
        if not font.to_unicode.keys() >= span.letters.keys():
            for glyph, width in span.widths.items():
                font.widths.setdefault(glyph, width)
            for glyph, letters in span.letters.items():
                font.to_unicode.setdefault(glyph, letters)
        page.stream.append(span.operator)
