"""The white plane: every unit as a dot beside the Planckian locus, its target and tolerance."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import say_as
from generator.records.curves import WhitePlane
from generator.sheets.drawings.axes import Frame, Scale, fixed, label, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_white_plane", "white_table"]

Array = NDArray[np.float64]

_WIDTH, _HEIGHT = 440.0, 190.0
_LEFT, _RIGHT, _TOP, _BOTTOM = 44.0, 12.0, 18.0, 32.0
_AXES = {"xy": ("x", "y"), "u'v'": ("u′", "v′")}


def _frame(plane: WhitePlane) -> Frame:
    """A piece of the plane around what is drawn, the same scale both ways."""
    shown = [plane.units]
    shown += [part.reshape(-1, 2) for part in (plane.tolerance, plane.target) if part is not None]
    every = np.vstack(shown)
    middle = (every.min(axis=0) + every.max(axis=0)) / 2
    wide, high = _WIDTH - _LEFT - _RIGHT, _HEIGHT - _TOP - _BOTTOM
    spread = np.ptp(every, axis=0)
    per_pixel = max(spread[0] / wide, spread[1] / high, 2e-5) * 1.35
    half_x, half_y = per_pixel * wide / 2, per_pixel * high / 2
    return Frame(
        Scale(middle[0] - half_x, middle[0] + half_x, _LEFT, _WIDTH - _RIGHT),
        Scale(middle[1] - half_y, middle[1] + half_y, _HEIGHT - _BOTTOM, _TOP),
    )


def draw_white_plane(plane: WhitePlane, title: str, palette: Palette) -> str:
    """Draw the plane.

    Parameters
    ----------
    plane
        Units, locus, target and tolerance.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    frame = _frame(plane)
    across, up = _AXES[plane.coordinates]
    frame.draw_y(canvas, ticks(frame.y.low, frame.y.high, 5), up)
    frame.draw_x(canvas, ticks(frame.x.low, frame.x.high, 6), across)
    if plane.tolerance is not None:
        outline = frame.points(plane.tolerance[:, 0], plane.tolerance[:, 1])
        canvas.area(outline, "good-soft", opacity=0.7)
        canvas.path(outline, "good", width=1.2, closed=True)
    _locus(canvas, frame, plane)
    if plane.target is not None:
        x, y = frame.x(float(plane.target[0])), frame.y(float(plane.target[1]))
        canvas.line((x - 5, y), (x + 5, y), "good", width=1.2)
        canvas.line((x, y - 5), (x, y + 5), "good", width=1.2)
        canvas.text((_LEFT, _HEIGHT - 6), plane.target_label, "good", bold=True)
    for x, y in frame.points(plane.units[:, 0], plane.units[:, 1]):
        canvas.dot((x, y), 3.4, "accent")
    return canvas.finish(title)


def _locus(canvas: Canvas, frame: Frame, plane: WhitePlane) -> None:
    """The locus with its temperatures, written on the side where the units are not."""
    line = frame.points(plane.locus[:, 0], plane.locus[:, 1])
    inside = (
        (line[:, 0] >= frame.x.start)
        & (line[:, 0] <= frame.x.end)
        & (line[:, 1] >= frame.y.end)
        & (line[:, 1] <= frame.y.start)
    )
    if inside.sum() < 2:
        return
    seen, temperatures = line[inside], plane.locus_cct_k[inside]
    canvas.path(seen, "ink", width=1.2)
    low, high = float(temperatures.min()), float(temperatures.max())
    order = np.argsort(temperatures)
    x, y = frame.points(*plane.units.mean(axis=0).reshape(2, 1))[0]
    below = y < float(np.interp(x, *seen[np.argsort(seen[:, 0])].T))
    away, anchor = ((7.0, 13.0), "start") if below else ((-7.0, -8.0), "end")
    for mark in ticks(low, high, 4):
        x, y = (float(np.interp(mark, temperatures[order], seen[order, axis])) for axis in (0, 1))
        canvas.line((x, y - 3.5), (x, y + 3.5), "ink", width=1)
        if y + away[1] < frame.y.start - 2:
            canvas.text((x + away[0], y + away[1]), f"{label(mark)} K", anchor=anchor)


def white_table(plane: WhitePlane) -> DataTable:
    """Give the chromaticity of every unit."""
    mean = say_as("mean of the units", "mean")
    rows = tuple(
        (unit or mean, fixed(x, 4), fixed(y, 4))
        for unit, (x, y) in zip(plane.unit_ids, plane.units, strict=True)
    )
    return DataTable((say_as("lamp", "unit"), *_AXES[plane.coordinates]), rows)
