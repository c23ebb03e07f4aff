"""Fixed sentences of a lamp's sheet, whole and with named places, so that they translate."""

from __future__ import annotations

from generator.records.figure import Grade
from generator.records.finding import Severity

__all__ = [
    "AMENDED",
    "AND_MORE",
    "ASKED_BY_THE_BUYER",
    "CLASS_ARROW",
    "CLASS_MISSING",
    "CLASS_WORDS",
    "CLOSEST",
    "CONDITION_LABELS",
    "DECISION_RULES",
    "EVIDENCE",
    "FOLDED",
    "GRADE_FIGURES",
    "GRADE_WORDS",
    "HARMONICS_WITHIN",
    "HEADLINE_UNITS",
    "IDENTITY_LABELS",
    "LAW_READ",
    "NOT_PROJECTED",
    "SEVERITY_WORDS",
    "SHORTFALL_SENTENCE",
    "SHORTFALL_WORDS",
    "SILHOUETTE",
    "SUMMARY_ROWS",
    "UNCERTAINTY_NAMES",
    "UNCERTAINTY_STATEMENT",
    "UNITS_NOTE",
    "USE_BASES",
    "USE_LABELS",
    "VERDICT_SENTENCES",
]

AND_MORE = "{titles} and {count} more"

IDENTITY_LABELS = {
    "lamp": "Lamp",
    "bidder": "Bidder",
    "cap": "Cap",
    "technology": "Technology",
    "directional": "Directional",
    "mains": "Mains",
    "connected": "Connected",
    "placed": "On the market since",
    "price": "Unit price",
    "report": "Test report",
}

SHORTFALL_WORDS = {"fail": "falls short", "inconclusive": "cannot be told"}
"""Mark -> word where only shortfalls are told."""
SHORTFALL_SENTENCE = "{values}; asked {limit}."

SILHOUETTE = {
    "tube": "Outline of a tube, cap {cap}",
    "capsule": "Outline of a capsule lamp, cap {cap}",
    "dish": "Outline of a wide reflector lamp, cap {cap}",
    "spot": "Outline of a reflector lamp, cap {cap}",
    "flood": "Outline of a reflector lamp, cap {cap}",
    "candle": "Outline of a candle lamp, cap {cap}",
    "bulb": "Outline of a bulb, cap {cap}",
    "plain": "A plain box in place of an outline: no cap is stated that tells a shape",
}
"""Shape -> what the outline shows."""

VERDICT_SENTENCES = {
    "none": "No clause could be judged.",
    "fails": "Fails {failed} of {judged} judgements.",
    "passes all": "Passes all {judged} judgements.",
    "passes some": "Passes {passed} of {judged} judgements.",
    "open": "{open} cannot be told within the uncertainty.",
    "not measured": "{unmeasured} not measured.",
}

CLOSEST = "Closest pass: {title}, {value} against {limit}."

CLASS_ARROW = "Energy efficiency class {letter} on a scale from A to G"
CLASS_MISSING = "Not declared, and not to be computed from what was given"
CLASS_WORDS = {
    Grade.DECLARED: "{letter} declared",
    Grade.COMPUTED: "{letter} computed",
    Grade.REPORTED: "{letter} reported",
}

AMENDED = "{act}, as amended by {amending}"
ASKED_BY_THE_BUYER = "{act}, asked by the buyer"

EVIDENCE = {
    "units": "{units} units in the campaign.",
    "one unit": "One unit in the campaign.",
    "no unit": "No unit in the campaign.",
    "figures": "Figures: {counted}.",
    "no figures": "No figures.",
}

FOLDED = {
    "verdicts": "Further verdicts on the HTML sheet: {counted}.",
    "drawings": "Further drawings on the HTML sheet: {count}.",
    "methods": "Further methods on the HTML sheet: {count}.",
    "notes": "Further notes on the verdicts on the HTML sheet: {count}.",
    "remarks": "The remarks continue on the HTML sheet.",
    "products": "Product information, {count} fields, stands on the HTML sheet.",
    "tables": (
        "This is the short form. Declared values beside determined ones, product information, the "
        "units with their spread, grades and methods stand on the HTML sheet."
    ),
}
"""What is said where something is left out on paper."""

