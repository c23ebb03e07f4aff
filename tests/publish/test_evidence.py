"""The data files hold the figures exactly, and the results keep to the published schema."""

from __future__ import annotations

import csv
import io
import json
from datetime import date
from decimal import Decimal
from pathlib import Path

import jsonschema
import pytest

import generator.publish
from generator.publish.evidence import (
    figures_csv,
    plain,
    product_information_csv,
    results_json,
    verdicts_csv,
    write_data,
)
from generator.records.assessment import Assessment
from generator.records.campaign import Campaign, InputFile
from generator.records.figure import Figure, FigureSet, Grade
from generator.records.finding import Finding, Severity
from generator.records.lamp import Lamp, Unit
from generator.records.product_field import ProductField
from generator.records.settings import Settings
from generator.records.verdict import Basis, Verdict, VerdictWord

SCHEMA = json.loads(
    (Path(generator.publish.__file__).parent / "results.schema.json").read_text(encoding="utf-8")
)


@pytest.fixture
def small_assessment() -> Assessment:
    campaign = Campaign(
        name="small",
        settings=Settings.model_validate({"campaign": {"title": "Small", "client": "A, B"}}),
        lamps=(Lamp("L1", "Bidder; one", 'Model "5"', row=2),),
        units=(Unit("U1", "L1", row=2),),
        files=(InputFile("lamps.csv", 3, "0" * 64),),
    )
    figures = FigureSet(
        [
            Figure(
                "L1",
                "U1",
                "power_w",
                Decimal("16.60"),
                Grade.REPORTED,
                "units.csv power_w",
                Decimal("0.05"),
            ),
            Figure(
                "L1", "", "cct_k", None, Grade.COMPUTED, "cct_ohno_2013", reason="Duv beyond 0.05"
            ),
            Figure("L1", "", "energy_efficiency_class", "F", Grade.DECLARED, "EU 2019/2015"),
        ]
    )
    verdict = Verdict(
        "L1",
        "eu-2019-2020-cri",
        "Colour rendering",
        "EU 2019/2020",
        "ra",
        "",
        Basis.DETERMINED,
        Decimal("80.0"),
        None,
        Decimal(80),
        "at least",
        Decimal("0.0"),
        VerdictWord.PASS,
        "Regulation (EU) 2019/2020, Annex II, Table 4",
        "read",
        steps=("80.0 is at least 80",),
    )
    findings = tuple(
        Finding(
            lamp_id,
            "",
            "efficacy-above-ler",
            Severity.IMPOSSIBLE,
            "Efficacy above that of its own light",
            "380 lm/W against 320 lm/W",
            deviation,
            "lm/W",
            "A flux or a power of another lamp.",
            ("efficacy_lm_per_w",),
            "cie_eilv, luminous efficacy of radiation",
        )
        for lamp_id, deviation in (("L1", Decimal("60.0")), ("L2", None))
    )
    return Assessment(campaign, date(2026, 3, 2), figures, (verdict,), "0.0", findings=findings)


def rows(content: bytes) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(content.decode(), newline="")))


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (Decimal("16.60"), "16.6"),
        (Decimal(1000), "1000"),
        (Decimal("1E+3"), "1000"),
        (Decimal("1E-7"), "0.0000001"),
        (Decimal("-0.0032"), "-0.0032"),
        (Decimal("0.0"), "0"),
        ("F", "F"),
        (None, ""),
    ],
)
def test_plain_values(value: Decimal | str | None, text: str) -> None:
    assert plain(value) == text


def test_figures_csv_has_one_row_per_figure(small_assessment: Assessment) -> None:
    first, second, third = rows(figures_csv(small_assessment))
    assert first["value"] == "16.6"
    assert first["unit"] == "W"
    assert first["expanded_uncertainty"] == "0.05"
    assert second["value"] == ""
    assert second["reason"] == "Duv beyond 0.05"
    assert third["value"] == "F"


def test_verdicts_csv_has_one_row_per_verdict(small_assessment: Assessment) -> None:
    (row,) = rows(verdicts_csv(small_assessment))
    assert (row["limit"], row["margin"], row["verdict"]) == ("80", "0", "pass")


def test_results_keep_to_the_schema(small_assessment: Assessment) -> None:
    results = json.loads(results_json(small_assessment))
    jsonschema.validate(results, SCHEMA)
    assert results["figures"][0]["value"] == 16.6
    assert results["figures"][1]["value"] is None
    assert [item["deviation"] for item in results["findings"]] == [60.0, None]


@pytest.mark.parametrize("changed", [{"severity": "grave"}, {"check": ""}, {"explanation": ""}])
def test_the_schema_refuses_a_finding_that_does_not_say_what_it_is(
    small_assessment: Assessment, changed: dict[str, str]
) -> None:
    results = json.loads(results_json(small_assessment))
    assert results["findings"][0]["compared"] == "380 lm/W against 320 lm/W"
    results["findings"][0] |= changed
    with pytest.raises(jsonschema.ValidationError):
        jsonschema.validate(results, SCHEMA)


def test_the_schema_refuses_a_silent_gap(small_assessment: Assessment) -> None:
    results = json.loads(results_json(small_assessment))
    results["figures"][1]["reason"] = ""
    with pytest.raises(jsonschema.ValidationError):
        jsonschema.validate(results, SCHEMA)


def test_the_schema_refuses_a_pass_on_an_unconfirmed_limit(small_assessment: Assessment) -> None:
    results = json.loads(results_json(small_assessment))
    results["verdicts"][0]["status"] = "unconfirmed"
    with pytest.raises(jsonschema.ValidationError):
        jsonschema.validate(results, SCHEMA)


def test_results_of_one_lamp_name_that_lamp_alone(small_assessment: Assessment) -> None:
    results = json.loads(results_json(small_assessment, ["L1"]))
    jsonschema.validate(results, SCHEMA)
    assert [lamp["lamp_id"] for lamp in results["campaign"]["lamps"]] == ["L1"]
    assert results["campaign"]["warnings"] == []
    assert [item["lamp_id"] for item in results["findings"]] == ["L1"]


def test_product_information_has_one_row_per_field() -> None:
    fields = [
        ProductField(
            "L1",
            "stroboscopic effect metric (SVM)",
            "0.4",
            "",
            "to the nearest 0.1",
            Decimal("0.44"),
            warning="0.44 would be shown as 0.4",
        ),
        ProductField("L1", "R9", "", reason="not declared"),
    ]
    first, second = rows(product_information_csv(fields))
    assert (first["text"], first["declared"]) == ("0.4", "0.44")
    assert second["reason"] == "not declared"


def test_the_data_folder_holds_tables_and_schemas(
    small_assessment: Assessment, tmp_path: Path
) -> None:
    write_data(tmp_path, small_assessment)
    assert sorted(path.name for path in (tmp_path / "data").iterdir()) == [
        "figures.csv",
        "manifest.schema.json",
        "product_information.csv",
        "results.json",
        "results.schema.json",
        "verdicts.csv",
    ]
