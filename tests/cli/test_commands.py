"""The commands as they are typed: what they print, where, and how they exit."""

from __future__ import annotations

import json
import re
import subprocess
import sys
from pathlib import Path

import colour
import numpy as np
import pytest

from generator.quantities import QUANTITIES


def run(*words: str | Path, cwd: Path | None = None) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "generator", *map(str, words)],
        capture_output=True,
        text=True,
        encoding="utf-8",
        cwd=cwd,
        check=False,
        env=None,
    )


def test_issue_writes_to_output_under_the_current_folder(
    small_campaign: Path, tmp_path: Path
) -> None:
    result = run("issue", small_campaign, "--no-pdf", cwd=tmp_path)
    assert result.returncode == 0
    assert result.stdout == str(Path("output") / "reading-room" / "index.html") + "\n"
    assert (tmp_path / "output" / "reading-room" / "index.html").is_file()
    stages = [line.split(":")[0] for line in result.stderr.splitlines() if line[0] != " "]
    assert stages == [
        "intake",
        "metrics",
        "conformity",
        "crosschecks",
        "comparison",
        "sheets",
        "publish",
    ]


def test_broken_data_exit_with_1_and_every_problem(small_campaign: Path, tmp_path: Path) -> None:
    text = (small_campaign / "lamps.csv").read_text(encoding="utf-8")
    (small_campaign / "lamps.csv").write_text(text.replace(",8.8,", ",8.8 W,"), encoding="utf-8")
    result = run("issue", small_campaign, "--to", tmp_path / "out", "--no-pdf")
    assert result.returncode == 1
    assert result.stdout == ""
    assert "lamps.csv, row 2, column declared_power_w" in result.stderr
    assert not (tmp_path / "out").exists()


def test_check_prints_the_documented_json(small_campaign: Path) -> None:
    (small_campaign / "units.csv").write_text(
        "unit_id,lamp_id,power_w\none-1,one,-3\none-1,one,4\n", encoding="utf-8"
    )
    result = run("check", small_campaign, "--json")
    assert result.returncode == 1
    content = json.loads(result.stdout)
    assert content["campaign"] == str(small_campaign)
    keys = {"level", "file", "row", "column", "found", "expected", "message"}
    assert all(set(problem) == keys for problem in content["problems"])
    places = {(item["file"], item["row"], item["column"]) for item in content["problems"]}
    assert {("units.csv", 2, "power_w"), ("units.csv", 3, "unit_id")} <= places


def test_check_of_good_data_exits_with_0(small_campaign: Path) -> None:
    result = run("check", small_campaign)
    assert (result.returncode, result.stdout) == (0, "")
    assert "0 error(s)" in result.stderr


@pytest.mark.parametrize(
    ("file", "kind", "names", "quantity", "value", "within"),
    [
        # A sine of 25 % depth; a sine lagging by 30°: closed forms.
        ("light/one.csv", "light", ["one-1", "one-2"], "percent_flicker", 25.0, 0.01),
        ("mains/one-1.csv", "mains", ["one-1"], "displacement_factor", np.cos(np.pi / 6), 5e-5),
        ("spectra/one.csv", "spectrum", ["one-1", "one-2"], "peak_wavelength_nm", 595.0, 1e-9),
    ],
)
def test_measure_prints_the_documented_json(
    small_campaign: Path,
    file: str,
    kind: str,
    names: list[str],
    quantity: str,
    value: float,
    within: float,
) -> None:
    result = run("measure", small_campaign / file, "--json")
    assert result.returncode == 0
    (content,) = json.loads(result.stdout)["files"]
    assert content["file"] == str(small_campaign / file)
    assert content["kind"] == kind
    assert [series["name"] for series in content["series"]] == names
    figures = content["series"][0]["figures"]
    assert set(figures) <= set(QUANTITIES)
    assert figures[quantity] == pytest.approx(value, abs=within)


def test_measure_gives_null_and_a_reason_for_what_cannot_be_given(small_campaign: Path) -> None:
    result = run("measure", small_campaign / "light" / "one.csv", "--json")
    series = json.loads(result.stdout)["files"][0]["series"][0]
    assert series["figures"]["pst_lm"] is None
    assert "30" in series["reasons"]["pst_lm"]


def test_measure_takes_several_files_and_lists_every_problem(
    small_campaign: Path, tmp_path: Path
) -> None:
    (tmp_path / "a.csv").write_text("wavelength_nm,s\n400,1\n390,1\n", encoding="utf-8")
    (tmp_path / "b.csv").write_text("time,s\n0,1\n", encoding="utf-8")
    result = run("measure", tmp_path / "a.csv", tmp_path / "b.csv")
    assert result.returncode == 1
    assert "a.csv" in result.stderr
    assert "b.csv" in result.stderr


