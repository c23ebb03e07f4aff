"""The front of the modulation room: what is given, withheld and remarked."""

import math

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.metrics.modulation import light_figures
from generator.quantities import QUANTITIES

Array = NDArray[np.float64]
RATE_HZ = 20000.0
TIME = np.arange(20074) / RATE_HZ
SINE = 1 + 0.3 * np.sin(2 * np.pi * 100 * TIME)


def one(light: Array, rate_hz: float = RATE_HZ) -> tuple[dict[str, float], dict[str, str], str]:
    found = light_figures(light[None, :], rate_hz)
    values = {name: float(series[0]) for name, series in found.values.items()}
    reasons = {name: found.reason(name, 0) for name in found.values}
    return values, reasons, "; ".join(found.remarks[0])


def test_gives_its_group_of_the_catalogue_with_methods() -> None:
    found = light_figures(SINE[None, :], RATE_HZ)
    group = {name for name, entry in QUANTITIES.items() if entry.group == "modulation"}
    assert set(found.values) == set(found.methods) == set(found.reasons) == group


def test_every_blank_has_a_reason_and_every_value_none() -> None:
    rng = np.random.default_rng(2)
    gap = SINE.copy()
    gap[77] = np.nan
    batch = np.stack(
        [SINE, np.zeros_like(SINE), gap, -SINE, 1 + 0.01 * rng.standard_normal(TIME.size)]
    )
    for rate_hz in (RATE_HZ, 3000.0, 500.0, 200.0):
        found = light_figures(batch, rate_hz)
        for name, values in found.values.items():
            for series, value in enumerate(values):
                assert math.isnan(value) == bool(found.reason(name, series))


def test_sine() -> None:
    # Closed forms: m, m / pi, m times 3.90205 (iec_tr_63158, Annex A.1), 0.08 f.
    values, reasons, remarks = one(SINE)
    assert values["flicker_frequency_hz"] == pytest.approx(100, abs=1e-3)
    assert values["percent_flicker"] == pytest.approx(30, abs=1e-6)
    assert values["flicker_index"] == pytest.approx(0.3 / math.pi, abs=5e-5)
    assert values["svm"] == pytest.approx(0.3 * 3.90205, rel=1e-3)
    assert values["pam_200hz_percent"] == pytest.approx(30, abs=0.01)
    assert values["pam_90hz_percent"] == pytest.approx(0, abs=0.01)
    assert values["low_risk_modulation_percent"] == pytest.approx(8, abs=1e-3)
    assert "shorter than 30 s" in reasons["pst_lm"]
    assert remarks == ""


def test_batch_reads_as_singles() -> None:
    batch = np.stack([SINE, 1 + 0.1 * np.sin(2 * np.pi * 120 * TIME), np.abs(SINE - 0.9)])
    found = light_figures(batch, RATE_HZ)
    for series, light in enumerate(batch):
        values, _, remarks = one(light)
        assert "; ".join(found.remarks[series]) == remarks
        for name, value in values.items():
            assert found.values[name][series] == pytest.approx(value, rel=1e-12, nan_ok=True)


def test_noise_alone_has_no_frequency_but_percent_flicker_with_a_remark() -> None:
    rng = np.random.default_rng(2)
    values, reasons, remarks = one(1 + 0.01 * rng.standard_normal(TIME.size))
    assert math.isnan(values["flicker_frequency_hz"])
    assert math.isnan(values["low_risk_modulation_percent"])
    assert "noise" in reasons["flicker_frequency_hz"]
    assert 3 < values["percent_flicker"] < 5
    assert values["svm"] < 0.01
    assert "noise may raise percent flicker" in remarks


def test_noise_on_modulated_light_is_remarked_when_material() -> None:
    rng = np.random.default_rng(2)
    noise = rng.standard_normal(TIME.size)
    assert "noise may raise" in one(SINE + 0.01 * noise)[2]
    assert one(SINE + 0.0002 * noise)[2] == ""
    assert "stroboscopic" in one(SINE * 0 + 1 + 0.2 * noise)[2]


def test_svm_is_refused_below_4_khz() -> None:
    for rate_hz, given in ((3900.0, False), (4000.0, True)):
        time = np.arange(round(1.2 * rate_hz)) / rate_hz
        values, reasons, remarks = one(1 + 0.3 * np.sin(2 * np.pi * 100 * time), rate_hz)
        assert math.isnan(values["svm"]) != given
        assert ("4000 Hz" in reasons["svm"]) != given
        assert "20 kHz or more is usual" in remarks


def test_too_short_and_too_sparse_records_give_nothing() -> None:
    for light, rate_hz, text in ((SINE[:2000], RATE_HZ, "0.1 s"), (SINE, 1000.0, "1000 Hz")):
        values, reasons, _ = one(light, rate_hz)
        assert all(math.isnan(value) for value in values.values())
        assert all(text in reason for reason in reasons.values())
    assert math.isnan(one(np.empty(0))[0]["svm"])


def test_short_record_is_remarked() -> None:
    values, _, remarks = one(SINE[:10000])
    assert values["svm"] == pytest.approx(0.3 * 3.90205, rel=1e-3)
    assert "0.5 s long" in remarks


