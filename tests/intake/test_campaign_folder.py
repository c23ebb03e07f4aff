from __future__ import annotations

import gzip
import hashlib
import os
import subprocess
import sys
from datetime import date
from decimal import Decimal
from pathlib import Path

import numpy as np
import pytest

from generator.errors import DataProblems
from generator.intake import check_campaign, read_campaign


def _errors(folder: Path) -> list[str]:
    return [f"{p.file}|{p.row}|{p.column}" for p in check_campaign(folder) if p.level == "error"]


def _warnings(folder: Path) -> list[tuple[str, str]]:
    return [(p.file, p.expected) for p in check_campaign(folder) if p.level == "warning"]


def test_a_good_campaign_is_read_whole(intake_campaign: Path) -> None:
    campaign = read_campaign(intake_campaign)
    assert campaign.name == "reading-rooms"
    assert campaign.warnings == ()
    assert [lamp.lamp_id for lamp in campaign.lamps] == ["L1", "L2"]
    assert [unit.unit_id for unit in campaign.units] == ["L1-1", "L1-2", "L2-1"]
    one, two = campaign.lamps
    assert str(one.declared["power_w"]) == "8.50"
    assert one.declared_energy_class == "E"
    assert one.placed_on_market == date(2024, 5, 1)
    assert one.offer.unit_price == Decimal("3.20")
    assert one.offer.quantity == 100
    assert one.row == 2
    # EU 2019/2015 Annex I(15): the flux of a directional lamp is its useful flux.
    assert "luminous_flux_lm" in one.declared
    assert two.declared["useful_luminous_flux_lm"] == 345
    assert "luminous_flux_lm" not in two.declared
    unit = campaign.units[1]
    assert str(unit.reported["luminous_flux_lm"]) == "799.0"
    assert unit.expanded_uncertainty == {"luminous_flux_lm": Decimal(16)}
    assert "x" not in unit.reported
    spectra = campaign.spectra[0]
    assert spectra.unit == "W/nm"
    assert spectra.unit_ids == ("L1-1", "L1-2")
    np.testing.assert_array_equal(spectra.wavelength_nm, [380, 480, 580, 680, 780])
    np.testing.assert_array_equal(spectra.values[1], [0.0001, 0.012, 0.021, 0.008, 0.0])
    assert campaign.light[0].sampling_rate_hz == pytest.approx(20000, rel=1e-12)
    assert campaign.light[0].values.shape == (2, 120)
    assert not campaign.light[0].long
    assert campaign.mains[0].unit_id == "L1-1"
    np.testing.assert_array_equal(campaign.mains[0].current_a[:3], [3, 4, 3])
    np.testing.assert_array_equal(campaign.intensity[0].intensity_cd, [[100, 70, 0], [100, 72, 0]])
    assert [r.operational for r in campaign.endurance] == [True, True, True, False]
    assert campaign.endurance[3].luminous_flux_lm is None
    assert campaign.endurance[3].row == 5
    assert campaign.notes == {
        "L1": "Warm at the base.\n",
        "campaign": "All units bought in shops.\n",
    }
    assert campaign.settings.use.tariff_per_kwh == Decimal("0.31")
    assert campaign.settings.clause[0]["value"] == Decimal("90.5")


def test_every_file_read_is_listed_with_size_and_checksum(intake_campaign: Path) -> None:
    files = read_campaign(intake_campaign).files
    paths = [path for path in intake_campaign.rglob("*") if path.is_file()]
    assert [file.path for file in files] == sorted(
        path.relative_to(intake_campaign).as_posix() for path in paths
    )
    for file in files:
        data = (intake_campaign / file.path).read_bytes()
        assert (file.size, file.sha256) == (len(data), hashlib.sha256(data).hexdigest())


def test_compressed_tables_read_the_same(intake_campaign: Path) -> None:
    plain = read_campaign(intake_campaign)
    for path in list(intake_campaign.rglob("*.csv")):
        packed = gzip.compress(path.read_bytes(), mtime=0)
        path.with_name(path.name + ".gz").write_bytes(packed)
        path.unlink()
    campaign = read_campaign(intake_campaign)
    assert campaign.lamps == plain.lamps
    assert campaign.units == plain.units
    assert campaign.endurance == plain.endurance
    np.testing.assert_array_equal(campaign.spectra[0].values, plain.spectra[0].values)
    entry = next(file for file in campaign.files if file.path == "units.csv.gz")
    data = (intake_campaign / "units.csv.gz").read_bytes()
    assert (entry.size, entry.sha256) == (len(data), hashlib.sha256(data).hexdigest())


