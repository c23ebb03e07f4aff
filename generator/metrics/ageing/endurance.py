"""Figures of one lamp's ageing test, per unit and for the lamp."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say, say_counted
from generator.metrics.ageing.exponential import (
    PROJECTION_METHOD,
    READING_WINDOW_H,
)
from generator.metrics.ageing.projection import (
    MaintenanceCurve,
    maintenance_curve,
    too_short_to_project,
)
from generator.records.figure import SeriesFigures

__all__ = ["ENDURANCE_H", "AgeingFigures", "ageing_figures", "u_v_prime_shift"]

Array = NDArray[np.float64]

ENDURANCE_H = 3000.0
"""Operating time at which the factors are defined [h] (EU 2019/2020 Annex V)."""

_METHODS = {
    "lumen_maintenance_factor": "final_over_initial_flux_eu_2019_2020_annex_v",
    "survival_factor": "share_operational_eu_2019_2020_annex_v",
    "chromaticity_shift": "distance_in_u_prime_v_prime",
    "l70_projected_h": PROJECTION_METHOD,
}

_FAILED = say("the unit had failed")
_NOT_LOOKED_AT = say("whether the unit still worked was not looked at")
_NO_INITIAL = say("no flux at 0 h")
_NO_FINAL = say("the unit still worked, but its flux was not read")
_NO_COLOUR = say("chromaticity not read at the start and at the end")
_NO_SURVIVOR = say("no unit survived with its flux read")


@dataclass(frozen=True, slots=True, eq=False)
class AgeingFigures:
    """Figures of one lamp's ageing test.

    Parameters
    ----------
    lamp
        One series: ``lumen_maintenance_factor`` and ``chromaticity_shift`` (means over the
        survivors), ``survival_factor``, ``l70_projected_h``.
    units
        One series per unit: ``lumen_maintenance_factor``, ``chromaticity_shift``.
    curve
        Readings and projection for drawing; ``None`` where the test has no reading at 0 h.
    read_at_h
        Hour of the reading the factors stand for [h]; not-a-number where the test is too short.
    """

    lamp: SeriesFigures
    units: SeriesFigures
    curve: MaintenanceCurve | None
    read_at_h: float


def ageing_figures(
    hours_h: Array,
    flux_lm: Array,
    operational: Array,
    x: Array,
    y: Array,
    endurance_h: float = ENDURANCE_H,
) -> AgeingFigures:
    """All figures of the ageing test of one lamp.

    Parameters
    ----------
    hours_h
        Hours of the readings, ascending [h] (readings,).
    flux_lm
        Luminous flux [lm] (units, readings); not-a-number where not read.
    operational
        1 where the unit worked, 0 where it had failed, not-a-number where it was not looked at
        (units, readings). A unit that has failed once counts as failed from then on.
    x, y
        Chromaticity (units, readings); not-a-number where not read.
    endurance_h
        Operating time at which the factors are taken: the first reading then or later [h].

    Returns
    -------
    AgeingFigures
        Factors, shift, projection. Tests that end earlier give no factors, and say so.
        Source: eu_2019_2020, Annex I(58), (59) and Annex V.

    Raises
    ------
    ValueError
        If the shapes do not fit or the hours do not ascend.
    """
    _check(hours_h, flux_lm, operational, x, y)
    due = np.flatnonzero(hours_h >= endurance_h - READING_WINDOW_H)
    if due.size == 0 or hours_h[0] > READING_WINDOW_H:
        return _without_factors(hours_h, flux_lm.shape[0], endurance_h, due.size == 0)
    last = int(due[0])
    status = _status(operational, last)
    maintenance = _relative(flux_lm)
    units = _unit_figures(
        maintenance[:, last],
        u_v_prime_shift(x, y, last),
        status,
        flux_lm[:, 0],
        float(hours_h[last]),
    )
    alive_to_the_end = _status(operational, hours_h.size - 1) == 1
    curve = maintenance_curve(
        hours_h, np.where(alive_to_the_end[:, np.newaxis], maintenance, np.nan)
    )
    lamp = _lamp_figures(units, status, curve, float(hours_h[last]))
    return AgeingFigures(lamp, units, curve, float(hours_h[last]))


def u_v_prime_shift(x: Array, y: Array, last: int) -> Array:
    """Distance in u′v′ between the first and a later reading.

    Parameters
    ----------
    x, y
        Chromaticity (units, readings).
    last
        Index of the later reading.

    Returns
    -------
    Array
        Distance (units,). Source: iso_cie_11664_5.
    """
    scale = -2.0 * x + 12.0 * y + 3.0
    u, v = 4.0 * x / scale, 9.0 * y / scale
    return np.asarray(np.hypot(u[:, last] - u[:, 0], v[:, last] - v[:, 0]))


def _check(hours_h: Array, flux_lm: Array, operational: Array, x: Array, y: Array) -> None:
    shapes = {flux_lm.shape, operational.shape, x.shape, y.shape}
    if len(shapes) != 1 or flux_lm.ndim != 2 or flux_lm.shape[1] != hours_h.size:
        raise ValueError(f"readings of shapes {sorted(shapes)} do not fit {hours_h.size} hours")
    if hours_h.size == 0 or np.any(np.diff(hours_h) <= 0):
        raise ValueError("the hours of an ageing test must ascend")


def _status(operational: Array, last: int) -> Array:
    """1 alive, 0 failed, not-a-number unknown, at one reading (units,)."""
    failed = np.any(operational[:, : last + 1] == 0, axis=1)
    alive = np.any(operational[:, last:] == 1, axis=1)
    return np.asarray(np.where(failed, 0.0, np.where(alive, 1.0, np.nan)))


def _relative(flux_lm: Array) -> Array:
    initial = flux_lm[:, :1]
    return np.divide(flux_lm, initial, out=np.full_like(flux_lm, np.nan), where=initial > 0)


def _unit_figures(
    maintenance: Array, shift: Array, status: Array, initial_lm: Array, read_at_h: float
) -> SeriesFigures:
    alive = status == 1
    factor = np.where(alive, maintenance, np.nan)
    moved = np.where(alive, shift, np.nan)
    lost = np.full(alive.shape, "", dtype=object)
    lost[:] = _NOT_LOOKED_AT
    lost[status == 0] = _FAILED
    why_flux, why_colour = lost.copy(), lost
    why_flux[alive] = _NO_INITIAL
    why_flux[alive & (initial_lm > 0)] = _NO_FINAL
    why_colour[alive] = _NO_COLOUR
    return SeriesFigures(
        {"lumen_maintenance_factor": factor, "chromaticity_shift": moved},
        {
            "lumen_maintenance_factor": _texts(factor, why_flux),
            "chromaticity_shift": _texts(moved, why_colour),
        },
        {name: _METHODS[name] for name in ("lumen_maintenance_factor", "chromaticity_shift")},
        ((_read_at(read_at_h),),) * alive.size,
    )


def _texts(numbers: Array, reasons: NDArray[np.object_]) -> tuple[str, ...]:
    return tuple(
        "" if np.isfinite(number) else reason
        for number, reason in zip(numbers, reasons, strict=True)
    )


def _lamp_figures(
    units: SeriesFigures, status: Array, curve: MaintenanceCurve, read_at_h: float
) -> SeriesFigures:
    values: dict[str, Array] = {}
    reasons: dict[str, tuple[str, ...]] = {}
    for name, lacking in (
        ("lumen_maintenance_factor", _NO_SURVIVOR),
        ("chromaticity_shift", _NO_COLOUR),
    ):
        known = units.values[name][np.isfinite(units.values[name])]
        values[name] = np.array([np.mean(known) if known.size else np.nan])
        reasons[name] = ("" if known.size else lacking,)
    unknown = int(np.sum(np.isnan(status)))
    values["survival_factor"] = np.array([np.nan if unknown else np.mean(status == 1)])
    reasons["survival_factor"] = (
        say_counted(
            "{count} unit was not looked at after {hours:g} h",
            "{count} units were not looked at after {hours:g} h",
            unknown,
            hours=read_at_h,
        )
        if unknown
        else "",
    )
    values["l70_projected_h"] = np.array([curve.reported_h])
    reasons["l70_projected_h"] = (curve.reason,)
    half = (curve.l70_high_h - curve.l70_low_h) / 2.0
    stated = curve.fit is not None and not curve.beyond_limit and np.isfinite(half)
    remarks = (*_unread(units, status), *_projection_remarks(curve))
    return SeriesFigures(
        values,
        reasons,
        _METHODS,
        ((_read_at(read_at_h), *remarks),),
        {"l70_projected_h": np.array([half if stated else np.nan])},
    )


def _unread(units: SeriesFigures, status: Array) -> tuple[str, ...]:
    missing = int(np.sum((status == 1) & np.isnan(units.values["lumen_maintenance_factor"])))
    if not missing:
        return ()
    return (
        say_counted(
            "{count} survivor is not in the mean: flux not read",
            "{count} survivors are not in the mean: flux not read",
            missing,
        ),
    )


def _read_at(hours_h: float) -> str:
    return say("read at {hours} h", hours=numeral(f"{hours_h:g}"))


def _projection_remarks(curve: MaintenanceCurve) -> tuple[str, ...]:
    if curve.fit is None:
        return ()
    span = say_counted(
        "fitted from {first:g} h to {last:g} h, {count} unit",
        "fitted from {first:g} h to {last:g} h, {count} units",
        curve.units_count,
        first=curve.fit_from_h,
        last=curve.fit_to_h,
    )
    if curve.beyond_limit:
        beyond = say(
            "projected life greater than {limit:g} h, the limit of projection", limit=curve.limit_h
        )
        return (beyond, span)
    if np.isfinite(curve.l70_high_h):
        life = say(
            "projected life between {low:.0f} h and {high:.0f} h (95 %)",
            low=curve.l70_low_h,
            high=curve.l70_high_h,
        )
    else:
        life = say(
            "projected life between {low:.0f} h and no upper end (95 %)", low=curve.l70_low_h
        )
    return (life, span)


def _without_factors(
    hours_h: Array, units: int, endurance_h: float, too_short: bool
) -> AgeingFigures:
    last_h = float(hours_h[-1])
    reason = say("the test has no reading at 0 h")
    if too_short:
        reason = say(
            "the test ends at {last:g} h, before the {due:g} h it is defined at",
            last=last_h,
            due=endurance_h,
        )
    named = tuple(_METHODS)
    projection = too_short_to_project(last_h) if too_short else reason
    lamp_reasons = dict.fromkeys(named, (reason,)) | {"l70_projected_h": (projection,)}
    per_unit = ("lumen_maintenance_factor", "chromaticity_shift")
    return AgeingFigures(
        SeriesFigures({name: np.array([np.nan]) for name in named}, lamp_reasons, _METHODS, ((),)),
        SeriesFigures(
            {name: np.full(units, np.nan) for name in per_unit},
            dict.fromkeys(per_unit, (reason,) * units),
            {name: _METHODS[name] for name in per_unit},
            ((),) * units,
        ),
        None,
        float("nan"),
    )
