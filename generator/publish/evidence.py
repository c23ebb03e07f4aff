"""The data files of an issue: figures, verdicts, results, product information, schemas."""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Iterable, Mapping, Sequence
from decimal import Decimal
from importlib.resources import files
from pathlib import Path
from typing import Any

from generator.publish.manifest import MANIFEST_SCHEMA, manifest_schema
from generator.quantities import quantity
from generator.records.assessment import Assessment
from generator.records.figure import Figure
from generator.records.finding import Finding
from generator.records.product_field import ProductField
from generator.records.verdict import Verdict

__all__ = [
    "FIGURE_COLUMNS",
    "PRODUCT_COLUMNS",
    "VERDICT_COLUMNS",
    "figures_csv",
    "plain",
    "product_information_csv",
    "results_json",
    "verdicts_csv",
    "write_data",
]

FIGURE_COLUMNS = (
    "lamp_id",
    "unit_id",
    "quantity",
    "value",
    "unit",
    "expanded_uncertainty",
    "grade",
    "method",
    "spread",
    "units_count",
    "reason",
)
VERDICT_COLUMNS = (
    "lamp_id",
    "clause",
    "quantity",
    "basis",
    "value",
    "unit",
    "expanded_uncertainty",
    "limit",
    "comparison",
    "margin",
    "verdict",
    "source",
    "status",
    "probability",
    "rule",
    "note",
)
PRODUCT_COLUMNS = (
    "lamp_id",
    "field",
    "text",
    "unit",
    "declared",
    "rounding",
    "reason",
    "warning",
)
RESULTS_SCHEMA = "results.schema.json"


def plain(value: Decimal | str | None) -> str:
    """Write a value without exponent, trailing zeros or locale; empty text for none.

    Parameters
    ----------
    value
        Exact decimal, text, or ``None``.

    Returns
    -------
    str
        The value as it stands in the data files.
    """
    if value is None:
        return ""
    if isinstance(value, str):
        return value
    text = format(value, "f")
    return text.rstrip("0").rstrip(".") if "." in text else text


def _figure_row(figure: Figure) -> dict[str, str]:
    return {
        "lamp_id": figure.lamp_id,
        "unit_id": figure.unit_id,
        "quantity": figure.quantity,
        "value": plain(figure.value),
        "unit": quantity(figure.quantity).unit,
        "expanded_uncertainty": plain(figure.expanded_uncertainty),
        "grade": figure.grade.value,
        "method": figure.method,
        "spread": plain(figure.spread),
        "units_count": str(figure.units_count),
        "reason": figure.reason,
    }


def _verdict_row(verdict: Verdict) -> dict[str, str]:
    return {
        "lamp_id": verdict.lamp_id,
        "clause": verdict.clause,
        "quantity": verdict.quantity,
        "basis": verdict.basis.value,
        "value": plain(verdict.value),
        "unit": verdict.unit,
        "expanded_uncertainty": plain(verdict.expanded_uncertainty),
        "limit": plain(verdict.limit),
        "comparison": verdict.comparison,
        "margin": plain(verdict.margin),
        "verdict": verdict.verdict.value,
        "source": verdict.source,
        "status": verdict.status,
        "probability": plain(verdict.probability),
        "rule": verdict.rule,
        "note": verdict.note,
    }


def _table(columns: Iterable[str], rows: Iterable[Mapping[str, str]]) -> bytes:
    text = io.StringIO(newline="")
    writer = csv.DictWriter(text, fieldnames=list(columns), lineterminator="\r\n")
    writer.writeheader()
    writer.writerows(rows)
    return text.getvalue().encode()


def figures_csv(assessment: Assessment) -> bytes:
    """Write ``data/figures.csv``: one row per figure; ``unit_id`` empty for the mean.

    Parameters
    ----------
    assessment
        The assessment.

    Returns
    -------
    bytes
        CSV (RFC 4180), UTF-8.
    """
    return _table(FIGURE_COLUMNS, (_figure_row(item) for item in assessment.figures))


def verdicts_csv(assessment: Assessment) -> bytes:
    """Write ``data/verdicts.csv``: one row per lamp, clause and basis.

    Parameters
    ----------
    assessment
        The assessment.

    Returns
    -------
    bytes
        CSV (RFC 4180), UTF-8.
    """
    return _table(VERDICT_COLUMNS, (_verdict_row(item) for item in assessment.verdicts))


_NUMBERS = ("value", "expanded_uncertainty", "spread", "limit", "margin", "probability")


