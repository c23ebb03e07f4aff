"""Speed of SVM and PstLM on a long light record, against the time the record took.

Run: python -m tests.benchmarks.bench_modulation, or as a file from the top folder.
"""

from __future__ import annotations

from time import perf_counter

import numpy as np

from generator.metrics.modulation import light_figures, light_lines, pst_lm, svm

DURATION_S = 180.0
RATE_HZ = 20000.0


def main() -> None:
    """Print how many times faster than real time the figures are computed."""
    time = np.arange(round(DURATION_S * RATE_HZ)) / RATE_HZ
    rng = np.random.default_rng(1)
    light = 1 + 0.2 * np.sin(2 * np.pi * 100.02 * time) + 0.001 * rng.standard_normal(time.size)
    batch = light[None, :]
    pst_lm(batch[:, : 40 * 20000], RATE_HZ)  # the filter library is loaded once
    start = perf_counter()
    svm(light_lines(batch, RATE_HZ))
    middle = perf_counter()
    pst_lm(batch, RATE_HZ)
    end = perf_counter()
    light_figures(batch, RATE_HZ)
    last = perf_counter()
    print(f"record: {DURATION_S:g} s at {RATE_HZ:g} Hz")
    print(f"SVM {middle - start:.3f} s, PstLM {end - middle:.3f} s")
    print(f"SVM and PstLM: {DURATION_S / (end - start):.0f} times real time (at least 100 asked)")
    print(f"all modulation figures: {DURATION_S / (last - end):.0f} times real time")


if __name__ == "__main__":
    main()
