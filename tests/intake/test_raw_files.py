from __future__ import annotations

import numpy as np
import pytest

from generator.intake.endurance_csv import read_endurance
from generator.intake.intensity_csv import read_intensity
from generator.intake.lamps_csv import read_lamps
from generator.intake.register import Register
from generator.intake.spectra_csv import read_spectra
from generator.intake.tables.problem_list import ProblemList
from generator.intake.waveforms_csv import read_light, read_mains


def test_the_rows_of_a_distribution_may_come_in_any_order() -> None:
    problems = ProblemList("intensity/U1.csv")
    table = read_intensity(
        "gamma_deg,intensity_cd,c_deg\n90,6,90\n0,1,0\n45,2,0\n90,3,0\n45,5,90\n0,4,90\n",
        "U1",
        problems,
    )
    assert problems.problems == ()
    assert table is not None
    np.testing.assert_array_equal(table.c_deg, [0, 90])
    np.testing.assert_array_equal(table.gamma_deg, [0, 45, 90])
    np.testing.assert_array_equal(table.intensity_cd, [[1, 2, 3], [4, 5, 6]])


def test_many_gaps_are_counted_not_listed() -> None:
    rows = [f"{c},{g},1" for c in range(40) for g in (0, 10, 20) if c == 0 or g == 0]
    problems = ProblemList("intensity/U1.csv")
    assert (
        read_intensity("c_deg,gamma_deg,intensity_cd\n" + "\n".join(rows), "U1", problems) is None
    )
    assert problems.errors == 21
    assert problems.problems[-1].message == "The grid of angles has 58 more gaps."


def test_small_negatives_are_noise_and_large_ones_are_named() -> None:
    rows = "wavelength_nm,U1\n400,{}\n450,1\n500,1\n550,1\n600,1\n"
    quiet, loud = ProblemList("spectra/L1.csv"), ProblemList("spectra/L1.csv")
    assert read_spectra(rows.format("-0.05"), "L1", "relative", quiet) is not None
    assert quiet.problems == ()
    assert read_spectra(rows.format("-0.2"), "L1", "relative", loud) is not None
    assert [(p.level, p.row, p.column) for p in loud.problems] == [("warning", 2, "U1")]


@pytest.mark.parametrize("wavelengths", ["100,200,300,400,2500", "380,381,382.5,383,384"])
def test_wavelength_scales_that_are_accepted(wavelengths: str) -> None:
    problems = ProblemList("spectra/L1.csv")
    text = "wavelength_nm,U1\n" + "".join(f"{nm},1\n" for nm in wavelengths.split(","))
    assert read_spectra(text, "L1", "W/nm", problems) is not None
    assert problems.problems == ()


def test_a_mains_capture_takes_its_columns_by_name() -> None:
    text = "current_a,time_s,voltage_v\n" + "".join(f"2,{i / 1000},1\n" for i in range(100))
    capture = read_mains(text, "U1", ProblemList("mains/U1.csv"))
    assert capture is not None
    assert capture.sampling_rate_hz == pytest.approx(1000, rel=1e-12)
    assert (capture.voltage_v == 1).all()
    assert (capture.current_a == 2).all()


def test_light_need_not_begin_at_time_zero() -> None:
    text = "time_s,U1\n" + "".join(f"{5 + i / 1000:.3f},1\n" for i in range(100))
    record = read_light(text, "L1", ProblemList("light/L1.csv"), long=False)
    assert record is not None
    assert record.sampling_rate_hz == pytest.approx(1000, rel=1e-12)


def _endurance(rows: str) -> ProblemList:
    register = Register()
    read_lamps("lamp_id\nL1\nL2\n", register, ProblemList("lamps.csv"))
    problems = ProblemList("endurance.csv")
    read_endurance(
        "lamp_id,unit_id,hours_h,luminous_flux_lm,operational\n" + rows, register, problems
    )
    return problems


def test_a_unit_belongs_to_one_lamp_in_the_ageing_test() -> None:
    problems = _endurance("L1,U1,0,800,yes\nL2,U1,0,800,yes\n")
    assert [(p.row, p.column) for p in problems.problems] == [(3, "unit_id")]


def test_a_missing_flux_is_named_only_for_a_unit_that_works() -> None:
    problems = _endurance("L1,U1,0,,yes\nL1,U2,0,,no\nL1,U3,0,0,no\nL1,U4,0,5,no\n")
    assert [(p.level, p.row) for p in problems.problems] == [("warning", 2), ("warning", 5)]
