"""Coast-down logs to the drag of a rotor: reading, fitting, and the stopping table that follows. One page, like assessment.py."""

from __future__ import annotations

import re
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from spinhazard.errors import Complaint, InputError
from spinhazard.mechanics.coastfit import NAMES, CoastFit, fit_coast, predicted_stop
from spinhazard.quantity.display import number
from spinhazard.statement.reading import assessment_from_text
from spinhazard.statement.tachometer_log import LogOptions, TachometerLog, read_log

FIELDS = {"constant": ("friction_torque", "N m"), "linear": ("viscous", "N m s"), "quadratic": ("windage", "N m s2")}
"""Coefficient to its field of the stopping table and the unit it is written in."""
UNITS = {"constant": "rad/s²", "linear": "1/s", "quadratic": "1/rad"}


@dataclass(frozen=True)
class Run:
    """One log with its fit."""

    log: TachometerLog
    fit: CoastFit


def fit_log(path: Path, options: LogOptions) -> Run:
    """Read and fit one log.

    Parameters
    ----------
    path : Path
        Log file.
    options : LogOptions
        Columns and units.

    Returns
    -------
    Run
        Log and fit.

    Raises
    ------
    InputError
        The file is no log, or there is no coast in it.
    """
    log = read_log(path, options)
    try:
        return Run(log, fit_coast(log.time, log.speed))
    except ValueError as error:
        raise InputError(
            Complaint(str(error), file=str(path), accepted="a log in which the rotor coasts down from its speed")
        ) from None


def slowest(runs: list[Run], start_speed: float) -> Run:
    """The run whose drag gives the longest stop from a speed: the one that governs.

    Parameters
    ----------
    runs : list of Run
        Runs of the same rotor.
    start_speed : float
        Speed [rad/s].

    Returns
    -------
    Run
        The slowest.
    """
    # a twentieth of the speed: beyond the log's end the tail would decide
    return max(runs, key=lambda run: predicted_stop(run.fit, start_speed, end_speed=0.05 * start_speed)[0])


def as_data(run: Run, predictions: list[tuple[float, float]]) -> dict[str, Any]:
    """One run as plain data, keys as in the contract.

    Parameters
    ----------
    run : Run
        The run.
    predictions : list of (float, float)
        Start and end speeds to predict the stop between [rad/s].

    Returns
    -------
    dict
        Coefficients over inertia in rad/s², 1/s, 1/rad; speeds in rad/s, times in s.
    """
    fit = run.fit
    data: dict[str, Any] = {"log": run.log.name}
    for name, value, low, high in zip(NAMES, fit.value, fit.low, fit.high, strict=True):
        data[f"{name}_over_inertia"] = {
            "value": float(value),
            "low": float(low),
            "high": float(high),
            "unit": UNITS[name],
        }
    data |= {
        "start_speed": fit.start_speed, "end_speed": fit.end_speed, "coast_begins": fit.began, "readings": fit.readings,
        "spikes": fit.spikes, "deviation": fit.deviation, "remarks": list(fit.remarks), "predictions": [],
    }  # fmt: skip
    for start, end in predictions:
        times = predicted_stop(fit, start, end_speed=end)
        shown = ["never" if time == float("inf") else time for time in times]
        data["predictions"].append({"from": start, "to": end, "value": shown[0], "low": shown[1], "high": shown[2]})
    return data


def stopping_lines(run: Run, inertia: float) -> list[str]:
    """Lines of the stopping table that the fit gives for a known inertia.

    Parameters
    ----------
    run : Run
        The run.
    inertia : float
        Inertia referred to the shaft of the log [kg m²].

    Returns
    -------
    list of str
        TOML lines; a part that is not there is left out.
    """
    name = Path(run.log.name).name.replace("\\", "/").replace('"', "'")
    lines = []
    for part, value, low, high in zip(NAMES, run.fit.value, run.fit.low, run.fit.high, strict=True):
        if value <= 0.0:
            continue
        field, unit = FIELDS[part]
        half = max(high - value, value - low) * inertia
        text = f"{number(value * inertia, figures=5)} {unit} ± {number(half, figures=2)} {unit} (k=2)"
        lines.append(f'{field} = {{ value = "{text}", source = "measured", note = "coast-down log {name}" }}')
    return lines


_KEYS = re.compile(r"^\s*(?:friction_torque|viscous|windage|loss_power)\s*=")
_HEADER = re.compile(r"^\s*\[")
_STOPPING = re.compile(r"^\s*\[\s*stopping\s*\]")


def merged_into(text: str, lines: list[str], *, name: str) -> str:
    """An assessment file with the drag of its stopping table replaced by a fit; the rest stays as it is written.

    Parameters
    ----------
    text : str
        Text of the assessment file, which has a stopping table.
    lines : list of str
        Result of :func:`stopping_lines`.
    name : str
        What messages call the file.

    Returns
    -------
    str
        The new text, checked to be readable.

    Raises
    ------
    InputError
        There is no stopping table, or a drag value in it runs over several lines.
    """
    rows = text.split("\n")
    start = next((i for i, row in enumerate(rows) if _STOPPING.match(row)), None)
    if start is None:
        raise InputError(
            Complaint("there is no [stopping] table to merge into", file=name, accepted='[stopping] with shaft = "…"')
        )
    stop = next((i for i in range(start + 1, len(rows)) if _HEADER.match(rows[i])), len(rows))
    kept = []
    for i in range(start + 1, stop):
        if not _KEYS.match(rows[i]):
            kept.append(rows[i])
        elif rows[i].count("[") != rows[i].count("]") or '"""' in rows[i]:
            raise InputError(Complaint("this value runs over several lines and is left to you", file=name, line=i + 1))
    merged = "\n".join([*rows[: start + 1], *lines, *kept, *rows[stop:]])
    assessment_from_text(merged, name=name)
    return merged
