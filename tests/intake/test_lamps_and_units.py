from __future__ import annotations

from decimal import Decimal

import pytest

from generator.intake.columns import DECLARED_COLUMNS, SPANS, UNIT_FIGURES
from generator.intake.lamps_csv import read_lamps
from generator.intake.register import Register
from generator.intake.tables.problem_list import ProblemList
from generator.intake.units_csv import read_units
from generator.quantities import QUANTITIES
from generator.records.lamp import Lamp, Unit


def _lamps(text: str) -> tuple[tuple[Lamp, ...], ProblemList]:
    problems = ProblemList("lamps.csv")
    return read_lamps(text, Register(), problems), problems


def _units(text: str) -> tuple[tuple[Unit, ...], ProblemList]:
    register = Register()
    read_lamps("lamp_id\nL1\nL2\n", register, ProblemList("lamps.csv"))
    problems = ProblemList("units.csv")
    return read_units(text, register, problems), problems


def test_every_figure_column_is_in_the_catalogue_and_has_a_span() -> None:
    for name in (*DECLARED_COLUMNS.values(), *UNIT_FIGURES):
        assert name in QUANTITIES
        assert name in SPANS


def test_usual_values_are_possible_values() -> None:
    for span in SPANS.values():
        if span.usual is not None:
            low, high = span.usual
            assert low < high
            assert span.holds(low)
            assert span.holds(high)


def test_a_lamp_needs_an_identifier_and_nothing_else() -> None:
    lamps, problems = _lamps("lamp_id\nL1\n")
    assert lamps == (Lamp("L1", "", "", row=2),)
    assert problems.problems == ()


def test_size_and_purity_stand_under_their_quantities() -> None:
    (lamp,), problems = _lamps(
        "lamp_id,light_emitting_area_mm2,length_mm,declared_excitation_purity\nL1,12.5,1200,0.92\n"
    )
    assert problems.problems == ()
    assert lamp.declared == {
        "light_emitting_area_mm2": Decimal("12.5"),
        "length_mm": Decimal(1200),
        "excitation_purity": Decimal("0.92"),
    }


@pytest.mark.parametrize(
    ("column", "cell"),
    [("light_emitting_area_mm2", "0"), ("length_mm", "-3"), ("declared_excitation_purity", "92")],
)
def test_impossible_size_or_purity_is_an_error(column: str, cell: str) -> None:
    (lamp,), problems = _lamps(f"lamp_id,{column}\nL1,{cell}\n")
    assert lamp.declared == {}
    assert [problem.column for problem in problems.problems] == [column]


def test_declared_columns_stand_under_their_quantities() -> None:
    (lamp,), problems = _lamps(
        "lamp_id;declared_colour_consistency_sdcm;declared_l70b50_h;declared_equivalent_power_w;"
        "declared_luminous_flux_lm;directional;unit_price;currency\n"
        "L1;5;15000;60;805,50;;3,20;EUR\n"
    )
    assert problems.problems == ()
    assert lamp.declared == {
        "sdcm": Decimal(5),
        "l70b50_h": Decimal(15000),
        "equivalent_power_w": Decimal(60),
        "luminous_flux_lm": Decimal("805.50"),
    }
    assert str(lamp.declared["luminous_flux_lm"]) == "805.50"
    assert lamp.directional is None
    assert lamp.offer.unit_price == Decimal("3.20")


@pytest.mark.parametrize(
    ("column", "value"),
    [
        ("declared_power_w", "8500"),
        ("declared_cct_k", "27"),
        ("declared_l70b50_h", "15"),
        ("declared_ra", "-5"),
        ("placed_on_market", "1924-05-01"),
    ],
)
def test_an_unusual_value_is_a_warning(column: str, value: str) -> None:
    (lamp,), problems = _lamps(f"lamp_id,{column}\nL1,{value}\n")
    assert lamp.lamp_id == "L1"
    assert [(p.level, p.row, p.column, p.found) for p in problems.problems] == [
        ("warning", 2, column, value)
    ]


@pytest.mark.parametrize(
    ("column", "last_possible", "impossible"),
    [
        ("declared_ra", "100", "100.1"),
        ("declared_displacement_factor", "1", "1.001"),
        ("declared_displacement_factor", "0", "-0.001"),
        ("declared_power_w", "0.001", "0"),
        ("declared_standby_power_w", "0", "-0.1"),
        ("declared_beam_angle_deg", "360", "361"),
        ("declared_survival_factor", "1", "1.01"),
    ],
)
def test_impossible_values_are_errors(column: str, last_possible: str, impossible: str) -> None:
    assert _lamps(f"lamp_id,{column}\nL1,{last_possible}\n")[1].errors == 0
    lamps, problems = _lamps(f"lamp_id,{column}\nL1,{impossible}\n")
    assert problems.errors == 1
    assert lamps[0].declared == {}


def test_flicker_above_one_hundred_percent_is_doubtful_then_impossible() -> None:
    for value, levels in [("100", []), ("101", ["warning"]), ("201", ["error"])]:
        _, problems = _units(f"unit_id,lamp_id,percent_flicker\nU1,L1,{value}\n")
        assert [p.level for p in problems.problems] == levels


def test_unknown_columns_are_named_with_what_they_may_have_been() -> None:
    _, problems = _units("unit_id,lamp_id,lumious_flux_lm,shelf\nU1,L1,5,3\n")
    assert [(p.level, p.row, p.column, p.expected) for p in problems.problems] == [
        ("warning", 1, "lumious_flux_lm", "luminous_flux_lm"),
        ("warning", 1, "shelf", "a column of the campaign format"),
    ]


def test_any_figure_can_have_its_uncertainty_beside_it() -> None:
    columns = [f"u_{name}" for name in UNIT_FIGURES]
    text = ",".join(["unit_id", "lamp_id", *columns]) + "\nU1,L1" + ",0.25" * len(columns) + "\n"
    (unit,), problems = _units(text)
    assert problems.problems == ()
    assert unit.reported == {}
    assert dict(unit.expanded_uncertainty) == dict.fromkeys(UNIT_FIGURES, Decimal("0.25"))


def test_a_price_without_currency_is_named() -> None:
    _, problems = _lamps("lamp_id,unit_price\nL1,4\n")
    assert [(p.level, p.column) for p in problems.problems] == [("warning", "currency")]


def test_an_empty_bidder_is_named_and_a_missing_column_is_not() -> None:
    _, problems = _lamps("lamp_id,bidder\nL1,\n")
    assert [(p.level, p.column) for p in problems.problems] == [("warning", "bidder")]
