"""Whole coasts against an adaptive solver of the equation of motion: scipy solve_ivp, DOP853, relative tolerance 1e-11.

Independent of the closed forms: the solver sees only J dω/dt = −(a + bω + cω²) and dθ/dt = ω, and beside them the work of
the drag, dW/dt = T ω. Covers stopping_time, angle_turned, speed_after, and the heat of a brake.
"""

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from spinhazard.mechanics import braking, coastdown, drag, energy


def spread():
    """Rotors from a spindle to a mill, each kind of drag missing in some; end at standstill where dry friction allows it."""
    generator = np.random.default_rng(20261201)
    made = []
    for index in range(20):
        body, start = 10 ** generator.uniform(-2, 3), 10 ** generator.uniform(1, 3)
        shares = (
            generator.dirichlet([1.0, 1.0, 1.0]) * ([1, 1, 1], [1, 0, 1], [1, 1, 0], [0, 1, 1], [1, 0, 0])[index % 5]
        )
        torque = body * start / 10 ** generator.uniform(0, 2)
        load = {
            "constant": shares[0] * torque,
            "linear": shares[1] * torque / start,
            "quadratic": shares[2] * torque / start**2,
        }
        made.append((float(body), float(start), 0.0 if shares[0] else 0.05 * float(start), load))
    return made  # fmt: skip


def solved(body, start, end, load, *, until=None):
    a, b, c = load.values()

    def motion(_t, state):
        torque = a + b * state[0] + c * state[0] ** 2
        return [-torque / body, state[0], torque * state[0]]

    def arrived(_t, state):
        return state[0] - end

    arrived.terminal = True
    return solve_ivp(
        motion, (0.0, until or 1e7), [start, 0.0, 0.0], method="DOP853", rtol=1e-11, atol=1e-11 * start,
        events=None if until else arrived,
    )  # fmt: skip


@pytest.mark.parametrize("case", spread(), ids=range(20))
def test_time_angle_and_speeds_on_the_way_agree(case):
    body, start, end, load = case
    reference = solved(body, start, end, load)
    time = float(coastdown.stopping_time(body, start, end_speed=end, **load))
    angle = float(coastdown.angle_turned(body, start, end_speed=end, **load))

    assert time == pytest.approx(reference.t[-1], rel=1e-9)
    assert angle == pytest.approx(reference.y[1, -1], rel=1e-9)
    inside = reference.t < time
    speeds = coastdown.speed_after(reference.t[inside], body, start_speed=start, **load)
    assert speeds == pytest.approx(reference.y[0, inside], abs=1e-9 * start)


@pytest.mark.parametrize("case", spread(), ids=range(20))
def test_work_of_the_drag_is_the_energy_the_rotor_loses(case):
    body, start, end, load = case
    lost = energy.rotational_energy(body, start) - energy.rotational_energy(body, end)

    assert float(lost) == pytest.approx(solved(body, start, end, load).y[2, -1], rel=1e-9)


def test_brake_takes_what_the_drag_leaves():
    """180 N m on a fan: heat as torque times angle_turned, against the solver's energy less its work of the drag alone."""
    body, start, brake, load = 24.0, 155.0, 180.0, {"constant": 3.1, "linear": 0.002, "quadratic": 0.0041}
    braked = load | {"constant": load["constant"] + brake}
    turned = coastdown.angle_turned(body, start, end_speed=0.0, **braked)

    def motion(_t, state):
        torque = drag.total_drag_torque(
            max(state[0], 0.0), load["constant"], linear=load["linear"], quadratic=load["quadratic"]
        )
        return [-(float(torque) + brake) / body, float(torque) * state[0]]  # fmt: skip

    stop = float(coastdown.stopping_time(body, start, end_speed=0.0, **braked))
    work = solve_ivp(motion, (0.0, stop), [start, 0.0], method="DOP853", rtol=1e-11, atol=1e-9).y[1, -1]
    heat = float(braking.brake_heat(brake, turned))

    assert heat == pytest.approx(float(braking.absorbed_energy(body, start, end_speed=0.0, drag_work=work)), rel=1e-9)


def test_moment_after_the_stop_is_at_rest_where_the_solver_ran_past_it():
    """Without an event the solver turns the rotor backwards, which friction never does; the closed form stays at zero."""
    body, start, load = 1.9, 155.0, {"constant": 3.1, "linear": 0.002, "quadratic": 0.0041}
    stop = float(coastdown.stopping_time(body, start, end_speed=0.0, **load))

    assert solved(body, start, 0.0, load, until=1.5 * stop).y[0, -1] < 0.0
    assert float(coastdown.speed_after(1.5 * stop, body, start_speed=start, **load)) == 0.0


def test_comparison_would_notice_a_wrong_coefficient():
    body, start, end, load = spread()[0]
    wrong = load | {"quadratic": load["quadratic"] * (1.0 + 1e-6)}
    time = float(coastdown.stopping_time(body, start, end_speed=end, **wrong))

    assert abs(time / solved(body, start, end, load).t[-1] - 1.0) > 1e-9
