"""The emitter and phosphor plate: the spectrum as an area in its own colours, cut in two."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import joined, say, say_as, told
from generator.records.curves import SpectrumCurve
from generator.sheets.drawings.axes import Frame, Scale, fixed, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.spectral_colour import wavelength_colour
from generator.sheets.drawings.svg import Canvas, thinned

__all__ = ["draw_spectrum_plate", "spectrum_table"]

Array = NDArray[np.float64]

_WIDTH, _HEIGHT = 440.0, 210.0
_LETTER = 5.2  # mean width of a letter at the size of the drawing [px]
_FIRST_NM, _LAST_NM = 380.0, 780.0


def _scaled(curve: SpectrumCurve) -> tuple[float, str]:
    """What the values are multiplied by, and the unit they then have."""
    peak = float(curve.total.max())
    if curve.unit == "relative":
        return 100 / peak, say("% of the peak")
    return (1000.0, "mW/nm") if peak < 0.5 else (1.0, "W/nm")


def draw_spectrum_plate(
    curve: SpectrumCurve,
    peak_label: str,
    white: tuple[str, ...],
    title: str,
    palette: Palette,
    *,
    key: str,
) -> str:
    """Draw the plate.

    Parameters
    ----------
    curve
        The spectrum.
    peak_label
        What is written at the peak of the emitter; empty where nothing is.
    white
        What is written of the white, line by line, at the upper right.
    title
        The finding in words.
    palette
        Colours of the theme.
    key
        Name that makes the gradient unique on a page.
    """
    factor, unit = _scaled(curve)
    inside = (curve.wavelength_nm >= _FIRST_NM) & (curve.wavelength_nm <= _LAST_NM)
    wavelength = curve.wavelength_nm[inside]
    total = np.maximum(curve.total[inside] * factor, 0)
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    top = float(total.max()) * 1.12
    frame = Frame(Scale(_FIRST_NM, _LAST_NM, 34, _WIDTH - 12), Scale(0, top, _HEIGHT - 32, 16))
    frame.draw_y(canvas, ticks(0, top, 5), unit)
    fill = canvas.gradient(f"light-{key}", _stops(frame))
    line = thinned(frame.points(wavelength, total))
    canvas.area(_closed(line, frame.y.start), fill)
    if curve.phosphor is not None and curve.emitter is not None:
        _cut(canvas, frame, wavelength, np.maximum(curve.phosphor[inside] * factor, 0), total)
    canvas.path(line, "ink", width=1)
    frame.draw_x(canvas, ticks(400, _LAST_NM, 8), say("wavelength, nm"))
    if peak_label:
        _name_peak(canvas, frame, wavelength, total, peak_label)
    for row, words in enumerate(white):
        canvas.text((_WIDTH - 12, 26 + 13 * row), words, "ink", anchor="end", bold=row == 0)
    return canvas.finish(title)


def _stops(frame: Frame) -> list[tuple[float, str]]:
    return [
        (frame.x(float(nm)) / _WIDTH, wavelength_colour(float(nm)))
        for nm in range(int(_FIRST_NM), int(_LAST_NM) + 1, 10)
    ]


def _closed(line: Array, base: float) -> Array:
    return np.vstack([[line[0, 0], base], line, [line[-1, 0], base]])


def _cut(canvas: Canvas, frame: Frame, wavelength: Array, phosphor: Array, total: Array) -> None:
    """Cut the area along the phosphor's own curve where the emitter lies over it."""
    cut = np.flatnonzero(total - phosphor > 0.01 * total.max())
    if cut.size == 0:
        return
    first, last = max(int(cut[0]) - 1, 0), min(int(cut[-1]) + 2, len(wavelength))
    line = frame.points(wavelength[first:last], phosphor[first:last])
    canvas.path(line, "paper", width=2.4)
    canvas.path(line, "ink", width=0.7, dash="3 2")
    high = int(phosphor.argmax())
    at = frame.points(wavelength[high : high + 1], phosphor[high : high + 1] * 0.45)[0]
    canvas.text((at[0], at[1]), say("phosphor"), "on-light", anchor="middle", bold=True)


def _name_peak(canvas: Canvas, frame: Frame, wavelength: Array, total: Array, words: str) -> None:
    blue = wavelength < 500
    part = total[blue] if bool(blue.any()) else total
    at = int(part.argmax())
    x, y = frame.x(float(wavelength[at])), frame.y(float(part[at]))
    top = frame.y.end + 1
    canvas.dot((x, y), 2.2, "ink")
    canvas.line((x, y), (x, top), "ink", width=0.7)
    canvas.rectangle((x + 3, top - 2), (_LETTER * len(told(words)), 12), "paper")
    canvas.text((x + 5, top + 7), words, "ink")


def spectrum_table(curve: SpectrumCurve) -> DataTable:
    """Give the numbers behind the plate, every twenty nanometres."""
    factor, unit = _scaled(curve)
    grid = np.arange(_FIRST_NM, _LAST_NM + 1, 20.0)
    grid = grid[(grid >= curve.wavelength_nm[0]) & (grid <= curve.wavelength_nm[-1])]
    parts: list[tuple[str, Array]] = [(say_as("spectrum", "total"), curve.total)]
    if curve.emitter is not None and curve.phosphor is not None:
        parts += [(say("emitter"), curve.emitter), (say("phosphor"), curve.phosphor)]
    columns = [np.interp(grid, curve.wavelength_nm, part) * factor for _, part in parts]
    rows = tuple(
        (fixed(nm, 0), *(fixed(column[index], 2) for column in columns))
        for index, nm in enumerate(grid)
    )
    return DataTable(
        (say("wavelength, nm"), *(joined(", ", (name, unit)) for name, _ in parts)), rows
    )
