"""Every figure of a batch of spectra, with what is withheld and why."""

from __future__ import annotations

from collections.abc import Callable
from functools import lru_cache
from itertools import chain

import numpy as np
from numpy.typing import NDArray

from generator.language import numeral, say
from generator.metrics.colour.chromaticity import (
    chromaticity_uv_1960,
    chromaticity_uv_prime,
    chromaticity_xy,
    dominant_wavelength,
)
from generator.metrics.colour.colour_fidelity import HUE_BINS, cam02_ucs, colour_fidelity
from generator.metrics.colour.colour_rendering import colour_rendering_indices
from generator.metrics.colour.colour_temperature import (
    CCT_RANGE_K,
    correlated_colour_temperature,
    planckian_locus_xy,
)
from generator.metrics.colour.emitter import split_of_grid
from generator.metrics.colour.radiometry import (
    blue_light_efficacy,
    blue_light_threshold_illuminance,
    luminous_efficacy_of_radiation,
    melanopic_daylight_efficacy_ratio,
    scotopic_photopic_ratio,
)
from generator.metrics.colour.reference_illuminant import reference_samples
from generator.metrics.colour.sampling import (
    Sampling,
    normalised,
    on_whole_nanometres,
    sampling,
)
from generator.metrics.colour.weighting import (
    BAND_NM,
    LUMINOUS_EFFICACY_LM_PER_W,
    SpectralSums,
    spectral_sums,
)
from generator.records.figure import SeriesFigures

__all__ = ["METHODS", "REFERENCE_OF_RA", "spectral_figures"]

Array = NDArray[np.float64]
Mask = NDArray[np.bool_]
Texts = NDArray[np.object_]

_CHUNK = 256
_MESSAGES_KEPT = 1024  # the draws of one lamp say the same thing many times
_LEAST_RANGE_NM = (400, 700)
_LARGEST_STEP_NM = {"chromaticity": 20.0, "rendering": 10.0, "fidelity": 5.0}
_LARGEST_DUV = 0.05
_LARGEST_PURITY = 0.8
_PURITY_BEYOND_PLANCKIAN = 0.05
_REFERENCE_DISTANCE = 0.0054
_LEAST_DOMINANT_PURITY = 0.002
_NEGATIVE_SHARE = 0.001
_MOST_NEGATIVE_SHARE = 0.25

_NO_SPECTRUM = say("the spectrum has values that are not finite, or no positive sum")
_NOISE = say("values down to {share} % of the peak: this is noise, no spectrum")
_NEGATIVE = say("negative values down to {share} % of the peak were kept")
_TOO_LARGE = say("the flux is too large for a number")
_MONOCHROMATIC = say("nearly monochromatic: excitation purity {purity:.2f}")
_OUTSIDE = say(
    "colour temperature outside {low:.0f} K to {high:.0f} K",
    low=CCT_RANGE_K[0],
    high=CCT_RANGE_K[1],
)
_TOO_FAR = say("too far from the Planckian locus: Duv {duv}, limit {limit}")
_FAR_REFERENCE = say(
    "chromaticity {apart} in u, v from that reference, more than {limit}: Ra and R1 to R15 are of "
    "limited meaning"
)

_CHROMATICITY = ("x", "y", "u_prime", "v_prime")
_DOMINANT = ("dominant_wavelength_nm", "excitation_purity")
_RENDERING = ("ra", *(f"r{i}" for i in range(1, 16)))
_LOCAL = tuple(f"{kind}_h{j}" for kind in ("rf", "rcs", "rhs") for j in range(1, HUE_BINS + 1))
_FIDELITY = ("rf", "rg", *_LOCAL)
_RATIOS = (
    "ler_lm_per_w",
    "scotopic_photopic_ratio",
    "melanopic_der",
    "kb_v_w_per_lm",
    "blue_light_threshold_lx",
)
_EMITTER = ("emitter_peak_nm", "emitter_photon_energy_ev", "emitter_fraction")

