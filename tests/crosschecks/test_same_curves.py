"""One curve under two names; distances checked against the plain definition, pair by pair."""

from __future__ import annotations

import numpy as np
import pytest

from generator.crosschecks.curves import CurveTable, closest, nearest_units, spectrum_table
from generator.records.finding import Severity

WAVELENGTH = np.arange(380.0, 781.0)


def white(peak_nm: float = 450.0, phosphor_nm: float = 600.0, share: float = 2.0) -> np.ndarray:
    blue = np.exp(-0.5 * ((WAVELENGTH - peak_nm) / 9) ** 2)
    return blue + share * np.exp(-0.5 * ((WAVELENGTH - phosphor_nm) / 55) ** 2)


def noisy(curve: np.ndarray, seed: int, relative: float = 0.003) -> np.ndarray:
    return curve * (1 + relative * np.random.default_rng(seed).standard_normal(curve.shape))


def table_of(curves: np.ndarray, starts: list[int]) -> CurveTable:
    lamps = tuple(f"L{place}" for place in range(len(starts)))
    units = tuple(f"U{place}" for place in range(len(curves)))
    return CurveTable(lamps, np.array(starts), units, curves, "points")


@pytest.mark.parametrize("count", [7, 1300])
def test_closest_is_the_smallest_pairwise_difference(count: int) -> None:
    # more curves than one block of rows holds, against the definition on some pairs
    curves = np.random.default_rng(5).standard_normal((count, 11))
    starts = [0, 2, 3]
    found = closest(table_of(curves, starts))

    def rms(first: int, second: int) -> float:
        size = max(np.linalg.norm(curves[first]), np.linalg.norm(curves[second]))
        return float(np.linalg.norm(curves[first] - curves[second]) / size)

    assert found.shape == (3, 3)
    assert found[0, 0] == pytest.approx(rms(0, 1))
    assert np.isinf(found[1, 1])
    assert found[0, 1] == pytest.approx(min(rms(0, 2), rms(1, 2)))
    assert found[0, 2] == pytest.approx(min(rms(a, b) for a in (0, 1) for b in range(3, count)))
    assert found == pytest.approx(found.T)
    unit, other, distance = nearest_units(table_of(curves, starts), 0, 2)
    assert distance == pytest.approx(found[0, 2])
    assert rms(int(unit[1:]), int(other[1:])) == pytest.approx(distance)


def test_two_bidders_one_spectrum_whatever_its_scale(bench) -> None:
    bench.lamp("L1", "North")
    bench.lamp("L2", "South")
    bench.lamp("L3", "South")
    bench.spectrum("L1", [noisy(white(), 1)])
    bench.spectrum("L2", [np.round(0.37 * noisy(white(), 1), 5)], unit="relative")
    bench.spectrum("L3", [noisy(white(455.0, 590.0), 2)])
    found = bench.findings()
    assert [(item.lamp_id, item.check, item.severity) for item in found] == [
        ("L1", "spectrum-same-between-bidders", Severity.CONTRADICTION),
        ("L2", "spectrum-same-between-bidders", Severity.CONTRADICTION),
    ]
    assert 0 <= float(found[0].deviation) < 0.01
    for words in ("lamp L1, unit L1-1", "lamp L2, unit L2-1 (South)", "% RMS", "0.1 %"):
        assert words in found[0].compared
    assert "common emitter type" in found[0].explanation
    assert "copied data, would explain it" in found[0].explanation


def test_the_same_spectrum_on_another_step(bench) -> None:
    bench.lamp("L1", "North")
    bench.lamp("L2", "South")
    bench.spectrum("L1", [white()])
    bench.spectrum("L2", [white()[::5]], WAVELENGTH[::5])
    assert bench.checks() == ["spectrum-same-between-bidders"] * 2


def test_one_bidder_is_a_family(bench) -> None:
    bench.lamp("L1", "North")
    bench.lamp("L2", "North")
    for lamp in ("L1", "L2"):
        bench.spectrum(lamp, [white()])
    assert [(item.check, item.severity) for item in bench.findings()] == [
        ("spectrum-same-within-bidder", Severity.REMARK)
    ] * 2


def test_two_units_of_one_lamp(bench) -> None:
    bench.lamp()
    bench.spectrum("L1", [noisy(white(), 1), noisy(white(), 2), 1.02 * noisy(white(), 1)])
    found = bench.only("spectrum-same-between-units")
    assert (found.unit_id, found.severity) == ("L1-1", Severity.DOUBT)
    assert "units L1-1 and L1-3" in found.compared


