"""Split of a phosphor-converted white spectrum into its blue emitter and its phosphor."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from generator.language import say
from generator.metrics.colour.sampling import (
    Sampling,
    normalised,
    on_whole_nanometres,
    sampling,
    sprague_matrix,
)
from generator.metrics.colour.weighting import BAND_NM

__all__ = ["EmitterSplit", "emitter_split", "photon_energy_ev", "split_of_grid"]

Array = NDArray[np.float64]
Index = NDArray[np.intp]

_PLANCK_TIMES_LIGHT_EV_NM = 1239.841984
_EMITTER_NM = (400, 490)
_VALLEY_TO_NM = 560
_PHOSPHOR_TO_NM = 720
_LEAST_PEAK = 0.05
_LEAST_DEPTH = 0.75
_FLANK_REST = 0.1
_EMITTER_HALF_WIDTH_NM = (5.0, 22.5)
_PHOSPHOR_WIDTH_NM = 60


_NO_PEAK = say("no peak between 400 nm and 490 nm")
_NO_VALLEY = say("no clear valley between emitter and phosphor")
_NO_LED = say("the peak between 400 nm and 490 nm has not the width of an LED")
_NO_PHOSPHOR = say("more than one narrow band: no phosphor can be told apart")
_UNUSABLE = say("the spectrum cannot be used")


@dataclass(frozen=True, slots=True, eq=False)
class EmitterSplit:
    """Emitter and phosphor of a batch of spectra, ready to be drawn.

    Parameters
    ----------
    wavelength_nm
        Whole nanometres of the record within 380 nm to 780 nm [nm] (g,).
    emitter, phosphor
        The two parts in the unit of the spectra; their sum is the spectrum; not-a-number where
        the split is not defined (series, g).
    peak_nm
        Peak wavelength of the emitter [nm] (series,).
    peak_ev
        Photon energy of that wavelength [eV] (series,).
    fraction
        Share of the radiant flux in 380 nm to 780 nm that comes from the emitter (series,).
    defined
        Whether the split is well defined (series,).
    reason
        Why not; empty where it is.
    """

    wavelength_nm: Array
    emitter: Array
    phosphor: Array
    peak_nm: Array
    peak_ev: Array
    fraction: Array
    defined: NDArray[np.bool_]
    reason: tuple[str, ...]


def photon_energy_ev(wavelength_nm: Array) -> Array:
    """Photon energy of a wavelength.

    Parameters
    ----------
    wavelength_nm
        Wavelengths, taken as in vacuum (air makes 0.03 % of difference) [nm] (any shape).

    Returns
    -------
    ndarray
        h c / λ [eV], same shape. Source: si_brochure, defining constants h, c, e.
    """
    return _PLANCK_TIMES_LIGHT_EV_NM / wavelength_nm


def emitter_split(wavelength_nm: Array, values: Array) -> EmitterSplit:
    """Split spectra into the blue (or violet) emitter and the phosphor.

    Up to its peak the spectrum is the emitter's alone. Beyond, the emitter is the mirror image
    of that flank in photon energy, as far as the spectrum itself reaches; the rest is phosphor.
    The split is withheld unless there is one LED-like peak between 400 nm and 490 nm, a valley
    behind it, and one broad band behind the valley.

    Parameters
    ----------
    wavelength_nm
        Wavelengths, strictly ascending [nm] (w,).
    values
        Spectra, any scale (series, w).

    Returns
    -------
    EmitterSplit
        Both parts at 1 nm, with peak and share.

    Raises
    ------
    ValueError
        If the wavelengths cannot be used (see :func:`sampling`).

    Notes
    -----
    Source: lampassay_methods; no standard defines this split.
    """
    how = sampling(wavelength_nm)
    spectra, peak, _, usable = normalised(values)
    split = split_of_grid(how, on_whole_nanometres(wavelength_nm, spectra, how), usable)
    return replace(
        split, emitter=split.emitter * peak[:, None], phosphor=split.phosphor * peak[:, None]
    )


def split_of_grid(how: Sampling, spectra: Array, usable: NDArray[np.bool_]) -> EmitterSplit:
    """The same for spectra that are at the wavelengths of summation already.

    Parameters
    ----------
    how
        Wavelengths of summation.
    spectra
        Spectra with a peak of one (series, g).
    usable
        Which of them can be used (series,).

    Returns
    -------
    EmitterSplit
        Both parts, on the scale of ``spectra``. Source: lampassay_methods.
    """
    grid, fine = _fine_band(how, spectra)
    if grid.size < 2 or grid[0] > _EMITTER_NM[0] - 5 or grid[-1] < _PHOSPHOR_TO_NM - 20:
        return _undefined(grid, fine, say("the spectrum does not cover the visible range"))
    top, valley = _peak_and_valley(grid, fine)
    peak_nm = grid[top] + _vertex(fine, top)
    emitter = _mirrored(grid, fine, peak_nm, top)
    rest = fine - emitter
    reason = _reasons(grid, fine, rest, top, valley)
    reason[~usable] = _UNUSABLE
    defined = reason == ""
    missing = np.where(defined, 1.0, np.nan)
    total = fine.sum(axis=1)
    share = emitter.sum(axis=1) / np.where(total > 0, total, np.nan)
    return EmitterSplit(
        wavelength_nm=grid,
        emitter=emitter * missing[:, None],
        phosphor=rest * missing[:, None],
        peak_nm=peak_nm * missing,
        peak_ev=photon_energy_ev(peak_nm) * missing,
        fraction=share * missing,
        defined=defined,
        reason=tuple(reason.tolist()),
    )


def _fine_band(how: Sampling, spectra: Array) -> tuple[Array, Array]:
    """Whole nanometres between 380 nm and 780 nm; 5 nm data by Sprague's interpolation."""
    grid = how.wavelength_nm
    if how.step_nm == 5:
        position = tuple((np.arange(5 * grid.size - 4) / 5.0).tolist())
        spectra = spectra @ sprague_matrix(grid.size, position).T
        grid = np.arange(how.start_nm, how.stop_nm + 1, dtype=np.float64)
    inside = (grid >= BAND_NM[0]) & (grid <= BAND_NM[1])
    return grid[inside], spectra[:, inside]


