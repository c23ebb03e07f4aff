"""Closed forms of simple distributions; the definitions are those of EU 2019/2015 Annex I."""

import numpy as np
import pytest

from generator.metrics.distribution import (
    full_circle,
    intensity_figures,
    useful_luminous_flux_lm,
)

ONE_PLANE = np.zeros(1)


def cosine_power(gamma_deg, power, peak_cd=100.0):
    cosine = np.clip(np.cos(np.radians(gamma_deg)), 0.0, None)
    return (peak_cd * cosine**power)[np.newaxis, np.newaxis, :]


def test_lambertian_source_has_flux_pi_times_its_intensity():
    gamma = np.arange(0.0, 181.0, 1.0)
    figures = intensity_figures(ONE_PLANE, gamma, cosine_power(gamma, 1))
    # closed form: Φ = π I0; shares sin²(60°) = 0.75 and sin²(45°) = 0.5; 2 acos(0.5) = 120°.
    # 2e-4: the kink at 90° lies between two angles.
    assert figures.values["luminous_flux_lm"][0] == pytest.approx(np.pi * 100, rel=2e-4)
    assert figures.values["flux_120deg_fraction"][0] == pytest.approx(0.75, abs=2e-4)
    assert figures.values["flux_90deg_lm"][0] == pytest.approx(0.5 * np.pi * 100, rel=2e-4)
    assert figures.values["beam_angle_deg"][0] == pytest.approx(120.0, abs=1e-3)
    assert figures.values["peak_intensity_cd"][0] == 100.0


def test_uniform_sphere_has_flux_four_pi_and_no_beam_angle():
    gamma = np.arange(0.0, 181.0, 10.0)
    figures = intensity_figures(np.arange(0.0, 360.0, 30.0), gamma, np.full((1, 12, 19), 7.0))
    # closed form: Φ = 4 π I; share of a cone (1 - cos 60°)/2 = 0.25
    assert figures.values["luminous_flux_lm"][0] == pytest.approx(4 * np.pi * 7, rel=1e-6)
    assert figures.values["flux_120deg_fraction"][0] == pytest.approx(0.25, abs=1e-6)
    assert np.isnan(figures.values["beam_angle_deg"][0])
    assert "half of the centre-beam" in figures.reason("beam_angle_deg", 0)


@pytest.mark.parametrize("power", [2, 10, 25, 80])
@pytest.mark.parametrize("step_deg", [1.0, 2.5])
def test_cosine_power_beams(power, step_deg):
    gamma = np.arange(0.0, 181.0, step_deg)
    figures = intensity_figures(ONE_PLANE, gamma, cosine_power(gamma, power))
    # 1e-3: n = 80 halves within 7.5°, three of the wider steps.
    # closed forms: Φ = 2π I0/(n+1); inside θ: 1 - cos^(n+1) θ; beam 2 acos(0.5^(1/n)).
    total = 2 * np.pi * 100 / (power + 1)
    assert figures.values["luminous_flux_lm"][0] == pytest.approx(total, rel=1e-3)
    for name, half in (("flux_90deg_lm", 45.0), ("flux_120deg_lm", 60.0)):
        inside = total * (1 - np.cos(np.radians(half)) ** (power + 1))
        assert figures.values[name][0] == pytest.approx(inside, rel=1e-3)
    beam = 2 * np.degrees(np.arccos(0.5 ** (1 / power)))
    assert figures.values["beam_angle_deg"][0] == pytest.approx(beam, abs=0.05)


def test_many_series_give_what_each_gives_alone():
    gamma = np.arange(0.0, 181.0, 2.5)
    table = np.concatenate([cosine_power(gamma, n) for n in (1, 4, 30)])
    together = intensity_figures(ONE_PLANE, gamma, table)
    for index in range(3):
        alone = intensity_figures(ONE_PLANE, gamma, table[index : index + 1])
        for name, numbers in together.values.items():
            assert numbers[index] == alone.values[name][0], name


