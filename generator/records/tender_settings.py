"""The tender tables of ``campaign.toml``: use, award, tender, lots, existing lamps, rooms."""

from __future__ import annotations

from datetime import date
from decimal import Decimal
from typing import Annotated, Literal, Self

from pydantic import BeforeValidator, Field, model_validator

from generator.records.setting_values import (
    NonNegative,
    Number,
    Positive,
    Table,
    exact,
    wrong_key,
)

__all__ = [
    "COST_CRITERIA",
    "EmissionFactor",
    "ExistingLamp",
    "Room",
    "ScoreStep",
    "Sensitivity",
    "TenderAward",
    "TenderCriterion",
    "TenderLot",
    "TenderSettings",
    "TenderTable",
    "TenderUse",
]

COST_CRITERIA = ("life_cycle_cost", "price")
"""What a criterion may be about beside the quantities of the catalogue."""


_Percent = Annotated[Number, Field(ge=0, le=100)]
_Rate = Annotated[Number, Field(gt=-100, le=100)]
_Count = Annotated[int, BeforeValidator(exact), Field(ge=1, le=10**9)]
_Years = Annotated[int, BeforeValidator(exact), Field(ge=1, le=100)]
_Hours = Annotated[Positive, Field(le=8784)]
_Id = Annotated[str, Field(pattern="^[A-Za-z0-9][A-Za-z0-9_-]{0,63}$")]


class EmissionFactor(Table):
    """Emissions of a kilowatt-hour [g CO2e/kWh] with the year, the region and where it stands.

    There is no factor built in. Source: ghg_scope_2, chapter 7 (quoted).
    """

    g_per_kwh: NonNegative
    source: str = Field(min_length=1)
    year: Annotated[int, Field(ge=1990, le=2100)]
    region: str = Field(min_length=1)


class Sensitivity(Table):
    """How far each assumption is moved, to either side [percent of itself].

    Where a tender says nothing a fifth is taken; common practice, no source.
    """

    tariff_percent: _Percent = Decimal(20)
    hours_percent: _Percent = Decimal(20)
    discount_rate_percent: _Percent = Decimal(20)
    life_percent: Annotated[_Percent, Field(lt=100)] = Decimal(20)


class TenderUse(Table):
    """``[use]``: how the lamps will burn, and what buying and burning them costs.

    Money is in :attr:`currency`. ``prices`` states whether rates are real or nominal; both rates
    are of that kind.
    """

    hours_per_year: _Hours | None = None
    standby_share_percent: _Percent = Decimal(100)
    tariff_per_kwh: NonNegative | None = None
    tariff_path_per_kwh: tuple[NonNegative, ...] | None = None
    price_rise_percent: _Rate | None = None
    currency: Annotated[str, Field(pattern="^[A-Z]{3}$")] | None = None
    prices: Literal["real", "nominal"] = "real"
    discount_rate_percent: _Rate | None = None
    years: _Years | None = None
    installation_cost_per_lamp: NonNegative = Decimal(0)
    replacement_labour_per_lamp: NonNegative = Decimal(0)
    maintenance_cost_per_lamp_year: NonNegative = Decimal(0)
    end_of_life_cost_per_lamp: NonNegative = Decimal(0)
    survival_stated_at_h: Positive | None = None
    carbon_price_per_t: NonNegative | None = None
    location_based: EmissionFactor | None = None
    market_based: EmissionFactor | None = None
    baseline_lamp: str | None = None
    tariff_uncertainty_percent: _Percent = Decimal(0)
    price_rise_uncertainty_points: _Percent = Decimal(0)
    life_uncertainty_percent: _Percent = Decimal(0)
    sensitivity: Sensitivity = Sensitivity()

    @model_validator(mode="after")
    def _one_price_path(self) -> Self:
        """A path stands in place of first price and rise, and covers the whole study."""
        path = self.tariff_path_per_kwh
        if path is None:
            return self
        if self.tariff_per_kwh is not None or self.price_rise_percent is not None:
            both = "tariff_path_per_kwh, or tariff_per_kwh with price_rise_percent"
            raise wrong_key("tariff_path_per_kwh", both)
        if self.years is None or len(path) != self.years:
            raise wrong_key("tariff_path_per_kwh", "one price for each of the years")
        return self


class ScoreStep(Table):
    """One step of a scoring function: the score from a value on."""

    at: Number
    score: _Percent


class TenderCriterion(Table):
    """One criterion of ``[award]``: what is scored, with which weight, by which function.

    ``linear`` needs ``full_score_at`` and ``zero_score_at``; ``steps`` needs ``steps``.
    """

    quantity: str
    weight_percent: Annotated[Positive, Field(le=100)]
    better: Literal["higher", "lower"]
    method: Literal["linear", "relative to best", "steps"] = "relative to best"
    full_score_at: Number | None = None
    zero_score_at: Number | None = None
    steps: tuple[ScoreStep, ...] = ()

    @model_validator(mode="after")
    def _keys_of_the_method(self) -> Self:
        """Every method has its own keys, and the bounds run the way that is better."""
        bounds = (self.full_score_at, self.zero_score_at)
        if self.method == "linear":
            if self.full_score_at is None or self.zero_score_at is None:
                key = "full_score_at" if self.full_score_at is None else "zero_score_at"
                raise wrong_key(key, "a value, as the method linear needs both")
            if self.full_score_at == self.zero_score_at or (
                (self.full_score_at > self.zero_score_at) != (self.better == "higher")
            ):
                raise wrong_key("full_score_at", "a value on the better side of zero_score_at")
        elif bounds != (None, None):
            key = "full_score_at" if self.full_score_at is not None else "zero_score_at"
            raise wrong_key(key, "no such key, as only the method linear has bounds")
        if bool(self.steps) != (self.method == "steps"):
            raise wrong_key("steps", "steps with the method steps, and only there")
        return self


