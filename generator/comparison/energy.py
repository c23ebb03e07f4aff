"""Energy of a year, its saving against the baseline lamp, and the emissions that go with it."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.comparison.cost.basis import LampBasis, cost_inputs, use_numbers
from generator.comparison.cost.formula import energy_per_year_kwh
from generator.language import say
from generator.records.tender import Emissions, EnergyUse
from generator.records.tender_settings import TenderUse

__all__ = ["energy_use", "yearly_energy_kwh"]

NOTES = (
    say("Rebound (longer use or more light once it is cheaper) is not counted."),
    say("Less heat from lamps may raise heating and lower cooling; that is not counted."),
    say("One emission factor is taken for the bid and for the baseline lamp."),
)


def yearly_energy_kwh(basis: LampBasis, use: TenderUse, lamps: int) -> tuple[Decimal, Decimal]:
    """Energy of a year in use and at standby [kWh]; zero lamps where a number is missing."""
    if basis.numbers is None:
        return Decimal(0), Decimal(0)
    return energy_per_year_kwh(cost_inputs(basis.numbers, use_numbers(use), Decimal(lamps)))


def energy_use(
    basis: LampBasis, use: TenderUse, lamps: int, baseline: LampBasis | None, baseline_lamps: int
) -> EnergyUse | None:
    """Energy and emissions of a year.

    Parameters
    ----------
    basis
        The lamp.
    use
        ``[use]`` without gaps.
    lamps
        Number of lamps.
    baseline, baseline_lamps
        The lamp to compare with, and how many of it burn; ``None`` without one.

    Returns
    -------
    EnergyUse or None
        ``None`` where a number of the lamp is missing. Emissions stand for every basis whose
        factor is given. Source: ghg_scope_2, chapter 7 (quoted).
    """
    if basis.numbers is None:
        return None
    in_use, standby = yearly_energy_kwh(basis, use, lamps)
    before = None
    if baseline is not None and baseline.numbers is not None:
        before = sum(yearly_energy_kwh(baseline, use, baseline_lamps), Decimal(0))
    return EnergyUse(
        lamps, in_use, standby, before, tuple(_emissions(in_use + standby, before, use)), NOTES
    )


def _emissions(kwh: Decimal, before: Decimal | None, use: TenderUse) -> Iterator[Emissions]:
    for name, factor in (
        ("location-based", use.location_based),
        ("market-based", use.market_based),
    ):
        if factor is not None:
            tonnes = factor.g_per_kwh / 10**6
            saving = None if before is None else (before - kwh) * tonnes
            yield Emissions(name, factor, kwh * tonnes, saving)
