"""Spectra laid over one another, white by white, so that only comparable lamps share a plot."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say, say_as, told
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.sheets.comparison_data import GRID_NM, relative_spectrum
from generator.sheets.drawings.axes import Frame, Scale, ticks
from generator.sheets.drawings.drawing import DataTable, Drawing, Palette
from generator.sheets.drawings.svg import Canvas
from generator.sheets.shown_names import ShownNames

__all__ = ["SPECTRUM_LINES", "spectra_drawings"]

Array = NDArray[np.float64]

SPECTRUM_LINES = (
    ("ink", ""),
    ("accent", "14 3"),
    ("bad", "7 2.5"),
    ("good", "2 2"),
    ("open", "8 2 2 2"),
    ("tooth", "4 3"),
)
"""Colour role and dashes of the lines of one plot; hue repeats what the dashes say."""

_NOMINAL_K = (2200, 2700, 3000, 3500, 4000, 5000, 5700, 6500)
"""Common nominal whites; common practice, no source."""

_WIDTH, _HEIGHT, _TOP, _LINE = 440.0, 190.0, 8.0, 14.0
_FIRST_NM, _LAST_NM, _TABLE_STEP = 380.0, 780.0, 4
_BLUE_NM = 500.0


@dataclass(frozen=True, slots=True)
class _Line:
    """One lamp: name, white, shares of the peak on the common grid."""

    name: str
    nominal_k: int
    shares: Array


def spectra_drawings(
    assessment: Assessment, context: SheetContext, palette: Palette, names: ShownNames
) -> tuple[Drawing, ...]:
    """Lay the spectra of a campaign over one another.

    Parameters
    ----------
    assessment
        Lamps, and their colour temperatures.
    context
        Their curves.
    palette
        Colours of the theme.
    names
        How lamps are called.

    Returns
    -------
    tuple of Drawing
        Plots of six lamps at the most, by nominal white; one that says why where none is drawn.
    """
    lines = _lines(assessment, context, names)
    if not lines:
        return (
            Drawing("spectra", say("Spectra"), say("Not drawn: the campaign has no spectrum.")),
        )
    drawings = []
    for nominal in sorted({line.nominal_k for line in lines}):
        group = [line for line in lines if line.nominal_k == nominal]
        heading = (
            say("Spectra, about {white}\u00a0K", white=nominal)
            if nominal
            else say("Spectra, white not known")
        )
        plots = _shared_out(group, len(SPECTRUM_LINES))
        for number, part in enumerate(plots, start=1):
            name = (
                heading
                if len(plots) == 1
                else say(
                    "{heading}, {number} of {count}",
                    heading=heading,
                    number=number,
                    count=len(plots),
                )
            )
            key = f"spectra-{nominal}-{number}"
            caption = _caption(part)
            drawings.append(
                Drawing(
                    key, name, caption, _plot(part, group, told(caption), palette), _table(part)
                )
            )
    return tuple(drawings)


def _lines(assessment: Assessment, context: SheetContext, names: ShownNames) -> list[_Line]:
    found = []
    for lamp in assessment.campaign.lamps:
        curves = context.curves.get(lamp.lamp_id)
        if curves is None or curves.spectrum is None:
            continue
        figure = assessment.figures.best(lamp.lamp_id, "cct_k")
        number = figure.number if figure else None
        nominal = _nearest(float(number)) if number else 0
        found.append(_Line(told(names.lamp(lamp)), nominal, relative_spectrum(curves.spectrum)))
    return found


def _nearest(cct_k: float) -> int:
    """Nearest in reciprocal temperature, as the eye takes steps of white."""
    return min(_NOMINAL_K, key=lambda nominal: abs(1 / nominal - 1 / cct_k))


def _shared_out(group: Sequence[_Line], most: int) -> list[Sequence[_Line]]:
    """Cut a group into as few parts as need be, equally full."""
    count = math.ceil(len(group) / most)
    size = math.ceil(len(group) / count)
    return [group[at : at + size] for at in range(0, len(group), size)]


def _blue_peak(line: _Line) -> float:
    blue = GRID_NM < _BLUE_NM
    return float(GRID_NM[blue][int(np.nanargmax(line.shares[blue]))])


def _caption(lines: Sequence[_Line]) -> str:
    peaks = [_blue_peak(line) for line in lines]
    low, high = min(peaks), max(peaks)
    where = (
        say("at {wavelength:.0f} nm", wavelength=low)
        if low == high
        else say("between {low:.0f} nm and {high:.0f} nm", low=low, high=high)
    )
    reds = {
        line.name: float(np.nansum(line.shares[GRID_NM >= 620]) / np.nansum(line.shares))
        for line in lines
    }
    if len(lines) == 1:
        red = _percent(reds[lines[0].name])
        return say(
            "{lamp}: strongest blue {where}; {share} of its radiation beyond 620 nm.",
            lamp=lines[0].name,
            where=where,
            share=red,
        )
    most, least = max(reds, key=lambda name: reds[name]), min(reds, key=lambda name: reds[name])
    return say(
        "Strongest blue {where}. Most red beyond 620 nm: {most}, {most_share} of its radiation; "
        "least: {least}, {least_share}.",
        where=where,
        most=most,
        most_share=_percent(reds[most]),
        least=least,
        least_share=_percent(reds[least]),
    )


def _percent(share: float) -> str:
    return f"{100 * share:.0f}\u00a0%"


def _plot(lines: Sequence[_Line], group: Sequence[_Line], title: str, palette: Palette) -> str:
    legend = _LINE * len(lines) + 6
    canvas = Canvas(_WIDTH, _HEIGHT + legend, palette)
    base = _HEIGHT - 32
    frame = Frame(Scale(_FIRST_NM, _LAST_NM, 34, _WIDTH - 12), Scale(0, 105, base, _TOP + 8))
    frame.draw_y(canvas, ticks(0, 100, 5), told(say("% of the peak")))
    _envelope(canvas, frame, group)
    frame.draw_x(canvas, ticks(400, _LAST_NM, 8), told(say("wavelength, nm")))
    for number, (line, (role, dash)) in enumerate(zip(lines, SPECTRUM_LINES, strict=False)):
        there = ~np.isnan(line.shares)
        points = frame.points(GRID_NM[there], line.shares[there] * 100)
        canvas.path(points, role, width=1.3, dash=dash)
        y = _HEIGHT + 8 + number * _LINE
        canvas.line((34, y), (62, y), role, width=1.6, dash=dash)
        canvas.text((68, y + 3.5), line.name, "ink")
    return canvas.finish(title)


def _envelope(canvas: Canvas, frame: Frame, group: Sequence[_Line]) -> None:
    """Shade what all lamps of this white cover together."""
    if len(group) < 2:
        return
    every = np.nan_to_num(np.stack([line.shares for line in group]))
    low = frame.points(GRID_NM, every.min(axis=0) * 100)
    high = frame.points(GRID_NM, every.max(axis=0) * 100)
    canvas.area(np.vstack([low, high[::-1]]), "faint")


def _table(lines: Sequence[_Line]) -> DataTable:
    shares = (say("{lamp}, % of the peak", lamp=line.name) for line in lines)
    headings = (say("wavelength, nm"), *shares)
    rows = tuple(
        (
            f"{GRID_NM[at]:.0f}",
            *(
                say_as("number", "none")
                if np.isnan(line.shares[at])
                else numeral(f"{100 * line.shares[at]:.1f}")
                for line in lines
            ),
        )
        for at in range(0, len(GRID_NM), _TABLE_STEP)
    )
    return DataTable(headings, rows)
