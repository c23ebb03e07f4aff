"""Colour figures against the plain colour-science loop, both timed in the same run.

Run from the root of the checkout, on one core::

    OPENBLAS_NUM_THREADS=1 python tests/benchmarks/bench_colour.py

Prints, for 1, 100 and 10 000 different spectra of 401 values, the time per spectrum of the whole
``spectral_figures`` (every figure, reasons and remarks) and of the part that the loop computes too
- (x, y), (CCT, Duv), (Ra, R1 to R15), (Rf, Rg) -, each with its ratio to the loop. Caches are
filled before on both sides. Rounds of the loop (on 20 spectra) and of the batch take turns, so
that a busy machine slows both alike; the best of each is kept.

Then the memory that the whole call takes beyond its own result, for growing numbers of spectra.
"""

from __future__ import annotations

import os
import sys
import time
import tracemalloc
import warnings
from pathlib import Path

os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
os.environ.setdefault("OMP_NUM_THREADS", "1")
sys.path.insert(0, str(Path(__file__).resolve().parents[2]))

import numpy as np

from generator.metrics.colour import chromaticity, spectral_figures
from generator.metrics.colour.colour_fidelity import cam02_ucs, colour_fidelity
from generator.metrics.colour.colour_rendering import colour_rendering_indices
from generator.metrics.colour.colour_temperature import correlated_colour_temperature
from generator.metrics.colour.reference_illuminant import reference_samples
from generator.metrics.colour.weighting import spectral_sums

NM = np.arange(380.0, 781.0)
LOOP_SIZE = 20
ROUNDS = 3


def different_spectra(count):
    """White LED spectra, all different: blue peak, phosphor peak, share and a little noise."""
    rng = np.random.default_rng(20)
    blue = rng.uniform(440, 465, (count, 1))
    phosphor = rng.uniform(550, 610, (count, 1))
    share = rng.uniform(0.4, 1.6, (count, 1))
    line = np.exp(-0.5 * ((NM - blue) / 9) ** 2)
    band = np.exp(-0.5 * ((NM - phosphor) / 52) ** 2)
    return (line + share * band) * (1 + 1e-3 * rng.standard_normal((count, NM.size)))


def same_figures(spectra, chunk=256):
    """The figures the loop computes, chunk by chunk."""
    for first in range(0, len(spectra), chunk):
        sums = spectral_sums(spectra[first : first + chunk], 380, 780, 1)
        x, y = chromaticity.chromaticity_xy(sums.tristimulus)
        u, v = chromaticity.chromaticity_uv_1960(x, y)
        cct, _ = correlated_colour_temperature(u, v)
        reference = reference_samples(1, cct)
        special = colour_rendering_indices(sums, u, v, reference.rendering, reference.white_uv)
        special[:, :8].mean(axis=1)
        colour_fidelity(cam02_ucs(sums.fidelity, sums.white), reference.fidelity)


def library_loop(colour, spectra):
    """One spectrum after the other, as the library's documentation shows."""
    shape = colour.SpectralShape(380, 780, 1)
    cmfs = colour.colorimetry.reshape_msds(
        colour.MSDS_CMFS["CIE 1931 2 Degree Standard Observer"], shape
    )
    for values in spectra:
        tristimulus = colour.sd_to_XYZ(values, cmfs, shape=shape, method="Integration")
        xy = colour.XYZ_to_xy(tristimulus)
        colour.uv_to_CCT(colour.xy_to_UCS_uv(xy), method="Ohno 2013")
        sd = colour.SpectralDistribution(values, NM)
        colour.colour_rendering_index(sd, additional_data=True, method="CIE 2024")
        colour.colour_fidelity_index(sd.copy(), additional_data=True, method="ANSI/IES TM-30-18")


def best_time(call, repeats):
    """Shortest of several runs [s]."""
    times = []
    for _ in range(repeats):
        start = time.perf_counter()
        call()
        times.append(time.perf_counter() - start)
    return min(times)


def working_memory(spectra):
    """Size of the result, and the largest size of all beside it [bytes]."""
    tracemalloc.start()
    figures = spectral_figures(NM, spectra, absolute=True)
    result, peak = tracemalloc.get_traced_memory()
    tracemalloc.stop()
    del figures
    return result, peak - result


def main():
    """Print the tables."""
    warnings.simplefilter("ignore")  # the library remarks on every interpolation
    import colour

    spectra = different_spectra(10_000)
    library_loop(colour, spectra[-2:])
    spectral_figures(NM, spectra[:300], absolute=True)
    same_figures(spectra[:300])
    loop = [
        best_time(lambda first=first: library_loop(colour, spectra[first : first + LOOP_SIZE]), 1)
        / LOOP_SIZE
        for first in range(0, ROUNDS * LOOP_SIZE, LOOP_SIZE)
    ]
    print(f"{'spectra':>8}  {'all figures':>22}  {'same figures':>22}")
    for count, repeats in ((1, 100), (100, 10), (10_000, 1)):
        some = spectra[:count]
        everything, same = [], []
        for first in range(0, ROUNDS * LOOP_SIZE, LOOP_SIZE):
            fresh = spectra[first : first + LOOP_SIZE]
            loop.append(best_time(lambda fresh=fresh: library_loop(colour, fresh), 1) / LOOP_SIZE)
            everything.append(
                best_time(lambda some=some: spectral_figures(NM, some, absolute=True), repeats)
            )
            same.append(best_time(lambda some=some: same_figures(some), repeats))
        cells = [
            f"{1e6 * t / count:9.1f} us {min(loop) * count / t:8.0f} x"
            for t in (min(everything), min(same))
        ]
        print(f"{count:>8}  {cells[0]:>22}  {cells[1]:>22}")
    print(f"colour-science loop: {1e3 * min(loop):.2f} ms a spectrum")
    for count in (500, 2_000, 10_000):
        result, beside = working_memory(spectra[:count])
        print(
            f"{count:>8}  result {result / 1e6:6.1f} MB, beside it {beside / 1e6:6.1f} MB at most"
        )


if __name__ == "__main__":
    main()
