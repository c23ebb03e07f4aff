"""Measured spectra of real LED products go in; the sheets show what colour-science gives for them.

Input: tests/published/led_spectra.csv (CC0; provenance in tests/published/README.md). Reference:
colour-science, called spectrum by spectrum: tristimulus values by direct summation on the 5 nm
table, Ohno 2013 for CCT and Duv, CIE 13.3-1995 for Ra.

Tolerance: half the last printed digit, and beside it 0.1 K for CCT, because colour-science sums
the Planckian locus over 360 nm to 780 nm and this program over 360 nm to 830 nm, and 0.1 for Ra,
by which the two ways of interpolating the test colour samples differ (see tests/metrics/colour).
"""

from __future__ import annotations

import csv
from pathlib import Path

import colour
import html5lib
import numpy as np
import pytest

from generator import pipeline

SPECTRA = Path(__file__).parent / "published" / "led_spectra.csv"
COUNT = 48

ROWS = {
    "cct": "correlated colour temperature",
    "duv": "distance from the Planckian locus",
    "ra": "general colour rendering index",
}


def read_spectra() -> tuple[list[str], np.ndarray, np.ndarray]:
    with SPECTRA.open(newline="", encoding="utf-8") as file:
        rows = list(csv.reader(line for line in file if not line.startswith("#")))
    table = np.array(rows[1:], dtype=float)
    step = (table.shape[1] - 1) // COUNT
    chosen = list(range(1, table.shape[1], step))[:COUNT]
    return [rows[0][i] for i in chosen], table[:, 0], table[:, chosen].T


def reference(wavelengths: np.ndarray, values: np.ndarray) -> dict[str, float]:
    shape = colour.SpectralShape(380, 780, 5)
    observer = colour.colorimetry.reshape_msds(
        colour.MSDS_CMFS["CIE 1931 2 Degree Standard Observer"], shape
    )
    tristimulus = colour.sd_to_XYZ(values, observer, shape=shape, method="Integration")
    uv = colour.xy_to_UCS_uv(colour.XYZ_to_xy(tristimulus))
    cct, duv = colour.uv_to_CCT(uv, method="Ohno 2013")
    ra = colour.colour_rendering_index(colour.SpectralDistribution(values, wavelengths))
    return {"cct": float(cct), "duv": float(duv), "ra": float(ra)}


def write_campaign(
    folder: Path, names: list[str], wavelengths: np.ndarray, values: np.ndarray
) -> None:
    (folder / "spectra").mkdir(parents=True)
    (folder / "campaign.toml").write_text(
        '[campaign]\ntitle = "Measured spectra"\nassessment_date = 2026-03-02\n'
        'spectra_unit = "relative"\n',
        encoding="utf-8",
    )
    with (folder / "lamps.csv").open("w", newline="", encoding="utf-8") as file:
        writer = csv.writer(file)
        writer.writerow(["lamp_id", "bidder", "model"])
        writer.writerows([name, "unnamed", name] for name in names)
    for name, spectrum in zip(names, values, strict=True):
        with (folder / "spectra" / f"{name}.csv").open("w", newline="", encoding="utf-8") as file:
            writer = csv.writer(file)
            writer.writerow(["wavelength_nm", f"{name}-unit"])
            writer.writerows(zip(wavelengths, spectrum, strict=True))


def shown(page: Path) -> dict[str, str]:
    """Numbers on a lamp's page, by the label of their row."""
    tree = html5lib.parse(page.read_text(encoding="utf-8"), namespaceHTMLElements=False)
    found: dict[str, str] = {}
    for row in tree.iter("tr"):
        head = row.find("th")
        number = row.find(".//span[@class='number']")
        if head is not None and head.text and number is not None and number.text:
            found.setdefault(head.text.strip(), number.text)
    return found


@pytest.fixture(scope="module")
def issued_folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("real")
    write_campaign(folder / "campaign", *read_spectra())
    return pipeline.issue(folder / "campaign", target=folder / "out", pdf=False).folder


def test_sheets_show_what_colour_science_gives(issued_folder: Path) -> None:
    names, wavelengths, values = read_spectra()
    assert len(names) >= 40
    compared = 0
    for name, spectrum in zip(names, values, strict=True):
        page = shown(issued_folder / "lamps" / f"{name}.html")
        expected = reference(wavelengths, spectrum)
        for key, extra in (("cct", 0.1), ("duv", 0.0), ("ra", 0.1)):
            text = page[ROWS[key]].replace("−", "-").replace("\u202f", "").replace("\xa0", "")
            half = 0.5 * 10.0 ** -len(text.partition(".")[2])
            # One part in ten thousand of the digit: the printed value is itself a rounded one.
            assert abs(float(text) - expected[key]) <= half * 1.0001 + extra, (name, key, text)
            compared += 1
    assert compared == 3 * len(names)
