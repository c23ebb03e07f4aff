"""Planckian locus and CCT against CIE 15, Ohno's example and closed forms."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.colour_temperature import (
    correlated_colour_temperature,
    planckian_locus_uv,
    planckian_locus_xy,
    planckian_spectrum,
)


def test_locus_at_illuminant_a():
    # CIE 15: illuminant A, 2856 K with c2 = 1.4388e-2 (T = 2855.54 K), x 0.44758, y 0.40745;
    # printed from a 5 nm sum, hence 2e-5 and not half a digit
    xy = planckian_locus_xy(np.array([2848 * 1.4388 / 1.4350]))
    assert xy[0] == pytest.approx([0.44758, 0.40745], abs=2e-5)


def test_planckian_spectrum_is_one_at_560_nm_and_follows_wien():
    # Closed forms: definition of the relative scale; Wien's ratio where exp(c2/λT) >> 1
    spectrum = planckian_spectrum(np.array([400.0, 560.0]), np.array([1000.0]))[0]
    wien = (560 / 400) ** 5 * np.exp(1.4388e-2 / 1000 * (1 / 560e-9 - 1 / 400e-9))
    assert spectrum == pytest.approx([wien, 1.0], rel=1e-9)


def test_example_of_ohno():
    # u, v = 0.1978, 0.3122: 6507.47 K, +0.00322 (colour-science 0.4.7, locus over 360-780 nm;
    # the locus over 360-830 nm here moves the CCT by 0.06 K)
    cct, duv = correlated_colour_temperature(np.array([0.1978]), np.array([0.3122]))
    assert cct[0] == pytest.approx(6507.47, abs=0.07)
    assert duv[0] == pytest.approx(0.00322, abs=5e-6)


@pytest.mark.parametrize("duv", [-0.03, -0.01, -0.00199, -0.0005, 0.0, 0.001, 0.0021, 0.01, 0.03])
def test_points_at_a_known_distance(duv):
    # Closed form: points on the normal of the locus belong to the foot of that normal
    temperature = np.geomspace(1010.0, 24500.0, 2000)
    foot = planckian_locus_uv(temperature)
    along = planckian_locus_uv(temperature * 1.00005) - planckian_locus_uv(temperature / 1.00005)
    normal = np.column_stack([along[:, 1], -along[:, 0]])
    normal *= (np.sign(normal[:, 1]) / np.hypot(*normal.T))[:, None]
    u, v = (foot + duv * normal).T
    cct, found = correlated_colour_temperature(u, v)
    # 3e-5 of the temperature (0.1 K at 3000 K) is what the method leaves at 0.2 % spacing
    np.testing.assert_allclose(cct, temperature, rtol=3e-5)
    np.testing.assert_allclose(found, duv, rtol=0, atol=5e-7)


def test_ends_of_the_range_give_nothing():
    u, v = planckian_locus_uv(np.array([900.0, 40000.0])).T
    cct, duv = correlated_colour_temperature(u, v)
    assert np.isnan(cct).all()
    assert np.isnan(duv).all()