def test_plain_and_compressed_together_are_refused(intake_campaign: Path) -> None:
    for name in ("units.csv", "spectra/L1.csv"):
        path = intake_campaign / name
        path.with_name(path.name + ".gz").write_bytes(gzip.compress(path.read_bytes()))
    assert _errors(intake_campaign) == [
        "spectra/L1.csv.gz|None|None",
        "units.csv.gz|None|None",
    ]


def test_all_mistakes_of_all_files_are_named_at_once(intake_campaign: Path) -> None:
    for name, old, new in [
        ("campaign.toml", "voltage_v = 230", "voltage_v = -1"),
        ("campaign.toml", "hours_per_year", "hours_per_yaer"),
        ("lamps.csv", "8.50", "8.50 W"),
        ("lamps.csv", "2025-02-28", "28/02/2025"),
        ("units.csv", "8.46", "-8.46"),
        ("units.csv", "L2-1,L2", "L2-1,L7"),
        ("spectra/L1.csv", "0.020", "n/a"),
        ("spectra/L1.csv", "680", "580"),
        ("light/L1.csv", "0.00300,1", "0.00300,"),
        ("mains/L1-1.csv", "0.00300,", "0.00302,"),
        ("intensity/L2-1.csv", "90,45,72", "90,45,-72"),
        ("endurance.csv", ",no,", ",broken,"),
    ]:
        path = intake_campaign / name
        text = path.read_text("utf-8")
        assert old in text
        path.write_text(text.replace(old, new, 1), "utf-8")
    assert _errors(intake_campaign) == [
        "campaign.toml|12|supply.voltage_v",
        "campaign.toml|22|use.hours_per_yaer",
        "lamps.csv|2|declared_power_w",
        "lamps.csv|3|report_date",
        "units.csv|3|power_w",
        "units.csv|4|lamp_id",
        "spectra/L1.csv|4|L1-1",
        "spectra/L1.csv|5|wavelength_nm",
        "light/L1.csv|62|L1-1",
        "endurance.csv|5|operational",
        "mains/L1-1.csv|62|time_s",
        "intensity/L2-1.csv|6|intensity_cd",
    ]


def test_units_that_only_raw_files_name_follow(intake_campaign: Path) -> None:
    (intake_campaign / "units.csv").unlink()
    (intake_campaign / "intensity" / "L2-1.csv").unlink()
    units = read_campaign(intake_campaign).units
    assert [(unit.unit_id, unit.lamp_id, unit.row) for unit in units] == [
        ("L1-1", "L1", 0),
        ("L1-2", "L1", 0),
    ]


def test_a_mains_file_of_a_unit_without_a_lamp_is_refused(intake_campaign: Path) -> None:
    mains = intake_campaign / "mains"
    (mains / "L1-1.csv").rename(mains / "L1-9.csv")
    (problem,) = check_campaign(intake_campaign)
    assert (problem.level, problem.file, problem.found) == ("error", "mains/L1-9.csv", "L1-9")
    assert problem.expected in {"L1-1", "L1-2"}


@pytest.mark.parametrize("written", ["l1", "L7", "L 1"])
def test_a_spectrum_file_must_be_named_after_a_lamp(intake_campaign: Path, written: str) -> None:
    spectra = intake_campaign / "spectra"
    (spectra / "L1.csv").rename(spectra / f"{written}.csv")
    errors = [p for p in check_campaign(intake_campaign) if p.level == "error"]
    assert [(p.file, p.row, p.found) for p in errors] == [(f"spectra/{written}.csv", None, written)]


def test_a_campaign_without_measurements_is_refused(intake_campaign: Path) -> None:
    for folder in ("spectra", "light", "mains", "intensity"):
        for path in (intake_campaign / folder).iterdir():
            path.unlink()
    (intake_campaign / "endurance.csv").unlink()
    (intake_campaign / "units.csv").write_text("unit_id,lamp_id,power_w\nL1-1,L1,\nL2-1,L2,\n")
    (problem,) = check_campaign(intake_campaign)
    assert problem.message == "The campaign has no measurements."
    (intake_campaign / "units.csv").write_text("unit_id,lamp_id,power_w\nL1-1,L1,8\nL2-1,L2,\n")
    assert check_campaign(intake_campaign) == ()


