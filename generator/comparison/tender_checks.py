"""Checks across the inputs of a tender, every problem named by file and key."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from generator.errors import Problem
from generator.quantities import QUANTITIES, suggestion
from generator.records.lamp import Lamp
from generator.records.tender import Bid
from generator.records.tender_settings import (
    COST_CRITERIA,
    TenderLot,
    TenderSettings,
    TenderTable,
)

__all__ = ["tender_problems"]

_SETTINGS = "campaign.toml"
_LAMPS = "lamps.csv"
_CLASS = "energy_efficiency_class"


def tender_problems(
    lamps: Sequence[Lamp],
    bids: Sequence[Bid],
    settings: TenderSettings,
    clauses: Mapping[str, str] | None = None,
) -> tuple[Problem, ...]:
    """Find what is wrong with a tender beyond a single file.

    Weights, single prices and the baseline lamp were checked when the files were read.

    Parameters
    ----------
    lamps, bids
        Lamps and the lots they are offered for.
    settings
        The tables of ``campaign.toml``; single values were checked when they were read.
    clauses
        Id -> regime of all clauses that are judged, so that a mistyped mandatory clause or
        regime is found; ``None`` to leave that out.

    Returns
    -------
    tuple of Problem
        Errors, settings first, then lamps by row.
    """
    return (
        *_award(settings),
        *_lots(settings, clauses),
        *_references(lamps, settings),
        *_bids(lamps, bids, settings),
    )


def _setting(key: str, found: str, expected: str, message: str) -> Problem:
    return Problem("error", _SETTINGS, None, key, found, expected, message)


def _offer(lamp: Lamp, column: str, found: str, expected: str, message: str) -> Problem:
    return Problem("error", _LAMPS, lamp.row, column, found, expected, message)


def _award(settings: TenderSettings) -> Iterator[Problem]:
    seen = set()
    for number, item in enumerate(settings.award.criteria, start=1):
        key = f"award.criteria.{number}.quantity"
        if item.quantity in seen:
            text = "Two criteria are about one quantity."
            yield _setting(key, item.quantity, "each quantity once", text)
        seen.add(item.quantity)
        known = item.quantity in QUANTITIES or item.quantity in COST_CRITERIA
        if not known:
            near = suggestion(item.quantity) or "a quantity, life_cycle_cost or price"
            yield _setting(key, item.quantity, near, f"No criterion is called {item.quantity}.")
        elif item.quantity == _CLASS:
            text = "A class has no number that could be scored."
            yield _setting(key, item.quantity, "total_mains_efficacy_lm_per_w", text)
        elif item.quantity in COST_CRITERIA and item.better == "higher":
            text = "A higher cost is not better."
            yield _setting(f"award.criteria.{number}.better", "higher", "lower", text)


def _lots(settings: TenderSettings, clauses: Mapping[str, str] | None) -> Iterator[Problem]:
    seen: set[str] = set()
    for number, lot in enumerate(settings.lot, start=1):
        if lot.id.casefold() in seen:
            yield _setting(f"lot.{number}.id", lot.id, "another id", "Two lots have this id.")
        seen.add(lot.id.casefold())
    if clauses is None:
        return
    regimes = {name.casefold() for name in clauses.values()}
    tables: list[tuple[str, TenderTable | TenderLot]] = [("tender", settings.tender)]
    tables += [(f"lot.{number}", lot) for number, lot in enumerate(settings.lot, start=1)]
    for table, wanted in tables:
        for clause in wanted.mandatory_clauses:
            if clause not in clauses:
                text = f"No clause of this campaign is called {clause}."
                yield _setting(f"{table}.mandatory_clauses", clause, "a clause it judges", text)
        for regime in wanted.mandatory_regimes:
            if regime.casefold() not in regimes:
                text = f"No clause of {regime} is judged in this campaign."
                known = ", ".join(sorted(set(clauses.values())))
                yield _setting(f"{table}.mandatory_regimes", regime, f"one of {known}", text)


def _references(lamps: Sequence[Lamp], settings: TenderSettings) -> Iterator[Problem]:
    offered = {lamp.lamp_id for lamp in lamps}
    existing = [item.id for item in settings.existing_lamp]
    for number, lamp_id in enumerate(existing, start=1):
        if lamp_id in offered or lamp_id in existing[: number - 1]:
            text = "Two lamps have this id."
            yield _setting(f"existing_lamp.{number}.id", lamp_id, "another id", text)
    expected = "a lamp_id of lamps.csv or the id of an existing_lamp"
    for number, lot in enumerate(settings.lot, start=1):
        if lot.baseline_lamp is not None and lot.baseline_lamp not in offered | set(existing):
            text = f"There is no lamp {lot.baseline_lamp}."
            yield _setting(f"lot.{number}.baseline_lamp", lot.baseline_lamp, expected, text)
    lots = {lot.id for lot in settings.lot} or {""}
    years = settings.use.years
    for number, room in enumerate(settings.room, start=1):
        if years is not None and room.relamp_year > years:
            text = "The room is relamped after the end of the study."
            key = f"room.{number}.relamp_year"
            yield _setting(key, str(room.relamp_year), f"1 to {years}", text)
        if room.lot not in lots:
            text = f"There is no lot {room.lot or 'without a name'}."
            yield _setting(f"room.{number}.lot", room.lot, _lot_words(settings), text)
        if room.existing_lamp not in offered | set(existing):
            text = f"There is no lamp {room.existing_lamp}."
            yield _setting(f"room.{number}.existing_lamp", room.existing_lamp, expected, text)


def _lot_words(settings: TenderSettings) -> str:
    names = ", ".join(lot.id for lot in settings.lot)
    return f"one of {names}" if names else "no lot, as the tender has none"


def _bids(
    lamps: Sequence[Lamp], bids: Sequence[Bid], settings: TenderSettings
) -> Iterator[Problem]:
    rows = {lamp.lamp_id: lamp for lamp in lamps}
    lots = {lot.id for lot in settings.lot} or {""}
    given: dict[str, Bid] = {}
    for bid in bids:
        if bid.lamp_id in given:
            text = f"The lamp {bid.lamp_id} is offered twice."
            yield Problem("error", _LAMPS, None, "lamp_id", bid.lamp_id, "one bid a lamp", text)
        given[bid.lamp_id] = bid
    for lamp_id in given:
        if lamp_id not in rows:
            text = f"lamps.csv has no lamp {lamp_id}."
            yield Problem("error", _LAMPS, None, "lamp_id", lamp_id, "a lamp_id", text)
    for lamp in lamps:
        lot = given.get(lamp.lamp_id, Bid(lamp.lamp_id)).lot
        if lamp.lamp_id not in settings.baseline_lamps and lot not in lots:
            text = f"There is no lot {lot}." if lot else "The lamp is offered for no lot."
            yield _offer(lamp, "lot", lot, _lot_words(settings), text)
