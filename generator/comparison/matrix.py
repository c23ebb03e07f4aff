"""The comparison matrix: lamps by quantities, with verdict counts and the best of each column."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from decimal import Decimal
from types import MappingProxyType

from generator.records.comparison import ComparisonCell, ComparisonMatrix, ComparisonRow
from generator.records.figure import Figure, FigureSet
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp
from generator.records.verdict import Basis, Verdict, VerdictWord

__all__ = ["BETTER", "COLUMNS", "compare"]

COLUMNS = (
    "energy_efficiency_class",
    "luminous_flux_lm",
    "useful_luminous_flux_lm",
    "power_w",
    "efficacy_lm_per_w",
    "cct_k",
    "duv",
    "sdcm",
    "ra",
    "r9",
    "percent_flicker",
    "svm",
    "pst_lm",
    "power_factor",
    "displacement_factor",
    "thd_current_percent",
    "standby_power_w",
    "lumen_maintenance_factor",
    "survival_factor",
)
"""Quantities of the comparison, in the order a buyer asks."""

BETTER = MappingProxyType(
    {
        "efficacy_lm_per_w": 1,
        "ra": 1,
        "r9": 1,
        "power_factor": 1,
        "displacement_factor": 1,
        "lumen_maintenance_factor": 1,
        "survival_factor": 1,
        "sdcm": -1,
        "percent_flicker": -1,
        "svm": -1,
        "pst_lm": -1,
        "thd_current_percent": -1,
        "standby_power_w": -1,
    }
)
"""Which way is better: 1 for higher, -1 for lower; a quantity that is not here has no better."""

_SEVERITY = {
    VerdictWord.FAIL: 0,
    VerdictWord.INCONCLUSIVE: 1,
    VerdictWord.NOT_MEASURED: 2,
    VerdictWord.PASS: 3,
    VerdictWord.NOT_APPLICABLE: 4,
}


def compare(
    lamps: Sequence[Lamp],
    figures: FigureSet,
    verdicts: Sequence[Verdict],
    findings: Sequence[Finding] = (),
    columns: Sequence[str] = COLUMNS,
) -> ComparisonMatrix:
    """Set lamps side by side.

    Parameters
    ----------
    lamps
        Lamps, in the order of the rows.
    figures
        All figures.
    verdicts
        All verdicts.
    findings
        All findings.
    columns
        Catalogue quantities, in the order of the columns; one that no lamp has is left out.

    Returns
    -------
    ComparisonMatrix
        One row per lamp, one cell per quantity.
    """
    shown = tuple(
        name
        for name in columns
        if any(figures.best(lamp.lamp_id, name) is not None for lamp in lamps)
    )
    best = {name: _best_value(lamps, figures, name) for name in shown}
    by_lamp: dict[str, list[Verdict]] = {lamp.lamp_id: [] for lamp in lamps}
    for verdict in verdicts:
        by_lamp[verdict.lamp_id].append(verdict)
    questions = Counter(item.lamp_id for item in findings if item.severity is not Severity.REMARK)
    rows = tuple(
        ComparisonRow(
            lamp.lamp_id,
            _cells(lamp, figures, by_lamp[lamp.lamp_id], shown, best),
            Counter(item.verdict for item in by_lamp[lamp.lamp_id]),
            questions[lamp.lamp_id],
        )
        for lamp in lamps
    )
    better = {name: BETTER[name] for name in shown if name in BETTER}
    return ComparisonMatrix(shown, rows, MappingProxyType(better))


def _cells(
    lamp: Lamp,
    figures: FigureSet,
    verdicts: Sequence[Verdict],
    columns: Sequence[str],
    best: dict[str, Decimal | None],
) -> tuple[ComparisonCell, ...]:
    cells = []
    for name in columns:
        figure = figures.best(lamp.lamp_id, name)
        number = _measured_number(figures, lamp.lamp_id, name)
        cells.append(
            ComparisonCell(
                figure,
                _severest(verdicts, name),
                best=number is not None and number == best[name],
            )
        )
    return tuple(cells)


def _measured_number(figures: FigureSet, lamp_id: str, name: str) -> Decimal | None:
    figure: Figure | None = figures.measured(lamp_id, name)
    return figure.number if figure else None


def _best_value(lamps: Sequence[Lamp], figures: FigureSet, name: str) -> Decimal | None:
    """The best measured value of a column; ``None`` where better has no meaning."""
    direction = BETTER.get(name)
    if direction is None:
        return None
    found = (_measured_number(figures, lamp.lamp_id, name) for lamp in lamps)
    numbers = [number for number in found if number is not None]
    return max(numbers, key=lambda number: direction * number, default=None)


def _severest(verdicts: Sequence[Verdict], name: str) -> Verdict | None:
    """The determined verdict on a quantity that weighs most; ``None`` where there is none."""
    found = [
        item
        for item in verdicts
        if item.quantity == name
        and item.basis is Basis.DETERMINED
        and item.verdict is not VerdictWord.NOT_APPLICABLE
    ]
    return min(
        found,
        key=lambda item: (_SEVERITY[item.verdict], item.margin if item.margin is not None else 0),
        default=None,
    )
