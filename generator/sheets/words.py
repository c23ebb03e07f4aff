"""Fixed words of the sheets, in one place; each is a message that is said where it is printed."""

from __future__ import annotations

from generator.language import say, say_as
from generator.records.figure import GRADE_WORDS as GRADE_NAMES
from generator.records.figure import Grade
from generator.records.verdict import BASIS_WORDS, VERDICT_WORDS, VerdictWord
from generator.sheets.description import Caution

__all__ = [
    "BASIS_WORDS",
    "CAUTIONS",
    "CLASS_GRADES",
    "COMPARISON_SIGNS",
    "DRAWING_HEADINGS",
    "GRADE_NAMES",
    "GROUP_HEADINGS",
    "HEADLINE_LABELS",
    "MARKS",
    "NOT_MEASURED",
    "RULER_SCALE_TITLE",
    "RULER_SIDES",
    "UNDER_CODE_NAMES",
    "VERDICT_ROLES",
    "VERDICT_WORDS",
    "YES_NO",
]

NOT_MEASURED = say("not measured")

CLASS_GRADES = {
    Grade.COMPUTED: say_as("grade of a class", "computed"),
    Grade.REPORTED: say_as("grade of a class", "reported"),
    Grade.DECLARED: say_as("grade of a class", "declared"),
}
"""The three grades beside a class, which has another gender than a value in some languages."""

COMPARISON_SIGNS = {
    "at least": "\u2265",
    "at most": "\u2264",
    "below": "<",
    "above": ">",
    "within": say_as("comparison", "within"),
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

UNDER_CODE_NAMES = say(
    "Bids stand under code names until the technical part is closed. Until then the remarks are "
    "left out, since free text may tell who the bidder is."
)
"""What stands in the place of remarks."""

YES_NO = {
    True: say_as("answer", "yes"),
    False: say_as("answer", "no"),
    None: say("not stated"),
}

RULER_SIDES = (say_as("side of a ruler", "fails"), say_as("side of a ruler", "passes"))

RULER_SCALE_TITLE = say(
    "Scale of the margin rulers: distance from the limit in percent of the limit, on a "
    "square-root scale; failing side left, passing side right"
)

GROUP_HEADINGS = {
    "photometric": say_as("group of quantities", "Light"),
    "colour": say("Colour of the light"),
    "rendering": say("Colour rendering"),
    "radiometric": say_as("group of quantities", "Radiation"),
    "modulation": say_as("group of quantities", "Modulation"),
    "electrical": say_as("group of quantities", "Electricity"),
    "harmonics": say("Harmonics of the current"),
    "distribution": say_as("group of quantities", "Distribution"),
    "ageing": say("Ageing"),
    "energy": say_as("group of quantities", "Energy"),
}

HEADLINE_LABELS = {
    "efficacy_lm_per_w": say("Luminous efficacy"),
    "cct_k": say("Colour temperature, CCT"),
    "ra": say("Colour rendering, CRI Ra"),
    "percent_flicker": say("Percent flicker"),
    "power_factor": say("Power factor"),
}
"""The five figures at the head of every sheet, with what they are called there."""

DRAWING_HEADINGS = {
    "spectrum": say("Spectrum"),
    "light": say("Light over two periods"),
    "mains": say("One cycle of the mains"),
    "rendering": say("Colour rendering"),
    "watts": say("Where the power goes"),
    "plane": say("Modulation against frequency"),
    "white": say("White, beside the Planckian locus"),
    "hues": say("Colours, hue by hue"),
    "harmonics": say("Harmonics of the current"),
    "ageing": say("Ageing"),
    "intensity": say("Luminous intensity by direction"),
}

CAUTIONS = (
    Caution(
        say_as("caution", "Flicker"),
        say(
            "Pulsing light between about 3 Hz and 70 Hz can bring on seizures in photosensitive "
            "people, and faster modulation can cause headache or make moving machinery seem to "
            "stand still. Keep people who may be sensitive away from such a lamp."
        ),
    ),
    Caution(
        say_as("caution", "Blue light"),
        say(
            "Do not stare into a burning lamp from close by. The figures here are no "
            "classification of photobiological risk; that needs a measurement to the standard at "
            "the distance of use."
        ),
    ),
    Caution(
        say_as("caution", "Mains"),
        say(
            "Measuring on the mains endangers life. It is for trained people with instruments "
            "rated for the circuit, with protection in place and nobody working alone."
        ),
    ),
    Caution(
        say_as("caution", "Verdicts"),
        say(
            "Verdicts are indicative: they follow from the data given and the text of the clause "
            "on the date named. They are no certificate. The market surveillance authority, "
            "local codes and licensed practice have the last word."
        ),
    ),
)