def _json_row(row: Mapping[str, str], source: Figure | Verdict) -> dict[str, Any]:
    """The CSV row with numbers as numbers, and ``null`` where there is none."""
    result: dict[str, Any] = dict(row)
    for name in _NUMBERS:
        if name in row:
            value = getattr(source, name)
            result[name] = float(value) if isinstance(value, Decimal) else value
    if isinstance(source, Figure):
        result["units_count"] = source.units_count
        result["origin"] = list(source.origin)
        result["remarks"] = list(source.remarks)
    else:
        result["steps"] = list(source.steps)
    return result


def _finding_row(finding: Finding) -> dict[str, Any]:
    deviation = finding.deviation
    return {
        "lamp_id": finding.lamp_id,
        "unit_id": finding.unit_id,
        "check": finding.check,
        "severity": finding.severity.value,
        "title": finding.title,
        "compared": finding.compared,
        "deviation": None if deviation is None else float(deviation),
        "deviation_unit": finding.deviation_unit,
        "explanation": finding.explanation,
        "source": finding.source,
    }


def _lamp_row(assessment: Assessment, lamp_id: str) -> dict[str, Any]:
    lamp = assessment.campaign.lamp(lamp_id)
    return {
        "lamp_id": lamp.lamp_id,
        "bidder": lamp.bidder,
        "model": lamp.model,
        "cap": lamp.cap,
        "technology": lamp.technology,
        "directional": lamp.directional,
        "mains": lamp.mains,
        "connected": lamp.connected,
        "placed_on_market": (lamp.placed_on_market.isoformat() if lamp.placed_on_market else None),
        "units": [unit.unit_id for unit in assessment.campaign.units_of(lamp_id)],
    }


def results_json(assessment: Assessment, lamp_ids: Sequence[str] | None = None) -> bytes:
    """Write ``data/results.json``: campaign, figures, verdicts and findings in one file.

    Parameters
    ----------
    assessment
        The assessment.
    lamp_ids
        Lamps to name; all by default. Where lamps are named, problems of the campaign as a
        whole and findings on other lamps are left out.

    Returns
    -------
    bytes
        JSON, UTF-8; its shape is published as ``data/results.schema.json``.
    """
    campaign = assessment.campaign
    table = campaign.settings.campaign
    content = {
        "$schema": RESULTS_SCHEMA,
        "program": {"name": "lampassay", "version": assessment.version},
        "campaign": {
            "name": campaign.name,
            "title": table.title,
            "reference": table.reference,
            "client": table.client,
            "assessed_on": assessment.assessed_on.isoformat(),
            "laboratory": campaign.settings.laboratory.name,
            "lamps": [
                _lamp_row(assessment, lamp.lamp_id)
                for lamp in campaign.lamps
                if lamp_ids is None or lamp.lamp_id in lamp_ids
            ],
            "warnings": [str(problem) for problem in campaign.warnings if lamp_ids is None],
        },
        "figures": [_json_row(_figure_row(item), item) for item in assessment.figures],
        "verdicts": [_json_row(_verdict_row(item), item) for item in assessment.verdicts],
        "findings": [
            _finding_row(item)
            for item in assessment.findings
            if lamp_ids is None or item.lamp_id in lamp_ids
        ],
    }
    return (json.dumps(content, ensure_ascii=False, indent=1) + "\n").encode()


def product_information_csv(products: Iterable[ProductField]) -> bytes:
    """Write ``data/product_information.csv``: one row per lamp and field of the act.

    Parameters
    ----------
    products
        The fields, lamp by lamp.

    Returns
    -------
    bytes
        CSV (RFC 4180), UTF-8.
    """
    return _table(PRODUCT_COLUMNS, (_product_row(item) for item in products))


def _product_row(item: ProductField) -> dict[str, str]:
    return {
        "lamp_id": item.lamp_id,
        "field": item.name,
        "text": item.text,
        "unit": item.unit,
        "declared": plain(item.declared),
        "rounding": item.rounding,
        "reason": item.reason,
        "warning": item.warning,
    }


def write_data(folder: Path, assessment: Assessment, products: Iterable[ProductField] = ()) -> None:
    """Write the data files of an issue.

    Parameters
    ----------
    folder
        Folder being built.
    assessment
        The assessment.
    products
        Product information, lamp by lamp.
    """
    data = folder / "data"
    data.mkdir()
    (data / "figures.csv").write_bytes(figures_csv(assessment))
    (data / "verdicts.csv").write_bytes(verdicts_csv(assessment))
    (data / "product_information.csv").write_bytes(product_information_csv(products))
    (data / "results.json").write_bytes(results_json(assessment))
    (data / RESULTS_SCHEMA).write_bytes(files(__package__).joinpath(RESULTS_SCHEMA).read_bytes())
    (data / MANIFEST_SCHEMA).write_bytes(manifest_schema())
