"""Scope: whether the lamp is a light source in the sense of an act.

Source: eu_2019_2015 and eu_2019_2020, Article 2 point 1; no tolerance, and one unit in scope
makes the model a light source (Annexes IX and IV).
"""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction

from generator.conformity.evidence import Evidence, LampRecord
from generator.conformity.exact_number import decimal_of, number_text
from generator.conformity.limits import Question
from generator.conformity.ruling import Ruling, not_measured
from generator.language import joined, numeral, say, say_counted, sentence
from generator.quantities import QUANTITIES
from generator.records.clause import DatedValue
from generator.records.clause_words import number_of, with_unit
from generator.records.verdict import Basis, VerdictWord

__all__ = ["in_scope", "light_source_scope", "unit_in_scope", "window_bounds"]

_NEEDED = ("x", "y", "luminous_flux_lm", "ra")
_AREA = "light_emitting_area_mm2"
_FORMATS = {"x": ".5f", "y": ".5f", "luminous_flux_lm": ".2f", "ra": ".2f"}
"""How figures are written in the steps; the declared area is shown as it was declared."""
_NO_AREA = say("The flux density is not checked: the light-emitting area is not given.")
_OUTSIDE = say("Every unit is outside the definition, so the act does not cover the lamp")
_FOUND = {
    True: say("in scope"),
    False: say("outside"),
    None: say("not all figures known"),
}


def window_bounds(x: Fraction, window: DatedValue) -> tuple[Fraction, Fraction]:
    """Lower and upper chromaticity y of the window at a chromaticity x.

    Parameters
    ----------
    x
        Chromaticity x.
    window
        Coefficients of the two parabolas.

    Returns
    -------
    tuple of Fraction
        Both bounds, themselves outside.

    Notes
    -----
    Source: eu_2019_2020, Article 2 point 1(a).
    """
    curve = Fraction(window.number("y_square")) * x * x + Fraction(window.number("y_linear")) * x
    return (
        curve + Fraction(window.number("y_lower_constant")),
        curve + Fraction(window.number("y_upper_constant")),
    )


def unit_in_scope(figures: dict[str, Fraction], window: DatedValue) -> bool | None:
    """Whether one unit satisfies every part of the definition that is known.

    Parameters
    ----------
    figures
        Known figures of the unit among x, y, luminous flux and Ra, and the declared
        light-emitting area of the lamp, without which the flux density is not judged.
    window
        The constants of the definition.

    Returns
    -------
    bool or None
        False where one known figure is outside; ``None`` where none is, but one is missing.

    Notes
    -----
    Source: eu_2019_2020, Article 2 point 1.
    """
    checks: list[bool] = []
    x, y = figures.get("x"), figures.get("y")
    if x is not None:
        checks.append(Fraction(window.number("x_above")) < x < Fraction(window.number("x_below")))
        if y is not None:
            lower, upper = window_bounds(x, window)
            checks.append(lower < y < upper)
    flux, ra = figures.get("luminous_flux_lm"), figures.get("ra")
    if flux is not None:
        least = Fraction(window.number("luminous_flux_at_least_lm"))
        checks.append(least <= flux <= Fraction(window.number("luminous_flux_at_most_lm")))
        if figures.get(_AREA):
            density = flux / figures[_AREA]
            checks.append(density < Fraction(window.number("flux_density_below_lm_per_mm2")))
    if ra is not None:
        checks.append(ra > Fraction(window.number("cri_above")))
    if not all(checks):
        return False
    return True if all(name in figures for name in _NEEDED) else None


def _unit_figures(record: LampRecord) -> dict[str, dict[str, Fraction]]:
    area = Evidence(record, Basis.DECLARED).reading(_AREA).value
    units: dict[str, dict[str, Fraction]] = {}
    for unit_id in record.unit_ids:
        units[unit_id] = {}
        for name in _NEEDED:
            figure = record.figures.measured(record.lamp.lamp_id, name, unit_id)
            if figure is not None and figure.number is not None:
                units[unit_id][name] = Fraction(figure.number)
        if units[unit_id] and area:
            units[unit_id][_AREA] = area
    return units


