"""Split into emitter and phosphor against spectra made of known parts."""

from __future__ import annotations

import numpy as np
import pytest

from generator.metrics.colour import emitter_split
from generator.metrics.colour.emitter import photon_energy_ev

NM = np.arange(380.0, 781.0)


def emitter_line(nm, peak, width_ev=0.06):
    """Line that is symmetric in photon energy."""
    return np.exp(-0.5 * ((1239.841984 / nm - 1239.841984 / peak) / width_ev) ** 2)


def phosphor_band(nm, centre=580.0, width=45.0):
    return np.exp(-0.5 * ((nm - centre) / width) ** 2)


def test_photon_energy():
    # h c / e = 1239.841984 eV nm (exact SI constants): 450 nm is 2.755 eV
    assert photon_energy_ev(np.array([450.0]))[0] == pytest.approx(2.7552, abs=0.00005)


@pytest.mark.parametrize("step", [1, 2, 5])
@pytest.mark.parametrize("peak", [442.0, 451.3, 462.0])
def test_known_parts_are_found(peak, step):
    # Closed form: a line symmetric in energy on a band that starts behind it
    nm = NM[::step]
    line, band = 0.9 * emitter_line(nm, peak), 0.7 * phosphor_band(nm)
    split = emitter_split(nm, 25.0 * (line + band)[None])
    assert split.defined[0]
    assert split.peak_nm[0] == pytest.approx(peak, abs=0.3)
    true_line = 0.9 * emitter_line(NM, peak)
    share = true_line.sum() / (true_line + 0.7 * phosphor_band(NM)).sum()
    assert split.fraction[0] == pytest.approx(share, rel=0.06)
    assert split.peak_ev[0] == pytest.approx(1239.841984 / split.peak_nm[0], rel=1e-12)
    np.testing.assert_allclose(split.emitter[0], 25.0 * true_line, atol=25.0 * 0.06)


def test_parts_add_up_to_the_spectrum(led_spectra):
    # Closed form: nothing is lost; measured spectra (CC0 set)
    nm, spectra = led_spectra
    split = emitter_split(nm, spectra)
    assert split.defined.sum() > 90
    total = (split.emitter + split.phosphor)[split.defined][:, ::5]
    np.testing.assert_allclose(total, spectra[split.defined], atol=1e-9)
    noise = np.minimum(total, 0.0)
    assert (split.phosphor[split.defined][:, ::5] >= noise - 1e-9).all()
    assert ((split.peak_nm > 400) & (split.peak_nm < 490))[split.defined].all()


@pytest.mark.parametrize(
    ("spectrum", "reason"),
    [
        (np.ones(NM.size), "no peak"),
        (phosphor_band(NM, 600, 60), "no peak"),
        (
            emitter_line(NM, 450) + emitter_line(NM, 530, 0.04) + emitter_line(NM, 630, 0.03),
            "narrow band",
        ),
        (np.where(NM == 436, 1.0, 0.0) + phosphor_band(NM), "width of an LED"),
        # half-width 29 nm at half height: as broad as a phosphor
        (phosphor_band(NM, 450, 25) + phosphor_band(NM, 610, 40), "width of an LED"),
        (emitter_line(NM, 450) + phosphor_band(NM, 500, 80), "valley"),
        (np.full(NM.size, np.nan), "cannot be used"),
    ],
)
def test_withheld_where_not_defined(spectrum, reason):
    split = emitter_split(NM, spectrum[None])
    assert not split.defined[0]
    assert reason in split.reason[0]
    assert np.isnan(split.peak_nm[0])
    assert np.isnan(split.emitter[0]).all()


def test_short_record_is_not_split():
    nm = np.arange(420.0, 700.0)
    split = emitter_split(nm, (emitter_line(nm, 450) + phosphor_band(nm))[None])
    assert split.reason == ("the spectrum does not cover the visible range",)
