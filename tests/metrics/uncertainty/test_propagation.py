"""Worked examples of JCGM 100:2008; printed numbers from memory unless said otherwise."""

import numpy as np
import pytest

from generator.metrics.uncertainty import combine, combine_powers


def test_resistance_and_reactance_with_correlated_inputs():
    # JCGM 100 H.2, approach 1, from the five sets of readings of table H.2 [V, mA, rad]
    readings = np.array(
        [
            [5.007, 4.994, 5.005, 4.990, 4.999],
            [19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3],
            [1.0456, 1.0438, 1.0468, 1.0428, 1.0433],
        ]
    )
    v, i, phi = readings.mean(axis=1)
    u = readings.std(axis=1, ddof=1) / np.sqrt(5)
    # The uncertainties and correlations of the means stand in the documentation of three
    # public packages: 0.0032 V, 0.0095 mA, 0.00075 rad; -0.36, 0.86, -0.65.
    r = np.corrcoef(readings)
    assert u == pytest.approx([0.0032, 9.5e-6, 0.00075], rel=0.02)
    assert [r[0, 1], r[0, 2], r[1, 2]] == pytest.approx([-0.36, 0.86, -0.65], abs=0.005)
    z = v / i
    cosine, sine = np.cos(phi), np.sin(phi)
    sensitivity = np.array(
        [
            [cosine / i, sine / i, 1 / i],
            [-z * cosine / i, -z * sine / i, -z / i],
            [-z * sine, z * cosine, 0.0],
        ]
    )
    # Table H.3: R = 127.732, X = 219.847, Z = 254.260 ohm; u = 0.071, 0.295, 0.236 ohm.
    assert [z * cosine, z * sine, z] == pytest.approx([127.732, 219.847, 254.260], abs=5e-4)
    np.testing.assert_allclose(
        combine(sensitivity, np.tile(u[:, None], 3), r), [0.071, 0.295, 0.236], atol=6e-4
    )


def test_product_of_three_inputs():
    # JCGM 100 G.4.1: relative uncertainties 0.25, 0.57, 0.82 % combine to 1.03 %.
    estimates = np.array([2.0, 3.0, 5.0])
    u = estimates * np.array([0.0025, 0.0057, 0.0082])
    assert combine_powers(estimates, np.ones(3), u) == pytest.approx(0.0103, abs=5e-5)


def test_efficacy_of_a_good_and_an_ordinary_laboratory():
    # root sum of 1.5 and 0.5 %, and of 4 and 1 %: 1.6 and 4.1 % (planning values, common practice)
    estimates = np.array([[800.0, 800.0], [8.0, 8.0]])
    u = np.array([[800 * 0.0075, 800 * 0.02], [8 * 0.0025, 8 * 0.005]])
    relative = 200 * combine_powers(estimates, np.array([1.0, -1.0]), u)
    np.testing.assert_allclose(relative, [1.6, 4.1], atol=0.05)


def test_full_correlation_of_a_quotient_cancels():
    estimates = np.array([10.0, 5.0])
    u = estimates * 0.02
    same = np.ones((2, 2))
    assert combine_powers(estimates, np.array([1.0, -1.0]), u, same) == pytest.approx(0, abs=1e-12)
    assert combine_powers(estimates, np.array([1.0, 1.0]), u, same) == pytest.approx(0.04)


def test_an_unknown_input_leaves_the_result_unknown():
    assert np.isnan(combine(np.ones(2), np.array([0.1, np.nan])))


def test_correlation_matrix_must_be_one():
    with pytest.raises(ValueError, match="symmetric"):
        combine(np.ones(2), np.ones(2), np.array([[1.0, 0.5], [0.4, 1.0]]))
