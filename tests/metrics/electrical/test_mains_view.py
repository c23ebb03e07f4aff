"""One mains cycle for drawing; the checks are sines of known phase."""

import numpy as np
import pytest

from generator.metrics.electrical import mains_cycle

ANGLE = 2 * np.pi * 50.1 * np.arange(4100) / 20000


@pytest.mark.parametrize("phase", [0.0, 1.0, 3.0, -2.0])
@pytest.mark.parametrize("lag", [0.6, -0.6])
def test_cycle_starts_at_the_rising_zero(phase: float, lag: float) -> None:
    cycle = mains_cycle(325 * np.sin(ANGLE + phase), 0.1 * np.sin(ANGLE + phase - lag), 20000.0)
    assert cycle is not None
    assert cycle.time_s.size <= 200
    assert cycle.time_s[0] == 0
    assert cycle.time_s[-1] == pytest.approx(1 / 50.1, rel=1e-5)
    turn = 2 * np.pi * 50.1 * cycle.time_s
    np.testing.assert_allclose(cycle.voltage_v, 325 * np.sin(turn), atol=0.02)
    np.testing.assert_allclose(cycle.current_a, 0.1 * np.sin(turn - lag), atol=1e-5)
    assert cycle.phase_angle_deg == pytest.approx(np.degrees(lag), abs=1e-3)


def test_no_mains_no_cycle() -> None:
    assert mains_cycle(np.zeros(4000), np.zeros(4000), 20000.0) is None
    assert mains_cycle(np.full(4000, np.nan), np.zeros(4000), 20000.0) is None
