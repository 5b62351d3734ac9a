"""Stop cases against an independent integration of the equation of motion, stage by stage."""

import itertools
import math

import numpy as np
import pytest
from scipy.integrate import solve_ivp

SPEED = 1480 * 2 * math.pi / 60
INERTIA = 22.0 + 2.0 * 1.5**2  # referred to the impeller shaft: ratio squared


def by_ode(delay, brakes, *, standstill=0.0, inertia=INERTIA, speed=SPEED, drag=(3.1, 0.002, 0.0041), until=None):
    """Time, angle, brake work by scipy's DOP853; brakes = [(torque, acts from)]; one event, no closed form."""
    a, b, c = drag
    times = sorted({delay + start for _, start in brakes} | {delay})
    state, now, work = np.array([speed, speed * delay, 0.0]), delay, 0.0
    edges = [*times, 1e6]
    for begin, end in itertools.pairwise(edges):
        torque = sum(t for t, start in brakes if delay + start <= begin + 1e-12)

        def motion(_t, y, torque=torque):
            return [-(a + b * y[0] + c * y[0] ** 2 + torque) / inertia, y[0], torque * y[0]]

        def stopped(_t, y):
            return y[0] - standstill

        stopped.terminal = True
        limit = end if until is None else min(end, until)
        if limit <= begin:
            break
        solution = solve_ivp(
            motion, (begin, limit), [state[0], state[1], work], method="DOP853", rtol=1e-11, atol=1e-11, events=stopped
        )
        state, work, now = solution.y[:2, -1], solution.y[2, -1], solution.t[-1]
        if solution.t_events[0].size:
            break
    return now, state[1], work, state[0]


@pytest.mark.parametrize(
    ("case", "delay", "brakes"),
    [
        ("normal stop", 0.4, [(180.0, 0.2), (40.0, 0.5)]),
        ("power loss", 0.0, [(40.0, 0.5)]),
        ("brake failed", 0.4, [(40.0, 0.5)]),
    ],
)
def test_each_stop_case_agrees_with_solve_ivp(fan, assess_text, case, delay, brakes):
    result = assess_text(fan)
    time, angle, work, _ = by_ode(delay, brakes)

    assert result.fact("stopping_time", f"stop:{case}").best == pytest.approx(time, rel=1e-8)
    assert result.fact("stopping_turns", f"stop:{case}").best == pytest.approx(angle / (2 * math.pi), rel=1e-8)
    assert result.fact("brake_heat", f"stop:{case}").best == pytest.approx(work, rel=1e-8)


def test_energy_at_access_agrees_with_solve_ivp(fan, assess_text):
    result = assess_text(fan)
    *_, speed = by_ode(0.4, [(180.0, 0.2), (40.0, 0.5)], until=3.0 - 0.06)

    assert result.fact("energy_at_access", "stop:normal stop").best == pytest.approx(0.5 * INERTIA * speed**2, rel=1e-8)


def test_braked_time_is_not_used_for_power_loss(fan, assess_text):
    result = assess_text(fan.replace("works_without_power = true", "works_without_power = false"))
    coast, *_ = by_ode(0.0, [])

    assert result.fact("stopping_time", "stop:power loss").best == pytest.approx(coast, rel=1e-8)
    assert result.fact("brake_heat", "stop:power loss").best == 0.0


def test_governing_stop_is_the_slowest_credible_one(fan, assess_text):
    from spinhazard import Policy

    result = assess_text(fan)
    braked_only = assess_text(fan, policy=Policy(credible_stops=("normal stop",)))

    assert result.fact("governing_stop").value == "brake failed"
    assert result.fact("governing_stopping_time").best == result.fact("stopping_time", "stop:brake failed").best
    assert braked_only.fact("governing_stopping_time").best == result.fact("stopping_time", "stop:normal stop").best


def test_required_wait_is_the_governing_stop_times_the_margin(fan, assess_text):
    result = assess_text(fan)

    assert result.fact("required_wait", "lockout").best == pytest.approx(
        1.2 * result.fact("governing_stopping_time").best, rel=1e-12
    )


def test_stop_without_dry_friction_and_standstill_speed_never_ends(fan, assess_text):
    text = fan.replace('friction_torque = "3.1 N m"\n', "").replace(
        "works_without_power = true", "works_without_power = false"
    )
    result = assess_text(text)

    assert math.isinf(result.fact("stopping_time", "stop:power loss").best)
    assert '"value": "never"' in __import__("spinhazard").as_json(result)


def test_standstill_speed_ends_a_stop_without_dry_friction(fan, assess_text):
    text = fan.replace('friction_torque = "3.1 N m"', 'standstill_speed = "10 rpm"').replace(
        "works_without_power = true", "works_without_power = false"
    )
    time, *_ = by_ode(0.0, [], drag=(0.0, 0.002, 0.0041), standstill=10 * 2 * math.pi / 60)

    assert assess_text(text).fact("stopping_time", "stop:power loss").best == pytest.approx(time, rel=1e-8)


def test_unknown_behaviour_without_supply_is_data_missing(fan, assess_text):
    result = assess_text(fan.replace("  works_without_power = false\n", ""))

    fact = result.fact("stopping_time", "stop:power loss")
    assert fact.value is None
    assert fact.missing == ("stopping.brake.disc.works_without_power",)
    assert result.fact("stopping_time", "stop:normal stop").known


