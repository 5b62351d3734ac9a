"""Stop cases: table, measured stops, speed and energy over time."""

from __future__ import annotations

import statistics

from reportlab.platypus import Flowable, KeepTogether

from spinhazard.facts.measured import ENOUGH_FOR_A_SPREAD
from spinhazard.quantity.display import display
from spinhazard.worksheet.grid import Grid
from spinhazard.worksheet.page import Sheet, heading
from spinhazard.worksheet.stop_drawing import stop_drawing
from spinhazard.worksheet.style import BODY, SMALL
from spinhazard.worksheet.text import paragraph, shares

COLUMNS = (
    "stopping_time",
    "stopping_turns",
    "energy_at_access",
    "brake_heat",
    "brake_temperature_rise",
    "brake_rating_use",
)


def stops(sheet: Sheet, number: int) -> list[Flowable]:
    """Stop cases.

    Parameters
    ----------
    sheet : Sheet
        What to print.
    number : int
        Number of the section.

    Returns
    -------
    list of Flowable
        Flowables.
    """
    file = sheet.assessment.file
    if file.stopping is None:
        return [
            *heading(number, "Stops"),
            paragraph("Nothing is stated about stopping, so no stop was computed.", BODY),
        ]
    credible = sheet.assessment.policy.credible_stops
    rows = []
    for stop in sheet.assessment.sheet.subjects.stops:
        time = sheet.assessment.fact("stopping_time", stop.name)
        cells = [sheet.of(time, interval=True) if time is not None else "–"]
        cells += [sheet.number(key, stop.name) for key in COLUMNS[1:]]
        rows.append([stop.entity + ("" if stop.entity in credible else " (not credible by policy)"), *cells])
    heads = ("stop case", "time to standstill", "turns", "energy at access", "brake heat", "temp. rise", "heat/rating")
    made = Grid(heads, rows, shares(sheet.width, (17, 25, 10, 14, 13, 11, 11)), numbers=(1, 2, 3, 4, 5, 6))
    return [*heading(number, "Stops"), *_basis(sheet), made, *_measured(sheet), *_drawing(sheet)]


def _basis(sheet: Sheet) -> list[Flowable]:
    drag = "; ".join(f"{label} {sheet.number(key)}" for label, key in (
        ("constant", "constant_drag"), ("per rad/s", "linear_drag"), ("per (rad/s)²", "quadratic_drag")))  # fmt: skip
    stopping = sheet.assessment.file.stopping
    conditions = f" Tried: {stopping.conditions}." if stopping is not None and stopping.conditions else ""
    shaft = stopping.shaft if stopping is not None else ""
    text = (
        f"Referred to the shaft {shaft}, from {sheet.number('stopping_shaft_speed')}, with {sheet.number('referred_inertia')} of referred "
        f"inertia and drag {drag}.{conditions} Normal stop: everything works. Power loss: no control delay, only brakes that work without "
        f"supply. Brake failed: the strongest brake is absent."
    )
    return [paragraph(text, BODY)]


def _measured(sheet: Sheet) -> list[Flowable]:
    stopping = sheet.assessment.file.stopping
    if stopping is None or not stopping.measured_times:
        return []
    readings = ", ".join(time.text for time in stopping.measured_times)
    case = stopping.measured_case or "stop case not stated"
    day = f" on {stopping.measured_on}" if stopping.measured_on else ""
    value = sheet.number("measured_stopping_time")
    seconds = [time.value for time in stopping.measured_times]
    spread = ""
    if len(seconds) > 1:
        mean, deviation = statistics.fmean(seconds), statistics.stdev(seconds)
        spread = f"; mean {display(mean, 's')}, standard deviation {display(deviation, 's')}"
    text = (
        f"Measured ({case}{day}): {readings}. Longest {display(max(seconds), 's')}{spread}. Used: {value}, by the convention: the longest "
        f"reading or, from {ENOUGH_FOR_A_SPREAD} readings on, the mean plus three standard deviations if that is longer."
    )
    return [paragraph(text, SMALL)]


def _drawing(sheet: Sheet) -> list[Flowable]:
    made = stop_drawing(sheet)
    if made is None:
        return []
    drawing, remarks = made
    wait = sheet.assessment.fact("stated_wait", "lockout")
    access = sheet.assessment.fact("earliest_access")
    marks = []
    if access is not None and access.known:
        marks.append(
            f"A: earliest access, {display(access.best, 's')} into the stop; short ticks: access guard by guard"
        )
    if wait is not None and wait.known:
        marks.append(f"W: stated wait, {display(wait.best, 's')}")
    caption = (
        "Computed speed (left) and energy of the drivetrain (right) over the time after the stop command, by best estimate; a longer "
        "measured time stands in the table only"
    )
    sentences = [caption, *marks, *(remark[0].upper() + remark[1:] for remark in remarks)]
    return [KeepTogether([drawing, paragraph(". ".join(sentences) + ".", SMALL)])]
