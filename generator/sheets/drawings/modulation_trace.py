"""The modulation trace: two periods of light, the area above the mean shaded.

The shaded area as a share of the whole area under the curve is the flicker index, and the
distance between highest and lowest as a share of their sum is percent flicker: the reader sees
what the two numbers mean.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import say, say_as
from generator.records.curves import LightCurve
from generator.sheets.drawings.axes import Frame, Scale, fixed, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas, thinned

__all__ = ["above_mean", "draw_modulation_trace", "modulation_table"]

Array = NDArray[np.float64]

_WIDTH, _HEIGHT = 440.0, 190.0
_RIGHT = 64.0


def above_mean(line: Array, mean: float) -> list[Array]:
    """Cut out the pieces of a curve above a level, with exact crossings.

    Parameters
    ----------
    line
        Points, any scale (points, 2).
    mean
        The level.

    Returns
    -------
    list of numpy.ndarray
        One closed outline per piece (points, 2).
    """
    x, y = line[:, 0], line[:, 1]
    crossing = np.flatnonzero((y[:-1] - mean) * (y[1:] - mean) < 0)
    share = (mean - y[crossing]) / (y[crossing + 1] - y[crossing])
    added = x[crossing] + share * (x[crossing + 1] - x[crossing])
    every = np.insert(line, crossing + 1, np.column_stack([added, np.full(len(added), mean)]), 0)
    high = every[:, 1] >= mean
    pieces = np.split(every, np.flatnonzero(np.diff(high.astype(int))) + 1)
    return [
        np.vstack([[piece[0, 0], mean], piece, [piece[-1, 0], mean]])
        for piece in pieces
        if piece[0, 1] >= mean and piece[:, 1].max() > mean
    ]


def draw_modulation_trace(curve: LightCurve, index_label: str, title: str, palette: Palette) -> str:
    """Draw the trace.

    Parameters
    ----------
    curve
        Light against time, relative to its mean.
    index_label
        What is written in the shaded area; empty where nothing is.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    top = max(1.25, float(curve.light.max()) * 1.1)
    frame = Frame(
        Scale(float(curve.time_ms[0]), float(curve.time_ms[-1]), 34, _WIDTH - _RIGHT),
        Scale(0, top, _HEIGHT - 32, 16),
    )
    frame.draw_y(canvas, ticks(0, top, 4), say("light, relative to its mean"))
    line = np.column_stack([curve.time_ms, curve.light])
    for piece in above_mean(line, 1.0):
        canvas.area(thinned(frame.points(piece[:, 0], piece[:, 1])), "accent-soft")
    mean = frame.y(1.0)
    canvas.line((frame.x.start, mean), (frame.x.end, mean), "ink", width=0.9, dash="4 3")
    canvas.text((frame.x.end + 5, mean + 3.5), say_as("mark in a drawing", "mean"), "ink")
    canvas.path(frame.points(curve.time_ms, curve.light), "accent", width=1.6)
    _extremes(canvas, frame, curve, mean)
    if index_label:
        canvas.text((frame.x.start + 4, _HEIGHT - 38), index_label, "ink")
    frame.draw_x(
        canvas, ticks(float(curve.time_ms[0]), float(curve.time_ms[-1]), 6), say("time, ms")
    )
    return canvas.finish(title)


def _extremes(canvas: Canvas, frame: Frame, curve: LightCurve, mean: float) -> None:
    """Name the highest and the lowest light where they stand clear of the mean."""
    for value, word in ((curve.light.max(), say("highest")), (curve.light.min(), say("lowest"))):
        at = frame.y(float(value))
        if abs(at - mean) > 11:
            canvas.line((frame.x.end - 8, at), (frame.x.end + 3, at), "quiet", width=0.7)
            canvas.text((frame.x.end + 5, at + 3.5), word)


def modulation_table(curve: LightCurve) -> DataTable:
    """Give the numbers behind the trace: forty times over the two periods."""
    times = np.linspace(curve.time_ms[0], curve.time_ms[-1], 41)
    light = np.interp(times, curve.time_ms, curve.light)
    rows = tuple(
        (fixed(time, 2), fixed(value, 3)) for time, value in zip(times, light, strict=True)
    )
    return DataTable((say("time, ms"), say("light, relative to its mean")), rows)
