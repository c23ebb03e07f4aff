"""Media types of issued files, from a fixed list: the machine's own list is not asked."""

from __future__ import annotations

from types import MappingProxyType

__all__ = ["MEDIA_TYPES", "media_type"]

MEDIA_TYPES = MappingProxyType(
    {
        ".css": "text/css",
        ".csv": "text/csv",
        ".gz": "application/gzip",
        ".html": "text/html",
        ".js": "text/javascript",
        ".json": "application/json",
        ".md": "text/markdown",
        ".p7s": "application/pkcs7-signature",
        ".pdf": "application/pdf",
        ".png": "image/png",
        ".svg": "image/svg+xml",
        ".toml": "application/toml",
        ".ttf": "font/ttf",
        ".txt": "text/plain",
        ".woff2": "font/woff2",
    }
)
"""Ending of a file name -> media type."""


def media_type(path: str) -> str:
    """Give the media type of a file by the ending of its name.

    Parameters
    ----------
    path
        Path or name.

    Returns
    -------
    str
        Media type; ``application/octet-stream`` where the ending is not known.
    """
    name = path.rpartition("/")[2]
    _, dot, ending = name.rpartition(".")
    return MEDIA_TYPES.get(f"{dot}{ending.lower()}", "application/octet-stream")
