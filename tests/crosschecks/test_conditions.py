"""Ambient, supply, stability and uncertainties; CIE S 025 intervals are from memory."""

from __future__ import annotations

from decimal import Decimal

import numpy as np
import pytest

from generator.records.finding import Severity


@pytest.mark.parametrize(
    ("ambient", "severity"),
    [
        ("25.0", None),
        ("26.2", None),
        ("26.3", Severity.DOUBT),
        ("23.8", None),
        ("23.7", Severity.DOUBT),
    ],
)
def test_ambient_of_25_within_1_2(bench, ambient: str, severity: Severity | None) -> None:
    bench.lamp()
    bench.unit(ambient_temperature_c=ambient)
    if severity is None:
        assert bench.checks() == []
    else:
        found = bench.only("ambient-outside-tolerance")
        assert found.severity is severity
        assert found.deviation == Decimal(ambient) - 25
        assert "from memory, unconfirmed" in found.compared
        assert "from memory, unconfirmed" in found.source
        for words in ("lamp L1, unit L1-1", f"{ambient} °C", "25.0 °C", "± 1.2 °C"):
            assert words in found.compared


@pytest.mark.parametrize(("expanded", "count"), [("0.2", 0), ("0.3", 1)])
def test_ambient_inside_but_not_by_its_uncertainty(bench, expanded: str, count: int) -> None:
    bench.lamp()
    bench.unit(ambient_temperature_c="26.0", uncertainty={"ambient_temperature_c": expanded})
    found = bench.findings()
    assert len(found) == count
    assert all(item.severity is Severity.REMARK for item in found)


def test_supply_voltage_and_frequency(bench) -> None:
    # 0.4 % of 230 V is 0.92 V, 0.2 % of 50 Hz is 0.1 Hz
    bench.lamp()
    bench.supply = {"voltage_v": "230", "frequency_hz": "50"}
    bench.unit("A", voltage_v="230.92", frequency_hz="50.10")
    bench.unit("B", voltage_v="230.93", frequency_hz="49.89")
    voltage = bench.only("voltage-outside-tolerance")
    assert (voltage.unit_id, voltage.deviation) == ("B", Decimal("0.93"))
    assert "± 0.92 V" in voltage.compared
    frequency = bench.only("frequency-outside-tolerance")
    assert (frequency.unit_id, frequency.deviation) == ("B", Decimal("-0.11"))


def test_lamps_without_mains_and_campaigns_without_supply(bench) -> None:
    bench.lamp("L1", mains=False)
    bench.unit("A", "L1", voltage_v="12.00")
    bench.supply = {"voltage_v": "230"}
    assert bench.checks() == []
    bench.lamp("L2")
    bench.unit("B", "L2", voltage_v="12.00")
    assert bench.checks() == ["voltage-outside-tolerance"]
    bench.supply = {}
    assert bench.checks() == []


def ripple(duration_s: float, drift: float) -> np.ndarray:
    time = np.arange(0, duration_s, 1 / 2000)
    return (1 + 0.3 * np.sin(2 * np.pi * 100 * time)) * (1 + drift * time / duration_s)


def test_light_that_still_drifts(bench) -> None:
    # a ramp of 2 %: means of the first and last tenth are at 0.1 % and 1.9 % of it
    bench.lamp()
    bench.record("L1", [ripple(60, 0.02), ripple(60, 0.004)], 2000.0, long=True)
    bench.unit("L1-1")
    bench.unit("L1-2")
    found = bench.only("light-not-stable")
    assert (found.unit_id, found.severity) == ("L1-1", Severity.DOUBT)
    assert float(found.deviation) == pytest.approx(100 * (1.019 / 1.001 - 1), abs=0.002)
    assert "from memory, unconfirmed" in found.compared


@pytest.mark.parametrize(("duration_s", "long"), [(20.0, True), (60.0, False)])
def test_short_records_say_nothing_on_stability(bench, duration_s: float, long: bool) -> None:
    bench.lamp()
    bench.record("L1", [ripple(duration_s, 0.02)], 2000.0, long=long)
    assert bench.checks() == []


def test_uncertainty_of_zero(bench) -> None:
    bench.lamp()
    bench.unit("A", luminous_flux_lm="806", uncertainty={"luminous_flux_lm": "0"})
    bench.unit("B", luminous_flux_lm="801", uncertainty={"luminous_flux_lm": "16"})
    found = bench.only("uncertainty-of-zero")
    assert (found.unit_id, found.quantities) == ("A", ("luminous_flux_lm",))
    assert "u_luminous_flux_lm = 0 lm beside 806 lm" in found.compared
