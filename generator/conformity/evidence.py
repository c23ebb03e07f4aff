"""What is known of one lamp on one basis: declared, or determined on its units."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction

from generator.conformity.exact_number import (
    decimal_of,
    mean_of,
    number_text,
    square_root,
    uncertainty_text,
)
from generator.language import joined, say, say_counted
from generator.quantities import QUANTITIES
from generator.records.clause_words import number_of, with_unit
from generator.records.figure import GRADE_WORDS, Figure, FigureSet, Grade
from generator.records.lamp import Lamp
from generator.records.verdict import Basis

__all__ = ["Evidence", "LampRecord", "Reading", "missing", "relative_root_sum"]


COUNTED = frozenset({"survival_factor"})
"""Quantities that are counted, so that no uncertainty of measurement stands in the way."""

_LOWEST = say("The lowest unit of {count} is {unit}.")
_HIGHEST = say("The highest unit of {count} is {unit}.")
_UNCERTAIN = say("Determined value {value} ({grade}, {units}, U = {uncertainty}).")
_NOT_CERTAIN = say("Determined value {value} ({grade}, {units}, uncertainty not known).")


@dataclass(frozen=True, slots=True)
class Reading:
    """One value that can be judged.

    Parameters
    ----------
    value
        Exact value, or ``None``; then :attr:`reason` says why.
    expanded_uncertainty
        Expanded uncertainty (k = 2), or ``None`` when not known.
    units_count
        Units behind a determined value.
    grade
        How it is known.
    reason
        Why there is no value.
    shown
        Text that stands for the value where it is not a number (a class letter).
    steps
        How it came about, one sentence a step.
    """

    value: Fraction | None
    expanded_uncertainty: Fraction | None = None
    units_count: int = 0
    grade: Grade = Grade.DECLARED
    reason: str = ""
    shown: str = ""
    steps: tuple[str, ...] = ()


def missing(reason: str) -> Reading:
    """A reading without a value."""
    return Reading(None, reason=reason)


@dataclass(frozen=True, slots=True, eq=False)
class LampRecord:
    """One lamp, its units and all figures."""

    lamp: Lamp
    unit_ids: tuple[str, ...]
    figures: FigureSet


def relative_root_sum(value: Fraction, *inputs: Reading) -> Fraction | None:
    """Expanded uncertainty of a product or quotient of independent inputs.

    Parameters
    ----------
    value
        The product or quotient.
    inputs
        Its factors, none of them zero.

    Returns
    -------
    Fraction or None
        Root sum of the squared relative uncertainties times the value; ``None`` where one of
        them is unknown. Source: jcgm_100, clause 5.1.6.
    """
    total = Fraction(0)
    for item in inputs:
        if item.expanded_uncertainty is None or not item.value:
            return None
        total += (item.expanded_uncertainty / item.value) ** 2
    return square_root(total) * abs(value)


@dataclass(frozen=True, slots=True, eq=False)
class Evidence:
    """The figures of one lamp on one basis.

    Parameters
    ----------
    record
        The lamp with its figures.
    basis
        Which of its figures count.
    """

    record: LampRecord
    basis: Basis

    @property
    def lamp(self) -> Lamp:
        """The lamp."""
        return self.record.lamp

    def catalogue_name(self, quantity: str) -> str:
        """The useful luminous flux of a lamp that is not directional is its luminous flux."""
        if quantity == "useful_luminous_flux_lm" and self.lamp.directional is not True:
            return "luminous_flux_lm"
        return quantity

    def reading(self, quantity: str, statistic: str = "mean") -> Reading:
        """Give the value of a quantity.

        Parameters
        ----------
        quantity
            Catalogue name.
        statistic
            ``mean``, ``lowest unit`` or ``highest unit``; matters on the determined basis.

        Returns
        -------
        Reading
            With a value, or with the reason why there is none.
        """
        name = self.catalogue_name(quantity)
        if self.basis is Basis.DECLARED:
            return self._declared(name)
        if statistic != "mean":
            return self._extreme(name, statistic)
        return self._determined(name)

    def _declared(self, name: str) -> Reading:
        figure = self.record.figures.graded(self.lamp.lamp_id, name, Grade.DECLARED)
        value = figure.number if figure is not None else self.lamp.declared.get(name)
        if value is not None:
            unit = QUANTITIES[name].unit if name in QUANTITIES else ""
            stated = with_unit(number_of(value), unit)
            return Reading(Fraction(value), steps=(say("Declared value {value}.", value=stated),))
        if name == "efficacy_lm_per_w":
            return self._declared_efficacy()
        return missing(say("not declared"))

    def _declared_efficacy(self) -> Reading:
        if self.lamp.directional:
            return missing(
                say("the declared flux of a directional lamp is its useful flux, not all of it")
            )
        flux, power = self.reading("luminous_flux_lm"), self.reading("power_w")
        if flux.value is None or not power.value:
            return missing(say("luminous flux and power are not both declared"))
        value = flux.value / power.value
        step = say(
            "Declared flux over declared power: {efficacy:f} lm/W.", efficacy=decimal_of(value)
        )
        return Reading(value, steps=(*flux.steps, *power.steps, step))

    def _determined(self, name: str) -> Reading:
        figure = self.record.figures.measured(self.lamp.lamp_id, name)
        if figure is not None and figure.number is not None:
            return _reading_of(figure)
        if name == "efficacy_lm_per_w":
            return self.quotient_of_units("luminous_flux_lm", "power_w", Fraction(1))
        return missing(
            figure.reason if figure is not None and figure.reason else say("not measured")
        )

    def unit_readings(self, quantity: str) -> dict[str, Reading]:
        """The measured values of the units that have one."""
        name = self.catalogue_name(quantity)
        found = {}
        for unit_id in self.record.unit_ids:
            figure = self.record.figures.measured(self.lamp.lamp_id, name, unit_id)
            if figure is not None and figure.number is not None:
                found[unit_id] = _reading_of(figure)
        return found

    def quotient_of_units(self, upper: str, lower: str, factor: Fraction) -> Reading:
        """Mean over the units of a quotient taken unit by unit.

        Parameters
        ----------
        upper, lower
            Quantities divided.
        factor
            Factor on every quotient.

        Returns
        -------
        Reading
            The mean of the quotients, not the quotient of the means.
        """
        above, below = self.unit_readings(upper), self.unit_readings(lower)
        both = [unit for unit in above if unit in below and below[unit].value]
        quotients = [
            (above[unit].value or Fraction(0)) / (below[unit].value or Fraction(1)) * factor
            for unit in both
        ]
        value = mean_of(quotients)
        if value is None:
            return missing(self._which_is_missing(upper, lower))
        inputs = self._determined(self.catalogue_name(upper)), self._determined(lower)
        used = [reading for unit in both for reading in (above[unit], below[unit])]
        step = say_counted(
            "Mean of the quotients of {count} unit.",
            "Mean of the quotients of {count} units.",
            len(both),
        )
        return Reading(
            value,
            relative_root_sum(value, *inputs),
            len(both),
            worst_grade(item.grade for item in used),
            steps=(step,),
        )

    def _which_is_missing(self, *quantities: str) -> str:
        names = [self.catalogue_name(name) for name in quantities if not self.unit_readings(name)]
        if not names:
            return say("no unit has both values")
        labels = joined(", ", (QUANTITIES[name].label for name in names))
        return say("not measured: {quantities}", quantities=labels)

    def _extreme(self, name: str, statistic: str) -> Reading:
        units = self.unit_readings(name)
        if not units and name == "efficacy_lm_per_w":
            flux = self.unit_readings("luminous_flux_lm")
            power = self.unit_readings("power_w")
            units = {
                unit: _quotient(flux[unit], power[unit])
                for unit in flux
                if unit in power and power[unit].value
            }
        if not units:
            return missing(say("not measured"))
        lowest = statistic == "lowest unit"
        pick = min if lowest else max
        unit_id, chosen = pick(units.items(), key=lambda pair: pair[1].value or Fraction(0))
        return Reading(
            chosen.value,
            chosen.expanded_uncertainty,
            len(units),
            chosen.grade,
            steps=((_LOWEST if lowest else _HIGHEST).format(count=len(units), unit=unit_id),),
        )


def _quotient(above: Reading, below: Reading) -> Reading:
    value = (above.value or Fraction(0)) / (below.value or Fraction(1))
    grade = worst_grade((above.grade, below.grade))
    return Reading(value, relative_root_sum(value, above, below), 1, grade)


def worst_grade(grades: Iterable[Grade]) -> Grade:
    """Reported where one input is reported, else computed."""
    return Grade.REPORTED if Grade.REPORTED in tuple(grades) else Grade.COMPUTED


def _count_of(figure: Figure, number: Decimal) -> Reading:
    """A share of units that were counted: there is nothing uncertain about it."""
    step = say(
        "Determined value {value} ({grade}, a count of units).",
        value=number_text(Fraction(number)),
        grade=GRADE_WORDS[figure.grade],
    )
    return Reading(Fraction(number), Fraction(0), figure.units_count, figure.grade, steps=(step,))


def _reading_of(figure: Figure) -> Reading:
    number = figure.number
    if number is None:
        return missing(figure.reason or say("not measured"))
    uncertainty = figure.expanded_uncertainty
    if figure.quantity in COUNTED:
        return _count_of(figure, number)
    count = figure.units_count
    return Reading(
        Fraction(number),
        None if uncertainty is None else Fraction(uncertainty),
        count,
        figure.grade,
        steps=(_determined_step(figure, number),),
    )


def _determined_step(figure: Figure, number: Decimal) -> str:
    unit = QUANTITIES[figure.quantity].unit
    said = {
        "value": with_unit(number_text(Fraction(number)), unit),
        "grade": GRADE_WORDS[figure.grade],
        "units": say_counted("one unit", "mean of {count} units", max(1, figure.units_count)),
    }
    if figure.expanded_uncertainty is None:
        return _NOT_CERTAIN.format(**said)
    uncertainty = with_unit(uncertainty_text(Fraction(figure.expanded_uncertainty)), unit)
    return _UNCERTAIN.format(**said, uncertainty=uncertainty)
