"""A whole tender: costs, energy, award, order of bids, refusals, relamping."""

from __future__ import annotations

import dataclasses
import math
import re
from collections.abc import Iterator, Mapping
from dataclasses import replace
from datetime import date
from decimal import Decimal
from string import Formatter
from typing import Any

import pytest
from pydantic import ValidationError
from scipy.optimize import brentq

from generator.comparison.cost.study import break_even
from generator.errors import DataProblems
from generator.language.messages import Message, spoken_by, told
from generator.records.figure import Figure, Grade
from generator.records.tender import (
    BidResult,
    CashFlow,
    CostItem,
    LifeCycleCost,
    LotResult,
    Outcome,
    Tender,
    money,
)
from generator.records.tender_settings import TenderSettings
from generator.records.verdict import VerdictWord


def only_lot(tender: Tender) -> LotResult:
    (lot,) = tender.lots
    return lot


def bid_of(tender: Tender, lamp_id: str) -> BidResult:
    return next(item for item in only_lot(tender).bids if item.bid.lamp_id == lamp_id)


def test_cost_of_a_bid_by_hand(tender_case: Any) -> None:
    """Closed form of the growing annuity; 30 000 h at 2000 h a year outlast ten years."""
    cost = bid_of(tender_case.compared(), "a").cost
    assert cost is not None
    factor = 1.02 / 0.02 * (1 - (1.02 / 1.04) ** 10)
    expected = 100 * (6 + 1) + 0.25 * (100 * 8 * 2000 / 1000) * factor
    assert float(cost.total) == pytest.approx(expected, rel=1e-12)
    assert set(cost.by_item) == {CostItem.PURCHASE, CostItem.INSTALLATION, CostItem.ENERGY}
    assert sum(cost.by_item.values()) == cost.total
    assert cost.cumulative[0] == 700
    assert cost.cumulative[-1] == cost.total
    assert money(Decimal("2.345")) == Decimal("2.35")


def test_break_even_year_against_an_independent_root(tender_case: Any) -> None:
    """Dear lamp, cheap baseline: the discounted sums cross where a root finder says."""
    case = tender_case.with_lamp(
        "a", lambda lamp: replace(lamp, offer=replace(lamp.offer, unit_price=Decimal(90)))
    )
    old = {"id": "old", "power_w": 60, "life_h": 900000, "unit_price": 1}
    case = replace(case, settings={**case.settings, "existing_lamp": [old]})
    result = bid_of(case.compared(), "a").break_even
    assert result is not None

    def difference(years: float) -> float:
        factor = 1.02 / 0.02 * (1 - (1.02 / 1.04) ** years)
        return 100 * (91 - 2) - 0.25 * 100 * (60 - 8) * 2 * factor

    assert result.year == math.ceil(brentq(difference, 0.1, 10))
    assert result.simple_payback_years is not None
    # extra 8900 over a first-year saving of 0.255 x 10 400 kWh
    assert float(result.simple_payback_years) == pytest.approx(8900 / (0.255 * 10400), rel=1e-12)


def test_equal_light_counts_lamps_and_light(tender_case: Any) -> None:
    light = bid_of(tender_case.compared(), "a").equal_light
    assert light is not None
    x = 20000 / 30000  # part of a life burnt in the study
    mean = (1 - 0.7**x) / (-math.log(0.7) * x)
    assert float(light.maintained_share) == pytest.approx(mean, rel=1e-12)
    assert light.lamps_needed == math.ceil(100 * 800 / (900 * mean))
    assert float(light.million_lumen_hours) == pytest.approx(100 * 900 * mean * 20000 / 1e6)
    lot = {**tender_case.settings["lot"][0], "compare_at": "equal light"}
    scaled = replace(tender_case, settings={**tender_case.settings, "lot": [lot]}).compared()
    cost = bid_of(scaled, "a").cost
    assert cost is not None
    assert cost.lamps == light.lamps_needed


