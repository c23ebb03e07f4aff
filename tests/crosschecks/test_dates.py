"""Dates and report numbers."""

from __future__ import annotations

from datetime import date

import pytest

from generator.records.finding import Severity

MARKET = date(2025, 6, 1)


@pytest.mark.parametrize(
    ("report", "severity", "days"),
    [
        (date(2025, 6, 1), None, 0),
        (date(2025, 5, 31), Severity.REMARK, 1),
        (date(2024, 6, 1), Severity.REMARK, 365),
        (date(2024, 5, 31), Severity.DOUBT, 366),
    ],
)
def test_report_older_than_the_model(bench, report, severity, days) -> None:
    bench.lamp(placed_on_market=MARKET, report_date=report)
    if severity is None:
        assert bench.checks() == []
    else:
        found = bench.only("report-older-than-model")
        assert (found.severity, found.deviation) == (severity, -days)
        assert report.isoformat() in found.compared
        assert "2025-06-01" in found.compared
        assert f"{days} day{'' if days == 1 else 's'} older" in found.compared
        assert found.deviation_unit == "d"


@pytest.mark.parametrize(("day", "count"), [(1, 0), (2, 1)])
def test_report_after_the_assessment(bench, day: int, count: int) -> None:
    bench.assessment_date = date(2026, 1, 1)
    bench.lamp(report_date=date(2026, 1, day))
    assert bench.checks().count("report-after-assessment") == count


def test_one_report_under_two_bidders(bench) -> None:
    bench.lamp("L1", "North", report_no="R-17")
    bench.lamp("L2", "South", report_no="r-17")
    bench.lamp("L3", "South", report_no="R-18")
    bench.lamp("L4", "South", report_no="R-18")
    found = bench.findings()
    assert [item.lamp_id for item in found] == ["L1", "L2"]
    assert {item.check for item in found} == {"report-number-between-bidders"}
    assert "R-17 of North also stands under L2 of South" in found[0].compared
