"""Luminous flux, intensity and efficacy against one another and the spectrum."""

from __future__ import annotations

import math
from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence, computed_against_reported
from generator.crosschecks.significance import (
    Comparison,
    Reading,
    compared,
    half_digit,
    quotient,
    reading,
)
from generator.crosschecks.tolerances import NO_SOURCE, tolerance
from generator.crosschecks.wording import CheckText, sourced, worded
from generator.language import Message, say
from generator.quantities import quantity
from generator.records.figure import MEAN, Grade
from generator.records.finding import Finding, Severity
from generator.records.lamp import Unit

__all__ = [
    "declared_efficacy_above_ler",
    "distribution_against_report",
    "efficacy_above_ler",
    "efficacy_above_maximum",
    "efficacy_against_ratio",
    "endurance_start_against_report",
    "flux_distribution_against_report",
    "flux_spectrum_against_report",
    "peak_intensity_below_average",
    "radiant_efficiency_above_one",
    "useful_flux_above_flux",
]

_FLUX = "luminous_flux_lm"
_POWER = "power_w"
_EFFICACY = "efficacy_lm_per_w"
_LER = "ler_lm_per_w"
_MAXIMUM_LM_PER_W = Decimal("683.002")

_FLUX_SPECTRUM = CheckText(
    "flux-spectrum-against-report",
    say("Flux from the spectrum and reported flux differ"),
    say(
        "A spectrum calibrated separately from the flux, one in another unit or scale, columns of "
        "two units exchanged, or a flux corrected for a factor that the spectrum was not."
    ),
    (_FLUX,),
    sourced("cie_s025", say("total luminous flux from the spectral radiant flux")),
)
_FLUX_DISTRIBUTION = CheckText(
    "flux-distribution-against-report",
    say("Flux from the intensity distribution and flux of the unit differ"),
    say(
        "Another unit or another operating point on the goniophotometer than in the sphere, planes "
        "or angles missing from the distribution, or spatial non-uniformity of the sphere."
    ),
    (_FLUX, "flux_120deg_lm", "flux_120deg_fraction"),
    sourced("cie_84", say("luminous flux from luminous intensities")),
)
_DISTRIBUTION_TEXTS = {
    name: CheckText(
        f"{word}-distribution-against-report",
        title,
        say(
            "Another definition of the angle or cone, another unit on the goniophotometer, or a "
            "distribution with its axis off the axis of the lamp."
        ),
        (name,),
        sourced(quantity(name).source, say("definition")),
    )
    for word, name, title in (
        (
            "useful-flux",
            "useful_luminous_flux_lm",
            say("Useful luminous flux computed and reported differ"),
        ),
        ("beam-angle", "beam_angle_deg", say("Beam angle computed and reported differ")),
        (
            "peak-intensity",
            "peak_intensity_cd",
            say("Peak luminous intensity computed and reported differ"),
        ),
    )
}
_EFFICACY_RATIO = CheckText(
    "efficacy-against-flux-and-power",
    say("Efficacy is not flux divided by power"),
    say(
        "Flux, power and efficacy taken from different units or operating points, or efficacy "
        "referred to the power of the module without its control gear."
    ),
    (_EFFICACY, _FLUX, _POWER),
    sourced("cie_s025", say("definition of luminous efficacy")),
)
_ABOVE_LER = CheckText(
    "efficacy-above-ler",
    say("Efficacy above what the spectrum itself allows"),
    say(
        "The lamp would have to give more light than its spectrum carries at full conversion of "
        "power. A flux in another unit, a power without control gear, or a spectrum of another "
        "lamp would explain it."
    ),
    (_EFFICACY, _LER, _FLUX, _POWER),
    sourced("cie_eilv", say("luminous efficacy of radiation")),
)
_DECLARED_ABOVE_LER = CheckText(
    "declared-efficacy-above-ler",
    say("Declared efficacy above what the spectrum allows"),
    say(
        "A declared flux or power of another operating mode, a slip in one of the two, or a "
        "spectrum of another lamp would explain it."
    ),
    (_EFFICACY, _LER, _FLUX, _POWER),
    sourced("cie_eilv", say("luminous efficacy of radiation")),
)
_ABOVE_MAXIMUM = CheckText(
    "efficacy-above-maximum",
    say("Efficacy above that of any radiation"),
    say(
        "No light has a higher luminous efficacy than monochromatic radiation at 555 nm. A slip in "
        "flux or power, or in their units, would explain it."
    ),
    (_EFFICACY, _FLUX, _POWER),
    sourced("si_brochure", say("luminous efficacy Kcd")),
)
_EFFICIENCY = CheckText(
    "radiant-efficiency-above-one",
    say("More radiant flux than electrical power"),
    say(
        "A spectrum in another unit than W/nm, on a relative scale, or a power without control "
        "gear would explain it."
    ),
    ("radiant_efficiency", "radiant_flux_w", _POWER),
    sourced("cie_eilv", say("radiant efficiency")),
)
_USEFUL = CheckText(
    "useful-flux-above-flux",
    say("Useful flux above total flux"),
    say(
        "The useful flux is the part of the total within a cone. The two columns exchanged, or the "
        "two taken from different units or instruments, would explain it."
    ),
    ("useful_luminous_flux_lm", _FLUX),
    sourced("eu_2019_2015", say("definition of useful luminous flux")),
)
_PEAK = CheckText(
    "peak-intensity-below-average",
    say("Peak intensity below the average over all directions"),
    say(
        "The highest intensity cannot be lower than flux divided by 4π. A slip in one of the two, "
        "or a distribution scaled to another flux, would explain it."
    ),
    ("peak_intensity_cd", _FLUX),
    sourced("cie_eilv", say("luminous flux and luminous intensity")),
)
_ENDURANCE = CheckText(
    "endurance-start-against-report",
    say("Flux at the start of the ageing test and reported flux differ"),
    say(
        "The ageing test run on other units, at another supply or temperature, or after a burn-in "
        "that the report does not count, would explain it."
    ),
    (_FLUX,),
    NO_SOURCE,
)
_FROM_SPECTRUM = say("computed from the spectrum as {computed}")
_FROM_DISTRIBUTION = say("computed from the intensity distribution as {computed}")
_BESIDE_REPORTED = say(
    "luminous flux from the intensity distribution {zonal}, reported {other}; {outcome}"
)
_BESIDE_SPECTRUM = say(
    "luminous flux from the intensity distribution {zonal}, computed from the spectrum {other}; "
    "{outcome}"
)


