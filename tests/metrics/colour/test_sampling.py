"""Sampling rules against colour-science's Sprague interpolator and closed forms."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.sampling import (
    normalised,
    on_whole_nanometres,
    sampling,
    sprague_matrix,
)


@pytest.mark.parametrize(
    ("wavelength", "kind", "step", "remark"),
    [
        (np.arange(380.0, 781.0), "native", 1, ""),
        (np.arange(380.0, 781.0, 5), "native", 5, ""),
        (np.arange(382.0, 781.0, 5), "sprague", 1, "Sprague"),
        (np.arange(380.0, 781.0, 2), "sprague", 1, "Sprague"),
        (np.arange(380.0, 781.0, 10), "sprague", 1, "Sprague"),
        (np.arange(380.25, 781.0), "sprague", 1, "Sprague"),
        (np.arange(380.0, 780.2, 0.25), "averaged", 1, "averaged"),
        (np.delete(np.arange(380.0, 781.0), 100), "cubic", 1, "cubic"),
    ],
)
def test_rule(wavelength, kind, step, remark):
    # CIE 15 clause 7: 1 nm or 5 nm as they are; the rest is lampassay_methods
    how = sampling(wavelength)
    assert (how.kind, how.step_nm) == (kind, step)
    assert remark in how.remark
    grid = how.wavelength_nm
    assert grid[0] >= wavelength[0] - 1e-3
    assert grid[-1] <= wavelength[-1] + 1e-3
    assert on_whole_nanometres(wavelength, np.ones((2, wavelength.size)), how).shape[1] == grid.size


def test_sprague_against_colour_science(colour_science):
    # colour-science 0.4.7, SpragueInterpolator, which cites CIE 167
    nm = np.arange(380.0, 781.0, 5.0)
    values = np.random.default_rng(3).random(nm.size)
    fine = np.arange(380.0, 781.0)
    matrix = sprague_matrix(nm.size, tuple(((fine - 380) / 5).tolist()))
    expected = colour_science.SpragueInterpolator(nm, values)(fine)
    np.testing.assert_allclose(matrix @ values, expected, atol=1e-12)


@pytest.mark.parametrize("degree", [0, 1, 2, 3])
def test_interpolation_keeps_polynomials(degree):
    # Closed form: Sprague's and cubic interpolation reproduce cubics
    uneven = np.sort(np.append(np.arange(380.0, 781.0, 4.0), 555.3))
    even = np.arange(380.0, 781.0, 4.0)
    for nm in (uneven, even):
        how = sampling(nm)
        polynomial = ((nm - 580) / 100) ** degree
        found = on_whole_nanometres(nm, polynomial[None], how)[0]
        inside = slice(12, -12)  # Sprague's end points are exact for straight lines only
        expected = ((how.wavelength_nm - 580) / 100) ** degree
        np.testing.assert_allclose(found[inside], expected[inside], atol=1e-9)


def test_averaging_keeps_power():
    # Closed form: cells of 1 nm add up to the trapezoid over the whole record
    nm = np.arange(380.0, 780.05, 0.1)
    values = np.random.default_rng(5).random((3, nm.size))
    how = sampling(nm)
    found = on_whole_nanometres(nm, values, how)
    np.testing.assert_allclose(found.sum(axis=1), np.trapezoid(values, nm), rtol=1e-12)


def test_normalised_marks_what_cannot_be_used():
    values = np.array([[1.0, 2.0], [0.0, 0.0], [-3.0, 1.0], [np.nan, 1.0], [np.inf, 1.0]])
    spectra, peak, lowest, usable = normalised(values)
    assert usable.tolist() == [True, False, False, False, False]
    assert spectra[0].tolist() == [0.5, 1.0]
    assert peak[0] == 2.0
    assert lowest[0] == 0.5
    assert np.isfinite(spectra).all()
