"""The front of the electrical room: what is given, withheld and remarked."""

import math

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.electrical import mains_figures
from generator.quantities import QUANTITIES

Array = NDArray[np.float64]
RATE_HZ = 20000.0
ANGLE = 2 * np.pi * 50 * np.arange(4100) / RATE_HZ + 0.3
VOLTAGE = 325 * np.sin(ANGLE)
LAMP = 0.05 * np.sin(ANGLE - 0.4) + 0.01 * np.sin(3 * ANGLE)


def one(current: Array, voltage: Array = VOLTAGE) -> tuple[dict[str, float], dict[str, str], str]:
    found = mains_figures(voltage[None, :], current[None, :], RATE_HZ)
    values = {name: float(series[0]) for name, series in found.values.items()}
    reasons = {name: found.reason(name, 0) for name in found.values}
    return values, reasons, "; ".join(found.remarks[0])


def test_gives_its_groups_of_the_catalogue_with_methods() -> None:
    found = mains_figures(VOLTAGE[None, :], LAMP[None, :], RATE_HZ)
    group = {
        name
        for name, entry in QUANTITIES.items()
        if entry.group in {"electrical", "harmonics"}
        and name not in {"standby_power_w", "networked_standby_power_w", "ambient_temperature_c"}
    }
    assert set(found.values) == set(found.methods) == set(found.reasons) == group


def test_every_blank_has_a_reason_and_every_value_none() -> None:
    voltage = np.stack([VOLTAGE] * 5 + [0 * VOLTAGE, np.where(ANGLE < 1, np.nan, VOLTAGE)])
    current = np.stack([LAMP, -LAMP, LAMP / 1000, 0 * LAMP, -LAMP / 1000, LAMP, LAMP])
    for rate_hz, step in ((RATE_HZ, 1), (RATE_HZ / 8, 8)):
        found = mains_figures(voltage[:, ::step], current[:, ::step], rate_hz)
        for name, values in found.values.items():
            for series, value in enumerate(values):
                assert math.isnan(value) == bool(found.reason(name, series)), (name, series)


def test_lamp_of_two_orders() -> None:
    # Closed forms of the two sines.
    values, _, remarks = one(LAMP)
    power = 325 * 0.05 * math.cos(0.4) / 2
    assert values["frequency_hz"] == pytest.approx(50, abs=1e-3)
    assert values["voltage_v"] == pytest.approx(325 / math.sqrt(2), rel=1e-5)
    assert values["current_a"] == pytest.approx(math.hypot(0.05, 0.01) / math.sqrt(2), rel=1e-5)
    assert values["power_w"] == pytest.approx(power, rel=1e-5)
    assert values["displacement_factor"] == pytest.approx(math.cos(0.4), abs=1e-5)
    assert values["power_factor"] == pytest.approx(math.cos(0.4) / math.hypot(1, 0.2), abs=1e-5)
    assert values["thd_current_percent"] == pytest.approx(20, abs=1e-3)
    assert values["thd_current_all_percent"] == pytest.approx(20, abs=1e-3)
    assert values["h3_percent"] == pytest.approx(20, abs=1e-3)
    assert values["h3_ma_per_w"] == pytest.approx(10 / math.sqrt(2) / power, rel=1e-4)
    assert values["h5_percent"] == pytest.approx(0, abs=1e-3)
    assert values["dc_current_percent"] == pytest.approx(0, abs=1e-3)
    assert values["crest_factor"] == pytest.approx(
        np.max(np.abs(LAMP)) / math.hypot(0.05, 0.01) * math.sqrt(2), rel=1e-5
    )
    assert remarks == ""


def test_angles_of_the_current_stand_under_their_names() -> None:
    # A sine that lags by 0.4 rad: 5 % of its peak 2.87° after its own zero, its peak 90° after it.
    values, _, _ = one(0.05 * np.sin(ANGLE - 0.4))
    lag = math.degrees(0.4)
    assert values["current_start_deg"] == pytest.approx(
        lag + math.degrees(math.asin(0.05)), abs=0.1
    )
    assert values["current_last_peak_deg"] == pytest.approx(lag + 90, abs=0.1)
    assert values["current_end_deg"] == 180


