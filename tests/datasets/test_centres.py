"""Centres of colour consistency against closed forms and Ohno's method."""

from __future__ import annotations

import numpy as np
import pytest

from generator.datasets import CIRCLE_STEP, centres
from generator.datasets.tables import reference_table

SYSTEMS = ("iec_60081", "ansi_c78_377_2008", "ansi_c78_377_2017")


@pytest.mark.parametrize(("system", "count"), list(zip(SYSTEMS, (6, 8, 10), strict=True)))
def test_centres_rise_and_are_plausible(system, count):
    found = centres(system)
    assert len(found) == count
    nominal = [centre.nominal_cct_k for centre in found]
    assert nominal == sorted(nominal)
    x = [centre.x for centre in found]
    assert x == sorted(x, reverse=True)


def test_declared_chromaticity_has_no_table():
    with pytest.raises(KeyError):
        centres("declared")


def test_labels_say_centre_and_kind():
    assert centres("iec_60081")[1].label == "IEC 60081 3000 K (0.4400, 0.4030), ellipse"
    assert centres("ansi_c78_377_2017")[0].label == (
        "ANSI C78.377-2017 2200 K (0.5018, 0.4153), u′v′ circle"
    )


@pytest.mark.parametrize("edition", ["2008", "2017"])
def test_c78_377_centres_follow_from_target_cct_and_duv(edition):
    # The centre is the point at target CCT and Duv (Ohno); computed with colour-science 0.4.7,
    # printed to 0.0001 in x, y and, in 2008, to 0.001 in Duv, which is 0.0007 in y
    import warnings

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # optional plotting libraries are not installed
        import colour
    table = reference_table(f"nominal_colours_ansi_c78_377_{edition}")
    targets = table.values[:, [table.columns.index(c) for c in ("target_cct_k", "target_duv")]]
    uv = np.array([colour.temperature.CCT_to_uv_Ohno2013(target) for target in targets])
    xy = colour.UCS_uv_to_xy(uv)
    printed = table.values[:, -2:]
    np.testing.assert_allclose(xy, printed, rtol=0, atol=0.00016)


def test_duv_targets_of_2017_follow_the_formula():
    # ANSI C78.377-2015/2017: 57700/T^2 - 44.6/T + 0.00854 from 2870 K, else 0 (remembered)
    table = reference_table("nominal_colours_ansi_c78_377_2017")
    T, duv = table.column("target_cct_k"), table.column("target_duv")
    formula = np.where(T < 2870, 0.0, 57700 / T**2 - 44.6 / T + 0.00854)
    np.testing.assert_allclose(duv, formula, rtol=0, atol=0.00006)


def test_circle_step_is_the_mean_of_the_ellipses():
    # Mean u'v' radius of the six one-step ellipses is 0.0011 (computed independently)
    radii = []
    for centre in centres("iec_60081"):
        g11, g12, g22 = centre.ellipse
        for angle in np.linspace(0, np.pi, 90, endpoint=False):
            dx, dy = np.cos(angle), np.sin(angle)
            step = 1 / np.sqrt(g11 * dx**2 + 2 * g12 * dx * dy + g22 * dy**2)
            points = [
                np.array([4 * x, 9 * y]) / (12 * y - 2 * x + 3)
                for x, y in (
                    (centre.x, centre.y),
                    (centre.x + step * dx, centre.y + step * dy),
                )
            ]
            radii.append(np.hypot(*(points[1] - points[0])))
    assert np.mean(radii) == pytest.approx(CIRCLE_STEP, abs=0.00005)