def spent_over(*yearly: int) -> LifeCycleCost:
    """A cost study of so much present value in each year, year 0 first."""
    flows = [
        CashFlow(k, CostItem.ENERGY, Decimal(k), Decimal(v), Decimal(1), Decimal(v))
        for k, v in enumerate(yearly)
    ]
    return LifeCycleCost(1, "EUR", len(yearly) - 1, "real", tuple(flows), ())


@pytest.mark.parametrize(
    ("offer", "year"),
    [
        ((10, 1, 1, 9, 1), 4),  # sums 10 11 12 21 22 to 5 10 15 20 25: ahead, dearer again, ahead
        ((10, 0, 5, 5, 5), 1),  # equal from the end of year 1 on: no dearer
        ((10, 9, 9, 9, 9), None),
        ((5, 5, 5, 5, 9), None),  # dearer at the end, whatever came before
        ((4, 5, 5, 5, 5), 0),
    ],
)
def test_break_even_is_the_year_from_whose_end_the_bid_stays_no_dearer(
    offer: tuple[int, ...], year: int | None
) -> None:
    assert break_even(spent_over(*offer), spent_over(5, 5, 5, 5, 5)).year == year


def test_what_the_baseline_is_costed_at_is_said(tender_case: Any) -> None:
    assert any("bought and fitted anew" in note for note in tender_case.compared().lots[0].notes)
    bare = tender_case.with_settings("use", baseline_lamp=None)
    assert bare.compared().lots[0].notes == ()


def in_floats(
    *, life: float = 10_000, hours: float = 2000, rate: float = 0.04, tariff: float = 0.25
) -> float:
    """Cost of bid a summed year by year in floats, apart from the formula of the program."""
    kwh = 100 * (8 * hours + 0.5 * 0.4 * (8760 - hours)) / 1000
    total: float = 100 * (6 + 1) + sum(
        kwh * tariff * (1.02 / (1 + rate)) ** k for k in range(1, 11)
    )
    renewals = math.ceil(10 * hours / life) - 1
    return total + sum(800 / (1 + rate) ** (j * life / hours) for j in range(1, renewals + 1))


def test_both_ends_of_every_bar_of_the_tornado(tender_case: Any) -> None:
    """A fifth up and down: life 8000 and 12 000 h, two renewals and one; standby two fifths."""
    figures = [
        replace(item, value=Decimal(10_000)) if item.quantity == "l70b50_h" else item
        for item in tender_case.figures
    ]
    figures.append(Figure("a", "", "standby_power_w", Decimal("0.5"), Grade.REPORTED, "m"))
    case = replace(tender_case, figures=tuple(figures))
    result = bid_of(case.with_settings("use", standby_share_percent=40).compared(), "a")
    assert result.cost is not None
    assert float(result.cost.total) == pytest.approx(in_floats(), rel=1e-12)
    bars = {bar.assumption: (bar.low_cost, bar.high_cost) for bar in result.sensitivity}
    assert {name: tuple(map(float, ends)) for name, ends in bars.items()} == {
        name: pytest.approx(ends, rel=1e-12)
        for name, ends in {
            "tariff": (in_floats(tariff=0.20), in_floats(tariff=0.30)),
            "hours per year": (in_floats(hours=1600), in_floats(hours=2400)),
            "discount rate": (in_floats(rate=0.032), in_floats(rate=0.048)),
            "life": (in_floats(life=8000), in_floats(life=12_000)),
        }.items()
    }


def test_tornado_is_widest_first_and_exact_for_the_tariff(tender_case: Any) -> None:
    result = bid_of(tender_case.compared(), "a")
    swings = [bar.swing for bar in result.sensitivity]
    assert swings == sorted(swings, reverse=True)
    assert len(swings) == 4
    assert result.cost is not None
    bar = next(item for item in result.sensitivity if item.assumption == "tariff")
    energy = result.cost.by_item[CostItem.ENERGY]
    assert abs(bar.swing - energy * Decimal("0.4")) < Decimal("1e-18")


