"""Fixed words of the tender documents: whole sentences with named places."""

from __future__ import annotations

from generator.sheets.description import Caution

__all__ = [
    "ASKED_REPORTS",
    "CHECK_TITLES",
    "FORMULAS",
    "LETTER",
    "LOT_OUTCOME",
    "NAMES_CAUTION",
    "OUTCOME_NOTES",
    "REPORT_LEAD",
    "TENDER_CAUTIONS",
]

REPORT_LEAD = {
    "first": "{lot}: {bid} is first with {points} points.",
    "provisional": "{lot}: {bid} is first with {points} points, provisionally: its questions "
    "are open.",
    "shared": "{lot}: first place is shared by {bids}.",
    "none": "{lot}: no bid can be ranked.",
    "unranked": "{lot}: the bids are not ranked, since the tender names no award criteria.",
}

LOT_OUTCOME = (
    "Of {bids} bids {admissible} may be accepted, {clarify} must be clarified first and "
    "{refused} may not be accepted."
)

OUTCOME_NOTES = {
    "reasons": "A bid is not admissible for every reason named here; each names its clause.",
    "questions": "Each question can be sent to the bidder as it stands. A bid with open questions "
    "is ranked provisionally.",
    "further": "{bid}: further questions would be open: {titles}.",
    "no_reasons": "No bid is refused.",
    "no_questions": "No question is open for a bid that may still win.",
}

CHECK_TITLES = {
    "evidence-report": "Test report",
    "evidence-model": "Model named in the report",
    "evidence-laboratory": "Laboratory",
    "evidence-accreditation": "Accreditation",
    "evidence-date": "Date of the report",
    "evidence-sample": "Size of the sample",
    "lot-cap": "Cap",
    "lot-beam": "Beam angle",
    "lot-flux": "Luminous flux",
}
"""Checks of the evidence and of the lot, by id; a clause has a title of its own."""

ASKED_REPORTS = {
    "report": "A test report with number and date that names the offered model.",
    "window": "A date of the report from {begin} to {end}.",
    "sample": "Measurements of {units} units or more.",
    "laboratory": "The name of the laboratory.",
    "accreditation": "The accreditation of the laboratory.",
    "clauses": "The requirements of the buyer, and these: {clauses}.",
    "own": "The requirements of the buyer.",
    "findings": "Numbers that agree with one another; where they do not, the bidder is asked.",
}

FORMULAS = (
    "Discount factor of a payment due after t years: 1 / (1 + i)^t, with the discount rate i.",
    "Price of energy in year k: today's price × (1 + rise)^k, or the price path of the tender.",
    "Energy in use of a year: lamps × power in W × hours / 1000, in kWh.",
    "Energy at standby of a year: lamps × standby power in W × share × (8760 − hours) / 1000.",
    (
        "Replacement at the end of life: lamps × (unit price + labour), due after life / hours, "
        "twice life / hours and so on, as long as that is before the end of the study."
    ),
    (
        "Early failures of a year: lamps × (1 − survival^(hours / stated at)) × (unit price + "
        "labour), only where the tender says at how many hours the survival factor is stated."
    ),
    (
        "Life-cycle cost: sum of all payments × their discount factors. Amounts are summed "
        "unrounded and rounded half up to two decimals for print."
    ),
    (
        "Mean luminous flux over the study: initial flux × mean of an exponential decay that "
        "passes through 70 % at the end of life, lamps being renewed then."
    ),
    "Lamps needed: light of the lot / mean luminous flux of a lamp, rounded up.",
    (
        "Points of a criterion: score from 0 to 100 × weight / 100; the total is rounded half up "
        "before totals are compared."
    ),
    "Emissions of a year: energy of a year in kWh × factor in g/kWh / 1 000 000, in t.",
)

NAMES_CAUTION = Caution(
    "Names",
    "Bidders stand here under code names. The folders data and inputs of the same issue name "
    "them, and so do file names of lamps: pass on the tender folder alone, or the public edition.",
)
"""What is said where code names are in use."""

TENDER_CAUTIONS = (
    Caution(
        "Decision",
        "This report supports a decision and does not take it. The contracting authority decides, "
        "after the questions are answered, and answers for the reasons it gives.",
    ),
    Caution(
        "Verdicts",
        "What is said on clauses follows from the data given and the text of each clause on the "
        "date named. It is no certificate; the market surveillance authority and the courts have "
        "the last word.",
    ),
    Caution(
        "Costs",
        "Costs and savings are projections from the assumptions printed here. Other hours, prices "
        "or lives give other costs; the study of sensitivity shows by how much.",
    ),
    Caution(
        "Emissions",
        "Factors are those the tender states, with year and region. Emissions on the two bases are "
        "never added, and no saving may be claimed twice.",
    ),
)

LETTER = {
    "title": "Outcome of the tender {reference}",
    "to": "To {name}",
    "opening": "Thank you for your offer. This letter tells you how each lamp you offered was "
    "judged, why, and how it stands in the comparison. It shows your own data and, of other bids, "
    "only what is published: rank and points.",
    "not_admissible": "This bid is not admissible, for the reasons below.",
    "admissible": "This bid is admissible.",
    "to_clarify": "This bid can be accepted only once the questions below are answered. Until "
    "then its rank is provisional.",
    "rank": "Rank {rank} of {ranked} ranked bids, with {points} points.",
    "first": "This bid holds first place with {points} points.",
    "unranked": "This bid is not ranked: {reason}.",
    "distance": "{points} points separate it from the first place.",
    "lead": "{points} points separate it from the second place.",
    "others": "Other bids are named by the code of their bidder.",
    "closing": "If you hold that a figure or a reason is wrong, say which one and why; every "
    "figure can be followed back to the file it came from. The time limits for a review are those "
    "of the procurement documents.",
}