METHODS: dict[str, str] = {
    "x": "xy_cie_15_2018_2deg",
    "y": "xy_cie_15_2018_2deg",
    "u_prime": "uv_iso_cie_11664_5_2016",
    "v_prime": "uv_iso_cie_11664_5_2016",
    "cct_k": "cct_ohno_2013",
    "duv": "cct_ohno_2013",
    "peak_wavelength_nm": "peak_as_measured",
    "centroid_wavelength_nm": "centroid_as_measured",
    "dominant_wavelength_nm": "dominant_cie_15_2018_equal_energy",
    "excitation_purity": "dominant_cie_15_2018_equal_energy",
    **dict.fromkeys(_RENDERING, "cri_cie_13_3_1995"),
    "r15": "cri_cie_13_3_1995_with_jis_z_8726_sample",
    **dict.fromkeys(_FIDELITY, "tm30_2018"),
    "radiant_flux_w": "radiant_flux_as_measured",
    "luminous_flux_lm": "luminous_flux_cie_15_2018",
    "ler_lm_per_w": "ler_380_780_nm",
    "scotopic_photopic_ratio": "sp_cie_191_2010",
    "melanopic_der": "melanopic_der_cie_s026_2018",
    "kb_v_w_per_lm": "kbv_iec_62471_2006",
    "blue_light_threshold_lx": "ethr_iec_62471_7_2023",
    **dict.fromkeys(_EMITTER, "emitter_mirror_lampassay_1"),
}
"""Method id of every quantity given here."""


REFERENCE_OF_RA = {
    "Planckian": say("reference of Ra: Planckian {cct} K"),
    "daylight": say("reference of Ra: daylight {cct} K"),
}
"""Kind of the reference illuminant -> what is said of it; bears on colour rendering alone."""


class _Batch:
    """Figures of one chunk of spectra, and the reasons for those withheld."""

    def __init__(self, count: int) -> None:
        self.count = count
        self.values: dict[str, Array] = {}
        self.reasons: dict[str, Texts] = {}
        self.remarks: list[list[str]] = [[] for _ in range(count)]

    def no_reason(self) -> Texts:
        """No reason for any series yet."""
        return np.full(self.count, "", dtype=object)

    def give(self, names: tuple[str, ...], arrays: Array, reason: Texts) -> None:
        """Enter quantities (names, series), withheld where there is a reason."""
        withheld = reason != ""
        if withheld.any():
            arrays = np.where(withheld, np.nan, arrays)
            self.reasons.update(dict.fromkeys(names, reason))
        self.values.update(zip(names, arrays, strict=True))

    def remark(self, mask: Mask, text: str | Callable[[int], str]) -> None:
        """Add a remark to the series where a condition holds."""
        for series in np.flatnonzero(mask).tolist():
            self.remarks[series].append(text if isinstance(text, str) else text(series))


def spectral_figures(wavelength_nm: Array, values: Array, *, absolute: bool) -> SeriesFigures:
    """All colour, rendering and radiometric figures of a batch of spectra.

    Figures are withheld, with the reason, where the methods do not hold: no finite values, no
    positive sum, or negative values beyond a quarter of the peak; a record that leaves out part
    of 400 nm to 700 nm (no figure but peak, centroid and radiant flux); a distance of more than
    0.05 from the Planckian locus, a colour temperature outside 1000 K to 25000 K, or a nearly
    monochromatic light (no CCT, Ra, Rf); data coarser than 10 nm (no Ra) or 5 nm (no Rf).

    Parameters
    ----------
    wavelength_nm
        Wavelengths, strictly ascending [nm] (w,).
    values
        Spectral radiant flux [W/nm] where ``absolute``, else on any scale (series, w).
    absolute
        Whether the spectra are in W/nm; if so the luminous flux is given as well.

    Returns
    -------
    SeriesFigures
        The figures with methods, reasons and remarks.

    Raises
    ------
    ValueError
        If the wavelengths are fewer than six, or not finite and strictly ascending.

    Notes
    -----
    Sums run over 380 nm to 780 nm, for the radiant flux and the centroid over the whole record.
    Source: cie_15; ohno_2014; cie_13_3; ies_tm_30_18; cie_191; cie_s026; iec_62471. The limits
    of withholding follow cie_15 and cie_13_3 where those state them, else lampassay_methods: a
    purity above 0.8 counts as monochromatic only where it also exceeds that of the Planckian
    radiator of the same colour temperature by 0.05, as candle-like light below 2100 K does not.
    """
    wavelength = np.asarray(wavelength_nm, dtype=np.float64)
    how = sampling(wavelength)
    rows = np.atleast_2d(values)
    batches = [
        _figures(
            wavelength, np.asarray(rows[first : first + _CHUNK], dtype=np.float64), how, absolute
        )
        for first in range(0, len(rows), _CHUNK)
    ]
    return _joined(batches)