@pytest.mark.parametrize(
    "planes",
    [
        np.arange(0.0, 91.0, 15.0),
        np.arange(0.0, 181.0, 15.0),
        np.arange(90.0, 271.0, 15.0),
        np.arange(0.0, 360.0, 15.0),
        np.arange(0.0, 361.0, 15.0),
    ],
    ids=["quadrant", "half", "half from 90", "turn", "turn closed"],
)
def test_symmetry_of_planes_does_not_change_the_figures(planes):
    # An elliptical beam, alike in all four quadrants: half angles 15° and 30°.
    gamma = np.arange(0.0, 181.0, 1.0)
    c = np.radians(planes)[:, np.newaxis]
    half = 1 / np.sqrt((np.cos(c) / 30.0) ** 2 + (np.sin(c) / 15.0) ** 2)
    table = 1000.0 * np.exp(-np.log(2) * (gamma / half) ** 2)[np.newaxis]
    figures = intensity_figures(planes, gamma, table)
    assert figures.values["beam_angle_deg"][0] == pytest.approx(60.0, abs=0.01)
    # by quadrature of the same formula on 0.25° planes, in this test
    fine_c = np.radians(np.arange(0.0, 360.0, 0.25))[:, np.newaxis]
    fine_half = 1 / np.sqrt((np.cos(fine_c) / 30.0) ** 2 + (np.sin(fine_c) / 15.0) ** 2)
    fine_g = np.arange(0.0, 180.001, 0.05)
    mean = (1000.0 * np.exp(-np.log(2) * (fine_g / fine_half) ** 2)).mean(axis=0)
    expected = np.trapezoid(2 * np.pi * mean * np.sin(np.radians(fine_g)), np.radians(fine_g))
    assert figures.values["luminous_flux_lm"][0] == pytest.approx(expected, rel=1e-3)


def test_beam_is_bounded_by_the_centre_not_by_the_maximum():
    # Batwing: 100 cd on the axis, 200 cd at 30°, down to 50 cd at 60° exactly.
    gamma = np.array([0.0, 30.0, 60.0, 61.0, 180.0])
    table = np.array([[[100.0, 200.0, 50.0, 0.0, 0.0]]])
    figures = intensity_figures(ONE_PLANE, gamma, table)
    assert figures.values["beam_angle_deg"][0] == pytest.approx(120.0, abs=0.01)
    assert figures.values["peak_intensity_cd"][0] == 200.0


def test_oblique_beam_takes_both_halves_of_the_plane():
    # Half-planes 0° and 180° fall to half at 10° and 30°: full angle 40°, not twice 30°.
    gamma = np.array([0.0, 10.0, 20.0, 30.0, 40.0, 90.0])
    near = [100.0, 50.0, 0.0, 0.0, 0.0, 0.0]
    far = [100.0, 90.0, 75.0, 50.0, 0.0, 0.0]
    between = [100.0, 80.0, 50.0, 0.0, 0.0, 0.0]
    table = np.array([[near, between, far, between]])
    figures = intensity_figures(np.array([0.0, 90.0, 180.0, 270.0]), gamma, table)
    assert figures.values["beam_angle_deg"][0] == pytest.approx(40.0, abs=0.01)


def test_table_that_ends_in_the_light_gives_no_total():
    gamma = np.arange(0.0, 91.0, 5.0)
    figures = intensity_figures(ONE_PLANE, gamma, np.full((1, 1, 19), 5.0))
    assert np.isnan(figures.values["luminous_flux_lm"][0])
    assert np.isnan(figures.values["flux_120deg_fraction"][0])
    assert "gamma = 90°" in figures.reason("luminous_flux_lm", 0)
    assert figures.values["flux_120deg_lm"][0] == pytest.approx(2 * np.pi * 5 * 0.5, rel=1e-6)
    assert figures.reason("flux_120deg_lm", 0) == ""


def test_table_that_ends_in_the_dark_gives_a_total_with_a_remark():
    gamma = np.arange(0.0, 91.0, 5.0)
    figures = intensity_figures(ONE_PLANE, gamma, cosine_power(gamma, 3))
    assert figures.values["luminous_flux_lm"][0] == pytest.approx(np.pi * 50, rel=5e-4)
    assert "gamma = 90°" in figures.remarks[0][0]


