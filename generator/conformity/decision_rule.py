"""Decision rules: how a value with its uncertainty and a limit become a verdict.

Source: iso_iec_17025, clause 7.8.6 (the rule is stated with the verdict); ilac_g8, clauses
4.2.1 to 4.2.3 (simple acceptance, guard bands); jcgm_106, clauses 7 and 8 (probability of
conformity, guarded acceptance).
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from fractions import Fraction

from generator.conformity.exact_number import number_text
from generator.language import say
from generator.records.clause_words import with_unit
from generator.records.settings import Decision
from generator.records.verdict import VerdictWord

__all__ = [
    "SIMPLE",
    "Limits",
    "Outcome",
    "acceptance_interval",
    "conformance_probability",
    "decide",
    "rule_text",
]

COVERAGE_FACTOR = 2
"""Every expanded uncertainty of a campaign is stated for this factor."""

SIMPLE = Decision()
"""The rule where none is chosen, and for declared values, which carry no uncertainty."""


@dataclass(frozen=True, slots=True)
class Limits:
    """A lower limit, an upper limit, or both.

    Parameters
    ----------
    lower, upper
        Limits in the unit of the quantity; ``None`` where there is none on that side.
    strict
        True where the limit itself does not conform (``below``, ``above``).
    """

    lower: Fraction | None = None
    upper: Fraction | None = None
    strict: bool = False

    def margin(self, value: Fraction) -> Fraction:
        """How far a value is on the passing side; negative on the failing side."""
        sides = []
        if self.lower is not None:
            sides.append(value - self.lower)
        if self.upper is not None:
            sides.append(self.upper - value)
        return min(sides)

    def meets(self, value: Fraction) -> bool:
        """Whether a value conforms, its uncertainty left aside."""
        margin = self.margin(value)
        return margin > 0 if self.strict else margin >= 0


@dataclass(frozen=True, slots=True)
class Outcome:
    """What a rule makes of a value.

    Parameters
    ----------
    word
        Pass, fail or inconclusive.
    margin
        Distance from the limit, positive on the passing side.
    probability
        Probability of conformity; ``None`` where the uncertainty is unknown.
    step
        The rule applied, with its numbers, in one sentence.
    """

    word: VerdictWord
    margin: Fraction
    probability: float | None
    step: str


def conformance_probability(
    value: Fraction, expanded_uncertainty: Fraction, limits: Limits
) -> float:
    """Probability that the true value lies within the limits.

    Parameters
    ----------
    value
        Measured value.
    expanded_uncertainty
        Expanded uncertainty (k = 2) in the same unit.
    limits
        The limits.

    Returns
    -------
    float
        Between 0 and 1; for an uncertainty of zero, 0 or 1.

    Notes
    -----
    Source: jcgm_106, clause 7, normal distribution.
    """
    if expanded_uncertainty == 0:
        return 1.0 if limits.meets(value) else 0.0
    spread = float(expanded_uncertainty) / COVERAGE_FACTOR
    upper = lower = 0.0
    if limits.upper is not None:
        upper = _below(-float(limits.upper - value) / spread)
    if limits.lower is not None:
        lower = _below(float(limits.lower - value) / spread)
    return max(0.0, 1.0 - upper - lower)


def _below(deviation: float) -> float:
    """Standard normal distribution function."""
    return math.erfc(-deviation / math.sqrt(2.0)) / 2.0


def acceptance_interval(limits: Limits, guard_band: Fraction) -> Limits:
    """Move limits inwards by a guard band; outwards by a negative one."""
    return Limits(
        lower=None if limits.lower is None else limits.lower + guard_band,
        upper=None if limits.upper is None else limits.upper - guard_band,
        strict=limits.strict,
    )


def rule_text(decision: Decision) -> str:
    """The rule in words, as it stands beside a verdict."""
    if decision.rule == "guarded acceptance":
        factor = number_text(Fraction(decision.guard_band_factor))
        band = "U" if decision.guard_band_factor == 1 else with_unit(factor, "U")
        return say("guarded acceptance, guard band w = {band} (ILAC-G8, 4.2.3)", band=band)
    if decision.rule == "conformance probability":
        level = number_text(Fraction(decision.probability) * 100)
        return say(
            "conformance probability of at least {level} % (JCGM 106, clause 7)", level=level
        )
    return say("simple acceptance (ILAC-G8, 4.2.1)")


def decide(
    value: Fraction, expanded_uncertainty: Fraction | None, limits: Limits, decision: Decision
) -> Outcome:
    """Apply a decision rule to a value.

    Parameters
    ----------
    value
        Value judged.
    expanded_uncertainty
        Expanded uncertainty (k = 2) in the same unit; ``None`` where unknown.
    limits
        The limits.
    decision
        The rule chosen.

    Returns
    -------
    Outcome
        Pass or fail, or inconclusive where the rule leaves it open or needs an uncertainty
        that is not known.
    """
    margin = limits.margin(value)
    known = None
    if expanded_uncertainty is not None:
        known = conformance_probability(value, expanded_uncertainty, limits)
    if decision.rule == "simple acceptance":
        word = VerdictWord.PASS if limits.meets(value) else VerdictWord.FAIL
        return Outcome(word, margin, known, say("The value itself is compared."))
    if expanded_uncertainty is None or known is None:
        unknown = say("The uncertainty is not known, so the decision rule cannot be applied.")
        return Outcome(VerdictWord.INCONCLUSIVE, margin, None, unknown)
    if decision.rule == "guarded acceptance":
        word, step = _guarded(value, expanded_uncertainty, limits, decision)
    else:
        word, step = _by_probability(known, decision)
    return Outcome(word, margin, known, step)


def _guarded(
    value: Fraction, expanded_uncertainty: Fraction, limits: Limits, decision: Decision
) -> tuple[VerdictWord, str]:
    band = Fraction(decision.guard_band_factor) * expanded_uncertainty
    shown = number_text(Fraction(f"{float(band):.4g}"))
    accepted = acceptance_interval(limits, band)
    crossed = (
        accepted.lower is not None
        and accepted.upper is not None
        and accepted.lower > accepted.upper
    )
    if not crossed and accepted.meets(value):
        step = say("Guard band w = {band}: the value lies within the guarded limits.", band=shown)
        return VerdictWord.PASS, step
    if not acceptance_interval(limits, -band).meets(value):
        step = say(
            "Guard band w = {band}: the value lies beyond the limit by more than w.", band=shown
        )
        return VerdictWord.FAIL, step
    meets = limits.meets(value)
    return VerdictWord.INCONCLUSIVE, (_CONDITIONAL_PASS if meets else _CONDITIONAL_FAIL).format(
        band=shown
    )


_CONDITIONAL_PASS = say(
    "Guard band w = {band}: the value lies within w of the limit (conditional pass in ILAC-G8, "
    "4.2.3)."
)
_CONDITIONAL_FAIL = say(
    "Guard band w = {band}: the value lies within w of the limit (conditional fail in ILAC-G8, "
    "4.2.3)."
)


def _by_probability(probability: float, decision: Decision) -> tuple[VerdictWord, str]:
    level = float(decision.probability)
    if probability >= level:
        step = say("Conformity is as probable as the level of {level:g} asks.", level=level)
        return VerdictWord.PASS, step
    if 1.0 - probability >= level:
        step = say("Nonconformity is as probable as the level of {level:g} asks.", level=level)
        return VerdictWord.FAIL, step
    step = say(
        "Neither conformity nor nonconformity is as probable as the level of {level:g} asks.",
        level=level,
    )
    return VerdictWord.INCONCLUSIVE, step