def _figures(wavelength: Array, values: Array, how: Sampling, absolute: bool) -> _Batch:
    batch = _Batch(len(values))
    spectra, peak, lowest, usable = normalised(values)
    on_grid = on_whole_nanometres(wavelength, spectra, how)
    sums = spectral_sums(on_grid, how.start_nm, how.stop_nm, how.step_nm)
    reason = batch.no_reason()
    _because(reason, ~usable, _NO_SPECTRUM)
    _because(
        reason,
        lowest < -_MOST_NEGATIVE_SHARE,
        lambda i: _NOISE.format(share=numeral(f"{100 * lowest[i]:.0f}")),
    )
    batch.give(("peak_wavelength_nm",), wavelength[spectra.argmax(axis=1)][None], reason)
    visible = reason.copy()
    _range_reasons(visible, sums, how)
    _power(batch, sums, peak, reason, visible, absolute)
    _ratios(batch, sums, visible)
    _colour(batch, sums, visible, how)
    split = split_of_grid(how, on_grid, usable)
    blue = reason.copy()
    _because(blue, ~split.defined, lambda i: split.reason[i])
    batch.give(_EMITTER, np.array([split.peak_nm, split.peak_ev, split.fraction]), blue)
    _record_remarks(batch, how, lowest, usable)
    return batch


def _because(reason: Texts, mask: Mask, text: str | Callable[[int], str]) -> None:
    """Write a reason where a condition holds and no earlier one stands."""
    if not mask.any():
        return
    for series in np.flatnonzero(mask & (reason == "")).tolist():
        reason[series] = text if isinstance(text, str) else text(series)


def _power(
    batch: _Batch, sums: SpectralSums, peak: Array, reason: Texts, visible: Texts, absolute: bool
) -> None:
    moment = sums.wavelength_moment / sums.total
    batch.give(("centroid_wavelength_nm",), moment[None], reason)
    flux, light = reason.copy(), visible.copy()
    with np.errstate(over="ignore"):
        radiant = peak * sums.total
        luminous = LUMINOUS_EFFICACY_LM_PER_W * peak * sums.tristimulus[:, 1]
    if not absolute:
        _because(flux, np.full(batch.count, True), say("the spectrum is relative"))
    huge = ~(np.isfinite(luminous) & np.isfinite(radiant))
    for which in (flux, light):
        _because(which, huge, _TOO_LARGE)
    batch.give(("radiant_flux_w",), radiant[None], flux)
    if absolute:
        batch.give(("luminous_flux_lm",), luminous[None], light)


def _range_reasons(reason: Texts, sums: SpectralSums, how: Sampling) -> None:
    everywhere = np.full(len(reason), True)
    low, high = _LEAST_RANGE_NM
    if how.start_nm > low or how.stop_nm < high:
        text = say(
            "the spectrum covers {first} nm to {last} nm, not {low} nm to {high} nm",
            first=how.start_nm,
            last=how.stop_nm,
            low=low,
            high=high,
        )
        _because(reason, everywhere, text)
    if how.largest_step_nm > _LARGEST_STEP_NM["chromaticity"] + 1e-6:
        _because(
            reason, everywhere, say("the data are {step:.0f} nm apart", step=how.largest_step_nm)
        )
    dark = (sums.tristimulus.min(axis=1) < 0) | (sums.tristimulus[:, 1] <= 0) | (sums.in_band <= 0)
    _because(reason, dark, say("no light in the visible range"))


