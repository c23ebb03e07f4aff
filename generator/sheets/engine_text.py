"""Measuring and painting texts in the PDF engine: each style is prepared, each line broken once.

The engine makes a Pango context, a font description and a list of features for every word it
measures, and makes and shapes them again for every word it paints.
"""

from __future__ import annotations

import sys
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

__all__ = ["forget_lines", "replace_everywhere", "shorten_text"]


_BESIDE_FONT = (
    "direction",
    "font_kerning",
    "text_decoration_line",
    "letter_spacing",
    "word_spacing",
    "overflow_wrap",
)
"""What tells the layouts of two styles apart that have the same font, size and language."""


@dataclass(slots=True)
class _Memory:
    """How many broken lines are kept since the last time that they were let go.

    Parameters
    ----------
    age
        How often they were; lines of an earlier age are not used again.
    lines
        Their number.
    """

    age: int = 0
    lines: int = 0


_memory = _Memory()
_MOST_LINES = 5_000
_SOFT_HYPHEN = "\u00ad"


def forget_lines() -> None:
    """Let go of the lines of past documents where they have become many."""
    if _memory.lines > _MOST_LINES:
        _memory.age, _memory.lines = _memory.age + 1, 0


def replace_everywhere(plain: Any, short: Any) -> None:
    """Put a function in the place of another wherever the engine has imported it.

    Parameters
    ----------
    plain, short
        What the engine has, and what takes its place.
    """
    for name, module in list(sys.modules.items()):
        if name.startswith("weasyprint"):
            for key, value in list(vars(module).items()):
                if value is plain:
                    setattr(module, key, short)


def _own_style(style: Any) -> Any:
    """The style that the type of an anonymous box comes from: all of it is inherited."""
    while style.__class__.__name__ == "AnonymousStyle":
        style = style.parent_style
    return style


@dataclass(frozen=True, slots=True)
class _Kit:
    """What Pango needs to know of a style."""

    context: Any
    description: Any
    language: Any
    features: Any


def _new_kit(style: Any) -> _Kit | None:
    """Prepare a style; ``None`` where its layouts cannot share their parts."""
    from weasyprint.text.constants import PANGO_DIRECTION
    from weasyprint.text.ffi import ffi, gobject, pango, unicode_to_char_p
    from weasyprint.text.fonts import get_font_description

    if (
        style["text_decoration_line"] != "none"
        or style["font_language_override"] != "normal"
        or style["letter_spacing"] not in ("normal", 0)
        or style["word_spacing"]
        or style["overflow_wrap"] != "normal"
    ):
        return None
    context = ffi.gc(
        pango.pango_font_map_create_context(style.font_config.font_map), gobject.g_object_unref
    )
    pango.pango_context_set_round_glyph_positions(context, False)
    pango.pango_context_set_base_dir(context, PANGO_DIRECTION[style["direction"]])
    language = pango.pango_language_get_default()
    if style["lang"]:
        pointer, _kept = unicode_to_char_p(style["lang"])
        language = pango.pango_language_from_string(pointer)
        pango.pango_context_set_language(context, language)
    return _Kit(context, get_font_description(style), language, _features(style))


def _features(style: Any) -> Any:
    """The list of features of a style; one list for all styles that ask for the same.

    Pango gives no list back while a layout may use it, so they are kept as long as the faces.
    """
    from weasyprint.text.ffi import pango
    from weasyprint.text.fonts import font_features

    properties = ("variant_ligatures", "variant_position", "variant_caps", "variant_numeric")
    others = ("variant_alternates", "variant_east_asian", "feature_settings")
    wanted = font_features(*(style[f"font_{name}"] for name in ("kerning", *properties, *others)))
    written = ",".join(f"{key} {value}" for key, value in wanted.items()).encode()
    if not written:
        return None
    kept = style.font_config.__dict__.setdefault("feature_lists", {})
    if written not in kept:
        kept[written] = pango.pango_attr_list_new()
        pango.pango_attr_list_insert(kept[written], pango.pango_attr_font_features_new(written))
    return kept[written]


