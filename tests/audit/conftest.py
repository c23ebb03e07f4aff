"""A small campaign of two bidders, and issues of it that tests may look at or copy and damage."""

from __future__ import annotations

import gzip
import shutil
from pathlib import Path

import numpy as np
import pytest

from generator import pipeline

CAMPAIGN_TOML = """\
[campaign]
title = "Lamps for the Moorgarth school"
reference = "MG-1"
client = "Moorgarth Trust (invented)"
purpose = "Comparison for the Moorgarth Trust."
assessment_date = 2026-03-02
spectra_unit = "W/nm"

[laboratory]
name = "Fellside Photometry (invented)"
address = "2 Gauge Lane (invented)"

[uncertainty]
luminous_flux_lm = "1.5 %"
power_w = "0.4 %"
ra = 0.6

[[clause]]
id = "mg-efficacy"
title = "Efficacy that Veldrune and all others must reach"
quantity = "efficacy_lm_per_w"
unit = "lm/W"
comparison = "at least"
value = 100
source = { act = "MG-1", annex = "Specification", point = "1" }
"""
TENDER_TOML = """
[use]
hours_per_year = 1800
tariff_per_kwh = 0.24
currency = "EUR"
"""
LAMPS_CSV = """\
lamp_id,bidder,model,cap,technology,directional,mains,connected,declared_luminous_flux_lm,\
declared_power_w,declared_cct_k,declared_ra,declared_svm,declared_energy_class,unit_price,\
currency,quantity
veldrune-a60,Veldrune Lighting,Veldrune Meridian 8,E27,LED,no,yes,no,806,6.5,4000,80,0.44,D,4.37,\
EUR,120
plain-t8,"Ostrelle, Lamps",Tube 15,G13,LED,no,yes,no,2100,15.0,4000,80,0.3,E,9.83,EUR,40
"""
UNITS_CSV = """\
unit_id,lamp_id,luminous_flux_lm,power_w,displacement_factor
veldrune-a60-1,veldrune-a60,812.0,6.42,0.95
veldrune-a60-2,veldrune-a60,803.5,6.51,0.96
plain-t8-1,plain-t8,2130,14.9,0.97
"""


def spectrum_csv(units: list[str], scale: float) -> str:
    """A blue peak and a broad one, as a phosphor lamp has; invented."""
    wavelength = np.arange(380, 781, 5)
    blue = np.exp(-(((wavelength - 450) / 12) ** 2))
    broad = 0.8 * np.exp(-(((wavelength - 570) / 70) ** 2))
    lines = [",".join(["wavelength_nm", *units])]
    for place, value in zip(wavelength, scale * (blue + broad), strict=True):
        lines.append(
            ",".join([str(place), *(f"{value * (1 + n / 50):.6f}" for n in range(len(units)))])
        )
    return "\n".join(lines) + "\n"


def light_csv(units: list[str]) -> str:
    """A tenth of a second of light that ripples at 100 Hz; invented."""
    time = np.arange(2000) / 20_000
    light = 1 + 0.1 * np.sin(2 * np.pi * 100 * time)
    rows = (
        f"{t:.5f}," + ",".join([f"{v:.5f}"] * len(units)) for t, v in zip(time, light, strict=True)
    )
    return "\n".join([",".join(["time_s", *units]), *rows]) + "\n"


def write_campaign(folder: Path) -> Path:
    """Write the small campaign."""
    for name in ("spectra", "light", "notes"):
        (folder / name).mkdir(parents=True)
    (folder / "campaign.toml").write_text(CAMPAIGN_TOML)
    (folder / "lamps.csv").write_text(LAMPS_CSV)
    (folder / "units.csv").write_text(UNITS_CSV)
    units = ["veldrune-a60-1", "veldrune-a60-2"]
    (folder / "spectra" / "veldrune-a60.csv").write_text(spectrum_csv(units, 0.02))
    (folder / "spectra" / "plain-t8.csv").write_text(spectrum_csv(["plain-t8-1"], 0.05))
    packed = gzip.compress(light_csv(units).encode(), mtime=0)
    (folder / "light" / "veldrune-a60.csv.gz").write_bytes(packed)
    (folder / "notes" / "veldrune-a60.md").write_text("Seen at Veldrune, 3 March.\n")
    (folder / "notes" / "campaign.md").write_text("The Moorgarth Trust asked for this.\n")
    return folder


@pytest.fixture(scope="session")
def campaign_folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return write_campaign(tmp_path_factory.mktemp("content") / "moorgarth")


@pytest.fixture(scope="session")
def tender_folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The same campaign with what a comparison of bids needs."""
    folder = write_campaign(tmp_path_factory.mktemp("tenders") / "moorgarth")
    (folder / "campaign.toml").write_text(CAMPAIGN_TOML + TENDER_TOML)
    return folder


@pytest.fixture(scope="session")
def pristine(tmp_path_factory: pytest.TempPathFactory, campaign_folder: Path) -> Path:
    """An issue with PDF, its public edition and its archive; not to be changed."""
    place = tmp_path_factory.mktemp("issued") / "moorgarth"
    pipeline.issue(
        campaign_folder, target=place, jobs=2, public=True, archive=place.with_suffix(".zip")
    )
    return place


@pytest.fixture
def issued(pristine: Path, tmp_path: Path) -> Path:
    """A copy of the issue that a test may damage."""
    return Path(shutil.copytree(pristine, tmp_path / "moorgarth"))


@pytest.fixture
def issued_public(pristine: Path, tmp_path: Path) -> Path:
    """A copy of the public edition that a test may damage."""
    return Path(shutil.copytree(f"{pristine}-public", tmp_path / "moorgarth-public"))
