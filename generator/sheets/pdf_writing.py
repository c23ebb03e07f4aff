"""Serialising a PDF once: the engine writes every object out twice, once for the identifier.

Each object is written out here and replaced by its bytes; what a reader sees stays the same.
"""

from __future__ import annotations

import zlib
from collections.abc import Callable
from typing import Any

__all__ = ["write_out"]

_LEVEL = 6
"""Of compression; the highest takes twice the time for two bytes in a hundred."""


def _number(value: float) -> bytes:
    if value.is_integer():
        return b"%d" % int(value)
    return f"{value:f}".rstrip("0").encode()


_SIMPLE: dict[type, Callable[[Any], bytes]] = {
    bytes: bytes,
    str: lambda item: item.encode("ascii"),
    int: lambda item: b"%d" % item,
    float: _number,
}


def _plain(item: Any) -> bytes:
    """Write out a value, the way the engine does."""
    simple = _SIMPLE.get(type(item))
    if simple is not None:
        return simple(item)
    if isinstance(item, dict):
        return b"<<" + _pairs(item) + b">>"
    if isinstance(item, list):
        return b"[" + b" ".join(map(_plain, item)) + b"]"
    return bytes(item.data) if hasattr(item, "data") else str(item).encode("ascii")


def _pairs(item: dict[Any, Any]) -> bytes:
    return b"".join(
        b"/%b %b" % (key.encode("ascii") if type(key) is str else _plain(key), _plain(value))
        for key, value in item.items()
    )


def _stream(item: Any) -> bytes:
    content = b"\n".join(map(_plain, item.stream))
    extra = dict(item.extra)
    if item.compress:
        extra["Filter"] = b"/FlateDecode"
        content = zlib.compress(content, _LEVEL)
    extra["Length"] = len(content)
    return b"\n".join((_plain(extra), b"stream", content, b"endstream"))


def write_out(pdf: Any) -> None:
    """Replace the objects of a file that is about to be written by their bytes.

    Parameters
    ----------
    pdf
        The file of the engine; nothing in it may change afterwards.
    """
    from pydyf import Object, Stream

    class WrittenOut(Object):  # type: ignore[misc] # the library has no types
        """An object of the file, as bytes."""

        def __init__(self, item: Any) -> None:
            super().__init__()
            is_stream = isinstance(item, Stream)
            self.number, self.generation, self.free = item.number, item.generation, item.free
            self._data = _stream(item) if is_stream else _plain(item)
            self._packed = not item.generation and not is_stream

        @property
        def data(self) -> bytes:
            return self._data

        @property
        def compressible(self) -> bool:
            return self._packed

    pdf.objects[:] = [item if item.free == "f" else WrittenOut(item) for item in pdf.objects]
