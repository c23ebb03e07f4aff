"""Fixed words of the sheets, in one place, so that a translation has one place to stand."""

from __future__ import annotations

from generator.records.verdict import VerdictWord
from generator.sheets.description import Caution

__all__ = [
    "CAUTIONS",
    "COMPARISON_SIGNS",
    "DRAWING_HEADINGS",
    "GROUP_HEADINGS",
    "HEADLINE_LABELS",
    "LANGUAGE",
    "MARKS",
    "NOT_MEASURED",
    "RULER_SCALE_TITLE",
    "RULER_SIDES",
    "UNDER_CODE_NAMES",
    "VERDICT_ROLES",
    "YES_NO",
]

LANGUAGE = "en"
"""The language these words are in; what a sheet declares, whatever language its data speak."""

NOT_MEASURED = "not measured"

COMPARISON_SIGNS = {
    "at least": "\u2265",
    "at most": "\u2264",
    "below": "<",
    "above": ">",
    "within": "within",
    "equal": "=",
}

MARKS = {word: word.value.replace(" ", "-") for word in VerdictWord}
"""Verdict -> class of its mark."""

VERDICT_ROLES = {
    VerdictWord.PASS: "good",
    VerdictWord.FAIL: "bad",
    VerdictWord.INCONCLUSIVE: "open",
    VerdictWord.NOT_MEASURED: "open",
    VerdictWord.NOT_APPLICABLE: "open",
}
"""Verdict -> colour role of its ruler."""

UNDER_CODE_NAMES = (
    "Bids stand under code names until the technical part is closed. Until then the remarks are "
    "left out, since free text may tell who the bidder is."
)
"""What stands in the place of remarks."""

YES_NO = {True: "yes", False: "no", None: "not stated"}

RULER_SIDES = ("fails", "passes")

RULER_SCALE_TITLE = (
    "Scale of the margin rulers: distance from the limit in percent of the limit, on a "
    "square-root scale; failing side left, passing side right"
)

GROUP_HEADINGS = {
    "photometric": "Light",
    "colour": "Colour of the light",
    "rendering": "Colour rendering",
    "radiometric": "Radiation",
    "modulation": "Modulation",
    "electrical": "Electricity",
    "harmonics": "Harmonics of the current",
    "distribution": "Distribution",
    "ageing": "Ageing",
    "energy": "Energy",
}

HEADLINE_LABELS = {
    "efficacy_lm_per_w": "Luminous efficacy",
    "cct_k": "Colour temperature, CCT",
    "ra": "Colour rendering, CRI Ra",
    "percent_flicker": "Percent flicker",
    "power_factor": "Power factor",
}
"""The five figures at the head of every sheet, with what they are called there."""

DRAWING_HEADINGS = {
    "spectrum": "Spectrum",
    "light": "Light over two periods",
    "mains": "One cycle of the mains",
    "rendering": "Colour rendering",
    "watts": "Where the power goes",
    "plane": "Modulation against frequency",
    "white": "White, beside the Planckian locus",
    "hues": "Colours, hue by hue",
    "harmonics": "Harmonics of the current",
    "ageing": "Ageing",
    "intensity": "Luminous intensity by direction",
}

CAUTIONS = (
    Caution(
        "Flicker",
        "Pulsing light between about 3 Hz and 70 Hz can bring on seizures in photosensitive "
        "people, and faster modulation can cause headache or make moving machinery seem to stand "
        "still. Keep people who may be sensitive away from such a lamp.",
    ),
    Caution(
        "Blue light",
        "Do not stare into a burning lamp from close by. The figures here are no classification "
        "of photobiological risk; that needs a measurement to the standard at the distance of use.",
    ),
    Caution(
        "Mains",
        "Measuring on the mains endangers life. It is for trained people with instruments rated "
        "for the circuit, with protection in place and nobody working alone.",
    ),
    Caution(
        "Verdicts",
        "Verdicts are indicative: they follow from the data given and the text of the clause on "
        "the date named. They are no certificate. The market surveillance authority, local codes "
        "and licensed practice have the last word.",
    ),
)
