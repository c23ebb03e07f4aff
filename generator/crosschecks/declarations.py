"""What the supplier declares, against what every unit shows."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence
from generator.crosschecks.significance import Reading, half_digit
from generator.crosschecks.tolerances import tolerance
from generator.crosschecks.wording import CheckText, number, sourced, with_unit, worded
from generator.language import say, say_counted
from generator.quantities import quantity
from generator.records.figure import MEAN, Grade
from generator.records.finding import Finding, Severity

__all__ = ["class_against_determined", "declared_better_than_every_unit"]

_CLASS = "energy_efficiency_class"

_HIGHER_IS_BETTER = {
    "luminous_flux_lm": True,
    "useful_luminous_flux_lm": True,
    "ra": True,
    "r9": True,
    "displacement_factor": True,
    "power_w": False,
    "standby_power_w": False,
    "networked_standby_power_w": False,
    "pst_lm": False,
    "svm": False,
    "sdcm": False,
}
_BETTER_TEXTS = {
    name: CheckText(
        f"{name.replace('_', '-')}-declared-better-than-every-unit",
        say("Declared {quantity} better than that of every unit", quantity=quantity(name).label),
        say(
            "A declaration that rests on other samples, an earlier batch or a calculation, or a "
            "tolerance for market surveillance used to set the declared value."
        ),
        (name,),
        sourced(
            "eu_2019_2020",
            say("Annex IV (declared values not more favourable than the test results)"),
        ),
    )
    for name in _HIGHER_IS_BETTER
}
_CLASS_TEXT = CheckText(
    "class-declared-against-determined",
    say("Declared energy class is not the class of the values"),
    say(
        "A class of an earlier label scale, of another model of the family, or of values that were "
        "declared elsewhere would explain it."
    ),
    (_CLASS,),
    sourced("eu_2019_2015", say("Annex II")),
)


def _severity(units: int, gap: Decimal, nearest: Reading) -> Severity | None:
    """By how many units there are, and whether the gap exceeds the uncertainty of the nearest."""
    if nearest.expanded is not None and gap > nearest.expanded:
        return Severity.CONTRADICTION
    if units >= tolerance("least_units_for_doubt").value:
        return Severity.DOUBT
    return Severity.REMARK if units > 1 else None


def declared_better_than_every_unit(evidence: LampEvidence) -> Iterator[Finding]:
    """Declared values on the favourable side of every measured unit, rounding set aside."""
    for name, higher in _HIGHER_IS_BETTER.items():
        declared = evidence.lamp.declared.get(name)
        found = [item for unit in evidence.units if (item := evidence.measured(unit, name))]
        if declared is None or not found:
            continue
        sign = 1 if higher else -1
        nearest = max(found, key=lambda item: sign * item.value)
        gap = sign * (declared - nearest.value) - half_digit(declared) - nearest.rounding
        severity = _severity(len(found), gap, nearest) if gap > 0 else None
        if severity is not None:
            unit = quantity(name).unit
            deviation = declared - nearest.value
            known = (
                say(
                    "expanded uncertainty {expanded}",
                    expanded=with_unit(number(nearest.expanded, 3), unit),
                )
                if nearest.expanded is not None
                else say("expanded uncertainty not given")
            )
            yield _BETTER_TEXTS[name].finding(
                evidence.lamp.lamp_id,
                MEAN,
                severity,
                say_counted(
                    "{quantity} declared as {declared}, best of {count} measured unit {best} "
                    "({uncertainty}); difference {difference}",
                    "{quantity} declared as {declared}, best of {count} measured units {best} "
                    "({uncertainty}); difference {difference}",
                    len(found),
                    quantity=quantity(name).label,
                    declared=worded(name, declared),
                    best=worded(name, nearest.value),
                    uncertainty=known,
                    difference=with_unit(number(deviation, 3, signed=True), unit),
                ),
                deviation,
                unit,
            )


def class_against_determined(evidence: LampEvidence) -> Iterator[Finding]:
    """Declared energy class against the class that the figures lead to."""
    declared = evidence.lamp.declared_energy_class
    figure = evidence.figures.graded(evidence.lamp.lamp_id, _CLASS, Grade.COMPUTED, MEAN)
    if declared is None or figure is None or not isinstance(figure.value, str):
        return
    letter = declared.strip().upper()
    steps = ord(figure.value[0]) - ord(letter[0]) if letter else 0
    if steps:
        yield _CLASS_TEXT.finding(
            evidence.lamp.lamp_id,
            MEAN,
            Severity.CONTRADICTION if steps > 0 else Severity.REMARK,
            say(
                "energy efficiency class declared as {declared}, class of the values "
                "{determined}; {distance}",
                declared=letter,
                determined=figure.value,
                distance=(
                    say_counted("{count} class better", "{count} classes better", steps)
                    if steps > 0
                    else say_counted("{count} class worse", "{count} classes worse", -steps)
                ),
            ),
            Decimal(steps),
            say("classes"),
        )
