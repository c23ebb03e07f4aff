"""Curves to draw: arrays that the metrics rooms made and the sheets only put on paper.

Every part is optional: a lamp without a light record has no :class:`LightCurve`, and the sheet
says so where the drawing would stand. Arrays are finished: averaged over units, aligned to a
period, normalised; the sheets scale them to the page and thin them out, nothing else.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "AgeingCurve",
    "HarmonicComb",
    "IntensityCurve",
    "LampCurves",
    "LightCurve",
    "LowRiskLine",
    "MainsCurve",
    "SpectrumCurve",
    "WhitePlane",
]

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True, eq=False)
class SpectrumCurve:
    """Mean spectrum of a lamp's units, cut into emitter and phosphor where that is defined.

    Parameters
    ----------
    wavelength_nm
        Wavelengths, ascending [nm] (wavelengths,).
    total
        Mean spectral radiant flux (wavelengths,), in the unit of ``unit``.
    unit
        ``W/nm``, or ``relative`` (any scale; the drawing then shows shares of the peak).
    emitter, phosphor
        The two parts, adding up to ``total`` (wavelengths,); ``None`` where the lamp has no
        single blue emitter or the split is not defined.
    units_count
        Number of units averaged.
    """

    wavelength_nm: Array
    total: Array
    unit: Literal["W/nm", "relative"]
    emitter: Array | None = None
    phosphor: Array | None = None
    units_count: int = 1


@dataclass(frozen=True, slots=True, eq=False)
class LightCurve:
    """Light against time over two periods of its main modulation, for one unit.

    Parameters
    ----------
    time_ms
        Time from the start of a period [ms] (samples,).
    light
        Light relative to its mean (samples,); the mean over one period is 1.
    period_ms
        Length of one period [ms].
    unit_id
        The unit drawn.
    """

    time_ms: Array
    light: Array
    period_ms: float
    unit_id: str = ""


@dataclass(frozen=True, slots=True, eq=False)
class LowRiskLine:
    """A line of low risk in the plane of modulation against frequency.

    Parameters
    ----------
    frequency_hz
        Corners of the line, ascending [Hz] (corners,).
    modulation_percent
        Highest modulation of low risk there [percent] (corners,).
    source
        Key into the list of sources.
    """

    frequency_hz: Array
    modulation_percent: Array
    source: str


@dataclass(frozen=True, slots=True, eq=False)
class MainsCurve:
    """Voltage and current over one mains cycle, from a rising zero crossing of the voltage.

    Parameters
    ----------
    phase_deg
        Phase of the voltage fundamental, 0 to 360 [degrees] (samples,).
    voltage_v, current_a
        Instantaneous voltage [V] and current [A], folded onto one cycle (samples,).
    current_phase_deg
        Phase of the current fundamental after that of the voltage [degrees]; negative where
        the current leads; ``None`` where not determined.
    unit_id
        The unit drawn.
    """

    phase_deg: Array
    voltage_v: Array
    current_a: Array
    current_phase_deg: float | None = None
    unit_id: str = ""


@dataclass(frozen=True, slots=True, eq=False)
class HarmonicComb:
    """Harmonics of the current.

    Parameters
    ----------
    order
        Orders, ascending (orders,).
    percent
        Harmonic current in percent of the fundamental [percent] (orders,).
    """

    order: Array
    percent: Array


@dataclass(frozen=True, slots=True, eq=False)
class WhitePlane:
    """A piece of the chromaticity plane around the Planckian locus with every unit as a dot.

    Parameters
    ----------
    coordinates
        ``xy`` (CIE 1931) or ``u'v'`` (CIE 1976); all arrays are in this plane.
    unit_ids
        The units (units,).
    units
        Chromaticity of the units (units, 2).
    locus
        Planckian locus across the piece (points, 2).
    locus_cct_k
        Temperatures along the locus [K] (points,).
    target
        Centre of the tolerance (2,), or ``None``.
    target_label
        What the centre is, for instance ``2 700 K`` or ``declared``.
    tolerance
        Closed outline of the tolerance (points, 2), or ``None``.
    tolerance_steps
        Steps of the outline (colour consistency), or ``None``.
    """

    coordinates: Literal["xy", "u'v'"]
    unit_ids: tuple[str, ...]
    units: Array
    locus: Array
    locus_cct_k: Array
    target: Array | None = None
    target_label: str = ""
    tolerance: Array | None = None
    tolerance_steps: float | None = None


@dataclass(frozen=True, slots=True, eq=False)
class AgeingCurve:
    """Luminous flux against operating time, with the fitted curve and its band.

    Parameters
    ----------
    hours_h
        Time of each reading [h] (readings,).
    maintenance
        Flux relative to the initial flux (readings,); one entry per unit and time.
    fit_hours_h, fit, fit_low, fit_high
        Fitted curve and its band [h] and relative (points,); ``None`` where no fit was made.
    limit_hours_h, limit
        Time [h] and least lumen maintenance factor asked for there; ``None`` where none is.
    projection_end_h
        Time beyond which projection is not allowed [h], or ``None``.
    """

    hours_h: Array
    maintenance: Array
    fit_hours_h: Array | None = None
    fit: Array | None = None
    fit_low: Array | None = None
    fit_high: Array | None = None
    limit_hours_h: float | None = None
    limit: float | None = None
    projection_end_h: float | None = None


@dataclass(frozen=True, slots=True, eq=False)
class IntensityCurve:
    """Luminous intensity in one plane through the optical axis.

    Parameters
    ----------
    angle_deg
        Angles from the axis, -180 to 180, ascending [degrees] (angles,).
    intensity_cd
        Luminous intensity [cd] (angles,).
    plane
        Name of the plane, for instance ``C0-C180``.
    unit_id
        The unit drawn.
    """

    angle_deg: Array
    intensity_cd: Array
    plane: str
    unit_id: str = ""


@dataclass(frozen=True, slots=True, eq=False)
class LampCurves:
    """Everything drawn for one lamp; ``None`` or empty where there is nothing to draw.

    Parameters
    ----------
    spectrum, light, mains, harmonics, white, ageing
        One curve each.
    low_risk
        The low-risk line of the modulation plane.
    intensity
        Planes of the luminous intensity distribution.
    missing
        Name of a part (``spectrum``, ``light``, ...) -> why it is not there, fit to be printed.
    """

    spectrum: SpectrumCurve | None = None
    light: LightCurve | None = None
    low_risk: LowRiskLine | None = None
    mains: MainsCurve | None = None
    harmonics: HarmonicComb | None = None
    white: WhitePlane | None = None
    ageing: AgeingCurve | None = None
    intensity: tuple[IntensityCurve, ...] = ()
    missing: Mapping[str, str] = field(default_factory=dict)
