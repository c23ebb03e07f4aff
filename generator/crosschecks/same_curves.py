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


def _kind(check: str, word: str, reason: str) -> _Kind:
    title = f"The same {word} under"
    return _Kind(
        word,
        CheckText(
            f"{check}-same-between-units",
            f"{title} two units",
            "A column copied from one unit to another, or one measurement entered for both, would "
            "explain it; separate measurements differ by more than this.",
            (),
            NO_SOURCE,
        ),
        CheckText(
            f"{check}-same-within-bidder",
            f"{title} two lamps of the bidder",
            f"{reason}, or one measurement used for a family of models, would explain it.",
            (),
            NO_SOURCE,
        ),
        CheckText(
            f"{check}-same-between-bidders",
            f"{title} two bidders",
            f"{reason}, one maker's lamp and report offered by two bidders, or copied data, would "
            "explain it; separate measurements differ by more than this.",
            (),
            NO_SOURCE,
        ),
    )


_SPECTRUM = _kind("spectrum", "spectrum", "A common emitter type")
_LIGHT = _kind("light", "light record", "A common control gear")
_MAINS = _kind("mains", "mains current", "A common control gear")
_SPECTRUM_NEAR = CheckText(
    "spectrum-near-between-bidders",
    "Nearly the same spectrum under two bidders",
    "Emitters of one type in both lamps would explain it, which is common.",
    (),
    NO_SOURCE,
)


def _pair(
    table: CurveTable,
    lamps: dict[str, Lamp],
    place: int,
    others: list[int],
    nearest: Array,
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
    tail = f"; the same goes for {listed(rest)}" if rest else ""
    text = (
        f"and that of {named(other_lamp, other_unit)} ({lamps[other_lamp].bidder}) differ by "
        f"{_percent(percent)} % RMS after scaling, over {table.points}"
    )
    return unit, f"{text}{limit}{tail}", percent


def _percent(value: Decimal) -> str:
    return number(value.quantize(Decimal("0.0001")), 2)


def _limit(name: str) -> str:
    limit = tolerance(name)
    return f", taken as the same up to {limit.words} ({limit.reason})"


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
                f"{kind.word} of units {unit} and {other} differ by {_percent(percent)} % RMS "
                f"after scaling, over {table.points}{_limit(_SAME)}",
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
                limit = _limit(_SAME)
                unit, words, percent = _pair(table, lamps, place, others, nearest, limit)
                yield text.finding(lamp_id, unit, severity, f"{kind.word} {words}", percent, "%")
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
        limit = f", named up to {tolerance(_NEAR).words} ({tolerance(_NEAR).reason})"
        unit, words, percent = _pair(table, lamps, place, others, nearest, limit)
        yield _SPECTRUM_NEAR.finding(
            lamp_id, unit, Severity.REMARK, f"spectrum {words}", percent, "%"
        )


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
