"""Uncertainty of figures of spectra, on synthetic phosphor-white lamps of known truth."""

import warnings
from functools import partial

import numpy as np
import pytest
from scipy.interpolate import CubicSpline

from generator.metrics.colour import spectral_figures
from generator.metrics.uncertainty import (
    SpectralInputs,
    spectral_draws,
    spectral_uncertainty,
)
from generator.records.figure import SeriesFigures

WAVELENGTH = np.arange(380.0, 781.0, 5.0)


@pytest.fixture(scope="module")
def observer_5nm():
    # CIE 1931 standard observer as carried by colour-science, which warns that it cannot draw
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        import colour
    table = colour.MSDS_CMFS["CIE 1931 2 Degree Standard Observer"].copy()
    return table.align(colour.SpectralShape(380, 780, 5)).values


@pytest.fixture(scope="module")
def chromaticity_figures(observer_5nm):
    def figures(wavelength_nm, values):
        tristimulus = values @ observer_5nm * 5.0
        total = tristimulus.sum(axis=-1)
        x, y = tristimulus[:, 0] / total, tristimulus[:, 1] / total
        n = (x - 0.3320) / (0.1858 - y)
        # McCamy 1992, a cubic that serves here as any smooth function of x and y
        cct = 449 * n**3 + 3525 * n**2 + 6823.3 * n + 5520.33
        flux = 683.002 * tristimulus[:, 1]
        return SeriesFigures({"x": x, "y": y, "cct_k": cct, "luminous_flux_lm": flux})

    return figures


def phosphor_white(blue_peak=450.0, blue=0.5, phosphor_peak=590.0):
    # two Gaussian bands, like a blue emitter with a broad phosphor
    emitter = blue * np.exp(-0.5 * ((WAVELENGTH - blue_peak) / 10.0) ** 2)
    phosphor = np.exp(-0.5 * ((WAVELENGTH - phosphor_peak) / 55.0) ** 2)
    return emitter + phosphor


ALL = SpectralInputs(wavelength_scale_nm=0.6, noise_percent=1.0, calibration_percent=3.0)


def test_nothing_stated_nothing_given(chromaticity_figures):
    spectra = phosphor_white()[np.newaxis]
    for inputs in (SpectralInputs(), SpectralInputs(flux_scale_percent=2.0)):
        found = spectral_uncertainty(WAVELENGTH, spectra, inputs, ["a"], chromaticity_figures, 20)
        assert found == {}


def test_flux_is_given_only_where_the_scale_is_stated(chromaticity_figures):
    spectra = phosphor_white()[np.newaxis]
    without = spectral_uncertainty(WAVELENGTH, spectra, ALL, ["a"], chromaticity_figures, 20)
    assert set(without) == {"x", "y", "cct_k"}
    scale = SpectralInputs(noise_percent=0.0, flux_scale_percent=2.0)
    given = spectral_uncertainty(WAVELENGTH, spectra, scale, ["a"], chromaticity_figures, 4000)
    flux = chromaticity_figures(WAVELENGTH, spectra).values["luminous_flux_lm"][0]
    # 4000 trials know a standard deviation to 1.1 %
    assert given["luminous_flux_lm"][0] == pytest.approx(0.02 * flux, rel=0.04)


def test_small_errors_agree_with_the_law_of_propagation(chromaticity_figures):
    spectra = phosphor_white()[np.newaxis]
    step = 0.01
    shifted = np.interp(WAVELENGTH + step, np.arange(380, 781, 0.5), _fine_white())
    here = np.interp(WAVELENGTH, np.arange(380, 781, 0.5), _fine_white())
    figures = [chromaticity_figures(WAVELENGTH, s[np.newaxis]).values for s in (here, shifted)]
    slope = (figures[1]["x"][0] - figures[0]["x"][0]) / step
    shift = SpectralInputs(wavelength_scale_nm=0.2)
    found = spectral_uncertainty(WAVELENGTH, spectra, shift, ["a"], chromaticity_figures, 4000)
    assert found["x"][0] == pytest.approx(abs(slope) * 0.2, rel=0.05)


def _fine_white():
    fine = np.arange(380, 781, 0.5)
    return 0.5 * np.exp(-0.5 * ((fine - 450) / 10.0) ** 2) + np.exp(
        -0.5 * ((fine - 590) / 55.0) ** 2
    )


def test_noise_averages_as_its_variance_says(chromaticity_figures, observer_5nm):
    # dx/dS(λ) = (x̄ - x(x̄+ȳ+z̄))/sum, so u(x)² is the sum of its squares times u(S)²
    spectra = phosphor_white()[np.newaxis]
    total = (spectra[0] @ observer_5nm).sum()
    x = chromaticity_figures(WAVELENGTH, spectra).values["x"][0]
    gradient = (observer_5nm[:, 0] - x * observer_5nm.sum(axis=1)) / total
    expected = 0.01 * spectra.max() * np.sqrt(np.sum(gradient**2))
    inputs = SpectralInputs(noise_percent=1.0)
    found = spectral_uncertainty(WAVELENGTH, spectra, inputs, ["a"], chromaticity_figures, 4000)
    assert found["x"][0] == pytest.approx(expected, rel=0.05)


def test_gain_error_has_the_stated_size_over_the_band():
    flat = np.ones((1, WAVELENGTH.size))
    drawn = spectral_draws(WAVELENGTH, flat, SpectralInputs(calibration_percent=4.0), ["a"], 4000)
    root_mean_square = np.sqrt(np.mean((drawn[0] - 1.0) ** 2))
    assert root_mean_square == pytest.approx(0.02, rel=0.05)


