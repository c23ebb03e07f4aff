"""Steps against the axes of IEC 60081 and the distances between the two systems of centres.

Sources: axes of the one-step ellipses and the circle as quoted for IEC 60081 Annex D and
CIE TN 001; distances of the C78.377 centres from the IEC 60081 centres computed independently
of this project.
"""

from __future__ import annotations

import numpy as np
import pytest

from generator.datasets import centres
from generator.metrics.colour import declared_centre, nominal_centre, sdcm

AXES = {  # one-step semi-axes a, b in x, y and angle of the long one [degrees]
    2700: (0.00258, 0.00134, 57.28),
    3000: (0.00278, 0.00137, 53.21),
    3500: (0.00309, 0.00138, 54.00),
    4000: (0.00313, 0.00134, 53.71),
    5000: (0.00274, 0.00119, 59.62),
    6500: (0.00221, 0.00095, 58.57),
}


@pytest.mark.parametrize("nominal", sorted(AXES))
def test_one_step_lies_on_the_axes(nominal):
    # a, b printed to 5 decimals: half a digit of 0.00095 is 0.5 %
    centre = nominal_centre(nominal, "iec_60081")
    a, b, theta = AXES[nominal]
    for length, angle in ((a, np.deg2rad(theta)), (b, np.deg2rad(theta + 90))):
        x = np.array([centre.x + length * np.cos(angle)])
        y = np.array([centre.y + length * np.sin(angle)])
        assert sdcm(x, y, centre)[0] == pytest.approx(1.0, abs=0.006)


@pytest.mark.parametrize(
    ("system", "expected"),
    [
        ("ansi_c78_377_2008", {2700: 4.4, 3000: 3.9, 3500: 0.9, 4000: 1.2, 5000: 1.5, 6500: 5.5}),
        ("ansi_c78_377_2017", {2700: 4.4, 3000: 3.9, 3500: 0.6, 4000: 1.2, 5000: 1.6, 6500: 5.4}),
    ],
)
def test_distance_between_the_systems(system, expected):
    # printed to 0.1
    for nominal, steps in expected.items():
        there = nominal_centre(nominal, system)
        here = nominal_centre(nominal, "iec_60081")
        assert sdcm(np.array([there.x]), np.array([there.y]), here)[0] == pytest.approx(
            steps, abs=0.051
        )


def test_circle_is_round_in_uv_prime():
    # CIE TN 001: n steps are a circle of radius 0.0011 n in u', v'
    centre = declared_centre(0.44, 0.403)
    divisor = -2 * 0.44 + 12 * 0.403 + 3
    u0, v0 = 4 * 0.44 / divisor, 9 * 0.403 / divisor
    angle = np.linspace(0, 6, 7)
    u, v = u0 + 0.0033 * np.cos(angle), v0 + 0.0033 * np.sin(angle)
    x, y = 9 * u / (6 * u - 16 * v + 12), 4 * v / (6 * u - 16 * v + 12)
    np.testing.assert_allclose(sdcm(x, y, centre), 3.0, rtol=1e-9)


def test_ellipse_and_circle_are_never_mixed():
    # the kind of step belongs to the centre and stands in the method id
    assert all(centre.ellipse is not None for centre in centres("iec_60081"))
    for system in ("ansi_c78_377_2008", "ansi_c78_377_2017"):
        assert all(centre.ellipse is None for centre in centres(system))
    assert nominal_centre(3000, "iec_60081").method == "sdcm_ellipse_iec_60081_3000k"
    assert declared_centre(0.4, 0.39).method == "sdcm_circle_declared_0.4000_0.3900"


@pytest.mark.parametrize(
    ("cct", "system", "nominal"),
    [
        (2700, "iec_60081", 2700),
        (6400, "iec_60081", 6500),
        (5700, "iec_60081", None),
        (5700, "ansi_c78_377_2008", 5700),
        (2200, "ansi_c78_377_2008", None),
        (2200, "ansi_c78_377_2017", 2200),
    ],
)
def test_nominal_centre(cct, system, nominal):
    centre = nominal_centre(cct, system)
    assert (centre.nominal_cct_k if centre else None) == nominal
