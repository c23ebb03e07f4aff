"""Maximum allowed power of a light source.

Source: eu_2019_2020, Annex II point 1(a), Tables 1 and 2; gb_2021_1095, Schedule 3, which has
the same formula. Every constant comes from the law book.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from generator.conformity.decision_rule import Limits
from generator.conformity.energy_class import NOT_STATED, not_stated
from generator.conformity.exact_number import decimal_of, number_text, rounded
from generator.conformity.limits import DEPENDS_ON, Limit, Question, no_limit
from generator.language import joined, say
from generator.records.clause import DatedValue
from generator.records.lamp import Lamp

__all__ = [
    "CorrectionFactor",
    "correction_factor",
    "maximum_power",
    "offset_and_efficacy",
    "rendering_factor",
]

LUMINANCE = "luminance_cd_per_mm2"
"""Declared average luminance of a high-luminance light source."""


@dataclass(frozen=True, slots=True)
class CorrectionFactor:
    """The factor C, with the way there."""

    value: Fraction
    step: str
    notes: tuple[str, ...] = ()


def correction_factor(lamp: Lamp, table: DatedValue) -> CorrectionFactor:
    """Correction factor C: basic value and bonuses.

    Parameters
    ----------
    lamp
        The lamp; ``directional`` and ``mains`` must be known. A bonus that is not stated is
        not granted.
    table
        Basic values and bonuses.

    Returns
    -------
    CorrectionFactor
        Unrounded.

    Notes
    -----
    Source: eu_2019_2020, Annex II Table 2 and the text below it. A high-luminance light source
    takes the basic value of a non-directional one.
    """
    supply = "mains" if lamp.mains else "non_mains"
    broad = lamp.high_luminance or not lamp.directional
    basic = Fraction(table.number(f"{'non_directional' if broad else 'directional'}_{supply}"))
    parts: list[str] = [number_text(basic)]
    notes: list[str] = []
    total = basic
    if lamp.directional and lamp.anti_glare_shield:
        total += Fraction(table.number("anti_glare_shield"))
        parts.append(say("{bonus:f} (anti-glare shield)", bonus=table.number("anti_glare_shield")))
    if lamp.colour_tuneable:
        total += Fraction(table.number("colour_tuneable"))
        parts.append(say("{bonus:f} (colour-tuneable)", bonus=table.number("colour_tuneable")))
    if lamp.high_luminance:
        bonus, note = _luminance_bonus(lamp, table)
        total += bonus
        parts.append(say("{bonus} (high luminance)", bonus=number_text(bonus)))
        notes += note
    sum_text: str = number_text(total)
    if len(parts) > 1:
        sum_text = joined(" = ", (joined(" + ", parts), sum_text))
    step = say("Correction factor C = {value}.", value=sum_text)
    return CorrectionFactor(total, step, tuple(notes))


def _luminance_bonus(lamp: Lamp, table: DatedValue) -> tuple[Fraction, list[str]]:
    declared = lamp.declared.get(LUMINANCE)
    least = table.number("high_luminance_above_cd_per_mm2")
    luminance = Fraction(least if declared is None else declared)
    bonus = luminance * Fraction(table.number("high_luminance_per_cd_per_mm2")) + Fraction(
        table.number("high_luminance_constant")
    )
    if declared is not None:
        return bonus, []
    note = say(
        "No luminance is declared; the bonus is that of {luminance:f} cd/mm², the least possible.",
        luminance=least,
    )
    return bonus, [note]


def offset_and_efficacy(lamp: Lamp, table: DatedValue) -> tuple[Fraction, Fraction]:
    """End-loss offset L [W] and threshold efficacy η [lm/W].

    Parameters
    ----------
    lamp
        The lamp; organic LED has a row of its own, a connected LED lamp a larger offset.
    table
        The constants.

    Returns
    -------
    tuple of Fraction
        L and η.

    Notes
    -----
    Source: eu_2019_2020, Annex II Table 1.
    """
    if lamp.technology.casefold() == "oled":
        return (
            Fraction(table.number("oled_offset_w")),
            Fraction(table.number("oled_efficacy_lm_per_w")),
        )
    offset = "offset_connected_w" if lamp.connected else "offset_w"
    return Fraction(table.number(offset)), Fraction(table.number("efficacy_lm_per_w"))


def rendering_factor(ra: Fraction, table: DatedValue, mode: str = "half up") -> Fraction:
    """Factor R for colour rendering, rounded to two decimals.

    Parameters
    ----------
    ra
        General colour rendering index.
    table
        The constants.
    mode
        What becomes of a tie, which the act does not say: ``half up`` or ``half down``.

    Returns
    -------
    Fraction
        R.

    Notes
    -----
    Source: eu_2019_2020, Annex II point 1(a).
    """
    if ra <= Fraction(table.number("low_cri_at_most")):
        return Fraction(table.number("low_cri_value"))
    raw = (ra + Fraction(table.number("offset"))) / Fraction(table.number("divisor"))
    return rounded(raw, Fraction(table.number("step")), mode)


def maximum_power(question: Question) -> Limit:
    """Maximum allowed power [W]: C × (L + Φuse / (F × η)) × R.

    Parameters
    ----------
    question
        Clause, lamp and basis. On the declared basis flux and CRI are the declared ones, as
        the act says; on the determined basis they are the determined ones.

    Returns
    -------
    Limit
        Unrounded, R alone excepted; with the limit under the other tie rule where CRI makes R
        a tie.

    Notes
    -----
    Source: eu_2019_2020, Annex II point 1(a).
    """
    lamp = question.evidence.lamp
    unknown = not_stated(lamp)
    if unknown:
        return no_limit(NOT_STATED.format(properties=unknown))
    flux = question.evidence.reading("useful_luminous_flux_lm")
    ra = question.evidence.reading("ra")
    if flux.value is None or ra.value is None:
        name, item = (say("luminous flux"), flux) if flux.value is None else (say("CRI"), ra)
        return no_limit(DEPENDS_ON.format(quantity=name, reason=item.reason))
    correction = correction_factor(lamp, question.constants("correction"))
    offset, efficacy = offset_and_efficacy(lamp, question.constants("efficacy"))
    beam = "directional" if lamp.directional else "non_directional"
    factor = Fraction(question.constants("factor").number(beam))
    table = question.constants("rendering")
    rendering = rendering_factor(ra.value, table)
    unrendered = correction.value * (offset + flux.value / (factor * efficacy))
    power = unrendered * rendering
    formula = say(
        "Maximum power: {correction} × ({offset} W + {flux} lm / ({factor} × {efficacy} lm/W)) × "
        "{rendering} = {power} W ({source}).",
        correction=number_text(correction.value),
        offset=number_text(offset),
        flux=number_text(flux.value),
        factor=number_text(factor),
        efficacy=number_text(efficacy),
        rendering=number_text(rendering),
        power=number_text(power),
        source=question.clause.source.text,
    )
    rendered = say(
        "R = {rendering} for a CRI of {ra}.",
        rendering=number_text(rendering),
        ra=number_text(ra.value),
    )
    other, tie_note = _other_tie(ra.value, table, rendering, unrendered)
    uncertain = None
    if flux.expanded_uncertainty is not None:
        uncertain = flux.expanded_uncertainty * correction.value * rendering / (factor * efficacy)
    return Limit(
        Limits(upper=power),
        shown=decimal_of(power),
        steps=(correction.step, rendered, formula, *tie_note),
        notes=correction.notes + _not_stated(lamp),
        expanded_uncertainty=uncertain,
        other_reading=other,
    )


def _not_stated(lamp: Lamp) -> tuple[str, ...]:
    if lamp.connected is None:
        return (say("Whether the lamp is connected is not stated; it is taken as not connected."),)
    return ()


def _other_tie(
    ra: Fraction, table: DatedValue, rendering: Fraction, unrendered: Fraction
) -> tuple[Limits | None, tuple[str, ...]]:
    down = rendering_factor(ra, table, "half down")
    if down == rendering:
        return None, ()
    step = say(
        "R is a tie at this CRI and the act has no rule for it: half-up gives {up}, half-down "
        "{down}, which would allow {power} W.",
        up=number_text(rendering),
        down=number_text(down),
        power=number_text(unrendered * down),
    )
    return Limits(upper=unrendered * down), (step,)
