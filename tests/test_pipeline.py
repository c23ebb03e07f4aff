"""The whole path on a small campaign: what goes in, what comes out, what bad input gets."""

from __future__ import annotations

import csv
import hashlib
import json
from datetime import date
from pathlib import Path

import jsonschema
import pandas as pd
import pytest

import generator
from generator import pipeline
from generator.errors import DataProblems
from generator.records.verdict import Basis, VerdictWord


def digests(folder: Path) -> dict[str, str]:
    return {
        path.relative_to(folder).as_posix(): hashlib.sha256(path.read_bytes()).hexdigest()
        for path in sorted(folder.rglob("*"))
        if path.is_file()
    }


def test_the_public_edge() -> None:
    assert sorted(generator.__all__) == ["DataProblems", "Issued", "check", "issue", "measure"]
    assert all(hasattr(generator, name) for name in generator.__all__)
    readme = (Path(__file__).parents[1] / "README.md").read_text(encoding="utf-8")
    assert all(f"`{name}`" in readme for name in generator.__all__)


def test_everything_of_the_contract_is_issued(small_campaign: Path, tmp_path: Path) -> None:
    issued = generator.issue(small_campaign, target=tmp_path / "out", jobs=2)
    assert issued.gaps == ()
    assert issued.index == tmp_path / "out" / "index.html"
    assert {
        "index.html",
        "comparison.pdf",
        "manifest.json",
        "lamps/one.html",
        "lamps/one.pdf",
        "lamps/two.html",
        "lamps/two.pdf",
        "data/figures.csv",
        "data/verdicts.csv",
        "data/results.json",
    } <= set(digests(tmp_path / "out"))
    assert (tmp_path / "out" / "lamps" / "one.pdf").read_bytes().startswith(b"%PDF-")


def test_data_files_say_what_was_computed(small_campaign: Path, tmp_path: Path) -> None:
    issued = generator.issue(small_campaign, target=tmp_path / "out", pdf=False)
    figures = issued.figures()
    assert isinstance(figures, pd.DataFrame)
    mean = figures[figures.unit_id.isna() & (figures.lamp_id == "one")]
    by_grade = mean.set_index(["quantity", "grade"]).value
    # Reported numbers: the mean of 8.75 and 8.80, exactly.
    assert by_grade["power_w", "reported"] == "8.775"
    # Closed forms: 230 V, 0.05/√2 A, 30° of phase give 7.0423 W; 25 % sine on a mean of 1.
    assert float(by_grade["power_w", "computed"]) == pytest.approx(7.0423, abs=5e-5)
    assert float(by_grade["percent_flicker", "computed"]) == pytest.approx(25.0, abs=0.01)
    assert float(by_grade["flicker_index", "computed"]) == pytest.approx(0.25 / 3.14159, abs=5e-5)
    verdicts = issued.verdicts()
    declared = verdicts[
        (verdicts.clause == "eu-2019-2020-maximum-power") & (verdicts.basis == "declared")
    ]
    assert dict(zip(declared.lamp_id, declared.verdict, strict=True)) == {
        "one": "pass",
        "two": "fail",
    }
    assert set(declared.limit) == {"8.874"}


def test_results_keep_to_their_schema(small_campaign: Path, tmp_path: Path) -> None:
    out = generator.issue(small_campaign, target=tmp_path / "out", pdf=False).folder
    schema = json.loads((out / "data" / "results.schema.json").read_text(encoding="utf-8"))
    results = json.loads((out / "data" / "results.json").read_text(encoding="utf-8"))
    jsonschema.validate(results, schema)
    with (out / "data" / "figures.csv").open(newline="", encoding="utf-8") as file:
        assert len(results["figures"]) == sum(1 for _ in csv.DictReader(file))


def test_a_lamp_without_a_measurement_is_not_measured(small_campaign: Path) -> None:
    assessment = pipeline.assess(small_campaign)
    figure = assessment.figures.best("two", "cct_k")
    assert figure is not None
    assert (figure.value, figure.reason) == (None, "not measured")
    words = {
        item.verdict
        for item in assessment.verdicts_of("two")
        if item.clause == "eu-2019-2020-cri" and item.basis is Basis.DETERMINED
    }
    assert words == {VerdictWord.NOT_MEASURED}


def test_the_date_of_law_can_be_given(small_campaign: Path) -> None:
    assert pipeline.assess(small_campaign).assessed_on == date(2026, 3, 2)
    assert pipeline.assess(small_campaign, date(2025, 1, 1)).assessed_on == date(2025, 1, 1)


def test_bad_data_leave_the_former_output_as_it_was(small_campaign: Path, tmp_path: Path) -> None:
    generator.issue(small_campaign, target=tmp_path / "out", pdf=False)
    before = digests(tmp_path / "out")
    text = (small_campaign / "units.csv").read_text(encoding="utf-8")
    (small_campaign / "units.csv").write_text(
        text.replace("8.75", "eight").replace("two-1,two", "two-1,tow"), encoding="utf-8"
    )
    with (small_campaign / "campaign.toml").open("a", encoding="utf-8") as file:
        file.write(
            '\n[[clause]]\nquantity = "efficacy_lm_per_watt"\ncomparison = "at least"\nvalue = 90\n'
        )
    with pytest.raises(DataProblems) as caught:
        generator.issue(small_campaign, target=tmp_path / "out", pdf=False)
    problems = {(item.file, item.row, item.column): item for item in caught.value.problems}
    assert problems["units.csv", 2, "power_w"].found == "eight"
    assert problems["units.csv", 4, "lamp_id"].found == "tow"
    lines = (small_campaign / "campaign.toml").read_text(encoding="utf-8").splitlines()
    row = lines.index('quantity = "efficacy_lm_per_watt"') + 1
    assert problems["campaign.toml", row, "clause.1.quantity"].expected == "efficacy_lm_per_w"
    assert digests(tmp_path / "out") == before


def test_an_unknown_regime_theme_or_exemption_is_named(small_campaign: Path) -> None:
    text = (small_campaign / "campaign.toml").read_text(encoding="utf-8")
    (small_campaign / "campaign.toml").write_text(
        text.replace("[laboratory]", 'regimes = ["EU 2019/2021"]\n[laboratory]')
        + '[sheet]\ntheme = "tendre"\n',
        encoding="utf-8",
    )
    found = {problem.column: problem for problem in generator.check(small_campaign)}
    assert "EU 2019/2020" in found["campaign.regimes"].expected
    assert "tender" in found["sheet.theme"].expected


def test_check_writes_nothing(small_campaign: Path) -> None:
    before = digests(small_campaign)
    assert generator.check(small_campaign) == ()
    assert digests(small_campaign) == before


def test_the_same_campaign_gives_the_same_bytes(small_campaign: Path, tmp_path: Path) -> None:
    for name in ("first", "second"):
        generator.issue(small_campaign, target=tmp_path / name, pdf=False)
    assert digests(tmp_path / "first") == digests(tmp_path / "second")


def test_a_campaign_may_change_a_colour_without_copying_the_rest(
    small_campaign: Path, tmp_path: Path
) -> None:
    own = small_campaign / "templates" / "tender"
    own.mkdir(parents=True)
    (own / "tokens.css").write_text(":root { --accent: #123456; }\n", encoding="utf-8")
    issued = generator.issue(small_campaign, target=tmp_path / "out", pdf=False)
    styles = "".join(
        path.read_text(encoding="utf-8") for path in (issued.folder / "assets").rglob("*.css")
    )
    assert "#123456" in styles
    assert (issued.folder / "inputs" / "templates" / "tender" / "tokens.css").is_file()
    assert generator.check(small_campaign) == ()
