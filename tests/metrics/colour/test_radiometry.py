"""Ratios of weighted sums against documents and closed forms."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.radiometry import (
    blue_light_efficacy,
    blue_light_threshold_illuminance,
    luminous_efficacy_of_radiation,
    melanopic_daylight_efficacy_ratio,
    scotopic_photopic_ratio,
)
from generator.metrics.colour.weighting import spectral_sums

NM = np.arange(380, 781)


def line(nm):
    return spectral_sums(np.where(nm == NM, 1.0, 0.0)[None], 380, 780, 1)


def test_efficacy_of_a_line_at_555_nm():
    # CIE 15: K = 683.002 lm/W where V(λ) = 1
    assert luminous_efficacy_of_radiation(line(555))[0] == pytest.approx(683.002, rel=1e-12)


def test_scotopic_ratio_of_a_line_at_555_nm():
    # CIE 191: both efficacies are 683 lm/W at 555 nm, V'(555) = 0.402 (3 digits): 0.1 %
    assert scotopic_photopic_ratio(line(555))[0] == pytest.approx(1.0, abs=0.0015)


def test_scotopic_ratio_of_a_and_d65(illuminant_spectrum):
    # 1.41 and 2.47, from memory of published lists
    spectra = np.array([illuminant_spectrum("A"), illuminant_spectrum("D65")])
    ratio = scotopic_photopic_ratio(spectral_sums(spectra, 380, 780, 5))
    assert ratio == pytest.approx([1.41, 2.47], abs=0.006)


def test_melanopic_elr_of_d65(illuminant_spectrum):
    # CIE S 026: 1.3262 mW/lm, so the ratio is one
    sums = spectral_sums(illuminant_spectrum("D65")[None], 380, 780, 5)
    assert melanopic_daylight_efficacy_ratio(sums)[0] == pytest.approx(1.0, abs=2e-4)


def test_blue_light_of_a_line_at_440_nm():
    # IEC 62471: B(440) = 1; V(440) = 0.023 (CIE 15), so K_B,v = 1/(683.002 * 0.023)
    found = blue_light_efficacy(line(440))
    assert found[0] == pytest.approx(1 / (683.002 * 0.023), rel=1e-9)
    threshold = blue_light_threshold_illuminance(found)[0]
    assert threshold == pytest.approx(683.002 * 0.023, rel=1e-9)


def test_no_blue_light_has_no_threshold():
    assert np.isnan(blue_light_threshold_illuminance(np.array([0.0, -1e-6]))).all()
