"""All figures of luminous intensity distributions, and the useful flux that follows."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say
from generator.metrics.distribution.angles import (
    BEAM_ANGLE_METHOD,
    beam_angle_deg,
    half_intensity_angle_deg,
    peak_intensity_cd,
)
from generator.metrics.distribution.zonal_flux import (
    ZONAL_METHOD,
    cone_flux_lm,
    cumulated_flux_lm,
    full_circle,
    on_fine_angles,
    plane_mean,
)
from generator.records.figure import SeriesFigures

__all__ = [
    "NARROW_CONE_DEG",
    "WIDE_BEAM_FROM_DEG",
    "WIDE_CONE_DEG",
    "intensity_figures",
    "useful_luminous_flux_lm",
]

Array = NDArray[np.float64]

WIDE_CONE_DEG = 120.0
"""Apex angle of the cone of π sr that defines ``flux_120deg_lm`` (EU 2019/2015 Annex I(15))."""

NARROW_CONE_DEG = 90.0
"""Apex angle of the cone of 0.586 π sr that defines ``flux_90deg_lm`` (the same)."""

WIDE_BEAM_FROM_DEG = 90.0
"""Beam angle from which the useful flux is that of the wide cone (the same)."""

DARK_SHARE = 1e-3
"""Share of the peak below which a distribution counts as having ended (house rule)."""

_METHODS = {
    "luminous_flux_lm": ZONAL_METHOD,
    "flux_90deg_lm": ZONAL_METHOD,
    "flux_120deg_lm": ZONAL_METHOD,
    "flux_120deg_fraction": ZONAL_METHOD,
    "beam_angle_deg": BEAM_ANGLE_METHOD,
    "peak_intensity_cd": "largest_intensity_of_the_table",
}

_NOT_FINITE = say("the intensity table holds values that are not numbers")
_DARK = say("the intensity table holds no light")
_NO_AXIS = say("the angles do not start on the optical axis (gamma = 0)")
_GAP = say("the C-planes leave part of the turn around the axis open")
_NO_BOUND = say("the intensity does not fall to half of the centre-beam intensity in every plane")


def intensity_figures(c_deg: Array, gamma_deg: Array, intensity_cd: Array) -> SeriesFigures:
    """Flux, cone fluxes, beam angle and peak intensity of distributions on one grid.

    Parameters
    ----------
    c_deg
        C-planes, ascending [degrees] (planes,); a single one for rotational symmetry.
    gamma_deg
        Angles from the optical axis, ascending [degrees] (angles,).
    intensity_cd
        Luminous intensity [cd] (series, planes, angles).

    Returns
    -------
    SeriesFigures
        ``luminous_flux_lm``, ``flux_90deg_lm``, ``flux_120deg_lm``, ``flux_120deg_fraction``,
        ``beam_angle_deg``, ``peak_intensity_cd``. A distribution that ends before gamma = 180
        with light still there gives no total flux.

    Raises
    ------
    ValueError
        If the shapes do not fit, or the angles do not ascend within 0 to 180 degrees.
    """
    _check_grid(c_deg, gamma_deg, intensity_cd)
    series = intensity_cd.shape[0]
    values = {name: np.full(series, np.nan) for name in _METHODS}
    reasons = {name: np.full(series, "", dtype=object) for name in _METHODS}
    sound = np.all(np.isfinite(intensity_cd), axis=(-2, -1))
    lit = sound & (np.max(np.where(np.isfinite(intensity_cd), intensity_cd, 0.0), (-2, -1)) > 0)
    for text in reasons.values():
        text[~sound] = _NOT_FINITE
        text[sound & ~lit] = _DARK
    remarks: list[tuple[str, ...]] = [()] * series
    if np.any(lit):
        used = intensity_cd[lit]
        values["peak_intensity_cd"][lit] = peak_intensity_cd(used)
        found, why, notes = _solid_angle_figures(c_deg, gamma_deg, used)
        for name, numbers in found.items():
            values[name][lit] = numbers
        for name, texts in why.items():
            reasons[name][lit] = texts
        for index, note in zip(np.flatnonzero(lit), notes, strict=True):
            remarks[index] = note
    return SeriesFigures(
        values,
        {name: tuple(texts.tolist()) for name, texts in reasons.items()},
        _METHODS,
        tuple(remarks),
    )


def useful_luminous_flux_lm(
    luminous_flux_lm: Array,
    flux_120deg_lm: Array,
    flux_90deg_lm: Array,
    angle_deg: Array,
    *,
    directional: bool,
) -> Array:
    """Useful luminous flux by the rule for directional or non-directional light sources.

    Parameters
    ----------
    luminous_flux_lm
        Total luminous flux [lm] (series,).
    flux_120deg_lm, flux_90deg_lm
        Flux in the wide and in the narrow cone [lm] (series,).
    angle_deg
        Beam angle [degrees] (series,).
    directional
        Whether the lamp is a directional light source; that decision is not taken here.

    Returns
    -------
    Array
        Total flux of a non-directional lamp; flux in 120 degrees of a directional lamp with a
        beam angle of 90 degrees or more, in 90 degrees below that [lm] (series,);
        not-a-number where what the rule needs is missing. Source: eu_2019_2015, Annex I(15).
    """
    if not directional:
        return np.asarray(luminous_flux_lm, dtype=np.float64)
    chosen = np.where(angle_deg >= WIDE_BEAM_FROM_DEG, flux_120deg_lm, flux_90deg_lm)
    return np.asarray(np.where(np.isnan(angle_deg), np.nan, chosen))


def _check_grid(c_deg: Array, gamma_deg: Array, intensity_cd: Array) -> None:
    if intensity_cd.ndim != 3 or intensity_cd.shape[1:] != (c_deg.size, gamma_deg.size):
        raise ValueError(
            f"intensities of shape {intensity_cd.shape} do not fit {c_deg.size} planes "
            f"and {gamma_deg.size} angles"
        )
    if gamma_deg.size < 2 or np.any(np.diff(gamma_deg) <= 0) or np.any(np.diff(c_deg) <= 0):
        raise ValueError("planes and angles must ascend, with two angles at the least")
    if gamma_deg[0] < 0 or gamma_deg[-1] > 180:
        raise ValueError(f"gamma runs from {gamma_deg[0]:g} to {gamma_deg[-1]:g}, not 0 to 180")


def _solid_angle_figures(
    c_deg: Array, gamma_deg: Array, intensity_cd: Array
) -> tuple[dict[str, Array], dict[str, list[str]], list[tuple[str, ...]]]:
    """Figures of sound tables that need the whole turn and the axis, with their reasons."""
    series = intensity_cd.shape[0]
    names = [name for name in _METHODS if name != "peak_intensity_cd"]
    turn = full_circle(c_deg)
    if gamma_deg[0] > 0 or turn is None:
        text = _NO_AXIS if gamma_deg[0] > 0 else _GAP
        return {}, {name: [text] * series for name in names}, [()] * series
    turn_deg, planes = turn
    fine_deg, fine_cd = on_fine_angles(gamma_deg, intensity_cd)
    found = _fluxes(fine_deg, plane_mean(turn_deg, fine_cd[:, planes, :]))
    centre = np.mean(intensity_cd[:, :, 0], axis=1)
    halves = half_intensity_angle_deg(fine_deg, fine_cd, centre)
    found["beam_angle_deg"] = beam_angle_deg(turn_deg, halves[:, planes])
    notes = _end_of_table(gamma_deg, intensity_cd, found)
    ended = say(
        "the angles end at gamma = {last:g}° with light still there", last=float(gamma_deg[-1])
    )
    why = {name: [ended if bad else "" for bad in np.isnan(found[name])] for name in names}
    why["beam_angle_deg"] = [_NO_BOUND if bad else "" for bad in np.isnan(found["beam_angle_deg"])]
    return found, why, notes


def _fluxes(fine_deg: Array, mean_cd: Array) -> dict[str, Array]:
    inside = cumulated_flux_lm(fine_deg, mean_cd)
    total = inside[..., -1].copy()
    wide = cone_flux_lm(fine_deg, inside, WIDE_CONE_DEG)
    narrow = cone_flux_lm(fine_deg, inside, NARROW_CONE_DEG)
    return {
        "luminous_flux_lm": total,
        "flux_90deg_lm": narrow,
        "flux_120deg_lm": wide,
        "flux_120deg_fraction": np.divide(
            wide, total, out=np.full_like(total, np.nan), where=total > 0
        ),
    }


def _end_of_table(
    gamma_deg: Array, intensity_cd: Array, found: dict[str, Array]
) -> list[tuple[str, ...]]:
    """Withhold the total of tables that end in the light; note those that end in the dark."""
    last = float(gamma_deg[-1])
    if last >= 180.0:
        return [()] * intensity_cd.shape[0]
    bright = np.max(intensity_cd[:, :, -1], axis=1) > DARK_SHARE * peak_intensity_cd(intensity_cd)
    found["luminous_flux_lm"][bright] = np.nan
    found["flux_120deg_fraction"][bright] = np.nan
    note = say(
        "the angles end at gamma = {last}°, where the light has ended; none is taken beyond",
        last=numeral(f"{last:g}"),
    )
    return [() if lit else (note,) for lit in bright]
