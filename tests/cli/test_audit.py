"""``lampassay audit``: results on standard output, status 0 or 1, and nothing changed."""

from __future__ import annotations

import json
from pathlib import Path

import click.testing
import pytest

from generator import pipeline
from generator.cli import command

TOML = """\
[campaign]
title = "One lamp"
assessment_date = 2026-03-02
"""


@pytest.fixture
def one_lamp_issue(tmp_path: Path) -> Path:
    campaign = tmp_path / "one"
    campaign.mkdir()
    (campaign / "campaign.toml").write_text(TOML)
    (campaign / "lamps.csv").write_text(
        "lamp_id,bidder,model,cap,technology,directional,mains,connected,declared_power_w\n"
        "a,A,One,E27,LED,no,yes,no,8\n"
    )
    (campaign / "units.csv").write_text("unit_id,lamp_id,power_w\na-1,a,8.1\n")
    pipeline.issue(campaign, target=tmp_path / "out", pdf=False, archive=tmp_path / "out.zip")
    return tmp_path / "out"


def run(*words: object) -> click.testing.Result:
    return click.testing.CliRunner().invoke(command, ["audit", *map(str, words)])


def test_a_good_issue_is_told(one_lamp_issue: Path) -> None:
    before = {path: path.read_bytes() for path in one_lamp_issue.rglob("*") if path.is_file()}
    done = run(one_lamp_issue)
    assert done.exit_code == 0, done.output
    assert "audit passed; checked" in done.output
    assert "note: completeness: Number of the report: missing" in done.output
    assert run(one_lamp_issue.with_suffix(".zip")).exit_code == 0
    assert before == {
        path: path.read_bytes() for path in one_lamp_issue.rglob("*") if path.is_file()
    }


def test_a_bad_issue_is_told(one_lamp_issue: Path) -> None:
    (one_lamp_issue / "index.html").write_text("other")
    done = run(one_lamp_issue)
    assert done.exit_code == 1
    assert "failure: integrity: index.html: changed" in done.output
    assert "audit FAILED, 1 failure(s)" in done.output


def test_json_says_everything(one_lamp_issue: Path) -> None:
    done = run(one_lamp_issue, "--json")
    assert done.exit_code == 0
    report = json.loads(done.stdout)
    assert report["passed"] is True
    assert report["kind"] == "folder"
    assert report["facts"]["assessed_on"] == "2026-03-02"
    assert report["checked"]["figures"] > 0
    (one_lamp_issue / "data" / "figures.csv").unlink()
    done = run(one_lamp_issue, "--json")
    assert done.exit_code == 1
    subjects = {item["subject"] for item in json.loads(done.stdout)["findings"]}
    assert "data/figures.csv" in subjects


def test_what_is_not_there_is_wrong_use(tmp_path: Path) -> None:
    assert run(tmp_path / "absent").exit_code == 2
    assert run().exit_code == 2


def test_salt_without_public_is_wrong_use(tmp_path: Path) -> None:
    (tmp_path / "salt").write_text("{}")
    words = ["issue", str(tmp_path), "--salt", str(tmp_path / "salt")]
    done = click.testing.CliRunner().invoke(command, words)
    assert done.exit_code == 2
    assert "--salt belongs to --public" in done.output
