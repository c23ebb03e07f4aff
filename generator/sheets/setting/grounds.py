"""Backgrounds behind words and cells: of equal ones only the place differs."""

from __future__ import annotations

from typing import Any

from pydyf import _to_bytes
from weasyprint.draw import draw_background
from weasyprint.formatting_structure import boxes
from weasyprint.layout.background import layout_box_backgrounds

__all__ = ["bare_box", "paint_ground", "paints_ground"]

_SIDES = ("left", "right", "top", "bottom")
_BARE = {
    **{f"margin_{side}": 0.0 for side in _SIDES},
    **{f"padding_{side}": 0.0 for side in _SIDES},
    **{f"border_{side}_width": 0.0 for side in _SIDES},
}
_SIZES = ("width", "height", *_BARE)
_MOST_SIZES = 500
_NAMED = (b" Do", b" sh", b" scn", b" gs")


def paints_ground(style: Any) -> bool:
    """Whether a style has a background.

    Parameters
    ----------
    style
        Of the engine.
    """
    colour = style["background_color"]
    return bool(
        colour == "currentcolor"
        or colour.alpha
        or any(kind != "none" for kind, _ in style["background_image"])
    )


def bare_box(style: Any) -> Any:
    """Make a box without margins, paddings and borders.

    Parameters
    ----------
    style
        Of the engine.
    """
    box = boxes.BlockBox("div", style, None, [])
    box.__dict__.update(_BARE)
    return box


def paint_ground(page: Any, box: Any, x: float, y: float) -> None:
    """Paint the background of a box.

    Parameters
    ----------
    page
        The page of the engine.
    box
        The box, of a known size.
    x, y
        Its upper left corner [px].
    """
    found = box.__dict__
    painted = box.style.__dict__.setdefault("grounds", {})
    size = tuple(round(found[name], 3) for name in _SIZES)
    operators = page.stream
    with page.stacked():
        page.transform(e=x, f=y)
        page.set_alpha(1.0)
        if size in painted:
            operators.append(painted[size])
            return
        start = len(operators)
        box.position_x = box.position_y = 0
        layout_box_backgrounds(None, box, None, layout_children=False)
        draw_background(page, box.background)
        written = b"\n".join(map(_to_bytes, operators[start:]))
    if not any(name in written for name in _NAMED) and len(painted) < _MOST_SIZES:
        painted[size] = written
