"""The table of harmonic limits that counts for a lamp, against the leaves and by hand.

The limits expected are those of IEC 61000-3-2:2018 (edition 5) and of editions 3 and 4 as the
leaves quote them; they are written out here again, so that a slip in the code shows.
"""

from __future__ import annotations

from collections.abc import Mapping
from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.conformity.harmonic_table import harmonic_table
from generator.lawbook import buyer_clauses, read_law_book
from generator.records.figure import MEAN, Figure, FigureSet, Grade
from generator.records.harmonic_table import HarmonicLimit, HarmonicTable
from generator.records.lamp import Lamp

TABLE_2 = {2: 2, 5: 10, 7: 7, 9: 5} | dict.fromkeys(range(11, 40, 2), 3)
OPTION_A = {3: "3.4", 5: "1.9", 7: "1.0", 9: "0.5", 11: "0.35"}
OPTION_C = {2: 5, 3: 35, 5: 25, 7: 30, 9: 20, 11: 20}
EDITION_5 = "IEC 61000-3-2 edition 5"

# A lamp made up for these tests: 9.2 W, fundamental current 41 mA.
POWER_W, FUNDAMENTAL_MA = 9.2, 41.0
HARMONIC_MA = {3: 32.8, 5: 12.3, 7: 4.1, 9: 3.2, 11: 2.0} | dict.fromkeys(range(13, 40, 2), 0.5)


def current(harmonic_ma: Mapping[int, float] = HARMONIC_MA) -> dict[str, float]:
    """Both figures of every order, from the currents by definition."""
    figures = {f"h{n}_percent": 100 * i / FUNDAMENTAL_MA for n, i in harmonic_ma.items()}
    figures |= {f"h{n}_ma_per_w": i / POWER_W for n, i in harmonic_ma.items()}
    return figures | {"h2_percent": 0.0, "h2_ma_per_w": 0.0}


def table_of(
    figures: Mapping[str, Any],
    power: str = "9",
    *,
    regimes: tuple[str, ...] = (EDITION_5,),
    placed: date = date(2024, 1, 1),
    mains: bool | None = True,
    own: tuple[dict[str, Any], ...] = (),
) -> HarmonicTable:
    law = read_law_book()
    lamp = Lamp("L1", "B", "M", mains=mains, placed_on_market=placed)
    if power:
        lamp = Lamp(
            "L1",
            "B",
            "M",
            mains=mains,
            placed_on_market=placed,
            declared={"power_w": Decimal(power)},
        )
    known = FigureSet(
        Figure("L1", MEAN, name, Decimal(str(value)), Grade.REPORTED, "units.csv")
        for name, value in figures.items()
    )
    clauses = law.clauses(regimes) + buyer_clauses(own, "campaign.toml")
    return harmonic_table(lamp, known, law, clauses, date(2026, 1, 15))


def by_order(table: HarmonicTable) -> dict[int, HarmonicLimit]:
    return {item.order: item for item in table.limits if item.order is not None}


def test_option_a_has_a_limit_for_every_odd_order_up_to_39():
    table = table_of(current())
    found = by_order(table)
    assert table.option == "A"
    assert table.judged
    assert "7.4.3" in table.source
    assert list(found) == list(range(3, 40, 2))
    for order, limit in OPTION_A.items():
        assert found[order].limit == Decimal(limit)
    for order in range(13, 40, 2):
        assert float(found[order].limit) == pytest.approx(3.85 / order, rel=1e-9)
    assert {item.status for item in table.limits} == {"quoted"}


def test_limits_per_watt_become_percent_by_power_over_fundamental_current():
    # By hand: 3.4 mA/W x 9.2 W = 31.28 mA; of 41 mA that is 76.29 %.
    table = table_of(current())
    assert table.percent_per_ma_per_w == pytest.approx(100 * 9.2 / 41, rel=1e-9)
    assert by_order(table)[3].percent == pytest.approx(76.29, abs=0.005)
    assert by_order(table)[39].percent == pytest.approx(100 * 3.85 / 39 * 9.2 / 41, rel=1e-9)


def test_the_worst_order_and_its_share():
    # By hand: order 3 has 32.8 mA / 9.2 W = 3.565 mA/W, 104.9 % of 3.4; order 9 only 69.6 %.
    # Third order 80 % and fifth 30 %: option B fails by its angles, option C by far.
    angles = {"current_start_deg": 70, "current_last_peak_deg": 80, "current_end_deg": 120}
    table = table_of(current() | angles | {"thd_current_percent": 90})
    assert table.option == "A"
    assert table.decided
    worst = table.worst
    assert worst is not None
    assert worst.order == 3
    assert worst.kept is False
    assert worst.share is not None
    assert float(worst.share) == pytest.approx(1.0486, abs=5e-5)
    assert by_order(table)[9].kept is True


