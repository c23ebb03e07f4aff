"""Remarks in Markdown, made into clean HTML; nothing of raw HTML, scripts or pictures passes."""

from __future__ import annotations

import html
import re

from generator.sheets.description import Note

__all__ = ["clean_notes"]

_TAGS = {"p", "em", "strong", "code", "ul", "ol", "li", "br", "blockquote", "a", "h3", "h4"}
_TAGS |= {"table", "thead", "tbody", "tr", "th", "td", "pre", "hr", "sup", "sub"}
_BLOCK = re.compile(r"(?<=>)\n(?=<(?:p|ul|ol|blockquote|h3|h4|table|pre|hr)\b)")


def clean_notes(markdown_text: str) -> tuple[Note, ...]:
    """Make remarks fit to be printed.

    Parameters
    ----------
    markdown_text
        Markdown; may be empty, may be hostile.

    Returns
    -------
    tuple of Note
        One note per block. Headings sink below those of the sheet, links keep only ``https``
        and ``mailto`` targets, raw HTML is shown as the text it is.
    """
    if not markdown_text.strip():
        return ()
    import markdown
    import nh3

    converter = markdown.Markdown(extensions=["tables", "sane_lists"], output_format="html")
    converter.preprocessors.deregister("html_block")
    converter.inlinePatterns.deregister("html")
    page = nh3.clean(
        _sunk(converter.convert(markdown_text)),
        tags=_TAGS,
        attributes={"a": {"href"}},
        url_schemes={"https", "mailto"},
        link_rel="noreferrer",
    )
    return tuple(
        Note(block.strip(), len(html.unescape(re.sub(r"<[^>]*>", "", block))))
        for block in _BLOCK.split(page)
        if block.strip()
    )


def _sunk(page: str) -> str:
    """Turn headings of any level into the two levels that fit under a heading of the sheet."""
    page = re.sub(r"<(/?)h[3-6]\b[^>]*>", r"<\1h4>", page)
    return re.sub(r"<(/?)h[12]\b[^>]*>", r"<\1h3>", page)