@pytest.mark.parametrize(("last_cd", "given"), [(0.09, True), (0.11, False)])
def test_a_table_has_ended_in_the_dark_below_a_thousandth_of_its_peak(last_cd, given):
    # House rule (lampassay_methods), checked on both sides of the limit
    gamma = np.arange(0.0, 81.0, 5.0)
    row = np.where(gamma < 80.0, 100.0, last_cd)[np.newaxis, np.newaxis]
    figures = intensity_figures(ONE_PLANE, gamma, row)
    assert np.isfinite(figures.values["luminous_flux_lm"][0]) == given


def test_table_narrower_than_the_cone_withholds_the_cone():
    gamma = np.arange(0.0, 51.0, 5.0)
    figures = intensity_figures(ONE_PLANE, gamma, cosine_power(gamma, 1))
    assert np.isnan(figures.values["flux_120deg_lm"][0])
    assert np.isfinite(figures.values["flux_90deg_lm"][0])


@pytest.mark.parametrize(
    ("planes", "gamma", "word"),
    [
        (np.array([0.0, 30.0, 60.0]), np.arange(0.0, 181.0, 10.0), "C-planes"),
        (np.array([0.0, 200.0]), np.arange(0.0, 181.0, 10.0), "C-planes"),
        (np.array([0.0, 360.0]), np.arange(0.0, 181.0, 10.0), "C-planes"),
        (ONE_PLANE, np.arange(10.0, 181.0, 10.0), "optical axis"),
    ],
)
def test_tables_that_miss_a_part_say_so(planes, gamma, word):
    figures = intensity_figures(planes, gamma, np.ones((1, planes.size, gamma.size)))
    assert np.isnan(figures.values["luminous_flux_lm"][0])
    assert word in figures.reason("luminous_flux_lm", 0)
    assert figures.values["peak_intensity_cd"][0] == 1.0


def test_bad_series_do_not_spoil_good_ones():
    gamma = np.arange(0.0, 181.0, 5.0)
    good = cosine_power(gamma, 1)
    bad = good.copy()
    bad[0, 0, 3] = np.nan
    figures = intensity_figures(ONE_PLANE, gamma, np.concatenate([bad, good * 0, good]))
    assert np.isnan(figures.values["peak_intensity_cd"][:2]).all()
    assert "not numbers" in figures.reason("luminous_flux_lm", 0)
    assert "no light" in figures.reason("luminous_flux_lm", 1)
    # 2e-3: the kink at 90° with angles 5° apart
    assert figures.values["luminous_flux_lm"][2] == pytest.approx(np.pi * 100, rel=2e-3)


def test_grids_that_do_not_fit_are_refused():
    with pytest.raises(ValueError, match="do not fit"):
        intensity_figures(ONE_PLANE, np.array([0.0, 90.0]), np.ones((1, 2, 2)))
    with pytest.raises(ValueError, match="ascend"):
        intensity_figures(ONE_PLANE, np.array([90.0, 0.0]), np.ones((1, 1, 2)))
    with pytest.raises(ValueError, match="not 0 to 180"):
        intensity_figures(ONE_PLANE, np.array([0.0, 190.0]), np.ones((1, 1, 2)))


def test_quadrant_planes_open_into_the_whole_turn():
    turn, planes = full_circle(np.array([0.0, 45.0, 90.0]))
    assert turn.tolist() == [0, 45, 90, 135, 180, 225, 270, 315]
    assert planes.tolist() == [0, 1, 2, 1, 0, 1, 2, 1]


def test_useful_flux_follows_direction_and_beam():
    total, wide, narrow = np.full(4, 800.0), np.full(4, 700.0), np.full(4, 600.0)
    beam = np.array([120.0, 90.0, 89.9, np.nan])
    directional = useful_luminous_flux_lm(total, wide, narrow, beam, directional=True)
    np.testing.assert_array_equal(directional, [700.0, 700.0, 600.0, np.nan])
    everywhere = useful_luminous_flux_lm(total, wide, narrow, beam, directional=False)
    np.testing.assert_array_equal(everywhere, total)
