"""Tachometer log to two arrays, nothing more: times in seconds, speeds in rad/s.

A log is a text table with one head line: columns separated by comma, semicolon or tab, units in the head
(``time [s];speed [rpm]``) or given by options. With semicolon or tab, a decimal comma is read.
"""

from __future__ import annotations

import difflib
import hashlib
import io
import re
from dataclasses import dataclass
from pathlib import Path
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from spinhazard.errors import Complaint, InputError, quoted
from spinhazard.files import check_readable
from spinhazard.quantity.units import UnitRefused, factor_to_si

LOG_LIMIT = 400_000_000
"""Bytes; ten million rows of a usual log."""
LONGEST_HEAD = 2000
TIME_WORDS = ("time", "t", "zeit", "temps", "seconds", "sec")
SPEED_WORDS = ("speed", "n", "rpm", "omega", "drehzahl", "vitesse", "w")
_HEAD_CELL = re.compile(r"\A(?P<name>[^\[\](){}/]*?)\s*(?:[\[({/]\s*(?P<unit>[^\[\](){}]*?)\s*[\])}]?)?\Z")


class LogOptions(NamedTuple):
    """What the user says about the columns; empty where the head says it."""

    time_column: str = ""
    speed_column: str = ""
    time_unit: str = ""
    speed_unit: str = ""


@dataclass(frozen=True)
class TachometerLog:
    """One run.

    Attributes
    ----------
    name : str
        File.
    time : ndarray, shape (n,)
        Rising times [s].
    speed : ndarray, shape (n,)
        Speeds [rad/s].
    digest : str
        SHA-256 of the file.
    """

    name: str
    time: NDArray[np.float64]
    speed: NDArray[np.float64]
    digest: str = ""


class _Column(NamedTuple):
    place: int
    factor: float


def read_log(path: Path, options: LogOptions = LogOptions()) -> TachometerLog:  # noqa: B008  (immutable)
    """Read one log.

    Parameters
    ----------
    path : Path
        File.
    options : LogOptions
        Columns and units where the head does not name them.

    Returns
    -------
    TachometerLog
        Times and speeds.

    Raises
    ------
    InputError
        The file is no such table, a value is no number, or times do not rise.
    """
    check_readable(path, limit=LOG_LIMIT, what="a tachometer log")
    head, separator = _head_of(path)
    names = [cell.strip().strip('"') for cell in head.split(separator)]
    if len(names) < 2:
        raise InputError(
            Complaint(
                "the head names fewer than two columns", file=str(path), line=1, stated=quoted(head), accepted=_EXAMPLE
            )
        )
    time = _column(path, names, options.time_column, options.time_unit, TIME_WORDS, "time")
    speed = _column(path, names, options.speed_column, options.speed_unit, SPEED_WORDS, "angular speed")
    table = _numbers(path, separator, (time.place, speed.place))
    times, speeds = table[:, 0] * time.factor, np.abs(table[:, 1] * speed.factor)
    _refuse_disorder(path, times)
    with path.open("rb") as stream:
        digest = hashlib.file_digest(stream, "sha256").hexdigest()
    return TachometerLog(name=str(path), time=times - times[0], speed=speeds, digest=digest)


_EXAMPLE = 'a head such as "time [s];speed [rpm]"'


def _head_of(path: Path) -> tuple[str, str]:
    with path.open("rb") as stream:
        raw = stream.readline(LONGEST_HEAD + 1)
    if len(raw) > LONGEST_HEAD or b"\x00" in raw:
        raise InputError(Complaint("not a text table", file=str(path), line=1, accepted=_EXAMPLE))
    try:
        head = raw.decode("utf-8-sig").strip()
    except UnicodeDecodeError:
        raise InputError(
            Complaint("not readable as text in UTF-8", file=str(path), line=1, accepted=_EXAMPLE)
        ) from None
    separator = max(";\t,", key=head.count) if any(mark in head for mark in ";\t,") else ","
    return head, ";" if ";" in head else separator


