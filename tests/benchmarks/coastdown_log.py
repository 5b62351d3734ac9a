"""One million rows read and fitted against numpy loading the same file, in one run. Exit code 1 where the limit is passed.

Run from the top of the project: ``python tests/benchmarks/coastdown_log.py``.
"""

from __future__ import annotations

import sys
import tempfile
import time
from pathlib import Path

import numpy as np

from spinhazard.mechanics.coastdown import speed_after
from spinhazard.mechanics.coastfit import fit_coast
from spinhazard.statement.tachometer_log import read_log

ROWS, LIMIT = 1_000_000, 5.0


def main() -> int:
    """Print the ratio."""
    seconds = np.arange(ROWS) * 3e-4
    coast = speed_after(
        np.maximum(seconds - 20.0, 0.0), 1.0, start_speed=155.0, constant=0.12, linear=1e-4, quadratic=1.6e-4
    )
    noisy = np.where(seconds < 20.0, 155.0, coast) * 60.0 / (2.0 * np.pi) + np.random.default_rng(0).normal(
        0.0, 2.0, ROWS
    )
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "log.csv"
        np.savetxt(
            path,
            np.column_stack([seconds, noisy]),
            delimiter=",",
            fmt="%.5f",
            header="time [s],speed [rpm]",
            comments="",
        )
        reference, own = [], []
        for _ in range(3):
            started = time.perf_counter()
            np.loadtxt(path, delimiter=",", skiprows=1)
            between = time.perf_counter()
            log = read_log(path)
            fit_coast(log.time, log.speed)
            own.append(time.perf_counter() - between)
            reference.append(between - started)
    ratio = min(own) / min(reference)
    print(
        f"read and fitted: {min(own):.2f} s = {ratio:.2f} times numpy.loadtxt ({min(reference):.2f} s; limit {LIMIT:g})"
    )
    return int(ratio > LIMIT)


if __name__ == "__main__":
    sys.exit(main())
