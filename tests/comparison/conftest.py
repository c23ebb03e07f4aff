"""A small invented tender: three bids, a baseline lamp, rooms."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace
from datetime import date
from decimal import Decimal
from typing import Any

import pytest

from generator.comparison import compare_tender
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.finding import Finding
from generator.records.lamp import Lamp, Offer, Unit
from generator.records.tender import Bid, Tender
from generator.records.tender_settings import TenderSettings
from generator.records.verdict import Basis, Verdict, VerdictWord

ON = date(2026, 9, 1)

SETTINGS: dict[str, Any] = {
    "use": {
        "hours_per_year": 2000,
        "tariff_per_kwh": Decimal("0.25"),
        "price_rise_percent": 2,
        "discount_rate_percent": 4,
        "years": 10,
        "currency": "EUR",
        "installation_cost_per_lamp": 1,
        "replacement_labour_per_lamp": 2,
        "baseline_lamp": "old",
        "location_based": {
            "g_per_kwh": 250,
            "source": "invented for this test",
            "year": 2025,
            "region": "nowhere",
        },
    },
    "award": {
        "criteria": [
            {"quantity": "life_cycle_cost", "weight_percent": 60, "better": "lower"},
            {
                "quantity": "ra",
                "weight_percent": 40,
                "better": "higher",
                "method": "linear",
                "full_score_at": 100,
                "zero_score_at": 70,
            },
        ]
    },
    "tender": {"seed": 7, "trials": 4000},
    "lot": [{"id": "rooms", "title": "Rooms", "quantity": 100, "flux_per_point_lm": 800}],
    "existing_lamp": [{"id": "old", "power_w": 60, "life_h": 2000, "unit_price": 1}],
}


@dataclass(frozen=True)
class TenderCase:
    """Everything that goes into a comparison, and the comparison itself."""

    lamps: tuple[Lamp, ...]
    bids: tuple[Bid, ...]
    units: tuple[Unit, ...]
    figures: tuple[Figure, ...]
    verdicts: tuple[Verdict, ...]
    findings: tuple[Finding, ...]
    settings: dict[str, Any]

    def compared(self) -> Tender:
        return compare_tender(
            self.lamps,
            self.bids,
            self.units,
            FigureSet(self.figures),
            self.verdicts,
            self.findings,
            TenderSettings.model_validate(self.settings),
            ON,
        )

    def with_settings(self, table: str, **values: Any) -> TenderCase:
        old = self.settings.get(table, {})
        return replace(self, settings={**self.settings, table: {**old, **values}})

    def with_lamp(self, lamp_id: str, change: Callable[[Lamp], Lamp]) -> TenderCase:
        lamps = tuple(change(item) if item.lamp_id == lamp_id else item for item in self.lamps)
        return replace(self, lamps=lamps)

    def with_bid(self, lamp_id: str, **values: Any) -> TenderCase:
        bids = tuple(
            replace(item, **values) if item.lamp_id == lamp_id else item for item in self.bids
        )
        return replace(self, bids=bids)


def tender_figure(
    lamp_id: str, name: str, value: str, wide: str | None, grade: Grade = Grade.REPORTED
) -> Figure:
    uncertainty = None if wide is None else Decimal(wide)
    return Figure(lamp_id, "", name, Decimal(value), grade, "m", uncertainty, units_count=3)


def tender_verdict(
    lamp_id: str, word: VerdictWord, *, basis: Basis = Basis.DETERMINED, **more: Any
) -> Verdict:
    base = Verdict(
        lamp_id,
        "c-ra",
        "Colour rendering",
        "EU 2019/2020",
        "ra",
        "",
        basis,
        Decimal(85),
        Decimal(2),
        Decimal(80),
        "at least",
        Decimal(5),
        word,
        "EU 2019/2020, Annex II",
        "read",
    )
    return replace(base, **more)


@pytest.fixture
def tender_case() -> TenderCase:
    rows = [
        # lamp, price, power, flux, Ra, life
        ("a", "6.00", "8.0", "900", "90", "30000"),
        ("b", "4.50", "9.0", "860", "85", "25000"),
        ("c", "9.00", "7.0", "950", "95", "40000"),
    ]
    lamps, bids, units, figures = [], [], [], []
    for number, (name, price, power, flux, ra, life) in enumerate(rows, start=2):
        offer = Offer(Decimal(price), "EUR", 100, f"R-{name}", date(2026, 5, 1))
        lamps.append(
            Lamp(name, f"Bidder of {name}", f"Model {name}", cap="E27", offer=offer, row=number)
        )
        bids.append(Bid(name, "rooms", f"Model {name}", "Invented Laboratory", "X-17025"))
        units += [Unit(f"{name}{i}", name) for i in range(3)]
        figures += [
            tender_figure(name, "power_w", power, "0.1"),
            tender_figure(name, "luminous_flux_lm", flux, "20"),
            tender_figure(name, "ra", ra, "2"),
            tender_figure(name, "l70b50_h", life, None, Grade.DECLARED),
        ]
    return TenderCase(tuple(lamps), tuple(bids), tuple(units), tuple(figures), (), (), SETTINGS)


@pytest.fixture
def verdict_of() -> Callable[..., Verdict]:
    return tender_verdict
