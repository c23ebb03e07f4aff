"""The pair of figures that the comparison sets against each other at first."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import Decimal
from typing import Literal

from generator.language import say, sentence, told
from generator.records.comparison import ComparisonMatrix, ComparisonRow
from generator.records.lamp import Lamp
from generator.records.verdict import VerdictWord
from generator.sheets.comparison_data import limit_lines
from generator.sheets.comparison_description import ComparisonColumn
from generator.sheets.comparison_scatter import (
    ScatterAxis,
    ScatterPoint,
    draw_scatter,
    scatter_table,
)
from generator.sheets.comparison_words import PRICE
from generator.sheets.drawings.drawing import Drawing, Palette
from generator.sheets.figure_text import figure_text
from generator.sheets.number_format import exact_text
from generator.sheets.shown_names import ShownNames

__all__ = ["SCATTER_ACROSS", "SCATTER_UP", "first_pair", "scatter_drawing"]

SCATTER_UP = ("efficacy_lm_per_w", "luminous_flux_lm", "ra")
SCATTER_ACROSS = (PRICE, "cct_k", "power_w")
"""Figures drawn upwards and across, the first that at least two lamps have."""

_HEADING = say("Two figures against each other")
_NOT_DRAWN = say("Not drawn: fewer than two lamps have two figures.")
_FEWEST = 2

_Value = tuple[Decimal, Decimal | None, str]
"""Value, expanded uncertainty, and the value as printed."""


def first_pair(lamps: Sequence[Lamp], matrix: ComparisonMatrix) -> tuple[str, str]:
    """Choose the columns set against each other at first.

    Parameters
    ----------
    lamps
        Lamps, in the order of the rows.
    matrix
        The comparison.

    Returns
    -------
    tuple of str
        Column across and column up; empty text where no column has two lamps with a number.
    """
    across, up = (
        next((key for key in keys if len(_values(key, lamps, matrix)) >= _FEWEST), "")
        for keys in (SCATTER_ACROSS, SCATTER_UP)
    )
    return across, up


def scatter_drawing(
    lamps: Sequence[Lamp],
    matrix: ComparisonMatrix,
    columns: Sequence[ComparisonColumn],
    pair: tuple[str, str],
    palette: Palette,
    names: ShownNames,
) -> Drawing:
    """Draw the pair shown at first.

    Parameters
    ----------
    lamps
        Lamps, in the order of the rows.
    matrix
        The comparison.
    columns
        Columns as printed.
    pair
        Columns across and up.
    palette
        Colours of the theme.
    names
        How lamps are called.

    Returns
    -------
    Drawing
        The plot, or why there is none.
    """
    across, up = pair
    first, second = _values(across, lamps, matrix), _values(up, lamps, matrix)
    both = [
        (told(names.lamp(lamp)), row, first[lamp.lamp_id], second[lamp.lamp_id])
        for lamp, row in zip(lamps, matrix.rows, strict=True)
        if lamp.lamp_id in first and lamp.lamp_id in second
    ]
    if len(both) < _FEWEST:
        return Drawing("scatter", _HEADING, _NOT_DRAWN)
    named = {column.key: column for column in columns}
    x, y = (_axis(named[key], matrix) for key in (across, up))
    points = [_point(*item) for item in both]
    caption = _caption(points, named[across].label, named[up].label)
    svg = draw_scatter(points, x, y, told(caption), palette)
    return Drawing("scatter", _HEADING, caption, svg, scatter_table(points, x, y))


def _values(key: str, lamps: Sequence[Lamp], matrix: ComparisonMatrix) -> dict[str, _Value]:
    if key == PRICE:
        prices = [(lamp.lamp_id, lamp.offer.unit_price) for lamp in lamps]
        return {
            name: (price, None, exact_text(price)) for name, price in prices if price is not None
        }
    if key not in matrix.quantities:
        return {}
    at = matrix.quantities.index(key)
    found = {}
    for row in matrix.rows:
        figure = row.cells[at].figure
        if figure is not None and figure.number is not None:
            text = figure_text(figure, key)
            written = f"{text.number} {text.uncertainty}".rstrip()
            found[row.lamp_id] = (figure.number, figure.expanded_uncertainty, written)
    return found


def _axis(column: ComparisonColumn, matrix: ComparisonMatrix) -> ScatterAxis:
    name = f"{column.label}, {column.unit}" if column.unit else told(column.label)
    if column.key not in matrix.quantities:
        return ScatterAxis(name)
    at = matrix.quantities.index(column.key)
    return ScatterAxis(name, limit_lines(row.cells[at] for row in matrix.rows))


def _point(name: str, row: ComparisonRow, x: _Value, y: _Value) -> ScatterPoint:
    return ScatterPoint(
        name,
        float(x[0]),
        float(y[0]),
        x[2],
        y[2],
        _worst(row),
        float(x[1] or 0),
        float(y[1] or 0),
    )


def _worst(row: ComparisonRow) -> Literal["fail", "open", "pass"]:
    if row.counts.get(VerdictWord.FAIL, 0):
        return "fail"
    unsure = (VerdictWord.INCONCLUSIVE, VerdictWord.NOT_MEASURED)
    settled = row.counts.get(VerdictWord.PASS, 0) and not any(row.counts.get(w, 0) for w in unsure)
    return "pass" if settled else "open"


def _caption(points: Sequence[ScatterPoint], across: str, up: str) -> str:
    best = max(points, key=lambda point: point.y)
    return sentence(
        say(
            "{up} against {across}. Highest: {lamp}. A dot passes every clause, a ring has "
            "something open, a cross fails a clause; bars are expanded uncertainties, broken "
            "lines are limits.",
            up=up,
            across=across,
            lamp=best.name,
        )
    )
