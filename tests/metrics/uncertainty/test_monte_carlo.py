"""Worked examples of JCGM 101:2008, clause 9; printed numbers from memory.

Tolerances: a Monte Carlo of 200 000 trials knows a standard uncertainty to 0.2 % and the ends
of a 95 % interval to about half a percent of the standard uncertainty, so one digit fewer than
printed is asked for.
"""

import numpy as np
import pytest

from generator.metrics.uncertainty import coverage_interval, monte_carlo, stable_generator

TRIALS = 200_000


def additive(*inputs):
    return sum(inputs)


def test_additive_model_of_four_normal_inputs():
    # 9.2.2: y = 0, u = 2.0, 95 % interval -3.92 to 3.92
    result = monte_carlo(
        additive, lambda g, n: tuple(g.standard_normal((4, n))), stable_generator("9.2.2"), TRIALS
    )
    assert result.estimate == pytest.approx(0.0, abs=0.02)
    assert result.standard_uncertainty == pytest.approx(2.0, abs=0.02)
    assert [result.low, result.high] == pytest.approx([-3.92, 3.92], abs=0.04)


def test_additive_model_of_four_rectangular_inputs():
    # 9.2.3: u = 2.0, 95 % interval -3.88 to 3.88
    half = np.sqrt(3.0)
    result = monte_carlo(
        additive,
        lambda g, n: tuple(g.uniform(-half, half, (4, n))),
        stable_generator("9.2.3"),
        TRIALS,
    )
    assert result.standard_uncertainty == pytest.approx(2.0, abs=0.02)
    assert [result.low, result.high] == pytest.approx([-3.88, 3.88], abs=0.03)


def test_additive_model_with_one_dominant_rectangular_input():
    # 9.2.4: u = 10.1, 95 % interval -17.0 to 17.0 (propagation of uncertainty gives 19.9)
    half = np.sqrt(3.0) * np.array([[1.0], [1.0], [1.0], [10.0]])
    result = monte_carlo(
        additive,
        lambda g, n: tuple(half * g.uniform(-1, 1, (4, n))),
        stable_generator("9.2.4"),
        TRIALS,
    )
    assert result.standard_uncertainty == pytest.approx(10.1, abs=0.06)
    assert [result.low, result.high] == pytest.approx([-17.0, 17.0], abs=0.1)


def test_mass_calibration():
    # 9.3.2, table 6: deviation 1.2341 mg, u = 0.0754 mg, shortest interval 1.0834 to 1.3825 mg
    def deviation(reference, small, air, weight_density, reference_density):
        factor = 1 + (air - 1.2) * (1 / weight_density - 1 / reference_density)
        return (reference + small) * factor - 100_000

    def draw(generator, trials):
        return (
            100_000 + 0.050 * generator.standard_normal(trials),
            1.234 + 0.020 * generator.standard_normal(trials),
            generator.uniform(1.10, 1.30, trials),
            generator.uniform(7_000, 9_000, trials),
            generator.uniform(7_950, 8_050, trials),
        )

    result = monte_carlo(deviation, draw, stable_generator("9.3"), TRIALS, shortest=True)
    assert result.estimate == pytest.approx(1.2341, abs=0.001)
    assert result.standard_uncertainty == pytest.approx(0.0754, abs=0.0005)
    # 0.006: the shortest interval wanders with the sample, its width does not
    assert [result.low, result.high] == pytest.approx([1.0834, 1.3825], abs=0.006)
    assert result.high - result.low == pytest.approx(0.2991, abs=0.003)


@pytest.mark.parametrize(
    ("estimate", "mean", "deviation", "low", "high"),
    [(0.0, 50, 50, 0, 150), (0.010, 150, 112, 0, 367), (0.050, 2551, 502, 1590, 3543)],
)
def test_comparison_loss_in_power_meter_calibration(estimate, mean, deviation, low, high):
    # 9.4.2.2, table 8, in units of 1e-6: u(x) = 0.005, no correlation, shortest 95 % interval
    result = monte_carlo(
        lambda real, imaginary: 1e6 * (real**2 + imaginary**2),
        lambda g, n: (estimate + 0.005 * g.standard_normal(n), 0.005 * g.standard_normal(n)),
        stable_generator("9.4", str(estimate)),
        TRIALS,
        shortest=True,
    )
    assert result.estimate == pytest.approx(mean, rel=0.01)
    assert result.standard_uncertainty == pytest.approx(deviation, rel=0.01)
    assert [result.low, result.high] == pytest.approx([low, high], abs=0.05 * deviation)


def test_intervals_of_several_outputs_are_taken_one_by_one():
    sample = np.stack([np.arange(1000.0), np.arange(1000.0) ** 2], axis=1)
    low, high = coverage_interval(sample, 0.9, shortest=True)
    # uniform: any stretch of 900 steps; squares: the densest stretch starts at 0
    assert high[0] - low[0] == 900
    assert low[1] == 0
    low, high = coverage_interval(sample, 0.9)
    assert (low[0], high[0]) == (50, 950)


def test_generators_depend_on_words_alone():
    one = stable_generator("noise", "L1/U1").standard_normal(4)
    np.testing.assert_array_equal(one, stable_generator("noise", "L1/U1").standard_normal(4))
    assert not np.any(one == stable_generator("noise", "L1/U2").standard_normal(4))
    assert not np.any(one == stable_generator("noiseL1/U1").standard_normal(4))