GRADE_WORDS = {
    Grade.COMPUTED: "Computed here from the raw data of the campaign",
    Grade.REPORTED: "Reported ready-made by the laboratory",
    Grade.DECLARED: "Declared by the supplier, not measured",
}

GRADE_FIGURES = "{count}: {names}"

HARMONICS_WITHIN = "every limit drawn is kept"

NOT_PROJECTED = "not projected: {reason}"

SEVERITY_WORDS = {
    Severity.IMPOSSIBLE: "impossible",
    Severity.CONTRADICTION: "contradiction",
    Severity.DOUBT: "doubt",
    Severity.REMARK: "remark",
}

HEADLINE_UNITS = (
    "luminous_flux_lm",
    "useful_luminous_flux_lm",
    "power_w",
    "efficacy_lm_per_w",
    "cct_k",
    "duv",
    "ra",
    "r9",
    "percent_flicker",
    "svm",
    "power_factor",
    "lumen_maintenance_factor",
)
"""Columns of the table of units, where any unit has the figure."""

SUMMARY_ROWS = ("mean", "s", "U")

UNITS_NOTE = (
    "s is the standard deviation over the units, U the expanded uncertainty of the mean (k = 2). "
    "A dash stands where a unit was not measured."
)

UNCERTAINTY_NAMES = {
    "wavelength_scale_nm": ("wavelength scale", "nm"),
    "spectral_noise_percent": ("noise of a spectrum", "% of its peak"),
    "spectral_calibration_percent": ("calibration of a spectrum", "%"),
}
"""Stated uncertainties that belong to no quantity -> name and unit."""

UNCERTAINTY_STATEMENT = (
    "Uncertainties are expanded, with the coverage factor k = 2, which corresponds to a coverage "
    "probability of about 95 % for a normal distribution (JCGM 100). What the laboratory states "
    "for its quantities is taken as given; what is computed from raw data propagates the stated "
    "uncertainties of wavelength, noise and calibration. The uncertainty of a mean over units "
    "holds the spread of the units too. Where no uncertainty is known, none is printed."
)

DECISION_RULES = {
    "simple acceptance": (
        "Simple acceptance: the determined value itself is compared with the limit, and a value "
        "on the limit passes (ILAC-G8, clause 4.2.1). Where a clause carries its own rule, that "
        "rule is used."
    ),
    "guarded acceptance": (
        "Guarded acceptance with a guard band of {factor} times the expanded uncertainty "
        "(ILAC-G8, clause 4.2.3): inside the band the verdict is inconclusive. Where a clause "
        "carries its own rule, that rule is used."
    ),
    "conformance probability": (
        "Conformance probability (JCGM 106): a clause passes where the probability of conformity "
        "is at least {probability}, fails where that of non-conformity is, and is inconclusive "
        "between. Where a clause carries its own rule, that rule is used."
    ),
}

LAW_READ = (
    "The law is read as it stood on {date} (law book {edition}). Limits that bind "
    "lamps from the day of placing on the market follow the day stated for the lamp."
)

CONDITION_LABELS = {
    "laboratory": "Laboratory",
    "address": "Address",
    "accreditation": "Accreditation",
    "methods": "Measured with",
    "supply": "Supply",
    "ambient": "Ambient temperature",
    "purpose": "Purpose",
}

USE_LABELS = {
    "energy": "Energy a year",
    "cost": "Electricity bill a year",
    "location": "Carbon a year, by the grid",
    "market": "Carbon a year, by contract",
    "life": "Cost over {years} years",
    "saving": "Energy saved a year",
}

USE_BASES = {
    "energy": "{power} at {hours} h a year",
    "cost": "at {tariff} a kilowatt hour, without price rise or interest",
    "location": "{factor} of CO\u2082 equivalent a kilowatt hour: {source}",
    "market": "{factor} of CO\u2082 equivalent a kilowatt hour: {source}",
    "life": "present value for {lamps} lamps, purchase to end of life, {prices} prices",
    "saving": "against {lamp}, {power}",
}
