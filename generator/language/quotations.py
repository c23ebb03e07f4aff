"""Marks around text of another language, so that a page can say which language it is in.

A description is plain text by the time it is rendered. What it quotes in another language than
that of the sheet, such as the title of the campaign, stands between marks until then; they are
noncharacters of Unicode, which no text contains.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from contextlib import contextmanager
from contextvars import ContextVar

__all__ = ["MARKS", "after_marks", "are_marked", "marked", "marking", "quoted", "without_marks"]

MARKS = "\ufdd0\ufdd1\ufdd2"
"""What stands before the tag of the language, before the text, and after the text."""

_MARK = re.compile(f"[{MARKS}]")
_BEFORE_TEXT = re.compile(f"{MARKS[0]}[A-Za-z0-9-]*{MARKS[1]}")
_TAG = re.compile("[A-Za-z]{2,8}(?:-[A-Za-z0-9]{1,8})*")
_MARKED: ContextVar[Mapping[str, str] | None] = ContextVar("marked", default=None)


def marked(text: str, language: str) -> str:
    """Put marks around a text.

    Parameters
    ----------
    text
        Plain text.
    language
        Tag of its language; where it is no tag, the text stays as it is.
    """
    if not text or not _TAG.fullmatch(language):
        return text
    return f"{MARKS[0]}{language}{MARKS[1]}{_MARK.sub('', text)}{MARKS[2]}"


def without_marks(text: str) -> str:
    """Take the marks, and the tags between them, out of a text."""
    return _MARK.sub("", _BEFORE_TEXT.sub("", text))


def after_marks(text: str) -> int:
    """Give the place at which the words of a text begin."""
    found = _BEFORE_TEXT.match(text)
    return found.end() if found else 0


@contextmanager
def marking(texts: Mapping[str, str]) -> Iterator[None]:
    """Mark some texts wherever they stand as a whole, for the length of a ``with`` block.

    Parameters
    ----------
    texts
        Text -> the same with its marks.
    """
    before = _MARKED.set(texts or None)
    try:
        yield
    finally:
        _MARKED.reset(before)


def quoted(text: str) -> str:
    """Give a plain text with its marks where it is one of those to be marked."""
    texts = _MARKED.get()
    return texts.get(text, text) if texts else text


def are_marked() -> bool:
    """Whether some texts are to be marked."""
    return _MARKED.get() is not None
