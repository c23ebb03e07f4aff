"""The colour strip: sixteen hue bins unrolled, chroma shift up and down, fidelity below."""

from __future__ import annotations

from collections.abc import Sequence

from generator.language import say, told
from generator.sheets.drawings.axes import Frame, Scale, ticks
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.spectral_colour import hue_colour
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_colour_strip"]

_WIDTH, _HEIGHT = 440.0, 190.0
_LEFT = 46.0
_STRIP, _THICK = 112.0, 14.0


def draw_colour_strip(
    chroma_shift: Sequence[float | None],
    fidelity: Sequence[float | None],
    title: str,
    palette: Palette,
) -> str:
    """Draw the strip.

    Parameters
    ----------
    chroma_shift
        Local chroma shift of bins 1 to 16 [percent].
    fidelity
        Local colour fidelity of bins 1 to 16.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    reach = max([20.0, *(abs(value) for value in chroma_shift if value is not None)])
    across = Scale(0.5, len(chroma_shift) + 0.5, _LEFT, _WIDTH - 4)
    shift = Frame(across, Scale(-reach, reach, _STRIP - 6, 16))
    shift.draw_y(canvas, ticks(-reach, reach, 5), say("chroma shift, %"))
    zero = shift.y(0)
    canvas.line((_LEFT, zero), (_WIDTH - 4, zero), "quiet", width=0.8)
    step = across(2) - across(1)
    for order, value in enumerate(chroma_shift, start=1):
        at = across(order)
        colour = hue_colour((order - 0.5) * 360 / len(chroma_shift))
        canvas.rectangle((at - step / 2, _STRIP), (step - 1, _THICK), colour)
        canvas.text((at, _STRIP + _THICK + 11), str(order), anchor="middle")
        if value is not None:
            tip = shift.y(value)
            canvas.rectangle((at - 6, min(zero, tip)), (12, max(abs(tip - zero), 0.8)), colour)
    _fidelity(canvas, across, fidelity)
    return canvas.finish(title)


def _fidelity(canvas: Canvas, across: Scale, fidelity: Sequence[float | None]) -> None:
    """Hang the loss of fidelity under the strip, a longer tooth for a greater loss."""
    top, low = _STRIP + _THICK + 17, _HEIGHT - 14
    for row, words in enumerate(told(say("loss of\nfidelity")).split("\n")):
        canvas.text((0, top + 6 + 13 * row), words, "quiet")
    down = Scale(100, 40, top, low)
    for order, value in enumerate(fidelity, start=1):
        if value is None:
            continue
        at, tip = across(order), down(max(value, 40.0))
        canvas.rectangle((at - 6, top), (12, max(tip - top, 0.8)), "tooth")
        canvas.text((at, tip + 12), f"{value:.0f}", anchor="middle")
