"""Heat of a brake by hand, and as the energy the rotor loses."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from spinhazard.mechanics import braking
from spinhazard.mechanics.coastdown import angle_turned
from spinhazard.mechanics.energy import rotational_energy

some = st.floats(1e-2, 1e3)

BY_HAND = [
    (braking.brake_heat(180.0, 100.0), 18000.0),
    (braking.absorbed_energy(2.0, 10.0, end_speed=0.0), 100.0),
    (braking.absorbed_energy(2.0, 10.0, end_speed=6.0), 64.0),
    (braking.absorbed_energy(2.0, 10.0, end_speed=0.0, drag_work=20.0), 80.0),
    # 49 kJ into 10 kg of 490 J/(kg K)
    (braking.temperature_rise(49000.0, 10.0, specific_heat=490.0), 10.0),
]


@pytest.mark.parametrize(("computed", "by_hand"), BY_HAND)
def test_heat_is_what_a_hand_calculation_gives(computed, by_hand):
    assert float(computed) == pytest.approx(by_hand, rel=1e-14)


@given(some, some, some)
def test_brake_alone_turns_all_the_energy_into_heat(body, speed, torque):
    turned = angle_turned(body, speed, end_speed=0.0, constant=torque, linear=0.0, quadratic=0.0)

    assert float(braking.brake_heat(torque, turned)) == pytest.approx(float(rotational_energy(body, speed)), rel=1e-12)


@given(some, some, some, some)
def test_brake_and_friction_share_the_energy_as_their_torques(body, speed, torque, friction):
    turned = angle_turned(body, speed, end_speed=0.0, constant=torque + friction, linear=0.0, quadratic=0.0)
    heat = float(braking.brake_heat(torque, turned))
    rest = braking.absorbed_energy(body, speed, end_speed=0.0, drag_work=braking.brake_heat(friction, turned))

    assert heat == pytest.approx(float(rotational_energy(body, speed)) * torque / (torque + friction), rel=1e-12)
    assert float(rest) == pytest.approx(heat, rel=1e-6, abs=1e-9 * float(rotational_energy(body, speed)))


@given(some, some, some, st.floats(0.0, 10.0), st.floats(0.0, 1.0))
def test_drag_beside_a_brake_never_adds_to_its_heat(body, speed, torque, linear, quadratic):
    with_drag = angle_turned(body, speed, end_speed=0.0, constant=torque, linear=linear, quadratic=quadratic)

    assert float(braking.brake_heat(torque, with_drag)) <= float(rotational_energy(body, speed)) * (1.0 + 1e-9)


@pytest.mark.parametrize(
    ("call", "message"),
    [
        (lambda: braking.brake_heat(-1.0, 1.0), r"torque = -1 N m: accepted is 0 or more"),
        (lambda: braking.temperature_rise(1.0, 0.0, specific_heat=490.0), r"mass = 0 kg: accepted is more than 0"),
        (lambda: braking.temperature_rise(1.0, 1.0, specific_heat=0.0), r"specific_heat = 0 J/\(kg K\): accepted is more than 0"),
    ],
)  # fmt: skip
def test_value_that_cannot_be_is_refused_with_unit_and_range(call, message):
    with pytest.raises(ValueError, match=message):
        call()
