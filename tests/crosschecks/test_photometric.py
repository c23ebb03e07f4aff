"""Each check with a case that triggers it and one that does not; numbers by hand."""

from __future__ import annotations

from decimal import Decimal

import pytest

from generator.records.finding import Severity
from generator.records.raw import EnduranceReading


def test_flux_from_spectrum_contradicts_the_report(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="806", uncertainty={"luminous_flux_lm": "16"})
    bench.computed("luminous_flux_lm", "640.5", uncertainty="12")
    found = bench.only("flux-spectrum-against-report")
    # sqrt(16² + 12²) = 20; (165.5 - 0.5) / 20 = 8.25
    assert found.severity is Severity.CONTRADICTION
    assert found.deviation == Decimal("165.5")
    assert found.deviation_unit == "lm"
    assert found.unit_id == "L1-1"
    for words in ("lamp L1, unit L1-1", "806 lm", "640.5 lm", "allowed 20", "E_n = 8.2"):
        assert words in found.compared
    assert found.source.startswith("cie_s025")


@pytest.mark.parametrize(("flux", "count"), [("660.5", 0), ("661", 0), ("662", 1)])
def test_flux_within_the_combined_uncertainty_is_no_finding(bench, flux: str, count: int) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm=flux, uncertainty={"luminous_flux_lm": "16"})
    bench.computed("luminous_flux_lm", "640.5", uncertainty="12")
    assert bench.checks().count("flux-spectrum-against-report") == count


def test_worst_unit_speaks_and_names_the_others(bench) -> None:
    bench.lamp()
    for unit, flux in (("A", "880"), ("B", "950"), ("C", "801"), ("D", "870")):
        bench.unit(unit, luminous_flux_lm=flux)
        bench.computed("luminous_flux_lm", "800", unit)
    found = bench.only("flux-spectrum-against-report")
    assert (found.unit_id, found.severity) == ("B", Severity.CONTRADICTION)
    assert found.compared.endswith("Found also for A, D.")


def test_flux_of_the_distribution_against_the_sphere(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="800")
    bench.computed("flux_120deg_lm", "450")
    bench.computed("flux_120deg_fraction", "0.5")
    found = bench.only("flux-distribution-against-report")
    assert found.deviation == 100
    assert found.severity is Severity.DOUBT
    assert "900" in found.compared
    assert "800 lm" in found.compared


def test_flux_of_the_distribution_that_agrees(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="800")
    bench.computed("flux_120deg_lm", "410")
    bench.computed("flux_120deg_fraction", "0.5")
    assert bench.checks() == []


def test_a_zonal_flux_is_never_called_that_of_the_spectrum(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="800")
    bench.computed("luminous_flux_lm", "1000", method="zonal_flux_cie_84")
    assert bench.checks() == ["flux-distribution-against-report"]


def test_useful_flux_beam_angle_and_peak_of_the_distribution(bench) -> None:
    bench.lamp()
    bench.unit(useful_luminous_flux_lm="400", beam_angle_deg="36", peak_intensity_cd="1000")
    bench.computed("useful_luminous_flux_lm", "350")
    bench.computed("beam_angle_deg", "38")
    bench.computed("peak_intensity_cd", "800")
    assert bench.checks() == [
        "peak-intensity-distribution-against-report",
        "useful-flux-distribution-against-report",
    ]


def test_efficacy_is_flux_over_power(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="800", power_w="8.00", efficacy_lm_per_w="120")
    found = bench.only("efficacy-against-flux-and-power")
    assert found.deviation == 20
    assert "120 lm/W" in found.compared
    assert "8.00 W" in found.compared


def test_efficacy_that_fits(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="800", power_w="8.00", efficacy_lm_per_w="100.0")
    assert bench.checks() == []


def test_efficacy_above_the_spectrum_is_impossible(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="3500", power_w="10.0")
    bench.computed("ler_lm_per_w", "325")
    found = bench.only("efficacy-above-ler")
    assert found.severity is Severity.IMPOSSIBLE
    assert found.deviation == 25
    assert "350" in found.compared
    assert "325 lm/W" in found.compared