class TenderAward(Table):
    """``[award]``: criteria, tie rule, and when a price must be explained.

    Totals are rounded half up to ``decimals`` before they are compared; bids still equal after
    the tie rule share the rank.
    """

    criteria: tuple[TenderCriterion, ...] = ()
    decimals: Annotated[int, Field(ge=0, le=6)] = 2
    tie_rule: Literal["lower life-cycle cost", "lower price", "shared rank"] = "shared rank"
    abnormally_low_percent: Annotated[Number, Field(gt=0, lt=100)] | None = None


class TenderTable(Table):
    """``[tender]``: evidence asked for, code names, and the random numbers of the certainty."""

    reports_from: date | None = None
    reports_to: date | None = None
    minimum_sample_units: Annotated[int, Field(ge=1, le=1000)] | None = None
    laboratory_required: bool = True
    accreditation_required: bool = True
    mandatory_regimes: tuple[str, ...] = ()
    mandatory_clauses: tuple[str, ...] = ()
    code_names: bool = False
    technical_part_closed: bool = False
    seed: Annotated[int, Field(ge=0, lt=2**63)] = 1
    trials: Annotated[int, Field(ge=100, le=200_000)] = 10_000

    @model_validator(mode="after")
    def _window_runs_forwards(self) -> Self:
        """The window for reports does not end before it begins."""
        begin, end = self.reports_from, self.reports_to
        if begin is not None and end is not None and end < begin:
            raise wrong_key("reports_to", "a date on or after reports_from")
        return self


class TenderLot(Table):
    """``[[lot]]``: what is bought together, and what its lamps must be.

    ``quantity`` is the number of light points; ``flux_per_point_lm`` the light each must give on
    the mean over the study. ``compare_at`` says which number of lamps the costs are for;
    ``baseline_lamp`` which lamp burns there today, where it is another than that of ``[use]``.
    """

    id: _Id
    title: str = ""
    quantity: _Count | None = None
    flux_per_point_lm: Positive | None = None
    compare_at: Literal["quantity", "equal light"] = "quantity"
    cap: str | None = None
    beam_from_deg: Positive | None = None
    beam_to_deg: Positive | None = None
    minimum_flux_lm: Positive | None = None
    baseline_lamp: str | None = None
    mandatory_regimes: tuple[str, ...] = ()
    mandatory_clauses: tuple[str, ...] = ()

    @model_validator(mode="after")
    def _needs_belong_together(self) -> Self:
        """Equal light needs a need for light; a beam does not end before it begins."""
        if self.compare_at == "equal light":
            for key in ("quantity", "flux_per_point_lm"):
                if getattr(self, key) is None:
                    raise wrong_key(key, "a number, as the lot is compared at equal light")
        begin, end = self.beam_from_deg, self.beam_to_deg
        if begin is not None and end is not None and end < begin:
            raise wrong_key("beam_to_deg", "an angle no smaller than beam_from_deg")
        return self


class ExistingLamp(Table):
    """``[[existing_lamp]]``: a lamp that burns today and is in no bid."""

    id: _Id
    title: str = ""
    power_w: Positive
    standby_power_w: NonNegative = Decimal(0)
    luminous_flux_lm: Positive | None = None
    life_h: Positive | None = None
    unit_price: NonNegative | None = None


class Room(Table):
    """``[[room]]``: light points of one kind in one room, and the year they are relamped."""

    id: _Id
    title: str = ""
    lot: str = ""
    points: _Count
    hours_per_year: _Hours
    existing_lamp: str
    relamp_year: _Years = 1


class TenderSettings(Table):
    """The tables of ``campaign.toml`` that a comparison of bids needs."""

    use: TenderUse = TenderUse()
    award: TenderAward = TenderAward()
    tender: TenderTable = TenderTable()
    lot: tuple[TenderLot, ...] = ()
    existing_lamp: tuple[ExistingLamp, ...] = ()
    room: tuple[Room, ...] = ()

    @property
    def has_tender(self) -> bool:
        """Whether bids are to be compared: one of the tables that only a tender has is there."""
        return not self.model_fields_set.isdisjoint(("use", "award", "tender", "lot", "room"))

    @property
    def baseline_lamps(self) -> frozenset[str]:
        """Ids of the lamps that bids are compared with; none of them is a bid."""
        named = (self.use.baseline_lamp, *(lot.baseline_lamp for lot in self.lot))
        return frozenset(name for name in named if name is not None)
