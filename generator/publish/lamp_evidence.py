"""What a PDF carries inside: the raw files of its lamp, the results, and a list of both.

A lamp's sheet can so be audited alone: the attached files are a small campaign of that lamp,
without prices, from which its figures and verdicts can be derived again.
"""

from __future__ import annotations

import hashlib
import json
import tomllib
from collections.abc import Iterator, Mapping
from dataclasses import replace
from decimal import Decimal
from pathlib import Path
from typing import Any

from generator.publish.campaign_table import packed_like, read_campaign_table
from generator.publish.evidence import figures_csv, results_json, verdicts_csv
from generator.publish.manifest import file_entry, manifest_bytes, manifest_digest
from generator.publish.toml_text import toml_text
from generator.records.assessment import Assessment
from generator.records.campaign import InputFile
from generator.records.figure import FigureSet
from generator.sheets import SheetAttachment

__all__ = [
    "EVIDENCE",
    "JUDGED_TABLES",
    "MOST_ATTACHED_BYTES",
    "attachment_name",
    "comparison_attachments",
    "document_attachments",
    "lamp_attachments",
    "lamp_campaign",
]

EVIDENCE = "evidence.json"
MOST_ATTACHED_BYTES = 4 * 1024 * 1024
"""Most raw data inside one PDF [bytes]; what does not fit is named with its digest."""

JUDGED_TABLES = ("campaign", "laboratory", "supply", "uncertainty", "decision", "clause", "report")
"""Tables of ``campaign.toml`` that figures, verdicts and the report rest on."""

_OF_LAMP = ("spectra", "light")
_OF_UNIT = ("mains", "intensity")
_OFFER = ("unit_price", "currency", "quantity")


def attachment_name(path: str) -> str:
    """Name of an attached file: its path in one word, for names with a slash are not portable."""
    return path.replace("/", "-")


def lamp_campaign(source: Path, assessment: Assessment, lamp_id: str) -> dict[str, bytes]:
    """The small campaign of one lamp: its own rows, its raw files, the settings judged by.

    Parameters
    ----------
    source
        The campaign folder.
    assessment
        The assessment made from it.
    lamp_id
        The lamp.

    Returns
    -------
    dict
        Path -> content, in the order of the paths. Prices are left out.
    """
    content = {}
    for file in assessment.campaign.files:
        if file.path == "campaign.toml":
            content[file.path] = _settings(source / file.path)
        elif "/" not in file.path:
            table = read_campaign_table(source / file.path).only("lamp_id", lamp_id)
            if table.rows:
                content[file.path] = packed_like(file.path, table.without(*_OFFER).content())
    content |= {
        file.path: (source / file.path).read_bytes() for file in _raw_files(assessment, lamp_id)
    }
    return dict(sorted(content.items()))


def _settings(path: Path) -> bytes:
    tables = tomllib.loads(path.read_text(encoding="utf-8-sig"), parse_float=Decimal)
    kept = {name: item for name, item in tables.items() if name in (*JUDGED_TABLES, "spectra_unit")}
    return toml_text(kept).encode()


def _raw_files(assessment: Assessment, lamp_id: str) -> Iterator[InputFile]:
    units = {unit.unit_id for unit in assessment.campaign.units_of(lamp_id)}
    for file in assessment.campaign.files:
        folder, _, name = file.path.partition("/")
        stem = name.removesuffix(".gz").removesuffix(".csv")
        of_lamp = folder in _OF_LAMP and stem.removesuffix(".long") == lamp_id
        if of_lamp or (folder in _OF_UNIT and stem in units):
            yield file


def _of_lamp(assessment: Assessment, lamp_id: str) -> Assessment:
    """The assessment with the figures and verdicts of one lamp alone."""
    return replace(
        assessment,
        figures=FigureSet(item for item in assessment.figures if item.lamp_id == lamp_id),
        verdicts=assessment.verdicts_of(lamp_id),
    )


def document_attachments(
    source: Path, assessment: Assessment, versions: Mapping[str, str]
) -> dict[str, tuple[SheetAttachment, ...]]:
    """What every document of an issue carries.

    Parameters
    ----------
    source
        The campaign folder.
    assessment
        The assessment made from it.
    versions
        Program, law book and libraries -> version.

    Returns
    -------
    dict
        Path of the document -> attachments.
    """
    lamps = {
        f"lamps/{lamp.lamp_id}.pdf": lamp_attachments(source, assessment, lamp.lamp_id, versions)
        for lamp in assessment.campaign.lamps
    }
    return {"comparison.pdf": comparison_attachments(source, assessment, versions), **lamps}


