"""Uncertainty of computed figures by what the campaign states about the raw data."""

from decimal import Decimal

import numpy as np
import pytest

from generator.metrics.assembly import figures_of
from generator.records.campaign import Campaign
from generator.records.figure import FigureSet, Grade
from generator.records.lamp import Lamp, Unit
from generator.records.raw import EnduranceReading, IntensityTable, LightRecord, MainsCapture
from generator.records.settings import Settings

D = Decimal
RATE = 20_000.0


def figures_with(uncertainty, unit=None, directional=False, **raw):
    settings = Settings.model_validate(
        {
            "campaign": {"title": "t"},
            "uncertainty": uncertainty,
            "supply": {"frequency_hz": 50},
        }
    )
    lamp = Lamp("L1", "B", "M", directional=directional, declared={"cct_k": D(3000)}, row=2)
    units = (unit or Unit("U1", "L1", row=2),)
    return FigureSet(figures_of(Campaign("t", settings, (lamp,), units, **raw)))


def expanded(figures, quantity):
    figure = figures.graded("L1", quantity, Grade.COMPUTED, "U1")
    assert figure.value is not None
    return figure.expanded_uncertainty


def light(seconds=0.5, rate=RATE, depth=0.3, long=False):
    time = np.arange(int(seconds * rate)) / rate
    wave = 1 + depth * np.sin(2 * np.pi * 100 * time)
    file = f"light/L1{'.long' if long else ''}.csv"
    return LightRecord("L1", ("U1",), rate, wave[np.newaxis], long, file)


def mains(angle=0.6):
    turn = 2 * np.pi * 50 * np.arange(4000) / RATE
    current = 0.05 * np.sin(turn - angle) + 0.01 * np.sin(3 * turn)
    return MainsCapture("U1", RATE, 325 * np.sin(turn), current, "mains/U1.csv")


def beam():
    gamma = np.arange(0.0, 181.0, 1.0)
    row = np.round(1000 * np.clip(np.cos(np.radians(gamma)), 0, None) ** 20, 6)
    return IntensityTable("U1", np.zeros(1), gamma, row[np.newaxis], "intensity/U1.csv")


def endurance():
    return tuple(
        EnduranceReading("L1", "U1", D(hours), D(flux), True, D(x), D("0.38"), row)
        for hours, flux, x, row in ((0, 800, "0.380", 2), (3000, 768, "0.385", 3))
    )


RAW = {
    "light": (light(), light(40, 2000.0, long=True)),
    "mains": (mains(),),
    "intensity": (beam(),),
    "endurance": endurance(),
}
EVERYTHING = {
    "light_noise_percent": 0.2,
    "light_offset_percent": 1,
    "time_base_percent": 0.01,
    "voltage_v": "0.2 %",
    "current_a": "0.4 %",
    "voltage_current_skew_us": 10,
    "luminous_flux_lm": "2 %",
    "peak_intensity_cd": "2.5 %",
    "angle_deg": 0.5,
    "flux_repeatability_percent": 0.3,
    "chromaticity_repeatability": 0.0003,
}


def test_nothing_stated_leaves_every_uncertainty_unknown():
    figures = figures_with({}, **RAW)
    assert all(figure.expanded_uncertainty is None for figure in figures)


def test_every_computed_figure_has_an_uncertainty_where_enough_is_stated():
    figures = figures_with(EVERYTHING, **RAW)
    without = {
        figure.quantity
        for figure in figures
        if figure.grade is Grade.COMPUTED
        and figure.value is not None
        and figure.expanded_uncertainty is None
    }
    # angles of the current, of which nothing is stated, and a share of units that were counted
    angles = {"current_start_deg", "current_last_peak_deg", "current_end_deg"}
    assert without == {"survival_factor", *angles}


def test_no_uncertainty_is_zero():
    for figure in figures_with(EVERYTHING, **RAW):
        wide = figure.expanded_uncertainty
        # a harmonic that is not there has a relative uncertainty of nothing
        if wide is not None and figure.value:
            assert wide > 0, figure.quantity


def test_column_comes_before_rule_and_rule_before_propagation():
    rules = EVERYTHING | {"svm": "5 %", "power_factor": 0.02}
    unit = Unit("U1", "L1", {}, {"svm": D("0.5")}, 2)
    figures = figures_with(rules, unit, **RAW)
    assert expanded(figures, "svm") == D("0.5")
    assert expanded(figures, "power_factor") == D("0.02")
    propagated = figures_with(EVERYTHING, **RAW)
    # sin 0.6 times the angle of 10 us at 50 Hz, times I1/I
    expected = np.sin(0.6) * 2 * np.pi * 50 * 10e-6 / np.sqrt(1 + 0.04)
    assert float(expanded(propagated, "power_factor")) == pytest.approx(expected, rel=1e-3)


def test_power_factor_without_a_delay_takes_power_voltage_and_current_as_independent():
    rules = {"power_w": "1 %", "voltage_v": "0.5 %", "current_a": "1 %"}
    figures = figures_with(rules, **RAW)
    value = float(figures.graded("L1", "power_factor", Grade.COMPUTED, "U1").value)
    assert float(expanded(figures, "power_factor")) == pytest.approx(0.015 * value, rel=1e-6)
    assert expanded(figures, "displacement_factor") is None


def test_useful_flux_of_a_directional_lamp_takes_that_of_its_cone():
    figures = figures_with(EVERYTHING, directional=True, **RAW)
    useful = figures.graded("L1", "useful_luminous_flux_lm", Grade.COMPUTED, "U1")
    assert useful.expanded_uncertainty == expanded(figures, "flux_90deg_lm")
    assert float(useful.expanded_uncertainty) >= 0.02 * float(useful.value)


def test_repeatability_gives_lumen_maintenance_and_shift():
    figures = figures_with({k: EVERYTHING[k] for k in ("flux_repeatability_percent",)}, **RAW)
    # 0.96 times 0.3 % times the root of 2
    factor = float(expanded(figures, "lumen_maintenance_factor"))
    assert factor == pytest.approx(0.96 * 0.003 * np.sqrt(2), rel=1e-6)
    assert expanded(figures, "chromaticity_shift") is None


def test_an_absolute_rule_of_the_current_holds_for_every_order():
    figures = figures_with({"current_a": 0.0005}, **RAW)
    # 0.5 mA of a fundamental of 35.4 mA, and 20 % of the same again
    share = 100 * 0.0005 / (0.05 / np.sqrt(2)) * np.hypot(1, 0.2)
    assert float(expanded(figures, "h3_percent")) == pytest.approx(share, rel=1e-3)


def test_remarks_stand_with_the_figures_they_concern():
    figures = figures_with({}, **RAW)
    pst = figures.graded("L1", "pst_lm", Grade.COMPUTED, "U1")
    assert pst.origin == ("light/L1.long.csv, column U1",)
    assert not any("usual" in text for text in pst.remarks)
    assert any("PstLM rests on 40 s" in text for text in pst.remarks)
    slow = figures_with({}, light=(light(0.5, 5000.0),))
    depth = slow.graded("L1", "percent_flicker", Grade.COMPUTED, "U1")
    assert any("20 kHz or more is usual" in text for text in depth.remarks)
    assert any("1 s or more is usual" in text for text in depth.remarks)
