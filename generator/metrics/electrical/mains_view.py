"""One mains cycle of voltage and current, for drawing."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from generator.metrics.electrical.mains_frequency import mains_frequency
from generator.metrics.electrical.mains_quantities import mains_quantities

__all__ = ["MainsCycle", "mains_cycle"]

Array = NDArray[np.float64]

_POINTS = 200


@dataclass(frozen=True, slots=True, eq=False)
class MainsCycle:
    """One cycle of a mains capture, from the rising zero of the voltage fundamental.

    Parameters
    ----------
    time_s
        Time from the start of the cycle [s] (points,).
    voltage_v, current_a
        Voltage [V] and current [A] (points,).
    phase_angle_deg
        Angle by which the current fundamental lags the voltage fundamental [degrees].
    """

    time_s: Array
    voltage_v: Array
    current_a: Array
    phase_angle_deg: float


def mains_cycle(voltage_v: Array, current_a: Array, sampling_rate_hz: float) -> MainsCycle | None:
    """The first whole cycle of a capture, on 200 points at the most.

    Parameters
    ----------
    voltage_v, current_a
        Voltage [V] and current [A] of one capture, sampled together (samples,).
    sampling_rate_hz
        Samples per second [Hz].

    Returns
    -------
    MainsCycle or None
        The cycle; ``None`` where no mains voltage is found.

    Notes
    -----
    Source: lampassay_methods, mains frequency.
    """
    if not (np.isfinite(voltage_v).all() and np.isfinite(current_a).all()):
        return None
    frequency = mains_frequency(voltage_v[None, :], sampling_rate_hz)
    if not np.isfinite(frequency[0]):
        return None
    found = mains_quantities(voltage_v[None, :], current_a[None, :], sampling_rate_hz, frequency)
    cycle = sampling_rate_hz / float(frequency[0])
    number = np.arange(voltage_v.size)
    whole = round(np.floor((voltage_v.size + 0.5) / cycle) * cycle)
    turn = np.exp(-2j * np.pi * number[:whole] / cycle)
    # The fundamental is sin(w n + angle); it rises through zero where the angle is made up.
    angle = float(np.angle(1j * np.sum(turn * voltage_v[:whole])))
    start = (-angle / (2 * np.pi) % 1.0) * cycle
    place = start + np.linspace(0.0, cycle, min(_POINTS, int(cycle) + 1))
    return MainsCycle(
        time_s=(place - start) / sampling_rate_hz,
        voltage_v=np.interp(place, number, voltage_v),
        current_a=np.interp(place, number, current_a),
        phase_angle_deg=float(np.degrees(found.phase_angle_rad[0])),
    )
