from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from decimal import Decimal
from fractions import Fraction

import pytest

from generator.conformity.equivalence import (
    equivalent_power_of,
    reflector_flux,
    reflector_flux_needed,
)
from generator.conformity.evidence import Evidence, LampRecord
from generator.conformity.limits import Question
from generator.records.clause import LawBook
from generator.records.figure import FigureSet
from generator.records.lamp import Lamp
from generator.records.verdict import Basis

DAY = date(2025, 3, 1)
F = Fraction


@dataclass(frozen=True)
class ReflectorLamp(Lamp):
    """A lamp that states the reflector it replaces."""

    reflector: str = ""


def test_every_row_of_table_7(law: LawBook) -> None:
    table = law.constant("eu-2019-2015-equivalent-power", DAY)
    rows = [(136, 15), (249, 25), (470, 40), (806, 60), (1055, 75), (1521, 100), (2452, 150)]
    for flux, power in [*rows, (3452, 200)]:
        assert equivalent_power_of(F(flux), table) == power


def test_between_the_rows(law: LawBook) -> None:
    # 40 + (700 - 470) / (806 - 470) * 20 = 53.690
    table = law.constant("eu-2019-2015-equivalent-power", DAY)
    assert float(equivalent_power_of(F(700), table) or 0) == pytest.approx(53.690, abs=5e-4)
    assert equivalent_power_of(F(135), table) is None
    assert equivalent_power_of(F(3453), table) is None


@pytest.mark.parametrize(
    ("angle", "wanted"),
    # 540 lm times 1.15 for a lumen maintenance of 0.70, times 1, 0.9, 0.85, 0.80 by beam angle.
    [
        ("36", "621"),
        ("20", "621"),
        ("19.9", "558.9"),
        ("15", "558.9"),
        ("14.9", "527.85"),
        ("10", "527.85"),
        ("9.9", "496.8"),
    ],
)
def test_reflector_flux(law: LawBook, angle: str, wanted: str) -> None:
    factors = law.constant("eu-2019-2015-reflector-factors", DAY)
    assert reflector_flux_needed(F(540), F("0.70"), F(angle), factors) == F(wanted)


def test_reflector_claim_of_a_lamp(law: LawBook) -> None:
    lamp = ReflectorLamp(
        "L1",
        "b",
        "m",
        directional=True,
        mains=False,
        reflector="MR16_GU5_3",
        declared={
            "equivalent_power_w": Decimal(50),
            "lumen_maintenance_factor": Decimal("0.70"),
            "beam_angle_deg": Decimal(36),
        },
    )
    clause = law.clause("eu-2019-2015-reflector-claim")
    evidence = Evidence(LampRecord(lamp, (), FigureSet(())), Basis.DETERMINED)
    limit = reflector_flux(Question(clause, clause.values[0], evidence, law, DAY))
    assert limit.shown == 621
