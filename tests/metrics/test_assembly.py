"""From records to figures: grades, means, derived figures, uncertainties, reasons."""

from decimal import Decimal
from fractions import Fraction

import numpy as np
import pytest

from generator.metrics.assembly import DIRECTIONAL_HEADLINE, HEADLINE, ageing_of, figures_of
from generator.metrics.assembly.exact_numbers import exact_mean, exact_quotient, rendered
from generator.metrics.uncertainty import coverage_factor
from generator.quantities import QUANTITIES
from generator.records.campaign import Campaign, InputFile
from generator.records.figure import MEAN, FigureSet, Grade
from generator.records.lamp import Lamp, Unit
from generator.records.raw import (
    EnduranceReading,
    IntensityTable,
    LightRecord,
    MainsCapture,
    SpectrumSet,
)
from generator.records.settings import Settings

D = Decimal
WAVELENGTH = np.arange(380.0, 781.0, 5.0)


def make_lamp(lamp_id="L1", **kind):
    declared = kind.pop("declared", {"cct_k": D(3000)})
    directional = kind.pop("directional", False)
    return Lamp(lamp_id, "B", "M", directional=directional, declared=declared, row=2, **kind)


def make_unit(unit_id, row, lamp_id="L1", u=None, **reported):
    numbers = {name: D(text) for name, text in reported.items()}
    known = {name: D(text) for name, text in (u or {}).items()}
    return Unit(unit_id, lamp_id, numbers, known, row)


def make_campaign(lamps, units, uncertainty=None, supply=None, **raw):
    settings = Settings.model_validate(
        {
            "campaign": {"title": "t"},
            "uncertainty": uncertainty or {},
            "supply": supply or {"frequency_hz": 50},
        }
    )
    return Campaign("t", settings, tuple(lamps), tuple(units), **raw)


def white(blue=0.5, scale=0.02):
    emitter = blue * np.exp(-0.5 * ((WAVELENGTH - 450.0) / 10.0) ** 2)
    return scale * (emitter + np.exp(-0.5 * ((WAVELENGTH - 590.0) / 55.0) ** 2))


def make_spectra(lamp_id, unit_ids, rows, unit="W/nm"):
    file = f"spectra/{lamp_id}.csv"
    return SpectrumSet(lamp_id, tuple(unit_ids), WAVELENGTH, np.array(rows), unit, file)


def found(campaign):
    return FigureSet(figures_of(campaign))


def test_every_headline_quantity_has_a_figure_or_a_reason():
    campaign = make_campaign([make_lamp(), make_lamp("L2", directional=True)], [])
    figures = found(campaign)
    for quantity in HEADLINE:
        figure = figures.measured("L1", quantity)
        assert figure.value is None
        assert figure.reason == "not measured"
    assert figures.measured("L1", "beam_angle_deg") is None
    assert {"beam_angle_deg", "peak_intensity_cd"} == set(DIRECTIONAL_HEADLINE)
    assert figures.measured("L2", "beam_angle_deg").reason == "not measured"


def test_declared_value_does_not_pass_for_a_measured_one():
    figures = found(make_campaign([make_lamp(declared={"ra": D("80")})], []))
    assert figures.best("L1", "ra").grade is Grade.DECLARED
    assert figures.measured("L1", "ra").value is None
    declared = figures.graded("L1", "ra", Grade.DECLARED)
    assert declared.method == "declared_ra"
    assert declared.origin == ("lamps.csv, row 2, column declared_ra",)
    assert declared.units_count == 0


def test_declared_useful_flux_and_class_name_their_columns():
    lamp = make_lamp(
        directional=True,
        declared={"useful_luminous_flux_lm": D(345), "sdcm": D(4)},
        declared_energy_class="F",
    )
    figures = found(make_campaign([lamp], []))
    useful = figures.graded("L1", "useful_luminous_flux_lm", Grade.DECLARED)
    assert useful.method == "declared_luminous_flux_lm"
    assert figures.best("L1", "energy_efficiency_class").value == "F"
    steps = figures.graded("L1", "sdcm", Grade.DECLARED)
    assert steps.method == "declared_colour_consistency_sdcm"