def test_instrument_errors_are_common_and_noise_is_not():
    two = np.stack([phosphor_white(), phosphor_white()])
    common = SpectralInputs(wavelength_scale_nm=0.5, calibration_percent=2.0)
    first, second = spectral_draws(WAVELENGTH, two, common, ["a", "b"], 5)
    np.testing.assert_array_equal(first, second)
    first, second = spectral_draws(WAVELENGTH, two, SpectralInputs(noise_percent=1.0), "ab", 5)
    assert not np.any(first == second)


def test_instrument_errors_are_as_large_as_stated_in_few_trials():
    # 20 trials of independent draws would know the size to 16 % only
    flat = np.ones((1, WAVELENGTH.size))
    for inputs in (
        SpectralInputs(calibration_percent=4.0),
        SpectralInputs(flux_scale_percent=4.0),
    ):
        drawn = spectral_draws(WAVELENGTH, flat, inputs, ["a"], 20)[0]
        np.testing.assert_allclose(drawn.mean(axis=0), 1.0, atol=1e-12)
        size = np.sqrt(np.mean(np.var(drawn, axis=0, ddof=1)))
        # 1 %: root mean square over 81 wavelengths, ends included, not over the band
        assert size == pytest.approx(0.02, rel=0.03)


def test_order_of_series_does_not_matter(chromaticity_figures):
    two = np.stack([phosphor_white(), phosphor_white(460.0)])
    one_way = spectral_uncertainty(WAVELENGTH, two, ALL, ["a", "b"], chromaticity_figures, 50)
    other = spectral_uncertainty(WAVELENGTH, two[::-1], ALL, ["b", "a"], chromaticity_figures, 50)
    np.testing.assert_allclose(one_way["cct_k"], other["cct_k"][::-1], rtol=1e-12)


def test_figures_that_mostly_fail_have_no_uncertainty():
    def failing(wavelength_nm, values):
        numbers = np.where(np.arange(values.shape[0]) % 2 == 0, np.nan, 1.0)
        return SeriesFigures({"cct_k": numbers})

    found = spectral_uncertainty(WAVELENGTH, phosphor_white()[np.newaxis], ALL, ["a"], failing, 20)
    assert np.isnan(found["cct_k"][0])


def measured_lamps(count, rng):
    """Lamps of different colours, each measured once by an instrument with its own errors."""
    truth = np.stack(
        [
            phosphor_white(rng.uniform(440, 465), rng.uniform(0.3, 1.2), rng.uniform(560, 610))
            for _ in range(count)
        ]
    )
    shift = 0.3 * rng.standard_normal((count, 1))
    place = (WAVELENGTH - 580.0) / 200.0
    slope, bow = rng.standard_normal((2, count, 1))
    gain = 1 + 0.015 * (
        slope * np.sqrt(1.5) * place + bow * np.sqrt(2.5) * 0.5 * (3 * place**2 - 1)
    )
    moved = np.stack(
        [CubicSpline(WAVELENGTH, s)(WAVELENGTH + d) for s, d in zip(truth, shift, strict=True)]
    )
    noise = 0.005 * truth.max(axis=1, keepdims=True) * rng.standard_normal(truth.shape)
    return truth, moved * gain + noise


@pytest.mark.parametrize("quantity", ["cct_k", "x", "y"])
def test_intervals_of_spectra_hold_the_truth_as_often_as_they_say(chromaticity_figures, quantity):
    truth, measured = measured_lamps(400, np.random.default_rng(7))
    names = [f"lamp {i}" for i in range(400)]
    found = spectral_uncertainty(WAVELENGTH, measured, ALL, names, chromaticity_figures, 200)
    right = chromaticity_figures(WAVELENGTH, truth).values[quantity]
    seen = chromaticity_figures(WAVELENGTH, measured).values[quantity]
    share = np.mean(np.abs(seen - right) <= found[quantity])
    # 95.45 % meant; 400 lamps know the share to 1 %
    assert 0.93 <= share <= 0.97


OWN_FIGURES = (
    "x", "y", "cct_k", "duv", "ra", "r9", "rf", "rg", "melanopic_der", "scotopic_photopic_ratio",
    "kb_v_w_per_lm", "centroid_wavelength_nm", "dominant_wavelength_nm", "emitter_peak_nm",
    "peak_wavelength_nm",
)  # fmt: skip


def test_intervals_of_the_programs_own_figures_hold_the_truth():
    figures = partial(spectral_figures, absolute=False)
    truth, measured = measured_lamps(500, np.random.default_rng(21))
    names = [f"lamp {i}" for i in range(500)]
    found = spectral_uncertainty(WAVELENGTH, measured, ALL, names, figures, 50)
    right, seen = figures(WAVELENGTH, truth).values, figures(WAVELENGTH, measured).values
    for quantity in OWN_FIGURES:
        share = np.mean(np.abs(seen[quantity] - right[quantity]) <= found[quantity])
        # 95.45 % meant; 500 lamps know the share to 0.93 %
        assert 0.93 <= share <= 0.97, quantity


def test_peak_on_a_grid_is_no_better_known_than_the_grid():
    # a shift of nothing leaves the step: 5 nm, rectangular, k = 2
    figures = partial(spectral_figures, absolute=False)
    found = spectral_uncertainty(
        WAVELENGTH,
        phosphor_white()[np.newaxis],
        SpectralInputs(wavelength_scale_nm=0.0),
        ["a"],
        figures,
        20,
    )
    assert found["peak_wavelength_nm"][0] == pytest.approx(2 * 5 / np.sqrt(12))
