"""The rendering comb: R1 to R15 as teeth, R9 named, the general index as a line across."""

from __future__ import annotations

import math
from collections.abc import Sequence

from generator.sheets.drawings.axes import Frame, Scale
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_rendering_comb"]

_WIDTH, _HEIGHT = 440.0, 170.0
_TOOTH = 12.0


def draw_rendering_comb(
    indices: Sequence[float | None],
    labels: Sequence[str],
    general: float | None,
    title: str,
    palette: Palette,
) -> str:
    """Draw the comb.

    Parameters
    ----------
    indices
        R1 to R15 in order; ``None`` leaves a gap.
    labels
        The same as finished text.
    general
        The general index, or ``None``.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    known = [value for value in indices if value is not None]
    floor = max(min(0.0, math.floor(min(known, default=0.0) / 50) * 50), -200.0)
    frame = Frame(
        Scale(0.5, len(indices) + 0.5, 34, _WIDTH - 26), Scale(floor, 100, _HEIGHT - 34, 10)
    )
    frame.draw_y(canvas, tuple(float(mark) for mark in range(int(floor), 101, 50)), "")
    if general is not None:
        level = frame.y(general)
        canvas.line((frame.x.start, level), (frame.x.end, level), "accent", width=1.2)
        canvas.text((frame.x.end + 4, level + 3.5), "Ra", "accent", bold=True)
    for order, (value, words) in enumerate(zip(indices, labels, strict=True), start=1):
        _tooth(canvas, frame, order, value, words)
    return canvas.finish(title)


def _tooth(canvas: Canvas, frame: Frame, order: int, value: float | None, words: str) -> None:
    at = frame.x(order)
    named = order == 9
    role = "ink" if named else "quiet"
    canvas.text((at, _HEIGHT - 19), f"R{order}", role, anchor="middle", bold=named)
    canvas.text((at, _HEIGHT - 5), words or "\u2013", "ink", anchor="middle", bold=named)
    if value is None:
        return
    zero = frame.y(0)
    tip = frame.y(max(value, frame.y.low))
    canvas.rectangle(
        (at - _TOOTH / 2, min(zero, tip)),
        (_TOOTH, max(abs(tip - zero), 1.0)),
        "accent" if named else "tooth" if order <= 8 else "tooth-soft",
    )
