"""Start-up of the command line against importing the packages it stands on, as whole processes in one run.

Run from the top of the project: ``python tests/benchmarks/start_up.py``. Exit code 1 where a limit is passed.
"""

from __future__ import annotations

import subprocess
import sys
import tempfile
import time
from pathlib import Path

ROOT = Path(__file__).parents[2]
ROUNDS = 9
IMPORTS = "import numpy, pydantic, typer, reportlab.platypus, pint; pint.UnitRegistry()"


def seconds(arguments: list[str], *, codes: tuple[int, ...] = (0,)) -> float:
    """Median time of a whole process."""
    times = []
    for _ in range(ROUNDS):
        started = time.perf_counter()
        done = subprocess.run([sys.executable, *arguments], cwd=ROOT, capture_output=True, check=False)
        times.append(time.perf_counter() - started)
        if done.returncode not in codes:
            raise SystemExit(done.stderr.decode())
    return sorted(times)[ROUNDS // 2]


def main() -> int:
    """Print the ratios."""
    worst = 0
    with tempfile.TemporaryDirectory() as folder:
        pairs = [
            ("--help", ["-m", "spinhazard", "--help"], "import typer", 2.5),
            (
                "assess with worksheet",
                [
                    "-m",
                    "spinhazard",
                    "assess",
                    "examples/extraction-fan.toml",
                    "--pdf",
                    f"{folder}/out.pdf",
                    "--overwrite",
                ],
                IMPORTS,
                2.0,
            ),
        ]
        for name, own, imports, limit in pairs:
            reference = seconds(["-c", imports])
            took = seconds(own, codes=(0, 1))
            print(
                f"{name}: {took:.3f} s = {took / reference:.2f} times `{imports}` ({reference:.3f} s; limit {limit:g})"
            )
            worst |= took / reference > limit
    return int(worst)


if __name__ == "__main__":
    sys.exit(main())
