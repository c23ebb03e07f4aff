"""The same curve under two names: spectra, light records and mains captures."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from decimal import Decimal

import numpy as np
from numpy.typing import NDArray

from generator.crosschecks.curves import (
    CurveTable,
    closest,
    light_tables,
    mains_tables,
    nearest_units,
    spectrum_table,
)
from generator.crosschecks.tolerances import NO_SOURCE, tolerance
from generator.crosschecks.wording import CheckText, listed, named, number
from generator.language import Numeral, say
from generator.records.campaign import Campaign
from generator.records.figure import exact
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp

__all__ = ["same_light", "same_mains", "same_spectra"]

Array = NDArray[np.float64]

_SAME = "same_curve_percent"
_NEAR = "near_curve_percent"


@dataclass(frozen=True, slots=True)
class _Kind:
    """Texts of one kind of curve."""

    word: str
    units: CheckText
    family: CheckText
    bidders: CheckText


_COPIED = say(
    "A column copied from one unit to another, or one measurement entered for both, would explain "
    "it; separate measurements differ by more than this."
)
_COMMON_EMITTER = (
    say("A common emitter type, or one measurement used for a family of models, would explain it."),
    say(
        "A common emitter type, one maker's lamp and report offered by two bidders, or copied "
        "data, would explain it; separate measurements differ by more than this."
    ),
)
_COMMON_GEAR = (
    say("A common control gear, or one measurement used for a family of models, would explain it."),
    say(
        "A common control gear, one maker's lamp and report offered by two bidders, or copied "
        "data, would explain it; separate measurements differ by more than this."
    ),
)


def _kind(check: str, word: str, titles: tuple[str, str, str], reasons: tuple[str, str]) -> _Kind:
    """Texts of one kind of curve, each relation in turn: units, lamps of a bidder, bidders."""
    units, family, bidders = titles
    return _Kind(
        word,
        CheckText(f"{check}-same-between-units", units, _COPIED, (), NO_SOURCE),
        CheckText(f"{check}-same-within-bidder", family, reasons[0], (), NO_SOURCE),
        CheckText(f"{check}-same-between-bidders", bidders, reasons[1], (), NO_SOURCE),
    )


_SPECTRUM = _kind(
    "spectrum",
    say("spectrum"),
    (
        say("The same spectrum under two units"),
        say("The same spectrum under two lamps of the bidder"),
        say("The same spectrum under two bidders"),
    ),
    _COMMON_EMITTER,
)
_LIGHT = _kind(
    "light",
    say("light record"),
    (
        say("The same light record under two units"),
        say("The same light record under two lamps of the bidder"),
        say("The same light record under two bidders"),
    ),
    _COMMON_GEAR,
)
_MAINS = _kind(
    "mains",
    say("mains current"),
    (
        say("The same mains current under two units"),
        say("The same mains current under two lamps of the bidder"),
        say("The same mains current under two bidders"),
    ),
    _COMMON_GEAR,
)
_SPECTRUM_NEAR = CheckText(
    "spectrum-near-between-bidders",
    say("Nearly the same spectrum under two bidders"),
    say("Emitters of one type in both lamps would explain it, which is common."),
    (),
    NO_SOURCE,
)


def _pair(
    table: CurveTable,
    lamps: dict[str, Lamp],
    place: int,
    others: list[int],
    nearest: Array,
    kind: _Kind,
    limit: str,
) -> tuple[str, str, Decimal]:
    """Unit, text and difference [percent] of the nearest other lamp, the rest by name."""
    closest_other = min(others, key=lambda other: float(nearest[place, other]))
    unit, other_unit, distance = nearest_units(table, place, closest_other)
    other_lamp = table.lamp_ids[closest_other]
    percent = exact(100.0 * distance)
    rest = [
        f"{table.lamp_ids[other]} ({lamps[table.lamp_ids[other]].bidder})"
        for other in others
        if other != closest_other
    ]
    text = say(
        "{curve} and that of {other} ({bidder}) differ by {percent} % RMS after scaling, over "
        "{points}, {limit}",
        curve=kind.word,
        other=named(other_lamp, other_unit),
        bidder=lamps[other_lamp].bidder,
        percent=_percent(percent),
        points=table.points,
        limit=limit,
    )
    if rest:
        text = say("{text}; the same goes for {lamps}", text=text, lamps=listed(rest))
    return unit, text, percent


def _percent(value: Decimal) -> Numeral:
    return number(value.quantize(Decimal("0.0001")), 2)


def _same_limit() -> str:
    limit = tolerance(_SAME)
    return say("taken as the same up to {limit} ({reason})", limit=limit.words, reason=limit.reason)


def _near_limit() -> str:
    limit = tolerance(_NEAR)
    return say("named up to {limit} ({reason})", limit=limit.words, reason=limit.reason)


def _of_table(table: CurveTable, lamps: dict[str, Lamp], kind: _Kind) -> Iterator[Finding]:
    same = float(tolerance(_SAME).value) / 100.0
    nearest = closest(table)
    for place, lamp_id in enumerate(table.lamp_ids):
        alike = np.flatnonzero(nearest[place] <= same).tolist()
        if place in alike:
            unit, other, distance = nearest_units(table, place, place)
            percent = exact(100.0 * distance)
            yield kind.units.finding(
                lamp_id,
                unit,
                Severity.DOUBT,
                say(
                    "{curve} of units {unit} and {other} differ by {percent} % RMS after "
                    "scaling, over {points}, {limit}",
                    curve=kind.word,
                    unit=unit,
                    other=other,
                    percent=_percent(percent),
                    points=table.points,
                    limit=_same_limit(),
                ),
                percent,
                "%",
            )
        bidder = lamps[lamp_id].bidder
        for own, text, severity in (
            (False, kind.bidders, Severity.CONTRADICTION),
            (True, kind.family, Severity.REMARK),
        ):
            others = [
                other
                for other in alike
                if other != place and (lamps[table.lamp_ids[other]].bidder == bidder) is own
            ]
            if others:
                unit, words, percent = _pair(
                    table, lamps, place, others, nearest, kind, _same_limit()
                )
                yield text.finding(lamp_id, unit, severity, words, percent, "%")
        if kind is _SPECTRUM:
            yield from _near(table, lamps, place, nearest)


def _near(
    table: CurveTable, lamps: dict[str, Lamp], place: int, nearest: Array
) -> Iterator[Finding]:
    """Spectra of other bidders that are near without being the same."""
    low, high = (float(tolerance(name).value) / 100.0 for name in (_SAME, _NEAR))
    lamp_id = table.lamp_ids[place]
    others = [
        other
        for other in np.flatnonzero((nearest[place] > low) & (nearest[place] <= high)).tolist()
        if lamps[table.lamp_ids[other]].bidder != lamps[lamp_id].bidder and other != place
    ]
    if others:
        unit, words, percent = _pair(table, lamps, place, others, nearest, _SPECTRUM, _near_limit())
        yield _SPECTRUM_NEAR.finding(lamp_id, unit, Severity.REMARK, words, percent, "%")


def same_spectra(campaign: Campaign) -> Iterator[Finding]:
    """Spectra that are one curve after scaling: of two units, two lamps, two bidders.

    Parameters
    ----------
    campaign
        The campaign.

    Yields
    ------
    Finding
        At most one of each relation per lamp.
    """
    table = spectrum_table(campaign)
    if table is not None:
        yield from _of_table(table, {lamp.lamp_id: lamp for lamp in campaign.lamps}, _SPECTRUM)


def same_light(campaign: Campaign) -> Iterator[Finding]:
    """Light records that are one after scaling, sample by sample; as :func:`same_spectra`."""
    lamps = {lamp.lamp_id: lamp for lamp in campaign.lamps}
    for table in light_tables(campaign):
        yield from _of_table(table, lamps, _LIGHT)


def same_mains(campaign: Campaign) -> Iterator[Finding]:
    """Mains currents that are one after scaling, sample by sample; as :func:`same_spectra`."""
    lamps = {lamp.lamp_id: lamp for lamp in campaign.lamps}
    for table in mains_tables(campaign):
        yield from _of_table(table, lamps, _MAINS)
