"""The harmonics comb: harmonics of the current as teeth, each against its own limit."""

from __future__ import annotations

import numpy as np

from generator.records.curves import HarmonicComb
from generator.sheets.drawings.axes import Frame, Scale, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_harmonics_comb", "harmonics_table"]

_WIDTH, _HEIGHT = 440.0, 180.0
_NAMED = (3, 5, 7, 9, 11, 15, 21, 27, 33, 39)


def draw_harmonics_comb(comb: HarmonicComb, title: str, palette: Palette) -> str:
    """Draw the comb.

    Parameters
    ----------
    comb
        Harmonics and their limits.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    limits = comb.limit_percent[np.isfinite(comb.limit_percent)]
    top = max(float(comb.percent.max()), float(limits.max(initial=0.0)), 5.0) * 1.08
    first, last = float(comb.order.min()), float(comb.order.max())
    frame = Frame(Scale(first - 0.8, last + 0.8, 34, _WIDTH - 8), Scale(0, top, _HEIGHT - 32, 16))
    frame.draw_y(canvas, ticks(0, top, 5), "% of the fundamental")
    step = frame.x(first + 1) - frame.x(first)
    for order, percent, limit in zip(comb.order, comb.percent, comb.limit_percent, strict=True):
        at, tip = frame.x(float(order)), frame.y(float(percent))
        over = bool(np.isfinite(limit)) and percent > limit
        role = "bad" if over else "accent"
        canvas.rectangle((at - step * 0.28, tip), (step * 0.56, frame.y.start - tip), role)
        if np.isfinite(limit):
            level = frame.y(float(limit))
            canvas.line((at - step * 0.5, level), (at + step * 0.5, level), "ink", width=1.4)
    marks = tuple(float(order) for order in _NAMED if first <= order <= last)
    frame.draw_x(canvas, marks, "order of the harmonic")
    return canvas.finish(title)


def harmonics_table(comb: HarmonicComb) -> DataTable:
    """Give the harmonics and their limits."""
    rows = tuple(
        (f"{order:.0f}", f"{percent:.1f}", f"{limit:.1f}" if np.isfinite(limit) else "none")
        for order, percent, limit in zip(comb.order, comb.percent, comb.limit_percent, strict=True)
    )
    return DataTable(("order", "current, % of the fundamental", "limit, %"), rows)