def test_reported_values_stay_exact_and_their_mean_is_exact():
    units = [
        make_unit(f"U{i}", i + 2, power_w=text) for i, text in enumerate(("8.10", "8.20", "8.30"))
    ]
    files = (InputFile("units.csv.gz", 1, ""),)
    figures = found(make_campaign([make_lamp()], units, files=files))
    own = figures.measured("L1", "power_w", "U0")
    assert str(own.value) == "8.10"
    assert own.origin == ("units.csv.gz, row 2, column power_w",)
    mean = figures.measured("L1", "power_w")
    assert mean.value == D("8.2")
    assert mean.spread == D("0.1")
    assert mean.units_count == 3
    assert mean.grade is Grade.REPORTED


def test_efficacy_is_the_mean_of_the_quotients_not_the_quotient_of_means():
    units = [
        make_unit("U1", 2, luminous_flux_lm="800", power_w="8"),
        make_unit("U2", 3, luminous_flux_lm="900", power_w="10"),
    ]
    figures = found(make_campaign([make_lamp()], units))
    efficacy = figures.measured("L1", "efficacy_lm_per_w")
    assert efficacy.value == D(95)
    assert efficacy.method == "quotient of reported figures"
    assert efficacy.grade is Grade.REPORTED
    assert efficacy.expanded_uncertainty is None


def test_efficacy_exactly_on_a_limit_is_exact():
    # 425.85 lm at 5.01 W is 85 lm/W; the quotient of the floats is 85.00000000000001
    unit = make_unit("U1", 2, luminous_flux_lm="425.85", power_w="5.01")
    figures = found(make_campaign([make_lamp()], [unit]))
    assert figures.measured("L1", "efficacy_lm_per_w").value == D(85)
    assert 425.85 / 5.01 != 85


def test_uncertainty_column_comes_before_rule_and_both_before_nothing():
    units = [
        make_unit("U1", 2, u={"power_w": "0.5"}, power_w="8", voltage_v="230"),
        make_unit("U2", 3, power_w="8"),
    ]
    figures = found(make_campaign([make_lamp()], units, {"power_w": "1 %"}))
    assert figures.measured("L1", "power_w", "U1").expanded_uncertainty == D("0.5")
    assert figures.measured("L1", "power_w", "U2").expanded_uncertainty == D("0.08")
    assert figures.measured("L1", "voltage_v", "U1").expanded_uncertainty is None
    assert figures.measured("L1", "voltage_v").expanded_uncertainty is None


def test_uncertainty_of_the_mean_joins_the_common_part_and_the_spread():
    units = [make_unit(f"U{i}", i, power_w=text) for i, text in enumerate(("8.0", "8.2", "8.4"))]
    figures = found(make_campaign([make_lamp()], units, {"power_w": 0.1}))
    mean = figures.measured("L1", "power_w")
    # by hand: u = sqrt(0.05² + 0.2²/3) = 0.12583; ν = 2 (0.12583/0.11547)^4 = 2.82 -> 2
    expected = coverage_factor(2) * (0.05**2 + 0.2**2 / 3) ** 0.5
    assert float(mean.expanded_uncertainty) == pytest.approx(expected, rel=1e-6)


def test_efficacy_and_power_factor_propagate_what_is_stated():
    unit = make_unit(
        "U1",
        2,
        luminous_flux_lm="800",
        power_w="8",
        voltage_v="230",
        current_a="0.04",
        power_factor="0.87",
        apparent_power_va="9.2",
    )
    rules = {"luminous_flux_lm": "2 %", "power_w": "1 %", "voltage_v": "0.5 %", "current_a": "1 %"}
    figures = found(make_campaign([make_lamp()], [unit], rules))
    # root sums of squares: sqrt(2² + 1²) %, sqrt(1 + 0.25 + 1) %, sqrt(0.25 + 1) %
    for quantity, value, percent in (
        ("efficacy_lm_per_w", 100, 5**0.5),
        ("power_factor", 0.87, 1.5),
        ("apparent_power_va", 9.2, 1.25**0.5),
    ):
        wide = figures.measured("L1", quantity, "U1").expanded_uncertainty
        assert float(wide) == pytest.approx(value * percent / 100, rel=1e-6), quantity


def test_rule_of_the_quantity_comes_before_propagation():
    unit = make_unit("U1", 2, luminous_flux_lm="800", power_w="8")
    rules = {"luminous_flux_lm": "2 %", "power_w": "1 %", "efficacy_lm_per_w": 5}
    figures = found(make_campaign([make_lamp()], [unit], rules))
    assert figures.measured("L1", "efficacy_lm_per_w", "U1").expanded_uncertainty == D(5)


