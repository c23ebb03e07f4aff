"""The modulation plane: depth against frequency, with the line of low risk."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import say
from generator.records.curves import LowRiskLine
from generator.sheets.drawings.axes import Frame, Scale
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas, thinned

__all__ = ["draw_modulation_plane"]

_WIDTH, _HEIGHT = 440.0, 190.0
_DECADES = (10.0, 100.0, 1000.0, 10000.0)
_DEPTHS = (0.1, 1.0, 10.0, 100.0)


def draw_modulation_plane(
    low_risk: LowRiskLine,
    at: tuple[float, float],
    words: str,
    title: str,
    palette: Palette,
) -> str:
    """Draw the plane.

    Parameters
    ----------
    low_risk
        The line; below it the risk is low.
    at
        Frequency [Hz] and modulation [percent] of the lamp.
    words
        What is written beside its dot.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    frame = Frame(
        Scale(_DECADES[0], _DECADES[-1], 38, _WIDTH - 22, logarithmic=True),
        Scale(_DEPTHS[0], _DEPTHS[-1], _HEIGHT - 32, 18, logarithmic=True),
    )
    line = thinned(_line(frame, low_risk))
    below = [[line[-1, 0], frame.y.start], [line[0, 0], frame.y.start]]
    canvas.area(np.vstack([line, below]), "good-soft")
    canvas.text((frame.x(2500), frame.y.start - 9), say("low risk"), "good", anchor="middle")
    frame.draw_y(canvas, _DEPTHS, say("percent flicker"))
    canvas.path(line, "good", width=1.4)
    frame.draw_x(canvas, _DECADES, say("frequency, Hz"))
    x = frame.x(min(max(at[0], _DECADES[0]), _DECADES[-1]))
    y = frame.y(min(max(at[1], _DEPTHS[0]), _DEPTHS[-1]))
    canvas.dot((x, y), 4, "accent")
    canvas.text((x + 8, y + 3.5), words, "ink")
    return canvas.finish(title)


def _line(frame: Frame, low_risk: LowRiskLine) -> NDArray[np.float64]:
    """The line across the whole plane; straight between its corners, both axes logarithmic."""
    decades = np.linspace(np.log10(_DECADES[0]), np.log10(_DECADES[-1]), 361)
    corners = np.log10(low_risk.frequency_hz), np.log10(low_risk.modulation_percent)
    depth = np.clip(10 ** np.interp(decades, *corners), _DEPTHS[0], _DEPTHS[-1])
    return frame.points(10**decades, depth)
