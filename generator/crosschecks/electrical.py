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
from generator.crosschecks.wording import CheckText, number, worded
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
    "Power factor is not power over voltage times current",
    "A displacement factor written in the column of the power factor, a peak or average current "
    "in place of the RMS value, or values taken at different moments would explain it.",
    (_PF, "power_w", "voltage_v", "current_a"),
    "iec_60050_131, power factor",
)
_DISTORTION = CheckText(
    "power-factor-against-displacement-and-distortion",
    "Power factor, displacement factor and distortion do not fit",
    "A distorted supply voltage, a distortion referred to the total current instead of the "
    "fundamental, or the two factors exchanged would explain it.",
    (_PF, _DF, _THD),
    "iec_60050_131, power factor with a sinusoidal voltage",
)
_ABOVE_DISPLACEMENT = CheckText(
    "power-factor-above-displacement-factor",
    "Power factor above the displacement factor",
    "With a sinusoidal voltage the power factor is the displacement factor reduced by the "
    "distortion. The two columns exchanged, or a distorted supply voltage, would explain it.",
    (_PF, _DF),
    "iec_60050_131, power factor with a sinusoidal voltage",
)
_MAINS_TEXTS = {
    name: CheckText(
        f"{word}-mains-against-report",
        f"Mains capture and report differ in {quantity(name).label}",
        "A capture of another unit or operating point, a probe factor not applied, a capture that "
        "is not a whole number of periods, or a time offset between its channels.",
        (name,),
        f"{quantity(name).source}, definition",
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
    "Standby power not below the power in use",
    "The columns exchanged, standby power written in milliwatts, or the power taken at a dimmed "
    "level would explain it.",
    ("standby_power_w", "networked_standby_power_w", "power_w"),
    "eu_2019_2020, definitions of standby and on-mode power",
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
                f"power factor reported as {worded(_PF, factor.value)}, "
                f"{worded('power_w', power.value)} / ({worded('voltage_v', voltage.value)} × "
                f"{worded('current_a', current.value)}) is {worded(_PF, ratio.value)}; "
                f"{outcome.words('')}",
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
                f"power factor reported as {worded(_PF, factor.value)}, displacement factor "
                f"{worded(_DF, displacement.value)} and current THD {worded(_THD, thd.value)} "
                f"give {worded(_PF, expected.value)}; {outcome.words('')}",
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
                f"power factor reported as {worded(_PF, factor.value)}, displacement factor as "
                f"{worded(_DF, displacement.value)}; {outcome.words('')}",
                outcome.deviation,
            )


def mains_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Electrical values of the mains captures against the reported ones."""
    for name, text in _MAINS_TEXTS.items():
        yield from computed_against_reported(evidence, text, name, "the mains capture")


def _standby(
    lamp_id: str, unit_id: str, grade: str, name: str, standby: Reading, power: Reading
) -> Iterator[Finding]:
    if standby.value >= power.value > 0:
        deviation = standby.value - power.value
        yield _STANDBY.finding(
            lamp_id,
            unit_id,
            Severity.CONTRADICTION,
            f"{grade} {quantity(name).label} {worded(name, standby.value)}, {grade} power in use "
            f"{worded('power_w', power.value)}; {number(deviation, 3)} W above it",
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
                yield from _standby(lamp.lamp_id, unit.unit_id, "measured", name, standby, power)
        declared, use = lamp.declared.get(name), lamp.declared.get("power_w")
        if declared is not None and use is not None:
            yield from _standby(
                lamp.lamp_id, MEAN, "declared", name, Reading(declared), Reading(use)
            )
