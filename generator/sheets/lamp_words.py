"""Fixed sentences of a lamp's sheet, whole and with named places, so that they translate."""

from __future__ import annotations

from generator.language import say, say_as, say_counted
from generator.records.figure import Grade
from generator.records.finding import Severity

__all__ = [
    "AGAINST",
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
    "FOUND_ON",
    "GAP",
    "GRADE_COUNTS",
    "GRADE_FIGURES",
    "GRADE_WORDS",
    "HARMONICS_WITHIN",
    "HEADLINE_UNITS",
    "IDENTITY_LABELS",
    "JUDGED_RULER",
    "JUDGED_VALUE",
    "LAW_READ",
    "LIFE_BASES",
    "NOT_PROJECTED",
    "SEVERITY_WORDS",
    "SHEET_SUMMARY",
    "SHEET_TITLE",
    "SHORTFALL_SENTENCE",
    "SHORTFALL_VALUE",
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

SHEET_TITLE = say("{model} \u2013 spec sheet")
SHEET_SUMMARY = say("{lamp}. {sentence}")

AND_MORE = say("{titles} and {count} more")

IDENTITY_LABELS = {
    "lamp": say("Lamp"),
    "bidder": say("Bidder"),
    "cap": say_as("identity of a lamp", "Cap"),
    "technology": say("Technology"),
    "directional": say_as("identity of a lamp", "Directional"),
    "mains": say_as("identity of a lamp", "Mains"),
    "connected": say_as("identity of a lamp", "Connected"),
    "placed": say("On the market since"),
    "price": say("Unit price"),
    "report": say("Test report"),
}

SHORTFALL_WORDS = {"fail": say("falls short"), "inconclusive": say("cannot be told")}
"""Mark -> word where only shortfalls are told."""
SHORTFALL_VALUE = say("{basis} {value}")
SHORTFALL_SENTENCE = say("{values}; asked {limit}.")

SILHOUETTE = {
    "tube": say("Outline of a tube, cap {cap}"),
    "capsule": say("Outline of a capsule lamp, cap {cap}"),
    "dish": say("Outline of a wide reflector lamp, cap {cap}"),
    "spot": say("Outline of a reflector lamp, cap {cap}"),
    "flood": say("Outline of a reflector lamp, cap {cap}"),
    "candle": say("Outline of a candle lamp, cap {cap}"),
    "bulb": say("Outline of a bulb, cap {cap}"),
    "plain": say("A plain box in place of an outline: no cap is stated that tells a shape"),
}
"""Shape -> what the outline shows."""

VERDICT_SENTENCES = {
    "none": say("No clause could be judged."),
    "fails": say_counted(
        "Fails {failed} of {count} judgement.", "Fails {failed} of {count} judgements."
    ),
    "passes all": say_counted("Passes the one judgement.", "Passes all {count} judgements."),
    "passes some": say_counted(
        "Passes {passed} of {count} judgement.", "Passes {passed} of {count} judgements."
    ),
    "open": say("{open} cannot be told within the uncertainty."),
    "not measured": say("{unmeasured} not measured."),
}

CLOSEST = say("Closest pass: {title}, {value} against {limit}.")

AGAINST = say("{limit} {regime}")
"""The limit that a figure at the head is set against, and who asks."""

CLASS_ARROW = say("Energy efficiency class {letter} on a scale from A to G")
CLASS_MISSING = say("Not declared, and not to be computed from what was given")
CLASS_WORDS = {
    Grade.DECLARED: say("{letter} declared"),
    Grade.COMPUTED: say("{letter} computed"),
    Grade.REPORTED: say("{letter} reported"),
}

JUDGED_RULER = say("{title}: {judged}")
JUDGED_VALUE = say("{basis} {value} against {limit}, margin {margin}, {word}")
"""What a ruler shows, of both bases of one clause."""

AMENDED = say("{act}, as amended by {amending}")
ASKED_BY_THE_BUYER = say("{act}, asked by the buyer")

GRADE_COUNTS = {
    Grade.COMPUTED: say("{count} computed"),
    Grade.REPORTED: say("{count} reported"),
    Grade.DECLARED: say("{count} declared"),
}

EVIDENCE = {
    "units": say_counted("One unit in the campaign.", "{count} units in the campaign."),
    "no unit": say("No unit in the campaign."),
    "figures": say("Figures: {counted}."),
    "no figures": say("No figures."),
}

FOLDED = {
    "verdicts": say("Further verdicts on the HTML sheet: {counted}."),
    "drawings": say("Further drawings on the HTML sheet: {count}."),
    "methods": say("Further methods on the HTML sheet: {count}."),
    "notes": say("Further notes on the verdicts on the HTML sheet: {count}."),
    "remarks": say("The remarks continue on the HTML sheet."),
    "products": say_counted(
        "Product information, {count} field, stands on the HTML sheet.",
        "Product information, {count} fields, stands on the HTML sheet.",
    ),
    "tables": say(
        "This is the short form. Declared values beside determined ones, product information, the "
        "units with their spread, grades and methods stand on the HTML sheet."
    ),
}
"""What is said where something is left out on paper."""

FOUND_ON = say("lamp {lamp}: ")
"""How the cross-checks begin; the lamp is named by the sheet already."""

GAP = say("{message} ({place})")
"""A warning of the campaign, with the place where it stands."""

GRADE_WORDS = {
    Grade.COMPUTED: say("Computed here from the raw data of the campaign"),
    Grade.REPORTED: say("Reported ready-made by the laboratory"),
    Grade.DECLARED: say("Declared by the supplier, not measured"),
}

GRADE_FIGURES = say("{count}: {names}")

HARMONICS_WITHIN = say("every limit drawn is kept")

NOT_PROJECTED = say("not projected: {reason}")

SEVERITY_WORDS = {
    Severity.IMPOSSIBLE: say_as("severity", "impossible"),
    Severity.CONTRADICTION: say_as("severity", "contradiction"),
    Severity.DOUBT: say_as("severity", "doubt"),
    Severity.REMARK: say_as("severity", "remark"),
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

SUMMARY_ROWS = (say_as("row of a table", "mean"), "s", "U")

UNITS_NOTE = say(
    "s is the standard deviation over the units, U the expanded uncertainty of the mean (k = 2). "
    "A dash stands where a unit was not measured."
)

UNCERTAINTY_NAMES = {
    "wavelength_scale_nm": (say("wavelength scale"), "nm"),
    "spectral_noise_percent": (say("noise of a spectrum"), say("% of its peak")),
    "spectral_calibration_percent": (say("calibration of a spectrum"), "%"),
    "light_noise_percent": (say("noise of a light record"), say("% of its mean")),
    "light_offset_percent": (say("offset of a light record"), say("% of its mean")),
    "time_base_percent": (say("time base"), "%"),
    "voltage_current_skew_us": (say("delay between voltage and current"), "\u00b5s"),
    "angle_deg": (say("angles of the goniophotometer"), "\u00b0"),
    "flux_repeatability_percent": (say("repeatability of the flux"), "%"),
    "chromaticity_repeatability": (say("repeatability of u\u2032 and v\u2032"), ""),
}
"""Stated uncertainties that belong to no quantity -> name and unit."""

UNCERTAINTY_STATEMENT = say(
    "Uncertainties are expanded, with the coverage factor k = 2, which corresponds to a coverage "
    "probability of about 95 % for a normal distribution (JCGM 100). What the laboratory states "
    "for its quantities is taken as given; what is computed from raw data propagates the stated "
    "uncertainties of wavelength, noise and calibration. The uncertainty of a mean over units "
    "holds the spread of the units too. Where no uncertainty is known, none is printed."
)

DECISION_RULES = {
    "simple acceptance": say(
        "Simple acceptance: the determined value itself is compared with the limit, and a value "
        "on the limit passes (ILAC-G8, clause 4.2.1). Where a clause carries its own rule, that "
        "rule is used."
    ),
    "guarded acceptance": say(
        "Guarded acceptance with a guard band of {factor} times the expanded uncertainty "
        "(ILAC-G8, clause 4.2.3): inside the band the verdict is inconclusive. Where a clause "
        "carries its own rule, that rule is used."
    ),
    "conformance probability": say(
        "Conformance probability (JCGM 106): a clause passes where the probability of conformity "
        "is at least {probability}, fails where that of non-conformity is, and is inconclusive "
        "between. Where a clause carries its own rule, that rule is used."
    ),
}

LAW_READ = say(
    "The law is read as it stood on {date} (law book {edition}). Limits that bind "
    "lamps from the day of placing on the market follow the day stated for the lamp."
)

CONDITION_LABELS = {
    "laboratory": say("Laboratory"),
    "address": say("Address"),
    "accreditation": say("Accreditation"),
    "methods": say("Measured with"),
    "supply": say_as("conditions of measurement", "Supply"),
    "ambient": say("Ambient temperature"),
    "purpose": say("Purpose"),
}

USE_LABELS = {
    "energy": say("Energy a year"),
    "cost": say("Electricity bill a year"),
    "location": say("Carbon a year, by the grid"),
    "market": say("Carbon a year, by contract"),
    "life": say_counted("Cost over {count} year", "Cost over {count} years"),
    "saving": say("Energy saved a year"),
}

USE_BASES = {
    "energy": say("{power} at {hours} h a year"),
    "cost": say("at {tariff} a kilowatt hour, without price rise or interest"),
    "location": say("{factor} of CO\u2082 equivalent a kilowatt hour: {source}"),
    "market": say("{factor} of CO\u2082 equivalent a kilowatt hour: {source}"),
    "saving": say("against {lamp}, {power}"),
}

LIFE_BASES = {
    "real": say_counted(
        "present value for {count} lamp, purchase to end of life, real prices",
        "present value for {count} lamps, purchase to end of life, real prices",
    ),
    "nominal": say_counted(
        "present value for {count} lamp, purchase to end of life, nominal prices",
        "present value for {count} lamps, purchase to end of life, nominal prices",
    ),
}
"""Kind of prices -> on what the cost over the life rests."""
