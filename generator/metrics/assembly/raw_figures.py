"""Figures computed from the raw files of a campaign, one batch per grid over all lamps."""

from __future__ import annotations

from collections.abc import Callable, Collection, Hashable, Iterable, Iterator, Sequence
from dataclasses import dataclass
from decimal import Decimal
from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from generator.language import Message, say
from generator.metrics.ageing import AgeingFigures, ageing_figures
from generator.metrics.assembly.raw_uncertainty import (
    with_ageing_uncertainty,
    with_intensity_uncertainty,
    with_light_uncertainty,
    with_mains_uncertainty,
    with_spectral_uncertainty,
)
from generator.metrics.assembly.stated_uncertainty import Stated, uncertainty_of_spectra
from generator.metrics.colour import REFERENCE_OF_RA, spectral_figures
from generator.metrics.electrical import mains_figures
from generator.metrics.modulation import (
    DARK_FLICKER,
    NOISE_IN_FLICKER,
    NOISE_IN_PST_LM,
    NOISE_IN_SVM,
    SHORT_FOR_PST_LM,
    SHORT_RECORD,
    SPARSE_RECORD,
    light_figures,
)
from generator.quantities import quantity as catalogue_entry
from generator.records.campaign import Campaign
from generator.records.figure import MEAN, Figure, Grade, SeriesFigures, exact
from generator.records.raw import EnduranceReading, LightRecord

__all__ = ["ageing_of", "computed_figures", "grouped"]

Array = NDArray[np.float64]
Item = TypeVar("Item")

_SAMPLES_AT_ONCE = 4_000_000
_LONG_RECORD = ("pst_lm",)
_UNEXPLAINED = say("this record does not give it")
_FLOOR_DECIMALS = 12
_REMARKS_OF_GROUPS = {remark.singular: "rendering" for remark in REFERENCE_OF_RA.values()}
_REMARKS_OF_QUANTITIES = {
    NOISE_IN_FLICKER.singular: "percent_flicker",
    DARK_FLICKER.singular: "percent_flicker",
    NOISE_IN_SVM.singular: "svm",
    NOISE_IN_PST_LM.singular: "pst_lm",
    SHORT_FOR_PST_LM.singular: "pst_lm",
}
_NOT_OF_PST_LM = {SPARSE_RECORD.singular, SHORT_RECORD.singular}
_LAMP_AGEING = ("survival_factor", "l70_projected_h")


@dataclass(frozen=True, slots=True, eq=False)
class _Series:
    """One series of a batch: whose it is, where it stands, and its samples."""

    lamp_id: str
    unit_id: str
    origin: str
    samples: tuple[Array, ...]


def computed_figures(campaign: Campaign, stated: Stated) -> list[Figure]:
    """Every figure the raw files give, per unit; those of a whole ageing test per lamp.

    Parameters
    ----------
    campaign
        The campaign.
    stated
        Stated uncertainties, from which those of the figures follow.

    Returns
    -------
    list of Figure
        Grade computed. Where two files give the same figure, the one to use comes first:
        spectra before intensity distributions, long light records before short ones.
    """
    return [
        *_spectra(campaign),
        *_light(campaign),
        *_mains(campaign, stated),
        *_intensity(campaign, stated),
        *_endurance(campaign),
    ]


def grouped(items: Iterable[Item], key: Callable[[Item], Hashable]) -> dict[Hashable, list[Item]]:
    """Group items that can be computed together, in order of first appearance."""
    groups: dict[Hashable, list[Item]] = {}
    for item in items:
        groups.setdefault(key(item), []).append(item)
    return groups


def ageing_of(campaign: Campaign) -> dict[str, AgeingFigures]:
    """Ageing figures and curve of every lamp in an ageing test.

    Parameters
    ----------
    campaign
        The campaign.

    Returns
    -------
    dict
        ``lamp_id`` -> figures with the curve for drawing, in the order of the readings.
    """
    tests = grouped(campaign.endurance, lambda reading: reading.lamp_id)
    return {str(lamp_id): ageing_figures(*_ageing_table(rows)) for lamp_id, rows in tests.items()}


