"""The drivetrain that comes to rest together, and the drag that brings it there."""

from __future__ import annotations

import numpy as np

from spinhazard.facts.fact import Word, fact
from spinhazard.facts.sheet import NOT_KNOWN, FactSheet
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import drag, energy
from spinhazard.mechanics import inertia as moments
from spinhazard.quantity.stated import Stated
from spinhazard.sampling import Samples

NONE: Samples = np.zeros(1)


def drivetrain(sheet: FactSheet, shaft: Subject) -> dict[str, Samples]:
    """Shafts rigidly coupled to one shaft, with their turns per turn of it.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    shaft : Subject
        The reference shaft.

    Returns
    -------
    dict
        Identifier of the shaft to samples of its ratio to the reference shaft.
    """
    return sheet.shared(f"drivetrain of {shaft.name}", lambda: _ratios(sheet, shaft))


def _ratios(sheet: FactSheet, shaft: Subject) -> dict[str, Samples]:
    ratios: dict[str, Samples] = {shaft.entity.id: np.ones(1)}
    waiting = [shaft.entity]
    while waiting:
        here = waiting.pop()
        if here.driven_by is not None and here.driven_by not in ratios:
            ratios[here.driven_by] = ratios[here.id] / sheet.value(sheet.subjects.shaft(here.id), "ratio")
            waiting.append(sheet.file.shaft(here.driven_by))
        for other in sheet.subjects.shafts:
            if other.entity.driven_by == here.id and other.entity.id not in ratios:
                ratios[other.entity.id] = ratios[here.id] * sheet.value(other, "ratio")
                waiting.append(other.entity)
    return ratios


@fact(per="shaft", word=True)
def is_coupled(sheet: FactSheet, shaft: Subject) -> Word | None:
    """Whether the shaft is rigidly coupled to another one."""
    return shaft.entity.driven_by is not None or any(
        other.entity.driven_by == shaft.entity.id for other in sheet.subjects.shafts
    )


def _stopping_shaft(sheet: FactSheet) -> Subject | None:
    if sheet.file.stopping is None:
        sheet.missing("stopping.shaft")
        return None
    return sheet.subjects.shaft(sheet.file.stopping.shaft)


@fact(per="shaft", word=True)
def in_stopping_drivetrain(sheet: FactSheet, shaft: Subject) -> Word | None:
    """Whether the stated stop covers this shaft."""
    reference = _stopping_shaft(sheet)
    return None if reference is None else shaft.entity.id in drivetrain(sheet, reference)


@fact(per="machine", unit="rad/s", symbol="ω₀")
def stopping_shaft_speed(sheet: FactSheet, _machine: Subject) -> Samples:
    """Speed of the shaft that stops are referred to, in running."""
    reference = _stopping_shaft(sheet)
    return NOT_KNOWN if reference is None else sheet("shaft_speed", reference)


@fact(per="machine", unit="kg m²", symbol="J_r", formulas=[moments.referred_inertia], equation="J_r = Σ J i²")
def referred_inertia(sheet: FactSheet, _machine: Subject) -> Samples:
    """Inertia of the whole drivetrain, referred to the stopping shaft."""
    reference = _stopping_shaft(sheet)
    if reference is None:
        return NOT_KNOWN
    total: Samples = NONE
    for name, ratio in drivetrain(sheet, reference).items():
        total = total + sheet.apply(moments.referred_inertia, sheet("shaft_inertia", sheet.subjects.shaft(name)), ratio)
    return total


def stated_or_zero(sheet: FactSheet, field: str) -> Samples:
    """Samples of a field of the stopping table that is zero where it is left out.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.
    field : str
        Name of the field.

    Returns
    -------
    ndarray
        Samples [SI].
    """
    stopping = sheet.file.stopping
    stated: Stated | None = None if stopping is None else getattr(stopping, field)
    return NONE if stated is None else sheet.draw(f"stopping.{field}", stated)


def _losses(sheet: FactSheet, law: str) -> list[tuple[Samples, Samples]]:
    """Power and speed of the stated losses that follow a law."""
    stopping = sheet.file.stopping
    return [
        (
            sheet.draw(f"stopping.loss_power.{i}.power", loss.power),
            sheet.draw(f"stopping.loss_power.{i}.speed", loss.speed),
        )
        for i, loss in enumerate(stopping.loss_power if stopping is not None else (), start=1)
        if loss.law == law
    ]


def drag_is_stated(sheet: FactSheet) -> bool:
    """Whether the drag is known from stated torques or losses, not only from a measured stop.

    Parameters
    ----------
    sheet : FactSheet
        The sheet.

    Returns
    -------
    bool
        True where any torque, coefficient or loss is stated.
    """
    stopping = sheet.file.stopping
    if stopping is None:
        return False
    if stopping.coastdown_log is not None:
        return True
    coefficients = (stopping.friction_torque, stopping.viscous, stopping.windage)
    return bool(stopping.loss_power) or any(value is not None for value in coefficients)


def _over_inertia(sheet: FactSheet, place: int) -> Samples | None:
    """One of a/J, b/J, c/J from the coast-down log; None where there is none."""
    if sheet.beside.coast is None:
        return None
    sheet.note("stopping.coastdown_log")
    return sheet.fitted("stopping.coastdown_log", sheet.beside.coast.value, sheet.beside.coast.covariance)[place]


