"""The descriptor describes every file, and every table reads as its schema says."""

from __future__ import annotations

import csv
import gzip
import hashlib
import io
import json
import re
from datetime import date
from decimal import Decimal
from pathlib import Path
from typing import Any

import pytest

from generator.publish.data_package import data_package_json
from generator.records.assessment import Assessment
from generator.records.campaign import Campaign
from generator.records.figure import FigureSet
from generator.records.settings import Settings

FILES = {
    "index.html": b"page",
    "inputs/lamps.csv": b"lamp_id,mains,placed_on_market,declared_power_w,quantity,unit_price\n"
    b"a,yes,2025-03-17,6.5,120,4.37\nb,no,,,,\n",
    "inputs/units.csv": b"# by the bench\nunit_id;lamp_id;luminous_flux_lm;u_power_w\n"
    b"a-1;a;812,5;0,02\n",
    "inputs/light/a.csv.gz": gzip.compress(b"time_s,a-1\n0,1.5\n0.00005,1.25\n", mtime=0),
    "inputs/endurance.csv": b"lamp_id,unit_id,hours_h,luminous_flux_lm,operational\n"
    b"a,a-1,0,810,yes\n",
    "data/verdicts.csv": b"lamp_id,clause,value,limit,margin,probability\n"
    b"a,c,D,D,0,0.97\na,e,80,80,-1.5,\n",
    "data/figures.csv": b"lamp_id,unit_id,quantity,value,units_count\na,,svm,0.4,2\n",
}


@pytest.fixture
def descriptor(tmp_path: Path) -> dict[str, Any]:
    (tmp_path / "data").mkdir()
    (tmp_path / "data" / "results.schema.json").write_text("{}")
    for name, content in FILES.items():
        (tmp_path / name).parent.mkdir(parents=True, exist_ok=True)
        (tmp_path / name).write_bytes(content)
    campaign = Campaign("Our-Tender", Settings.model_validate({"campaign": {"title": "T"}}), (), ())
    assessment = Assessment(campaign, date(2026, 3, 2), FigureSet([]), (), "0.0")
    described: dict[str, Any] = json.loads(data_package_json(tmp_path, assessment))
    return described


def test_every_file_is_a_resource_with_its_digest(descriptor: dict[str, Any]) -> None:
    resources = {item["path"]: item for item in descriptor["resources"]}
    assert sorted(resources) == sorted(FILES)
    for path, content in FILES.items():
        assert resources[path]["bytes"] == len(content)
        assert resources[path]["hash"] == f"sha256:{hashlib.sha256(content).hexdigest()}"
    # Data Package 2.0: names are lower-case, of letters, digits, ".", "_" and "-", each once
    names = [item["name"] for item in descriptor["resources"]]
    assert len(set(names)) == len(names)
    assert all(re.fullmatch(r"[a-z0-9._-]+", name) for name in [*names, descriptor["name"]])


def parsed(kind: dict[str, Any], cell: str) -> object:
    """A cell as Table Schema says: types string, number, integer, boolean, date."""
    if cell == "":
        return None
    if kind["type"] == "boolean":
        assert cell in kind["trueValues"] + kind["falseValues"]
        return cell in kind["trueValues"]
    if kind["type"] == "number":
        return Decimal(cell.replace(kind.get("decimalChar", "."), "."))
    readers = {"string": str, "integer": int, "date": date.fromisoformat}
    reader: Any = readers[kind["type"]]
    return reader(cell)


def table(resource: dict[str, Any]) -> list[list[object]]:
    content = FILES[resource["path"]]
    text = (gzip.decompress(content) if resource.get("compression") == "gz" else content).decode()
    mark = resource["dialect"].get("commentChar")
    lines = [line for line in text.splitlines() if not (mark and line.startswith(mark))]
    rows = list(
        csv.reader(io.StringIO("\n".join(lines)), delimiter=resource["dialect"]["delimiter"])
    )
    fields = resource["schema"]["fields"]
    assert rows[0] == [field["name"] for field in fields]
    return [[parsed(*pair) for pair in zip(fields, row, strict=True)] for row in rows[1:]]


def test_every_table_reads_as_its_schema_says(descriptor: dict[str, Any]) -> None:
    read = {item["path"]: table(item) for item in descriptor["resources"] if "schema" in item}
    assert sorted(read) == sorted(path for path in FILES if ".csv" in path)
    assert read["inputs/lamps.csv"] == [
        ["a", True, date(2025, 3, 17), Decimal("6.5"), 120, Decimal("4.37")],
        ["b", False, None, None, None, None],
    ]
    assert read["inputs/units.csv"] == [["a-1", "a", Decimal("812.5"), Decimal("0.02")]]
    assert read["inputs/light/a.csv.gz"][1] == [Decimal("0.00005"), Decimal("1.25")]
    assert read["inputs/endurance.csv"] == [["a", "a-1", 0, 810, True]]
    assert read["data/verdicts.csv"][0] == ["a", "c", "D", "D", 0, Decimal("0.97")]
    assert read["data/figures.csv"] == [["a", None, "svm", "0.4", 2]]


def test_units_stand_beside_the_columns(descriptor: dict[str, Any]) -> None:
    units = {
        (item["path"], field["name"]): field.get("unit")
        for item in descriptor["resources"]
        if "schema" in item
        for field in item["schema"]["fields"]
    }
    assert units["inputs/lamps.csv", "declared_power_w"] == "W"
    assert units["inputs/units.csv", "luminous_flux_lm"] == "lm"
    assert units["inputs/units.csv", "u_power_w"] == "W"
    assert units["inputs/light/a.csv.gz", "time_s"] == "s"
    assert units["inputs/endurance.csv", "hours_h"] == "h"
    assert units["inputs/lamps.csv", "lamp_id"] is None
