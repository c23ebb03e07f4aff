"""Light modulation: its values against one another, the record and the mains."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence, computed_against_reported
from generator.crosschecks.significance import half_digit, reading
from generator.crosschecks.tolerances import NO_SOURCE, tolerance
from generator.crosschecks.wording import CheckText, number, sourced, worded
from generator.language import say
from generator.quantities import quantity
from generator.records.figure import Grade
from generator.records.finding import Finding, Severity
from generator.records.lamp import Unit

__all__ = [
    "flicker_frequency_against_mains",
    "flicker_index_above_bound",
    "modulation_against_report",
]

_PERCENT_FLICKER = "percent_flicker"
_FREQUENCY = "flicker_frequency_hz"
_MAINS_HZ = (Decimal(50), Decimal(60))

_MODULATION_TEXTS = {
    name: CheckText(
        f"{name.replace('_', '-')}-light-against-report",
        title,
        say(
            "Another bandwidth, length or sampling rate of the record, an offset of the light "
            "sensor, a dimmer or another supply voltage, or another edition of the method."
        ),
        (name,),
        sourced(quantity(name).source, say("definition")),
    )
    for name, title in (
        (
            _PERCENT_FLICKER,
            say("Percent flicker (modulation depth) of the light record and of the report differ"),
        ),
        ("flicker_index", say("Flicker index of the light record and of the report differ")),
        (
            "svm",
            say("Stroboscopic visibility measure of the light record and of the report differ"),
        ),
        ("pst_lm", say("Short-term flicker of light of the light record and of the report differ")),
    )
}
_MAINS_MULTIPLE = CheckText(
    "flicker-frequency-against-mains",
    say("Light modulation is not at twice the mains frequency"),
    say(
        "Modulation above it comes from a dimmer or control gear that switches by itself; "
        "modulation at the mains frequency from half-waves that differ. Otherwise a record on "
        "another mains frequency or a time column in another unit would explain it."
    ),
    (_FREQUENCY, "frequency_hz"),
    NO_SOURCE,
)
_INDEX_BOUND = CheckText(
    "flicker-index-above-bound",
    say("Flicker index too high for the percent flicker"),
    say(
        "For a given percent flicker the flicker index is highest for light that switches between "
        "two levels. Values of two records, or one of the two in another unit, would explain it."
    ),
    ("flicker_index", _PERCENT_FLICKER),
    sourced("iec_60050_845", say("definitions of both; the bound follows from them")),
)
_FROM_RECORD = say("computed from the light record as {computed}")


def modulation_against_report(evidence: LampEvidence) -> Iterator[Finding]:
    """Modulation values of the light records against the reported ones."""
    for name, text in _MODULATION_TEXTS.items():
        yield from computed_against_reported(evidence, text, name, _FROM_RECORD)


def _mains_frequency(evidence: LampEvidence, unit: Unit) -> Decimal | None:
    measured = evidence.measured(unit, "frequency_hz")
    if measured is not None and measured.value > 0:
        return measured.value
    return evidence.supply_frequency_hz


def _frequency_severity(light_hz: Decimal, mains_hz: Decimal) -> Severity | None:
    """None at twice the mains; a contradiction at twice another mains; else by side."""
    limit = tolerance(_FREQUENCY)
    if abs(light_hz - 2 * mains_hz) <= limit.allowance(2 * mains_hz):
        return None
    if any(abs(light_hz - 2 * other) <= limit.allowance(2 * other) for other in _MAINS_HZ):
        return Severity.CONTRADICTION
    return Severity.REMARK if light_hz > 2 * mains_hz else Severity.DOUBT


def flicker_frequency_against_mains(evidence: LampEvidence) -> Iterator[Finding]:
    """Main frequency of the light modulation against twice the mains frequency."""
    if evidence.lamp.mains is False:
        return
    for unit in evidence.units:
        light = reading(evidence.figure(unit, _FREQUENCY, Grade.COMPUTED))
        depth = evidence.measured(unit, _PERCENT_FLICKER)
        mains_hz = _mains_frequency(evidence, unit)
        if light is None or mains_hz is None or depth is None:
            continue
        severity = _frequency_severity(light.value, mains_hz)
        if severity is None or depth.value < tolerance("least_modulation_percent").value:
            continue
        deviation = light.value - 2 * mains_hz
        yield _MAINS_MULTIPLE.finding(
            evidence.lamp.lamp_id,
            unit.unit_id,
            severity,
            say(
                "light modulation at {light} ({depth} percent flicker), twice the mains "
                "frequency of {mains} is {twice} Hz; difference {difference} Hz, allowed "
                "{allowed} ({reason})",
                light=worded(_FREQUENCY, light.value),
                depth=worded(_PERCENT_FLICKER, depth.value),
                mains=worded("frequency_hz", mains_hz),
                twice=number(2 * mains_hz),
                difference=number(deviation, 3, signed=True),
                allowed=tolerance(_FREQUENCY).words,
                reason=tolerance(_FREQUENCY).reason,
            ),
            deviation,
            "Hz",
        )


def _index_bound(percent: Decimal) -> Decimal:
    """Highest flicker index at a percent flicker: (1 − sqrt(1 − p²)) / p, p = percent / 100."""
    p = min(percent / 100, Decimal(1))
    return (1 - (1 - p * p).sqrt()) / p


def flicker_index_above_bound(evidence: LampEvidence) -> Iterator[Finding]:
    """Reported flicker index against the highest one the reported percent flicker allows."""
    for unit in evidence.units:
        index = evidence.reported(unit, "flicker_index")
        depth = evidence.reported(unit, _PERCENT_FLICKER)
        if index is None or depth is None or depth.value < 0:
            continue
        margin = (depth.expanded or Decimal(0)) + half_digit(depth.value)
        bound = _index_bound(depth.value + margin)
        lowest = index.value - (index.expanded or Decimal(0)) - index.rounding
        if lowest > bound:
            deviation = index.value - bound
            yield _INDEX_BOUND.finding(
                evidence.lamp.lamp_id,
                unit.unit_id,
                Severity.IMPOSSIBLE,
                say(
                    "flicker index reported as {index}, a percent flicker of {depth} allows "
                    "{bound} at most; {difference} above it",
                    index=worded("flicker_index", index.value),
                    depth=worded(_PERCENT_FLICKER, depth.value),
                    bound=number(bound, 3),
                    difference=number(deviation, 2),
                ),
                deviation,
            )
