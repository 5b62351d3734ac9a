"""Stop cases stage by stage, and the governing stop."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spinhazard.facts.drag import NONE, stated_or_zero
from spinhazard.facts.fact import Word, fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import coastdown, energy
from spinhazard.quantity.stated import Stated
from spinhazard.sampling import Samples, largest, smallest
from spinhazard.statement.stopping import Brake


@dataclass(frozen=True)
class Stage:
    """One stage of a stop: braking torque on top of the drag, what it takes, and the speeds at its ends."""

    torque: Samples
    time: Samples
    angle: Samples
    start: Samples
    end: Samples


def brakes_of(sheet: FactSheet, case: str) -> tuple[Brake, ...]:
    """Brakes that act in a stop case.

    Parameters
    ----------
    sheet : FactSheet
        The sheet; a brake whose behaviour without supply is not stated is recorded as missing.
    case : str
        Stop case.

    Returns
    -------
    tuple of Brake
        All of them, those that work without supply, or all but the strongest.
    """
    stopping = sheet.file.stopping
    brakes = stopping.brakes if stopping is not None and case != "coast" else ()
    if case == "power loss":
        for brake in brakes:
            if brake.works_without_power is None:
                sheet.missing(f"stopping.brake.{brake.id}.works_without_power")
        return tuple(brake for brake in brakes if brake.works_without_power)
    if case == "brake failed":
        strongest = max(brakes, key=lambda brake: brake.torque.value)
        return tuple(brake for brake in brakes if brake is not strongest)
    return brakes


def _delay(sheet: FactSheet, case: str) -> Samples:
    """Time the drive keeps driving; nothing drives once the supply is lost."""
    if case in {"power loss", "coast"} or sheet.file.stopping is None:
        return NONE
    if sheet.file.stopping.control_delay is None:
        return sheet.policy("default_control_delay")
    return stated_or_zero(sheet, "control_delay")


def stop_stages(sheet: FactSheet, case: str) -> tuple[Stage, ...]:
    """Stages of one stop: drive still on, then drag with the brakes that have built up so far, to standstill.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    case : str
        Stop case.

    Returns
    -------
    tuple of Stage
        Stages in order of time.
    """
    return sheet.shared(f"stages of {case}", lambda: _stages(sheet, case))


def _stages(sheet: FactSheet, case: str) -> tuple[Stage, ...]:
    speed = sheet("stopping_shaft_speed")
    delay = _delay(sheet, case)
    stages = [Stage(torque=NONE, time=delay, angle=speed * delay, start=speed, end=speed)]
    steps = _brake_steps(sheet, case)
    began: Samples = NONE
    torque: Samples = NONE
    for build_up, added in steps:
        stages.append(_coast(sheet, torque, stages[-1].end, duration=build_up - began))
        began, torque = build_up, torque + added
    stages.append(_coast(sheet, torque, stages[-1].end, duration=None))
    return tuple(stages)


def _brake_steps(sheet: FactSheet, case: str) -> list[tuple[Samples, Samples]]:
    """Build-up times in rising order within each draw, with the torque that is there from then on."""
    times, torques = [], []
    for brake in brakes_of(sheet, case):
        path = f"stopping.brake.{brake.id}"
        torques.append(sheet.draw(f"{path}.torque", brake.torque))
        times.append(build_up_of(sheet, brake))
    if len(times) < 2:
        return list(zip(times, torques, strict=True))
    all_times, all_torques = (np.array(np.broadcast_arrays(*arrays)) for arrays in (times, torques))
    order = np.argsort(all_times, axis=0, kind="stable")
    return list(zip(np.take_along_axis(all_times, order, 0), np.take_along_axis(all_torques, order, 0), strict=True))


def build_up_of(sheet: FactSheet, brake: Brake) -> Samples:
    """Time until a brake's torque is there: as stated, or the policy's default.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    brake : Brake
        The brake.

    Returns
    -------
    ndarray
        Time [s].
    """
    if brake.build_up is None:
        return sheet.policy("default_build_up")
    return sheet.draw(f"stopping.brake.{brake.id}.build_up", brake.build_up)


@fact(per="machine", word=True)
def control_delay_is_stated(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether it is stated how long the drive keeps driving after the stop command."""
    if sheet.file.stopping is None:
        return None
    return sheet.file.stopping.control_delay is not None


