"""Figures: one number about one lamp or one unit, with uncertainty, grade, method and origin."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from decimal import Decimal
from enum import StrEnum
from types import MappingProxyType

import numpy as np
from numpy.typing import NDArray

from generator.language import say_as

__all__ = ["GRADE_WORDS", "MEAN", "Figure", "FigureSet", "Grade", "SeriesFigures", "exact"]

MEAN = ""
"""The ``unit_id`` of a figure that stands for the mean over a lamp's units."""

_DIGITS = 10


def exact(number: float) -> Decimal:
    """Turn a computed float into the decimal that stands for it from then on.

    Ten significant digits are kept: far more than any measurement holds, and few enough that
    the last bits of a sum, which differ between processors, never reach a figure.

    Parameters
    ----------
    number
        A finite float.

    Returns
    -------
    Decimal
        The number, rounded to ten significant digits, without trailing zeros.
    """
    text = f"{number:.{_DIGITS}g}"
    return Decimal(text)


class Grade(StrEnum):
    """How a figure is known: computed from raw data, reported ready-made, or declared."""

    COMPUTED = "computed"
    REPORTED = "reported"
    DECLARED = "declared"


GRADE_WORDS = MappingProxyType(
    {
        Grade.COMPUTED: say_as("grade", "computed"),
        Grade.REPORTED: say_as("grade", "reported"),
        Grade.DECLARED: say_as("grade", "declared"),
    }
)
"""The three grades as they are said."""

_ORDER = {Grade.COMPUTED: 0, Grade.REPORTED: 1, Grade.DECLARED: 2}


@dataclass(frozen=True, slots=True)
class SeriesFigures:
    """Figures of a batch of series (units, columns of a file), one array entry per series.

    The currency of the metrics rooms. A quantity that could not be given for a series holds
    not-a-number there and a reason in :attr:`reasons`.

    Parameters
    ----------
    values
        Quantity name -> values in the unit of the catalogue (series,).
    reasons
        Quantity name -> one reason per series; empty text where the value stands.
    methods
        Quantity name -> method id with edition, for instance ``cct_ohno_2013``.
    remarks
        One tuple of remarks per series: things to know about the record itself
        (noise floor, clipping, reversed clamp), fit to be printed.
    expanded_uncertainty
        Quantity name -> expanded uncertainty (k = 2) (series,), where the metric itself gives
        one; not-a-number where unknown.
    """

    values: Mapping[str, NDArray[np.float64]]
    reasons: Mapping[str, tuple[str, ...]] = field(default_factory=dict)
    methods: Mapping[str, str] = field(default_factory=dict)
    remarks: tuple[tuple[str, ...], ...] = ()
    expanded_uncertainty: Mapping[str, NDArray[np.float64]] = field(default_factory=dict)

    def reason(self, quantity: str, series: int) -> str:
        """Why a quantity is withheld for one series; empty where it is not."""
        texts = self.reasons.get(quantity)
        return texts[series] if texts else ""


@dataclass(frozen=True, slots=True)
class Figure:
    """One figure of one unit, or of the mean over a lamp's units.

    Parameters
    ----------
    lamp_id, unit_id
        What it belongs to; ``unit_id`` is :data:`MEAN` for the mean over units.
    quantity
        Catalogue name.
    value
        Exact decimal in the unit of the catalogue; text for a class; ``None`` when there is
        no number, and then :attr:`reason` says why.
    grade
        How it is known.
    method
        Method id with edition, or the name of the file column for ready-made numbers.
    expanded_uncertainty
        Expanded uncertainty (k = 2) in the same unit, or ``None`` when not known.
    spread
        Sample standard deviation over units; only on means of two units or more.
    units_count
        Number of units behind the figure.
    reason
        Why there is no value; empty otherwise.
    origin
        Where the inputs stand (file, row, column), for the trace.
    remarks
        Things to know about the record behind it.
    """

    lamp_id: str
    unit_id: str
    quantity: str
    value: Decimal | str | None
    grade: Grade
    method: str
    expanded_uncertainty: Decimal | None = None
    spread: Decimal | None = None
    units_count: int = 1
    reason: str = ""
    origin: tuple[str, ...] = ()
    remarks: tuple[str, ...] = ()

    @property
    def number(self) -> Decimal | None:
        """The value where it is a number, else ``None``."""
        return self.value if isinstance(self.value, Decimal) else None


class FigureSet:
    """All figures of a campaign, with look-up by lamp, unit, quantity and grade.

    Parameters
    ----------
    figures
        The figures, in the order they are to be written.
    """

    def __init__(self, figures: Iterable[Figure]) -> None:
        self._figures = tuple(figures)
        self._index: dict[tuple[str, str, str], list[Figure]] = {}
        for item in self._figures:
            self._index.setdefault((item.lamp_id, item.unit_id, item.quantity), []).append(item)
        for items in self._index.values():
            items.sort(key=lambda item: (item.value is None, _ORDER[item.grade]))

    def __iter__(self) -> Iterator[Figure]:
        return iter(self._figures)

    def __len__(self) -> int:
        return len(self._figures)

    def every(self, lamp_id: str, quantity: str, unit_id: str = MEAN) -> tuple[Figure, ...]:
        """All grades of one figure, the one to use first."""
        return tuple(self._index.get((lamp_id, unit_id, quantity), ()))

    def measured(self, lamp_id: str, quantity: str, unit_id: str = MEAN) -> Figure | None:
        """The computed figure, else the reported one, else ``None``; never the declared one."""
        for item in self.every(lamp_id, quantity, unit_id):
            if item.grade is not Grade.DECLARED:
                return item
        return None

    def graded(
        self, lamp_id: str, quantity: str, grade: Grade, unit_id: str = MEAN
    ) -> Figure | None:
        """The figure of one grade, or ``None``."""
        for item in self.every(lamp_id, quantity, unit_id):
            if item.grade is grade:
                return item
        return None

    def best(self, lamp_id: str, quantity: str, unit_id: str = MEAN) -> Figure | None:
        """The figure to show: computed before reported before declared; one with a value first."""
        items = self.every(lamp_id, quantity, unit_id)
        return items[0] if items else None