def test_spectra_give_computed_figures_beside_reported_ones():
    units = [make_unit("U1", 2, luminous_flux_lm="1000", power_w="8"), make_unit("U2", 3)]
    spectra = (make_spectra("L1", ["U1", "U2"], [white(), white(0.4)]),)
    figures = found(make_campaign([make_lamp()], units, spectra=spectra))
    flux = figures.measured("L1", "luminous_flux_lm")
    assert flux.grade is Grade.COMPUTED
    assert flux.units_count == 2
    reported = figures.graded("L1", "luminous_flux_lm", Grade.REPORTED)
    assert (reported.value, reported.units_count) == (D(1000), 1)
    unit_flux = figures.measured("L1", "luminous_flux_lm", "U1")
    assert unit_flux.origin == ("spectra/L1.csv, column U1",)
    efficacy = figures.measured("L1", "efficacy_lm_per_w")
    assert efficacy.grade is Grade.COMPUTED
    assert efficacy.units_count == 1
    assert efficacy.value == rendered(Fraction(unit_flux.value) / 8)
    radiant = figures.measured("L1", "radiant_flux_w", "U1").value
    assert figures.measured("L1", "radiant_efficiency").value == exact_quotient(radiant, D(8))


def test_relative_spectra_withhold_the_flux_but_not_a_reported_one():
    units = [make_unit("U1", 2, luminous_flux_lm="1000"), make_unit("U2", 3)]
    spectra = (make_spectra("L1", ["U1", "U2"], [white(), white()], "relative"),)
    figures = found(make_campaign([make_lamp()], units, spectra=spectra))
    assert figures.measured("L1", "luminous_flux_lm", "U1").value == D(1000)
    assert figures.graded("L1", "luminous_flux_lm", Grade.COMPUTED, "U1") is None
    assert figures.measured("L1", "cct_k").units_count == 2
    assert figures.measured("L1", "luminous_flux_lm").value == D(1000)


def test_what_is_stated_about_spectra_gives_uncertainties():
    units = [make_unit("U1", 2)]
    spectra = (make_spectra("L1", ["U1"], [white()]),)
    bare = found(make_campaign([make_lamp()], units, spectra=spectra))
    assert bare.measured("L1", "cct_k").expanded_uncertainty is None
    rules = {"wavelength_scale_nm": 0.5, "spectral_noise_percent": "0.2 %", "ra": 1}
    stated = found(make_campaign([make_lamp()], units, rules, spectra=spectra))
    assert 3 < float(stated.measured("L1", "cct_k").expanded_uncertainty) < 60
    assert stated.measured("L1", "ra").expanded_uncertainty == 1
    assert stated.measured("L1", "luminous_flux_lm").expanded_uncertainty is None
    scaled = found(
        make_campaign([make_lamp()], units, rules | {"luminous_flux_lm": "2 %"}, spectra=spectra)
    )
    flux = scaled.measured("L1", "luminous_flux_lm")
    assert float(flux.expanded_uncertainty / flux.value) == pytest.approx(0.02, rel=1e-6)
    radiant = scaled.measured("L1", "radiant_flux_w")
    assert float(radiant.expanded_uncertainty / radiant.value) == pytest.approx(0.02, rel=0.2)


def test_order_of_lamps_changes_nothing():
    lamps = [make_lamp("L1"), make_lamp("L2")]
    units = [make_unit("U1", 2), make_unit("V1", 3, "L2")]
    sets = [make_spectra("L1", ["U1"], [white()]), make_spectra("L2", ["V1"], [white(0.7)])]
    rules = {"wavelength_scale_nm": 0.5, "spectral_noise_percent": 1, "luminous_flux_lm": "2 %"}
    one = make_campaign(lamps, units, rules, spectra=tuple(sets))
    other = make_campaign(lamps[::-1], units[::-1], rules, spectra=tuple(sets[::-1]))
    alone = make_campaign(lamps[:1], units[:1], rules, spectra=tuple(sets[:1]))

    def table(campaign, lamp_id="L1"):
        return {
            (f.unit_id, f.quantity, f.grade): (f.value, f.expanded_uncertainty)
            for f in figures_of(campaign)
            if f.lamp_id == lamp_id
        }

    assert table(one) == table(other)
    assert table(one, "L2") == table(other, "L2")
    first, second = table(one), table(alone)
    assert first.keys() == second.keys()
    for key, (value, _) in first.items():
        if value is not None:
            assert float(value) == pytest.approx(float(second[key][0]), rel=1e-8, abs=1e-9), key


