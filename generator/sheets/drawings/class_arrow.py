"""The arrow of the energy efficiency class with the range of classes, as the act asks for it.

Source: eu_2019_2015, Annex VII, points 2 and 4, with the colours of Annex III, point 2.3(e). The
act gives the colours for print, in cyan, magenta, yellow and black; they stand here as
255 (1 - c) (1 - k) per channel. The letter is white as the act says, in the middle of the
rectangular part, and has a black border like the arrow; since white on some of the colours is
hard to read, the class always stands beside the arrow in words as well.
"""

from __future__ import annotations

import numpy as np

from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["CLASS_COLOURS", "draw_class_arrow"]

CLASS_COLOURS = {
    "A": "#00ff00",
    "B": "#4dff00",
    "C": "#b3ff00",
    "D": "#ffff00",
    "E": "#ffb300",
    "F": "#ff4d00",
    "G": "#ff0000",
}
"""Class -> colour of its arrow."""

_WIDTH, _HEIGHT, _BORDER = 62.0, 28.0, 0.7
_RANGE = 15.0


def draw_class_arrow(letter: str, title: str, palette: Palette) -> str:
    """Draw the arrow; empty where the letter is no class.

    Parameters
    ----------
    letter
        ``A`` to ``G``.
    title
        The class in words.
    palette
        Colours of the theme; the arrow itself takes none of them.
    """
    if letter not in CLASS_COLOURS:
        return ""
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    middle = _HEIGHT / 2
    box = np.array([[1, 1], [_RANGE, 1], [_RANGE, _HEIGHT - 1], [1, _HEIGHT - 1]])
    canvas.area(box, "#ffffff")
    canvas.path(box, "#000000", width=_BORDER, closed=True)
    canvas.text((1 + (_RANGE - 1) / 2, 10), "A", "#000000", anchor="middle", bold=True, size=9)
    canvas.text(
        (1 + (_RANGE - 1) / 2, _HEIGHT - 3.5), "G", "#000000", anchor="middle", bold=True, size=9
    )
    canvas.area(np.array([[5.5, 15], [8, 11.5], [10.5, 15]]), "#000000")
    arrow = np.array(
        [[_RANGE, 1], [_WIDTH - 14, 1], [_WIDTH - 1, middle], [_WIDTH - 14, 27], [_RANGE, 27]]
    )
    canvas.area(arrow, CLASS_COLOURS[letter])
    canvas.path(arrow, "#000000", width=_BORDER, closed=True)
    centre = (_RANGE + _WIDTH - 14) / 2
    canvas.text(
        (centre, 21.5), letter, "#ffffff", anchor="middle", bold=True, size=21, edge="#000000"
    )
    return canvas.finish(title, kind="class-arrow")
