"""A tender: bids with their evidence, eligibility, costs, scores, certainty, relamping plan.

Money is exact decimal, unrounded, in the currency of the tender; :func:`money` rounds it for
print. Probabilities and shares are floats between 0 and 1.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from decimal import ROUND_HALF_UP, Decimal
from enum import StrEnum

from generator.records.tender_settings import EmissionFactor

__all__ = [
    "Assumption",
    "AwardResult",
    "Bid",
    "BidCertainty",
    "BidResult",
    "BidScore",
    "BreakEven",
    "CashFlow",
    "Certainty",
    "CostItem",
    "Driver",
    "Eligibility",
    "Emissions",
    "EnergyUse",
    "EqualLight",
    "LifeCycleCost",
    "LotResult",
    "LowOffer",
    "Outcome",
    "Question",
    "Reason",
    "RelampingPlan",
    "RelampingYear",
    "RoomPlan",
    "SensitivityBar",
    "SubScore",
    "SwapChange",
    "Tender",
    "money",
]

_CENT = Decimal("0.01")


def money(amount: Decimal) -> Decimal:
    """An amount rounded half up to two decimals, as printed; sums are formed before rounding."""
    return amount.quantize(_CENT, rounding=ROUND_HALF_UP)


class CostItem(StrEnum):
    """What a payment is for, in the order of print."""

    PURCHASE = "purchase"
    INSTALLATION = "installation"
    ENERGY = "energy in use"
    STANDBY = "energy at standby"
    REPLACEMENT = "replacement at the end of life"
    FAILURES = "replacement of early failures"
    MAINTENANCE = "maintenance"
    CARBON = "emissions"
    END_OF_LIFE = "end of life"


class Outcome(StrEnum):
    """What the eligibility gate says of a bid."""

    ADMISSIBLE = "admissible"
    NOT_ADMISSIBLE = "not admissible"
    TO_CLARIFY = "to be clarified"


@dataclass(frozen=True, slots=True)
class Bid:
    """One lamp offered for one lot, and what its test report says of itself.

    Parameters
    ----------
    lamp_id
        The lamp.
    lot
        Id of the lot; empty for the only lot of a tender without lots.
    report_model
        Model named in the report; empty where not known.
    laboratory, accreditation
        Laboratory of the report and its accreditation; empty where not given.
    """

    lamp_id: str
    lot: str = ""
    report_model: str = ""
    laboratory: str = ""
    accreditation: str = ""


@dataclass(frozen=True, slots=True)
class Reason:
    """Why a bid is not admissible: clause id, title, what was found, where the clause stands."""

    clause: str
    title: str
    text: str
    source: str


@dataclass(frozen=True, slots=True)
class Question:
    """One question to a bidder.

    Parameters
    ----------
    clause
        Clause id, or a name such as ``evidence-report`` or ``finding``.
    title
        What it is about, in a few words.
    text
        The question, ready to send; names neither bidder nor model.
    particulars
        Facts behind it, which may name the model; not for print under code names.
    """

    clause: str
    title: str
    text: str
    particulars: str = ""


@dataclass(frozen=True, slots=True)
class Eligibility:
    """Outcome of the gate for one bid, with every reason, every question, every check passed."""

    outcome: Outcome
    reasons: tuple[Reason, ...] = ()
    questions: tuple[Question, ...] = ()
    passed: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Assumption:
    """One input of a computation: name, value, unit, where it comes from."""

    name: str
    value: Decimal
    unit: str
    origin: str


@dataclass(frozen=True, slots=True)
class CashFlow:
    """One payment.

    Parameters
    ----------
    year
        Year of the study it falls in; 0 for the day of purchase.
    item
        What it is for.
    moment_years
        When it falls due, from purchase [years].
    amount, factor, present_value
        Payment, discount factor at that moment, and their product.
    """

    year: int
    item: CostItem
    moment_years: Decimal
    amount: Decimal
    factor: Decimal
    present_value: Decimal


@dataclass(frozen=True, slots=True)
class LifeCycleCost:
    """Life-cycle cost of a number of lamps, with every payment.

    Parameters
    ----------
    lamps
        Number of lamps.
    currency
        ISO 4217 code.
    years
        Length of the study [years].
    prices
        ``real`` or ``nominal``.
    cash_flows
        Every payment other than zero, by moment.
    assumptions
        Every input with its origin.
    notes
        What a reader must know with the number.
    """

    lamps: int
    currency: str
    years: int
    prices: str
    cash_flows: tuple[CashFlow, ...]
    assumptions: tuple[Assumption, ...]
    notes: tuple[str, ...] = ()

    @property
    def total(self) -> Decimal:
        """Present value of every payment, unrounded [money]."""
        return sum((flow.present_value for flow in self.cash_flows), Decimal(0))

    @property
    def by_item(self) -> Mapping[CostItem, Decimal]:
        """Present value per item of cost, items without a payment left out [money]."""
        items: dict[CostItem, Decimal] = {}
        for item in CostItem:
            flows = [flow.present_value for flow in self.cash_flows if flow.item is item]
            if flows:
                items[item] = sum(flows, Decimal(0))
        return items

    @property
    def cumulative(self) -> tuple[Decimal, ...]:
        """Present value spent up to the end of each year, year 0 first [money] (years + 1,)."""
        spent = [Decimal(0)] * (self.years + 1)
        for flow in self.cash_flows:
            spent[flow.year] += flow.present_value
        for year in range(1, self.years + 1):
            spent[year] += spent[year - 1]
        return tuple(spent)


@dataclass(frozen=True, slots=True)
class EqualLight:
    """Cost for the light given.

    Parameters
    ----------
    flux_lm
        Initial luminous flux of a lamp [lm].
    maintained_share
        Mean flux over the study as a share of the initial one.
    million_lumen_hours
        Light of the lamps costed over the study [Mlm h].
    cost_per_million_lumen_hours
        Life-cycle cost over that light [money/(Mlm h)].
    lamps_needed
        Lamps that give the light the lot asks for, rounded up; ``None`` where it asks for none.
    """

    flux_lm: Decimal
    maintained_share: Decimal
    million_lumen_hours: Decimal
    cost_per_million_lumen_hours: Decimal
    lamps_needed: int | None


@dataclass(frozen=True, slots=True)
class SensitivityBar:
    """One bar of the tornado: an assumption moved down and up, and the costs that follow."""

    assumption: str
    unit: str
    low_input: Decimal
    high_input: Decimal
    low_cost: Decimal
    high_cost: Decimal

    @property
    def swing(self) -> Decimal:
        """Distance between both costs [money]."""
        return abs(self.high_cost - self.low_cost)


@dataclass(frozen=True, slots=True)
class BreakEven:
    """A bid against the baseline lamp.

    Parameters
    ----------
    saving
        Present value saved over the study; negative where the bid costs more [money].
    year
        First year from whose end on the bid has cost no more; ``None`` where there is none.
    simple_payback_years
        Extra first cost over the saving of the first year, undiscounted; ``None`` where there
        is no extra cost or no saving.
    """

    saving: Decimal
    year: int | None
    simple_payback_years: Decimal | None


@dataclass(frozen=True, slots=True)
class Emissions:
    """Emissions of a year on one basis, ``location-based`` or ``market-based`` [t CO2e]."""

    basis: str
    factor: EmissionFactor
    tonnes: Decimal
    saving_tonnes: Decimal | None


@dataclass(frozen=True, slots=True)
class EnergyUse:
    """Energy of a year [kWh], the saving against the baseline lamp, and emissions."""

    lamps: int
    in_use_kwh: Decimal
    standby_kwh: Decimal
    baseline_kwh: Decimal | None
    emissions: tuple[Emissions, ...]
    notes: tuple[str, ...] = ()

    @property
    def total_kwh(self) -> Decimal:
        """In use and at standby [kWh]."""
        return self.in_use_kwh + self.standby_kwh

    @property
    def saving_kwh(self) -> Decimal | None:
        """Saved against the baseline lamp [kWh]; ``None`` where there is none."""
        return None if self.baseline_kwh is None else self.baseline_kwh - self.total_kwh


@dataclass(frozen=True, slots=True)
class SubScore:
    """Score of one bid on one criterion; score and points are ``None`` where it has no value."""

    criterion: str
    value: Decimal | None
    unit: str
    score: Decimal | None
    weight_percent: Decimal
    points: Decimal | None
    arithmetic: str


@dataclass(frozen=True, slots=True)
class BidScore:
    """Scores of one bid.

    Parameters
    ----------
    lamp_id
        The bid.
    sub_scores
        One per criterion.
    total
        Sum of points, rounded as the tender says; ``None`` where a criterion has no value.
    rank
        Rank, shared where equal; ``None`` where the bid is not ranked.
    tied_with
        Bids with the same total.
    tie_note
        How the tie was settled; empty without one.
    provisional
        Whether questions are open.
    reason
        Why it is not ranked; empty where it is.
    """

    lamp_id: str
    sub_scores: tuple[SubScore, ...]
    total: Decimal | None
    rank: int | None
    tied_with: tuple[str, ...] = ()
    tie_note: str = ""
    provisional: bool = False
    reason: str = ""


@dataclass(frozen=True, slots=True)
class LowOffer:
    """An offer whose price must be explained; it stays in the ranking."""

    lamp_id: str
    price: Decimal
    mean_of_others: Decimal
    percent_below: Decimal
    question: Question


@dataclass(frozen=True, slots=True)
class AwardResult:
    """Scores of a lot by rank, the scoring functions in words, and offers to be explained."""

    scores: tuple[BidScore, ...]
    functions: tuple[str, ...]
    tie_rule: str
    low_offers: tuple[LowOffer, ...] = ()

    @property
    def winners(self) -> tuple[str, ...]:
        """Bids of rank 1; more than one where they are equal to the end."""
        return tuple(item.lamp_id for item in self.scores if item.rank == 1)


@dataclass(frozen=True, slots=True)
class BidCertainty:
    """How sure the place of one bid is.

    Parameters
    ----------
    lamp_id
        The bid.
    ranks
        Probability of each rank, the first first.
    not_ranked
        Probability that it has no rank, since a mandatory limit is missed.
    outcomes
        Probability of each outcome of the gate.
    total_low, total_high
        Coverage interval of the total, 95 %; ``None`` for a bid that is not ranked.
    """

    lamp_id: str
    ranks: tuple[float, ...]
    not_ranked: float
    outcomes: Mapping[Outcome, float]
    total_low: float | None
    total_high: float | None


@dataclass(frozen=True, slots=True)
class SwapChange:
    """A change of one input alone that makes the first and the second bid change places."""

    input: str
    lamp_id: str
    value: Decimal
    changed: Decimal
    change_percent: Decimal


@dataclass(frozen=True, slots=True)
class Driver:
    """Share of the variance of the lead (first less second) that goes with one input."""

    input: str
    lamp_id: str
    share: float


@dataclass(frozen=True, slots=True)
class Certainty:
    """How sure a ranking is.

    Parameters
    ----------
    seed, trials
        Of the Monte Carlo method; the same seed gives the same answer.
    bids
        One per bid that is scored, by rank.
    swaps
        Per input the smallest change that swaps first and second place, smallest first.
    drivers
        Inputs by their share in the variance of the lead, largest first.
    notes
        What was varied and what was not.
    """

    seed: int
    trials: int
    bids: tuple[BidCertainty, ...]
    swaps: tuple[SwapChange, ...]
    drivers: tuple[Driver, ...]
    notes: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class BidResult:
    """One bid in one lot: everything a sheet shows of it.

    A part that could not be given is ``None``; :attr:`withheld` then says why.
    """

    bid: Bid
    shown_as: str
    eligibility: Eligibility
    price: Decimal | None
    cost: LifeCycleCost | None
    equal_light: EqualLight | None = None
    energy: EnergyUse | None = None
    break_even: BreakEven | None = None
    sensitivity: tuple[SensitivityBar, ...] = ()
    withheld: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class LotResult:
    """One lot: its bids by rank (then by code), its award, and how sure that is.

    ``baseline_lamp`` is the id of the lamp the bids are compared with; empty without one.
    """

    lot: str
    title: str
    quantity: int
    bids: tuple[BidResult, ...]
    award: AwardResult | None
    certainty: Certainty | None
    baseline: LifeCycleCost | None = None
    baseline_lamp: str = ""
    notes: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class RoomPlan:
    """One room relamped: existing lamp, new lamp, quantity, energy of a year, spend.

    ``new_lamp`` is empty where the lot has no single winner; :attr:`reason` then says so.
    """

    room: str
    title: str
    lot: str
    relamp_year: int
    points: int
    existing_lamp: str
    existing_kwh: Decimal | None
    new_lamp: str = ""
    quantity: int = 0
    new_kwh: Decimal | None = None
    spend: Decimal | None = None
    reason: str = ""


@dataclass(frozen=True, slots=True)
class RelampingYear:
    """One year of the plan, undiscounted: lamps, spend, energy and money saved, running net."""

    year: int
    quantity: int
    spend: Decimal
    saved_kwh: Decimal
    saved_money: Decimal
    cumulative_net: Decimal


@dataclass(frozen=True, slots=True)
class RelampingPlan:
    """Rooms, years, and quantities per lamp."""

    rooms: tuple[RoomPlan, ...]
    years: tuple[RelampingYear, ...]
    quantities: Mapping[str, int]
    notes: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Tender:
    """All lots, how each lamp is shown, the relamping plan, what was assumed.

    Parameters
    ----------
    lots
        The lots, in the order of ``campaign.toml``.
    shown_as
        lamp_id -> how the bid is shown.
    codes
        lamp_id -> code of its bidder, ``A`` and so on; also the name of its letter.
    coded_names
        lamp_id -> code name of the bid, whether or not code names are in force.
    existing_titles
        Id of a lamp that burns today -> how it is called.
    under_codes
        Whether bids are shown under code names now.
    plan
        The relamping plan; ``None`` where there are no rooms or no costs.
    notes
        What was assumed.
    """

    lots: tuple[LotResult, ...]
    shown_as: Mapping[str, str] = field(default_factory=dict)
    codes: Mapping[str, str] = field(default_factory=dict)
    coded_names: Mapping[str, str] = field(default_factory=dict)
    existing_titles: Mapping[str, str] = field(default_factory=dict)
    under_codes: bool = False
    plan: RelampingPlan | None = None
    notes: tuple[str, ...] = ()
