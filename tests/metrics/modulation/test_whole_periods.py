"""Whole periods; the checks are closed forms."""

import numpy as np
import pytest

from generator.metrics.whole_periods import whole_period_samples, whole_period_weights


@pytest.mark.parametrize(
    ("samples", "period", "length"),
    [(100, 10.0, 100.0), (99, 10.0, 90.0), (100, 33.6, 67.2), (100, np.nan, 100.0), (10, 40.0, 10)],
)
def test_weights_add_up_to_the_whole_periods(samples: int, period: float, length: float) -> None:
    weights = whole_period_weights(samples, np.array([period]))
    assert weights.shape == (1, samples)
    assert weights.sum() == pytest.approx(length, abs=1e-9)


def test_weighted_mean_of_a_sine_is_nothing() -> None:
    number = np.arange(9876)
    weights = whole_period_weights(number.size, np.array([402.4144869]))
    mean = np.sum(weights * np.sin(2 * np.pi * number / 402.4144869 + 0.7)) / weights.sum()
    assert abs(mean) < 1e-5
    assert abs(np.mean(np.sin(2 * np.pi * number / 402.4144869 + 0.7))) > 1e-3


def test_samples_come_near_a_whole_number_of_periods() -> None:
    for period in (402.41, 166.67, 193.05, 7.3):
        length = whole_period_samples(20000, period)
        assert length > 17900
        assert abs(length / period - round(length / period)) * period < 0.5


def test_long_records_are_cut_to_lengths_that_transform_fast() -> None:
    for period in (199.96, 200.0004, 166.69):
        length = whole_period_samples(3_600_000, period)
        assert length > 3_239_000
        assert abs(length / period - round(length / period)) * period <= 0.051
        left = length
        for factor in (2, 3, 5, 7, 11, 13, 17, 19, 23):
            while left % factor == 0:
                left //= factor
        # For the period of 166.69 the longest would be 3 599 837, a prime.
        assert left < 1000


def test_one_period_and_none() -> None:
    assert whole_period_samples(100, 80.0) == 80
    assert whole_period_samples(100, 300.0) == 100
    assert whole_period_samples(100, float("nan")) == 100