def test_steps_are_counted_from_the_centre_nearest_to_the_declared_temperature():
    units = [make_unit("U1", 2, x="0.440", y="0.403"), make_unit("U2", 3, x="0.4437", y="0.403")]
    figures = found(make_campaign([make_lamp()], units, {"x": 0.001, "y": 0.001}))
    steps = figures.measured("L1", "sdcm", "U2")
    # IEC 60081 F 3000: centre 0.440, 0.403; g11 = 39e4: sqrt(39e4) * 0.0037 = 2.31
    assert float(steps.value) == pytest.approx(2.31, abs=0.005)
    assert steps.method == "sdcm_ellipse_iec_60081_3000k"
    assert "IEC 60081 3000 K" in steps.remarks[0]
    # along x: sqrt(39e4) * 0.001 = 0.62; along y: g12/sqrt(g11) * 0.001 = 0.31; together 0.70
    assert float(steps.expanded_uncertainty) == pytest.approx(0.70, abs=0.01)
    assert figures.measured("L1", "sdcm", "U1").value == 0
    mean = figures.measured("L1", "sdcm")
    assert "U2 with 2.3 steps" in " ".join(mean.remarks)


@pytest.mark.parametrize(
    ("declared", "method"),
    [(4000, "iec_60081_4000k"), (4500, "ansi_c78_377_2017_4500k"), (6500, "iec_60081_6500k")],
)
def test_centre_system_follows_the_declared_temperature(declared, method):
    lamp = make_lamp(declared={"cct_k": D(declared)})
    unit = make_unit("U1", 2, x="0.38", y="0.38")
    figures = found(make_campaign([lamp], [unit]))
    assert figures.measured("L1", "sdcm").method.endswith(method)


@pytest.mark.parametrize(
    ("declared", "word"), [({}, "declared"), ({"cct_k": D(20_000)}, "nominal centre")]
)
def test_steps_without_a_centre_are_withheld(declared, word):
    unit = make_unit("U1", 2, x="0.44", y="0.403")
    figures = found(make_campaign([make_lamp(declared=declared)], [unit]))
    steps = figures.measured("L1", "sdcm")
    assert steps.value is None
    assert word in steps.reason


def cone(unit_id, power=20):
    gamma = np.arange(0.0, 181.0, 1.0)
    intensity = 1000.0 * np.clip(np.cos(np.radians(gamma)), 0, None) ** power
    return IntensityTable(
        unit_id, np.zeros(1), gamma, intensity[np.newaxis], f"intensity/{unit_id}.csv"
    )


def test_useful_flux_of_a_directional_lamp_is_that_of_its_cone():
    lamp = make_lamp(directional=True)
    units = [make_unit("U1", 2), make_unit("U2", 3, luminous_flux_lm="310")]
    figures = found(make_campaign([lamp], units, intensity=(cone("U1"), cone("U2", 2))))
    # closed form: 2π I0/21 (1 - cos^21 45°)
    narrow = figures.measured("L1", "useful_luminous_flux_lm", "U1")
    expected = 2 * np.pi * 1000 / 21 * (1 - np.cos(np.pi / 4) ** 21)
    assert float(narrow.value) == pytest.approx(expected, rel=1e-3)
    assert narrow.method == "useful_flux_directional_eu_2019_2015"
    assert figures.measured("L1", "beam_angle_deg").units_count == 2
    assert figures.measured("L1", "luminous_flux_lm", "U2").grade is Grade.COMPUTED


def test_useful_flux_of_a_wide_directional_lamp():
    lamp = make_lamp(directional=True)
    figures = found(make_campaign([lamp], [make_unit("U1", 2)], intensity=(cone("U1", 1),)))
    # Lambertian: three quarters of π I0 in the cone of 120°
    useful = figures.measured("L1", "useful_luminous_flux_lm")
    assert float(useful.value) == pytest.approx(0.75 * np.pi * 1000, rel=1e-3)


