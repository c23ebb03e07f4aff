"""Colour values against spectrum, chromaticity and declaration."""

from __future__ import annotations

import csv
import warnings
from decimal import Decimal
from pathlib import Path

import numpy as np
import pytest

import generator
from generator.crosschecks.colour import cct_mccamy_1992
from generator.crosschecks.tolerances import tolerance
from generator.records.finding import Severity


@pytest.mark.parametrize(
    ("name", "reported", "computed", "check"),
    [
        ("x", "0.4400", "0.4500", "x-spectrum-against-report"),
        ("y", "0.4000", "0.4100", "y-spectrum-against-report"),
        ("cct_k", "2700", "3000", "cct-spectrum-against-report"),
        ("duv", "0.0010", "0.0060", "duv-spectrum-against-report"),
        ("ra", "92.0", "83.5", "ra-spectrum-against-report"),
        ("r9", "50", "10", "r9-spectrum-against-report"),
    ],
)
def test_spectrum_against_report(bench, name, reported, computed, check) -> None:
    bench.lamp()
    bench.unit("A", **{name: reported})
    bench.computed(name, computed, "A")
    bench.unit("B", **{name: reported})
    bench.computed(name, reported, "B")
    found = bench.only(check)
    assert (found.unit_id, found.deviation) == ("A", Decimal(reported) - Decimal(computed))
    assert reported in found.compared
    assert computed in found.compared


@pytest.mark.parametrize(
    ("x", "y", "cct_k"),
    # illuminants A, D50, D65 (CIE 15): 2856 K, 5003 K, 6504 K; the cubic is within 2 K there
    [("0.44758", "0.40745", 2856), ("0.34567", "0.35850", 5003), ("0.31272", "0.32903", 6503.6)],
)
def test_mccamy_at_the_illuminants(x: str, y: str, cct_k: float) -> None:
    found = cct_mccamy_1992(Decimal(x), Decimal(y))
    assert found is not None
    assert float(found) == pytest.approx(cct_k, abs=2)


def test_mccamy_is_as_near_as_it_says() -> None:
    # against colour-science: CCT and Duv to u, v after Ohno; it warns that it cannot draw
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        import colour
    for cct_k in range(2600, 6900, 100):
        for duv in (-0.01, -0.005, 0.0, 0.005, 0.01):
            uv = colour.temperature.CCT_to_uv_Ohno2013(np.array([cct_k, duv]))
            x, y = (Decimal(repr(float(item))) for item in colour.UCS_uv_to_xy(uv))
            found = cct_mccamy_1992(x, y)
            assert found is not None
            assert abs(float(found) - cct_k) < 25


def test_mccamy_keeps_to_its_range() -> None:
    assert cct_mccamy_1992(Decimal("0.50"), Decimal("0.41")) is None
    assert cct_mccamy_1992(Decimal("0.25"), Decimal("0.25")) is None
    assert cct_mccamy_1992(Decimal("0.33"), Decimal("0.18")) is None


def test_reported_cct_against_reported_chromaticity(bench) -> None:
    bench.lamp()
    bench.unit("A", cct_k="2700", x="0.4338", y="0.4030")
    bench.unit("B", cct_k="3045", x="0.4338", y="0.4030")
    found = bench.only("cct-against-chromaticity")
    assert (found.unit_id, found.severity) == ("A", Severity.CONTRADICTION)
    # the chromaticity is the target of 3045 K
    assert float(found.deviation) == pytest.approx(2700 - 3045, abs=10)
    assert "2700 K" in found.compared


def test_coarse_chromaticity_is_no_contradiction(bench) -> None:
    bench.lamp()
    bench.unit(cct_k="2860", x="0.44", y="0.40")
    assert bench.checks() == []


@pytest.mark.parametrize(
    ("mean", "severity"),
    [
        ("3045", None),
        ("3255", None),
        ("3256", Severity.DOUBT),
        ("2744", Severity.DOUBT),
        ("4000", Severity.CONTRADICTION),
    ],
)
def test_declared_cct(bench, mean: str, severity: Severity | None) -> None:
    # 8.5 % of 3000 K is 255 K, and half of the last digit is taken off
    bench.lamp(declared={"cct_k": "3000"})
    bench.mean("cct_k", mean)
    if severity is None:
        assert bench.checks() == []
    else:
        found = bench.only("cct-declared-against-measured")
        assert found.severity is severity
        assert found.deviation == Decimal(mean) - 3000


def test_no_nominal_step_reaches_beyond_the_tolerance_of_declared_cct() -> None:
    table = Path(generator.__file__).parent / "datasets" / "nominal_colours_ansi_c78_377_2008.csv"
    lines = [line for line in table.read_text(encoding="utf-8").splitlines() if line[0] != "#"]
    rows = list(csv.DictReader(lines))
    assert len(rows) >= 8
    reach = [
        (
            abs(float(row["target_cct_k"]) - float(row["nominal_cct_k"]))
            + float(row["cct_tolerance_k"])
        )
        / float(row["nominal_cct_k"])
        for row in rows
    ]
    assert max(reach) * 100 < float(tolerance("declared_cct_k").value)
