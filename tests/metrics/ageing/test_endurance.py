"""Factors of ageing tests; the definitions are those of EU 2019/2020 Annex V."""

import math

import numpy as np
import pytest

from generator.metrics.ageing import ageing_figures

HOURS = np.array([0.0, 1000.0, 2000.0, 3000.0])


def lamp(units=4, hours=HOURS, rate=1e-5):
    flux = 800.0 * np.tile(np.exp(-rate * hours), (units, 1))
    same = np.ones_like(flux)
    return flux, same.copy(), 0.45 * same, 0.41 * same


def test_factor_is_the_mean_over_the_survivors_only():
    flux, works, x, y = lamp(3)
    flux[:, 3] = [760.0, 784.0, 100.0]
    works[2, 2:] = 0
    found = ageing_figures(HOURS, flux, works, x, y)
    # (0.95 + 0.98)/2; the third unit failed
    assert found.lamp.values["lumen_maintenance_factor"][0] == pytest.approx(0.965)
    assert found.lamp.values["survival_factor"][0] == pytest.approx(2 / 3)
    np.testing.assert_allclose(found.units.values["lumen_maintenance_factor"], [0.95, 0.98, np.nan])
    assert "failed" in found.units.reason("lumen_maintenance_factor", 2)
    assert found.read_at_h == 3000


def test_link_to_the_declared_life():
    # 100 exp(3000 ln 0.7 / 15 000 h) = 93.11 %: a lamp that ages by its declared L70 shows it
    flux, works, x, y = lamp(rate=-math.log(0.7) / 15_000)
    found = ageing_figures(HOURS, flux, works, x, y)
    assert found.lamp.values["lumen_maintenance_factor"][0] == pytest.approx(0.9311, abs=5e-5)


def test_longer_test_is_read_at_three_thousand_hours():
    hours = np.arange(0.0, 7001.0, 1000.0)
    found = ageing_figures(hours, *lamp(12, hours))
    assert found.read_at_h == 3000
    assert found.lamp.values["lumen_maintenance_factor"][0] == pytest.approx(math.exp(-0.03))
    # projected: ln(1/0.7)/1e-5 = 35 667 h, below the limit of 5.5 times 7000 h
    assert found.lamp.values["l70_projected_h"][0] == pytest.approx(35_667, abs=1)
    assert found.lamp.expanded_uncertainty["l70_projected_h"][0] == pytest.approx(0, abs=1)
    assert any("between" in text for text in found.lamp.remarks[0])


def test_projection_beyond_the_limit_is_reported_as_greater():
    hours = np.arange(0.0, 6001.0, 1000.0)
    found = ageing_figures(hours, *lamp(10, hours, rate=1e-6))
    assert found.lamp.values["l70_projected_h"][0] == 33_000
    assert "greater than 33000 h" in " ".join(found.lamp.remarks[0])
    assert np.isnan(found.lamp.expanded_uncertainty["l70_projected_h"][0])


def test_short_test_gives_no_factor_and_no_projection():
    hours = HOURS[:3]
    found = ageing_figures(hours, *lamp(10, hours))
    assert all(np.isnan(numbers[0]) for numbers in found.lamp.values.values())
    assert "2000 h" in found.lamp.reason("lumen_maintenance_factor", 0)
    assert "TM-21" in found.lamp.reason("l70_projected_h", 0)
    assert found.curve is None


def test_three_thousand_hours_give_the_factor_without_a_projection():
    found = ageing_figures(HOURS, *lamp(10))
    assert np.isfinite(found.lamp.values["lumen_maintenance_factor"][0])
    assert np.isnan(found.lamp.values["l70_projected_h"][0])
    assert "6000 h" in found.lamp.reason("l70_projected_h", 0)


def test_reading_window_of_forty_eight_hours():
    hours = np.array([0.0, 2960.0, 3600.0])
    found = ageing_figures(hours, *lamp(2, hours))
    assert found.read_at_h == 2960


def test_test_without_a_start_says_so():
    hours = np.array([500.0, 3000.0])
    found = ageing_figures(hours, *lamp(2, hours))
    assert "0 h" in found.lamp.reason("lumen_maintenance_factor", 0)


def test_unit_not_looked_at_leaves_survival_unknown():
    flux, works, x, y = lamp(2)
    works[1, 3] = np.nan
    flux[1, 3] = np.nan
    found = ageing_figures(HOURS, flux, works, x, y)
    assert np.isnan(found.lamp.values["survival_factor"][0])
    assert "not looked at" in found.lamp.reason("survival_factor", 0)
    assert np.isfinite(found.lamp.values["lumen_maintenance_factor"][0])
    for name in ("lumen_maintenance_factor", "chromaticity_shift"):
        assert "not looked at" in found.units.reason(name, 1)
        assert found.units.reason(name, 0) == ""


def test_survivor_without_a_flux_is_named():
    flux, works, x, y = lamp(3)
    flux[0, 3] = np.nan
    flux[1, 0] = np.nan
    found = ageing_figures(HOURS, flux, works, x, y)
    assert found.lamp.values["survival_factor"][0] == 1.0
    assert "not read" in found.units.reason("lumen_maintenance_factor", 0)
    assert "0 h" in found.units.reason("lumen_maintenance_factor", 1)
    assert any("2 survivors" in text for text in found.lamp.remarks[0])


def test_no_survivor():
    flux, works, x, y = lamp(2)
    works[:, 3] = 0
    found = ageing_figures(HOURS, flux, works, x, y)
    assert found.lamp.values["survival_factor"][0] == 0.0
    assert np.isnan(found.lamp.values["lumen_maintenance_factor"][0])
    assert "survived" in found.lamp.reason("lumen_maintenance_factor", 0)


def test_a_unit_that_failed_once_stays_failed():
    flux, works, x, y = lamp(2)
    works[0, 1] = 0
    found = ageing_figures(HOURS, flux, works, x, y)
    assert found.lamp.values["survival_factor"][0] == 0.5


def test_chromaticity_shift_is_the_distance_in_u_prime_v_prime():
    flux, works, x, y = lamp(1)
    # u', v' by the definition, worked by hand: (0.256410, 0.525641) and (0.256818, 0.526705)
    x[0, 3], y[0, 3] = 0.452, 0.412
    found = ageing_figures(HOURS, flux, works, x, y)
    assert found.lamp.values["chromaticity_shift"][0] == pytest.approx(0.001139, abs=5e-7)


def test_no_colour_no_shift():
    flux, works, x, y = lamp(1)
    found = ageing_figures(HOURS, flux, works, x * np.nan, y * np.nan)
    assert np.isnan(found.lamp.values["chromaticity_shift"][0])
    assert "chromaticity" in found.lamp.reason("chromaticity_shift", 0)


def test_readings_that_do_not_fit_are_refused():
    flux, works, x, y = lamp(1)
    with pytest.raises(ValueError, match="do not fit"):
        ageing_figures(HOURS[:2], flux, works, x, y)
    with pytest.raises(ValueError, match="ascend"):
        ageing_figures(HOURS[::-1], flux, works, x, y)
