"""Declared values against units."""

from __future__ import annotations

from decimal import Decimal

import pytest

from generator.records.finding import Severity

FLUX = "luminous-flux-lm-declared-better-than-every-unit"
POWER = "power-w-declared-better-than-every-unit"


def fluxes(bench, *values: str, u: str | None = None) -> None:
    expanded = None if u is None else {"luminous_flux_lm": u}
    for place, value in enumerate(values):
        bench.unit(f"L1-{place + 1}", uncertainty=expanded, luminous_flux_lm=value)


def test_declared_flux_above_every_unit(bench) -> None:
    bench.lamp(declared={"luminous_flux_lm": "850"})
    fluxes(bench, "801", "811", "790")
    found = bench.only(FLUX)
    assert (found.severity, found.deviation, found.unit_id) == (Severity.DOUBT, 39, "")
    for words in ("lamp L1", "850 lm", "best of 3 measured units 811 lm", "+39 lm"):
        assert words in found.compared


@pytest.mark.parametrize("best", ["849", "850", "860"])
def test_one_unit_that_reaches_it_up_to_rounding(bench, best: str) -> None:
    bench.lamp(declared={"luminous_flux_lm": "850"})
    fluxes(bench, "801", best, "790")
    assert bench.checks() == []


@pytest.mark.parametrize(
    ("values", "u", "severity"),
    [
        (["801"], None, None),
        (["801", "811"], None, Severity.REMARK),
        (["801", "811", "790"], "50", Severity.DOUBT),
        (["801", "811", "790"], "20", Severity.CONTRADICTION),
        (["801"], "20", Severity.CONTRADICTION),
    ],
)
def test_weight_by_number_of_units_and_uncertainty(bench, values, u, severity) -> None:
    bench.lamp(declared={"luminous_flux_lm": "850"})
    fluxes(bench, *values, u=u)
    assert [item.severity for item in bench.findings()] == ([] if severity is None else [severity])


def test_lower_is_better_for_power(bench) -> None:
    bench.lamp(declared={"power_w": "7.5"})
    for unit, power in (("A", "8.1"), ("B", "7.9"), ("C", "8.0")):
        bench.unit(unit, power_w=power)
    assert bench.only(POWER).deviation == Decimal("-0.4")


def test_higher_power_declared_is_modest(bench) -> None:
    bench.lamp(declared={"power_w": "8.5"})
    for unit, power in (("A", "8.1"), ("B", "7.9"), ("C", "8.0")):
        bench.unit(unit, power_w=power)
    assert bench.checks() == []


@pytest.mark.parametrize(
    ("declared", "determined", "severity", "steps"),
    [
        ("C", "E", Severity.CONTRADICTION, 2),
        ("E", "D", Severity.REMARK, -1),
        ("E", "E", None, 0),
        ("A", "A", None, 0),
    ],
)
def test_declared_class(bench, declared, determined, severity, steps) -> None:
    bench.lamp(declared_energy_class=declared)
    bench.mean("energy_efficiency_class", determined)
    if severity is None:
        assert bench.checks() == []
    else:
        found = bench.only("class-declared-against-determined")
        assert (found.severity, found.deviation) == (severity, steps)
        assert f"declared as {declared}, class of the values {determined}" in found.compared
