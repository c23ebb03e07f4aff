"""The bundled typeface: which characters it covers, and what is printed for those it does not."""

from __future__ import annotations

import re
import struct
from functools import cache

from generator.sheets.themes import FACES, font_bytes

__all__ = ["printable", "uncovered_characters"]

_UNSEEN = frozenset("\n\r\t")


@cache
def _covered() -> frozenset[int]:
    """Code points that every face covers."""
    return frozenset.intersection(*(_code_points(font_bytes(name)) for name in FACES))


def _code_points(font: bytes) -> frozenset[int]:
    """Read the format 4 character map of a TrueType face (OpenType, table cmap)."""
    tables = struct.unpack_from(">H", font, 4)[0]
    records = (struct.unpack_from(">4s3I", font, 12 + 16 * index) for index in range(tables))
    start = next(offset for name, _, offset, _ in records if name == b"cmap")
    points: set[int] = set()
    for index in range(struct.unpack_from(">H", font, start + 2)[0]):
        offset = start + struct.unpack_from(">2HI", font, start + 4 + 8 * index)[2]
        if struct.unpack_from(">H", font, offset)[0] == 4:
            points |= _segments(font, offset)
    return frozenset(points)


def _segments(font: bytes, offset: int) -> set[int]:
    count = struct.unpack_from(">H", font, offset + 6)[0] // 2
    ends = struct.unpack_from(f">{count}H", font, offset + 14)
    starts = struct.unpack_from(f">{count}H", font, offset + 16 + 2 * count)
    return {
        point
        for first, last in zip(starts, ends, strict=True)
        if first != 0xFFFF
        for point in range(first, last + 1)
    }


@cache
def _elsewhere() -> re.Pattern[str]:
    """What matches a character that is not covered."""
    known = "".join(re.escape(char) for char in sorted({*map(chr, _covered()), *_UNSEEN}))
    return re.compile(f"[^{known}]")


def uncovered_characters(text: str) -> tuple[str, ...]:
    """List the characters that the bundled typeface cannot print, each once, in order.

    Parameters
    ----------
    text
        Any text.
    """
    return tuple(dict.fromkeys(_elsewhere().findall(text)))


def printable(text: str) -> str:
    """Replace what the typeface cannot print by its code point, ``[U+4E2D]``, plain to see.

    Parameters
    ----------
    text
        Any text; markup stays as it is, because its own characters are all covered.
    """
    missing = uncovered_characters(text)
    if not missing:
        return text
    return text.translate({ord(char): f"[U+{ord(char):04X}]" for char in missing})