def _ratios(batch: _Batch, sums: SpectralSums, reason: Texts) -> None:
    with np.errstate(divide="ignore", invalid="ignore"):
        kb_v = blue_light_efficacy(sums)
        ratios = np.array(
            [
                luminous_efficacy_of_radiation(sums),
                scotopic_photopic_ratio(sums),
                melanopic_daylight_efficacy_ratio(sums),
                kb_v,
                blue_light_threshold_illuminance(kb_v),
            ]
        )
    batch.give(_RATIOS[:4], ratios[:4], reason)
    threshold = reason.copy()
    _because(threshold, ~(kb_v > 0), say("no blue light"))
    batch.give(_RATIOS[4:], ratios[4:], threshold)


def _colour(batch: _Batch, sums: SpectralSums, reason: Texts, how: Sampling) -> None:
    """Chromaticity, colour temperature, rendering and fidelity of the lights that have them."""
    given = reason == ""
    tristimulus = np.where(given[:, None], sums.tristimulus, 1.0)
    x, y = chromaticity_xy(tristimulus)
    u_prime, v_prime = chromaticity_uv_prime(x, y)
    batch.give(_CHROMATICITY, np.array([x, y, u_prime, v_prime]), reason)
    dominant, purity = dominant_wavelength(x, y)
    batch.give(_DOMINANT[1:], purity[None], reason)
    hue = reason.copy()
    _because(hue, purity < _LEAST_DOMINANT_PURITY, say("the light is achromatic"))
    batch.give(_DOMINANT[:1], dominant[None], hue)
    u, v = chromaticity_uv_1960(x, y)
    cct, duv = correlated_colour_temperature(u, v)
    white, coloured = _white_reasons(reason, cct, duv, purity)
    batch.give(("duv",), duv[None], np.where(np.isnan(duv) | coloured, white, reason))
    batch.give(("cct_k",), cct[None], white)
    _rendering(batch, sums, u, v, cct, white, how)


def _white_reasons(reason: Texts, cct: Array, duv: Array, purity: Array) -> tuple[Texts, Mask]:
    """Why a light has no colour temperature, and whether it is nearly monochromatic."""
    white = reason.copy()
    single = np.zeros(len(white), dtype=np.bool_)
    pure = np.flatnonzero((purity > _LARGEST_PURITY) & (reason == ""))
    if pure.size:
        radiator = planckian_locus_xy(np.where(np.isnan(cct[pure]), CCT_RANGE_K[0], cct[pure]))
        _, beside = dominant_wavelength(radiator[:, 0], radiator[:, 1])
        single[pure] = (purity[pure] > beside + _PURITY_BEYOND_PLANCKIAN) | np.isnan(cct[pure])
        _because(white, single, lambda i: _MONOCHROMATIC.format(purity=float(purity[i])))
    _because(white, np.isnan(cct), _OUTSIDE)
    _because(
        white,
        np.abs(duv) > _LARGEST_DUV,
        lambda i: _TOO_FAR.format(duv=numeral(f"{duv[i]:+.3f}"), limit=_LARGEST_DUV),
    )
    return white, single


def _rendering(
    batch: _Batch, sums: SpectralSums, u: Array, v: Array, cct: Array, white: Texts, how: Sampling
) -> None:
    everywhere = np.full(batch.count, True)
    rendering, fidelity = white.copy(), white.copy()
    for kind, reason in (("rendering", rendering), ("fidelity", fidelity)):
        if how.largest_step_nm > _LARGEST_STEP_NM[kind] + 1e-6:
            limit = _LARGEST_STEP_NM[kind]
            text = say(
                "the data are {step:g} nm apart, more than {limit:g} nm",
                step=how.largest_step_nm,
                limit=limit,
            )
            _because(reason, everywhere, text)
    rows = np.flatnonzero(white == "")
    indices = np.full((len(_RENDERING), batch.count), np.nan)
    shifts = np.full((len(_FIDELITY), batch.count), np.nan)
    if rows.size:
        part = _rows(sums, rows)
        reference = reference_samples(how.step_nm, cct[rows])
        special = colour_rendering_indices(
            part, u[rows], v[rows], reference.rendering, reference.white_uv
        )
        indices[0, rows] = special[:, :8].mean(axis=1)
        indices[1:, rows] = special.T
        figures = colour_fidelity(cam02_ucs(part.fidelity, part.white), reference.fidelity)
        shifts[0, rows], shifts[1, rows] = figures.rf, figures.rg
        shifts[2:, rows] = np.hstack([figures.rf_h, figures.rcs_h, figures.rhs_h]).T
        _reference_remarks(batch, rows, u, v, cct, reference.white_uv, rendering)
    batch.give(_RENDERING, indices, rendering)
    batch.give(_FIDELITY, shifts, fidelity)
    unfilled = np.isnan(shifts) & (fidelity == "")
    for name, empty in zip(_FIDELITY, unfilled, strict=True) if unfilled.any() else ():
        if empty.any():
            missing = fidelity.copy()
            _because(missing, empty, say("no sample of the reference falls into a hue bin"))
            batch.reasons[name] = missing