def flux_spectrum_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Flux computed from the spectrum against the reported flux."""
    yield from computed_against_reported(
        evidence, _FLUX_SPECTRUM, _FLUX, _FROM_SPECTRUM, zonal=False
    )


def distribution_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Useful flux, beam angle and peak intensity of the distribution against reported ones."""
    for name, text in _DISTRIBUTION_TEXTS.items():
        yield from computed_against_reported(evidence, text, name, _FROM_DISTRIBUTION)


def _distribution_flux(evidence: LampEvidence, unit: Unit) -> Reading | None:
    """Total flux of the intensity table: given as such, or cone flux over its share."""
    total = evidence.computed(unit, _FLUX, zonal=True)
    if total is not None:
        return total
    cone = reading(evidence.figure(unit, "flux_120deg_lm", Grade.COMPUTED))
    share = reading(evidence.figure(unit, "flux_120deg_fraction", Grade.COMPUTED))
    if cone is None or share is None or not cone.value or not share.value:
        return None
    return Reading(cone.value / share.value, cone.expanded and cone.expanded / share.value)


def _other_flux(evidence: LampEvidence, unit: Unit) -> tuple[Reading | None, Message]:
    """Reported flux, else that of the spectrum, with what is then said."""
    reported = evidence.reported(unit, _FLUX)
    if reported is not None:
        return reported, _BESIDE_REPORTED
    return evidence.computed(unit, _FLUX, zonal=False), _BESIDE_SPECTRUM


