"""The room as a whole: a sound campaign is left in peace, order and words hold."""

from __future__ import annotations

import re
from datetime import date

import numpy as np

from generator.quantities import QUANTITIES
from generator.records.figure import FigureSet
from generator.records.finding import Finding, Severity

WAVELENGTH = np.arange(380.0, 781.0)


def sound(bench) -> None:
    """Three bidders, three units each, everything measured and declared, nothing wrong."""
    noise = np.random.default_rng(17)
    bench.supply = {"voltage_v": "230", "frequency_hz": "50"}
    bench.assessment_date = date(2026, 3, 1)
    time = np.arange(20000) / 20000
    for place, bidder in enumerate(("North", "South", "East")):
        lamp = f"L{place}"
        bench.lamp(
            lamp,
            bidder,
            declared={
                "luminous_flux_lm": "806",
                "power_w": "8.5",
                "cct_k": "2700",
                "ra": "80",
                "displacement_factor": "0.9",
                "standby_power_w": "0.3",
                "svm": "0.4",
            },
            mains=True,
            declared_energy_class="E",
            placed_on_market=date(2025, 1, 1),
            report_no=f"R-{place}",
            report_date=date(2025, 2, 1),
        )
        bench.mean("cct_k", "2725", lamp)
        bench.mean("ler_lm_per_w", "325.1", lamp)
        bench.mean("energy_efficiency_class", "E", lamp)
        spectra, records = [], []
        for unit_place in range(3):
            unit = f"{lamp}-{unit_place + 1}"
            step = 3 * place + unit_place
            flux, current = 806 + 3 * step, 0.0395 + 0.0001 * step
            # cos φ1 = 0.9 and THD = 10 %: λ = 0.9 / sqrt(1.01) = 0.8955
            power = 230 * current * 0.8955
            bench.unit(
                unit,
                lamp,
                uncertainty={"luminous_flux_lm": "16", "ambient_temperature_c": "0.3"},
                luminous_flux_lm=f"{flux}",
                power_w=f"{power:.3f}",
                voltage_v="230.0",
                current_a=f"{current:.5f}",
                frequency_hz="50.00",
                power_factor=f"{0.8955 + step / 5000:.4f}",
                displacement_factor="0.900",
                thd_current_percent=f"{10 + step / 10:.1f}",
                standby_power_w="0.25",
                ambient_temperature_c="25.1",
                cct_k=f"{2720 + step}",
                x=f"{0.4578 + step / 10000:.4f}",
                y="0.4101",
                ra=f"{82 + step / 10:.1f}",
                percent_flicker=f"{30 + step / 10:.1f}",
                flicker_index="0.095",
                svm=f"{0.3 + step / 100:.2f}",
            )
            bench.computed("luminous_flux_lm", f"{flux - 5}", unit, lamp, "14")
            bench.computed("ler_lm_per_w", "325.1", unit, lamp, "3")
            bench.computed("radiant_efficiency", "0.31", unit, lamp)
            bench.computed("cct_k", f"{2725 + step}", unit, lamp, "30")
            bench.computed("flicker_frequency_hz", "100", unit, lamp)
            bench.computed("percent_flicker", "30.2", unit, lamp)
            curve = np.exp(-0.5 * ((WAVELENGTH - 448 - 3 * place - 0.5 * unit_place) / 9) ** 2)
            curve += 2 * np.exp(-0.5 * ((WAVELENGTH - 600) / 55) ** 2)
            spectra.append(curve * (1 + 0.002 * noise.standard_normal(401)))
            wave = 1 + 0.3 * np.sin(2 * np.pi * 100 * time)
            records.append(wave + 0.002 * noise.standard_normal(time.size))
        bench.spectrum(lamp, spectra)
        bench.record(lamp, records)


def test_a_campaign_with_nothing_wrong_gives_no_findings(bench) -> None:
    sound(bench)
    assert bench.findings() == ()


def test_an_empty_campaign_gives_no_findings(bench) -> None:
    assert bench.findings() == ()
    bench.lamp()
    assert bench.findings() == ()


def faulty(bench) -> tuple[Finding, ...]:
    sound(bench)
    bench.spectra[1] = bench.spectra[0].__class__(
        "L1", ("L1-1", "L1-2", "L1-3"), WAVELENGTH, bench.spectra[0].values * 0.9, "W/nm", "f"
    )
    bench.computed("radiant_efficiency", "1.31", "L2-4", "L2")
    bench.unit("L2-4", "L2", luminous_flux_lm="806", power_w="0.9", ambient_temperature_c="28.0")
    return bench.findings()


def test_order_of_lamps_then_of_weight(bench) -> None:
    found = faulty(bench)
    assert [item.lamp_id for item in found] == sorted(item.lamp_id for item in found)
    assert {item.lamp_id for item in found} == {"L0", "L1", "L2"}
    of_last = [item.severity.rank for item in found if item.lamp_id == "L2"]
    assert of_last == sorted(of_last)
    assert len(of_last) >= 3
    assert found == bench.findings()


def test_every_finding_says_what_by_how_much_and_why(bench) -> None:
    for item in faulty(bench):
        assert item.compared.startswith(f"lamp {item.lamp_id}")
        assert re.search(r"\d", item.compared)
        assert item.title
        assert item.explanation.endswith(".")
        assert item.source
        assert set(item.quantities) <= set(QUANTITIES)
        assert re.fullmatch(r"[a-z0-9]+(-[a-z0-9]+)+", item.check)


def test_findings_accuse_nobody(bench) -> None:
    accusing = re.compile(r"fraud|forg|fake|manipulat|cheat|false|wrong|lie[sd]?\b", re.IGNORECASE)
    for item in faulty(bench):
        assert not accusing.search(f"{item.title} {item.compared} {item.explanation}")


def test_severities_stand_from_heavy_to_light() -> None:
    assert [item.rank for item in Severity] == [0, 1, 2, 3]
    assert Severity.IMPOSSIBLE.rank < Severity.REMARK.rank
    assert str(Severity.DOUBT) == "doubt"


def test_figures_without_a_lamp_are_left_aside(bench) -> None:
    bench.computed("radiant_efficiency", "1.31", "X-1", "X")
    bench.unit("X-1", "X", luminous_flux_lm="806")
    assert bench.findings() == ()
    assert len(FigureSet(bench.figures)) == 2