def lamp_attachments(
    source: Path, assessment: Assessment, lamp_id: str, versions: Mapping[str, str]
) -> tuple[SheetAttachment, ...]:
    """What the sheet of one lamp carries.

    Parameters
    ----------
    source
        The campaign folder.
    assessment
        The assessment made from it.
    lamp_id
        The lamp.
    versions
        Program, law book and libraries -> version.

    Returns
    -------
    tuple of SheetAttachment
        Raw files as ``Source``, results as ``Data``, and the list of both.
    """
    inputs = lamp_campaign(source, assessment, lamp_id)
    alone = _of_lamp(assessment, lamp_id)
    results = {
        "data/figures.csv": figures_csv(alone),
        "data/results.json": results_json(alone, [lamp_id]),
        "data/verdicts.csv": verdicts_csv(alone),
    }
    return _attachments(assessment, lamp_id, inputs, results, versions, MOST_ATTACHED_BYTES)


def comparison_attachments(
    source: Path, assessment: Assessment, versions: Mapping[str, str]
) -> tuple[SheetAttachment, ...]:
    """What the comparison carries: figures and verdicts of all lamps, and the list of inputs.

    Parameters
    ----------
    source
        The campaign folder.
    assessment
        The assessment made from it.
    versions
        Program, law book and libraries -> version.
    """
    inputs = {
        file.path: (source / file.path).read_bytes()
        for file in assessment.campaign.files
        if file.path.startswith(tuple(f"{name}/" for name in (*_OF_LAMP, *_OF_UNIT)))
    }
    results = {
        "data/figures.csv": figures_csv(assessment),
        "data/verdicts.csv": verdicts_csv(assessment),
    }
    return _attachments(assessment, "", inputs, results, versions, 0)


def _attachments(
    assessment: Assessment,
    lamp_id: str,
    inputs: Mapping[str, bytes],
    results: Mapping[str, bytes],
    versions: Mapping[str, str],
    most_bytes: int,
) -> tuple[SheetAttachment, ...]:
    inside = _fitting(inputs, most_bytes)
    listed = _evidence(assessment, lamp_id, inputs, inside, results, versions)
    return (
        SheetAttachment(EVIDENCE, listed, "List of the attached files with digests", "Supplement"),
        *(
            SheetAttachment(attachment_name(path), inputs[path], f"Input {path}", "Source")
            for path in inside
        ),
        *(
            SheetAttachment(attachment_name(path), content, f"Result {path}", "Data")
            for path, content in results.items()
        ),
    )


def _fitting(inputs: Mapping[str, bytes], most_bytes: int) -> tuple[str, ...]:
    """The smallest files first, as many as there is room for, in the order of the paths."""
    room = most_bytes
    chosen = []
    for path in sorted(inputs, key=lambda path: (len(inputs[path]), path)):
        room -= len(inputs[path])
        if room < 0:
            break
        chosen.append(path)
    return tuple(sorted(chosen))


def _evidence(
    assessment: Assessment,
    lamp_id: str,
    inputs: Mapping[str, bytes],
    inside: tuple[str, ...],
    results: Mapping[str, bytes],
    versions: Mapping[str, str],
) -> bytes:
    def listed(path: str, content: bytes, *, attached: bool) -> dict[str, Any]:
        entry = file_entry(path, content)
        return {
            "path": path,
            "attached_as": attachment_name(path) if attached else None,
            "size": entry.size,
            "sha256": entry.sha256,
            "media_type": entry.media_type,
        }

    content: dict[str, Any] = {
        "campaign": assessment.campaign.name,
        "reference": assessment.campaign.settings.campaign.reference,
        "lamp_id": lamp_id or None,
        "assessed_on": assessment.assessed_on.isoformat(),
        "versions": dict(versions),
        "campaign_sha256": _campaign_digest(assessment),
        "inputs": [listed(path, data, attached=path in inside) for path, data in inputs.items()],
        "outputs": [listed(path, data, attached=True) for path, data in results.items()],
    }
    content["digest"] = manifest_digest(content)
    return manifest_bytes(content)


def _campaign_digest(assessment: Assessment) -> str:
    """Digest over all inputs of the campaign, which ties the document to its issue."""
    files = [[file.path, file.sha256] for file in assessment.campaign.files]
    return hashlib.sha256(json.dumps(files).encode()).hexdigest()
