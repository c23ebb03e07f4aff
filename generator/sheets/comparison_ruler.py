"""The small margin ruler of a cell: few elements, because there are thousands of them.

It is read like the ruler of a sheet: the limit at the same place everywhere, the passing side on
the right, distance in shares of the limit on a square-root scale.
"""

from __future__ import annotations

from html import escape

from generator.language import told
from generator.sheets.drawings.drawing import Palette
from generator.sheets.drawings.margin_ruler import LEFT_END, RIGHT_END, Distance, place
from generator.sheets.drawings.svg import coordinate

__all__ = ["draw_cell_ruler"]

_WIDTH, _HEIGHT, _MIDDLE = 96.0, 10.0, 5.0


def draw_cell_ruler(distance: Distance, role: str, title: str, palette: Palette) -> str:
    """Draw the ruler of a cell.

    Parameters
    ----------
    distance
        Where the value stands.
    role
        Colour of the tick: ``good``, ``bad`` or ``open``.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    limit, words = coordinate(place(0, _WIDTH)), escape(told(title), quote=False)
    axis = f"M0 {_MIDDLE:g}H{_WIDTH:g}M{limit} 0V{_HEIGHT:g}"
    parts = [f'<path class="s-quiet" fill="none" stroke="{palette["quiet"]}" d="{axis}"/>']
    if distance.uncertainty:
        parts.append(_filled(_band(distance.margin, distance.uncertainty), f"{role}-soft", palette))
    parts.append(_filled(_tick(distance.margin), role, palette))
    return (
        f'<svg class="ruler" role="img" viewBox="0 0 {_WIDTH:g} {_HEIGHT:g}" width="{_WIDTH:g}"'
        f' height="{_HEIGHT:g}"><title>{words}</title>{"".join(parts)}</svg>'
    )


def _filled(data: str, role: str, palette: Palette) -> str:
    return f'<path class="f-{role}" fill="{palette[role]}" d="{data}"/>'


def _band(margin: float, uncertainty: float) -> str:
    low, high = place(margin - uncertainty, _WIDTH), place(margin + uncertainty, _WIDTH)
    return f"M{coordinate(low)} 2.5h{coordinate(max(high - low, 1))}v5H{coordinate(low)}z"


def _tick(margin: float) -> str:
    """A tick at the value; an arrow head where it lies beyond the end."""
    at = place(margin, _WIDTH)
    if LEFT_END <= margin <= RIGHT_END:
        return f"M{coordinate(at - 1.1)} 0h2.2v{_HEIGHT:g}h-2.2z"
    way = 1 if margin > 0 else -1
    back, tip = coordinate(at - 4 * way), coordinate(at + 2 * way)
    return f"M{back} 1.2L{tip} {_MIDDLE:g}L{back} 8.8z"
