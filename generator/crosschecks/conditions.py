"""Conditions of measurement: ambient, supply, stability, and uncertainties that cannot be."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

import numpy as np
from numpy.typing import NDArray

from generator.crosschecks.evidence import LampEvidence
from generator.crosschecks.significance import Reading
from generator.crosschecks.tolerances import NO_SOURCE, UNCONFIRMED, Tolerance, tolerance
from generator.crosschecks.wording import CheckText, listed, number, sourced, with_unit, worded
from generator.language import joined, say
from generator.quantities import quantity
from generator.records.figure import exact
from generator.records.finding import Finding, Severity
from generator.records.raw import LightRecord

__all__ = [
    "ambient_outside_tolerance",
    "light_not_stable",
    "supply_outside_tolerance",
    "uncertainty_of_zero",
]

_BLOCKS = 10
_S025 = sourced(
    "cie_s025",
    say("tolerance intervals of the test conditions ({status})", status=UNCONFIRMED),
)

_AMBIENT = CheckText(
    "ambient-outside-tolerance",
    say("Ambient temperature outside the tolerance of the measuring standard"),
    say(
        "A measurement without a controlled room, or one made for another ambient on purpose. LED "
        "lamps give less light when warmer; the results may have been corrected, which the report "
        "would say."
    ),
    ("ambient_temperature_c",),
    _S025,
)
_SUPPLY_TEXTS = {
    name: CheckText(
        f"{word}-outside-tolerance",
        title,
        say(
            "Measured on the public mains instead of a regulated source, at another rated value, "
            "or with the drop along the leads not compensated."
        ),
        (name,),
        _S025,
    )
    for name, word, title in (
        (
            "voltage_v",
            "voltage",
            say("Supply voltage outside the tolerance of the measuring standard"),
        ),
        (
            "frequency_hz",
            "frequency",
            say("Supply frequency outside the tolerance of the measuring standard"),
        ),
    )
}
_STABILITY = CheckText(
    "light-not-stable",
    say("Light still drifting during the long record"),
    say(
        "A record started before the lamp was warm, a supply that wandered, or a light level set "
        "by a sensor or control would explain it."
    ),
    ("pst_lm", "luminous_flux_lm"),
    sourced("cie_s025", say("stabilisation ({status})", status=UNCONFIRMED)),
)
_ZERO = CheckText(
    "uncertainty-of-zero",
    say("Expanded uncertainty given as zero"),
    say(
        "No measurement has none. A column filled with zeros in place of empty cells would explain "
        "it; the checks take the uncertainty as unknown."
    ),
    (),
    NO_SOURCE,
)


def _outside(
    place: tuple[str, str],
    text: CheckText,
    name: str,
    item: Reading,
    target: Decimal,
    limit: Tolerance,
) -> Iterator[Finding]:
    """A doubt outside the interval; a remark where the uncertainty reaches out of it."""
    unit = quantity(name).unit
    deviation = item.value - target
    excess = abs(deviation) - limit.allowance(target)
    expanded = item.expanded or Decimal(0)
    if excess + expanded <= 0:
        return
    words = say(
        "{quantity} {value}, set value {target}; difference {difference}, "
        "allowed ± {allowed} ({status})",
        quantity=quantity(name).label,
        value=worded(name, item.value),
        target=worded(name, target),
        difference=with_unit(number(deviation, 3, signed=True), unit),
        allowed=with_unit(number(limit.allowance(target), 3), unit),
        status=limit.status,
    )
    if excess <= 0:
        words = say(
            "{text}; inside, but not by the expanded uncertainty of {expanded}",
            text=words,
            expanded=with_unit(number(expanded), unit),
        )
    yield text.finding(
        *place,
        Severity.DOUBT if excess > 0 else Severity.REMARK,
        words,
        deviation,
        unit,
    )


def ambient_outside_tolerance(evidence: LampEvidence) -> Iterator[Finding]:
    """Ambient temperature against the interval of the measuring standard."""
    name = "ambient_temperature_c"
    for unit in evidence.units:
        item = evidence.measured(unit, name)
        if item is not None:
            place = (evidence.lamp.lamp_id, unit.unit_id)
            target = tolerance("ambient_set_c").value
            yield from _outside(place, _AMBIENT, name, item, target, tolerance(name))


def supply_outside_tolerance(evidence: LampEvidence) -> Iterator[Finding]:
    """Supply voltage and frequency of mains lamps against the nominal supply."""
    if evidence.lamp.mains is False:
        return
    nominal = {
        "voltage_v": evidence.supply_voltage_v,
        "frequency_hz": evidence.supply_frequency_hz,
    }
    for name, target in nominal.items():
        for unit in evidence.units:
            item = evidence.measured(unit, name)
            if item is not None and target is not None:
                place = (evidence.lamp.lamp_id, unit.unit_id)
                limit = tolerance(f"supply_{name}")
                yield from _outside(place, _SUPPLY_TEXTS[name], name, item, target, limit)


def _drift_percent(record: LightRecord) -> NDArray[np.float64]:
    """(highest − lowest) / lowest of the means of ten equal parts [percent] (units,)."""
    length = record.values.shape[1] // _BLOCKS
    parts = record.values[:, : length * _BLOCKS].reshape(-1, _BLOCKS, length).mean(axis=2)
    lowest = parts.min(axis=1)
    drift = np.full(lowest.shape, np.nan)
    np.divide(parts.max(axis=1) - lowest, lowest, out=drift, where=lowest > 0)
    return 100.0 * drift


def light_not_stable(evidence: LampEvidence) -> Iterator[Finding]:
    """Drift of the light over the long record against the stabilisation criterion."""
    limit = tolerance("stabilisation_percent")
    for record in evidence.light:
        duration_s = record.values.shape[1] / record.sampling_rate_hz
        if not record.long or duration_s < float(tolerance("stabilisation_record_s").value):
            continue
        for unit_id, drift in zip(record.unit_ids, _drift_percent(record).tolist(), strict=True):
            if drift > float(limit.value):
                yield _STABILITY.finding(
                    evidence.lamp.lamp_id,
                    unit_id,
                    Severity.DOUBT,
                    say(
                        "light over {duration:.0f} s, means of {parts} equal parts: highest less "
                        "lowest is {drift} % of the lowest, allowed {allowed} ({status}; {reason})",
                        duration=duration_s,
                        parts=_BLOCKS,
                        drift=number(exact(drift), 3),
                        allowed=limit.words,
                        status=limit.status,
                        reason=limit.reason,
                    ),
                    exact(drift),
                    "%",
                )


def _zero(name: str, reported: Decimal | None) -> str:
    """A column that says zero, beside the value it belongs to where there is one."""
    zero = joined(" = ", (f"u_{name}", with_unit("0", quantity(name).unit)))
    if reported is None:
        return zero
    return say("{zero} beside {value}", zero=zero, value=worded(name, reported))


def uncertainty_of_zero(evidence: LampEvidence) -> Iterator[Finding]:
    """Uncertainty columns that say zero."""
    for unit in evidence.units:
        names = [name for name, value in unit.expanded_uncertainty.items() if value == 0]
        if names:
            text = CheckText(
                _ZERO.check, _ZERO.title, _ZERO.explanation, tuple(names), _ZERO.source
            )
            values = [_zero(name, unit.reported.get(name)) for name in names]
            yield text.finding(evidence.lamp.lamp_id, unit.unit_id, Severity.DOUBT, listed(values))
