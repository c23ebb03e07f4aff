"""The units of one lamp as the laboratory finds them: truth, spread, and measuring deviation."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from demo_source.lamps import Lamp
from demo_source.light import flicker_index, percent_flicker, stroboscopic_visibility
from demo_source.mains import Capture, capture
from demo_source.noise import normal, spread
from demo_source.spectra import WAVELENGTH_NM, white

__all__ = ["Sample", "samples", "spectrum", "unit_row"]

Array = NDArray[np.float64]

EXTRA_LOW_VOLTAGE_V = 12.0
EXACT_LAMP = 15  # stands on the limits, so its drivers are all alike


@dataclass(frozen=True, slots=True)
class Sample:
    """One unit.

    Parameters
    ----------
    unit_id
        Identity.
    flux_lm, power_w
        True luminous flux [lm] and active power [W].
    sphere
        Deviation of the integrating sphere: reading over true flux.
    x, y
        True chromaticity.
    shift_nm
        Shift of the blue emitter from its nominal peak [nm].
    strength
        Factor on the ripple of the light.
    mains
        Voltage and current; ``None`` behind a separate control gear.
    aged_only
        True for a unit that only the endurance test knows.
    """

    unit_id: str
    flux_lm: float
    power_w: float
    sphere: float
    x: float
    y: float
    shift_nm: float
    strength: float
    mains: Capture | None
    aged_only: bool

    @property
    def measured_flux_lm(self) -> float:
        """Luminous flux as the sphere reads it [lm]."""
        return self.flux_lm * self.sphere


def samples(lamp: Lamp) -> tuple[Sample, ...]:
    """Give the units of one lamp; those that were only aged come last."""
    aged = lamp.ageing.units if lamp.ageing else 0
    extra = max(aged - lamp.units, 0)
    parts = [_deviations(lamp, 0, lamp.units), _deviations(lamp, 100, extra)]
    numbered = np.concatenate(parts, axis=1)
    return tuple(_sample(lamp, i, numbered[:, i]) for i in range(lamp.units + extra))


def _deviations(lamp: Lamp, group: int, count: int) -> Array:
    if count == 0:
        return np.empty((8, 0))
    return np.stack([spread(lamp.number, group + part, count=count) for part in range(8)])


def _sample(lamp: Lamp, index: int, deviation: Array) -> Sample:
    power_w = lamp.power_w * (1.0 + 0.006 * deviation[1])
    driver = lamp.driver
    if driver and lamp.number != EXACT_LAMP:
        driver = driver.varied(float(deviation[7]))
    return Sample(
        unit_id=f"{lamp.lamp_id}-{index + 1:02d}",
        flux_lm=lamp.flux_lm * (1.0 + lamp.flux_spread * deviation[0]),
        power_w=power_w,
        sphere=1.0 + 0.003 * deviation[2],
        x=lamp.colour[0] + 0.0007 * deviation[3],
        y=lamp.colour[1] + 0.0007 * deviation[4],
        shift_nm=0.6 * deviation[5],
        strength=1.0 + 0.03 * deviation[6],
        mains=capture(driver, power_w) if driver else None,
        aged_only=index >= lamp.units,
    )


def spectrum(lamp: Lamp, index: int, sample: Sample) -> tuple[Array, Array]:
    """Wavelengths [nm] and spectral radiant flux [W/nm] as the spectroradiometer reads them."""
    clean = white(lamp.components, sample.x, sample.y, sample.flux_lm, sample.shift_nm)
    step = lamp.spectrum_step_nm
    wavelength_nm, flux = WAVELENGTH_NM[::step], clean[::step]
    noise = normal(lamp.number, 200 + index, count=2 * flux.size)
    read = flux * (1.0 + 0.0004 * noise[: flux.size])
    read = read + lamp.dark_noise * flux.max() * noise[flux.size :]
    return wavelength_nm, np.asarray(read)


def unit_row(lamp: Lamp, index: int, sample: Sample) -> dict[str, str]:
    """One row of ``units.csv``; a figure that was not measured is left out."""
    row = {"unit_id": sample.unit_id, "lamp_id": lamp.lamp_id}
    row.update(_photometric(lamp, sample))
    row.update(_electrical(lamp, sample))
    row.update(_modulation(lamp, sample))
    deviates = normal(lamp.number, 300 + index, count=8)
    row["ambient_temperature_c"] = f"{25.0 + 0.3 * deviates[0]:.1f}"
    standby = {
        "standby_power_w": lamp.standby_w,
        "networked_standby_power_w": lamp.networked_standby_w,
    }
    for (column, mean), deviate in zip(standby.items(), deviates[1:3], strict=True):
        if mean is not None:
            row[column] = f"{mean * (1.0 + 0.004 * deviate):.3f}"
    for (column, (mean, width, decimals)), deviate in zip(
        lamp.reported.items(), deviates[3:], strict=False
    ):
        row[column] = f"{mean + width * deviate:.{decimals}f}"
    return row


def _photometric(lamp: Lamp, sample: Sample) -> Iterator[tuple[str, str]]:
    yield "luminous_flux_lm", f"{sample.measured_flux_lm:.1f}"
    if lamp.number in (1, 15):
        yield "u_luminous_flux_lm", f"{0.013 * sample.measured_flux_lm:.1f}"
    if lamp.beam:
        beam, cone_deg = lamp.beam, 120.0 if lamp.beam.angle_deg >= 90.0 else 90.0
        centre_cd = sample.measured_flux_lm / beam.flux_per_candela()
        yield "useful_luminous_flux_lm", f"{centre_cd * beam.flux_per_candela(cone_deg):.1f}"
        yield "beam_angle_deg", f"{beam.angle_deg * (1.0 + beam.ellipticity):.1f}"
        yield "peak_intensity_cd", f"{centre_cd:.0f}"


def _electrical(lamp: Lamp, sample: Sample) -> Iterator[tuple[str, str]]:
    yield "power_w", f"{sample.power_w:.3f}"
    if lamp.number in (1, 15):
        yield "u_power_w", f"{0.003 * sample.power_w:.3f}"
    if lamp.standby_w:
        yield "u_standby_power_w", "0.010"
    if sample.mains is None:
        yield "voltage_v", f"{EXTRA_LOW_VOLTAGE_V:.2f}"
        yield "current_a", f"{sample.power_w / EXTRA_LOW_VOLTAGE_V:.4f}"
    elif lamp.records.mains:
        mains = sample.mains
        yield "voltage_v", f"{mains.voltage_v:.2f}"
        yield "current_a", f"{mains.current_a:.5f}"
        yield "frequency_hz", "50.00"
        yield "power_factor", f"{mains.power_factor:.4f}"
        yield "displacement_factor", f"{mains.displacement_factor:.4f}"
        yield "thd_current_percent", f"{mains.thd_current_percent:.1f}"


def _modulation(lamp: Lamp, sample: Sample) -> Iterator[tuple[str, str]]:
    if lamp.number in (3, 16):
        light, strength = lamp.modulation, sample.strength
        yield "percent_flicker", f"{percent_flicker(light, strength):.1f}"
        yield "flicker_index", f"{flicker_index(light, strength):.3f}"
        yield "svm", f"{stroboscopic_visibility(light, strength):.2f}"
