"""The issue as an open Data Package: ``datapackage.json`` with a Table Schema for every CSV.

It follows the Data Package standard, version 2, of the Open Knowledge Foundation: descriptor,
resource, table schema and table dialect.
"""

from __future__ import annotations

import gzip
import hashlib
import json
from collections.abc import Iterable, Iterator
from pathlib import Path
from typing import Any

from generator.intake.tables.problem_list import ProblemList
from generator.intake.tables.text_table import read_heading
from generator.publish.inputs import INPUTS
from generator.publish.media_types import media_type
from generator.quantities import QUANTITIES
from generator.records.assessment import Assessment

__all__ = ["DATA_PACKAGE", "data_package_json", "write_data_package"]

DATA_PACKAGE = "datapackage.json"
_PROFILE = "https://datapackage.org/profiles/2.0/datapackage.json"

_SCHEMA = ".schema.json"
"""Ending of the schemas that lie beside the data: they are no resources, but tell of them."""

_YES_NO = (
    "directional",
    "mains",
    "connected",
    "colour_tuneable",
    "high_luminance",
    "anti_glare_shield",
    "dimmable",
    "operational",
)
_DAYS = ("placed_on_market", "report_date")
_COUNTS = ("units_count",)
_NUMBERS = ("unit_price", "expanded_uncertainty", "margin", "probability", "spread")
_WORDS = ("declared_energy_class", "energy_efficiency_class")
_RAW_FOLDERS = ("spectra", "light", "mains", "intensity")
_UNITS = (
    ("_lm_per_w", "lm/W"),
    ("_cd_per_mm2", "cd/mm²"),
    ("_sdcm", "steps"),
    ("_percent", "%"),
    ("_deg", "°"),
    ("_lm", "lm"),
    ("_nm", "nm"),
    ("_cd", "cd"),
    ("_hz", "Hz"),
    ("_w", "W"),
    ("_v", "V"),
    ("_a", "A"),
    ("_k", "K"),
    ("_c", "°C"),
    ("_h", "h"),
    ("_s", "s"),
)
_UNITLESS = frozenset({"pst_lm", "u_pst_lm", "declared_pst_lm"})


def data_package_json(folder: Path, assessment: Assessment) -> bytes:
    """Describe an issue as a Data Package.

    Parameters
    ----------
    folder
        Folder being built, complete but for this file and the manifest.
    assessment
        The assessment.

    Returns
    -------
    bytes
        JSON, UTF-8.
    """
    table = assessment.campaign.settings.campaign
    paths = (path for path in folder.rglob("*") if path.is_file())
    names = sorted(path.relative_to(folder).as_posix() for path in paths)
    data = [name for name in names if not name.endswith(_SCHEMA)]
    content = {
        "$schema": _PROFILE,
        "name": assessment.campaign.name.lower(),
        "title": table.title,
        "created": f"{assessment.assessed_on.isoformat()}T00:00:00Z",
        "version": assessment.version,
        "resources": list(_resources(folder, data)),
    }
    return (json.dumps(content, ensure_ascii=False, indent=1) + "\n").encode()


def write_data_package(folder: Path, assessment: Assessment) -> None:
    """Write ``datapackage.json``; after every other file but the manifest.

    Parameters
    ----------
    folder
        Folder being built.
    assessment
        The assessment.
    """
    (folder / DATA_PACKAGE).write_bytes(data_package_json(folder, assessment))


def _resources(folder: Path, names: Iterable[str]) -> Iterator[dict[str, Any]]:
    taken: set[str] = set()
    for name in names:
        content = (folder / name).read_bytes()
        resource: dict[str, Any] = {
            "name": _resource_name(name, taken),
            "path": name,
            "mediatype": media_type(name),
            "bytes": len(content),
            "hash": f"sha256:{hashlib.sha256(content).hexdigest()}",
        }
        if name.endswith((".csv", ".csv.gz")):
            resource |= _table(name, content)
        yield resource


def _resource_name(path: str, taken: set[str]) -> str:
    """A name of lower-case letters, digits, ``.``, ``_`` and ``-``, once in the package."""
    plain = "".join(
        sign if sign.isascii() and (sign.isalnum() or sign in "._-") else "-"
        for sign in path.lower()
    )
    name, number = plain, 1
    while name in taken:
        number += 1
        name = f"{plain}-{number}"
    taken.add(name)
    return name


def _table(path: str, content: bytes) -> dict[str, Any]:
    packed = path.endswith(".gz")
    text = (gzip.decompress(content) if packed else content).decode("utf-8-sig")
    heading = read_heading(text, ProblemList(path))
    if heading is None:
        return {}
    decimal = "," if heading.separator == ";" and _comma_decimals(text, heading.row) else "."
    dialect: dict[str, Any] = {"delimiter": heading.separator}
    if heading.row > 1:
        dialect["commentChar"] = "#"
    table: dict[str, Any] = {
        "type": "table",
        "format": "csv",
        "encoding": "utf-8",
        "dialect": dialect,
        "schema": {
            "fields": [_field(path, name, decimal) for name in heading.names],
            "missingValues": [""],
        },
    }
    return table | ({"compression": "gz"} if packed else {})


def _comma_decimals(text: str, heading_row: int) -> bool:
    """Whether numbers of a table separated by semicolons are written with a decimal comma."""
    rows = text.split("\n")[heading_row:]
    return any("," in row for row in rows if not row.startswith("#"))


def _field(path: str, name: str, decimal: str) -> dict[str, Any]:
    described = _type(path, name)
    if described["type"] == "number" and decimal == ",":
        described["decimalChar"] = decimal
    unit = _unit(name)
    return {"name": name, **described} | ({"unit": unit} if unit else {})


def _type(path: str, name: str) -> dict[str, Any]:
    if name in _YES_NO:
        return {"type": "boolean", "trueValues": ["yes"], "falseValues": ["no"]}
    if name in _DAYS:
        return {"type": "date"}
    offered = name == "quantity" and path.startswith(f"{INPUTS}/lamps.csv")
    if name in _COUNTS or offered:
        return {"type": "integer"}
    return {"type": "number" if _numeric(path, name) else "string"}


def _numeric(path: str, name: str) -> bool:
    if name in _NUMBERS:
        return True
    if not path.startswith(f"{INPUTS}/") or name in _WORDS:
        return False  # a value or limit of the results is a number, or the letter of a class
    stem = name.removeprefix("declared_").removeprefix("u_")
    raw = path.split("/")[1] in _RAW_FOLDERS
    return raw or stem in QUANTITIES or bool(_unit(name))


def _unit(name: str) -> str:
    if name in _UNITLESS:
        return ""
    stem = name.removeprefix("declared_").removeprefix("u_")
    if stem in QUANTITIES:
        return QUANTITIES[stem].unit
    return next((unit for ending, unit in _UNITS if stem.endswith(ending)), "")