def test_useful_flux_of_other_lamps_is_the_total():
    unit = make_unit("U1", 2, luminous_flux_lm="806")
    figures = found(make_campaign([make_lamp()], [unit], {"luminous_flux_lm": "2 %"}))
    useful = figures.measured("L1", "useful_luminous_flux_lm")
    assert useful.value == D(806)
    assert useful.expanded_uncertainty == D("16.12")
    unknown = found(make_campaign([make_lamp(directional=None)], [unit]))
    withheld = unknown.measured("L1", "useful_luminous_flux_lm")
    assert withheld.value is None
    assert "directional is not stated" in withheld.reason


def test_useful_flux_without_a_distribution_is_not_guessed():
    unit = make_unit("U1", 2, luminous_flux_lm="400")
    figures = found(make_campaign([make_lamp(directional=True)], [unit]))
    assert figures.measured("L1", "useful_luminous_flux_lm").reason == "not measured"


def test_flux_of_the_spectrum_comes_before_that_of_the_distribution():
    campaign = make_campaign(
        [make_lamp(directional=True)],
        [make_unit("U1", 2)],
        spectra=(make_spectra("L1", ["U1"], [white()]),),
        intensity=(cone("U1"),),
    )
    flux = found(campaign).measured("L1", "luminous_flux_lm", "U1")
    assert flux.origin == ("spectra/L1.csv, column U1",)
    assert any("intensity/U1.csv" in remark for remark in flux.remarks)


def sine(seconds, rate, depth, hertz=100.0):
    return 1 + depth * np.sin(2 * np.pi * hertz * np.arange(int(seconds * rate)) / rate)


def test_long_light_records_give_pst_and_short_ones_the_rest():
    short = LightRecord(
        "L1", ("U1", "U2"), 20e3, np.stack([sine(1, 20e3, 0.1)] * 2), False, "light/L1.csv"
    )
    long = LightRecord(
        "L1", ("U1",), 2e3, sine(40, 2e3, 0.1)[np.newaxis], True, "light/L1.long.csv"
    )
    units = [make_unit("U1", 2), make_unit("U2", 3)]
    figures = found(make_campaign([make_lamp()], units, light=(short, long)))
    assert float(figures.measured("L1", "percent_flicker").value) == pytest.approx(10, abs=0.1)
    assert figures.measured("L1", "percent_flicker", "U1").origin == ("light/L1.csv, column U1",)
    pst = figures.measured("L1", "pst_lm", "U1")
    assert pst.value is not None
    assert pst.origin == ("light/L1.long.csv, column U1",)
    without = found(make_campaign([make_lamp()], units, light=(short,)))
    assert without.measured("L1", "pst_lm").value is None
    assert "1 s" in without.measured("L1", "pst_lm").reason


def test_mains_captures_give_power_for_the_efficacy():
    rate = 20e3
    t = np.arange(4000) / rate
    capture = MainsCapture(
        "U1",
        rate,
        325.0 * np.sin(2 * np.pi * 50 * t),
        0.05 * np.sin(2 * np.pi * 50 * t - 0.3),
        "mains/U1.csv",
    )
    unit = make_unit("U1", 2, luminous_flux_lm="800", power_w="7.7")
    figures = found(make_campaign([make_lamp()], [unit], mains=(capture,)))
    # closed form: 325 * 0.05 / 2 * cos 0.3
    power = figures.measured("L1", "power_w")
    assert float(power.value) == pytest.approx(325 * 0.05 / 2 * np.cos(0.3), rel=1e-6)
    assert power.origin == ("mains/U1.csv",)
    efficacy = figures.measured("L1", "efficacy_lm_per_w")
    assert efficacy.grade is Grade.COMPUTED
    assert efficacy.origin == ("units.csv, row 2, column luminous_flux_lm", "mains/U1.csv")
    # what is zero is zero on every processor
    assert figures.measured("L1", "h2_percent").value == 0


def reading(unit_id, hours, flux, works=True, row=2):
    number = None if flux is None else D(flux)
    return EnduranceReading("L1", unit_id, D(hours), number, works, row=row)


