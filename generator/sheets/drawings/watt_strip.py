"""The watt strip: one bar as long as the electrical power, cut into light and the rest."""

from __future__ import annotations

from dataclasses import dataclass

from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["WattShares", "draw_watt_strip"]

_WIDTH, _HEIGHT = 440.0, 84.0
_TOP, _BAR = 22.0, 26.0


@dataclass(frozen=True, slots=True)
class WattShares:
    """What becomes of the electrical power.

    Parameters
    ----------
    light
        Share that leaves as light, 0 to 1.
    emitter
        Share of the light that the blue emitter gives, 0 to 1; ``None`` where not split.
    useful
        Share of the electrical power that the eye can use, 0 to 1; ``None`` where not known.
    emitter_colour, phosphor_colour
        Colours of the two parts, ``#rrggbb``.
    """

    light: float
    emitter: float | None
    useful: float | None
    emitter_colour: str
    phosphor_colour: str


def draw_watt_strip(
    shares: WattShares, words: tuple[str, str, str, str], title: str, palette: Palette
) -> str:
    """Draw the strip.

    Parameters
    ----------
    shares
        What becomes of the power.
    words
        Whole power, light, useful part, and the rest, as finished text.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    light = min(max(shares.light, 0.0), 1.0) * _WIDTH
    blue = light * (shares.emitter or 0.0)
    canvas.rectangle((0, _TOP), (blue, _BAR), shares.emitter_colour)
    canvas.rectangle((blue, _TOP), (light - blue, _BAR), shares.phosphor_colour)
    canvas.rectangle((light, _TOP), (_WIDTH - light, _BAR), "heat")
    canvas.line((light, _TOP - 5), (light, _TOP + _BAR + 5), "ink", width=0.9)
    canvas.text((0, 13), words[1], "ink")
    canvas.text((_WIDTH, 13), words[3], anchor="end")
    _measure(canvas, shares.useful, words[2])
    canvas.text((_WIDTH, _TOP + _BAR + 17), words[0], "ink", anchor="end", bold=True)
    return canvas.finish(title)


def _measure(canvas: Canvas, useful: float | None, words: str) -> None:
    if useful is None or not words:
        return
    end, low = useful * _WIDTH, _TOP + _BAR + 6
    canvas.line((0, low), (end, low), "ink", width=1.6)
    canvas.line((0, low - 3), (0, low + 3), "ink", width=0.9)
    canvas.line((end, low - 3), (end, low + 3), "ink", width=0.9)
    canvas.text((0, low + 16), words, "ink")
