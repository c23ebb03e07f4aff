"""Coverage factors and means over units; printed numbers of JCGM 100:2008 from memory."""

import math

import numpy as np
import pytest

from generator.metrics.uncertainty import (
    COVERAGE_PROBABILITY,
    coverage_factor,
    expanded_with_lift,
    mean_with_spread,
    welch_satterthwaite,
)


@pytest.mark.parametrize(
    ("freedom", "printed"),
    [
        (1, 13.97), (2, 4.53), (3, 3.31), (4, 2.87), (5, 2.65), (6, 2.52), (8, 2.37),
        (10, 2.28), (20, 2.13), (50, 2.05), (math.inf, 2.000),
    ],
)  # fmt: skip
def test_coverage_factors_for_95_45_percent(freedom, printed):
    # JCGM 100 table G.2, column 95.45 %
    assert coverage_factor(freedom) == pytest.approx(printed, abs=0.005)


def test_coverage_factors_for_other_probabilities():
    # JCGM 100 table G.2: 95 % at 19 degrees 2.09; H.1.6: 99 % at 16 degrees 2.92
    assert coverage_factor(19, 0.95) == pytest.approx(2.09, abs=0.005)
    assert coverage_factor(16, 0.99) == pytest.approx(2.92, abs=0.005)


def test_no_freedom_gives_no_factor():
    with pytest.raises(ValueError, match="degrees of freedom"):
        coverage_factor(0.5)


def test_effective_degrees_of_freedom_of_worked_examples():
    # JCGM 100 G.4.1: 19.0 for 0.25, 0.57, 0.82 % with 9, 4 and 14 degrees of freedom
    product = welch_satterthwaite(np.array([0.25, 0.57, 0.82]), np.array([9.0, 4.0, 14.0]))
    assert product == pytest.approx(19.0, abs=0.05)
    # JCGM 100 H.1.6: 16.7 for 25, 9.7, 2.9 and 16.6 nm with 18, 25.6, 50 and 2 degrees
    gauge = welch_satterthwaite(np.array([25, 9.7, 2.9, 16.6]), np.array([18, 25.6, 50, 2.0]))
    # 0.1: the four contributions are printed to two digits
    assert gauge == pytest.approx(16.7, abs=0.1)


def test_exact_contributions_do_not_limit():
    assert math.isinf(welch_satterthwaite(np.array([1.0, 0.0]), np.array([math.inf, 4.0])))
    assert math.isinf(welch_satterthwaite(np.zeros(2), np.array([1.0, 4.0])))


def test_mean_of_one_unit_keeps_the_uncertainty_of_the_unit():
    mean = mean_with_spread(np.array([806.0]), 16.0)
    assert (mean.mean, mean.expanded_uncertainty, mean.spread) == (806.0, 16.0, None)


def test_mean_without_a_stated_uncertainty_has_none():
    mean = mean_with_spread(np.array([1.0, 2.0, 3.0]), None)
    assert mean.expanded_uncertainty is None
    assert mean.spread == pytest.approx(1.0)


def test_mean_of_type_a_alone_is_students_interval():
    # s/sqrt(n) times t(4) = 2.87 for 95.45 %
    values = np.array([9.0, 10.0, 11.0, 10.0, 10.0])
    mean = mean_with_spread(values, 0.0)
    expected = 2.87 * math.sqrt(0.5) / math.sqrt(5)
    assert mean.expanded_uncertainty == pytest.approx(expected, rel=2e-3)
    assert mean.degrees_of_freedom == pytest.approx(4.0)


def test_common_part_does_not_average_out():
    rng = np.random.default_rng(5)
    many = mean_with_spread(100 + rng.standard_normal(10_000), 6.0)
    assert many.expanded_uncertainty == pytest.approx(6.0, abs=0.01)


def test_no_units_no_mean():
    with pytest.raises(ValueError, match="one value"):
        mean_with_spread(np.array([]), 1.0)


def share_held(units, common, lamps=20_000):
    """Share of synthetic lamps whose interval holds the truth.

    Truth 100, units spread 2, laboratory error of expanded size `common`.
    """
    rng = np.random.default_rng(units)
    readings = 100 + 2 * rng.standard_normal((lamps, units))
    readings += common / 2 * rng.standard_normal((lamps, 1))
    results = [mean_with_spread(row, common) for row in readings]
    return np.mean([abs(one.mean - 100) <= one.expanded_uncertainty for one in results])


@pytest.mark.parametrize("units", [5, 10, 20])
@pytest.mark.parametrize("common", [0.0, 1.0, 2.0, 4.0])
def test_intervals_of_means_hold_the_truth_as_often_as_they_say(units, common):
    # 95.45 % meant; 4000 lamps know the share to 0.33 %
    assert 0.93 <= share_held(units, common, 4000) <= 0.97
    assert pytest.approx(0.9545, abs=5e-5) == COVERAGE_PROBABILITY


@pytest.mark.parametrize(("units", "least"), [(2, 0.87), (3, 0.915), (4, 0.93)])
def test_intervals_of_means_over_few_units_fall_somewhat_short(units, least):
    # The effective degrees of freedom are themselves taken from the spread. Three units that
    # happen to lie close together give a small spread, which then seems not to matter, and with
    # it the factor falls from 4.53 towards 2: too narrow twice over. Where the part of the
    # spread is about as large as the common part that leaves 88.5 % for two units, 92.5 % for
    # three and 94.2 % for four; nothing is lost where either part dominates.
    worst = min(share_held(units, common, 4000) for common in (0.5, 1.0, 2.0, 4.0))
    assert least <= worst <= 0.95
    assert 0.945 <= share_held(units, 0.0, 4000) <= 0.97
    assert 0.945 <= share_held(units, 20.0, 4000) <= 0.97


def test_a_part_of_each_unit_alone_is_counted_twice_in_the_mean():
    # Noise drawn for each reading shows in the spread and is stated as if common to all: the
    # interval of the mean is then too wide, never too narrow.
    rng = np.random.default_rng(1)
    readings = 100 + rng.standard_normal((2000, 10))
    held = [
        abs(one.mean - 100) <= one.expanded_uncertainty
        for one in (mean_with_spread(row, 2.0) for row in readings)
    ]
    assert np.mean(held) >= 0.99


def test_a_lift_is_covered_with_the_same_probability():
    # one-sided 95.45 % is 1.690 deviations
    lift = np.array([0.0, 0.5, 1.0, 10.0])
    wide = expanded_with_lift(lift, np.ones(4))
    assert wide[0] == pytest.approx(2.0, abs=1e-3)
    assert wide[3] == pytest.approx(11.690, abs=1e-3)
    drawn = lift + np.random.default_rng(2).standard_normal((200_000, 4))
    np.testing.assert_allclose(np.mean(np.abs(drawn) <= wide, axis=0), 0.9545, atol=2e-3)
    assert expanded_with_lift(np.array([0.3]), np.zeros(1))[0] == pytest.approx(0.3)
