"""Tabulated reference samples against direct computation, and the illuminants themselves."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour.chromaticity import chromaticity_uv_1960, chromaticity_xy
from generator.metrics.colour.colour_fidelity import cam02_ucs, colour_fidelity
from generator.metrics.colour.colour_rendering import colour_rendering_indices
from generator.metrics.colour.reference_illuminant import (
    blended_reference,
    daylight_phase,
    reference_samples,
    rendering_reference,
)
from generator.metrics.colour.weighting import spectral_sums

CCT = np.concatenate([np.geomspace(1001, 24990, 700), [3999, 4001, 4999, 5000, 6999, 7001]])


@pytest.mark.parametrize("step", [1, 5])
def test_interpolated_fidelity_reference(step):
    # Direct computation at every temperature; the bound is what the module promises
    sums = spectral_sums(blended_reference(step, CCT), 380, 780, step)
    direct = cam02_ucs(sums.fidelity, sums.white)
    table = reference_samples(step, CCT).fidelity
    error = np.abs(direct - table).max(axis=1)
    assert np.sort(error.max(axis=0))[-2] < 1e-4
    assert error.max() < 0.002
    assert colour_fidelity(direct, table).rf.min() > 100 - 2e-4


@pytest.mark.parametrize("step", [1, 5])
def test_interpolated_rendering_reference(step):
    # Closed form: a reference illuminant renders like itself, Ri = 100
    sums = spectral_sums(rendering_reference(step, CCT), 380, 780, step)
    u, v = chromaticity_uv_1960(*chromaticity_xy(sums.tristimulus))
    table = reference_samples(step, CCT)
    indices = colour_rendering_indices(sums, u, v, table.rendering, table.white_uv)
    np.testing.assert_allclose(indices, 100.0, rtol=0, atol=2e-4)
    np.testing.assert_allclose(table.white_uv, np.column_stack([u, v]), atol=1e-7)


def test_daylight_is_d65(illuminant_spectrum):
    # CIE 15: D65 is the phase of daylight at 6504 K; its table comes from M1, M2 rounded to
    # three decimals, hence 0.2 of 118
    phase = daylight_phase(5, np.array([6504.0]))[0]
    np.testing.assert_allclose(phase, illuminant_spectrum("D65"), rtol=0, atol=0.2)


def test_blend_is_eighty_to_twenty_at_4200_k():
    # TM-30-18: at 4200 K 80 % Planckian and 20 % daylight of equal luminance, both 2 degree
    mixed = blended_reference(5, np.array([4200.0, 3999.0, 5001.0]))
    sums = spectral_sums(mixed, 380, 780, 5).tristimulus[:, 1]
    np.testing.assert_allclose(sums, sums[0], rtol=1e-12)
    daylight = daylight_phase(5, np.array([4200.0]))
    daylight /= spectral_sums(daylight, 380, 780, 5).tristimulus[0, 1] / sums[0]
    planckian = rendering_reference(5, np.array([4200.0]))
    planckian /= spectral_sums(planckian, 380, 780, 5).tristimulus[0, 1] / sums[0]
    np.testing.assert_allclose(mixed[0], 0.8 * planckian[0] + 0.2 * daylight[0], rtol=1e-12)
