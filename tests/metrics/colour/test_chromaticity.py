"""Chromaticity, dominant wavelength and purity against closed forms and colour-science."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.chromaticity import (
    chromaticity_uv_1960,
    chromaticity_uv_prime,
    dominant_wavelength,
)


def test_uv_prime_of_c78_377_centre():
    # ANSI C78.377-2008, 3000 K: x, y 0.4338, 0.4030; u', v' 0.2490, 0.5205
    u, v = chromaticity_uv_prime(np.array([0.4338]), np.array([0.4030]))
    assert (u[0], v[0]) == pytest.approx((0.2490, 0.5205), abs=0.00005)


def test_uv_1960_differs_in_v_alone():
    # CIE 15: u = u', v = 2/3 v'
    x, y = np.array([0.3, 0.45]), np.array([0.32, 0.41])
    u, v = chromaticity_uv_1960(x, y)
    u_prime, v_prime = chromaticity_uv_prime(x, y)
    np.testing.assert_array_equal(u, u_prime)
    np.testing.assert_allclose(v, v_prime * 2 / 3, rtol=1e-15)


@pytest.mark.parametrize(
    "xy", [(0.3, 0.6), (0.6, 0.35), (0.15, 0.05), (0.25, 0.2), (0.1, 0.4), (0.45, 0.41)]
)
def test_dominant_wavelength_against_colour_science(colour_science, xy):
    # colour-science 0.4.7 gives whole nanometres; the purity is not rounded
    wavelength, purity = dominant_wavelength(np.array([xy[0]]), np.array([xy[1]]))
    assert wavelength[0] == pytest.approx(
        colour_science.dominant_wavelength(xy, [1 / 3, 1 / 3])[0], abs=0.6
    )
    assert purity[0] == pytest.approx(
        colour_science.excitation_purity(xy, [1 / 3, 1 / 3]), abs=2e-5
    )


def test_points_on_the_locus(colour_science):
    # Closed form: a spectral colour is its own dominant wavelength, with a purity of one
    cmfs = colour_science.MSDS_CMFS["CIE 1931 2 Degree Standard Observer"]
    nm = np.array([400.0, 450.0, 500.0, 555.0, 600.0, 690.0])
    X, Y, Z = cmfs[nm].T
    wavelength, purity = dominant_wavelength(X / (X + Y + Z), Y / (X + Y + Z))
    np.testing.assert_allclose(wavelength, nm, atol=1e-6)
    np.testing.assert_allclose(purity, 1.0, atol=1e-9)


def test_purple_has_a_complementary_wavelength():
    # colour-science 0.4.7: -521 nm and 0.645; its purple line runs from 360 nm to 830 nm
    wavelength, purity = dominant_wavelength(np.array([0.4]), np.array([0.2]))
    assert wavelength[0] == pytest.approx(-521, abs=0.6)
    assert purity[0] == pytest.approx(0.6453, abs=0.001)


def test_half_way_to_the_locus_has_half_the_purity():
    # Closed form: excitation purity is a quotient of distances on one line
    x, y = np.array([0.3, 0.4]), np.array([0.6, 0.2])
    nm, purity = dominant_wavelength(x, y)
    nm_half, purity_half = dominant_wavelength((x + 1 / 3) / 2, (y + 1 / 3) / 2)
    np.testing.assert_allclose(nm_half, nm, atol=1e-9)
    np.testing.assert_allclose(purity_half, purity / 2, atol=1e-12)


def test_achromatic_point_has_no_dominant_wavelength():
    wavelength, purity = dominant_wavelength(np.array([1 / 3]), np.array([1 / 3]))
    assert np.isnan(wavelength[0])
    assert purity[0] == 0.0
