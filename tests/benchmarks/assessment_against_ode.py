"""One assessment against scipy solve_ivp coast-downs of the same rotor, in one run on one machine.

Run from the top of the project: ``python tests/benchmarks/assessment_against_ode.py``. Exit code 1 where a limit is passed.
A coast-down is what a general-purpose tool would do for one stop: solve_ivp, default method, rtol 1e-9, to standstill.
"""

from __future__ import annotations

import sys
import time
from pathlib import Path

import numpy as np
from scipy.integrate import solve_ivp

from spinhazard import assess, assessment_from_text

ROUNDS = 40
LIMITS = {"best estimate": 3.0, "4 096 draws": 20.0}


def coast_down() -> object:
    """One coast-down of the extraction fan by scipy."""

    def motion(_t: float, y: np.ndarray) -> list[float]:
        return [-(3.1 + 0.002 * y[0] + 0.0041 * y[0] ** 2) / 26.5]

    def stopped(_t: float, y: np.ndarray) -> float:
        return y[0] - 0.1047

    stopped.terminal = True  # type: ignore[attr-defined]
    return solve_ivp(motion, (0.0, 1e4), [155.0], rtol=1e-9, atol=1e-9, events=stopped)


def seconds(work) -> float:  # type: ignore[no-untyped-def]
    """Lower quartile of the times of repeated runs; what disturbs a run only makes it longer."""
    times = []
    for _ in range(ROUNDS):
        started = time.perf_counter()
        work()
        times.append(time.perf_counter() - started)
    return sorted(times)[ROUNDS // 4]


def main() -> int:
    """Print the ratios."""
    text = (Path(__file__).parents[2] / "examples/extraction-fan.toml").read_text("utf-8")
    assess(assessment_from_text(text, name="warm-up"))
    reference = seconds(coast_down)
    print(f"solve_ivp coast-down: {reference * 1e3:.2f} ms")
    worst = 0
    for name, best_estimate in (("best estimate", True), ("4 096 draws", False)):
        own = seconds(lambda best=best_estimate: assess(assessment_from_text(text, name="bench"), best_estimate=best))
        ratio = own / reference
        print(f"assessment, {name}: {own * 1e3:.2f} ms = {ratio:.2f} coast-downs (limit {LIMITS[name]:g})")
        worst |= ratio > LIMITS[name]
    return int(worst)


if __name__ == "__main__":
    sys.exit(main())
