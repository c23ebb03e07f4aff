"""Values that the definition of their quantity does not allow."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence
from generator.crosschecks.wording import CheckText, number, worded
from generator.quantities import quantity
from generator.records.figure import MEAN
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
_DEFINITION_TEXTS = {
    name: CheckText(
        f"{name.replace('_', '-')}-above-{number(highest)}",
        f"{quantity(name).label[0].upper()}{quantity(name).label[1:]} above {number(highest)}",
        "A slip in the value, a percentage in place of a share, or, with light records, a sensor "
        "whose zero is off would explain it.",
        (name,),
        f"{quantity(name).source}, definition",
    )
    for name, highest in _HIGHEST.items()
}


def above_definition(evidence: LampEvidence) -> Iterator[Finding]:
    """Measured and declared values above what their definition allows at all."""
    lamp = evidence.lamp
    for name, highest in _HIGHEST.items():
        found = [
            (unit.unit_id, figure.grade.value, figure.number)
            for unit in evidence.units
            for figure in evidence.figures.every(lamp.lamp_id, name, unit.unit_id)
            if figure.number is not None
        ]
        if name in lamp.declared:
            found.append((MEAN, "declared", lamp.declared[name]))
        for unit_id, grade, value in found:
            if value > highest:
                yield _DEFINITION_TEXTS[name].finding(
                    lamp.lamp_id,
                    unit_id,
                    Severity.IMPOSSIBLE,
                    f"{grade} {quantity(name).label} {worded(name, value)}, by its definition at "
                    f"most {worded(name, highest)}",
                    value - highest,
                    quantity(name).unit,
                )
