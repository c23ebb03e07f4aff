"""The stroboscopic visibility measure against its closed forms.

Formula: iec_tr_63158, Annex A.1. The expected values are sums of the Fourier series of each
waveform over its lines to 2000 Hz, worked out outside this project to the digits printed.
"""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from generator.metrics.modulation import light_lines, svm, visibility_threshold

Array = NDArray[np.float64]


def value(light: Array, rate_hz: float) -> float:
    return float(svm(light_lines(light[None, :], rate_hz))[0])


@pytest.mark.parametrize(
    ("frequency_hz", "threshold"),
    [
        (40, 0.567163),
        (50, 0.344053),
        (80, 0.242880),
        (100, 0.256275),
        (120, 0.275684),
        (200, 0.365357),
        (240, 0.414598),
        (300, 0.491454),
        (400, 0.618648),
        (500, 0.731415),
        (1000, 0.973190),
        (2000, 0.999845),
    ],
)
def test_threshold(frequency_hz: float, threshold: float) -> None:
    assert visibility_threshold(np.array([frequency_hz]))[0] == pytest.approx(threshold, abs=5e-7)


def test_threshold_is_lowest_near_77_hz() -> None:
    frequency = np.linspace(60, 100, 401)
    threshold = visibility_threshold(frequency)
    assert frequency[np.argmin(threshold)] == pytest.approx(76.8, abs=0.05)
    assert threshold.min() == pytest.approx(0.24243, abs=5e-6)


DURATIONS_S = [1.0, 1.0037, 1.5, 2.713]


@pytest.mark.parametrize("duration_s", DURATIONS_S)
@pytest.mark.parametrize(
    ("frequency_hz", "depth", "expected"),
    [
        (100.0, 1.0, 3.90205),
        (120.0, 1.0, 3.62734),
        (100.0, 0.1025, 0.4),
        (100.0, 0.2306, 0.9),
        (100.0, 0.2563, 1.0),
        (120.0, 0.1103, 0.4),
        (120.0, 0.2481, 0.9),
        (120.0, 0.2757, 1.0),
    ],
)
def test_sine(duration_s: float, frequency_hz: float, depth: float, expected: float) -> None:
    time = np.arange(round(duration_s * 20000)) / 20000
    light = 1 + depth * np.sin(2 * np.pi * frequency_hz * time)
    assert value(light, 20000.0) == pytest.approx(expected, rel=1e-3)


def shape(name: str, phase: Array) -> Array:
    kind, _, duty = name.partition(" ")
    if kind == "pulse":
        return np.where(phase % 1 < float(duty), 1.0, 0.0)
    if kind == "triangle":
        return np.asarray(2 - 4 * np.abs(phase % 1 - 0.5))
    return np.abs(np.sin(np.pi * phase))


@pytest.mark.parametrize("duration_s", DURATIONS_S)
@pytest.mark.parametrize(
    ("name", "at_100_hz", "at_120_hz"),
    [
        ("pulse 0.5", 4.97041, 4.62002),
        ("pulse 0.1", 8.23730, 7.56548),
        ("pulse 0.25", 7.16731, 6.63957),
        ("pulse 0.9", 0.91526, 0.84061),
        ("triangle", 3.16291, 2.94023),
        ("rectified", 2.60187, 2.41861),
    ],
)
def test_closed_forms(duration_s: float, name: str, at_100_hz: float, at_120_hz: float) -> None:
    # Sampling a pulse raises its lines by (pi n / N)^2 / 6; N = 1000 keeps that below 0.1 %.
    for frequency_hz, expected in ((100.0, at_100_hz), (120.0, at_120_hz)):
        rate_hz = 1000 * frequency_hz
        phase = (np.arange(round(duration_s * rate_hz)) + 0.25) / 1000
        light = shape(name, phase)
        assert value(light, rate_hz) == pytest.approx(expected, rel=1e-3)


