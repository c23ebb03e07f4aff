"""The manifest lists every file, keeps to its schema, and agrees with its own digest."""

from __future__ import annotations

import hashlib
import json
from datetime import date
from pathlib import Path
from typing import Any

import jsonschema
import pytest

from generator.publish.manifest import (
    Edition,
    Withheld,
    file_entry,
    manifest_bytes,
    manifest_digest,
    manifest_json,
    manifest_schema,
)
from generator.publish.media_types import media_type
from generator.records.assessment import Assessment
from generator.records.campaign import Campaign, InputFile
from generator.records.figure import FigureSet
from generator.records.settings import Settings

VERSIONS = {"lampassay": "0.0", "law book": "1" * 64}


@pytest.fixture
def bare_assessment() -> Assessment:
    campaign = Campaign(
        name="small",
        settings=Settings.model_validate({"campaign": {"title": "Small", "reference": "S-1"}}),
        lamps=(),
        units=(),
        files=(InputFile("light/a.csv.gz", 3, "0" * 64),),
    )
    return Assessment(campaign, date(2026, 3, 2), FigureSet([]), (), "0.0")


@pytest.fixture
def built_folder(tmp_path: Path) -> Path:
    (tmp_path / "data").mkdir()
    (tmp_path / "inputs" / "light").mkdir(parents=True)
    (tmp_path / "index.html").write_bytes(b"page")
    (tmp_path / "data" / "figures.csv").write_bytes(b"figures")
    (tmp_path / "inputs" / "light" / "a.csv.gz").write_bytes(b"raw")
    return tmp_path


def read(content: bytes) -> dict[str, Any]:
    manifest: dict[str, Any] = json.loads(content)
    jsonschema.Draft202012Validator(json.loads(manifest_schema())).validate(manifest)
    return manifest


def test_every_file_is_listed_with_its_digest(
    bare_assessment: Assessment, built_folder: Path
) -> None:
    manifest = read(manifest_json(bare_assessment, built_folder, VERSIONS, Edition(seed=7)))
    assert [(entry["path"], entry["size"]) for entry in manifest["outputs"]] == [
        ("data/figures.csv", 7),
        ("index.html", 4),
    ]
    assert manifest["outputs"][1]["sha256"] == hashlib.sha256(b"page").hexdigest()
    assert manifest["inputs"] == [
        {
            "path": "light/a.csv.gz",
            "size": 3,
            "sha256": "0" * 64,
            "media_type": "application/gzip",
        }
    ]
    assert (manifest["seed"], manifest["edition"]) == (7, "full")
    assert (manifest["assessed_on"], manifest["decision_rule"]) == (
        "2026-03-02",
        "simple acceptance",
    )


def test_the_digest_is_over_everything_else(
    bare_assessment: Assessment, built_folder: Path
) -> None:
    content = manifest_json(bare_assessment, built_folder, VERSIONS)
    manifest = read(content)
    stated = manifest.pop("digest")
    # the rule as the schema words it, written out here a second time
    compact = json.dumps(manifest, ensure_ascii=False, sort_keys=True, separators=(",", ":"))
    assert stated == hashlib.sha256(compact.encode()).hexdigest() == manifest_digest(manifest)
    assert manifest_bytes({**manifest, "digest": stated}) == content


def test_a_signed_document_keeps_its_former_entry(
    bare_assessment: Assessment, built_folder: Path
) -> None:
    edition = Edition(unsigned={"index.html": file_entry("index.html", b"pa")})
    manifest = read(manifest_json(bare_assessment, built_folder, VERSIONS, edition))
    assert manifest["outputs"][1]["unsigned"] == {
        "size": 2,
        "sha256": hashlib.sha256(b"pa").hexdigest(),
    }


def test_a_full_edition_withholds_nothing(bare_assessment: Assessment, built_folder: Path) -> None:
    parts = (Withheld("lamps.csv", "row 2, unit_price", "a" * 64),)
    public = manifest_json(bare_assessment, built_folder, VERSIONS, Edition("public", parts))
    assert read(public)["withheld"][0]["place"] == "row 2, unit_price"
    with pytest.raises(jsonschema.ValidationError):
        read(manifest_json(bare_assessment, built_folder, VERSIONS, Edition("full", parts)))


@pytest.mark.parametrize("path", ["../x", "/x", "a/../b", "a\\b", "./x"])
def test_the_schema_refuses_paths_that_lead_out(
    bare_assessment: Assessment, built_folder: Path, path: str
) -> None:
    manifest = read(manifest_json(bare_assessment, built_folder, VERSIONS))
    manifest["outputs"][0]["path"] = path
    with pytest.raises(jsonschema.ValidationError):
        read(manifest_bytes(manifest))


@pytest.mark.parametrize(
    ("path", "expected"),
    [
        # registered with IANA, but for the last two
        ("data/figures.csv", "text/csv"),
        ("light/a.csv.gz", "application/gzip"),
        ("lamps/a.long.PDF", "application/pdf"),
        ("manifest.json.p7s", "application/pkcs7-signature"),
        ("campaign.toml", "application/toml"),
        ("a.b/c", "application/octet-stream"),
        ("x.unknown", "application/octet-stream"),
    ],
)
def test_media_types(path: str, expected: str) -> None:
    assert media_type(path) == expected
