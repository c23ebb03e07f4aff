"""Lines and noise floor; the checks are closed forms."""

import numpy as np
import pytest

from generator.metrics.modulation import light_lines

RATE_HZ = 20000.0


@pytest.mark.parametrize("duration_s", [0.25, 1.0, 1.0037, 1.4999, 3.21])
@pytest.mark.parametrize("frequency_hz", [8.8, 99.7, 100.5, 1999.3])
def test_frequency_and_amplitude_of_one_line(duration_s: float, frequency_hz: float) -> None:
    if frequency_hz * duration_s < 4:
        frequency_hz *= 3
    time = np.arange(round(duration_s * RATE_HZ)) / RATE_HZ
    lines = light_lines(1 + 0.2 * np.sin(2 * np.pi * frequency_hz * time + 1)[None, :], RATE_HZ)
    at = np.flatnonzero(lines.material[0])
    assert at.size == 1
    # The line's own mirror image, a few bins away at the lowest frequency, costs a thousandth.
    assert lines.frequency_hz[0, at[0]] == pytest.approx(frequency_hz, abs=5e-3)
    assert lines.amplitude[0, at[0]] == pytest.approx(0.2, rel=1e-3)


@pytest.mark.parametrize("samples", [20000, 50000, 200000])
def test_noise_floor_of_white_noise(samples: int) -> None:
    rng = np.random.default_rng(20240101)
    light = 5 + 0.05 * rng.standard_normal((4, samples))
    # 20000 samples fix a standard deviation to 0.5 %; the band medians to some 5 %.
    np.testing.assert_allclose(light_lines(light, RATE_HZ).noise_rms, 0.01, rtol=0.05)


def test_noise_is_no_line() -> None:
    rng = np.random.default_rng(7)
    light = 1 + 0.02 * rng.standard_normal((60, 20000))
    assert not light_lines(light, RATE_HZ).material.any()


def test_slow_drift_is_no_line() -> None:
    ramp = np.linspace(1.0, 1.05, 20000)
    assert not light_lines(np.stack([ramp, np.exp(-ramp), ramp**2]), RATE_HZ).material.any()