@pytest.mark.parametrize("duration_s", DURATIONS_S)
def test_three_lines(duration_s: float) -> None:
    angle = 2 * np.pi * np.arange(round(duration_s * 20000)) / 20000
    light = 1 + 0.3 * np.sin(100 * angle) + 0.1 * np.sin(200 * angle + 1)
    light += 0.05 * np.sin(300 * angle + 2)
    assert value(light, 20000.0) == pytest.approx(1.17211, rel=1e-3)


@pytest.mark.parametrize("frequency_hz", [100.0, 100.5, 99.75])
def test_a_line_counts_once_wherever_it_falls(frequency_hz: float) -> None:
    # Traps of a Hann window: every bin summed reads +3.9 %, the highest bin alone down to -15 %.
    angle = 2 * np.pi * np.arange(20000) / 20000
    expected = 0.4 / visibility_threshold(np.array([frequency_hz]))[0]
    assert value(1 + 0.4 * np.sin(frequency_hz * angle), 20000.0) == pytest.approx(
        expected, rel=1e-4
    )


@pytest.mark.parametrize("duration_s", [1.0, 0.3, 1.234])
def test_constant_light_reads_nothing(duration_s: float) -> None:
    # Trap: a mean left in under the window reads 0.055 to 0.065.
    assert value(np.full(round(duration_s * 20000), 812.0), 20000.0) < 1e-6


def test_a_line_on_the_band_edge_counts() -> None:
    time = (np.arange(100000) + 0.25) / 100000
    light = np.where(2000 * time % 1 < 0.5, 1.0, 0.0)
    # The sampled square has 2 / (N sin(pi / N)) of its mean in the first line, N = 50.
    line = 4 / (50 * np.sin(np.pi / 50))
    assert value(light, 100000.0) == pytest.approx(line / 0.999845, rel=1e-4)


def test_nothing_above_the_band_counts() -> None:
    time = np.arange(20000) / 20000
    assert value(1 + 0.5 * np.sin(2 * np.pi * 2300 * time), 20000.0) < 1e-3


def test_long_record_reads_as_its_first_second() -> None:
    time = np.arange(600000) / 20000
    light = 1 + 0.3 * np.sin(2 * np.pi * 100.03 * time) + 0.1 * np.sin(2 * np.pi * 1111 * time)
    assert value(light, 20000.0) == pytest.approx(value(light[:20000], 20000.0), rel=1e-4)


def test_noise_adds_little_and_can_be_left_out() -> None:
    rng = np.random.default_rng(5)
    noise = 1 + 0.01 * rng.standard_normal((5, 20000))
    lines = light_lines(noise, 20000.0)
    assert (svm(lines) > 1e-4).all()
    assert (svm(lines) < 0.01).all()
    np.testing.assert_array_equal(svm(lines, material_only=True), 0.0)


@settings(max_examples=25, deadline=None)
@given(
    shift=st.floats(0, 1),
    scale=st.floats(1e-6, 1e6),
    frequency_hz=st.floats(80, 900),
    second=st.floats(0, 0.4),
)
def test_shift_and_scale_change_nothing(
    shift: float, scale: float, frequency_hz: float, second: float
) -> None:
    def light(offset: float) -> Array:
        angle = 2 * np.pi * (frequency_hz * np.arange(20000) / 20000 + offset)
        return 1 + 0.4 * np.sin(angle) + second * np.sin(2 * angle)

    assert value(scale * light(shift), 20000.0) == pytest.approx(
        value(light(0.0), 20000.0), rel=1e-3
    )


def test_two_lines_add_with_the_exponent_3_7() -> None:
    # Two lines, each just visible: 2^(1/3.7) = 1.20603 (iec_tr_63158, Annex A.1). The tolerance is
    # half the last digit; an exponent of 3.71 gives 1.20542.
    time = np.arange(20000) / 20000
    light = 1 + sum(
        depth * np.sin(2 * np.pi * frequency * time)
        for frequency, depth in ((100, 0.256275), (400, 0.618648))
    )
    assert value(light, 20000.0) == pytest.approx(1.20603, abs=5e-6)
