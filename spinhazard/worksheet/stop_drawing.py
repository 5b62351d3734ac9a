"""Speed and energy over time for each stop case; line styles tell the cases apart without colour."""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable

import numpy as np
from reportlab.graphics.shapes import Drawing, Line, PolyLine, Rect, String
from reportlab.lib import colors

from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.stopping import speed_at
from spinhazard.quantity.display import display
from spinhazard.sampling import Sampler, Samples
from spinhazard.worksheet.page import Sheet
from spinhazard.worksheet.style import FAINT, PLAIN, RULE

POINTS = 240
HEIGHT = 150.0
ON_EACH_OTHER = 0.01
"""Curves nearer than this share of the highest speed cannot be told apart on paper."""
DASHES: dict[str, tuple[list[float] | None, float]] = {
    "normal stop": (None, 1.4),
    "power loss": ([6, 2], 1.2),
    "brake failed": ([1.5, 2], 1.2),
}


def stop_drawing(sheet: Sheet) -> tuple[Drawing, list[str]] | None:
    """Two charts side by side, and what has to be said about them.

    Parameters
    ----------
    sheet : Sheet
        What to draw.

    Returns
    -------
    (Drawing, list of str) or None
        None where no stop could be computed.
    """
    assessment = sheet.assessment
    facts = {stop.entity: assessment.fact("stopping_time", stop.name) for stop in assessment.sheet.subjects.stops}
    ends = {case: fact.best for case, fact in facts.items() if fact is not None and fact.known}
    inertia, start = assessment.fact("referred_inertia"), assessment.fact("stopping_shaft_speed")
    if not ends or inertia is None or start is None or not start.best > 0.0:
        return None
    times = np.linspace(0.0, _horizon(list(ends.values())), POINTS)
    speeds = _best_speeds(sheet, list(ends), times)
    energies = {case: 0.5 * inertia.best * speed**2 for case, speed in speeds.items()}
    drawing = Drawing(sheet.width, HEIGHT + 30)
    half = sheet.width / 2.0
    _chart(drawing, sheet, (0.0, half - 8), times, speeds, start.best, "rad/s")
    _chart(drawing, sheet, (half + 4, half - 8), times, energies, 0.5 * inertia.best * start.best**2, "J")
    _legend(drawing, list(ends))
    return drawing, _remarks(ends, speeds, start.best, float(times[-1]))


def _remarks(ends: dict[str, float], speeds: dict[str, Samples], start: float, horizon: float) -> list[str]:
    """Curves that lie on each other, and stops that never end."""
    said = [
        f"{one} and {other} lie on each other"
        for one, other in itertools.combinations(speeds, 2)
        if np.max(np.abs(speeds[one] - speeds[other])) < ON_EACH_OTHER * start
    ]
    said += [
        f"{case} never reaches standstill and is drawn to {display(horizon, 's')}"
        for case, end in ends.items()
        if math.isinf(end)
    ]
    return said


def _horizon(times: list[float]) -> float:
    """End of the time axis: a little beyond the longest stop that ends; stops that never end run off the chart."""
    ending = [time for time in times if math.isfinite(time)]
    longest = 1.06 * max(ending) if ending else 0.0
    return max(longest, 1.0) if len(ending) == len(times) else max(4.0 * longest, 600.0)


def _best_speeds(sheet: Sheet, cases: list[str], times: Samples) -> dict[str, Samples]:
    """Speeds by best estimate: the same facts without draws, evaluated at many times at once."""
    assessment = sheet.assessment
    best = FactSheet(
        assessment.file, assessment.policy, Sampler("", 0, assessment.policy.spreads), assessment.sheet.beside
    )
    with np.errstate(all="ignore"):  # infinity stands for a stop that never ends
        return {case: np.asarray(speed_at(best, case, times), dtype=np.float64) for case in cases}


def _chart(
    drawing: Drawing,
    sheet: Sheet,
    place: tuple[float, float],
    times: Samples,
    curves: dict[str, Samples],
    top: float,
    unit: str,
) -> None:
    left, width = place[0] + 46, place[1] - 50
    bottom, height = 40.0, HEIGHT - 26.0
    horizon = float(times[-1])

    def across(time: float) -> float:
        return left + width * time / horizon

    drawing.add(Rect(left, bottom, width, height, fillColor=None, strokeColor=RULE, strokeWidth=0.6))
    for share in (0.25, 0.5, 0.75, 1.0):
        level = bottom + height * share / 1.05
        drawing.add(Line(left, level, left + width, level, strokeColor=FAINT, strokeWidth=0.3))
        drawing.add(_text(left - 3, level - 2.5, display(top * share, unit, system=sheet.system, figures=3), "end"))
    step = _nice_step(horizon)
    for tick in np.arange(0.0, horizon * 0.999, step):
        drawing.add(Line(across(tick), bottom, across(tick), bottom - 3, strokeColor=RULE, strokeWidth=0.5))
        drawing.add(_text(across(tick), bottom - 11, f"{tick:g} s", "middle"))
    for case, values in curves.items():
        dash, thickness = DASHES[case]
        points = [
            coordinate
            for t, v in zip(times, values, strict=True)
            for coordinate in (across(float(t)), bottom + height * float(v) / (1.05 * top))
        ]
        drawing.add(PolyLine(points, strokeColor=colors.black, strokeWidth=thickness, strokeDashArray=dash))
    _marks(drawing, sheet, across, (left, left + width), (bottom, height))


def _marks(
    drawing: Drawing,
    sheet: Sheet,
    across: Callable[[float], float],
    sides: tuple[float, float],
    frame: tuple[float, float],
) -> None:
    """Earliest access and stated wait as lines with a letter, access through each guard as a short tick."""
    bottom, top = frame[0], frame[0] + frame[1]
    for guard in sheet.assessment.sheet.subjects.guards:
        fact = sheet.assessment.fact("stop_time_before_access", guard.name)
        if fact is not None and fact.known and across(fact.best) <= sides[1]:
            x = across(fact.best)
            drawing.add(Line(x, top, x, top - 7, strokeColor=RULE, strokeWidth=0.9))
    for letter, key, subject in (("A", "earliest_access", "machine"), ("W", "stated_wait", "lockout")):
        fact = sheet.assessment.fact(key, subject)
        if fact is None or not fact.known or not math.isfinite(fact.best):
            continue
        x = min(across(fact.best), sides[1])
        drawing.add(Line(x, bottom, x, top, strokeColor=RULE, strokeWidth=0.9, strokeDashArray=[3, 1.5, 0.8, 1.5]))
        beyond = " →" if across(fact.best) > sides[1] else ""
        drawing.add(_text(x, top + 3, letter + beyond, "end" if beyond else "middle"))


def _legend(drawing: Drawing, cases: list[str]) -> None:
    x = 46.0
    for case in cases:
        dash, thickness = DASHES[case]
        drawing.add(Line(x, 12, x + 24, 12, strokeColor=colors.black, strokeWidth=thickness, strokeDashArray=dash))
        drawing.add(_text(x + 28, 9.5, case, "start"))
        x += 96.0


def _text(x: float, y: float, text: str, anchor: str) -> String:
    return String(x, y, text, fontName=PLAIN, fontSize=6.8, textAnchor=anchor)


def _nice_step(span: float) -> float:
    """Step of about five ticks: 1, 2 or 5 times a power of ten."""
    raw = span / 5.0
    power: float = 10.0 ** math.floor(math.log10(raw))
    return next(power * factor for factor in (1.0, 2.0, 5.0, 10.0) if power * factor >= raw * 0.999)
