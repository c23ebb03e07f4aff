"""Claims to replace another lamp.

Source: eu_2019_2015, Annex V, notes to Table 3, Tables 4 to 7.
"""

from __future__ import annotations

from fractions import Fraction
from itertools import pairwise

from generator.conformity.decision_rule import Limits
from generator.conformity.evidence import Evidence
from generator.conformity.exact_number import decimal_of, number_text, rounded
from generator.conformity.limits import Limit, Question, no_limit
from generator.language import say
from generator.records.clause import DatedValue
from generator.records.verdict import Basis

__all__ = [
    "equivalent_power",
    "equivalent_power_of",
    "reflector_flux",
    "reflector_flux_needed",
]


def equivalent_power_of(flux_lm: Fraction, table: DatedValue) -> Fraction | None:
    """Power of the incandescent lamp that a luminous flux stands for [W].

    Parameters
    ----------
    flux_lm
        Luminous flux [lm].
    table
        Rows of flux and power.

    Returns
    -------
    Fraction or None
        Linear between the rows, not yet rounded; ``None`` outside them, where the act has no
        rule.

    Notes
    -----
    Source: eu_2019_2015, Annex V Table 7 and note 3 to Table 3.
    """
    rows = [(Fraction(row[0]), Fraction(row[1])) for row in table.rows("lm_w")]
    for (flux, power), (next_flux, next_power) in pairwise(rows):
        if flux <= flux_lm <= next_flux:
            return power + (flux_lm - flux) / (next_flux - flux) * (next_power - power)
    return None


def equivalent_power(question: Question) -> Limit:
    """The highest power that the lamp may claim to replace.

    Parameters
    ----------
    question
        Clause, lamp and basis.

    Returns
    -------
    Limit
        On the claimed power [W], rounded to an integer.

    Notes
    -----
    Source: eu_2019_2015, Annex V note 3 to Table 3.
    """
    flux = question.evidence.reading("useful_luminous_flux_lm")
    if flux.value is None:
        return no_limit(
            say("the claim depends on the luminous flux, which is {reason}", reason=flux.reason)
        )
    table = question.constants("table")
    power = equivalent_power_of(flux.value, table)
    if power is None:
        return no_limit(say("the act has no rule for {flux} lm", flux=number_text(flux.value)))
    whole = rounded(power, Fraction(table.number("step_w")))
    step = say(
        "{flux} lm stand for {power} W, rounded {whole} W ({source}).",
        flux=number_text(flux.value),
        power=number_text(power),
        whole=number_text(whole),
        source=question.clause.source.text,
    )
    return Limit(Limits(upper=whole), shown=decimal_of(whole), steps=(step,))


def reflector_flux_needed(
    reference_lm: Fraction, maintenance: Fraction, beam_angle_deg: Fraction, factors: DatedValue
) -> Fraction:
    """Flux in a 90° cone that an LED lamp needs to replace a reflector lamp [lm].

    Parameters
    ----------
    reference_lm
        Reference flux of the lamp replaced [lm].
    maintenance
        Lumen maintenance factor at the end of the declared life.
    beam_angle_deg
        Beam angle of the LED lamp [degrees].
    factors
        Factors for lumen maintenance and beam angle.

    Returns
    -------
    Fraction
        Reference flux times both factors.

    Notes
    -----
    Source: eu_2019_2015, Annex V Tables 4, 5 and 6.
    """
    ageing = Fraction(factors.number("maintenance_constant")) + Fraction(
        factors.number("maintenance_slope")
    ) * (1 - maintenance)
    steps = sorted(factors.rows("beam_angle_factor"), reverse=True)
    beam = next(Fraction(row[1]) for row in steps if beam_angle_deg >= Fraction(row[0]))
    return reference_lm * ageing * beam


def reflector_flux(question: Question) -> Limit:
    """The flux in a 90° cone that the claimed reflector lamp asks for.

    Parameters
    ----------
    question
        Clause, lamp and basis; the claim, the lumen maintenance and the beam angle are the
        declared ones.

    Returns
    -------
    Limit
        On the flux in a 90° cone [lm].

    Notes
    -----
    Source: eu_2019_2015, Annex V Tables 4, 5 and 6.
    """
    declared = Evidence(question.evidence.record, Basis.DECLARED)
    claim = declared.reading("equivalent_power_w").value
    if claim is None:
        return no_limit(say("no lamp is claimed to be replaced"))
    kind = declared.lamp.reflector
    table = question.constants("flux")
    if kind not in table.entries:
        return no_limit(say("the claim depends on the type of reflector, which is not stated"))
    row = next((row for row in table.rows(kind) if Fraction(row[0]) == claim), None)
    if row is None:
        return no_limit(
            say(
                "the act has no reference flux for {kind} at {power} W",
                kind=kind,
                power=number_text(claim),
            )
        )
    maintenance = declared.reading("lumen_maintenance_factor").value
    angle = declared.reading("beam_angle_deg").value
    if maintenance is None or angle is None:
        return no_limit(say("the claim depends on lumen maintenance and beam angle; not declared"))
    reference, factors = Fraction(row[1]), question.constants("factors")
    needed = reflector_flux_needed(reference, maintenance, angle, factors)
    step = say(
        "{kind} at {power} W asks for {flux} lm in 90° ({source}).",
        kind=kind,
        power=number_text(claim),
        flux=number_text(needed),
        source=question.clause.source.text,
    )
    return Limit(Limits(lower=needed), shown=decimal_of(needed), steps=(step,))
