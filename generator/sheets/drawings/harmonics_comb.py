"""The harmonics comb: harmonics of the current as teeth, against every limit of their table."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence

import numpy as np
from numpy.typing import NDArray

from generator.language import say
from generator.records.curves import HarmonicComb
from generator.records.harmonic_table import HarmonicLimit
from generator.sheets.drawings.axes import Frame, Scale, ticks
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_harmonics_comb"]

_WIDTH, _HEIGHT = 440.0, 180.0
_NAMED = (3, 5, 7, 9, 11, 15, 21, 27, 33, 39)
_EDGE = 3.0  # of a lower limit, towards the side that is asked
_UNCONFIRMED = "unconfirmed"


def draw_harmonics_comb(
    comb: HarmonicComb, limits: Sequence[HarmonicLimit], title: str, palette: Palette
) -> str:
    """Draw the comb.

    Parameters
    ----------
    comb
        Harmonics of the current.
    limits
        Limits; those of an order that can be told in percent of the fundamental are drawn, an
        unconfirmed one dashed, a lower one with its ends turned up. A tooth that does not keep
        a limit stands out, as open where that limit is not confirmed.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    drawn = [item for item in limits if item.order is not None and item.percent is not None]
    heights = [float(comb.percent.max()), *(item.percent or 0.0 for item in drawn), 5.0]
    top = 1.08 * max(heights)
    orders = [*comb.order.tolist(), *(float(item.order or 0) for item in drawn)]
    first, last = min(orders), max(orders)
    frame = Frame(Scale(first - 0.8, last + 0.8, 34, _WIDTH - 8), Scale(0, top, _HEIGHT - 32, 16))
    frame.draw_y(canvas, ticks(0, top, 5), say("% of the fundamental"))
    missed = [item for item in limits if item.kept is False]
    roles = {item.order: "open" for item in missed if item.status == _UNCONFIRMED}
    roles |= {item.order: "bad" for item in missed if item.status != _UNCONFIRMED}
    _draw_teeth(canvas, frame, comb, roles)
    known = (item for item in drawn if item.status != _UNCONFIRMED)
    canvas.pieces(list(_steps(frame, known)))
    unconfirmed = [item for item in drawn if item.status == _UNCONFIRMED]
    canvas.pieces(list(_steps(frame, unconfirmed)), dash="2 1.5")
    if unconfirmed:
        canvas.text((_WIDTH - 8, 9), say("dashed: limit not confirmed"), anchor="end")
    marks = tuple(float(order) for order in _NAMED if first <= order <= last)
    frame.draw_x(canvas, marks, say("order of the harmonic"))
    return canvas.finish(title)


def _draw_teeth(
    canvas: Canvas, frame: Frame, comb: HarmonicComb, roles: Mapping[int | None, str]
) -> None:
    step = frame.x(1) - frame.x(0)
    for order, percent in zip(comb.order, comb.percent, strict=True):
        at, tip = frame.x(float(order)), frame.y(float(percent))
        role = roles.get(int(order), "accent")
        canvas.rectangle((at - step * 0.28, tip), (step * 0.56, frame.y.start - tip), role)


def _steps(frame: Frame, limits: Iterable[HarmonicLimit]) -> Iterator[NDArray[np.float64]]:
    half = (frame.x(1) - frame.x(0)) / 2
    for item in limits:
        at, level = frame.x(float(item.order or 0)), frame.y(item.percent or 0.0)
        ends = [(at - half, level), (at + half, level)]
        if item.lower:
            ends = [(at - half, level - _EDGE), *ends, (at + half, level - _EDGE)]
        yield np.array(ends)
