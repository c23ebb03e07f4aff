from __future__ import annotations

import gzip
from pathlib import Path

import numpy as np
import pytest

from generator.errors import DataProblems
from generator.intake import read_series
from generator.records.raw import LightRecord, MainsCapture, SpectrumSet


def _wave(heading: str, cells: str, samples: int, rate_hz: int) -> str:
    rows = "".join(f"{i / rate_hz},{cells}\n" for i in range(samples))
    return f"{heading}\n{rows}"


def test_a_spectrum_file(tmp_path: Path) -> None:
    path = tmp_path / "hall lamps.csv"
    path.write_text(
        "wavelength_nm;lamp 1;lamp 2\n" + "".join(f"{nm};0,5;1\n" for nm in range(400, 406))
    )
    series = read_series(path, "W/nm")
    assert (series.kind, series.names) == ("spectrum", ("lamp 1", "lamp 2"))
    assert isinstance(series.record, SpectrumSet)
    assert series.record.unit == "W/nm"
    np.testing.assert_array_equal(series.record.values, [[0.5] * 6, [1.0] * 6])


@pytest.mark.parametrize(("samples", "long"), [(2900, False), (3000, True)])
def test_a_light_file_is_long_from_thirty_seconds(tmp_path: Path, samples: int, long: bool) -> None:
    path = tmp_path / "L1.csv.gz"
    path.write_bytes(gzip.compress(_wave("time_s,a,b", "1,2", samples, 100).encode()))
    series = read_series(path)
    assert (series.kind, series.names) == ("light", ("a", "b"))
    assert isinstance(series.record, LightRecord)
    assert series.record.long is long


def test_a_mains_file_is_one_series(tmp_path: Path) -> None:
    path = tmp_path / "U1.csv"
    path.write_text(_wave("time_s,voltage_v,current_a", "230,0.1", 200, 10_000))
    series = read_series(path)
    assert (series.kind, series.names) == ("mains", ("U1",))
    assert isinstance(series.record, MainsCapture)
    assert series.record.unit_id == "U1"


@pytest.mark.parametrize(
    ("text", "row", "column"),
    [
        ("watts,a\n1,2\n", 1, "watts"),
        ("time_s,voltage_v\n0,1\n", 1, "current_a"),
        (_wave("time_s,a", "0", 100, 100), None, "a"),
        ("wavelength_nm,a\n400,1\n410,x\n420,1\n430,1\n440,1\n", 3, "a"),
    ],
)
def test_problems_name_the_file_as_given(
    tmp_path: Path, text: str, row: int | None, column: str
) -> None:
    path = tmp_path / "odd.csv"
    path.write_text(text)
    with pytest.raises(DataProblems) as caught:
        read_series(path)
    (problem,) = caught.value.problems
    assert (problem.file, problem.row, problem.column) == (str(path), row, column)


def test_a_file_that_is_not_there(tmp_path: Path) -> None:
    with pytest.raises(DataProblems, match="cannot be read"):
        read_series(tmp_path / "none.csv")
