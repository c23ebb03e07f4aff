"""Weighted sums against a worked example and closed forms."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.weighting import spectral_sums, weights

NM1 = np.arange(380.0, 781.0)


def test_tristimulus_values_of_fl4(illuminant_spectrum):
    # Worked example of an encyclopaedia article on CIE FL4: X, Y, Z 109.2, 100.0, 38.9
    tristimulus = spectral_sums(illuminant_spectrum("FL4")[None], 380, 780, 5).tristimulus[0]
    assert 100 * tristimulus / tristimulus[1] == pytest.approx([109.2, 100.0, 38.9], abs=0.05)


@pytest.mark.parametrize(("start", "stop", "step"), [(380, 780, 1), (380, 780, 5)])
def test_flat_spectrum(start, stop, step):
    # Closed forms: sums of ones times the interval
    count = (stop - start) // step + 1
    sums = spectral_sums(np.ones((1, count)), start, stop, step)
    assert sums.total[0] == count * step
    assert sums.in_band[0] == count * step
    assert sums.wavelength_moment[0] / sums.total[0] == pytest.approx(580)
    # area of V(λ) in 380-780 nm is 106.857 nm (CIE 15, sum at 1 nm)
    assert sums.tristimulus[0, 1] == pytest.approx(106.857, abs=0.02)


def test_light_outside_the_band_counts_in_the_total_alone():
    nm = np.arange(350, 1001)
    outside = np.where((nm < 380) | (nm > 780), 1.0, 0.0)
    sums = spectral_sums(outside[None], 350, 1000, 1)
    assert sums.total[0] == 30 + 220
    assert sums.in_band[0] == 0
    assert np.abs(sums.tristimulus).max() == 0
    assert sums.blue_light[0] == pytest.approx(30 * 0.01)  # B = 0.01 from 300 nm to 380 nm


def test_missing_wavelengths_count_as_dark():
    spectrum = np.random.default_rng(1).random(401)
    cut = spectrum[20:321]
    padded = np.zeros(401)
    padded[20:321] = cut
    short = spectral_sums(cut[None], 400, 700, 1)
    full = spectral_sums(padded[None], 380, 780, 1)
    for name in ("tristimulus", "rendering", "fidelity", "melanopic", "scotopic"):
        np.testing.assert_allclose(getattr(short, name), getattr(full, name), rtol=1e-12)


def test_record_outside_the_band_has_no_sums():
    sums = spectral_sums(np.ones((1, 101)), 900, 1000, 1)
    assert sums.total[0] == 101
    assert sums.in_band[0] == 0


def test_white_sample_is_the_light_itself():
    # Closed form: samples are weighted like the light, so factors of one would give the white;
    # every factor lies between zero and one, so no sample exceeds it in Y
    sums = spectral_sums(np.ones((1, 401)), 380, 780, 1)
    assert (sums.rendering[:, 1] < sums.tristimulus[:, 1, None]).all()
    assert not weights(380, 780, 1).flags.writeable
