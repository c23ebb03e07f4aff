"""Forward model of the mains current of LED drivers, as harmonics beside a laboratory supply."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

__all__ = ["Capture", "Corrected", "Driver", "Rectifier", "capture"]

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]

ORDERS: Array = np.arange(1.0, 60.0, 2.0)
SUPPLY_V = 230.0
SUPPLY_HZ = 50.0
SUPPLY_DISTORTION = {3.0: 0.003, 5.0: 0.002}


@dataclass(frozen=True, slots=True)
class Rectifier:
    """Rectifier with a reservoir capacitor: half-cosine pulses of current ahead of the crest.

    Parameters
    ----------
    width_deg
        Length of a pulse [degrees of the mains period].
    lead_deg
        How far the middle of the pulse lies ahead of the crest of the voltage [degrees].
    """

    width_deg: float
    lead_deg: float

    def varied(self, deviate: float) -> Rectifier:
        """The driver of one unit: its capacitor is a little larger or smaller."""
        return Rectifier(self.width_deg * (1.0 - 0.02 * deviate), self.lead_deg)

    def harmonics(self) -> Complex:
        """Amplitudes of odd orders, softened by the inductance of the interference filter."""
        half = np.radians(self.width_deg) / 2.0
        ratio = np.pi / (2.0 * half)
        amplitude = 4.0 / np.pi * ratio * np.cos(ORDERS * half) / (ratio**2 - ORDERS**2)
        softened = amplitude / (1.0 + (ORDERS / 21.0) ** 2)
        return np.asarray(softened * np.exp(1j * ORDERS * np.radians(self.lead_deg)))


@dataclass(frozen=True, slots=True)
class Corrected:
    """Near-sinusoidal current, ahead of or behind the voltage, with a few harmonics.

    Parameters
    ----------
    lead_deg
        How far the fundamental lies ahead of the voltage [degrees]; negative for behind.
    percent
        Harmonics 3, 5, 7, ... in percent of the fundamental.
    """

    lead_deg: float
    percent: tuple[float, ...]

    def varied(self, deviate: float) -> Corrected:
        """The driver of one unit: phase and harmonics are a little larger or smaller."""
        scale = 1.0 + 0.02 * deviate
        return Corrected(self.lead_deg * scale, tuple(scale * part for part in self.percent))

    def harmonics(self) -> Complex:
        """Amplitudes of odd orders relative to the fundamental."""
        amplitude = np.zeros_like(ORDERS)
        amplitude[0] = 1.0
        amplitude[1 : 1 + len(self.percent)] = np.array(self.percent) / 100.0
        signs = np.where(np.arange(ORDERS.size) % 2 == 0, 1.0, -1.0)
        return np.asarray(signs * amplitude * np.exp(1j * ORDERS * np.radians(self.lead_deg)))


Driver = Rectifier | Corrected


@dataclass(frozen=True)
class Capture:
    """Voltage and current of one unit as peak phasors of odd orders, angle 0 at the crest."""

    voltage: Complex
    current: Complex

    @cached_property
    def power_w(self) -> float:
        """Active power [W]."""
        return float(np.sum((self.voltage * np.conj(self.current)).real) / 2.0)

    @cached_property
    def voltage_v(self) -> float:
        """RMS voltage [V]."""
        return float(np.sqrt(np.sum(np.abs(self.voltage) ** 2) / 2.0))

    @cached_property
    def current_a(self) -> float:
        """RMS current [A]."""
        return float(np.sqrt(np.sum(np.abs(self.current) ** 2) / 2.0))

    @cached_property
    def power_factor(self) -> float:
        """Active over apparent power."""
        return self.power_w / (self.voltage_v * self.current_a)

    @cached_property
    def displacement_factor(self) -> float:
        """Cosine of the angle between the fundamentals."""
        return float(np.cos(np.angle(self.current[0]) - np.angle(self.voltage[0])))

    @cached_property
    def thd_current_percent(self) -> float:
        """Distortion of the current, orders 2 to 40, relative to the fundamental [%]."""
        inside = (ORDERS > 1.0) & (ORDERS <= 40.0)
        rest = np.sqrt(np.sum(np.abs(self.current[inside]) ** 2))
        return float(100.0 * rest / np.abs(self.current[0]))

    def samples(self, rate_hz: float, cycles: int, start_rad: float) -> tuple[Array, Array, Array]:
        """Time [s], voltage [V] and current [A] over whole cycles from a phase of the mains."""
        time_s = np.arange(round(rate_hz * cycles / SUPPLY_HZ)) / rate_hz
        angle = np.outer(2.0 * np.pi * SUPPLY_HZ * time_s + start_rad, ORDERS)
        turning = np.exp(1j * angle)
        return time_s, (turning @ self.voltage).real, (turning @ self.current).real


def capture(driver: Driver, power_w: float) -> Capture:
    """Voltage and current of a driver that takes a given active power from the supply [W]."""
    distortion = np.array([SUPPLY_DISTORTION.get(order, 0.0) for order in ORDERS])
    distortion[0] = 1.0
    voltage = np.sqrt(2.0) * SUPPLY_V * distortion * np.exp(0.4j * (ORDERS - 1.0))
    shape = driver.harmonics()
    return Capture(voltage, shape * (power_w / Capture(voltage, shape).power_w))
