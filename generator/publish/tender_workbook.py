"""The workbook of a tender: assumptions once, then cost and score of every bid as live formulas."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from decimal import Decimal

from generator.publish.workbook_score import write_scores
from generator.publish.workbook_sheet import SheetWriter, column_letter, packed
from generator.records.tender import BidResult, CostItem, LotResult, Tender, money
from generator.records.tender_settings import TenderLot, TenderSettings, TenderUse

__all__ = ["tender_workbook"]

_README = {
    "follows": "Every number on the sheets of the lots follows from the sheet Assumptions and from "
    "the inputs at the head of each column. Change an input and costs, scores and ranks follow.",
    "gate": "A bid that is not admissible has costs here, and neither score nor rank.",
    "totals": "Totals are those of the tender report. The row below each total holds the number "
    "that the report prints, and the difference from it.",
    "prices": "Prices and rates are {prices}; money is in {currency}.",
}
_HOURS_OF_A_YEAR = 8760
_NOT_KNOWN = "not known"
_INPUTS = {
    "unit price": "Unit price",
    "active power": "Active power, W",
    "standby power": "Standby power, W",
    "projected or declared life": "Life, h",
    "survival factor": "Survival factor",
}
"""Name of an assumption of the cost study -> heading of its row."""

_USE_ROWS = (
    ("hours_per_year", "Hours in use of a year, h"),
    ("standby_share_percent", "Share of the other hours at standby, %"),
    ("tariff_per_kwh", "Price of energy today, money/kWh"),
    ("price_rise_percent", "Rise of the price of energy, % a year"),
    ("discount_rate_percent", "Discount rate, % a year"),
    ("years", "Length of the study, years"),
    ("installation_cost_per_lamp", "Installation, money per lamp"),
    ("replacement_labour_per_lamp", "Labour of a replacement, money per lamp"),
    ("maintenance_cost_per_lamp_year", "Maintenance, money per lamp and year"),
    ("end_of_life_cost_per_lamp", "End of life, money per lamp"),
    ("survival_stated_at_h", "Survival factor stated at, h"),
    ("carbon_price_per_t", "Price of emissions, money/t"),
)


@dataclass(frozen=True, slots=True)
class _Assumed:
    """Places of the assumptions: key -> cell, and the columns of the years."""

    cells: Mapping[str, str]
    tariffs: str
    factors: str

    def __getitem__(self, key: str) -> str:
        return self.cells[key]


def tender_workbook(tender: Tender, settings: TenderSettings, day: date) -> bytes:
    """Write the workbook.

    Parameters
    ----------
    tender
        The bids compared.
    settings
        Tables of ``campaign.toml`` that they were compared under.
    day
        Date of the assessment, which the file bears.

    Returns
    -------
    bytes
        A workbook with formulas for cost and score; the same bytes for the same tender.
    """
    from openpyxl import Workbook

    book = Workbook()
    del book["Sheet"]
    use = settings.use
    intro = SheetWriter(book.create_sheet("Read me"))
    for words in _README.values():
        intro.next_row(words.format(prices=use.prices, currency=use.currency or "no currency"))
    intro.widths(110, 12, 1)
    costed = any(item.cost is not None for lot in tender.lots for item in lot.bids)
    assumed = _write_assumptions(SheetWriter(book.create_sheet("Assumptions")), use, costed=costed)
    lots = {lot.id: lot for lot in settings.lot}
    for place, lot in enumerate(tender.lots, start=1):
        sheet = SheetWriter(book.create_sheet(f"Lot {place}"))
        _write_lot(sheet, lot, lots.get(lot.lot), settings, assumed)
    book.calculation.fullCalcOnLoad = True
    return packed(book, day)


def _write_assumptions(sheet: SheetWriter, use: TenderUse, *, costed: bool) -> _Assumed:
    sheet.next_row("Assumption", bold=True)
    sheet.text(2, "Value", bold=True)
    cells: dict[str, str] = {}
    for key, words in _USE_ROWS:
        value = getattr(use, key)
        if value is not None:
            row = sheet.next_row(words)
            sheet.number(2, value)
            cells[key] = f"Assumptions!$B${row}"
    factor = use.location_based
    if use.carbon_price_per_t is not None and factor is not None:
        row = sheet.next_row("Location-based factor, g/kWh")
        sheet.number(2, factor.g_per_kwh)
        cells["g_per_kwh"] = f"Assumptions!$B${row}"
    sheet.widths(44, 16, 3)
    if not costed:
        return _Assumed(cells, "", "")
    sheet.next_row()
    sheet.next_row("Year", bold=True)
    sheet.text(2, "Price of energy, money/kWh", bold=True)
    sheet.text(3, "Discount factor", bold=True)
    first = sheet.row + 1
    for year in range(1, (use.years or 0) + 1):
        row = sheet.next_row()
        sheet.number(1, year)
        _write_tariff(sheet, use, cells, year)
        sheet.formula(3, f"1/(1+{cells['discount_rate_percent']}/100)^A{row}", "0.000000")
    last = sheet.row
    return _Assumed(cells, f"Assumptions!$B${first}:$B${last}", f"Assumptions!$C${first}:$C${last}")


def _write_tariff(sheet: SheetWriter, use: TenderUse, cells: Mapping[str, str], year: int) -> None:
    if use.tariff_path_per_kwh is not None:
        sheet.number(2, use.tariff_path_per_kwh[year - 1], "0.0000")
        return
    rise = cells.get("price_rise_percent")
    growth = f"*(1+{rise}/100)^A{sheet.row}" if rise else ""
    sheet.formula(2, f"{cells['tariff_per_kwh']}{growth}", "0.0000")


def _write_lot(
    sheet: SheetWriter,
    lot: LotResult,
    asked: TenderLot | None,
    settings: TenderSettings,
    assumed: _Assumed,
) -> None:
    sheet.next_row(f"Lot {lot.lot}: {lot.title}" if lot.lot else "The lot", bold=True)
    columns = {item.bid.lamp_id: place for place, item in enumerate(lot.bids, start=2)}
    for item in lot.bids:
        sheet.text(columns[item.bid.lamp_id], item.shown_as, bold=True)
    sheet.next_row("Outcome at the gate")
    for column, item in enumerate(lot.bids, start=2):
        sheet.text(column, item.eligibility.outcome.value)
    rows = _write_inputs(sheet, lot.bids)
    rows["lamps"] = _write_lamps(sheet, lot, asked, rows, assumed)
    rows["price"] = _write_price(sheet, lot.bids, rows)
    rows["life_cycle_cost"] = _write_costs(sheet, lot.bids, rows, assumed)
    write_scores(sheet, lot, settings.award, rows)
    sheet.widths(40, 20, len(lot.bids) + 1)


def _known(item: BidResult) -> dict[str, Decimal]:
    if item.cost is None:
        return {}
    return {part.name: part.value for part in item.cost.assumptions}


def _write_inputs(sheet: SheetWriter, bids: Sequence[BidResult]) -> dict[str, int]:
    rows: dict[str, int] = {}
    for name, heading in _INPUTS.items():
        rows[name] = sheet.next_row(heading)
        for column, item in enumerate(bids, start=2):
            value = _known(item).get(name)
            if value is None:
                sheet.text(column, _NOT_KNOWN)
            else:
                sheet.number(column, value)
    rows["flux"] = sheet.next_row("Initial luminous flux, lm")
    for column, item in enumerate(bids, start=2):
        if item.equal_light is None:
            sheet.text(column, _NOT_KNOWN)
        else:
            sheet.number(column, item.equal_light.flux_lm)
    return rows


def _write_lamps(
    sheet: SheetWriter,
    lot: LotResult,
    asked: TenderLot | None,
    rows: Mapping[str, int],
    assumed: _Assumed,
) -> int:
    """Number of lamps: as asked, or for the light asked for."""
    if asked is None or asked.compare_at == "quantity" or asked.flux_per_point_lm is None:
        row = sheet.next_row("Lamps")
        for column, item in enumerate(lot.bids, start=2):
            if item.cost is not None:
                sheet.number(column, item.cost.lamps)
        return row
    points = sheet.next_row("Light points")
    sheet.number(2, lot.quantity)
    light = sheet.next_row("Light of each point, mean over the study, lm")
    sheet.number(2, asked.flux_per_point_lm)
    lives = sheet.next_row("Lives in the study")
    share = sheet.next_row("Mean flux as a share of the initial flux")
    row = sheet.next_row("Lamps, for equal light")
    for column, item in enumerate(lot.bids, start=2):
        if item.cost is None:
            continue
        at = column_letter(column)
        sheet.row = lives
        hours, years = assumed["hours_per_year"], assumed["years"]
        life = f"{at}{rows['projected or declared life']}"
        sheet.formula(column, f"{hours}*{years}/{life}", "0.0000")
        sheet.row = share
        x = f"{at}{lives}"
        decayed = f"(INT({x})*0.3+1-0.7^({x}-INT({x})))/(-LN(0.7))/{x}"
        sheet.formula(column, decayed, "0.0000")
        sheet.row = row
        mean = f"({at}{rows['flux']}*{at}{share})"
        sheet.formula(column, f"ROUNDUP($B${points}*$B${light}/{mean},0)", "0")
    sheet.row = row
    return row


def _write_price(sheet: SheetWriter, bids: Sequence[BidResult], rows: Mapping[str, int]) -> int:
    row = sheet.next_row("Price of all lamps")
    for column, item in enumerate(bids, start=2):
        at = column_letter(column)
        if item.cost is not None:
            sheet.formula(column, f"{at}{rows['unit price']}*{at}{rows['lamps']}")
        elif item.price is not None:
            sheet.number(column, item.price, "#,##0.00")
    return row


def _write_costs(
    sheet: SheetWriter, bids: Sequence[BidResult], rows: dict[str, int], assumed: _Assumed
) -> int:
    """Energy, then present value per item, total, and what the report prints."""
    helpers = {
        "in use": sheet.next_row("Energy in use of a year, kWh"),
        "standby": sheet.next_row("Energy at standby of a year, kWh"),
        "renewals": sheet.next_row("Renewals at the end of life"),
        "failing": sheet.next_row("Share failing early in a year"),
    }
    items = {item: sheet.next_row(f"{item.value.capitalize()}, present value") for item in CostItem}
    total = sheet.next_row("Life-cycle cost", bold=True)
    printed = sheet.next_row("As printed in the report")
    differs = sheet.next_row("Difference")
    for column, item in enumerate(bids, start=2):
        if item.cost is None:
            continue
        at = column_letter(column)
        cells = {name: f"{at}{row}" for name, row in (*rows.items(), *helpers.items())}
        for name, (formula, form) in _helper_formulas(cells, assumed).items():
            sheet.row = helpers[name]
            sheet.formula(column, formula, form)
        for cost_item, formula in _item_formulas(cells, assumed).items():
            sheet.row = items[cost_item]
            sheet.formula(column, formula)
        sheet.row = total
        sheet.formula(column, f"SUM({at}{min(items.values())}:{at}{max(items.values())})")
        sheet.row = printed
        sheet.number(column, money(item.cost.total), "#,##0.00")
        sheet.row = differs
        sheet.formula(column, f"ROUND({at}{total},2)-{at}{printed}")
    sheet.row = differs
    return total


def _helper_formulas(cells: Mapping[str, str], assumed: _Assumed) -> Mapping[str, tuple[str, str]]:
    hours, years = assumed["hours_per_year"], assumed["years"]
    off = f"MAX({_HOURS_OF_A_YEAR}-{hours},0)*{assumed['standby_share_percent']}/100"
    failing = "0"
    if "survival_stated_at_h" in assumed.cells:
        share = f"{cells['survival factor']}^({hours}/{assumed['survival_stated_at_h']})"
        failing = f"1-{share}"
    lamps = cells["lamps"]
    return {
        "in use": (f"{lamps}*{cells['active power']}*{hours}/1000", "#,##0.0"),
        "standby": (f"{lamps}*{cells['standby power']}*{off}/1000", "#,##0.0"),
        "renewals": (f"ROUNDUP({hours}*{years}/{cells['projected or declared life']},0)-1", "0"),
        "failing": (failing, "0.0000"),
    }


def _item_formulas(cells: Mapping[str, str], assumed: _Assumed) -> Mapping[CostItem, str]:
    lamps, price = cells["lamps"], cells["unit price"]
    renewed = f"{lamps}*({price}+{assumed['replacement_labour_per_lamp']})"
    rate = f"(1+{assumed['discount_rate_percent']}/100)"
    life = f"{cells['projected or declared life']}/{assumed['hours_per_year']}"
    step, count = f"{rate}^(-{life})", cells["renewals"]
    series = f"IF({rate}=1,{count},{step}*(1-{step}^{count})/(1-{step}))"
    factors = f"SUM({assumed.factors})"
    carbon = "0"
    if "g_per_kwh" in assumed.cells:
        per_kwh = f"{assumed['carbon_price_per_t']}*{assumed['g_per_kwh']}/1000000"
        carbon = f"({cells['in use']}+{cells['standby']})*{per_kwh}*{factors}"
    paid = f"SUMPRODUCT({assumed.tariffs},{assumed.factors})"
    return {
        CostItem.PURCHASE: f"{lamps}*{price}",
        CostItem.INSTALLATION: f"{lamps}*{assumed['installation_cost_per_lamp']}",
        CostItem.ENERGY: f"{cells['in use']}*{paid}",
        CostItem.STANDBY: f"{cells['standby']}*{paid}",
        CostItem.REPLACEMENT: f"{renewed}*{series}",
        CostItem.FAILURES: f"{cells['failing']}*{renewed}*{factors}",
        CostItem.MAINTENANCE: f"{lamps}*{assumed['maintenance_cost_per_lamp_year']}*{factors}",
        CostItem.CARBON: carbon,
        CostItem.END_OF_LIFE: f"{lamps}*{assumed['end_of_life_cost_per_lamp']}"
        f"/{rate}^{assumed['years']}",
    }