def flux_distribution_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Flux of the intensity distribution against that of the sphere."""
    for unit in evidence.units:
        zonal = _distribution_flux(evidence, unit)
        other, words = _other_flux(evidence, unit)
        if zonal is None or other is None:
            continue
        outcome = compared(zonal, other, tolerance(_FLUX))
        if outcome.severity is not None:
            yield _FLUX_DISTRIBUTION.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                words.format(
                    zonal=worded(_FLUX, zonal.value),
                    other=worded(_FLUX, other.value),
                    outcome=outcome.words("lm"),
                ),
                outcome.deviation,
                "lm",
            )


def _efficacy(evidence: LampEvidence, unit: Unit) -> Reading | None:
    """Reported flux over reported power, else the two as measured."""
    for read in (evidence.reported, evidence.measured):
        flux, power = read(unit, _FLUX), read(unit, _POWER)
        if flux is not None and power is not None and flux.value > 0 and power.value > 0:
            return quotient(flux, power)
    return None


def efficacy_against_ratio(evidence: LampEvidence) -> Iterator[Finding]:
    """Reported efficacy against reported flux divided by reported power."""
    for unit in evidence.units:
        flux, power = evidence.reported(unit, _FLUX), evidence.reported(unit, _POWER)
        efficacy = evidence.reported(unit, _EFFICACY)
        if flux is None or power is None or efficacy is None:
            continue
        ratio = quotient(flux, power)
        outcome = compared(efficacy, ratio, tolerance(_EFFICACY))
        if outcome.severity is not None:
            yield _EFFICACY_RATIO.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "efficacy reported as {efficacy}, {flux} divided by {power} is {ratio}; "
                    "{outcome}",
                    efficacy=worded(_EFFICACY, efficacy.value),
                    flux=worded(_FLUX, flux.value),
                    power=worded(_POWER, power.value),
                    ratio=worded(_EFFICACY, ratio.value),
                    outcome=outcome.words("lm/W"),
                ),
                outcome.deviation,
                "lm/W",
            )


def _above(outcome: Comparison) -> Severity | None:
    """Beyond a limit of nature: impossible; beyond it within the uncertainty: a doubt."""
    if outcome.deviation <= 0 or outcome.excess <= 0:
        return None
    return Severity.DOUBT if outcome.severity is None else Severity.IMPOSSIBLE


def efficacy_above_ler(evidence: LampEvidence) -> Iterator[Finding]:
    """Efficacy of each unit against the luminous efficacy of its own radiation."""
    for unit in evidence.units:
        efficacy, ler = _efficacy(evidence, unit), evidence.measured(unit, _LER)
        if efficacy is None or ler is None:
            continue
        outcome = compared(efficacy, ler, tolerance("efficacy_above_ler"))
        severity = _above(outcome)
        if severity is not None:
            yield _ABOVE_LER.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                severity,
                say(
                    "luminous efficacy {efficacy} (flux divided by power), luminous efficacy of "
                    "the radiation itself {radiation}; {outcome}",
                    efficacy=worded(_EFFICACY, efficacy.value),
                    radiation=worded(_LER, ler.value),
                    outcome=outcome.words("lm/W"),
                ),
                outcome.deviation,
                "lm/W",
            )


def declared_efficacy_above_ler(evidence: LampEvidence) -> Iterator[Finding]:
    """Declared flux over declared power against the mean efficacy of the radiation."""
    declared = evidence.lamp.declared
    flux = declared.get(_FLUX) or declared.get("useful_luminous_flux_lm")
    power, ler = declared.get(_POWER), evidence.measured_mean(_LER)
    if not flux or not power or ler is None:
        return
    efficacy = quotient(
        Reading(flux, rounding=half_digit(flux)), Reading(power, rounding=half_digit(power))
    )
    outcome = compared(efficacy, ler, tolerance("efficacy_above_ler"))
    severity = _above(outcome)
    if severity is not None:
        yield _DECLARED_ABOVE_LER.finding(
            evidence.lamp.lamp_id,
            MEAN,
            severity,
            say(
                "declared {flux} divided by declared {power} is {efficacy}, luminous efficacy of "
                "the radiation itself {radiation}; {outcome}",
                flux=worded(_FLUX, flux),
                power=worded(_POWER, power),
                efficacy=worded(_EFFICACY, efficacy.value),
                radiation=worded(_LER, ler.value),
                outcome=outcome.words("lm/W"),
            ),
            outcome.deviation,
            "lm/W",
        )


def efficacy_above_maximum(evidence: LampEvidence) -> Iterator[Finding]:
    """Efficacy of units without a spectrum against the highest efficacy of any radiation."""
    highest = Reading(_MAXIMUM_LM_PER_W, Decimal(0))
    for unit in evidence.units:
        efficacy = _efficacy(evidence, unit)
        if efficacy is None or evidence.measured(unit, _LER) is not None:
            continue
        outcome = compared(efficacy, highest, tolerance("efficacy_above_ler"))
        severity = _above(outcome)
        if severity is not None:
            yield _ABOVE_MAXIMUM.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                severity,
                say(
                    "luminous efficacy {efficacy} (flux divided by power), highest of any "
                    "radiation {highest}; {outcome}",
                    efficacy=worded(_EFFICACY, efficacy.value),
                    highest=worded(_EFFICACY, highest.value),
                    outcome=outcome.words("lm/W"),
                ),
                outcome.deviation,
                "lm/W",
            )


def radiant_efficiency_above_one(evidence: LampEvidence) -> Iterator[Finding]:
    """Radiant flux against electrical power."""
    name = "radiant_efficiency"
    for unit in evidence.units:
        efficiency = evidence.measured(unit, name)
        if efficiency is None:
            continue
        outcome = compared(
            efficiency, Reading(Decimal(1), Decimal(0)), tolerance("efficacy_above_ler")
        )
        severity = _above(outcome)
        if severity is not None:
            yield _EFFICIENCY.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                severity,
                say(
                    "radiant flux divided by electrical power is {efficiency}, at most 1 is "
                    "possible; {outcome}",
                    efficiency=worded(name, efficiency.value),
                    outcome=outcome.words(""),
                ),
                outcome.deviation,
            )


def useful_flux_above_flux(evidence: LampEvidence) -> Iterator[Finding]:
    """Useful flux against the total flux it is part of."""
    name = "useful_luminous_flux_lm"
    for unit in evidence.units:
        useful, total = evidence.measured(unit, name), evidence.measured(unit, _FLUX)
        if useful is None or total is None:
            continue
        outcome = compared(useful, total, tolerance(name))
        if outcome.deviation > 0 and outcome.severity is not None:
            yield _USEFUL.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "useful luminous flux {useful}, total luminous flux {total}; {outcome}",
                    useful=worded(name, useful.value),
                    total=worded(_FLUX, total.value),
                    outcome=outcome.words("lm"),
                ),
                outcome.deviation,
                "lm",
            )


def peak_intensity_below_average(evidence: LampEvidence) -> Iterator[Finding]:
    """Peak intensity against flux over the full solid angle."""
    name = "peak_intensity_cd"
    sphere_sr = Decimal(repr(4 * math.pi))
    for unit in evidence.units:
        peak, flux = evidence.measured(unit, name), evidence.measured(unit, _FLUX)
        if peak is None or flux is None or not flux.value:
            continue
        mean = quotient(flux, Reading(sphere_sr, Decimal(0)))
        outcome = compared(mean, peak, tolerance(name))
        if outcome.deviation > 0 and outcome.severity is not None:
            yield _PEAK.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                Severity.IMPOSSIBLE,
                say(
                    "{flux} over 4π sr is {mean} on average, peak intensity {peak}; {outcome}",
                    flux=worded(_FLUX, flux.value),
                    mean=worded(name, mean.value),
                    peak=worded(name, peak.value),
                    outcome=outcome.words("cd"),
                ),
                outcome.deviation,
                "cd",
            )


def endurance_start_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Flux read at 0 h of the ageing test against the reported flux of the same unit."""
    units = {unit.unit_id: unit for unit in evidence.units}
    for row in evidence.endurance:
        unit = units.get(row.unit_id)
        if unit is None or row.hours_h != 0 or not row.luminous_flux_lm:
            continue
        reported = evidence.measured(unit, _FLUX)
        if reported is None:
            continue
        start = Reading(row.luminous_flux_lm, None, half_digit(row.luminous_flux_lm))
        outcome = compared(start, reported, tolerance(_FLUX))
        if outcome.severity is not None:
            yield _ENDURANCE.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "luminous flux {start} at 0 h of the ageing test, {other} measured "
                    "otherwise; {outcome}",
                    start=worded(_FLUX, start.value),
                    other=worded(_FLUX, reported.value),
                    outcome=outcome.words("lm"),
                ),
                outcome.deviation,
                "lm",
            )
