"""The light flickermeter against its filters, its closed form and its verification waveforms.

Method: iec_tr_61547_1, Annex A. The magnitudes and sine depths were worked out from the analogue
transfer functions outside this project, to the digits printed; so was the scale.
"""

import math

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.modulation import pst_lm
from generator.metrics.modulation.short_term_flicker import light_response, noise_pst_lm

Array = NDArray[np.float64]


def value(light: Array, rate_hz: float) -> float:
    return float(pst_lm(light[None, :], rate_hz)[0])


def seconds(duration_s: float, rate_hz: float) -> Array:
    return np.arange(round(duration_s * rate_hz)) / rate_hz


RESPONSE = [
    (0.5, 0.025313),
    (1, 0.045838),
    (2, 0.078579),
    (5, 0.207888),
    (8.8, 0.421391),
    (10, 0.436417),
    (15, 0.348303),
    (20, 0.276429),
    (25, 0.229957),
    (100 / 3, 0.148018),
    (40, 0.065272),
    (50, 0.015526),
    (100, 1.4287e-4),
    (120, 4.2437e-5),
]


@pytest.mark.parametrize(("frequency_hz", "magnitude"), RESPONSE)
def test_response(frequency_hz: float, magnitude: float) -> None:
    digit = 5e-7 if magnitude > 1e-3 else 5e-9
    found = light_response(np.array([frequency_hz]), 100000.0)[0]
    # At 100 kHz the discrete filters still differ from the analogue ones, most at 120 Hz.
    assert found == pytest.approx(magnitude, abs=digit, rel=6e-5 if frequency_hz >= 50 else 5e-6)


def test_response_peaks_near_10_hz() -> None:
    frequency = np.linspace(8, 12, 401)
    peak = frequency[np.argmax(light_response(frequency, 20000.0))]
    assert peak == pytest.approx(9.95, abs=0.01)


@pytest.mark.parametrize("rate_hz", [2000.0, 10000.0, 20000.0])
@pytest.mark.parametrize(
    ("frequency_hz", "change_percent"),
    [
        (0.5, 12.726),
        (1, 7.505),
        (2, 4.570),
        (5, 1.779),
        (8.8, 0.8852),
        (10, 0.8559),
        (15, 1.0761),
        (20, 1.3583),
        (25, 1.6345),
        (100 / 3, 2.5420),
        (40, 5.768),
    ],
)
def test_sine_of_unit_pst_lm(frequency_hz: float, change_percent: float, rate_hz: float) -> None:
    light = 1 + change_percent / 200 * np.sin(2 * np.pi * frequency_hz * seconds(60, rate_hz))
    assert value(light, rate_hz) == pytest.approx(1, abs=0.003)


def verification(changes_per_minute: float, depth_percent: float, time: Array) -> Array:
    # A millionth of a turn keeps the edges off the samples, where the sign would be zero.
    edge = np.sign(np.sin(2 * np.pi * changes_per_minute / 120 * time + 1e-6))
    return (1 - 0.11 * np.cos(2 * np.pi * 100 * time)) * (1 + depth_percent / 200 * edge)


@pytest.mark.parametrize("rate_hz", [2000.0, 10000.0, 20000.0])
@pytest.mark.parametrize(
    ("changes_per_minute", "depth_percent", "expected"),
    [
        (39, 2.5386, 1.0004),
        (110, 2.0473, 1.0002),
        (1056, 0.6832, 1.0000),
        (1620, 0.7780, 1.0006),
        (4000, 2.0027, 1.0031),
        (39, 2.5375, 1.0),
        (110, 2.0470, 1.0),
        (1620, 0.7775, 1.0),
        (4000, 1.9965, 1.0),
    ],
)
def test_rectangular_verification_waveforms(
    changes_per_minute: float, depth_percent: float, expected: float, rate_hz: float
) -> None:
    # Depths of iec_tr_61547_1, A.3, known from a secondary text, and those that give exactly 1
    # in the analogue model; the expected values are those of the analogue model.
    light = verification(changes_per_minute, depth_percent, seconds(60, rate_hz))
    assert value(light, rate_hz) == pytest.approx(expected, abs=0.003)


