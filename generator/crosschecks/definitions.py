"""Values that the definition of their quantity does not allow."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence
from generator.crosschecks.wording import CheckText, number, sourced, worded
from generator.language import say
from generator.quantities import quantity
from generator.records.figure import MEAN, Grade
from generator.records.finding import Finding, Severity

__all__ = ["above_definition"]

_HIGHEST = {
    "ra": Decimal(100),
    **{f"r{i}": Decimal(100) for i in range(1, 16)},
    "rf": Decimal(100),
    "percent_flicker": Decimal(100),
    "flicker_index": Decimal(1),
    "power_factor": Decimal(1),
    "displacement_factor": Decimal(1),
}
_TITLES = {
    "ra": say("General colour rendering index above 100"),
    **{
        f"r{i}": say("Special colour rendering index R{number} above 100", number=i)
        for i in range(1, 16)
    },
    "rf": say("Colour fidelity index above 100"),
    "percent_flicker": say("Percent flicker (modulation depth) above 100"),
    "flicker_index": say("Flicker index above 1"),
    "power_factor": say("Power factor above 1"),
    "displacement_factor": say("Displacement factor above 1"),
}
_COMPARED = {
    Grade.COMPUTED: say("computed {quantity} {value}, by its definition at most {highest}"),
    Grade.REPORTED: say("reported {quantity} {value}, by its definition at most {highest}"),
    Grade.DECLARED: say("declared {quantity} {value}, by its definition at most {highest}"),
}
_DEFINITION_TEXTS = {
    name: CheckText(
        f"{name.replace('_', '-')}-above-{number(highest)}",
        _TITLES[name],
        say(
            "A slip in the value, a percentage in place of a share, or, with light records, a "
            "sensor whose zero is off would explain it."
        ),
        (name,),
        sourced(quantity(name).source, say("definition")),
    )
    for name, highest in _HIGHEST.items()
}


def above_definition(evidence: LampEvidence) -> Iterator[Finding]:
    """Measured and declared values above what their definition allows at all."""
    lamp = evidence.lamp
    for name, highest in _HIGHEST.items():
        found = [
            (unit.unit_id, figure.grade, figure.number)
            for unit in evidence.units
            for figure in evidence.figures.every(lamp.lamp_id, name, unit.unit_id)
            if figure.number is not None
        ]
        if name in lamp.declared:
            found.append((MEAN, Grade.DECLARED, lamp.declared[name]))
        for unit_id, grade, value in found:
            if value > highest:
                yield _DEFINITION_TEXTS[name].finding(
                    lamp.lamp_id,
                    unit_id,
                    Severity.IMPOSSIBLE,
                    _COMPARED[grade].format(
                        quantity=quantity(name).label,
                        value=worded(name, value),
                        highest=worded(name, highest),
                    ),
                    value - highest,
                    quantity(name).unit,
                )