@fact(per="machine", unit="rad/s²", symbol="a/J", equation="see method: coastfit", source="spinhazard-methods coastfit")
def constant_over_inertia(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Dry friction over inertia, fitted to the coast-down log."""
    return _over_inertia(sheet, 0)


@fact(per="machine", unit="1/s", symbol="b/J", equation="see method: coastfit", source="spinhazard-methods coastfit")
def linear_over_inertia(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Viscous drag over inertia, fitted to the coast-down log."""
    return _over_inertia(sheet, 1)


@fact(per="machine", unit="1/rad", symbol="c/J", equation="see method: coastfit", source="spinhazard-methods coastfit")
def quadratic_over_inertia(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Windage over inertia, fitted to the coast-down log."""
    return _over_inertia(sheet, 2)


def _coast_is_measured(sheet: FactSheet) -> bool:
    """Whether the measured stops tell how the rotor coasts without brake."""
    stopping = sheet.file.stopping
    if stopping is None or not stopping.measured_times:
        return False
    if stopping.measured_case == "coast" or not stopping.brakes:
        return True
    return stopping.measured_case == "power loss" and all(
        brake.works_without_power is False for brake in stopping.brakes
    )


@fact(
    per="machine", unit="N m", symbol="a", formulas=[drag.torque_from_power, drag.friction_from_stop_time],
    equation="a = stated + Σ P/ω; of a log: a = (a/J) J_r; of measured coast alone: a = J_r ω₀/t",
)  # fmt: skip
def constant_drag(sheet: FactSheet, _machine: Subject) -> Samples:
    """Part of the drag torque that does not depend on speed."""
    fitted = sheet.where_applies("constant_over_inertia")
    if fitted is not None:
        return fitted * sheet("referred_inertia")
    if drag_is_stated(sheet):
        total = stated_or_zero(sheet, "friction_torque")
        for power, speed in _losses(sheet, "constant torque"):
            total = total + sheet.apply(drag.torque_from_power, power, speed)
        return total
    if _coast_is_measured(sheet):
        return sheet.apply(
            drag.friction_from_stop_time,
            sheet("referred_inertia"),
            sheet("stopping_shaft_speed"),
            time=sheet("measured_stopping_time"),
        )
    stopping = sheet.file.stopping
    if stopping is not None and stopping.measured_times and stopping.measured_case is None:
        return sheet.missing("stopping.measured_case")
    return sheet.missing("stopping.friction_torque")


@fact(
    per="machine",
    unit="N m s",
    symbol="b",
    formulas=[drag.linear_drag_from_power],
    equation="b = stated + Σ P/ω²; of a log: b = (b/J) J_r",
)
def linear_drag(sheet: FactSheet, _machine: Subject) -> Samples:
    """Part of the drag torque that grows with speed, per rad/s."""
    fitted = sheet.where_applies("linear_over_inertia")
    if fitted is not None:
        return fitted * sheet("referred_inertia")
    total = stated_or_zero(sheet, "viscous")
    for power, speed in _losses(sheet, "viscous"):
        total = total + sheet.apply(drag.linear_drag_from_power, power, speed)
    return total


@fact(
    per="machine",
    unit="N m s²",
    symbol="c",
    formulas=[drag.fan_drag_from_power],
    equation="c = stated + Σ P/ω³; of a log: c = (c/J) J_r",
)
def quadratic_drag(sheet: FactSheet, _machine: Subject) -> Samples:
    """Part of the drag torque that grows with speed squared, per (rad/s)²."""
    fitted = sheet.where_applies("quadratic_over_inertia")
    if fitted is not None:
        return fitted * sheet("referred_inertia")
    total = stated_or_zero(sheet, "windage")
    for power, speed in _losses(sheet, "fan"):
        total = total + sheet.apply(drag.fan_drag_from_power, power, speed)
    return total


@fact(per="machine", word=True)
def drag_is_estimated(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether every stated drag value is marked as estimated or has no source, and no stop was measured."""
    stopping = sheet.file.stopping
    if stopping is None:
        sheet.missing("stopping.shaft")
        return None
    values = [
        stopping.friction_torque,
        stopping.viscous,
        stopping.windage,
        *(loss.power for loss in stopping.loss_power),
    ]
    stated = [value for value in values if value is not None]
    return bool(stated) and not stopping.measured_times and all(v.source_class in {None, "estimated"} for v in stated)


@fact(per="machine", unit="rad/s", symbol="ω₁")
def standstill_speed(sheet: FactSheet, _machine: Subject) -> Samples:
    """Speed below which the shaft counts as stopped; zero where none is stated."""
    return stated_or_zero(sheet, "standstill_speed")


@fact(
    per="machine", unit="m/s", symbol="v₁", equation="v₁ = max(ω₁ i R) over the drivetrain", source="openstax-up1 §10.3",
)  # fmt: skip
def standstill_tip_speed(sheet: FactSheet, _machine: Subject) -> Samples | None:
    """Speed of the drivetrain's fastest point at the standstill speed."""
    reference = _stopping_shaft(sheet) if sheet.file.stopping is not None else None
    if reference is None or sheet.file.stopping is None or sheet.file.stopping.standstill_speed is None:
        return None
    speeds: Samples = NONE
    for name, ratio in drivetrain(sheet, reference).items():
        for part in sheet.subjects.parts_of(sheet.subjects.shaft(name)):
            speed = sheet("standstill_speed") * ratio
            speeds = np.maximum(speeds, sheet.apply(energy.tip_speed, speed, sheet("tip_radius", part)))
    return speeds


@fact(per="machine", word=True)
def drag_reaches_standstill(sheet: FactSheet, _machine: Subject) -> Word | None:
    """Whether the drag that was stated brings the rotor to rest in finite time without a brake."""
    if np.isnan(sheet("constant_drag")[0]):
        return None
    return bool(sheet("constant_drag")[0] > 0.0 or sheet("standstill_speed")[0] > 0.0)