def test_pst_lm_is_given_from_30_s_and_remarked_below_60_s() -> None:
    for duration_s, remarked in ((30, True), (59, True), (60, False)):
        time = np.arange(duration_s * 2000) / 2000
        # 0.8852 % peak to peak at 8.8 Hz: PstLM of one, closed form.
        light = 1 + 0.008852 / 2 * np.sin(2 * np.pi * 8.8 * time)
        values, reasons, remarks = one(light, 2000.0)
        assert values["pst_lm"] == pytest.approx(1, abs=0.003)
        assert reasons["pst_lm"] == ""
        assert ("60 s or more is recommended" in remarks) == remarked


def test_noise_floor_of_pst_lm_is_remarked() -> None:
    rng = np.random.default_rng(2)
    noise = 0.01 * rng.standard_normal(40 * 2000)
    values, _, remarks = one(1 + noise, 2000.0)
    # White noise of 1 % reads about 0.45 at 2 kHz; the floor comes from 45 bins, some 10 %.
    assert values["pst_lm"] == pytest.approx(0.45, abs=0.05)
    told = float(remarks.split("PstLM of about ")[1].split(";")[0])
    assert told == pytest.approx(values["pst_lm"], rel=0.2)
    assert "PstLM of about" not in one(1 + noise / 10, 2000.0)[2]


def test_over_subtracted_dark_signal() -> None:
    light = np.where((100 * TIME + 0.001) % 1 < 0.5, 1.0, 0.0)
    assert one(light)[0]["percent_flicker"] == 100
    values, reasons, remarks = one(light - 0.05)
    assert math.isnan(values["percent_flicker"])
    # Every figure relative to the mean is as wrong as the mean; the frequency is not.
    for name in ("percent_flicker", "flicker_index", "svm", "pam_200hz_percent"):
        assert math.isnan(values[name])
        assert "over-subtracted" in reasons[name]
    assert values["flicker_frequency_hz"] == pytest.approx(100, abs=1e-3)
    assert "over-subtracted" in remarks


def test_over_subtracted_dark_signal_withholds_pst_lm() -> None:
    time = np.arange(31 * 2000) / 2000.0
    light = 0.2 + 0.3 * np.sin(2 * np.pi * 10 * time)
    values, reasons, _ = one(light, 2000.0)
    assert math.isnan(values["pst_lm"])
    assert "over-subtracted" in reasons["pst_lm"]


@pytest.mark.parametrize("light", [(SINE - 1)[:20000] * 1e-9, SINE - SINE.mean()])
def test_light_about_zero_gives_nothing(light: Array) -> None:
    # What rounding leaves of a mean is no light: an amplifier coupled to alternating current.
    values, reasons, _ = one(light)
    assert all(math.isnan(value) for value in values.values())
    assert all("mean is not above zero" in reason for reason in reasons.values())


def test_light_that_swings_about_zero_is_over_subtracted() -> None:
    # 0.37 of a period too much leaves a mean just above zero
    values, reasons, _ = one(SINE - 1)
    for name in ("percent_flicker", "flicker_index", "svm", "pam_200hz_percent"):
        assert math.isnan(values[name])
        assert "over-subtracted" in reasons[name]


@pytest.mark.parametrize("scale", [1e300, 1e-300, 3e-310])
def test_scale_of_the_light_does_not_show(scale: float) -> None:
    # Closed form: every figure is a ratio. 1e-6: at 3e-310 the samples themselves hold 6 digits.
    plain, huge = one(SINE)[0], one(scale * SINE)[0]
    for name, value in plain.items():
        assert huge[name] == pytest.approx(value, rel=1e-6, abs=1e-6, nan_ok=True), name


def test_noise_about_zero_light_is_no_dark_signal() -> None:
    rng = np.random.default_rng(2)
    light = np.where((100 * TIME + 0.001) % 1 < 0.5, 1.0, 0.0)
    values, _, remarks = one(light + 0.002 * rng.standard_normal(light.size))
    assert values["percent_flicker"] == 100
    assert "noise about zero light" in remarks


def test_clipping_is_remarked() -> None:
    assert "clipped" in one(np.minimum(SINE, 1.25))[2]


def test_asymmetry_is_told() -> None:
    values, _, remarks = one(SINE + 0.03 * np.sin(2 * np.pi * 50 * TIME))
    assert values["flicker_frequency_hz"] == pytest.approx(50, abs=1e-3)
    assert "strongest component is at 100.0 Hz" in remarks


def test_mains_frequency_cuts_light_without_a_period() -> None:
    rng = np.random.default_rng(2)
    light = (1 + 0.001 * rng.standard_normal((1, 20500)))[:, :]
    with_mains = light_figures(light, RATE_HZ, mains_frequency_hz=50.0)
    cut = light_figures(light[:, :20400], RATE_HZ)
    assert with_mains.values["pam_1000hz_percent"] == pytest.approx(
        cut.values["pam_1000hz_percent"], rel=1e-9
    )


def test_wrong_shapes_are_refused() -> None:
    with pytest.raises(ValueError, match="series, samples"):
        light_figures(SINE, RATE_HZ)
    with pytest.raises(ValueError, match="above zero"):
        light_figures(SINE[None, :], 0.0)
