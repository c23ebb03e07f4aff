"""Factors of the maximum power, worked by hand from EU 2019/2020 Annex II Tables 1 and 2."""

from __future__ import annotations

from dataclasses import dataclass, replace
from datetime import date
from decimal import Decimal
from fractions import Fraction

import pytest

from generator.conformity.decision_rule import Limits
from generator.conformity.evidence import Evidence, LampRecord
from generator.conformity.limits import Limit, Question, chosen_value
from generator.conformity.maximum_power import (
    correction_factor,
    maximum_power,
    offset_and_efficacy,
    rendering_factor,
)
from generator.records.clause import DatedValue, LawBook
from generator.records.figure import FigureSet
from generator.records.lamp import Lamp
from generator.records.verdict import Basis

DAY = date(2025, 3, 1)
F = Fraction


@dataclass(frozen=True)
class ShieldedLamp(Lamp):
    """A lamp that states its anti-glare shield."""

    anti_glare_shield: bool | None = None


LAMP = ShieldedLamp(
    "L1",
    "b",
    "m",
    directional=False,
    mains=True,
    connected=False,
    colour_tuneable=False,
    high_luminance=False,
)


def table(law: LawBook, name: str) -> DatedValue:
    return law.constant(f"eu-2019-2020-{name}", DAY)


def limit(law: LawBook, lamp: Lamp) -> Limit:
    clause = law.clause("eu-2019-2020-maximum-power")
    record = LampRecord(lamp, (), FigureSet(()))
    value = chosen_value(clause, record, DAY).value
    assert value is not None
    return maximum_power(Question(clause, value, Evidence(record, Basis.DECLARED), law, DAY))


@pytest.mark.parametrize(
    ("directional", "mains", "wanted"),
    [(False, False, "1.00"), (False, True, "1.08"), (True, False, "1.15"), (True, True, "1.23")],
)
def test_basic_values(law: LawBook, directional: bool, mains: bool, wanted: str) -> None:
    lamp = replace(LAMP, directional=directional, mains=mains)
    assert correction_factor(lamp, table(law, "correction-factor")).value == F(wanted)


def test_bonuses_add_up(law: LawBook) -> None:
    factors = table(law, "correction-factor")
    directional = replace(LAMP, directional=True)
    shielded = replace(directional, anti_glare_shield=True)
    assert correction_factor(shielded, factors).value == F("1.43")
    assert correction_factor(replace(shielded, colour_tuneable=True), factors).value == F("1.53")


def test_a_shield_counts_on_directional_lamps_only(law: LawBook) -> None:
    lamp = replace(LAMP, anti_glare_shield=True)
    assert correction_factor(lamp, table(law, "correction-factor")).value == F("1.08")


def test_high_luminance_takes_the_non_directional_value(law: LawBook) -> None:
    # 1.08 + 0.0058 * 40 - 0.0167 + 0.10 = 1.3953
    lamp = replace(
        LAMP,
        directional=True,
        high_luminance=True,
        colour_tuneable=True,
        declared={"luminance_cd_per_mm2": Decimal(40)},
    )
    found = correction_factor(lamp, table(law, "correction-factor"))
    assert found.value == F("1.3953")
    assert found.notes == ()


def test_an_undeclared_luminance_is_taken_as_the_least(law: LawBook) -> None:
    # 1.08 + 0.0058 * 30 - 0.0167 = 1.2373
    lamp = replace(LAMP, high_luminance=True)
    found = correction_factor(lamp, table(law, "correction-factor"))
    assert found.value == F("1.2373")
    assert "30 cd/mm²" in found.notes[0]


def test_worked_example_of_a_high_luminance_lamp(law: LawBook) -> None:
    lamp = replace(
        LAMP,
        directional=True,
        high_luminance=True,
        colour_tuneable=True,
        declared={
            "luminance_cd_per_mm2": Decimal(40),
            "useful_luminous_flux_lm": Decimal(1000),
            "ra": Decimal(90),
        },
    )
    found = limit(law, lamp).limits
    assert found is not None
    assert found.upper is not None
    assert float(found.upper) == pytest.approx(16.71870, abs=5e-6)


def test_worked_example_of_a_connected_lamp(law: LawBook) -> None:
    declared = {"useful_luminous_flux_lm": Decimal(345), "ra": Decimal(80)}
    lamp = replace(LAMP, directional=True, connected=True, declared=declared)
    connected, plain = limit(law, lamp), limit(law, replace(lamp, connected=False))
    assert connected.limits is not None
    assert plain.limits is not None
    assert float(connected.limits.upper or 0) == pytest.approx(6.62029, abs=5e-6)
    assert float(plain.limits.upper or 0) == pytest.approx(6.00529, abs=5e-6)


def test_not_stated_whether_connected_is_said(law: LawBook) -> None:
    declared = {"luminous_flux_lm": Decimal(806), "ra": Decimal(80)}
    found = limit(law, replace(LAMP, connected=None, declared=declared))
    assert "taken as not connected" in found.notes[0]


def test_offsets(law: LawBook) -> None:
    constants = table(law, "efficacy-and-offset")
    assert offset_and_efficacy(LAMP, constants) == (F("1.5"), F(120))
    assert offset_and_efficacy(replace(LAMP, connected=True), constants) == (F(2), F(120))
    assert offset_and_efficacy(replace(LAMP, technology="OLED"), constants) == (F("1.5"), F(65))


@pytest.mark.parametrize(
    ("ra", "wanted"),
    # EU 2019/2020 Annex II point 1(a): (CRI + 80) / 160 with two decimals.
    [
        ("80", "1.00"),
        ("82", "1.01"),
        ("90", "1.06"),
        ("95", "1.09"),
        ("97", "1.11"),
        ("25", "0.65"),
    ],
)
def test_rendering_factor(law: LawBook, ra: str, wanted: str) -> None:
    assert rendering_factor(F(ra), table(law, "rendering-factor")) == F(wanted)


@pytest.mark.parametrize("ra", [28, 36, 44, 52, 60, 68, 76, 84, 92, 100])
def test_ties_of_the_rendering_factor(law: LawBook, ra: int) -> None:
    constants = table(law, "rendering-factor")
    up = rendering_factor(F(ra), constants)
    down = rendering_factor(F(ra), constants, "half down")
    assert up - down == F("0.01")


def test_a_tie_carries_the_other_reading(law: LawBook) -> None:
    declared = {"luminous_flux_lm": Decimal(806), "ra": Decimal(84)}
    found = limit(law, replace(LAMP, declared=declared))
    assert found.limits == Limits(upper=F("9.14022"))
    assert found.other_reading == Limits(upper=F("9.05148"))