def _column(path: Path, names: list[str], wanted: str, unit: str, words: tuple[str, ...], kind: str) -> _Column:
    cells = [_HEAD_CELL.match(name) for name in names]
    labels = [(cell["name"] if cell else name).strip().lower() for cell, name in zip(cells, names, strict=True)]
    what = "time" if kind == "time" else "speed"
    if wanted:
        found = next((i for i, label in enumerate(labels) if wanted.strip().lower() in {label, names[i].lower()}), None)
    else:
        found = next((i for i, label in enumerate(labels) if label in words or label.startswith(what)), None)
    if found is None:
        near = difflib.get_close_matches(wanted.lower(), labels, n=1, cutoff=0.4) if wanted else []
        raise InputError(
            Complaint(
                f"no column for the {what}",
                file=str(path),
                line=1,
                stated=quoted("; ".join(names)),
                accepted=f"a column named {words[0]}, or --{what}-column NAME",
                nearest=near[0] if near else "",
            )
        )
    cell = cells[found]
    stated = unit or (cell["unit"] if cell and cell["unit"] else "") or ("rpm" if labels[found] == "rpm" else "")
    if not stated:
        accepted = f"{_EXAMPLE}, or --{what}-unit UNIT"
        raise InputError(
            Complaint(f"the {what} has no unit", file=str(path), line=1, stated=quoted(names[found]), accepted=accepted)
        )
    try:
        return _Column(found, factor_to_si(stated, kind))
    except UnitRefused as error:
        raise InputError(
            Complaint(
                f"unit of the {what}: {error}",
                file=str(path),
                line=1,
                stated=quoted(stated),
                accepted=error.hint or _EXAMPLE,
            )
        ) from None


def _numbers(path: Path, separator: str, columns: tuple[int, int]) -> NDArray[np.float64]:
    try:
        if separator == ",":
            table = np.loadtxt(
                path, delimiter=separator, skiprows=1, usecols=columns, ndmin=2, encoding="utf-8-sig", comments="#"
            )
        else:
            text = path.read_text("utf-8-sig").replace(",", ".")
            table = np.loadtxt(
                io.StringIO(text), delimiter=separator, skiprows=1, usecols=columns, ndmin=2, comments="#"
            )
    except (ValueError, IndexError, UnicodeDecodeError) as error:
        raise InputError(_where(path, separator, columns, str(error))) from None
    if table.shape[0] < 3:
        raise InputError(Complaint("fewer than three readings", file=str(path), accepted="a row for each reading"))
    wrong = np.flatnonzero(~np.isfinite(table).all(axis=1))
    if wrong.size:
        problem = f"{wrong.size} readings are no numbers (NaN or infinite)"
        raise InputError(Complaint(problem, file=str(path), line=int(wrong[0]) + 2, accepted="finite numbers"))
    return table


def _where(path: Path, separator: str, columns: tuple[int, int], reason: str) -> Complaint:
    """The first line that is no row of numbers; only on the way to a message."""
    with path.open(encoding="utf-8-sig", errors="replace") as stream:
        for number, line in enumerate(stream, start=1):
            if number == 1 or not line.strip() or line.startswith("#"):
                continue
            cells = line.rstrip("\n").split(separator)
            try:
                for column in columns:
                    float(cells[column].replace(",", ".") if separator != "," else cells[column])
            except (ValueError, IndexError):
                shown = quoted(line.strip())
                return Complaint(
                    "not a row of numbers", file=str(path), line=number, stated=shown, accepted="time and speed"
                )
    return Complaint(f"not readable as a table ({reason.splitlines()[0][:100]})", file=str(path), accepted=_EXAMPLE)


def _refuse_disorder(path: Path, times: NDArray[np.float64]) -> None:
    steps = np.diff(times)
    wrong = np.flatnonzero(steps <= 0.0)
    if wrong.size:
        problem = "two readings have the same time" if steps[wrong[0]] == 0.0 else "the time runs backwards"
        more = f" ({wrong.size} such places)" if wrong.size > 1 else ""
        raise InputError(Complaint(problem + more, file=str(path), line=int(wrong[0]) + 3, accepted="rising times"))
