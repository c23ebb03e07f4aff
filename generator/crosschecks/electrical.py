"""Power, voltage, current and the factors between them, against one another."""

from __future__ import annotations

from collections.abc import Iterator

from generator.crosschecks.evidence import LampEvidence, computed_against_reported
from generator.crosschecks.significance import (
    Reading,
    compared,
    product,
    quotient,
    reading,
)
from generator.crosschecks.tolerances import tolerance
from generator.crosschecks.wording import CheckText, number, sourced, worded
from generator.language import Message, say
from generator.quantities import quantity
from generator.records.figure import MEAN, Grade
from generator.records.finding import Finding, Severity

__all__ = [
    "mains_against_report",
    "power_factor_above_displacement",
    "power_factor_against_displacement_and_distortion",
    "power_factor_against_ratio",
    "standby_above_on_power",
]

_PF = "power_factor"
_DF = "displacement_factor"
_THD = "thd_current_percent"


_RATIO = CheckText(
    "power-factor-against-power-voltage-current",
    say("Power factor is not power over voltage times current"),
    say(
        "A displacement factor written in the column of the power factor, a peak or average "
        "current in place of the RMS value, or values taken at different moments would explain it."
    ),
    (_PF, "power_w", "voltage_v", "current_a"),
    sourced("iec_60050_131", say("power factor")),
)
_DISTORTION = CheckText(
    "power-factor-against-displacement-and-distortion",
    say("Power factor, displacement factor and distortion do not fit"),
    say(
        "A distorted supply voltage, a distortion referred to the total current instead of the "
        "fundamental, or the two factors exchanged would explain it."
    ),
    (_PF, _DF, _THD),
    sourced("iec_60050_131", say("power factor with a sinusoidal voltage")),
)
_ABOVE_DISPLACEMENT = CheckText(
    "power-factor-above-displacement-factor",
    say("Power factor above the displacement factor"),
    say(
        "With a sinusoidal voltage the power factor is the displacement factor reduced by the "
        "distortion. The two columns exchanged, or a distorted supply voltage, would explain it."
    ),
    (_PF, _DF),
    sourced("iec_60050_131", say("power factor with a sinusoidal voltage")),
)
_MAINS_TEXTS = {
    name: CheckText(
        f"{word}-mains-against-report",
        say("Mains capture and report differ in {quantity}", quantity=quantity(name).label),
        say(
            "A capture of another unit or operating point, a probe factor not applied, a capture "
            "that is not a whole number of periods, or a time offset between its channels."
        ),
        (name,),
        sourced(quantity(name).source, say("definition")),
    )
    for name, word in (
        ("power_w", "power"),
        ("voltage_v", "voltage"),
        ("current_a", "current"),
        ("frequency_hz", "frequency"),
        (_PF, "power-factor"),
        (_DF, "displacement-factor"),
        (_THD, "thd"),
    )
}
_STANDBY = CheckText(
    "standby-above-on-power",
    say("Standby power not below the power in use"),
    say(
        "The columns exchanged, standby power written in milliwatts, or the power taken at a "
        "dimmed level would explain it."
    ),
    ("standby_power_w", "networked_standby_power_w", "power_w"),
    sourced("eu_2019_2020", say("definitions of standby and on-mode power")),
)
_FROM_CAPTURE = say("computed from the mains capture as {computed}")
_STANDBY_MEASURED = say(
    "measured {quantity} {standby}, measured power in use {power}; {difference} W above it"
)
_STANDBY_DECLARED = say(
    "declared {quantity} {standby}, declared power in use {power}; {difference} W above it"
)


def power_factor_against_ratio(evidence: LampEvidence) -> Iterator[Finding]:
    """Reported power factor against P / (U I) of the reported values."""
    for unit in evidence.units:
        power, voltage = evidence.reported(unit, "power_w"), evidence.reported(unit, "voltage_v")
        current, factor = evidence.reported(unit, "current_a"), evidence.reported(unit, _PF)
        if power is None or voltage is None or current is None or factor is None:
            continue
        ratio = quotient(power, product(voltage, current))
        outcome = compared(factor, ratio, tolerance(_PF))
        if outcome.severity is not None:
            yield _RATIO.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "power factor reported as {factor}, {power} / ({voltage} × {current}) is "
                    "{ratio}; {outcome}",
                    factor=worded(_PF, factor.value),
                    power=worded("power_w", power.value),
                    voltage=worded("voltage_v", voltage.value),
                    current=worded("current_a", current.value),
                    ratio=worded(_PF, ratio.value),
                    outcome=outcome.words(""),
                ),
                outcome.deviation,
            )


