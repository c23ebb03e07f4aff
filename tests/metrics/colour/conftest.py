"""Spectra and published values for the colour tests; colour-science is imported in one place."""

from __future__ import annotations

import csv
import warnings
from pathlib import Path

import numpy as np
import pytest

PUBLISHED = Path(__file__).parents[2] / "published"


@pytest.fixture(scope="session")
def colour_science():
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # optional plotting libraries are not installed
        import colour
    return colour


@pytest.fixture(scope="session")
def illuminant_spectrum(colour_science):
    """Spectrum of a CIE illuminant at 5 nm, 380 nm to 780 nm."""

    def spectrum(name):
        shape = colour_science.SpectralShape(380, 780, 5)
        return colour_science.SDS_ILLUMINANTS[name].copy().trim(shape).values

    return spectrum


@pytest.fixture(scope="session")
def published_rows():
    """Rows of a file in tests/published."""

    def rows(name):
        with (PUBLISHED / name).open(encoding="utf-8", newline="") as stream:
            return list(csv.DictReader(stream))

    return rows


@pytest.fixture(scope="session")
def led_spectra():
    """Measured LED spectra: wavelengths and (series, w)."""
    table = np.loadtxt(PUBLISHED / "led_spectra.csv", delimiter=",", skiprows=1)
    return table[:, 0], table[:, 1:].T.copy()