def test_without_the_waveform_the_nearest_of_the_other_options_is_not_decided():
    table = table_of(current() | {"thd_current_percent": 90})
    assert table.option == "A"
    assert not table.decided


def test_option_b_is_given_as_it_is_stated():
    angles = {"current_start_deg": 50, "current_last_peak_deg": 60, "current_end_deg": 100}
    table = table_of(current() | angles | {"thd_current_percent": 90})
    stated = {item.quantity: (item.comparison, item.limit) for item in table.limits}
    assert table.option == "B"
    assert table.percent_per_ma_per_w is None
    assert stated == {
        "h3_percent": ("at most", 86),
        "h5_percent": ("at most", 61),
        "current_start_deg": ("at most", 60),
        "current_last_peak_deg": ("at most", 65),
        "current_end_deg": ("at least", 90),
    }
    lower = next(item for item in table.limits if item.lower)
    assert lower.kept is True
    assert lower.percent is None


def test_option_c_is_given_as_it_is_stated():
    figures = {f"h{order}_percent": 1 for order in OPTION_C} | {"thd_current_percent": 20}
    per_watt = {f"h{order}_ma_per_w": 9 for order in range(3, 40, 2)}
    table = table_of(figures | per_watt)
    assert table.option == "C"
    assert {order: item.limit for order, item in by_order(table).items()} == OPTION_C
    assert [item.limit for item in table.limits if item.order is None] == [70]


def test_above_25_w_edition_5_has_table_2_and_an_unconfirmed_third_order():
    table = table_of(current(), "30")
    found = by_order(table)
    assert table.option == ""
    assert "Table 2" in table.source
    assert {n: item.limit for n, item in found.items() if n != 3} == TABLE_2
    assert (found[3].limit, found[3].status) == (27, "unconfirmed")
    assert found[5].percent == 10
    assert found[5].status == "quoted"


def test_third_order_of_edition_4_goes_with_the_power_factor():
    edition_4 = {"regimes": ("IEC 61000-3-2 edition 4",), "placed": date(2015, 1, 1)}
    table = table_of(current() | {"power_factor": "0.9"}, "30", **edition_4)
    assert by_order(table)[3].limit == 27
    assert by_order(table)[3].status == "quoted"
    without = table_of(current(), "30", **edition_4)
    assert 3 not in by_order(without)
    assert "power factor" in without.notes[0]


def test_the_later_edition_counts_and_the_day_of_placing_decides_which_there_is():
    both = ("IEC 61000-3-2 edition 4", EDITION_5)
    assert "edition 5" in table_of(current(), "30", regimes=both).source
    early = table_of(current() | {"power_factor": 1}, "30", regimes=both, placed=date(2015, 1, 1))
    assert "editions 3 and 4" in early.source
    assert by_order(early)[3].limit == 30


@pytest.mark.parametrize(
    ("power", "mains", "reason"),
    [("4.9", True, "No limit below 5 W."), ("", True, "power"), ("9", False, "applies where")],
)
def test_no_table_and_why(power: str, mains: bool, reason: str):
    table = table_of(current() if power else {}, power, mains=mains)
    assert table.limits == ()
    assert reason in table.reason


def test_a_table_that_the_campaign_does_not_ask_for_is_not_judged():
    table = table_of(current(), regimes=("EU 2019/2020",))
    assert table.option == "A"
    assert not table.judged


def test_a_limit_of_the_buyer_stands_beside_the_table():
    own = {
        "id": "own-h3",
        "quantity": "h3_percent",
        "unit": "%",
        "comparison": "at most",
        "value": Decimal(20),
        "source": {"act": "Call", "annex": "A", "point": "1"},
    }
    table = table_of(current(), own=(own,))
    third = [item for item in table.limits if item.order == 3]
    assert [(item.limit, item.status) for item in third] == [
        (Decimal("3.4"), "quoted"),
        (20, "buyer"),
    ]


def test_missing_figures_leave_the_limits_without_a_share():
    table = table_of({}, "30")
    assert by_order(table)[5].limit == 10
    assert table.worst is None
    assert not table.decided
    assert {item.kept for item in table.limits} == {None}