def test_efficacy_above_the_spectrum_within_its_uncertainty_is_a_doubt(bench) -> None:
    bench.lamp()
    bench.unit(
        luminous_flux_lm="3300",
        power_w="10.00",
        uncertainty={"luminous_flux_lm": "99", "power_w": "0.05"},
    )
    bench.computed("ler_lm_per_w", "325", uncertainty="3")
    assert bench.only("efficacy-above-ler").severity is Severity.DOUBT


@pytest.mark.parametrize("flux", ["1200", "3250"])
def test_efficacy_up_to_the_spectrum(bench, flux: str) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm=flux, power_w="10.0")
    bench.computed("ler_lm_per_w", "325")
    assert bench.checks() == []


def test_declared_efficacy_above_the_spectrum(bench) -> None:
    bench.lamp(declared={"luminous_flux_lm": "3400", "power_w": "10.0"})
    bench.mean("ler_lm_per_w", "325")
    found = bench.only("declared-efficacy-above-ler")
    assert (found.severity, found.deviation) == (Severity.IMPOSSIBLE, 15)


def test_declared_efficacy_below_the_spectrum(bench) -> None:
    bench.lamp(declared={"luminous_flux_lm": "1400", "power_w": "10.0"})
    bench.mean("ler_lm_per_w", "325")
    assert bench.checks() == []


def test_efficacy_above_that_of_any_radiation(bench) -> None:
    bench.lamp()
    bench.unit(luminous_flux_lm="8060", power_w="8.1")
    found = bench.only("efficacy-above-maximum")
    assert found.severity is Severity.IMPOSSIBLE
    assert "683.002 lm/W" in found.compared


def test_radiant_efficiency_above_one(bench) -> None:
    bench.lamp()
    bench.unit()
    bench.computed("radiant_efficiency", "1.25")
    found = bench.only("radiant-efficiency-above-one")
    assert (found.severity, found.deviation) == (Severity.IMPOSSIBLE, Decimal("0.25"))


def test_radiant_efficiency_of_one(bench) -> None:
    bench.lamp()
    bench.unit()
    bench.computed("radiant_efficiency", "1")
    assert bench.checks() == []


def test_useful_flux_above_flux(bench) -> None:
    bench.lamp()
    bench.unit("A", luminous_flux_lm="400", useful_luminous_flux_lm="440")
    bench.unit("B", luminous_flux_lm="400", useful_luminous_flux_lm="410")
    found = bench.only("useful-flux-above-flux")
    assert (found.unit_id, found.deviation) == ("A", 40)


def test_peak_intensity_below_the_average_over_the_sphere(bench) -> None:
    bench.lamp()
    # 1256.637 lm over 4π sr is 100 cd
    bench.unit("A", luminous_flux_lm="1256.637", peak_intensity_cd="80")
    bench.unit("B", luminous_flux_lm="1256.637", peak_intensity_cd="100")
    found = bench.only("peak-intensity-below-average")
    assert (found.unit_id, found.severity) == ("A", Severity.IMPOSSIBLE)
    assert float(found.deviation) == pytest.approx(20, abs=1e-4)
    assert "100.00 cd" in found.compared


def test_flux_at_the_start_of_the_ageing_test(bench) -> None:
    bench.lamp()
    bench.unit("A", luminous_flux_lm="800")
    bench.unit("B", luminous_flux_lm="800")
    for unit, hours, flux in (("A", "0", "700"), ("B", "0", "790"), ("B", "3000", "600")):
        bench.endurance.append(
            EnduranceReading("L1", unit, Decimal(hours), Decimal(flux), operational=True)
        )
    found = bench.only("endurance-start-against-report")
    assert (found.unit_id, found.deviation) == ("A", -100)


def test_flux_of_spectrum_and_of_distribution_side_by_side(bench) -> None:
    bench.lamp()
    bench.unit("A", luminous_flux_lm="800")
    bench.computed("luminous_flux_lm", "1000", "A", method="zonal_flux_cie_84")
    bench.computed("luminous_flux_lm", "700", "A", method="sum_of_spectrum")
    by_check = {item.check: item.deviation for item in bench.findings()}
    assert by_check == {
        "flux-spectrum-against-report": 100,
        "flux-distribution-against-report": 200,
    }
