"""The mains frequency; the checks are waveforms of known frequency."""

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.electrical import mains_frequency

Array = NDArray[np.float64]


def voltage(frequency_hz: float, cycles: float, rate_hz: float, phase: float = 0.7) -> Array:
    """A mains voltage with third, fifth and seventh harmonic, as networks have."""
    angle = 2 * np.pi * frequency_hz * np.arange(round(cycles / frequency_hz * rate_hz)) / rate_hz
    angle = angle + phase
    shape = np.sin(angle) + 0.03 * np.sin(3 * angle) + 0.05 * np.sin(5 * angle + 1)
    return np.asarray(325 * (shape + 0.03 * np.sin(7 * angle)), dtype=np.float64)


@pytest.mark.parametrize("rate_hz", [5000.0, 20000.0, 51200.0])
@pytest.mark.parametrize("cycles", [2.0, 2.37, 5.5, 10.0, 24.85])
@pytest.mark.parametrize("frequency_hz", [49.7, 50.0, 50.02, 60.0, 60.31])
def test_frequency(frequency_hz: float, cycles: float, rate_hz: float) -> None:
    wave = voltage(frequency_hz, cycles, rate_hz)
    # Worst over all: the fraction of a sample at the ends of a record of two cycles.
    assert mains_frequency(wave[None, :], rate_hz)[0] == pytest.approx(frequency_hz, rel=2e-4)
    if cycles >= 5:
        assert mains_frequency(wave[None, :], rate_hz)[0] == pytest.approx(frequency_hz, rel=2e-5)


def test_noise_does_not_disturb() -> None:
    rng = np.random.default_rng(1)
    clean = voltage(49.93, 12.3, 20000.0)
    wave = clean + 3 * rng.standard_normal((20, clean.size))
    np.testing.assert_allclose(mains_frequency(wave, 20000.0), 49.93, atol=0.01)


def test_no_mains_has_no_frequency() -> None:
    rng = np.random.default_rng(1)
    angle = 2 * np.pi * np.arange(4000) / 20000
    waves = np.stack(
        [
            np.zeros(4000),
            np.full(4000, 230.0),
            rng.standard_normal(4000),
            300 * np.sin(400 * angle),
            300 * np.sin(16.7 * angle),
        ]
    )
    assert np.isnan(mains_frequency(waves, 20000.0)).all()


def test_less_than_two_cycles_are_not_enough() -> None:
    assert np.isnan(mains_frequency(voltage(50.0, 1.9, 20000.0)[None, :], 20000.0))[0]
    assert np.isnan(mains_frequency(np.ones((1, 5)), 20000.0))[0]
    assert np.isnan(mains_frequency(voltage(50.0, 10, 250.0)[None, :], 250.0))[0]