def shorten_text() -> None:  # noqa: C901, PLR0915 - one small function for each shortcut
    """Put the shortcuts of texts in place."""
    from weasyprint.css import ComputedStyle
    from weasyprint.draw import text as drawn
    from weasyprint.pdf import stream
    from weasyprint.text import line_break
    from weasyprint.text.ffi import ffi, gobject, pango

    layout_type, plain_setup = line_break.Layout, line_break.Layout.setup
    plain_text, plain_key = line_break.Layout.set_text, line_break._font_style_cache_key

    def setup(self: Any, style: Any) -> None:
        """Make a layout of the parts that the style keeps."""
        own = _own_style(style)
        kept = own.__dict__
        if "pango_kit" not in kept:
            kits = own.font_config.__dict__.setdefault("pango_kits", {})
            key = font_key(own, include_size=True) + str([own[name] for name in _BESIDE_FONT])
            if key not in kits:
                kits[key] = _new_kit(own)
            kept["pango_kit"] = kits[key]
        kit = kept["pango_kit"]
        if kit is None or self.justification_spacing:
            plain_setup(self, style)
            return
        self.style, self.first_line_direction, self.language = style, 0, kit.language
        self.ascent = self.underline_position = self.strikethrough_position = None
        self.layout = ffi.gc(pango.pango_layout_new(kit.context), gobject.g_object_unref)
        pango.pango_layout_set_auto_dir(self.layout, False)
        pango.pango_layout_set_font_description(self.layout, kit.description)
        if kit.features is not None:
            pango.pango_layout_set_attributes(self.layout, kit.features)

    def set_text(self: Any, text: str, justify: bool = False) -> None:
        """Set the mode of painting now: set later, it would have the text shaped again."""
        single = text.isprintable()
        pango.pango_layout_set_single_paragraph_mode(self.layout, single)
        plain_text(self, text, justify)

    def reactivate(self: Any, style: Any) -> None:
        """Paint the layout that was measured; a spread line has to be laid out again."""
        if self.justification_spacing:
            self.setup(style)
            self.set_text(self.text, justify=True)

    def font_key(style: Any, include_size: bool = False) -> Any:
        kept = _own_style(style).__dict__
        name = "sized_font_key" if include_size else "font_key"
        if name not in kept:
            kept[name] = plain_key(style, include_size)
        return kept[name]

    plain_split = line_break.split_first_line

    def split_first_line(
        text: str,
        style: Any,
        context: Any,
        max_width: Any,
        justification_spacing: Any,
        is_line_start: bool = True,
        minimum: bool = False,
    ) -> Any:
        """Break a text of one style in one width once: columns and grids ask for it again."""
        own = _own_style(style)
        rest = (max_width, justification_spacing, is_line_start, minimum)
        if type(own) is not ComputedStyle or style["white_space"] != own["white_space"]:
            return plain_split(text, style, context, *rest)
        if own.__dict__.get("age_of_lines") != _memory.age:
            own.age_of_lines, own.lines = _memory.age, {}
        kept, key = own.lines, (text, *rest)
        if key not in kept:
            kept[key] = plain_split(text, style, context, *rest)
            _memory.lines += 1
        return kept[key]

    replace_everywhere(plain_split, split_first_line)
    layout_type.setup, layout_type.set_text = setup, set_text
    layout_type.reactivate, layout_type.deactivate = reactivate, _keep
    line_break._font_style_cache_key = font_key
    replace_everywhere(
        line_break.can_break_text, lru_cache(maxsize=4096)(line_break.can_break_text)
    )
    replace_everywhere(drawn.draw_first_line, _first_line_painter(drawn.draw_first_line))
    replace_everywhere(stream.get_pango_font_key, _font_keys(stream.get_pango_font_key))


def _keep(layout: Any) -> None:
    """Let a measured layout live until it is painted."""


def _font_keys(plain: Any) -> Any:
    """Describe each font once. The font is held, so that no other can take its address."""
    from weasyprint.text.ffi import ffi, gobject

    known: dict[int, Any] = {}
    ffi.cdef("void *g_object_ref(void *object);", override=True)

    def font_key(pango_font: Any) -> Any:
        address = int(ffi.cast("uintptr_t", pango_font))
        if address not in known:
            known[address] = plain(pango_font)
            gobject.g_object_ref(pango_font)
        return known[address]

    return font_key


def _first_line_painter(plain: Any) -> Any:
    """Paint a line whose glyphs stand where the face puts them; others as the engine does."""
    from weasyprint.text.ffi import pango

    from generator.sheets.setting.shapes import shape_of_line, write_spans

    def paint(
        stream: Any, textbox: Any, text_overflow: Any, block_ellipsis: Any, matrix: Any
    ) -> Any:
        text, layout = textbox.pango_layout.text, textbox.pango_layout.layout
        if text_overflow == "ellipsis" or block_ellipsis != "none" or _SOFT_HYPHEN in text:
            return plain(stream, textbox, text_overflow, block_ellipsis, matrix)
        if not text.strip():
            return []
        line = pango.pango_layout_get_line_readonly(layout, 0)
        shape = shape_of_line(line, text.encode(), textbox.style)
        if shape.spans is None:
            return plain(stream, textbox, text_overflow, block_ellipsis, matrix)
        stream.set_text_matrix(*matrix.values)
        write_spans(stream, shape.spans)
        return []

    return paint
