"""The outline of a lamp by its cap and kind: a few lines, drawn, never a photograph."""

from __future__ import annotations

import re

import numpy as np
from numpy.typing import NDArray

from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_silhouette", "lamp_shape"]

Array = NDArray[np.float64]

_WIDTH, _HEIGHT = 120.0, 150.0
_MIDDLE = _WIDTH / 2
_TURN = np.linspace(0, 1, 25)
_TUBES = {"G13", "G5", "FA8", "2G11"}
_CAPSULES = {"G9", "G4", "GY6.35"}
_WIDE = {"G53", "GX53"}


def lamp_shape(cap: str, *, directional: bool | None) -> str:
    """Tell the shape that a cap and a kind stand for.

    Parameters
    ----------
    cap
        Cap as written in the campaign, for instance ``E27``.
    directional
        Whether the lamp is directional; ``None`` where not stated.

    Returns
    -------
    str
        ``tube``, ``capsule``, ``dish``, ``spot``, ``flood``, ``candle``, ``bulb`` or ``plain``.
    """
    name = cap.upper().replace("-", "")
    known = (("tube", name in _TUBES), ("capsule", name in _CAPSULES), ("dish", name in _WIDE))
    shape = next((kind for kind, fits in known if fits), "")
    if shape:
        return shape
    if name.startswith(("GU", "GX")):
        return "spot"
    if re.match(r"[EB]\d", name):
        if directional:
            return "flood"
        return "candle" if name.startswith(("E14", "B15")) else "bulb"
    return "plain"


def draw_silhouette(cap: str, *, directional: bool | None, title: str, palette: Palette) -> str:
    """Draw the outline.

    Parameters
    ----------
    cap, directional
        What the shape is told from.
    title
        What is drawn, in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    shape = lamp_shape(cap, directional=directional)
    if shape == "tube":
        _tube(canvas)
    elif shape == "plain":
        _outline(canvas, _mirrored([(0, 18), (34, 18), (34, 132), (0, 132)]))
    else:
        _outline(canvas, _mirrored(_BODIES[shape]))
        _LOWER[shape](canvas)
    return canvas.finish(title, kind="silhouette")


def _arc(
    centre: tuple[float, float], radii: tuple[float, float], first_deg: float, last_deg: float
) -> list[tuple[float, float]]:
    """Points of an arc, as half widths and heights; nought degrees points up."""
    angle = np.deg2rad(first_deg + _TURN * (last_deg - first_deg))
    across = centre[0] + radii[0] * np.sin(angle)
    down = centre[1] - radii[1] * np.cos(angle)
    return list(zip(across.tolist(), down.tolist(), strict=True))


def _mirrored(right: list[tuple[float, float]]) -> Array:
    """Both halves of an outline from its right half, given as half widths and heights."""
    half = np.array(right)
    left = half[::-1] * np.array([-1.0, 1.0])
    return np.asarray(np.vstack([half, left]) + np.array([_MIDDLE, 0.0]), dtype=np.float64)


_BODIES: dict[str, list[tuple[float, float]]] = {
    "bulb": [*_arc((0, 46), (38, 38), 0, 128), (19, 82), (15, 104)],
    "candle": [*_arc((0, 66), (24, 58), 0, 118), (14, 104)],
    "flood": [(0, 14), *_arc((44, 20), (6, 6), 0, 90), (48, 34), (20, 84), (15, 104)],
    "spot": [(0, 30), (36, 30), (38, 36), (34, 56), (20, 92), (14, 98), (14, 116)],
    "dish": [(0, 34), *_arc((48, 40), (6, 6), 0, 90), (52, 58), (30, 92), (12, 98), (12, 108)],
    "capsule": [*_arc((0, 40), (18, 18), 0, 90), (18, 100), (14, 108)],
}


def _outline(canvas: Canvas, points: Array) -> None:
    canvas.area(points, "faint")
    canvas.path(points, "ink", width=1.3, closed=True)


def _screw(canvas: Canvas) -> None:
    """The thread of a screw or bayonet cap with its contact."""
    for step in range(4):
        high = 108.0 + 7 * step
        canvas.line((_MIDDLE - 14, high), (_MIDDLE + 14, high - 3), "ink", width=1.3)
    foot = _mirrored([(14, 104), (14, 131), (6, 138), (0, 138)])
    canvas.path(foot, "ink", width=1.3)


def _pins(canvas: Canvas) -> None:
    for side in (-1, 1):
        at = _MIDDLE + side * 8
        canvas.rectangle((at - 2, 116), (4, 18), "ink")


def _legs(canvas: Canvas) -> None:
    for side in (-1, 1):
        at = _MIDDLE + side * 8
        canvas.line((at, 108), (at, 132), "ink", width=1.8)


_LOWER = {
    "bulb": _screw,
    "candle": _screw,
    "flood": _screw,
    "spot": _pins,
    "dish": _legs,
    "capsule": _legs,
}


def _tube(canvas: Canvas) -> None:
    """A straight tube, upright, with the pins at both ends."""
    _outline(canvas, _mirrored([(0, 20), (11, 20), (11, 130), (0, 130)]))
    for high in (30.0, 120.0):
        canvas.line((_MIDDLE - 11, high), (_MIDDLE + 11, high), "ink", width=1.3)
    for side in (-1, 1):
        at = _MIDDLE + side * 5
        for start, end in ((8.0, 20.0), (130.0, 142.0)):
            canvas.line((at, start), (at, end), "ink", width=1.8)
