"""A small chart of text: measured points and a fitted line, for any terminal."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from spinhazard.cli.screen import width
from spinhazard.quantity.display import number

MARGIN = 10


def chart(
    x: NDArray[np.float64], points: NDArray[np.float64], line: NDArray[np.float64], title: str, *, height: int = 11
) -> list[str]:
    """Lines of text with points as ``o`` and the line as ``-``.

    Parameters
    ----------
    x, points, line : ndarray, shape (n,)
        Abscissae, measured values, fitted values.
    title : str
        What is drawn.
    height : int
        Rows.

    Returns
    -------
    list of str
        Lines, at most as wide as the terminal.
    """
    columns = min(width() - MARGIN - 2, 100)
    low, high = float(min(points.min(), line.min())), float(max(points.max(), line.max()))
    span = high - low or 1.0
    cells = [[" "] * columns for _ in range(height)]

    def place(values: NDArray[np.float64], mark: str) -> None:
        across = np.round((x - x[0]) / (x[-1] - x[0]) * (columns - 1)).astype(int)
        for column in range(columns):
            here = values[across == column]
            if here.size:
                row = height - 1 - round(float((here.mean() - low) / span * (height - 1)))
                cells[row][column] = mark

    place(line, "-")
    place(points, "o")
    lines = [f"{'':>{MARGIN}} {title}   (o log, - fit)"]
    for index, row in enumerate(cells):
        label = number(high - span * index / (height - 1), figures=3) if index in {0, height - 1} else ""
        lines.append(f"{label:>{MARGIN}}|{''.join(row).rstrip()}")
    return [*lines, f"{'':>{MARGIN}}+{'-' * columns}", f"{'0':>{MARGIN + 1}}{number(float(x[-1] - x[0])):>{columns}}"]
