"""Quotients and distances of two readings by one instrument."""

import numpy as np
import pytest

from generator.metrics.uncertainty import combine_powers, distance_uncertainty, quotient_uncertainty

LAMPS = 4000


def test_calibration_cancels_as_full_correlation_says():
    # JCGM 100 equation 16 with readings that share 1.5 % and are each 0.3 % apart (k = 2)
    one = np.hypot(1.5, 0.3) / 100
    shared = (1.5 / 100 / one) ** 2
    correlation = np.array([[1.0, shared], [shared, 1.0]])
    readings = np.array([800.0, 750.0])
    relative = combine_powers(readings, np.array([-1.0, 1.0]), readings * one, correlation)
    factor = np.array([750 / 800])
    assert quotient_uncertainty(factor, 0.3)[0] == pytest.approx(float(relative) * factor[0])


def test_intervals_of_lumen_maintenance_hold_the_truth():
    rng = np.random.default_rng(3)
    truth = rng.uniform(0.85, 1.0, LAMPS)
    common = 1 + 0.0075 * rng.standard_normal(LAMPS)
    first, last = common * (1 + 0.0015 * rng.standard_normal((2, LAMPS)))
    seen = truth * last / first
    share = np.mean(np.abs(seen - truth) <= quotient_uncertainty(seen, 0.3))
    # 95.45 % meant; 4000 lamps know the share to 0.33 %
    assert 0.94 <= share <= 0.97


@pytest.mark.parametrize("true_distance", [0.0, 0.0005, 0.002, 0.01])
def test_intervals_of_chromaticity_shift_hold_the_truth(true_distance):
    # each coordinate of each reading 0.0004 apart (k = 2)
    rng = np.random.default_rng(17)
    first, last = 0.0002 * rng.standard_normal((2, LAMPS, 2))
    moved = last - first + np.array([true_distance, 0.0])
    seen = np.hypot(moved[:, 0], moved[:, 1])
    share = np.mean(np.abs(seen - true_distance) <= distance_uncertainty(seen, 0.0004))
    # 95.45 % meant; near three deviations the two rules meet and hold up to 98 %
    assert 0.94 <= share <= 0.985
