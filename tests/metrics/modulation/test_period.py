"""The period of the whole waveform; the checks are closed forms."""

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.modulation import fundamental_period, light_lines, two_periods
from generator.metrics.modulation.period import fundamental_frequency, strongest_frequency

RATE_HZ = 20000.0


def seconds(duration: float) -> NDArray[np.float64]:
    return np.arange(round(duration * RATE_HZ)) / RATE_HZ


def frequency(light: NDArray[np.float64]) -> float:
    return float(1 / fundamental_period(light[None, :], RATE_HZ)[0])


@pytest.mark.parametrize("duration_s", [0.2, 0.517, 1.0, 1.3333, 4.1])
@pytest.mark.parametrize("mains_hz", [49.7, 50.0, 60.02])
def test_rectified_light_and_its_asymmetry(duration_s: float, mains_hz: float) -> None:
    wave = np.sin(2 * np.pi * mains_hz * seconds(duration_s) + 0.4)
    assert frequency(np.abs(wave)) == pytest.approx(2 * mains_hz, abs=0.01)
    # Half-cycles of unequal height: the waveform repeats once per mains cycle.
    assert frequency(np.abs(wave) + 0.1 * wave + 0.2) == pytest.approx(mains_hz, abs=0.01)


def test_fundamental_that_is_not_there() -> None:
    time = 2 * np.pi * seconds(1.0)
    light = 1 + 0.2 * np.sin(200 * time) + 0.2 * np.sin(300 * time)
    assert frequency(light) == pytest.approx(100, abs=1e-3)


def test_pulse_width_modulation_beside_ripple() -> None:
    time = seconds(1.0)
    light = ((1237.3 * time + 0.01) % 1 < 0.3) * (1 + 0.1 * np.sin(200 * np.pi * time))
    lines = light_lines(light[None, :], RATE_HZ)
    found, fits = fundamental_frequency(lines)
    assert found[0] == pytest.approx(1237.3, abs=0.01)
    assert not fits[0]
    assert strongest_frequency(lines)[0] == found[0]


def test_noise_and_constant_light_have_no_period() -> None:
    rng = np.random.default_rng(3)
    light = np.stack([np.ones(20000), 1 + 0.01 * rng.standard_normal(20000)])
    assert np.isnan(fundamental_period(light, RATE_HZ)).all()


def test_noise_does_not_hide_the_period() -> None:
    rng = np.random.default_rng(4)
    time = seconds(1.0)
    light = np.abs(np.sin(100 * np.pi * time)) + 0.03 * rng.standard_normal((30, time.size))
    np.testing.assert_allclose(1 / fundamental_period(light, RATE_HZ), 100, atol=0.02)


def test_two_periods_show_two_periods_from_the_rise() -> None:
    time = seconds(1.0)
    at, relative = two_periods(3 + 1.5 * np.sin(200 * np.pi * time + 2), RATE_HZ)
    assert at.size <= 400
    assert at[0] == 0
    assert at[-1] == pytest.approx(0.02, abs=1e-6)
    start = np.arcsin((relative[0] - 1) / 0.5)
    np.testing.assert_allclose(
        relative, 1 + 0.5 * np.sin(200 * np.pi * at + start), atol=1e-3
    )  # straight lines between samples
    assert 1 <= relative[0] < 1.02


def test_light_without_period_is_shown_over_two_mains_cycles() -> None:
    at, relative = two_periods(np.full(20000, 7.0), RATE_HZ)
    assert at[-1] == pytest.approx(0.04)
    np.testing.assert_array_equal(relative, 1.0)
