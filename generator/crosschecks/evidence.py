"""What the checks of one lamp look at: the lamp, its units, its figures, its supply."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from decimal import Decimal

from generator.crosschecks.significance import Reading, compared, reading
from generator.crosschecks.tolerances import tolerance
from generator.crosschecks.wording import CheckText, worded
from generator.language import Message, say
from generator.quantities import quantity
from generator.records.campaign import Campaign
from generator.records.figure import MEAN, Figure, FigureSet, Grade
from generator.records.finding import Finding
from generator.records.lamp import Lamp, Unit
from generator.records.raw import EnduranceReading, LightRecord

__all__ = ["LampEvidence", "computed_against_reported", "gathered"]

_ZONAL = "zonal_flux"
"""How methods that integrate intensities begin."""


@dataclass(frozen=True, slots=True, eq=False)
class LampEvidence:
    """Everything known of one lamp that a check may ask for.

    Parameters
    ----------
    lamp, units
        The lamp and its units.
    figures
        All figures of the campaign.
    supply_voltage_v, supply_frequency_hz
        Nominal supply of the campaign [V], [Hz]; ``None`` where not given.
    assessment_date
        Date of the assessment as the campaign gives it, or ``None``.
    light
        Light records of the lamp.
    endurance
        Readings of its ageing test.
    """

    lamp: Lamp
    units: tuple[Unit, ...]
    figures: FigureSet
    supply_voltage_v: Decimal | None = None
    supply_frequency_hz: Decimal | None = None
    assessment_date: date | None = None
    light: tuple[LightRecord, ...] = ()
    endurance: tuple[EnduranceReading, ...] = ()

    def figure(self, unit: Unit, name: str, grade: Grade) -> Figure | None:
        """One figure of one unit in one grade."""
        return self.figures.graded(self.lamp.lamp_id, name, grade, unit.unit_id)

    def computed(self, unit: Unit, name: str, *, zonal: bool | None = None) -> Reading | None:
        """The computed value; by zonal integration of intensities, not by it, or in any way."""
        for figure in self.figures.every(self.lamp.lamp_id, name, unit.unit_id):
            wanted = zonal is None or figure.method.startswith(_ZONAL) is zonal
            if figure.grade is Grade.COMPUTED and wanted:
                return reading(figure)
        return None

    def reported(self, unit: Unit, name: str) -> Reading | None:
        """The reported value of one unit, other than zero."""
        return _other_than_zero(reading(self.figure(unit, name, Grade.REPORTED)))

    def measured(self, unit: Unit, name: str) -> Reading | None:
        """The computed value of one unit, else the reported one."""
        return reading(self.figures.measured(self.lamp.lamp_id, name, unit.unit_id))

    def measured_mean(self, name: str) -> Reading | None:
        """The mean over the units, computed before reported; ``None`` where there is none."""
        return reading(self.figures.measured(self.lamp.lamp_id, name, MEAN))


def _other_than_zero(item: Reading | None) -> Reading | None:
    return item if item is not None and item.value else None


def gathered(campaign: Campaign, figures: FigureSet) -> tuple[LampEvidence, ...]:
    """Sort a campaign by lamps.

    Parameters
    ----------
    campaign
        The campaign.
    figures
        Its figures.

    Returns
    -------
    tuple of LampEvidence
        One per lamp, in the order of the campaign.
    """
    units: dict[str, list[Unit]] = {}
    for unit in campaign.units:
        units.setdefault(unit.lamp_id, []).append(unit)
    light: dict[str, list[LightRecord]] = {}
    for record in campaign.light:
        light.setdefault(record.lamp_id, []).append(record)
    endurance: dict[str, list[EnduranceReading]] = {}
    for row in campaign.endurance:
        endurance.setdefault(row.lamp_id, []).append(row)
    supply = campaign.settings.supply
    return tuple(
        LampEvidence(
            lamp=lamp,
            units=tuple(units.get(lamp.lamp_id, ())),
            figures=figures,
            supply_voltage_v=supply.voltage_v,
            supply_frequency_hz=supply.frequency_hz,
            assessment_date=campaign.settings.campaign.assessment_date,
            light=tuple(light.get(lamp.lamp_id, ())),
            endurance=tuple(endurance.get(lamp.lamp_id, ())),
        )
        for lamp in campaign.lamps
    )


def computed_against_reported(
    evidence: LampEvidence,
    text: CheckText,
    name: str,
    origin: Message,
    *,
    zonal: bool | None = None,
) -> Iterator[Finding]:
    """Hold the computed value of one quantity against the reported one, unit by unit.

    Parameters
    ----------
    evidence
        The lamp.
    text
        What the check says.
    name
        The quantity.
    origin
        What the value was computed from, in words with a place ``{computed}`` for it.
    zonal
        Whether the value sought is that of zonal integration; ``None`` for either.

    Yields
    ------
    Finding
        One per unit whose values differ by more than is allowed.
    """
    unit_of_quantity = quantity(name).unit
    for unit in evidence.units:
        reported = reading(evidence.figure(unit, name, Grade.REPORTED))
        computed = evidence.computed(unit, name, zonal=zonal)
        if reported is None or computed is None:
            continue
        outcome = compared(reported, computed, tolerance(name))
        if outcome.severity is not None:
            yield text.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "{quantity} reported as {reported}, {origin}; {outcome}",
                    quantity=quantity(name).label,
                    reported=worded(name, reported.value),
                    origin=origin.format(computed=worded(name, computed.value)),
                    outcome=outcome.words(unit_of_quantity),
                ),
                outcome.deviation,
                unit_of_quantity,
            )
