"""Reaching the hazard zone: access time, required distance, openings, settings of guards and abrasive wheels."""

from __future__ import annotations

import math

import numpy as np

from spinhazard.facts.fact import Word, fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import reach
from spinhazard.sampling import Samples, largest, smallest
from spinhazard.statement.guarding import Opening

ZERO: Samples = np.zeros(1)
ACTS_ON_OPENING = ("interlocked", "light curtain", "two-hand")
"""Guards that give the stop command themselves when a person comes; at others the person stops the machine first."""


def _optional(sheet: FactSheet, guard: Subject, field: str) -> Samples:
    return ZERO if getattr(guard.entity, field) is None else sheet.value(guard, field)


@fact(per="guard", word=True)
def guard_kind(sheet: FactSheet, guard: Subject) -> Word | None:
    """Kind of guard."""
    return sheet.word(guard, "kind")


@fact(per="guard", word=True)
def guard_fastening(sheet: FactSheet, guard: Subject) -> Word | None:
    """What it takes to open the guard."""
    return sheet.word(guard, "fastening")


@fact(per="guard", word=True)
def lock_release(sheet: FactSheet, guard: Subject) -> Word | None:
    """What releases the guard lock."""
    return sheet.word(guard, "lock_release")


@fact(per="guard", unit="s", symbol="t_lock")
def lock_timer(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Time after which the guard lock is released."""
    return sheet.value(guard, "lock_timer") if guard.entity.lock_release == "timer" else None


@fact(per="guard", unit="s", symbol="t_resp")
def response_time(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Time from opening or interrupting the guard to the stop command."""
    return sheet.value(guard, "response_time") if guard.entity.kind in ACTS_ON_OPENING else None


@fact(per="guard", unit="m", symbol="S_g")
def guard_distance(sheet: FactSheet, guard: Subject) -> Samples:
    """Distance from the guard plane to the nearest moving part."""
    return sheet.value(guard, "distance")


@fact(
    per="guard", unit="s", symbol="t_acc", formulas=[reach.reach_time],
    equation="t_acc = (S_g − C)/K, not less than opening time (tool) or lock timer",
)  # fmt: skip
def access_time(sheet: FactSheet, guard: Subject) -> Samples:
    """Least time in which a person can reach the hazard zone through this guard."""
    time = sheet.apply(
        reach.reach_time,
        sheet.value(guard, "distance"),
        sheet.policy("approach_speed"),
        intrusion=_optional(sheet, guard, "intrusion"),
    )
    if guard.entity.fastening == "tool" and guard.entity.opening_time is not None:
        time = np.maximum(time, sheet.value(guard, "opening_time"))
    if guard.entity.lock_release == "timer":
        time = np.maximum(time, sheet.value(guard, "lock_timer"))
    return time


@fact(per="guard", unit="s", symbol="t_used", equation="t_used = t_acc − t_resp, at least 0", source="iso-13855")
def stop_time_before_access(sheet: FactSheet, guard: Subject) -> Samples:
    """Time the rotor has been stopping when the hazard zone can be reached: access time less the guard's response."""
    response = sheet.where_applies("response_time", guard)
    return np.maximum(sheet("access_time", guard) - (ZERO if response is None else response), 0.0)


@fact(
    per="machine",
    unit="s",
    symbol="t_acc",
    equation="t_acc = min over the guards without standstill sensor",
    source="iso-13855",
)
def earliest_access(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Least time the rotor has been stopping when it can be reached through any guard."""
    times = [
        sheet("stop_time_before_access", guard) for guard in sheet.subjects.guards
        if guard.entity.lock_release != "standstill sensor"
    ]  # fmt: skip
    return smallest(times) if times else None


@fact(
    per="guard", unit="m", symbol="S",
    formulas=[reach.separation_distance, reach.curtain_distance, reach.two_hand_distance, reach.us_distance],
)  # fmt: skip
def required_distance(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Distance at which the rotor would stand still before it is reached: the governing stop with the guard's response."""
    kind = guard.entity.kind
    if kind not in {"interlocked", "hinged", "light curtain", "two-hand"}:
        return None
    response = sheet.where_applies("response_time", guard)
    time = sheet("governing_stopping_time") + (ZERO if response is None else response)
    if kind in {"light curtain", "two-hand"} and sheet.rules.figures == "us":
        return sheet.apply(reach.us_distance, time)
    if kind == "light curtain":
        return sheet.apply(reach.curtain_distance, time, sheet.value(guard, "resolution"))
    if kind == "two-hand":
        return sheet.apply(reach.two_hand_distance, time)
    return sheet.apply(
        reach.separation_distance, sheet.policy("approach_speed"), time, intrusion=_optional(sheet, guard, "intrusion")
    )


def _limits(sheet: FactSheet, guard: Subject) -> list[tuple[Opening, Samples, Samples]]:
    """Each opening with its size and the largest size allowed at its distance."""
    found = []
    for index, opening in enumerate(guard.entity.openings, start=1):
        path = f"{guard.path}.opening.{index}"
        size, distance = sheet.draw(f"{path}.size", opening.size), sheet.draw(f"{path}.distance", opening.distance)
        if sheet.rules.figures == "us":
            limit = sheet.apply(reach.us_opening_limit, distance)
        else:
            limit = sheet.apply(reach.iso_opening_limit, distance, shape=opening.shape)
        found.append((opening, size, limit))
    return found


def _worst(sheet: FactSheet, guard: Subject) -> tuple[Samples, Samples] | None:
    """Size and limit of the opening that exceeds its limit by most, by best estimate."""
    found = _limits(sheet, guard)
    if not found:
        return None
    _, size, limit = max(found, key=lambda entry: entry[1][0] / entry[2][0] if entry[2][0] > 0.0 else math.inf)
    return size, limit


@fact(per="guard", unit="m", symbol="e_lim", formulas=[reach.iso_opening_limit, reach.us_opening_limit])
def opening_limit(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Largest opening allowed at the distance of the opening that comes nearest to its limit."""
    worst = _worst(sheet, guard)
    return None if worst is None else worst[1]


@fact(per="guard", unit="m", symbol="e")
def opening_size(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Size of the opening that comes nearest to its limit."""
    worst = _worst(sheet, guard)
    return None if worst is None else worst[0]


@fact(per="guard", unit="m", symbol="e_max", equation="e_max = max(e)", source="29cfr1910.212 (a)(5)")
def largest_opening(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Size of the largest opening in the guard."""
    sizes = [size for _, size, _ in _limits(sheet, guard)]
    return largest(sizes) if sizes else None


@fact(per="guard", unit="m", symbol="h")
def height_above_floor(sheet: FactSheet, guard: Subject) -> Samples:
    """Height of the lowest moving part behind the guard above the floor."""
    return sheet.value(guard, "height_above_floor")


@fact(per="guard", word=True)
def wheel_use(sheet: FactSheet, guard: Subject) -> Word | None:
    """Use of the abrasive wheel behind the guard."""
    return sheet.word(guard, "wheel_use") if sheet.file.machine.kind == "grinder" else None


@fact(per="guard", unit="m", symbol="g_rest")
def work_rest_gap(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Gap between work rest and abrasive wheel."""
    return sheet.value(guard, "work_rest_gap") if guard.entity.wheel_use in {"bench", "floor stand"} else None


@fact(per="guard", unit="m", symbol="g_tongue")
def tongue_gap(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Gap between the hood's tongue and the abrasive wheel."""
    return sheet.value(guard, "tongue_gap") if guard.entity.wheel_use in {"bench", "floor stand"} else None


@fact(per="guard", unit="rad", symbol="α")
def exposed_angle(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Angle of the abrasive wheel that its hood leaves open."""
    return sheet.value(guard, "exposed_angle") if guard.entity.wheel_use is not None else None


EXPOSED_ANGLES = {
    "bench": 90.0,
    "floor stand": 90.0,
    "cylindrical": 180.0,
    "surface": 150.0,
    "cut-off": 150.0,
    "top": 60.0,
}
"""Largest exposed angle in degrees by use of the wheel, 29 CFR 1910.215(b)(3)–(8), from memory."""


@fact(per="guard", unit="rad", symbol="α_lim", source="29cfr1910.215 (b)(3)-(8)")
def exposed_angle_limit(sheet: FactSheet, guard: Subject) -> Samples | None:
    """Largest angle of the abrasive wheel that its hood may leave open for this use."""
    use = guard.entity.wheel_use
    if use is None:
        return None
    sheet.note(f"{guard.path}.wheel_use")
    return np.array([math.radians(EXPOSED_ANGLES[use])])


@fact(per="shaft", word=True)
def is_guarded(sheet: FactSheet, shaft: Subject) -> Word | None:
    """Whether a guard other than none covers the shaft."""
    return any(
        shaft.entity.id in guard.entity.covers and guard.entity.kind != "none" for guard in sheet.subjects.guards
    )
