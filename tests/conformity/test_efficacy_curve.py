from __future__ import annotations

from datetime import date
from fractions import Fraction

import pytest

from generator.conformity.efficacy_curve import curve_efficacy
from generator.records.clause import LawBook


@pytest.mark.parametrize(
    ("row", "at_800", "at_1600"),
    # Values of the equations at 800 lm and 1600 lm, worked apart to one decimal; the first agrees
    # with the published "about 125 lm/W" of a common bulb.
    [
        ("integrated-omnidirectional", 124.3, 128.3),
        ("integrated-omnidirectional-standby", 115.5, 119.5),
        ("integrated-directional", 92.4, 97.6),
        ("integrated-directional-standby", 88.7, 93.9),
        ("non-integrated-omnidirectional", 122.4, 136.9),
        ("integrated-omnidirectional-long", 170.1, 174.1),
        ("non-integrated-omnidirectional-long", 191.4, 195.4),
        ("non-integrated-directional", 88.1, 93.8),
    ],
)
def test_curves_of_2028(law: LawBook, row: str, at_800: float, at_1600: float) -> None:
    constants = law.constant(f"us-10-cfr-430-2028-{row}", date(2028, 7, 25))
    assert float(curve_efficacy(Fraction(800), constants)) == pytest.approx(at_800, abs=0.05)
    assert float(curve_efficacy(Fraction(1600), constants)) == pytest.approx(at_1600, abs=0.05)