def test_energy_and_emissions_against_the_baseline(tender_case: Any) -> None:
    energy = bid_of(tender_case.compared(), "c").energy
    assert energy is not None
    assert energy.total_kwh == 1400
    assert energy.saving_kwh == 12000 - 1400
    (emissions,) = energy.emissions
    assert emissions.basis == "location-based"
    assert emissions.tonnes == Decimal("0.35")
    assert emissions.saving_tonnes == Decimal("2.65")
    assert emissions.factor.year == 2025


def test_no_factor_no_emissions_and_no_price_on_them_unless_the_tender_says(
    tender_case: Any,
) -> None:
    bare = tender_case.with_settings("use", location_based=None)
    energy = bid_of(bare.compared(), "a").energy
    assert energy is not None
    assert energy.emissions == ()
    cost = bid_of(tender_case.with_settings("use", carbon_price_per_t=100).compared(), "a").cost
    assert cost is not None
    # 1600 kWh x 250 g x 100 EUR/t = 40 EUR a year, annuity factor 8.1109 (tables)
    assert abs(cost.by_item[CostItem.CARBON] - Decimal("324.436")) < Decimal("0.002")
    withheld = bare.with_settings("use", carbon_price_per_t=100).compared()
    assert bid_of(withheld, "a").cost is None


def test_costs_are_withheld_with_the_reason(tender_case: Any) -> None:
    case = replace(
        tender_case,
        figures=tuple(
            item
            for item in tender_case.figures
            if not (item.lamp_id == "b" and item.quantity == "l70b50_h")
        ),
    )
    tender = case.compared()
    result = bid_of(tender, "b")
    assert result.cost is None
    assert result.withheld == ("costs: projected or declared life is not known",)
    award = only_lot(tender).award
    assert award is not None
    score = next(item for item in award.scores if item.lamp_id == "b")
    assert score.rank is None
    assert score.reason == "no value for life_cycle_cost"
    no_tariff = tender_case.with_settings("use", tariff_per_kwh=None).compared()
    assert bid_of(no_tariff, "a").withheld == ("costs: use.tariff_per_kwh is not given",)


def test_a_connected_lamp_without_standby_power_has_no_cost(tender_case: Any) -> None:
    case = tender_case.with_lamp("a", lambda lamp: replace(lamp, connected=True))
    assert bid_of(case.compared(), "a").withheld == ("costs: standby power is not known",)


def test_order_of_the_input_changes_nothing(tender_case: Any) -> None:
    turned = replace(
        tender_case,
        lamps=tender_case.lamps[::-1],
        bids=tender_case.bids[::-1],
        figures=tender_case.figures[::-1],
        units=tender_case.units[::-1],
    )
    one, other = tender_case.compared(), turned.compared()
    assert one.lots == other.lots
    assert dict(one.shown_as) == dict(other.shown_as)


def test_an_inadmissible_bid_is_not_ranked(tender_case: Any) -> None:
    lot = {**tender_case.settings["lot"][0], "minimum_flux_lm": 880}
    tender = replace(tender_case, settings={**tender_case.settings, "lot": [lot]}).compared()
    assert bid_of(tender, "b").eligibility.outcome is Outcome.NOT_ADMISSIBLE
    result = only_lot(tender)
    assert result.award is not None
    assert result.award.scores[-1].lamp_id == "b"
    assert result.award.scores[-1].rank is None
    assert result.certainty is not None
    assert result.certainty.bids[-1].not_ranked == 1.0


def test_a_tender_without_lots_has_one(tender_case: Any) -> None:
    case = replace(
        tender_case,
        settings={**tender_case.settings, "lot": []},
        bids=tuple(replace(bid, lot="") for bid in tender_case.bids),
    )
    lot = only_lot(case.compared())
    assert (lot.lot, lot.quantity, len(lot.bids)) == ("", 100, 3)


