"""Figures that stand ready-made in the campaign: reported per unit, declared per lamp."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.records.campaign import Campaign
from generator.records.figure import MEAN, Figure, Grade
from generator.records.lamp import Lamp

__all__ = ["declared_figures", "reported_figures"]

_COLUMNS = {
    "useful_luminous_flux_lm": "declared_luminous_flux_lm",
    "sdcm": "declared_colour_consistency_sdcm",
    "energy_efficiency_class": "declared_energy_class",
    "light_emitting_area_mm2": "light_emitting_area_mm2",
    "length_mm": "length_mm",
}


def reported_figures(campaign: Campaign) -> Iterator[Figure]:
    """Figures of ``units.csv`` as the laboratory reports them, exact as written.

    Parameters
    ----------
    campaign
        The campaign.

    Yields
    ------
    Figure
        Grade reported, with the uncertainty of the ``u_`` column where there is one.
    """
    file = _named(campaign, "units.csv")
    for unit in campaign.units:
        for quantity, value in unit.reported.items():
            yield Figure(
                unit.lamp_id,
                unit.unit_id,
                quantity,
                value,
                Grade.REPORTED,
                quantity,
                expanded_uncertainty=unit.expanded_uncertainty.get(quantity),
                origin=(f"{file}, row {unit.row}, column {quantity}",),
            )


def declared_figures(campaign: Campaign, lamp: Lamp) -> Iterator[Figure]:
    """Figures of ``lamps.csv`` as the supplier declares them, exact as written.

    Parameters
    ----------
    campaign, lamp
        The campaign, and the lamp in it.

    Yields
    ------
    Figure
        Grade declared, without uncertainty; they stand for the model, not for units.
    """
    file = _named(campaign, "lamps.csv")
    values: dict[str, Decimal | str] = dict(lamp.declared)
    if lamp.declared_energy_class is not None:
        values["energy_efficiency_class"] = lamp.declared_energy_class
    for quantity, value in values.items():
        column = _COLUMNS.get(quantity, f"declared_{quantity}")
        yield Figure(
            lamp.lamp_id,
            MEAN,
            quantity,
            value,
            Grade.DECLARED,
            column,
            units_count=0,
            origin=(f"{file}, row {lamp.row}, column {column}",),
        )


def _named(campaign: Campaign, name: str) -> str:
    """The file as it lies in the campaign, compressed or not."""
    paths = {item.path for item in campaign.files}
    return f"{name}.gz" if f"{name}.gz" in paths else name