def test_endurance_gives_factors_per_unit_and_for_the_lamp():
    rows = (
        reading("U1", 0, "800", row=2),
        reading("U2", 0, "800", row=3),
        reading("U1", 3000, "768", row=4),
        reading("U2", 3000, None, works=False, row=5),
    )
    units = [make_unit("U1", 2), make_unit("U2", 3)]
    campaign = make_campaign([make_lamp()], units, endurance=rows)
    figures = found(campaign)
    factor = figures.measured("L1", "lumen_maintenance_factor")
    assert factor.value == D("0.96")
    assert factor.units_count == 1
    assert any("1 of 2 units: the unit had failed" in remark for remark in factor.remarks)
    survival = figures.measured("L1", "survival_factor")
    assert (survival.value, survival.units_count) == (D("0.5"), 2)
    assert survival.origin == ("endurance.csv, rows 2 to 5",)
    assert "TM-21" in figures.measured("L1", "l70_projected_h").reason
    assert ageing_of(campaign)["L1"].curve.maintenance[-1] == pytest.approx(0.96)


def test_gaps_of_single_units_are_named_on_the_mean():
    dark = np.zeros_like(WAVELENGTH)
    units = [make_unit("U1", 2, power_w="8"), make_unit("U2", 3, power_w="8")]
    spectra = (make_spectra("L1", ["U1", "U2"], [white(), dark]),)
    figures = found(make_campaign([make_lamp()], units, spectra=spectra))
    cct = figures.measured("L1", "cct_k")
    assert cct.units_count == 1
    assert any("not given for 1 of 2 units" in remark for remark in cct.remarks)
    assert figures.measured("L1", "cct_k", "U2").value is None
    assert figures.measured("L1", "efficacy_lm_per_w", "U2").reason.startswith("luminous flux: ")


def test_power_of_zero_gives_no_efficacy():
    unit = make_unit("U1", 2, luminous_flux_lm="800", power_w="0")
    figures = found(make_campaign([make_lamp()], [unit]))
    assert figures.measured("L1", "efficacy_lm_per_w").reason == "active power is zero"


def test_figures_come_lamp_by_lamp_in_the_order_of_the_catalogue():
    lamps = [make_lamp("L2"), make_lamp("L1")]
    units = [
        make_unit("B", 2, "L2", power_w="8", luminous_flux_lm="800"),
        make_unit("A", 3, "L2", power_w="8", luminous_flux_lm="800"),
    ]
    figures = figures_of(make_campaign(lamps, units))
    assert [f.lamp_id for f in figures] == sorted((f.lamp_id for f in figures), reverse=True)
    places = {name: index for index, name in enumerate(QUANTITIES)}
    of_first = [f for f in figures if f.lamp_id == "L2"]
    assert [places[f.quantity] for f in of_first] == sorted(places[f.quantity] for f in of_first)
    assert [f.unit_id for f in of_first if f.quantity == "power_w"] == [MEAN, "B", "A"]
    keys = [(f.lamp_id, f.unit_id, f.quantity, f.grade) for f in figures]
    assert len(keys) == len(set(keys))


def test_same_campaign_gives_the_same_figures_twice():
    units = [make_unit("U1", 2)]
    spectra = (make_spectra("L1", ["U1"], [white()]),)
    campaign = make_campaign([make_lamp()], units, {"spectral_noise_percent": 1}, spectra=spectra)
    assert figures_of(campaign) == figures_of(campaign)


def test_exact_numbers_keep_twelve_digits():
    assert rendered(Fraction(1, 3)) == D("0.333333333333")
    assert rendered(Fraction(1, 8)) == D("0.125")
    assert str(exact_mean([D("5.00")])) == "5.00"
    assert exact_mean([D("0.1"), D("0.2"), D("0.3")]) == D("0.2")


def test_mean_is_uncertain_only_where_every_unit_is():
    units = [
        make_unit("U1", 2, u={"power_w": "0.1"}, power_w="8"),
        make_unit("U2", 3, power_w="8.2"),
    ]
    figures = found(make_campaign([make_lamp()], units))
    assert figures.measured("L1", "power_w", "U1").expanded_uncertainty == D("0.1")
    assert figures.measured("L1", "power_w").expanded_uncertainty is None
    assert figures.measured("L1", "power_w").spread is not None


def test_a_percentage_of_zero_is_no_uncertainty():
    units = [make_unit("U1", 2, standby_power_w="0"), make_unit("U2", 3, standby_power_w="0.4")]
    campaign = make_campaign([make_lamp()], units, {"standby_power_w": "2 %"})
    figures = found(campaign)
    assert figures.measured("L1", "standby_power_w", "U1").expanded_uncertainty is None
    assert figures.measured("L1", "standby_power_w", "U2").expanded_uncertainty == D("0.008")
