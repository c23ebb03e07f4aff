"""The low-risk line of ieee_1789, clause 8.1.1, as quoted in secondary texts."""

import numpy as np

from generator.metrics.modulation import LOW_RISK_LINE, low_risk_modulation


def test_values_of_the_line() -> None:
    found = low_risk_modulation(np.array([40.0, 89.9, 100.0, 120.0, 1000.0]))
    np.testing.assert_allclose(found, [1.0, 2.2475, 8.0, 9.6, 80.0], rtol=1e-12)


def test_no_limit_above_and_no_frequency() -> None:
    assert np.isnan(low_risk_modulation(np.array([1250.0, 3000.0, np.nan]))).all()


def test_line_ends_where_it_reaches_everything() -> None:
    # 100 % / 0.08 = 1250 Hz
    assert LOW_RISK_LINE[-1].to_hz * LOW_RISK_LINE[-1].percent_per_hz == 100