def test_relamping_plan_by_hand(tender_case: Any) -> None:
    rooms = [
        {
            "id": "hall",
            "lot": "rooms",
            "points": 10,
            "hours_per_year": 3000,
            "existing_lamp": "old",
        },
        {
            "id": "store",
            "lot": "rooms",
            "points": 5,
            "hours_per_year": 500,
            "existing_lamp": "old",
            "relamp_year": 2,
        },
    ]
    tender = replace(tender_case, settings={**tender_case.settings, "room": rooms}).compared()
    plan = tender.plan
    assert plan is not None
    award = only_lot(tender).award
    assert award is not None
    assert award.winners == ("c",)
    assert plan.quantities == {"c": 15}
    assert [room.spend for room in plan.rooms] == [100, 50]  # (9 + 1) a lamp
    hall, store = 10 * 53 * 3, Decimal(5) * 53 / 2  # kWh a year: 60 W to 7 W
    assert plan.years[0].saved_kwh == hall
    assert plan.years[1].saved_kwh == hall + store
    first = hall * Decimal("0.255") - 100
    assert plan.years[0].cumulative_net == first
    assert plan.years[1].cumulative_net == first + (hall + store) * Decimal("0.2601") - 50
    assert len(plan.years) == 10


def test_relamping_counts_replacements_of_the_new_lamps(tender_case: Any) -> None:
    """40 000 h at 8000 h a year end after five years: one renewal, in year five."""
    room = {
        "id": "tunnel",
        "lot": "rooms",
        "points": 10,
        "hours_per_year": 8000,
        "existing_lamp": "old",
    }
    tender = replace(tender_case, settings={**tender_case.settings, "room": [room]}).compared()
    assert tender.plan is not None
    spends = [year.spend for year in tender.plan.years]
    assert spends == [100, 0, 0, 0, 110, 0, 0, 0, 0, 0]  # (9 + 1) a lamp, then (9 + 2)
    later = replace(
        tender_case, settings={**tender_case.settings, "room": [{**room, "relamp_year": 5}]}
    ).compared()
    assert later.plan is not None
    spends = [year.spend for year in later.plan.years]
    assert spends == [0, 0, 0, 0, 100, 0, 0, 0, 110, 0]  # five years on, within the study


def test_a_plan_says_where_the_first_place_is_provisional(tender_case: Any) -> None:
    room = {"id": "r", "lot": "rooms", "points": 1, "hours_per_year": 9, "existing_lamp": "old"}
    case = replace(tender_case, settings={**tender_case.settings, "room": [room]})
    plan = case.compared().plan
    assert plan is not None
    assert plan.rooms[0].new_lamp == "c"
    assert not any("provisional" in note for note in plan.notes)
    asked = case.with_bid("c", laboratory="").compared().plan
    assert asked is not None
    assert asked.rooms[0].new_lamp == "c"
    assert "first place of lot rooms is provisional" in asked.notes[-1]


def test_a_price_path_stands_in_place_of_price_and_rise(tender_case: Any) -> None:
    path = [Decimal("0.25") * Decimal("1.02") ** k for k in range(1, 11)]
    case = tender_case.with_settings(
        "use", tariff_per_kwh=None, price_rise_percent=None, tariff_path_per_kwh=path
    )
    one, other = bid_of(case.compared(), "b").cost, bid_of(tender_case.compared(), "b").cost
    assert one is not None
    assert other is not None
    assert one.total == other.total


def test_early_failures_follow_the_survival_factor(tender_case: Any) -> None:
    """0.9 after 3000 h is 0.9^(2/3) after 2000 h; lamps that fail cost price and labour."""
    survival = Figure("a", "", "survival_factor", Decimal("0.9"), Grade.DECLARED, "m")
    case = replace(tender_case, figures=(*tender_case.figures, survival))
    cost = bid_of(case.with_settings("use", survival_stated_at_h=3000).compared(), "a").cost
    assert cost is not None
    factor = (1 - 1.04**-10) / 0.04
    expected = 100 * (1 - 0.9 ** (2 / 3)) * (6 + 2) * factor
    assert float(cost.by_item[CostItem.FAILURES]) == pytest.approx(expected, rel=1e-12)


