"""Curves to draw: what the raw data of a lamp look like, finished for the sheets."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
from numpy.typing import NDArray

from generator.datasets import CIRCLE_STEP, Centre
from generator.metrics.ageing import AgeingFigures
from generator.metrics.assembly import ageing_of, nearest_centre
from generator.metrics.colour import (
    chromaticity_uv_prime,
    emitter_split,
    planckian_locus_xy,
)
from generator.metrics.electrical import mains_cycle
from generator.metrics.modulation import LOW_RISK_LINE, two_periods
from generator.records.campaign import Campaign
from generator.records.curves import (
    AgeingCurve,
    HarmonicComb,
    IntensityCurve,
    LampCurves,
    LightCurve,
    LowRiskLine,
    MainsCurve,
    SpectrumCurve,
    WhitePlane,
)
from generator.records.figure import FigureSet
from generator.records.lamp import Lamp

__all__ = ["curves_of"]

Array = NDArray[np.float64]

_LOCUS_RANGE_K = (1500.0, 20000.0)
_OUTLINE_POINTS = 72
_HIGHEST_HARMONIC = 40
_LOWEST_HZ = 1.0


def curves_of(campaign: Campaign, figures: FigureSet) -> Mapping[str, LampCurves]:
    """Curves of every lamp; a part is ``None`` where the campaign has nothing to draw.

    Parameters
    ----------
    campaign
        The campaign.
    figures
        Its figures; harmonics and chromaticities of the units are taken from them.

    Returns
    -------
    Mapping
        ``lamp_id`` -> curves.
    """
    ageing = ageing_of(campaign)
    return {
        lamp.lamp_id: LampCurves(
            spectrum=_spectrum(campaign, lamp),
            light=_light(campaign, lamp),
            low_risk=_low_risk(),
            mains=_mains(campaign, lamp),
            harmonics=_harmonics(figures, lamp),
            white=_white(campaign, figures, lamp),
            ageing=_ageing(ageing.get(lamp.lamp_id)),
            intensity=_intensity(campaign, lamp),
        )
        for lamp in campaign.lamps
    }


def _spectrum(campaign: Campaign, lamp: Lamp) -> SpectrumCurve | None:
    found = next((item for item in campaign.spectra if item.lamp_id == lamp.lamp_id), None)
    if found is None:
        return None
    mean = found.values.mean(axis=0)
    split = emitter_split(found.wavelength_nm, mean[None, :])
    if not split.defined[0]:
        return SpectrumCurve(found.wavelength_nm, mean, found.unit, units_count=len(found.unit_ids))
    return SpectrumCurve(
        split.wavelength_nm,
        split.emitter[0] + split.phosphor[0],
        found.unit,
        split.emitter[0],
        split.phosphor[0],
        len(found.unit_ids),
    )


def _light(campaign: Campaign, lamp: Lamp) -> LightCurve | None:
    records = sorted(
        (item for item in campaign.light if item.lamp_id == lamp.lamp_id),
        key=lambda item: item.long,
    )
    if not records:
        return None
    record = records[0]
    time_s, light = two_periods(record.values[0], record.sampling_rate_hz)
    time_ms = 1000.0 * time_s
    return LightCurve(time_ms, light, float(time_ms[-1]) / 2.0, record.unit_ids[0])


def _low_risk() -> LowRiskLine:
    corners = [
        (hertz, section.percent_per_hz * hertz)
        for section in LOW_RISK_LINE
        for hertz in (max(section.from_hz, _LOWEST_HZ), section.to_hz)
    ]
    frequency, modulation = np.array(corners).T
    return LowRiskLine(frequency, modulation, "ieee_1789")


def _mains(campaign: Campaign, lamp: Lamp) -> MainsCurve | None:
    units = {unit.unit_id for unit in campaign.units_of(lamp.lamp_id)}
    for capture in campaign.mains:
        if capture.unit_id not in units:
            continue
        cycle = mains_cycle(capture.voltage_v, capture.current_a, capture.sampling_rate_hz)
        if cycle is not None:
            phase = 360.0 * cycle.time_s / cycle.time_s[-1]
            lag = cycle.phase_angle_deg
            return MainsCurve(
                phase,
                cycle.voltage_v,
                cycle.current_a,
                lag if np.isfinite(lag) else None,
                capture.unit_id,
            )
    return None


def _harmonics(figures: FigureSet, lamp: Lamp) -> HarmonicComb | None:
    orders, percent = [], []
    for order in range(2, _HIGHEST_HARMONIC + 1):
        figure = figures.measured(lamp.lamp_id, f"h{order}_percent")
        if figure is not None and figure.number is not None:
            orders.append(float(order))
            percent.append(float(figure.number))
    if not orders:
        return None
    return HarmonicComb(np.array(orders), np.array(percent))


def _white(campaign: Campaign, figures: FigureSet, lamp: Lamp) -> WhitePlane | None:
    ids, points = [], []
    for unit in campaign.units_of(lamp.lamp_id):
        x, y = (figures.measured(lamp.lamp_id, name, unit.unit_id) for name in ("x", "y"))
        if x and y and x.number is not None and y.number is not None:
            ids.append(unit.unit_id)
            points.append((float(x.number), float(y.number)))
    if not ids:
        return None
    # Evenly spaced in reciprocal temperature, as the eye sees steps of white.
    temperature = 1.0 / np.linspace(1 / _LOCUS_RANGE_K[0], 1 / _LOCUS_RANGE_K[1], 240)
    nearest = nearest_centre(lamp)
    centre = nearest if isinstance(nearest, Centre) else None
    steps = float(lamp.declared["sdcm"]) if "sdcm" in lamp.declared else None
    return WhitePlane(
        "xy",
        tuple(ids),
        np.array(points),
        planckian_locus_xy(temperature),
        temperature,
        None if centre is None else np.array([centre.x, centre.y]),
        "" if centre is None else centre.label,
        None if centre is None or steps is None else _outline(centre, steps),
        steps,
    )


def _outline(centre: Centre, steps: float) -> Array:
    """Closed outline, in x and y, of so many steps around a centre (points, 2)."""
    angle = np.linspace(0.0, 2.0 * np.pi, _OUTLINE_POINTS + 1)
    ring = np.stack([np.cos(angle), np.sin(angle)])
    if centre.ellipse is not None:
        g11, g12, g22 = centre.ellipse
        root = np.linalg.cholesky(np.array([[g11, g12], [g12, g22]]))
        return np.asarray(np.array([centre.x, centre.y]) + steps * np.linalg.solve(root.T, ring).T)
    u, v = chromaticity_uv_prime(np.array(centre.x), np.array(centre.y))
    u, v = u + steps * CIRCLE_STEP * ring[0], v + steps * CIRCLE_STEP * ring[1]
    below = 6.0 * u - 16.0 * v + 12.0
    return np.stack([9.0 * u / below, 4.0 * v / below], axis=1)


def _ageing(found: AgeingFigures | None) -> AgeingCurve | None:
    if found is None or found.curve is None:
        return None
    curve = found.curve
    if curve.fit is None:
        return AgeingCurve(curve.hours_h, curve.maintenance)
    hours = np.linspace(curve.fit_from_h, curve.limit_h, 100)
    low, high = curve.fit.band(hours)
    return AgeingCurve(
        curve.hours_h,
        curve.maintenance,
        hours,
        curve.fit.at(hours),
        low,
        high,
        projection_end_h=curve.limit_h,
    )


def _intensity(campaign: Campaign, lamp: Lamp) -> tuple[IntensityCurve, ...]:
    units = {unit.unit_id for unit in campaign.units_of(lamp.lamp_id)}
    for table in campaign.intensity:
        if table.unit_id in units:
            planes = [(0.0, 180.0), (90.0, 270.0)]
            drawn = [
                _plane(table.c_deg, table.gamma_deg, table.intensity_cd, *pair) for pair in planes
            ]
            return tuple(
                IntensityCurve(angle, intensity, name, table.unit_id)
                for angle, intensity, name in (item for item in drawn if item is not None)
            )
    return ()


def _plane(
    c_deg: Array, gamma_deg: Array, intensity_cd: Array, right: float, left: float
) -> tuple[Array, Array, str] | None:
    """One plane through the axis from its two half planes; ``None`` where they are not there."""
    if c_deg.size == 1:
        if right != 0.0:
            return None
        halves = (0, 0)
    else:
        found = [np.flatnonzero(np.isclose(c_deg, value)) for value in (right, left)]
        if not all(item.size for item in found):
            return None
        halves = (int(found[0][0]), int(found[1][0]))
    tail = slice(1, None) if gamma_deg[0] == 0.0 else slice(None)
    angle = np.concatenate([-gamma_deg[tail][::-1], gamma_deg])
    intensity = np.concatenate([intensity_cd[halves[1]][tail][::-1], intensity_cd[halves[0]]])
    return angle, intensity, f"C{right:.0f}-C{left:.0f}"
