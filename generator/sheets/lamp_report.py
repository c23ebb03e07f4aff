"""Two things that acts and standards ask for in writing: report items, product information."""

from __future__ import annotations

import dataclasses
from collections.abc import Iterable
from decimal import Decimal

from generator.language import joined
from generator.records.assessment import Assessment
from generator.records.figure import FigureSet
from generator.records.lamp import Lamp
from generator.records.product_field import ProductField
from generator.records.report import ReportItem, missing_items, report_items
from generator.sheets.description import Pair
from generator.sheets.lamp_description import ProductTable, ProductText, ReportText
from generator.sheets.number_format import declared_text
from generator.sheets.shown_names import ShownNames

__all__ = ["product_table", "report_text"]

_CLOSING = frozenset({"items_only", "reproduction", "signatory", "opinions", "amendments"})
_PRINTED = "pages"  # the margin of every page says it


def report_text(assessment: Assessment, lamp: Lamp, names: ShownNames) -> ReportText:
    """Write the items of the test report as far as they concern one lamp.

    Parameters
    ----------
    assessment
        Campaign, figures and verdicts.
    lamp
        The lamp.
    names
        How lamps and bidders are called.
    """
    narrowed = _of_lamp(assessment, lamp, names)
    items = report_items(narrowed, narrowed.campaign.settings.report)
    shown = [item for item in items if item.key != _PRINTED]
    return ReportText(
        opening=_pairs(item for item in shown if item.key not in _CLOSING),
        closing=_pairs(item for item in shown if item.key in _CLOSING),
        signatory=next((item.text or "" for item in items if item.key == "signatory"), ""),
        missing=tuple(item.label for item in missing_items(items)),
    )


def _of_lamp(assessment: Assessment, lamp: Lamp, names: ShownNames) -> Assessment:
    """The assessment as if the campaign held one lamp alone, under the name it is shown by."""
    called = dataclasses.replace(lamp, bidder=names.bidder(lamp), model=names.lamp(lamp))
    return dataclasses.replace(
        assessment,
        campaign=dataclasses.replace(assessment.campaign, lamps=(called,)),
        figures=FigureSet(item for item in assessment.figures if item.lamp_id == lamp.lamp_id),
        verdicts=assessment.verdicts_of(lamp.lamp_id),
    )


def _pairs(items: Iterable[ReportItem]) -> tuple[Pair, ...]:
    return tuple(Pair(item.label, item.text) for item in items if item.text)


def product_table(
    fields: Iterable[ProductField], lamp: Lamp, names: ShownNames
) -> ProductTable | None:
    """Write the product information of one lamp; ``None`` where the act is not in force.

    Parameters
    ----------
    fields
        The fields in the order of the act.
    lamp
        The lamp.
    names
        How lamps and bidders are called.
    """
    rows = tuple(_product(field, lamp, names) for field in fields)
    reasons: dict[str, list[str]] = {}
    for row in rows:
        if not row.text:
            reasons.setdefault(row.reason, []).append(row.name)
    missing = tuple(Pair(reason, joined(", ", listed)) for reason, listed in reasons.items())
    return ProductTable(rows, missing) if rows else None


def _product(field: ProductField, lamp: Lamp, names: ShownNames) -> ProductText:
    text = field.text
    if names.hidden(lamp.lamp_id):
        called = {lamp.bidder: names.bidder(lamp), lamp.model: names.lamp(lamp)}
        text = called.get(text, text) if text else ""
    return ProductText(
        name=field.name,
        text=text,
        unit=field.unit if text else "",
        declared=_declared(field.declared),
        rounding=field.rounding,
        reason=field.reason,
        warning=field.warning,
    )


def _declared(declared: Decimal | str | None) -> str:
    return declared_text(declared) if isinstance(declared, Decimal) else declared or ""
