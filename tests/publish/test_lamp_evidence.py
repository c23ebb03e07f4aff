"""A sheet carries the small campaign of its lamp, without prices, and a list that binds it."""

from __future__ import annotations

import csv
import hashlib
import io
import json
import tomllib
from datetime import date
from pathlib import Path

import pytest

from generator.audit.integrity import read_manifest
from generator.intake import read_campaign
from generator.publish import lamp_evidence
from generator.publish.lamp_evidence import (
    EVIDENCE,
    attachment_name,
    comparison_attachments,
    document_attachments,
    lamp_attachments,
    lamp_campaign,
)
from generator.records.assessment import Assessment
from generator.records.figure import FigureSet

VERSIONS = {"lampassay": "0.0", "law book": "1" * 64}
SPECTRUM = "wavelength_nm,{}\n" + "".join(f"{n},0.1\n" for n in range(380, 781, 5))
TOML = """\
spectra_unit = "W/nm"
[campaign]
title = "Two lamps"
reference = "T-1"
[use]
tariff_per_kwh = 0.24
"""


@pytest.fixture
def two_lamp_folder(tmp_path: Path) -> Path:
    (tmp_path / "spectra").mkdir()
    (tmp_path / "campaign.toml").write_text(TOML)
    (tmp_path / "lamps.csv").write_text(
        "lamp_id,bidder,model,mains,unit_price,currency,quantity\n"
        "a,A,One,yes,4.37,EUR,9\nb,B,Two,yes,9.83,EUR,9\n"
    )
    (tmp_path / "units.csv").write_text("unit_id,lamp_id,power_w\na-1,a,8.1\nb-1,b,9.2\n")
    for lamp in "ab":
        (tmp_path / "spectra" / f"{lamp}.csv").write_text(SPECTRUM.format(f"{lamp}-1"))
    return tmp_path


@pytest.fixture
def two_lamp_assessment(two_lamp_folder: Path) -> Assessment:
    return Assessment(read_campaign(two_lamp_folder), date(2026, 3, 2), FigureSet([]), (), "0.0")


def test_the_small_campaign_reads_as_one(
    two_lamp_folder: Path, two_lamp_assessment: Assessment, tmp_path: Path
) -> None:
    files = lamp_campaign(two_lamp_folder, two_lamp_assessment, "a")
    assert list(files) == ["campaign.toml", "lamps.csv", "spectra/a.csv", "units.csv"]
    small = tmp_path / "small"
    for path, content in files.items():
        (small / path).parent.mkdir(parents=True, exist_ok=True)
        (small / path).write_bytes(content)
    campaign = read_campaign(small)
    assert [lamp.lamp_id for lamp in campaign.lamps] == ["a"]
    assert [unit.unit_id for unit in campaign.units] == ["a-1"]
    assert campaign.settings.campaign.spectra_unit == "W/nm"


def test_prices_and_costs_stay_out(two_lamp_folder: Path, two_lamp_assessment: Assessment) -> None:
    files = lamp_campaign(two_lamp_folder, two_lamp_assessment, "a")
    (row,) = csv.DictReader(io.StringIO(files["lamps.csv"].decode()))
    assert (row["unit_price"], row["currency"], row["quantity"]) == ("", "", "")
    assert sorted(tomllib.loads(files["campaign.toml"].decode())) == ["campaign", "spectra_unit"]


def test_raw_files_keep_their_bytes(two_lamp_folder: Path, two_lamp_assessment: Assessment) -> None:
    files = lamp_campaign(two_lamp_folder, two_lamp_assessment, "b")
    assert files["spectra/b.csv"] == (two_lamp_folder / "spectra" / "b.csv").read_bytes()


def test_the_list_binds_every_attachment(
    two_lamp_folder: Path, two_lamp_assessment: Assessment
) -> None:
    attached = lamp_attachments(two_lamp_folder, two_lamp_assessment, "a", VERSIONS)
    content = {item.name: item.data for item in attached}
    kinds = {item.name: item.relationship for item in attached}
    evidence, wrong = read_manifest(content[EVIDENCE])
    assert wrong == ()
    assert evidence is not None
    entries = [*evidence["inputs"], *evidence["outputs"]]
    assert {entry["attached_as"] for entry in entries} == set(content) - {EVIDENCE}
    for entry in entries:
        data = content[entry["attached_as"]]
        assert entry["sha256"] == hashlib.sha256(data).hexdigest()
        assert entry["size"] == len(data)
    # AFRelationship of ISO 19005-3: Source for what it was made from, Data for what it shows
    assert kinds["spectra-a.csv"] == "Source"
    assert kinds["data-results.json"] == "Data"
    assert kinds[EVIDENCE] == "Supplement"


def test_what_does_not_fit_is_named(
    two_lamp_folder: Path, two_lamp_assessment: Assessment, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(lamp_evidence, "MOST_ATTACHED_BYTES", 600)
    attached = lamp_attachments(two_lamp_folder, two_lamp_assessment, "a", VERSIONS)
    evidence = json.loads(next(item.data for item in attached if item.name == EVIDENCE))
    left_out = [entry for entry in evidence["inputs"] if entry["attached_as"] is None]
    assert [entry["path"] for entry in left_out] == ["spectra/a.csv"]
    assert (
        left_out[0]["sha256"]
        == hashlib.sha256((two_lamp_folder / "spectra" / "a.csv").read_bytes()).hexdigest()
    )
    assert "spectra-a.csv" not in {item.name for item in attached}


def test_the_comparison_carries_results_and_digests(
    two_lamp_folder: Path, two_lamp_assessment: Assessment
) -> None:
    attached = comparison_attachments(two_lamp_folder, two_lamp_assessment, VERSIONS)
    assert {item.name for item in attached} == {
        EVIDENCE,
        "data-figures.csv",
        "data-verdicts.csv",
    }
    every = document_attachments(two_lamp_folder, two_lamp_assessment, VERSIONS)
    assert sorted(every) == ["comparison.pdf", "lamps/a.pdf", "lamps/b.pdf"]


def test_names_of_attachments_have_no_slash() -> None:
    assert attachment_name("light/a.long.csv.gz") == "light-a.long.csv.gz"
