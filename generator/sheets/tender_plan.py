"""The relamping plan in words and tables: by room, by year, quantities per lamp."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from generator.language import joined, say, say_as
from generator.records.tender import RelampingPlan
from generator.sheets.tender_description import Block, HeadingBlock, ListBlock, TableBlock
from generator.sheets.tender_text import NONE, amount, number

__all__ = ["plan_blocks"]


def plan_blocks(
    plan: RelampingPlan, names: Mapping[str, str], titles: Mapping[str, str], currency: str
) -> Iterator[Block]:
    """The relamping plan.

    Parameters
    ----------
    plan
        The plan.
    names
        lamp_id -> how the bid is shown.
    titles
        Id of a lamp in use today -> how it is called.
    currency
        Currency of all money.
    """
    yield HeadingBlock(say("Relamping plan"), 2, "plan")
    rows = tuple(
        (
            room.title or room.room,
            str(room.relamp_year),
            joined(" × ", (str(room.points), titles.get(room.existing_lamp, room.existing_lamp))),
            f"{room.quantity} × {names[room.new_lamp]}" if room.new_lamp else room.reason,
            number(room.existing_kwh, 0),
            number(room.new_kwh, 0),
            amount(room.spend),
        )
        for room in plan.rooms
    )
    headings = (
        say("Room"),
        say("Year"),
        say_as("lamp", "Today"),
        say_as("lamp", "New"),
        say("Today, kWh a year"),
        say("New, kWh a year"),
        say("Spend, {currency}", currency=currency),
    )
    yield TableBlock(say("By room"), headings, rows, (0, 2, 3))
    years = tuple(
        (
            str(year.year),
            str(year.quantity),
            amount(year.spend),
            number(year.saved_kwh, 0),
            amount(year.saved_money),
            amount(year.cumulative_net),
        )
        for year in plan.years
    )
    year_headings = (
        say("Year"),
        say("Lamps"),
        say("Spend, {currency}", currency=currency),
        say("Saved, kWh"),
        say("Saved, {currency}", currency=currency),
        say("Saved less spent so far, {currency}", currency=currency),
    )
    yield TableBlock(say("By year, undiscounted"), year_headings, years)
    quantities = tuple((names[lamp], str(count)) for lamp, count in plan.quantities.items())
    yield TableBlock(
        say("Lamps to order"),
        (say("Lamp"), say_as("number", "Quantity")),
        quantities or ((NONE, "0"),),
    )
    yield ListBlock(plan.notes)
