"""Two figures of all lamps against each other, with uncertainty bars and limit lines."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

from generator.language import say, say_as
from generator.sheets.comparison_data import LimitLine
from generator.sheets.drawings.axes import Frame, Scale, label, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["ScatterAxis", "ScatterPoint", "draw_scatter", "scatter_table"]

_WIDTH, _HEIGHT = 640.0, 360.0
_LEFT, _RIGHT, _TOP, _BOTTOM = 44.0, 20.0, 24.0, 36.0
_MARGIN = 0.08
_MOST_NAMES, _LETTER, _NAME_HEIGHT = 40, 5.3, 11.0

_STANDING = {
    "pass": say("fails none"),
    "open": say_as("verdict", "open"),
    "fail": say_as("verdict", "fails"),
}

Box = tuple[float, float, float, float]


@dataclass(frozen=True, slots=True)
class ScatterAxis:
    """One axis: what it shows, with its unit, and the limits in common."""

    name: str
    limits: tuple[LimitLine, ...] = ()


@dataclass(frozen=True, slots=True)
class ScatterPoint:
    """One lamp: its two figures, their expanded uncertainties, and how it stands.

    ``worst`` is ``fail``, ``open`` or ``pass``; the texts are the figures as printed.
    """

    name: str
    x: float
    y: float
    x_text: str
    y_text: str
    worst: Literal["fail", "open", "pass"]
    x_uncertainty: float = 0.0
    y_uncertainty: float = 0.0


def draw_scatter(
    points: Sequence[ScatterPoint], x: ScatterAxis, y: ScatterAxis, title: str, palette: Palette
) -> str:
    """Draw the plot.

    Parameters
    ----------
    points
        Lamps that have both figures, one at the least.
    x, y
        Axes.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette, size=11)
    frame = Frame(
        Scale(*_ends([(p.x, p.x_uncertainty) for p in points], x), _LEFT, _WIDTH - _RIGHT),
        Scale(*_ends([(p.y, p.y_uncertainty) for p in points], y), _HEIGHT - _BOTTOM, _TOP),
    )
    frame.draw_y(canvas, ticks(frame.y.low, frame.y.high, 6), y.name)
    frame.draw_x(canvas, ticks(frame.x.low, frame.x.high, 8), x.name)
    _limits(canvas, frame, x, y)
    for point in points:
        _bars(canvas, frame, point)
    for point in points:
        _mark(canvas, (frame.x(point.x), frame.y(point.y)), point.worst)
    if len(points) <= _MOST_NAMES:
        _names(canvas, frame, points)
    return canvas.finish(title)


def _ends(values: Sequence[tuple[float, float]], axis: ScatterAxis) -> tuple[float, float]:
    """Ends of an axis: all bars, and the limits where they lie near."""
    low = min(value - spread for value, spread in values)
    high = max(value + spread for value, spread in values)
    span = (high - low) or abs(high) or 1.0
    near = [limit for limit, _ in axis.limits if low - span < limit < high + span]
    low, high = min(low, *near, high), max(high, *near, low)
    span = (high - low) or abs(high) or 1.0
    return low - _MARGIN * span, high + _MARGIN * span


def _limits(canvas: Canvas, frame: Frame, x: ScatterAxis, y: ScatterAxis) -> None:
    for limit, sign in x.limits:
        if frame.x.low < limit < frame.x.high:
            at = frame.x(limit)
            canvas.line((at, frame.y.start), (at, frame.y.end), "ink", width=1, dash="6 3")
            canvas.text((at + 4, frame.y.end + 4), f"{sign} {label(limit)}", "ink", bold=True)
    for limit, sign in y.limits:
        if frame.y.low < limit < frame.y.high:
            at = frame.y(limit)
            canvas.line((frame.x.start, at), (frame.x.end, at), "ink", width=1, dash="6 3")
            place = (frame.x.end, at - 4)
            canvas.text(place, f"{sign} {label(limit)}", "ink", anchor="end", bold=True)


def _bars(canvas: Canvas, frame: Frame, point: ScatterPoint) -> None:
    x, y = frame.x(point.x), frame.y(point.y)
    if point.x_uncertainty:
        ends = (frame.x(point.x - point.x_uncertainty), frame.x(point.x + point.x_uncertainty))
        canvas.line((ends[0], y), (ends[1], y), "tooth", width=1)
    if point.y_uncertainty:
        ends = (frame.y(point.y - point.y_uncertainty), frame.y(point.y + point.y_uncertainty))
        canvas.line((x, ends[0]), (x, ends[1]), "tooth", width=1)


def _mark(canvas: Canvas, at: tuple[float, float], worst: str) -> None:
    """A dot passes, a ring is open, a cross fails."""
    if worst == "pass":
        canvas.dot(at, 4.2, "good")
    elif worst == "open":
        canvas.dot(at, 3.8, "open", hollow=True)
    else:
        x, y, arm = *at, 3.6
        canvas.line((x - arm, y - arm), (x + arm, y + arm), "bad", width=1.8)
        canvas.line((x - arm, y + arm), (x + arm, y - arm), "bad", width=1.8)


def _names(canvas: Canvas, frame: Frame, points: Sequence[ScatterPoint]) -> None:
    """Name every lamp beside its mark where there is room; the table names all."""
    taken: list[Box] = []
    for point in points:
        x, y = frame.x(point.x), frame.y(point.y)
        taken.append((x - 5, y - 5, x + 5, y + 5))
    for point in points:
        x, y = frame.x(point.x), frame.y(point.y)
        wide = _LETTER * len(point.name)
        for left, base, anchor in (
            (x + 8, y + 4, "start"),
            (x - 8 - wide, y + 4, "end"),
            (x - wide / 2, y - 8, "middle"),
            (x - wide / 2, y + 16, "middle"),
        ):
            box = (left, base - _NAME_HEIGHT + 2, left + wide, base + 2)
            if _free(box, taken, frame):
                taken.append(box)
                at = {"start": left, "end": left + wide, "middle": left + wide / 2}[anchor]
                canvas.text((at, base), point.name, "ink", anchor=anchor, size=10)
                break


def _free(box: Box, taken: Sequence[Box], frame: Frame) -> bool:
    inside = frame.x.start < box[0] and box[2] < frame.x.end
    return inside and not any(
        box[0] < other[2] and other[0] < box[2] and box[1] < other[3] and other[1] < box[3]
        for other in taken
    )


def scatter_table(points: Sequence[ScatterPoint], x: ScatterAxis, y: ScatterAxis) -> DataTable:
    """Give the numbers behind the plot."""
    rows = tuple((p.name, p.x_text, p.y_text, _STANDING[p.worst]) for p in points)
    return DataTable((say("Lamp"), x.name, y.name, say("Verdict")), rows)
