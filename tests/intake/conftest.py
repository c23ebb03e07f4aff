from __future__ import annotations

from pathlib import Path

import pytest

CAMPAIGN = """\
[campaign]
title = "Lamps for the reading rooms"
reference = "RR-7"
assessment_date = 2025-06-01
spectra_unit = "W/nm"

[laboratory]
name = "House laboratory"
methods = ["sphere of 1.5 m"]

[supply]
voltage_v = 230
frequency_hz = 50

[uncertainty]
luminous_flux_lm = "2.5 %"
ra = 0.6
cct_k = { absolute = 30 }
wavelength_scale_nm = 0.3

[use]
hours_per_year = 2000
tariff_per_kwh = 0.31
currency = "EUR"
baseline_lamp = "L1"

[[award.criteria]]
quantity = "efficacy_lm_per_w"
weight_percent = 60
better = "higher"

[[award.criteria]]
quantity = "svm"
weight_percent = 40
better = "lower"

[[clause]]
quantity = "ra"
value = 90.5
"""

LAMPS = """\
lamp_id,bidder,model,directional,declared_luminous_flux_lm,declared_power_w,declared_energy_class,unit_price,currency,quantity,report_date,placed_on_market
L1,Birch,One,no,806,8.50,E,3.20,EUR,100,2025-01-31,2024-05-01
L2,Cedar,Two,yes,345,4.9,F,4.10,EUR,100,2025-02-28,
"""

UNITS = """\
unit_id,lamp_id,luminous_flux_lm,u_luminous_flux_lm,power_w,x,y
L1-1,L1,811,16,8.41,0.4578,0.4101
L1-2,L1,799.0,16,8.46,,
L2-1,L2,,,4.88,,
"""

SPECTRUM = """\
wavelength_nm,L1-1,L1-2
380,0.0,0.0001
480,0.011,0.012
580,0.020,0.021
680,0.009,0.008
780,-0.0001,0.0
"""

INTENSITY = """\
c_deg,gamma_deg,intensity_cd
0,0,100
0,45,70
0,90,0
90,0,100
90,45,72
90,90,0
"""

ENDURANCE = """\
lamp_id,unit_id,hours_h,luminous_flux_lm,operational,x,y
L1,L1-1,0,811,yes,0.4578,0.4101
L1,L1-1,3600,780,yes,0.4581,0.4102
L1,L1-2,0,799,yes,,
L1,L1-2,3600,,no,,
"""


def waveform(heading: str, *series: str) -> str:
    rows = [
        ",".join([f"{i * 0.00005:.5f}", *(text[i % 2 :: 2] for text in series)]) for i in range(120)
    ]
    return "\n".join([heading, *rows, ""])


@pytest.fixture
def intake_campaign(tmp_path: Path) -> Path:
    """A small campaign with every kind of file and nothing wrong."""
    folder = tmp_path / "reading-rooms"
    for name, text in {
        "campaign.toml": CAMPAIGN,
        "lamps.csv": LAMPS,
        "units.csv": UNITS,
        "spectra/L1.csv": SPECTRUM,
        "light/L1.csv": waveform("time_s,L1-1,L1-2", "12", "34"),
        "mains/L1-1.csv": waveform("time_s,voltage_v,current_a", "12", "34"),
        "intensity/L2-1.csv": INTENSITY,
        "endurance.csv": ENDURANCE,
        "notes/L1.md": "Warm at the base.\n",
        "notes/campaign.md": "All units bought in shops.\n",
    }.items():
        path = folder / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(text, encoding="utf-8")
    return folder
