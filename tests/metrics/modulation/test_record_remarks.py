"""Remarks on light records; the cases are records with one known fault each."""

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.modulation import light_lines
from generator.metrics.modulation.record_remarks import clipped, noise_reach_percent

Array = NDArray[np.float64]
TIME = np.arange(20000) / 20000
SINE = 1 + 0.3 * np.sin(2 * np.pi * 100.2 * TIME + 0.3)


@pytest.mark.parametrize(
    "light",
    [
        np.minimum(SINE, 1.25),
        np.round(4095 * np.minimum(SINE, 1.27) / 1.3),
        np.minimum(2 * np.abs(np.sin(100 * np.pi * TIME)), 1.9),
    ],
)
def test_clipped(light: Array) -> None:
    assert clipped(light[None, :])[0]


@pytest.mark.parametrize(
    "light",
    [
        SINE,
        np.round(255 * SINE / 1.3),
        np.round(4095 * SINE / 1.3),
        np.abs(np.sin(100 * np.pi * TIME)),
        np.where(100 * TIME % 1 < 0.95, 1.0, 0.0),
        np.where(100 * TIME % 1 < 0.5, 1.0, 0.2),
        np.maximum(np.sin(200 * np.pi * TIME), 0),
        np.ones(20000),
        np.round(1000 * (1 + 0.0005 * np.sin(200 * np.pi * TIME))),
    ],
)
def test_not_clipped(light: Array) -> None:
    assert not clipped(light[None, :])[0]


def test_reach_of_noise_is_that_of_gaussian_samples() -> None:
    rng = np.random.default_rng(1)
    light = 1 + 0.01 * rng.standard_normal((8, 20000))
    reach = noise_reach_percent(light, light_lines(light, 20000.0))
    found = 100 * (light.max(axis=1) - light.min(axis=1)) / 2
    # sqrt(2 ln n) is the upper side of the expected maximum: 4.45 against about 4.0.
    assert (found < 1.15 * reach).all()
    assert (found > 0.75 * reach).all()


@pytest.mark.parametrize("frequency_hz", [103.7, 1237.3])
def test_edges_are_not_taken_for_noise(frequency_hz: float) -> None:
    light = np.where(frequency_hz * TIME % 1 < 0.4, 1.0, 0.0)[None, :]
    assert noise_reach_percent(light, light_lines(light, 20000.0))[0] < 1e-9
