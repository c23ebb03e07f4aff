"""Angles of the current against pulses whose angles are known in closed form."""

from __future__ import annotations

import math

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.electrical import current_conduction

Array = NDArray[np.float64]
RATE_HZ = 20000.0


def half_cycles(samples: int, phase_rad: float, mains_hz: float = 50.0) -> tuple[Array, Array]:
    """Voltage, and the angle within its half cycle [degrees]."""
    turn = 2 * np.pi * mains_hz * np.arange(samples) / RATE_HZ + phase_rad
    return 325 * np.sin(turn), np.degrees(turn) % 180


def angles(voltage: Array, current: Array, mains_hz: float = 50.0) -> tuple[float, float, float]:
    found = current_conduction(voltage[None], current[None], RATE_HZ, np.array([mains_hz]))
    return float(found.start_deg[0]), float(found.last_peak_deg[0]), float(found.end_deg[0])


def half_cosine(place: Array, centre_deg: float, half_width_deg: float) -> Array:
    away = (place - centre_deg) / half_width_deg
    return np.where(np.abs(away) < 1, np.cos(away * np.pi / 2), 0.0)


# A sample is 0.9° at 50 Hz, and the edge lies anywhere between two; without the lines above
# 9 kHz, whose period is 2°, the rise takes up to 1° and reaches 5 % up to 0.5° before its middle.
EDGE_DEG = 1.4


@pytest.mark.parametrize("half_width", [10, 20, 30, 45])
@pytest.mark.parametrize(("samples", "phase"), [(4000, 0.0), (4100, 0.3), (4000, 3.5)])
def test_rectangular_pulse_centred_on_the_peak(half_width: int, samples: int, phase: float) -> None:
    voltage, place = half_cycles(samples, phase)
    current = 0.1 * np.sign(voltage) * (np.abs(place - 90) <= half_width)
    start, last_peak, end = angles(voltage, current)
    assert start == pytest.approx(90 - half_width, abs=EDGE_DEG)
    assert end == pytest.approx(90 + half_width, abs=EDGE_DEG)
    # Of a flat top without its high orders, the last maximum lies near its end.
    assert end - 2.5 < last_peak < end


@pytest.mark.parametrize("mains_hz", [50.0, 60.0, 49.97])
@pytest.mark.parametrize(("centre", "half_width"), [(60, 40), (65, 30), (75, 16), (110, 60)])
def test_half_cosine_pulse(centre: int, half_width: int, mains_hz: float) -> None:
    voltage, place = half_cycles(4100, 0.3, mains_hz)
    current = 0.1 * np.sign(voltage) * half_cosine(place, centre, half_width)
    start, last_peak, end = angles(voltage, current, mains_hz)
    # cos(90° × away) = 0.05
    away = half_width * math.acos(0.05) / (math.pi / 2)
    # A sample is 0.9° or 1.1°; straight lines between samples bend the foot of the pulse by less
    # than half of that.
    assert start == pytest.approx(centre - away, abs=0.5)
    assert end == pytest.approx(centre + away, abs=0.5)
    assert last_peak == pytest.approx(centre, abs=0.2)


def test_sine_in_phase_and_lagging() -> None:
    voltage, _ = half_cycles(4000, 0.3)
    edge = math.degrees(math.asin(0.05))
    assert angles(voltage, voltage / 1000) == pytest.approx((edge, 90, 180 - edge), abs=0.1)
    turn = 2 * np.pi * 50 * np.arange(4000) / RATE_HZ + 0.3
    start, last_peak, end = angles(voltage, np.sin(turn - np.radians(30)))
    # Still flowing against the voltage until 30°, and on to the end of the half cycle.
    assert start == pytest.approx(30 + edge, abs=0.1)
    assert last_peak == pytest.approx(120, abs=0.1)
    assert end == 180


def test_of_two_peaks_the_last_counts_and_the_flow_of_the_higher() -> None:
    voltage, place = half_cycles(4000, 0.0)
    pulses = half_cosine(place, 50, 20) + 0.4 * half_cosine(place, 120, 20)
    start, last_peak, end = angles(voltage, np.sign(voltage) * pulses)
    away = 20 * math.acos(0.05) / (math.pi / 2)
    assert start == pytest.approx(50 - away, abs=0.5)
    assert end == pytest.approx(50 + away, abs=0.5)
    assert last_peak == pytest.approx(120, abs=0.2)


def test_half_cycle_with_the_highest_peak_counts() -> None:
    voltage, place = half_cycles(4000, 0.0)
    current = np.where(voltage > 0, half_cosine(place, 60, 30), -1.2 * half_cosine(place, 80, 30))
    assert angles(voltage, current)[1] == pytest.approx(80, abs=0.2)


def test_components_above_9_khz_do_not_count() -> None:
    voltage, place = half_cycles(4000, 0.0)
    pulse = np.sign(voltage) * half_cosine(place, 60, 40)
    ripple = 0.2 * np.sin(2 * np.pi * 9500 * np.arange(4000) / RATE_HZ)
    assert angles(voltage, pulse + ripple) == pytest.approx(angles(voltage, pulse), abs=0.5)
    # The same at 2 kHz is a current like any other: the last ripple is a peak.
    slow = 0.2 * np.sin(2 * np.pi * 2000 * np.arange(4000) / RATE_HZ)
    assert angles(voltage, pulse + slow)[1] > 65


def test_a_little_noise_moves_no_angle_far() -> None:
    voltage, place = half_cycles(4000, 0.0)
    pulse = np.sign(voltage) * half_cosine(place, 60, 40)
    noise = 0.005 * np.random.default_rng(7).standard_normal(4000)
    found = angles(voltage, pulse + noise)
    # The top is flat: 0.5 % of it is 2.5° from the centre; the feet are steep.
    assert found == pytest.approx(angles(voltage, pulse), abs=3)


def test_a_current_against_the_voltage_has_no_angles() -> None:
    voltage, place = half_cycles(4000, 0.0)
    found = angles(voltage, -np.sign(voltage) * half_cosine(place, 60, 40))
    assert all(math.isnan(angle) for angle in found)