def test_measure_of_an_absolute_spectrum_gives_the_flux(small_campaign: Path) -> None:
    file = small_campaign / "spectra" / "one.csv"
    relative = json.loads(run("measure", file, "--json").stdout)["files"][0]["series"][0]
    absolute = json.loads(run("measure", file, "--json", "--absolute").stdout)["files"][0][
        "series"
    ][0]
    assert relative["figures"].get("luminous_flux_lm") is None
    wavelength, power, _ = np.loadtxt(file, delimiter=",", skiprows=1, unpack=True)
    # Reference: colour-science, 683 lm/W and the trapezoidal rule on the 5 nm table.
    expected = colour.luminous_flux(colour.SpectralDistribution(power, wavelength))
    assert absolute["figures"]["luminous_flux_lm"] == pytest.approx(expected, rel=1e-4)


def test_clauses_differ_between_the_two_days_of_the_svm_limit() -> None:
    def svm(day: str) -> str:
        rows = json.loads(run("clauses", "--on", day, "--json").stdout)["clauses"]
        return str(next(row["limit"] for row in rows if row["id"] == "eu-2019-2020-svm"))

    # Regulation (EU) 2021/341, Annex IV(2)(a).
    assert (svm("2024-08-31"), svm("2024-09-01")) == ("0.9", "0.4")


def test_clauses_are_read_as_sentences() -> None:
    text = run("clauses", "--on", "2024-09-01").stdout
    for words in (
        "applies where the lamp runs on the mains",
        "at least 0.7, where the active power is above 10 W and at most 25 W",
        "within the declared value ± 25 %",
        "where the declared correlated colour temperature is 2200 K",
        "Factor R for colour rendering (eu-2019-2020-rendering-factor; read):",
        "divisor 160",
    ):
        assert words in text
    assert "at least no limit" not in text


def test_explain_traces_a_figure_to_its_file_and_row(small_campaign: Path) -> None:
    result = run("explain", small_campaign, "ONE", "power_w")
    assert result.returncode == 0
    assert "one-1: 8.75 W ± 0.04 (k = 2); from units.csv, row 2, column power_w" in result.stdout
    assert "mains/one-1.csv" in result.stdout


def test_explain_traces_a_verdict_to_its_clause(small_campaign: Path) -> None:
    result = run("explain", small_campaign, "two", "eu-2019-2020-maximum-power", "--json")
    content = json.loads(result.stdout)
    text = " ".join(line for part in content["parts"] for line in part["lines"])
    assert "8.874 W" in text
    assert "Regulation (EU) 2019/2020, Annex II" in text
    assert "lamps.csv, row 3, column declared_power_w" in text


@pytest.mark.parametrize(
    ("words", "hint"),
    [
        (["one", "powerw"], "power_w"),
        (["on", "power_w"], "one"),
        (["one", "eu-2019-2020-maximum-powr"], "eu-2019-2020-maximum-power"),
    ],
)
def test_explain_suggests_what_was_meant(small_campaign: Path, words: list[str], hint: str) -> None:
    result = run("explain", small_campaign, *words)
    assert result.returncode == 2
    assert hint in result.stderr


def test_wrong_use_exits_with_2(tmp_path: Path, small_campaign: Path) -> None:
    (tmp_path / "mine").mkdir()
    (tmp_path / "mine" / "thesis.txt").write_text("x", encoding="utf-8")
    assert run("check", tmp_path / "nowhere").returncode == 2
    assert run("issue", small_campaign, "--jobs", "0").returncode == 2
    result = run("issue", small_campaign, "--to", tmp_path / "mine", "--no-pdf")
    assert result.returncode == 2
    assert "not issued by lampassay" in result.stderr


def test_start_makes_a_folder_that_check_can_read(tmp_path: Path) -> None:
    folder = tmp_path / "new"
    result = run("start", folder)
    assert result.returncode == 0
    assert str(folder / "campaign.toml") in result.stdout.splitlines()
    checked = run("check", folder, "--json")
    assert checked.returncode == 1
    problems = json.loads(checked.stdout)["problems"]
    assert all(item["level"] == "error" for item in problems)
    assert {(item["file"], item["column"]) for item in problems} == {
        ("campaign.toml", "campaign.title"),
        ("lamps.csv", None),
        ("units.csv", None),
    }


def test_start_takes_nothing_over(tmp_path: Path) -> None:
    (tmp_path / "mine.txt").write_text("x", encoding="utf-8")
    result = run("start", tmp_path)
    assert result.returncode == 2
    assert "not empty" in result.stderr


def test_every_example_of_a_new_campaign_is_right(tmp_path: Path, small_campaign: Path) -> None:
    run("start", tmp_path / "new")
    text = (tmp_path / "new" / "campaign.toml").read_text(encoding="utf-8")
    examples = [
        line.removeprefix("# ")
        for line in text.splitlines()
        if re.match(r"# (\[|[a-z_]+ = )", line)
    ]
    (small_campaign / "campaign.toml").write_text(
        '[campaign]\ntitle = "All examples"\n' + "\n".join(examples), encoding="utf-8"
    )
    result = run("check", small_campaign)
    assert result.returncode == 0, result.stdout