def _from_distortion(displacement: Reading, thd: Reading) -> Reading:
    """Power factor with a sinusoidal voltage: cos φ1 / sqrt(1 + THD²)."""
    ratio = thd.value / 100
    value = displacement.value / (1 + ratio * ratio).sqrt()
    slope = value * ratio / (1 + ratio * ratio) / 100
    parts = (displacement.expanded, thd.expanded)
    expanded = None
    if parts[0] is not None and parts[1] is not None:
        relative = parts[0] / displacement.value * value
        expanded = (relative * relative + (slope * parts[1]) ** 2).sqrt()
    rounding = displacement.rounding / displacement.value * value + slope * thd.rounding
    return Reading(value, expanded, abs(rounding))


def power_factor_against_displacement_and_distortion(evidence: LampEvidence) -> Iterator[Finding]:
    """Reported power factor against cos φ1 / sqrt(1 + THD²) of the reported values."""
    for unit in evidence.units:
        factor, displacement = evidence.reported(unit, _PF), evidence.reported(unit, _DF)
        thd = reading(evidence.figure(unit, _THD, Grade.REPORTED))
        if factor is None or displacement is None or thd is None:
            continue
        expected = _from_distortion(displacement, thd)
        outcome = compared(factor, expected, tolerance(_PF))
        if outcome.severity is not None:
            yield _DISTORTION.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "power factor reported as {factor}, displacement factor {displacement} and "
                    "current THD {distortion} give {expected}; {outcome}",
                    factor=worded(_PF, factor.value),
                    displacement=worded(_DF, displacement.value),
                    distortion=worded(_THD, thd.value),
                    expected=worded(_PF, expected.value),
                    outcome=outcome.words(""),
                ),
                outcome.deviation,
            )


def power_factor_above_displacement(evidence: LampEvidence) -> Iterator[Finding]:
    """Reported power factor against the displacement factor that bounds it, without a THD."""
    for unit in evidence.units:
        factor, displacement = evidence.reported(unit, _PF), evidence.reported(unit, _DF)
        thd = evidence.figure(unit, _THD, Grade.REPORTED)
        if factor is None or displacement is None or reading(thd) is not None:
            continue
        outcome = compared(factor, displacement, tolerance(_PF))
        if outcome.deviation > 0 and outcome.severity is not None:
            yield _ABOVE_DISPLACEMENT.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                outcome.severity,
                say(
                    "power factor reported as {factor}, displacement factor as {displacement}; "
                    "{outcome}",
                    factor=worded(_PF, factor.value),
                    displacement=worded(_DF, displacement.value),
                    outcome=outcome.words(""),
                ),
                outcome.deviation,
            )


def mains_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Electrical values of the mains captures against the reported ones."""
    for name, text in _MAINS_TEXTS.items():
        yield from computed_against_reported(evidence, text, name, _FROM_CAPTURE)


def _standby(
    lamp_id: str, unit_id: str, words: Message, name: str, standby: Reading, power: Reading
) -> Iterator[Finding]:
    if standby.value >= power.value > 0:
        deviation = standby.value - power.value
        yield _STANDBY.finding(
            lamp_id,
            unit_id,
            Severity.CONTRADICTION,
            words.format(
                quantity=quantity(name).label,
                standby=worded(name, standby.value),
                power=worded("power_w", power.value),
                difference=number(deviation, 3),
            ),
            deviation,
            "W",
        )


def standby_above_on_power(evidence: LampEvidence) -> Iterator[Finding]:
    """Standby and networked standby power against the power in use, measured and declared."""
    lamp = evidence.lamp
    for name in ("standby_power_w", "networked_standby_power_w"):
        for unit in evidence.units:
            standby, power = evidence.measured(unit, name), evidence.measured(unit, "power_w")
            if standby is not None and power is not None:
                place = (lamp.lamp_id, unit.unit_id)
                yield from _standby(*place, _STANDBY_MEASURED, name, standby, power)
        declared, use = lamp.declared.get(name), lamp.declared.get("power_w")
        if declared is not None and use is not None:
            yield from _standby(
                lamp.lamp_id, MEAN, _STANDBY_DECLARED, name, Reading(declared), Reading(use)
            )
