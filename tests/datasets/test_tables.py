"""Shipped tables: nothing changed by accident, heads complete, spot values of the documents."""

from __future__ import annotations

import hashlib
import re

import numpy as np
import pytest

from generator.datasets import reference_table, sources, table_names
from generator.datasets import spectral_tables as tables
from generator.datasets.tables import FOLDER, HEAD_KEYS

TABLES = {
    "blue_light_hazard_2006": (
        28,
        "2a49cc888450e200b15e21c188ea8416aa4cc3eb690c79f4bdb7d0675f2cabbb",
    ),
    "colour_evaluation_samples_2018": (
        81,
        "41f601ab1ca3d04d54e4fc6915142d6368515afcce076d9051a9516c38e37f4f",
    ),
    "colour_matching_10_degree_1964": (
        471,
        "433c206fafbcc51818e04995e06be724eb9aab3bcab29c4499133f33d00096f5",
    ),
    "colour_matching_2_degree_1931": (
        471,
        "5e9126c3f95d87906984f6d88c2002aba57b1d2b694b571dbeeb15626c9c8262",
    ),
    "daylight_components_2018": (
        107,
        "68149e333d0892fb5796b0378a80dc7bee000da46218f60e0fd5c084be396ff7",
    ),
    "melanopic_action_spectrum_2018": (
        401,
        "aa5e7db977702d9c8760c087aa88cfbf77104cd69a363312505d7992f70999df",
    ),
    "nominal_colours_ansi_c78_377_2008": (
        8,
        "fcc8c628da242ca02d7083bcc89cdaf6623d7411dbc923ae50ea81c01b48c597",
    ),
    "nominal_colours_ansi_c78_377_2017": (
        10,
        "12785b4a57418427a68f12d098f63c21e99e7df8c0582f3e31b8c0e8a07b7998",
    ),
    "scotopic_efficiency_1951": (
        401,
        "5d9009a7fe8c219d337ecd2366523f8805bd0150553e4b5b0a9b27788beb1ab2",
    ),
    "skin_sample_2024": (
        81,
        "03d55d153a18ba2f8ab5506901e4de98b47f701f19a61b90d6e6b29d469cf114",
    ),
    "standard_colours_iec_60081_1997": (
        6,
        "f22c6852054edce0d902f57d2f6b5d4ca870ccf92ce6cfe5ff3f6d3a8d1afdbe",
    ),
    "test_colour_samples_1995": (
        95,
        "bb0871b03a827f84ae496f8aff3394137b4f51c9603d6597c3c171a9c5ac6c35",
    ),
}


def test_every_table_is_listed_here_and_in_the_readme():
    readme = (FOLDER / "README.md").read_text(encoding="utf-8")
    sections = set(re.findall(r"^## (\w+)$", readme, re.MULTILINE))
    assert set(table_names()) == set(TABLES)
    assert set(TABLES) == sections


@pytest.mark.parametrize("name", sorted(TABLES))
def test_rows_checksum_and_head(name):
    rows, checksum = TABLES[name]
    assert hashlib.sha256((FOLDER / f"{name}.csv").read_bytes()).hexdigest() == checksum
    table = reference_table(name)
    assert table.values.shape == (rows, len(table.columns))
    assert np.isfinite(table.values).all()
    assert tuple(table.head) == HEAD_KEYS
    assert table.head["source"] in sources()
    assert re.fullmatch(r"\d{4}-\d{2}-\d{2}", table.head["retrieved on"])
    assert reference_table(name) is table
    assert not table.values.flags.writeable


def test_unknown_table_is_refused():
    with pytest.raises(FileNotFoundError, match="no_such_table"):
        reference_table("no_such_table")


def test_luminous_efficiency_peaks_at_one():
    # CIE: V(555 nm) = 1, V'(507 nm) = 1, both by definition
    photopic = tables.colour_matching_2_degree()[1]
    assert tables.OBSERVER_WAVELENGTH_NM[photopic.argmax()] == 555
    assert photopic.max() == 1.0
    scotopic = tables.scotopic_efficiency()
    assert scotopic[507 - 360] == scotopic.max() == 1.0


def test_equal_energy_is_achromatic():
    # CIE 15: the sums of the three functions are equal, so E lies at 1/3, 1/3 (to 0.0001)
    for cmfs in (tables.colour_matching_2_degree(), tables.colour_matching_10_degree()):
        total = cmfs.sum(axis=1)
        np.testing.assert_allclose(total / total.sum(), 1 / 3, atol=1e-4)


def test_melanopic_spectrum_peaks_at_490_nm():
    # CIE S 026: peak at 490 nm, normalised to one
    melanopic = tables.melanopic_action_spectrum()
    assert tables.OBSERVER_WAVELENGTH_NM[melanopic.argmax()] == 490
    assert melanopic.max() == pytest.approx(1.0, abs=1e-4)


def test_blue_light_weighting():
    # IEC 62471:2006 Table 4.2: tabulated points, formula 10^((450 - nm)/50), zero outside
    nm = np.array([299.0, 300, 379, 385, 440, 480, 495, 500, 530, 600, 650, 700, 701])
    expected = [0, 0.01, 0.01, 0.013, 1, 0.45, 0.16, 0.1, 10**-1.6, 0.001, 0.001, 0.001, 0]
    np.testing.assert_allclose(tables.blue_light_hazard(nm), expected, rtol=1e-12)


def test_sample_tables_share_their_wavelengths():
    count = tables.SAMPLE_WAVELENGTH_NM.size
    assert tables.colour_rendering_samples().shape == (15, count)
    assert tables.colour_evaluation_samples().shape == (99, count)
    assert tables.daylight_components().shape == (3, count)


def test_tables_equal_their_origin():
    # colour-science 0.4.7: spot rows of every table taken from it
    import warnings

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # optional plotting libraries are not installed
        import colour
        from colour.quality.datasets.tcs import SDS_TCS
    cmfs = colour.MSDS_CMFS["CIE 1931 2 Degree Standard Observer"]
    np.testing.assert_allclose(tables.colour_matching_2_degree(), cmfs.values.T, rtol=1e-11)
    shape = colour.SpectralShape(380, 780, 5)
    for found, sample in zip(
        tables.colour_rendering_samples(), SDS_TCS["CIE 2024"].values(), strict=True
    ):
        np.testing.assert_array_equal(found, sample.copy().trim(shape).values)
