"""Figures that the law itself defines, for the declared and for the determined basis.

Source: eu_2019_2015, Annex II and Annex V Table 3; eu_2019_2020, Annex II point 1(a).
"""

from __future__ import annotations

from collections.abc import Iterator
from datetime import date
from decimal import Decimal
from fractions import Fraction

from generator.conformity.energy_class import (
    NOT_IN_FORCE,
    energy_class_reading,
    total_mains_efficacy,
)
from generator.conformity.evidence import Evidence, LampRecord, Reading, missing
from generator.conformity.exact_number import decimal_of, rounded
from generator.conformity.limits import Question, chosen_value
from generator.conformity.maximum_power import maximum_power
from generator.errors import LawBookError
from generator.language import say
from generator.records.clause import LawBook
from generator.records.figure import MEAN, Figure, Grade
from generator.records.verdict import Basis

__all__ = ["energy_consumption", "law_figures", "law_reading"]

MAXIMUM_POWER_CLAUSE = "eu-2019-2020-maximum-power"
ENERGY_CONSUMPTION = "eu-2019-2015-energy-consumption"

_METHODS = {
    "total_mains_efficacy_lm_per_w": say("EU 2019/2015 Annex II"),
    "energy_efficiency_class": say("EU 2019/2015 Annex II"),
    "max_power_w": say("EU 2019/2020 Annex II"),
    "energy_kwh_per_1000h": say("EU 2019/2015 Annex V Table 3, rounded up"),
}


_FROM = {
    Basis.DECLARED: say("from declared values, {method}"),
    Basis.DETERMINED: say("from determined values, {method}"),
}


def energy_consumption(evidence: Evidence, law: LawBook, day: date) -> Reading:
    """Energy use in on-mode [kWh/1000 h], rounded up to the next integer.

    Parameters
    ----------
    evidence
        Figures of the lamp on one basis.
    law, day
        The law book and the day.

    Returns
    -------
    Reading
        Numerically the power in watts, rounded up.

    Notes
    -----
    Source: eu_2019_2015, Annex V Table 3.
    """
    try:
        table = law.constant(ENERGY_CONSUMPTION, day)
    except LawBookError:
        return missing(NOT_IN_FORCE.format(day=day))
    power = evidence.reading("power_w")
    if power.value is None:
        return power
    energy = power.value * Fraction(table.number("kwh_per_1000h_per_w"))
    whole = rounded(energy, Fraction(table.number("step_kwh_per_1000h")), "up")
    return Reading(whole, units_count=power.units_count, grade=power.grade)


def _maximum_power(evidence: Evidence, law: LawBook, day: date) -> Reading:
    clause = law.clause(MAXIMUM_POWER_CLAUSE)
    chosen = chosen_value(clause, evidence.record, day)
    if chosen.value is None:
        return missing(chosen.why or chosen.unknown)
    limit = maximum_power(Question(clause, chosen.value, evidence, law, day))
    if limit.limits is None or limit.limits.upper is None:
        return missing(limit.reason)
    inputs = evidence.reading("useful_luminous_flux_lm"), evidence.reading("ra")
    reported = any(item.grade is Grade.REPORTED for item in inputs)
    determined = Grade.REPORTED if reported else Grade.COMPUTED
    return Reading(
        limit.limits.upper,
        limit.expanded_uncertainty,
        min(item.units_count for item in inputs),
        Grade.DECLARED if evidence.basis is Basis.DECLARED else determined,
        steps=limit.steps,
    )


def law_reading(quantity: str, evidence: Evidence, law: LawBook, day: date) -> Reading | None:
    """Give the reading of a quantity that the law defines.

    Parameters
    ----------
    quantity
        Catalogue name.
    evidence
        Figures of the lamp on one basis.
    law, day
        The law book and the day.

    Returns
    -------
    Reading or None
        ``None`` for a quantity that is not defined by the law.
    """
    if quantity == "total_mains_efficacy_lm_per_w":
        return total_mains_efficacy(evidence, law, day)
    if quantity == "energy_efficiency_class":
        return energy_class_reading(evidence, law, day)
    if quantity == "max_power_w":
        return _maximum_power(evidence, law, day)
    if quantity == "energy_kwh_per_1000h":
        return energy_consumption(evidence, law, day)
    return None


def law_figures(record: LampRecord, law: LawBook, day: date) -> Iterator[Figure]:
    """Figures that the law defines, for one lamp.

    Parameters
    ----------
    record
        The lamp with its figures.
    law, day
        The law book and the day.

    Yields
    ------
    Figure
        Each quantity on each basis, with its value or the reason why there is none.
    """
    for basis in Basis:
        evidence = Evidence(record, basis)
        for quantity, method in _METHODS.items():
            reading = law_reading(quantity, evidence, law, day)
            if reading is not None:
                yield _figure(record, basis, quantity, method, reading)


def _figure(
    record: LampRecord, basis: Basis, quantity: str, method: str, reading: Reading
) -> Figure:
    value: Decimal | str | None = reading.shown or None
    if value is None and reading.value is not None:
        value = decimal_of(reading.value)
    declared = basis is Basis.DECLARED
    grade = Grade.DECLARED if declared else reading.grade
    if not declared and grade is Grade.DECLARED:
        grade = Grade.COMPUTED
    uncertain = reading.expanded_uncertainty
    numeric = isinstance(value, Decimal) and not declared and uncertain is not None
    return Figure(
        lamp_id=record.lamp.lamp_id,
        unit_id=MEAN,
        quantity=quantity,
        value=value,
        grade=grade,
        method=_FROM[basis].format(method=method),
        expanded_uncertainty=decimal_of(uncertain) if numeric and uncertain is not None else None,
        units_count=1 if declared else max(1, reading.units_count),
        reason="" if value is not None else reading.reason,
        remarks=reading.steps if value is not None else (),
    )
