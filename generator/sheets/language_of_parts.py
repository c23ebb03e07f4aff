"""The language of parts of a page: marks of a description become ``lang`` attributes.

Source: WCAG 2.2, success criterion 3.1.2.
"""

from __future__ import annotations

import re

from generator.language.quotations import MARKS, without_marks

__all__ = ["with_languages"]

_ANY = re.compile(f"[{MARKS}]")
_OPENING, _BETWEEN, _CLOSING = MARKS[0], MARKS[1], MARKS[2]
_WORDS = f"[^<{MARKS}]*"
_QUOTED = (
    f"{_OPENING}(?P<tag>[A-Za-z0-9-]+){_BETWEEN}"
    f"(?P<text>{_WORDS}(?:{_CLOSING}[,;.:]? ?{_OPENING}(?P=tag){_BETWEEN}{_WORDS})*){_CLOSING}"
)
"""One text, or several of one language with nothing but a sign between them."""

_UNSPOKEN = re.compile(f"<(script|style)\\b.*?</\\1>|<[^<>]*[{MARKS}][^<>]*>", re.DOTALL)
"""What has no language of parts: scripts, and the attributes of an element."""

_ALONE = re.compile(rf"(?P<open><(?P<name>[A-Za-z][\w-]*)[^<>]*)>\s*{_QUOTED}\s*(?=</(?P=name)>)")
"""Text that is all there is in its element."""

_TEXT_ONLY = re.compile(r"<(title|desc|text|tspan|option|textarea)\b[^<>]*>[^<]*")
"""Elements that hold text and nothing else."""

_PART = re.compile(_QUOTED)


def with_languages(page: str) -> str:
    """Turn the marks of a page into ``lang`` attributes.

    Parameters
    ----------
    page
        A whole page, its texts with their marks.

    Returns
    -------
    str
        The page without marks. Text that fills an element gives it its language; else an element
        of its own is put around it. Where neither can be, as in an attribute, it goes unsaid.
    """
    if not _ANY.search(page):
        return page
    bare = _UNSPOKEN.sub(lambda found: without_marks(found[0]), page)
    filled = _ALONE.sub(_on_the_element, bare)
    plain = _TEXT_ONLY.sub(lambda found: without_marks(found[0]), filled)
    return without_marks(_PART.sub(_in_an_element, plain))


def _on_the_element(found: re.Match[str]) -> str:
    text = without_marks(found[0][len(found["open"]) :])
    said = " lang=" in found["open"]
    return f"{found['open']}{'' if said else _lang(found)}{text}"


def _in_an_element(found: re.Match[str]) -> str:
    return f"<span{_lang(found)}>{without_marks(found[0])}</span>"


def _lang(found: re.Match[str]) -> str:
    return f' lang="{found["tag"]}"'
