"""The mains cycle: voltage and current over one cycle, with the shift of the fundamental."""

from __future__ import annotations

import numpy as np

from generator.language import say
from generator.records.curves import MainsCurve
from generator.sheets.drawings.axes import Frame, Scale, fixed, label, ticks
from generator.sheets.drawings.drawing import DataTable, Palette
from generator.sheets.drawings.svg import Canvas

__all__ = ["draw_mains_cycle", "mains_table"]

_WIDTH, _HEIGHT = 440.0, 190.0
_LEFT, _RIGHT, _TOP, _BOTTOM = 38.0, 46.0, 18.0, 32.0
_CYCLE = (0.0, 90.0, 180.0, 270.0, 360.0)


def draw_mains_cycle(curve: MainsCurve, shift_label: str, title: str, palette: Palette) -> str:
    """Draw the cycle.

    Parameters
    ----------
    curve
        Voltage and current over one cycle.
    shift_label
        What is written at the mark of the phase shift; empty where nothing is.
    title
        The finding in words.
    palette
        Colours of the theme.
    """
    canvas = Canvas(_WIDTH, _HEIGHT, palette)
    across = Scale(0, 360, _LEFT, _WIDTH - _RIGHT)
    volts = _both_ways(curve.voltage_v)
    milliamperes = _both_ways(curve.current_a * 1000)
    voltage = Frame(across, Scale(-volts, volts, _HEIGHT - _BOTTOM, _TOP))
    current = Frame(across, Scale(-milliamperes, milliamperes, _HEIGHT - _BOTTOM, _TOP))
    voltage.draw_y(canvas, ticks(-volts, volts, 5), say("voltage, V"))
    current.draw_y(canvas, ticks(-milliamperes, milliamperes, 5), "", right=True)
    canvas.text((_WIDTH, 9), say("current, mA"), "accent", anchor="end")
    zero = voltage.y(0)
    canvas.line((_LEFT, zero), (_WIDTH - _RIGHT, zero), "quiet", width=0.8)
    canvas.path(voltage.points(curve.phase_deg, curve.voltage_v), "quiet", width=1.3, dash="5 2.5")
    canvas.path(current.points(curve.phase_deg, curve.current_a * 1000), "accent", width=1.8)
    if shift_label and curve.current_phase_deg is not None:
        _mark_shift(canvas, voltage, curve.current_phase_deg, shift_label)
    voltage.draw_x(canvas, _CYCLE, say("phase of the voltage, degrees"))
    return canvas.finish(title)


def _both_ways(values: np.ndarray[tuple[int], np.dtype[np.float64]]) -> float:
    """The end of a scale that shows the values on both sides of nought."""
    return max(float(np.abs(values).max()) * 1.08, 1e-9)


def _mark_shift(canvas: Canvas, frame: Frame, shift_deg: float, words: str) -> None:
    """Mark, from the falling zero of the voltage, where the current fundamental has its own."""
    zero, start, end = frame.y(0), frame.x(180), frame.x(180 + shift_deg)
    high = zero - 12
    canvas.line((start, zero), (start, high - 3), "ink", width=0.9)
    canvas.line((end, zero), (end, high - 3), "accent", width=0.9)
    canvas.line((start, high), (end, high), "ink", width=0.9)
    canvas.text((max(start, end) + 4, high + 1), words, "ink")


def mains_table(curve: MainsCurve) -> DataTable:
    """Give the numbers behind the drawing, every ten degrees."""
    phases = np.arange(0, 361, 10.0)
    volts = np.interp(phases, curve.phase_deg, curve.voltage_v)
    milliamperes = np.interp(phases, curve.phase_deg, curve.current_a) * 1000
    rows = tuple(
        (label(phase), fixed(u, 1), fixed(i, 1))
        for phase, u, i in zip(phases, volts, milliamperes, strict=True)
    )
    return DataTable((say("phase, degrees"), say("voltage, V"), say("current, mA")), rows)
