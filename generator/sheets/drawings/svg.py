"""SVG by hand: a canvas that writes elements, escapes text, and thins out long paths.

Colours are named roles of the theme (``ink``, ``quiet``, ``hair``, ``accent`` ...). Each element
carries the role twice: as a presentation attribute with the theme's print colour, which is all
that the PDF engine sees, and as a class, by which the style sheet of a page may overrule it in
the dark. No element carries a style attribute, so a strict content security policy holds.
"""

from __future__ import annotations

import itertools
from collections.abc import Mapping, Sequence
from html import escape

import numpy as np
from numpy.typing import NDArray

from generator.language import told
from generator.sheets.drawings.drawing import Palette

__all__ = ["FONT_FAMILY", "MOST_POINTS", "Canvas", "coordinate", "outline", "thinned"]

FONT_FAMILY = "Sheet Sans"
MOST_POINTS = 200
"""A path is thinned until it has no more points than this."""

_TOLERANCE_PX = 0.12
_FIRST_PASS = 2000

Array = NDArray[np.float64]


def coordinate(value: float) -> str:
    """Write a coordinate with one decimal at the most."""
    text = f"{value:.1f}".removesuffix(".0")
    return "0" if text == "-0" else text


def thinned(points: Array, most: int = MOST_POINTS) -> Array:
    """Drop the points of a path that the eye does not miss.

    Parameters
    ----------
    points
        Points in pixels (points, 2).
    most
        Largest number of points kept.

    Returns
    -------
    numpy.ndarray
        The kept points; ends and corners stay (kept, 2).

    Notes
    -----
    Line simplification by greatest distance (Douglas and Peucker 1973), with a tolerance that
    grows until few enough points are left.
    """
    if len(points) > _FIRST_PASS:
        points = _extremes(points, _FIRST_PASS // 2)
    tolerance = _TOLERANCE_PX
    kept = points[_corners(points, tolerance)]
    while len(kept) > most:
        tolerance *= 1.4
        kept = points[_corners(points, tolerance)]
    return kept


def _extremes(points: Array, buckets: int) -> Array:
    """Keep the lowest and the highest point of each bucket."""
    edges = np.linspace(0, len(points), buckets + 1).astype(int)
    chosen = {0, len(points) - 1}
    for first, last in itertools.pairwise(edges):
        part = points[first:last, 1]
        chosen.add(int(first + part.argmin()))
        chosen.add(int(first + part.argmax()))
    return points[sorted(chosen)]


def _corners(points: Array, tolerance: float) -> NDArray[np.bool_]:
    keep = np.zeros(len(points), dtype=bool)
    keep[[0, -1]] = True
    stack = [(0, len(points) - 1)]
    while stack:
        first, last = stack.pop()
        if last - first < 2:
            continue
        start, chord = points[first], points[last] - points[first]
        between = points[first + 1 : last] - start
        length = float(np.hypot(*chord))
        if length > 0:
            distance = np.abs(chord[0] * between[:, 1] - chord[1] * between[:, 0]) / length
        else:
            distance = np.hypot(between[:, 0], between[:, 1])
        at = int(distance.argmax())
        if distance[at] > tolerance:
            middle = first + 1 + at
            keep[middle] = True
            stack += [(first, middle), (middle, last)]
    return keep


def outline(points: Array, *, closed: bool = False) -> str:
    """Write points as the data of a path."""
    pairs = [f"{coordinate(x)} {coordinate(y)}" for x, y in points]
    return "M" + "L".join(pairs) + ("Z" if closed else "")


class Canvas:
    """One drawing being made.

    Parameters
    ----------
    width, height
        Size in pixels; the drawing scales to the place it is put.
    palette
        Role -> colour of the theme on paper.
    size
        Text size in pixels.
    """

    def __init__(self, width: float, height: float, palette: Palette, *, size: float = 10) -> None:
        self.width = width
        self.height = height
        self.palette = palette
        self.size = size
        self._parts: list[str] = []

    def _element(
        self, name: str, attributes: Mapping[str, str], content: str | None = None
    ) -> None:
        written = "".join(f' {key}="{escape(value)}"' for key, value in attributes.items())
        tail = "/>" if content is None else f">{content}</{name}>"
        self._parts.append(f"<{name}{written}{tail}")

    def _stroke(self, role: str, width: float, dash: str) -> dict[str, str]:
        """A role of the theme, or a colour written ``#rrggbb``."""
        named = {} if role.startswith("#") else {"class": f"s-{role}"}
        attributes = named | {
            "fill": "none",
            "stroke": self.palette.get(role, role),
            "stroke-width": coordinate(width),
        }
        if dash:
            attributes["stroke-dasharray"] = dash
        return attributes

    def _fill(self, role: str) -> dict[str, str]:
        """A role of the theme, or a colour of nature written ``#rrggbb`` or ``url(#id)``."""
        if role.startswith(("#", "url(")):
            return {"fill": role}
        return {"class": f"f-{role}", "fill": self.palette[role]}

    def line(
        self,
        start: tuple[float, float],
        end: tuple[float, float],
        role: str = "hair",
        *,
        width: float = 1,
        dash: str = "",
    ) -> None:
        """Draw a straight line."""
        ends = {
            "x1": coordinate(start[0]),
            "y1": coordinate(start[1]),
            "x2": coordinate(end[0]),
            "y2": coordinate(end[1]),
        }
        self._element("line", ends | self._stroke(role, width, dash))

    def path(
        self,
        points: Array,
        role: str = "ink",
        *,
        width: float = 1.4,
        dash: str = "",
        closed: bool = False,
    ) -> None:
        """Draw a line through points (points, 2)."""
        data = {"d": outline(thinned(points), closed=closed), "stroke-linejoin": "round"}
        self._element("path", data | self._stroke(role, width, dash))

    def pieces(
        self, pieces: Sequence[Array], role: str = "ink", *, width: float = 1.4, dash: str = ""
    ) -> None:
        """Draw lines that do not hang together as one path; nothing where there are none."""
        if pieces:
            data = {"d": "".join(outline(piece) for piece in pieces)}
            self._element("path", data | self._stroke(role, width, dash))

    def area(self, points: Array, role: str, *, opacity: float = 1) -> None:
        """Fill the outline through points (points, 2)."""
        attributes = {"d": outline(points, closed=True)} | self._fill(role)
        if opacity < 1:
            attributes["fill-opacity"] = f"{opacity:.2f}"
        self._element("path", attributes)

    def rectangle(self, corner: tuple[float, float], size: tuple[float, float], role: str) -> None:
        """Fill a rectangle; nothing is drawn where it has no width."""
        if size[0] <= 0 or size[1] <= 0:
            return
        place = {
            "x": coordinate(corner[0]),
            "y": coordinate(corner[1]),
            "width": coordinate(size[0]),
            "height": coordinate(size[1]),
        }
        self._element("rect", place | self._fill(role))

    def dot(
        self, centre: tuple[float, float], radius: float, role: str, *, hollow: bool = False
    ) -> None:
        """Draw a dot, filled or hollow."""
        place = {
            "cx": coordinate(centre[0]),
            "cy": coordinate(centre[1]),
            "r": coordinate(radius),
        }
        paint = self._stroke(role, 1.2, "") if hollow else self._fill(role)
        self._element("circle", place | paint)

    def text(
        self,
        at: tuple[float, float],
        words: str,
        role: str = "quiet",
        *,
        anchor: str = "start",
        bold: bool = False,
        size: float | None = None,
        edge: str = "",
    ) -> None:
        """Write words; ``anchor`` is ``start``, ``middle`` or ``end``, ``edge`` their border."""
        attributes = {"x": coordinate(at[0]), "y": coordinate(at[1])} | self._fill(role)
        if anchor != "start":
            attributes["text-anchor"] = anchor
        if bold:
            attributes["font-weight"] = "600"
        if size is not None:
            attributes["font-size"] = coordinate(size)
        if edge:
            attributes |= {"stroke": self.palette.get(edge, edge), "stroke-width": "0.7"}
        self._element("text", attributes, escape(told(words), quote=False))

    def gradient(self, name: str, stops: Sequence[tuple[float, str]]) -> str:
        """Define a gradient from left to right; give what to fill with."""
        inner = "".join(
            f'<stop offset="{place:.3f}" stop-color="{colour}"/>' for place, colour in stops
        )
        ends = {"x1": "0", "y1": "0", "x2": coordinate(self.width), "y2": "0"}
        self._element(
            "linearGradient", {"id": name, "gradientUnits": "userSpaceOnUse"} | ends, inner
        )
        return f"url(#{name})"

    def finish(self, title: str, *, kind: str = "drawing") -> str:
        """Close the drawing.

        Parameters
        ----------
        title
            The finding in words; read aloud in place of the drawing.
        kind
            Class of the element.
        """
        width, height = coordinate(self.width), coordinate(self.height)
        return (
            f'<svg xmlns="http://www.w3.org/2000/svg" class="{kind}" role="img"'
            f' viewBox="0 0 {width} {height}" width="{width}" height="{height}">'
            f"<title>{escape(told(title), quote=False)}</title>"
            f'<g font-family="{FONT_FAMILY}" font-size="{coordinate(self.size)}">'
            f"{''.join(self._parts)}</g></svg>"
        )