def test_both_bases_of_emissions_are_labelled(tender_case: Any) -> None:
    factor = {"g_per_kwh": 0, "source": "certificates", "year": 2025, "region": "nowhere"}
    energy = bid_of(tender_case.with_settings("use", market_based=factor).compared(), "a").energy
    assert energy is not None
    assert [(item.basis, item.tonnes) for item in energy.emissions] == [
        ("location-based", Decimal("0.4")),
        ("market-based", 0),
    ]


@pytest.mark.parametrize(
    ("table", "values", "key"),
    [
        ("use", {"discount_rate_percent": 350}, "use.discount_rate_percent"),
        ("use", {"tariff_per_kwh": -1}, "use.tariff_per_kwh"),
        ("use", {"years": "ten"}, "use.years"),
        ("use", {"years": 2.5}, "use.years"),
        ("use", {"currency": "euro"}, "use.currency"),
        ("use", {"tariff_path_per_kwh": [0.2]}, "use"),
        ("use", {"location_based": {"g_per_kwh": 1, "source": "s"}}, "use.location_based.year"),
        ("use", {"location_based": {"g_per_kwh": 1, "source": "s"}}, "use.location_based.region"),
        ("use", {"market_based": {"g_per_kwh": 1, "year": 2025}}, "use.market_based.source"),
        ("use", {"emission_factor_g_per_kwh": 250}, "use.emission_factor_g_per_kwh"),
        ("tender", {"reports_from": "2026-02-01", "reports_to": "2026-01-01"}, "tender"),
        ("tender", {"nonsense": 1}, "tender.nonsense"),
    ],
)
def test_single_values_are_refused_by_key(
    tender_case: Any, table: str, values: dict[str, Any], key: str
) -> None:
    raw = tender_case.with_settings(table, **values).settings
    with pytest.raises(ValidationError) as refused:
        TenderSettings.model_validate(raw)
    assert key in {".".join(map(str, error["loc"])) for error in refused.value.errors()}


@pytest.mark.parametrize(
    "values",
    [
        {"method": "linear"},
        {"method": "linear", "full_score_at": 1, "zero_score_at": 2},  # the wrong way for higher
        {"method": "linear", "full_score_at": 1, "zero_score_at": 1},
        {"method": "steps"},
        {"steps": [{"at": 1, "score": 2}]},
        {"full_score_at": 3},
    ],
)
def test_scoring_functions_must_be_whole(tender_case: Any, values: dict[str, Any]) -> None:
    row = {"quantity": "ra", "weight_percent": 100, "better": "higher", **values}
    with pytest.raises(ValidationError):
        TenderSettings.model_validate({"award": {"criteria": [row]}})


def expect_problem(case: Any, file: str, column: str) -> None:
    with pytest.raises(DataProblems) as refused:
        case.compared()
    assert (file, column) in {(item.file, item.column) for item in refused.value.problems}


def test_inputs_that_do_not_fit_together_are_refused(tender_case: Any) -> None:
    row = {"quantity": "energy_efficiency_class", "weight_percent": 100, "better": "lower"}
    key = "award.criteria.1.quantity"
    expect_problem(tender_case.with_settings("award", criteria=[row]), "campaign.toml", key)
    expect_problem(tender_case.with_bid("a", lot="moon"), "lamps.csv", "lot")
    doubled = replace(tender_case, bids=(*tender_case.bids, tender_case.bids[0]))
    expect_problem(doubled, "lamps.csv", "lamp_id")
    twice = [tender_case.settings["lot"][0], {"id": "ROOMS"}]
    case = replace(tender_case, settings={**tender_case.settings, "lot": twice})
    expect_problem(case, "campaign.toml", "lot.2.id")
    room = {"id": "r", "lot": "moon", "points": 1, "hours_per_year": 9, "existing_lamp": "none"}
    case = replace(tender_case, settings={**tender_case.settings, "room": [room]})
    expect_problem(case, "campaign.toml", "room.1.lot")
    expect_problem(case, "campaign.toml", "room.1.existing_lamp")


