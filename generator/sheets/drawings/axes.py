"""Scales and ticks: from data to pixels, and the round numbers written beside an axis."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, told
from generator.sheets.drawings.svg import Canvas

__all__ = ["Frame", "Scale", "fixed", "label", "ticks"]

Array = NDArray[np.float64]

_LONG = re.compile(r"\u2212?\d{5,6}")


@dataclass(frozen=True, slots=True)
class Scale:
    """A straight or logarithmic map from data to pixels.

    Parameters
    ----------
    low, high
        Ends in data.
    start, end
        Ends in pixels.
    logarithmic
        Whether equal ratios take equal lengths.
    """

    low: float
    high: float
    start: float
    end: float
    logarithmic: bool = False

    def __call__(self, value: float) -> float:
        """Give the pixel of one value."""
        return float(self.many(np.array([value]))[0])

    def many(self, values: Array) -> Array:
        """Give the pixels of many values."""
        low, high = self.low, self.high
        if self.logarithmic:
            values, low, high = np.log10(values), math.log10(low), math.log10(high)
        share = (values - low) / (high - low)
        return np.asarray(self.start + share * (self.end - self.start), dtype=np.float64)


def ticks(low: float, high: float, most: int = 6) -> tuple[float, ...]:
    """Give round numbers (1, 2 or 5 times a power of ten apart) between two ends.

    Parameters
    ----------
    low, high
        Ends, ``low`` below ``high``.
    most
        Largest number of ticks.
    """
    rough = (high - low) / max(most - 1, 1)
    power = 10.0 ** math.floor(math.log10(rough))
    step = next(factor * power for factor in (1, 2, 5, 10, 20) if factor * power >= rough * 0.999)
    first = math.ceil(low / step - 1e-9)
    last = math.floor(high / step + 1e-9)
    return tuple(float(f"{index * step:.10g}") for index in range(first, last + 1))


def label(value: float) -> str:
    """Write a tick: no needless zeros, a true minus sign, thousands of long numbers apart."""
    text = f"{value:.6g}".replace("-", "\u2212")
    return told(numeral(f"{text[:-3]}\u00a0{text[-3:]}" if _LONG.fullmatch(text) else text))


def fixed(value: float, decimals: int) -> str:
    """Write a number with so many decimals and a true minus sign.

    Parameters
    ----------
    value
        The number.
    decimals
        Decimals.
    """
    return told(numeral(f"{value:.{decimals}f}".replace("-", "\u2212")))


@dataclass(frozen=True, slots=True)
class Frame:
    """The place of a plot inside a canvas, with its two scales."""

    x: Scale
    y: Scale

    def points(self, x: Array, y: Array) -> Array:
        """Give the pixels of a curve (points, 2)."""
        return np.column_stack([self.x.many(x), self.y.many(y)])

    def draw_x(self, canvas: Canvas, values: tuple[float, ...], unit: str) -> None:
        """Write the horizontal axis: hairline, ticks, numbers, unit at the right end."""
        base = self.y.start
        canvas.line((self.x.start, base), (self.x.end, base), "quiet", width=0.8)
        for value in values:
            at = self.x(value)
            canvas.line((at, base), (at, base + 3), "quiet", width=0.8)
            canvas.text((at, base + 13), label(value), anchor="middle")
        canvas.text((self.x.end, base + 25), unit, anchor="end")

    def draw_y(
        self, canvas: Canvas, values: tuple[float, ...], unit: str, *, right: bool = False
    ) -> None:
        """Write the vertical axis: hairlines across, numbers, unit above."""
        for value in values:
            at = self.y(value)
            if not right:
                canvas.line((self.x.start, at), (self.x.end, at), "hair", width=0.6)
            place = (self.x.end + 5, at + 3.5) if right else (self.x.start - 5, at + 3.5)
            canvas.text(place, label(value), anchor="start" if right else "end")
        top = (self.x.end + 5, 9.0) if right else (0.0, 9.0)
        canvas.text(top, unit)
