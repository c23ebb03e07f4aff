"""How near curves of many lamps come to one another, whatever their scale.

The smallest RMS difference between any unit of one lamp and any unit of another comes from one
matrix product per block of rows; nothing is compared pair by pair.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.language import say
from generator.records.campaign import Campaign

__all__ = [
    "CurveTable",
    "closest",
    "light_tables",
    "mains_tables",
    "nearest_units",
    "spectrum_table",
]

Array = NDArray[np.float64]
Row = tuple[str, str, Array]

_GRID_NM = np.arange(400.0, 701.0, 5.0)
_SAMPLES = 512
_BLOCK = 1024


@dataclass(frozen=True, slots=True, eq=False)
class CurveTable:
    """Curves of many units on one scale.

    Parameters
    ----------
    lamp_ids
        Lamps, in the order of the campaign (lamps,).
    starts
        Row of the first curve of each lamp (lamps,).
    unit_ids
        One per curve (curves,).
    curves
        Curves, free of their scale (curves, points).
    points
        What was compared, in words.
    """

    lamp_ids: tuple[str, ...]
    starts: NDArray[np.intp]
    unit_ids: tuple[str, ...]
    curves: Array
    points: str

    def rows(self, lamp: int) -> slice:
        """Rows of one lamp, by its place."""
        end = self.starts[lamp + 1] if lamp + 1 < len(self.starts) else len(self.unit_ids)
        return slice(int(self.starts[lamp]), int(end))


def _table(campaign: Campaign, found: Iterable[Row], points: str) -> CurveTable | None:
    """Stack curves lamp by lamp; those without content are left out."""
    order = {lamp.lamp_id: place for place, lamp in enumerate(campaign.lamps)}
    kept = [row for row in found if row[0] in order and float(row[2] @ row[2]) > 0.0]
    if not kept:
        return None
    kept.sort(key=lambda row: order[row[0]])
    places = np.array([order[lamp] for lamp, _, _ in kept])
    starts = np.flatnonzero(np.diff(places, prepend=-1))
    lamp_ids = tuple(kept[start][0] for start in starts.tolist())
    units = tuple(unit for _, unit, _ in kept)
    return CurveTable(lamp_ids, starts, units, np.stack([row for _, _, row in kept]), points)


def _unit_norm(rows: Array) -> Array:
    norm = np.linalg.norm(rows, axis=-1, keepdims=True)
    result: Array = np.divide(rows, norm, out=np.zeros_like(rows), where=norm > 0)
    return result


def spectrum_table(campaign: Campaign) -> CurveTable | None:
    """Spectra from 400 nm to 700 nm in steps of 5 nm, each of unit norm.

    Parameters
    ----------
    campaign
        The campaign.

    Returns
    -------
    CurveTable or None
        ``None`` where no spectrum covers the range.
    """
    found: list[Row] = []
    for spectra in campaign.spectra:
        scale = spectra.wavelength_nm
        if scale[0] <= _GRID_NM[0] and scale[-1] >= _GRID_NM[-1]:
            rows = np.stack([np.interp(_GRID_NM, scale, row) for row in spectra.values])
            found += [
                (spectra.lamp_id, unit, row)
                for unit, row in zip(spectra.unit_ids, _unit_norm(rows), strict=True)
            ]
    return _table(
        campaign, found, say("{points} wavelengths from 400 nm to 700 nm", points=_GRID_NM.size)
    )


def _tables(
    campaign: Campaign, groups: dict[tuple[float, int, bool], list[Row]]
) -> Iterator[CurveTable]:
    for (rate_hz, samples, _), found in groups.items():
        points = say(
            "{points} of {samples} samples at {rate:g} Hz",
            points=min(_SAMPLES, samples),
            samples=samples,
            rate=rate_hz,
        )
        table = _table(campaign, found, points)
        if table is not None:
            yield table


def _thinned(values: Array) -> Array:
    """Samples spread evenly over the records (..., samples)."""
    last = values.shape[-1] - 1
    places = np.linspace(0, last, min(_SAMPLES, last + 1)).astype(np.intp)
    thinned: Array = values[..., places]
    return thinned


def light_tables(campaign: Campaign) -> Iterator[CurveTable]:
    """Light records of one sampling rate and length: light less its mean, relative to the mean.

    Parameters
    ----------
    campaign
        The campaign.

    Yields
    ------
    CurveTable
        One per rate and length; records without any modulation or noise are left out.
    """
    groups: dict[tuple[float, int, bool], list[Row]] = {}
    for record in campaign.light:
        mean = record.values.mean(axis=1, keepdims=True)
        relative = np.zeros((len(record.unit_ids), min(_SAMPLES, record.values.shape[1])))
        np.divide(_thinned(record.values), mean, out=relative, where=mean > 0)
        relative[mean[:, 0] > 0] -= 1.0
        relative[np.abs(relative) < np.finfo(np.float64).eps * 8] = 0.0
        key = (record.sampling_rate_hz, record.values.shape[1], record.long)
        groups.setdefault(key, []).extend(
            (record.lamp_id, unit, row) for unit, row in zip(record.unit_ids, relative, strict=True)
        )
    yield from _tables(campaign, groups)


def mains_tables(campaign: Campaign) -> Iterator[CurveTable]:
    """Currents of mains captures of one sampling rate and length, each of unit norm.

    Parameters
    ----------
    campaign
        The campaign.

    Yields
    ------
    CurveTable
        One per rate and length.
    """
    lamp_of = {unit.unit_id: unit.lamp_id for unit in campaign.units}
    groups: dict[tuple[float, int, bool], list[Row]] = {}
    for capture in campaign.mains:
        if capture.unit_id in lamp_of:
            key = (capture.sampling_rate_hz, capture.current_a.size, False)
            row = _unit_norm(_thinned(capture.current_a))
            groups.setdefault(key, []).append((lamp_of[capture.unit_id], capture.unit_id, row))
    yield from _tables(campaign, groups)


def _distance(rows: Array, columns: Array) -> Array:
    """RMS difference relative to the larger RMS of the two (rows, columns)."""
    row_power = np.einsum("ij,ij->i", rows, rows)[:, None]
    column_power = np.einsum("ij,ij->i", columns, columns)[None, :]
    squared = row_power + column_power - 2.0 * (rows @ columns.T)
    distance: Array = np.sqrt(np.maximum(squared, 0.0) / np.maximum(row_power, column_power))
    return distance


def closest(table: CurveTable) -> Array:
    """Smallest difference between any two units of any two lamps.

    Parameters
    ----------
    table
        Curves of many units.

    Returns
    -------
    NDArray
        RMS difference relative to the larger RMS [1] (lamps, lamps); on the diagonal between
        different units of one lamp, infinite where it has only one.
    """
    curves = table.curves
    blocks = []
    for start in range(0, len(curves), _BLOCK):
        distance = _distance(curves[start : start + _BLOCK], curves)
        own = np.arange(len(distance))
        distance[own, start + own] = np.inf
        blocks.append(np.minimum.reduceat(distance, table.starts, axis=1))
    nearest: Array = np.minimum.reduceat(np.concatenate(blocks), table.starts, axis=0)
    return nearest


def nearest_units(table: CurveTable, first: int, second: int) -> tuple[str, str, float]:
    """The two units of two lamps, or of one, whose curves are nearest to one another.

    Parameters
    ----------
    table
        Curves of many units.
    first, second
        Places of the lamps; the same place asks for two units of one lamp.

    Returns
    -------
    tuple
        The units, and the RMS difference relative to the larger RMS [1].
    """
    distance = _distance(table.curves[table.rows(first)], table.curves[table.rows(second)])
    if first == second:
        np.fill_diagonal(distance, np.inf)
    row, column = np.unravel_index(int(np.argmin(distance)), distance.shape)
    names = (
        table.unit_ids[table.rows(first)][int(row)],
        table.unit_ids[table.rows(second)][int(column)],
    )
    return *names, float(distance[row, column])
