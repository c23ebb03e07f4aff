"""Serialising a PDF once: the engine writes every object out twice, once for the identifier.

Each object is written out here and replaced by its bytes; what a reader sees stays the same.
"""

from __future__ import annotations

import zlib
from collections.abc import Callable
from functools import lru_cache
from types import SimpleNamespace
from typing import Any

__all__ = ["lighten_compression", "write_out"]

_LEVEL = 6
"""Of compression; the highest takes twice the time for two bytes in a hundred."""


def _number(value: float) -> bytes:
    if value.is_integer():
        return b"%d" % int(value)
    return f"{value:f}".rstrip("0").encode()


def _dictionary(item: Any) -> bytes:
    return b"<<" + _pairs(item) + b">>"


def _array(item: Any) -> bytes:
    return b"[" + b" ".join(map(_plain, item)) + b"]"


@lru_cache(maxsize=4096)
def _word(text: str) -> bytes:
    return text.encode("ascii")


_WRITERS: dict[type, Callable[[Any], bytes]] = {
    bytes: bytes,
    str: _word,
    int: lambda item: b"%d" % item,
    float: _number,
}


def _plain(item: Any) -> bytes:
    """Write out a value, the way the engine does."""
    kind = type(item)
    writer = _WRITERS.get(kind)
    if writer is None:
        writer = _WRITERS[kind] = _writer(item)
    return writer(item)


def _writer(item: Any) -> Callable[[Any], bytes]:
    """How values of the kind of an item are written."""
    if isinstance(item, dict):
        return _dictionary
    if isinstance(item, list):
        return _array
    if hasattr(item, "data"):
        return lambda value: bytes(value.data)
    return lambda value: str(value).encode("ascii")


def _pairs(item: dict[Any, Any]) -> bytes:
    return b"".join(
        [
            b"/%b %b" % (_word(key) if type(key) is str else _plain(key), _plain(value))
            for key, value in item.items()
        ]
    )


def _stream(item: Any) -> bytes:
    content = b"\n".join(map(_plain, item.stream))
    extra = dict(item.extra)
    if item.compress:
        extra["Filter"] = b"/FlateDecode"
        content = zlib.compress(content, _LEVEL)
    extra["Length"] = len(content)
    return b"\n".join((_plain(extra), b"stream", content, b"endstream"))


def lighten_compression() -> None:
    """Let the engine compress what it packs itself no harder than the rest."""
    import pydyf

    pydyf.zlib = SimpleNamespace(
        compress=zlib.compress, compressobj=lambda level: zlib.compressobj(min(level, _LEVEL))
    )


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