def in_scope(record: LampRecord, window: DatedValue) -> bool | None:
    """Whether a model is a light source: one unit in scope is enough.

    Parameters
    ----------
    record
        The lamp with its figures.
    window
        The constants of the definition.

    Returns
    -------
    bool or None
        False only where every unit is outside; ``None`` where it cannot be told.

    Notes
    -----
    Source: eu_2019_2020, Annex IV; eu_2019_2015, Annex IX.
    """
    found = [unit_in_scope(figures, window) for figures in _unit_figures(record).values()]
    if any(found):
        return True
    return False if found and all(item is False for item in found) else None


def light_source_scope(question: Question) -> Ruling:
    """Rule on the scope as a clause of its own.

    Parameters
    ----------
    question
        Clause and lamp.

    Returns
    -------
    Ruling
        Pass where the lamp is in scope, not applicable where every unit is outside, not
        measured where it cannot be told.
    """
    window = question.constants("window")
    record = question.evidence.record
    units = _unit_figures(record)
    found = {unit: unit_in_scope(figures, window) for unit, figures in units.items()}
    flux = question.evidence.reading("luminous_flux_lm")
    least, most = (
        window.number("luminous_flux_at_least_lm"),
        window.number("luminous_flux_at_most_lm"),
    )
    shown = say("{low} to {high}", low=number_of(least), high=number_of(most))
    steps = tuple(_unit_step(unit, units[unit], item, window) for unit, item in found.items())
    open_density = () if any(_AREA in figures for figures in units.values()) else (_NO_AREA,)
    if any(found.values()):
        inside = sum(item is True for item in found.values())
        note = say_counted(
            "{inside} of {count} unit shown to be in scope; one is enough.",
            "{inside} of {count} units shown to be in scope; one is enough.",
            len(found),
            inside=inside,
        )
        return _scoped(VerdictWord.PASS, flux.value, shown, (note, *open_density), steps)
    if found and all(item is False for item in found.values()):
        notes = (sentence(_OUTSIDE),)
        outside = _scoped(VerdictWord.NOT_APPLICABLE, flux.value, shown, notes, steps)
        return replace(outside, reason=_OUTSIDE)
    ruling = not_measured(
        say("chromaticity, luminous flux and CRI are not all measured on one unit")
    )
    note = say("The clauses of the act are judged as if the lamp were in scope.")
    return ruling.with_notes([note]).with_steps_before(steps)


def _scoped(
    word: VerdictWord,
    flux: Fraction | None,
    shown: str,
    notes: tuple[str, ...],
    steps: tuple[str, ...],
) -> Ruling:
    value = None if flux is None else decimal_of(flux)
    return Ruling(word, value=value, limit=shown, notes=notes, steps=steps)


def _unit_step(
    unit_id: str, figures: dict[str, Fraction], found: bool | None, window: DatedValue
) -> str:
    parts = [_figure_text(name, figures, window) for name in figures]
    return say(
        "Unit {unit}: {figures}: {found}.",
        unit=unit_id,
        figures=joined(", ", parts) if parts else say("nothing measured"),
        found=_FOUND[found],
    )


def _figure_text(name: str, figures: dict[str, Fraction], window: DatedValue) -> str:
    """One figure of a unit, with what it is compared with."""
    figure, number = QUANTITIES[name], figures[name]
    spec = _FORMATS.get(name)
    shown = numeral(format(float(number), spec)) if spec else number_text(number)
    text = joined(" ", (figure.label, with_unit(shown, figure.unit)))
    if name == "y" and "x" in figures:
        lower, upper = window_bounds(figures["x"], window)
        return say(
            "{figure} (window {lower:.5f} to {upper:.5f})",
            figure=text,
            lower=float(lower),
            upper=float(upper),
        )
    if name == _AREA and "luminous_flux_lm" in figures:
        return say(
            "{figure} (flux density {density:.2f} lm/mm², to be below {limit:f} lm/mm²)",
            figure=text,
            density=float(figures["luminous_flux_lm"] / figures[name]),
            limit=window.number("flux_density_below_lm_per_mm2"),
        )
    return text