def test_angles_are_withheld_where_the_clamp_is_reversed_or_the_current_too_small() -> None:
    for current, reason in ((-LAMP, "clamp appears reversed"), (LAMP / 1000, "below 1 mA")):
        values, reasons, _ = one(current)
        for name in ("current_start_deg", "current_last_peak_deg", "current_end_deg"):
            assert math.isnan(values[name])
            assert reason in reasons[name]


def test_reversed_clamp_is_flagged_and_not_turned_round() -> None:
    values, reasons, remarks = one(-LAMP)
    assert "clamp appears reversed" in remarks
    for name in ("power_w", "power_factor", "displacement_factor", "h3_ma_per_w"):
        assert math.isnan(values[name])
        assert "clamp appears reversed" in reasons[name]
    assert values["thd_current_percent"] == pytest.approx(20, abs=1e-3)
    assert values["apparent_power_va"] > 0


def test_direct_current_and_even_harmonics_are_made_visible() -> None:
    # Half-wave: direct component 2 sqrt(2) / pi of the fundamental, order 2 four thirds over pi.
    values, _, remarks = one(0.1 * np.maximum(np.sin(ANGLE), 0))
    assert values["dc_current_percent"] == pytest.approx(200 * math.sqrt(2) / math.pi, abs=0.01)
    assert values["h2_percent"] == pytest.approx(400 / (3 * math.pi), abs=0.01)
    assert "direct current: 90.0 %" in remarks
    assert "order 2 reaches 42.4 %" in remarks


def test_ratios_are_suppressed_near_zero_current() -> None:
    rng = np.random.default_rng(1)
    values, reasons, remarks = one(1e-4 * rng.standard_normal(ANGLE.size))
    for name in ("thd_current_percent", "displacement_factor", "power_factor", "h3_percent"):
        assert math.isnan(values[name])
        assert "below 1 mA" in reasons[name]
    assert values["current_a"] == pytest.approx(1e-4, rel=0.05)
    assert "below 1 mA" in remarks
    assert "reversed" not in remarks


def test_no_mains_voltage_gives_nothing() -> None:
    values, reasons, _ = one(LAMP, np.full(ANGLE.size, 24.0))
    assert all(math.isnan(value) for value in values.values())
    assert all("no mains voltage" in reason for reason in reasons.values())


def test_batch_reads_as_singles() -> None:
    current = np.stack([LAMP, 2 * LAMP, np.sign(VOLTAGE)])
    found = mains_figures(np.stack([VOLTAGE] * 3), current, RATE_HZ)
    for series, wave in enumerate(current):
        for name, value in one(wave)[0].items():
            assert found.values[name][series] == pytest.approx(value, rel=1e-9, abs=1e-12)


def test_wrong_shapes_are_refused() -> None:
    with pytest.raises(ValueError, match="series, samples"):
        mains_figures(VOLTAGE, LAMP, RATE_HZ)
    with pytest.raises(ValueError, match="shapes"):
        mains_figures(VOLTAGE[None, :], LAMP[None, :10], RATE_HZ)


def test_slow_sampling_withholds_the_orders_it_cannot_see() -> None:
    # 2 kHz at 50 Hz: order 20 lies on half the sampling rate
    found = mains_figures(VOLTAGE[None, ::10], LAMP[None, ::10], RATE_HZ / 10)
    for name in ("thd_current_percent", "thd_current_all_percent", "h20_percent", "h40_ma_per_w"):
        assert math.isnan(found.values[name][0])
        assert "sampled too slowly" in found.reason(name, 0)
    assert found.values["h19_percent"][0] == pytest.approx(0, abs=1e-3)
    assert found.values["h3_percent"][0] == pytest.approx(20, abs=1e-3)


def test_reactive_current_is_no_reversed_clamp() -> None:
    # A power factor of cos 91.1 degrees = -0.02 is within the reach of a phase error
    values, reasons, remarks = one(0.05 * np.sin(ANGLE - math.radians(91.1)))
    assert math.isnan(values["power_w"])
    assert "purely reactive" in reasons["power_w"]
    assert "purely reactive" in remarks
    assert "reversed" not in remarks
    # cos 93.5 degrees = -0.06
    assert "reversed" in one(0.05 * np.sin(ANGLE - math.radians(93.5)))[2]


def test_values_too_large_to_multiply_are_refused() -> None:
    values, reasons, _ = one(LAMP, 1e160 * VOLTAGE)
    assert all(math.isnan(value) for value in values.values())
    assert all("too large" in reason for reason in reasons.values())
