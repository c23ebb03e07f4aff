"""Power factor, mains captures and standby; closed forms named beside each number."""

from __future__ import annotations

from decimal import Decimal

import pytest

from generator.records.finding import Severity


def test_power_factor_against_power_voltage_current(bench) -> None:
    bench.lamp()
    # 8.05 / (230 x 0.0500) = 0.7
    bench.unit(power_w="8.05", voltage_v="230.0", current_a="0.0500", power_factor="0.91")
    found = bench.only("power-factor-against-power-voltage-current")
    assert found.deviation == Decimal("0.21")
    assert found.severity is Severity.CONTRADICTION
    for words in ("0.91", "8.05 W", "230.0 V", "0.0500 A", "is 0.7"):
        assert words in found.compared


@pytest.mark.parametrize(("current", "count"), [("0.0500", 1), ("0.05", 0)])
def test_a_current_written_coarsely_is_no_contradiction(bench, current: str, count: int) -> None:
    bench.lamp()
    bench.unit(power_w="8.05", voltage_v="230.0", current_a=current, power_factor="0.75")
    assert bench.checks().count("power-factor-against-power-voltage-current") == count


def test_power_factor_with_all_uncertainties(bench) -> None:
    bench.lamp()
    expanded = {
        "power_w": "0.04",
        "voltage_v": "0.2",
        "current_a": "0.0003",
        "power_factor": "0.004",
    }
    reported = {"power_w": "8.05", "voltage_v": "230.0", "current_a": "0.0500"}
    bench.unit("A", uncertainty=expanded, power_factor="0.7050", **reported)
    bench.unit("B", uncertainty=expanded, power_factor="0.7150", **reported)
    found = bench.only("power-factor-against-power-voltage-current")
    assert (found.unit_id, found.deviation) == ("B", Decimal("0.0150"))
    assert "E_n" in found.compared


def test_square_current_fits_its_distortion(bench) -> None:
    # square wave in phase: λ = 2√2/π = 0.9003, THD = sqrt(π²/8 − 1) = 48.34 % (closed form)
    bench.lamp()
    bench.unit(power_factor="0.900", displacement_factor="1.000", thd_current_percent="48.3")
    assert bench.checks() == []


def test_power_factor_that_ignores_the_distortion(bench) -> None:
    # cos φ1 = 0.94, THD = 75 %: 0.94 / sqrt(1.5625) = 0.94 / 1.25 = 0.752
    bench.lamp()
    bench.unit(power_factor="0.940", displacement_factor="0.940", thd_current_percent="75.0")
    found = bench.only("power-factor-against-displacement-and-distortion")
    assert found.deviation == Decimal("0.188")
    assert "0.752" in found.compared


def test_distortion_with_uncertainties(bench) -> None:
    expanded = {
        "power_factor": "0.005",
        "displacement_factor": "0.005",
        "thd_current_percent": "1",
    }
    bench.lamp()
    bench.unit(
        "A",
        uncertainty=expanded,
        power_factor="0.757",
        displacement_factor="0.940",
        thd_current_percent="75.0",
    )
    bench.unit(
        "B",
        uncertainty=expanded,
        power_factor="0.765",
        displacement_factor="0.940",
        thd_current_percent="75.0",
    )
    # U(0.752) = sqrt((0.005/0.94·0.752)² + (0.752·0.75/1.5625·0.01)²) = 0.00539,
    # with the 0.005 of the power factor 0.00735
    found = bench.only("power-factor-against-displacement-and-distortion")
    assert found.unit_id == "B"
    assert "allowed 0.00735" in found.compared


def test_power_factor_above_the_displacement_factor(bench) -> None:
    bench.lamp()
    bench.unit("A", power_factor="0.95", displacement_factor="0.90")
    bench.unit("B", power_factor="0.55", displacement_factor="0.90")
    found = bench.only("power-factor-above-displacement-factor")
    assert (found.unit_id, found.deviation) == ("A", Decimal("0.05"))


@pytest.mark.parametrize(
    ("name", "reported", "computed", "check"),
    [
        ("power_w", "8.10", "7.50", "power-mains-against-report"),
        ("voltage_v", "230.0", "225", "voltage-mains-against-report"),
        ("current_a", "0.0500", "0.06", "current-mains-against-report"),
        ("frequency_hz", "50.00", "60", "frequency-mains-against-report"),
        ("power_factor", "0.90", "0.60", "power-factor-mains-against-report"),
        ("displacement_factor", "0.90", "0.60", "displacement-factor-mains-against-report"),
        ("thd_current_percent", "20.0", "120", "thd-mains-against-report"),
    ],
)
def test_mains_capture_against_report(bench, name, reported, computed, check) -> None:
    bench.lamp()
    bench.unit("A", **{name: reported})
    bench.computed(name, computed, "A")
    bench.unit("B", **{name: reported})
    bench.computed(name, reported, "B")
    found = bench.only(check)
    assert found.unit_id == "A"
    assert found.deviation == Decimal(reported) - Decimal(computed)
    assert found.quantities == (name,)


def test_standby_above_power_in_use(bench) -> None:
    bench.lamp(declared={"standby_power_w": "0.5", "power_w": "8"})
    bench.unit("A", standby_power_w="400", power_w="8.1")
    bench.unit("B", standby_power_w="0.4", power_w="8.1")
    found = bench.only("standby-above-on-power")
    assert (found.unit_id, found.severity) == ("A", Severity.CONTRADICTION)
    assert found.deviation == Decimal("391.9")


def test_declared_standby_at_the_power_in_use(bench) -> None:
    bench.lamp(declared={"networked_standby_power_w": "8", "power_w": "8"})
    found = bench.only("standby-above-on-power")
    assert (found.unit_id, found.deviation) == ("", 0)
    assert "declared" in found.compared
