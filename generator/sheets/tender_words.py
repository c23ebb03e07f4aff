"""Fixed words of the tender documents: whole sentences with named places."""

from __future__ import annotations

from collections.abc import Mapping

from generator.language import say, say_as, say_counted
from generator.records.tender import CostItem, Outcome
from generator.sheets.description import Caution

__all__ = [
    "ASKED_REPORTS",
    "ASSUMPTION_NAMES",
    "CHECK_TITLES",
    "COST_ITEMS",
    "EMISSION_BASES",
    "FORMULAS",
    "LETTER",
    "LOT_OUTCOME",
    "MOVED_ASSUMPTIONS",
    "NAMES_CAUTION",
    "OUTCOMES",
    "OUTCOME_NOTES",
    "PRICES",
    "RATES",
    "REPORT_LEAD",
    "TENDER_CAUTIONS",
    "TIE_RULES",
]

REPORT_LEAD = {
    "first": say("{lot}: {bid} is first with {points} points."),
    "provisional": say(
        "{lot}: {bid} is first with {points} points, provisionally: its questions are open."
    ),
    "shared": say("{lot}: first place is shared by {bids}."),
    "none": say("{lot}: no bid can be ranked."),
    "unranked": say("{lot}: the bids are not ranked, since the tender names no award criteria."),
}

LOT_OUTCOME = say_counted(
    "Of {count} bid {admissible} may be accepted, {clarify} must be clarified first and {refused} "
    "may not be accepted.",
    "Of {count} bids {admissible} may be accepted, {clarify} must be clarified first and {refused} "
    "may not be accepted.",
)

OUTCOMES: Mapping[str, str] = {
    Outcome.ADMISSIBLE: say_as("outcome", "admissible"),
    Outcome.NOT_ADMISSIBLE: say_as("outcome", "not admissible"),
    Outcome.TO_CLARIFY: say_as("outcome", "to be clarified"),
}

COST_ITEMS: Mapping[CostItem, str] = {
    CostItem.PURCHASE: say_as("cost", "purchase"),
    CostItem.INSTALLATION: say_as("cost", "installation"),
    CostItem.ENERGY: say_as("cost", "energy in use"),
    CostItem.STANDBY: say_as("cost", "energy at standby"),
    CostItem.REPLACEMENT: say_as("cost", "replacement at the end of life"),
    CostItem.FAILURES: say_as("cost", "replacement of early failures"),
    CostItem.MAINTENANCE: say_as("cost", "maintenance"),
    CostItem.CARBON: say_as("cost", "emissions"),
    CostItem.END_OF_LIFE: say_as("cost", "end of life"),
}

PRICES: Mapping[str, str] = {"real": say("real prices"), "nominal": say("nominal prices")}

RATES: Mapping[str, str] = {
    "real": say_as("rate", "real"),
    "nominal": say_as("rate", "nominal"),
}

TIE_RULES: Mapping[str, str] = {
    "lower life-cycle cost": say("lower life-cycle cost"),
    "lower price": say("lower price"),
    "shared rank": say("shared rank"),
}

EMISSION_BASES: Mapping[str, str] = {
    "location-based": say("location-based"),
    "market-based": say("market-based"),
}

MOVED_ASSUMPTIONS: Mapping[str, str] = {
    "tariff": say_as("energy", "tariff"),
    "hours per year": say("hours per year"),
    "discount rate": say("discount rate"),
    "life": say_as("lamp", "life"),
}
"""What the study of sensitivity moves, by the names it has there."""

ASSUMPTION_NAMES: Mapping[str, str] = {
    "hours_per_year": say("hours per year"),
    "standby_share_percent": say("standby share percent"),
    "tariff_per_kwh": say("tariff per kwh"),
    "price_rise_percent": say("price rise percent"),
    "discount_rate_percent": say("discount rate percent"),
    "installation_cost_per_lamp": say("installation cost per lamp"),
    "replacement_labour_per_lamp": say("replacement labour per lamp"),
    "maintenance_cost_per_lamp_year": say("maintenance cost per lamp year"),
    "end_of_life_cost_per_lamp": say("end of life cost per lamp"),
    "survival_stated_at_h": say("survival stated at h"),
    "carbon_price_per_t": say("carbon price per t"),
}
"""What the cost study takes from ``[use]``, by its keys."""

OUTCOME_NOTES = {
    "reasons": say("A bid is not admissible for every reason named here; each names its clause."),
    "questions": say(
        "Each question can be sent to the bidder as it stands. A bid with open questions is ranked "
        "provisionally."
    ),
    "further": say("{bid}: further questions would be open: {titles}."),
    "no_reasons": say("No bid is refused."),
    "no_questions": say("No question is open for a bid that may still win."),
}