def test_settings_of_a_campaign_without_a_tender_still_read() -> None:
    """The keys of the campaign format as they stood before there were tenders."""
    settings = TenderSettings.model_validate(
        {
            "use": {
                "hours_per_year": 1800,
                "tariff_per_kwh": 0.24,
                "currency": "EUR",
                "price_rise_percent": 2.0,
                "discount_rate_percent": 3.0,
                "years": 10,
                "baseline_lamp": "x",
            },
            "award": {"criteria": [{"quantity": "r9", "weight_percent": 100, "better": "higher"}]},
        }
    )
    assert settings.use.tariff_per_kwh == Decimal("0.24")
    assert settings.use.location_based is None
    assert settings.award.criteria[0].method == "relative to best"


class Blanked:
    """Speaks a language in which every letter of a message is the same."""

    def pattern(self, message: Message) -> str:
        words = message.plural if message.plural and message.counted != 1 else message.singular
        blanked = ""
        for text, place, shape, _ in Formatter().parse(words):
            blanked += re.sub("[A-Za-z]", "\u0436", text)
            blanked += "" if place is None else f"{{{place}:{shape}}}"
        return blanked

    def number(self, text: str) -> str:
        return text.replace(".", ",")

    def day(self, day: date) -> str:
        return day.isoformat()


def texts_of(record: Any, fields: frozenset[str], name: str = "") -> Iterator[str]:
    """Every text of some fields, at any depth."""
    if isinstance(record, str):
        if name in fields:
            yield record
    elif dataclasses.is_dataclass(record):
        for item in dataclasses.fields(record):
            yield from texts_of(getattr(record, item.name), fields, item.name)
    elif isinstance(record, Mapping):
        for value in record.values():
            yield from texts_of(value, fields, name)
    elif isinstance(record, tuple):
        for value in record:
            yield from texts_of(value, fields, name)


def test_every_text_can_be_said_in_another_language(tender_case: Any, verdict_of: Any) -> None:
    """Names of data stay: those with an underscore or in brackets, lots, models, clauses, units."""
    room = {
        "id": "r",
        "title": "R",
        "lot": "rooms",
        "points": 10,
        "relamp_year": 1,
        "existing_lamp": "old",
        "hours_per_year": 1000,
    }
    case = (
        replace(
            tender_case,
            settings={**tender_case.settings, "room": [room]},
            verdicts=(
                verdict_of("a", VerdictWord.INCONCLUSIVE),
                verdict_of("b", VerdictWord.FAIL),
                verdict_of("c", VerdictWord.NOT_MEASURED, value=None),
            ),
        )
        .with_settings("tender", code_names=True, minimum_sample_units=5)
        .with_settings("use", market_based=tender_case.settings["use"]["location_based"])
        .with_settings("award", tie_rule="lower price", abnormally_low_percent=20)
        .with_bid("a", report_model="Other")
    )
    fields = frozenset(
        {
            "arithmetic",
            "coded_names",
            "existing_titles",
            "functions",
            "notes",
            "origin",
            "particulars",
            "reason",
            "shown_as",
            "source",
            "text",
            "tie_note",
            "withheld",
        }
    )
    data = (
        r"not admissible|rooms|Model|Other|Annex|EU|\[use\]|\[tender\]|old|invented for this test"
    )
    texts = tuple(texts_of(case.compared(), fields))
    seen = 0
    with spoken_by(Blanked()):
        for text in texts:
            said = re.sub(data, "", told(text))
            assert not re.search(r"(?<![\w.])[A-Za-z]{3,}(?![\w.])|\d\.\d", said), said
            seen += said != text
    assert seen > 50