def _peak_and_valley(grid: Array, spectra: Array) -> tuple[Index, Index]:
    """Places of the highest sample of the emitter's band and of the lowest one behind it."""
    first, behind = np.searchsorted(grid, [_EMITTER_NM[0], _EMITTER_NM[1] + 1])
    last = int(np.searchsorted(grid, _VALLEY_TO_NM, side="right"))
    top = first + spectra[:, first:behind].argmax(axis=1)
    near = spectra[:, first:last]
    beyond = np.arange(first, last) > top[:, None]
    valley = first + np.where(beyond, near, np.inf).argmin(axis=1)
    return top, valley


def _vertex(spectra: Array, top: Index) -> Array:
    """Vertex of the parabola fitted to seven points around the peak, from the middle [nm]."""
    offset = np.arange(-3, 4)
    around = np.clip(top[:, None] + offset, 0, spectra.shape[1] - 1)
    near = np.take_along_axis(spectra, around, axis=1)
    slope = near @ offset / 28.0
    bend = near @ (offset**2 - 4.0) / 84.0
    bend = np.where(bend < 0, bend, -np.inf)
    return np.clip(-slope / (2.0 * bend), -3.0, 3.0)


def _mirrored(grid: Array, spectra: Array, peak_nm: Array, top: Index) -> Array:
    """The emitter: the spectrum up to the peak, its mirror image in photon energy beyond.

    The image ends where the mirror shows the first wavelength of the record.
    """
    end = 1.0 / np.maximum(2.0 / peak_nm - 1.0 / grid[0], 1.0 / grid[-1])
    reach = int(np.searchsorted(grid, end.max(), side="right"))
    near, measured = grid[:reach], spectra[:, :reach]
    position = 1.0 / (2.0 / peak_nm[:, None] - 1.0 / near) - grid[0]
    beyond = position < 0.0
    position = np.clip(position, 0.0, grid.size - 1.001)
    cell = position.astype(np.intp)
    left = np.take_along_axis(spectra, cell, axis=1)
    right = np.take_along_axis(spectra, cell + 1, axis=1)
    image = left + (position - cell) * (right - left)
    image = np.clip(image, 0.0, np.maximum(measured, 0.0))
    image[beyond] = 0.0
    emitter = np.zeros_like(spectra)
    emitter[:, :reach] = np.where(np.arange(reach) <= top[:, None], measured, image)
    return emitter


def _reasons(
    grid: Array, spectra: Array, rest: Array, top: Index, valley: Index
) -> NDArray[np.object_]:
    """Why the split is not defined, per spectrum; empty text where it is."""
    row = np.arange(len(spectra))
    height = spectra[row, top]
    nm = np.arange(grid.size)
    behind = (nm > valley[:, None]) & (grid <= _PHOSPHOR_TO_NM)
    phosphor = np.where(behind, spectra, 0.0).max(axis=1)
    low = spectra[row, valley]
    below_half = (nm < top[:, None]) & (spectra < 0.5 * height[:, None])
    half_width = top - np.where(below_half, nm, -1000).max(axis=1)
    rest_height = np.where(behind, rest, 0.0).max(axis=1)
    rest_width = (rest >= 0.5 * rest_height[:, None]).sum(axis=1)
    at_edge = (grid[top] <= _EMITTER_NM[0]) | (grid[top] >= _EMITTER_NM[1])
    narrow, wide = _EMITTER_HALF_WIDTH_NM
    reason = np.full(len(spectra), "", dtype=object)
    for holds, text in (
        (rest_width < _PHOSPHOR_WIDTH_NM, _NO_PHOSPHOR),
        (
            (half_width < narrow) | (half_width > wide) | (spectra[:, 0] > _FLANK_REST * height),
            _NO_LED,
        ),
        (low > _LEAST_DEPTH * np.minimum(height, phosphor), _NO_VALLEY),
        (at_edge | (height < _LEAST_PEAK), _NO_PEAK),
    ):
        reason[holds] = text
    return reason


def _undefined(grid: Array, spectra: Array, reason: str) -> EmitterSplit:
    count = len(spectra)
    nothing = np.full(count, np.nan)
    empty = np.full(spectra.shape, np.nan)
    return EmitterSplit(
        wavelength_nm=grid,
        emitter=empty,
        phosphor=empty,
        peak_nm=nothing,
        peak_ev=nothing,
        fraction=nothing,
        defined=np.zeros(count, dtype=np.bool_),
        reason=(reason,) * count,
    )