def test_control_delay_that_is_not_stated_is_the_policys_and_said_so(fan, assess_text):
    from spinhazard import Policy
    from spinhazard.quantity.notation import parse_stated

    text = fan.replace('control_delay = "0.4 s"\n', "")
    shipped = assess_text(text)
    site = assess_text(text, policy=Policy(default_control_delay=parse_stated("0.4 s", "time")))

    assert site.fact("stopping_time", "stop:normal stop").best == pytest.approx(
        shipped.fact("stopping_time", "stop:normal stop").best + 0.4
    )
    assert "policy.default_control_delay" in shipped.fact("stopping_time", "stop:normal stop").asked
    assert shipped.fact("control_delay_is_stated").value is False


def test_all_missing_fields_come_at_once(fan, assess_text):
    text = fan.replace('speed = "1480 rpm"\nmax_speed = "1628 rpm"\n', "").replace(
        'friction_torque = "3.1 N m"\nviscous = "0.002 N m s"\nwindage = "0.0041 N m s2"\n', ""
    )
    missing = assess_text(text).fact("stopping_time", "stop:power loss").missing

    assert set(missing) == {"shaft.impeller.speed", "stopping.friction_torque"}


def test_measured_coast_gives_an_upper_bound_for_the_speed_on_the_way(fan, assess_text):
    """The straight line of a constant torque lies above the true, convex curve with the same end."""
    brakeless = fan[: fan.index("  [[stopping.brake]]")] + fan[fan.index("[[guard]]") :]
    computed = assess_text(brakeless)
    time = computed.fact("stopping_time", "stop:power loss").best
    drag = 'friction_torque = "3.1 N m"\nviscous = "0.002 N m s"\nwindage = "0.0041 N m s2"'
    measured = assess_text(brakeless.replace(drag, f'measured_times = ["{time:.9f} s"]'))

    assert measured.fact("stopping_time", "stop:power loss").best == pytest.approx(time, rel=1e-8)
    for case in ("normal stop", "power loss"):
        assert (
            measured.fact("energy_at_access", f"stop:{case}").best
            > computed.fact("energy_at_access", f"stop:{case}").best
        )


def test_measured_times_with_a_brake_need_their_stop_case(fan, assess_text):
    drag = 'friction_torque = "3.1 N m"\nviscous = "0.002 N m s"\nwindage = "0.0041 N m s2"'
    result = assess_text(fan.replace(drag, 'measured_times = ["30 s", "31 s"]'))

    assert "stopping.measured_case" in result.fact("stopping_time", "stop:power loss").missing


def test_longest_reading_counts_and_from_five_on_mean_plus_three_deviations(fan, assess_text):
    # common practice, no source: the longest, or mean + 3 s where five or more were taken
    three = assess_text(
        fan.replace(
            "control_delay", 'measured_times = ["5 s", "6 s", "5.5 s"]\nmeasured_case = "normal stop"\ncontrol_delay'
        )
    )
    readings = [5.0, 6.0, 5.5, 5.2, 5.8]
    five = assess_text(
        fan.replace(
            "control_delay",
            f'measured_times = {[f"{t} s" for t in readings]}\nmeasured_case = "normal stop"\ncontrol_delay'.replace(
                "'", '"'
            ),
        )
    )

    assert three.fact("measured_stopping_time").best == 6.0
    assert five.fact("measured_stopping_time").best == pytest.approx(np.mean(readings) + 3 * np.std(readings, ddof=1))


def test_loss_power_gives_the_drag_of_its_law(fan, assess_text):
    drag = 'friction_torque = "3.1 N m"\nviscous = "0.002 N m s"\nwindage = "0.0041 N m s2"'
    laws = {"fan": "14 kW", "constant torque": "500 W", "viscous": "100 W"}
    entries = ", ".join(f'{{ speed = "1480 rpm", power = "{power}", law = "{law}" }}' for law, power in laws.items())
    losses = f"loss_power = [{entries}]"
    result = assess_text(fan.replace(drag, losses))

    assert result.fact("constant_drag").best == pytest.approx(500 / SPEED)
    assert result.fact("linear_drag").best == pytest.approx(100 / SPEED**2)
    assert result.fact("quadratic_drag").best == pytest.approx(14000 / SPEED**3)


def test_temperature_rise_is_that_of_the_hottest_brake(fan, assess_text):
    result = assess_text(fan)
    _, _, both, _ = by_ode(0.4, [(180.0, 0.2), (40.0, 0.5)])
    rise = result.fact("brake_temperature_rise", "stop:normal stop").best

    assert both / (24 * 490) < rise < both / (14 * 490)


def test_heat_is_the_energy_of_the_rotor_less_the_work_of_the_drag(fan, assess_text):
    drag = 'friction_torque = "3.1 N m"\nviscous = "0.002 N m s"\nwindage = "0.0041 N m s2"'
    result = assess_text(fan.replace(drag, 'friction_torque = "0 N m"'))

    assert result.fact("brake_heat", "stop:power loss").best == pytest.approx(0.5 * INERTIA * SPEED**2, rel=1e-9)