@pytest.mark.parametrize("rate_hz", [40000.0, 50000.0, 100000.0])
def test_high_rates_keep_their_digits(rate_hz: float) -> None:
    # Direct-form filters read 0.951, 1.132 and not-a-number here.
    light = verification(1056, 0.6832, seconds(31, rate_hz))
    assert value(light, rate_hz) == pytest.approx(1, abs=0.003)


def test_longer_records_agree() -> None:
    for duration_s in (30.0, 45.0, 180.0):
        light = verification(1056, 0.6832, seconds(duration_s, 2000.0))
        assert value(light, 2000.0) == pytest.approx(1, abs=0.003)


def test_ripple_at_100_hz_reads_almost_nothing() -> None:
    # Rectified sine: 0.0505 in the analogue model; the start of the record would make it 0.27.
    light = np.abs(np.sin(2 * np.pi * 50 * seconds(60, 20000.0)))
    assert value(light, 20000.0) == pytest.approx(0.0505, abs=5e-4)


def test_proportional_to_depth_and_free_of_scale() -> None:
    # 11.3: 5 % depth is 10 % peak to peak, over 0.8852 % for unit PstLM.
    light = 1 + 0.05 * np.sin(2 * np.pi * 8.8 * seconds(60, 2000.0))
    assert value(light, 2000.0) == pytest.approx(11.3, abs=0.05)
    assert value(450 * light, 2000.0) == pytest.approx(value(light, 2000.0), rel=1e-9)


def test_batch_reads_as_singles() -> None:
    time = seconds(40, 2000.0)
    batch = np.stack([verification(1056, depth, time) for depth in (0.2, 0.6832, 2.0)])
    singles = [value(light, 2000.0) for light in batch]
    np.testing.assert_allclose(pst_lm(batch, 2000.0), singles, rtol=1e-12)


@pytest.mark.parametrize(("rate_hz", "low", "high"), [(2000.0, 0.40, 0.50), (20000.0, 0.12, 0.16)])
def test_white_noise_of_one_percent(rate_hz: float, low: float, high: float) -> None:
    # About 0.45 at 2 kHz and 0.14 at 20 kHz, found outside this project with other noise.
    rng = np.random.default_rng(9)
    light = 1 + 0.01 * rng.standard_normal(round(60 * rate_hz))
    found = value(light, rate_hz)
    assert low < found < high
    # White noise of variance s^2 has the density s^2 / (rate / 2).
    foreseen = noise_pst_lm(np.array([1e-4 / (rate_hz / 2)]), rate_hz)[0]
    assert foreseen == pytest.approx(found, rel=0.15)


def test_short_and_sparse_records_are_refused() -> None:
    with pytest.raises(ValueError, match="30 s at 2000 Hz"):
        pst_lm(np.ones((1, 20 * 2000)), 2000.0)
    with pytest.raises(ValueError, match="1000 Hz"):
        pst_lm(np.ones((1, 60 * 1000)), 1000.0)


def test_constant_light_reads_zero() -> None:
    assert value(np.full(60 * 2000, 3.0), 2000.0) == 0


def test_constant_perception() -> None:
    # The weights of A.6 add up to 0.5096: constant perception of one gives 0.71386. A sine of
    # 8.8 Hz is nearly that, its perception being smoothed to +/- 3 %.
    light = 1 + 0.00630 / 2 * np.sin(2 * np.pi * 8.8 * seconds(60, 2000.0))
    ripple = 1 / math.hypot(1, 2 * math.pi * 17.6 * 0.3)
    expected = math.sqrt((0.5096 + 0.40545 * ripple) / (1 + ripple))
    assert value(light, 2000.0) == pytest.approx(expected, abs=5e-4)
    assert expected == pytest.approx(0.71386, rel=0.01)
