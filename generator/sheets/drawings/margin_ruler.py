"""The margin ruler: how far a value stands from its limit, the passing side always on the right.

The limit stands at the same place on every ruler and distances are shares of the limit, so a
column of rulers is read in one sweep. Distance is drawn on a square-root scale: what is near the
edge is spread out, what is far is drawn together. The tick is the determined value, the band its
expanded uncertainty, the ring the declared value; an arrow head says that the value lies beyond
the end.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["LEFT_END", "RIGHT_END", "Distance", "draw_margin_ruler", "draw_ruler_scale", "place"]

LEFT_END, RIGHT_END = -0.25, 1.0
"""Ends of the ruler as shares of the limit."""

_WIDTH, _HEIGHT, _EDGE = 120.0, 18.0, 5.0


@dataclass(frozen=True, slots=True)
class Distance:
    """Distance of a value from its limit, as a share of the limit.

    Parameters
    ----------
    margin
        Positive on the passing side.
    uncertainty
        Expanded uncertainty as a share of the limit, or ``None``.
    """

    margin: float
    uncertainty: float | None = None


def place(share: float, width: float = _WIDTH) -> float:
    """Give the pixel of a distance; ends are clamped.

    Parameters
    ----------
    share
        Distance as a share of the limit.
    width
        Width of the ruler in pixels.
    """
    clamped = min(max(share, LEFT_END), RIGHT_END)
    root = math.copysign(math.sqrt(abs(clamped)), clamped)
    low, high = -math.sqrt(-LEFT_END), math.sqrt(RIGHT_END)
    return _EDGE + (root - low) / (high - low) * (width - 2 * _EDGE)


def draw_margin_ruler(
    distance: Distance | None,
    role: str,
    title: str,
    palette: Palette,
    *,
    declared: Distance | None = None,
) -> str:
    """Draw one ruler.

    Parameters
    ----------
    distance
        Where the determined value stands; ``None`` where there is none.
    role
        Colour of the tick: ``good``, ``bad`` or ``open``.
    title
        The finding in words.
    palette
        Colours of the theme.
    declared
        Where the declared value stands, drawn as a ring; ``None`` where there is none.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    middle, limit = _HEIGHT / 2, place(0)
    canvas.line((_EDGE, middle), (_WIDTH - _EDGE, middle), "hair", width=1)
    canvas.line((limit, 0), (limit, _HEIGHT), "ink", width=0.9)
    if distance is not None:
        _tick(canvas, distance, middle, role)
    if declared is not None:
        canvas.dot((place(declared.margin), middle), 3.6, "ink", hollow=True)
    return canvas.finish(title, kind="ruler")


def _tick(canvas: Canvas, distance: Distance, middle: float, role: str) -> None:
    if distance.uncertainty is not None:
        low = place(distance.margin - distance.uncertainty)
        high = place(distance.margin + distance.uncertainty)
        canvas.rectangle((low, middle - 2.5), (max(high - low, 1.0), 5), f"{role}-soft")
    at = place(distance.margin)
    if distance.margin > RIGHT_END:
        canvas.area(_head(at, middle, 1), role)
    elif distance.margin < LEFT_END:
        canvas.area(_head(at, middle, -1), role)
    else:
        canvas.rectangle((at - 1.1, middle - 6), (2.2, 12), role)


def _head(at: float, middle: float, way: int) -> np.ndarray[tuple[int, int], np.dtype[np.float64]]:
    back = at - 6.0 * way
    return np.array([[back, middle - 4.5], [at + 2.0 * way, middle], [back, middle + 4.5]])


def draw_ruler_scale(words: tuple[str, str], title: str, palette: Palette) -> str:
    """Draw the scale that heads a column of rulers.

    Parameters
    ----------
    words
        What is written on the failing and on the passing side.
    title
        The scale in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, 26, palette, size=8.5)
    canvas.text((place(0) - 4, 8), words[0], anchor="end")
    canvas.text((place(0) + 4, 8), words[1])
    for share, text in ((-0.25, "\u221225"), (0.0, "0"), (0.25, "25"), (1.0, "100 %")):
        at = place(share)
        canvas.line((at, 22), (at, 26), "ink" if share == 0 else "quiet", width=0.9)
        anchor = "start" if share < 0 else "end" if share == 1 else "middle"
        shift = {-0.25: -_EDGE, 1.0: _EDGE}.get(share, 0.0)
        canvas.text((at + shift, 19.5), text, anchor=anchor)
    return canvas.finish(title, kind="ruler")
