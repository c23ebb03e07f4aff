"""``lamps.csv``: the lamps as the suppliers declare them, and what they ask for them."""

from __future__ import annotations

import re
from datetime import date
from decimal import Decimal

from generator.intake.columns import (
    DECLARED_COLUMNS,
    LAMP_COLUMNS,
    LAMP_TEXTS,
    SPANS,
    check_heading,
    check_span,
)
from generator.intake.lettering import UncoveredCharacters, note_uncovered
from generator.intake.register import Register
from generator.intake.tables.cells import CellReader
from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.text_table import read_text_table
from generator.language import say
from generator.records.lamp import Lamp, Offer

__all__ = ["read_lamps"]

_CURRENCY = re.compile(r"[A-Z]{3}")
_FIRST_LAMPS = date(1990, 1, 1)  # before white LED lamps; common knowledge, no source
_CLASSES = frozenset("ABCDEFG")
_LACKING = {"bidder": say("The lamp has no bidder."), "model": say("The lamp has no model.")}


def read_lamps(
    text: str,
    register: Register,
    problems: ProblemList,
    uncovered: UncoveredCharacters | None = None,
) -> tuple[Lamp, ...]:
    """Read the lamps and enter them in the register.

    Parameters
    ----------
    text
        Content of ``lamps.csv``.
    register
        Where to enter the lamps.
    problems
        Where to note what is wrong.
    uncovered
        Gives the characters of a text that the sheets cannot print.

    Returns
    -------
    tuple of Lamp
        The lamps that could be read, in file order.
    """
    table = read_text_table(text, problems)
    register.lamps_whole = table is not None and table.whole
    if table is None or not check_heading(table.heading, LAMP_COLUMNS, ["lamp_id"], problems):
        register.lamps_whole = False
        return ()
    cells = CellReader(table.heading.separator, problems)
    lamps = []
    for row, record in table.rows:
        if register.enter_lamp(record["lamp_id"], row, problems):
            lamps.append(_lamp(record, row, cells))
    if not table.rows and table.whole:
        register.lamps_whole = False
        problems.error("The file has no lamp.", found="a heading alone", expected="a row per lamp")
    _check_currencies(table.rows, problems)
    if uncovered is not None:
        for row, record in table.rows:
            for column in LAMP_TEXTS:
                note_uncovered(record.get(column, ""), uncovered, problems, row=row, column=column)
    return tuple(lamps)


def _lamp(record: dict[str, str], row: int, cells: CellReader) -> Lamp:
    def answer(column: str) -> bool | None:
        return cells.yes_no(record.get(column, ""), row, column)

    for column, text in _LACKING.items():
        if record.get(column) == "":
            cells.problems.warning(text, row=row, column=column, found="an empty cell")
    directional = answer("directional")
    return Lamp(
        lamp_id=record["lamp_id"],
        bidder=record.get("bidder", ""),
        model=record.get("model", ""),
        cap=record.get("cap", ""),
        technology=record.get("technology", ""),
        directional=directional,
        mains=answer("mains"),
        connected=answer("connected"),
        colour_tuneable=answer("colour_tuneable"),
        high_luminance=answer("high_luminance"),
        anti_glare_shield=answer("anti_glare_shield"),
        dimmable=answer("dimmable"),
        reflector=record.get("reflector", ""),
        claimed_exemptions=tuple(record.get("claimed_exemptions", "").split()),
        lot=record.get("lot", ""),
        placed_on_market=_day(record, "placed_on_market", row, cells),
        declared=_declared(record, row, cells, directional=bool(directional)),
        declared_energy_class=_energy_class(record, row, cells.problems),
        offer=_offer(record, row, cells),
        row=row,
    )


def _declared(
    record: dict[str, str], row: int, cells: CellReader, *, directional: bool
) -> dict[str, Decimal]:
    declared = {}
    for column, quantity in DECLARED_COLUMNS.items():
        number = cells.number(record.get(column, ""), row, column)
        if number is None or not check_span(number, SPANS[quantity], row, column, cells.problems):
            continue
        useful = directional and quantity == "luminous_flux_lm"
        declared["useful_luminous_flux_lm" if useful else quantity] = number
    return declared


def _offer(record: dict[str, str], row: int, cells: CellReader) -> Offer:
    price = cells.number(record.get("unit_price", ""), row, "unit_price")
    if price is not None:
        check_span(price, SPANS["unit_price"], row, "unit_price", cells.problems)
    currency = record.get("currency") or None
    if currency is None and price is not None:
        cells.problems.warning(
            say("The price has no currency."),
            row=row,
            column="currency",
            expected="a code such as EUR",
        )
    if currency is not None and not _CURRENCY.fullmatch(currency):
        cells.problems.error(
            "A currency is written as its code of three letters.",
            row=row,
            column="currency",
            found=currency,
            expected="a code such as EUR (ISO 4217)",
        )
        currency = None
    return Offer(
        unit_price=price,
        currency=currency,
        quantity=cells.count(record.get("quantity", ""), row, "quantity"),
        report_no=record.get("report_no") or None,
        report_date=_day(record, "report_date", row, cells),
        report_model=record.get("report_model", ""),
        report_laboratory=record.get("report_laboratory", ""),
        report_accreditation=record.get("report_accreditation", ""),
    )


def _day(record: dict[str, str], column: str, row: int, cells: CellReader) -> date | None:
    day = cells.iso_date(record.get(column, ""), row, column)
    if day is not None and not _FIRST_LAMPS <= day < date(2100, 1, 1):
        cells.problems.warning(
            say("{column} is far from any date of an LED lamp.", column=column),
            row=row,
            column=column,
            found=day.isoformat(),
            expected="a date from 1990 to 2099",
        )
    return day


def _energy_class(record: dict[str, str], row: int, problems: ProblemList) -> str | None:
    letter = record.get("declared_energy_class") or None
    if letter is None or letter in _CLASSES:
        return letter
    problems.error(
        "That is no energy efficiency class.",
        row=row,
        column="declared_energy_class",
        found=letter,
        expected="one letter from A to G",
    )
    return None


def _check_currencies(rows: tuple[tuple[int, dict[str, str]], ...], problems: ProblemList) -> None:
    first: tuple[int, str] | None = None
    for row, record in rows:
        currency = record.get("currency", "")
        if not _CURRENCY.fullmatch(currency):
            continue
        if first is None:
            first = (row, currency)
        elif currency != first[1]:
            problems.error(
                f"Prices in {first[1]} (row {first[0]}) and {currency} cannot be compared.",
                row=row,
                column="currency",
                found=currency,
                expected=f"{first[1]}, one currency in the whole campaign",
            )