CHECK_TITLES = {
    "evidence-report": say("Test report"),
    "evidence-model": say("Model named in the report"),
    "evidence-laboratory": say("Laboratory"),
    "evidence-accreditation": say("Accreditation"),
    "evidence-date": say("Date of the report"),
    "evidence-sample": say("Size of the sample"),
    "lot-cap": say_as("lamp", "Cap"),
    "lot-beam": say("Beam angle"),
    "lot-flux": say("Luminous flux"),
}
"""Checks of the evidence and of the lot, by id; a clause has a title of its own."""

ASKED_REPORTS = {
    "report": say("A test report with number and date that names the offered model."),
    "window": say("A date of the report from {begin} to {end}."),
    "sample": say_counted(
        "Measurements of {count} unit or more.", "Measurements of {count} units or more."
    ),
    "laboratory": say("The name of the laboratory."),
    "accreditation": say("The accreditation of the laboratory."),
    "clauses": say("The requirements of the buyer, and these: {clauses}."),
    "own": say("The requirements of the buyer."),
    "findings": say("Numbers that agree with one another; where they do not, the bidder is asked."),
}

FORMULAS = (
    say("Discount factor of a payment due after t years: 1 / (1 + i)^t, with the discount rate i."),
    say(
        "Price of energy in year k: today's price × (1 + rise)^k, or the price path of the tender."
    ),
    say("Energy in use of a year: lamps × power in W × hours / 1000, in kWh."),
    say("Energy at standby of a year: lamps × standby power in W × share × (8760 − hours) / 1000."),
    say(
        "Replacement at the end of life: lamps × (unit price + labour), due after life / hours, "
        "twice life / hours and so on, as long as that is before the end of the study."
    ),
    say(
        "Early failures of a year: lamps × (1 − survival^(hours / stated at)) × (unit price + "
        "labour), only where the tender says at how many hours the survival factor is stated."
    ),
    say(
        "Life-cycle cost: sum of all payments × their discount factors. Amounts are summed "
        "unrounded and rounded half up to two decimals for print."
    ),
    say(
        "Mean luminous flux over the study: initial flux × mean of an exponential decay that "
        "passes through 70 % at the end of life, lamps being renewed then."
    ),
    say("Lamps needed: light of the lot / mean luminous flux of a lamp, rounded up."),
    say(
        "Points of a criterion: score from 0 to 100 × weight / 100; the total is rounded half up "
        "before totals are compared."
    ),
    say("Emissions of a year: energy of a year in kWh × factor in g/kWh / 1 000 000, in t."),
)

NAMES_CAUTION = Caution(
    say("Names"),
    say(
        "Bidders stand here under code names. The folders data and inputs of the same issue name "
        "them, and so do file names of lamps: pass on the tender folder alone, or the public "
        "edition."
    ),
)
"""What is said where code names are in use."""

TENDER_CAUTIONS = (
    Caution(
        say("Decision"),
        say(
            "This document supports a decision and does not take it. The contracting authority "
            "decides, after the questions are answered, and answers for the reasons it gives."
        ),
    ),
    Caution(
        say("Verdicts"),
        say(
            "What is said on clauses follows from the data given and the text of each clause on "
            "the date named. It is no certificate; the market surveillance authority and the "
            "courts have the last word."
        ),
    ),
    Caution(
        say("Costs"),
        say(
            "Costs and savings are projections from the assumptions printed here. Other hours, "
            "prices or lives give other costs; the study of sensitivity shows by how much."
        ),
    ),
    Caution(
        say("Emissions"),
        say(
            "Factors are those the tender states, with year and region. Emissions on the two bases "
            "are never added, and no saving may be claimed twice."
        ),
    ),
)

LETTER = {
    "title": say("Outcome of the tender {reference}"),
    "to": say("To {name}"),
    "opening": say(
        "Thank you for your offer. This letter tells you how each lamp you offered was judged, "
        "why, and how it stands in the comparison. It shows your own data and, of other bids, only "
        "what is published: rank and points."
    ),
    "not_admissible": say("This bid is not admissible, for the reasons below."),
    "admissible": say("This bid is admissible."),
    "to_clarify": say(
        "This bid can be accepted only once the questions below are answered. Until then its rank "
        "is provisional."
    ),
    "rank": say("Rank {rank} of {ranked} ranked bids, with {points} points."),
    "first": say("This bid holds first place with {points} points."),
    "unranked": say("This bid is not ranked: {reason}."),
    "distance": say("{points} points separate it from the first place."),
    "lead": say("{points} points separate it from the second place."),
    "others": say("Other bids are named by the code of their bidder."),
    "closing": say(
        "If you hold that a figure or a reason is wrong, say which one and why; every figure can "
        "be followed back to the file it came from. The time limits for a review are those of the "
        "procurement documents."
    ),
}