def _spectra(campaign: Campaign) -> Iterator[Figure]:
    sets = grouped(campaign.spectra, lambda item: (item.wavelength_nm.tobytes(), item.unit))
    for alike in sets.values():
        series = [
            _Series(item.lamp_id, unit_id, f"{item.file}, column {unit_id}", (row,))
            for item in alike
            for unit_id, row in zip(item.unit_ids, item.values, strict=True)
        ]
        absolute = alike[0].unit == "W/nm"
        wavelength = alike[0].wavelength_nm
        known = uncertainty_of_spectra(campaign.settings, alike)
        for chunk in _chunks(series):
            found = spectral_figures(wavelength, _stack(chunk), absolute=absolute)
            found = with_spectral_uncertainty(found, known, [item.lamp_id for item in chunk])
            yield from _as_figures(chunk, found)


def _light(campaign: Campaign) -> Iterator[Figure]:
    frequency = campaign.settings.supply.frequency_hz
    mains_hz = None if frequency is None else float(frequency)

    def kind(item: LightRecord) -> tuple[bool, int, float]:
        return not item.long, item.values.shape[1], item.sampling_rate_hz

    with_long = {item.lamp_id for item in campaign.light if item.long}
    for (short, _, rate), alike in sorted(
        ((kind(group[0]), group) for group in grouped(campaign.light, kind).values()),
        key=lambda pair: pair[0],
    ):
        series = [
            _Series(item.lamp_id, unit_id, f"{item.file}, column {unit_id}", (row,))
            for item in alike
            for unit_id, row in zip(item.unit_ids, item.values, strict=True)
        ]
        for chunk in _chunks(series):
            light = _stack(chunk)
            found = with_light_uncertainty(
                light_figures(light, rate, mains_frequency_hz=mains_hz),
                light,
                rate,
                campaign.settings,
                tuple(item.lamp_id for item in chunk),
                long=not short,
            )
            for figure in _as_figures(chunk, found):
                from_long = figure.quantity in _LONG_RECORD
                if from_long != short or (short and figure.lamp_id not in with_long):
                    yield figure


def _mains(campaign: Campaign, stated: Stated) -> Iterator[Figure]:
    lamp_of = {unit.unit_id: unit.lamp_id for unit in campaign.units}
    for alike in grouped(
        campaign.mains, lambda item: (item.voltage_v.size, item.sampling_rate_hz)
    ).values():
        series = [
            _Series(
                lamp_of[item.unit_id], item.unit_id, item.file, (item.voltage_v, item.current_a)
            )
            for item in alike
        ]
        for chunk in _chunks(series):
            found = mains_figures(_stack(chunk, 0), _stack(chunk, 1), alike[0].sampling_rate_hz)
            units = [item.unit_id for item in chunk]
            found = with_mains_uncertainty(found, campaign.settings, stated, units)
            yield from _as_figures(chunk, found)


def _intensity(campaign: Campaign, stated: Stated) -> Iterator[Figure]:
    lamp_of = {unit.unit_id: unit.lamp_id for unit in campaign.units}
    for alike in grouped(
        campaign.intensity, lambda item: (item.c_deg.tobytes(), item.gamma_deg.tobytes())
    ).values():
        series = [
            _Series(lamp_of[item.unit_id], item.unit_id, item.file, (item.intensity_cd,))
            for item in alike
        ]
        found = with_intensity_uncertainty(alike, campaign.settings, stated)
        yield from _as_figures(series, found)


