"""Identical rows and values without spread."""

from __future__ import annotations

from generator.records.finding import Severity

ROW = {"luminous_flux_lm": "806.3", "power_w": "8.104", "cct_k": "2713", "power_factor": "0.512"}
OTHER = {"luminous_flux_lm": "811.9", "power_w": "8.117", "cct_k": "2721", "power_factor": "0.514"}


def test_two_units_of_one_lamp(bench) -> None:
    bench.lamp()
    bench.unit("A", voltage_v="230.0", **ROW)
    bench.unit("B", voltage_v="230.1", **ROW)
    bench.unit("C", voltage_v="230.0", **OTHER)
    found = bench.only("units-identical")
    assert (found.unit_id, found.severity) == ("A", Severity.DOUBT)
    # 4 + 4 + 4 + 3 digits; the set voltage is left aside
    assert "all 4 reported values (15 digits) are the same as those of unit B" in found.compared
    assert "806.3 lm" in found.compared
    assert found.quantities == ("cct_k", "luminous_flux_lm", "power_factor", "power_w")


def test_trailing_zeros_do_not_hide_a_copy(bench) -> None:
    bench.lamp()
    bench.unit("A", luminous_flux_lm="806.3", power_w="8.10", cct_k="2713")
    bench.unit("B", luminous_flux_lm="806.30", power_w="8.1", cct_k="2713.0")
    assert "units-identical" in bench.checks()


def test_one_digit_apart_is_no_copy(bench) -> None:
    bench.lamp()
    bench.unit("A", **ROW)
    bench.unit("B", **{**ROW, "cct_k": "2714"})
    assert bench.checks() == []


def test_few_digits_agree_by_chance(bench) -> None:
    bench.lamp()
    for unit in ("A", "B"):
        bench.unit(unit, luminous_flux_lm="806", power_w="8.1", ra="82", r9="5")
    assert bench.checks() == []


def test_between_bidders_lamps_and_units(bench) -> None:
    bench.lamp("L1", "North")
    bench.lamp("L2", "South")
    bench.lamp("L3", "South")
    for unit, lamp in (("A", "L1"), ("B", "L2"), ("C", "L3")):
        bench.unit(unit, lamp, **ROW)
    found = [(item.lamp_id, item.check, item.severity) for item in bench.findings()]
    between, family = "units-identical-between-bidders", "units-identical-between-lamps"
    assert found == [
        ("L1", between, Severity.CONTRADICTION),
        ("L2", between, Severity.CONTRADICTION),
        ("L2", family, Severity.REMARK),
        ("L3", between, Severity.CONTRADICTION),
        ("L3", family, Severity.REMARK),
    ]
    text = bench.findings()[0].compared
    assert "lamp L1, unit A" in text
    assert "lamp L2, unit B (South), lamp L3, unit C (South)" in text


def test_no_spread_in_several_quantities(bench) -> None:
    bench.lamp()
    for unit, flux in (("A", "806"), ("B", "811"), ("C", "799")):
        bench.unit(unit, **{**ROW, "luminous_flux_lm": flux})
    found = bench.only("units-without-spread")
    assert found.quantities == ("power_w", "cct_k", "power_factor")
    assert "all 3 units in 3 quantities" in found.compared
    assert "8.104 W" in found.compared


def test_no_spread_in_two_quantities_or_between_two_units(bench) -> None:
    bench.lamp()
    for unit, flux, power in (("A", "806", "8.1"), ("B", "811", "8.2"), ("C", "799", "8.0")):
        bench.unit(unit, **{**ROW, "luminous_flux_lm": flux, "power_w": power})
    bench.lamp("L2")
    for unit, flux in (("D", "806"), ("E", "811")):
        bench.unit(unit, "L2", **{**ROW, "luminous_flux_lm": flux})
    assert bench.checks() == []


def test_quantities_of_one_curve_count_once(bench) -> None:
    bench.lamp()
    for unit, flux in (("A", "806"), ("B", "811"), ("C", "799")):
        bench.unit(
            unit,
            luminous_flux_lm=flux,
            power_factor="0.512",
            displacement_factor="0.874",
            thd_current_percent="139",
            cct_k="2713",
            x="0.4578",
            y="0.4101",
        )
    assert bench.checks() == []
