"""A finished drawing: SVG, the finding in words, and the table behind it."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

__all__ = ["DataTable", "Drawing", "Palette"]

Palette = Mapping[str, str]
"""Role -> colour of the theme on paper."""


@dataclass(frozen=True, slots=True)
class DataTable:
    """The numbers behind a drawing, as finished text.

    Parameters
    ----------
    headings
        Column headings with units.
    rows
        Cells, one tuple per row; the first cell is the heading of its row.
    """

    headings: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]


@dataclass(frozen=True, slots=True)
class Drawing:
    """One drawing, or the statement that there is nothing to draw.

    Parameters
    ----------
    key
        Name of the drawing, unique on a sheet.
    heading
        Topic in a few words.
    caption
        The finding in a sentence; where there is no drawing, why.
    svg
        The drawing; empty where there is none.
    table
        The numbers behind it; ``None`` where there is no drawing.
    """

    key: str
    heading: str
    caption: str
    svg: str = ""
    table: DataTable | None = None
