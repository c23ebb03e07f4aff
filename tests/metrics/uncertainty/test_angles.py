"""Uncertainty of figures of intensity distributions, on beams of known truth."""

import numpy as np
import pytest

from generator.metrics.distribution import intensity_figures
from generator.metrics.uncertainty.angles import distribution_uncertainty

PLANES = np.zeros(1)
GAMMA = np.arange(0.0, 181.0, 2.5)


def beams(exponents, shift_deg=0.0):
    """Intensity 1000 cos^m of the angle [cd] (beams, 1, angles), read at angles off by a shift."""
    cosine = np.maximum(np.cos(np.radians(np.abs(GAMMA + shift_deg))), 0.0)
    exact = 1000 * cosine[np.newaxis, np.newaxis, :] ** np.reshape(exponents, (-1, 1, 1))
    return np.round(exact, 9)


def uncertainty(table, flux=np.nan, intensity=np.nan, angle_deg=None):
    found = intensity_figures(PLANES, GAMMA, table)
    count = table.shape[0]
    return found, distribution_uncertainty(
        PLANES, GAMMA, table, found, np.full(count, flux), np.full(count, intensity), angle_deg
    )


def test_scale_multiplies_fluxes_and_intensity():
    found, known = uncertainty(beams([2.0, 8.0]), flux=0.02, intensity=0.03)
    for name in ("flux_90deg_lm", "flux_120deg_lm", "luminous_flux_lm"):
        np.testing.assert_allclose(known[name], 0.02 * found.values[name], rtol=1e-12)
    np.testing.assert_allclose(known["peak_intensity_cd"], [30.0, 30.0], rtol=1e-9)
    assert "beam_angle_deg" not in known


def test_scale_of_intensities_serves_fluxes_where_theirs_is_not_stated():
    found, known = uncertainty(beams([4.0]), intensity=0.03)
    assert known["flux_90deg_lm"][0] == pytest.approx(0.03 * found.values["flux_90deg_lm"][0])


def test_both_halves_of_a_beam_err_alike():
    # the table is read at angles 0.5 degrees off on either side: the beam by 1 degree
    _, known = uncertainty(beams([6.0]), angle_deg=0.5)
    assert known["beam_angle_deg"][0] == pytest.approx(1.0, rel=0.02)


def test_share_of_a_cone_rests_on_the_angle_alone():
    # cos^m: the share of a cone of half-angle t is 1 - cos^(m+1) t; brute-force shift as check
    _, known = uncertainty(beams([3.0]), angle_deg=0.5)
    shifted = [
        intensity_figures(PLANES, GAMMA, beams([3.0], d)).values["flux_120deg_fraction"][0]
        for d in (-0.5, 0.5)
    ]
    assert known["flux_120deg_fraction"][0] == pytest.approx(
        abs(shifted[0] - shifted[1]) / 2, rel=0.02
    )


def test_nothing_stated_nothing_known():
    _, known = uncertainty(beams([3.0]))
    assert all(np.isnan(numbers).all() for numbers in known.values())


def test_intervals_hold_the_truth_as_often_as_they_say():
    rng = np.random.default_rng(15)
    count = 500
    exponents = rng.uniform(2, 30, count)
    scale = 1 + 0.01 * rng.standard_normal((count, 1, 1))
    shift = 0.25 * rng.standard_normal(count)
    seen = scale * np.concatenate([beams([m], d) for m, d in zip(exponents, shift, strict=True)])
    right = intensity_figures(PLANES, GAMMA, beams(exponents)).values
    found, known = uncertainty(seen, flux=0.02, intensity=0.02, angle_deg=0.5)
    for name in ("flux_90deg_lm", "flux_120deg_lm", "beam_angle_deg"):
        share = np.mean(np.abs(found.values[name] - right[name]) <= known[name])
        # 95.45 % meant; 500 beams know the share to 0.9 %
        assert 0.93 <= share <= 0.975, name
