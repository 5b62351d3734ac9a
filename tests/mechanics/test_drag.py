"""Drag torques by hand: from power, from a measured stop, of a disk in air, of a bearing."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import drag
from spinhazard.mechanics.coastdown import speed_after, stopping_time

some = st.floats(1e-2, 1e3)

BY_HAND = [
    (drag.torque_from_power(310.0, 155.0), 2.0),
    (drag.linear_drag_from_power(400.0, 100.0), 0.04),
    (drag.fan_drag_from_power(4000.0, 100.0), 0.004),
    (drag.friction_from_stop_time(1.9, 155.0, time=95.0), 3.1),
    (drag.total_drag_torque(100.0, 3.0, linear=0.01, quadratic=0.001), 14.0),
    (drag.total_drag_torque(0.0, 3.0, linear=0.01, quadratic=0.001), 3.0),
    # 1.2·155·0.36/1.81e-5
    (drag.reynolds_number(1.2, 155.0, radius=0.6, viscosity=1.81e-5), 66.96 / 1.81e-5),
    (drag.bearing_friction_torque(0.002, 10000.0, bore=0.1), 1.0),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_drag_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(some, some)
def test_each_law_takes_the_stated_power_at_the_stated_speed(power, speed):
    parts = {"constant": 0.0, "linear": 0.0, "quadratic": 0.0}
    laws = {
        "constant": drag.torque_from_power, "linear": drag.linear_drag_from_power, "quadratic": drag.fan_drag_from_power,
    }  # fmt: skip
    for part, law in laws.items():
        load = parts | {part: float(law(power, speed))}
        torque = drag.total_drag_torque(speed, load["constant"], linear=load["linear"], quadratic=load["quadratic"])
        assert float(torque * speed) == pytest.approx(power, rel=1e-12)


@given(some, some, some)
def test_friction_of_a_timed_stop_gives_that_time_back(body, speed, time):
    friction = drag.friction_from_stop_time(body, speed, time=time)
    back = stopping_time(body, speed, end_speed=0.0, constant=friction, linear=0.0, quadratic=0.0)

    assert float(back) == pytest.approx(time, rel=1e-12)


growing = st.tuples(st.floats(1e-2, 1e2), st.floats(0.0, 1.0), st.floats(1e-5, 1e-1)).map(
    lambda load: dict(zip(("constant", "linear", "quadratic"), load, strict=True))
)


def times(body, speed, friction, load, brake=0.0):
    """True stop and the one with the constant torque, both with a brake added."""
    true = stopping_time(body, speed, end_speed=0.0, **(load | {"constant": load["constant"] + brake}))
    bound = stopping_time(body, speed, end_speed=0.0, constant=friction + brake, linear=0.0, quadratic=0.0)
    return float(true), float(bound)


@given(growing, st.floats(10.0, 500.0), st.floats(1.0, 3.0), st.floats(0.0, 100.0))
def test_constant_torque_of_a_test_bounds_stops_from_that_speed_and_from_higher_ones(load, speed, factor, brake):
    measured = stopping_time(1.9, speed, end_speed=0.0, **load)
    friction = float(drag.friction_from_stop_time(1.9, speed, time=measured))
    true, bound = times(1.9, factor * speed, friction, load, brake)

    assert bound >= true * (1.0 - 1e-12)


@given(growing, st.floats(10.0, 500.0), st.floats(0.1, 0.9))
def test_constant_torque_of_a_test_is_no_bound_from_a_lower_speed(load, speed, factor):
    measured = stopping_time(1.9, speed, end_speed=0.0, **load)
    friction = float(drag.friction_from_stop_time(1.9, speed, time=measured))
    true, bound = times(1.9, factor * speed, friction, load)

    assert bound < true


def test_example_of_the_page_on_drag_is_worked_out_rightly():
    load = {"constant": 3.1, "linear": 0.002, "quadratic": 0.0041}
    measured = float(stopping_time(1.9, 155.0, end_speed=0.0, **load))

    assert measured == pytest.approx(23.37, abs=5e-3)
    assert float(drag.friction_from_stop_time(1.9, 155.0, time=measured)) == pytest.approx(12.60, abs=5e-3)
    halfway = float(speed_after(measured / 2.0, 1.9, start_speed=155.0, **load))
    assert halfway == pytest.approx(23.0, abs=0.05)
    assert (77.5 / halfway) ** 2 == pytest.approx(11.0, abs=0.5)


def disk(number):
    """Torque of a disk of radius 1 at speed 1 in a fluid of density 2, so that ½ρω²R⁵ is 1: the coefficient itself."""
    return float(drag.disk_windage_torque(2.0, 1.0, radius=1.0, viscosity=2.0 / number))


def test_coefficient_of_a_disk_is_that_of_its_boundary_layer():
    # laminar: 3.87/√10⁴, 3.87/√10⁵
    assert disk(1e4) == pytest.approx(0.0387, rel=1e-12)
    assert disk(1e5) == pytest.approx(3.87 / 10**2.5, rel=1e-12)
    # turbulent: 0.146/(10¹⁰)^(1/5) = 0.146/100
    assert disk(1e10) == pytest.approx(0.00146, rel=1e-12)


def test_boundary_layer_turns_turbulent_at_the_stated_limit():
    below, above = disk(drag.LAMINAR_LIMIT * 0.999), disk(drag.LAMINAR_LIMIT * 1.001)

    assert below == pytest.approx(3.87 * (drag.LAMINAR_LIMIT * 0.999) ** -0.5)
    assert above == pytest.approx(0.146 * (drag.LAMINAR_LIMIT * 1.001) ** -0.2)


@given(st.floats(0.1, 500.0), st.floats(1.0, 2.0))
def test_windage_never_falls_as_the_speed_rises(speed, factor):
    air = {"radius": 0.6, "viscosity": 1.81e-5}
    faster = drag.disk_windage_torque(1.2, factor * speed, **air)

    assert drag.disk_windage_torque(1.2, speed, **air) <= faster * (1.0 + 1e-14)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: drag.fan_drag_from_power(1.0, 0.0), r"speed = 0 rad/s: accepted is more than 0"),
        (lambda: drag.friction_from_stop_time(1.0, 1.0, time=0.0), r"time = 0 s: accepted is more than 0"),
        (lambda: drag.reynolds_number(1.0, 1.0, radius=1.0, viscosity=0.0), r"viscosity = 0 Pa s: accepted is more than 0"),
        (lambda: drag.bearing_friction_torque(-0.1, 1.0, bore=0.1), r"coefficient = -0.1: accepted is 0 or more"),
    ],
)  # fmt: skip
def test_value_that_cannot_be_is_refused_with_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
