"""``lampassay measure`` of one small file against the bare import of numpy and pandas.

Run: python -m tests.benchmarks.bench_measure, or as a file from the top folder.

Whole processes, in turn, so that a busy machine slows both alike; prints the median of each and
of their ratio, for a spectrum, a light record and a mains capture.
"""

from __future__ import annotations

import subprocess
import sys
import tempfile
from pathlib import Path
from statistics import median
from time import perf_counter

import numpy as np

RUNS = 9
IMPORTS = (sys.executable, "-c", "import numpy, pandas")
TOP = Path(__file__).resolve().parents[2]


def small_files(folder: Path) -> list[Path]:
    """Write one file of each kind that the command reads."""
    nm = np.arange(380.0, 781.0)
    time = np.arange(20000) / 20000
    led = np.exp(-0.5 * ((nm - 450) / 9) ** 2) + np.exp(-0.5 * ((nm - 590) / 52) ** 2)
    turn = 2 * np.pi * 50 * time[:4000]
    mains = 325 * np.sin(turn), 0.05 * np.sin(turn - 0.4) + 0.01 * np.sin(3 * turn)
    tables = {
        "spectrum": ("wavelength_nm,lamp-01", (nm, led)),
        "light": ("time_s,lamp-01", (time, 1 + 0.2 * np.sin(2 * np.pi * 100 * time))),
        "mains": ("time_s,voltage_v,current_a", (time[:4000], *mains)),
    }
    paths = []
    for kind, (heading, columns) in tables.items():
        path = folder / f"{kind}.csv"
        table = np.column_stack(columns)
        np.savetxt(path, table, "%.6g", ",", header=heading, comments="")
        paths.append(path)
    return paths


def process_time(command: tuple[str, ...]) -> float:
    """Time from start to end of one process [s]."""
    start = perf_counter()
    subprocess.run(command, check=True, capture_output=True, cwd=TOP)
    return perf_counter() - start


def main() -> None:
    """Print the times and their ratios."""
    with tempfile.TemporaryDirectory() as name:
        for path in small_files(Path(name)):
            measure = (sys.executable, "-m", "generator", "measure", str(path), "--json")
            process_time(measure)
            process_time(IMPORTS)
            pairs = [(process_time(measure), process_time(IMPORTS)) for _ in range(RUNS)]
            ours, bare = (median(times) for times in zip(*pairs, strict=True))
            ratio = median(mine / theirs for mine, theirs in pairs)
            print(
                f"{path.stem:<9} measure {ours:.3f} s, imports {bare:.3f} s: {ratio:.2f} times "
                "(below 1.5 asked)"
            )


if __name__ == "__main__":
    main()
