"""What measured stops say: the value used, how many there are, how old, and whether they agree with the computed stop."""

from __future__ import annotations

import numpy as np

from spinhazard.facts.drag import drag_is_stated
from spinhazard.facts.fact import Word, fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.stopping import computed_time
from spinhazard.facts.subject import Subject
from spinhazard.sampling import Samples, interval, largest

ENOUGH_FOR_A_SPREAD = 5
SECONDS_PER_DAY = 86400.0


def _readings(sheet: FactSheet) -> list[Samples]:
    stopping = sheet.file.stopping
    times = stopping.measured_times if stopping is not None else ()
    return [sheet.draw(f"stopping.measured_times.{i}", time) for i, time in enumerate(times, start=1)]


@fact(
    per="machine", unit="s", symbol="t_meas", equation="t_meas = max(longest, mean + 3 s from five readings on)", source="practice",
)  # fmt: skip
def measured_stopping_time(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Stopping time from measured stops: the longest, and mean plus three standard deviations where there are five or more."""
    readings = _readings(sheet)
    if not readings:
        return None
    table = np.array(np.broadcast_arrays(*readings))
    longest: Samples = table.max(axis=0)
    if len(readings) < ENOUGH_FOR_A_SPREAD:
        return longest
    bound: Samples = table.mean(axis=0) + 3.0 * table.std(axis=0, ddof=1)
    return largest([longest, bound])


@fact(per="machine", symbol="n", equation="n = number of readings", source="practice")
def stop_measurements(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Number of measured stops."""
    count = len(sheet.file.stopping.measured_times) if sheet.file.stopping is not None else 0
    return np.array([float(count)]) if count else None


@fact(per="machine", word=True)
def measured_case(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Stop case that the measured stops belong to."""
    stopping = sheet.file.stopping
    if stopping is None or not stopping.measured_times:
        return None
    if stopping.measured_case is None and stopping.brakes:
        sheet.missing("stopping.measured_case")
        return None
    sheet.note("stopping.measured_case")
    return stopping.measured_case or "coast"


@fact(per="machine", symbol="t_meas/t", equation="t_meas / t", source="jcgm-100 4.3.1")
def measured_over_computed(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Measured stopping time over the one computed from the stated drag for the same stop case."""
    measured = sheet.where_applies("measured_stopping_time")
    if measured is None or not drag_is_stated(sheet):
        return None
    case = sheet.fact("measured_case")
    if case is None or not isinstance(case.value, str):
        return sheet.missing("stopping.measured_case")
    return measured / computed_time(sheet, case.value)


@fact(per="machine", symbol="d", equation="d = max(low end of t_meas/t, 1 / its high end, 1)", source="jcgm-100 4.3.1")
def stop_departure(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Factor by which measured and computed stop differ at least, whatever the values are within their spreads."""
    ratio = sheet.where_applies("measured_over_computed")
    if ratio is None or np.isnan(ratio[0]):
        return ratio
    # a wide spread must not make the two contradict each other: the interval's end nearest to agreement counts
    low, high = interval(ratio, sheet.rules.coverage)
    sheet.note("policy.coverage")
    return np.array([max(low, 1.0 / high if high > 0.0 else np.inf, 1.0)])


@fact(
    per="machine",
    unit="s",
    symbol="age",
    equation="day of assessment − day of measurement",
    source="policy measurement_age_limit",
)
def measurement_age(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Time from the measured stops to the assessment."""
    stopping = sheet.file.stopping
    if stopping is None or not stopping.measured_times:
        return None
    if stopping.measured_on is None or sheet.file.assessment.date is None:
        return sheet.missing(*(path for path, day in (
            ("stopping.measured_on", stopping.measured_on), ("assessment.date", sheet.file.assessment.date)) if day is None))  # fmt: skip
    sheet.note("stopping.measured_on")
    sheet.note("assessment.date")
    return np.array([(sheet.file.assessment.date - stopping.measured_on).days * SECONDS_PER_DAY])


@fact(per="machine", word=True)
def measured_before_change(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether the stops were measured before the last change of rotor, drive, brake or speed."""
    stopping, changed = sheet.file.stopping, sheet.file.assessment.last_change
    if stopping is None or not stopping.measured_times or changed is None:
        return None
    if stopping.measured_on is None:
        sheet.missing("stopping.measured_on")
        return None
    sheet.note("stopping.measured_on")
    sheet.note("assessment.last_change")
    return stopping.measured_on < changed
