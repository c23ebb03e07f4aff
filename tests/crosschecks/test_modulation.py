"""Light modulation against mains, record and definition."""

from __future__ import annotations

import math
from decimal import Decimal

import pytest

from generator.records.finding import Severity


@pytest.mark.parametrize(
    ("light_hz", "mains_hz", "severity"),
    [
        ("100", "50", None),
        ("100.9", "50", None),
        ("119.5", "60", None),
        ("120", "50", Severity.CONTRADICTION),
        ("100", "60", Severity.CONTRADICTION),
        ("50", "50", Severity.DOUBT),
        ("80", "50", Severity.DOUBT),
        ("200", "50", Severity.REMARK),
        ("1000", "50", Severity.REMARK),
    ],
)
def test_light_follows_twice_the_mains(bench, light_hz, mains_hz, severity) -> None:
    bench.lamp()
    bench.supply = {"frequency_hz": mains_hz}
    bench.unit()
    bench.computed("flicker_frequency_hz", light_hz)
    bench.computed("percent_flicker", "30")
    if severity is None:
        assert bench.checks() == []
    else:
        found = bench.only("flicker-frequency-against-mains")
        assert found.severity is severity
        assert found.deviation == Decimal(light_hz) - 2 * Decimal(mains_hz)
        assert f"{light_hz} Hz" in found.compared


@pytest.mark.parametrize(("depth", "mains"), [("0.5", True), ("30", False)])
def test_no_word_on_noise_or_on_lamps_without_mains(bench, depth: str, mains: bool) -> None:
    bench.lamp(mains=mains)
    bench.supply = {"frequency_hz": "50"}
    bench.unit()
    bench.computed("flicker_frequency_hz", "80")
    bench.computed("percent_flicker", depth)
    assert bench.checks() == []


def test_the_measured_mains_frequency_goes_before_the_nominal(bench) -> None:
    bench.lamp()
    bench.supply = {"frequency_hz": "50"}
    bench.unit(frequency_hz="60.00")
    bench.computed("flicker_frequency_hz", "120")
    bench.computed("percent_flicker", "30")
    assert "flicker-frequency-against-mains" not in bench.checks()


def test_flicker_index_bound_of_two_level_light(bench) -> None:
    # Light at two levels 1 ± p, high for the share D: index 2pD(1-D)/(1-p+2pD). At p = 0.6 the
    # highest over D is (1 - 0.8)/0.6 = 1/3, found here by search.
    p = 0.6
    highest = max(
        2 * p * d * (1 - d) / (1 - p + 2 * p * d) for d in (i / 10000 for i in range(1, 10000))
    )
    assert math.isclose(highest, 1 / 3, abs_tol=1e-6)
    bench.lamp()
    bench.unit("A", percent_flicker="60.0", flicker_index="0.333")
    bench.unit("B", percent_flicker="60.0", flicker_index="0.350")
    found = bench.only("flicker-index-above-bound")
    assert (found.unit_id, found.severity) == ("B", Severity.IMPOSSIBLE)
    assert float(found.deviation) == pytest.approx(0.35 - 1 / 3, abs=5e-4)
    assert "0.350" in found.compared
    assert "60.0 %" in found.compared


def test_full_wave_rectified_sine_is_possible(bench) -> None:
    # |sin|: percent flicker 100, flicker index 0.2105 (closed form)
    bench.lamp()
    bench.unit(percent_flicker="100.0", flicker_index="0.2105")
    assert bench.checks() == []


@pytest.mark.parametrize(
    ("name", "reported", "computed", "check"),
    [
        ("percent_flicker", "5.0", "40", "percent-flicker-light-against-report"),
        ("flicker_index", "0.010", "0.1", "flicker-index-light-against-report"),
        ("svm", "0.10", "1.2", "svm-light-against-report"),
        ("pst_lm", "0.10", "1.2", "pst-lm-light-against-report"),
    ],
)
def test_light_record_against_report(bench, name, reported, computed, check) -> None:
    bench.lamp()
    bench.unit("A", **{name: reported})
    bench.computed(name, computed, "A")
    bench.unit("B", **{name: reported})
    bench.computed(name, reported, "B")
    found = bench.only(check)
    assert (found.unit_id, found.deviation) == ("A", Decimal(reported) - Decimal(computed))


@pytest.mark.parametrize(
    ("name", "value", "check"),
    [
        ("percent_flicker", "104.2", "percent-flicker-above-100"),
        ("flicker_index", "1.2", "flicker-index-above-1"),
        ("power_factor", "1.04", "power-factor-above-1"),
        ("displacement_factor", "1.04", "displacement-factor-above-1"),
        ("ra", "101.5", "ra-above-100"),
        ("r9", "100.5", "r9-above-100"),
    ],
)
def test_above_the_definition(bench, name: str, value: str, check: str) -> None:
    bench.lamp()
    bench.unit(**{name: value})
    found = bench.only(check)
    assert found.severity is Severity.IMPOSSIBLE
    assert value in found.compared
    assert float(found.deviation) == pytest.approx(float(value) % (100 if "100" in check else 1))


def test_declared_above_the_definition_and_the_limit_itself(bench) -> None:
    bench.lamp(declared={"ra": "100", "displacement_factor": "1.2"})
    bench.unit(percent_flicker="100", ra="100")
    assert bench.checks() == ["displacement-factor-above-1"]
