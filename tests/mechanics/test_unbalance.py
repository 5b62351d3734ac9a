"""Torque of static unbalance, and inertia measured by a swing or a fall, by hand."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import pendulum, unbalance
from spinhazard.mechanics.inertia import disk_inertia

some = st.floats(1e-2, 1e2)


def test_heavy_side_level_with_the_axis_turns_with_its_weight():
    assert float(unbalance.unbalance_torque(2.0)) == pytest.approx(19.6133, rel=1e-14)
    assert float(unbalance.unbalance_torque(0.0)) == 0.0


@given(some, st.floats(0.1, 2.0), st.floats(0.1, 5.0))
def test_disk_on_two_or_three_cords_at_its_rim_swings_alike(mass, diameter, length):
    """Equation of motion of small swings: J θ″ = −(m g r²/L) θ with cords at r from the axis; T = 2π √(J L/(m g r²))."""
    body, radius = float(disk_inertia(mass, diameter)), diameter / 2.0
    period = 2.0 * math.pi * math.sqrt(body * length / (mass * unbalance.STANDARD_GRAVITY * radius**2))

    assert float(pendulum.bifilar_inertia(mass, diameter, length=length, period=period)) == pytest.approx(
        body, rel=1e-12
    )
    assert float(pendulum.trifilar_inertia(mass, radius, length=length, period=period)) == pytest.approx(
        body, rel=1e-12
    )


@given(some, st.floats(0.01, 1.0), some, st.floats(0.1, 10.0))
def test_falling_weight_gives_back_the_rotor_it_turned(body, radius, weight, height):
    """The weight falls with w g/(w + J/r²)."""
    fall = weight * unbalance.STANDARD_GRAVITY / (weight + body / radius**2)
    back = pendulum.falling_weight_inertia(weight, radius, height=height, time=math.sqrt(2.0 * height / fall))

    assert float(back) == pytest.approx(body, rel=1e-9, abs=1e-12 * weight * radius**2)


def test_fall_quicker_than_a_free_one_is_refused():
    with pytest.raises(ValueError, match="time: accepted is longer than free fall over this height"):
        pendulum.falling_weight_inertia(2.0, 0.05, height=1.0, time=math.sqrt(2.0 / 9.81))


def test_negative_unbalance_is_refused():
    with pytest.raises(ValueError, match="unbalance = -1 kg m: accepted is 0 or more"):
        unbalance.unbalance_torque(-1.0)
