"""Spectra brought to the interval at which they are summed: 1 nm or 5 nm as they come, or 1 nm."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from generator.language import say

__all__ = ["Sampling", "normalised", "on_whole_nanometres", "sampling", "sprague_matrix"]

Array = NDArray[np.float64]
Kind = Literal["native", "averaged", "sprague", "cubic"]

_TOLERANCE_NM = 1e-3

_REMARKS: dict[Kind, str] = {
    "native": "",
    "averaged": say("spectrum averaged to 1 nm before summing"),
    "sprague": say("spectrum interpolated to 1 nm (Sprague) before summing"),
    "cubic": say(
        "spectrum on uneven wavelengths, interpolated to 1 nm (cubic spline) before summing"
    ),
}

_SPRAGUE_ENDS = (
    np.array(
        [
            [884, -1960, 3033, -2648, 1080, -180],
            [508, -540, 488, -367, 144, -24],
            [-24, 144, -367, 488, -540, 508],
            [-180, 1080, -2648, 3033, -1960, 884],
        ]
    )
    / 209.0
)
_SPRAGUE_POLYNOMIAL = (
    np.array(
        [
            [0, 0, 24, 0, 0, 0],
            [2, -16, 0, 16, -2, 0],
            [-1, 16, -30, 16, -1, 0],
            [-9, 39, -70, 66, -33, 7],
            [13, -64, 126, -124, 61, -12],
            [-5, 25, -50, 50, -25, 5],
        ]
    )
    / 24.0
)


@dataclass(frozen=True, slots=True, eq=False)
class Sampling:
    """How spectra on given wavelengths are brought to the interval of summation.

    Parameters
    ----------
    kind
        ``native``, ``averaged``, ``sprague`` or ``cubic``.
    start_nm, stop_nm, step_nm
        Wavelengths of summation: first, last, interval (1 or 5) [nm].
    largest_step_nm
        Largest interval of the data as they came [nm].
    remark
        What was done, fit to be printed; empty for native summation.
    """

    kind: Kind
    start_nm: int
    stop_nm: int
    step_nm: int
    largest_step_nm: float
    remark: str

    @property
    def wavelength_nm(self) -> Array:
        """Wavelengths of summation [nm] (g,)."""
        return np.arange(self.start_nm, self.stop_nm + 1, self.step_nm, dtype=np.float64)


def sampling(wavelength_nm: Array) -> Sampling:
    """Decide how spectra on given wavelengths are summed.

    Data at 1 nm or 5 nm on whole multiples of the interval are summed as they are. Finer data
    are averaged over 1 nm; evenly spaced coarser data are interpolated to 1 nm with Sprague's
    quintic, uneven ones with a cubic spline. Nothing is interpolated linearly, which would act
    like a wider instrument bandpass.

    Parameters
    ----------
    wavelength_nm
        Wavelengths, strictly ascending [nm] (w,).

    Returns
    -------
    Sampling
        The decision.

    Raises
    ------
    ValueError
        If there are fewer than six wavelengths, or they are not finite and strictly ascending.

    Notes
    -----
    Source: cie_15, clause 7.2; cie_167, clause 4; lampassay_methods for uneven spectra.
    """
    return _sampling(np.ascontiguousarray(wavelength_nm, dtype=np.float64).tobytes())


@lru_cache(maxsize=64)
def _sampling(wavelength_nm_bytes: bytes) -> Sampling:
    """The decision, taken once per wavelength scale."""
    wavelength_nm = np.frombuffer(wavelength_nm_bytes, dtype=np.float64)
    if wavelength_nm.size < 6:
        raise ValueError(f"six wavelengths are needed at the least, found {wavelength_nm.size}")
    steps = np.diff(wavelength_nm)
    if not (np.isfinite(wavelength_nm).all() and (steps > 0).all()):
        raise ValueError("wavelengths must be finite and strictly ascending")
    largest = float(steps.max())
    first, last = float(wavelength_nm[0]), float(wavelength_nm[-1])
    for step in (1, 5) if np.ptp(steps) < 2 * _TOLERANCE_NM else ():
        whole = step * np.rint(wavelength_nm / step)
        if np.abs(steps - step).max() < _TOLERANCE_NM and (
            np.abs(wavelength_nm - whole).max() < _TOLERANCE_NM
        ):
            return Sampling("native", int(whole[0]), int(whole[-1]), step, float(step), "")
    kind: Kind = "cubic"
    if largest < 1.0:
        kind = "averaged"
    elif np.ptp(steps) < _TOLERANCE_NM:
        kind = "sprague"
    start = int(np.ceil(first - _TOLERANCE_NM))
    stop = int(np.floor(last + _TOLERANCE_NM))
    return Sampling(kind, start, stop, 1, largest, _REMARKS[kind])


def on_whole_nanometres(wavelength_nm: Array, values: Array, how: Sampling) -> Array:
    """Spectra at the wavelengths of summation.

    Parameters
    ----------
    wavelength_nm
        Wavelengths of the data [nm] (w,).
    values
        Spectra (series, w).
    how
        The decision of :func:`sampling` for these wavelengths.

    Returns
    -------
    ndarray
        Spectra (series, g); the argument itself where it is summed as it is.
    """
    if how.kind == "native":
        return values
    if how.kind == "averaged":
        return _cell_means(wavelength_nm, values, how.wavelength_nm)
    if how.kind == "sprague":
        position = (how.wavelength_nm - wavelength_nm[0]) / np.diff(wavelength_nm).mean()
        matrix = sprague_matrix(wavelength_nm.size, tuple(position.tolist()))
        return np.asarray(values @ matrix.T)
    from scipy.interpolate import CubicSpline

    return np.asarray(CubicSpline(wavelength_nm, values, axis=1)(how.wavelength_nm))


@lru_cache(maxsize=8)
def sprague_matrix(count: int, positions: tuple[float, ...]) -> Array:
    """Matrix that interpolates evenly spaced data with Sprague's quintic polynomial.

    Parameters
    ----------
    count
        Number of data points, six or more.
    positions
        Where values are wanted, in intervals from the first point, 0 to ``count`` − 1.

    Returns
    -------
    ndarray
        Read-only matrix (positions, count); its product with the data gives the values.

    Notes
    -----
    Source: cie_167, clause 4.
    """
    padded = np.zeros((count + 4, count))
    padded[2:-2] = np.eye(count)
    padded[:2, :6] = _SPRAGUE_ENDS[:2]
    padded[-2:, -6:] = _SPRAGUE_ENDS[2:]
    place = np.asarray(positions)
    cell = np.clip(np.floor(place).astype(np.intp), 0, count - 2)
    powers = (place - cell)[:, None] ** np.arange(6)
    weights = powers @ _SPRAGUE_POLYNOMIAL
    matrix = np.zeros((place.size, count))
    for offset in range(6):
        matrix += weights[:, offset, None] * padded[cell + offset]
    matrix.setflags(write=False)
    return matrix


def normalised(values: Array) -> tuple[Array, Array, Array, NDArray[np.bool_]]:
    """Spectra divided by their peak, and which of them can be used at all.

    Parameters
    ----------
    values
        Spectra (series, w).

    Returns
    -------
    spectra
        Spectra with a peak of one; ones throughout where a spectrum cannot be used (series, w).
    peak
        What they were divided by (series,).
    lowest
        Lowest value after division (series,).
    usable
        False where a value is not finite or the sum is not positive (series,).
    """
    peak = values.max(axis=1)
    lowest = values.min(axis=1)
    usable = np.isfinite(peak) & np.isfinite(lowest) & (peak > 0)
    if usable.all():
        spectra = values / peak[:, None]
    else:
        peak = np.where(usable, peak, 1.0)
        spectra = np.where(usable[:, None], values, 1.0) / peak[:, None]
    positive = spectra.sum(axis=1) > 0
    if not positive.all():
        spectra[~positive] = 1.0
        usable &= positive
    lowest = np.where(usable, lowest, 0.0) / peak
    return spectra, peak, lowest, usable


def _cell_means(wavelength_nm: Array, values: Array, centre_nm: Array) -> Array:
    """Mean over 1 nm around each centre of the data joined by straight lines."""
    steps = np.diff(wavelength_nm)
    areas = 0.5 * (values[:, 1:] + values[:, :-1]) * steps
    total = np.concatenate([np.zeros((len(values), 1)), np.cumsum(areas, axis=1)], axis=1)
    slope = np.diff(values, axis=1) / steps
    edge = np.append(centre_nm - 0.5, centre_nm[-1] + 0.5)
    edge = np.clip(edge, wavelength_nm[0], wavelength_nm[-1])
    cell = np.clip(np.searchsorted(wavelength_nm, edge, side="right") - 1, 0, steps.size - 1)
    rest = edge - wavelength_nm[cell]
    reached = total[:, cell] + rest * (values[:, cell] + 0.5 * slope[:, cell] * rest)
    return np.asarray(np.diff(reached, axis=1))
