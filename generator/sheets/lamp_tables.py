"""Two tables of one lamp: declared against determined, and the units one by one."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import Decimal

from generator.quantities import QUANTITIES, quantity
from generator.records.assessment import Assessment
from generator.records.figure import Figure
from generator.records.lamp import Lamp
from generator.records.verdict import Basis, Verdict, VerdictWord
from generator.sheets.description import Pair
from generator.sheets.drawings.drawing import Palette
from generator.sheets.figure_text import figure_text, verdict_text
from generator.sheets.lamp_description import DeclaredText, UnitsTable
from generator.sheets.lamp_words import HEADLINE_UNITS, SUMMARY_ROWS, UNITS_NOTE
from generator.sheets.number_format import declared_text, shown, shown_margin

__all__ = ["declared_texts", "units_table"]

_DASH = "\u2013"
_SAME_LIGHT = {"luminous_flux_lm": "useful_luminous_flux_lm"}
_VERIFIES = "-verification-"


def declared_texts(
    assessment: Assessment, lamp: Lamp, colours: Palette
) -> tuple[DeclaredText, ...]:
    """Set what a supplier declares beside what the units were found to be.

    Parameters
    ----------
    assessment
        Figures and verdicts.
    lamp
        The lamp.
    colours
        Colours of the theme.
    """
    verdicts = assessment.verdicts_of(lamp.lamp_id)
    return tuple(
        _declared(name, lamp.declared[name], assessment, lamp, verdicts, colours)
        for name in QUANTITIES
        if name in lamp.declared
    )


def _declared(
    name: str,
    declared: Decimal,
    assessment: Assessment,
    lamp: Lamp,
    verdicts: Sequence[Verdict],
    colours: Palette,
) -> DeclaredText:
    figure = assessment.figures.measured(lamp.lamp_id, name)
    found = figure_text(figure, name)
    judged = next((item for item in verdicts if _verifies(item, name)), None)
    text = verdict_text(judged, colours) if judged else None
    return DeclaredText(
        label=quantity(name).label,
        unit=quantity(name).unit,
        declared=declared_text(declared),
        determined=found.number,
        uncertainty=found.uncertainty,
        difference=_difference(declared, figure),
        allowed=text.limit if text else "",
        word=text.word if text else "",
        mark=text.mark if text else "",
    )


def _verifies(verdict: Verdict, name: str) -> bool:
    names = {name, _SAME_LIGHT.get(name, name)}
    return (
        _VERIFIES in verdict.clause
        and verdict.quantity in names
        and verdict.basis is Basis.DETERMINED
        and verdict.verdict is not VerdictWord.NOT_APPLICABLE
    )


def _difference(declared: Decimal, figure: Figure | None) -> str:
    """Determined less declared in percent of the declared value; empty where it is nought."""
    if figure is None or figure.number is None or not declared:
        return ""
    return f"{shown_margin(100 * (figure.number - declared) / abs(declared), 1)}\u00a0%"


def units_table(assessment: Assessment, lamp: Lamp) -> UnitsTable | None:
    """Give the units one by one with mean and spread; ``None`` where none was measured.

    Parameters
    ----------
    assessment
        Figures.
    lamp
        The lamp.
    """
    units = assessment.campaign.units_of(lamp.lamp_id)
    known = {
        name: {
            unit.unit_id: figure_text(figure, name).number
            for unit in units
            if (figure := assessment.figures.measured(lamp.lamp_id, name, unit.unit_id))
            and figure.number is not None
        }
        for name in HEADLINE_UNITS
        if name not in _SAME_LIGHT.values() or lamp.directional
    }
    names = [name for name, texts in known.items() if texts]
    if not names:
        return None
    rows = tuple(
        (
            unit.unit_id.removeprefix(f"{lamp.lamp_id}-"),
            *(known[name].get(unit.unit_id, _DASH) for name in names),
        )
        for unit in units
    )
    means = [assessment.figures.measured(lamp.lamp_id, name) for name in names]
    columns = [_summary(mean, name) for mean, name in zip(means, names, strict=True)]
    summary = tuple(
        (label, *(column[place] for column in columns)) for place, label in enumerate(SUMMARY_ROWS)
    )
    headings = tuple(Pair(quantity(name).symbol, quantity(name).unit) for name in names)
    return UnitsTable(headings, rows, summary, UNITS_NOTE)


def _summary(mean: Figure | None, name: str) -> tuple[str, ...]:
    """Mean, standard deviation and uncertainty of one column."""
    text = figure_text(mean, name)
    if mean is None or mean.number is None:
        return (_DASH,) * len(SUMMARY_ROWS)
    return (text.number, _spread(mean, name), text.uncertainty.removeprefix("±\u00a0") or _DASH)


def _spread(mean: Figure, name: str) -> str:
    if mean.spread is None:
        return _DASH
    return shown(mean.spread, quantity(name).decimals + 1)
