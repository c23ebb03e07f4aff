"""Ageing: readings, the fitted curve with its band, the limit, and where projection must end."""

from __future__ import annotations

import numpy as np

from generator.language import say, say_as
from generator.records.curves import AgeingCurve
from generator.sheets.drawings.axes import Frame, Scale, fixed, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas, thinned

__all__ = ["ageing_table", "draw_ageing_chart"]

_WIDTH, _HEIGHT = 440.0, 190.0
_MOST_DOTS = 240


def _frame(curve: AgeingCurve) -> Frame:
    ends = [float(curve.hours_h.max())]
    ends += [float(curve.fit_hours_h.max())] if curve.fit_hours_h is not None else []
    ends += [end for end in (curve.limit_hours_h, curve.projection_end_h) if end is not None]
    lows = [float(curve.maintenance.min()), 0.9]
    lows += [float(part.min()) for part in (curve.fit, curve.fit_low) if part is not None]
    lows += [curve.limit] if curve.limit is not None else []
    low = max(min(lows) - 0.03, 0.0)
    high = max(float(curve.maintenance.max()), 1.0) + 0.02
    return Frame(Scale(0, max(ends) * 1.03, 38, _WIDTH - 14), Scale(low, high, _HEIGHT - 32, 16))


def draw_ageing_chart(curve: AgeingCurve, title: str, palette: Palette) -> str:
    """Draw the chart.

    Parameters
    ----------
    curve
        Readings, fit, limit.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    frame = _frame(curve)
    frame.draw_y(canvas, ticks(frame.y.low, frame.y.high, 5), say("flux, relative to the initial"))
    if curve.projection_end_h is not None:
        end = frame.x(curve.projection_end_h)
        canvas.rectangle(
            (end, frame.y.end), (frame.x.end - end, frame.y.start - frame.y.end), "faint"
        )
        canvas.line((end, frame.y.start), (end, frame.y.end), "quiet", width=0.9, dash="3 2")
        canvas.text((end - 4, frame.y.end + 9), say("projection ends"), anchor="end")
    _fit(canvas, frame, curve)
    if curve.limit is not None and curve.limit_hours_h is not None:
        x, y = frame.x(curve.limit_hours_h), frame.y(curve.limit)
        canvas.line((frame.x.start, y), (x, y), "ink", width=1.2)
        canvas.line((x, y - 5), (x, y + 5), "ink", width=1.2)
        canvas.text((x - 4, y - 4), say_as("mark in a drawing", "limit"), "ink", anchor="end")
    for hours, value in list(zip(curve.hours_h, curve.maintenance, strict=True))[:_MOST_DOTS]:
        canvas.dot((frame.x(float(hours)), frame.y(float(value))), 2.2, "accent")
    frame.draw_x(canvas, ticks(0, frame.x.high, 6), say("operating time, h"))
    return canvas.finish(title)


def _fit(canvas: Canvas, frame: Frame, curve: AgeingCurve) -> None:
    if curve.fit_hours_h is None or curve.fit is None:
        return
    if curve.fit_low is not None and curve.fit_high is not None:
        upper = thinned(frame.points(curve.fit_hours_h, curve.fit_high))
        lower = thinned(frame.points(curve.fit_hours_h, curve.fit_low))
        canvas.area(np.vstack([upper, lower[::-1]]), "accent-soft")
    canvas.path(frame.points(curve.fit_hours_h, curve.fit), "accent", width=1.4)


def ageing_table(curve: AgeingCurve) -> DataTable:
    """Give the mean of the readings at each time."""
    times = np.unique(curve.hours_h)
    rows = tuple(
        (fixed(time, 0), fixed(curve.maintenance[curve.hours_h == time].mean(), 3))
        for time in times
    )
    return DataTable((say("operating time, h"), say("flux, relative to the initial, mean")), rows)