def _rows(sums: SpectralSums, rows: NDArray[np.intp]) -> SpectralSums:
    if rows.size == len(sums.total):
        return sums
    return SpectralSums(*(getattr(sums, name)[rows] for name in SpectralSums.__dataclass_fields__))


def _reference_remarks(
    batch: _Batch,
    rows: NDArray[np.intp],
    u: Array,
    v: Array,
    cct: Array,
    white_uv: Array,
    rendering: Texts,
) -> None:
    """Name the reference of the colour rendering index, and warn where it is far away."""
    distance = np.hypot(u[rows] - white_uv[:, 0], v[rows] - white_uv[:, 1])
    for series, apart in zip(rows.tolist(), distance.tolist(), strict=True):
        if rendering[series]:
            continue
        kind = "Planckian" if cct[series] < 5000.0 else "daylight"
        batch.remarks[series].append(_reference(kind, f"{cct[series]:.0f}"))
        if apart > _REFERENCE_DISTANCE:
            batch.remarks[series].append(
                _FAR_REFERENCE.format(apart=numeral(f"{apart:.4f}"), limit=_REFERENCE_DISTANCE)
            )


@lru_cache(maxsize=_MESSAGES_KEPT)
def _reference(kind: str, cct: str) -> str:
    return REFERENCE_OF_RA[kind].format(cct=numeral(cct))


@lru_cache(maxsize=_MESSAGES_KEPT)
def _negative(share: str) -> str:
    return _NEGATIVE.format(share=numeral(share))


def _record_remarks(batch: _Batch, how: Sampling, lowest: Array, usable: Mask) -> None:
    """What to know about the record itself."""
    first, last = BAND_NM
    span = {"first": numeral(f"{how.start_nm}"), "last": numeral(f"{how.stop_nm}")}
    texts = [how.remark] if how.remark else []
    if how.start_nm > first or how.stop_nm < last:
        texts.append(
            say(
                "spectrum covers {first} nm to {last} nm only; what lies outside counts as dark, "
                "which bears on LER, S/P, melanopic DER and K_B,v most",
                **span,
            )
        )
    if how.start_nm < first or how.stop_nm > last:
        texts.append(
            say("radiant flux and centroid are taken over {first} nm to {last} nm", **span)
        )
    if 5.0 < how.largest_step_nm <= _LARGEST_STEP_NM["rendering"] + 1e-6:
        texts.append(
            say(
                "data {step} nm apart: Ra holds for smooth spectra only",
                step=numeral(f"{how.largest_step_nm:g}"),
            )
        )
    for text in texts:
        batch.remark(usable, text)
    batch.remark(
        lowest < -_NEGATIVE_SHARE,
        lambda i: _negative(f"{100 * lowest[i]:.1f}"),
    )


def _joined(batches: list[_Batch]) -> SeriesFigures:
    """All chunks as one, quantities in the order of their methods."""
    names = [name for name in METHODS if name in batches[0].values]
    some = set().union(*(batch.reasons for batch in batches))
    withheld = [name for name in names if name in some]
    return SeriesFigures(
        values={
            name: np.concatenate([batch.values[name] for batch in batches])
            if len(batches) > 1
            else batches[0].values[name]
            for name in names
        },
        reasons={
            name: tuple(
                chain.from_iterable(
                    batch.reasons.get(name, ("",) * batch.count) for batch in batches
                )
            )
            for name in withheld
        },
        methods={name: METHODS[name] for name in names},
        remarks=tuple(tuple(remarks) for batch in batches for remarks in batch.remarks),
    )
