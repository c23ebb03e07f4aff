"""Luminous intensity by direction: a polar curve, the axis of the lamp downwards."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import say
from generator.records.curves import IntensityCurve
from generator.sheets.drawings.axes import fixed, label, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_polar_intensity", "intensity_table"]

Array = NDArray[np.float64]

_WIDTH, _HEIGHT = 440.0, 200.0
_RADIUS = 82.0
_ROLES = (("accent", ""), ("ink", "5 3"))
_TURN = np.linspace(0, 2 * np.pi, 73)


def _points(angle_deg: Array, length: Array) -> Array:
    """Pixels of directions from the centre; nought degrees points down."""
    turned = np.deg2rad(angle_deg)
    return np.column_stack(
        [_WIDTH / 2 + length * np.sin(turned), _HEIGHT / 2 + length * np.cos(turned)]
    )


def draw_polar_intensity(planes: tuple[IntensityCurve, ...], title: str, palette: Palette) -> str:
    """Draw the curve of one or two planes.

    Parameters
    ----------
    planes
        Planes through the axis; the first two are drawn.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    top = max(float(plane.intensity_cd.max()) for plane in planes) * 1.02
    scale = _RADIUS / top
    for mark in ticks(0, top, 4)[1:]:
        circle = _points(np.rad2deg(_TURN), np.full(_TURN.shape, mark * scale))
        canvas.path(circle, "hair", width=0.8)
        at = _points(np.array([135.0]), np.array([mark * scale]))[0]
        canvas.text((at[0] + 3, at[1]), f"{label(mark)} cd")
    for angle in range(-150, 181, 30):
        ends = _points(np.array([angle, angle], float), np.array([0.0, _RADIUS]))
        canvas.line((ends[0, 0], ends[0, 1]), (ends[1, 0], ends[1, 1]), "hair", width=0.6)
        at = _points(np.array([float(angle)]), np.array([_RADIUS + 11]))[0]
        canvas.text((at[0], at[1] + 3.5), f"{abs(angle)}°", anchor="middle")
    for row, (plane, (role, dash)) in enumerate(zip(planes, _ROLES, strict=False)):
        line = _points(plane.angle_deg, plane.intensity_cd * scale)
        canvas.path(line, role, width=1.6, dash=dash)
        height = 12 + 14 * row
        canvas.line((0, height), (22, height), role, width=1.6, dash=dash)
        canvas.text((27, height + 3.5), plane.plane, "ink")
    return canvas.finish(title)


def intensity_table(planes: tuple[IntensityCurve, ...]) -> DataTable:
    """Give the intensity of the planes drawn, every ten degrees."""
    shown = planes[: len(_ROLES)]
    low = max(plane.angle_deg[0] for plane in shown)
    high = min(plane.angle_deg[-1] for plane in shown)
    angles = np.arange(np.ceil(low / 10) * 10, high + 1e-9, 10.0)
    columns = [np.interp(angles, plane.angle_deg, plane.intensity_cd) for plane in shown]
    rows = tuple(
        (label(float(angle)), *(fixed(column[place], 1) for column in columns))
        for place, angle in enumerate(angles)
    )
    return DataTable(
        (say("angle from the axis, °"), *(f"{plane.plane}, cd" for plane in shown)), rows
    )
