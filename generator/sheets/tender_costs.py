"""Costs, light, energy and emissions of the bids of a lot in words and tables."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace
from decimal import Decimal

from generator.language import SEMICOLON, joined, say, say_as, say_counted, told
from generator.records.tender import BidResult, BreakEven, CostItem, LifeCycleCost, LotResult
from generator.records.tender_settings import Sensitivity
from generator.sheets.drawings.drawing import DataTable, Drawing, Palette
from generator.sheets.drawings.tornado import draw_tornado
from generator.sheets.tender_description import (
    Block,
    DrawingBlock,
    HeadingBlock,
    ListBlock,
    ParagraphBlock,
    TableBlock,
)
from generator.sheets.tender_text import NONE, amount, capital, number
from generator.sheets.tender_words import COST_ITEMS, EMISSION_BASES, MOVED_ASSUMPTIONS, PRICES

__all__ = ["cost_blocks", "energy_blocks", "item_table", "tornado_blocks"]

_EQUAL = say(
    "Mean luminous flux is that over the study. Lamps needed is the number that gives the light "
    "the lot asks for; a dash stands where it asks for none."
)
_TORNADO = say(
    "{bid}: of the assumptions moved one at a time, {first} changes the life-cycle cost most, from "
    "{low} to {high} {currency}."
)
_RANGE = say("{low} to {high}")
_SAVED = say("Against {lamp}, which the lot uses today.")
_FACTOR = say("{basis}: {factor} g/kWh, {region}, {year}. Source: {source}")
_LEAST_PAYBACK = Decimal("0.05")
"""A shorter payback would be printed as nought [years]."""


def cost_blocks(lot: LotResult, titles: Mapping[str, str], currency: str) -> Iterator[Block]:
    """Life-cycle cost by item, cost at equal light, break-even."""
    costed = [item for item in lot.bids if item.cost is not None]
    yield HeadingBlock(say("Life-cycle cost"), 3)
    withheld = [
        say("{bid}: {text}.", bid=item.shown_as, text=joined(SEMICOLON, item.withheld))
        for item in lot.bids
        if item.withheld
    ]
    studies = [item.cost for item in costed if item.cost is not None]
    if studies:
        yield ParagraphBlock(_study(studies[0], currency), "quiet")
        yield item_table(lot, titles, currency)
        yield ParagraphBlock(_EQUAL, "quiet")
        yield _light_table(costed, currency)
        if lot.baseline is not None:
            yield ParagraphBlock(_SAVED.format(lamp=titles[lot.baseline_lamp]), "quiet")
            yield _break_even_table(costed, currency)
    if withheld:
        yield ParagraphBlock(say("Not given"))
        yield ListBlock(tuple(withheld))
    if lot.notes:
        yield ListBlock(lot.notes)


def _study(cost: LifeCycleCost, currency: str) -> str:
    return say_counted(
        "Present value over {count} year, {prices}, in {currency}, for the number of lamps named "
        "in each row.",
        "Present value over {count} years, {prices}, in {currency}, for the number of lamps named "
        "in each row.",
        cost.years,
        prices=PRICES[cost.prices],
        currency=currency,
    )


def item_table(lot: LotResult, titles: Mapping[str, str], currency: str) -> TableBlock:
    """Present value by item of cost, one row per bid and one for the baseline lamp."""
    costs: list[tuple[str, LifeCycleCost]] = [
        (item.shown_as, item.cost) for item in lot.bids if item.cost is not None
    ]
    if lot.baseline is not None:
        name = say("{lamp} (in use today)", lamp=titles[lot.baseline_lamp])
        costs.append((name, lot.baseline))
    used = [item for item in CostItem if any(item in cost.by_item for _, cost in costs)]
    rows = tuple(_cost_row(name, cost, used) for name, cost in costs)
    headings = (say("Bid"), say("Lamps"), *(COST_ITEMS[item] for item in used), say("Total"))
    caption = say("Life-cycle cost by item, present value in {currency}", currency=currency)
    return TableBlock(caption, headings, rows)


def _cost_row(name: str, cost: LifeCycleCost, used: Sequence[CostItem]) -> tuple[str, ...]:
    items = cost.by_item
    return (
        name,
        str(cost.lamps),
        *(amount(items.get(item)) for item in used),
        amount(cost.total),
    )


def _light_table(costed: Sequence[BidResult], currency: str) -> TableBlock:
    rows = []
    for item in costed:
        light = item.equal_light
        if light is None:
            rows.append((item.shown_as, NONE, NONE, NONE, NONE, NONE))
            continue
        rows.append(
            (
                item.shown_as,
                number(light.flux_lm, 0),
                number(light.flux_lm * light.maintained_share, 0),
                number(light.million_lumen_hours, 1),
                number(light.cost_per_million_lumen_hours, 3),
                NONE if light.lamps_needed is None else str(light.lamps_needed),
            )
        )
    headings = (
        say("Bid"),
        say("Initial flux, lm"),
        say("Mean flux, lm"),
        say("Light, Mlm h"),
        say("{currency} per Mlm h", currency=currency),
        say("Lamps needed"),
    )
    return TableBlock(say("Cost at equal light"), headings, tuple(rows))


def _break_even_table(costed: Sequence[BidResult], currency: str) -> TableBlock:
    rows = []
    for item in costed:
        if (even := item.break_even) is not None:
            year = say("never") if even.year is None else str(even.year)
            rows.append((item.shown_as, amount(even.saving), year, _payback(even)))
    headings = (
        say("Bid"),
        say("Saving, {currency}", currency=currency),
        say("Break-even, end of year"),
        say("Simple payback, years"),
    )
    caption = say("Saving against the lamp in use today, present value")
    return TableBlock(caption, headings, tuple(rows))


def _payback(even: BreakEven) -> str:
    years = even.simple_payback_years
    if years is None:
        return say("at once") if even.year == 0 else NONE
    return f"< {number(Decimal('0.1'), 1)}" if abs(years) < _LEAST_PAYBACK else number(years, 1)


def tornado_blocks(
    lot: LotResult, moved: Sensitivity, currency: str, colours: Palette
) -> Iterator[Block]:
    """Sensitivity: a drawing for the bid that stands first, a table for every bid."""
    bids = [(item, item.cost) for item in lot.bids if item.sensitivity and item.cost is not None]
    if not bids:
        return
    yield HeadingBlock(say("Sensitivity"), 3)
    yield DrawingBlock(_tornado(*bids[0], currency, colours))
    spans = {
        "tariff": moved.tariff_percent,
        "hours per year": moved.hours_percent,
        "discount rate": moved.discount_rate_percent,
        "life": moved.life_percent,
    }
    rows = tuple((item.shown_as, *_ranges(item, tuple(spans))) for item, _ in bids)
    moves = (
        say("{assumption} ± {span} %", assumption=MOVED_ASSUMPTIONS[name], span=span)
        for name, span in spans.items()
    )
    headings = (say("Bid"), *moves)
    caption = say(
        "Life-cycle cost with one assumption moved down and up, {currency}", currency=currency
    )
    yield TableBlock(caption, headings, rows)


def _ranges(item: BidResult, names: Sequence[str]) -> Iterator[str]:
    """Cost at the lower and at the higher value of each assumption."""
    bars = {bar.assumption: bar for bar in item.sensitivity}
    for name in names:
        bar = bars[name]
        yield (
            say_as("cost", "unchanged")
            if bar.swing == 0
            else _RANGE.format(low=amount(bar.low_cost), high=amount(bar.high_cost))
        )


def _tornado(item: BidResult, cost: LifeCycleCost, currency: str, colours: Palette) -> Drawing:
    bars = tuple(
        replace(bar, assumption=told(MOVED_ASSUMPTIONS[bar.assumption])) for bar in item.sensitivity
    )
    widest = bars[0]
    ends = sorted((widest.low_cost, widest.high_cost))
    says = _TORNADO.format(
        bid=item.shown_as,
        first=widest.assumption,
        low=amount(ends[0]),
        high=amount(ends[1]),
        currency=currency,
    )
    rows = tuple((bar.assumption, amount(bar.low_cost), amount(bar.high_cost)) for bar in bars)
    table = DataTable(
        (say("assumption"), say("cost at the lower"), say("cost at the higher")), rows
    )
    return Drawing(
        "tornado",
        say("Sensitivity of the cost"),
        says,
        draw_tornado(bars, float(cost.total), currency, told(says), colours),
        table,
    )


def energy_blocks(lot: LotResult, titles: Mapping[str, str]) -> Iterator[Block]:
    """Energy of a year, its saving, and emissions on each basis."""
    known = [(item.shown_as, item.energy) for item in lot.bids if item.energy is not None]
    if not known:
        return
    yield HeadingBlock(say("Energy and emissions of a year"), 3)
    first = known[0][1]
    rows = []
    for name, use in known:
        cells = [name, str(use.lamps), number(use.in_use_kwh, 0)]
        cells += [number(use.standby_kwh, 0), number(use.saving_kwh, 0)]
        for emission in use.emissions:
            cells += [number(emission.tonnes, 2), number(emission.saving_tonnes, 2)]
        rows.append(tuple(cells))
    headings: list[str] = [
        say("Bid"),
        say("Lamps"),
        say("In use, kWh"),
        say("Standby, kWh"),
        say("Saved, kWh"),
    ]
    for emission in first.emissions:
        basis = EMISSION_BASES[emission.basis]
        headings += [say("{basis}, t CO\u2082e", basis=basis), say("saved, t CO\u2082e")]
    yield TableBlock(_energy_caption(lot, titles), tuple(headings), tuple(rows))
    factors = tuple(
        _FACTOR.format(
            basis=capital(EMISSION_BASES[emission.basis]),
            factor=emission.factor.g_per_kwh,
            region=emission.factor.region,
            year=emission.factor.year or say("year not stated"),
            source=emission.factor.source,
        )
        for emission in first.emissions
    )
    yield ListBlock((*factors, *first.notes))


def _energy_caption(lot: LotResult, titles: Mapping[str, str]) -> str:
    if not lot.baseline_lamp:
        return say("Energy and emissions of a year")
    return say(
        "Energy and emissions of a year; saved against {lamp}", lamp=titles[lot.baseline_lamp]
    )
