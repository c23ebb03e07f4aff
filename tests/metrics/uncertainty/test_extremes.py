"""What noise does to extremes: order statistics of the normal distribution."""

import numpy as np
import pytest

from generator.metrics.uncertainty import noise_of_highest, noise_of_swing_percent


@pytest.mark.parametrize(
    ("count", "surplus", "scatter"),
    # Mean and standard deviation of the largest of n unit Gaussians: 1.539 and 0.587 for 10,
    # 2.508 and 0.429 for 100, 3.241 and 0.351 for 1000 (tables of Tippett 1925, from memory).
    [(10, 1.539, 0.587), (100, 2.508, 0.429), (1000, 3.241, 0.351)],
)
def test_surplus_and_scatter_of_equal_samples(count, surplus, scatter):
    rng = np.random.default_rng(count)
    noise = rng.standard_normal((2000, count))
    up, wide = noise_of_highest(noise, np.ones(2000))
    # the number of equal samples is counted, which is known to some tenths of a deviation
    assert np.mean(up) == pytest.approx(surplus, abs=0.15)
    assert np.mean(wide) == pytest.approx(scatter, abs=0.05)
    assert np.mean(noise.max(axis=1)) == pytest.approx(surplus, abs=0.04)


def test_a_single_high_sample_is_not_lifted():
    values = np.zeros((1, 100))
    values[0, 7] = 10.0
    up, wide = noise_of_highest(values, np.ones(1))
    assert up[0] == pytest.approx(0.0, abs=2e-3)
    assert wide[0] == pytest.approx(1.0, abs=2e-3)


def test_crests_of_correlated_samples_count_one_each():
    wave = np.sin(2 * np.pi * np.arange(0, 10, 0.001))[np.newaxis]
    up, _ = noise_of_highest(wave, np.array([1e-6]), independent=1e-6)
    # the largest of ten unit Gaussians
    assert up[0] == pytest.approx(1.539e-6, rel=0.05)


def test_no_noise_and_no_offset_leave_no_uncertainty():
    wave = 1 + 0.3 * np.sin(2 * np.pi * np.arange(0, 10, 0.01))[np.newaxis]
    assert noise_of_swing_percent(wave, np.zeros(1), 0.0)[0] == pytest.approx(0.0, abs=1e-9)


def test_offset_divides_the_swing():
    # 100 * 0.3 / (1 + d): d = 1 % changes 30 % by 0.3 %
    wave = 1 + 0.3 * np.sin(2 * np.pi * np.arange(0, 10, 0.01))[np.newaxis]
    assert noise_of_swing_percent(wave, np.zeros(1), 0.005)[0] == pytest.approx(0.3, rel=1e-3)


def test_a_swing_that_noise_alone_makes_may_be_none():
    rng = np.random.default_rng(3)
    noise = 1 + 0.01 * rng.standard_normal((50, 5000))
    swing = 100 * np.ptp(noise, axis=1) / (noise.max(axis=1) + noise.min(axis=1))
    assert np.all(noise_of_swing_percent(noise, np.full(50, 0.01), 0.0) >= swing)
