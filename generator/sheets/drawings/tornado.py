"""The tornado: life-cycle cost when one assumption at a time is moved down and up."""

from __future__ import annotations

from collections.abc import Sequence

from generator.language import say, say_as
from generator.records.tender import SensitivityBar
from generator.sheets.drawings.axes import Frame, Scale, ticks
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_tornado"]

_WIDTH, _ROW, _TOP, _BOTTOM = 520.0, 26.0, 20.0, 34.0
_LEFT, _RIGHT = 106.0, 16.0
_EDGE = 0.16


def draw_tornado(
    bars: Sequence[SensitivityBar], cost: float, currency: str, title: str, palette: Palette
) -> str:
    """Draw the tornado.

    Parameters
    ----------
    bars
        Widest first.
    cost
        Life-cycle cost with nothing moved.
    currency
        Currency of the costs.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    height = _TOP + _ROW * len(bars) + _BOTTOM
    canvas = Canvas(_WIDTH, height, palette)
    ends = [float(end) for bar in bars for end in (bar.low_cost, bar.high_cost)]
    low, high = min(*ends, cost), max(*ends, cost)
    edge = max((high - low) * _EDGE, abs(cost) * 0.01, 1e-9)
    frame = Frame(
        Scale(low - edge, high + edge, _LEFT, _WIDTH - _RIGHT),
        Scale(len(bars), 0, height - _BOTTOM, _TOP),
    )
    frame.draw_x(canvas, ticks(low - edge, high + edge, 6), currency)
    for place, bar in enumerate(bars):
        middle = frame.y(place + 0.5)
        canvas.text((_LEFT - 8, middle + 3.5), bar.assumption, "ink", anchor="end")
        if bar.swing == 0:
            canvas.text((frame.x(cost) + 4, middle + 3.5), say("no change"))
            continue
        for end, role, word in (
            (float(bar.low_cost), "accent-soft", say_as("end of a bar", "lower")),
            (float(bar.high_cost), "accent", say_as("end of a bar", "higher")),
        ):
            start, tip = sorted((frame.x(cost), frame.x(end)))
            canvas.rectangle((start, middle - 7), (tip - start, 14), role)
            side = "end" if end < cost else "start"
            canvas.text((frame.x(end) + (-4 if end < cost else 4), middle + 3.5), word, anchor=side)
    centre = frame.x(cost)
    canvas.line((centre, _TOP - 4), (centre, height - _BOTTOM), "ink", width=1.2)
    canvas.text((centre, _TOP - 8), say("as assumed"), "ink", anchor="middle")
    return canvas.finish(title)
