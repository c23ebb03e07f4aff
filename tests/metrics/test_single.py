"""Figures of single records: all there, in order, and quick to come by."""

import json
import subprocess
import sys

import numpy as np
import pytest

from generator.metrics.single import named_figures, record_figures
from generator.quantities import QUANTITIES
from generator.records.raw import LightRecord, MainsCapture, SpectrumSet

NM = np.arange(380.0, 781.0)
WHITE = np.exp(-0.5 * ((NM - 450) / 9) ** 2) + 0.9 * np.exp(-0.5 * ((NM - 590) / 52) ** 2)
TIME = np.arange(20000) / 20000
TURN = 2 * np.pi * 50 * TIME[:4000]

RECORDS = {
    "spectrum": SpectrumSet("L1", ("a", "b"), NM, np.stack([WHITE, 0 * WHITE]), "W/nm", "s.csv"),
    "light": LightRecord(
        "L1", ("a",), 20000.0, 1 + 0.2 * np.sin(2 * np.pi * 100 * TIME)[None], False, "l.csv"
    ),
    "mains": MainsCapture("U1", 20000.0, 325 * np.sin(TURN), 0.05 * np.sin(TURN), "m.csv"),
}


def rows(kind):
    record = RECORDS[kind]
    names = ("U1",) if kind == "mains" else record.unit_ids
    return named_figures(names, record_figures(record))


def test_every_figure_has_a_number_or_a_reason_in_the_order_of_the_catalogue():
    for kind in RECORDS:
        for row in rows(kind):
            assert list(row["figures"]) == [name for name in QUANTITIES if name in row["figures"]]
            blank = {name for name, number in row["figures"].items() if number is None}
            assert blank == set(row["reasons"])
            assert all(row["reasons"].values())
            json.dumps(row, allow_nan=False)
    assert rows("spectrum")[1]["figures"]["x"] is None
    assert rows("spectrum")[0]["figures"]["x"] == pytest.approx(0.400, abs=5e-4)


def test_quantities_of_the_three_kinds():
    groups = {
        kind: {QUANTITIES[name].group for name in rows(kind)[0]["figures"]} for kind in RECORDS
    }
    assert groups["spectrum"] == {"photometric", "colour", "rendering", "radiometric"}
    assert groups["light"] == {"modulation"}
    assert groups["mains"] == {"electrical", "harmonics"}


SHORT = """
import sys
import numpy as np
from generator.metrics.single import record_figures
from generator.records.raw import LightRecord, MainsCapture, SpectrumSet
nm, time = np.arange(380.0, 781.0), np.arange(20000) / 20000
turn = 2 * np.pi * 50 * time[:4000]
light = 1 + 0.2 * np.sin(2 * np.pi * 100 * time)[None]
record_figures(SpectrumSet("L1", ("a",), nm, np.exp(-(((nm - 580) / 90) ** 2))[None], "W/nm", "s"))
record_figures(LightRecord("L1", ("a",), 20000.0, light, False, "l"))
record_figures(MainsCapture("U1", 20000.0, 325 * np.sin(turn), 0.05 * np.sin(turn), "m"))
print(sorted({name.partition(".")[0] for name in sys.modules} & {"scipy", "pandas", "colour"}))
"""


def test_short_records_load_no_heavy_library():
    # scipy alone takes longer to import than the whole command may take on one small file
    run = subprocess.run([sys.executable, "-c", SHORT], capture_output=True, text=True, check=True)
    assert run.stdout.strip() == "[]"