@pytest.mark.parametrize(("bidder", "count"), [("South", 2), ("North", 0)])
def test_nearly_the_same_emitter_is_a_remark_between_bidders(bench, bidder, count) -> None:
    bench.lamp("L1", "North")
    bench.lamp("L2", bidder)
    bench.spectrum("L1", [noisy(white(), 1)])
    bench.spectrum("L2", [noisy(white(), 2)])
    found = bench.findings()
    assert [item.check for item in found] == ["spectrum-near-between-bidders"] * count
    # 0.3 % noise in each: about 0.42 % between them
    assert all(0.2 < float(item.deviation) < 0.7 for item in found)
    assert all(item.severity is Severity.REMARK for item in found)


def test_different_emitters_short_scales_and_empty_spectra(bench) -> None:
    for lamp, bidder in (("L1", "North"), ("L2", "South"), ("L3", "East"), ("L4", "West")):
        bench.lamp(lamp, bidder)
    bench.spectrum("L1", [white()])
    bench.spectrum("L2", [white(455.0)])
    bench.spectrum("L3", [white()[40:]], WAVELENGTH[40:])
    bench.spectrum("L4", [np.zeros(401)])
    assert bench.checks() == []
    table = spectrum_table(bench.campaign)
    assert table is not None
    assert table.lamp_ids == ("L1", "L2")


def test_many_lamps_of_other_bidders_are_named_in_one_finding(bench) -> None:
    for place in range(10):
        bench.lamp(f"L{place}", f"B{place}")
        bench.spectrum(f"L{place}", [white()])
    found = bench.findings()
    assert len(found) == 10
    assert "and 2 more" in found[0].compared


def test_braces_in_a_name_are_only_a_name(bench) -> None:
    bench.lamp("L1", "North {0}")
    bench.lamp("L2", "South {limit}")
    for lamp in ("L1", "L2"):
        bench.spectrum(lamp, [white()])
    assert "South {limit}" in bench.findings()[0].compared


def light(seed: int, depth: float = 0.3) -> np.ndarray:
    time = np.arange(20000) / 20000
    noise = 0.002 * np.random.default_rng(seed).standard_normal(time.size)
    return 1 + depth * np.sin(2 * np.pi * 100 * time) + noise


def test_light_records_of_two_bidders(bench) -> None:
    bench.lamp("L1", "North")
    bench.lamp("L2", "South")
    bench.record("L1", [light(1)])
    bench.record("L2", [np.round(4.2 * light(1), 5)])
    found = bench.findings()
    assert [item.check for item in found] == ["light-same-between-bidders"] * 2
    assert found[0].severity is Severity.CONTRADICTION
    assert "512 of 20000 samples at 20000 Hz" in found[0].compared


def test_light_of_one_kind_measured_twice(bench) -> None:
    # same shape and phase, own noise; and another depth without noise
    for place, record in enumerate([light(1), light(2), light(2, 0.2)]):
        bench.lamp(f"L{place}", f"B{place}")
        bench.record(f"L{place}", [record])
    assert bench.checks() == []


def test_steady_light_is_not_a_copy_of_steady_light(bench) -> None:
    for lamp, bidder, seed in (("L1", "North", 1), ("L2", "South", 2)):
        bench.lamp(lamp, bidder)
        bench.record(lamp, [np.full(20000, 0.7), light(seed, 0.0)])
    assert bench.checks() == []


def test_records_of_other_length_or_rate_are_not_compared(bench) -> None:
    for lamp, record, rate in (
        ("L1", light(1), 20000.0),
        ("L2", light(1)[:15000], 20000.0),
        ("L3", light(1), 25000.0),
    ):
        bench.lamp(lamp, lamp)
        bench.record(lamp, [record], rate)
    assert bench.checks() == []


def test_mains_currents(bench) -> None:
    time = np.arange(4000) / 20000
    current = np.sin(2 * np.pi * 50 * time) ** 3
    for unit, lamp, bidder, values in (
        ("A", "L1", "North", noisy(current, 1)),
        ("B", "L2", "South", 0.6 * noisy(current, 1)),
        ("C", "L3", "East", noisy(current, 3)),
    ):
        bench.lamp(lamp, bidder)
        bench.unit(unit, lamp)
        bench.capture(unit, values)
    bench.capture("unknown", current)
    found = bench.findings()
    assert [(item.lamp_id, item.check) for item in found] == [
        ("L1", "mains-same-between-bidders"),
        ("L2", "mains-same-between-bidders"),
    ]