def test_required_files_are_asked_for(intake_campaign: Path) -> None:
    (intake_campaign / "campaign.toml").unlink()
    (intake_campaign / "lamps.csv").unlink()
    assert _errors(intake_campaign) == ["campaign.toml|None|None", "lamps.csv|None|None"]


def test_a_folder_that_is_not_there(tmp_path: Path) -> None:
    with pytest.raises(DataProblems, match="There is no such folder"):
        read_campaign(tmp_path / "nowhere")


def test_an_empty_folder(tmp_path: Path) -> None:
    assert _errors(tmp_path) == ["campaign.toml|None|None", "lamps.csv|None|None"]


def test_strangers_are_named_and_hidden_files_are_not(intake_campaign: Path) -> None:
    (intake_campaign / "Unit.csv").write_text("")
    (intake_campaign / "spectra" / "L1.txt").write_text("")
    (intake_campaign / "spectrum").mkdir()
    (intake_campaign / "photographs").mkdir()
    (intake_campaign / "notes" / "L9.md").write_text("Which one?")
    (intake_campaign / ".hidden").write_text("")
    (intake_campaign / "light" / ".hidden.csv").write_text("")
    assert _warnings(intake_campaign) == [
        ("Unit.csv", "units.csv"),
        ("photographs", "the files of the campaign format"),
        ("spectra/L1.txt", "<lamp_id>.csv"),
        ("spectrum", "spectra/"),
        ("notes/L9.md", "a lamp_id of lamps.csv, or campaign"),
    ]
    campaign = read_campaign(intake_campaign)
    assert len(campaign.warnings) == 5
    assert "L9" not in campaign.notes


def test_links_may_not_leave_the_folder(intake_campaign: Path, tmp_path: Path) -> None:
    outside = tmp_path / "outside.csv"
    outside.write_text("unit_id,lamp_id\n")
    (intake_campaign / "endurance.csv").unlink()
    (intake_campaign / "endurance.csv").symlink_to(outside)
    (intake_campaign / "light" / "L2.csv").symlink_to("nowhere.csv")
    assert _errors(intake_campaign) == ["endurance.csv|None|None", "light/L2.csv|None|None"]


def test_links_inside_the_folder_are_followed(intake_campaign: Path) -> None:
    intensity = intake_campaign / "intensity"
    (intensity / "L1-1.csv").symlink_to("L2-1.csv")
    assert [table.unit_id for table in read_campaign(intake_campaign).intensity] == ["L1-1", "L2-1"]


def test_a_pipe_is_not_waited_for(intake_campaign: Path) -> None:
    (intake_campaign / "endurance.csv").unlink()
    os.mkfifo(intake_campaign / "endurance.csv")
    assert _warnings(intake_campaign) == [("endurance.csv", "the files of the campaign format")]


def test_a_lamp_without_units_is_named(intake_campaign: Path) -> None:
    path = intake_campaign / "lamps.csv"
    path.write_text(path.read_text("utf-8") + "L3,Elm,Three,no,,,,,,,,\n", "utf-8")
    (warning,) = read_campaign(intake_campaign).warnings
    assert (warning.file, warning.row, warning.found) == ("lamps.csv", 4, "L3")


def test_a_short_long_record_is_named(intake_campaign: Path) -> None:
    light = intake_campaign / "light"
    (light / "L1.csv").rename(light / "L1.long.csv")
    campaign = read_campaign(intake_campaign)
    assert campaign.light[0].long
    assert campaign.warnings[0].found == "0.006 s"


def test_rows_are_lines_of_the_file(intake_campaign: Path) -> None:
    path = intake_campaign / "lamps.csv"
    heading, one, two = path.read_text("utf-8").strip().split("\n")
    one = one.replace("Birch", '"Birch\nand sons"')
    two = two.replace("4.9", "-4.9")
    path.write_text(f"# made by hand\n\n{heading}\n{one}\n# note\n\n{two}", "utf-8")
    assert _errors(intake_campaign) == ["lamps.csv|8|declared_power_w"]


def test_heavy_libraries_wait_until_they_are_needed() -> None:
    code = (
        "import sys, generator.intake;"
        "print([m for m in ('pandas', 'pydantic', 'scipy') if m in sys.modules])"
    )
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert run.stdout.strip() == "[]"
