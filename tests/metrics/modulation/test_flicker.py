"""Percent flicker and flicker index against the closed forms of their definitions.

Definitions: cie_eilv term 39 and iec_60050_845 entry 845-22-094. The closed forms follow from
integrating each waveform over one period.
"""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from generator.metrics.modulation import flicker_index, fundamental_period, percent_flicker

RATE_HZ = 50000.0
Array = NDArray[np.float64]


def cycles(frequency_hz: float, duration_s: float = 1.0037) -> Array:
    # A quarter sample off, so that no edge falls on a sample.
    number = np.arange(round(duration_s * RATE_HZ), dtype=np.float64)
    return frequency_hz * (number + 0.25) / RATE_HZ


def index(light: Array) -> float:
    batch = light[None, :]
    return float(flicker_index(batch, RATE_HZ, fundamental_period(batch, RATE_HZ))[0])


def pulse(phase: Array, duty: float) -> Array:
    return np.where(phase % 1 < duty, 1.0, 0.0)


RECTIFIED = math.sqrt(1 - 4 / math.pi**2) - 1 + 2 / math.pi * math.asin(2 / math.pi)


@pytest.mark.parametrize("frequency_hz", [100.0, 120.0, 99.4])
def test_closed_forms(frequency_hz: float) -> None:
    phase = cycles(frequency_hz)
    sine = np.sin(2 * np.pi * phase)
    triangle = 1 - 4 * np.abs(phase % 1 - 0.5)
    cases: list[tuple[Array, float, float]] = [
        (1 + 0.3 * sine, 30.0, 0.3 / math.pi),
        (1 + sine, 100.0, 1 / math.pi),
        (1 + 0.4 * triangle, 40.0, 0.1),
        (1 + triangle, 100.0, 0.25),
        (pulse(phase, 0.1), 100.0, 0.9),
        (pulse(phase, 0.25), 100.0, 0.75),
        (1 + 0.6 * (2 * pulse(phase, 0.5) - 1), 60.0, 0.3),
        (2 + 6 * pulse(phase, 0.3), 60.0, 0.3 * 0.7 * 6 / (0.3 * 8 + 0.7 * 2)),
        (np.abs(np.sin(np.pi * phase)), 100.0, RECTIFIED),
        (np.sin(np.pi * phase) ** 2, 100.0, 1 / math.pi),
    ]
    for light, percent, expected in cases:
        assert percent_flicker(light[None, :])[0] == pytest.approx(percent, abs=0.4)
        # The duty cycle itself comes in steps of one sample of some 500.
        assert index(light) == pytest.approx(expected, abs=1.1e-3)


def test_rectified_sine_to_six_digits() -> None:
    # 0.210514: value of the closed form.
    assert pytest.approx(0.210514, abs=5e-7) == RECTIFIED
    assert index(np.abs(np.sin(np.pi * cycles(100.0)))) == pytest.approx(RECTIFIED, abs=2e-5)


def test_index_counts_whole_periods_of_the_whole_waveform() -> None:
    # 2.5 periods of 20 ms: cutting at 10 ms would weigh the higher half-cycle three to two.
    wave = np.sin(2 * np.pi * cycles(50.0, 0.25))
    light = 1 + 0.5 * wave
    assert index(light) == pytest.approx(0.5 / math.pi, abs=1e-4)
    blind = float(flicker_index(light[None, :], RATE_HZ, np.array([np.nan]))[0])
    assert abs(blind - 0.5 / math.pi) > 1e-3


def test_noise_hardly_moves_the_index_but_moves_percent_flicker() -> None:
    rng = np.random.default_rng(11)
    light = 1 + 0.3 * np.sin(2 * np.pi * cycles(100.0))
    noisy = light + 0.01 * rng.standard_normal(light.size)
    assert index(noisy) == pytest.approx(index(light), rel=2e-3)
    assert percent_flicker(noisy[None, :])[0] > 31.5


@settings(max_examples=25, deadline=None)
@given(
    shift=st.floats(0, 1),
    scale=st.floats(1e-6, 1e6),
    depth=st.floats(0.05, 0.9),
    frequency_hz=st.floats(80, 400),
)
def test_shift_and_scale_change_nothing(
    shift: float, scale: float, depth: float, frequency_hz: float
) -> None:
    def light(offset: float) -> Array:
        phase = cycles(frequency_hz, 0.4)
        return 1 + depth * np.sin(2 * np.pi * (phase + offset))

    moved = scale * light(shift)
    assert index(moved) == pytest.approx(index(light(0.0)), rel=1e-3)
    assert percent_flicker(moved[None, :])[0] == pytest.approx(
        float(percent_flicker(light(0.0)[None, :])[0]), rel=1e-3
    )
