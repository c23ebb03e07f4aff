"""What a reader of a PDF finds in it: words and their places, structure, grey of every point."""

from __future__ import annotations

import io
import re
import subprocess
from html import unescape
from typing import Any, NamedTuple

import numpy as np
import pikepdf

__all__ = [
    "DOTS",
    "Word",
    "figures_of",
    "grey_of",
    "languages_in",
    "most_different",
    "paper",
    "structure_of",
    "text_of",
    "words_of",
]

DOTS = 150
_PAGE_OR_WORD = re.compile(
    r'<page |<word xMin="([^"]+)" yMin="([^"]+)" xMax="([^"]+)" yMax="([^"]+)">([^<]*)'
)

_NEIGHBOURS = 9


class Word(NamedTuple):
    """A word as poppler reads it [pt from the upper left corner]."""

    text: str
    left: float
    top: float
    right: float
    bottom: float


def paper(body: str, style: str = "") -> str:
    """A whole page around a body."""
    own = f"<style>{style}</style>" if style else ""
    return (
        '<!DOCTYPE html>\n<html lang="en"><head><meta charset="utf-8"><title>t</title>'
        f"{own}</head><body>{body}</body></html>"
    )


def _poppler(tool: str, data: bytes, *options: str) -> bytes:
    return subprocess.run([tool, *options, "-"], input=data, capture_output=True, check=True).stdout


def words_of(data: bytes) -> list[list[Word]]:
    """The words of every page, in the order of the file."""
    found = subprocess.run(
        ["pdftotext", "-bbox", "-raw", "-", "-"],  # noqa: S607 - poppler, wherever it lies
        input=data,
        capture_output=True,
        check=True,
    ).stdout.decode()
    pages: list[list[Word]] = []
    for match in _PAGE_OR_WORD.finditer(found):
        if match[5] is None:
            pages.append([])
        else:
            pages[-1].append(Word(unescape(match[5]), *map(float, match.groups()[:4])))
    return pages


def text_of(data: bytes) -> str:
    """All words, one blank between them."""
    return " ".join(word.text for page in words_of(data) for word in page)


def grey_of(data: bytes, page: int = 1, dots_per_inch: int = DOTS) -> Any:
    """The grey of every point of a page, from 0 (black) to 255."""
    place = str(page)
    written = _poppler(
        "pdftoppm", data, "-gray", "-r", str(dots_per_inch), "-f", place, "-l", place
    )
    head = re.match(rb"P5\s+(\d+)\s+(\d+)\s+255\s", written)
    assert head is not None
    width, height = int(head[1]), int(head[2])
    return np.frombuffer(written[head.end() :], dtype=np.uint8).reshape(height, width).astype(int)


def most_different(grey: Any, other: Any) -> float:
    """The greatest difference of two pages, each point taken with its neighbours.

    A line that falls between two rows of points is smeared over both or drawn on one; among the
    neighbours its ink is the same.
    """
    away = grey - other
    for axis in (0, 1):
        sums = np.cumsum(np.insert(away, 0, 0, axis=axis), axis=axis)
        count = sums.shape[axis] - _NEIGHBOURS
        ends = np.arange(_NEIGHBOURS, sums.shape[axis])
        away = (sums.take(ends, axis) - sums.take(np.arange(count), axis)) / _NEIGHBOURS
    return float(np.abs(away).max())


def structure_of(data: bytes) -> list[tuple[int, str, Any]]:
    """The elements of the structure in reading order: depth, kind, element's own entries."""
    with pikepdf.open(io.BytesIO(data)) as pdf:
        stack: list[tuple[int, Any]] = [(0, pdf.Root.StructTreeRoot.K[0])]
        found: list[tuple[int, str, Any]] = []
        while stack:
            depth, node = stack.pop()
            if not isinstance(node, pikepdf.Dictionary) or "/S" not in node:
                continue
            own = {name: str(node[name]) for name in ("/Alt", "/Lang") if name in node}
            if "/A" in node and "/Scope" in node.A:
                own["/Scope"] = str(node.A.Scope)
            found.append((depth, str(node.S).removeprefix("/"), own))
            below = node.get("/K", [])
            below = list(below) if isinstance(below, pikepdf.Array) else [below]
            stack += [(depth + 1, kid) for kid in reversed(below)]
        return found


def figures_of(data: bytes) -> list[list[tuple[float, ...]]]:
    """The places of the drawings of every page [pt from the upper left corner]."""
    with pikepdf.open(io.BytesIO(data)) as pdf:
        found: list[list[tuple[float, ...]]] = [[] for _ in pdf.pages]
        places = {page.objgen: at for at, page in enumerate(pdf.pages)}
        heights = [float(page.mediabox[3]) for page in pdf.pages]
        for item in pdf.objects:
            if isinstance(item, pikepdf.Dictionary) and item.get("/S") == "/Figure":
                at = places[item.Pg.objgen]
                left, low, right, high = map(float, item.A.BBox)
                found[at].append((left, heights[at] - high, right, heights[at] - low))
        return found


def languages_in(data: bytes) -> list[tuple[str, str]]:
    """The languages of elements of the structure, and of marked words inside them."""
    found = [(kind, own["/Lang"]) for _, kind, own in structure_of(data) if "/Lang" in own]
    with pikepdf.open(io.BytesIO(data)) as pdf:
        for page in pdf.pages:
            for operands, operator in pikepdf.parse_content_stream(page):
                if str(operator) != "BDC" or not isinstance(operands[1], pikepdf.Dictionary):
                    continue
                if "/Lang" in operands[1]:
                    found.append((f"words in {operands[0]}", str(operands[1].Lang)))
    return found
