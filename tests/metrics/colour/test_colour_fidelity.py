"""CAM02-UCS and TM-30 figures against colour-science and closed forms."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.colour_fidelity import cam02_ucs, colour_fidelity
from generator.metrics.colour.weighting import CAT02


def test_cam02_ucs_against_colour_science(colour_science):
    # colour-science 0.4.7, XYZ_to_CIECAM02 under the conditions of TM-30
    white = np.array([[98.0, 100.0, 60.0]])
    samples = np.random.default_rng(7).uniform(5, 60, (1, 3, 99))
    conditions = colour_science.VIEWING_CONDITIONS_CIECAM02["Average"]
    specification = colour_science.XYZ_to_CIECAM02(
        samples[0].T, white[0], 100, 20, conditions, discount_illuminant=True
    )
    JMh = np.column_stack([specification.J, specification.M, specification.h])
    expected = colour_science.JMh_CIECAM02_to_CAM02UCS(JMh).T
    found = cam02_ucs(np.matmul(CAT02, samples), white @ CAT02.T)[0]
    np.testing.assert_allclose(found, expected, atol=1e-6)


def test_equal_samples_are_perfect():
    # Closed form: no difference gives Rf = 10 ln(1 + exp(10)), Rg = 100, no shifts
    angle = np.linspace(0.01, 2 * np.pi - 0.01, 99)
    samples = np.stack([np.full(99, 50.0), 20 * np.cos(angle), 20 * np.sin(angle)])[None]
    figures = colour_fidelity(samples, samples)
    assert figures.rf[0] == pytest.approx(10 * np.log1p(np.exp(10)), abs=1e-12)
    assert figures.rg[0] == pytest.approx(100, abs=1e-9)
    assert np.abs(figures.rcs_h).max() == 0
    assert np.abs(figures.rhs_h).max() == 0


def test_uniform_growth_is_gamut_and_chroma_shift():
    # Closed form: all chroma 10 % larger is 121 % of area; every bin shifts outwards
    angle = np.linspace(0.01, 2 * np.pi - 0.01, 99)
    reference = np.stack([np.full(99, 50.0), 20 * np.cos(angle), 20 * np.sin(angle)])[None]
    test = reference * np.array([1.0, 1.1, 1.1])[None, :, None]
    figures = colour_fidelity(test, reference)
    assert figures.rg[0] == pytest.approx(121, abs=1e-9)
    np.testing.assert_allclose(figures.rcs_h, 10.0, atol=0.05)
    assert figures.rf[0] == pytest.approx(100 - 6.73 * 2, abs=0.01)
    assert figures.rf_h == pytest.approx(np.full((1, 16), 100 - 6.73 * 2), abs=0.01)


def test_empty_hue_bin_is_not_a_number():
    samples = np.tile(np.array([50.0, 10.0, 1.0])[None, :, None], (1, 1, 99))
    figures = colour_fidelity(samples, samples)
    assert np.isnan(figures.rg[0])
    assert np.isfinite(figures.rf_h[0, 0])
    assert np.isnan(figures.rf_h[0, 1:]).all()
