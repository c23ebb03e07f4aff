"""A small campaign that the tests of the command and of the whole path share."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import numpy as np
import pytest

TOML = """\
[campaign]
title = "Two lamps for a reading room"
reference = "RR-1"
assessment_date = 2026-03-02
spectra_unit = "W/nm"

[laboratory]
name = "Lowmoor bench (invented)"

[supply]
voltage_v = 230
frequency_hz = 50

[uncertainty]
luminous_flux_lm = "2 %"
power_w = "0.5 %"
cct_k = 40
ra = 0.6
"""
LAMPS = """\
lamp_id,bidder,model,cap,technology,directional,mains,connected,colour_tuneable,high_luminance,\
placed_on_market,declared_luminous_flux_lm,declared_power_w,declared_ra,declared_displacement_factor,\
declared_energy_class
one,First bidder,One,E27,LED,no,yes,no,no,no,2025-05-01,806,8.8,80,0.5,F
two,Second bidder,Two,E27,LED,no,yes,no,no,no,2025-05-01,806,8.9,80,0.5,F
"""
UNITS = """\
unit_id,lamp_id,luminous_flux_lm,power_w,displacement_factor,u_power_w
one-1,one,810,8.75,0.62,0.04
one-2,one,802,8.80,0.61,0.04
two-1,two,800,8.95,0.60,0.04
"""


def _spectrum(wavelength_nm: np.ndarray) -> np.ndarray:
    """A phosphor-white spectrum of some 800 lm: a narrow blue band and a broad yellow one."""
    blue = 0.55 * np.exp(-0.5 * ((wavelength_nm - 452) / 9) ** 2)
    return 0.0157 * (blue + np.exp(-0.5 * ((wavelength_nm - 595) / 55) ** 2))


@pytest.fixture(scope="session")
def write_small_campaign() -> Callable[[Path], Path]:
    """Gives a function that writes the small campaign into a folder."""

    def write(folder: Path) -> Path:
        (folder / "spectra").mkdir(parents=True)
        (folder / "light").mkdir()
        (folder / "mains").mkdir()
        (folder / "notes").mkdir()
        (folder / "campaign.toml").write_text(TOML, encoding="utf-8")
        (folder / "lamps.csv").write_text(LAMPS, encoding="utf-8")
        (folder / "units.csv").write_text(UNITS, encoding="utf-8")
        (folder / "notes" / "one.md").write_text("Seen *burning*.\n", encoding="utf-8")
        wavelength = np.arange(380.0, 781.0, 5.0)
        power = _spectrum(wavelength)
        np.savetxt(
            folder / "spectra" / "one.csv",
            np.stack([wavelength, power, 1.01 * power], axis=1),
            fmt="%.6g",
            delimiter=",",
            header="wavelength_nm,one-1,one-2",
            comments="",
        )
        time = np.arange(20_000) / 20_000.0
        light = 1 + 0.25 * np.sin(2 * np.pi * 100 * time)
        np.savetxt(
            folder / "light" / "one.csv",
            np.stack([time, light, light], axis=1),
            fmt=["%.5f", "%.5f", "%.5f"],
            delimiter=",",
            header="time_s,one-1,one-2",
            comments="",
        )
        cycle = np.arange(4_000) / 20_000.0
        voltage = 230 * np.sqrt(2) * np.sin(2 * np.pi * 50 * cycle)
        current = 0.05 * np.sin(2 * np.pi * 50 * cycle - np.pi / 6)
        np.savetxt(
            folder / "mains" / "one-1.csv",
            np.stack([cycle, voltage, current], axis=1),
            fmt=["%.5f", "%.4f", "%.7f"],
            delimiter=",",
            header="time_s,voltage_v,current_a",
            comments="",
        )
        return folder

    return write


@pytest.fixture
def small_campaign(tmp_path: Path, write_small_campaign: Callable[[Path], Path]) -> Path:
    """The small campaign, written for one test."""
    return write_small_campaign(tmp_path / "reading-room")