def _endurance(campaign: Campaign) -> Iterator[Figure]:
    tests = grouped(campaign.endurance, lambda reading: reading.lamp_id)
    for lamp_id, found in ageing_of(campaign).items():
        rows = tests[lamp_id]
        units = _in_order(reading.unit_id for reading in rows)
        series = [_Series(lamp_id, unit, _rows_of(rows, unit), ()) for unit in units]
        yield from _as_figures(series, with_ageing_uncertainty(found.units, campaign.settings))
        whole = [_Series(lamp_id, MEAN, _rows_of(rows, None), ())]
        yield from _as_figures(whole, found.lamp, _LAMP_AGEING, units_count=len(units))


def _ageing_table(rows: Sequence[EnduranceReading]) -> tuple[Array, Array, Array, Array, Array]:
    """Hours, flux, state and chromaticity of one lamp's test as tables over units and hours."""
    hours = sorted({row.hours_h for row in rows})
    units = _in_order(row.unit_id for row in rows)
    flux, state, x, y = np.full((4, len(units), len(hours)), np.nan)
    place = {hour: index for index, hour in enumerate(hours)}
    of_unit = {unit: index for index, unit in enumerate(units)}
    for row in rows:
        at = of_unit[row.unit_id], place[row.hours_h]
        state[at] = float(row.operational)
        for table, number in ((flux, row.luminous_flux_lm), (x, row.x), (y, row.y)):
            if number is not None:
                table[at] = float(number)
    return np.array([float(hour) for hour in hours]), flux, state, x, y


def _rows_of(rows: Iterable[EnduranceReading], unit_id: str | None) -> str:
    numbers = sorted(row.row for row in rows if unit_id in (None, row.unit_id))
    return f"endurance.csv, rows {numbers[0]} to {numbers[-1]}"


def _in_order(names: Iterable[str]) -> list[str]:
    return list(dict.fromkeys(names))


def _stack(series: Sequence[_Series], which: int = 0) -> Array:
    return np.stack([item.samples[which] for item in series])


def _chunks(series: Sequence[_Series]) -> Iterator[Sequence[_Series]]:
    """Cut a batch so that long records do not fill the memory."""
    size = max(_SAMPLES_AT_ONCE // series[0].samples[0].size, 1)
    for start in range(0, len(series), size):
        yield series[start : start + size]


def _as_figures(
    series: Sequence[_Series],
    found: SeriesFigures,
    quantities: Collection[str] | None = None,
    units_count: int = 1,
) -> Iterator[Figure]:
    for index, item in enumerate(series):
        texts = found.remarks[index] if found.remarks else ()
        for quantity, numbers in found.values.items():
            if quantities is not None and quantity not in quantities:
                continue
            number = float(numbers[index])
            reason = found.reason(quantity, index)
            given = bool(np.isfinite(number)) and not reason
            known = found.expanded_uncertainty.get(quantity)
            wide = float(known[index]) if known is not None and given else 0.0
            yield Figure(
                item.lamp_id,
                item.unit_id,
                quantity,
                _settled(number) if given else None,
                Grade.COMPUTED,
                found.methods.get(quantity, ""),
                expanded_uncertainty=exact(wide) if np.isfinite(wide) and wide > 0 else None,
                units_count=units_count,
                reason="" if given else reason or _UNEXPLAINED,
                origin=(item.origin,),
                remarks=tuple(text for text in texts if _bears_on(text, quantity)),
            )


def _settled(number: float) -> Decimal:
    """The decimal of a figure; what lies below any measurement is zero on every processor."""
    return exact(round(number, _FLOOR_DECIMALS) + 0.0)


def _bears_on(remark: str, quantity: str) -> bool:
    """Whether a remark on a record is to be read with a figure; most bear on all."""
    key = remark.singular if isinstance(remark, Message) else ""
    if key in _REMARKS_OF_GROUPS:
        return catalogue_entry(quantity).group == _REMARKS_OF_GROUPS[key]
    if key in _REMARKS_OF_QUANTITIES:
        return quantity == _REMARKS_OF_QUANTITIES[key]
    return quantity not in _LONG_RECORD or key not in _NOT_OF_PST_LM