@fact(per="machine", word=True)
def brake_data_are_whole(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether build-up time and behaviour without supply are stated for every brake."""
    stopping = sheet.file.stopping
    if stopping is None or not stopping.brakes:
        return None
    return all(brake.build_up is not None and brake.works_without_power is not None for brake in stopping.brakes)


def _coast(sheet: FactSheet, torque: Samples, start: Samples, *, duration: Samples | None) -> Stage:
    """One stage under drag and a constant braking torque, for a time or, without one, to standstill."""
    load = {
        "constant": sheet("constant_drag") + torque, "linear": sheet("linear_drag"), "quadratic": sheet("quadratic_drag"),
    }  # fmt: skip
    inertia = sheet("referred_inertia")
    standstill = np.minimum(sheet("standstill_speed"), start)
    time = sheet.apply(coastdown.stopping_time, inertia, start, end_speed=standstill, **load)
    if duration is None:
        end = standstill
    else:
        time = np.minimum(time, duration)
        end = np.maximum(coastdown.speed_after(time, inertia, start_speed=start, **load), standstill)
    angle = sheet.apply(coastdown.angle_turned, inertia, start, end_speed=end, **load)
    return Stage(torque=torque, time=time, angle=angle, start=start, end=end)


@fact(
    per="stop", unit="s", symbol="t", formulas=[coastdown.stopping_time],
    equation="t = t_delay + Σ 2 J_r u φ(Δu²), the stable form of ∫J dω/T",
)  # fmt: skip
def stopping_time(sheet: FactSheet, stop: Subject) -> Samples:
    """Time from the stop command to standstill."""
    if sheet.file.stopping is None:
        return sheet.missing("stopping.shaft")
    computed = computed_time(sheet, stop.entity)
    measured = sheet.where_applies("measured_stopping_time")
    # a stop that was timed is never taken shorter than the longest one seen
    return computed if measured is None or not _was_measured(sheet, stop.entity) else np.maximum(computed, measured)


def computed_time(sheet: FactSheet, case: str) -> Samples:
    """Stopping time from drag and brakes alone.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    case : str
        Stop case, or ``coast``: supply off, no brake.

    Returns
    -------
    ndarray
        Time [s].
    """
    return total_of([stage.time for stage in stop_stages(sheet, case)])


def _was_measured(sheet: FactSheet, case: str) -> bool:
    stopping = sheet.file.stopping
    if stopping is None:
        return False
    measured = stopping.measured_case or ("coast" if not stopping.brakes else "")
    return measured == case or (measured == "coast" and not brakes_of(sheet, case))


def total_of(terms: list[Samples]) -> Samples:
    """Sum of samples of different lengths.

    Parameters
    ----------
    terms : list of ndarray
        Samples, at least one.

    Returns
    -------
    ndarray
        Their sum.
    """
    total = terms[0]
    for term in terms[1:]:
        total = total + term
    return total


@fact(per="stop", symbol="θ/2π", formulas=[coastdown.angle_turned], equation="θ/2π = (ω₀ t_delay + ∫J ω dω/T)/2π")
def stopping_turns(sheet: FactSheet, stop: Subject) -> Samples:
    """Turns of the stopping shaft from the stop command to standstill."""
    if sheet.file.stopping is None:
        return sheet.missing("stopping.shaft")
    return total_of([stage.angle for stage in stop_stages(sheet, stop.entity)]) / (2.0 * np.pi)


def speed_at(sheet: FactSheet, case: str, time: Samples) -> Samples:
    """Speed of the stopping shaft some time after the stop command.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    case : str
        Stop case.
    time : ndarray, shape (n,) or (1,)
        Time after the command [s].

    Returns
    -------
    ndarray
        Speed [rad/s].
    """
    delay, *stages = stop_stages(sheet, case)
    speed, left = delay.start, np.maximum(time - delay.time, 0.0)
    for stage in stages:
        after = coastdown.speed_after(
            np.minimum(left, stage.time), sheet("referred_inertia"), start_speed=stage.start,
            constant=sheet("constant_drag") + stage.torque, linear=sheet("linear_drag"), quadratic=sheet("quadratic_drag"),
        )  # fmt: skip
        speed = np.where(left > 0.0, np.maximum(after, np.where(left < stage.time, 0.0, stage.end)), speed)
        left = left - np.minimum(left, stage.time)
    # at the standstill speed the shaft counts as stopped; no energy is carried beyond it
    return np.where(speed <= stages[-1].end, 0.0, speed)


@fact(per="stop", unit="J", symbol="E_acc", formulas=[energy.rotational_energy], equation="E_acc = ½ J_r ω(t_acc)²")
def energy_at_access(sheet: FactSheet, stop: Subject) -> Samples | None:
    """Energy left in the stopping drivetrain when the hazard zone can first be reached."""
    access = sheet.where_applies("earliest_access")
    if access is None:
        return None
    if sheet.file.stopping is None:
        return sheet.missing("stopping.shaft")
    return sheet.apply(energy.rotational_energy, sheet("referred_inertia"), speed_at(sheet, stop.entity, access))


@fact(
    per="machine",
    unit="s",
    symbol="t_gov",
    equation="t_gov = max over the credible stop cases",
    source="policy credible_stops",
)
def governing_stopping_time(sheet: FactSheet, _machine: Subject) -> Samples:
    """Time of the slowest credible stop."""
    sheet.note("policy.credible_stops")
    times = [sheet("stopping_time", stop) for stop in sheet.subjects.stops if stop.entity in sheet.rules.credible_stops]
    measured = sheet.where_applies("measured_stopping_time")
    if measured is not None:
        times.append(measured)
    return largest(times)


@fact(per="machine", word=True)
def governing_stop(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Stop case that governs."""
    times = {
        stop.entity: float(sheet("stopping_time", stop)[0])
        for stop in sheet.subjects.stops
        if stop.entity in sheet.rules.credible_stops
    }
    if any(np.isnan(time) for time in times.values()):
        return None
    return str(max(times, key=lambda case: times[case]))


@fact(per="machine", unit="s", symbol="t_slow", equation="slowest stop case", source="practice")
def slowest_stopping_time(sheet: FactSheet, _machine: Subject) -> Samples:
    """Time of the slowest stop case, credible or not."""
    return largest([sheet("stopping_time", stop) for stop in sheet.subjects.stops])


@fact(per="machine", symbol="t_slow/t_fast", equation="slowest over fastest stop case", source="iso-14119")
def stop_variation(sheet: FactSheet, _machine: Subject) -> Samples:
    """Slowest over fastest stop case."""
    times = [sheet("stopping_time", stop) for stop in sheet.subjects.stops]
    return largest(times) / np.maximum(smallest(times), 1e-9)


@fact(per="machine", symbol="t_loss/t_normal", equation="t(power loss) / t(normal stop)", source="practice")
def power_loss_ratio(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Stopping time with the supply lost over that of the normal stop."""
    if sheet.file.stopping is not None and not sheet.file.stopping.brakes:
        return None
    by_case = {stop.entity: stop for stop in sheet.subjects.stops}
    return sheet("stopping_time", by_case["power loss"]) / sheet("stopping_time", by_case["normal stop"])


@fact(per="machine", word=True)
def has_brake(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether a brake is stated."""
    return sheet.file.stopping is not None and bool(sheet.file.stopping.brakes)


@fact(per="machine", unit="s", symbol="t_kind", source="en-iso-19085")
def usual_stop_limit(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Usual limit of the stopping time for this kind of machine, from the policy."""
    limit: Stated | None = getattr(sheet.rules.stop_limits, sheet.file.machine.kind)
    if limit is None:
        return None
    sheet.note(f"policy.stop_limits.{sheet.file.machine.kind}")
    return np.array([limit.value])
