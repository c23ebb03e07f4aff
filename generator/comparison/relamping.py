"""The relamping plan: rooms and the winning lamps, year by year."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from decimal import ROUND_CEILING, Decimal

from generator.comparison.cost.basis import (
    ACTIVE_POWER,
    STANDBY_POWER,
    LampBasis,
    lamps_for_light,
    use_numbers,
)
from generator.comparison.cost.formula import HOURS_OF_A_YEAR, maintained_share
from generator.comparison.energy import yearly_energy_kwh
from generator.language import say
from generator.records.tender import RelampingPlan, RelampingYear, RoomPlan
from generator.records.tender_settings import Room, TenderLot, TenderUse

__all__ = ["Winner", "relamping_plan"]

_NOTES = (
    say("Undiscounted; lamps are bought and fitted at the start of the year given for the room."),
    say("Energy is saved from that year on; the price of each year is that of the cost study."),
    say("Spend holds purchase, fitting and replacements at the end of life of the new lamps."),
    say("Replacements that the existing lamps would have needed are not counted as saved."),
)
_PROVISIONAL_LOT = say(
    "The first place of lot {lot} is provisional: no lamp of it may be ordered before the open "
    "questions are answered."
)
_PROVISIONAL = say(
    "The first place of the lot is provisional: no lamp of it may be ordered before the open "
    "questions are answered."
)


@dataclass(frozen=True, slots=True)
class Winner:
    """The lot of a room, the lamp that won it (``None`` without a single one), and why not.

    ``provisional`` says that questions to the winner are open.
    """

    lot: TenderLot
    basis: LampBasis | None
    reason: str = ""
    provisional: bool = False


def relamping_plan(
    rooms: Sequence[Room],
    winners: Mapping[str, Winner],
    existing: Mapping[str, LampBasis],
    use: TenderUse,
) -> RelampingPlan:
    """Plan the exchange of lamps.

    Parameters
    ----------
    rooms
        The schedule.
    winners
        Lot id -> its winner.
    existing
        Lamp id -> the lamps that burn today.
    use
        ``[use]`` without gaps; the hours are those of each room.

    Returns
    -------
    RelampingPlan
        Rooms in the order of the schedule, one row per year of the study, quantities per lamp.
    """
    planned = tuple(
        _room(room, winners[room.lot], existing[room.existing_lamp], use) for room in rooms
    )
    quantities: dict[str, int] = {}
    for item in planned:
        if item.new_lamp:
            quantities[item.new_lamp] = quantities.get(item.new_lamp, 0) + item.quantity
    renewals = {
        room.id: _renewals(room, item, winners[room.lot].basis, use)
        for room, item in zip(rooms, planned, strict=True)
    }
    return RelampingPlan(
        planned,
        tuple(_years(planned, renewals, use)),
        dict(sorted(quantities.items())),
        (*_NOTES, *_provisional(planned, winners)),
    )


def _provisional(planned: Sequence[RoomPlan], winners: Mapping[str, Winner]) -> Iterator[str]:
    for lot in sorted({item.lot for item in planned if item.new_lamp}):
        if winners[lot].provisional:
            yield (_PROVISIONAL_LOT.format(lot=lot) if lot else _PROVISIONAL)


def _room(room: Room, winner: Winner, before: LampBasis, use: TenderUse) -> RoomPlan:
    own = use.model_copy(update={"hours_per_year": room.hours_per_year})
    plan = RoomPlan(
        room=room.id,
        title=room.title,
        lot=room.lot,
        relamp_year=room.relamp_year,
        points=room.points,
        existing_lamp=room.existing_lamp,
        existing_kwh=_kwh(before, own, room.points),
    )
    after = winner.basis
    if plan.existing_kwh is None:
        return replace(plan, reason=say("the power of the existing lamp is not known"))
    if after is None or after.numbers is None:
        return replace(plan, reason=winner.reason or say("the costs of the winner are not known"))
    quantity = _quantity(room, winner.lot, after, use)
    if quantity is None:
        return replace(plan, reason=say("the luminous flux of the winner is not known"))
    return replace(
        plan,
        new_lamp=after.lamp_id,
        quantity=quantity,
        new_kwh=_kwh(after, own, quantity),
        spend=quantity * (after.numbers.price + use.installation_cost_per_lamp),
    )


def _kwh(basis: LampBasis, use: TenderUse, lamps: int) -> Decimal | None:
    """Energy of a year; a lamp of which only the powers are known counts too, else ``None``."""
    if basis.numbers is not None:
        return sum(yearly_energy_kwh(basis, use, lamps), Decimal(0))
    known = {item.name: item.value for item in basis.assumptions}
    if ACTIVE_POWER not in known:
        return None
    hours = use.hours_per_year or Decimal(0)
    off = max(HOURS_OF_A_YEAR - hours, Decimal(0)) * use.standby_share_percent / 100
    watt_hours = known[ACTIVE_POWER] * hours + known.get(STANDBY_POWER, Decimal(0)) * off
    return lamps * watt_hours / 1000


def _quantity(room: Room, lot: TenderLot, after: LampBasis, use: TenderUse) -> int | None:
    if lot.compare_at == "quantity" or lot.flux_per_point_lm is None:
        return room.points
    if after.flux_lm is None or after.numbers is None:
        return None
    share = maintained_share(after.numbers.life_h, room.hours_per_year, use.years or 1)
    return int(lamps_for_light(lot.flux_per_point_lm * room.points, after.flux_lm * share))


def _renewals(
    room: Room, plan: RoomPlan, after: LampBasis | None, use: TenderUse
) -> dict[int, Decimal]:
    """Year -> spend on replacements at the end of life of the new lamps."""
    spent: dict[int, Decimal] = {}
    if after is None or after.numbers is None or not plan.new_lamp:
        return spent
    life, years = after.numbers.life_h, (use.years or 0) - (room.relamp_year - 1)
    burnt = life
    each = plan.quantity * (after.numbers.price + use.replacement_labour_per_lamp)
    while burnt < years * room.hours_per_year:
        moment = burnt / room.hours_per_year
        year = room.relamp_year - 1 + int(moment.to_integral_value(ROUND_CEILING))
        spent[year] = spent.get(year, Decimal(0)) + each
        burnt += life
    return spent


def _years(
    rooms: Sequence[RoomPlan], renewals: Mapping[str, Mapping[int, Decimal]], use: TenderUse
) -> list[RelampingYear]:
    done = [item for item in rooms if item.new_lamp]
    net = Decimal(0)
    rows = []
    for year, tariff in enumerate(use_numbers(use).tariffs, start=1):
        now = [item for item in done if item.relamp_year == year]
        spend = sum((item.spend or Decimal(0) for item in now), Decimal(0))
        spend += sum((renewals[item.room].get(year, Decimal(0)) for item in done), Decimal(0))
        saved = sum(
            (
                (item.existing_kwh or Decimal(0)) - (item.new_kwh or Decimal(0))
                for item in done
                if item.relamp_year <= year
            ),
            Decimal(0),
        )
        net += saved * tariff - spend
        quantity = sum(item.quantity for item in now)
        rows.append(RelampingYear(year, quantity, spend, saved, saved * tariff, net))
    return rows
