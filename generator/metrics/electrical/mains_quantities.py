"""Effective values, power and harmonics over whole mains cycles."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.metrics.whole_periods import whole_period_weights

__all__ = ["HIGHEST_ORDER", "MainsQuantities", "mains_quantities"]

Array = NDArray[np.float64]

HIGHEST_ORDER = 40
"""Highest harmonic order of the figures."""


@dataclass(frozen=True, slots=True, eq=False)
class MainsQuantities:
    """Mains quantities of a batch of captures, as measured, nothing withheld.

    Parameters
    ----------
    voltage_v, current_a
        Effective (RMS) values, direct component included [V], [A] (series,).
    direct_current_a
        Direct component of the current [A] (series,).
    peak_current_a
        Greatest absolute current [A] (series,).
    power_w
        Active power, with its sign [W] (series,).
    harmonic_current_a
        RMS value per order, order 1 first [A] (series, 40); not-a-number for orders at or above
        half the sampling rate.
    phase_angle_rad
        Angle by which the current fundamental lags the voltage fundamental [rad] (series,).
    """

    voltage_v: Array
    current_a: Array
    direct_current_a: Array
    peak_current_a: Array
    power_w: Array
    harmonic_current_a: Array
    phase_angle_rad: Array

    @property
    def apparent_power_va(self) -> Array:
        """Apparent power: the product of the effective values [VA] (series,)."""
        return self.voltage_v * self.current_a

    @property
    def thd_current(self) -> Array:
        """Total harmonic distortion of the current, orders 2 to 40, over order 1 (series,).

        Source: iec_61000_3_2.
        """
        harmonics = np.sqrt(np.sum(self.harmonic_current_a[:, 1:] ** 2, axis=1))
        return np.asarray(harmonics / self._fundamental_a, dtype=np.float64)

    @property
    def thd_current_all(self) -> Array:
        """Everything but direct component and fundamental, over the fundamental (series,).

        Source: iec_60050_551.
        """
        fundamental = self._fundamental_a
        rest = self.current_a**2 - self.direct_current_a**2 - fundamental**2
        return np.asarray(np.sqrt(np.maximum(rest, 0.0)) / fundamental, dtype=np.float64)

    @property
    def _fundamental_a(self) -> Array:
        """Current of order 1, not-a-number where there is none (series,)."""
        fundamental = self.harmonic_current_a[:, 0]
        return np.where(fundamental > 0, fundamental, np.nan)


def mains_quantities(
    voltage_v: Array, current_a: Array, sampling_rate_hz: float, frequency_hz: Array
) -> MainsQuantities:
    """Effective values, power and harmonics over the whole cycles of each capture.

    Parameters
    ----------
    voltage_v, current_a
        Voltage [V] and current [A], sampled together (series, samples).
    sampling_rate_hz
        Samples per second [Hz].
    frequency_hz
        Mains frequency [Hz] (series,).

    Returns
    -------
    MainsQuantities
        The quantities.

    Notes
    -----
    Source: iec_60050_131, entries 131-11-42, -41, -46; iec_61000_4_7 (whole cycles).
    """
    cycles_per_sample = frequency_hz / sampling_rate_hz
    weights = whole_period_weights(voltage_v.shape[1], 1 / cycles_per_sample)
    weights /= weights.sum(axis=1, keepdims=True)
    voltage, current = _fundamental_and_harmonics(
        voltage_v * weights, current_a * weights, cycles_per_sample
    )
    orders = np.arange(1, HIGHEST_ORDER + 1)
    folded = orders * cycles_per_sample[:, None] >= 0.5
    return MainsQuantities(
        voltage_v=np.sqrt(np.sum(weights * voltage_v**2, axis=1)),
        current_a=np.sqrt(np.sum(weights * current_a**2, axis=1)),
        direct_current_a=np.sum(weights * current_a, axis=1),
        peak_current_a=np.max(np.abs(current_a) * (weights > 0), axis=1),
        power_w=np.sum(weights * voltage_v * current_a, axis=1),
        harmonic_current_a=np.where(folded, np.nan, np.sqrt(2) * np.abs(current)),
        phase_angle_rad=np.angle(voltage * np.conj(current[:, 0])),
    )


def _fundamental_and_harmonics(
    voltage: Array, current: Array, cycles_per_sample: Array
) -> tuple[NDArray[np.complex128], NDArray[np.complex128]]:
    """Fourier coefficients: the voltage fundamental (series,), the current (series, orders)."""
    turn = np.exp(-2j * np.pi * cycles_per_sample[:, None] * np.arange(current.shape[1]))
    fundamental = np.sum(voltage * turn, axis=1)
    harmonics = np.empty((current.shape[0], HIGHEST_ORDER), dtype=np.complex128)
    rotated = current.astype(np.complex128)
    for order in range(HIGHEST_ORDER):
        rotated *= turn
        harmonics[:, order] = rotated.sum(axis=1)
    return fundamental, harmonics
