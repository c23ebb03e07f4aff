"""The matrix as numbers for the scripts of the page: JSON that is safe inside a page."""

from __future__ import annotations

import json
from collections.abc import Iterable, Mapping, Sequence
from decimal import Decimal
from typing import Any

import numpy as np

from generator.language import told
from generator.language.speaking import decimal_sign
from generator.quantities import quantity
from generator.records.assessment import Assessment
from generator.records.comparison import ComparisonCell, ComparisonMatrix, SheetContext
from generator.records.curves import SpectrumCurve
from generator.records.verdict import VerdictWord
from generator.sheets.comparison_description import ComparisonColumn
from generator.sheets.comparison_words import PRICE, QUESTIONS, control_words
from generator.sheets.number_format import decimals_for
from generator.sheets.shown_names import ShownNames
from generator.sheets.words import COMPARISON_SIGNS, MARKS

__all__ = [
    "GRID_NM",
    "LimitLine",
    "comparison_data",
    "limit_lines",
    "page_json",
    "relative_spectrum",
]

LimitLine = tuple[float, str]
"""A limit and the sign of its comparison."""

GRID_NM = np.arange(380.0, 781.0, 5.0)
"""Wavelengths at which spectra are laid over one another [nm]."""

_MOST_LINES = 3
_ONE_SIDED = ("at least", "at most", "below", "above")
_PERMILLE = 1000


def limit_lines(cells: Iterable[ComparisonCell]) -> tuple[LimitLine, ...]:
    """Give the limits that a column has in common, ascending; none where each lamp has its own.

    Parameters
    ----------
    cells
        The cells of one column.
    """
    verdicts = [cell.verdict for cell in cells if cell.verdict is not None]
    found = {
        (float(item.limit), COMPARISON_SIGNS[item.comparison])
        for item in verdicts
        if isinstance(item.limit, Decimal) and item.comparison in _ONE_SIDED
    }
    return tuple(sorted(found)) if len(found) <= _MOST_LINES else ()


def relative_spectrum(curve: SpectrumCurve) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    """Give a spectrum on :data:`GRID_NM` as shares of its peak; not-a-number outside its range.

    Parameters
    ----------
    curve
        The spectrum.
    """
    values = np.interp(GRID_NM, curve.wavelength_nm, curve.total, left=np.nan, right=np.nan)
    return np.asarray(np.maximum(values / float(curve.total.max()), 0), dtype=np.float64)


def comparison_data(
    assessment: Assessment,
    context: SheetContext,
    matrix: ComparisonMatrix,
    columns: Sequence[ComparisonColumn],
    pair: tuple[str, str],
    names: ShownNames,
) -> str:
    """Write the data of the scripts.

    Parameters
    ----------
    assessment, context
        Lamps and curves.
    matrix
        The comparison.
    columns
        Columns as printed.
    pair
        Columns set against each other at first, across and up; empty where there are none.
    names
        How lamps and bidders are called.

    Returns
    -------
    str
        JSON without a character that could end its element; words, labels and the decimal sign
        are those of the language that is being spoken.
    """
    places = {name: index for index, name in enumerate(matrix.quantities)}
    return page_json(
        {
            "columns": [_column(column, matrix, places) for column in columns],
            "lamps": _lamps(assessment, matrix, columns, places, names),
            "pair": pair,
            "spectra": _spectra(context),
            "words": control_words(),
            "decimal": decimal_sign(),
        }
    )


def page_json(content: object) -> str:
    """Write JSON that may stand inside a ``script`` element."""
    text = json.dumps(content, ensure_ascii=False, allow_nan=False, separators=(",", ":"))
    return text.replace("<", "\\u003c").replace(">", "\\u003e").replace("&", "\\u0026")


def _column(
    column: ComparisonColumn, matrix: ComparisonMatrix, places: Mapping[str, int]
) -> dict[str, Any]:
    at = places.get(column.key)
    cells = [] if at is None else [row.cells[at] for row in matrix.rows]
    numbers = at is None or any(
        cell.figure is not None and cell.figure.number is not None for cell in cells
    )
    return {
        "key": column.key,
        "label": told(column.label),
        "symbol": told(column.symbol),
        "unit": told(column.unit),
        "chosen": column.chosen,
        "number": numbers,
        "better": -1 if at is None else matrix.better.get(column.key, 0),
        "limits": limit_lines(cells),
    }


def _lamps(
    assessment: Assessment,
    matrix: ComparisonMatrix,
    columns: Sequence[ComparisonColumn],
    places: Mapping[str, int],
    names: ShownNames,
) -> list[dict[str, Any]]:
    lamps = {lamp.lamp_id: lamp for lamp in assessment.campaign.lamps}
    rows = []
    for row in matrix.rows:
        lamp = lamps[row.lamp_id]
        own = {PRICE: lamp.offer.unit_price, QUESTIONS: Decimal(row.questions)}
        cells = [
            _own(own[column.key])
            if column.key in own
            else _figure(row.cells[places[column.key]], column.key)
            for column in columns
        ]
        rows.append(
            {
                "id": row.lamp_id,
                "model": told(names.lamp(lamp)),
                "bidder": told(names.bidder(lamp)),
                "currency": lamp.offer.currency or "",
                "counts": {MARKS[word]: row.counts.get(word, 0) for word in VerdictWord},
                "cells": cells,
            }
        )
    return rows


def _own(value: Decimal | None) -> list[Any] | None:
    if value is None:
        return None
    return [float(value), None, max(-int(value.as_tuple().exponent), 0)]


def _figure(cell: ComparisonCell, name: str) -> list[Any] | None:
    """Value, expanded uncertainty, decimals shown; a class as text alone."""
    figure = cell.figure
    if figure is None or figure.value is None:
        return None
    if isinstance(figure.value, str):
        return [told(figure.value)]
    spread = figure.expanded_uncertainty
    decimals = decimals_for(spread, quantity(name).decimals)
    return [float(figure.value), None if spread is None else float(spread), decimals]


def _spectra(context: SheetContext) -> dict[str, Any]:
    found = {
        lamp_id: [
            None if np.isnan(value) else round(float(value) * _PERMILLE)
            for value in relative_spectrum(curves.spectrum)
        ]
        for lamp_id, curves in context.curves.items()
        if curves.spectrum is not None
    }
    return {"first_nm": GRID_NM[0], "step_nm": GRID_NM[1] - GRID_NM[0], "permille": found}
