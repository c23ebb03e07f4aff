"""Figures of one raw record alone, outside any campaign."""

from __future__ import annotations

from math import isfinite
from typing import Any

from generator.quantities import QUANTITIES
from generator.records.figure import SeriesFigures, exact
from generator.records.raw import LightRecord, MainsCapture, SpectrumSet

__all__ = ["named_figures", "record_figures"]


def record_figures(record: SpectrumSet | LightRecord | MainsCapture) -> SeriesFigures:
    """Every figure that one raw record gives.

    Parameters
    ----------
    record
        Spectra, light record or mains capture.

    Returns
    -------
    SeriesFigures
        One entry per series of the record.
    """
    if isinstance(record, SpectrumSet):
        from generator.metrics.colour import spectral_figures

        return spectral_figures(record.wavelength_nm, record.values, absolute=record.unit == "W/nm")
    if isinstance(record, LightRecord):
        from generator.metrics.modulation import light_figures

        return light_figures(record.values, record.sampling_rate_hz)
    from generator.metrics.electrical import mains_figures

    return mains_figures(
        record.voltage_v[None, :], record.current_a[None, :], record.sampling_rate_hz
    )


def named_figures(names: tuple[str, ...], found: SeriesFigures) -> list[dict[str, Any]]:
    """The figures series by series, in the order of the catalogue.

    Parameters
    ----------
    names
        Names of the series.
    found
        Their figures.

    Returns
    -------
    list of dict
        ``name``; ``figures``, quantity -> number or ``None``; ``reasons``, quantity -> why a
        figure is ``None``; ``remarks`` on the record.
    """
    ordered = [name for name in QUANTITIES if name in found.values]
    result = []
    for place, name in enumerate(names):
        numbers = {quantity: float(found.values[quantity][place]) for quantity in ordered}
        given = {key: float(exact(value)) for key, value in numbers.items() if isfinite(value)}
        result.append(
            {
                "name": name,
                "figures": {key: given.get(key) for key in ordered},
                "reasons": {key: found.reason(key, place) for key in ordered if key not in given},
                "remarks": list(found.remarks[place]) if found.remarks else [],
            }
        )
    return result
