"""Colour rendering against other people's code and closed forms."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour import spectral_figures
from generator.metrics.colour.colour_rendering import sample_chromaticities, uvw_1964

NM5 = np.arange(380.0, 781.0, 5.0)


def test_ra_of_the_r_package_colorspec(illuminant_spectrum):
    # colorSpec 1.x (own code, snapshot of January 2025): Ra of F2 64.158 and F4 51.365; sample
    # interpolation and the reference's temperature differ by 0.02
    spectra = np.array([illuminant_spectrum("FL2"), illuminant_spectrum("FL4")])
    ra = spectral_figures(NM5, spectra, absolute=False).values["ra"]
    assert ra == pytest.approx([64.158, 51.365], abs=0.02)


def test_cct_of_the_r_package_colorspec(illuminant_spectrum):
    # the same: D65 6503.32 K and A 2855.66 K with the exact isotherm, from finer sums
    spectra = np.array([illuminant_spectrum("D65"), illuminant_spectrum("A")])
    cct = spectral_figures(NM5, spectra, absolute=False).values["cct_k"]
    assert cct == pytest.approx([6503.32, 2855.66], abs=0.5)


def test_ra_is_the_mean_of_the_first_eight(illuminant_spectrum):
    # CIE 13.3 clause 5.9: Ra is the arithmetic mean of R1 to R8
    values = spectral_figures(NM5, illuminant_spectrum("FL11")[None], absolute=False).values
    assert values["ra"][0] == pytest.approx(np.mean([values[f"r{i}"][0] for i in range(1, 9)]))


def test_indices_may_be_negative(illuminant_spectrum):
    # FL4 R9 is -111: never cut at zero
    values = spectral_figures(NM5, illuminant_spectrum("FL4")[None], absolute=False).values
    assert values["r9"][0] == pytest.approx(-111.3, abs=0.1)


def test_uvw_1964_of_white():
    # CIE 13.3 clause 5.8: W* = 25 * 100^(1/3) - 17 = 99.04, U* = V* = 0 at the white
    white = np.array([[0.2]])
    uvw = uvw_1964(white, white, np.array([[100.0]]), white, white)
    assert uvw[0, :, 0] == pytest.approx([0, 0, 99.0397], abs=5e-5)


def test_sample_chromaticity_of_equal_energy():
    # Closed form: X = Y = Z gives u = 4/19, v = 6/19
    u, v = sample_chromaticities(np.ones((1, 3, 2)))
    assert u[0, 0] == pytest.approx(4 / 19)
    assert v[0, 0] == pytest.approx(6 / 19)
