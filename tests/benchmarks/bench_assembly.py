"""Assembly of a campaign of ``units.csv`` alone, against reading the same file with plain csv.

Run: python -m tests.benchmarks.bench_assembly, or as a file from the top folder.

Prints the time to read and check the campaign and to assemble all its figures, each beside the
time that the csv module of the standard library takes for the bare cells, both in the same run.
"""

from __future__ import annotations

import csv
import sys
import tempfile
from pathlib import Path
from time import perf_counter

sys.path.insert(0, str(Path(__file__).resolve().parents[2]))

import numpy as np

from generator.intake import read_campaign
from generator.metrics import figures_of

LAMPS = 1000
UNITS = 5
QUANTITIES = {
    "luminous_flux_lm": (806.0, 10.0, 1),
    "power_w": (8.0, 0.1, 3),
    "voltage_v": (230.0, 0.01, 2),
    "current_a": (0.04, 0.0004, 5),
    "power_factor": (0.88, 0.005, 4),
    "displacement_factor": (0.93, 0.005, 4),
    "cct_k": (2700.0, 20.0, 0),
    "ra": (82.0, 0.5, 1),
    "r9": (12.0, 1.0, 1),
    "percent_flicker": (8.0, 0.2, 2),
    "svm": (0.2, 0.01, 3),
    "pst_lm": (0.1, 0.01, 3),
}
CAMPAIGN = """[campaign]
title = "Benchmark"

[uncertainty]
luminous_flux_lm = "2 %"
power_w = "0.5 %"
voltage_v = "0.1 %"
current_a = "0.3 %"
"""


def write_campaign(folder: Path) -> Path:
    """Write the campaign and give the path of its ``units.csv``."""
    rng = np.random.default_rng(1)
    (folder / "campaign.toml").write_text(CAMPAIGN, encoding="utf-8")
    lamps = ["lamp_id,bidder,model,directional,mains,declared_cct_k"]
    lamps += [f"lamp-{i},Bidder,Model {i},no,yes,2700" for i in range(LAMPS)]
    (folder / "lamps.csv").write_text("\n".join(lamps) + "\n", encoding="utf-8")
    rows = [",".join(("unit_id", "lamp_id", *QUANTITIES))]
    for lamp in range(LAMPS):
        for unit in range(UNITS):
            cells = (
                f"{middle + spread * rng.standard_normal():.{decimals}f}"
                for middle, spread, decimals in QUANTITIES.values()
            )
            rows.append(",".join((f"lamp-{lamp}-{unit}", f"lamp-{lamp}", *cells)))
    units = folder / "units.csv"
    units.write_text("\n".join(rows) + "\n", encoding="utf-8")
    return units


def plain_csv(units: Path) -> int:
    """Read every cell as the standard library does, numbers as floats."""
    with units.open(encoding="utf-8", newline="") as file:
        rows = csv.reader(file)
        next(rows)
        return sum(len([float(cell) for cell in row[2:]]) for row in rows)


def main() -> None:
    """Print the times and their ratios."""
    with tempfile.TemporaryDirectory() as name:
        units = write_campaign(Path(name))
        plain_csv(units)
        start = perf_counter()
        cells = plain_csv(units)
        plain = perf_counter() - start
        start = perf_counter()
        campaign = read_campaign(Path(name))
        read = perf_counter() - start
    figures_of(campaign)
    start = perf_counter()
    figures = figures_of(campaign)
    assembled = perf_counter() - start
    print(f"{LAMPS} lamps, {LAMPS * UNITS} units, {cells} numbers, {len(figures)} figures")
    print(f"plain csv    {plain:7.3f} s")
    print(f"read, check  {read:7.3f} s  {read / plain:6.1f} times")
    print(f"assemble     {assembled:7.3f} s  {assembled / plain:6.1f} times")


if __name__ == "__main__":
    main()
