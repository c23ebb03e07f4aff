"""The same numbers under two names: units with identical values, units without any spread."""

from __future__ import annotations

from collections.abc import Iterator
from decimal import Decimal

from generator.crosschecks.evidence import LampEvidence
from generator.crosschecks.tolerances import NO_SOURCE, tolerance
from generator.crosschecks.wording import CheckText, listed, named, worded
from generator.language import joined, say, say_counted
from generator.quantities import quantity
from generator.records.campaign import Campaign
from generator.records.figure import MEAN
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp, Unit

__all__ = ["no_spread_between_units", "units_identical"]

_SET_POINTS = frozenset({"voltage_v", "frequency_hz", "ambient_temperature_c"})
"""Quantities that the laboratory sets; equal values of them say nothing."""

_DEPENDENT = {
    **dict.fromkeys(("power_factor", "displacement_factor", "thd_current_percent"), "current"),
    **dict.fromkeys(("x", "y", "cct_k", "duv"), "chromaticity"),
    **dict.fromkeys(("ra", "r9"), "rendering"),
    **dict.fromkeys(("percent_flicker", "flicker_index", "svm"), "modulation"),
}
"""Quantities that follow from one curve; those of one word count once."""

Values = frozenset[tuple[str, Decimal]]

_BETWEEN_UNITS = CheckText(
    "units-identical",
    say("Units with identical values"),
    say(
        "A row copied from one unit to another, or means entered in place of the values of each "
        "unit, would explain it; separate measurements differ in the last digits."
    ),
    (),
    NO_SOURCE,
)
_BETWEEN_LAMPS = CheckText(
    "units-identical-between-lamps",
    say("Identical values under another lamp of the bidder"),
    say(
        "Two names for one model, one report used for a family of models, or a row copied from one "
        "lamp to the other would explain it."
    ),
    (),
    NO_SOURCE,
)
_BETWEEN_BIDDERS = CheckText(
    "units-identical-between-bidders",
    say("Identical values under another bidder"),
    say(
        "One maker's lamp and report offered by two bidders, or copied data, would explain it; "
        "separate measurements differ in the last digits."
    ),
    (),
    NO_SOURCE,
)
_NO_SPREAD = CheckText(
    "units-without-spread",
    say("No spread between units in several quantities"),
    say(
        "One unit measured and its values entered for all, means or declared values entered in "
        "place of the values of each unit, or coarse rounding would explain it."
    ),
    (),
    NO_SOURCE,
)


def _values(unit: Unit) -> Values:
    return frozenset(item for item in unit.reported.items() if item[0] not in _SET_POINTS)


def _digits(value: Decimal) -> int:
    return len(value.as_tuple().digits)


def _telling(values: Values) -> bool:
    """Whether so many quantities and digits agree that chance does not explain it."""
    digits = sum(_digits(value) for _, value in values)
    return (
        len(values) >= tolerance("identical_quantities").value
        and digits >= tolerance("identical_digits").value
    )


def _with_quantities(text: CheckText, names: tuple[str, ...]) -> CheckText:
    return CheckText(text.check, text.title, text.explanation, names, text.source)


def _stated(name: str, value: Decimal) -> str:
    return joined(" ", (quantity(name).label, worded(name, value)))


def _sample(values: Values) -> str:
    pairs = sorted(values)
    return listed([_stated(name, value) for name, value in pairs])


def _identical(
    text: CheckText, lamp: Lamp, unit: Unit, others: list[str], severity: Severity
) -> Finding:
    values = _values(unit)
    names = tuple(sorted(name for name, _ in values))
    digits = sum(_digits(value) for _, value in values)
    return _with_quantities(text, names).finding(
        lamp.lamp_id,
        unit.unit_id,
        severity,
        say_counted(
            "the reported value ({digits}) is the same as that of {others}: {values}",
            "all {count} reported values ({digits}) are the same as those of {others}: {values}",
            len(values),
            digits=say_counted("{count} digit", "{count} digits", digits),
            others=listed(others),
            values=_sample(values),
        ),
        Decimal(0),
    )


def units_identical(campaign: Campaign) -> Iterator[Finding]:
    """Units, anywhere in the campaign, all of whose reported values are the same.

    Set points of the laboratory are left aside. A value counts as the same whatever zeros end
    it.

    Parameters
    ----------
    campaign
        The campaign.

    Yields
    ------
    Finding
        For each lamp concerned, one among its units, one against other lamps of the bidder and
        one against other bidders.
    """
    lamps = {lamp.lamp_id: lamp for lamp in campaign.lamps}
    groups: dict[Values, list[Unit]] = {}
    for unit in campaign.units:
        if unit.lamp_id in lamps:
            groups.setdefault(_values(unit), []).append(unit)
    for values, units in groups.items():
        if len(units) < 2 or not _telling(values):
            continue
        first = {unit.lamp_id: unit for unit in reversed(units)}
        for lamp_id in dict.fromkeys(unit.lamp_id for unit in units):
            yield from _identical_with(lamps, lamps[lamp_id], first[lamp_id], units)


def _identical_with(
    lamps: dict[str, Lamp], lamp: Lamp, unit: Unit, units: list[Unit]
) -> Iterator[Finding]:
    """Findings of one lamp in one group of identical units."""
    same_lamp: list[str] = []
    same_bidder: list[str] = []
    other_bidder: list[str] = []
    for other in units:
        place = named(other.lamp_id, other.unit_id)
        owner = lamps[other.lamp_id]
        if other.lamp_id == lamp.lamp_id:
            same_lamp += [] if other is unit else [say("unit {unit}", unit=other.unit_id)]
        elif owner.bidder == lamp.bidder:
            same_bidder.append(place)
        else:
            other_bidder.append(joined("", (place, f" ({owner.bidder})")))
    if other_bidder:
        yield _identical(_BETWEEN_BIDDERS, lamp, unit, other_bidder, Severity.CONTRADICTION)
    if same_lamp:
        yield _identical(_BETWEEN_UNITS, lamp, unit, same_lamp, Severity.DOUBT)
    if same_bidder:
        yield _identical(_BETWEEN_LAMPS, lamp, unit, same_bidder, Severity.REMARK)


def _without_spread(units: tuple[Unit, ...]) -> tuple[str, ...]:
    """Quantities that every unit reports with one and the same value of enough digits."""
    least = tolerance("digits_of_one_value").value
    first = units[0].reported
    return tuple(
        name
        for name, value in first.items()
        if name not in _SET_POINTS
        and _digits(value) >= least
        and all(unit.reported.get(name) == value for unit in units[1:])
    )


def no_spread_between_units(evidence: LampEvidence) -> Iterator[Finding]:
    """Several quantities without any spread over the units of a lamp, others having some.

    Quantities that follow from one curve count once: one shape of the current gives power
    factor, displacement factor and distortion together.
    """
    units = tuple(unit for unit in evidence.units if unit.reported)
    if len(units) < tolerance("least_units_for_doubt").value:
        return
    if len({_values(unit) for unit in units}) == 1:
        return
    names = _without_spread(units)
    independent = {_DEPENDENT.get(name, name) for name in names}
    if len(independent) < tolerance("identical_quantities").value:
        return
    values = [_stated(name, units[0].reported[name]) for name in names]
    yield _with_quantities(_NO_SPREAD, names).finding(
        evidence.lamp.lamp_id,
        MEAN,
        Severity.DOUBT,
        say(
            "the same value for all {units} units in {quantities} quantities, a spread of 0: "
            "{values}",
            units=len(units),
            quantities=len(names),
            values=listed(values),
        ),
        Decimal(0),
    )
