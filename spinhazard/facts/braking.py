"""Heat and temperature of the brakes in each stop case."""

from __future__ import annotations

import numpy as np

from spinhazard.facts.drag import NONE
from spinhazard.facts.fact import fact
from spinhazard.facts.sheet import FactSheet
from spinhazard.facts.stopping import brakes_of, build_up_of, stop_stages, total_of
from spinhazard.facts.subject import Subject
from spinhazard.mechanics import braking
from spinhazard.sampling import Samples, largest, smallest


def _heats(sheet: FactSheet, case: str) -> dict[str, Samples]:
    """Heat into each brake that acts in a stop case."""
    return sheet.shared(f"heats of {case}", lambda: _worked_out(sheet, case))


def _worked_out(sheet: FactSheet, case: str) -> dict[str, Samples]:
    stages = stop_stages(sheet, case)
    heats: dict[str, Samples] = {}
    for brake in brakes_of(sheet, case):
        path = f"stopping.brake.{brake.id}"
        torque = sheet.draw(f"{path}.torque", brake.torque)
        build_up = build_up_of(sheet, brake)
        began: Samples = NONE
        angle: Samples = NONE
        for stage in stages[1:]:
            angle = angle + np.where(began >= build_up * (1.0 - 1e-12), stage.angle, 0.0)
            began = began + stage.time
        heats[brake.id] = sheet.apply(braking.brake_heat, torque, angle)
    return heats


@fact(per="stop", unit="J", symbol="Q", formulas=[braking.brake_heat], equation="Q = Σ T_brake θ_braked")
def brake_heat(sheet: FactSheet, stop: Subject) -> Samples | None:
    """Heat into all brakes during one stop: the energy of the rotor less the work of the drag."""
    if sheet.file.stopping is None or not sheet.file.stopping.brakes:
        return None
    return total_of([NONE, *_heats(sheet, stop.entity).values()])


@fact(per="stop", unit="K", symbol="ΔT", formulas=[braking.temperature_rise])
def brake_temperature_rise(sheet: FactSheet, stop: Subject) -> Samples | None:
    """Temperature rise of the hottest drum or disc in one stop, all heat staying in it (an upper bound)."""
    if sheet.file.stopping is None or not sheet.file.stopping.brakes:
        return None
    rises = [NONE]
    heats = _heats(sheet, stop.entity)
    for brake in brakes_of(sheet, stop.entity):
        path = f"stopping.brake.{brake.id}"
        if brake.heat_capacity_mass is None:
            rises.append(sheet.missing(f"{path}.heat_capacity_mass"))
            continue
        specific_heat = (
            sheet.policy("specific_heat")
            if brake.specific_heat is None
            else sheet.draw(f"{path}.specific_heat", brake.specific_heat)
        )
        capacity = sheet.draw(f"{path}.heat_capacity_mass", brake.heat_capacity_mass)
        rises.append(sheet.apply(braking.temperature_rise, heats[brake.id], capacity, specific_heat=specific_heat))
    return largest(rises)


@fact(per="stop", unit="K", symbol="ΔT_lim", source="policy")
def temperature_rise_limit(sheet: FactSheet, _stop: Subject) -> Samples | None:
    """Smallest temperature rise allowed for any of the brakes: as stated, or the policy's."""
    if sheet.file.stopping is None or not sheet.file.stopping.brakes:
        return None
    limits = [
        sheet.policy("brake_temperature_rise_limit") if brake.max_temperature_rise is None
        else sheet.draw(f"stopping.brake.{brake.id}.max_temperature_rise", brake.max_temperature_rise)
        for brake in sheet.file.stopping.brakes
    ]  # fmt: skip
    return smallest(limits)


@fact(per="stop", symbol="Q/Q_rated", equation="max(Q / Q_rated)", source="practice")
def brake_rating_use(sheet: FactSheet, stop: Subject) -> Samples | None:
    """Heat of one stop over the brake's energy rating, for the brake that is nearest to it."""
    if sheet.file.stopping is None or not sheet.file.stopping.brakes:
        return None
    shares = [NONE]
    heats = _heats(sheet, stop.entity)
    for brake in brakes_of(sheet, stop.entity):
        path = f"stopping.brake.{brake.id}.energy_rating"
        rating = sheet.missing(path) if brake.energy_rating is None else sheet.draw(path, brake.energy_rating)
        shares.append(heats[brake.id] / rating)
    return largest(shares)
