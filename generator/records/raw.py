"""Raw measurements as they lie in the campaign: spectra, waveforms, distributions, ageing."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from typing import Literal

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "EnduranceReading",
    "IntensityTable",
    "LightRecord",
    "MainsCapture",
    "SpectrumSet",
    "SpectrumUnit",
]

Array = NDArray[np.float64]
SpectrumUnit = Literal["W/nm", "relative"]


@dataclass(frozen=True, slots=True, eq=False)
class SpectrumSet:
    """Spectra of the units of one lamp on one wavelength scale.

    Parameters
    ----------
    lamp_id
        Lamp they belong to.
    unit_ids
        Column headings (units,).
    wavelength_nm
        Wavelengths, ascending [nm] (wavelengths,).
    values
        Spectral radiant flux [W/nm], or relative, (units, wavelengths).
    unit
        ``W/nm`` or ``relative``.
    file
        Path inside the campaign.
    """

    lamp_id: str
    unit_ids: tuple[str, ...]
    wavelength_nm: Array
    values: Array
    unit: SpectrumUnit
    file: str


@dataclass(frozen=True, slots=True, eq=False)
class LightRecord:
    """Light against time for the units of one lamp, evenly sampled.

    Parameters
    ----------
    lamp_id
        Lamp they belong to.
    unit_ids
        Column headings (units,).
    sampling_rate_hz
        Samples per second [Hz].
    values
        Light, linear, any scale (units, samples).
    long
        True for the long record of ``light/<lamp_id>.long.csv``.
    file
        Path inside the campaign.
    """

    lamp_id: str
    unit_ids: tuple[str, ...]
    sampling_rate_hz: float
    values: Array
    long: bool
    file: str


@dataclass(frozen=True, slots=True, eq=False)
class MainsCapture:
    """Voltage and current of one unit against time, sampled together and evenly.

    Parameters
    ----------
    unit_id
        Unit it belongs to.
    sampling_rate_hz
        Samples per second [Hz].
    voltage_v, current_a
        Samples [V], [A] (samples,).
    file
        Path inside the campaign.
    """

    unit_id: str
    sampling_rate_hz: float
    voltage_v: Array
    current_a: Array
    file: str


@dataclass(frozen=True, slots=True, eq=False)
class IntensityTable:
    """Luminous intensity distribution of one unit on a full grid of C-planes and gamma angles.

    Parameters
    ----------
    unit_id
        Unit it belongs to.
    c_deg
        Planes, ascending [degrees] (planes,); 0 alone for a rotationally symmetric lamp.
    gamma_deg
        Angles from the optical axis, ascending [degrees] (angles,).
    intensity_cd
        Luminous intensity [cd] (planes, angles).
    file
        Path inside the campaign.
    """

    unit_id: str
    c_deg: Array
    gamma_deg: Array
    intensity_cd: Array
    file: str


@dataclass(frozen=True, slots=True)
class EnduranceReading:
    """One reading in an ageing test; ``None`` where not measured.

    Parameters
    ----------
    lamp_id, unit_id
        What was read.
    hours_h
        Operating time [h].
    luminous_flux_lm
        Luminous flux [lm].
    operational
        Whether the unit still worked.
    x, y
        Chromaticity.
    row
        Row of ``endurance.csv``.
    """

    lamp_id: str
    unit_id: str
    hours_h: Decimal
    luminous_flux_lm: Decimal | None
    operational: bool
    x: Decimal | None = None
    y: Decimal | None = None
    row: int = 0
