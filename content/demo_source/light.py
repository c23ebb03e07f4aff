"""Forward model of light against time: ripple of the driver, pulse-width modulation, hunting."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

__all__ = ["Modulation", "flicker_index", "percent_flicker", "record", "stroboscopic_visibility"]

Array = NDArray[np.float64]

RIPPLE_HZ = 100.0


@dataclass(frozen=True, slots=True)
class Modulation:
    """How the light of a lamp moves about its mean.

    Parameters
    ----------
    ripple
        Amplitudes of 100 Hz and its multiples, relative to the mean; sines, so that two or more
        make the sawtooth of a capacitor that is charged and discharged.
    hunting_hz, hunting
        Frequency [Hz] and amplitude of a slow oscillation of the driver.
    pulse_hz, duty
        Frequency [Hz] and duty cycle of pulse-width modulation; 0 for none.
    """

    ripple: tuple[float, ...] = (0.004,)
    hunting_hz: float = 0.0
    hunting: float = 0.0
    pulse_hz: float = 0.0
    duty: float = 1.0

    def at(self, time_s: Array, width_s: float, strength: float = 1.0) -> Array:
        """Light relative to its mean, each sample averaged over the width of one sample."""
        light = np.ones_like(time_s)
        for order, amplitude in enumerate(self.ripple, start=1):
            light += strength * amplitude * np.sin(2.0 * np.pi * RIPPLE_HZ * order * time_s)
        light += self.hunting * np.sin(2.0 * np.pi * self.hunting_hz * time_s)
        if self.pulse_hz and self.pulse_hz * width_s < 0.5:
            light *= self._pulses(time_s, width_s)
        return light

    def _pulses(self, time_s: Array, width_s: float) -> Array:
        def lit(cycles: Array) -> Array:
            whole = np.floor(cycles)
            return np.asarray(whole * self.duty + np.minimum(cycles - whole, self.duty))

        first = time_s * self.pulse_hz
        share = lit(first + width_s * self.pulse_hz) - lit(first)
        return np.asarray(share / (width_s * self.pulse_hz * self.duty))


def record(
    modulation: Modulation,
    rate_hz: float,
    start_s: Array,
    strength: Array,
    noise: Array,
    level: float,
) -> Array:
    """Readings of a photodetector for several units.

    A record whose rate is too low for the pulses was taken behind a low-pass filter and shows
    none of them.

    Parameters
    ----------
    modulation
        How the light moves.
    rate_hz
        Sampling rate [Hz].
    start_s
        Where in the mains period each record starts [s] (units,).
    strength
        Factor on the ripple of each unit (units,).
    noise
        Noise relative to the mean (samples, units).
    level
        Mean reading of the detector [V].

    Returns
    -------
    NDArray
        Readings [V] (samples, units).
    """
    time_s = np.arange(noise.shape[0]) / rate_hz
    columns = [
        modulation.at(time_s + start, 1.0 / rate_hz, factor)
        for start, factor in zip(start_s, strength, strict=True)
    ]
    return np.asarray(level * np.maximum(np.stack(columns, axis=1) + noise, 0.0))


def _period(modulation: Modulation, strength: float) -> Array:
    return modulation.at(np.arange(4000) / 4000 / RIPPLE_HZ, 2.5e-6, strength)


def percent_flicker(modulation: Modulation, strength: float = 1.0) -> float:
    """Modulation depth of one period of the ripple [%], without noise."""
    light = _period(modulation, strength)
    return float(100.0 * (light.max() - light.min()) / (light.max() + light.min()))


def flicker_index(modulation: Modulation, strength: float = 1.0) -> float:
    """Flicker index of one period of the ripple, without noise."""
    light = _period(modulation, strength)
    return float(np.sum(np.maximum(light - light.mean(), 0.0)) / np.sum(light))


def stroboscopic_visibility(modulation: Modulation, strength: float = 1.0) -> float:
    """Stroboscopic visibility measure of the ripple, from its amplitudes (IEC TR 63158)."""
    frequency_hz = RIPPLE_HZ * np.arange(1, len(modulation.ripple) + 1)
    threshold = 1.0 / (1.0 + np.exp(-0.00518 * (frequency_hz - 306.6)))
    threshold += 20.0 * np.exp(-frequency_hz / 10.0)
    relative = strength * np.asarray(modulation.ripple) / threshold
    return float(np.sum(relative**3.7) ** (1.0 / 3.7))
