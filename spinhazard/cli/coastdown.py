"""``spinhazard coastdown LOG…``: fit, compare, predict; to paste, to merge, as JSON and PDF."""

from __future__ import annotations

import json
import math
import sys
from dataclasses import dataclass
from pathlib import Path

from spinhazard.assessment import CAUTIONS, assess, program_name
from spinhazard.cli.chart import chart
from spinhazard.cli.screen import say, wrapped
from spinhazard.coastdown import UNITS, Run, as_data, fit_log, merged_into, slowest, stopping_lines
from spinhazard.errors import Complaint, InputError, quoted
from spinhazard.files import check_output, write_file
from spinhazard.mechanics.coastfit import NAMES, predicted_stop
from spinhazard.quantity.display import display, number
from spinhazard.quantity.notation import NotationError, parse_stated
from spinhazard.statement.reading import Reading, read_assessment
from spinhazard.statement.tachometer_log import LogOptions

LABELS = {"constant": "dry friction  a/J", "linear": "viscous drag  b/J", "quadratic": "windage       c/J"}


@dataclass(frozen=True)
class Wanted:
    """What to do with the fit."""

    inertia: str
    speeds: tuple[str, ...]
    standstill: str
    into: Path | None
    json: Path | None
    overwrite: bool


def run(files: list[Path], options: LogOptions, wanted: Wanted) -> None:
    """Fit logs and report.

    Parameters
    ----------
    files : list of Path
        Logs of the same rotor.
    options : LogOptions
        Columns and units.
    wanted : Wanted
        What to do with the fit.
    """
    standstill = _stated(wanted.standstill, "angular speed", "--standstill") if wanted.standstill else 0.0
    starts = [_stated(text, "angular speed", "--from") for text in wanted.speeds]
    inertia = _stated(wanted.inertia, "inertia", "--inertia") if wanted.inertia else None
    to_screen = wanted.json is not None and str(wanted.json) == "-"
    if wanted.json is not None and not to_screen:
        check_output(wanted.json, overwrite=wanted.overwrite)
    reading = read_assessment(wanted.into) if wanted.into is not None else None
    if reading is not None:
        inertia = _inertia_of(reading) if inertia is None else inertia
    runs = [fit_log(file, options) for file in files]
    governing = slowest(runs, max(starts or [run.fit.start_speed for run in runs]))
    pairs = [(start, standstill) for start in starts] or [(governing.fit.start_speed, standstill)]
    data = {
        "format": 1,
        "program": program_name(),
        **as_data(governing, pairs),
        "runs": [as_data(run, pairs) for run in runs],
    }
    data["cautions"] = CAUTIONS
    text = json.dumps(data, ensure_ascii=False, indent=1, allow_nan=False) + "\n"
    if to_screen:
        sys.stdout.write(text)
        return
    say(*_report(runs, governing, pairs, inertia))
    if wanted.json is not None:
        write_file(wanted.json, text.encode(), overwrite=wanted.overwrite)
        say("", f"Wrote {wanted.json}")
    if wanted.into is not None and reading is not None and inertia is not None:
        merged = merged_into(reading.text, stopping_lines(governing, inertia), name=str(wanted.into))
        write_file(wanted.into, merged.encode(), overwrite=True)
        say("", f"Merged into the [stopping] table of {wanted.into}")


def _stated(text: str, kind: str, option: str) -> float:
    try:
        stated = parse_stated(text, kind)
    except NotationError as error:
        raise InputError(Complaint(error.problem, field=option, stated=quoted(text), accepted=error.accepted)) from None
    if not stated.value > 0.0:
        raise InputError(Complaint("must be more than zero", field=option, stated=quoted(text), accepted=kind))
    return stated.value


def _inertia_of(reading: Reading) -> float:
    """Inertia of the drivetrain that the file's stopping table is about."""
    fact = assess(reading, best_estimate=True).fact("referred_inertia")
    if fact is None or not fact.known:
        needed = ", ".join(fact.missing) if fact is not None else ""
        raise InputError(
            Complaint(
                "the inertia at the stopping shaft is not known",
                file=reading.name,
                accepted=f"{needed}, or --inertia TEXT",
            )
        )
    return fact.best


def _report(runs: list[Run], governing: Run, pairs: list[tuple[float, float]], inertia: float | None) -> list[str]:
    lines: list[str] = []
    for run in runs:
        lines += [*_one(run, pairs), ""]
    if len(runs) > 1:
        lines += [*wrapped(f"Longest stop of {len(runs)} runs: {governing.log.name}. It is the one used below."), ""]
    lines += chart(
        governing.fit.time, governing.fit.speed * 30.0 / math.pi, governing.fit.fitted * 30.0 / math.pi, "rpm over s"
    )
    residual = (governing.fit.speed - governing.fit.fitted) * 30.0 / math.pi
    lines += ["", *chart(governing.fit.time, residual, residual * 0.0, "residual, rpm over s", height=5), ""]
    if inertia is None:
        lines += wrapped("With --inertia TEXT, or --into FILE, the stopping table of an assessment file is written.")
    else:
        lines += [
            f"With {display(inertia, 'kg m²')} at this shaft, for the [stopping] table:",
            "",
            *stopping_lines(governing, inertia),
        ]
    return [*lines, "", *wrapped(CAUTIONS[2])]


def _one(run: Run, pairs: list[tuple[float, float]]) -> list[str]:
    fit = run.fit
    lines = wrapped(
        f"{run.log.name}: coast from {display(fit.start_speed, 'rad/s')} to {display(fit.end_speed, 'rad/s')}, beginning "
        f"{number(fit.began)} s into the log; {fit.readings} readings, scatter {display(fit.deviation, 'rad/s', figures=2)}"
    )
    for name, value, low, high in zip(NAMES, fit.value, fit.low, fit.high, strict=True):
        lines.append(f"  {LABELS[name]}  {number(value)} {UNITS[name]}  (95 %: {number(low)} to {number(high)})")
    for start, end in pairs:
        best, low, high = (display(time, "s") for time in predicted_stop(fit, start, end_speed=end))
        to = f"to {display(end, 'rad/s')}" if end else "to standstill"
        lines += wrapped(f"from {display(start, 'rad/s')} {to}: {best} (95 %: {low} to {high})", indent=2)
        if end < fit.end_speed:
            lines += wrapped(f"below {display(fit.end_speed, 'rad/s')} this is extrapolated beyond the log", indent=4)
    for remark in fit.remarks:
        lines += wrapped(remark, indent=4, first="  · ")
    return lines
