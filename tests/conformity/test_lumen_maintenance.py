from __future__ import annotations

import math
from datetime import date
from fractions import Fraction

import pytest

from generator.conformity.lumen_maintenance import lumen_maintenance_curve
from generator.records.clause import LawBook


@pytest.mark.parametrize(
    ("lifetime", "percent"),
    # 100 exp(3000 ln 0.7 / L70), worked apart to five decimals.
    [(15000, 93.11499), (20000, 94.79048), (25000, 95.81020), (26212, 96.0), (50000, 97.88269)],
)
def test_curve(law: LawBook, lifetime: int, percent: float) -> None:
    constants = law.constant("eu-2019-2020-lumen-maintenance-curve", date(2025, 1, 1))
    found = lumen_maintenance_curve(Fraction(lifetime), constants)
    assert float(found) * 100 == pytest.approx(percent, abs=5e-6)


def test_curve_agrees_with_floating_point(law: LawBook) -> None:
    constants = law.constant("eu-2019-2020-lumen-maintenance-curve", date(2025, 1, 1))
    for lifetime in range(5000, 60000, 5000):
        found = lumen_maintenance_curve(Fraction(lifetime), constants)
        assert float(found) == pytest.approx(0.7 ** (3000 / lifetime), rel=1e-12)
    assert math.isclose(float(lumen_maintenance_curve(Fraction(3000), constants)), 0.7)
