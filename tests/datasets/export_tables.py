"""Write the tables of ``generator/datasets`` that come from open packages.

Run by hand, from the root of the checkout, when a table has to be made again::

    python tests/datasets/export_tables.py CIES026.csv RETRIEVED-ON

It needs colour-science 0.4.7 and the file ``pysilsub/data/CIES026.csv`` of pysilsub 0.1.1. The
numbers are written as their origin holds them; nothing is interpolated or rounded.
"""

from __future__ import annotations

import csv
import sys
import warnings
from collections.abc import Iterable, Sequence
from pathlib import Path

import numpy as np

DATASETS = Path(__file__).resolve().parents[2] / "generator" / "datasets"
COLOUR = "BSD-3-Clause, from colour-science 0.4.7"
PYSILSUB = "MIT, from pysilsub 0.1.1, copyright (c) 2021 PySilentSubstitution"


def write_table(
    name: str, head: dict[str, str], columns: Sequence[str], rows: Iterable[Sequence[float]]
) -> None:
    """Write one table with its comment head."""
    lines = [f"# {key}: {value}" for key, value in head.items()]
    lines.append(",".join(columns))
    lines += [",".join(f"{number:.12g}" for number in row) for row in rows]
    (DATASETS / f"{name}.csv").write_text("\n".join(lines) + "\n", encoding="utf-8")
    print(name, len(lines) - len(head) - 1)


def head(source: str, edition: str, licence: str, interval: str, retrieved: str) -> dict[str, str]:
    """Comment head in the order of the README."""
    return {
        "source": source,
        "edition": edition,
        "licence": licence,
        "interval": interval,
        "retrieved on": retrieved,
    }


def export_colour_science(retrieved: str) -> None:
    """Observers, scotopic efficiency, samples and daylight components."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # optional plotting libraries are not installed
        import colour
        from colour.colorimetry import SDS_LEFS_SCOTOPIC
        from colour.quality.cfi2017 import load_TCS_CIE2017
        from colour.quality.datasets.tcs import SDS_TCS

    for name, key, edition in (
        ("colour_matching_2_degree_1931", "CIE 1931 2 Degree Standard Observer", "CIE 1931"),
        ("colour_matching_10_degree_1964", "CIE 1964 10 Degree Standard Observer", "CIE 1964"),
    ):
        cmfs = colour.MSDS_CMFS[key]
        write_table(
            name,
            head("iso_cie_11664_1", edition, COLOUR, "1 nm", retrieved),
            ("wavelength_nm", "x_bar", "y_bar", "z_bar"),
            np.column_stack([cmfs.wavelengths, cmfs.values]),
        )
    scotopic = SDS_LEFS_SCOTOPIC["CIE 1951 Scotopic Standard Observer"]
    write_table(
        "scotopic_efficiency_1951",
        head("cie_191", "CIE 1951", COLOUR, "1 nm", retrieved),
        ("wavelength_nm", "v_prime"),
        np.column_stack([scotopic.wavelengths, scotopic.values]),
    )
    samples = list(SDS_TCS["CIE 2024"].values())
    write_table(
        "test_colour_samples_1995",
        head("cie_13_3", "1995", COLOUR, "5 nm", retrieved),
        ("wavelength_nm", *(f"tcs{i:02d}" for i in range(1, 15))),
        np.column_stack([samples[0].wavelengths, *(sample.values for sample in samples[:14])]),
    )
    write_table(
        "skin_sample_2024",
        head("jis_z_8726", "CIE data set of 2024", COLOUR, "5 nm", retrieved),
        ("wavelength_nm", "skin"),
        np.column_stack([samples[14].wavelengths, samples[14].values]),
    )
    evaluation = load_TCS_CIE2017(colour.SpectralShape(380, 780, 5))
    write_table(
        "colour_evaluation_samples_2018",
        head("ies_tm_30_18", "TM-30-18 = CIE 224:2017", COLOUR, "5 nm", retrieved),
        ("wavelength_nm", *(f"ces{i:02d}" for i in range(1, 100))),
        np.column_stack([evaluation.wavelengths, evaluation.values]),
    )
    basis = colour.colorimetry.SDS_BASIS_FUNCTIONS_CIE_ILLUMINANT_D_SERIES
    write_table(
        "daylight_components_2018",
        head("cie_15", "2018", COLOUR, "5 nm", retrieved),
        ("wavelength_nm", "s0", "s1", "s2"),
        np.column_stack([basis["S0"].wavelengths, *(basis[k].values for k in ("S0", "S1", "S2"))]),
    )


def export_melanopic(file: Path, retrieved: str) -> None:
    """Melanopic action spectrum."""
    with file.open(encoding="utf-8", newline="") as stream:
        rows = [
            (float(row["Wavelength"]), float(row["mel"]))
            for row in csv.DictReader(stream)
            if row["Wavelength"]
        ]
    write_table(
        "melanopic_action_spectrum_2018",
        head("cie_s026", "2018", PYSILSUB, "1 nm", retrieved),
        ("wavelength_nm", "s_mel"),
        rows,
    )


if __name__ == "__main__":
    export_colour_science(sys.argv[2])
    export_melanopic(Path(sys.argv[1]), sys.argv[2])
